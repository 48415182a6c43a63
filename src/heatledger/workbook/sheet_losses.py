"""The sheet Element losses: every heat path of the conditioned zones, the largest loss first."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import fields

from openpyxl.worksheet.worksheet import Worksheet

from heatledger.results import ElementLoss, Results, label_of
from heatledger.workbook.canvas import Canvas
from heatledger.workbook.charts import BLUE, Area, Bars, add_bars
from heatledger.workbook.look import BODY, NUMBER, NUMBER_TOTAL, SECTION, SMALL, TOTAL
from heatledger.workbook.measure import DASH, LINE, shortened
from heatledger.workbook.monthly import head
from heatledger.workbook.pages import print_setup
from heatledger.workbook.printed import ROUNDED, energy_digits

__all__ = ["write_element_losses"]

REMARK = (
    "What each element, opening, thermal bridge and air flow loses in the months in which its zone needs heating, "
    "the largest first. Negative: heat from a warmer space. Shares are of the sum of what leaves the conditioned "
    f"zones; what passes between two of them stands last and is not part of it. {ROUNDED}"
)
MOST_BARS, MOST_OF_A_NAME = 15, 18
"""Bars of the chart, and characters of a name beside one."""
HEADER_ROW = 24
TOTAL_ROW = HEADER_ROW + 1
"""The sum stands above its parts, since their number and order change."""
LABEL_COLUMN = 11
"""Names for the chart, outside the printed area."""
_DIGITS = {"area": "#,##0.0", "u_value": "0.00", "coefficient": "#,##0.0", "share": "0.0"}
_SUMMED = ("coefficient", "loss", "share")
_COLUMNS = [item.name for item in fields(ElementLoss) if item.name != "between_zones"]


def write_element_losses(sheet: Worksheet, results: Results) -> None:
    """Write the sheet."""
    canvas = Canvas(sheet, (6, 34, 28, 14, 20, 10, 13, 13, 19, 12))
    head(canvas, results, sheet.title, REMARK)
    canvas.space(4, HEADER_ROW - 1)
    canvas.titles(HEADER_ROW, ("Rank", *(label_of(ElementLoss, name) for name in _COLUMNS)), text_columns=5)
    canvas.put(HEADER_ROW, LABEL_COLUMN, "Name in the chart", SMALL)
    ranked = sorted(results.element_losses, key=lambda loss: -loss.loss)
    losses = [loss for loss in ranked if not loss.between_zones]
    digits = {**_DIGITS, "loss": energy_digits(results)}
    _total(canvas, losses, digits)
    for rank, loss in enumerate(losses, start=1):
        _row(canvas, TOTAL_ROW + rank, rank, loss, digits)
    last = TOTAL_ROW + len(losses)
    last = _between_zones(canvas, last, [loss for loss in ranked if loss.between_zones], digits)
    if losses:
        _chart(sheet, min(len(losses), MOST_BARS))
    sheet.column_dimensions["K"].width = 30
    sheet.print_area = f"A1:J{last}"
    print_setup(sheet, results.project.project, titles=f"{HEADER_ROW}:{HEADER_ROW}")


def _between_zones(canvas: Canvas, last: int, losses: Sequence[ElementLoss], digits: dict[str, str]) -> int:
    """Rows of what passes between conditioned zones, below the others; gives the last row."""
    if not losses:
        return last
    text = "Between conditioned zones: heat that the building does not lose"
    canvas.merged(last + 2, 1, LABEL_COLUMN - 1, text, SECTION)
    canvas.fit_merged(last + 2, 1, LABEL_COLUMN - 1, text, size=11, bold=True)
    for row, loss in enumerate(losses, start=last + 3):
        _row(canvas, row, None, loss, digits)
    return last + 2 + len(losses)


def _row(canvas: Canvas, row: int, rank: int | None, loss: ElementLoss, digits: dict[str, str]) -> None:
    canvas.put(row, 1, rank, BODY)
    for place, name in enumerate(_COLUMNS, start=2):
        value = getattr(loss, name)
        shown = DASH if loss.between_zones and name == "share" else value
        canvas.put(row, place, shown, BODY if isinstance(value, str) else NUMBER, digits.get(name, "General"))
    if rank is not None:
        label = f"{shortened(loss.name, MOST_OF_A_NAME)} · {shortened(loss.zone, MOST_OF_A_NAME)}"
        canvas.put(row, LABEL_COLUMN, label, SMALL)
    canvas.fit(row, ("", loss.name, loss.zone, loss.kind, loss.faces))


def _total(canvas: Canvas, losses: Sequence[ElementLoss], digits: dict[str, str]) -> None:
    canvas.put(TOTAL_ROW, 1, None, TOTAL)
    for place, name in enumerate(_COLUMNS, start=2):
        value = sum(getattr(loss, name) for loss in losses) if name in _SUMMED else None
        canvas.put(TOTAL_ROW, place, value, NUMBER_TOTAL, digits.get(name, "General"))
    canvas.put(TOTAL_ROW, 2, "Sum", TOTAL)
    canvas.height(TOTAL_ROW, LINE + 4)


def _chart(sheet: Worksheet, bars: int) -> None:
    column = 2 + _COLUMNS.index("loss")
    first, last = TOTAL_ROW + 1, TOTAL_ROW + bars
    names = Area.down(LABEL_COLUMN, first, last)
    values = Bars(Area.across(HEADER_ROW, column, column), Area.down(column, first, last), BLUE)
    titles = ("The largest losses in months with heating", "kWh a year")
    add_bars(sheet, Area(5, 1, HEADER_ROW - 2, LABEL_COLUMN - 1), titles, names, [values])
