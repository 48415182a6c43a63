"""The whole calculation of a building in a climate: the order of the steps."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from heatledger.balance.air import AirExchange, air_exchange, air_heat_capacity
from heatledger.balance.capacity import heat_capacities
from heatledger.balance.constructions import Constructions, construct
from heatledger.balance.gains import Gains, monthly_gains
from heatledger.balance.needs import ModeBalance, mode_balance
from heatledger.balance.network import adjustment_factors, zone_temperatures
from heatledger.balance.notes import notes_of
from heatledger.balance.paths import HeatPath, heat_paths
from heatledger.balance.reporting import build_up_results, climate_result, element_losses, project_result
from heatledger.building.model import Building, Zone
from heatledger.climate.model import Climate
from heatledger.errors import InputError, Problem
from heatledger.results import BuildingResult, Months, Results, ZoneResult
from heatledger.standards.iso13790 import numerical_parameter, time_constant

__all__ = ["calculate"]


def calculate(building: Building, climate: Climate) -> Results:
    """Monthly heating and cooling need of every zone.

    Parameters
    ----------
    building : Building
        The building with resolved names.
    climate : Climate
        The climate of the place.

    Returns
    -------
    Results

    Raises
    ------
    InputError
        If a conditioned zone loses no heat at all, so that it has no time constant.
    """
    altitude = climate.altitude if building.project.altitude is None else building.project.altitude
    air_capacity = air_heat_capacity(building.project, altitude)
    model = _heat_model(building, climate, air_capacity)
    _require_losses(model)
    heating, cooling = _balance(model, "heating"), _balance(model, "cooling")
    zones = tuple(_zone_result(number, model, heating, cooling) for number in range(len(building.zones)))
    return Results(
        project_result(building, altitude, air_capacity),
        climate_result(climate),
        zones,
        _building_result(zones),
        element_losses(building, model.paths, model.air, heating, model.outdoor),
        model.gains.openings,
        build_up_results(model.constructions, model.outdoor),
        notes_of(building, climate, model.air, model.constructions, cooling),
    )


@dataclass(frozen=True)
class _HeatModel:
    """What both modes share."""

    building: Building
    outdoor: Months
    """[°C]"""
    constructions: Constructions
    paths: tuple[HeatPath, ...]
    air: tuple[AirExchange, ...]
    gains: Gains
    capacities: NDArray[np.float64]
    """Of each zone. [J/K]"""
    factors: NDArray[np.float64]
    """Adjustment factor b of each zone. [-]"""
    transmission: NDArray[np.float64]
    """Of each zone towards outdoors and ground. [W/K]"""

    def air_coefficients(self, mode: str) -> NDArray[np.float64]:
        """Heat carried by outdoor air, shape (zones, 12). [W/K]"""
        return _monthly(self.air, mode)

    def total_coefficients(self, mode: str) -> NDArray[np.float64]:
        """Transmission and air of each zone, mean of the year. [W/K]"""
        return np.asarray(self.transmission + self.air_coefficients(mode).mean(axis=1))


def _heat_model(building: Building, climate: Climate, air_capacity: float) -> _HeatModel:
    outdoor = climate.temperature
    constructions = construct(building, outdoor, climate.latitude)
    paths = heat_paths(building, constructions, outdoor)
    air = tuple(air_exchange(zone, building.project, air_capacity) for zone in building.zones)
    conditioned = np.array([zone.conditioned for zone in building.zones])
    factors = adjustment_factors(paths, np.where(conditioned, 1.0, np.nan), _monthly(air, "heating"))
    return _HeatModel(
        building,
        outdoor,
        constructions,
        paths,
        air,
        monthly_gains(building, constructions, climate),
        heat_capacities(building, constructions),
        factors,
        _transmission(paths, factors),
    )


def _monthly(air: tuple[AirExchange, ...], mode: str) -> NDArray[np.float64]:
    values = np.array([exchange.heating if mode == "heating" else exchange.cooling for exchange in air])
    return np.repeat(values[:, None], 12, axis=1)


def _transmission(paths: tuple[HeatPath, ...], factors: NDArray[np.float64]) -> NDArray[np.float64]:
    """Towards outdoors and ground; through an unconditioned zone with its factor b, to a conditioned one none. [W/K]"""
    coefficients = np.zeros(len(factors))
    for path in paths:
        coefficients[path.zone] += path.coefficient * (1.0 if path.other is None else factors[path.other])
    return coefficients


def _balance(model: _HeatModel, mode: str) -> ModeBalance:
    """Temperatures, then balance, of all zones in one mode."""
    zones = model.building.zones
    coefficients = model.air_coefficients(mode)
    set_points = np.array([_set_point(zone, mode) for zone in zones])
    temperatures = zone_temperatures(model.paths, set_points, coefficients, model.outdoor, model.gains.power)
    total = model.total_coefficients(mode)
    exponents = numerical_parameter(time_constant(model.capacities, np.where(total > 0, total, np.inf)))[:, None]
    cut_offs = model.building.project.method.startswith("EN ISO 52016-1")
    return mode_balance(
        mode,
        model.paths,
        temperatures,
        coefficients,
        model.outdoor,
        model.gains.total,
        exponents,
        cut_offs=cut_offs,
    )


def _set_point(zone: Zone, mode: str) -> float:
    """NaN for an unconditioned zone. [°C]"""
    if not zone.conditioned:
        return float("nan")
    return zone.heating_set_point if mode == "heating" else zone.cooling_set_point


def _require_losses(model: _HeatModel) -> None:
    problems = [
        Problem(
            f"no heat loss from '{zone.name}'",
            "a positive sum of transmission and ventilation",
            "Check its elements, thermal bridges, leakage and air system.",
            sheet=zone.origin.sheet,
            cell=zone.origin.cell(),
            column="Zone",
        )
        for zone, *coefficients in zip(
            model.building.zones, model.total_coefficients("heating"), model.total_coefficients("cooling"), strict=True
        )
        if zone.conditioned and min(coefficients) <= 0
    ]
    if problems:
        raise InputError(problems)


def _zone_result(number: int, model: _HeatModel, heating: ModeBalance, cooling: ModeBalance) -> ZoneResult:
    zone = model.building.zones[number]
    total = model.total_coefficients("heating")[number]
    constant = float(time_constant(model.capacities[number], total)) if total > 0 else 0.0
    nothing = np.zeros(12)
    return ZoneResult(
        name=zone.name,
        conditioning=zone.conditioning,
        floor_area=zone.floor_area,
        heating_need=heating.need[number] if zone.conditioned else nothing,
        cooling_need=cooling.need[number] if zone.cooled else nothing,
        transmission_heating=heating.transmission[number],
        ventilation_heating=heating.ventilation[number],
        transmission_cooling=cooling.transmission[number],
        ventilation_cooling=cooling.ventilation[number],
        solar_gains=model.gains.solar[number],
        internal_gains=model.gains.internal[number],
        gain_ratio=heating.ratio[number],
        gain_utilisation=heating.utilisation[number],
        loss_ratio=cooling.ratio[number],
        loss_utilisation=cooling.utilisation[number],
        exponent=float(numerical_parameter(constant)),
        time_constant=constant,
        heat_capacity=float(model.capacities[number]) / 1000,
        transmission_coefficient=float(model.transmission[number]),
        ventilation_coefficient=float(model.air_coefficients("heating")[number].mean()),
        heating_set_point=zone.heating_set_point,
        cooling_set_point=zone.cooling_set_point,
        temperature=heating.temperature[number],
        adjustment_factor=float(model.factors[number]),
    )


def _building_result(zones: tuple[ZoneResult, ...]) -> BuildingResult:
    return BuildingResult(
        sum(zone.floor_area for zone in zones if zone.conditioning != "unconditioned"),
        np.sum([zone.heating_need for zone in zones], axis=0),
        np.sum([zone.cooling_need for zone in zones], axis=0),
    )
