"""The sheet Monthly balance: each loss and gain of the building and of every zone."""

from __future__ import annotations

from dataclasses import fields, replace
from typing import Literal, TypeAlias

import numpy as np
from openpyxl.worksheet.worksheet import Worksheet

from heatledger.results import ClimateResult, GroundFloorResult, Months, Results, ZoneResult, label_of
from heatledger.workbook.canvas import Canvas
from heatledger.workbook.charts import BLUE, GREEN, GREY, ORANGE, SKY, VERMILLION, YELLOW, Area, Bars, add_columns
from heatledger.workbook.look import BODY, MONTHS, NUMBER, SECTION
from heatledger.workbook.measure import digits_for
from heatledger.workbook.monthly import conditioned, head, sum_of, year_mean
from heatledger.workbook.pages import print_setup
from heatledger.workbook.printed import ROUNDED, energy_digits

__all__ = ["write_monthly_balance"]

REMARK = (
    "Losses and gains of each calendar month as they enter the balance: transmission and ventilation at the "
    "set-points, γ gains divided by losses, η the share that counts. "
    f"{ROUNDED}"
)
HEADER_ROW = 5
CHART_HEIGHT = 17
"""Rows behind the chart."""
ROW = 13.0
"""Height of a row, so that two zones share a page. [pt]"""
FIRST_MONTH, YEAR = 2, 14
_Year: TypeAlias = Literal["sum", "mean", "none"]
"""What stands in the column of the year."""

GAINS = ("solar_gains", "internal_gains")
HEATING = (
    *("transmission_heating", "ventilation_heating", "gain_ratio", "gain_utilisation"),
    *("heating_spared", "heating_need", "heating_season"),
)
COOLING = (
    "solar_gains_cooling",
    *("transmission_cooling", "ventilation_cooling", "loss_ratio", "loss_utilisation", "cooling_need"),
    "cooling_season",
)
FANS = ("fan_electricity",)
FACTS = (
    "heating_use",
    "cooling_use",
    "exponent",
    "time_constant",
    "heat_capacity",
    "transmission_coefficient",
    "ventilation_coefficient",
    "heating_set_point",
    "cooling_set_point",
)
UNCONDITIONED = ("temperature", *GAINS, "transmission_heating", "ventilation_heating")
UNCONDITIONED_FACTS = (
    "adjustment_factor",
    "heat_capacity",
    "transmission_coefficient",
    "ventilation_coefficient",
)
GROUND = ("temperature", "heat_flow_heating", "heat_flow_cooling")
GROUND_FACTS = (
    *("equivalent_thickness", "area", "characteristic_dimension", "u_value", "coefficient"),
    *("inside_periodic_coefficient", "lag", "outside_periodic_coefficient"),
)
FACT_PLACES = (((1, 1), (2, 3)), ((4, 7), (8, 9)), ((10, 13), (14, 14)))
"""Columns of title and value of the figures that stand side by side."""


def write_monthly_balance(sheet: Worksheet, results: Results) -> None:
    """Write the sheet."""
    canvas = Canvas(sheet, (50, *[9.3] * 12, 12))
    head(canvas, results, sheet.title, REMARK)
    canvas.titles(HEADER_ROW, ("Quantity", *MONTHS, "Year"))
    energy = energy_digits(results)
    row = _building(canvas, HEADER_ROW + 1, results, energy)
    blocks = [(HEADER_ROW + 1, row - 1)]
    for zone in results.zones:
        first = row
        row = _zone(canvas, first, zone, energy)
        blocks.append((first, row - 1))
    for floor in results.ground_floors:
        first = row
        row = _ground_floor(canvas, first, floor)
        blocks.append((first, row - 1))
    canvas.keep_together(blocks, HEADER_ROW)
    sheet.freeze_panes = f"B{HEADER_ROW + 1}"
    print_setup(sheet, results.project.project, titles=f"{HEADER_ROW}:{HEADER_ROW}")


def _building(canvas: Canvas, row: int, results: Results, energy: str) -> int:
    """Flows into (+) and out of (−) the conditioned zones in heating mode; each month's sum is zero."""
    outdoor = results.climate.temperature
    _line(canvas, row, label_of(ClimateResult, "temperature"), _DIGITS["°C"], outdoor, "mean")
    row += 1
    _section(canvas, row, "Building in heating mode: heat into the conditioned zones (+) and out of them (−)")
    zones = conditioned(results)
    solar, internal = (sum_of(zones, field) for field in GAINS)
    transmission, ventilation = (sum_of(zones, field) for field in HEATING[:2])
    need = results.building.heating_need
    spared = sum_of(zones, "heating_spared")
    unused = transmission + ventilation - solar - internal - need - spared
    flows = (
        (label_of(ZoneResult, "heating_need"), need, VERMILLION),
        (label_of(ZoneResult, "internal_gains"), internal, YELLOW),
        (label_of(ZoneResult, "solar_gains"), solar, ORANGE),
        (label_of(ZoneResult, "heating_spared"), spared, GREEN),
        ("Transmission [kWh]", -transmission, BLUE),
        ("Ventilation [kWh]", -ventilation, SKY),
        ("Gains not used, and rounding [kWh]", unused, GREY),
    )
    first = row + 1
    for place, (title, months, _) in enumerate(flows):
        _line(canvas, first + place, title, energy, months)
    series = [
        Bars(Area.across(row, 1, 1), Area.across(row, FIRST_MONTH, FIRST_MONTH + 11), colour, hatched=months is spared)
        for row, (_, months, colour) in enumerate(flows, start=first)
    ]
    chart_row = first + len(flows) + 1
    canvas.space(chart_row - 1, chart_row + CHART_HEIGHT)
    add_columns(
        canvas.sheet,
        Area(chart_row, 1, chart_row + CHART_HEIGHT - 1, YEAR),
        ("Losses and gains of the building in heating mode", "kWh per month"),
        Area.across(HEADER_ROW, FIRST_MONTH, FIRST_MONTH + 11),
        series,
        stacked=True,
    )
    return chart_row + CHART_HEIGHT + 1


