"""What stands in a weather file, before anything is repaired."""

from __future__ import annotations

from dataclasses import dataclass, field, replace
from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from heatledger.climate.model import DAYS_OF_MONTH, MONTH_NAMES, FloatArray
from heatledger.climate.sun import Site

__all__ = ["LIGHT", "OPTIONAL", "REQUIRED", "SENSOR_ERROR", "Bounds", "Readings", "hour_name", "labels_of_year"]


class Bounds(NamedTuple):
    """What a quantity is called, its unit, and the least and most that is plausible."""

    title: str
    unit: str
    least: float
    most: float


LIGHT = {
    "global_horizontal": Bounds("global horizontal irradiance", "W/m²", 0.0, 1500.0),
    "direct_normal": Bounds("direct normal irradiance", "W/m²", 0.0, 1500.0),
    "diffuse_horizontal": Bounds("diffuse horizontal irradiance", "W/m²", 0.0, 1200.0),
}
"""The three parts of the sun's light; two of them, or the first alone, are enough."""

REQUIRED = {"temperature": Bounds("outdoor temperature", "°C", -90.0, 60.0), **LIGHT}
"""Columns that the calculation reads, with bounds that weather on earth keeps. Codes for missing
values such as 9999, 99.9 for temperature and -9900 lie outside of them."""

SENSOR_ERROR = 10.0
"""How far values may lie outside: sensors of light read a little below zero at night. [unit of the column]"""

OPTIONAL = {
    "relative_humidity": (0.0, 110.0),
    "dew_point": (-99.0, 50.0),
    "wind_speed": (0.0, 90.0),
    "horizontal_infrared": (30.0, 700.0),
}
"""Columns that may be missing and their bounds, in the units of the hours; outside a value is missing."""


@dataclass(frozen=True)
class Readings:
    """What stands in a weather file.

    Parameters
    ----------
    name, source : str
        Name of the place; where the figures come from.
    site : Site
        Latitude, longitude [°], altitude [m] and time zone [h].
    sun_offset : float or None
        Instant after the start of the hour at which the sun stands for the hour's light; None if the file leaves it
        open. [h]
    labels : ndarray, shape (hours, 3)
        Month, day and hour of each row; hour 1 begins at midnight.
    columns : dict of str to ndarray of shape (hours,)
        By the names of :class:`~heatledger.climate.hourly.Hours`; what a file lacks is absent.
    utc : bool
        Whether the labels are in UTC, not in local standard time.
    remarks : tuple of str
        What was repaired.
    """

    name: str
    source: str
    site: Site
    sun_offset: float | None
    labels: NDArray[np.int64]
    columns: dict[str, FloatArray] = field(repr=False)
    utc: bool = False
    remarks: tuple[str, ...] = ()

    def rows(self, chosen: NDArray[np.intp] | NDArray[np.bool_], *remarks: str) -> Readings:
        """The same with the chosen rows only, and further remarks."""
        columns = {name: values[chosen] for name, values in self.columns.items()}
        return replace(self, labels=self.labels[chosen], columns=columns, remarks=(*self.remarks, *remarks))


def labels_of_year() -> NDArray[np.int64]:
    """Month, day and hour 1 to 24 of each hour of a year of 365 days, shape (8760, 3)."""
    months = np.repeat(np.arange(1, 13), DAYS_OF_MONTH)
    days = np.concatenate([np.arange(1, days + 1) for days in DAYS_OF_MONTH])
    return np.column_stack([np.repeat(months, 24), np.repeat(days, 24), np.tile(np.arange(1, 25), 365)])


def hour_name(label: NDArray[np.int64]) -> str:
    """An hour as a person names it.

    >>> hour_name(np.array([1, 31, 24]))
    'hour 24 of 31 January'
    """
    month, day, hour = (int(part) for part in label)
    name = MONTH_NAMES[month - 1] if 1 <= month <= len(MONTH_NAMES) else f"of month {month}"
    return f"hour {hour} of {day} {name}"
