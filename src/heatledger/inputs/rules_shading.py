"""Rules of obstructions and movable shading: within a row and between rows."""

from __future__ import annotations

from collections.abc import Callable, Iterator
from typing import Any

from heatledger.errors import Problem
from heatledger.inputs.checking import problem_at
from heatledger.inputs.columns import SheetRow, plain
from heatledger.inputs.names import Typed
from heatledger.inputs.rows import (
    NEIGHBOUR,
    ElementRow,
    ObstructionRow,
    OpeningRow,
    Rows,
    ShadingDeviceRow,
    ZoneRow,
)
from heatledger.inputs.wording import folded

__all__ = ["SHADING_RULES", "in_the_sun", "uses"]


def uses(row: ObstructionRow | ShadingDeviceRow, field: str) -> bool:
    """Whether a blank field of a row is an assumption worth telling."""
    if isinstance(row, ObstructionRow):
        return field == "reflectance"
    match field:
        case "place":
            return row.device is not None
        case "threshold":
            return row.control == "irradiance"
    return True


def in_the_sun(rows: Rows, typed: Typed) -> Iterator[Problem]:
    """Obstructions and movable shading stand only where there is sun."""
    known = {NEIGHBOUR, *map(folded, typed.words(ZoneRow.sheet, "name"))}
    indoors = {folded(element.name) for element in rows.elements if folded(element.faces) in known}
    for element in rows.elements:
        if element.obstruction and folded(element.faces) in known:
            found = f"'{element.obstruction}' on an element that faces '{element.faces}'"
            yield _no_sun(element, "obstruction", found)
    for opening in rows.openings:
        for field in ("obstruction", "shading"):
            name = getattr(opening, field)
            if name and folded(opening.element) in indoors:
                yield _no_sun(opening, field, f"'{name}' on an opening in '{opening.element}'")


def _no_sun(row: ElementRow | OpeningRow, field: str, found: str) -> Problem:
    return problem_at(row, field, found, "an empty cell, since no sun falls there", "Clear the cell.")


def _distances(obstruction: ObstructionRow) -> Iterator[Problem]:
    """A distance alone throws no shadow."""
    for part in ("overhang", "left_fin", "right_fin"):
        distance = getattr(obstruction, f"{part}_distance")
        if distance > 0 and getattr(obstruction, f"{part}_depth") == 0:
            found = f"no depth, with a distance of {plain(distance)} m"
            expected = f"the depth of the {part.replace('_', ' ')}"
            yield problem_at(obstruction, f"{part}_depth", found, expected, "Fill in the depth, or clear the distance.")


def _reduction(device: ShadingDeviceRow) -> Iterator[Problem]:
    if device.reduction_factor is None and device.device is None:
        fix = "Type the factor, or choose a device."
        yield problem_at(device, "reduction_factor", "neither a factor nor a device", "one of the two", fix)
    if device.reduction_factor is not None and device.device is not None:
        found = f"both the factor {plain(device.reduction_factor)} and the device '{device.device}'"
        yield problem_at(device, "device", found, "one of the two", "Clear one of the two cells.")


def _control(device: ShadingDeviceRow) -> Iterator[Problem]:
    if device.control == "months" and not device.months_used:
        fix = "Type the first and the last month, such as 5-9."
        yield problem_at(device, "months_used", "an empty cell", "the months of a device controlled by months", fix)


def _use(device: ShadingDeviceRow) -> Iterator[Problem]:
    if device.used_in_heating == device.used_in_cooling == "no":
        expected = "yes in heating, in cooling or in both"
        fix = "Choose yes in one of the two columns, or delete the device."
        yield problem_at(device, "used_in_cooling", "no in heating and in cooling", expected, fix)


SHADING_RULES: tuple[tuple[type[SheetRow], frozenset[str], Callable[[Any], Iterator[Problem]]], ...] = (
    (
        ObstructionRow,
        frozenset(f"{part}_{what}" for part in ("overhang", "left_fin", "right_fin") for what in ("depth", "distance")),
        _distances,
    ),
    (ShadingDeviceRow, frozenset({"reduction_factor", "device"}), _reduction),
    (ShadingDeviceRow, frozenset({"control", "months_used"}), _control),
    (ShadingDeviceRow, frozenset({"used_in_heating", "used_in_cooling"}), _use),
)
"""Row model, the fields a rule reads, and the rule."""
