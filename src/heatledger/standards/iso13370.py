"""ISO 13370:2017: steady transmittance of slabs on ground and suspended floors.

Basements stand in :mod:`heatledger.standards.iso13370_basement`, the swing over the year in
:mod:`heatledger.standards.iso13370_monthly`. Formulas recalled from memory; the 2017 edition keeps those of 2007
under other symbols.
"""

from __future__ import annotations

from typing import NamedTuple

import numpy as np
from numpy.typing import ArrayLike, NDArray

from heatledger.standards._guards import not_negative, positive

__all__ = [
    "SOILS",
    "WIND_SHIELDING",
    "Soil",
    "additional_thickness",
    "characteristic_dimension",
    "edge_transmittance",
    "equivalent_thickness",
    "periodic_depth",
    "slab_transmittance",
    "suspended_floor_transmittance",
    "transmittance_with_edge",
    "underfloor_transmittance",
]

INSIDE_RESISTANCE_FLOOR = 0.17
"""R_si, heat flowing down. [m²·K/W] ISO 6946:2017, table 7."""

OUTSIDE_RESISTANCE = 0.04
"""R_se. [m²·K/W] ISO 6946:2017, table 7."""

STACK_COEFFICIENT = 1450.0
"""Factor of the ventilation of a space under a floor. [J/(m³·K)] ISO 13370:2017, 7.3."""

SECONDS_PER_YEAR = 3.15e7
"""As rounded in the standard. [s] ISO 13370:2017, annex on periodic transfer."""


class Soil(NamedTuple):
    """Thermal properties of the ground."""

    conductivity: float
    """λ. [W/(m·K)]"""
    heat_capacity: float
    """Per volume, ρc. [J/(m³·K)]"""


SOILS: dict[str, Soil] = {
    "clay or silt": Soil(1.5, 3.0e6),
    "sand or gravel": Soil(2.0, 2.0e6),
    "rock": Soil(3.5, 2.0e6),
}
"""ISO 13370:2017, 5.1, table 7 (2007: table 1); recalled from memory."""

WIND_SHIELDING: dict[str, float] = {"sheltered": 0.02, "normal": 0.05, "open": 0.10}
"""Wind shielding factor f_w of a space under a floor: city centre, suburban, rural. [-] ISO 13370:2017, 7.3."""


def characteristic_dimension(area: ArrayLike, perimeter: ArrayLike) -> NDArray[np.float64]:
    """Characteristic dimension of a floor, B′ = A/(½P).

    Parameters
    ----------
    area : array_like
        Area of the floor A. [m²]
    perimeter : array_like
        Exposed perimeter P. [m]

    Returns
    -------
    ndarray
        B′. [m]

    Raises
    ------
    ValueError
        If one is not positive: a floor without exposed perimeter loses no heat through the ground.

    References
    ----------
    ISO 13370:2017, 6.1.
    """
    return positive("the area", area) / (0.5 * positive("the exposed perimeter", perimeter))


def equivalent_thickness(
    wall_thickness: ArrayLike,
    conductivity: ArrayLike,
    resistance: ArrayLike,
    inside_resistance: ArrayLike = INSIDE_RESISTANCE_FLOOR,
    outside_resistance: ArrayLike = OUTSIDE_RESISTANCE,
) -> NDArray[np.float64]:
    """Thickness of ground that resists as the floor does, w + λ·(R_si + R + R_se).

    Parameters
    ----------
    wall_thickness : array_like
        Full thickness w of the walls around; 0 for the walls of a basement (d_w). [m]
    conductivity : array_like
        λ of the ground. [W/(m·K)]
    resistance : array_like
        R of the floor (d_t), of a space's floor (d_g) or of a basement wall (d_w), without surfaces; dense slabs
        and thin coverings may be left out. [m²·K/W]
    inside_resistance, outside_resistance : array_like, optional
        Surface resistances. [m²·K/W]

    Returns
    -------
    ndarray
        d_t, d_g or d_w. [m]

    Raises
    ------
    ValueError
        If a number is negative or λ is not positive.

    References
    ----------
    ISO 13370:2017, 6.2, 7.3 and 7.4.
    """
    surfaces = not_negative("a surface resistance", inside_resistance) + not_negative(
        "a surface resistance", outside_resistance
    )
    total = surfaces + not_negative("the resistance", resistance)
    return (
        not_negative("the wall thickness", wall_thickness) + positive("the ground's conductivity", conductivity) * total
    )


