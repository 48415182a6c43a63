"""What the reader should know: checks that ask for a second look, defaults, methods, sources."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Iterator, Sequence

from heatledger.balance.air import AirExchange, air_heat_capacity, required_air, site_altitude
from heatledger.balance.constructions import Constructions
from heatledger.balance.envelope_notes import envelope_checks, envelope_methods, material_sources
from heatledger.balance.ground_notes import ground_checks
from heatledger.balance.needs import ModeBalance
from heatledger.balance.shading_notes import shading_checks, shading_methods
from heatledger.building.defaults import DefaultUsed
from heatledger.building.model import Building, Zone
from heatledger.climate.model import Climate
from heatledger.results import Note, OpeningGains

__all__ = ["notes_of"]

FLOOR_HEIGHT = (2.0, 6.0)
"""Usual volume per floor area. [m] Common practice, no source."""
OPENING_SHARE = (5.0, 50.0)
"""Usual openings per floor area of a conditioned zone. [%] Common practice, no source."""
LEAKAGE = (0.3, 12.0)
"""Usual air changes at 50 Pa. [1/h] Common practice, no source."""
U_VALUES = {
    "wall": (0.08, 3.0),
    "roof": (0.06, 3.0),
    "floor": (0.06, 3.0),
    "door": (0.5, 5.0),
    "partition": (0.1, 4.0),
    "glazed unit": (0.5, 6.0),
}
"""Usual U-values by kind. [W/(m²·K)] Common practice, no source."""
OVERHEATING = 10.0
"""Heat per floor area and year that a zone without cooling may hold before it is pointed out. [kWh/m²] Common
practice, no source."""

NIGHT_COOLING = (
    "Night cooling: its air change for 8 hours a night at the mean outdoor temperature of the month, never beyond the "
    "need. Nights are cooler, but a building stores only so much cold: check with an hourly method."
)


def notes_of(
    building: Building,
    climate: Climate,
    air: Sequence[AirExchange],
    constructions: Constructions,
    cooling: ModeBalance,
    openings: Sequence[OpeningGains] = (),
) -> tuple[Note, ...]:
    """All notes, checks first.

    Parameters
    ----------
    building, climate, air, constructions, cooling, openings
        What was calculated, and from what.

    Returns
    -------
    tuple of Note
    """
    checks = [
        *_geometry(building),
        *_level_roofs(building),
        *_without_sun(building),
        *_leakage(building),
        *_u_values(building, constructions),
        *envelope_checks(building, constructions),
        *ground_checks(building),
        *shading_checks(building),
        *_bridges(building),
        *_fresh_air(building, air),
        *_storage(building),
        *_overheating(building, cooling),
        *(Note("check", note, "Project", building.project.origin.cell("weather")) for note in climate.notes),
    ]
    return (
        *checks,
        *_defaults(building.defaults),
        *_methods(building, climate, openings),
        *_sources(building, climate),
    )


def _zone_check(zone: Zone, field: str, text: str) -> Note:
    return Note("check", f"{zone.name}: {text}", zone.origin.sheet, zone.origin.cell(field))


def _outside(value: float, limits: tuple[float, float]) -> bool:
    return not limits[0] <= value <= limits[1]


def _geometry(building: Building) -> Iterator[Note]:
    glazing: dict[str, float] = defaultdict(float)
    for element in building.elements:
        if element.faces_outdoors:
            glazing[element.zone] += sum(opening.area for opening in element.openings)
    for zone in building.zones:
        height = zone.volume / zone.floor_area
        if zone.conditioned and _outside(height, FLOOR_HEIGHT):
            usual = "{:g} to {:g} m".format(*FLOOR_HEIGHT)
            text = f"air volume divided by floor area gives {height:.2f} m; usual is {usual}."
            yield _zone_check(zone, "air_volume", text)
        share = 100 * glazing[zone.name] / zone.floor_area
        if zone.conditioned and _outside(share, OPENING_SHARE):
            usual = "{:g} to {:g} %".format(*OPENING_SHARE)
            yield _zone_check(zone, "floor_area", f"openings are {share:.1f} % of the floor area; usual is {usual}.")


def _level_roofs(building: Building) -> Iterator[Note]:
    """A direction without a tilt: the plane is taken as level, and the direction does not count."""
    for element in building.elements:
        row = element.origin
        if element.faces_outdoors and row.tilt is None and row.azimuth is not None and element.azimuth is None:
            text = f"{element.name}: an azimuth without a tilt; taken as level ({element.tilt:g}°), so it has no say."
            yield Note("check", text, row.sheet, row.cell("azimuth"))


def _without_sun(building: Building) -> Iterator[Note]:
    for element in building.elements:
        for opening in element.openings:
            if not element.faces_outdoors and opening.glazed_unit.g_value > 0:
                text = f"{opening.name}: no sun is counted, since {element.name} does not face outdoors."
                yield Note("check", text, opening.origin.sheet, opening.origin.cell("element"))


def _leakage(building: Building) -> Iterator[Note]:
    for zone in building.zones:
        if zone.conditioned and _outside(zone.leakage, LEAKAGE):
            usual = "{:g} to {:g} 1/h".format(*LEAKAGE)
            yield _zone_check(zone, "leakage", f"leakage n50 is {zone.leakage:g} 1/h; usual is {usual}.")


def _u_values(building: Building, constructions: Constructions) -> Iterator[Note]:
    for element in building.elements:
        value = constructions.u_values[element.name]
        if element.faces != element.zone and _outside(value, U_VALUES[element.kind]):
            usual = "{:g} to {:g} W/(m²·K)".format(*U_VALUES[element.kind])
            field = "u_value" if element.build_up is None else "build_up"
            text = f"{element.name}: the U-value is {value:.3g} W/(m²·K); usual for a {element.kind} is {usual}."
            yield Note("check", text, element.origin.sheet, element.origin.cell(field))
    told: set[str] = set()
    for opening in (opening for element in building.elements for opening in element.openings):
        unit, value = opening.glazed_unit, constructions.openings[opening.name].u_value
        if unit.name not in told and _outside(value, U_VALUES["glazed unit"]):
            told.add(unit.name)
            usual = "{:g} to {:g} W/(m²·K)".format(*U_VALUES["glazed unit"])
            where = "" if unit.u_value is not None else f" in {opening.name}"
            text = f"{unit.name}: the U-value is {value:.3g} W/(m²·K){where}; usual for a glazed unit is {usual}."
            yield Note("check", text, unit.origin.sheet, unit.origin.cell("u_value"))


def _bridges(building: Building) -> Iterator[Note]:
    bridged = {bridge.zone for bridge in building.thermal_bridges}
    exposed = {element.zone for element in building.elements if element.faces_outdoors}
    for zone in building.zones:
        if zone.conditioned and zone.name in exposed - bridged:
            dimensions = building.project.dimensions
            more = (
                "with external dimensions the sum is often near zero, yet single junctions are not"
                if dimensions == "external"
                else f"with {dimensions} dimensions they add to the loss"
            )
            yield _zone_check(zone, "name", f"no thermal bridges are entered; {more} (ISO 14683).")


def _fresh_air(building: Building, air: Sequence[AirExchange]) -> Iterator[Note]:
    for zone, exchange in zip(building.zones, air, strict=True):
        if not zone.conditioned:
            continue
        if zone.air_system is None:
            text = "no air system; leakage alone is no planned fresh air. Local codes on hygiene decide."
            yield _zone_check(zone, "air_system", text)
            continue
        needed, flow = required_air(zone), float((exchange.leakage + exchange.supplied).max())
        present = zone.usage.presence if zone.usage else 0.0
        if flow <= 0 or flow < needed * (1 - 1e-9) * max(present, zone.air_system.running_share):
            text = (
                f"outdoor air of {flow:.0f} m³/h on average is less than the {needed:.0f} m³/h of its usage; "
                "too little fresh air harms health and building. Local codes on hygiene decide."
            )
            yield _zone_check(zone, "air_system", text)


def _storage(building: Building) -> Iterator[Note]:
    """Zones whose capacity follows the build-ups although most of their faces have none."""
    for zone in building.zones:
        if zone.heat_capacity is not None or zone.thermal_mass != "from build-ups" or not zone.conditioned:
            continue
        faces = [(e.net_area, e.build_up) for e in building.elements if zone.name in {e.zone, e.faces}]
        floors = [floor for floor in building.ground_floors if floor.zone == zone.name]
        faces += [(floor.area, floor.build_up) for floor in floors]
        faces += [(floor.wall_area, floor.basement_wall) for floor in floors]
        total = sum(area for area, _ in faces)
        unknown = sum(area for area, build_up in faces if build_up is None)
        if total and unknown > total / 2:
            share = 100 * unknown / total
            text = (
                f"{share:.0f} % of its faces have a U-value but no layers, so their heat capacity is missing; "
                "choose a class of thermal mass."
            )
            yield _zone_check(zone, "thermal_mass", text)


def _overheating(building: Building, cooling: ModeBalance) -> Iterator[Note]:
    for number, zone in enumerate(building.zones):
        surplus = float(cooling.need[number].sum()) / zone.floor_area
        if zone.conditioned and not zone.cooled and surplus > OVERHEATING:
            text = (
                f"not cooled, but {surplus:.0f} kWh/m² a year would have to be removed to stay below "
                f"{zone.cooling_set_point:g} °C; check the risk of overheating with an hourly method."
            )
            yield _zone_check(zone, "conditioning", text)


def _defaults(defaults: Sequence[DefaultUsed]) -> Iterator[Note]:
    """One note for each default, with a link to the first of its cells."""
    alike: dict[tuple[str, str, str, str], list[DefaultUsed]] = defaultdict(list)
    for default in defaults:
        alike[default.sheet, default.column, default.value, default.reason].append(default)
    for (sheet, column, value, reason), cells in alike.items():
        names = ", ".join(dict.fromkeys(default.name for default in cells if default.name))
        whose = f" of {names}" if names else ""
        because = f" ({reason})" if reason else ""
        yield Note("default", f"{column}{whose}: empty, taken as {value}{because}.", sheet, cells[0].cell)


def _methods(building: Building, climate: Climate, openings: Sequence[OpeningGains]) -> Iterator[Note]:
    method = building.project.method
    lines = [
        f"Monthly balance with utilisation factors: {method}, a = 1 + τ/15 h.",
        *envelope_methods(),
        "Slabs, suspended floors and basements: ISO 13370:2017, monthly, each mode at its constant inside temperature.",
        "Thermal bridges: ψ·l and χ as entered (ISO 14683, ISO 10211).",
        "Outdoor air: leakage from n50 (ISO 13789:1999, annex), fans and windows as entered.",
        "Sun: hourly irradiance on each plane with the Perez sky (ISO 52010-1), summed by month.",
        *shading_methods(building, openings),
        "Radiation to the sky: 11 K below outdoor air (ISO 13790:2008, 11.4.6).",
        "Unconditioned zones: steady heat balance of all of them together, month by month (ISO 13789:2017).",
        "Air flows between zones are not modelled.",
        _air_line(building, climate),
        *_limits_of_air(building),
        *([NIGHT_COOLING] if any(zone.air_system and zone.air_system.night_cooling for zone in building.zones) else []),
        "Hours and days without use: ISO 13790:2008, 13.2: normal or mean set-point, or reduced need.",
        "Length of the season: ISO 13790:2008, 7.4.",
    ]
    yield from (Note("method", line, "", "") for line in lines)


def _air_line(building: Building, climate: Climate) -> str:
    project = building.project
    altitude = site_altitude(project, climate)
    whose = "of the weather file" if project.altitude is None else "of sheet Project"
    capacity = air_heat_capacity(project, altitude)
    return f"Air carries {capacity:.0f} J/(m³·K), at the altitude {whose}, {altitude:.0f} m (ISO 2533:1975)."


def _limits_of_air(building: Building) -> Iterator[str]:
    """What the balance does not see of the air."""
    systems = [zone.air_system for zone in building.zones if zone.air_system]
    if any(system.frost_limit is not None for system in systems):
        yield (
            "Frost limit of heat recovery: by the mean outdoor temperature of the month, in conditioned zones; colder "
            "hours of milder months are not seen."
        )
    if any(system.fan_power for system in systems):
        yield "Fan electricity is reported; its heat is not counted among the gains."
    if any(zone.cooled for zone in building.zones):
        yield "Cooling need: sensible heat only; drying the air takes more."


def _sources(building: Building, climate: Climate) -> Iterator[Note]:
    cell = building.project.origin.cell("weather")
    yield Note("source", f"Weather: {climate.name}. {climate.source}", "Project", cell)
    usages = {zone.usage.name: zone.usage for zone in building.zones if zone.usage}
    for usage in usages.values():
        whose = "standard profile, ISO 13790:2008, table G.12 (from memory)" if usage.standard else "own values"
        yield Note("source", f"Usage {usage.name}: {whose}.", usage.origin.sheet, usage.origin.cell())
    yield from material_sources(building)
