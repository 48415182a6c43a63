"""ISO 6946:2017: direction of heat flow, surface resistances and plain layers.

Air layers and voids stand in :mod:`heatledger.standards.iso6946_air`, bridged layers in
:mod:`heatledger.standards.iso6946_bridged`, corrections and tapered layers in
:mod:`heatledger.standards.iso6946_corrections`. Clauses are those of the 2017 edition, recalled from memory; the
formulas are unchanged since 2007, annexes A to D of which are its C to F.
"""

from __future__ import annotations

from typing import Literal, NamedTuple

import numpy as np
from numpy.typing import ArrayLike, NDArray

from heatledger.standards._guards import not_negative, positive

__all__ = [
    "SURFACE_EMISSIVITY",
    "Direction",
    "Facing",
    "SurfaceResistances",
    "black_body_coefficient",
    "direction_of_heat_flow",
    "layer_resistance",
    "surface_resistance",
    "surface_resistances",
    "wind_coefficient",
]

Direction = Literal["up", "horizontal", "down"]
"""Direction of the heat that leaves the zone."""

Facing = Literal["outdoors", "zone", "ventilated cavity"]
"""What the outer face looks at: open air, another zone, or a well ventilated cavity behind a cladding."""

INSIDE_RESISTANCE: dict[Direction, float] = {"up": 0.10, "horizontal": 0.13, "down": 0.17}
"""Inside surface resistance R_si. [m²·K/W] ISO 6946:2017, table 7."""

OUTSIDE_RESISTANCE = 0.04
"""Surface resistance R_se towards open air. [m²·K/W] ISO 6946:2017, table 7."""

SURFACE_EMISSIVITY = 0.9
"""Emissivity of ordinary building surfaces. [-] ISO 6946:2017, annex C."""

STEFAN_BOLTZMANN = 5.67e-8
"""[W/(m²·K⁴)] ISO 6946:2017, annex C."""


class SurfaceResistances(NamedTuple):
    """Resistances of the two surfaces of an element [m²·K/W]."""

    inside: float
    outside: float


def direction_of_heat_flow(tilt: float) -> Direction:
    """Direction of the heat that leaves a zone through an element.

    Parameters
    ----------
    tilt : float
        Angle between the outward normal and straight up: 0 a roof, 90 a wall, 180 a floor. [°]

    Returns
    -------
    str
        "up", "horizontal" (within 30° of level) or "down".

    Raises
    ------
    ValueError
        If the tilt lies outside 0 to 180.

    References
    ----------
    ISO 6946:2017, 6.8 (note to table 7). The standard uses the heating case; where a flow may turn round it
    recommends the horizontal values, which is left to the caller.

    Examples
    --------
    >>> direction_of_heat_flow(35), direction_of_heat_flow(60), direction_of_heat_flow(180)
    ('up', 'horizontal', 'down')
    """
    if not 0 <= tilt <= 180:
        raise ValueError("the tilt must lie between 0 and 180")
    if tilt < 60:
        return "up"
    return "horizontal" if tilt <= 120 else "down"


def surface_resistances(direction: Direction, facing: Facing = "outdoors") -> SurfaceResistances:
    """Conventional surface resistances of an element.

    Parameters
    ----------
    direction : {"up", "horizontal", "down"}
        Direction of heat flow.
    facing : {"outdoors", "zone", "ventilated cavity"}
        What the outer face looks at.

    Returns
    -------
    SurfaceResistances
        Inside and outside. [m²·K/W]

    Raises
    ------
    ValueError
        If a word is unknown.

    References
    ----------
    ISO 6946:2017, table 7; outer face towards a zone: 6.8; outer face in a well ventilated cavity: 6.9.4.
    """
    if direction not in INSIDE_RESISTANCE:
        raise ValueError(f"unknown direction of heat flow: {direction!r}")
    if facing not in ("outdoors", "zone", "ventilated cavity"):
        raise ValueError(f"unknown facing: {facing!r}")
    inside = INSIDE_RESISTANCE[direction]
    return SurfaceResistances(inside, OUTSIDE_RESISTANCE if facing == "outdoors" else inside)


def black_body_coefficient(temperature: ArrayLike) -> NDArray[np.float64]:
    """Radiative coefficient of a black body, h_r0 = 4σT³.

    Parameters
    ----------
    temperature : array_like
        Mean temperature of the surface and its surroundings. [°C]

    Returns
    -------
    ndarray
        h_r0. [W/(m²·K)]

    Raises
    ------
    ValueError
        If a temperature is below absolute zero.

    References
    ----------
    ISO 6946:2017, annex C.
    """
    kelvin = positive("the absolute temperature", np.asarray(temperature, dtype=float) + 273.15)
    return 4 * STEFAN_BOLTZMANN * kelvin**3


def wind_coefficient(speed: ArrayLike) -> NDArray[np.float64]:
    """Convective coefficient of an outer surface, h_ce = 4 + 4v.

    Parameters
    ----------
    speed : array_like
        Wind speed beside the surface. [m/s]

    Returns
    -------
    ndarray
        h_ce. [W/(m²·K)]

    Raises
    ------
    ValueError
        If a speed is negative.

    References
    ----------
    ISO 6946:2017, annex C.
    """
    return 4 + 4 * not_negative("the wind speed", speed)


def surface_resistance(convective: ArrayLike, radiative: ArrayLike) -> NDArray[np.float64]:
    """Surface resistance from its two coefficients, 1/(h_c + h_r).

    Parameters
    ----------
    convective, radiative : array_like
        Convective coefficient h_c, and radiative coefficient h_r = ε·h_r0. [W/(m²·K)]

    Returns
    -------
    ndarray
        Surface resistance. [m²·K/W]

    Raises
    ------
    ValueError
        If a coefficient is not positive.

    References
    ----------
    ISO 6946:2017, annex C.
    """
    return 1 / (positive("the convective coefficient", convective) + positive("the radiative coefficient", radiative))


def layer_resistance(thickness: ArrayLike, conductivity: ArrayLike) -> NDArray[np.float64]:
    """Thermal resistance of a homogeneous layer, d/λ.

    Parameters
    ----------
    thickness : array_like
        Thickness d. [m]
    conductivity : array_like
        Design thermal conductivity λ. [W/(m·K)]

    Returns
    -------
    ndarray
        Resistance R. [m²·K/W]

    Raises
    ------
    ValueError
        If a thickness is negative or a conductivity is not positive.

    References
    ----------
    ISO 6946:2017, 6.7.1.1.
    """
    return not_negative("the thickness", thickness) / positive("the conductivity", conductivity)
