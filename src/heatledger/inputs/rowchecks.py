"""Rules between the cells of one row."""

from __future__ import annotations

from collections.abc import Callable, Iterator
from typing import Any, TypeAlias

from heatledger.errors import Problem
from heatledger.inputs.checking import Checked, problem_at
from heatledger.inputs.columns import SheetRow, plain
from heatledger.inputs.rows import (
    NEIGHBOUR,
    OUTDOORS,
    AirSystemRow,
    BuildUpRow,
    ElementRow,
    GlazedUnitRow,
    GroundFloorRow,
    MaterialRow,
    ProjectRow,
    ThermalBridgeRow,
    UsageRow,
    ZoneRow,
)
from heatledger.inputs.rules_build_ups import BUILD_UP_RULES
from heatledger.inputs.rules_glazed_units import GLAZED_UNIT_RULES
from heatledger.inputs.rules_ground_floors import GROUND_FLOOR_RULES
from heatledger.inputs.rules_shading import SHADING_RULES
from heatledger.inputs.wording import folded

__all__ = ["LIGHT", "MOST_OF_LIGHT", "MOST_OF_STONE", "check_row", "crossed_set_points", "default_tilt", "is_level"]

LIGHT = 300.0
"""A material below it is no masonry, timber or metal. [kg/m³]"""
MOST_OF_LIGHT = 1.0
"""More than any light material conducts. [W/(m·K)]"""
METAL = 2500.0
"""Every metal in use is denser. [kg/m³]"""
MOST_OF_STONE = 6.0
"""More than any stone or concrete conducts, quartzite included. [W/(m·K)] All four: common practice, no source."""

Rule: TypeAlias = tuple[type[SheetRow], frozenset[str], Callable[[Any], Iterator[Problem]]]
"""Row model, the fields a rule reads, and the rule."""


def check_row(checked: Checked[Any]) -> Iterator[Problem]:
    """Problems between the cells of a row; a rule that reads a cell at fault is passed over."""
    for model, fields, rule in _RULES:
        if isinstance(checked.partial, model) and not fields & checked.at_fault:
            yield from rule(checked.partial)


def default_tilt(element: ElementRow) -> float:
    """Tilt of an element, by its kind where the cell is empty."""
    if element.tilt is not None:
        return element.tilt
    return {"roof": 0.0, "floor": 180.0}.get(element.kind, 90.0)


def is_level(tilt: float) -> bool:
    """Whether a plane has no direction: it faces straight up or down."""
    return tilt in {0.0, 180.0}


def crossed_set_points(row: SheetRow, field: str, heating: float, cooling: float) -> Iterator[Problem]:
    """A cooling set-point below the one for heating."""
    if heating > cooling:
        found = f"{plain(heating)} °C for heating and {plain(cooling)} °C for cooling"
        yield problem_at(row, field, found, "cooling not below heating", "Correct one of the two set-points.")


def _zone_name(zone: ZoneRow) -> Iterator[Problem]:
    if folded(zone.name) in {OUTDOORS, NEIGHBOUR}:
        expected = f"a name other than {OUTDOORS} and {NEIGHBOUR}"
        yield problem_at(zone, "name", f"'{zone.name}'", expected, "Rename the zone.")


def _zone_usage(zone: ZoneRow) -> Iterator[Problem]:
    if not zone.usage and zone.conditioning != "unconditioned":
        fix = "Choose a row of sheet Usage."
        yield problem_at(zone, "usage", "an empty cell", "the usage of a conditioned zone", fix)


def _usage_set_points(usage: UsageRow) -> Iterator[Problem]:
    return crossed_set_points(usage, "cooling_set_point", usage.heating_set_point, usage.cooling_set_point)


