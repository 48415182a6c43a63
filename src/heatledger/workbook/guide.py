"""The Guide sheet: how to fill in, the legend, the cautions."""

from __future__ import annotations

from openpyxl.worksheet.worksheet import Worksheet

from heatledger.inputs.rows import SHEETS
from heatledger.workbook.canvas import Canvas
from heatledger.workbook.look import INPUT, LINK, OPTIONAL, PURPOSE, REQUIRED, SECTION, SMALL, TITLE, UNIT, Style
from heatledger.workbook.pages import print_setup
from heatledger.workbook.slips import MISSING, SLIP

__all__ = ["CAUTIONS", "TITLE_OF_GUIDE", "write_guide"]

TITLE_OF_GUIDE = "Guide"

CAUTIONS = (
    "The figures are an estimate by a monthly method. They do not size plant and are no certificate.",
    "Local codes and licensed practice decide.",
    "A tighter envelope needs planned fresh air. Open-flued appliances need an air supply that a qualified person "
    "has checked.",
    "Insulation on the inside, and any damp, need a moisture check before work begins.",
)
"""What a reader of any figure has to know; printed on the guide and on the summary."""

STEPS = (
    "Fill in the sheets from left to right. The dropdowns offer the names typed on the other sheets; a name that is "
    "not there yet stands in bold orange until it is.",
    "Start with Project and Zones. One zone is a space, or several, with one set-point and one use.",
    "Usage and Materials come filled in. Change the rows or add your own.",
    "Then the build-ups and glazed units, the envelope with its openings, the ground floors and thermal bridges.",
    "Leave an optional cell empty to take its default. The results list every default that was used.",
    "Save the file, then type in a terminal:  heatledger check FILE  and, when nothing is left to mend,  "
    "heatledger run FILE. The results come as new sheets of this workbook. Each run writes them anew, so keep "
    "remarks of your own on other sheets.",
    "You may move columns, add, sort and filter rows, and keep columns and sheets of your own. Keep the titles of "
    "ours.",
)

EXPLAINED = (
    "Every title carries a note with the unit, the limits, the default and the source of typical values. "
    "The short form stands beside the cell while you fill it in; on Project it stands in column D."
)

_MEANING = Style(indent=1)
_CODE = Style(bold=True, horizontal="center")
_SAMPLES: tuple[tuple[Style, str, str], ...] = (
    (REQUIRED, "Dark title", "Must be filled in on every row that is used."),
    (OPTIONAL, "Light title", "May stay empty; its default then counts."),
    (INPUT, "Pale cell", "Type here. Unused rows stay empty."),
    (UNIT, "m²", "The unit of the column, in the row above its title."),
    (Style(italic=True, size=8.5, colour=SMALL.colour), "e.g. 0.77", "An example, above the unit; nothing there is "
     "read."),
    (Style(bold=True, colour=SLIP, border=INPUT.border, fill=INPUT.fill), "1,2", "Bold orange: text where a number is "
     "expected, a number outside its limits or typed in another unit, a name that is not in the list or stands twice, "
     "two cells that contradict each other, openings that together are larger than their element."),
    (Style(border=INPUT.border, fill=MISSING), "", "Orange cell: this row is used, and the cell must not stay empty."),
)  # fmt: skip


def write_guide(sheet: Worksheet, project: str) -> None:
    """Write the guide on an empty sheet."""
    canvas = Canvas(sheet, (5, 22, 92))
    canvas.put(1, 1, "How to fill in this workbook", TITLE)
    canvas.height(1, 24)
    canvas.put(2, 1, "From the building to its monthly heating and cooling need.", PURPOSE)
    row = _steps(canvas, 4)
    row = _legend(canvas, row + 1)
    row = _sheets(canvas, row + 1)
    _cautions(canvas, row + 1)
    print_setup(sheet, project, portrait=True, one_page=True)


def _heading(canvas: Canvas, row: int, text: str) -> int:
    canvas.put(row, 1, text, SECTION)
    canvas.height(row, 18)
    return row + 1


def _steps(canvas: Canvas, row: int) -> int:
    row = _heading(canvas, row, "Steps")
    for number, step in enumerate(STEPS, start=1):
        canvas.put(row, 1, number, _CODE)
        canvas.merged(row, 2, 3, step)
        canvas.fit_merged(row, 2, 3, step)
        row += 1
    return row


def _legend(canvas: Canvas, row: int) -> int:
    row = _heading(canvas, row, "Legend")
    for style, sample, meaning in _SAMPLES:
        canvas.put(row, 2, sample, style)
        canvas.put(row, 3, meaning, _MEANING)
        canvas.fit(row, ("", sample, meaning))
        row += 1
    canvas.merged(row, 2, 3, EXPLAINED)
    canvas.fit_merged(row, 2, 3, EXPLAINED)
    return row + 1


def _sheets(canvas: Canvas, row: int) -> int:
    row = _heading(canvas, row, "Sheets")
    for model in SHEETS:
        canvas.link(canvas.put(row, 2, model.sheet, LINK), model.sheet)
        canvas.put(row, 3, model.purpose)
        canvas.fit(row, ("", model.sheet, model.purpose))
        row += 1
    return row


def _cautions(canvas: Canvas, row: int) -> None:
    row = _heading(canvas, row, "Cautions")
    for caution in CAUTIONS:
        canvas.put(row, 1, "•", _CODE)
        canvas.merged(row, 2, 3, caution)
        canvas.fit_merged(row, 2, 3, caution)
        row += 1
