"""Sun and people: monthly gains of every zone and of every opening."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from heatledger.balance.constructions import Constructions
from heatledger.balance.months import HOURS
from heatledger.balance.openings import OpeningProperties
from heatledger.balance.sunlight import SurfaceSun, device_reduction, movable_shading, sun_on_elements, sun_on_openings
from heatledger.balance.use import months_in_use
from heatledger.building.model import Building, Element, Opening
from heatledger.climate.model import Climate
from heatledger.results import OpeningGains
from heatledger.standards.iso13790 import ANGLE_FACTOR, glazed_gain_area, opaque_gain_area, sky_loss

__all__ = ["Gains", "monthly_gains"]


@dataclass(frozen=True)
class Gains:
    """Monthly gains of the zones. [kWh]"""

    solar: NDArray[np.float64]
    """In heating mode, less sky losses, shape (zones, 12)."""
    solar_cooling: NDArray[np.float64]
    """In cooling mode, where movable shading may differ, less sky losses, shape (zones, 12)."""
    internal: NDArray[np.float64]
    """Shape (zones, 12)."""
    openings: tuple[OpeningGains, ...]

    def total(self, mode: str) -> NDArray[np.float64]:
        """Solar and internal in a mode, ``heating`` or ``cooling``. [kWh]"""
        return np.asarray((self.solar if mode == "heating" else self.solar_cooling) + self.internal)

    def power(self, mode: str) -> NDArray[np.float64]:
        """Mean of each month in a mode. [W]"""
        return self.total(mode) * 1000 / HOURS


def monthly_gains(building: Building, constructions: Constructions, climate: Climate) -> Gains:
    """Gains of all zones; every distinct plane is calculated once.

    Parameters
    ----------
    building : Building
        The building.
    constructions : Constructions
        U-values.
    climate : Climate
        Gives the irradiation of a plane, and of a surface behind an obstruction.

    Returns
    -------
    Gains
    """
    index = {zone.name: number for number, zone in enumerate(building.zones)}
    outdoor = [element for element in building.elements if element.faces_outdoors]
    pairs = [(element, opening) for element in outdoor for opening in element.openings]
    solar = np.zeros((len(building.zones), 12))
    for element, sun in zip(outdoor, sun_on_elements(building, outdoor, climate), strict=True):
        u_value = constructions.u_values[element.name]
        collecting = float(opaque_gain_area(element.net_area, u_value, element.absorptance))
        solar[index[element.zone]] += collecting * sun.obstruction * sun.free
        solar[index[element.zone]] -= float(sky_loss(element.net_area, u_value, element.tilt)) * HOURS / 1000
    cooling = solar.copy()
    openings: list[OpeningGains] = []
    for (element, opening), sun in zip(pairs, sun_on_openings(building, pairs, climate), strict=True):
        found = _opening_gains(element, opening, constructions.openings[opening.name], sun)
        lost = float(sky_loss(opening.area, found.u_value, element.tilt)) * HOURS / 1000
        solar[index[element.zone]] += found.gains - lost
        cooling[index[element.zone]] += found.gains_cooling - lost
        openings.append(found)
    return Gains(solar, cooling, _internal(building), tuple(openings))


def _opening_gains(element: Element, opening: Opening, found: OpeningProperties, sun: SurfaceSun) -> OpeningGains:
    """Gains of one row of openings; sky losses are those of an open sky, so that no obstruction raises gains."""
    unit, device = opening.glazed_unit, opening.shading
    # The collecting area holds the standard factor of the angle; here the factor of each month takes its place.
    area = float(glazed_gain_area(opening.area, unit.g_value, found.frame_share)) / ANGLE_FACTOR
    entering = area * sun.angle * sun.obstruction * sun.free
    reduction = device_reduction(device, unit.g_value, found.u_value) if device else 1.0
    drawn = movable_shading(device, reduction, sun.bright)
    heating = drawn if device and device.in_heating else np.ones(12)
    cooling = drawn if device and device.in_cooling else np.ones(12)
    arriving = sun.obstruction * sun.free
    angle = float(np.average(sun.angle, weights=arriving)) if arriving.sum() > 0 else ANGLE_FACTOR
    return OpeningGains(
        name=opening.name,
        zone=element.zone,
        azimuth=element.azimuth,
        tilt=element.tilt,
        area=opening.area,
        u_value=found.u_value,
        g_value=angle * unit.g_value,
        angle_factor=angle,
        obstruction=opening.obstruction.name if opening.obstruction else "",
        shading_device=device.name if device else "",
        irradiation=sun.free,
        obstruction_factor=sun.obstruction,
        shading_factor_heating=heating,
        shading_factor_cooling=cooling,
        gains=heating * entering,
        gains_cooling=cooling * entering,
    )


def _internal(building: Building) -> NDArray[np.float64]:
    """Nobody is there and nothing runs in months out of use. [kWh]"""
    power = [zone.floor_area * zone.usage.internal_gains if zone.usage else 0.0 for zone in building.zones]
    in_use = np.array([months_in_use(zone) for zone in building.zones]).reshape(-1, 12)
    return np.asarray(np.array(power)[:, None] * in_use * HOURS / 1000)
