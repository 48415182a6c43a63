"""The stored values of a workbook, read in one bounded pass per sheet."""

from __future__ import annotations

import re
import string
from bisect import bisect_right
from collections.abc import Callable, Collection, Iterable
from contextlib import suppress
from dataclasses import dataclass, replace
from datetime import datetime, timedelta
from pathlib import Path

from heatledger.errors import InputError, Problem
from heatledger.inputs.cells import Cell, Cells, reference
from heatledger.inputs.wording import folded
from heatledger.workbook.gate import read_package, readable
from heatledger.workbook.package import Package, SheetEntry, main, required
from heatledger.workbook.references import global_markers
from heatledger.workbook.stream import Budget, StoredCell, column_number, hear_cells, hear_strings, unescaped

__all__ = ["owned_sheets", "read_cells"]

FIRST_ROWS = 30
MOST_ROWS = 20_000
MOST_COLUMNS = 500
MOST_CELLS = 1_000_000

_UNSEEN = string.whitespace + "\xa0\xad\u200b\u200c\u200d\u2060\ufeff"
"""White space and characters without width."""
_RANGE = re.compile(r"([A-Z]{1,3})(\d{1,7}):[A-Z]{1,3}(\d{1,7})")
_NOT_A_DATE_PART = re.compile(r'"[^"]*"|\\.|_.|\*.|\[[^\]]*\]')
_LONGEST_FORMAT = 255
"""Letters that spreadsheet programs allow in a number format."""
_DATE_FORMATS = {*range(14, 23), *range(27, 37), *range(45, 48), *range(50, 59)}
"""Built-in number formats that show dates or times (ECMA-376 Part 1, 18.8.30)."""


def owned_sheets(path: Path) -> frozenset[str]:
    """Names of the sheets that carry our marker."""
    package = read_package(path)
    with readable(path):
        return _owned(package)


def read_cells(path: Path, wanted: Collection[str] | None = None) -> dict[str, Cells]:
    """The filled cells of every worksheet, in the order of the tabs.

    Result sheets of ours and chart sheets are left out. White space counts as
    empty; the outer spaces of other texts are kept.

    Parameters
    ----------
    path : Path
        An .xlsx or .xlsm file.
    wanted : collection of str, optional
        Sheets to read, in any case; the others stand in the result without cells,
        so a user's own large sheet costs nothing and meets no limit. Where a wanted
        sheet is absent, the first rows of the others are read: one may be it, renamed.

    Raises
    ------
    InputError
        If the file is no sound workbook, or sheets hold more than can be read.
    """
    package = read_package(path)
    with readable(path):
        book = _Book(Budget(), _strings(package), *_dates(package))
        entries = _user_sheets(package)
    only = None if wanted is None else {folded(title) for title in wanted}
    renamed = bool(only and only - {folded(entry.title) for entry in entries})
    sheets: dict[str, Cells] = {entry.title: {} for entry in entries}
    problems: list[Problem] = []
    room = MOST_CELLS
    for entry in entries:
        if only is None or folded(entry.title) in only:
            try:
                sheets[entry.title] = _sheet(path, package, entry, book, room)
                room -= len(sheets[entry.title])
            except InputError as error:
                problems += error.problems
        elif renamed:
            sheets[entry.title] = _first_rows(path, package, entry, book)
    if problems:
        raise InputError(problems)
    return sheets


def _user_sheets(package: Package) -> list[SheetEntry]:
    """Worksheets that are not ours."""
    owned = {title.casefold() for title in _owned(package)}
    return [entry for entry in package.sheets() if entry.kind == "worksheet" and entry.title.casefold() not in owned]


@dataclass(frozen=True)
class _Book:
    """What the cells of all sheets refer to."""

    budget: Budget
    strings: list[str]
    is_date: list[bool]
    start: datetime


def _owned(package: Package) -> frozenset[str]:
    return frozenset(title for _, title in global_markers(package.xml(package.workbook)))


def _strings(package: Package) -> list[str]:
    part = package.related(package.workbook, "sharedStrings")
    return hear_strings(package.parts[part], Budget()) if part else []


def _dates(package: Package) -> tuple[list[bool], datetime]:
    """Whether each cell style shows dates, and the day before the first serial day."""
    properties = package.xml(package.workbook).find(main("workbookPr"))
    late = properties is not None and properties.get("date1904") in {"1", "true"}
    start = datetime(1904, 1, 1) if late else datetime(1899, 12, 30)
    part = package.related(package.workbook, "styles")
    if part is None:
        return [False], start
    styles = package.xml(part)
    codes = {int(required(item, "numFmtId")): required(item, "formatCode") for item in styles.iter(main("numFmt"))}
    formats = [int(item.get("numFmtId", "0")) for item in styles.iterfind(f"{main('cellXfs')}/{main('xf')}")]
    return [_shows_date(number, codes.get(number)) for number in formats] or [False], start


def _shows_date(number: int, code: str | None) -> bool:
    if code is None:
        return number in _DATE_FORMATS
    bare = _NOT_A_DATE_PART.sub("", code[:_LONGEST_FORMAT]).split(";")[0].lower()
    return bare != "general" and any(letter in bare for letter in "ymdhs")


