"""Fresh workbooks of ours: plain font, print set-up, and a file that does not change by itself."""

from __future__ import annotations

import re
from io import BytesIO
from typing import Any, cast
from zipfile import ZIP_DEFLATED, ZIP_STORED, ZipFile, ZipInfo

from openpyxl import Workbook
from openpyxl.drawing.spreadsheet_drawing import SpreadsheetDrawing
from openpyxl.styles import Font
from openpyxl.worksheet._writer import WorksheetWriter
from openpyxl.worksheet.header_footer import HeaderFooterItem
from openpyxl.worksheet.properties import PageSetupProperties
from openpyxl.worksheet.worksheet import Worksheet
from openpyxl.writer.excel import ExcelWriter

from heatledger.workbook.look import FONT
from heatledger.workbook.measure import clean_text

__all__ = ["CREATOR", "book_bytes", "new_book", "print_setup"]

CREATOR = "heatledger"
"""Author of what we write, in the properties of a file and on its notes."""
FIXED_TIME = (1980, 1, 1, 0, 0, 0)
_DATES = re.compile(rb"(<dcterms:(created|modified)[^>]*>)[^<]*")


def print_setup(
    sheet: Worksheet,
    project: str,
    *,
    titles: str = "",
    portrait: bool = False,
    one_page: bool = False,
) -> None:
    """A4, fitted to the width; page number, date, sheet and project, or else the file, in the footer."""
    sheet.page_setup.paperSize = "9"
    sheet.page_setup.orientation = "portrait" if portrait else "landscape"
    sheet.page_setup.fitToWidth = 1
    sheet.page_setup.fitToHeight = 1 if one_page else 0
    sheet.sheet_properties.pageSetUpPr = PageSetupProperties(fitToPage=True)
    sheet.print_options.horizontalCentered = True
    margins = sheet.page_margins
    margins.left = margins.right = 0.5
    margins.top, margins.bottom, margins.header, margins.footer = 0.5, 0.75, 0.3, 0.4
    if titles:
        sheet.print_title_rows = titles
    footer = cast("HeaderFooterItem", sheet.oddFooter)
    parts = (footer.left, footer.center, footer.right)
    for part, text in zip(parts, (_footer_text(project) or "&F", "&A · &D", "Page &P of &N"), strict=True):
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
    book.properties.creator = CREATOR
    return cast("Workbook", book)


def book_bytes(book: Workbook) -> bytes:
    """The file of a workbook, the same for the same content: dates and times are fixed."""
    saved, fixed = BytesIO(), BytesIO()
    _MemoryWriter(book, ZipFile(saved, "w", ZIP_STORED)).save()
    with ZipFile(saved) as source, ZipFile(fixed, "w") as target:
        for name in source.namelist():
            data = source.read(name)
            if name == "docProps/core.xml":
                data = _DATES.sub(rb"\g<1>2000-01-01T00:00:00Z", data)
            entry = ZipInfo(name, FIXED_TIME)
            entry.compress_type, entry.create_system = ZIP_DEFLATED, 0
            target.writestr(entry, data)
    return fixed.getvalue()


class _MemoryWriter(ExcelWriter):
    """Gathers the sheets in memory; openpyxl does so in temporary files, for which a full disk has no room."""

    def write_worksheet(self, ws: Any) -> None:
        """As the method it replaces, which types do not know from within."""
        ws._drawing = SpreadsheetDrawing()
        ws._drawing.charts, ws._drawing.images = ws._charts, ws._images
        gathered = BytesIO()
        inner: Any = self
        writer: Any = WorksheetWriter(ws, gathered)
        writer.write()
        ws._rels = writer._rels
        inner._archive.writestr(ws.path[1:], gathered.getvalue())
        inner.manifest.append(ws)
