"""Values that are missing in a year of hours, filled in where a short gap or the other parts of the light allow."""

from __future__ import annotations

from dataclasses import dataclass, field

import numpy as np
from numpy.typing import NDArray
from pvlib import irradiance

from heatledger.climate.model import HOURS_OF_YEAR, FloatArray
from heatledger.climate.readings import LIGHT, REQUIRED, SENSOR_ERROR, Bounds, hour_name, labels_of_year
from heatledger.climate.sun import SunPath
from heatledger.errors import Problem

__all__ = ["Repairs", "complete_light", "complete_temperature", "usable"]

LONGEST_GAP = 6
"""Hours in a row that are filled in from their neighbours; by night light needs no filling in [h]."""

LOWEST_SUN = 0.02
"""Cosine of the zenith angle below which direct light is not worked out from the others, the sun 1° high [-].

A higher bound loses low winter sun, a lower one takes rounding for light: measured on the shipped climates, four
upright sides come within 0.4 % a year where the parts close to 0.3 %, and within 1 % for those that close to 0.9 %."""

Hours = NDArray[np.bool_]


@dataclass
class Repairs:
    """What was found and done on the way, in the order of finding."""

    remarks: list[str] = field(default_factory=list)
    problems: list[Problem] = field(default_factory=list)


def usable(values: FloatArray | None, bounds: Bounds) -> FloatArray:
    """Values with NaN where they are missing or beyond what weather keeps; a column of zeros alone is missing."""
    if values is None:
        return np.full(HOURS_OF_YEAR, np.nan)
    plausible = (values >= bounds.least - SENSOR_ERROR) & (values <= bounds.most + SENSOR_ERROR)
    kept: FloatArray = np.where(plausible, values, np.nan)
    if not bounds.least and not (kept > 0).any():
        return np.full(HOURS_OF_YEAR, np.nan)
    return kept


def complete_temperature(values: FloatArray | None, repairs: Repairs) -> FloatArray:
    """Temperatures with short gaps filled in along a straight line, shape (8760,) [°C]."""
    bounds = REQUIRED["temperature"]
    kept = usable(values, bounds)
    missing = np.isnan(kept)
    if _too_long(missing, np.full(HOURS_OF_YEAR, True), bounds, values, repairs):
        return kept
    if missing.any():
        repairs.remarks.append(f"{_hours_without(missing, bounds.title)}: filled in from the hours around.")
        known = np.flatnonzero(~missing)
        kept[missing] = np.interp(np.flatnonzero(missing), known, kept[known], period=HOURS_OF_YEAR)
    return kept


def complete_light(
    columns: dict[str, FloatArray], sun: SunPath, repairs: Repairs
) -> tuple[FloatArray, FloatArray, FloatArray]:
    """Global horizontal, direct normal and diffuse horizontal irradiance without gaps [W/m²].

    Of two parts the third follows; global alone is split by Erbs; hours without any are filled in by clearness.
    """
    ghi, dni, dhi = (usable(columns.get(name), bounds) for name, bounds in LIGHT.items())
    up = np.cos(np.radians(sun.zenith))
    night = up <= 0
    for part in (ghi, dni, dhi):
        part[night & np.isnan(part)] = 0.0
    _fill_global(ghi, dni * up + dhi, repairs)
    gap = np.isnan(ghi)
    if _too_long(gap, ~night, LIGHT["global_horizontal"], columns.get("global_horizontal"), repairs):
        return ghi, dni, dhi
    if gap.any():
        repairs.remarks.append(f"{_hours_without(gap, 'sunlight')}: filled in from the clearness of the hours around.")
        ghi[gap] = _by_clearness(ghi, gap, sun.extraterrestrial * up, ~night)
        dni[gap] = dhi[gap] = np.nan
    _fill_parts(ghi, dni, dhi, up, sun, repairs, gap)
    return np.maximum(ghi, 0.0), np.maximum(dni, 0.0), np.maximum(dhi, 0.0)


