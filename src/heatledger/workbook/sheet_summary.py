"""The sheet Summary: one printed page for the client."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import replace

import numpy as np
from openpyxl.worksheet.worksheet import Worksheet

from heatledger.results import BuildingResult, ClimateResult, Months, ProjectResult, Results, label_of
from heatledger.workbook.canvas import Canvas
from heatledger.workbook.charts import BLUE, SKY, VERMILLION, Area, Bars, add_bars, add_columns
from heatledger.workbook.guide import CAUTIONS
from heatledger.workbook.look import (
    BODY,
    HEAD,
    HEAD_NUMBER,
    LINK,
    LONG,
    MONTHS,
    NUMBER,
    NUMBER_TOTAL,
    SECTION,
    SMALL,
    TOTAL,
    Style,
)
from heatledger.workbook.monthly import months_of_need
from heatledger.workbook.pages import print_setup
from heatledger.workbook.printed import ROUNDED, energy_digits, energy_text
from heatledger.workbook.sheet_notes import NOTES
from heatledger.workbook.summary_words import drivers, headline, losses_by_kind, one_of_each_kind, second_look

__all__ = ["write_summary"]

LAST = 14
"""Last column: a column of words, twelve months, the year."""
MOST_CHECKS = 3
"""Kinds of checks that the page quotes; sheet Notes holds all of them."""
_PROJECT_TITLE = Style(bold=True, size=16, colour=SECTION.colour)
_LABEL = Style(size=9, colour=SMALL.colour)
_VALUE = Style(size=9)


def write_summary(sheet: Worksheet, results: Results) -> None:
    """Write the sheet; every part keeps its rows whatever the results are."""
    canvas = Canvas(sheet, (22, *[7.4] * 12, 9))
    _project(canvas, results)
    _headline(canvas, 7, results)
    _key_figures(canvas, 8, results)
    _months(canvas, 17, results)
    _losses(canvas, 39, results)
    _last_words(canvas, 56, results)
    for gap in (12, 21, 38, 55):
        canvas.height(gap, 8)
    print_setup(sheet, results.project.project, portrait=True, one_page=True)


def _project(canvas: Canvas, results: Results) -> None:
    """Rows 1 to 6."""
    project, climate = results.project, results.climate
    canvas.merged(1, 1, LAST, project.project, _PROJECT_TITLE)
    canvas.fit_merged(1, 1, LAST, project.project, size=16, bold=True)
    canvas.merged(2, 1, LAST, "Monthly heating and cooling need", Style(colour=SMALL.colour))
    canvas.height(2, 18)
    pairs = (
        (_entry(project, "address"), _entry(project, "client")),
        (_entry(project, "assessor"), _entry(project, "job_number")),
        ((label_of(ClimateResult, "name"), climate.name), _entry(project, "method")),
        (
            (label_of(BuildingResult, "floor_area"), results.building.floor_area),
            _entry(project, "dimensions"),
        ),
    )
    for row, pair in enumerate(pairs, start=3):
        heights = []
        for (label, value), (first, last) in zip(pair, ((1, 7), (8, LAST)), strict=True):
            after = first + 1 if first == 1 else first + 3
            canvas.merged(row, first, after - 1, label, _LABEL)
            canvas.merged(row, after, last, value, _VALUE, "#,##0.0")
            heights.append(
                max(
                    canvas.fit_merged(row, a, b, str(text), size=9)
                    for a, b, text in ((first, after - 1, label), (after, last, value))
                )
            )
        canvas.height(row, max(heights))


def _entry(project: ProjectResult, field: str) -> tuple[str, str]:
    return label_of(ProjectResult, field), str(getattr(project, field)) or "–"


def _headline(canvas: Canvas, row: int, results: Results) -> None:
    """Row 7: what the page says, in one sentence."""
    text = headline(results)
    canvas.merged(row, 1, LAST, text, _HEADLINE)
    canvas.height(row, canvas.fit_merged(row, 1, LAST, text, size=11, bold=True) + 12)


def _key_figures(canvas: Canvas, row: int, results: Results) -> None:
    """Rows 8 to 16."""
    _heading(canvas, row, "Key figures")
    spans = ((1, 3), (4, 5), (6, 7), (8, 10), (11, LAST))
    titles = ("", "kWh a year", "kWh/m² a year", "Largest month", "Months above 1 % of the year")
    for (first, last), title in zip(spans, titles, strict=True):
        canvas.merged(row + 1, first, last, title, HEAD_NUMBER if first in {4, 6} else _HEAD_INDENTED)
    canvas.height(row + 1, 16)
    for place, field in enumerate(("heating_need", "cooling_need"), start=row + 2):
        _figure_row(canvas, place, field, spans, results)
    for place, sentence in enumerate(drivers(results), start=row + 5):
        canvas.merged(place, 1, LAST, sentence or None, LONG)
        canvas.fit_merged(place, 1, LAST, sentence)


def _figure_row(canvas: Canvas, row: int, field: str, spans: Sequence[tuple[int, int]], results: Results) -> None:
    building = results.building
    need: Months = getattr(building, field)
    year = float(np.sum(need))
    largest = int(np.argmax(need))
    share = year / building.floor_area if building.floor_area else None
    month = f"{MONTHS[largest]}, {energy_text(results, need[largest])} kWh" if year > 0 else "none"
    title = label_of(BuildingResult, field).partition(" [")[0]
    values = (title, year, share, month, months_of_need(need))
    digits = ("", energy_digits(results), '0.0;-0.0;"–"', "", "")
    for (first, last), value, number_format in zip(spans, values, digits, strict=True):
        style = _FIGURE if not isinstance(value, str) else _NAME if first == 1 else _WORDS
        canvas.merged(row, first, last, value, style, number_format or "General")
    canvas.height(row, 20)


_HEAD_INDENTED = replace(HEAD, indent=1)
_HEADLINE = replace(LONG, bold=True, size=11, vertical="center")
_FIGURE = replace(NUMBER, bold=True, size=12, vertical="center")
_NAME = Style(bold=True, border=BODY.border, vertical="center", wrap=False)
_WORDS = Style(border=BODY.border, vertical="center", wrap=False, indent=1)


def _months(canvas: Canvas, row: int, results: Results) -> None:
    """Rows 17 to 37: the needs month by month and their chart."""
    _heading(canvas, row, "Month by month")
    canvas.titles(row + 1, ("Need", *MONTHS, "Year"))
    canvas.height(row + 1, 16)
    needs = ("heating_need", "cooling_need")
    for place, field in enumerate(needs, start=row + 2):
        need: Months = getattr(results.building, field)
        canvas.put(place, 1, label_of(BuildingResult, field), BODY)
        digits = energy_digits(results)
        canvas.numbers(place, 2, need, NUMBER, digits)
        canvas.put(place, LAST, float(np.sum(need)), NUMBER, digits)
        canvas.height(place, 15)
    canvas.space(row + 5, row + 20, 12)
    series = [
        Bars(Area.across(place, 1, 1), Area.across(place, 2, 13), colour)
        for place, colour in ((row + 2, VERMILLION), (row + 3, SKY))
    ]
    titles = ("Heating and cooling need of the building", "kWh per month")
    add_columns(canvas.sheet, Area(row + 5, 1, row + 20, LAST), titles, Area.across(row + 1, 2, 13), series)


def _losses(canvas: Canvas, row: int, results: Results) -> None:
    """Rows 39 to 54: the losses by kind and their chart."""
    _heading(canvas, row, "Where the heat goes in months with heating")
    canvas.put(row + 1, 1, "Loss", HEAD)
    canvas.merged(row + 1, 2, 3, "kWh a year", HEAD_NUMBER)
    canvas.merged(row + 1, 4, 5, "Share [%]", HEAD_NUMBER)
    groups = losses_by_kind(results.element_losses)
    digits = energy_digits(results)
    for place, group in enumerate(groups, start=row + 2):
        _loss_row(canvas, place, group, (BODY, NUMBER), digits)
    total = ("Sum", sum(loss for _, loss, _ in groups), sum(share for _, _, share in groups))
    _loss_row(canvas, row + 2 + len(groups), total, (TOTAL, NUMBER_TOTAL), digits)
    canvas.space(row + 1, row + 15)
    first, last = row + 2, row + 1 + len(groups)
    values = Bars(Area.across(row + 1, 2, 2), Area.down(2, first, last), BLUE)
    titles = ("Losses by kind", "kWh a year")
    add_bars(canvas.sheet, Area(row + 1, 6, row + 15, LAST), titles, Area.down(1, first, last), [values])


def _loss_row(
    canvas: Canvas, row: int, group: tuple[str, float, float], styles: tuple[Style, Style], digits: str
) -> None:
    canvas.put(row, 1, group[0], styles[0])
    for first, value, number_format in ((2, group[1], digits), (4, group[2], '0.0;-0.0;"–"')):
        canvas.merged(row, first, first + 1, value, styles[1], number_format)


def _last_words(canvas: Canvas, row: int, results: Results) -> None:
    """From row 56: what to doubt, and the cautions."""
    _heading(canvas, row, "What to doubt")
    checks = [note for note in results.notes if note.kind == "check"]
    quoted = one_of_each_kind(checks)
    for place in range(MOST_CHECKS):
        text = f"• {quoted[place]}" if place < len(quoted) else None
        canvas.merged(row + 1 + place, 1, LAST, text, _VALUE)
        canvas.height(row + 1 + place, 1)
        if text:
            canvas.fit_merged(row + 1 + place, 1, LAST, text, size=9)
    row += MOST_CHECKS + 1
    cell = canvas.merged(row, 1, LAST, second_look(len(checks)), replace(LINK, border=LONG.border) if checks else LONG)
    canvas.link(cell, NOTES)
    canvas.height(row, 16)
    _heading(canvas, row + 1, "Cautions")
    for place, caution in enumerate((*CAUTIONS, f"Figures: {ROUNDED[0].lower()}{ROUNDED[1:]}"), start=row + 2):
        canvas.merged(place, 1, LAST, caution, SMALL)
        canvas.fit_merged(place, 1, LAST, caution, size=8.5)


def _heading(canvas: Canvas, row: int, text: str) -> None:
    canvas.put(row, 1, text, SECTION)
    canvas.height(row, 18)
