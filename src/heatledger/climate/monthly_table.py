"""Hours from twelve mean temperatures and twelve irradiations of the horizontal.

One mean day for each month would lose the mix of clear and overcast days and put far too much diffuse light on a
south wall in a cloudy winter. So each month gets days from dull to clear, in an order that never changes.
"""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from typing import NamedTuple

import numpy as np
from numpy.typing import ArrayLike
from pvlib import irradiance

from heatledger.climate.clearness import DULLEST_DAY, daily_clearness, day_shape, hourly_spread
from heatledger.climate.hourly import HourlyClimate, Hours
from heatledger.climate.model import DAYS_OF_MONTH, MONTH_NAMES, FloatArray, month_of_hour
from heatledger.climate.sun import Site, SunPath, hour_angle, sun_path
from heatledger.climate.swing import daily_means, daily_swing
from heatledger.errors import InputError, Problem

__all__ = ["MONTHLY_TABLE", "monthly_table_climate"]

MONTHLY_TABLE = "monthly table"
"""What stands under Weather for a climate of twelve rows."""

GOLDEN_SHARE = 0.6180339887498949
"""Steps of this share of the whole spread any number of days most evenly [-]."""

CLEAREST_MONTH = 0.80
"""Clearness that no month on earth passes: the driest deserts reach 0.76 [-]."""

DULLEST_MONTH = 0.10
"""Clearness that every month with a sun worth the name passes: the dullest basins have 0.15 [-]."""

LITTLE_SUN = 5.0
"""Irradiation outside the atmosphere in a month below which it is not tested for dullness [kWh/m²]."""

LITTLE_LIGHT = 0.5
"""What a table may hold for a month of polar night [kWh/m²]."""

METHOD = (
    "Hours built from it: days by Bendt, Collares-Pereira and Rabl, hours by Collares-Pereira and Rabl, diffuse share "
    "by {split}, daily temperatures by Erbs, Klein and Beckman."
)


class _Year(NamedTuple):
    """The sun of a year of whole days, fields of shape (365, 24), the last of shape (365,)."""

    sun: SunPath
    outside: FloatArray
    shape: FloatArray
    month: np.ndarray[tuple[int], np.dtype[np.intp]]


def monthly_table_climate(
    name: str,
    temperature: ArrayLike,
    horizontal_irradiation: ArrayLike,
    *,
    latitude: float,
    longitude: float | None = None,
    time_zone: float | None = None,
    altitude: float | None = None,
    diffuse_share: Sequence[float | None] | None = None,
    source: str = "Monthly table given by the user.",
    sheet: str = "",
    cells: Sequence[str] = (),
) -> HourlyClimate:
    """A climate of hours whose monthly means and sums are those of a table.

    Parameters
    ----------
    name : str
        Name of the place.
    temperature : array_like, shape (12,)
        Mean outdoor air temperature of each month. [°C]
    horizontal_irradiation : array_like, shape (12,)
        Global irradiation of the horizontal in each month. [kWh/m²]
    latitude : float
        North positive. [°]
    longitude, time_zone : float, optional
        East positive [°]; local standard time less UTC [h]. Without the one it follows from the other; without both,
        hours are in solar time, which changes no monthly figure by more than a few hours at the months' ends.
    altitude : float, optional
        Above sea level; without it that of the sea, which is noted. [m]
    diffuse_share : sequence of twelve numbers or None, optional
        Of the irradiation of the horizontal; without it, estimated hour by hour from the clearness. [-]
    source : str, optional
        Where the figures come from.
    sheet, cells : str and sequence of str, optional
        Where the twelve irradiations stand; problems point there.

    Raises
    ------
    InputError
        With every row that is no twelve plausible numbers, and every month with more or less sun than can be.

    References
    ----------
    See :mod:`heatledger.climate.clearness` and :mod:`heatledger.climate.swing`; diffuse share of the hours: Erbs,
    Klein and Duffie 1982, as pvlib calculates it.

    Examples
    --------
    >>> climate = monthly_table_climate("Hill", [5.0] * 12, [30, 50, 90, 120, 150, 160] + [160, 140, 100, 65, 35, 25],
    ...                                 latitude=47.0, longitude=8.0, altitude=450.0)
    >>> climate.horizontal_irradiation.round(6).tolist()[:3], climate.time_zone
    ([30.0, 50.0, 90.0], 1.0)
    """
    temperatures = _twelve(name, "mean outdoor temperature", temperature, -90.0, 60.0)
    irradiations = _twelve(name, "global horizontal irradiation", horizontal_irradiation, 0.0, 500.0)
    shares = _shares(name, diffuse_share)
    site = _site(latitude, longitude, time_zone, altitude)
    year = _year(site)
    problems = list(_sun_problems(irradiations, year, sheet, cells))
    if problems:
        raise InputError(problems)
    clearness = _clearness(irradiations, year)
    global_horizontal = _light(irradiations, clearness, year)
    direct_normal, diffuse_horizontal = _parts(global_horizontal, shares, year.sun)
    hours = Hours(_temperature(temperatures, clearness, site), global_horizontal, direct_normal, diffuse_horizontal)
    split = "Erbs, Klein and Duffie" if np.isnan(shares).any() else "the table"
    remarks = ("The altitude is not given: that of the sea is assumed.",) if altitude is None else ()
    return HourlyClimate(name, f"{source} {METHOD.format(split=split)}", site, hours, 0.5, remarks).with_sun(year.sun)


