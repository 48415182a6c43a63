"""Checks between rows and sheets: what no single row can show."""

from __future__ import annotations

from collections import Counter, defaultdict
from collections.abc import Callable, Iterator
from typing import TypeAlias

from heatledger.errors import Problem
from heatledger.inputs.checking import problem_at
from heatledger.inputs.columns import plain
from heatledger.inputs.names import Typed
from heatledger.inputs.prefilled import known_materials
from heatledger.inputs.rowchecks import LIGHT, MOST_OF_LIGHT, MOST_OF_STONE, crossed_set_points, default_tilt, is_level
from heatledger.inputs.rows import (
    NEIGHBOUR,
    OUTDOORS,
    BuildUpRow,
    MaterialRow,
    Rows,
    ThermalBridgeRow,
    UsageRow,
    ZoneRow,
)
from heatledger.inputs.rules_build_ups import layers_together
from heatledger.inputs.rules_glazed_units import frame_in_opening
from heatledger.inputs.rules_monthly_climate import monthly_climate_problems
from heatledger.inputs.rules_shading import in_the_sun
from heatledger.inputs.wording import folded, nearest

__all__ = ["cross_check", "default_tilt", "folded", "is_level"]

THINNEST = 1.0
"""No layer is thinner, but sheets, foils and membranes. [mm]"""
LIGHTEST_SHEET = 800.0
"""Sheets and foils are denser, [kg/m³]"""
MOST_OF_INSULATION = 0.1
"""or woven, which is light and conducts more than light insulation does. [W/(m·K)]"""
LIGHTEST_STONE = 1200.0
"""Masonry, concrete, plaster and screed from this density on, [kg/m³]"""
LEAST_OF_STONE = 0.35
"""conduct more than plastics [W/(m·K)] and less than metals (``MOST_OF_STONE``).

All five: common practice, no source.
"""

Check: TypeAlias = Callable[[Rows, Typed], Iterator[Problem]]


def cross_check(rows: Rows, typed: Typed) -> list[Problem]:
    """Every problem between the rows of a workbook.

    Parameters
    ----------
    rows : Rows
        The rows that are right in themselves.
    typed : Typed
        What stands in the sheets, also in rows at fault: nothing is said to be absent because of another fault.

    Returns
    -------
    list of Problem
    """
    checks: tuple[Check, ...] = (
        _zones,
        _zone_set_points,
        _layers,
        _thin_layers,
        _opening_areas,
        _frames,
        in_the_sun,
        _envelope_of_zones,
        monthly_climate_problems,
    )
    return [problem for check in checks for problem in check(rows, typed)]


def _zones(rows: Rows, typed: Typed) -> Iterator[Problem]:
    if not typed.records.get(ZoneRow.sheet) and ZoneRow.sheet not in typed.unreadable:
        yield Problem("no zone", "at least one heated zone", "Fill in a row for each zone.", sheet=ZoneRow.sheet)
    usage_based = {folded(system.name) for system in rows.air_systems if system.rate_basis == "usage"}
    for zone in rows.zones:
        if not zone.usage and zone.conditioning == "unconditioned" and folded(zone.air_system) in usage_based:
            fix = "Choose a usage, or an air system with another rate basis."
            yield problem_at(zone, "usage", "an empty cell", "a usage, since the air system's rate follows it", fix)
    whole = len(rows.zones) == len(typed.records.get(ZoneRow.sheet, ()))
    if whole and rows.zones and all(zone.conditioning == "unconditioned" for zone in rows.zones):
        fix = "Set the conditioning of at least one zone to heated."
        yield problem_at(rows.zones[0], "conditioning", "unconditioned zones only", "at least one heated zone", fix)


