"""The sheet Solar gains: the sun on and through every opening, month by month."""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np
from openpyxl.worksheet.worksheet import Worksheet

from heatledger.results import OpeningGains, Results, label_of
from heatledger.workbook.look import BODY, MONTHS, NUMBER, NUMBER_TOTAL, SECTION, TOTAL, Canvas, print_setup
from heatledger.workbook.monthly import head

__all__ = ["write_solar_gains"]

REMARK = (
    "Sun on the plane of each opening in each calendar month, and the part of it that enters: irradiation times area, "
    "share of glass and g-value. Losses to the sky are not taken off here."
)
HEADER_ROW = 5
FACTS = ("azimuth", "tilt", "area", "u_value", "g_value")
_DIGITS = {"azimuth": "0", "tilt": "0", "area": "#,##0.00", "u_value": "0.00", "g_value": "0.00"}
FIRST_MONTH, YEAR = 8, 20


def write_solar_gains(sheet: Worksheet, results: Results) -> None:
    """Write the sheet."""
    canvas = Canvas(sheet, (22, 22, 9, 7, 8, 11, 11, *[7.5] * 12, 9))
    head(canvas, results, sheet.title, REMARK)
    titles = ("Opening", "Zone", *(label_of(OpeningGains, name) for name in FACTS), *MONTHS, "Year")
    canvas.titles(HEADER_ROW, titles, text_columns=2)
    row = _block(canvas, HEADER_ROW + 1, "irradiation", results.opening_gains)
    row = _block(canvas, row + 1, "gains", results.opening_gains)
    _total(canvas, row, results.opening_gains)
    sheet.freeze_panes = f"B{HEADER_ROW + 1}"
    print_setup(sheet, results.project.project, titles=f"{HEADER_ROW}:{HEADER_ROW}")


def _block(canvas: Canvas, row: int, field: str, openings: Sequence[OpeningGains]) -> int:
    canvas.put(row, 1, label_of(OpeningGains, field), SECTION)
    canvas.height(row, 20)
    for opening in openings:
        row += 1
        _row(canvas, row, opening, getattr(opening, field))
    return row + 1


def _row(canvas: Canvas, row: int, opening: OpeningGains, months: Sequence[float]) -> None:
    canvas.put(row, 1, opening.name, BODY)
    canvas.put(row, 2, opening.zone, BODY)
    for place, name in enumerate(FACTS, start=3):
        value = getattr(opening, name)
        canvas.put(row, place, "–" if value is None else value, NUMBER, _DIGITS[name])
    canvas.numbers(row, FIRST_MONTH, months)
    canvas.numbers(row, YEAR, [float(np.sum(months))])
    canvas.fit(row, (opening.name, opening.zone))


def _total(canvas: Canvas, row: int, openings: Sequence[OpeningGains]) -> None:
    months = np.sum([opening.gains for opening in openings], axis=0) if openings else np.zeros(12)
    canvas.put(row, 1, "Building", TOTAL)
    for column in range(2, FIRST_MONTH):
        canvas.put(row, column, None, TOTAL)
    canvas.numbers(row, FIRST_MONTH, months, NUMBER_TOTAL)
    canvas.numbers(row, YEAR, [float(np.sum(months))], NUMBER_TOTAL)
