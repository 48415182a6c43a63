"""Workbooks as users have them: everything that a careless save would lose."""

from __future__ import annotations

import os
import shutil
import struct
import subprocess
import zlib
from collections.abc import Callable, Mapping
from io import BytesIO
from pathlib import Path
from zipfile import ZIP_DEFLATED, ZipFile

import pytest
import xlsxwriter  # type: ignore[import-untyped]
from lxml import etree
from openpyxl import Workbook
from openpyxl.chart import BarChart, LineChart, Reference
from openpyxl.comments import Comment
from openpyxl.formatting.rule import CellIsRule
from openpyxl.styles import Font, PatternFill
from openpyxl.worksheet.datavalidation import DataValidation
from openpyxl.worksheet.hyperlink import Hyperlink
from openpyxl.worksheet.table import Table
from openpyxl.worksheet.worksheet import Worksheet

OFFICE = "http://schemas.openxmlformats.org/officeDocument/2006/relationships"
MAIN = "http://schemas.openxmlformats.org/spreadsheetml/2006/main"
MICROSOFT = "http://schemas.microsoft.com/office"

Inject = Callable[[bytes, Mapping[str, bytes], Mapping[str, tuple[str, str]]], bytes]
Convert = Callable[[Path, Path], Path]


def png() -> bytes:
    """A picture of one blue point."""

    def chunk(kind: bytes, data: bytes) -> bytes:
        return struct.pack(">I", len(data)) + kind + data + struct.pack(">I", zlib.crc32(kind + data))

    head = struct.pack(">IIBBBBB", 1, 1, 8, 2, 0, 0, 0)
    return b"\x89PNG\r\n\x1a\n" + b"".join(
        chunk(kind, data) for kind, data in ((b"IHDR", head), (b"IDAT", zlib.compress(b"\0\0\x72\xb2")), (b"IEND", b""))
    )


def injected(data: bytes, parts: Mapping[str, bytes], edits: Mapping[str, tuple[str, str]]) -> bytes:
    """The package with further parts, and with one text replaced in some parts."""
    buffer = BytesIO()
    with ZipFile(BytesIO(data)) as old, ZipFile(buffer, "w", ZIP_DEFLATED) as new:
        for entry in old.infolist():
            content = old.read(entry)
            if entry.filename in edits:
                before, after = edits[entry.filename]
                assert before.encode() in content, (entry.filename, before)
                content = content.replace(before.encode(), after.encode(), 1)
            if entry.filename not in parts:
                new.writestr(entry, content)
        for name, content in parts.items():
            new.writestr(name, content)
    return buffer.getvalue()


