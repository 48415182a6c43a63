"""The sheet Element losses: every heat path of the conditioned zones, the largest loss first."""

from __future__ import annotations

from dataclasses import fields

from openpyxl.worksheet.worksheet import Worksheet

from heatledger.results import ElementLoss, Results, label_of
from heatledger.workbook.charts import BLUE, Area, Bars, add_bars
from heatledger.workbook.look import BODY, NUMBER, NUMBER_TOTAL, SMALL, TOTAL, Canvas, digits_for, print_setup
from heatledger.workbook.monthly import head

__all__ = ["write_element_losses"]

REMARK = (
    "What each element, opening, thermal bridge and air flow loses in the months in which its zone needs heating, "
    "the largest first."
)
MOST_BARS = 15
HEADER_ROW = 24
LABEL_COLUMN = 11
"""Names for the chart, outside the printed area."""
_DIGITS = {"area": "#,##0.0", "u_value": "0.00", "coefficient": "#,##0.0", "share": "0.0"}
_SUMMED = ("coefficient", "loss", "share")


def write_element_losses(sheet: Worksheet, results: Results) -> None:
    """Write the sheet."""
    canvas = Canvas(sheet, (7, 32, 24, 15, 20, 10, 13, 13, 19, 11))
    head(canvas, results, sheet.title, REMARK)
    canvas.space(4, HEADER_ROW - 1)
    names = [item.name for item in fields(ElementLoss)]
    canvas.titles(HEADER_ROW, ("Rank", *(label_of(ElementLoss, name) for name in names)), text_columns=5)
    canvas.put(HEADER_ROW, LABEL_COLUMN, "Name in the chart", SMALL)
    losses = sorted(results.element_losses, key=lambda loss: -loss.loss)
    digits = {**_DIGITS, "loss": digits_for(loss.loss for loss in losses)}
    for rank, loss in enumerate(losses, start=1):
        _row(canvas, HEADER_ROW + rank, rank, loss, digits)
    _total(canvas, HEADER_ROW + len(losses) + 1, results, digits)
    if losses:
        _chart(sheet, min(len(losses), MOST_BARS))
    sheet.column_dimensions["K"].width = 30
    sheet.print_area = f"A1:J{HEADER_ROW + len(losses) + 1}"
    print_setup(sheet, results.project.project, titles=f"{HEADER_ROW}:{HEADER_ROW}")


def _row(canvas: Canvas, row: int, rank: int, loss: ElementLoss, digits: dict[str, str]) -> None:
    canvas.put(row, 1, rank, BODY)
    for place, item in enumerate(fields(ElementLoss), start=2):
        value = getattr(loss, item.name)
        is_text = isinstance(value, str)
        canvas.put(row, place, value, BODY if is_text else NUMBER, digits.get(item.name, "General"))
    label = f"{loss.name} · {loss.zone}"
    canvas.put(row, LABEL_COLUMN, label if len(label) <= 48 else label[:47] + "…", SMALL)
    canvas.fit(row, ("", loss.name, loss.zone, loss.kind, loss.faces))


def _total(canvas: Canvas, row: int, results: Results, digits: dict[str, str]) -> None:
    canvas.put(row, 1, None, TOTAL)
    for place, item in enumerate(fields(ElementLoss), start=2):
        summed = item.name in _SUMMED
        value = sum(getattr(loss, item.name) for loss in results.element_losses) if summed else None
        canvas.put(row, place, value, NUMBER_TOTAL, digits.get(item.name, "General"))
    canvas.put(row, 2, "Sum", TOTAL)


def _chart(sheet: Worksheet, bars: int) -> None:
    column = 2 + [item.name for item in fields(ElementLoss)].index("loss")
    names = Area.down(LABEL_COLUMN, HEADER_ROW + 1, HEADER_ROW + bars)
    values = Bars(Area.across(HEADER_ROW, column, column), Area.down(column, HEADER_ROW + 1, HEADER_ROW + bars), BLUE)
    titles = ("The largest losses in months with heating", "kWh a year")
    add_bars(sheet, Area(5, 1, HEADER_ROW - 2, LABEL_COLUMN - 1), titles, names, [values])
