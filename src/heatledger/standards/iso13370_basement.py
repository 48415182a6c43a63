"""ISO 13370:2017, 7.4: steady transmittance of heated and unheated basements."""

from __future__ import annotations

from typing import NamedTuple

import numpy as np
from numpy.typing import ArrayLike, NDArray

from heatledger.standards._guards import not_negative, positive
from heatledger.standards.iso13370 import characteristic_dimension, slab_transmittance

__all__ = [
    "AIR_HEAT_CAPACITY",
    "BasementTransmittance",
    "heated_basement",
    "unheated_basement_transmittance",
]

AIR_HEAT_CAPACITY = 0.33
"""Heat capacity of air per volume. [Wh/(m³·K)] ISO 13370:2017, 7.5."""


class BasementTransmittance(NamedTuple):
    """Transmittances of a heated basement. [W/(m²·K)]"""

    floor: NDArray[np.float64]
    """U_bf."""
    wall: NDArray[np.float64]
    """U_bw, on the walls in the ground."""
    effective: NDArray[np.float64]
    """U′ of floor and walls together, on A + z·P."""


def heated_basement(
    area: ArrayLike,
    perimeter: ArrayLike,
    depth: ArrayLike,
    conductivity: ArrayLike,
    *,
    floor_thickness: ArrayLike,
    wall_thickness: ArrayLike,
) -> BasementTransmittance:
    """Transmittances of floor and walls of a heated basement.

    Parameters
    ----------
    area, perimeter : array_like
        Area A of the floor [m²], and exposed perimeter P [m].
    depth : array_like
        Depth z of the floor below the ground outside. [m]
    conductivity : array_like
        λ of the ground. [W/(m·K)]
    floor_thickness : array_like
        Equivalent thickness d_t of the floor. [m]
    wall_thickness : array_like
        Equivalent thickness d_w of the walls in the ground, λ·(R_si + R_w + R_se). [m]

    Returns
    -------
    BasementTransmittance
        Floor, wall, and effective. [W/(m²·K)]

    Raises
    ------
    ValueError
        If a number is not positive.

    References
    ----------
    ISO 13370:2017, 7.4.2 to 7.4.4. Where d_w < d_t the wall counts with d_w in the place of d_t. The branches of
    the floor meet as those of :func:`slab_transmittance`; the two of the wall meet exactly.

    Examples
    --------
    >>> cellar = heated_basement(100.0, 40.0, 2.5, 2.0, floor_thickness=1.72, wall_thickness=2.34)
    >>> round(float(cellar.floor), 4), round(float(cellar.wall), 4), round(float(cellar.effective), 4)
    (0.3938, 0.4456, 0.4197)
    """
    span = characteristic_dimension(area, perimeter)
    below, ground = positive("the depth", depth), positive("the ground's conductivity", conductivity)
    slab, wall = positive("the equivalent thickness", floor_thickness), positive("the wall's thickness", wall_thickness)
    floor = slab_transmittance(span, slab + below / 2, ground)
    lesser = np.minimum(slab, wall)
    walls = 2 * ground / (np.pi * below) * (1 + 0.5 * lesser / (lesser + below)) * np.log1p(below / wall)
    faces = np.asarray(area, dtype=float), below * np.asarray(perimeter, dtype=float)
    effective = (faces[0] * floor + faces[1] * walls) / (faces[0] + faces[1])
    return BasementTransmittance(floor, np.asarray(walls), np.asarray(effective))


def unheated_basement_transmittance(
    area: ArrayLike,
    perimeter: ArrayLike,
    depth: ArrayLike,
    basement: BasementTransmittance,
    *,
    floor_transmittance: ArrayLike,
    height: ArrayLike,
    wall_transmittance: ArrayLike,
    air_volume: ArrayLike,
    air_changes: ArrayLike = 0.3,
) -> NDArray[np.float64]:
    """Transmittance of the floor above an unheated basement.

    Parameters
    ----------
    area, perimeter : array_like
        Area A of the floor [m²], and exposed perimeter P [m].
    depth : array_like
        Depth z of the basement's floor below the ground outside. [m]
    basement : BasementTransmittance
        Its floor and walls in the ground, see :func:`heated_basement`. [W/(m²·K)]
    floor_transmittance : array_like
        U_f of the floor above, R_si 0.17 on both faces. [W/(m²·K)]
    height : array_like
        Height h of the floor above the ground outside. [m]
    wall_transmittance : array_like
        U_w of the basement's walls above ground. [W/(m²·K)]
    air_volume : array_like
        Air volume V of the basement. [m³]
    air_changes : array_like
        n of the basement. [1/h]

    Returns
    -------
    ndarray
        U. [W/(m²·K)]

    Raises
    ------
    ValueError
        If A, P, z or U_f is not positive or another number negative.

    References
    ----------
    ISO 13370:2017, 7.4.5: 1/U = 1/U_f + A/(A·U_bf + z·P·U_bw + h·P·U_w + 0.33·n·V); n = 0.3 if unknown.
    """
    face, edge = positive("the area", area), positive("the exposed perimeter", perimeter)
    ground = face * basement.floor + positive("the depth", depth) * edge * basement.wall
    walls = not_negative("the height", height) * edge * not_negative("the wall's transmittance", wall_transmittance)
    air = AIR_HEAT_CAPACITY * not_negative("the air changes", air_changes) * not_negative("the air volume", air_volume)
    below = (ground + walls + air) / face
    return np.asarray(1 / (1 / positive("the floor's transmittance", floor_transmittance) + 1 / below))
