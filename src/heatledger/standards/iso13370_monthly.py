"""ISO 13370:2017, annex on periodic transfer: heat flow through the ground month by month.

Every coefficient is for the whole floor. Formulas recalled from memory (2007: annex A).
"""

from __future__ import annotations

from typing import Literal, NamedTuple

import numpy as np
from numpy.typing import ArrayLike, NDArray

from heatledger.standards._guards import not_negative, positive
from heatledger.standards.iso13370_basement import AIR_HEAT_CAPACITY

__all__ = [
    "PHASES",
    "FloorKind",
    "PeriodicCoefficients",
    "coldest_month",
    "equivalent_temperature",
    "heated_basement_periodic",
    "monthly_heat_flow",
    "slab_periodic",
    "suspended_floor_periodic",
    "temperature_amplitude",
    "unheated_basement_periodic",
]

FloorKind = Literal[
    "slab",
    "slab with horizontal edge insulation",
    "slab with vertical edge insulation",
    "suspended floor",
    "heated basement",
    "unheated basement",
]
"""Kind of floor that the phases depend on."""

PHASES: dict[FloorKind, tuple[float, float]] = {
    "slab": (0.0, 1.0),
    "slab with horizontal edge insulation": (0.0, 1.0),
    "slab with vertical edge insulation": (0.0, 2.0),
    "suspended floor": (0.0, 0.0),
    "heated basement": (0.0, 1.0),
    "unheated basement": (0.0, 1.0),
}
"""Lead α on the swing inside and lag β on the swing outside. [months] ISO 13370:2007, annex A; recalled."""

EDGE_FACTOR = 0.37
"""Factor of the swing at the edge of a floor. [-] ISO 13370:2007, annex A."""


class PeriodicCoefficients(NamedTuple):
    """Heat flow that a swing causes, per amplitude. [W/K]"""

    inside: NDArray[np.float64]
    """H_pi, of the temperature inside."""
    outside: NDArray[np.float64]
    """H_pe, of the temperature outside."""


def slab_periodic(
    area: ArrayLike,
    perimeter: ArrayLike,
    thickness: ArrayLike,
    conductivity: ArrayLike,
    periodic_depth: ArrayLike,
    *,
    edge_depth: ArrayLike = 0.0,
    additional: ArrayLike = 0.0,
    vertical: bool = False,
) -> PeriodicCoefficients:
    """Periodic coefficients of a slab on ground, with or without edge insulation.

    Parameters
    ----------
    area, perimeter : array_like
        Area A [m²], and exposed perimeter P [m].
    thickness : array_like
        Equivalent thickness d_t. [m]
    conductivity : array_like
        λ of the ground. [W/(m·K)]
    periodic_depth : array_like
        δ of the ground. [m]
    edge_depth, additional : array_like, optional
        Width or depth D of edge insulation, and its additional thickness d′; 0 for none. [m]
    vertical : bool
        Whether the edge insulation stands upright.

    Returns
    -------
    PeriodicCoefficients
        H_pi and H_pe. [W/K]

    Raises
    ------
    ValueError
        If a number is negative, or one that divides is 0.

    References
    ----------
    ISO 13370:2007, A.3.2 to A.3.4; edge insulation changes H_pe alone.

    Examples
    --------
    >>> bare = slab_periodic(100.0, 40.0, 0.72, 2.0, 3.1665)
    >>> round(float(bare.inside), 1), round(float(bare.outside), 1)
    (71.6, 49.9)
    """
    delta, slab = positive("the periodic depth", periodic_depth), positive("the equivalent thickness", thickness)
    more = not_negative("the additional thickness", additional)
    reach = (2 if vertical else 1) * not_negative("the depth of the edge insulation", edge_depth)
    beyond = np.exp(-reach / delta)
    swing = (1 - beyond) * np.log1p(delta / (slab + more)) + beyond * np.log1p(delta / slab)
    edge = EDGE_FACTOR * positive("the exposed perimeter", perimeter) * positive("λ", conductivity)
    return PeriodicCoefficients(_plane(area, slab, conductivity, delta), np.asarray(edge * swing))