def _site(latitude: float, longitude: float | None, time_zone: float | None, altitude: float | None) -> Site:
    """A place whose clock fits its sun where one of the two is not given."""
    east = 15.0 * (time_zone or 0.0) if longitude is None else longitude
    ahead = float(round(east / 15.0)) if time_zone is None else time_zone
    return Site(latitude, east, altitude or 0.0, ahead)


def _year(site: Site) -> _Year:
    sun = sun_path(site)
    up = np.cos(np.radians(sun.zenith))
    outside = (sun.extraterrestrial * np.maximum(up, 0.0)).reshape(365, 24)
    angle = hour_angle(sun, site.latitude).reshape(365, 24)
    # The last lit hour of the day ends near sunset, so half an hour is added; the shape hardly notices.
    lit = np.where(outside > 0, np.abs(angle), 0.0).max(axis=1, keepdims=True)
    shape = day_shape(angle, np.minimum(lit + np.radians(7.5), np.pi))
    return _Year(sun, outside, shape, month_of_hour()[::24])


def _clearness(irradiations: FloatArray, year: _Year) -> FloatArray:
    """Clearness of each month [-]; that of a month without sun counts for nothing."""
    available = np.bincount(year.month, year.outside.sum(axis=1)) / 1000.0
    clearness: FloatArray = irradiations / np.maximum(available, 1e-9)
    return np.clip(clearness, DULLEST_DAY + 0.01, CLEAREST_MONTH)


def _light(irradiations: FloatArray, clearness: FloatArray, year: _Year) -> FloatArray:
    """Global irradiance of the hours whose sums are those of the table, shape (8760,) [W/m²]."""
    days = np.concatenate(
        [_mixed(daily_clearness(mean, count)) for mean, count in zip(clearness, DAYS_OF_MONTH, strict=True)]
    )
    shaped = year.shape * year.outside
    light = shaped * (days * year.outside.sum(axis=1) / np.maximum(shaped.sum(axis=1), 1e-9))[:, None]
    # One hour above, the next below; on the next day the other way round, so that east and west get the same.
    sign = 1.0 - 2.0 * ((np.arange(365)[:, None] + np.arange(24)) % 2)
    light = (light * (1.0 + sign * (hourly_spread(days) / days)[:, None])).ravel()
    sums = np.bincount(month_of_hour(), light) / 1000.0
    scaled: FloatArray = light * (irradiations / np.maximum(sums, 1e-9))[month_of_hour()]
    return scaled


def _mixed(ascending: FloatArray) -> FloatArray:
    """Values in a fixed order in which each part of the month has low and high ones."""
    order = np.argsort(np.arange(len(ascending)) * GOLDEN_SHARE % 1.0)
    mixed = np.empty_like(ascending)
    mixed[order] = ascending
    return mixed


