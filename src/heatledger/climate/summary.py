"""The twelve months of a climate for a person to read."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

from heatledger.climate.model import DAYS_OF_MONTH, MONTH_NAMES, Climate, FloatArray

__all__ = ["DEGREE_DAY_BASE", "GROUND_REFLECTANCE", "SummaryColumn", "monthly_summary", "summary_lines"]

DEGREE_DAY_BASE = 18.0
"""Base temperature of the heating degree days, a common choice; daily means below it count [°C]."""

GROUND_REFLECTANCE = 0.2
"""Of bare ground and lawn, the usual default [-]."""


@dataclass(frozen=True)
class SummaryColumn:
    """One column: title, unit, twelve values and the mean or sum of the year."""

    title: str
    unit: str
    values: FloatArray
    year: float


def monthly_summary(climate: Climate) -> tuple[SummaryColumn, ...]:
    """Temperature, degree days, and sun on the horizontal and on the four upright sides.

    Returns
    -------
    tuple of SummaryColumn
        The year's temperature is the mean over its days, everything else the sum.
    """
    temperature = climate.temperature
    sides = climate.irradiation([90.0] * 4, [0.0, 90.0, 180.0, 270.0], GROUND_REFLECTANCE)
    mean = float((temperature * DAYS_OF_MONTH).sum() / sum(DAYS_OF_MONTH))
    return (
        SummaryColumn("Temperature", "°C", temperature, mean),
        _sum(f"Degree days below {DEGREE_DAY_BASE:g} °C", "K·d", climate.heating_degree_days(DEGREE_DAY_BASE)),
        _sum("Horizontal", "kWh/m²", climate.horizontal_irradiation),
        *(
            _sum(title, "kWh/m²", values)
            for title, values in zip(("North", "East", "South", "West"), sides, strict=True)
        ),
    )


def _sum(title: str, unit: str, values: FloatArray) -> SummaryColumn:
    return SummaryColumn(title, unit, values, float(values.sum()))


def summary_lines(climate: Climate) -> list[str]:
    """The place, the twelve months and the year in columns, and the notes, each line at most 80 characters of table."""
    columns = monthly_summary(climate)
    heads = [*(_head(column) for column in columns[:2]), *(_head(column, "sun") for column in columns[2:])]
    widths = [max(map(len, head)) for head in heads]
    first = max(map(len, MONTH_NAMES))
    lines = [f"{climate.name}: {_place(climate)}", climate.source, ""]
    lines += [_line("", row, widths, first) for row in zip(*heads, strict=True)]
    rule = "-" * (first + sum(widths) + 2 * len(widths))
    lines.append(rule)
    for month, name in enumerate(MONTH_NAMES):
        lines.append(_line(name, [_figure(column.values[month]) for column in columns], widths, first))
    lines += [rule, _line("Year", [_figure(column.year) for column in columns], widths, first), ""]
    lines.append(f"Sun of the sides: upright, ground reflectance {GROUND_REFLECTANCE:g}. Degree days from daily means.")
    return [*lines, *(f"Note: {note}" for note in climate.notes)]


def _head(column: SummaryColumn, *above: str) -> tuple[str, str, str]:
    """Three rows: what it is, the rest of the title, the unit."""
    words = [*above, *column.title.split(" below ")]
    below = f"< {words[1]}" if " below " in column.title else "".join(words[1:])
    return words[0].capitalize(), below.lower() if above else below, column.unit


def _line(name: str, cells: Sequence[str], widths: Sequence[int], first: int) -> str:
    texts = (f"{cell:>{width}}" for cell, width in zip(cells, widths, strict=True))
    return "  ".join([f"{name:<{first}}", *texts]).rstrip()


def _figure(value: float) -> str:
    """One decimal; a little below zero is zero."""
    return f"{round(float(value), 1) + 0.0:.1f}"


def _place(climate: Climate) -> str:
    north, east = ("N" if climate.latitude >= 0 else "S"), ("E" if climate.longitude >= 0 else "W")
    zone = f"UTC{climate.time_zone:+g} h" if climate.time_zone else "UTC"
    return (
        f"{abs(climate.latitude):.2f}° {north}, {abs(climate.longitude):.2f}° {east}, {climate.altitude:.0f} m, {zone}"
    )