def _conductivity(material: MaterialRow) -> Iterator[Problem]:
    """What is no metal conducts little: 40 for 0.040 is milliwatts."""
    density = material.density
    if density is None or density >= METAL:
        return
    kind, most = (LIGHT, MOST_OF_LIGHT) if density < LIGHT else (METAL, MOST_OF_STONE)
    if material.conductivity > most:
        found = f"{plain(material.conductivity)} for a density of {plain(density)} kg/m³"
        expected = f"at most {plain(most)} for a material below {plain(kind)} kg/m³"
        fix = f"Type {plain(material.conductivity / 1000)} if mW/(m·K) were meant, or correct the density."
        yield problem_at(material, "conductivity", found, expected, fix)


def _setback(usage: UsageRow) -> Iterator[Problem]:
    columns = usage.columns()  # where the cells are empty it is day and night, every day
    reduced = any(getattr(usage, field) < columns[field].default for field in ("heated_hours", "days_in_use"))
    if (reduced or usage.months_out_of_use) and usage.setback is None:
        expected = "the temperature kept in hours, on days or in months without use"
        yield problem_at(usage, "setback", "an empty cell", expected, "Fill in the cell.")
    if usage.setback is not None and usage.setback > usage.heating_set_point:
        found = f"{plain(usage.setback)} °C with a heating set-point of {plain(usage.heating_set_point)} °C"
        fix = "Correct one of the two temperatures."
        yield problem_at(usage, "setback", found, "a setback not above the heating set-point", fix)


def _night_cooling(system: AirSystemRow) -> Iterator[Problem]:
    if system.night_cooling > 0 and not system.night_cooling_months:
        yield problem_at(
            system,
            "night_cooling_months",
            "an empty cell",
            "the months of the night cooling",
            "Type them, such as 5-9.",
        )
    if system.night_cooling_months and system.night_cooling == 0:
        fix = "Fill in the air change, or clear the months."
        yield problem_at(system, "night_cooling", "no air change", "the air change of the night cooling", fix)


def _fans(system: AirSystemRow) -> Iterator[Problem]:
    if system.kind == "natural" and system.fan_power > 0:
        found = f"{plain(system.fan_power)} W/(m³/h) for a natural system"
        yield problem_at(system, "fan_power", found, "0 or an empty cell", "Clear the cell, or correct the kind.")
    if system.frost_limit is not None and system.heat_recovery == 0:
        found = f"{plain(system.frost_limit)} °C without heat recovery"
        fix = "Clear the cell, or fill in the heat recovery."
        yield problem_at(system, "frost_limit", found, "an empty cell without heat recovery", fix)


def _rate(system: AirSystemRow) -> Iterator[Problem]:
    if system.rate_basis == "usage" and system.rate is not None:
        expected, fix = (
            "an empty cell, since the rate follows the usage",
            "Clear the rate, or choose another rate basis.",
        )
        yield problem_at(system, "rate", plain(system.rate), expected, fix)
    if system.rate_basis != "usage" and system.rate is None and system.kind != "natural":
        fix = "Fill in the rate, or choose rate basis usage."
        yield problem_at(system, "rate", "an empty cell", "the rate of a system with fans", fix)


def _heat_recovery(system: AirSystemRow) -> Iterator[Problem]:
    if system.heat_recovery > 0 and system.kind != "balanced":
        found = f"{plain(system.heat_recovery)} % for a system of kind {system.kind}"
        expected = "0 or an empty cell, since only a balanced system recovers heat"
        yield problem_at(system, "heat_recovery", found, expected, "Clear the cell, or set the kind to balanced.")


def _construction(row: ElementRow | GroundFloorRow) -> Iterator[Problem]:
    if not row.build_up and row.u_value is None:
        fix = "Choose a build-up or type a U-value."
        yield problem_at(row, "build_up", "neither a build-up nor a U-value", "one of the two", fix)
    if row.build_up and row.u_value is not None:
        found = f"both the build-up '{row.build_up}' and the U-value {plain(row.u_value)}"
        yield problem_at(row, "u_value", found, "one of the two", "Clear one of the two cells.")


