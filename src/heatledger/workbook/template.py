"""The input workbook, made from the columns that the sheets declare."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import replace

from openpyxl.comments import Comment
from openpyxl.styles import Border
from openpyxl.worksheet.datavalidation import DataValidation
from openpyxl.worksheet.worksheet import Worksheet

from heatledger.inputs.cells import column_letters, reference
from heatledger.inputs.columns import Column, SheetRow, plain
from heatledger.inputs.prefilled import example_values
from heatledger.inputs.rows import SHEETS, MonthlyClimateRow, ProjectRow
from heatledger.workbook.canvas import Canvas
from heatledger.workbook.dropdowns import LISTS, Key, Source, key_of, write_lists
from heatledger.workbook.guide import TITLE_OF_GUIDE, write_guide
from heatledger.workbook.look import HEAD, INPUT, OPTIONAL, PURPOSE, REQUIRED, SMALL, TITLE, UNIT, Style
from heatledger.workbook.measure import LINE, line_count
from heatledger.workbook.pages import book_bytes, new_book, print_setup
from heatledger.workbook.slips import Field, limits, mark_rows, mark_slips, name_areas, show_as_filled

__all__ = ["build_template"]

SPARE_ROWS = 60
"""Empty rows ready for input below the filled ones."""
TINTED_ROWS = 12
"""Spare rows that show from the start; further ones show as the sheet fills, so that empty rows are not printed."""
HINT_ROW, UNITS_ROW, HEADER_ROW, FIRST_ROW = 3, 4, 5, 6
MOST_PROMPT, MOST_TITLE = 255, 32
"""Characters an input prompt and its title may have (ECMA-376 Part 1, 18.3.1.32)."""
_TEXT_INPUT = replace(INPUT, number_format="@")
"""Kept as text, lest a spreadsheet program turns months such as 5-9 into a date."""
_NUMBER_INPUT = replace(INPUT, horizontal="right", wrap=False)
_HINT = Style(italic=True, size=8.5, colour=SMALL.colour)
_HINT_NUMBER = replace(_HINT, horizontal="right")
MOST_OF_A_HINT = 40
"""Characters of an example above a title."""
MOST_WIDTH_OF_A_PAGE = 300.0
"""Wider sheets print on two pages side by side, else nobody could read them. [characters]"""
MOST_WIDTH_UPRIGHT = 150.0
"""Narrower sheets print upright. [characters]"""
_PROJECT_WIDTHS = (24, 44, 8, 84)


def build_template(values: Mapping[str, Sequence[Mapping[str, object]]]) -> bytes:
    """The input workbook, with rows filled in.

    Parameters
    ----------
    values : mapping of str to sequence of mappings
        Rows to fill in, by sheet name; each row maps field names to values. Sheet
        Project takes one row.

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
    rows = {model: list(values.get(model.sheet, ())) for model in SHEETS}
    sources = {
        model.sheet: Source(model.sheet, FIRST_ROW, FIRST_ROW + len(rows[model]) + _spare(model, rows[model]) - 1)
        for model in SHEETS
    }
    lists = write_lists(book, sources)
    name_areas(book, sources["Envelope"])
    book[LISTS].protection.sheet = guide.protection.sheet = True
    for model, sheet in sheets.items():
        if model is ProjectRow:
            _labels(sheet, rows[model], lists)
        else:
            _table(sheet, model, rows[model], sources[model.sheet].last, lists)
        titles = f"{UNITS_ROW}:{HEADER_ROW}" if model is not ProjectRow else ""
        print_setup(sheet, project, titles=titles, portrait=_sheet_width(model) <= MOST_WIDTH_UPRIGHT)
        if _sheet_width(model) > MOST_WIDTH_OF_A_PAGE:
            sheet.page_setup.fitToWidth = 2
            sheet.print_title_cols = "A:A"
    return book_bytes(book)


def _spare(model: type[SheetRow], rows: Sequence[Mapping[str, object]]) -> int:
    """Rows to leave empty; a year has twelve months."""
    return max(12 - len(rows), 0) if model is MonthlyClimateRow else SPARE_ROWS


def _sheet_width(model: type[SheetRow]) -> float:
    columns = model.columns().values()
    widths = _PROJECT_WIDTHS if model is ProjectRow else [_width(column, first=False) for column in columns]
    return sum(widths)


def _hints(canvas: Canvas, model: type[SheetRow]) -> None:
    """An example of each column in grey, above the units, where nothing is read."""
    example = example_values()[model.sheet][0]
    texts = []
    for place, (field, column) in enumerate(model.columns().items(), start=1):
        value = example.get(field)
        shown = "" if value is None else f"e.g. {plain(value) if isinstance(value, float) else value}"
        texts.append(shown if len(shown) <= MOST_OF_A_HINT else "")
        style = _HINT_NUMBER if column.kind in {"number", "integer", "azimuth"} else _HINT
        canvas.put(HINT_ROW, place, texts[-1] or None, style)
    canvas.fit(HINT_ROW, texts, size=8.5)


