"""From rows as typed to the building in SI units: the one place where units and spellings are converted."""

from __future__ import annotations

from collections import defaultdict
from typing import TYPE_CHECKING

from heatledger.building.defaults import defaults_that_count
from heatledger.building.glazing import glazed_unit
from heatledger.building.layers import material_sources, resolve_build_ups
from heatledger.building.model import (
    AirSystem,
    Building,
    BuildUp,
    EdgeInsulation,
    Element,
    GlazedUnit,
    GroundFloor,
    Opening,
    Project,
    ThermalBridge,
    Usage,
    Zone,
)
from heatledger.building.monthlytable import MonthlyTable, monthly_table
from heatledger.building.shading import Obstruction, ShadingDevice, resolve_obstruction, resolve_shading_device
from heatledger.inputs.crosschecks import default_tilt, folded, is_level
from heatledger.inputs.prefilled import shipped_usages
from heatledger.inputs.rows import NEIGHBOUR, OUTDOORS

if TYPE_CHECKING:
    from heatledger.inputs.rows import (
        AirSystemRow,
        ElementRow,
        GroundFloorRow,
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
    units = {folded(row.name): glazed_unit(row) for row in rows.glazed_units}
    zone_names = {folded(row.name): row.name for row in rows.zones}
    build_ups = resolve_build_ups(rows)
    obstructions = {folded(row.name): resolve_obstruction(row) for row in rows.obstructions}
    devices = {folded(row.name): resolve_shading_device(row) for row in rows.shading_devices}
    behind = {folded(row.name): obstructions.get(folded(row.obstruction)) for row in rows.elements}
    openings: dict[str, list[Opening]] = defaultdict(list)
    for row in rows.openings:
        element = folded(row.element)
        obstruction = obstructions.get(folded(row.obstruction), behind[element])
        openings[element].append(_opening(row, units, obstruction, devices.get(folded(row.shading))))
    return Building(
        _project(rows.project, build_ups, monthly_table(rows)),
        tuple(_zone(row, usages, systems) for row in rows.zones),
        tuple(
            _element(row, zone_names, build_ups, openings[folded(row.name)], behind[folded(row.name)])
            for row in rows.elements
        ),
        tuple(_ground_floor(row, zone_names, build_ups) for row in rows.ground_floors),
        tuple(_thermal_bridge(row, zone_names) for row in rows.thermal_bridges),
        defaults_that_count(rows),
        material_sources(rows),
    )


def _project(row: ProjectRow, build_ups: dict[str, BuildUp], table: MonthlyTable | None) -> Project:
    compared = (build_ups[folded(row.compared)], build_ups[folded(row.compared_with)]) if row.compared else None
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
        row.glass_angle == "by hour",
        row.site_exposure,
        row.dimensions,
        row.air_density == "sea level",
        row.method,
        row.design_inside,
        row.design_outside,
        compared,
        row,
        table,
    )


def _usage(row: UsageRow) -> Usage:
    electricity = (row.appliances + row.lighting) * row.share_released / 100
    return Usage(
        row.name,
        row.heating_set_point,
        row.cooling_set_point,
        row.setback,
        row.heated_hours,
        row.days_in_use,
        row.months_out_of_use,
        1 / row.area_per_person if row.area_per_person else 0.0,
        row.heat_per_person,
        row.presence / 24,
        electricity * 1000 / HOURS_OF_YEAR,
        row.air_per_person,
        row.air_per_area,
        _is_standard(row),
        row,
    )


def _is_standard(row: UsageRow) -> bool:
    shipped = shipped_usages().get(folded(row.name))
    return shipped is not None and shipped.model_dump(exclude={"name"}) == row.model_dump(exclude={"name"})


def _air_system(row: AirSystemRow) -> AirSystem:
    return AirSystem(
        row.name,
        row.kind,
        row.rate_basis,
        row.rate,
        row.running_hours / 24,
        row.heat_recovery / 100,
        row.bypass == "yes",
        row.frost_limit,
        row.fan_power,
        row.night_cooling,
        row.night_cooling_months,
    )


def _opening(
    row: OpeningRow, units: dict[str, GlazedUnit], obstruction: Obstruction | None, shading: ShadingDevice | None
) -> Opening:
    unit = units[folded(row.glazed_unit)]
    return Opening(row.name, unit, row.width, row.height, row.count, obstruction, shading, row)


def _element(
    row: ElementRow,
    zone_names: dict[str, str],
    build_ups: dict[str, BuildUp],
    openings: list[Opening],
    obstruction: Obstruction | None,
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
        obstruction,
        row,
    )


def _ground_floor(row: GroundFloorRow, zone_names: dict[str, str], build_ups: dict[str, BuildUp]) -> GroundFloor:
    return GroundFloor(
        row.name,
        zone_names[folded(row.zone)],
        row.type,
        row.area,
        row.perimeter,
        build_ups[folded(row.build_up)] if row.build_up else None,
        row.u_value,
        row.wall_thickness,
        row.soil,
        _edge(row),
        row.height_above_ground or 0.0,
        row.outer_wall_u_value or 0.0,
        row.vent_area or 0.0,
        row.wind_speed,
        row.ground_resistance,
        row.basement_depth or 0.0,
        build_ups[folded(row.basement_wall)] if row.basement_wall else None,
        row.basement_volume or 0.0,
        row.basement_air_change,
        row,
    )


def _edge(row: GroundFloorRow) -> EdgeInsulation | None:
    """Edge insulation of a slab; checked rows describe it whole or not at all."""
    if row.edge_insulation == "none" or row.edge_depth is None:
        return None
    thickness = (row.edge_thickness or 0.0) / 1000
    return EdgeInsulation(row.edge_insulation == "vertical", row.edge_depth, row.edge_resistance or 0.0, thickness)


def _thermal_bridge(row: ThermalBridgeRow, zone_names: dict[str, str]) -> ThermalBridge:
    linear = (row.length or 0.0) * (row.linear_transmittance or 0.0)
    point = (row.count or 0) * (row.point_transmittance or 0.0)
    faces = zone_names.get(folded(row.faces), OUTDOORS)
    return ThermalBridge(row.name, zone_names[folded(row.zone)], faces, linear + point, row)


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
