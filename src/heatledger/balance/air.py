"""Outdoor air of every zone: leakage, windows, fans, heat recovery, night cooling, month by month."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from heatledger.balance.months import HOURS
from heatledger.balance.use import months_in_use
from heatledger.building.model import AirSystem, Project, Zone
from heatledger.climate.model import Climate
from heatledger.results import Months
from heatledger.standards.iso2533 import pressure_ratio
from heatledger.standards.iso13789 import (
    AIR_HEAT_CAPACITY,
    SHIELDING,
    infiltration,
    recovered_share,
    ventilation_coefficient,
)

__all__ = ["AirExchange", "air_exchange", "air_heat_capacity", "required_air", "site_altitude"]

NIGHT_HOURS = 8.0
"""Hours a day that night cooling counts. [h] Common practice, no source."""


@dataclass(frozen=True)
class AirExchange:
    """Mean air flows of a zone and the heat they carry per kelvin; each of shape (12,)."""

    leakage: Months
    """Through gaps. [m³/h]"""
    supplied: Months
    """By the air system, mean of the day. [m³/h]"""
    leakage_coefficient: Months
    """[W/K]"""
    supplied_heating: Months
    """With heat recovery. [W/K]"""
    supplied_cooling: Months
    """Heat recovery off where there is a bypass; with night cooling. [W/K]"""
    fan_electricity: Months
    """[kWh]"""

    @property
    def heating(self) -> Months:
        """Coefficient in heating mode. [W/K]"""
        return self.leakage_coefficient + self.supplied_heating

    @property
    def cooling(self) -> Months:
        """Coefficient in cooling mode. [W/K]"""
        return self.leakage_coefficient + self.supplied_cooling


def site_altitude(project: Project, climate: Climate) -> float:
    """Altitude of the building: as typed, else that of the weather. [m]"""
    return climate.altitude if project.altitude is None else project.altitude


def air_heat_capacity(project: Project, altitude: float) -> float:
    """Heat capacity of air per volume at the site, or at sea level where the project says so. [J/(m³·K)]"""
    return AIR_HEAT_CAPACITY if project.sea_level_air else AIR_HEAT_CAPACITY * float(pressure_ratio(altitude))


def air_exchange(zone: Zone, project: Project, heat_capacity: float, outdoor: Months) -> AirExchange:
    """Air flows of a zone and their coefficients.

    Parameters
    ----------
    zone : Zone
        With its air system; in months out of use the system is off and the zone only leaks.
    project : Project
        Tells the exposure of the site.
    heat_capacity : float
        Of air per volume. [J/(m³·K)]
    outdoor : ndarray, shape (12,)
        [°C]

    Returns
    -------
    AirExchange
        A natural system takes the larger of its rate and the leakage; fans come on top of the leakage, which they
        change by their imbalance while they run.
    """
    shielding = SHIELDING[project.exposure, zone.several_facades]
    still = float(infiltration(zone.volume, zone.leakage, shielding))
    system, in_use = zone.air_system, months_in_use(zone)
    if system is None:
        nothing = np.zeros(12)
        leaking = np.full(12, still)
        return AirExchange(leaking, nothing, ventilation_coefficient(leaking, heat_capacity), nothing, nothing, nothing)
    flow = _flow_while_running(zone, system)
    supplied = np.where(in_use, flow * system.running_share, 0.0)
    if system.kind == "natural":
        leaking = np.where(supplied > still, 0.0, still)
        supplied = np.where(supplied > still, supplied, 0.0)
    else:
        imbalance = {"extract": -flow, "supply": flow}.get(system.kind, 0.0)
        running = float(infiltration(zone.volume, zone.leakage, shielding, imbalance))
        mean = running * system.running_share + still * (1 - system.running_share)
        leaking = np.where(in_use, mean, still)
    # An unconditioned zone has no set-point from which to tell its exhaust, so its frost limit does not count.
    exhaust = zone.heating_set_point if zone.conditioned else np.nan
    recovered = recovered_share(system.heat_recovery, exhaust, outdoor, system.frost_limit)
    in_cooling = 0.0 if system.bypass else system.heat_recovery
    night = _night_flow(zone, system, outdoor)
    return AirExchange(
        leaking,
        supplied,
        ventilation_coefficient(leaking, heat_capacity),
        ventilation_coefficient(supplied, heat_capacity, recovered),
        ventilation_coefficient(supplied, heat_capacity, in_cooling) + ventilation_coefficient(night, heat_capacity),
        system.fan_power * supplied * HOURS / 1000,
    )


def _flow_while_running(zone: Zone, system: AirSystem) -> float:
    """[m³/h]"""
    if system.rate_basis == "usage":
        return required_air(zone)
    return (system.rate or 0.0) * (zone.volume if system.rate_basis == "air changes" else zone.floor_area)


def required_air(zone: Zone) -> float:
    """Fresh air that the usage asks for with everybody present: of the people and of the area. [m³/h]"""
    usage = zone.usage
    if usage is None:
        return 0.0
    return zone.floor_area * (usage.people_per_area * usage.air_per_person + usage.air_per_area)


def _night_flow(zone: Zone, system: AirSystem, outdoor: Months) -> Months:
    """Additional flow of the night, mean of the day, shape (12,); none in months that would bring in heat. [m³/h]"""
    months = [month in system.night_cooling_months for month in range(1, 13)]
    warmer = outdoor >= zone.cooling_set_point
    return np.where(months & ~warmer, system.night_cooling * zone.volume * NIGHT_HOURS / 24, 0.0)
