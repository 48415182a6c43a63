"""Find the table of an input sheet by its titles, so that columns may be moved and rows put above."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

from heatledger.errors import Problem
from heatledger.inputs.cells import Cell, Cells, reference
from heatledger.inputs.columns import SheetRow
from heatledger.inputs.headings import Headings, find_fields
from heatledger.inputs.titles import column_titles, title_of
from heatledger.inputs.typed_numbers import is_number
from heatledger.inputs.units import is_unit_of, unit_meant

__all__ = ["Record", "Table", "header_row", "read_labels", "read_table"]


@dataclass(frozen=True)
class Record:
    """The cells of one row by field name, with the place of every column."""

    row: int
    cells: dict[str, Cell]
    positions: dict[str, int]
    lost: frozenset[str] = frozenset()
    """Fields whose title seems to have been changed: nothing is said of their cells."""


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
    header = header_row(model, cells)
    if header is None:
        return Table(problems=(_no_header(model),), complete=False)
    titles = {column: cell for (row, column), cell in sorted(cells.items()) if row == header}
    found = find_fields(model, titles, lambda column: reference(header, column))
    problems = [*found.problems]
    for field, column in found.positions.items():
        problems += _changed_unit(model, field, cells.get((header - 1, column)), reference(header - 1, column))
    return Table(tuple(_records(model, header, found, cells)), tuple(problems), found.complete)


def read_labels(model: type[SheetRow], cells: Cells) -> Table:
    """Read the one record of a sheet with labels in column A, values in column B and units in column C.

    A label without value is taken for a heading where the same label stands again with one, or further down.
    """
    labels = {row: cell for (row, column), cell in sorted(cells.items()) if column == 1}
    with_value = {row: cell for row, cell in labels.items() if (row, 2) in cells}
    without = {row: labels[row] for row in reversed(labels) if row not in with_value}
    found = find_fields(model, {**with_value, **without}, lambda row: reference(row, 1), headings=without)
    problems = [*found.problems]
    for field, row in found.positions.items():
        problems += _changed_unit(model, field, cells.get((row, 3)), reference(row, 3))
    values = {field: cells[row, 2] for field, row in found.positions.items() if (row, 2) in cells}
    record = Record(0, values, found.positions, frozenset(found.lost))
    return Table((record,), tuple(problems), found.complete)


def header_row(model: type[SheetRow], cells: Cells) -> int | None:
    """Row that holds the first column's title or enough of the others; the fullest one, then the topmost."""
    fields = column_titles(model)
    enough = max(2, sum(column.required for column in model.columns().values()) - 1)
    found: dict[int, set[str]] = {}
    for (row, _), cell in cells.items():
        field = fields.get(title_of(cell).key)
        if field:
            found.setdefault(row, set()).add(field)
    candidates = [(len(names), -row) for row, names in found.items() if model.key() in names or len(names) >= enough]
    return -max(candidates)[1] if candidates else None


def _records(model: type[SheetRow], header: int, titles: Headings, cells: Cells) -> Iterator[Record]:
    """Rows that hold anything in a column of ours; a copy of the header row is none."""
    fields: dict[int, list[str]] = {}
    for field, column in titles.positions.items():
        fields.setdefault(column, []).append(field)
    rows: dict[int, dict[str, Cell]] = {}
    for (row, column), cell in sorted(cells.items()):
        if row > header and column in fields:
            shared = fields[column]
            rows.setdefault(row, {})[shared[-1] if _is_number(cell) else shared[0]] = cell
    own, lost = column_titles(model), frozenset(titles.lost)
    for row, found in rows.items():
        if len(found) == 1 or any(own.get(title_of(cell).key) != field for field, cell in found.items()):
            yield Record(row, found, titles.positions, lost)


def _is_number(cell: Cell) -> bool:
    return cell.kind == "number" or (cell.kind == "text" and is_number(str(cell.value)))


def _no_header(model: type[SheetRow]) -> Problem:
    titles = ", ".join(column.title for column in model.columns().values() if column.required)
    fix = "Copy the header row from a fresh template, or restore the titles."
    return Problem("no header row", f"a row with the titles {titles}", fix, sheet=model.sheet)


def _changed_unit(model: type[SheetRow], field: str, unit: Cell | None, cell: str) -> list[Problem]:
    """A unit typed over would be read wrongly; any text that is no unit is left alone."""
    column = model.columns()[field]
    typed = str(unit.value).strip(" []") if unit and unit.kind == "text" else ""
    if not column.unit or not unit_meant(typed) or is_unit_of(unit_meant(typed), column):
        return []
    found, fix = f"the unit '{typed}'", f"Convert the values to {column.unit} and restore the unit."
    return [Problem(found, f"'{column.unit}'", fix, sheet=model.sheet, cell=cell, column=column.label)]