def suspended_floor_periodic(
    area: ArrayLike,
    perimeter: ArrayLike,
    conductivity: ArrayLike,
    periodic_depth: ArrayLike,
    *,
    floor_transmittance: ArrayLike,
    ground_thickness: ArrayLike,
    underfloor: ArrayLike,
) -> PeriodicCoefficients:
    """Periodic coefficients of a suspended floor.

    Parameters
    ----------
    area, perimeter : array_like
        Area A [m²], and exposed perimeter P [m].
    conductivity : array_like
        λ of the ground. [W/(m·K)]
    periodic_depth : array_like
        δ of the ground. [m]
    floor_transmittance : array_like
        U_f of the floor. [W/(m²·K)]
    ground_thickness : array_like
        Equivalent thickness d_g of the space's floor. [m]
    underfloor : array_like
        U_x from the space to the open air. [W/(m²·K)]

    Returns
    -------
    PeriodicCoefficients
        H_pi and H_pe. [W/K]

    Raises
    ------
    ValueError
        If a number is negative, or one that divides is 0.

    References
    ----------
    ISO 13370:2007, A.3.5.
    """
    face, edge = positive("the area", area), positive("the exposed perimeter", perimeter)
    ground, delta = positive("λ", conductivity), positive("the periodic depth", periodic_depth)
    floor, open_air = positive("U_f", floor_transmittance), not_negative("U_x", underfloor)
    below = ground / delta + open_air
    swing = EDGE_FACTOR * edge * ground * np.log1p(delta / positive("the equivalent thickness", ground_thickness))
    outside = floor * (swing + open_air * face) / (below + floor)
    return PeriodicCoefficients(np.asarray(face / (1 / floor + 1 / below)), np.asarray(outside))


def heated_basement_periodic(
    area: ArrayLike,
    perimeter: ArrayLike,
    depth: ArrayLike,
    conductivity: ArrayLike,
    periodic_depth: ArrayLike,
    *,
    floor_thickness: ArrayLike,
    wall_thickness: ArrayLike,
) -> PeriodicCoefficients:
    """Periodic coefficients of floor and walls of a heated basement.

    Parameters
    ----------
    area, perimeter : array_like
        Area A [m²], and exposed perimeter P [m].
    depth : array_like
        Depth z of the floor below the ground outside. [m]
    conductivity : array_like
        λ of the ground. [W/(m·K)]
    periodic_depth : array_like
        δ of the ground. [m]
    floor_thickness, wall_thickness : array_like
        Equivalent thicknesses d_t of the floor and d_w of the walls. [m]

    Returns
    -------
    PeriodicCoefficients
        H_pi and H_pe. [W/K]

    Raises
    ------
    ValueError
        If a number is not positive.

    References
    ----------
    ISO 13370:2007, A.3.6.
    """
    delta, edge = positive("the periodic depth", periodic_depth), positive("the exposed perimeter", perimeter)
    below = positive("the depth", depth)
    slab, wall = positive("the equivalent thickness", floor_thickness), positive("the wall's thickness", wall_thickness)
    beyond = np.exp(-below / delta)
    swing = beyond * np.log1p(delta / slab) + 2 * (1 - beyond) * np.log1p(delta / wall)
    inside = _plane(area, slab, conductivity, delta) + _plane(below * edge, wall, conductivity, delta)
    return PeriodicCoefficients(inside, np.asarray(EDGE_FACTOR * edge * positive("λ", conductivity) * swing))


