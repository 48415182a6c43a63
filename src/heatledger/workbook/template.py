"""The input workbook, made from the columns that the sheets declare."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass, replace

from openpyxl.comments import Comment
from openpyxl.formatting.rule import Rule
from openpyxl.styles import Font
from openpyxl.styles.differential import DifferentialStyle
from openpyxl.worksheet.datavalidation import DataValidation
from openpyxl.worksheet.worksheet import Worksheet

from heatledger.inputs.cells import column_letters, reference
from heatledger.inputs.columns import Column, SheetRow
from heatledger.inputs.rows import SHEETS, ProjectRow
from heatledger.workbook.canvas import Canvas
from heatledger.workbook.dropdowns import Key, Source, key_of, write_lists
from heatledger.workbook.guide import TITLE_OF_GUIDE, write_guide
from heatledger.workbook.look import HEAD, INPUT, OPTIONAL, PURPOSE, REQUIRED, SMALL, TITLE, UNIT, Style
from heatledger.workbook.measure import LINE, line_count
from heatledger.workbook.pages import book_bytes, new_book, print_setup

__all__ = ["build_template"]

SPARE_ROWS = 60
"""Empty rows ready for input below the filled ones."""
UNITS_ROW, HEADER_ROW, FIRST_ROW = 4, 5, 6
MOST_PROMPT, MOST_TITLE = 255, 32
"""Characters an input prompt and its title may have (ECMA-376 Part 1, 18.3.1.32)."""
_SLIP = Font(bold=True, color="D55E00")
_TEXT_INPUT = replace(INPUT, number_format="@")
"""Kept as text, lest a spreadsheet program turns months such as 5-9 into a date."""
_NUMBER_INPUT = replace(INPUT, horizontal="right", indent=1)
_JUST = 1e-9
"""Validations know closed bounds only: an open bound is moved by less than anybody types."""


@dataclass(frozen=True)
class _Field:
    """A column of a sheet with the cells it is typed in."""

    column: Column
    cells: str
    first: str
    list: str

    @property
    def is_number(self) -> bool:
        return self.column.kind in {"number", "integer"}


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
        model.sheet: Source(model.sheet, FIRST_ROW, FIRST_ROW + len(rows[model]) + SPARE_ROWS - 1) for model in SHEETS
    }
    lists = write_lists(book, sources)
    for model, sheet in sheets.items():
        if model is ProjectRow:
            _labels(sheet, rows[model], lists)
        else:
            _table(sheet, model, rows[model], sources[model.sheet].last, lists)
        print_setup(sheet, project, titles=f"{UNITS_ROW}:{HEADER_ROW}" if model is not ProjectRow else "")
    return book_bytes(book)


def _labels(sheet: Worksheet, rows: Sequence[Mapping[str, object]], lists: Mapping[Key, str]) -> None:
    """The Project sheet: labels, values, units and notes side by side."""
    canvas = Canvas(sheet, (24, 44, 8, 84))
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
        _guard(sheet, _Field(column, cell, cell, lists.get(key_of(column), "")), prompt=False)
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
        _guard(sheet, _Field(column, cells, f"{letters}{FIRST_ROW}", lists.get(key_of(column), "")))
    sheet.freeze_panes = reference(FIRST_ROW, 2)


def _fill(canvas: Canvas, columns: Mapping[str, Column], rows: Sequence[Mapping[str, object]], last: int) -> None:
    """Rows filled in, then spare ones."""
    for row in range(FIRST_ROW, last + 1):
        given = rows[row - FIRST_ROW] if row - FIRST_ROW < len(rows) else {}
        for place, (field, column) in enumerate(columns.items(), start=1):
            canvas.put(row, place, given.get(field), _input_style(column))
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
            return 24.0
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


def _guard(sheet: Worksheet, field: _Field, prompt: bool = True) -> None:
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
    slip = _slip(field)
    if slip:
        sheet.conditional_formatting.add(field.cells, _marking(slip))


def _validation(field: _Field) -> DataValidation:
    column = field.column
    match column.kind:
        case "number" | "integer":
            low, high = _limits(column)
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


def _limits(column: Column) -> tuple[float, float]:
    """Closed bounds of a number; without a bound the widest that is ever meant."""
    low = column.above + _JUST if column.above is not None else column.at_least
    high = column.below - _JUST if column.below is not None else column.at_most
    return (-1e9 if low is None else low, 1e9 if high is None else high)


def _marking(slip: str) -> Rule:
    return Rule("expression", dxf=DifferentialStyle(font=_SLIP), formula=[slip])


def _slip(field: _Field) -> str:
    """Formula that finds usual slips, also pasted ones, which no validation stops."""
    cell = field.first
    match field.column.kind:
        case "number" | "integer":
            low, high = _limits(field.column)
            return f'AND({cell}<>"",OR(ISTEXT({cell}),{cell}<{low:.15g},{cell}>{high:.15g}))'
        case "azimuth":
            return (
                f'AND({cell}<>"",IF(ISTEXT({cell}),ISNA(MATCH(TRIM({cell}),{field.list},0)),OR({cell}<0,{cell}>360)))'
            )
        case "name":
            return f'AND({cell}<>"",ISNA(MATCH(TRIM({cell}),{field.list},0)))'
        case "choice" | "months" | "text":
            return ""
