"""Irradiance of planes from the three parts of the sun's light, all planes at once."""

from __future__ import annotations

from typing import Literal, NamedTuple, TypeAlias

import numpy as np
from numpy.typing import ArrayLike
from pvlib import irradiance

from heatledger.climate.model import FloatArray
from heatledger.climate.sun import SunPath

__all__ = ["PlaneIrradiance", "SkyModel", "plane_irradiance", "plane_sums"]

SkyModel: TypeAlias = Literal["perez", "isotropic"]
"""How diffuse light is spread over the sky."""

PLANES_AT_ONCE = 8
"""Planes of one pass: their arrays stay near the processor, and memory stays the same for any number."""


class PlaneIrradiance(NamedTuple):
    """Light on planes by where it comes from, each field of shape (planes, hours) [W/m²]."""

    beam: FloatArray
    sky: FloatArray
    ground: FloatArray


def plane_irradiance(
    tilt: ArrayLike,
    azimuth: ArrayLike,
    sun: SunPath,
    light: tuple[FloatArray, FloatArray, FloatArray],
    *,
    ground_reflectance: ArrayLike,
    sky_model: SkyModel = "perez",
) -> PlaneIrradiance:
    """Irradiance of planes at each instant.

    Parameters
    ----------
    tilt, azimuth : array_like, shape (planes,)
        0 = facing up, 90 = upright; from north, clockwise. [°]
    sun : SunPath
        The sun at each instant, fields of shape (hours,).
    light : tuple of three ndarrays of shape (hours,)
        Global horizontal, direct normal and diffuse horizontal irradiance. [W/m²]
    ground_reflectance : array_like, shape () or (hours,)
        Share of the global irradiance that the ground reflects. [-]
    sky_model : {"perez", "isotropic"}
        Anisotropic sky of Perez et al. 1990, or a uniform one.

    Returns
    -------
    PlaneIrradiance
        Fields of shape (planes, hours). [W/m²]

    References
    ----------
    EN ISO 52010-1:2017, 6.4 (the sky of Perez with its coefficients of 1990), as pvlib calculates it.
    """
    global_horizontal, direct_normal, diffuse_horizontal = light
    parts = irradiance.get_total_irradiance(
        _column(tilt),
        _column(azimuth),
        sun.zenith,
        sun.azimuth,
        direct_normal,
        global_horizontal,
        diffuse_horizontal,
        dni_extra=sun.extraterrestrial,
        airmass=sun.airmass,
        albedo=ground_reflectance,
        model=sky_model,
    )
    shape = np.broadcast_shapes(_column(tilt).shape, sun.zenith.shape)
    names = ("poa_direct", "poa_sky_diffuse", "poa_ground_diffuse")
    return PlaneIrradiance(*(np.broadcast_to(np.asarray(parts[name]), shape) for name in names))


def plane_sums(
    tilt: FloatArray,
    azimuth: FloatArray,
    sun: SunPath,
    light: tuple[FloatArray, FloatArray, FloatArray],
    *,
    ground_reflectance: float,
    weights: FloatArray,
) -> FloatArray:
    """Weighted sums over the hours of the irradiance of planes, each distinct plane calculated once.

    Parameters
    ----------
    tilt, azimuth : ndarray, shape (planes,)
        [°]
    sun, light
        As for :func:`plane_irradiance`.
    ground_reflectance : float
        Share of the global irradiance that the ground reflects. [-]
    weights : ndarray, shape (hours, sums)
        E.g. 1 where the hour belongs to the month, else 0.

    Returns
    -------
    ndarray, shape (planes, sums)
        In W/m² times the unit of the weights.
    """
    # A horizontal plane has no azimuth, and 360° is north again.
    given = np.column_stack([tilt, np.where(tilt == 0, 0.0, azimuth % 360.0)])
    distinct, place = np.unique(given, axis=0, return_inverse=True)
    sums = np.empty((len(distinct), weights.shape[1]))
    for start in range(0, len(distinct), PLANES_AT_ONCE):
        block = slice(start, start + PLANES_AT_ONCE)
        tilts, azimuths = distinct[block].T
        parts = plane_irradiance(tilts, azimuths, sun, light, ground_reflectance=ground_reflectance)
        sums[block] = (parts.beam + parts.sky + parts.ground) @ weights
    return sums[place.reshape(-1)]


def _column(values: ArrayLike) -> FloatArray:
    return np.asarray(values, dtype=np.float64).reshape(-1, 1)
