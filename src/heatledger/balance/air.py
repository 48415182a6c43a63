"""Outdoor air of every zone: leakage, windows, fans, heat recovery."""

from __future__ import annotations

from dataclasses import dataclass

from heatledger.building.model import AirSystem, Project, Zone
from heatledger.standards.iso2533 import pressure_ratio
from heatledger.standards.iso13789 import AIR_HEAT_CAPACITY, SHIELDING, infiltration, ventilation_coefficient

__all__ = ["AirExchange", "air_exchange", "air_heat_capacity", "required_air"]


@dataclass(frozen=True)
class AirExchange:
    """Mean air flows of a zone and the heat they carry per kelvin."""

    leakage: float
    """Through gaps, or through windows beyond the fans. [m³/h]"""
    supplied: float
    """By the air system. [m³/h]"""
    leakage_coefficient: float
    """[W/K]"""
    supplied_heating: float
    """With heat recovery. [W/K]"""
    supplied_cooling: float
    """Heat recovery off where there is a bypass. [W/K]"""

    @property
    def heating(self) -> float:
        """Coefficient in heating mode. [W/K]"""
        return self.leakage_coefficient + self.supplied_heating

    @property
    def cooling(self) -> float:
        """Coefficient in cooling mode. [W/K]"""
        return self.leakage_coefficient + self.supplied_cooling


def air_heat_capacity(project: Project, altitude: float) -> float:
    """Heat capacity of air per volume at the site, or at sea level where the project says so. [J/(m³·K)]"""
    return AIR_HEAT_CAPACITY if project.sea_level_air else AIR_HEAT_CAPACITY * float(pressure_ratio(altitude))


def air_exchange(zone: Zone, project: Project, heat_capacity: float) -> AirExchange:
    """Air flows of a zone and their coefficients.

    A natural system takes the larger of its rate and the leakage; fans come on top of the leakage,
    which they change by their imbalance while they run.
    """
    system = zone.air_system
    shielding = SHIELDING[project.exposure, zone.several_facades]
    still = float(infiltration(zone.volume, zone.leakage, shielding))
    if system is None:
        return _exchange(still, 0.0, 0.0, 0.0, heat_capacity)
    flow = _flow_while_running(zone, system)
    supplied = flow * system.running_share
    if system.kind == "natural":
        return (
            _exchange(0.0, supplied, 0.0, 0.0, heat_capacity)
            if supplied > still
            else _exchange(still, 0.0, 0.0, 0.0, heat_capacity)
        )
    imbalance = {"extract": -flow, "supply": flow}.get(system.kind, 0.0)
    running = float(infiltration(zone.volume, zone.leakage, shielding, imbalance))
    leaking = running * system.running_share + still * (1 - system.running_share)
    in_cooling = 0.0 if system.bypass else system.heat_recovery
    return _exchange(leaking, supplied, system.heat_recovery, in_cooling, heat_capacity)


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


def _exchange(
    leakage: float, supplied: float, recovered_heating: float, recovered_cooling: float, heat_capacity: float
) -> AirExchange:
    return AirExchange(
        leakage,
        supplied,
        float(ventilation_coefficient(leakage, heat_capacity)),
        float(ventilation_coefficient(supplied, heat_capacity, recovered_heating)),
        float(ventilation_coefficient(supplied, heat_capacity, recovered_cooling)),
    )