def _zone_set_points(rows: Rows, typed: Typed) -> Iterator[Problem]:
    """A set-point of the zone against the other one, its own or the usage's."""
    usages = {folded(usage.name): usage for usage in rows.usages}
    for zone in rows.zones:
        usage = usages.get(folded(zone.usage))
        heating, cooling = _set_points(zone, usage)
        own = zone.heating_set_point is not None or zone.cooling_set_point is not None
        if own and heating is not None and cooling is not None:
            field = "heating_set_point" if zone.cooling_set_point is None else "cooling_set_point"
            yield from crossed_set_points(zone, field, heating, cooling)
        if usage is not None and usage.setback is not None and zone.heating_set_point is not None:
            yield from _below_setback(zone, zone.heating_set_point, usage.setback)


def _below_setback(zone: ZoneRow, heating: float, setback: float) -> Iterator[Problem]:
    if heating < setback:
        found = f"{plain(heating)} °C with a setback temperature of {plain(setback)} °C in its usage"
        fix = "Correct one of the two temperatures, or give the zone another usage."
        yield problem_at(zone, "heating_set_point", found, "a set-point not below the setback", fix)


def _set_points(zone: ZoneRow, usage: UsageRow | None) -> tuple[float | None, float | None]:
    heating, cooling = zone.heating_set_point, zone.cooling_set_point
    if usage is None:
        return heating, cooling
    return (
        usage.heating_set_point if heating is None else heating,
        usage.cooling_set_point if cooling is None else cooling,
    )


def _layers(rows: Rows, typed: Typed) -> Iterator[Problem]:
    """Layers are numbered from 1 without gaps; a build-up with a layer at fault is left for the next run."""
    build_ups: dict[str, list[BuildUpRow]] = defaultdict(list)
    for layer in rows.build_ups:
        build_ups[folded(layer.name)].append(layer)
    typed_layers = Counter(map(folded, typed.words(BuildUpRow.sheet, "name")))
    for name, layers in build_ups.items():
        if len(layers) == typed_layers[name]:
            in_order = sorted(layers, key=lambda layer: layer.layer)
            yield from _numbering(in_order)
            yield from layers_together(in_order)


def _thin_layers(rows: Rows, typed: Typed) -> Iterator[Problem]:
    """Less than a millimetre of what is neither sheet nor foil was typed in metres."""
    materials = known_materials(rows)
    for layer in rows.build_ups:
        material = materials.get(folded(layer.material))
        if material is not None and layer.thickness < THINNEST and not _comes_thin(material):
            found = f"{plain(layer.thickness)} mm of '{layer.material}'"
            fix = f"Type {plain(1000 * layer.thickness)} if {plain(layer.thickness)} m is meant."
            yield problem_at(layer, "thickness", found, "a thickness in millimetres", fix)


def _comes_thin(material: MaterialRow) -> bool:
    """Whether a material may be a sheet, a foil or a membrane; nobody knows without its density."""
    density, conductivity = material.density, material.conductivity
    if density is None:
        return True
    if density < LIGHTEST_SHEET:
        return density < LIGHT and MOST_OF_INSULATION < conductivity <= MOST_OF_LIGHT
    return density < LIGHTEST_STONE or not LEAST_OF_STONE <= conductivity <= MOST_OF_STONE


def _numbering(layers: list[BuildUpRow]) -> Iterator[Problem]:
    for expected, layer in enumerate(layers, start=1):
        if layer.layer != expected:
            again = " a second time" if layer.layer < expected else ""
            found = f"layer {layer.layer} of '{layer.name}'{again}"
            fix = "Number the layers from 1 without gaps, the inside layer first."
            yield problem_at(layer, "layer", found, f"layer {expected}", fix)
            return


def _opening_areas(rows: Rows, typed: Typed) -> Iterator[Problem]:
    areas: dict[str, float] = defaultdict(float)
    for opening in rows.openings:
        areas[folded(opening.element)] += opening.count * opening.width * opening.height
    for element in rows.elements:
        openings = areas[folded(element.name)]
        if openings > element.area * (1 + 1e-9):
            found = f"{plain(element.area)} m² with {openings:.2f} m² of openings in '{element.name}'"
            fix = "Correct the gross area, or the sizes and number on sheet Openings."
            yield problem_at(element, "area", found, "an area that holds its openings", fix)