def drawn_book() -> bytes:
    """What XlsxWriter can put into a workbook, formulas with their stored values included."""
    buffer = BytesIO()
    book = xlsxwriter.Workbook(buffer, {"in_memory": True})
    bold, red = book.add_format({"bold": True}), book.add_format({"font_color": "red", "num_format": '0.000 "m"'})
    zones = book.add_worksheet("Zones")
    zones.write_row(1, 0, ["Zone", "Floor area", "Note"], bold)
    for row, (name, area) in enumerate(
        [("Workshop", 120.5), ("Reading room", 80.25), ("Müller & Söhne", 42.0)], start=2
    ):
        zones.write_row(row, 0, [name, area])
    zones.write_formula("B6", "=SUM(B3:B5)", red, 242.75)
    zones.write_formula("C6", '=IF(B6>0,"filled","")', None, "filled")
    zones.write_formula("D6", "=1/0", None, "#DIV/0!")
    zones.write_rich_string("C3", "plain ", bold, "bold", " plain")
    zones.write_comment("B3", "as measured", {"visible": True, "color": "yellow", "x_scale": 2})
    zones.insert_image("F2", "point.png", {"image_data": BytesIO(png()), "description": "a point"})
    zones.insert_textbox("F8", "a text box")
    zones.add_sparkline("E3", {"range": "Zones!B3:B5"})
    zones.conditional_format("B3:B5", {"type": "data_bar", "data_bar_2010": True})
    zones.conditional_format("B3:B5", {"type": "cell", "criteria": ">", "value": 100, "format": red})
    zones.data_validation("A10:A20", {"validate": "list", "source": "=Lists!$A$1:$A$3"})
    zones.set_header("&L&G", {"image_left": "point.png", "image_data_left": BytesIO(png())})
    zones.repeat_rows(1)
    zones.print_area("A1:H40")
    series = {"values": "=Zones!$B$3:$B$5", "pattern": {"pattern": "wide_upward_diagonal", "fg_color": "blue"}}
    columns, lines = book.add_chart({"type": "column"}), book.add_chart({"type": "line"})
    columns.add_series(series)
    lines.add_series(series)
    zones.insert_chart("F12", columns)
    book.add_chartsheet("Plot").set_chart(lines)
    lists = book.add_worksheet("Lists")
    lists.write_column(0, 0, ["heated", "heated and cooled", "unconditioned"])
    lists.add_table("C1:D4", {"name": "Prices", "columns": [{"header": "Item"}, {"header": "Price"}]})
    lists.repeat_rows(0)
    lists.very_hidden()
    book.define_name("Areas", "=Zones!$B$3:$B$5")
    book.define_name("Lists!Local", "=Lists!$A$1")
    book.set_custom_property("Job", "J-12")
    zones.activate()
    book.close()
    return buffer.getvalue()


def rich_parts() -> dict[str, bytes]:
    """Parts that no Python writer makes, in their least form."""
    relation = (
        '<?xml version="1.0"?><Relationships xmlns="http://schemas.openxmlformats.org/package/2006/relationships">'
    )
    return {
        "xl/threadedComments/threadedComment1.xml": f'<ThreadedComments xmlns="{MICROSOFT}/spreadsheetml/2018/'
        'threadedcomments"><threadedComment ref="A3" dT="2024-01-01T00:00:00" personId="{1}" id="{2}"><text>why?</text>'
        "</threadedComment></ThreadedComments>".encode(),
        "xl/persons/person.xml": f'<personList xmlns="{MICROSOFT}/spreadsheetml/2018/threadedcomments">'
        '<person displayName="A. Smith" id="{1}"/></personList>'.encode(),
        "customXml/item1.xml": b"<job><number>12</number></job>",
        "customXml/_rels/item1.xml.rels": f"{relation}</Relationships>".encode(),
        "xl/externalLinks/externalLink1.xml": f'<externalLink xmlns="{MAIN}">'
        f'<externalBook xmlns:r="{OFFICE}" r:id="rId1">'
        '<sheetNames><sheetName val="Prices"/></sheetNames></externalBook></externalLink>'.encode(),
        "xl/externalLinks/_rels/externalLink1.xml.rels": f'{relation}<Relationship Id="rId1"'
        f' Type="{OFFICE}/externalLinkPath"'
        ' Target="prices.xlsx" TargetMode="External"/></Relationships>'.encode(),
        "xl/printerSettings/printerSettings1.bin": bytes(range(256)),
        "xl/calcChain.xml": f'<calcChain xmlns="{MAIN}"><c r="B6" i="1"/><c r="C6"/><c r="D6"/></calcChain>'.encode(),
        "xl/vbaProject.bin": b"\xd0\xcf\x11\xe0 stands in for macros " + bytes(range(256)) * 4,
    }


