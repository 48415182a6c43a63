"""The sheet of a climate known by its months."""

from __future__ import annotations

from typing import ClassVar

from heatledger.inputs.columns import SheetRow, choice, number
from heatledger.inputs.words import Month

__all__ = ["MonthlyClimateRow"]


class MonthlyClimateRow(SheetRow):
    """A month of a climate that is known by its monthly means and sums."""

    sheet: ClassVar[str] = "Monthly climate"
    purpose: ClassVar[str] = (
        "Twelve months of a place without an hourly file. Counts only if Weather on sheet Project is: monthly table."
    )

    month: Month = choice("Month", help="January to December, each once.", required=True)
    temperature: float | None = number(
        "Mean outdoor temperature",
        unit="°C",
        help="Mean of the month, day and night. Needed if the table counts.",
        ge=-60,
        le=50,
    )
    irradiation: float | None = number(
        "Global horizontal irradiation",
        unit="kWh/m²",
        help="Sum of the month on the horizontal, direct and diffuse: the mean of a day times the days. 1 kWh = 3.6 "
        "MJ. Needed if the table counts.",
        ge=0,
        le=400,
    )
    diffuse_share: float | None = number(
        "Diffuse share",
        unit="%",
        help="Of the global horizontal irradiation. Empty: estimated hour by hour (Erbs, Klein and Duffie 1982).",
        default_note="estimated hour by hour (Erbs, Klein and Duffie 1982)",
        ge=0,
        le=100,
    )
