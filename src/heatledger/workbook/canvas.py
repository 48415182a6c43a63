"""A worksheet written cell by cell in the common look."""

from __future__ import annotations

import math
from collections.abc import Iterable, Sequence
from copy import copy
from typing import Any, cast
from weakref import WeakKeyDictionary

from openpyxl import Workbook
from openpyxl.cell.cell import Cell
from openpyxl.styles.cell_style import StyleArray
from openpyxl.worksheet.hyperlink import Hyperlink
from openpyxl.worksheet.pagebreak import Break
from openpyxl.worksheet.worksheet import Worksheet

from heatledger.inputs.cells import column_letters, reference
from heatledger.workbook.look import BODY, HEAD, HEAD_NUMBER, LONG, NUMBER, Style
from heatledger.workbook.measure import DASH, LINE, clean_text, digits_for, line_count
from heatledger.workbook.references import quoted

__all__ = ["Canvas"]

PAGE_WIDTH, PAGE_HEIGHT = 770.0, 490.0
"""Room inside the margins of a landscape A4 page, with some to spare. [pt]"""

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

    def put(self, row: int, column: int, value: object, style: Style = BODY, digits: str = "") -> Cell:
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
            cell.number_format = digits or cell.number_format
            self._dressed[style, digits] = copy(cell._style)
        else:
            cell._style = copy(known)

    def column(self, column: int, style: Style) -> None:
        """Dress the cells of a column that nothing is written in."""
        style.dress(self.sheet.column_dimensions[column_letters(column)])

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

    def merged(
        self, row: int, first: int, last: int, value: object, style: Style = LONG, digits: str = "General"
    ) -> Cell:
        """Write a value over several columns, or into one."""
        cell = self.put(row, first, value, style, digits)
        if first == last:
            return cell
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

    def keep_together(self, blocks: Sequence[tuple[int, int]], repeated_row: int | None = None) -> None:
        """Start a new landscape page before each block of rows that would be cut by the end of one.

        Parameters
        ----------
        blocks : sequence of (int, int)
            First and last row of each block, from top to bottom.
        repeated_row : int, optional
            Row of titles that is repeated on every page.
        """
        repeated = self._height(repeated_row, repeated_row) if repeated_row else 0.0
        page = self._page_height()
        used = self._height(1, blocks[0][0] - 1) if blocks else 0.0
        for first, last in blocks:
            needed = self._height(first, last)
            fits_a_page = repeated + needed <= page or used > 0.7 * page
            if used + needed > page and used > repeated and fits_a_page:
                self.sheet.row_breaks.append(Break(id=first - 1))
                used = repeated
            used += needed
            if used > page:
                used = repeated + (used - page) % (page - repeated)

    def _height(self, first: int, last: int) -> float:
        """Height of rows. [pt]"""
        return sum(self._row_height(row) for row in range(first, last + 1))

    def _row_height(self, row: int) -> float:
        return float(self.sheet.row_dimensions[row].height or 15.0)

    def _page_height(self) -> float:
        """Points that fit a landscape A4 page at the scale that fits the width."""
        width = sum(_points(width) for width in self.widths)
        return PAGE_HEIGHT * max(1.0, width / PAGE_WIDTH)


def _points(width: float) -> float:
    """Points of a column width: 7 pixels for each character and 5 for the margins, as the file format counts."""
    return 5.25 * width + 3.75
