"""Rules of sheet Glazed units: a unit is declared whole, or given by all of its parts."""

from __future__ import annotations

from collections.abc import Callable, Iterator
from typing import TypeAlias

from heatledger.errors import Problem
from heatledger.inputs.checking import problem_at
from heatledger.inputs.columns import plain
from heatledger.inputs.rows import GlazedUnitRow, OpeningRow

__all__ = ["GLAZED_UNIT_RULES", "frame_in_opening", "uses"]

_GAP_FIELDS = ("gap", "gas", "coating")
_PARTS = ("glazing_u_value", "frame_u_value", "edge", "panes", *_GAP_FIELDS)
_SHUTTER_FIELDS = ("shutter_tightness", "shutter_share")


def uses(row: GlazedUnitRow, field: str) -> bool:
    """Whether a cell with a default counts in its unit."""
    match field:
        case "frame_share":
            return row.frame_width is None
        case "gas":
            return (row.panes or 0) > 1
        case "shutter_tightness" | "shutter_share":
            return row.shutter_resistance is not None
    return True


def _given(row: GlazedUnitRow, *fields: str) -> list[str]:
    """Titles of those cells that are filled in."""
    columns = row.columns()
    return [columns[field].title for field in fields if field in row.model_fields_set]


def _leaf(row: GlazedUnitRow) -> bool:
    """Whether it has no glass."""
    return row.frame_width is None and row.frame_share >= 100


def _whole_or_parts(row: GlazedUnitRow) -> Iterator[Problem]:
    parts = _given(row, *_PARTS)
    if row.u_value is not None and parts:
        found = f"both the U-value {plain(row.u_value)} of the whole unit and {', '.join(parts)}"
        fix = "Clear the U-value, or clear the cells of the parts."
        yield problem_at(row, "u_value", found, "the whole unit or its parts", fix)
    if row.u_value is None and not parts:
        fix = "Type the U-value of the whole unit, or give the glazing, the frame and the edge."
        yield problem_at(row, "u_value", "neither a U-value nor parts", "one of the two", fix)


def _glass(row: GlazedUnitRow) -> Iterator[Problem]:
    """Glazing U-value or panes, once."""
    if row.u_value is not None or not _given(row, *_PARTS):
        return
    of_panes = _given(row, "panes", *_GAP_FIELDS)
    if row.glazing_u_value is not None and of_panes:
        found = f"both the glazing U-value {plain(row.glazing_u_value)} and {', '.join(of_panes)}"
        fix = "Clear the glazing U-value, or clear the cells of the panes."
        yield problem_at(row, "glazing_u_value", found, "one of the two", fix)
    elif row.glazing_u_value is None and row.panes is None:
        if of_panes:
            expected = f"the number of panes to go with {', '.join(of_panes)}"
            yield problem_at(row, "panes", "an empty cell", expected, "Fill in the cell.")
        elif not _leaf(row):
            fix = "Type the glazing U-value, or give the panes."
            yield problem_at(row, "glazing_u_value", "neither a glazing U-value nor panes", "one of the two", fix)


def _frame(row: GlazedUnitRow) -> Iterator[Problem]:
    """Frame and edge of a unit given by its parts."""
    if row.u_value is not None or not _given(row, *_PARTS):
        return
    frameless = row.frame_width is None and row.frame_share == 0
    if row.frame_u_value is None and not frameless:
        expected = "the U-value of the frame of a unit given by its parts"
        yield problem_at(row, "frame_u_value", "an empty cell", expected, "Fill in the cell.")
    if row.edge is None and row.panes != 1 and not _leaf(row):
        fix = "Fill in the cell: 0.08 for aluminium, 0.06 for improved spacers."
        yield problem_at(row, "edge", "an empty cell", "the ψ of the glass edge of a unit given by its parts", fix)


def _panes(row: GlazedUnitRow) -> Iterator[Problem]:
    if row.panes is None or row.glazing_u_value is not None or row.u_value is not None:
        return
    if row.panes > 1 and row.gap is None:
        fix = "Fill in the cell, such as 16."
        yield problem_at(row, "gap", "an empty cell", f"the gap between the {row.panes} panes", fix)
    if row.panes == 1:
        for field in _GAP_FIELDS:
            if field in row.model_fields_set:
                value = getattr(row, field)
                found = f"{value if isinstance(value, str) else plain(value)} for a single pane"
                fix = "Clear the cell, or correct the number of panes."
                yield problem_at(row, field, found, "an empty cell, since a single pane has no gap", fix)


def _shutter(row: GlazedUnitRow) -> Iterator[Problem]:
    given = _given(row, *_SHUTTER_FIELDS)
    if row.shutter_resistance is None and given:
        expected = f"the resistance of the shutter to go with {' and '.join(given)}"
        fix = "Fill in the cell, or clear the other cells of the shutter."
        yield problem_at(row, "shutter_resistance", "an empty cell", expected, fix)


_Rules: TypeAlias = tuple[tuple[frozenset[str], Callable[[GlazedUnitRow], Iterator[Problem]]], ...]
_FRAME_FIELDS = ("frame_share", "frame_width")

GLAZED_UNIT_RULES: _Rules = (
    (frozenset({"u_value", *_PARTS}), _whole_or_parts),
    (frozenset({"u_value", *_PARTS, *_FRAME_FIELDS}), _glass),
    (frozenset({"u_value", *_PARTS, *_FRAME_FIELDS}), _frame),
    (frozenset({"u_value", "glazing_u_value", "panes", *_GAP_FIELDS}), _panes),
    (frozenset({"shutter_resistance", *_SHUTTER_FIELDS}), _shutter),
)
"""The fields a rule reads, and the rule."""


def frame_in_opening(opening: OpeningRow, unit: GlazedUnitRow) -> Iterator[Problem]:
    """A frame that leaves no glass in an opening."""
    if unit.frame_width is None or unit.frame_width / 1000 < min(opening.width, opening.height) / 2:
        return
    field = "width" if opening.width <= opening.height else "height"
    found = (
        f"an opening of {plain(opening.width)} m by {plain(opening.height)} m "
        f"with a frame of {plain(unit.frame_width)} mm all round"
    )
    fix = f"Correct its size, or the frame width of '{unit.name}'."
    yield problem_at(opening, field, found, "an opening that leaves room for glass", fix)
