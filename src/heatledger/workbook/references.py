"""Sheet names inside formulas, and the hidden names that mark our own sheets."""

from __future__ import annotations

import re
from collections.abc import Iterator, Mapping

from heatledger.workbook.package import Element, main, required

__all__ = ["global_markers", "is_marker", "marker_name", "quoted", "rename_sheets", "sheet_of", "sheets_in"]

MARKER = "_heatledger_sheet_"
"""Stem of the hidden workbook-level names; each points at a sheet that we wrote."""
_SHEET = re.compile(r""""(?:[^"]|"")*"|'((?:[^']|'')+)'!|(?<![\w.\]])([^\W\d][\w.]*)!""")
"""A text, which holds no reference, or a sheet name; behind a bracket it belongs to another workbook."""


def quoted(title: str) -> str:
    """A sheet name as formulas quote it.

    >>> quoted("Tom's sheet")
    "'Tom''s sheet'"
    """
    return "'" + title.replace("'", "''") + "'"


def sheet_of(formula: str) -> str | None:
    """The sheet that a reference points at.

    >>> sheet_of("'Monthly need'!$A$1"), sheet_of("Summary!$A$1"), sheet_of("#REF!$A$1")
    ('Monthly need', 'Summary', None)
    """
    match = _SHEET.match(formula)
    return _title(match) if match else None


def sheets_in(formula: str) -> set[str]:
    r"""The sheets of this workbook that a formula uses, casefolded.

    >>> sorted(sheets_in("'Monthly need'!B3+Summary!A1+[1]Notes!A1&\"Zones!\""))
    ['monthly need', 'summary']
    """
    return {(_title(match) or "").casefold() for match in _SHEET.finditer(formula)} - {""}


def rename_sheets(formula: str, renames: Mapping[str, str]) -> str:
    r"""The formula with other sheet names; old names are given casefolded, texts stay.

    >>> rename_sheets("SUM('Monthly need'!$B$3,notes!A1)&\"Notes!\"", {"notes": "Notes (2)"})
    'SUM(\'Monthly need\'!$B$3,\'Notes (2)\'!A1)&"Notes!"'
    """

    def swap(match: re.Match[str]) -> str:
        new = renames.get((_title(match) or "").casefold())
        return f"{quoted(new)}!" if new else match[0]

    return _SHEET.sub(swap, formula)


def _title(match: re.Match[str]) -> str | None:
    return match[1].replace("''", "'") if match[1] else match[2]


def marker_name(title: str) -> str:
    """Name that marks the sheet we first wrote under this title.

    >>> marker_name("Monthly need")
    '_heatledger_sheet_monthly_need'
    """
    return MARKER + re.sub(r"\W", "_", title.casefold())


def is_marker(name: Element) -> bool:
    """Whether a defined name is one of our markers; copies that belong to one sheet are not."""
    return name.get("name", "").casefold().startswith(MARKER) and name.get("localSheetId") is None


def global_markers(workbook: Element) -> Iterator[tuple[str, str]]:
    """Marker and present title of each sheet that is ours."""
    for name in workbook.iterfind(f"{main('definedNames')}/{main('definedName')}"):
        title = sheet_of(name.text or "")
        if is_marker(name) and title is not None:
            yield required(name, "name").casefold(), title
