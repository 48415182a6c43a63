"""The whole calculation of a building in a climate: the order of the steps."""

from __future__ import annotations

from dataclasses import dataclass, replace
from functools import cached_property

import numpy as np
from numpy.typing import NDArray

from heatledger.balance.air import AirExchange, air_exchange, air_heat_capacity, site_altitude
from heatledger.balance.build_ups import build_up_comparison, build_up_results
from heatledger.balance.capacity import heat_capacities
from heatledger.balance.constructions import Constructions, Position, construct
from heatledger.balance.gains import Gains, monthly_gains
from heatledger.balance.ground import GroundCoupling, ground_couplings
from heatledger.balance.needs import ModeBalance, mode_balance
from heatledger.balance.network import adjustment_factors, zone_temperatures
from heatledger.balance.notes import notes_of
from heatledger.balance.paths import HeatPath, heat_paths
from heatledger.balance.reporting import climate_result, element_losses, ground_floor_results, project_result
from heatledger.balance.use import ZoneUse, reduced, set_points, zone_use
from heatledger.building.model import Building, Zone
from heatledger.climate.model import Climate
from heatledger.errors import InputError, Problem
from heatledger.results import BuildingResult, Months, Results, ZoneResult
from heatledger.standards.iso13790 import numerical_parameter, time_constant
from heatledger.standards.iso13790_use import limit_ratio, season_fraction

__all__ = ["calculate"]

MODES = ("heating", "cooling")
"""The two balances of a month; figures of the zone that need one mode are those of heating."""


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
    altitude = site_altitude(building.project, climate)
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
        build_up_results(model.constructions, building.project, model.outdoor, model.drops),
        notes_of(building, climate, model.air, model.constructions, cooling, model.gains.openings),
        build_up_comparison(model.constructions, building.project, model.outdoor, model.drops),
        ground_floor_results(building, model.ground, heating, cooling),
    )


@dataclass(frozen=True)
class _HeatModel:
    """What both modes share."""

    building: Building
    outdoor: Months
    """[°C]"""
    constructions: Constructions
    ground: dict[str, GroundCoupling]
    paths: tuple[HeatPath, ...]
    air: tuple[AirExchange, ...]
    gains: Gains
    capacities: NDArray[np.float64]
    """Of each zone. [J/K]"""
    factors: NDArray[np.float64]
    """Adjustment factor b of each zone. [-]"""
    transmission: NDArray[np.float64]
    """Of each zone towards outdoors and ground. [W/K]"""

    @cached_property
    def air_coefficients(self) -> dict[str, NDArray[np.float64]]:
        """Heat carried by outdoor air, by mode, shape (zones, 12). [W/K]"""
        return {mode: _monthly(self.air, mode) for mode in MODES}

    @cached_property
    def total_coefficients(self) -> dict[str, NDArray[np.float64]]:
        """Transmission and air of each zone, by mode, mean of the year. [W/K]"""
        return {mode: self.transmission + air.mean(axis=1) for mode, air in self.air_coefficients.items()}

    @cached_property
    def time_constants(self) -> dict[str, NDArray[np.float64]]:
        """Of each zone, by mode; 0 for one without heat loss. [h]"""
        return {
            mode: time_constant(self.capacities, np.where(total > 0, total, np.inf))
            for mode, total in self.total_coefficients.items()
        }

    @cached_property
    def drops(self) -> dict[Position, float]:
        """Largest share of the difference to outdoors that falls across each build-up between two zones. [-]"""
        factors = {zone.name: float(b) for zone, b in zip(self.building.zones, self.factors, strict=True)}
        shares: dict[Position, float] = {}
        for element in self.building.elements:
            found = self.constructions.of_element.get(element.name)
            if found is not None and not element.faces_outdoors:
                own = factors[element.zone]
                share = abs(factors.get(element.faces, own) - own)
                shares[found.position] = max(share, shares.get(found.position, 0.0))
        return shares

    @cached_property
    def uses(self) -> tuple[ZoneUse, ...]:
        """How each zone is used."""
        constants = zip(*(self.time_constants[mode] for mode in MODES), strict=True)
        return tuple(zone_use(zone, *pair) for zone, pair in zip(self.building.zones, constants, strict=True))


def _heat_model(building: Building, climate: Climate, air_capacity: float) -> _HeatModel:
    outdoor = climate.temperature
    constructions = construct(building)
    ground = ground_couplings(building, constructions, outdoor, climate.latitude)
    paths = heat_paths(building, constructions, ground, outdoor)
    air = tuple(air_exchange(zone, building.project, air_capacity, outdoor) for zone in building.zones)
    conditioned = np.array([zone.conditioned for zone in building.zones])
    air_in_heating = _monthly(air, "heating")
    _require_heat_paths(building, paths, air_in_heating)
    factors = adjustment_factors(paths, conditioned, air_in_heating)
    return _HeatModel(
        building,
        outdoor,
        constructions,
        ground,
        paths,
        air,
        monthly_gains(building, constructions, climate),
        heat_capacities(building, constructions),
        factors,
        _transmission(paths, factors),
    )


