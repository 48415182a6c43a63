"""A climate of 8760 hours."""

from __future__ import annotations

from dataclasses import dataclass, field
from functools import cached_property

import numpy as np
from numpy.typing import ArrayLike

from heatledger.climate.closure import closure_errors, closure_note
from heatledger.climate.model import DAYS_OF_MONTH, FloatArray, month_of_hour
from heatledger.climate.planes import plane_sums
from heatledger.climate.sun import Site, SunPath, sun_path
from heatledger.climate.sunlight import sunlight
from heatledger.climate.surfaces import Sunlight, Surfaces

__all__ = ["HourlyClimate", "Hours"]


@dataclass(frozen=True)
class Hours:
    """Readings of 8760 hours of local standard time from 1 January, each of shape (8760,).

    Parameters
    ----------
    temperature : ndarray
        Outdoor air. [°C]
    global_horizontal, direct_normal, diffuse_horizontal : ndarray
        Irradiance of the horizontal, of a plane facing the sun, of the horizontal without direct sun. [W/m²]
    relative_humidity : ndarray, optional
        NaN where it is missing. [%]
    dew_point : ndarray, optional
        NaN where it is missing. [°C]
    wind_speed : ndarray, optional
        NaN where it is missing. [m/s]
    horizontal_infrared : ndarray, optional
        Long-wave irradiance from the sky, NaN where it is missing. [W/m²]
    """

    temperature: FloatArray
    global_horizontal: FloatArray
    direct_normal: FloatArray
    diffuse_horizontal: FloatArray
    relative_humidity: FloatArray | None = None
    dew_point: FloatArray | None = None
    wind_speed: FloatArray | None = None
    horizontal_infrared: FloatArray | None = None

    @property
    def light(self) -> tuple[FloatArray, FloatArray, FloatArray]:
        """Global horizontal, direct normal and diffuse horizontal irradiance [W/m²]."""
        return self.global_horizontal, self.direct_normal, self.diffuse_horizontal


@dataclass(frozen=True)
class HourlyClimate:
    """A climate of 8760 hours; monthly figures are of calendar months in local standard time.

    Parameters
    ----------
    name, source : str
        Name of the place; where the figures come from.
    site : Site
        Latitude, longitude [°], altitude [m] and time zone [h].
    hours : Hours
        The readings.
    sun_offset : float
        Instant after the start of each hour at which the sun stands for its light; 0.5 is the middle. [h]
    remarks : tuple of str
        What was repaired or replaced on reading.
    """

    name: str
    source: str
    site: Site
    hours: Hours = field(repr=False)
    sun_offset: float = 0.5
    remarks: tuple[str, ...] = ()

    @property
    def latitude(self) -> float:
        """North positive [°]."""
        return self.site.latitude

    @property
    def longitude(self) -> float:
        """East positive [°]."""
        return self.site.longitude

    @property
    def altitude(self) -> float:
        """Above sea level [m]."""
        return self.site.altitude

    @property
    def time_zone(self) -> float:
        """Local standard time less UTC [h]."""
        return self.site.time_zone

    @cached_property
    def temperature(self) -> FloatArray:
        """Mean outdoor air temperature of each month, shape (12,) [°C]."""
        return np.bincount(month_of_hour(), self.hours.temperature) / np.multiply(DAYS_OF_MONTH, 24)

    @cached_property
    def horizontal_irradiation(self) -> FloatArray:
        """Global irradiation of the horizontal in each month, as measured, shape (12,) [kWh/m²]."""
        return np.bincount(month_of_hour(), self.hours.global_horizontal) / 1000.0

    @cached_property
    def sun(self) -> SunPath:
        """The sun in each hour, fields of shape (8760,)."""
        return sun_path(self.site, self.sun_offset)

    def with_sun(self, sun: SunPath) -> HourlyClimate:
        """The climate itself, given the sun of its site and instants: working it out takes as long as all the rest."""
        vars(self)["sun"] = sun  # where the cached property keeps it
        return self

    @cached_property
    def closure_errors(self) -> dict[float, float]:
        """Closure error by shift of the sun's instant in hours [-]."""
        return closure_errors(self.hours.light, self.sun, self.latitude)

    @property
    def notes(self) -> tuple[str, ...]:
        """What was repaired or replaced, and the warning of the closure check."""
        warning = closure_note(self.closure_errors)
        return (*self.remarks, warning) if warning else self.remarks

    def irradiation(self, tilt: ArrayLike, azimuth: ArrayLike, ground_reflectance: float) -> FloatArray:
        """Irradiation of planes in each month under the sky of Perez, shape (n, 12) [kWh/m²].

        Parameters
        ----------
        tilt, azimuth : array_like, shape (n,)
            0 = facing up, 90 = upright; from north, clockwise. [°]
        ground_reflectance : float
            Share of the global irradiance that the ground reflects. [-]
        """
        tilts, azimuths = np.broadcast_arrays(
            np.atleast_1d(np.asarray(tilt, dtype=np.float64)), np.atleast_1d(np.asarray(azimuth, dtype=np.float64))
        )
        sun, light, months = self._lit_hours
        return plane_sums(tilts, azimuths, sun, light, ground_reflectance=ground_reflectance, weights=months)

    def sunlight(self, surfaces: Surfaces, ground_reflectance: float) -> Sunlight:
        """Irradiation of surfaces behind obstructions in each month, fields of shape (n, 12) [kWh/m²].

        Parameters
        ----------
        surfaces : Surfaces
            n of them.
        ground_reflectance : float
            Share of the global irradiance that the ground reflects. [-]
        """
        sun, light, months = self._lit_hours
        return sunlight(surfaces, sun, light, ground_reflectance=ground_reflectance, weights=months)

    def heating_degree_days(self, base: float) -> FloatArray:
        """Degree days of each month from daily means below ``base`` [°C], shape (12,) [K·d]."""
        daily_means = self.hours.temperature.reshape(365, 24).mean(axis=1)
        return np.bincount(month_of_hour()[::24], np.maximum(base - daily_means, 0.0)).astype(np.float64)

    @cached_property
    def _lit_hours(self) -> tuple[SunPath, tuple[FloatArray, FloatArray, FloatArray], FloatArray]:
        """Sun, light and weights of the months in hours with any light: half of the year, so half of the work."""
        lit = np.asarray(np.any([values > 0 for values in self.hours.light], axis=0))
        light = (self.hours.global_horizontal[lit], self.hours.direct_normal[lit], self.hours.diffuse_horizontal[lit])
        return self.sun.at(lit), light, np.eye(12)[month_of_hour()[lit]] / 1000.0
