"""Turn the cells of a record into a checked row, or into problems."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from typing import Any, Generic, TypeAlias, TypeVar, cast

from pydantic import ValidationError

from heatledger.errors import Problem
from heatledger.inputs.cells import Cell
from heatledger.inputs.columns import COMPASS, Column, SheetRow, plain
from heatledger.inputs.tables import Record
from heatledger.inputs.units import within_limits, wrong_size
from heatledger.inputs.wording import (
    chosen_word,
    compass_word,
    describe,
    folded,
    mend,
    month_numbers,
    typed_name,
)

__all__ = ["Checked", "check_record", "meant_word", "placed_row", "problem_at"]

Row = TypeVar("Row", bound=SheetRow)
EMPTY = "an empty cell"
Faults: TypeAlias = dict[str, tuple[str, str, str]]
"""What was found, what is expected and the mend, by field."""


@dataclass(frozen=True)
class Checked(Generic[Row]):
    """What became of a record.

    Parameters
    ----------
    row : SheetRow or None
        None if any cell is at fault.
    partial : SheetRow
        What could be read, so that rules on the sound cells are checked all the same.
    at_fault : frozenset of str
        Fields that ``partial`` lacks.
    problems : list of Problem
        One for each cell at fault.
    """

    row: Row | None
    partial: Row
    at_fault: frozenset[str] = frozenset()
    problems: list[Problem] = field(default_factory=list)


def check_record(model: type[Row], record: Record) -> Checked[Row]:
    """Check one record against its row model."""
    values, faults = _typed_values(model, record)
    row, refused = _validated(model, values, record)
    faults |= refused
    if row is not None and not faults:
        row.placed(record.row, record.positions)
        return Checked(row, row, record.lost)
    missing = {name for name, column in model.columns().items() if column.required and name not in values}
    at_fault = frozenset(faults) | missing | record.lost
    partial = placed_row(model, record, {name: value for name, value in values.items() if name not in at_fault})
    gaps = [name for name, (found, *_) in faults.items() if found == EMPTY]
    if len(gaps) > 1 and not model.labelled:
        return _hardly_filled(partial, [name for name in faults if name not in gaps], gaps, faults)
    problems = [problem_at(partial, name, *faults[name]) for name in model.columns() if name in faults]
    return Checked(None, partial, at_fault, problems)


def _hardly_filled(partial: Row, others: list[str], gaps: list[str], faults: Faults) -> Checked[Row]:
    """One problem for all that a row lacks; a remark or a sum below the table is no row, and no rule is told of it."""
    titles = ", ".join(partial.columns()[name].title for name in gaps)
    fix = "Fill them in, or clear the row."
    problems = [problem_at(partial, partial.key(), f"a row without {titles}", "these cells filled in", fix)]
    problems += [problem_at(partial, name, *faults[name]) for name in others]
    return Checked(None, partial, frozenset(partial.columns()), problems)


def placed_row(model: type[Row], record: Record, values: Mapping[str, Any] | None = None) -> Row:
    """An unchecked row of some values, or of none, that knows its place."""
    row = model.model_construct(**(values or {}))
    return cast("Row", row.placed(record.row, record.positions))


def problem_at(row: SheetRow, name: str, found: str, expected: str, fix: str) -> Problem:
    """A problem placed on the cell of a row's field, or on the row's name where the field has no column."""
    column = row.columns()[name]
    if not row.has(name):
        found = "no such column" if found == EMPTY else found
        fix = f"Add the column {column.title}, or rename the one that stands for it."
    return Problem(found, expected, fix, sheet=row.sheet, cell=row.cell(name), column=column.label)


def meant_word(typed: str, words: tuple[str, ...]) -> str:
    """The word of a name column that is meant, else the name as typed.

    >>> meant_word("Unventilated", ("unventilated air layer",))
    'unventilated air layer'
    """
    meant = {_bare(word): word for word in words}
    return meant.get(_bare(typed), typed)


def _bare(word: str) -> str:
    return folded(word).replace("air layer", "").strip(" :,()")


def _typed_values(model: type[SheetRow], record: Record) -> tuple[dict[str, object], Faults]:
    """Values by field, and the cells at fault."""
    values: dict[str, object] = {}
    faults: Faults = {}
    for name, column in model.columns().items():
        cell = record.cells.get(name)
        if cell is None:
            if column.required and name in record.positions:
                faults[name] = (EMPTY, column.expected, _fill_in(model, name, record))
            continue
        value, fix = _typed_value(cell, column)
        if fix:
            faults[name] = (describe(cell), column.expected, fix)
        elif _looks_like_fraction(column, value):
            faults[name] = (describe(cell), _percent(column), _in_percent(column, value))
        else:
            values[name] = value
    return values, faults


def _fill_in(model: type[SheetRow], name: str, record: Record) -> str:
    named = record.row and name == model.key()
    return "Fill in the name, or clear the whole row." if named else "Fill in the cell."


def _looks_like_fraction(column: Column, value: object) -> bool:
    """Spreadsheet programs store ``78%`` as 0.78, which would be read as less than one percent."""
    one_percent = column.small_share and value == 1
    return column.unit == "%" and isinstance(value, float) and 0 < value <= 1 and not one_percent


def _percent(column: Column) -> str:
    upper = f" and at most {plain(column.at_most)}" if column.at_most is not None else ""
    return f"0, or a number above 1{upper}, in percent"


def _in_percent(column: Column, value: object) -> str:
    percent = 100 * value if isinstance(value, float) else 0.0
    if not within_limits(percent, column):
        return "Type the share in percent."
    return f"Type {plain(percent)} for {plain(percent)} %."


def _validated(model: type[Row], values: dict[str, object], record: Record) -> tuple[Row | None, Faults]:
    """The row, or the faults of values of the right kind that the model refuses."""
    try:
        return model.model_validate(values), {}
    except ValidationError as error:
        names = [str(fault["loc"][0]) for fault in error.errors() if fault["type"] != "missing"]
    columns = model.columns()
    return None, {
        name: (describe(record.cells[name]), columns[name].expected, _out_of_bounds(columns[name], record.cells[name]))
        for name in dict.fromkeys(names)
    }


def _out_of_bounds(column: Column, cell: Cell) -> str:
    return wrong_size(cell.value, column) if isinstance(cell.value, float) else "Correct the value."


def _typed_value(cell: Cell, column: Column) -> tuple[object, str]:
    """Value of a cell for its column, and the mend if it cannot be read."""
    remark = column.kind == "text" and not column.required
    if cell.kind in {"error", "uncalculated", "merged", "boolean"} or (cell.kind == "date" and not remark):
        return None, mend(cell, column)
    match column.kind:
        case "number":
            return _number(cell, column)
        case "integer":
            return _integer(cell, column)
        case "azimuth":
            return _azimuth(cell, column)
        case "choice":
            return _choice(cell, column)
        case "months":
            return _months(cell)
        case "name":
            return meant_word(typed_name(cell), column.choices), ""
        case "text":
            return typed_name(cell), ""


def _number(cell: Cell, column: Column) -> tuple[object, str]:
    return (cell.value, "") if cell.kind == "number" else (None, mend(cell, column))


def _integer(cell: Cell, column: Column) -> tuple[object, str]:
    value, fix = _number(cell, column)
    if isinstance(value, float) and value.is_integer():
        return int(value), ""
    return None, fix or "Type a whole number."


def _choice(cell: Cell, column: Column) -> tuple[object, str]:
    typed = typed_name(cell)
    for word in column.choices:
        if folded(word) == folded(typed):
            return word, ""
    meant = chosen_word(typed, column.choices)
    return None, f"Did you mean '{meant}'?" if meant else "Choose from the list of the cell."


def _months(cell: Cell) -> tuple[object, str]:
    """Month numbers of a text or of a single number."""
    found = month_numbers(typed_name(cell))
    return (found, "") if found else (None, "Type the first and the last month, such as 5-9.")


def _azimuth(cell: Cell, column: Column) -> tuple[object, str]:
    """Degrees from north clockwise."""
    if cell.kind == "number":
        return cell.value, ""
    typed = typed_name(cell)
    if typed.upper() in COMPASS:
        return COMPASS.index(typed.upper()) * 22.5, ""
    if compass_word(typed):
        return None, f"Did you mean '{compass_word(typed)}'?"
    fix = mend(cell, column)
    return None, fix if any(letter.isdigit() for letter in typed) else f"Type degrees, or one of: {', '.join(COMPASS)}."
