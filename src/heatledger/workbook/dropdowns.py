"""The hidden sheet behind the dropdowns: each list of names, without gaps and repeats."""

from __future__ import annotations

import re
from collections.abc import Iterable, Mapping

from openpyxl import Workbook
from openpyxl.workbook.defined_name import DefinedName
from openpyxl.worksheet.worksheet import Worksheet

from heatledger.inputs.cells import column_letters
from heatledger.inputs.columns import COMPASS, Column, SheetRow
from heatledger.inputs.rows import SHEETS
from heatledger.workbook.row_marks import Rows

__all__ = ["LISTS", "key_of", "write_lists"]

LISTS = "Lists"
"""Name of the hidden sheet."""
LONGEST_LIST = 255
"""Characters a list may have inside a validation (ECMA-376 Part 1, 18.3.1.33)."""
_TOP = 3
"""First row of every list; its title stands in row 1, its length in row 2."""

Key = tuple[str, tuple[str, ...]]
"""What tells lists apart: the sheet whose names they hold and their fixed words."""


def write_lists(book: Workbook, rows: Mapping[type[SheetRow], Rows], further: Iterable[Key]) -> dict[Key, str]:
    """Write every list that a column needs.

    Parameters
    ----------
    book : Workbook
        Gets the hidden sheet as its last one.
    rows : mapping
        The rows of each sheet; names stand in its first column.
    further : iterable of Key
        Lists that the columns as declared do not know.

    Returns
    -------
    dict
        Formula of each list, as a validation takes it.
    """
    sheet = book.create_sheet(LISTS)
    sheet.sheet_state = "hidden"
    sources = {model.sheet: found for model, found in rows.items()}
    formulas: dict[Key, str] = {}
    counters: dict[str, int] = {}
    for key in dict.fromkeys((*_needed(), *further)):
        origin, words = key
        if not origin and words != COMPASS and len(",".join(words)) + 2 <= LONGEST_LIST:
            formulas[key] = '"' + ",".join(words) + '"'
            continue
        if origin and origin not in counters:
            counters[origin] = sheet.max_column + 1
            _counter(sheet, counters[origin], sources[origin])
        column = sheet.max_column + 1
        _list(sheet, column, key, sources.get(origin), counters.get(origin, 0))
        formulas[key] = _named(book, key, column)
    return formulas


def key_of(column: Column) -> Key:
    """The list a column chooses from."""
    return column.names_from, COMPASS if column.kind == "azimuth" else column.choices


def _needed() -> list[Key]:
    columns = [column for model in SHEETS for column in model.columns().values()]
    keys = [key_of(column) for column in columns if column.kind in {"choice", "name", "azimuth"}]
    return list(dict.fromkeys(keys))


def _counter(sheet: Worksheet, column: int, source: Rows) -> None:
    """Count up at each name that stands for the first time."""
    letters, cells, top = column_letters(column), source.names, _TOP - 1
    sheet.cell(1, column, f"{source.model.sheet}: counter")
    sheet.cell(2, column, 0)
    place, name = f"ROW()-{top}", f"INDEX({cells},ROW()-{top})"
    for row in range(_TOP, _TOP + source.length):
        is_new = f'IF({name}="",0,IF(MATCH({name},{cells},0)={place},1,0))'
        sheet.cell(row, column, f"={letters}{row - 1}+IFERROR({is_new},0)")


def _list(sheet: Worksheet, column: int, key: Key, source: Rows | None, counter: int) -> None:
    """Fixed words first, then the names in the order of their sheet."""
    origin, words = key
    sheet.cell(1, column, " + ".join(part for part in (", ".join(words), origin) if part))
    sheet.cell(2, column, len(words))
    for place, word in enumerate(words):
        sheet.cell(_TOP + place, column, word)
    if source is None:
        return
    last = _TOP + source.length - 1
    count = f"{column_letters(counter)}${_TOP}:{column_letters(counter)}${last}"
    sheet.cell(2, column, f"={len(words)}+MAX({count})")
    for place in range(source.length):
        row = _TOP + len(words) + place
        match = f"MATCH(ROW()-{row - place - 1},{count},0)"
        sheet.cell(row, column, f'=IFERROR(TRIM(INDEX({source.names},{match})),"")')


def _named(book: Workbook, key: Key, column: int) -> str:
    """Give the filled part of a list a name; validations refer to other sheets through names."""
    origin, words = key
    parts = [origin, "compass" if words == COMPASS else " ".join(word.split()[0] for word in words)]
    name = "_".join(["list", *(re.sub(r"\W+", "_", part.lower()) for part in parts if part)])
    letters = column_letters(column)
    area = f"OFFSET({LISTS}!${letters}${_TOP},0,0,MAX(1,{LISTS}!${letters}$2),1)"
    book.defined_names[name] = DefinedName(name, attr_text=area)
    return name
