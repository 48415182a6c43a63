"""What stands beside and on the cells: dropdowns, limits, prompts, and notes on the titles."""

from __future__ import annotations

from typing import Literal

from openpyxl.comments import Comment
from openpyxl.utils.cell import absolute_coordinate
from openpyxl.worksheet.datavalidation import DataValidation
from openpyxl.worksheet.worksheet import Worksheet

from heatledger.inputs.columns import Column
from heatledger.workbook.measure import LINE, line_count
from heatledger.workbook.pages import CREATOR
from heatledger.workbook.slips import Field, limits, mark_slips

__all__ = ["guard", "guard_titles", "note", "story"]

MOST_PROMPT, MOST_TITLE = 255, 32
"""Characters an input prompt and its title may have (ECMA-376 Part 1, 18.3.1.32)."""


def story(column: Column) -> str:
    """Help with the default that an empty cell stands for."""
    stands = f"{column.default:g}" if isinstance(column.default, int | float) else str(column.default)
    source = f" ({column.default_note})" if column.default_note else ""
    if column.default is not None:
        return f"{column.help} Empty: {stands}{source}."
    if column.default_note and "Empty:" not in column.help:
        return f"{column.help} Empty: {column.default_note}."
    return column.help


def note(column: Column) -> Comment:
    """The note of a title: everything there is to know about its column."""
    need = "Required" if column.required else "Optional"
    text = f"{column.label}\n{need}: {column.expected}.\n{story(column)}"
    comment = Comment(text, CREATOR)
    comment.width, comment.height = 330, int((line_count(text, 52) + 1) * LINE * 4 / 3)
    return comment


def guard(sheet: Worksheet, field: Field, *, prompt: bool = True, names_stand_before: bool = False) -> None:
    """Dropdown or limits, the prompt beside the cell, and the marking of slips.

    Names of a sheet that is filled in later are marked only: a question at each of them would be in the way.
    """
    validation = _validation(field)
    if field.column.kind == "name" and not names_stand_before:
        validation.showErrorMessage = False
    validation.allow_blank = True
    if prompt:
        told = story(field.column)
        validation.promptTitle = field.column.label[:MOST_TITLE]
        validation.prompt = told if len(told) <= MOST_PROMPT else field.column.help[:MOST_PROMPT]
        validation.showInputMessage = True
    if prompt or validation.type:
        validation.add(field.cells)
        sheet.add_data_validation(validation)
    mark_slips(sheet, field)


def guard_titles(sheet: Worksheet, cells: str, place: Literal["ROW", "COLUMN"]) -> None:
    """Refuse what is typed over titles: without them nothing is found. Moving and inserting stay free.

    A row inserted below the titles takes over their guard, so it looks whether it still stands in the row of titles.
    """
    first = cells.partition(":")[0]
    moved = f"{place}({first})<>{place}({absolute_coordinate(first)})"
    refusing = DataValidation(type="custom", formula1=moved, errorTitle="Please keep the title", allow_blank=False)
    refusing.error = "The titles tell heatledger what stands where. Press Esc, and type in the pale cells."
    refusing.showErrorMessage = True
    refusing.add(cells)
    sheet.add_data_validation(refusing)


def _validation(field: Field) -> DataValidation:
    column = field.column
    match column.kind:
        case "number" | "integer":
            low, high = limits(column)
            found = DataValidation(
                type="whole" if column.kind == "integer" else "decimal",
                operator="between",
                formula1=f"{low:.15g}",
                formula2=f"{high:.15g}",
            )
            return _stopping(found, f"Type {column.expected}.")
        case "choice":
            return _stopping(DataValidation(type="list", formula1=field.list), "Choose a word of the list.")
        case "name":
            # A row may be typed before the row it refers to: ask, but let it stand.
            found = DataValidation(type="list", formula1=field.list, errorStyle="warning")
            return _stopping(found, f"Sheet {column.names_from} has no such name yet. Keep it?")
        case "azimuth" | "months" | "text":  # the dropdown offers words; degrees and paths may be typed as well
            return DataValidation(type="list" if field.list else None, formula1=field.list or None)


def _stopping(validation: DataValidation, message: str) -> DataValidation:
    validation.showErrorMessage = True
    validation.errorTitle = "Please check"
    validation.error = message
    return validation
