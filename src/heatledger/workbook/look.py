"""The common look of our sheets: fonts, fills, number formats, print set-up."""

from __future__ import annotations

import math
import re
import unicodedata
from collections.abc import Iterable, Sequence
from copy import copy
from dataclasses import dataclass, field
from io import BytesIO
from typing import Any, Literal, cast
from weakref import WeakKeyDictionary
from zipfile import ZIP_DEFLATED, ZIP_STORED, ZipFile, ZipInfo

from openpyxl import Workbook
from openpyxl.cell.cell import ILLEGAL_CHARACTERS_RE, Cell
from openpyxl.styles import Alignment, Border, Font, PatternFill, Side
from openpyxl.styles.cell_style import StyleArray
from openpyxl.worksheet.header_footer import HeaderFooterItem
from openpyxl.worksheet.hyperlink import Hyperlink
from openpyxl.worksheet.pagebreak import Break
from openpyxl.worksheet.properties import PageSetupProperties
from openpyxl.worksheet.worksheet import Worksheet
from openpyxl.writer.excel import ExcelWriter

from heatledger.inputs.cells import column_letters, reference
from heatledger.workbook.references import quoted

__all__ = [
    "BODY",
    "FONT",
    "INK",
    "LINK",
    "LONG",
    "MONTHS",
    "NUMBER",
    "NUMBER_TOTAL",
    "PURPOSE",
    "SECTION",
    "SMALL",
    "TITLE",
    "TOTAL",
    "UNIT",
    "Canvas",
    "Style",
    "book_bytes",
    "clean_text",
    "digits_for",
    "new_book",
    "print_setup",
]

FONT = "Arial"
"""Named for every cell: an unnamed font would take the theme of the workbook the sheets are put into."""
INK, DARK, LIGHT, TINT, RULE, MUTED = "1A1A1A", "22384A", "DCE4EA", "FFF8E1", "B8C4CC", "55606A"

MONTHS = ("Jan", "Feb", "Mar", "Apr", "May", "Jun", "Jul", "Aug", "Sep", "Oct", "Nov", "Dec")
DASH = "–"
"""Shown for a number that does not exist."""
MOST_CHARACTERS = 32_767
"""A cell holds no more (ECMA-376 Part 1, 18.18.37 as spreadsheet programs apply it)."""
PAGE_WIDTH, PAGE_HEIGHT = 770.0, 490.0
"""Room inside the margins of a landscape A4 page, with some to spare. [pt]"""
LINE = 14.0
"""Height of a text line of the body font. [pt]"""
FIXED_TIME = (1980, 1, 1, 0, 0, 0)
_LOOKS_ESCAPED = re.compile("_(?=x[0-9A-Fa-f]{4}_)")
_DATES = re.compile(rb"(<dcterms:(created|modified)[^>]*>)[^<]*")


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

    def dress(self, cell: Cell) -> None:
        """Put the style on a cell."""
        cell.font = Font(
            name=FONT, size=self.size, bold=self.bold, italic=self.italic, underline=self.underline, color=self.colour
        )
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


def clean_text(text: str) -> str:
    """Text as a cell can hold it: without control characters, not over-long.

    >>> clean_text("one" + chr(7) + " two")
    'one two'
    """
    plain = ILLEGAL_CHARACTERS_RE.sub("", text).encode("utf-8", "ignore").decode("utf-8")
    plain = _LOOKS_ESCAPED.sub("_x005F_", plain)
    return plain if len(plain) <= MOST_CHARACTERS else plain[: MOST_CHARACTERS - 1] + "…"


def digits_for(values: Iterable[float | None]) -> str:
    """Number format by the size of the largest value; zero shows as a dash.

    >>> digits_for([12000.0, 3.0]), digits_for([0.25])
    ('#,##0;-#,##0;"–"', '0.00;-0.00;"–"')
    """
    sizes = [abs(value) for value in values if value is not None and math.isfinite(value)]
    largest = max(sizes, default=0.0)
    digits = "#,##0" if largest >= 100 else "0.0" if largest >= 10 else "0.00"
    return f'{digits};-{digits};"{DASH}"'


def text_width(text: str) -> float:
    """Width of a text in column units; East Asian signs count double."""
    return sum(1.9 if unicodedata.east_asian_width(sign) in "WF" else 1.0 for sign in text)