def _zone(canvas: Canvas, row: int, zone: ZoneResult, energy: str) -> int:
    """One zone; gives the row below it."""
    _section(canvas, row, f"{zone.name} · {zone.conditioning} · {zone.floor_area:,.1f} m²")
    if zone.conditioning == "unconditioned":
        return _facts(canvas, _lines(canvas, row + 1, zone, UNCONDITIONED, energy), zone, UNCONDITIONED_FACTS)
    row = _lines(canvas, row + 1, zone, GAINS, energy)
    for part in (HEATING, COOLING, FANS):
        row = _lines(canvas, row, zone, part, energy)
    return _facts(canvas, row, zone, FACTS)


def _ground_floor(canvas: Canvas, row: int, floor: GroundFloorResult) -> int:
    """One ground floor; gives the row below it."""
    _section(canvas, row, f"{floor.name} · {floor.type} · {floor.zone}")
    for place, name in enumerate(GROUND, start=row + 1):
        months = getattr(floor, name)
        digits = _DIGITS.get(_GROUND_UNITS[name]) or digits_for(months.tolist())
        _line(canvas, place, label_of(GroundFloorResult, name), digits, months, "mean")
    return _facts(canvas, row + 1 + len(GROUND), floor, GROUND_FACTS)


def _lines(canvas: Canvas, row: int, zone: ZoneResult, names: tuple[str, ...], energy: str) -> int:
    for name in names:
        unit = "months" if name.endswith("_season") else _UNITS[name]
        year: _Year = {"°C": "mean", "-": "none"}.get(unit, "sum")  # type: ignore[assignment]
        digits = _DIGITS.get(unit, energy)
        important = name.endswith("_need")
        _line(canvas, row, label_of(ZoneResult, name), digits, getattr(zone, name), year, important=important)
        row += 1
    return row


def _facts(canvas: Canvas, row: int, part: ZoneResult | GroundFloorResult, names: tuple[str, ...]) -> int:
    """Figures that hold for the whole year, three side by side; gives the row below a gap."""
    for start in range(0, len(names), len(FACT_PLACES)):
        for name, (title, place) in zip(names[start:], FACT_PLACES, strict=False):
            value = getattr(part, name)
            canvas.merged(row, *title, label_of(type(part), name), _BESIDE if title[0] > 1 else BODY)
            canvas.merged(row, *place, value, NUMBER, "General" if isinstance(value, str) else digits_for([value]))
        canvas.height(row, ROW)
        row += 1
    canvas.height(row, 8)
    return row + 1


def _line(
    canvas: Canvas,
    row: int,
    title: str,
    digits: str,
    months: Months,
    year: _Year = "sum",
    *,
    important: bool = False,
) -> None:
    """Twelve months and what the year makes of them."""
    style = _NUMBER_BOLD if important else NUMBER
    canvas.put(row, 1, title, _BOLD if important else BODY)
    canvas.numbers(row, FIRST_MONTH, months, style, digits)
    if year == "none":
        canvas.put(row, YEAR, None, style)
    else:
        canvas.numbers(row, YEAR, [float(np.sum(months)) if year == "sum" else year_mean(months)], style, digits)
    canvas.height(row, ROW)


def _section(canvas: Canvas, row: int, text: str) -> None:
    last = len(canvas.widths)
    canvas.merged(row, 1, last, text, _HEADING)
    canvas.fit_merged(row, 1, last, text, size=11, bold=True)


_DIGITS = {"°C": "0.0", "-": "0.00", "months": "0.0"}
_UNITS = {item.name: item.metadata["unit"] for item in fields(ZoneResult)}
_GROUND_UNITS = {item.name: item.metadata["unit"] for item in fields(GroundFloorResult)}
_HEADING = replace(SECTION, wrap=True)
_BOLD = replace(BODY, bold=True)
_BESIDE = replace(BODY, indent=1)
"""Text that follows a number."""
_NUMBER_BOLD = replace(NUMBER, bold=True)
