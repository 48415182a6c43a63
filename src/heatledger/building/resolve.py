"""From rows as typed to the building in SI units: the one place where units and spellings are converted."""

from __future__ import annotations

from collections import defaultdict
from typing import TYPE_CHECKING, TypeVar

from heatledger.building.defaults import defaults_that_count
from heatledger.building.model import (
    AirSystem,
    Building,
    BuildUp,
    Element,
    GlazedUnit,
    GroundFloor,
    Layer,
    Opening,
    Project,
    ThermalBridge,
    Usage,
    Zone,
)
from heatledger.inputs.crosschecks import default_tilt, folded, is_level
from heatledger.inputs.rows import AIR_LAYERS, NEIGHBOUR, OUTDOORS

if TYPE_CHECKING:
    from heatledger.building.model import AirLayer
    from heatledger.inputs.rows import (
        AirSystemRow,
        BuildUpRow,
        ElementRow,
        GlazedUnitRow,
        GroundFloorRow,
        MaterialRow,
        OpeningRow,
        ProjectRow,
        Rows,
        ThermalBridgeRow,
        UsageRow,
        ZoneRow,
    )

__all__ = ["resolve"]

HOURS_OF_YEAR = 8760.0
"""[h]"""

Part = TypeVar("Part")


def resolve(rows: Rows) -> Building:
    """Build the building from checked rows.

    Parameters
    ----------
    rows : Rows
        Rows that passed every check; names resolve.

    Returns
    -------
    Building
    """
    usages = {folded(row.name): _usage(row) for row in rows.usages}
    systems = {folded(row.name): _air_system(row) for row in rows.air_systems}
    units = {folded(row.name): _glazed_unit(row) for row in rows.glazed_units}
    zone_names = {folded(row.name): row.name for row in rows.zones}
    build_ups = _build_ups(rows)
    openings: dict[str, list[Opening]] = defaultdict(list)
    for row in rows.openings:
        openings[folded(row.element)].append(_opening(row, units))
    return Building(
        _project(rows.project),
        tuple(_zone(row, usages, systems) for row in rows.zones),
        tuple(_element(row, zone_names, build_ups, openings[folded(row.name)]) for row in rows.elements),
        tuple(_ground_floor(row, zone_names, build_ups) for row in rows.ground_floors),
        tuple(_thermal_bridge(row, zone_names) for row in rows.thermal_bridges),
        defaults_that_count(rows),
    )


def _project(row: ProjectRow) -> Project:
    return Project(
        row.project,
        row.client,
        row.assessor,
        row.job_number,
        row.address,
        row.weather,
        row.altitude,
        row.latitude,
        row.longitude,
        row.time_zone,
        row.ground_reflectance,
        row.site_exposure,
        row.dimensions,
        row.air_density == "sea level",
        row.method,
        row,
    )


def _usage(row: UsageRow) -> Usage:
    electricity = (row.appliances + row.lighting) * row.share_released / 100
    return Usage(
        row.name,
        row.heating_set_point,
        row.cooling_set_point,
        1 / row.area_per_person if row.area_per_person else 0.0,
        row.heat_per_person,
        row.presence / 24,
        electricity * 1000 / HOURS_OF_YEAR,
        row.air_per_person,
        row.air_per_area,
    )


def _air_system(row: AirSystemRow) -> AirSystem:
    return AirSystem(
        row.name,
        row.kind,
        row.rate_basis,
        row.rate,
        row.running_hours / 24,
        row.heat_recovery / 100,
        row.bypass == "yes",
    )


def _glazed_unit(row: GlazedUnitRow) -> GlazedUnit:
    return GlazedUnit(row.name, row.u_value, row.g_value, row.frame_share / 100, row)


def _opening(row: OpeningRow, units: dict[str, GlazedUnit]) -> Opening:
    return Opening(row.name, units[folded(row.glazed_unit)], row.count * row.width * row.height, row)


def _build_ups(rows: Rows) -> dict[str, BuildUp]:
    materials = {folded(row.name): row for row in rows.materials}
    layers: dict[str, list[BuildUpRow]] = defaultdict(list)
    for row in rows.build_ups:
        layers[folded(row.name)].append(row)
    return {
        name: BuildUp(
            found[0].name, tuple(_layer(row, materials) for row in sorted(found, key=lambda layer: layer.layer))
        )
        for name, found in layers.items()
    }


def _layer(row: BuildUpRow, materials: dict[str, MaterialRow]) -> Layer:
    thickness = row.thickness / 1000
    air = _AIR.get(row.material)
    if air:
        return Layer(row.material, thickness, 0.0, 0.0, 0.0, air)
    material = materials[folded(row.material)]
    stores = material.density is not None and material.specific_heat is not None
    return Layer(
        material.name,
        thickness,
        material.conductivity,
        (material.density or 0.0) if stores else 0.0,
        (material.specific_heat or 0.0) if stores else 0.0,
        "",
    )


def _element(
    row: ElementRow, zone_names: dict[str, str], build_ups: dict[str, BuildUp], openings: list[Opening]
) -> Element:
    tilt = default_tilt(row)
    return Element(
        row.name,
        zone_names[folded(row.zone)],
        row.kind,
        folded(row.faces) if folded(row.faces) in {OUTDOORS, NEIGHBOUR} else zone_names[folded(row.faces)],
        build_ups[folded(row.build_up)] if row.build_up else None,
        row.u_value,
        row.area,
        None if row.azimuth is None or is_level(tilt) else float(row.azimuth) % 360,
        tilt,
        row.absorptance,
        tuple(openings),
        row,
    )


def _ground_floor(row: GroundFloorRow, zone_names: dict[str, str], build_ups: dict[str, BuildUp]) -> GroundFloor:
    return GroundFloor(
        row.name,
        zone_names[folded(row.zone)],
        row.area,
        row.perimeter,
        build_ups[folded(row.build_up)] if row.build_up else None,
        row.u_value,
        row.wall_thickness,
        row.soil,
        row,
    )


def _thermal_bridge(row: ThermalBridgeRow, zone_names: dict[str, str]) -> ThermalBridge:
    linear = (row.length or 0.0) * (row.linear_transmittance or 0.0)
    point = (row.count or 0) * (row.point_transmittance or 0.0)
    return ThermalBridge(row.name, zone_names[folded(row.zone)], linear + point, row)


def _zone(row: ZoneRow, usages: dict[str, Usage], systems: dict[str, AirSystem]) -> Zone:
    usage = usages.get(folded(row.usage))
    return Zone(
        row.name,
        row.conditioning,
        usage,
        systems.get(folded(row.air_system)),
        row.floor_area,
        row.air_volume,
        row.thermal_mass,
        None if row.heat_capacity is None else row.heat_capacity * 1000,
        _first(row.heating_set_point, usage.heating_set_point if usage else None),
        _first(row.cooling_set_point, usage.cooling_set_point if usage else None),
        row.leakage,
        row.exposed_facades == "several",
        row,
    )


def _first(override: float | None, usual: float | None) -> float:
    """Set-point of a zone; an unconditioned zone without usage has none."""
    if override is not None:
        return override
    return usual if usual is not None else float("nan")


_AIR: dict[str, AirLayer] = dict(
    zip(AIR_LAYERS, ("unventilated", "slightly ventilated", "well ventilated"), strict=True)
)