def _parts(global_horizontal: FloatArray, shares: FloatArray, sun: SunPath) -> tuple[FloatArray, FloatArray]:
    """Direct normal and diffuse horizontal irradiance; monthly sums of diffuse light are the shares given [W/m²]."""
    days = np.repeat(np.arange(1, 366), 24)
    diffuse = np.asarray(irradiance.erbs(global_horizontal, sun.zenith, days)["dhi"], dtype=np.float64)
    month = month_of_hour()
    whole = np.maximum(np.bincount(month, global_horizontal), 1e-9)
    estimated = np.bincount(month, diffuse) / whole
    wanted = np.where(np.isnan(shares), estimated, shares)
    # Less than estimated: all diffuse light is lowered alike; more: all direct light is.
    lower = np.minimum(wanted / np.maximum(estimated, 1e-9), 1.0)
    direct = np.minimum((1.0 - wanted) / np.maximum(1.0 - estimated * lower, 1e-9), 1.0)
    diffuse = global_horizontal - direct[month] * (global_horizontal - lower[month] * diffuse)
    up = np.cos(np.radians(sun.zenith))
    normal = np.where(up > 0, (global_horizontal - diffuse) / np.where(up > 0, up, 1.0), 0.0)
    return np.maximum(normal, 0.0), diffuse


def _temperature(means: FloatArray, clearness: FloatArray, site: Site) -> FloatArray:
    """Hourly temperatures whose monthly means are those of the table, shape (8760,) [°C]."""
    days = np.concatenate([_mixed(days[::-1]) for days in daily_means(means)])
    solar_time = np.arange(0.5, 24.0) + site.longitude / 15.0 - site.time_zone
    swing: FloatArray = daily_swing(clearness[:, None], solar_time)
    hours = (days[:, None] + np.repeat(swing, DAYS_OF_MONTH, axis=0)).ravel()
    found = np.bincount(month_of_hour(), hours) / np.multiply(DAYS_OF_MONTH, 24)
    return hours + (means - found)[month_of_hour()]


def _sun_problems(irradiations: FloatArray, year: _Year, sheet: str, cells: Sequence[str]) -> Iterator[Problem]:
    available = np.bincount(year.month, year.outside.sum(axis=1)) / 1000.0
    column = "Global horizontal irradiation [kWh/m²]"
    for month, (given, most) in enumerate(zip(irradiations, available, strict=True)):
        cell = cells[month] if cells else ""
        found = f"{given:g} kWh/m² in {MONTH_NAMES[month]}"
        if given > CLEAREST_MONTH * most + LITTLE_LIGHT:
            expected = f"at most {CLEAREST_MONTH * most:.0f} kWh/m² at this latitude"
            fix = "Correct latitude or figure; it is the sum of the month in kWh/m² (1 kWh = 3.6 MJ)."
            yield Problem(found, expected, fix, sheet=sheet, cell=cell, column=column)
        elif most > LITTLE_SUN and given < DULLEST_MONTH * most:
            expected = f"at least {DULLEST_MONTH * most:.0f} kWh/m² at this latitude"
            fix = "Correct latitude or figure; it is the sum of the whole month, not the mean of a day."
            yield Problem(found, expected, fix, sheet=sheet, cell=cell, column=column)


def _twelve(name: str, title: str, values: ArrayLike, least: float, most: float) -> FloatArray:
    months = np.asarray(values, dtype=np.float64)
    if months.shape != (12,) or not ((months >= least) & (months <= most)).all():
        found = f"{months.size} values" if months.shape != (12,) else f"the values {months.tolist()}"
        expected = f"twelve numbers from {least:g} to {most:g}"
        raise InputError([Problem(found, expected, "Give one value per month.", file=name, column=title)])
    return months


def _shares(name: str, values: Sequence[float | None] | None) -> FloatArray:
    """Diffuse shares, NaN where none is given."""
    given = [None] * 12 if values is None else list(values)
    known = np.array([np.nan if value is None else value for value in given], dtype=np.float64)
    _twelve(name, "diffuse share", np.where(np.isnan(known), 0.5, known), 0.0, 1.0)
    return known