def unheated_basement_periodic(
    area: ArrayLike,
    perimeter: ArrayLike,
    depth: ArrayLike,
    conductivity: ArrayLike,
    periodic_depth: ArrayLike,
    *,
    floor_transmittance: ArrayLike,
    floor_thickness: ArrayLike,
    height: ArrayLike,
    wall_transmittance: ArrayLike,
    air_volume: ArrayLike,
    air_changes: ArrayLike = 0.3,
) -> PeriodicCoefficients:
    """Periodic coefficients of the floor above an unheated basement.

    Parameters
    ----------
    area, perimeter : array_like
        Area A [m²], and exposed perimeter P [m].
    depth : array_like
        Depth z of the basement's floor below the ground outside. [m]
    conductivity : array_like
        λ of the ground. [W/(m·K)]
    periodic_depth : array_like
        δ of the ground. [m]
    floor_transmittance : array_like
        U_f of the floor above. [W/(m²·K)]
    floor_thickness : array_like
        Equivalent thickness d_t of the basement's floor. [m]
    height : array_like
        Height h of the floor above the ground outside. [m]
    wall_transmittance : array_like
        U_w of the walls above ground. [W/(m²·K)]
    air_volume : array_like
        Air volume V of the basement. [m³]
    air_changes : array_like
        n of the basement. [1/h]

    Returns
    -------
    PeriodicCoefficients
        H_pi and H_pe. [W/K]

    Raises
    ------
    ValueError
        If a number is negative, or one that divides is 0.

    References
    ----------
    ISO 13370:2007, A.3.7.
    """
    face, edge = positive("the area", area), positive("the exposed perimeter", perimeter)
    below, ground = positive("the depth", depth), positive("λ", conductivity)
    delta = positive("the periodic depth", periodic_depth)
    floor = face * positive("U_f", floor_transmittance)
    walls = not_negative("the height", height) * edge * not_negative("U_w", wall_transmittance)
    air = AIR_HEAT_CAPACITY * not_negative("the air changes", air_changes) * not_negative("the air volume", air_volume)
    stored = (face + below * edge) * ground / delta + walls + air
    slab = positive("the equivalent thickness", floor_thickness)
    swing = EDGE_FACTOR * edge * ground * (2 - np.exp(-below / delta)) * np.log1p(delta / slab)
    inside, outside = 1 / (1 / floor + 1 / stored), floor * (swing + walls + air) / (stored + floor)
    return PeriodicCoefficients(np.asarray(inside), np.asarray(outside))


def coldest_month(latitude: float) -> int:
    """Month τ in which the open air is coldest: January north of the equator, July south of it.

    Parameters
    ----------
    latitude : float
        Latitude, north positive. [°]

    Returns
    -------
    int
        1 or 7.

    Raises
    ------
    ValueError
        If the latitude lies outside −90 to 90.

    References
    ----------
    ISO 13370:2007, A.2.
    """
    if not -90 <= latitude <= 90:
        raise ValueError("the latitude must lie between -90 and 90")
    return 1 if latitude >= 0 else 7


def temperature_amplitude(monthly: ArrayLike) -> NDArray[np.float64]:
    """Amplitude of a yearly swing: half the difference between the warmest and the coldest month.

    Parameters
    ----------
    monthly : array_like, shape (..., 12)
        Monthly mean temperatures. [°C]

    Returns
    -------
    ndarray, shape (...)
        θ̂. [K]

    Raises
    ------
    ValueError
        If the last axis has not 12 months.

    References
    ----------
    ISO 13370:2007, A.2.
    """
    temperatures = _months(monthly)
    return np.asarray((temperatures.max(axis=-1) - temperatures.min(axis=-1)) / 2)


