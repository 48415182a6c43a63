"""From the rows of a weather file to the 8760 hours of a local year, those that are missing left empty."""

from __future__ import annotations

from dataclasses import replace

import numpy as np
from numpy.typing import NDArray

from heatledger.climate.model import DAYS_OF_MONTH, HOURS_OF_YEAR, FloatArray
from heatledger.climate.readings import REQUIRED, SENSOR_ERROR, Readings, hour_name, labels_of_year
from heatledger.errors import InputError, Problem

__all__ = ["whole_year"]

FEWEST_HOURS = 8400
"""A file of fewer hours is not one of a year with gaps."""

FIX = "Give a file of one whole year, 1 January to 31 December, one row for each hour."


def whole_year(readings: Readings) -> Readings:
    """The hours of a year of 365 days in order, in local standard time.

    The leap day is left out; rows of parts of an hour become their mean; of an hour that stands twice the first is
    kept; hours that are missing hold NaN.

    Parameters
    ----------
    readings : Readings
        Rows as they stand.

    Returns
    -------
    Readings
        In local standard time, with what was done in its remarks.

    Raises
    ------
    InputError
        If labels are no hours, or the rows are those of less or more than a year.
    """
    readings = _in_local_time(_hourly(_without_leap_day(_labelled(readings))))
    hours = _hour_of_year(readings.labels)
    times = np.bincount(hours, minlength=HOURS_OF_YEAR)
    if (times > 0).sum() < FEWEST_HOURS:
        raise InputError([Problem(f"{(times > 0).sum()} hours", f"{HOURS_OF_YEAR} hours", FIX)])
    if (times > 1).sum() > HOURS_OF_YEAR / 2:
        found = f"{len(hours)} hours, about {len(hours) / HOURS_OF_YEAR:.1f} years"
        fix = "Give a typical year, or cut one year out of the file."
        raise InputError([Problem(found, "one year of hours", fix)])
    return _in_order(readings, hours)


def _labelled(readings: Readings) -> Readings:
    month, day, hour = readings.labels.T
    longest = np.array([0, *DAYS_OF_MONTH, 0])[np.clip(month, 0, 13)] + (month == 2)
    wrong = np.flatnonzero((day < 1) | (day > longest) | (hour < 1) | (hour > 24))
    if wrong.size:
        found = f"'{hour_name(readings.labels[wrong[0]])}' in row {wrong[0] + 1} of the hours"
        fix = "Correct the date, or download the file again."
        raise InputError([Problem(found, "a day of the calendar and an hour from 1 to 24", fix)])
    return readings


def _without_leap_day(readings: Readings) -> Readings:
    leap = (readings.labels[:, 0] == 2) & (readings.labels[:, 1] == 29)
    if not leap.any():
        return readings
    return readings.rows(~leap, "29 February was left out of the weather file: months are of a 365-day year.")


def _hourly(readings: Readings) -> Readings:
    """Rows of equal parts of an hour made to hours."""
    parts, rest = divmod(len(readings.labels), HOURS_OF_YEAR)
    if parts < 2 or rest:
        return readings
    grouped = readings.labels.reshape(HOURS_OF_YEAR, parts, 3)
    if (grouped != grouped[:, :1]).any():
        return readings
    columns = {
        name: _plausible(name, values).reshape(HOURS_OF_YEAR, parts).mean(axis=1)
        for name, values in readings.columns.items()
    }
    remark = f"The weather file has {parts} rows an hour; their means were taken."
    return replace(readings, labels=grouped[:, 0], columns=columns, remarks=(*readings.remarks, remark))


def _plausible(name: str, values: FloatArray) -> FloatArray:
    """Values with NaN for codes of missing ones, which a mean would hide."""
    if name not in REQUIRED:
        return values
    bounds = REQUIRED[name]
    return np.where((values >= bounds.least - SENSOR_ERROR) & (values <= bounds.most + SENSOR_ERROR), values, np.nan)


def _in_local_time(readings: Readings) -> Readings:
    """Labels of UTC moved by whole hours; a fraction of the time zone moves the sun instead."""
    if not readings.utc:
        return readings
    ahead = readings.site.time_zone
    whole = int(np.floor(ahead))
    moved = (_hour_of_year(readings.labels) + whole) % HOURS_OF_YEAR
    offset = None if readings.sun_offset is None else round(readings.sun_offset + ahead - whole, 10)
    # The hours that fall out of the one end of the year come in at the other, so that the year stays whole.
    order = np.argsort(moved, kind="stable")
    turned = readings.rows(order)
    return replace(turned, labels=labels_of_year()[moved[order]], sun_offset=offset, utc=False)


def _in_order(readings: Readings, hours: NDArray[np.int64]) -> Readings:
    expected = labels_of_year()
    remarks = list(readings.remarks)
    present, first = np.unique(hours, return_index=True)
    if len(present) < len(hours):
        again = np.setdiff1d(np.arange(len(hours)), first)
        count = _count(len(again), "hour stands", "hours stand")
        where = hour_name(expected[hours[again[0]]])
        remarks.append(f"{count} twice in the weather file (first: {where}); the first of each was taken.")
    if (np.diff(first) < 0).any():
        remarks.append("The hours of the weather file stand out of order and were sorted.")
    missing = np.setdiff1d(np.arange(HOURS_OF_YEAR), present)
    if missing.size:
        count = _count(missing.size, "hour is", "hours are")
        remarks.append(f"{count} missing in the weather file (first: {hour_name(expected[missing[0]])}).")
    columns = {}
    for name, values in readings.columns.items():
        columns[name] = np.full(HOURS_OF_YEAR, np.nan)
        columns[name][present] = values[first]
    return replace(readings, labels=expected, columns=columns, remarks=tuple(remarks))


def _hour_of_year(labels: NDArray[np.int64]) -> NDArray[np.int64]:
    before = np.concatenate([[0], np.cumsum(DAYS_OF_MONTH)])
    hours: NDArray[np.int64] = (before[labels[:, 0] - 1] + labels[:, 1] - 1) * 24 + labels[:, 2] - 1
    return hours


def _count(number: int, one: str, many: str) -> str:
    return f"{number} {one if number == 1 else many}"