def _labels(sheet: Worksheet, rows: Sequence[Mapping[str, object]], lists: Mapping[Key, str]) -> None:
    """The Project sheet: labels, values, units and notes side by side."""
    canvas = Canvas(sheet, _PROJECT_WIDTHS)
    _heading(canvas, "Project data", ProjectRow.purpose)
    for place, title in enumerate(("Label", "Value", "Unit", "Note"), start=1):
        canvas.put(3, place, title, HEAD)
    given = rows[0] if rows else {}
    for row, (field, column) in enumerate(ProjectRow.columns().items(), start=UNITS_ROW):
        note = _story(column)
        canvas.put(row, 1, column.title, REQUIRED if column.required else OPTIONAL)
        canvas.put(row, 2, given.get(field), INPUT)
        canvas.put(row, 3, column.unit, UNIT)
        canvas.put(row, 4, note, SMALL)
        canvas.fit(row, (column.title, given.get(field), column.unit, note))
        cell = reference(row, 2)
        _guard(sheet, Field(column, cell, cell, lists.get(key_of(column), "")), prompt=False)
    sheet.freeze_panes = reference(UNITS_ROW, 2)


def _table(
    sheet: Worksheet,
    model: type[SheetRow],
    rows: Sequence[Mapping[str, object]],
    last: int,
    lists: Mapping[Key, str],
) -> None:
    columns = model.columns()
    canvas = Canvas(sheet, [_width(column, place == 0) for place, column in enumerate(columns.values())])
    _heading(canvas, model.sheet, model.purpose)
    _hints(canvas, model)
    for place, column in enumerate(columns.values(), start=1):
        canvas.put(UNITS_ROW, place, column.unit, UNIT)
        title = canvas.put(HEADER_ROW, place, column.title, REQUIRED if column.required else OPTIONAL)
        title.comment = _note(column)
    canvas.fit(UNITS_ROW, [column.unit for column in columns.values()])
    canvas.fit(HEADER_ROW, [column.title for column in columns.values()], bold=True)
    _fill(canvas, columns, rows, last)
    for place, column in enumerate(columns.values(), start=1):
        letters = column_letters(place)
        cells = f"{letters}{FIRST_ROW}:{letters}{last}"
        _guard(sheet, Field(column, cells, f"{letters}{FIRST_ROW}", lists.get(key_of(column), "")))
    mark_rows(sheet, model, FIRST_ROW, last)
    show_as_filled(sheet, len(columns), FIRST_ROW + len(rows) + TINTED_ROWS, last)
    sheet.freeze_panes = reference(FIRST_ROW, 2)


def _fill(canvas: Canvas, columns: Mapping[str, Column], rows: Sequence[Mapping[str, object]], last: int) -> None:
    """Rows filled in, then spare ones, the last of them without tint and border as yet."""
    styles = {_input_style(column) for column in columns.values()}
    bare = {style: replace(style, fill="", border=Border()) for style in styles}
    tinted = FIRST_ROW + len(rows) + TINTED_ROWS
    for row in range(FIRST_ROW, last + 1):
        given = rows[row - FIRST_ROW] if row - FIRST_ROW < len(rows) else {}
        for place, (field, column) in enumerate(columns.items(), start=1):
            style = _input_style(column)
            canvas.put(row, place, given.get(field), style if row < tinted else bare[style])
        canvas.fit(row, [given.get(field) for field in columns])


def _input_style(column: Column) -> Style:
    if column.kind == "months":
        return _TEXT_INPUT
    return _NUMBER_INPUT if column.kind in {"number", "integer", "azimuth"} else INPUT


def _heading(canvas: Canvas, title: str, purpose: str) -> None:
    canvas.put(1, 1, title, TITLE)
    canvas.height(1, 24)
    canvas.put(2, 1, purpose, PURPOSE)


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


def _story(column: Column) -> str:
    """Help with the default that an empty cell stands for."""
    stands = f"{column.default:g}" if isinstance(column.default, int | float) else str(column.default)
    source = f" ({column.default_note})" if column.default_note else ""
    if column.default is not None:
        return f"{column.help} Empty: {stands}{source}."
    if column.default_note and "Empty:" not in column.help:
        return f"{column.help} Empty: {column.default_note}."
    return column.help


def _note(column: Column) -> Comment:
    """The note of a title: everything there is to know about its column."""
    need = "Required" if column.required else "Optional"
    text = f"{column.label}\n{need}: {column.expected}.\n{_story(column)}"
    note = Comment(text, "heatledger")
    note.width, note.height = 330, int((line_count(text, 52) + 1) * LINE * 4 / 3)
    return note


def _guard(sheet: Worksheet, field: Field, prompt: bool = True) -> None:
    """Dropdown or limits, the prompt beside the cell, and the marking of slips."""
    validation = _validation(field)
    validation.allow_blank = True
    if prompt:
        story = _story(field.column)
        validation.promptTitle = field.column.label[:MOST_TITLE]
        validation.prompt = story if len(story) <= MOST_PROMPT else field.column.help[:MOST_PROMPT]
        validation.showInputMessage = True
    if prompt or validation.type:
        validation.add(field.cells)
        sheet.add_data_validation(validation)
    mark_slips(sheet, field)


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
            # A row may be typed before the row it refers to: say so, but let it stand.
            found = DataValidation(type="list", formula1=field.list, errorStyle="warning")
            return _stopping(found, f"Sheet {column.names_from} has no such name yet. Keep it?")
        case "azimuth":  # the dropdown offers compass words; degrees may be typed as well
            return DataValidation(type="list", formula1=field.list, showErrorMessage=False)
        case "months" | "text":
            return DataValidation()


def _stopping(validation: DataValidation, message: str) -> DataValidation:
    validation.showErrorMessage = True
    validation.errorTitle = "Please check"
    validation.error = message
    return validation