def _direction(element: ElementRow) -> Iterator[Problem]:
    outdoors = folded(element.faces) == OUTDOORS
    if outdoors and element.azimuth is None and not is_level(default_tilt(element)):
        expected = "the direction of an element that faces outdoors"
        fix = "Type degrees from north clockwise, or N, NE, E …"
        yield problem_at(element, "azimuth", "an empty cell", expected, fix)


def _bridge(bridge: ThermalBridgeRow) -> Iterator[Problem]:
    pairs = (("length", "linear_transmittance", "length and ψ"), ("count", "point_transmittance", "number and χ"))
    given = {field for pair in pairs for field in pair[:2] if getattr(bridge, field) is not None}
    if not given:
        fix = "Fill in length and ψ, or number and χ."
        yield problem_at(bridge, "length", "neither a linear nor a point bridge", "one of the two", fix)
    for amount, transmittance, words in pairs:
        if len(given & {amount, transmittance}) == 1:
            empty = transmittance if amount in given else amount
            yield problem_at(bridge, empty, "an empty cell", f"{words} together", "Fill in the cell.")


def _bridge_sides(bridge: ThermalBridgeRow) -> Iterator[Problem]:
    if bridge.faces and folded(bridge.faces) == folded(bridge.zone):
        found, expected = f"'{bridge.faces}', the bridge's own zone", f"{OUTDOORS} or another zone"
        yield problem_at(bridge, "faces", found, expected, "Choose the zone on the other side, or clear the cell.")


def _compared(project: ProjectRow) -> Iterator[Problem]:
    """Two different build-ups, or none."""
    pair = {"compared": project.compared, "compared_with": project.compared_with}
    if sum(map(bool, pair.values())) == 1:
        empty = next(field for field, name in pair.items() if not name)
        fix = "Choose a build-up, or clear both cells."
        yield problem_at(project, empty, "an empty cell", "the other build-up of the comparison", fix)
    elif project.compared and folded(project.compared) == folded(project.compared_with):
        found = f"'{project.compared_with}' twice"
        yield problem_at(project, "compared_with", found, "two different build-ups", "Choose another build-up.")


_RULES: tuple[Rule, ...] = (
    (ProjectRow, frozenset({"compared", "compared_with"}), _compared),
    (ZoneRow, frozenset({"name"}), _zone_name),
    (ZoneRow, frozenset({"conditioning", "usage"}), _zone_usage),
    (UsageRow, frozenset({"heating_set_point", "cooling_set_point"}), _usage_set_points),
    (MaterialRow, frozenset({"conductivity", "density"}), _conductivity),
    (
        UsageRow,
        frozenset({"heating_set_point", "setback", "heated_hours", "days_in_use", "months_out_of_use"}),
        _setback,
    ),
    (AirSystemRow, frozenset({"kind", "rate_basis", "rate"}), _rate),
    (AirSystemRow, frozenset({"night_cooling", "night_cooling_months"}), _night_cooling),
    (AirSystemRow, frozenset({"kind", "fan_power", "heat_recovery", "frost_limit"}), _fans),
    (AirSystemRow, frozenset({"kind", "heat_recovery"}), _heat_recovery),
    (ElementRow, frozenset({"build_up", "u_value"}), _construction),
    (ElementRow, frozenset({"kind", "faces", "azimuth", "tilt"}), _direction),
    (GroundFloorRow, frozenset({"build_up", "u_value"}), _construction),
    *SHADING_RULES,
    *((BuildUpRow, fields, rule) for fields, rule in BUILD_UP_RULES),
    *((GlazedUnitRow, fields, rule) for fields, rule in GLAZED_UNIT_RULES),
    *((GroundFloorRow, fields, rule) for fields, rule in GROUND_FLOOR_RULES),
    (ThermalBridgeRow, frozenset({"length", "linear_transmittance", "count", "point_transmittance"}), _bridge),
    (ThermalBridgeRow, frozenset({"zone", "faces"}), _bridge_sides),
)
