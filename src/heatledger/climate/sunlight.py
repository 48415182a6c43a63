"""Sun on surfaces behind obstructions, hour by hour and all in one pass."""

from __future__ import annotations

from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray
from pvlib import irradiance

from heatledger.climate.glass import angular_transmission, hemispherical_transmission
from heatledger.climate.model import FloatArray
from heatledger.climate.obstruction import (
    SURFACES_AT_ONCE,
    above_skyline,
    lit_share,
    plane_axes,
    sector_of,
    towards,
    views,
)
from heatledger.climate.sun import SunPath
from heatledger.climate.surfaces import Sunlight, Surfaces

__all__ = ["PlaneLight", "SkyLight", "plane_light", "sky_light", "sunlight"]

PROBE_TILT = 10.0
"""Tilt at which pvlib is asked for the parts of the sky: low enough that their sum is never cut off at zero [°]."""
LOWEST_SUN = 85.0
"""Zenith angle beyond which the light about the sun no longer grows (Perez et al. 1990) [°]."""


class SkyLight(NamedTuple):
    """The light of the sky by its parts, before any plane.

    Attributes
    ----------
    towards_sun : ndarray, shape (3, hours)
        Unit vectors: east, north, up. [-]
    sector : ndarray, shape (hours,)
        Sector of the skyline in which the sun stands. [-]
    normal : ndarray, shape (hours,)
        Beam and the bright ring about the sun, on a plane facing the sun. [W/m²]
    ring : ndarray, shape (hours,)
        The part of ``normal`` that comes from the ring. [W/m²]
    even, band : ndarray, shape (hours,)
        The even sky on the horizontal; the brighter or darker band above the horizon on an upright plane. [W/m²]
    ground : ndarray, shape (hours,)
        Reflected by the ground, on a plane facing down. [W/m²]
    """

    towards_sun: FloatArray
    sector: NDArray[np.intp]
    normal: FloatArray
    ring: FloatArray
    even: FloatArray
    band: FloatArray
    ground: FloatArray


class PlaneLight(NamedTuple):
    """Light on a plane by how an obstruction takes it, each field of shape (hours,) [W/m²].

    Attributes
    ----------
    direct : ndarray
        Beam and the bright ring about the sun.
    sky : ndarray
        The rest of the sky.
    ground : ndarray
        Reflected by the ground.
    """

    direct: FloatArray
    sky: FloatArray
    ground: FloatArray


def sky_light(sun: SunPath, light: tuple[FloatArray, FloatArray, FloatArray], ground_reflectance: float) -> SkyLight:
    """The parts of the sky of Perez, which no plane changes but by its view of them.

    Parameters
    ----------
    sun : SunPath
        The sun at each instant, fields of shape (hours,).
    light : tuple of three ndarrays of shape (hours,)
        Global horizontal, direct normal and diffuse horizontal irradiance. [W/m²]
    ground_reflectance : float
        Share of the global irradiance that the ground reflects. [-]

    References
    ----------
    EN ISO 52010-1:2017, 6.4 (the sky of Perez with its coefficients of 1990; the light about the sun belongs to the
    direct irradiance), as pvlib calculates it.
    """
    global_horizontal, direct_normal, diffuse_horizontal = light
    found = irradiance.perez(
        PROBE_TILT,
        sun.azimuth,
        diffuse_horizontal,
        direct_normal,
        sun.extraterrestrial,
        sun.zenith,
        sun.azimuth,
        sun.airmass,
        return_components=True,
    )
    # pvlib has renamed its parts once; their last words have stayed.
    parts = {name.removeprefix("poa_"): np.nan_to_num(np.asarray(part)) for name, part in found.items()}
    tilt, zenith = np.radians(PROBE_TILT), np.radians(sun.zenith)
    even = parts["isotropic"] * 2 / (1 + np.cos(tilt))
    known = ~np.isnan(sun.airmass)
    ring = np.where(known, diffuse_horizontal - even, 0.0) / np.cos(np.minimum(zenith, np.radians(LOWEST_SUN)))
    band = parts["horizon"] / np.sin(tilt)
    vectors = towards(sun.zenith, sun.azimuth)
    ground = ground_reflectance * global_horizontal
    return SkyLight(vectors, sector_of(vectors), direct_normal + ring, ring, even, band, ground)


def plane_light(tilt: float, axes: FloatArray, sky: SkyLight) -> PlaneLight:
    """Irradiance of one plane, the light about the sun counted with the beam.

    Parameters
    ----------
    tilt : float
        [°]
    axes : ndarray, shape (3, 3)
        Of the plane, see :func:`plane_axes`. [-]
    sky : SkyLight
        [W/m²]
    """
    slope = np.radians(tilt)
    cosine = np.maximum(axes[2] @ sky.towards_sun, 0.0)
    rest = sky.even * (1 + np.cos(slope)) / 2 + sky.band * np.sin(slope)
    direct = sky.normal * cosine
    if (rest < 0).any():  # a dark band that outweighs the even sky takes from the ring about the sun
        direct += np.maximum(np.minimum(rest, 0.0), -sky.ring * cosine)
    return PlaneLight(direct, np.maximum(rest, 0.0), sky.ground * (1 - np.cos(slope)) / 2)


