"""What stands before an opening: the share of it that light of a direction reaches, and of sky and ground it sees.

Overhang and fins are taken to reach far past the opening on both sides, so that their shadows are rectangles and the
lit part of the opening is an exact product. A skyline is far away: all of the opening is above it or below it.
"""

from __future__ import annotations

from typing import NamedTuple

import numpy as np
from numpy.typing import ArrayLike, NDArray

from heatledger.climate.model import FloatArray

__all__ = [
    "SECTORS",
    "SURFACES_AT_ONCE",
    "Obstructions",
    "above_skyline",
    "lit_share",
    "no_obstructions",
    "plane_axes",
    "sector_of",
    "towards",
    "views",
]

SECTORS = ("N", "NE", "E", "SE", "S", "SW", "W", "NW")
"""Sectors of the skyline, each 45° wide with its direction in the middle."""

HALF_THE_DIRECTIONS = 1000
"""Directions on one half of the hemisphere before a plane, then mirrored: view factors past overhang and fins are met
within 0.001, above a skyline within 0.007."""
GOLDEN_RATIO = (np.sqrt(5.0) - 1.0) / 2.0
SURFACES_AT_ONCE = 16
"""Surfaces of one pass: their arrays stay near the processor."""


class Obstructions(NamedTuple):
    """What stands before each of n rectangular openings; fields of shape (n,) unless stated.

    Attributes
    ----------
    width, height : ndarray
        Of the opening. [m]
    skyline : ndarray, shape (n, 8)
        Height of the skyline above the horizontal in each of :data:`SECTORS`. [°]
    overhang_depth, overhang_distance : ndarray
        Out from the face of the wall; above the upper edge of the opening. [m]
    left_fin_depth, left_fin_distance, right_fin_depth, right_fin_distance : ndarray
        Out from the face of the wall; beside the edge of the opening, left and right as seen from outside. [m]
    reveal_depth : ndarray
        Of the glass behind the face of the wall: head, sill and both jambs shade it. [m]
    reflectance : ndarray
        Radiance of the obstruction as a share of that of the sky or ground it hides. [-]
    """

    width: FloatArray
    height: FloatArray
    skyline: FloatArray
    overhang_depth: FloatArray
    overhang_distance: FloatArray
    left_fin_depth: FloatArray
    left_fin_distance: FloatArray
    right_fin_depth: FloatArray
    right_fin_distance: FloatArray
    reveal_depth: FloatArray
    reflectance: FloatArray

    def at(self, which: slice | NDArray[np.intp]) -> Obstructions:
        """The same for the chosen openings."""
        return Obstructions(*(values[which] for values in self))


def no_obstructions(count: int) -> Obstructions:
    """Nothing before ``count`` openings of 1 m by 1 m."""
    fields: dict[str, FloatArray] = {name: np.zeros(count) for name in Obstructions._fields}
    fields |= {"width": np.ones(count), "height": np.ones(count), "skyline": np.zeros((count, len(SECTORS)))}
    return Obstructions(**fields)


def towards(zenith: ArrayLike, azimuth: ArrayLike) -> FloatArray:
    """Unit vectors towards points of the sky: east, north and up, shape (3, points).

    Parameters
    ----------
    zenith, azimuth : array_like, shape (points,)
        Angle from straight up, and direction from north, clockwise. [°]
    """
    height, turn = np.radians(90.0 - np.asarray(zenith, float)), np.radians(np.asarray(azimuth, float))
    return np.stack([np.cos(height) * np.sin(turn), np.cos(height) * np.cos(turn), np.sin(height)])


def plane_axes(tilt: float, azimuth: float) -> FloatArray:
    """Axes of a plane: to the right as seen from outside, up the slope, away from the plane; each east, north, up.

    Parameters
    ----------
    tilt, azimuth : float
        0 = facing up, 90 = upright; from north, clockwise. [°]

    Returns
    -------
    ndarray, shape (3, 3)
        Times the vectors of :func:`towards` it gives directions in the frame of the plane. [-]

    Examples
    --------
    >>> float((plane_axes(90, 180) @ towards(90, 90))[0])  # the east lies to the right of a south wall
    1.0
    """
    slope, turn = np.radians(tilt), np.radians(azimuth)
    east, north = np.sin(turn), np.cos(turn)
    return np.array(
        [
            [-north, east, 0.0],
            [-np.cos(slope) * east, -np.cos(slope) * north, np.sin(slope)],
            [np.sin(slope) * east, np.sin(slope) * north, np.cos(slope)],
        ]
    )


