"""From the readings of a weather file to a climate: repaired where the trade repairs, refused where it cannot."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import replace
from typing import Any

import numpy as np

from heatledger.climate.closure import TOLERABLE, closure_error
from heatledger.climate.gaps import Repairs, complete_light, complete_temperature, usable
from heatledger.climate.hourly import HourlyClimate, Hours
from heatledger.climate.model import FloatArray
from heatledger.climate.readings import LIGHT, OPTIONAL, Bounds, Readings
from heatledger.climate.sun import Site, SunPath, cos_zenith, sun_path
from heatledger.climate.year import whole_year
from heatledger.errors import InputError, Problem

__all__ = ["checked_climate"]

SITE_BOUNDS = {
    "latitude": Bounds("latitude", "°", -90.0, 90.0),
    "longitude": Bounds("longitude", "°", -180.0, 180.0),
    "time_zone": Bounds("time zone", "h", -12.0, 14.0),
}
"""Bounds of what places the sun."""

WIDEST_ZONE = 3.5
"""How far clocks stand from the sun at most: 3.2 h in the west of China [h]."""

MIDDLE = 0.5
"""Instant after the start of the hour where neither the file nor its light tells another [h]."""

MINUTES = np.arange(0, 60, 5)
"""Minutes after the start of the hour at which light may have been seen [min]."""

SUN_DOWN = -0.05
"""Cosine of the zenith angle below which there is no light: the sun 3° under the horizon [-]."""

LIGHT_AT_NIGHT, DARK_AT_DAY = 0.002, 0.05
"""Share of the year's light with the sun down that asks for a look, and that is refused [-]."""

Light = tuple[FloatArray, FloatArray, FloatArray]


def checked_climate(readings: Readings) -> HourlyClimate:
    """The climate of a weather file.

    Raises
    ------
    InputError
        With every fault of the file.
    """
    problems = list(_site_problems(readings.site))
    if problems:
        raise InputError(problems)
    readings = _at_stated_minute(_with_fitting_time_zone(whole_year(readings)))
    offset = _offset(readings)
    sun = sun_path(readings.site, offset)
    repairs = Repairs()
    temperature = complete_temperature(readings.columns.get("temperature"), repairs)
    light = complete_light(readings.columns, sun, repairs)
    if not repairs.problems:
        _look_for_light_at_night(readings, light[0], sun, repairs)
    if repairs.problems:
        raise InputError(repairs.problems)
    optional: dict[str, Any] = {name: _optional(readings.columns.get(name), *OPTIONAL[name]) for name in OPTIONAL}
    hours = Hours(temperature, *light, **optional)
    remarks = (*readings.remarks, *repairs.remarks)
    return HourlyClimate(readings.name, readings.source, readings.site, hours, offset, remarks).with_sun(sun)


def _site_problems(site: Site) -> Iterator[Problem]:
    for name, (title, unit, least, most) in SITE_BOUNDS.items():
        value = getattr(site, name)
        if not least <= value <= most:
            yield Problem(
                f"the {title} {value:g} {unit}",
                f"a {title} from {least:g} to {most:g} {unit}",
                f"Correct the {title} in the weather file or give it on the sheet Project.",
            )


def _with_fitting_time_zone(readings: Readings) -> Readings:
    """The sun's own time zone where that of the file is impossible and the light proves it."""
    site = readings.site
    if abs((site.time_zone - site.longitude / 15.0 + 12.0) % 24.0 - 12.0) <= WIDEST_ZONE:
        return readings
    fitting = float(round(site.longitude / 15.0))
    moved = site._replace(time_zone=fitting)
    found = f"the time zone {site.time_zone:g} h at longitude {site.longitude:g}°"
    if not _closure(readings, sun_path(moved, _offset(readings))) <= TOLERABLE:
        expected = f"a time zone within {WIDEST_ZONE:g} h of that of the sun, {fitting:g} h"
        fix = "Correct time zone or longitude in the weather file or give them on the sheet Project."
        raise InputError([Problem(found, expected, fix)])
    remark = (
        f"The weather file states {found}; that of the sun, {fitting:g} h, is used, since with it global, direct and "
        "diffuse irradiance agree."
    )
    return replace(readings, site=moved, remarks=(*readings.remarks, remark))


def _at_stated_minute(readings: Readings) -> Readings:
    """The instant at which the light closes best, where the file does not state one."""
    if readings.sun_offset is not None:
        return readings
    sun = sun_path(readings.site, 0.0)
    errors = [_closure(readings, sun, minute / 60.0) for minute in MINUTES]
    best = int(np.nanargmin(errors)) if not np.isnan(errors).all() else 0
    if not errors[best] <= TOLERABLE:
        return readings
    remark = (
        "The weather file does not state at which minute of the hour its light was seen; global, direct and diffuse "
        f"irradiance agree best {MINUTES[best]} minutes after the full hour, to {100 * errors[best]:.1f} %."
    )
    return replace(readings, sun_offset=MINUTES[best] / 60.0, remarks=(*readings.remarks, remark))


def _closure(readings: Readings, sun: SunPath, shift: float = 0.0) -> float:
    """Closure error of the hours that have all three parts; NaN if there are none [-]."""
    light = [usable(readings.columns.get(name), bounds) for name, bounds in LIGHT.items()]
    whole = ~np.isnan(light).any(axis=0)
    if not whole.any():
        return float("nan")
    global_horizontal, direct_normal, diffuse_horizontal = (values[whole] for values in light)
    up = cos_zenith(sun, readings.site.latitude, shift)[whole]
    return closure_error((global_horizontal, direct_normal, diffuse_horizontal), up)


def _offset(readings: Readings) -> float:
    return MIDDLE if readings.sun_offset is None else readings.sun_offset


def _look_for_light_at_night(readings: Readings, light: FloatArray, sun: SunPath, repairs: Repairs) -> None:
    """The proof that is left where direct or diffuse light was worked out from the rest."""
    share = float(light[np.cos(np.radians(sun.zenith)) < SUN_DOWN].sum() / light.sum())
    found = f"{100 * share:.1f} % of the sunlight in hours when the sun is down"
    fix = "Check time zone, longitude and the order of the hours of the weather file."
    if share > DARK_AT_DAY:
        repairs.problems.append(Problem(found, "sunlight by day", fix))
    elif share > LIGHT_AT_NIGHT and np.isnan(_closure(readings, sun)):
        repairs.remarks.append(f"The weather file has {found}. {fix}")


def _optional(values: FloatArray | None, least: float, most: float) -> FloatArray | None:
    if values is None:
        return None
    kept = np.where((values >= least) & (values <= most), values, np.nan)
    return None if np.isnan(kept).all() else kept
