"""ISO 6946:2017, 6.9 and annex D: air layers and air voids."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike, NDArray

from heatledger.standards._guards import not_negative, positive
from heatledger.standards.iso6946 import SURFACE_EMISSIVITY, Direction

__all__ = [
    "GREATEST_AIR_LAYER",
    "WIDEST_VOID",
    "air_layer_resistance",
    "air_void_resistance",
    "slightly_ventilated_resistance",
    "void_radiation_factor",
]

RADIATIVE_COEFFICIENT_10 = 5.1
"""Radiative coefficient of a black body at 10 °C, h_r0, as printed. [W/(m²·K)] ISO 6946:2017, annex C.

The exact value is 5.15; the printed one is kept because the table of air layers was made with it."""

AIR_CONDUCTIVITY = 0.025
"""Still air at 10 °C. [W/(m·K)] ISO 6946:2017, annex D."""

GREATEST_AIR_LAYER = 0.3
"""Thickest air layer that the method covers. [m] ISO 6946:2017, 6.9.1; thicker ones need a zone of their own."""

WIDEST_VOID = 10.0
"""A void wider than this many times its depth is an air layer. [-] ISO 6946:2017, annex D.4."""

WIDEST_SMALL_DIFFERENCE = 5.0
"""Temperature difference across an air layer up to which convection does not depend on it. [K] Annex D.2."""

FEWEST_OPENINGS = 500.0
"""Openings of an unventilated air layer, at most. [mm² per m of length or per m² of face] 6.9.2."""

MOST_OPENINGS = 1500.0
"""Openings of a well ventilated air layer, at least. [mm² per m of length or per m² of face] 6.9.4."""


def air_layer_resistance(
    thickness: ArrayLike,
    direction: Direction,
    *,
    inner_emissivity: ArrayLike = SURFACE_EMISSIVITY,
    outer_emissivity: ArrayLike = SURFACE_EMISSIVITY,
    temperature_difference: float | None = None,
) -> NDArray[np.float64]:
    """Thermal resistance of an unventilated air layer.

    Parameters
    ----------
    thickness : array_like
        Thickness d in the direction of heat flow; 0 gives 0. [m]
    direction : {"up", "horizontal", "down"}
        Direction of heat flow.
    inner_emissivity, outer_emissivity : array_like, optional
        Emissivities of the two faces. [-]
    temperature_difference : float, optional
        Difference between the two faces; left out, it counts as 5 K or less. [K]

    Returns
    -------
    ndarray
        Resistance R_g. [m²·K/W]

    Raises
    ------
    ValueError
        If a thickness is negative or above 0.3 m, an emissivity lies outside (0, 1], the direction is unknown
        or the difference is negative.

    References
    ----------
    ISO 6946:2017, 6.9.2 and annex D.2. Valid for layers bounded by parallel faces, at least ten times as long
    and wide as thick, without exchange of air with the room.

    Examples
    --------
    >>> round(float(air_layer_resistance(0.05, "horizontal")), 3)
    0.184
    """
    depth = _air_thickness(thickness)
    convection = _convection(depth, direction, temperature_difference)
    radiation = _emittance(inner_emissivity, outer_emissivity) * RADIATIVE_COEFFICIENT_10
    return np.where(depth > 0, 1 / (convection + radiation), 0.0)


def void_radiation_factor(depth: ArrayLike, width: ArrayLike) -> NDArray[np.float64]:
    """Share of the radiation of an endless layer that crosses a narrow void, ½(1 + √(1 + d²/b²) − d/b).

    Parameters
    ----------
    depth, width : array_like
        Size d in the direction of heat flow and b across it. [m]

    Returns
    -------
    ndarray
        Factor between ½ (deep slot) and 1 (endless layer). [-]

    Raises
    ------
    ValueError
        If a size is not positive.

    References
    ----------
    ISO 6946:2017, annex D.4.
    """
    ratio = positive("the void depth", depth) / positive("the void width", width)
    # √(1+r²) − r written without the difference of two large numbers
    return 0.5 * (1 + 1 / (np.hypot(1, ratio) + ratio))


def air_void_resistance(
    depth: ArrayLike,
    width: ArrayLike,
    direction: Direction,
    *,
    inner_emissivity: ArrayLike = SURFACE_EMISSIVITY,
    outer_emissivity: ArrayLike = SURFACE_EMISSIVITY,
    temperature_difference: float | None = None,
) -> NDArray[np.float64]:
    """Thermal resistance of a small or divided airspace, such as the void of a block.

    Parameters
    ----------
    depth, width : array_like
        Size of the void in the direction of heat flow, and across it. [m]
    direction : {"up", "horizontal", "down"}
        Direction of heat flow.
    inner_emissivity, outer_emissivity : array_like, optional
        Emissivities of the inner and the outer face. [-]
    temperature_difference : float, optional
        Difference between those faces; left out, it counts as 5 K or less. [K]

    Returns
    -------
    ndarray
        Resistance R_g. [m²·K/W]

    Raises
    ------
    ValueError
        As :func:`air_layer_resistance`; also if a size is not positive or the void is wider than ten times
        its depth, where it is an air layer.

    References
    ----------
    ISO 6946:2017, annex D.4; a void that is not a rectangle counts as the rectangle of equal area and aspect
    ratio. Temperatures inside an element may be taken from it up to a depth of 50 mm.

    Examples
    --------
    >>> round(float(air_void_resistance(0.05, 0.05, "horizontal")), 4)
    0.2381
    """
    factor = void_radiation_factor(depth, width)
    depths = _air_thickness(depth)
    if np.any(np.asarray(width, dtype=float) > WIDEST_VOID * depths * (1 + 1e-9)):
        raise ValueError("a void wider than 10 times its depth is an air layer")
    convection = _convection(depths, direction, temperature_difference)
    radiation = _emittance(inner_emissivity, outer_emissivity) * RADIATIVE_COEFFICIENT_10
    return 1 / (convection + radiation * factor)


def slightly_ventilated_resistance(
    openings: ArrayLike, unventilated: ArrayLike, ventilated: ArrayLike
) -> NDArray[np.float64]:
    """Total resistance of an element with an air layer that is open to the outside.

    Parameters
    ----------
    openings : array_like
        Openings A_v of the layer: per metre of length if upright, per square metre of face if level. [mm²]
    unventilated, ventilated : array_like
        Total resistance of the element with the layer unventilated, and well ventilated (the layer and all
        outside it dropped, still air at the face beyond). [m²·K/W]

    Returns
    -------
    ndarray
        Total resistance: the first up to 500 mm², the second from 1500 mm², linear between. [m²·K/W]

    Raises
    ------
    ValueError
        If openings are negative or a resistance is not positive.

    References
    ----------
    ISO 6946:2017, 6.9.2 to 6.9.4.
    """
    span = MOST_OPENINGS - FEWEST_OPENINGS
    share = np.clip((not_negative("the area of openings", openings) - FEWEST_OPENINGS) / span, 0, 1)
    still = positive("the total resistance", unventilated)
    return still + share * (positive("the total resistance", ventilated) - still)


def _air_thickness(thickness: ArrayLike) -> NDArray[np.float64]:
    depth = not_negative("the thickness of an air layer", thickness)
    if np.any(depth > GREATEST_AIR_LAYER):
        raise ValueError("an air layer must not be thicker than 0.3 m")
    return depth


def _convection(depth: NDArray[np.float64], direction: Direction, difference: float | None) -> NDArray[np.float64]:
    """Conduction or convection across an air layer, h_a; a layer of no thickness gets that of a hair's breadth."""
    if direction not in ("up", "horizontal", "down"):
        raise ValueError(f"unknown direction of heat flow: {direction!r}")
    if difference is not None and not difference >= 0:
        raise ValueError("the temperature difference must not be negative")
    breadth = np.maximum(depth, 1e-6)
    if difference is None or difference <= WIDEST_SMALL_DIFFERENCE:
        moving: dict[Direction, ArrayLike] = {"up": 1.95, "horizontal": 1.25, "down": 0.12 * breadth**-0.44}
    else:
        third = difference ** (1 / 3)
        downward = 0.09 * breadth**-0.187 * difference**0.44
        moving = {"up": 1.14 * third, "horizontal": 0.73 * third, "down": downward}
    return np.maximum(moving[direction], AIR_CONDUCTIVITY / breadth)


def _emittance(inner: ArrayLike, outer: ArrayLike) -> NDArray[np.float64]:
    """Mutual emittance of two parallel faces, E = 1/(1/ε1 + 1/ε2 − 1)."""
    first, second = positive("an emissivity", inner), positive("an emissivity", outer)
    if np.any(first > 1) or np.any(second > 1):
        raise ValueError("an emissivity must not be above 1")
    return 1 / (1 / first + 1 / second - 1)