def line_count(text: str, width: float, size: float = 10, bold: bool = False) -> int:
    """Lines a text takes in a column of a width, counted on the safe side."""
    room = max((width - 1) * 10 / size * (1.0 if bold else 1.1), 1)
    return sum(_wrapped(line, room) for line in text.split("\n"))


def _wrapped(line: str, room: float) -> int:
    lines, used = 1, 0.0
    for word in line.split(" "):
        width = text_width(word)
        if used and used + 1 + width > room:
            lines, used = lines + 1, 0.0
        used += width + (1 if used else 0)
        while used > room:
            lines, used = lines + 1, used - room
    return lines


_DRESSED: WeakKeyDictionary[Workbook, dict[tuple[Style, str], StyleArray]] = WeakKeyDictionary()
"""Styles that a workbook already knows."""


class Canvas:
    """A worksheet written cell by cell in the common look.

    Parameters
    ----------
    sheet : Worksheet
        An empty sheet.
    widths : sequence of float
        Column widths from column A on. [characters]
    """

    def __init__(self, sheet: Worksheet, widths: Sequence[float]) -> None:
        self.sheet = sheet
        self.widths = list(widths)
        self._dressed = _DRESSED.setdefault(cast("Workbook", sheet.parent), {})
        for column, width in enumerate(widths):
            sheet.column_dimensions[column_letters(column + 1)].width = width
        sheet.sheet_view.showGridLines = False

    def put(self, row: int, column: int, value: object, style: Style = BODY, digits: str = "General") -> Cell:
        """Write a value; text stays text, a number that does not exist shows as a dash."""
        cell = cast("Cell", self.sheet.cell(row, column))
        if isinstance(value, str):
            cell.value = clean_text(value)
            cell.data_type = "s"
        elif value is None:
            cell.value = None
        else:
            number = float(value) if not isinstance(value, int) else value  # type: ignore[arg-type]
            cell.value = number if math.isfinite(number) else DASH
        self._dress(cell, style, digits)
        return cell

    def _dress(self, cell: Any, style: Style, digits: str) -> None:
        """Styles are looked up once per workbook: the look-up costs more than the cell."""
        known = self._dressed.get((style, digits))
        if known is None:
            style.dress(cell)
            cell.number_format = digits
            self._dressed[style, digits] = copy(cell._style)
        else:
            cell._style = copy(known)

    def numbers(
        self, row: int, column: int, values: Iterable[float | None], style: Style = NUMBER, digits: str = ""
    ) -> None:
        """Write numbers side by side, in a format by their size unless one is given."""
        shown = [math.nan if value is None else float(value) for value in values]
        digits = digits or digits_for(shown)
        for place, value in enumerate(shown):
            self.put(row, column + place, value, style, digits)

    def titles(self, row: int, titles: Sequence[str], text_columns: int = 1) -> None:
        """A header row, high enough for its longest title; titles of numbers stand on the right."""
        for place, title in enumerate(titles):
            self.put(row, place + 1, title, HEAD if place < text_columns else HEAD_NUMBER)
        self.fit(row, titles, bold=True)

    def fit(self, row: int, texts: Sequence[object], size: float = 10, bold: bool = False) -> float:
        """Make a row as high as its texts need, from column A on; spreadsheet programs do not do it."""
        lines = [
            line_count(str(text), self.widths[place], size, bold)
            for place, text in enumerate(texts)
            if isinstance(text, str) and place < len(self.widths)
        ]
        return self.height(row, max(lines, default=1) * LINE * size / 10 + 2)

    def height(self, row: int, points: float) -> float:
        """Set a row's height, at most what a row can have."""
        points = min(points, 400.0)
        self.sheet.row_dimensions[row].height = points
        return points

    def merged(self, row: int, first: int, last: int, value: object, style: Style = LONG) -> Cell:
        """Write a value over several columns."""
        cell = self.put(row, first, value, style)
        for column in range(first + 1, last + 1):
            self.put(row, column, None, style)
        # Sheet.merge_cells would dress every cell again, at half the time of a summary.
        self.sheet.merged_cells.add(f"{reference(row, first)}:{reference(row, last)}")
        return cell

    def fit_merged(self, row: int, first: int, last: int, text: str, *, size: float = 10, bold: bool = False) -> float:
        """Make a row as high as a text over several columns needs."""
        width = sum(self.widths[first - 1 : last])
        return self.height(row, line_count(text, width, size, bold) * LINE * size / 10 + 2)

    def link(self, cell: Cell, sheet: str, place: str = "A1") -> None:
        """Make a cell jump to a place in this workbook."""
        cell.hyperlink = Hyperlink(ref=cell.coordinate, location=f"{quoted(sheet)}!{place}")

    def space(self, first: int, last: int, points: float = 15.0) -> None:
        """Fix the height of rows, e.g. behind a chart."""
        for row in range(first, last + 1):
            self.sheet.row_dimensions[row].height = points

    def keep_together(self, blocks: Sequence[tuple[int, int]], repeated: float = 0.0) -> None:
        """Start a new landscape page before each block of rows that would be cut by the end of one.

        Parameters
        ----------
        blocks : sequence of (int, int)
            First and last row of each block, from top to bottom.
        repeated : float
            Height of the rows repeated on every page. [pt]
        """
        page, used = self._page_height(), sum(self._height(row) for row in range(1, blocks[0][0])) if blocks else 0.0
        for first, last in blocks:
            needed = sum(self._height(row) for row in range(first, last + 1))
            fits_a_page = repeated + needed <= page or used > 0.7 * page
            if used + needed > page and used > repeated and fits_a_page:
                self.sheet.row_breaks.append(Break(id=first - 1))
                used = repeated
            used = (used + needed) % page

    def _height(self, row: int) -> float:
        return float(self.sheet.row_dimensions[row].height or 15.0)

    def _page_height(self) -> float:
        """Points that fit a landscape A4 page at the scale that fits the width."""
        width = sum(_points(width) for width in self.widths)
        return PAGE_HEIGHT * max(1.0, width / PAGE_WIDTH)


