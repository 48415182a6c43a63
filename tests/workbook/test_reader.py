from __future__ import annotations

from collections.abc import Callable, Mapping
from datetime import date, datetime
from datetime import time as clock
from io import BytesIO
from pathlib import Path

import pytest
import xlsxwriter  # type: ignore[import-untyped]
from openpyxl import Workbook, load_workbook

from heatledger.errors import InputError
from heatledger.inputs.cells import Cell, Cells
from heatledger.workbook import reader
from heatledger.workbook.graft import graft
from heatledger.workbook.reader import owned_sheets, read_cells

MAIN = "http://schemas.openxmlformats.org/spreadsheetml/2006/main"
Inject = Callable[[bytes, Mapping[str, bytes], Mapping[str, tuple[str, str]]], bytes]


@pytest.fixture
def book(tmp_path: Path) -> Callable[[bytes], Path]:
    def write(data: bytes) -> Path:
        path = tmp_path / "book.xlsx"
        path.write_bytes(data)
        return path

    return write


@pytest.fixture
def read(book: Callable[[bytes], Path], plain_book: bytes, inject: Inject) -> Callable[[str], Cells]:
    """Cells of a sheet whose rows are given as XML."""

    def run(rows: str) -> Cells:
        sheet = f'<worksheet xmlns="{MAIN}"><sheetData>{rows}</sheetData></worksheet>'.encode()
        return read_cells(book(inject(plain_book, {"xl/worksheets/sheet1.xml": sheet}, {})))["Zones"]

    return run


def refusal(path: Path) -> list[str]:
    with pytest.raises(InputError) as caught:
        read_cells(path)
    return [str(problem) for problem in caught.value.problems]


def test_a_rich_workbook_is_read_with_its_stored_values(book: Callable[[bytes], Path], rich_book: bytes) -> None:
    sheets = read_cells(book(rich_book))
    assert list(sheets) == ["Zones", "Lists"]  # the chart sheet between them has no cells
    assert sheets["Zones"] == {
        (2, 1): Cell("Zone", "text"),
        (2, 2): Cell("Floor area", "text"),
        (2, 3): Cell("Note", "text"),
        (3, 1): Cell("Workshop", "text"),
        (3, 2): Cell(120.5, "number"),
        (3, 3): Cell("plain bold plain", "text"),
        (4, 1): Cell("Reading room", "text"),
        (4, 2): Cell(80.25, "number"),
        (5, 1): Cell("Müller & Söhne", "text"),
        (5, 2): Cell(42.0, "number"),
        (6, 2): Cell(242.75, "number"),
        (6, 3): Cell("filled", "text"),
        (6, 4): Cell("#DIV/0!", "error"),
    }


def test_kinds_that_openpyxl_writes(book: Callable[[bytes], Path]) -> None:
    made = Workbook()
    sheet = made.active
    assert sheet is not None
    for row in (
        1,
        1.5,
        True,
        date(2023, 3, 15),
        datetime(2023, 3, 15, 6, 30),
        clock(6, 30),
        "=A1*2",
        " x ",
        " \t",
        "1,5",
    ):
        sheet.append([row])
    buffer = BytesIO()
    made.save(buffer)
    cells = read_cells(book(buffer.getvalue()))["Sheet"]
    assert [cells.get((row, 1)) for row in range(1, 11)] == [
        Cell(1.0, "number"),
        Cell(1.5, "number"),
        Cell(True, "boolean"),
        Cell("2023-03-15", "date"),
        Cell("2023-03-15T06:30:00", "date"),
        Cell("06:30:00", "date"),
        Cell(None, "uncalculated"),
        Cell(" x ", "text"),
        None,
        Cell("1,5", "text"),
    ]


def test_every_spelling_of_a_cell(read: Callable[[str], Cells]) -> None:
    cells = read(
        '<row><c t="inlineStr"><is><r><t>one </t></r><r><t>text</t></r><rPh sb="0" eb="1"><t>aid</t></rPh></is></c>'
        '<c t="str"><f>"a"</f><v>a_x000D_b_x005F_x0041_</v></c><c t="b"><v>0</v></c>'
        '<c t="d"><v>2023-03-15T00:00:00</v></c></row>'
        '<row r="5"><c r="C5" t="e"><f>NA()</f><v>#N/A</v></c><c t="str"><f>""</f><v></v></c><c t="str"><f>A1</f></c>'
        "<c><f>A1</f><v/></c><c><v/></c><c/><c><v>1E-3</v></c></row><row><c><v>-2</v></c></row>"
    )
    assert cells == {
        (1, 1): Cell("one text", "text"),
        (1, 2): Cell("a\rb_x0041_", "text"),
        (1, 3): Cell(False, "boolean"),
        (1, 4): Cell("2023-03-15", "date"),
        (5, 3): Cell("#N/A", "error"),
        (5, 5): Cell(None, "uncalculated"),
        (5, 6): Cell(None, "uncalculated"),
        (5, 9): Cell(0.001, "number"),
        (6, 1): Cell(-2.0, "number"),
    }


