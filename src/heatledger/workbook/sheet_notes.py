"""The sheet Notes: what asks for a second look, defaults used, methods and sources."""

from __future__ import annotations

from collections.abc import Sequence
from textwrap import wrap

from openpyxl.worksheet.worksheet import Worksheet

from heatledger.results import Note, NoteKind, Results
from heatledger.workbook.canvas import Canvas
from heatledger.workbook.look import BODY, LINK, SECTION
from heatledger.workbook.measure import LINE
from heatledger.workbook.monthly import head
from heatledger.workbook.pages import print_setup

__all__ = ["NOTES", "write_notes"]

NOTES = "Notes"
REMARK = (
    "A click on a cell's name leads to the cell. Result sheets are written anew at each run: "
    "keep remarks of your own on other sheets."
)
GROUPS: dict[NoteKind, str] = {
    "check": "Please look at these again",
    "default": "Defaults used for empty cells",
    "method": "Method, step by step",
    "source": "Sources of data",
}
FIRST_ROW = 5
MOST_OF_A_ROW = 2000
"""Characters, so that no row is higher than a row can be; names of many rows may make a long note."""


def write_notes(sheet: Worksheet, results: Results) -> None:
    """Write the sheet."""
    canvas = Canvas(sheet, (28, 112))
    head(canvas, results, sheet.title, REMARK)
    canvas.titles(FIRST_ROW - 1, ("Cell", "Note"), text_columns=2)
    row = FIRST_ROW
    for kind, title in GROUPS.items():
        row = _group(canvas, row, title, [note for note in results.notes if note.kind == kind])
    sheet.freeze_panes = f"A{FIRST_ROW}"
    print_setup(sheet, results.project.project, titles=f"{FIRST_ROW - 1}:{FIRST_ROW - 1}")


def _group(canvas: Canvas, row: int, title: str, notes: Sequence[Note]) -> int:
    canvas.put(row, 1, f"{title}: {len(notes) or 'none'}", SECTION)
    canvas.height(row, LINE * 1.8)
    for note in notes:
        place = f"{note.sheet}!{note.cell}" if note.cell else note.sheet
        cell = canvas.put(row + 1, 1, place, LINK if note.sheet else BODY)
        if note.sheet:
            canvas.link(cell, note.sheet, note.cell or "A1")
        for part in wrap(note.text, MOST_OF_A_ROW):
            row += 1
            canvas.put(row, 2, part, BODY)
            canvas.fit(row, (place, part))
    return row + 1