def _fill_global(ghi: FloatArray, worked_out: FloatArray, repairs: Repairs) -> None:
    found = np.isnan(ghi) & ~np.isnan(worked_out)
    if found.any():
        title = LIGHT["global_horizontal"].title
        repairs.remarks.append(f"{_hours_without(found, title)}: worked out from the direct and the diffuse one.")
        ghi[found] = worked_out[found]


def _fill_parts(
    ghi: FloatArray, dni: FloatArray, dhi: FloatArray, up: FloatArray, sun: SunPath, repairs: Repairs, told: Hours
) -> None:
    """Direct and diffuse light where one or both of them are missing."""
    no_direct, no_diffuse = np.isnan(dni), np.isnan(dhi)
    split = no_direct & no_diffuse
    if split.any():
        parts = irradiance.erbs(ghi, sun.zenith, np.repeat(np.arange(1, 366), 24))
        dni[split], dhi[split] = np.asarray(parts["dni"])[split], np.asarray(parts["dhi"])[split]
    if (split & ~told).any():
        without = _hours_without(split & ~told, "direct and diffuse irradiance")
        repairs.remarks.append(f"{without}: global irradiance was split by Erbs, Klein and Duffie.")
    no_direct, no_diffuse = no_direct & ~split, no_diffuse & ~split
    if no_direct.any():
        title = LIGHT["direct_normal"].title
        repairs.remarks.append(f"{_hours_without(no_direct, title)}: worked out from the global and the diffuse one.")
        high = no_direct & (up > LOWEST_SUN)
        dni[no_direct] = 0.0
        dni[high] = np.clip((ghi[high] - dhi[high]) / up[high], 0.0, sun.extraterrestrial[high])
    if no_diffuse.any():
        title = LIGHT["diffuse_horizontal"].title
        repairs.remarks.append(f"{_hours_without(no_diffuse, title)}: worked out from the global and the direct one.")
        dhi[no_diffuse] = np.maximum(ghi[no_diffuse] - dni[no_diffuse] * np.maximum(up[no_diffuse], 0.0), 0.0)


def _by_clearness(ghi: FloatArray, gap: Hours, outside: FloatArray, day: Hours) -> FloatArray:
    known = np.flatnonzero(~gap & day)
    clearness = np.clip(ghi[known] / outside[known], 0.0, 0.82)
    filled: FloatArray = np.interp(np.flatnonzero(gap), known, clearness, period=HOURS_OF_YEAR) * outside[gap]
    return filled


def _too_long(missing: Hours, counting: Hours, bounds: Bounds, given: FloatArray | None, repairs: Repairs) -> bool:
    """Whether there is a gap that cannot be filled in, among the hours that count; told as a problem."""
    longest = _longest_run(missing[counting])
    if longest <= LONGEST_GAP:
        return False
    values = f"values from {bounds.least:g} to {bounds.most:g} {bounds.unit}"
    expected = f"{values} without gaps of more than {LONGEST_GAP} h"
    fix = f"Fill in the missing {bounds.title} of the weather file or give another file."
    if given is None:
        found = f"no column of {bounds.title}"
    elif missing[counting].all():
        found = f"no {bounds.title} in any hour"
    else:
        first = int(np.flatnonzero(missing)[0])
        value = "no number" if np.isnan(given[first]) else f"{given[first]:g}"
        where = f"first: {value} at {hour_name(labels_of_year()[first])}"
        found = f"{_count(int(missing.sum()))} without a usable {bounds.title}, {longest} in a row ({where})"
    repairs.problems.append(Problem(found, expected, fix))
    return True


def _longest_run(missing: Hours) -> int:
    """Hours in a row, also across the end of the year."""
    known = np.flatnonzero(~missing)
    if not known.size:
        return len(missing)
    return int(np.diff(known, append=known[0] + len(missing)).max()) - 1


def _hours_without(missing: Hours, title: str) -> str:
    first = hour_name(labels_of_year()[int(np.flatnonzero(missing)[0])])
    have = "has" if missing.sum() == 1 else "have"
    return f"{_count(int(missing.sum()))} of the weather file {have} no usable {title} (first: {first})"


def _count(hours: int) -> str:
    return "1 hour" if hours == 1 else f"{hours} hours"