@pytest.mark.parametrize(
    ("code", "kind"),
    [
        ("yyyy-mm-dd", "date"),
        ("[h]:mm", "date"),
        ("dd/mm/yy;@", "date"),
        ("[$-409]mmm d", "date"),
        ("0.00", "number"),
        ('0.0 "days"', "number"),
        ("0.0\\ \\m\\²", "number"),
        ("[Red]0.00E+00", "number"),
        ("#,##0_);(#,##0)", "number"),
        ("0;[Yellow]0", "number"),
        ("General", "number"),
    ],
)
def test_number_formats_tell_dates(book: Callable[[bytes], Path], code: str, kind: str) -> None:
    buffer = BytesIO()
    made = xlsxwriter.Workbook(buffer)
    made.add_worksheet("Zones").write_number(0, 0, 45000, made.add_format({"num_format": code}))
    made.close()
    assert read_cells(book(buffer.getvalue()))["Zones"][1, 1].kind == kind


def test_dates_of_the_early_days_and_of_the_other_calendar(book: Callable[[bytes], Path]) -> None:
    # day numbers as openpyxl, which others made, reads them
    for late in (False, True):
        buffer = BytesIO()
        made = xlsxwriter.Workbook(buffer, {"date_1904": late})
        sheet, style = made.add_worksheet("Zones"), made.add_format({"num_format": "yyyy-mm-dd hh:mm"})
        serials = [1, 59, 61, 366.25, 45000, 0.5]
        sheet.write_column(0, 0, serials, style)
        made.close()
        path = book(buffer.getvalue())
        cells = read_cells(path)["Zones"]
        others = load_workbook(path)["Zones"]
        for row in range(1, len(serials) + 1):
            expected = others.cell(row, 1).value
            assert isinstance(expected, (datetime, clock))
            assert cells[row, 1] == Cell(expected.isoformat().removesuffix("T00:00:00"), "date")


def test_a_workbook_without_styles_and_shared_strings(
    book: Callable[[bytes], Path], plain_book: bytes, inject: Inject
) -> None:
    sheet = f'<worksheet xmlns="{MAIN}"><sheetData><row><c><v>7</v></c></row></sheetData></worksheet>'.encode()
    kinds = {"/styles": "/other", "/sharedStrings": "/another"}
    data = inject(plain_book, {"xl/worksheets/sheet1.xml": sheet, "xl/worksheets/sheet2.xml": sheet}, {})
    for old, new in kinds.items():
        data = inject(data, {}, {"xl/_rels/workbook.xml.rels": (old + '"', new + '"')})
    assert read_cells(book(data)) == {"Zones": {(1, 1): Cell(7.0, "number")}, "Lists": {(1, 1): Cell(7.0, "number")}}


def test_relations_may_be_absolute_and_spelt_in_another_case(
    book: Callable[[bytes], Path], plain_book: bytes, inject: Inject
) -> None:
    edits = {"xl/_rels/workbook.xml.rels": ("worksheets/sheet1.xml", "/xl/Worksheets/Sheet1.xml")}
    assert read_cells(book(inject(plain_book, {}, edits)))["Zones"][3, 2] == Cell(120.5, "number")


def test_only_wanted_sheets_are_read(book: Callable[[bytes], Path], plain_book: bytes, inject: Inject) -> None:
    path = book(inject(plain_book, {"xl/worksheets/sheet2.xml": b"<broken"}, {}))
    sheets = read_cells(path, wanted=["ZONES "])
    assert list(sheets) == ["Zones", "Lists"]
    assert len(sheets["Zones"]) == 13
    assert sheets["Lists"] == {}


def test_a_value_beyond_the_last_row(read: Callable[[str], Cells], tmp_path: Path) -> None:
    with pytest.raises(InputError) as caught:
        read('<row r="20000"><c r="A20000"><v>1</v></c></row><row r="1048576"><c r="XFD1048576"><v>1</v></c></row>')
    assert str(caught.value) == (
        "book.xlsx  Zones!XFD1048576: found a value in row 1,048,576; expected at most 20,000 rows. "
        "Clear this cell and those beyond it, or move them to another workbook."
    )


