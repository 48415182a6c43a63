"""The twelve months of a climate for a person to read."""

from __future__ import annotations

from dataclasses import dataclass

from heatledger.climate.model import DAYS_OF_MONTH, Climate, FloatArray

__all__ = ["DEGREE_DAY_BASE", "GROUND_REFLECTANCE", "SummaryColumn", "monthly_summary"]

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