def rich_edits() -> dict[str, tuple[str, str]]:
    """The index entries of :func:`rich_parts`."""

    def relation(number: int, kind: str, target: str, *, base: str = OFFICE) -> str:
        return f'<Relationship Id="rId{number}" Type="{base}/{kind}" Target="{target}"/>'

    def override(part: str, kind: str) -> str:
        return f'<Override PartName="/{part}" ContentType="application/vnd.{kind}+xml"/>'

    sheet = "openxmlformats-officedocument.spreadsheetml"
    end = "</Relationships>"
    return {
        "xl/_rels/workbook.xml.rels": (
            end,
            relation(71, "externalLink", "externalLinks/externalLink1.xml")
            + relation(72, "person", "persons/person.xml", base=f"{MICROSOFT}/2017/10/relationships")
            + relation(73, "customXml", "../customXml/item1.xml")
            + relation(74, "calcChain", "calcChain.xml")
            + relation(75, "vbaProject", "vbaProject.bin", base=f"{MICROSOFT}/2006/relationships")
            + end,
        ),
        "xl/worksheets/_rels/sheet1.xml.rels": (
            end,
            relation(71, "threadedComment", "../threadedComments/threadedComment1.xml")
            + relation(72, "printerSettings", "../printerSettings/printerSettings1.bin")
            + end,
        ),
        "xl/workbook.xml": (
            "</sheets>",
            '</sheets><externalReferences><externalReference r:id="rId71"/></externalReferences>',
        ),
        "[Content_Types].xml": (
            "</Types>",
            override("xl/threadedComments/threadedComment1.xml", "ms-excel.threadedcomments")
            + override("xl/persons/person.xml", "ms-excel.person")
            + override("xl/externalLinks/externalLink1.xml", f"{sheet}.externalLink")
            + override("xl/calcChain.xml", f"{sheet}.calcChain")
            + '<Default Extension="bin" ContentType="application/vnd.ms-office.vbaProject"/></Types>',
        ),
    }


def result_sheets(heating: float = 5300.0) -> Workbook:
    """Result sheets as openpyxl builds them, with all that ours may hold."""
    book = Workbook()
    summary = book.active
    assert isinstance(summary, Worksheet)
    summary.title = "Summary"
    summary.sheet_view.tabSelected = True
    summary["A1"], summary["B1"] = "Heating need", heating
    summary["B1"].number_format = '#,##0.0 "kWh"'
    summary["A1"].font = Font(name="Arial", bold=True, color="FF0072B2")
    summary["A2"] = "=cmd()"
    summary["A2"].data_type = "s"
    summary["A2"].quotePrefix = True
    summary["A3"] = "to the months"
    summary["A3"].hyperlink = Hyperlink(ref="A3", location="'Monthly need'!A1")
    summary["A4"] = "also"
    summary["A4"].hyperlink = "#'Monthly need'!B2"
    summary["A5"] = "='Monthly need'!B3"
    summary["A6"] = "to your sheet"
    summary["A6"].hyperlink = Hyperlink(ref="A6", location="'Zones'!B3")
    summary["A1"].comment = Comment("all zones", "heatledger")
    months = book.create_sheet("Monthly need")
    assert isinstance(months, Worksheet)
    months.append(["Month", "Heating"])
    for month in range(1, 13):
        months.append([f"M{month}", heating / month])
    rule = CellIsRule("lessThan", ["1000"], fill=PatternFill("solid", bgColor="FFE69F00"))  # type: ignore[no-untyped-call]
    months.conditional_formatting.add("B2:B13", rule)
    choice = DataValidation("list", formula1="'Monthly need'!$A$2:$A$4")
    choice.add("D1")
    months.add_data_validation(choice)
    months.add_table(Table(displayName="Prices", ref="A1:B13"))
    months.print_title_rows = "1:1"
    months.print_area = "A1:C20"
    for sheet, chart in ((summary, BarChart()), (months, LineChart())):
        chart.add_data(Reference(months, min_col=2, min_row=1, max_row=13), titles_from_data=True)
        chart.set_categories(Reference(months, min_col=1, min_row=2, max_row=13))
        sheet.add_chart(chart, "F2")
    return book


def saved(book: Workbook) -> bytes:
    """The bytes of an openpyxl workbook."""
    buffer = BytesIO()
    book.save(buffer)
    return buffer.getvalue()


@pytest.fixture(scope="session")
def plain_book() -> bytes:
    """XlsxWriter's workbook, as it is."""
    return drawn_book()


