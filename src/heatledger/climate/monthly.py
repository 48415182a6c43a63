"""A climate given month by month, for those who have a table of each plane."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass

import numpy as np
from numpy.typing import ArrayLike

from heatledger.climate.model import DAYS_OF_MONTH, FloatArray
from heatledger.climate.surfaces import Sunlight, Surfaces
from heatledger.errors import InputError, Problem

__all__ = ["MonthlyClimate"]


@dataclass(frozen=True)
class MonthlyClimate:
    """Monthly means and sums of a place, each plane given.

    Parameters
    ----------
    name : str
        Name of the place.
    temperature : array_like, shape (12,)
        Mean outdoor air temperature of each month. [°C]
    horizontal_irradiation : array_like, shape (12,)
        Global irradiation of the horizontal in each month. [kWh/m²]
    planes : mapping of (tilt, azimuth) to array_like of shape (12,)
        Irradiation of every plane that a building of this climate has, ground-reflected light included;
        tilt 0 = facing up, azimuth from north, clockwise. The horizontal need not be given again. [kWh/m²]
    latitude, longitude : float, optional
        North and east positive. [°]
    altitude : float, optional
        Above sea level. [m]
    time_zone : float, optional
        Local standard time less UTC. [h]
    source : str, optional
        Where the figures come from.
    notes : tuple of str, optional
        What asks for a second look.

    Raises
    ------
    InputError
        If a row does not hold twelve finite numbers, or an irradiation is negative.

    Examples
    --------
    >>> south = [40.0, 50, 80, 90, 95, 95, 100, 100, 90, 70, 45, 35]
    >>> climate = MonthlyClimate("Hill", [0.0] * 12, [50.0] * 12, {(90, 180): south})
    >>> climate.irradiation([90, 0], [180, 0], 0.2)[:, 0].tolist()
    [40.0, 50.0]
    """

    name: str
    temperature: FloatArray
    horizontal_irradiation: FloatArray
    planes: Mapping[tuple[float, float], FloatArray]
    latitude: float = 0.0
    longitude: float = 0.0
    altitude: float = 0.0
    time_zone: float = 0.0
    source: str = "Monthly table given by the user."
    notes: tuple[str, ...] = ()

    def __init__(
        self,
        name: str,
        temperature: ArrayLike,
        horizontal_irradiation: ArrayLike,
        planes: Mapping[tuple[float, float], ArrayLike],
        *,
        latitude: float = 0.0,
        longitude: float = 0.0,
        altitude: float = 0.0,
        time_zone: float = 0.0,
        source: str = "Monthly table given by the user.",
        notes: tuple[str, ...] = (),
    ) -> None:
        problems: list[Problem] = []
        horizontal = _months(name, "horizontal irradiation", horizontal_irradiation, problems, least=0.0)
        table = {
            _plane(*plane): _months(name, _title(*_plane(*plane)), values, problems, least=0.0)
            for plane, values in planes.items()
        }
        fields = {
            "name": name,
            "temperature": _months(name, "temperature", temperature, problems, least=-np.inf),
            "horizontal_irradiation": horizontal,
            "planes": {(0.0, 0.0): horizontal, **table},
            "latitude": latitude,
            "longitude": longitude,
            "altitude": altitude,
            "time_zone": time_zone,
            "source": source,
            "notes": notes,
        }
        if problems:
            raise InputError(problems)
        for field, value in fields.items():
            object.__setattr__(self, field, value)

    def irradiation(self, tilt: ArrayLike, azimuth: ArrayLike, ground_reflectance: float) -> FloatArray:
        """Irradiation of planes as given, shape (n, 12); the ground's reflectance is already in it [kWh/m²].

        Raises
        ------
        InputError
            With every plane that was not given.
        """
        tilts, azimuths = np.broadcast_arrays(np.atleast_1d(tilt), np.atleast_1d(azimuth))
        wanted = [_plane(*plane) for plane in zip(tilts.tolist(), azimuths.tolist(), strict=True)]
        missing = [plane for plane in dict.fromkeys(wanted) if plane not in self.planes]
        if missing:
            raise InputError(self._missing(plane) for plane in missing)
        return np.array([self.planes[plane] for plane in wanted]).reshape(-1, 12)

    def sunlight(self, surfaces: Surfaces, ground_reflectance: float) -> Sunlight:
        """Never given: a table of months does not say where the sun stands in each hour.

        Raises
        ------
        InputError
            Always.
        """
        raise InputError(
            [
                Problem(
                    "a table of months",
                    "a climate of hours, since obstructions, shading by irradiance and glass by hour follow the sun",
                    "Give hourly weather, or leave these out.",
                    file=self.name,
                )
            ]
        )

    def heating_degree_days(self, base: float) -> FloatArray:
        """Degree days below ``base`` [°C] from the monthly means: a lower bound, shape (12,) [K·d]."""
        return np.maximum(base - self.temperature, 0.0) * DAYS_OF_MONTH

    def _missing(self, plane: tuple[float, float]) -> Problem:
        given = ", ".join(_title(*known) for known in self.planes)
        return Problem(
            f"no irradiation for the {_title(*plane)}",
            f"one of the planes given ({given})",
            "Add the twelve values of this plane to the monthly climate.",
            file=self.name,
        )


def _plane(tilt: float, azimuth: float) -> tuple[float, float]:
    """One key for each plane: a horizontal one has no azimuth."""
    return (round(float(tilt), 6), 0.0 if tilt == 0 else round(float(azimuth) % 360.0, 6))


def _title(tilt: float, azimuth: float) -> str:
    return f"plane of tilt {tilt:g}° and azimuth {azimuth:g}°"


def _months(name: str, title: str, values: ArrayLike, problems: list[Problem], *, least: float) -> FloatArray:
    months = np.asarray(values, dtype=np.float64)
    if months.shape != (12,) or not np.isfinite(months).all() or (months < least).any():
        at_least = "" if least == -np.inf else ", none of them negative"
        found = f"{months.size} values" if months.shape != (12,) else f"the values {months.tolist()}"
        expected = f"twelve numbers{at_least}"
        problems.append(Problem(found, expected, "Give one value per month.", file=name, column=title))
    return months
