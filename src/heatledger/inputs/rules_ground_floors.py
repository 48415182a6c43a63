"""Rules of the Ground floors sheet: which cells each type of floor needs, and which it has no use for."""

from __future__ import annotations

from collections.abc import Callable, Iterator
from functools import partial
from typing import TypeAlias

from heatledger.errors import Problem
from heatledger.inputs.checking import problem_at
from heatledger.inputs.columns import plain
from heatledger.inputs.rows import GroundFloorRow

__all__ = ["GROUND_FLOOR_RULES", "SOIL_CONDUCTIVITIES", "uses"]

FieldRule: TypeAlias = tuple[frozenset[str], Callable[[GroundFloorRow], Iterator[Problem]]]
"""The fields a rule reads, and the rule."""

EDGE = ("edge_depth", "edge_resistance", "edge_thickness")
NEEDED: dict[str, tuple[str, ...]] = {
    "slab on ground": (),
    "suspended": ("height_above_ground", "outer_wall_u_value", "vent_area"),
    "heated basement": ("basement_depth", "basement_wall"),
    "unheated basement": (
        "height_above_ground",
        "outer_wall_u_value",
        "basement_depth",
        "basement_wall",
        "basement_volume",
    ),
}
OPTIONAL: dict[str, tuple[str, ...]] = {
    "slab on ground": ("edge_insulation", *EDGE),
    "suspended": ("wind_speed", "ground_resistance"),
    "heated basement": (),
    "unheated basement": ("ground_resistance", "basement_air_change"),
}
FIELDS = tuple(dict.fromkeys(field for part in (OPTIONAL, NEEDED) for fields in part.values() for field in fields))
"""Columns that belong to some types only."""

SPOKEN = {
    "slab on ground": "a slab on ground",
    "suspended": "a suspended floor",
    "heated basement": "a heated basement",
    "unheated basement": "an unheated basement",
}
SOIL_CONDUCTIVITIES = {"clay or silt": 1.5, "sand or gravel": 2.0, "rock": 3.5}
"""As the help note of the column states them; a test compares them with the table of the standard. [W/(m·K)]"""


def uses(floor: GroundFloorRow, field: str) -> bool:
    """Whether a field enters the calculation of a floor of this type."""
    return field not in FIELDS or field in (*NEEDED[floor.type], *OPTIONAL[floor.type])


def _of_type(floor: GroundFloorRow, field: str) -> Iterator[Problem]:
    """A cell that the type needs and is empty, or has no use for and is filled."""
    kind = SPOKEN[floor.type]
    if field in NEEDED[floor.type] and not _given(floor, field):
        if field == "outer_wall_u_value" and floor.height_above_ground == 0:
            return
        expected = f"the {_spoken(floor, field)} of {kind}"
        yield problem_at(floor, field, "an empty cell", expected, "Fill in the cell.")
    if _given(floor, field) and not uses(floor, field):
        fix = "Clear the cell, or correct the type."
        yield problem_at(floor, field, _typed(floor, field), f"an empty cell for {kind}", fix)


def _edge_whole(floor: GroundFloorRow, field: str) -> Iterator[Problem]:
    """Edge insulation is described whole or not at all."""
    if floor.type != "slab on ground":
        return
    if floor.edge_insulation == "none" and _given(floor, field):
        expected, fix = "an empty cell without edge insulation", "Clear the cell, or choose the edge insulation."
        yield problem_at(floor, field, _typed(floor, field), expected, fix)
    if floor.edge_insulation != "none" and not _given(floor, field):
        expected = f"the {_spoken(floor, field)} of {floor.edge_insulation} edge insulation"
        yield problem_at(floor, field, "an empty cell", expected, "Fill in the cell.")


def _edge_insulates(floor: GroundFloorRow) -> Iterator[Problem]:
    """Edge insulation resists more than the ground whose place it takes."""
    if floor.edge_insulation == "none" or floor.edge_resistance is None or floor.edge_thickness is None:
        return
    ground = floor.edge_thickness / 1000 / SOIL_CONDUCTIVITIES[floor.soil]
    if floor.edge_resistance <= ground:
        found = f"{plain(floor.edge_resistance)} for {plain(floor.edge_thickness)} mm"
        expected = f"more than the {ground:.3g} m²·K/W of as much {floor.soil}"
        yield problem_at(floor, "edge_resistance", found, expected, "Correct the resistance or the thickness.")


def _given(floor: GroundFloorRow, field: str) -> bool:
    return field in floor.model_fields_set and getattr(floor, field) not in {"", None, "none"}


def _typed(floor: GroundFloorRow, field: str) -> str:
    value = getattr(floor, field)
    return f"'{value}'" if isinstance(value, str) else plain(value)


def _spoken(floor: GroundFloorRow, field: str) -> str:
    title = floor.columns()[field].title
    return title[0].lower() + title[1:]


GROUND_FLOOR_RULES: tuple[FieldRule, ...] = (
    *((frozenset({"type", "height_above_ground", field}), partial(_of_type, field=field)) for field in FIELDS),
    *((frozenset({"type", "edge_insulation", field}), partial(_edge_whole, field=field)) for field in EDGE),
    (frozenset({"type", "edge_insulation", "soil", *EDGE}), _edge_insulates),
)
"""One rule for each cell, so that a fault of one cell hides none of another."""
