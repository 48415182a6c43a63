"""The common look of our sheets: fonts, colours, borders."""

from __future__ import annotations

from dataclasses import dataclass, field
from typing import Literal

from openpyxl.cell.cell import Cell
from openpyxl.styles import Alignment, Border, Font, PatternFill, Side
from openpyxl.worksheet.dimensions import ColumnDimension

__all__ = [
    "BODY",
    "FONT",
    "HEAD",
    "HEAD_NUMBER",
    "INK",
    "INPUT",
    "LINK",
    "LONG",
    "MONTHS",
    "NUMBER",
    "NUMBER_TOTAL",
    "OPTIONAL",
    "PURPOSE",
    "REQUIRED",
    "RULE",
    "SECTION",
    "SMALL",
    "TINT",
    "TITLE",
    "TOTAL",
    "UNIT",
    "Style",
]

FONT = "Arial"
"""Named for every cell: an unnamed font would take the theme of the workbook the sheets are put into."""
INK, DARK, LIGHT, TINT, RULE, MUTED = "1A1A1A", "22384A", "DCE4EA", "F1EDF6", "B8C4CC", "55606A"

MONTHS = ("Jan", "Feb", "Mar", "Apr", "May", "Jun", "Jul", "Aug", "Sep", "Oct", "Nov", "Dec")


@dataclass(frozen=True, eq=False)
class Style:
    """Font, fill, border and alignment of a cell."""

    bold: bool = False
    italic: bool = False
    underline: Literal["single"] | None = None
    size: float = 10
    colour: str = INK
    fill: str = ""
    border: Border = field(default_factory=Border)
    horizontal: Literal["left", "center", "right"] = "left"
    vertical: Literal["top", "center", "bottom"] = "top"
    wrap: bool = True
    shrink: bool = False
    indent: int = 0
    number_format: str = ""

    def dress(self, cell: Cell | ColumnDimension) -> None:
        """Put the style on a cell, or on the empty cells of a column."""
        cell.font = Font(
            name=FONT, size=self.size, bold=self.bold, italic=self.italic, underline=self.underline, color=self.colour
        )
        if self.number_format:
            cell.number_format = self.number_format
        cell.fill = PatternFill("solid", fgColor=self.fill) if self.fill else PatternFill()
        cell.border = self.border
        cell.alignment = Alignment(
            horizontal=self.horizontal,
            vertical=self.vertical,
            wrap_text=self.wrap,
            shrink_to_fit=self.shrink,
            indent=self.indent,
        )


_THIN = Side("thin", color=RULE)
_UNDER = Border(bottom=_THIN)
_OVER = Border(top=Side("thin", color=DARK))
BOX = Border(left=_THIN, right=_THIN, top=_THIN, bottom=_THIN)

TITLE = Style(bold=True, size=15, colour=DARK, wrap=False)
SECTION = Style(bold=True, size=11, colour=DARK, vertical="bottom", wrap=False)
PURPOSE = Style(colour=MUTED, wrap=False)
LONG = Style()
SMALL = Style(size=8.5, colour=MUTED)
UNIT = Style(size=9, colour=MUTED, horizontal="center")
REQUIRED = Style(bold=True, colour="FFFFFF", fill=DARK, border=BOX)
OPTIONAL = Style(bold=True, colour=DARK, fill=LIGHT, border=BOX)
INPUT = Style(fill=TINT, border=BOX)
HEAD = Style(bold=True, colour=DARK, fill=LIGHT, border=_UNDER, vertical="bottom")
HEAD_NUMBER = Style(bold=True, colour=DARK, fill=LIGHT, border=_UNDER, vertical="bottom", horizontal="right")
BODY = Style(border=_UNDER)
NUMBER = Style(border=_UNDER, horizontal="right", wrap=False, shrink=True)
TOTAL = Style(bold=True, border=_OVER)
NUMBER_TOTAL = Style(bold=True, border=_OVER, horizontal="right", wrap=False, shrink=True)
LINK = Style(border=_UNDER, underline="single", colour="0072B2")