def _points(width: float) -> float:
    """Points of a column width: 7 pixels for each character and 5 for the margins, as the file format counts."""
    return 5.25 * width + 3.75


def print_setup(
    sheet: Worksheet,
    project: str,
    *,
    titles: str = "",
    portrait: bool = False,
    one_page: bool = False,
) -> None:
    """A4, fitted to the width, with page number, date, sheet and project in the footer."""
    sheet.page_setup.paperSize = "9"
    sheet.page_setup.orientation = "portrait" if portrait else "landscape"
    sheet.page_setup.fitToWidth = 1
    sheet.page_setup.fitToHeight = 1 if one_page else 0
    sheet.sheet_properties.pageSetUpPr = PageSetupProperties(fitToPage=True)
    margins = sheet.page_margins
    margins.left = margins.right = 0.5
    margins.top, margins.bottom, margins.header, margins.footer = 0.5, 0.75, 0.3, 0.4
    if titles:
        sheet.print_title_rows = titles
    footer = cast("HeaderFooterItem", sheet.oddFooter)
    parts = (footer.left, footer.center, footer.right)
    for part, text in zip(parts, (_footer_text(project), "&A · &D", "Page &P of &N"), strict=True):
        part.text, part.font, part.size = text, f"{FONT},Regular", 8


def _footer_text(project: str) -> str:
    """Project name for a footer, which holds 255 characters in all and reads & as a code."""
    plain = " ".join(clean_text(project).split())
    short = plain if len(plain) <= 60 else plain[:59] + "…"
    return short.replace("&", "&&")


def new_book() -> Workbook:
    """A workbook without sheets whose plain font is ours: column widths are counted in its digits."""
    book: Any = Workbook()
    book.remove(book.worksheets[0])
    plain = Font(name=FONT, size=10, family=2)
    book._fonts[0] = plain
    book._named_styles["Normal"].font = plain
    return cast("Workbook", book)


def book_bytes(book: Workbook) -> bytes:
    """The file of a workbook, the same for the same content: dates and times are fixed."""
    saved, fixed = BytesIO(), BytesIO()
    ExcelWriter(book, ZipFile(saved, "w", ZIP_STORED)).save()
    with ZipFile(saved) as source, ZipFile(fixed, "w") as target:
        for name in source.namelist():
            data = source.read(name)
            if name == "docProps/core.xml":
                data = _DATES.sub(rb"\g<1>2000-01-01T00:00:00Z", data)
            entry = ZipInfo(name, FIXED_TIME)
            entry.compress_type, entry.create_system = ZIP_DEFLATED, 0
            target.writestr(entry, data)
    return fixed.getvalue()
