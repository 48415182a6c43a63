"""Instant warnings: conditional formats that find the usual slips, also pasted ones, which no validation stops."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

from openpyxl.formatting.rule import Rule
from openpyxl.styles import Border, Font, PatternFill, Side
from openpyxl.styles.differential import DifferentialStyle
from openpyxl.worksheet.worksheet import Worksheet

from heatledger.inputs.cells import column_letters
from heatledger.inputs.columns import Column
from heatledger.workbook.look import RULE, TINT
from heatledger.workbook.row_marks import Rows, gaps, slips

__all__ = ["MISSING", "SLIP", "Field", "limits", "mark_gaps", "mark_rows", "mark_slips", "show_as_filled"]

SLIP, MISSING = "D55E00", "F4B183"
"""Colour of the letters of a slip, in bold; of a cell that must not stay empty."""
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


def mark_rows(sheet: Worksheet, rows: Rows) -> None:
    """Mark what a row shows only as a whole."""
    for found, style in ((gaps, _MISSING), (slips, _SLIP)):
        for field, formula in found(rows.model):
            _mark(sheet, rows.column(field), rows.formula(formula), style)


def mark_gaps(sheet: Worksheet, cells: Sequence[str], record: str) -> None:
    """Mark the required cells of a record that is filled in elsewhere."""
    for cell in cells:
        _mark(sheet, cell, f'AND({cell}="",COUNTA({record})>0)', _MISSING)


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
            share = f",AND({cell}>0,{cell}{_fraction(field.column)})" if field.column.unit == "%" else ""
            return f'AND({cell}<>"",IF(ISTEXT({cell}),TRUE,OR({cell}<{low:.15g},{cell}>{high:.15g}{whole}{share})))'
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
        case "months":  # such as a date that the program made of 5-9
            return f"AND(ISNUMBER({cell}),OR({cell}<1,{cell}>12))"
        case "text":
            return ""


def _fraction(column: Column) -> str:
    """Spreadsheet programs store 78 % as 0.78; where shares are small, 1 means one percent."""
    return "<1" if column.small_share else "<=1"