def _frames(rows: Rows, typed: Typed) -> Iterator[Problem]:
    units = {folded(unit.name): unit for unit in rows.glazed_units}
    for opening in rows.openings:
        unit = units.get(folded(opening.glazed_unit))
        if unit is not None:
            yield from frame_in_opening(opening, unit)


def _envelope_of_zones(rows: Rows, typed: Typed) -> Iterator[Problem]:
    """Every conditioned zone has an envelope; every unconditioned zone is tied to a known temperature."""
    if typed.unreadable & {"Envelope", "Ground floors"}:
        return
    mentioned = _zones_in_faulty_rows(rows, typed) | _zones_misspelt(typed)
    bounded, tied = _bounded_zones(rows) | mentioned, _zones_with_heat_path(rows, mentioned)
    for zone in rows.zones:
        if folded(zone.name) in {OUTDOORS, NEIGHBOUR}:
            continue
        fix = f"Add the elements of '{zone.name}' to sheet Envelope"
        if zone.conditioning != "unconditioned" and folded(zone.name) not in bounded:
            found = f"'{zone.name}' without envelope"
            inner = f"{fix}, inner walls to other zones included."
            yield problem_at(zone, "name", found, "at least one element or ground floor", inner)
        if zone.conditioning == "unconditioned" and folded(zone.name) not in tied:
            expected = "an element to outdoors or to a conditioned zone, or a ground floor"
            yield problem_at(zone, "name", f"'{zone.name}' without any heat path", expected, f"{fix}.")


def _zones_in_faulty_rows(rows: Rows, typed: Typed) -> set[str]:
    """Zones that elements or ground floors at fault would enclose."""
    found: set[str] = set()
    for sheet, sound in (("Envelope", rows.elements), ("Ground floors", rows.ground_floors)):
        numbers = {row.row_number for row in sound}
        faulty = [record.cells for record in typed.records.get(sheet, ()) if record.row not in numbers]
        found |= {folded(str(cells[field].value)) for cells in faulty for field in ("zone", "faces") if field in cells}
    return found - {OUTDOORS, NEIGHBOUR}


def _zones_misspelt(typed: Typed) -> set[str]:
    """Zones that are most likely meant where an element or ground floor names an unknown one."""
    known = {folded(name): name for name in typed.words("Zones", "name")}
    words = {*typed.words("Envelope", "zone"), *typed.words("Envelope", "faces"), *typed.words("Ground floors", "zone")}
    unknown = {word for word in words if folded(word) not in {*known, OUTDOORS, NEIGHBOUR}}
    return {folded(nearest(word, known.values())) for word in unknown}


def _bounded_zones(rows: Rows) -> set[str]:
    """Zones with an element between them and something else, or with a ground floor."""
    sides = [(folded(element.zone), folded(element.faces)) for element in rows.elements]
    return {zone for one, other in sides if one != other for zone in (one, other)} | {
        folded(floor.zone) for floor in rows.ground_floors
    }


def _zones_with_heat_path(rows: Rows, mentioned: set[str]) -> set[str]:
    """Zones from which heat can flow, also through other unconditioned zones, to a known temperature."""
    tied = {folded(zone.name) for zone in rows.zones if zone.conditioning != "unconditioned"} | mentioned
    tied |= {folded(floor.zone) for floor in rows.ground_floors}
    links = [(folded(element.zone), folded(element.faces)) for element in rows.elements]
    bridges = filter(_carries_heat, rows.thermal_bridges)
    links += [(folded(bridge.zone), folded(bridge.faces) or OUTDOORS) for bridge in bridges]
    tied |= {one for one, other in links if other == OUTDOORS}
    grown = True
    while grown:
        before = len(tied)
        for one, other in links:
            if one in tied or other in tied:
                tied |= {one, other} - {OUTDOORS, NEIGHBOUR}
        grown = len(tied) > before
    return tied


def _carries_heat(bridge: ThermalBridgeRow) -> bool:
    linear = (bridge.length or 0.0) * (bridge.linear_transmittance or 0.0)
    return linear + (bridge.count or 0) * (bridge.point_transmittance or 0.0) > 0