def test_a_value_beyond_the_last_column(read: Callable[[str], Cells]) -> None:
    with pytest.raises(InputError) as caught:
        read('<row><c r="SF1"><v>1</v></c><c r="SG1" t="str"><f>A1</f></c></row>')
    assert str(caught.value) == (
        "book.xlsx  Zones!SG1: found a value in column 501; expected at most 500 columns. "
        "Clear this cell and those beyond it, or move them to another workbook."
    )


def test_more_cells_than_can_be_read(
    book: Callable[[bytes], Path], plain_book: bytes, monkeypatch: pytest.MonkeyPatch
) -> None:
    monkeypatch.setattr(reader, "MOST_CELLS", 13)  # Zones holds 13
    assert refusal(book(plain_book)) == [
        "book.xlsx  Lists!A1: found more than 13 filled cells; expected at most 13 in all sheets. "
        "Clear this cell and those beyond it, or move them to another workbook."
    ]


def test_formatted_empty_cells_do_not_count(read: Callable[[str], Cells]) -> None:
    rows = "".join(f'<row r="{row}"><c r="A{row}" s="1"/></row>' for row in range(20_001, 60_000))
    assert read(f'<row r="1"><c r="A1"><v>1</v></c></row>{rows}') == {(1, 1): Cell(1.0, "number")}


@pytest.mark.parametrize(
    ("cell", "cause"),
    [
        ('<c s="99"><v>1</v></c>', "IndexError"),
        ('<c t="s"><v>9999</v></c>', "IndexError"),
        ('<c t="s"><v>-1</v></c>', "IndexError"),
        ("<c><v>twelve</v></c>", "ValueError"),
        ('<c t="x"><v>1</v></c>', "KeyError"),
        ("<c>", "ExpatError"),
        ('<c r="$A$1"><v>1</v></c>', "ValueError"),
        ('<c r="日1"><v>1</v></c>', "ValueError"),
    ],
)
def test_a_broken_cell_names_its_sheet(read: Callable[[str], Cells], cell: str, cause: str) -> None:
    with pytest.raises(InputError) as caught:
        read(f"<row>{cell}</row>")
    assert str(caught.value) == (
        f"book.xlsx  Zones: found a part that cannot be read ({cause}); expected a sound workbook. "
        "Open the file in your spreadsheet program, save it again, and try once more."
    )


def test_all_broken_sheets_are_told_at_once(book: Callable[[bytes], Path], plain_book: bytes, inject: Inject) -> None:
    edits = {"xl/_rels/workbook.xml.rels": ("worksheets/sheet2.xml", "worksheets/gone.xml")}
    problems = refusal(book(inject(plain_book, {"xl/worksheets/sheet1.xml": b"<worksheet>"}, edits)))
    assert problems == [
        f"book.xlsx  {sheet}: found a part that cannot be read ({cause}); expected a sound workbook. "
        "Open the file in your spreadsheet program, save it again, and try once more."
        for sheet, cause in (("Zones", "ExpatError"), ("Lists", "KeyError"))
    ]


def test_a_missing_index_part_is_told(book: Callable[[bytes], Path], plain_book: bytes, inject: Inject) -> None:
    assert refusal(book(inject(plain_book, {}, {"xl/_rels/workbook.xml.rels": ("styles.xml", "gone.xml")}))) == [
        "book.xlsx: found a part that cannot be read (KeyError); expected a sound workbook. "
        "Open the file in your spreadsheet program, save it again, and try once more."
    ]


def test_the_gate_comes_first(book: Callable[[bytes], Path]) -> None:
    assert refusal(book(b"Zone;12")) == [
        "book.xlsx: found a plain text file; expected an .xlsx or .xlsm workbook. "
        "Open it in your spreadsheet program and save it as .xlsx."
    ]


def test_our_own_sheets_are_left_out(book: Callable[[bytes], Path], plain_book: bytes, donor: bytes) -> None:
    path = book(plain_book)
    assert owned_sheets(path) == frozenset()
    graft(path, donor, path)
    assert owned_sheets(path) == {"Summary", "Monthly need"}
    assert list(read_cells(path)) == ["Zones", "Lists"]


def test_the_reader_agrees_with_openpyxl_on_result_sheets(book: Callable[[bytes], Path], donor: bytes) -> None:
    path = book(donor)
    cells = read_cells(path)["Monthly need"]
    others = {
        (cell.row, cell.column): cell.value
        for row in load_workbook(path)["Monthly need"]
        for cell in row
        if cell.value is not None
    }
    assert {place: cell.value for place, cell in cells.items()} == others