@pytest.fixture(scope="session")
def rich_book(plain_book: bytes) -> bytes:
    """The workbook with parts that no Python writer makes, macros included (an .xlsm)."""
    macro = (
        "application/vnd.openxmlformats-officedocument.spreadsheetml.sheet.main+xml",
        "application/vnd.ms-excel.sheet.macroEnabled.main+xml",
    )
    return injected(injected(plain_book, rich_parts(), rich_edits()), {}, {"[Content_Types].xml": macro})


@pytest.fixture(scope="session")
def donor() -> bytes:
    """Result sheets in a workbook of their own."""
    return saved(result_sheets())


@pytest.fixture(scope="session")
def make_donor() -> Callable[[float], bytes]:
    """Result sheets with another figure."""
    return lambda heating: saved(result_sheets(heating))


@pytest.fixture(scope="session")
def inject() -> Inject:
    """:func:`injected` for tests."""
    return injected


@pytest.fixture(scope="session")
def convert(tmp_path_factory: pytest.TempPathFactory) -> Convert:
    """Open a workbook in LibreOffice and save it, as the suffix of the new file says."""
    program = shutil.which("soffice")
    if program is None:
        if os.environ.get("CI"):
            pytest.fail("LibreOffice is missing: install soffice")
        pytest.skip("LibreOffice (soffice) is not on the path")
    profile = tmp_path_factory.mktemp("profile").as_uri()

    def run(source: Path, folder: Path, suffix: str = "xlsx") -> Path:
        arguments = [f"-env:UserInstallation={profile}", "--headless", "--convert-to", suffix, "--outdir", str(folder)]
        done = subprocess.run(
            [program, *arguments, str(source)], capture_output=True, text=True, timeout=180, check=False
        )
        result = folder / f"{source.stem}.{suffix}"
        assert result.exists(), done.stdout + done.stderr
        return result

    return run


ORDER = {
    "workbook": "fileVersion fileSharing workbookPr workbookProtection bookViews sheets functionGroups "
    "externalReferences definedNames calcPr oleSize customWorkbookViews pivotCaches smartTagPr smartTagTypes "
    "webPublishing fileRecoveryPr webPublishObjects extLst",
    "styleSheet": "numFmts fonts fills borders cellStyleXfs cellXfs cellStyles dxfs tableStyles colors extLst",
    "worksheet": "sheetPr dimension sheetViews sheetFormatPr cols sheetData sheetCalcPr sheetProtection "
    "protectedRanges scenarios autoFilter sortState dataConsolidate customSheetViews mergeCells phoneticPr "
    "conditionalFormatting dataValidations hyperlinks printOptions pageMargins pageSetup headerFooter rowBreaks "
    "colBreaks customProperties cellWatches ignoredErrors smartTags drawing legacyDrawing legacyDrawingHF picture "
    "oleObjects controls webPublishItems tableParts extLst",
}
"""Order of the children: ECMA-376 Part 1, Annex A (CT_Workbook, CT_Stylesheet, CT_Worksheet)."""


def check_order(data: bytes) -> None:
    """Whether the index and all sheets keep the order of the schema; Excel repairs what does not."""
    with ZipFile(BytesIO(data)) as archive:
        roots = [etree.fromstring(archive.read(name)) for name in archive.namelist() if name.lower().endswith(".xml")]
    heard = [root for root in roots if root.tag in {f"{{{MAIN}}}{name}" for name in ORDER}]
    assert len(heard) > len(ORDER)
    for root in heard:
        order = ORDER[etree.QName(root).localname].split()
        names = [etree.QName(child).localname for child in root.iterchildren(f"{{{MAIN}}}*")]
        assert names == sorted(names, key=order.index)
        assert [name for name in set(names) if names.count(name) > 1] in ([], ["conditionalFormatting"])


@pytest.fixture(scope="session")
def in_order() -> Callable[[bytes], None]:
    """:func:`check_order` for tests."""
    return check_order
