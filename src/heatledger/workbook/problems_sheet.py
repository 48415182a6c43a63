"""The sheet Problems: every problem of a workbook with a link to its cell."""

from __future__ import annotations

from collections.abc import Iterable

from heatledger.errors import Problem
from heatledger.listing import listed, sheets_of
from heatledger.workbook.canvas import Canvas
from heatledger.workbook.look import BODY, LINK, PURPOSE, SECTION, TITLE
from heatledger.workbook.measure import LINE
from heatledger.workbook.pages import book_bytes, new_book, print_setup

__all__ = ["PROBLEMS", "build_problems_sheet"]

PROBLEMS = "Problems"
TITLES = ("Cell", "Column", "Found", "Expected", "How to mend it")
WIDTHS = (20, 26, 34, 42, 44)
HEADER_ROW = 4


def build_problems_sheet(problems: Iterable[Problem], file: str) -> bytes:
    """A fresh workbook with the one sheet, ready to be put into a copy of the user's.

    Parameters
    ----------
    problems : iterable of Problem
        All of them, in the order of the workbook.
    file : str
        Name of the workbook they were found in.

    Returns
    -------
    bytes
        The .xlsx file.
    """
    found = listed(problems)
    book = new_book()
    sheet = book.create_sheet(PROBLEMS)
    canvas = Canvas(sheet, WIDTHS)
    canvas.put(1, 1, PROBLEMS, TITLE)
    canvas.height(1, 24)
    count = sum(one.count for one in found)
    remark = f"{count} in {file}. A click on a cell's name leads to the cell. Nothing was calculated."
    canvas.merged(2, 1, len(WIDTHS), remark, PURPOSE)
    canvas.titles(HEADER_ROW, TITLES, text_columns=len(TITLES))
    row = HEADER_ROW + 1
    for name, group in sheets_of(found):
        canvas.put(row, 1, name or file, SECTION)
        canvas.height(row, LINE * 1.8)
        row += 1
        for one in group:
            problem = one.merged
            cell = canvas.put(row, 1, problem.cell or "–", LINK if problem.cell else BODY)
            if problem.cell:
                canvas.link(cell, problem.sheet, one.problem.cell)
            texts = (problem.column, problem.found, problem.expected, problem.fix)
            for place, text in enumerate(texts, start=2):
                canvas.put(row, place, text, BODY)
            canvas.fit(row, (problem.cell, *texts))
            row += 1
    sheet.freeze_panes = f"A{HEADER_ROW + 1}"
    print_setup(sheet, file, titles=f"{HEADER_ROW}:{HEADER_ROW}")
    return book_bytes(book)
