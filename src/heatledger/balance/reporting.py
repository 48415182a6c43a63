"""From arrays to the result rows that the sheets show."""

from __future__ import annotations

from collections.abc import Iterator, Mapping, Sequence
from dataclasses import replace

import numpy as np

from heatledger.balance.air import AirExchange
from heatledger.balance.ground import GroundCoupling
from heatledger.balance.months import HOURS
from heatledger.balance.needs import ModeBalance
from heatledger.balance.paths import HeatPath, transfer
from heatledger.building.model import Building
from heatledger.climate.model import Climate
from heatledger.results import ClimateResult, ElementLoss, GroundFloorResult, Months, ProjectResult

__all__ = ["climate_result", "element_losses", "ground_floor_results", "project_result"]


def project_result(building: Building, altitude: float, air_heat_capacity: float) -> ProjectResult:
    """What was assessed."""
    project = building.project
    return ProjectResult(
        project.name,
        project.client,
        project.assessor,
        project.job_number,
        project.address,
        project.method,
        project.dimensions,
        altitude,
        air_heat_capacity,
    )


def climate_result(climate: Climate) -> ClimateResult:
    """The climate's monthly means and sums."""
    return ClimateResult(
        climate.name,
        climate.source,
        climate.latitude,
        climate.longitude,
        climate.temperature,
        climate.horizontal_irradiation,
    )


def element_losses(
    building: Building, paths: Sequence[HeatPath], air: Sequence[AirExchange], heating: ModeBalance, outdoor: Months
) -> tuple[ElementLoss, ...]:
    """Every heat path of the conditioned zones, ranked by what it loses in the months its zone needs heating.

    Parameters
    ----------
    building : Building
        The building.
    paths : sequence of HeatPath
        Transmission paths of all zones.
    air : sequence of AirExchange
        Of each zone.
    heating : ModeBalance
        All zones in heating mode.
    outdoor : ndarray, shape (12,)
        [°C]

    Returns
    -------
    tuple of ElementLoss
        The largest loss first, paths between two conditioned zones last; shares are of what leaves the conditioned
        zones and add up to 100.
    """
    rows = [*_through_elements(building, paths, heating), *_by_air(building, air, heating, outdoor)]
    total = sum(row.loss for row in rows if not row.between_zones)
    ranked = sorted(rows, key=lambda row: (row.between_zones, -row.loss, row.zone, row.name))
    counts = total if total > 0 else float("inf")
    return tuple(replace(row, share=0.0 if row.between_zones else 100 * row.loss / counts) for row in ranked)


def _through_elements(building: Building, paths: Sequence[HeatPath], heating: ModeBalance) -> Iterator[ElementLoss]:
    for path in paths:
        zone = building.zones[path.zone]
        if zone.conditioned:
            season = heating.need[path.zone] > 0
            loss = float(np.sum(transfer(path, heating.temperature, HOURS), where=season))
            between = path.other is not None and building.zones[path.other].conditioned
            size = path.area, path.u_value, path.coefficient
            yield ElementLoss(path.name, zone.name, path.kind, path.faces, *size, loss, 0.0, between)


def _by_air(
    building: Building, air: Sequence[AirExchange], heating: ModeBalance, outdoor: Months
) -> Iterator[ElementLoss]:
    for number, (zone, exchange) in enumerate(zip(building.zones, air, strict=True)):
        season = heating.need[number] > 0
        degree_hours = (heating.temperature[number] - outdoor) * HOURS
        parts = (
            ("Air leakage", "air leakage", exchange.leakage_coefficient),
            (zone.air_system.name if zone.air_system else "", "ventilation", exchange.supplied_heating),
        )
        for name, kind, coefficient in parts:
            if zone.conditioned and coefficient.any():
                loss = float(np.sum(coefficient * degree_hours / 1000, where=season))
                mean = float(coefficient.mean())
                yield ElementLoss(name, zone.name, kind, "outdoors", None, None, mean, loss, 0.0)


def ground_floor_results(
    building: Building, ground: Mapping[str, GroundCoupling], heating: ModeBalance, cooling: ModeBalance
) -> tuple[GroundFloorResult, ...]:
    """Every ground floor with its coefficients and its heat flow at the temperatures of its zone in both modes."""
    index = {zone.name: number for number, zone in enumerate(building.zones)}
    results: list[GroundFloorResult] = []
    for floor in building.ground_floors:
        found, zone = ground[floor.name], index[floor.zone]
        results.append(
            GroundFloorResult(
                floor.name,
                floor.zone,
                floor.type,
                found.area,
                found.dimension,
                found.thickness,
                found.u_value,
                found.coefficient,
                float(found.periodic.inside),
                float(found.periodic.outside),
                found.phases[1],
                found.temperature,
                found.heat_flow(heating.temperature[zone]),
                found.heat_flow(cooling.temperature[zone]),
            )
        )
    return tuple(results)
