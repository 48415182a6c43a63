"""From arrays to the result rows that the sheets show."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

import numpy as np

from heatledger.balance.air import AirExchange
from heatledger.balance.capacity import face_capacities
from heatledger.balance.constructions import Construction, Constructions
from heatledger.balance.months import HOURS
from heatledger.balance.needs import ModeBalance
from heatledger.balance.paths import HeatPath, transfer
from heatledger.building.model import Building
from heatledger.climate.model import Climate
from heatledger.results import BuildUpResult, ClimateResult, ElementLoss, LayerResult, Months, ProjectResult
from heatledger.standards.iso13788 import steady_profile

__all__ = ["build_up_results", "climate_result", "element_losses", "project_result"]


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
        The largest loss first; shares are of the sum of all losses that are positive.
    """
    rows = [*_through_elements(building, paths, heating), *_by_air(building, air, heating, outdoor)]
    total = sum(max(loss, 0.0) for *_, loss in rows)
    ranked = sorted(rows, key=lambda row: (-row[-1], row[1], row[0]))
    return tuple(ElementLoss(*row, share=100 * row[-1] / total if total else 0.0) for row in ranked)


_Row = tuple[str, str, str, str, float | None, float | None, float, float]


def _through_elements(building: Building, paths: Sequence[HeatPath], heating: ModeBalance) -> Iterator[_Row]:
    for path in paths:
        zone = building.zones[path.zone]
        if zone.conditioned:
            season = heating.need[path.zone] > 0
            loss = float(np.sum(transfer(path, heating.temperature, HOURS), where=season))
            yield path.name, zone.name, path.kind, path.faces, path.area, path.u_value, path.coefficient, loss


def _by_air(building: Building, air: Sequence[AirExchange], heating: ModeBalance, outdoor: Months) -> Iterator[_Row]:
    for number, (zone, exchange) in enumerate(zip(building.zones, air, strict=True)):
        season = heating.need[number] > 0
        degree_hours = np.sum((heating.temperature[number] - outdoor) * HOURS, where=season)
        parts = (
            ("Air leakage", "air leakage", exchange.leakage_coefficient),
            (zone.air_system.name if zone.air_system else "", "ventilation", exchange.supplied_heating),
        )
        for name, kind, coefficient in parts:
            if zone.conditioned and coefficient:
                loss = float(coefficient * degree_hours / 1000)
                yield name, zone.name, kind, "outdoors", None, None, coefficient, loss


INSIDE_TEMPERATURE = 20.0
"""Inside air of the temperature profiles. [°C]"""


def build_up_results(constructions: Constructions, outdoor: Months) -> tuple[BuildUpResult, ...]:
    """Every build-up in every position: layers, U, temperatures in the coldest month, heat capacity.

    Parameters
    ----------
    constructions : Constructions
        Build-ups in their positions.
    outdoor : ndarray, shape (12,)
        The coldest of these months stands outside. [°C]

    Returns
    -------
    tuple of BuildUpResult
    """
    coldest = float(np.min(outdoor))
    return tuple(_build_up_result(found, coldest) for found in constructions.used)


def _build_up_result(found: Construction, coldest: float) -> BuildUpResult:
    layers = found.build_up.layers
    beyond = (0.0,) * (len(layers) - len(found.resistances))
    profile = steady_profile(found.resistances, *found.surfaces, INSIDE_TEMPERATURE, coldest)
    behind = {"outdoors": "outdoors", "zone": "to another zone"}[found.facing]
    return BuildUpResult(
        found.build_up.name,
        f"{found.direction}, {behind}",
        tuple(
            LayerResult(layer.material, layer.thickness * 1000, layer.conductivity or None, resistance)
            for layer, resistance in zip(layers, (*found.resistances, *beyond), strict=True)
        ),
        sum(layer.thickness for layer in layers) * 1000,
        found.total,
        found.u_value,
        face_capacities(found)[0] / 1000,
        tuple(float(temperature) for temperature in profile.temperatures),
    )
