"""The sheet Solar gains: the sun on and through every opening, month by month."""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np
from openpyxl.worksheet.worksheet import Worksheet

from heatledger.results import Months, OpeningGains, Results, label_of
from heatledger.workbook.canvas import Canvas
from heatledger.workbook.look import BODY, MONTHS, NUMBER, NUMBER_TOTAL, SECTION, TOTAL
from heatledger.workbook.monthly import head
from heatledger.workbook.pages import print_setup
from heatledger.workbook.printed import ROUNDED, energy_digits

__all__ = ["write_solar_gains"]

REMARK = (
    "Sun on the plane of each opening in each calendar month, what obstructions and movable shading leave of it, and "
    "the part that enters: irradiation times these factors, area, share of glass and g-value. Factors of the year are "
    f"weighted by the sun. Losses to the sky are not taken off here. {ROUNDED}"
)
HEADER_ROW = 5
FACTS = ("azimuth", "tilt", "area", "u_value", "g_value", "angle_factor")
_DIGITS = {
    **{"azimuth": "0", "tilt": "0", "area": "#,##0.00"},
    **{"u_value": "0.00", "g_value": "0.00", "angle_factor": "0.00"},
}
_SUN = '#,##0;-#,##0;"–"'
FIRST_MONTH, YEAR = 9, 21
FACTORS = {
    "obstruction_factor": "obstruction",
    "shading_factor_heating": "shading_device",
    "shading_factor_cooling": "shading_device",
}
"""Monthly factors, and the name of what they stand for."""


def write_solar_gains(sheet: Worksheet, results: Results) -> None:
    """Write the sheet."""
    canvas = Canvas(sheet, (22, 22, 9, 7, 8, 11, 11, 8, *[7.5] * 12, 9))
    head(canvas, results, sheet.title, REMARK)
    titles = ("Opening", "Zone", *(label_of(OpeningGains, name) for name in FACTS), *MONTHS, "Year")
    canvas.titles(HEADER_ROW, titles, text_columns=2)
    openings = results.opening_gains
    digits = energy_digits(results)
    # Gains come first: their places must not hang on which factors are shown.
    ends = [_gains(canvas, HEADER_ROW + 1, "gains", openings, digits)]
    if any(opening.shading_device for opening in openings):
        ends.append(_gains(canvas, ends[-1] + 1, "gains_cooling", openings, digits))
    ends.append(_sums(canvas, ends[-1] + 1, "irradiation", openings, _SUN))
    for field, name in FACTORS.items():
        shaded = [opening for opening in openings if getattr(opening, name)]
        if any((getattr(opening, field) < 1).any() for opening in shaded):
            ends.append(_factors(canvas, ends[-1] + 1, field, shaded))
    starts = (HEADER_ROW + 1, *(end + 1 for end in ends))
    canvas.keep_together(list(zip(starts, ends, strict=False)), HEADER_ROW)
    sheet.freeze_panes = f"B{HEADER_ROW + 1}"
    print_setup(sheet, results.project.project, titles=f"{HEADER_ROW}:{HEADER_ROW}")


def _gains(canvas: Canvas, row: int, field: str, openings: Sequence[OpeningGains], digits: str) -> int:
    """A table of gains with the sum of the building; gives the row below it."""
    return _total(canvas, _sums(canvas, row, field, openings, digits), field, openings, digits)


def _sums(canvas: Canvas, row: int, field: str, openings: Sequence[OpeningGains], digits: str) -> int:
    """A table of energies; gives the row below it."""
    _section(canvas, row, field)
    for number, opening in enumerate(openings, start=row + 1):
        months: Months = getattr(opening, field)
        for place, name in enumerate(FACTS, start=3):
            value = getattr(opening, name)
            canvas.put(number, place, "–" if value is None else value, NUMBER, _DIGITS[name])
        _line(canvas, number, opening, months, float(np.sum(months)), digits)
    return row + len(openings) + 1


def _factors(canvas: Canvas, row: int, field: str, openings: Sequence[OpeningGains]) -> int:
    """A table of factors, each with the name of what it stands for; gives the row below it."""
    _section(canvas, row, field)
    for number, opening in enumerate(openings, start=row + 1):
        months: Months = getattr(opening, field)
        canvas.merged(number, 3, FIRST_MONTH - 1, getattr(opening, FACTORS[field]), BODY)
        _line(canvas, number, opening, months, _year(months, opening.irradiation), "0.00")
    return row + len(openings) + 1


def _section(canvas: Canvas, row: int, field: str) -> None:
    canvas.put(row, 1, label_of(OpeningGains, field), SECTION)
    canvas.height(row, 20)


def _line(canvas: Canvas, row: int, opening: OpeningGains, months: Months, year: float, digits: str) -> None:
    canvas.put(row, 1, opening.name, BODY)
    canvas.put(row, 2, opening.zone, BODY)
    canvas.numbers(row, FIRST_MONTH, months, NUMBER, digits)
    canvas.numbers(row, YEAR, [year], NUMBER, digits)
    canvas.fit(row, (opening.name, opening.zone))


def _year(factors: Months, irradiation: Months) -> float:
    """Factor of the year, each month by its sun."""
    return float(np.average(factors, weights=irradiation)) if np.sum(irradiation) > 0 else float(np.mean(factors))


def _total(canvas: Canvas, row: int, field: str, openings: Sequence[OpeningGains], digits: str) -> int:
    """The sum of a table; gives the row below it."""
    months = np.sum([getattr(opening, field) for opening in openings], axis=0) if openings else np.zeros(12)
    canvas.put(row, 1, "Building", TOTAL)
    for column in range(2, FIRST_MONTH):
        canvas.put(row, column, None, TOTAL)
    canvas.numbers(row, FIRST_MONTH, months, NUMBER_TOTAL, digits)
    canvas.numbers(row, YEAR, [float(np.sum(months))], NUMBER_TOTAL, digits)
    return row + 1
