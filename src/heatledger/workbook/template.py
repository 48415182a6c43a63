"""The input workbook, made from the columns that the sheets declare."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import replace
from typing import Literal

from openpyxl.styles import Border
from openpyxl.worksheet.table import Table
from openpyxl.worksheet.worksheet import Worksheet

from heatledger.inputs.cells import column_letters, reference
from heatledger.inputs.columns import Column, SheetRow, plain
from heatledger.inputs.prefilled import example_values
from heatledger.inputs.rows import MONTHLY_TABLE, SHEETS, MonthlyClimateRow, ProjectRow
from heatledger.workbook.canvas import Canvas
from heatledger.workbook.dropdowns import LISTS, Key, key_of, write_lists
from heatledger.workbook.guards import guard, guard_titles, note, story
from heatledger.workbook.guide import TITLE_OF_GUIDE, write_guide
from heatledger.workbook.look import HEAD, INPUT, OPTIONAL, PURPOSE, REQUIRED, SMALL, TITLE, UNIT, Style
from heatledger.workbook.pages import book_bytes, new_book, print_setup
from heatledger.workbook.row_marks import Rows, name_columns
from heatledger.workbook.slips import Field, mark_gaps, mark_rows, show_as_filled

__all__ = ["build_template"]

SPARE_ROWS = 300
"""Empty rows ready for input below the filled ones: dropdowns, warnings and lists reach them."""
TINTED_ROWS = 12
"""Rows that show from the start; further ones show as the sheet fills, so that empty rows are not printed."""
ROWS_IN_VIEW = 20
"""Rows that show below the titles on a small screen."""
HINT_ROW, UNITS_ROW, HEADER_ROW, FIRST_ROW = 3, 4, 5, 6
_TEXT_INPUT = replace(INPUT, number_format="@")
"""Kept as text, lest a spreadsheet program turns months 5-9 into a date and room 1.10 into the number 1.1."""
_NUMBER_INPUT = replace(INPUT, number_format="General_)", horizontal="right", wrap=False)
"""As typed, with the room of a bracket to the text in the next column."""
_LABELLED_NUMBER = replace(INPUT, wrap=False)
_HINT = Style(italic=True, size=8.5, colour=SMALL.colour)
_HINT_NUMBER = replace(_HINT, horizontal="right", indent=1)
_NUMBERS = {"number", "integer", "azimuth"}
"""Kinds that stand on the right."""
BUTTON = 10.0
"""Room below the titles for the buttons that sort and filter. [pt]"""
MOST_OF_A_HINT = 40
"""Characters of an example above a title."""
MOST_WIDTH_OF_A_PAGE = 300.0
"""Wider sheets print on two pages side by side, else nobody could read them. [characters]"""
MOST_WIDTH_UPRIGHT = 150.0
"""Narrower sheets print upright. [characters]"""
_PROJECT_WIDTHS = (28, 44, 8, 84)


def build_template(values: Mapping[str, Sequence[Mapping[str, object]]], climates: Sequence[str] = ()) -> bytes:
    """The input workbook, with rows filled in.

    Parameters
    ----------
    values : mapping of str to sequence of mappings
        Rows to fill in, by sheet name; each row maps field names to values. Sheet
        Project takes one row.
    climates : sequence of str
        Names of the shipped climates, offered as weather of the project.

    Returns
    -------
    bytes
        The .xlsx file; the same for the same values.
    """
    book = new_book()
    guide = book.create_sheet(TITLE_OF_GUIDE)
    project = str((list(values.get(ProjectRow.sheet, ())) or [{}])[0].get("project", ""))
    write_guide(guide, project)
    sheets = {model: book.create_sheet(model.sheet) for model in SHEETS}
    filled = {model: list(values.get(model.sheet, ())) for model in SHEETS}
    rows = {model: Rows(model, FIRST_ROW, _last_row(model, len(filled[model]))) for model in SHEETS}
    labels = _labelled(climates)
    lists = write_lists(book, rows, [key_of(labels["weather"])])
    name_columns(book, rows)
    book[LISTS].protection.sheet = guide.protection.sheet = True
    for model, sheet in sheets.items():
        if model is ProjectRow:
            _labels(sheet, labels, filled[model], lists)
        else:
            _table(sheet, rows[model], filled[model], lists)
        titles = f"{UNITS_ROW}:{HEADER_ROW}" if model is not ProjectRow else ""
        print_setup(sheet, project, titles=titles, portrait=_sheet_width(model) <= MOST_WIDTH_UPRIGHT)
        if _in_two_pages(model):
            sheet.page_setup.fitToWidth = 2
            sheet.print_title_cols = "A:A"
    book.active = sheets[ProjectRow]
    return book_bytes(book)


def _last_row(model: type[SheetRow], filled: int) -> int:
    """Last row that is ready for input; a year has twelve months."""
    spare = max(12 - filled, 0) if model is MonthlyClimateRow else SPARE_ROWS
    return FIRST_ROW + filled + spare - 1


def _labelled(climates: Sequence[str]) -> dict[str, Column]:
    """Columns of the project; its weather may be chosen, or typed as a path."""
    columns = ProjectRow.columns()
    return {**columns, "weather": replace(columns["weather"], choices=(*climates, MONTHLY_TABLE))}


def _in_two_pages(model: type[SheetRow]) -> bool:
    return _sheet_width(model) > MOST_WIDTH_OF_A_PAGE


def _sheet_width(model: type[SheetRow]) -> float:
    columns = model.columns().values()
    widths = _PROJECT_WIDTHS if model is ProjectRow else [_width(column, first=False) for column in columns]
    return sum(widths)


def _hints(canvas: Canvas, model: type[SheetRow]) -> None:
    """An example of each column in grey, above the units, where nothing is read."""
    examples = example_values()[model.sheet]
    texts = [_hint(examples, field) for field in model.columns()]
    for place, (text, column) in enumerate(zip(texts, model.columns().values(), strict=True), start=1):
        canvas.put(HINT_ROW, place, text or None, _HINT_NUMBER if column.kind in _NUMBERS else _HINT)
    canvas.fit(HINT_ROW, texts, size=_HINT.size)


def _hint(examples: Sequence[Mapping[str, object]], field: str) -> str:
    """The first short value of the example."""
    values = (row[field] for row in examples if field in row)
    shown = (f"e.g. {plain(value) if isinstance(value, float) else value}" for value in values)
    return next((text for text in shown if len(text) <= MOST_OF_A_HINT), "")


def _labels(
    sheet: Worksheet,
    columns: Mapping[str, Column],
    rows: Sequence[Mapping[str, object]],
    lists: Mapping[Key, str],
) -> None:
    """The Project sheet: labels, values, units and notes side by side."""
    canvas = Canvas(sheet, _PROJECT_WIDTHS)
    _heading(canvas, "Project data", ProjectRow.purpose)
    for place, title in enumerate(("Label", "Value", "Unit", "Note"), start=1):
        canvas.put(3, place, title, HEAD)
    given = rows[0] if rows else {}
    cells = {field: reference(row, 2) for row, field in enumerate(columns, start=UNITS_ROW)}
    for row, (field, column) in enumerate(columns.items(), start=UNITS_ROW):
        canvas.put(row, 1, column.title, REQUIRED if column.required else OPTIONAL)
        value = given.get(field)
        canvas.put(row, 2, value, _LABELLED_NUMBER if column.kind in _NUMBERS else _TEXT_INPUT)
        canvas.put(row, 3, column.unit, UNIT)
        canvas.put(row, 4, story(column), SMALL)
        told = canvas.fit(row, ("", "", "", story(column)), size=SMALL.size)
        canvas.height(row, max(told, canvas.fit(row, (column.title, value))))
        guard(sheet, Field(column, cells[field], cells[field], lists.get(key_of(column), "")), prompt=False)
    first, *_, last = cells.values()
    mark_gaps(sheet, [cells[field] for field, column in columns.items() if column.required], f"{first}:{last}")
    guard_titles(sheet, f"{reference(UNITS_ROW, 1)}:{reference(UNITS_ROW + len(columns) - 1, 1)}", "COLUMN")
    sheet.freeze_panes = first
    _stand_at(sheet, next((cell for field, cell in cells.items() if field not in given), first), "bottomRight")


def _table(sheet: Worksheet, rows: Rows, filled: Sequence[Mapping[str, object]], lists: Mapping[Key, str]) -> None:
    model, columns = rows.model, rows.model.columns()
    canvas = Canvas(sheet, [_width(column, place == 0) for place, column in enumerate(columns.values())])
    _heading(canvas, model.sheet, model.purpose, column=2 if _in_two_pages(model) else 1)
    _hints(canvas, model)
    for place, column in enumerate(columns.values(), start=1):
        canvas.put(UNITS_ROW, place, column.unit, UNIT)
        canvas.put(HEADER_ROW, place, column.title, REQUIRED if column.required else OPTIONAL).comment = note(column)
    canvas.fit(UNITS_ROW, [column.unit for column in columns.values()])
    height = canvas.fit(HEADER_ROW, [column.title for column in columns.values()], bold=True)
    canvas.height(HEADER_ROW, height + BUTTON)
    _fill(canvas, columns, filled, rows.last)
    for field, column in columns.items():
        cells = rows.column(field)
        field_cells = Field(column, cells, cells.partition(":")[0], lists.get(key_of(column), ""))
        guard(sheet, field_cells, names_stand_before=_stands_before(column.names_from, model))
    mark_rows(sheet, rows)
    show_as_filled(sheet, len(columns), FIRST_ROW + max(len(filled), TINTED_ROWS), rows.last)
    end = column_letters(len(columns))
    guard_titles(sheet, f"A{HEADER_ROW}:{end}{HEADER_ROW}", "ROW")
    sheet.add_table(Table(displayName=_table_name(model), ref=f"A{HEADER_ROW}:{end}{rows.last}"))
    sheet.freeze_panes = reference(FIRST_ROW, 2)
    _stand_at_first_empty(sheet, filled)


def _table_name(model: type[SheetRow]) -> str:
    """Declared as tables, the rows are sorted and filtered by themselves, without what stands above the titles."""
    return f"{model.sheet.replace(' ', '_').replace('-', '_')}_rows"


def _stands_before(sheet: str, model: type[SheetRow]) -> bool:
    """Whether who fills in the sheets from left to right has filled in a sheet before another."""
    order = [each.sheet for each in SHEETS]
    return sheet in order and order.index(sheet) < order.index(model.sheet)


def _stand_at_first_empty(sheet: Worksheet, filled: Sequence[Mapping[str, object]]) -> None:
    """The first empty row, or the first one whose name is given and nothing else, in view with those above it."""
    named = next((place for place, row in enumerate(filled) if len(row) == 1), None)
    row, column = (FIRST_ROW + len(filled), 1) if named is None else (FIRST_ROW + named, 2)
    _stand_at(sheet, reference(row, column), "bottomLeft" if column == 1 else "bottomRight")
    if sheet.sheet_view.pane and row > FIRST_ROW + ROWS_IN_VIEW:
        sheet.sheet_view.pane.topLeftCell = reference(row - ROWS_IN_VIEW // 2, 2)


def _stand_at(sheet: Worksheet, cell: str, pane: Literal["bottomLeft", "bottomRight"]) -> None:
    """Where the cursor stands when the sheet is opened: what is typed at once must not meet a title."""
    view = sheet.sheet_view
    if view.pane:
        view.pane.activePane = pane
    for selection in view.selection:
        selection.activeCell = selection.sqref = cell


def _fill(canvas: Canvas, columns: Mapping[str, Column], rows: Sequence[Mapping[str, object]], last: int) -> None:
    """Rows filled in, then empty ones; those further down take the style of their column."""
    styles = [_input_style(column) for column in columns.values()]
    for place, style in enumerate(styles, start=1):
        canvas.column(place, replace(style, fill="", border=Border()))
    for row, given in enumerate(rows, start=FIRST_ROW):
        for place, (field, style) in enumerate(zip(columns, styles, strict=True), start=1):
            canvas.put(row, place, given.get(field), style)
        canvas.fit(row, [given.get(field) for field in columns])
    first = FIRST_ROW + len(rows)
    for row in range(first, min(FIRST_ROW + TINTED_ROWS, last + 1)):
        for place, style in enumerate(styles, start=1):
            canvas.put(row, place, None, style)


def _input_style(column: Column) -> Style:
    return _NUMBER_INPUT if column.kind in _NUMBERS else INPUT if column.kind == "choice" else _TEXT_INPUT


def _heading(canvas: Canvas, title: str, purpose: str, column: int = 1) -> None:
    """Title and purpose; in a column that is not repeated on a second page where there is one."""
    canvas.put(1, 1, title, TITLE)
    canvas.height(1, 24)
    canvas.put(2, column, purpose, PURPOSE)


def _width(column: Column, first: bool) -> float:
    match column.kind:
        case "number" | "integer" | "azimuth":
            longest = max(len(word) for word in column.title.split())
            return max(12.0, len(column.unit) + 2.0, 1.15 * longest + 2.0)
        case "choice":
            return min(max(*(len(word) for word in column.choices), 9) + 4.0, 22.0)
        case "name":
            return 28.0
        case "months":
            return 14.0
        case "text":
            return 30.0 if first else 52.0