def lit_share(before: Obstructions, across: FloatArray, along: FloatArray) -> FloatArray:
    """Share of each opening that light from a direction reaches past overhang, fins and reveal.

    Parameters
    ----------
    before : Obstructions
        Of n openings.
    across, along : ndarray, shape (directions,) or (n, directions)
        How far the direction runs to the right and up the slope for each metre away from the plane. [m/m]

    Returns
    -------
    ndarray, shape (n, directions)
        [-]

    References
    ----------
    Plane geometry: the edge of an overhang of depth D at distance d above the opening throws its shadow
    D·along − d below the upper edge; the reveal is an overhang, a sill and two fins at distance 0.
    """
    reveal = before.reveal_depth[:, None]

    def fin(depth: FloatArray, distance: FloatArray, slope: FloatArray) -> FloatArray:
        return (reveal + depth[:, None]) * slope - distance[:, None]

    head = np.maximum(reveal * np.abs(along), fin(before.overhang_depth, before.overhang_distance, along))
    side = np.maximum(
        reveal * np.abs(across),
        np.maximum(
            fin(before.left_fin_depth, before.left_fin_distance, -across),
            fin(before.right_fin_depth, before.right_fin_distance, across),
        ),
    )
    high = np.clip(1.0 - head / before.height[:, None], 0.0, 1.0)
    return np.asarray(high * np.clip(1.0 - side / before.width[:, None], 0.0, 1.0))


def sector_of(direction: FloatArray) -> NDArray[np.intp]:
    """Place in :data:`SECTORS` of each direction.

    Parameters
    ----------
    direction : ndarray, shape (3, points)
        Unit vectors: east, north, up. [-]

    Examples
    --------
    >>> sector_of(towards([60, 60, 60], [22.4, 22.6, 350])).tolist()
    [0, 1, 0]
    """
    turn = np.degrees(np.arctan2(direction[0], direction[1]))
    return np.asarray(((turn + 22.5) % 360.0) // 45.0, dtype=np.intp)


def above_skyline(skyline: FloatArray, sector: NDArray[np.intp], up: FloatArray) -> NDArray[np.bool_]:
    """Whether directions point above the skyline of their sector.

    Parameters
    ----------
    skyline : ndarray, shape (n, 8)
        [°]
    sector, up : ndarray, shape (points,)
        Place in :data:`SECTORS` and upward part of the unit vector of each direction. [-]

    Returns
    -------
    ndarray, shape (n, points)
        Where a sector has no skyline, everything counts as above it, the refracted sun included.
    """
    limit = np.where(skyline > 0, np.sin(np.radians(skyline)), -1.0)[:, sector]
    return np.asarray(up >= limit)


def views(before: Obstructions, tilt: FloatArray, azimuth: FloatArray) -> tuple[FloatArray, FloatArray]:
    """Shares of the sky and of the ground before planes that are still seen, averaged over each opening.

    Parameters
    ----------
    before : Obstructions
        Of n openings.
    tilt, azimuth : ndarray, shape (n,)
        Of their planes. [°]

    Returns
    -------
    sky, ground : ndarray, shape (n,)
        View factor of what is left over that without obstruction; 1 where a plane sees none of it. A skyline hides
        sky only: the ground before the wall is nearer. [-]

    References
    ----------
    Nusselt's analogue: directions spread evenly over the unit disc weigh like the cosine of their incidence, so a
    mean over them is a view factor.
    """
    sky, ground = np.ones(len(tilt)), np.ones(len(tilt))
    planes, place = np.unique(np.column_stack([tilt, azimuth]), axis=0, return_inverse=True)
    for number, plane in enumerate(planes):
        members = np.flatnonzero(place.reshape(-1) == number)
        for start in range(0, len(members), SURFACES_AT_ONCE):
            chosen = members[start : start + SURFACES_AT_ONCE]
            sky[chosen], ground[chosen] = _views(before.at(chosen), *plane)
    return sky, ground


def _views(before: Obstructions, tilt: float, azimuth: float) -> tuple[FloatArray, FloatArray]:
    """Of openings in one plane."""
    across, along, out = _HEMISPHERE
    directions = plane_axes(tilt, azimuth).T @ _HEMISPHERE
    seen = lit_share(before, across / out, along / out)
    in_sky = directions[2] > 0
    ground = _mean(seen[:, ~in_sky])
    if before.skyline.any():
        seen = seen * above_skyline(before.skyline, sector_of(directions), directions[2])
    return _mean(seen[:, in_sky]), ground


def _mean(shares: FloatArray) -> FloatArray:
    return np.asarray(shares.mean(axis=1)) if shares.shape[1] else np.ones(len(shares))


def _hemisphere() -> FloatArray:
    """Directions before a plane (across, along, out), spread evenly over the disc they project to, shape (3, …)."""
    number = np.arange(HALF_THE_DIRECTIONS) + 0.5
    radius, turn = np.sqrt(number / HALF_THE_DIRECTIONS), np.pi * (number * GOLDEN_RATIO % 1.0 - 0.5)
    across, along = radius * np.cos(turn), radius * np.sin(turn)
    half = np.stack([across, along, np.sqrt(1.0 - radius**2)])
    return np.concatenate([half, half * [[-1.0], [1.0], [1.0]]], axis=1)


_HEMISPHERE = _hemisphere()
