"""Find the table of an input sheet by its titles, so that columns may be moved and rows put above."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass

from heatledger.errors import Problem
from heatledger.inputs.cells import Cell, Cells, reference
from heatledger.inputs.columns import Column, SheetRow
from heatledger.inputs.wording import nearest

__all__ = ["Record", "Table", "read_labels", "read_table"]

_ALIKE = 0.75
"""Likeness from which a title or sheet is taken for a renamed one although it may be absent."""


@dataclass(frozen=True)
class Record:
    """The cells of one row by field name, with the place of every column."""

    row: int
    cells: dict[str, Cell]
    positions: dict[str, int]


@dataclass(frozen=True)
class Table:
    """What was read of a sheet.

    Parameters
    ----------
    records : tuple of Record
        One for each row that holds anything in a column of ours.
    problems : tuple of Problem
        Missing header or columns, titles that stand twice, units that were changed.
    complete : bool
        Whether every required column was found.
    """

    records: tuple[Record, ...] = ()
    problems: tuple[Problem, ...] = ()
    complete: bool = True


def read_table(model: type[SheetRow], cells: Cells) -> Table:
    """Read the rows below the header row of a sheet.

    Parameters
    ----------
    model : type of SheetRow
        The sheet's row model.
    cells : Cells
        All filled cells of the sheet.

    Returns
    -------
    Table
    """
    if not cells and not model.required_sheet:
        return Table()
    header = _header_row(model, cells)
    if header is None:
        return Table(problems=(_no_header(model),), complete=False)
    titles = {column: cell for (row, column), cell in sorted(cells.items()) if row == header}
    positions, twice = _positions(model, titles, header)
    problems = [*twice, *_missing_titles(model, positions, titles.values())]
    for field, column in positions.items():
        problems += _changed_unit(model, field, cells.get((header - 1, column)), reference(header - 1, column))
    return Table(tuple(_records(header, positions, cells)), tuple(problems), _complete(model, positions))


def read_labels(model: type[SheetRow], cells: Cells) -> Table:
    """Read the one record of a sheet with labels in column A, values in column B and units in column C.

    A label without value beside the same label with one is taken for a heading.
    """
    fields = _fields(model)
    labels = {row: cell for (row, column), cell in sorted(cells.items()) if column == 1}
    positions: dict[str, int] = {}
    problems: list[Problem] = []
    for row, cell in labels.items():
        field = fields.get(_title(cell))
        if field is None:
            continue
        if (positions.get(field, 0), 2) not in cells:
            positions[field] = row
        elif (row, 2) in cells:
            problems.append(_twice(model, model.columns()[field], reference(row, 1)))
    for field, row in positions.items():
        problems += _changed_unit(model, field, cells.get((row, 3)), reference(row, 3))
    problems += _missing_titles(model, positions, labels.values())
    values = {field: cells[row, 2] for field, row in positions.items() if (row, 2) in cells}
    return Table((Record(0, values, positions),), tuple(problems), _complete(model, positions))


def _title(cell: Cell) -> str:
    """A title without regard to case and to line breaks within it."""
    return " ".join(str(cell.value).split()).casefold()


def _fields(model: type[SheetRow]) -> dict[str, str]:
    return {column.title.casefold(): field for field, column in model.columns().items()}


def _header_row(model: type[SheetRow], cells: Cells) -> int | None:
    """Row that holds the first column's title or enough of the others; the fullest one, then the topmost."""
    titles = _fields(model)
    first = model.columns()[model.key()].title.casefold()
    enough = max(2, sum(column.required for column in model.columns().values()) - 1)
    found: dict[int, set[str]] = {}
    for (row, _), cell in cells.items():
        if _title(cell) in titles:
            found.setdefault(row, set()).add(_title(cell))
    candidates = [(len(words), -row) for row, words in found.items() if first in words or len(words) >= enough]
    return -max(candidates)[1] if candidates else None


def _positions(model: type[SheetRow], titles: dict[int, Cell], header: int) -> tuple[dict[str, int], list[Problem]]:
    """Column of every field, and the titles that stand twice."""
    fields = _fields(model)
    positions: dict[str, int] = {}
    twice: list[Problem] = []
    for column, cell in titles.items():
        field = fields.get(_title(cell))
        if field is None:
            continue
        if field in positions:
            twice.append(_twice(model, model.columns()[field], reference(header, column)))
        positions.setdefault(field, column)
    return positions, twice


def _complete(model: type[SheetRow], positions: dict[str, int]) -> bool:
    return all(field in positions for field, column in model.columns().items() if column.required)


def _records(header: int, positions: dict[str, int], cells: Cells) -> list[Record]:
    fields = {column: field for field, column in positions.items()}
    rows: dict[int, dict[str, Cell]] = {}
    for (row, column), cell in sorted(cells.items()):
        if row > header and column in fields:
            rows.setdefault(row, {})[fields[column]] = cell
    return [Record(row, found, positions) for row, found in rows.items()]


def _missing_titles(model: type[SheetRow], positions: dict[str, int], titles: Iterable[Cell]) -> list[Problem]:
    """Required titles that are absent, and optional ones that seem to have been renamed."""
    fields = _fields(model)
    others = [" ".join(str(cell.value).split()) for cell in titles if _title(cell) not in fields]
    absent = [column for field, column in model.columns().items() if field not in positions]
    return [
        _missing(model, column, nearest(column.title, others, 0.6 if column.required else _ALIKE))
        for column in absent
        if column.required or nearest(column.title, others, _ALIKE)
    ]


def _missing(model: type[SheetRow], column: Column, close: str) -> Problem:
    hint = f"Rename '{close}' to '{column.title}'" if close else "Add it, or copy the titles from a fresh template"
    expected = f"the {'label' if model.labelled else 'column'} {column.title}"
    return Problem(f"no title '{column.title}'", expected, f"{hint}.", sheet=model.sheet, column=column.label)


def _no_header(model: type[SheetRow]) -> Problem:
    titles = ", ".join(column.title for column in model.columns().values() if column.required)
    fix = "Copy the header row from a fresh template, or restore the titles."
    return Problem("no header row", f"a row with the titles {titles}", fix, sheet=model.sheet)


def _twice(model: type[SheetRow], column: Column, cell: str) -> Problem:
    found, fix = f"the title '{column.title}' a second time", "Rename or delete one of the two."
    return Problem(found, "each title once", fix, sheet=model.sheet, cell=cell, column=column.label)


def _changed_unit(model: type[SheetRow], field: str, unit: Cell | None, cell: str) -> list[Problem]:
    """A unit typed over would be read wrongly."""
    column = model.columns()[field]
    typed = str(unit.value).strip(" []") if unit and unit.kind == "text" else ""
    if not column.unit or typed not in OTHER_UNITS or typed in column.unit.split(" or "):
        return []
    found, fix = f"the unit '{typed}'", f"Convert the values to {column.unit} and restore the unit."
    return [Problem(found, f"'{column.unit}'", fix, sheet=model.sheet, cell=cell, column=column.label)]


OTHER_UNITS = frozenset(
    {"mm", "cm", "m", "m²", "m³", "ft", "in", "ft²", "ft³", "°C", "°F", "K", "%", "-", "W", "kW", "BTU/h"}
    | {"W/(m·K)", "W/(m²·K)", "kJ/(m²·K)", "Wh/(m²·K)", "J/(kg·K)", "kJ/(kg·K)", "kg/m³", "lb/ft³", "1/h", "l/s"}
)
"""Units whose meaning is plain; any other text above a title is left alone."""
