"""The result sheets, in a fresh workbook of their own; another module puts them into the user's."""

from __future__ import annotations

from collections.abc import Callable

from openpyxl.worksheet.worksheet import Worksheet

from heatledger.results import Results
from heatledger.workbook.pages import book_bytes, new_book
from heatledger.workbook.printed import printed
from heatledger.workbook.sheet_balance import write_monthly_balance
from heatledger.workbook.sheet_build_ups import write_build_ups
from heatledger.workbook.sheet_losses import write_element_losses
from heatledger.workbook.sheet_need import write_monthly_need
from heatledger.workbook.sheet_notes import NOTES, write_notes
from heatledger.workbook.sheet_solar import write_solar_gains
from heatledger.workbook.sheet_summary import write_summary

__all__ = ["RESULT_SHEETS", "build_result_sheets"]

RESULT_SHEETS: dict[str, Callable[[Worksheet, Results], None]] = {
    "Summary": write_summary,
    "Monthly need": write_monthly_need,
    "Monthly balance": write_monthly_balance,
    "Element losses": write_element_losses,
    "Solar gains": write_solar_gains,
    "Build-up results": write_build_ups,
    NOTES: write_notes,
}
"""Every result sheet with the function that writes it, in the order of the workbook."""


def build_result_sheets(results: Results) -> bytes:
    """A fresh workbook with the result sheets.

    Parameters
    ----------
    results : Results
        Everything an assessment found.

    Returns
    -------
    bytes
        The .xlsx file; the same for the same results. As long as the zones stay the
        same, their figures keep their cells. Figures that are summed up are rounded to
        what is shown, so that the sums hold for the cells as well as on paper.
    """
    book = new_book()
    results = printed(results)
    for title, write in RESULT_SHEETS.items():
        write(book.create_sheet(title), results)
    return book_bytes(book)
