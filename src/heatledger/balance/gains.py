"""Sun and people: monthly gains of every zone and of every opening."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from heatledger.balance.constructions import Constructions
from heatledger.balance.months import HOURS
from heatledger.building.model import Building, Element, Opening
from heatledger.climate.model import Climate
from heatledger.results import Months, OpeningGains
from heatledger.standards.iso13790 import ANGLE_FACTOR, glazed_gain_area, opaque_gain_area, sky_loss

__all__ = ["Gains", "monthly_gains"]


@dataclass(frozen=True)
class Gains:
    """Monthly gains of the zones. [kWh]"""

    solar: NDArray[np.float64]
    """Less sky losses, shape (zones, 12)."""
    internal: NDArray[np.float64]
    """Shape (zones, 12)."""
    openings: tuple[OpeningGains, ...]

    @property
    def total(self) -> NDArray[np.float64]:
        """Solar and internal. [kWh]"""
        return self.solar + self.internal

    @property
    def power(self) -> NDArray[np.float64]:
        """Mean of each month. [W]"""
        return self.total * 1000 / HOURS


def monthly_gains(building: Building, constructions: Constructions, climate: Climate) -> Gains:
    """Gains of all zones; every distinct plane is calculated once.

    Parameters
    ----------
    building : Building
        The building.
    constructions : Constructions
        U-values.
    climate : Climate
        Gives the irradiation of a plane.

    Returns
    -------
    Gains
    """
    index = {zone.name: number for number, zone in enumerate(building.zones)}
    outdoor = [element for element in building.elements if element.faces_outdoors]
    irradiation = _irradiation(outdoor, building.project.ground_reflectance, climate)
    solar = np.zeros((len(building.zones), 12))
    openings: list[OpeningGains] = []
    for element, sun in zip(outdoor, irradiation, strict=True):
        zone = index[element.zone]
        u_value = constructions.u_values[element.name]
        solar[zone] += float(opaque_gain_area(element.net_area, u_value, element.absorptance)) * sun
        solar[zone] -= float(sky_loss(element.net_area, u_value, element.tilt)) * HOURS / 1000
        for opening in element.openings:
            found = _opening_gains(element, opening, sun)
            openings.append(found)
            solar[zone] += found.gains
            solar[zone] -= float(sky_loss(opening.area, found.u_value, element.tilt)) * HOURS / 1000
    return Gains(solar, _internal(building), tuple(openings))


def _irradiation(elements: list[Element], ground_reflectance: float, climate: Climate) -> list[Months]:
    """Irradiation of each element's plane; a level plane has no direction. [kWh/m²]"""
    planes = [(element.tilt, element.azimuth or 0.0) for element in elements]
    distinct = sorted(set(planes))
    if not distinct:
        return []
    tilts, azimuths = np.array(distinct).T
    table = climate.irradiation(tilts, azimuths, ground_reflectance)
    by_plane = dict(zip(distinct, table, strict=True))
    return [by_plane[plane] for plane in planes]


def _opening_gains(element: Element, opening: Opening, sun: Months) -> OpeningGains:
    unit = opening.glazed_unit
    collecting = float(glazed_gain_area(opening.area, unit.g_value, unit.frame_share))
    return OpeningGains(
        opening.name,
        element.zone,
        element.azimuth,
        element.tilt,
        opening.area,
        unit.u_value,
        ANGLE_FACTOR * unit.g_value,
        sun,
        collecting * sun,
    )


def _internal(building: Building) -> NDArray[np.float64]:
    power = [zone.floor_area * zone.usage.internal_gains if zone.usage else 0.0 for zone in building.zones]
    return np.array(power)[:, None] * HOURS / 1000