def sunlight(
    surfaces: Surfaces,
    sun: SunPath,
    light: tuple[FloatArray, FloatArray, FloatArray],
    *,
    ground_reflectance: float,
    weights: FloatArray,
) -> Sunlight:
    """Weighted sums over the hours of the sun on surfaces; every distinct plane is calculated once.

    Direct light is cut by the lit share of the surface in each hour. What an obstruction hides of sky and ground
    shines with its reflectance times the radiance of what it hides. The sun on the obstruction itself is left out.
    So an obstruction never raises what a surface receives.

    Parameters
    ----------
    surfaces : Surfaces
        n of them.
    sun, light, ground_reflectance
        As for :func:`sky_light`.
    weights : ndarray, shape (hours, sums)
        E.g. 1 where the hour belongs to the month, else 0.

    Returns
    -------
    Sunlight
        Fields of shape (n, sums), in W/m² times the unit of the weights.

    References
    ----------
    Radiance of obstructions: rule of the split-flux method of daylighting, R. G. Hopkinson, P. Petherbridge and
    J. Longmore, Daylighting, 1966, where it is one fifth of that of the sky; recalled from memory.
    """
    count = len(surfaces.tilt)
    sums = Sunlight(*(np.zeros((count, weights.shape[1])) for _ in Sunlight._fields))
    reflectance = surfaces.before.reflectance
    left = [share + reflectance * (1 - share) for share in views(surfaces.before, surfaces.tilt, surfaces.azimuth)]
    sky = sky_light(sun, light, ground_reflectance)
    # Width and height of an opening in a level plane still have a direction, so its azimuth is kept.
    planes, place = np.unique(np.column_stack([surfaces.tilt, surfaces.azimuth]), axis=0, return_inverse=True)
    for number, (tilt, azimuth) in enumerate(planes):
        hours = _plane_hours(float(tilt), float(azimuth), sky, weights)
        members = np.flatnonzero(place.reshape(-1) == number)
        for start in range(0, len(members), SURFACES_AT_ONCE):
            chosen = members[start : start + SURFACES_AT_ONCE]
            found = _surface_sums(surfaces.at(chosen), hours, left[0][chosen], left[1][chosen])
            for field, values in zip(sums, found, strict=True):
                field[chosen] = values
    return sums


class _Hours(NamedTuple):
    """The light on one plane; the fields from ``lit`` on hold for the hours in which direct light falls on it."""

    light: PlaneLight
    weights: FloatArray
    sky: FloatArray
    """Weighted sums of the year, as ``ground``."""
    ground: FloatArray
    lit: NDArray[np.intp]
    direct: FloatArray
    lit_weights: FloatArray
    sector: NDArray[np.intp]
    height: FloatArray
    """Upward part of the unit vector towards the sun."""
    sun: FloatArray
    """Unit vector towards the sun in the frame of the plane: across, along, out."""


def _plane_hours(tilt: float, azimuth: float, sky: SkyLight, weights: FloatArray) -> _Hours:
    axes = plane_axes(tilt, azimuth)
    light = plane_light(tilt, axes, sky)
    lit = np.flatnonzero(light.direct > 0)
    vectors = sky.towards_sun[:, lit]
    return _Hours(
        light,
        weights,
        light.sky @ weights,
        light.ground @ weights,
        lit,
        light.direct[lit],
        weights[lit],
        sky.sector[lit],
        vectors[2],
        axes @ vectors,
    )


def _surface_sums(surfaces: Surfaces, hours: _Hours, sky_left: FloatArray, ground_left: FloatArray) -> Sunlight:
    """Sums of a few surfaces of one plane, with the shares of sky and ground that reach each."""
    before = surfaces.before
    across, along, out = hours.sun
    share = lit_share(before, across / out, along / out)
    if before.skyline.any():
        share *= above_skyline(before.skyline, hours.sector, hours.height)
    direct = share * hours.direct
    scattered = np.outer(sky_left, hours.sky) + np.outer(ground_left, hours.ground)
    received = direct @ hours.lit_weights + scattered
    free = np.tile(hours.direct @ hours.lit_weights + hours.sky + hours.ground, (len(share), 1))
    passed = _passed(surfaces.panes, direct, scattered, received, hours)
    bright = _bright(surfaces.threshold, direct, sky_left, ground_left, hours)
    return Sunlight(free, received, passed, bright)


def _passed(
    panes: NDArray[np.intp], direct: FloatArray, scattered: FloatArray, received: FloatArray, hours: _Hours
) -> FloatArray:
    """What glass lets in at the angle of each hour; what is scattered comes from everywhere."""
    passed = received.copy()
    for number in {int(number) for number in panes if number}:
        members = panes == number
        beam = angular_transmission(hours.sun[2], number)
        passed[members] = direct[members] @ (beam[:, None] * hours.lit_weights)
        passed[members] += hemispherical_transmission(number) * scattered[members]
    return passed


def _bright(
    threshold: FloatArray, direct: FloatArray, sky_left: FloatArray, ground_left: FloatArray, hours: _Hours
) -> FloatArray:
    """Sums over the hours in which the surface receives more than its threshold."""
    bright = np.zeros((len(threshold), hours.weights.shape[1]))
    watched = np.flatnonzero(np.isfinite(threshold))
    if not watched.size:
        return bright
    limit = threshold[watched, None]
    sky, ground = hours.light.sky, hours.light.ground
    # Only hours that are bright without obstruction can be bright behind it.
    may = hours.light.direct + sky + ground > limit.min()
    in_sun, in_shade = np.flatnonzero(may[hours.lit]), np.flatnonzero(may & (hours.light.direct <= 0))
    parts = ((hours.lit[in_sun], direct[watched][:, in_sun]), (in_shade, np.zeros((1, len(in_shade)))))
    for chosen, beam in parts:
        total = beam + np.outer(sky_left[watched], sky[chosen]) + np.outer(ground_left[watched], ground[chosen])
        bright[watched] += np.where(total > limit, total, 0.0) @ hours.weights[chosen]
    return bright
