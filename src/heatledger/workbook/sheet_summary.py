"""The sheet Summary: one printed page for the client."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import replace

import numpy as np
from openpyxl.worksheet.worksheet import Worksheet

from heatledger.results import (
    BuildingResult,
    ClimateResult,
    ElementLoss,
    Months,
    Note,
    ProjectResult,
    Results,
    label_of,
)
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
from heatledger.workbook.monthly import conditioned, months_of_need, sum_of
from heatledger.workbook.pages import print_setup
from heatledger.workbook.printed import ROUNDED, energy_digits, energy_text, shares_in_tenths
from heatledger.workbook.sheet_notes import NOTES

__all__ = ["LOSS_GROUPS", "write_summary"]

LAST = 14
"""Last column: a column of words, twelve months, the year."""
LOSS_GROUPS = {
    "wall": "Walls",
    "roof": "Roofs",
    "floor": "Floors",
    "door": "Doors",
    "partition": "Partitions",
    "opening": "Openings",
    "ground floor": "Ground floors",
    "thermal bridge": "Thermal bridges",
    "air leakage": "Air leakage",
    "ventilation": "Ventilation",
}
"""Kinds of losses as the summary names them, in its order."""
MOST_CHECKS, MOST_OF_A_CHECK = 3, 190
"""Kinds of checks that the page quotes, and their characters; sheet Notes holds all of them."""
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
    parts = [_need_in_words(results, field, word) for field, word in _NEEDS.items()]
    text = f"Each year the building needs {parts[0]}, and {parts[1]}."
    canvas.merged(row, 1, LAST, text, _HEADLINE)
    canvas.height(row, canvas.fit_merged(row, 1, LAST, text, size=11, bold=True) + 12)


def _need_in_words(results: Results, field: str, word: str) -> str:
    building = results.building
    need: Months = getattr(building, field)
    year = float(np.sum(need))
    if year <= 0:
        return f"no {word}"
    share = f"{year / building.floor_area:,.1f} kWh/m²"
    return f"{energy_text(results, year)} kWh of {word} ({share}), most in {_FULL_MONTHS[int(np.argmax(need))]}"


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
    for place, sentence in enumerate(_sentences(results), start=row + 5):
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
_NEEDS = {"heating_need": "heating", "cooling_need": "cooling"}
_FULL_MONTHS = (
    *("January", "February", "March", "April", "May", "June"),
    *("July", "August", "September", "October", "November", "December"),
)
_HEADLINE = replace(LONG, bold=True, size=11, vertical="center")
_FIGURE = replace(NUMBER, bold=True, size=12, vertical="center")
_NAME = Style(bold=True, border=BODY.border, vertical="center", wrap=False)
_WORDS = Style(border=BODY.border, vertical="center", wrap=False, indent=1)


def _sentences(results: Results) -> tuple[str, ...]:
    return _largest_loss(results), _driver_of_heating(results), _driver_of_cooling(results), _neediest_zones(results)


def _largest_loss(results: Results) -> str:
    losses = [loss for loss in results.element_losses if not loss.between_zones]
    if not losses:
        return "Largest single loss: none, no zone is heated."
    top = max(losses, key=lambda loss: loss.loss)
    return (
        f"Largest single loss: {top.name} ({top.kind}, {top.zone}), {energy_text(results, top.loss)} kWh a year, "
        f"{top.share:.0f} % of the losses."
    )


def _driver_of_heating(results: Results) -> str:
    groups = {title: share for title, _, share in _grouped(results.element_losses)}
    if not any(groups.values()):
        return "Main driver of heating: none."
    title = max(groups, key=lambda name: groups[name])
    return f"Main driver of heating: {title.lower()}, {groups[title]:.0f} % of the losses in months with heating."


def _driver_of_cooling(results: Results) -> str:
    """The larger of sun and internal gains while there is a need for cooling."""
    zones = [zone for zone in conditioned(results) if np.nansum(zone.cooling_need) > 0]
    season = results.building.cooling_need > 0
    gains = {
        "solar gains": float(np.sum(sum_of(zones, "solar_gains_cooling"), where=season)),
        "internal gains": float(np.sum(sum_of(zones, "internal_gains"), where=season)),
    }
    total = sum(gains.values())
    if total <= 0:
        return "Main driver of cooling: none, there is no need for cooling."
    name = max(gains, key=lambda key: gains[key])
    share = 100 * gains[name] / total
    return f"Main driver of cooling: {name}, {share:.0f} % of the gains of the cooled zones in months with cooling."


def _neediest_zones(results: Results) -> str:
    """Nothing to compare in a building of one zone."""
    zones = conditioned(results)
    parts = []
    for field, word in _NEEDS.items():
        needs = {zone.name: float(np.sum(getattr(zone, field))) / zone.floor_area for zone in zones}
        name = max(needs, key=lambda zone: needs[zone], default="")
        if name and needs[name] > 0:
            parts.append(f"for {word} {name}, {needs[name]:,.1f} kWh/m² a year")
    return f"Largest need per floor area: {'; '.join(parts)}." if parts and len(zones) > 1 else ""


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


def _grouped(losses: Sequence[ElementLoss]) -> list[tuple[str, float, float]]:
    """Title, loss [kWh] and share of the sum [%] of each kind of loss, always in the same order.

    What passes between conditioned zones is left out. Shares are rounded so that they add up to 100 as printed.
    """
    sums = dict.fromkeys(LOSS_GROUPS.values(), 0.0)
    for loss in losses:
        if not loss.between_zones:
            sums[LOSS_GROUPS[loss.kind]] += loss.loss
    shares = shares_in_tenths(list(sums.values()))
    return [(title, loss, share) for (title, loss), share in zip(sums.items(), shares, strict=True)]


def _losses(canvas: Canvas, row: int, results: Results) -> None:
    """Rows 39 to 54: the losses by kind and their chart."""
    _heading(canvas, row, "Where the heat goes in months with heating")
    canvas.put(row + 1, 1, "Loss", HEAD)
    canvas.merged(row + 1, 2, 3, "kWh a year", HEAD_NUMBER)
    canvas.merged(row + 1, 4, 5, "Share [%]", HEAD_NUMBER)
    groups = _grouped(results.element_losses)
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
    quoted = _one_of_each_kind(checks)
    for place in range(MOST_CHECKS):
        text = f"• {quoted[place]}" if place < len(quoted) else None
        canvas.merged(row + 1 + place, 1, LAST, text, _VALUE)
        canvas.height(row + 1 + place, 1)
        if text:
            canvas.fit_merged(row + 1 + place, 1, LAST, text, size=9)
    row += MOST_CHECKS + 1
    cell = canvas.merged(row, 1, LAST, _second_look(len(checks)), replace(LINK, border=LONG.border) if checks else LONG)
    canvas.link(cell, NOTES)
    canvas.height(row, 16)
    _heading(canvas, row + 1, "Cautions")
    for place, caution in enumerate((*CAUTIONS, f"Figures: {ROUNDED[0].lower()}{ROUNDED[1:]}"), start=row + 2):
        canvas.merged(place, 1, LAST, caution, SMALL)
        canvas.fit_merged(place, 1, LAST, caution, size=8.5)


def _second_look(checks: int) -> str:
    words = {0: "No figure asks for a second look.", 1: "1 check asks for a second look: see sheet Notes."}
    return words.get(checks, f"{checks} checks ask for a second look: see sheet Notes.")


def _one_of_each_kind(checks: Sequence[Note]) -> list[str]:
    """The first check on each column of the workbook, with the number of others on it."""
    alike: dict[tuple[str, str], list[Note]] = {}
    for check in checks:
        alike.setdefault((check.sheet, check.cell.rstrip("0123456789")), []).append(check)
    return [
        _short(first.text) + (f" And {len(others)} more like it." if others else "")
        for first, *others in alike.values()
    ]


def _short(text: str) -> str:
    """A check as far as two lines hold it."""
    return text if len(text) <= MOST_OF_A_CHECK else text[: MOST_OF_A_CHECK - 1].rstrip() + "…"


def _heading(canvas: Canvas, row: int, text: str) -> None:
    canvas.put(row, 1, text, SECTION)
    canvas.height(row, 18)
