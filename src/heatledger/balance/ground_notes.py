"""Where a ground floor lies outside of what ISO 13370 is made for, or its figures do not fit together."""

from __future__ import annotations

from collections.abc import Iterator
from typing import TypeAlias

from heatledger.building.model import Building, GroundFloor
from heatledger.results import Note

__all__ = ["ground_checks"]

DIMENSION = (2.0, 50.0)
"""Usual characteristic dimension B′. [m] Common practice, no source; below it the edge rules, and the formula, made
for floors as wide as a house, is 10 % and more below older tables."""
VENT_AREA = (0.0005, 0.006)
"""Usual openings of the space under a suspended floor per length of perimeter. [m²/m] Common practice, no source."""
VOLUME_SHARE = (0.5, 1.02)
"""Usual air volume of a basement per volume between its floor and the floor above. [-] Common practice, no source."""

_Check: TypeAlias = tuple[str, str]
"""Field and sentence."""


def ground_checks(building: Building) -> Iterator[Note]:
    """Ground floors that ask for a second look, in the order of the sheet."""
    for floor in building.ground_floors:
        for field, text in (*_dimension(floor), *_edge(floor), *_vents(floor), *_volume(floor)):
            yield Note("check", f"{floor.name}: {text}", floor.origin.sheet, floor.origin.cell(field))


def _dimension(floor: GroundFloor) -> Iterator[_Check]:
    span, (least, most) = 2 * floor.area / floor.perimeter, DIMENSION
    if not least <= span <= most:
        yield (
            "perimeter",
            f"area over half of the exposed perimeter is {span:.3g} m; usual is {least:g} to {most:g} m, and outside "
            "of it the method for the ground is less sure. The perimeter counts only where outdoors is beside the "
            "floor.",
        )


def _edge(floor: GroundFloor) -> Iterator[_Check]:
    reach = floor.area / floor.perimeter
    if floor.edge is not None and floor.edge.depth > reach:
        yield (
            "edge_depth",
            f"the edge insulation reaches {floor.edge.depth:g} m, more than half of the floor's width ({reach:.3g} m); "
            "its saving is limited to that of the same insulation under the whole floor.",
        )


def _vents(floor: GroundFloor) -> Iterator[_Check]:
    least, most = VENT_AREA
    if floor.type == "suspended" and not least <= floor.vent_area <= most:
        words = (
            "a space so open is better entered as outdoors, the floor on sheet Envelope"
            if floor.vent_area > most
            else "a space that is hardly aired may be damp"
        )
        yield "vent_area", f"the vent area is {floor.vent_area:g} m²/m; usual is {least:g} to {most:g} m²/m; {words}."


def _volume(floor: GroundFloor) -> Iterator[_Check]:
    """Air volume against the height of floor above, less the thickness of floors and walls."""
    if floor.type != "unheated basement":
        return
    room, (least, most) = floor.area * (floor.depth + floor.height), VOLUME_SHARE
    if not least <= floor.basement_volume / room <= most:
        yield (
            "basement_volume",
            f"the basement holds {floor.basement_volume:.4g} m³ of air, but area times depth and height above ground "
            f"is {room:.4g} m³.",
        )
