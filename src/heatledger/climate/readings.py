"""From the columns of a weather file to a checked year of 8760 hours."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass, field, replace
from typing import Any, NamedTuple

import numpy as np
from numpy.typing import NDArray

from heatledger.climate.hourly import HourlyClimate, Hours
from heatledger.climate.model import DAYS_OF_MONTH, HOURS_OF_YEAR, MONTH_NAMES, FloatArray
from heatledger.climate.sun import Site
from heatledger.errors import InputError, Problem

__all__ = ["Readings", "checked_climate"]


class Bounds(NamedTuple):
    """What a quantity is called, its unit, and the least and most that is plausible."""

    title: str
    unit: str
    least: float
    most: float


REQUIRED = {
    "temperature": Bounds("outdoor temperature", "°C", -90.0, 60.0),
    "global_horizontal": Bounds("global horizontal irradiance", "W/m²", 0.0, 1500.0),
    "direct_normal": Bounds("direct normal irradiance", "W/m²", 0.0, 1500.0),
    "diffuse_horizontal": Bounds("diffuse horizontal irradiance", "W/m²", 0.0, 1200.0),
}
"""Columns that every file must have, with bounds that weather on earth keeps. Codes for missing
values such as 9999 and -9900 lie outside of them."""

SENSOR_ERROR = 10.0
"""How far values may lie outside: sensors of light read a little below zero at night. [unit of the column]"""

OPTIONAL = {
    "relative_humidity": (0.0, 110.0),
    "dew_point": (-99.0, 50.0),
    "wind_speed": (0.0, 100.0),
    "horizontal_infrared": (30.0, 700.0),
}
"""Columns that may be missing and their bounds, in the units of :class:`Hours`; outside a value is missing."""

SITE_BOUNDS = {
    "latitude": Bounds("latitude", "°", -90.0, 90.0),
    "longitude": Bounds("longitude", "°", -180.0, 180.0),
    "time_zone": Bounds("time zone", "h", -12.0, 14.0),
}
"""Bounds of what places the sun."""


@dataclass(frozen=True)
class Readings:
    """What stands in a weather file.

    Parameters
    ----------
    name, source : str
        Name of the place; where the figures come from.
    site : Site
        Latitude, longitude [°], altitude [m] and time zone [h].
    sun_offset : float
        Instant after the start of the hour at which the sun stands for the hour's light. [h]
    labels : ndarray, shape (hours, 3)
        Month, day and hour of each row; hour 1 begins at midnight.
    columns : dict of str to ndarray of shape (hours,)
        By the names of :class:`Hours`.
    remarks : tuple of str
        What was repaired.
    """

    name: str
    source: str
    site: Site
    sun_offset: float
    labels: NDArray[np.int64]
    columns: dict[str, FloatArray] = field(repr=False)
    remarks: tuple[str, ...] = ()


def checked_climate(readings: Readings) -> HourlyClimate:
    """The year of a weather file: leap day dropped, hours complete and in order, values plausible.

    Raises
    ------
    InputError
        With every fault of the file.
    """
    readings = _without_leap_day(readings)
    problems = [*_site_problems(readings.site)]
    problems += _label_problems(readings.labels) or _value_problems(readings)
    if problems:
        raise InputError(problems)
    required: dict[str, FloatArray] = {name: _lit(name, readings.columns[name]) for name in REQUIRED}
    optional: dict[str, Any] = {name: _optional(readings.columns.get(name), *OPTIONAL[name]) for name in OPTIONAL}
    hours = Hours(**required, **optional)
    return HourlyClimate(readings.name, readings.source, readings.site, hours, readings.sun_offset, readings.remarks)


def _without_leap_day(readings: Readings) -> Readings:
    leap = (readings.labels[:, 0] == 2) & (readings.labels[:, 1] == 29)
    if not leap.any():
        return readings
    return replace(
        readings,
        labels=readings.labels[~leap],
        columns={name: values[~leap] for name, values in readings.columns.items()},
        remarks=(*readings.remarks, "29 February was left out of the weather file: months are of a 365-day year."),
    )


def _site_problems(site: Site) -> Iterator[Problem]:
    for name, (title, unit, least, most) in SITE_BOUNDS.items():
        value = getattr(site, name)
        if not least <= value <= most:
            yield Problem(
                f"the {title} {value:g} {unit}",
                f"a {title} from {least:g} to {most:g} {unit}",
                f"Correct the {title} in the weather file or give it on the sheet Project.",
            )


def _label_problems(labels: NDArray[np.int64]) -> list[Problem]:
    expected = _labels_of_year()
    if len(labels) != HOURS_OF_YEAR:
        fix = "Give a file of one whole year, 1 January to 31 December, one row for each hour."
        return [Problem(f"{len(labels)} hours", f"{HOURS_OF_YEAR} hours", fix)]
    wrong = np.flatnonzero((labels != expected).any(axis=1))
    if not wrong.size:
        return []
    first = wrong[0]
    fix = "Put the hours in order, each one once, from 1 January to 31 December."
    return [Problem(_label(labels[first]), f"{_label(expected[first])} in that row", fix)]


def _value_problems(readings: Readings) -> list[Problem]:
    problems = [problem for name, bounds in REQUIRED.items() if (problem := _value_problem(readings, name, bounds))]
    if not problems and not readings.columns["global_horizontal"].max() > 0:
        fix = "Give a file with hourly global, direct and diffuse irradiance."
        problems.append(Problem("no global horizontal irradiance in any hour", "a year with sun", fix))
    return problems


def _value_problem(readings: Readings, name: str, bounds: Bounds) -> Problem | None:
    title, unit, least, most = bounds
    expected = f"values from {least:g} to {most:g} {unit}"
    fix = f"Fill in the missing {title} of the weather file or give another file."
    if name not in readings.columns:
        return Problem(f"no column of {title}", expected, fix)
    values = readings.columns[name]
    wrong = np.flatnonzero(~((values >= least - SENSOR_ERROR) & (values <= most + SENSOR_ERROR)))
    if not wrong.size:
        return None
    first = wrong[0]
    value = "no number" if np.isnan(values[first]) else f"{values[first]:g}"
    hours = "1 hour" if wrong.size == 1 else f"{wrong.size} hours"
    found = f"{hours} without a usable {title} (first: {value} at {_label(readings.labels[first])})"
    return Problem(found, expected, fix)


def _labels_of_year() -> NDArray[np.int64]:
    """Month, day and hour 1 to 24 of each hour of a year of 365 days, shape (8760, 3)."""
    months = np.repeat(np.arange(1, 13), DAYS_OF_MONTH)
    days = np.concatenate([np.arange(1, days + 1) for days in DAYS_OF_MONTH])
    return np.column_stack([np.repeat(months, 24), np.repeat(days, 24), np.tile(np.arange(1, 25), 365)])


def _label(label: NDArray[np.int64]) -> str:
    month, day, hour = (int(part) for part in label)
    name = MONTH_NAMES[month - 1] if 1 <= month <= len(MONTH_NAMES) else f"of month {month}"
    return f"hour {hour} of {day} {name}"


def _lit(name: str, values: FloatArray) -> FloatArray:
    """Light is never negative, whatever a sensor reads at night."""
    return values if name == "temperature" else np.maximum(values, 0.0)


def _optional(values: FloatArray | None, least: float, most: float) -> FloatArray | None:
    if values is None:
        return None
    kept = np.where((values >= least) & (values <= most), values, np.nan)
    return None if np.isnan(kept).all() else kept