def equivalent_temperature(
    steady_coefficient: ArrayLike,
    external_periodic_coefficient: ArrayLike,
    outdoor_temperature: ArrayLike,
    phase_lag: ArrayLike,
    coldest_month: int = 1,
) -> NDArray[np.float64]:
    """Temperature that the ground shows to a room held at a constant temperature.

    Parameters
    ----------
    steady_coefficient, external_periodic_coefficient : array_like, shape (...)
        H_g = A·U, and H_pe of the floor. [W/K]
    outdoor_temperature : array_like, shape (12,)
        Monthly means of the open air. [°C]
    phase_lag : array_like, shape (...)
        Lag β of the floor. [months]
    coldest_month : int
        Coldest month τ, see :func:`coldest_month`.

    Returns
    -------
    ndarray, shape (..., 12)
        θ_g with Φ = H_g·(θ_i − θ_g). [°C]

    Raises
    ------
    ValueError
        If H_g is not positive, H_pe negative, or months do not number 12.

    References
    ----------
    ISO 13370:2007, A.2: θ̄_e − (H_pe/H_g)·θ̂_e·cos(2π·(m − τ − β)/12). τ is the convention of the hemisphere and
    not the coldest month of the table, so that a single odd month does not shift the ground by a month.

    Examples
    --------
    >>> outdoors = 10 - 8 * np.cos(2 * np.pi * np.arange(12) / 12)
    >>> equivalent_temperature(80.0, 40.0, outdoors, 1.0).round(1).tolist()[:3]
    [6.5, 6.0, 6.5]
    """
    temperatures = _months(outdoor_temperature)
    ratio = not_negative("H_pe", external_periodic_coefficient) / positive("H_g", steady_coefficient)
    swing = ratio * temperature_amplitude(temperatures)
    lag = np.asarray(phase_lag, dtype=float)
    return np.asarray(temperatures.mean(axis=-1) - swing[..., None] * _cosine(coldest_month + lag))


def monthly_heat_flow(
    steady_coefficient: ArrayLike,
    periodic: PeriodicCoefficients,
    inside_temperature: ArrayLike,
    outdoor_temperature: ArrayLike,
    phases: tuple[float, float],
    coldest_month: int = 1,
) -> NDArray[np.float64]:
    """Heat flow through a floor, month by month, with swings inside and outside.

    Parameters
    ----------
    steady_coefficient : array_like, shape (...)
        H_g = A·U. [W/K]
    periodic : PeriodicCoefficients
        H_pi and H_pe, shape (...). [W/K]
    inside_temperature, outdoor_temperature : array_like, shape (12,)
        Monthly means inside, and of the open air. [°C]
    phases : tuple of float
        Lead α and lag β of :data:`PHASES`. [months]
    coldest_month : int
        Coldest month τ, see :func:`coldest_month`.

    Returns
    -------
    ndarray, shape (..., 12)
        Φ, positive from the room into the ground. [W]

    Raises
    ------
    ValueError
        If H_g is not positive or months do not number 12.

    References
    ----------
    ISO 13370:2007, A.2: H_g·(θ̄_i − θ̄_e) − H_pi·θ̂_i·cos(2π·(m − τ + α)/12) + H_pe·θ̂_e·cos(2π·(m − τ − β)/12).
    """
    inside, outside = _months(inside_temperature), _months(outdoor_temperature)
    lead, lag = phases
    steady = positive("H_g", steady_coefficient) * (inside.mean() - outside.mean())
    from_inside = np.asarray(periodic.inside * temperature_amplitude(inside))
    from_outside = np.asarray(periodic.outside * temperature_amplitude(outside))
    swing = from_outside[..., None] * _cosine(coldest_month + lag) - from_inside[..., None] * _cosine(
        coldest_month - lead
    )
    return np.asarray(np.asarray(steady)[..., None] + swing)


def _plane(
    area: ArrayLike, thickness: NDArray[np.float64], conductivity: ArrayLike, delta: NDArray[np.float64]
) -> NDArray[np.float64]:
    """Periodic coefficient of a plane in the ground, A·λ/d·√(2/((1 + δ/d)² + 1))."""
    damping = np.sqrt(2 / ((1 + delta / thickness) ** 2 + 1))
    return np.asarray(positive("the area", area) * positive("λ", conductivity) / thickness * damping)


def _months(temperatures: ArrayLike) -> NDArray[np.float64]:
    monthly = np.asarray(temperatures, dtype=float)
    if monthly.ndim == 0 or monthly.shape[-1] != 12:
        raise ValueError("the temperatures must be those of 12 months")
    return monthly


def _cosine(extreme: ArrayLike) -> NDArray[np.float64]:
    """Swing over the months, 1 in the month given; shape (..., 12)."""
    months = np.arange(1, 13)
    return np.asarray(np.cos(2 * np.pi * (months - np.asarray(extreme, dtype=float)[..., None]) / 12))
