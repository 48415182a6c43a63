"""Instant warnings: conditional formats that find the usual slips, also pasted ones, which no validation stops."""

from __future__ import annotations

from dataclasses import dataclass

from openpyxl import Workbook
from openpyxl.formatting.rule import Rule
from openpyxl.styles import Border, Font, PatternFill, Side
from openpyxl.styles.differential import DifferentialStyle
from openpyxl.workbook.defined_name import DefinedName
from openpyxl.worksheet.worksheet import Worksheet

from heatledger.inputs.cells import column_letters
from heatledger.inputs.columns import Column, SheetRow
from heatledger.inputs.rows import ElementRow, OpeningRow
from heatledger.workbook.dropdowns import Source
from heatledger.workbook.look import RULE, TINT
from heatledger.workbook.references import quoted

__all__ = ["MISSING", "SLIP", "Field", "limits", "mark_rows", "mark_slips", "name_areas", "show_as_filled"]

SLIP, MISSING = "D55E00", "F4B183"
"""Colour of the letters of a slip, in bold; of a cell that must not stay empty."""
ELEMENTS, AREAS = "element_names", "element_areas"
"""Names of two columns of sheet Envelope; conditional formats reach other sheets through names."""
MOST_OF_A_FORMULA = 1000
"""Characters; longer lists of words are left to the validation."""
_JUST = 1e-9
"""Validations know closed bounds only: an open bound is moved by less than anybody types."""
_SLIP = DifferentialStyle(font=Font(bold=True, color=SLIP))
_MISSING = DifferentialStyle(fill=PatternFill(bgColor=MISSING, fill_type="solid"))
_THIN = Side("thin", color=RULE)
_TINTED = DifferentialStyle(
    fill=PatternFill(bgColor=TINT, fill_type="solid"), border=Border(left=_THIN, right=_THIN, top=_THIN, bottom=_THIN)
)


@dataclass(frozen=True)
class Field:
    """A column of a sheet with the cells it is typed in."""

    column: Column
    cells: str
    first: str
    list: str


def limits(column: Column) -> tuple[float, float]:
    """Closed bounds of a number; without a bound the widest that is ever meant."""
    low = column.above + _JUST if column.above is not None else column.at_least
    high = column.below - _JUST if column.below is not None else column.at_most
    return (-1e9 if low is None else low, 1e9 if high is None else high)


def mark_slips(sheet: Worksheet, field: Field) -> None:
    """Mark cells whose content cannot be right."""
    slip = _slip(field)
    if slip:
        _mark(sheet, field.cells, slip, _SLIP)


def mark_rows(sheet: Worksheet, model: type[SheetRow], first: int, last: int) -> None:
    """Mark what a row shows only as a whole: gaps, names that stand twice, openings larger than their element."""
    columns = list(model.columns().values())
    row = f"$A{first}:${column_letters(len(columns))}{first}"
    for place, column in enumerate(columns, start=1):
        if column.required:
            letters = column_letters(place)
            formula = f'AND({letters}{first}="",COUNTA({row})>0)'
            _mark(sheet, f"{letters}{first}:{letters}{last}", formula, _MISSING)
    cells = f"A{first}:A{last}"
    if model.unique:
        names = f"$A${first}:$A${last}"
        _mark(sheet, cells, f'AND(A{first}<>"",SUMPRODUCT(--(TRIM({names})=TRIM(A{first})))>1)', _SLIP)
    if model is OpeningRow:
        _mark(sheet, cells, _too_large(first, last), _SLIP)


def name_areas(book: Workbook, elements: Source) -> None:
    """Name the columns of the elements that formulas on other sheets need."""
    for name, field in ((ELEMENTS, "name"), (AREAS, "area")):
        letters = _letters(ElementRow, field)
        cells = f"{quoted(elements.sheet)}!${letters}${elements.first}:${letters}${elements.last}"
        book.defined_names[name] = DefinedName(name, attr_text=cells)


def show_as_filled(sheet: Worksheet, columns: int, first: int, last: int) -> None:
    """Tint the spare rows from one on as the rows above them fill, five ahead."""
    if first > last:
        return
    end = column_letters(columns)
    above = f"$A{first - 5}:${end}${last}"
    _mark(sheet, f"A{first}:{end}{last}", f"COUNTA({above})>0", _TINTED)


def _mark(sheet: Worksheet, cells: str, formula: str, style: DifferentialStyle) -> None:
    sheet.conditional_formatting.add(cells, Rule("expression", dxf=style, formula=[formula]))


def _slip(field: Field) -> str:
    """Formula that is true for a slip."""
    cell = field.first
    match field.column.kind:
        case "number" | "integer":
            low, high = limits(field.column)
            whole = f",{cell}<>INT({cell})" if field.column.kind == "integer" else ""
            return f'AND({cell}<>"",IF(ISTEXT({cell}),TRUE,OR({cell}<{low:.15g},{cell}>{high:.15g}{whole})))'
        case "azimuth":
            return (
                f'AND({cell}<>"",IF(ISTEXT({cell}),ISNA(MATCH(TRIM({cell}),{field.list},0)),OR({cell}<0,{cell}>360)))'
            )
        case "name":
            return f'AND({cell}<>"",ISNA(MATCH(TRIM({cell}),{field.list},0)))'
        case "choice":
            words = ",".join(f'TRIM({cell})="{word}"' for word in field.column.choices)
            formula = f'AND({cell}<>"",NOT(OR({words})))'
            return formula if len(formula) <= MOST_OF_A_FORMULA else ""
        case "months" | "text":
            return ""


def _letters(model: type[SheetRow], field: str) -> str:
    return column_letters(list(model.columns()).index(field) + 1)


def _too_large(first: int, last: int) -> str:
    """The openings of an element together are larger than it is; an empty number counts as one."""
    element, number, width, height = (_letters(OpeningRow, field) for field in ("element", "count", "width", "height"))
    whole = {letters: f"${letters}${first}:${letters}${last}" for letters in (element, number, width, height)}
    own = f"${element}{first}"
    count = f'({whole[number]}+({whole[number]}=""))'
    area = f"SUMPRODUCT(({whole[element]}={own})*{count}*{whole[width]}*{whole[height]})"
    return f'AND({own}<>"",IFERROR({area}>INDEX({AREAS},MATCH(TRIM({own}),{ELEMENTS},0)),FALSE))'