def slab_transmittance(dimension: ArrayLike, thickness: ArrayLike, conductivity: ArrayLike) -> NDArray[np.float64]:
    """Transmittance of a slab on ground without edge insulation, U_0.

    Parameters
    ----------
    dimension : array_like
        Characteristic dimension B′. [m]
    thickness : array_like
        Equivalent thickness d_t (for a basement floor d_t + z/2). [m]
    conductivity : array_like
        λ of the ground. [W/(m·K)]

    Returns
    -------
    ndarray
        U_0. [W/(m²·K)]

    Raises
    ------
    ValueError
        If a number is not positive.

    References
    ----------
    ISO 13370:2017, 7.2: 2λ/(πB′ + d_t)·ln(πB′/d_t + 1) where d_t < B′, else λ/(0.457·B′ + d_t). The printed
    branches do not quite meet: at d_t = B′ the second is 0.014 % above the first.

    Examples
    --------
    >>> slab_transmittance(5.0, [0.72, 5.72], 2.0).round(4).tolist()
    [0.7615, 0.2498]
    """
    span, depth = positive("the characteristic dimension", dimension), positive("the equivalent thickness", thickness)
    ground = positive("the ground's conductivity", conductivity)
    poor = 2 * ground / (np.pi * span + depth) * np.log(np.pi * span / depth + 1)
    return np.where(depth < span, poor, ground / (0.457 * span + depth))


def additional_thickness(
    resistance: ArrayLike, insulation_thickness: ArrayLike, conductivity: ArrayLike
) -> NDArray[np.float64]:
    """Thickness of ground that edge insulation adds, d′ = λ·(R_n − d_n/λ).

    Parameters
    ----------
    resistance : array_like
        Resistance R_n of the edge insulation. [m²·K/W]
    insulation_thickness : array_like
        Its thickness d_n. [m]
    conductivity : array_like
        λ of the ground. [W/(m·K)]

    Returns
    -------
    ndarray
        d′. [m]

    Raises
    ------
    ValueError
        If a number is negative, or the insulation resists less than the ground that it replaces.

    References
    ----------
    ISO 13370:2017, annex on edge insulation (2007: annex B).
    """
    ground = positive("the ground's conductivity", conductivity)
    gained = not_negative("the resistance", resistance) * ground - not_negative("the thickness", insulation_thickness)
    if np.any(gained < 0):
        raise ValueError("the edge insulation must resist more than the ground that it replaces")
    return gained


def edge_transmittance(
    depth: ArrayLike, thickness: ArrayLike, additional: ArrayLike, conductivity: ArrayLike, *, vertical: bool
) -> NDArray[np.float64]:
    """Linear transmittance of edge insulation, ψ_g,e: negative, since it saves heat.

    Parameters
    ----------
    depth : array_like
        Width D of horizontal, or depth D below ground of vertical edge insulation. [m]
    thickness : array_like
        Equivalent thickness d_t of the slab. [m]
    additional : array_like
        Additional equivalent thickness d′. [m]
    conductivity : array_like
        λ of the ground. [W/(m·K)]
    vertical : bool
        Whether it stands upright along the edge or lies under the floor along it.

    Returns
    -------
    ndarray
        ψ_g,e. [W/(m·K)]

    Raises
    ------
    ValueError
        If a number is negative, or d_t or λ not positive.

    References
    ----------
    ISO 13370:2017, annex on edge insulation (2007: annex B). With both kinds the one that saves more counts.

    Examples
    --------
    >>> round(float(edge_transmittance(1.0, 0.72, 2.95, 2.0, vertical=False)), 3)
    -0.401
    """
    reach = (2 if vertical else 1) * not_negative("the depth of the edge insulation", depth)
    slab = positive("the equivalent thickness", thickness)
    more = not_negative("the additional thickness", additional)
    saved = np.log1p(reach / slab) - np.log1p(reach / (slab + more))
    return np.asarray(-positive("the ground's conductivity", conductivity) / np.pi * saved)


