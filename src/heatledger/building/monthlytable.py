"""The climate of twelve rows that a workbook may hold."""

from __future__ import annotations

from dataclasses import dataclass

from heatledger.inputs.rows import MONTHS, Rows
from heatledger.inputs.rules_monthly_climate import uses_monthly_table

__all__ = ["MonthlyTable", "monthly_table"]


@dataclass(frozen=True)
class MonthlyTable:
    """Temperatures [°C], irradiations of the horizontal [kWh/m²] and diffuse shares [-] of twelve months."""

    temperature: tuple[float, ...]
    irradiation: tuple[float, ...]
    diffuse_share: tuple[float | None, ...]
    """None where it is to be estimated."""
    cells: tuple[str, ...]
    """Of the irradiations."""


def monthly_table(rows: Rows) -> MonthlyTable | None:
    """The table of a workbook, January first; None if its weather is another or its table has gaps."""
    by_month = {row.month: row for row in rows.monthly_climate}
    if not uses_monthly_table(rows) or rows.project.latitude is None or len(by_month) < len(MONTHS):
        return None
    months = [by_month[month] for month in MONTHS]
    temperatures = tuple(row.temperature for row in months if row.temperature is not None)
    irradiations = tuple(row.irradiation for row in months if row.irradiation is not None)
    if len(temperatures) < len(MONTHS) or len(irradiations) < len(MONTHS):
        return None
    shares = tuple(None if row.diffuse_share is None else row.diffuse_share / 100 for row in months)
    return MonthlyTable(temperatures, irradiations, shares, tuple(row.cell("irradiation") for row in months))