def _monthly(air: tuple[AirExchange, ...], mode: str) -> NDArray[np.float64]:
    return np.array([exchange.heating if mode == "heating" else exchange.cooling for exchange in air])


def _transmission(paths: tuple[HeatPath, ...], factors: NDArray[np.float64]) -> NDArray[np.float64]:
    """Towards outdoors and ground; through an unconditioned zone with its factor b, to a conditioned one none. [W/K]"""
    coefficients = np.zeros(len(factors))
    for path in paths:
        coefficients[path.zone] += path.coefficient * (1.0 if path.other is None else factors[path.other])
    return coefficients


def _balance(model: _HeatModel, mode: str) -> ModeBalance:
    """Temperatures, then balance, then intermittency of all zones in one mode."""
    zones, uses = model.building.zones, model.uses
    coefficients, constants = model.air_coefficients[mode], model.time_constants[mode]
    temperatures = zone_temperatures(
        model.paths, set_points(zones, uses, mode, model.outdoor), coefficients, model.outdoor, model.gains.power(mode)
    )
    continuous = mode_balance(
        mode,
        model.paths,
        temperatures,
        coefficients,
        model.outdoor,
        model.gains.total(mode),
        numerical_parameter(constants)[:, None],
        cut_offs=model.building.project.method.startswith("EN ISO 52016-1"),
    )
    needs = [
        reduced(need, ratio, zone, use, mode, float(constant))
        for need, ratio, zone, use, constant in zip(
            continuous.need, continuous.ratio, zones, uses, constants, strict=True
        )
    ]
    return replace(continuous, need=np.array(needs))


def _require_heat_paths(building: Building, paths: tuple[HeatPath, ...], air: NDArray[np.float64]) -> None:
    """Without them an unconditioned zone has no temperature, as where negative thermal bridges outweigh the rest."""
    conductances = air.min(axis=1)
    for path in paths:
        conductances[path.zone] += path.coefficient
    pairs = zip(building.zones, conductances, strict=True)
    problems = [_no_loss(zone) for zone, conductance in pairs if not zone.conditioned and conductance <= 0]
    if problems:
        raise InputError(problems)


def _no_loss(zone: Zone) -> Problem:
    return Problem(
        f"no heat loss from '{zone.name}'",
        "a positive sum of transmission and ventilation",
        "Give it leakage, an air system, or an element or thermal bridge that loses heat, or join it to another zone.",
        sheet=zone.origin.sheet,
        cell=zone.origin.cell(),
        column="Zone",
    )


def _require_losses(model: _HeatModel) -> None:
    problems = [
        _no_loss(zone)
        for zone, *coefficients in zip(
            model.building.zones, *(model.total_coefficients[mode] for mode in MODES), strict=True
        )
        if zone.conditioned and min(coefficients) <= 0
    ]
    if problems:
        raise InputError(problems)


def _zone_result(number: int, model: _HeatModel, heating: ModeBalance, cooling: ModeBalance) -> ZoneResult:
    zone = model.building.zones[number]
    constants = [float(model.time_constants[mode][number]) for mode in MODES]
    exponents = [float(numerical_parameter(constant)) for constant in constants]
    use = model.uses[number]
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
        solar_gains_cooling=model.gains.solar_cooling[number],
        internal_gains=model.gains.internal[number],
        heating_spared=heating.spared[number],
        gain_ratio=heating.ratio[number],
        gain_utilisation=heating.utilisation[number],
        loss_ratio=cooling.ratio[number],
        loss_utilisation=cooling.utilisation[number],
        heating_season=_season(np.maximum(heating.ratio[number], 0), exponents[0]) if zone.conditioned else nothing,
        cooling_season=_season(_losses_to_gains(model, cooling, number), exponents[1]) if zone.cooled else nothing,
        fan_electricity=model.air[number].fan_electricity,
        heating_use=use.heating,
        cooling_use=use.cooling,
        exponent=exponents[0],
        time_constant=constants[0],
        heat_capacity=float(model.capacities[number]) / 1000,
        transmission_coefficient=float(model.transmission[number]),
        ventilation_coefficient=float(model.air_coefficients["heating"][number].mean()),
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


def _losses_to_gains(model: _HeatModel, cooling: ModeBalance, number: int) -> Months:
    """1/γ_C of a zone: 0 where heat comes in from outdoors, NaN without gains. [-]"""
    losses = np.maximum(cooling.transmission[number] + cooling.ventilation[number], 0)
    gains = model.gains.total("cooling")[number]
    return np.asarray(np.divide(losses, gains, out=np.full(12, np.nan), where=gains > 0))


def _season(ratio: Months, exponent: float) -> Months:
    return season_fraction(ratio, float(limit_ratio(exponent)))
