"""Where the sun stands in each hour of a year."""

from __future__ import annotations

from typing import NamedTuple

import numpy as np
import pandas as pd
from pvlib import atmosphere, irradiance, solarposition

from heatledger.climate.model import HOURS_OF_YEAR, FloatArray

__all__ = ["REFERENCE_YEAR", "Site", "SunPath", "cos_zenith", "hour_angle", "hour_instants", "sun_path"]

REFERENCE_YEAR = 2001
"""Typical years join months of many years, so one year gives the sun: it has 365 days and stands near the
middle of the four-year cycle of the calendar (declination within 0.2° of any other year)."""


class Site(NamedTuple):
    """A point on the earth: latitude and longitude [°], altitude [m], local standard time less UTC [h]."""

    latitude: float
    longitude: float
    altitude: float
    time_zone: float


class SunPath(NamedTuple):
    """The sun at a row of instants, each field of shape (hours,).

    Attributes
    ----------
    zenith : ndarray
        Refracted angle from straight up. [°]
    azimuth : ndarray
        From north, clockwise. [°]
    extraterrestrial : ndarray
        Normal irradiance outside the atmosphere. [W/m²]
    airmass : ndarray
        Relative optical air mass, NaN with the sun down. [-]
    """

    zenith: FloatArray
    azimuth: FloatArray
    extraterrestrial: FloatArray
    airmass: FloatArray

    def at(self, hours: np.ndarray[tuple[int], np.dtype[np.bool_]]) -> SunPath:
        """The same for the chosen hours."""
        return SunPath(*(values[hours] for values in self))


def hour_instants(time_zone: float, sun_offset: float) -> pd.DatetimeIndex:
    """Instants at which the sun stands for each hour of the local year, in UTC.

    Parameters
    ----------
    time_zone : float
        Local standard time less UTC. [h]
    sun_offset : float
        Instant after the start of the hour; 0.5 is its middle. [h]
    """
    starts = pd.date_range(f"{REFERENCE_YEAR}-01-01", periods=HOURS_OF_YEAR, freq="h", tz="UTC")
    return starts + pd.Timedelta(sun_offset - time_zone, unit="h")


def sun_path(site: Site, sun_offset: float = 0.5) -> SunPath:
    """The sun in each hour of a year of 365 days, shape (8760,).

    References
    ----------
    Reda and Andreas 2004, as pvlib calculates it; air mass: Kasten and Young 1989.
    """
    instants = hour_instants(site.time_zone, sun_offset)
    position = solarposition.get_solarposition(instants, site.latitude, site.longitude, site.altitude)
    zenith = position["apparent_zenith"].to_numpy()
    return SunPath(
        zenith,
        position["azimuth"].to_numpy(),
        np.asarray(irradiance.get_extra_radiation(instants.day_of_year.to_numpy()), dtype=np.float64),
        np.asarray(atmosphere.get_relative_airmass(zenith), dtype=np.float64),
    )


def cos_zenith(sun: SunPath, latitude: float, shift: float) -> FloatArray:
    """Cosine of the zenith angle ``shift`` hours later, by turning the hour angle.

    The declination moves less than 0.02° in an hour, so no second series of sun positions is needed.

    Parameters
    ----------
    sun : SunPath
        The sun at the stated instants.
    latitude : float
        North positive. [°]
    shift : float
        Later is positive. [h]

    Returns
    -------
    ndarray, shape (hours,)
        Negative with the sun down. [-]
    """
    zenith, azimuth, phi = np.radians(sun.zenith), np.radians(sun.azimuth), np.radians(latitude)
    up, north, west = np.cos(zenith), np.sin(zenith) * np.cos(azimuth), -np.sin(zenith) * np.sin(azimuth)
    pole = np.sin(phi) * up + np.cos(phi) * north  # sin δ
    noon = np.cos(phi) * up - np.sin(phi) * north  # cos δ · cos ω
    turn = np.radians(15.0 * shift)
    result: FloatArray = np.sin(phi) * pole + np.cos(phi) * (noon * np.cos(turn) - west * np.sin(turn))
    return result


def hour_angle(sun: SunPath, latitude: float) -> FloatArray:
    """Angle by which the earth has to turn back for the sun to stand highest, shape (hours,) [rad].

    Negative in the morning.
    """
    zenith, azimuth, phi = np.radians(sun.zenith), np.radians(sun.azimuth), np.radians(latitude)
    noon = np.cos(phi) * np.cos(zenith) - np.sin(phi) * np.sin(zenith) * np.cos(azimuth)
    return np.asarray(np.arctan2(-np.sin(zenith) * np.sin(azimuth), noon), dtype=np.float64)