def transmittance_with_edge(transmittance: ArrayLike, edge: ArrayLike, dimension: ArrayLike) -> NDArray[np.float64]:
    """Transmittance of a slab with edge insulation, U = U_0 + 2ψ/B′.

    Parameters
    ----------
    transmittance : array_like
        U_0 without it. [W/(m²·K)]
    edge : array_like
        ψ_g,e. [W/(m·K)]
    dimension : array_like
        Characteristic dimension B′. [m]

    Returns
    -------
    ndarray
        U. [W/(m²·K)]

    Raises
    ------
    ValueError
        If U_0 is negative or B′ not positive.

    References
    ----------
    ISO 13370:2017, annex on edge insulation (2007: 9.1 and annex B).
    """
    slab = not_negative("the transmittance", transmittance)
    return np.asarray(slab + 2 * np.asarray(edge, dtype=float) / positive("the characteristic dimension", dimension))


def underfloor_transmittance(
    dimension: ArrayLike,
    *,
    height: ArrayLike,
    wall_transmittance: ArrayLike,
    openings: ArrayLike,
    wind_speed: ArrayLike,
    shielding: ArrayLike,
) -> NDArray[np.float64]:
    """Transmittance from the space under a suspended floor to the open air, U_x, on the floor's area.

    Parameters
    ----------
    dimension : array_like
        Characteristic dimension B′. [m]
    height : array_like
        Height h of the floor's upper face above the ground outside. [m]
    wall_transmittance : array_like
        U_w of the walls of the space above ground. [W/(m²·K)]
    openings : array_like
        Ventilation openings ε per length of perimeter. [m²/m]
    wind_speed : array_like
        Mean wind speed v at 10 m. [m/s]
    shielding : array_like
        f_w of :data:`WIND_SHIELDING`. [-]

    Returns
    -------
    ndarray
        U_x. [W/(m²·K)]

    Raises
    ------
    ValueError
        If a number is negative or B′ not positive.

    References
    ----------
    ISO 13370:2017, 7.3: 2h·U_w/B′ + 1450·ε·v·f_w/B′; ventilated by wind.
    """
    span = positive("the characteristic dimension", dimension)
    walls = 2 * not_negative("the height", height) * not_negative("the wall's transmittance", wall_transmittance)
    gaps = not_negative("the openings", openings) * not_negative("the wind speed", wind_speed)
    return (walls + STACK_COEFFICIENT * gaps * not_negative("the shielding factor", shielding)) / span


def suspended_floor_transmittance(
    floor_transmittance: ArrayLike, ground_transmittance: ArrayLike, underfloor: ArrayLike
) -> NDArray[np.float64]:
    """Transmittance of a suspended floor, 1/U = 1/U_f + 1/(U_g + U_x).

    Parameters
    ----------
    floor_transmittance : array_like
        U_f of the floor between room and space, R_si 0.17 on both faces. [W/(m²·K)]
    ground_transmittance : array_like
        U_g from the space into the ground: :func:`slab_transmittance` with d_g. [W/(m²·K)]
    underfloor : array_like
        U_x of :func:`underfloor_transmittance`. [W/(m²·K)]

    Returns
    -------
    ndarray
        U. [W/(m²·K)]

    Raises
    ------
    ValueError
        If U_f or U_g is not positive or U_x negative.

    References
    ----------
    ISO 13370:2017, 7.3; floor of the space no more than 0.5 m below the ground outside.
    """
    floor = positive("the floor's transmittance", floor_transmittance)
    below = positive("the ground's transmittance", ground_transmittance) + not_negative("U_x", underfloor)
    return 1 / (1 / floor + 1 / below)


def periodic_depth(soil: Soil) -> float:
    """Depth of penetration of the yearly swing, δ = √(3.15e7·λ/(π·ρc)).

    Parameters
    ----------
    soil : Soil
        Ground.

    Returns
    -------
    float
        δ. [m]

    Raises
    ------
    ValueError
        If a property is not positive.

    References
    ----------
    ISO 13370:2017, annex on periodic transfer (2007: annex A).

    Examples
    --------
    >>> [round(periodic_depth(soil), 1) for soil in SOILS.values()]
    [2.2, 3.2, 4.2]
    """
    conductivity, capacity = positive("a property of the ground", soil)
    return float(np.sqrt(SECONDS_PER_YEAR * conductivity / (np.pi * capacity)))
