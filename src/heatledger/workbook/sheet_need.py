"""The sheet Monthly need: heating and cooling of each zone and of the building."""

from __future__ import annotations

from typing import NamedTuple

import numpy as np
from openpyxl.worksheet.worksheet import Worksheet

from heatledger.results import Months, Results, ZoneResult, label_of
from heatledger.workbook.canvas import Canvas
from heatledger.workbook.charts import SKY, VERMILLION, Area, Bars, add_bars, add_columns
from heatledger.workbook.look import BODY, MONTHS, NUMBER, NUMBER_TOTAL, SECTION, TOTAL
from heatledger.workbook.measure import text_width
from heatledger.workbook.monthly import conditioned, head
from heatledger.workbook.pages import print_setup
from heatledger.workbook.printed import ROUNDED, energy_digits

__all__ = ["write_monthly_need"]

REMARK = f"Heat to supply to and to remove from the zones in each calendar month. {ROUNDED}"
CHART_ROW, CHART_HEIGHT = 5, 16
"""First row of the charts and the rows they cover with few zones."""
FIRST_MONTH, YEAR, PER_AREA = 3, 15, 16
HALF = 9
"""First column below the second chart."""
MOST_COLUMNS, MOST_ZONES_IN_CHART, MOST_ROWS = 8, 30, 36
"""Zones that a chart of columns, and any chart, can name readably; rows of a page that a chart may cover."""


class _Line(NamedTuple):
    name: str
    floor_area: float
    need: Months


def write_monthly_need(sheet: Worksheet, results: Results) -> None:
    """Write the sheet."""
    longest = max((text_width(zone.name) for zone in results.zones), default=0.0)
    canvas = Canvas(sheet, (min(max(30, 1.1 * longest + 2), 52), 11, *[8.5] * 12, 10, 15))
    head(canvas, results, sheet.title, REMARK)
    zones = conditioned(results)
    header = CHART_ROW + _chart_height(len(zones)) + 1
    canvas.space(CHART_ROW - 1, header - 1)
    per_area = "Year per floor area [kWh/m²]"
    canvas.titles(header, ("Zone", label_of(ZoneResult, "floor_area"), *MONTHS, "Year", per_area))
    heating = _block(canvas, header + 1, "heating_need", results)
    cooling = _block(canvas, heating + 2, "cooling_need", results)
    canvas.keep_together([(header, heating), (heating + 2, cooling)], header)
    several = len(zones) > 1
    _building_chart(sheet, header, heating, cooling, HALF - 1 if several else PER_AREA)
    if several:
        _zone_chart(sheet, header, heating, min(len(zones), MOST_ZONES_IN_CHART))
    sheet.freeze_panes = "B1"
    print_setup(sheet, results.project.project, titles=f"{header}:{header}")


def _chart_height(zones: int) -> int:
    """Rows that the charts cover: level bars need room for each zone, up to a page of them."""
    return CHART_HEIGHT if zones <= MOST_COLUMNS else max(CHART_HEIGHT, min(zones * 7 // 5, MOST_ROWS))


def _block(canvas: Canvas, row: int, field: str, results: Results) -> int:
    """One need: a heading, a row for each zone, the building's sum; gives the row of the sum."""
    canvas.put(row, 1, label_of(ZoneResult, field), SECTION)
    canvas.height(row, 20)
    lines = [_Line(zone.name, zone.floor_area, getattr(zone, field)) for zone in conditioned(results)]
    total = _Line("Building", results.building.floor_area, getattr(results.building, field))
    months = energy_digits(results)
    for line in (*lines, total):
        row += 1
        is_total = line is total
        text, number = (TOTAL, NUMBER_TOTAL) if is_total else (BODY, NUMBER)
        year = float(np.sum(line.need))
        canvas.put(row, 1, line.name, text)
        canvas.fit(row, [line.name], bold=is_total)
        canvas.put(row, 2, line.floor_area, number, "#,##0.0")
        canvas.numbers(row, FIRST_MONTH, line.need, number, months)
        canvas.put(row, YEAR, year, number, months)
        canvas.put(row, PER_AREA, year / line.floor_area if line.floor_area else None, number, '0.0;-0.0;"–"')
    return row


def _building_chart(sheet: Worksheet, header: int, heating: int, cooling: int, last_column: int) -> None:
    """The building month by month."""
    last = FIRST_MONTH + 11
    series = [
        Bars(Area.across(top, 1, 1), Area.across(total, FIRST_MONTH, last), colour)
        for top, total, colour in ((header + 1, heating, VERMILLION), (heating + 2, cooling, SKY))
    ]
    place = Area(CHART_ROW, 1, CHART_ROW + CHART_HEIGHT - 1, last_column)
    titles = ("Building, month by month", "kWh per month")
    add_columns(sheet, place, titles, Area.across(header, FIRST_MONTH, last), series)


def _zone_chart(sheet: Worksheet, header: int, heating: int, zones: int) -> None:
    """The zones side by side, or one below the other if they are many."""
    names = Area.down(1, header + 2, header + 1 + zones)
    series = [
        Bars(name, Area.down(PER_AREA, top + 1, top + zones), colour)
        for name, top, colour in (("Heating", header + 1, VERMILLION), ("Cooling", heating + 2, SKY))
    ]
    place = Area(CHART_ROW, HALF, header - 2, PER_AREA)
    add = add_columns if zones <= MOST_COLUMNS else add_bars
    add(sheet, place, ("Zones, year per floor area", "kWh/m² a year"), names, series)