def _sheet(path: Path, package: Package, entry: SheetEntry, book: _Book, room: int) -> Cells:
    cells: dict[tuple[int, int], Cell] = {}

    def keep(row: int, column: int, stored: StoredCell) -> None:
        cell = _cell(stored, book)
        if cell is None:
            return
        if row > MOST_ROWS or column > MOST_COLUMNS or len(cells) >= room:
            raise InputError([_too_much(path, entry.title, row, column)])
        cells[row, column] = cell

    with readable(path, entry.title):
        ranges = hear_cells(package.parts[entry.part], book.budget, keep)
    return cells | _merged(ranges, cells)


def _merged(ranges: Iterable[str], cells: Cells) -> dict[tuple[int, int], Cell]:
    """Empty cells that look filled, since they are merged with a filled one above in a row that holds more."""
    rows = sorted({row for row, _ in cells})
    found: dict[tuple[int, int], Cell] = {}
    for match in filter(None, map(_RANGE.fullmatch, ranges)):
        column, first, last = column_number(match[1]), int(match[2]), int(match[3])
        if (first, column) in cells:
            below = rows[bisect_right(rows, first) : bisect_right(rows, last)]
            found |= {(row, column): Cell(None, "merged") for row in below}
    return found


class _EnoughError(Exception):
    """Ends the reading of a sheet early."""


def _first_rows(path: Path, package: Package, entry: SheetEntry, book: _Book) -> Cells:
    """What stands in the first rows of a sheet that need not be sound."""
    cells: dict[tuple[int, int], Cell] = {}

    def keep(row: int, column: int, stored: StoredCell) -> None:
        if row > FIRST_ROWS:
            raise _EnoughError
        cell = _cell(stored, book)
        if cell is not None and column <= MOST_COLUMNS:
            cells[row, column] = cell

    with suppress(_EnoughError, InputError), readable(path, entry.title):
        hear_cells(package.parts[entry.part], replace(book.budget), keep)
    return cells


def _too_much(path: Path, sheet: str, row: int, column: int) -> Problem:
    found, limit = f"more than {MOST_CELLS:,} filled cells", f"at most {MOST_CELLS:,} in all sheets"
    if row > MOST_ROWS:
        found, limit = f"a value in row {row:,}", f"at most {MOST_ROWS:,} rows"
    elif column > MOST_COLUMNS:
        found, limit = f"a value in column {column:,}", f"at most {MOST_COLUMNS:,} columns"
    fix = "Clear this cell and those beyond it, or move them to another workbook."
    return Problem(found, limit, fix, sheet=sheet, cell=reference(row, column), file=path.name)


def _cell(stored: StoredCell, book: _Book) -> Cell | None:
    attributes, text, formula = stored
    kind = attributes.get("t", "n")
    if text:
        return _DECODE[kind](text, int(attributes.get("s", "0")), book)
    if formula and (text is None or kind != "str"):
        return Cell(None, "uncalculated")
    return None


def _number(text: str, style: int, book: _Book) -> Cell:
    number = float(text)
    if not book.is_date[style]:
        return Cell(number, "number")
    return Cell(_moment(number, book.start), "date")


def _moment(serial: float, start: datetime) -> str:
    """ISO text of a serial day; what has no date stays a number in the text.

    >>> _moment(45000, datetime(1899, 12, 30)), _moment(45000.5, datetime(1899, 12, 30))
    ('2023-03-15', '2023-03-15T12:00:00')
    >>> _moment(0.25, datetime(1899, 12, 30)), _moment(-1, datetime(1899, 12, 30))
    ('06:00:00', '-1')
    """
    early = start.year < 1900 and 1 <= serial < 61
    try:  # the calendar of 1900 counts a 29 February that never was
        moment = start + timedelta(days=int(early), seconds=round(serial * 86400))
    except OverflowError:
        return f"{serial:g}"
    if serial < 0:
        return f"{serial:g}"
    return moment.time().isoformat() if serial < 1 else moment.isoformat().removesuffix("T00:00:00")


def _text(text: str, style: int, book: _Book) -> Cell | None:
    return _visible(unescaped(text))


def _visible(text: str) -> Cell | None:
    """A text; none if nothing of it can be seen."""
    return Cell(text, "text") if text.strip(_UNSEEN).strip() else None


def _shared_text(text: str, style: int, book: _Book) -> Cell | None:
    index = int(text)
    if index < 0:
        raise IndexError("negative string index")
    return _visible(book.strings[index])


_DECODE: dict[str, Callable[[str, int, _Book], Cell | None]] = {
    "n": _number,
    "s": _shared_text,
    "str": _text,
    "inlineStr": lambda text, style, book: _visible(text),
    "b": lambda text, style, book: Cell(text in {"1", "true"}, "boolean"),
    "e": lambda text, style, book: Cell(text, "error"),
    "d": lambda text, style, book: Cell(text.removesuffix("T00:00:00"), "date"),
}
