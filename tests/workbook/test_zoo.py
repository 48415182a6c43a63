"""Everything that a workbook of a user may hold, calculated as a whole and found again byte for byte."""

from __future__ import annotations

import posixpath
import re
from collections.abc import Callable, Mapping
from dataclasses import dataclass, field
from io import BytesIO
from pathlib import Path
from typing import TYPE_CHECKING, Any
from zipfile import ZIP_DEFLATED, ZipFile

import pytest
import xlsxwriter  # type: ignore[import-untyped]
from click.testing import CliRunner
from lxml import etree
from openpyxl import Workbook
from openpyxl.chart import BarChart, Reference
from openpyxl.chartsheet import Chartsheet
from openpyxl.comments import Comment
from openpyxl.formatting.rule import DataBarRule
from openpyxl.workbook.defined_name import DefinedName
from openpyxl.workbook.protection import WorkbookProtection
from openpyxl.worksheet.datavalidation import DataValidation
from openpyxl.worksheet.formula import ArrayFormula
from openpyxl.worksheet.table import Table

from heatledger.cli import main
from heatledger.inputs.cells import Cell
from heatledger.workbook.reader import owned_sheets, read_cells

if TYPE_CHECKING:
    from tests.conftest import Book, Tell

    Convert = Callable[..., Path]
    KeepsAll = Callable[[Path, bytes], None]

SPACE = "http://schemas.openxmlformats.org/spreadsheetml/2006/main"
MAIN = f"{{{SPACE}}}"
OFFICE = "http://schemas.openxmlformats.org/officeDocument/2006/relationships"
MICROSOFT = "http://schemas.microsoft.com/office"
INDEX_PARTS = {"[Content_Types].xml", "xl/workbook.xml", "xl/_rels/workbook.xml.rels", "xl/styles.xml"}
RESULTS = ("Summary", "Monthly need", "Monthly balance", "Element losses", "Solar gains", "Build-up results", "Notes")
PICTURE = bytes.fromhex(
    "89504e470d0a1a0a0000000d4948445200000001000000010802000000907753de0000000c49444154789c6360"
    "28da0400019a012579d294fa0000000049454e44ae426082"
)
"""A PNG of one blue point."""


# What XlsxWriter can make


def pictures(_book: Any, sheet: Any) -> None:
    sheet.insert_image(
        "H2", "point.png", {"image_data": BytesIO(PICTURE), "description": "a point", "url": "http://a.b"}
    )
    sheet.embed_image("H20", "point.png", {"image_data": BytesIO(PICTURE)})
    sheet.set_background(BytesIO(PICTURE))


def header_pictures(_book: Any, sheet: Any) -> None:
    sheet.set_header("&L&G&RPage &P", {"image_left": "point.png", "image_data_left": BytesIO(PICTURE)})
    sheet.set_footer("&C&G", {"image_center": "point.png", "image_data_center": BytesIO(PICTURE)})


def charts(book: Any, sheet: Any) -> None:
    for place, kind in (("H2", "column"), ("H20", "scatter"), ("H40", "doughnut")):
        chart = book.add_chart({"type": kind})
        chart.add_series({"categories": "=Survey!$A$1:$A$3", "values": "=Survey!$B$1:$B$3", "gap": 40})
        chart.set_title({"name": "=Survey!$A$1"})
        sheet.insert_chart(place, chart)


def chart_sheets(book: Any, _sheet: Any) -> None:
    chart = book.add_chart({"type": "line"})
    chart.add_series({"values": "=Survey!$B$1:$B$3"})
    book.add_chartsheet("Plot").set_chart(chart)


def sparklines(_book: Any, sheet: Any) -> None:
    sheet.add_sparkline("E1", {"range": "Survey!B1:B3", "type": "column", "markers": True})


def notes(_book: Any, sheet: Any) -> None:
    sheet.write_comment("B1", "as measured", {"visible": True, "color": "yellow", "x_scale": 2})


def conditional_formats_of_2010(book: Any, sheet: Any) -> None:
    sheet.conditional_format("B1:B3", {"type": "data_bar", "data_bar_2010": True, "bar_negative_color": "red"})
    sheet.conditional_format(
        "B1:B3", {"type": "cell", "criteria": ">", "value": 1, "format": book.add_format({"bold": 1})}
    )
    sheet.conditional_format("B1:B3", {"type": "icon_set", "icon_style": "3_arrows"})


def shapes_and_buttons(_book: Any, sheet: Any) -> None:
    sheet.insert_textbox("H2", "a text box")
    sheet.insert_button("H10", {"caption": "Press", "macro": "run_it"})
    sheet.insert_checkbox("C9", True)


def tables(_book: Any, sheet: Any) -> None:
    columns = [{"header": "Item"}, {"header": "Price"}, {"header": "Twice", "formula": "=[@Price]*2"}]
    sheet.add_table("J1:L4", {"name": "Prices", "columns": columns, "total_row": False})


def defined_names(book: Any, _sheet: Any) -> None:
    book.define_name("Areas", "=Survey!$B$1:$B$3")
    book.define_name("Survey!Local", "=Survey!$A$1")
    book.define_name("Factor", "=1.25")


def print_settings(_book: Any, sheet: Any) -> None:
    sheet.print_area("A1:H40")
    sheet.repeat_rows(0, 1)
    sheet.fit_to_pages(1, 0)
    sheet.set_h_pagebreaks([20])
    sheet.set_footer("&CPage &P of &N")


def protected_sheets(_book: Any, sheet: Any) -> None:
    sheet.protect("secret", {"sort": True})
    sheet.unprotect_range("B1:B3", "figures")


def dynamic_arrays(_book: Any, sheet: Any) -> None:
    sheet.write_dynamic_array_formula("J1:J3", "=SORT(B1:B3)", None, 1)
    sheet.write_array_formula("K1:K3", "{=B1:B3*2}", None, 2)
    sheet.write_formula("L1", "=LET(_xlpm.a,2,_xlpm.a*B1)", None, 2)


def hidden_sheets(book: Any, _sheet: Any) -> None:
    book.add_worksheet("Quiet").hide()
    silent = book.add_worksheet("Silent")
    silent.very_hidden()
    silent.write("A1", "kept")


def rich_texts_and_links(book: Any, sheet: Any) -> None:
    sheet.write_rich_string("A9", "plain ", book.add_format({"bold": True}), "bold", " plain")
    sheet.write_url("A10", "https://example.org", string="link")
    sheet.write_url("A11", "internal:Zones!A1")
    sheet.merge_range("A12:C12", "merged")
    sheet.autofilter("A1:B3")
    sheet.ignore_errors({"number_stored_as_text": "A1:A9"})
    book.set_custom_property("Job", "J-12")


def validations(_book: Any, sheet: Any) -> None:
    sheet.data_validation("A14:A20", {"validate": "list", "source": "=Zones!$A$5:$A$6", "input_message": "one of them"})


XLSXWRITER: tuple[Callable[[Any, Any], None], ...] = (
    *(pictures, header_pictures, charts, chart_sheets, sparklines, notes, conditional_formats_of_2010),
    *(shapes_and_buttons, tables, defined_names, print_settings, protected_sheets, dynamic_arrays, hidden_sheets),
    *(rich_texts_and_links, validations),
)


def written(building: Book, *features: Callable[[Any, Any], None]) -> bytes:
    """The building and a sheet Survey with these features, by XlsxWriter; Survey is the active sheet."""
    buffer = BytesIO()
    book = xlsxwriter.Workbook(buffer, {"in_memory": True})
    for title, values in building.sheets.items():
        sheet = book.add_worksheet(title)
        for (row, column), value in values.items():
            sheet.write(row - 1, column - 1, value)
    survey = book.add_worksheet("Survey")
    survey.write_column("A1", ["one", "two", "three"])
    survey.write_column("B1", [1, 2, 3])
    survey.write_formula("B4", "=SUM(B1:B3)", None, 6)
    survey.write_formula("C4", "=1/0", None, "#DIV/0!")
    survey.write_formula("D4", "='Monthly need'!C8", None, 0)
    survey.activate()
    for feature in features:
        feature(book, survey)
    book.close()
    return buffer.getvalue()


# What no Python writer makes, in its least form


@dataclass(frozen=True)
class Injected:
    """Parts, and what points at them."""

    parts: Mapping[str, tuple[str, str | bytes]]
    """Content type (without ``application/``; empty where the extension tells it) and content by name."""
    of_sheet: Mapping[str, str] = field(default_factory=dict)
    """Parts that the sheet points at, and the type of the relation."""
    of_book: Mapping[str, str] = field(default_factory=dict)
    in_sheet: str = ""
    """Inserted at the end of the sheet; {0} is the id of the first relation."""
    of_cells: str = ""
    """Rows behind the last."""
    in_book: tuple[str, str] = ("</sheets>", "</sheets>")


SHEETML = "vnd.openxmlformats-officedocument.spreadsheetml"
X14 = f'xmlns:x14="{MICROSOFT}/spreadsheetml/2009/9/main" xmlns:xm="{MICROSOFT}/excel/2006/main"'
EXTENSION = f'<extLst><ext {X14} uri="{{CCE6A557-97BC-4b89-ADB6-D9C93CAAB3DF}}">'
THREADS = f'xmlns="{MICROSOFT}/spreadsheetml/2018/threadedcomments"'

INJECTED: dict[str, Injected] = {
    "custom views": Injected(
        {},
        in_book=(
            "</workbook>",
            '<customWorkbookViews><customWorkbookView name="Print" guid="{AAAAAAAA-0000-0000-0000-000000000001}" '
            'windowWidth="9" windowHeight="9" activeSheetId="1"/></customWorkbookViews></workbook>',
        ),
    ),
    "pivot tables": Injected(
        {
            "xl/pivotTables/pivotTable1.xml": (
                f"{SHEETML}.pivotTable+xml",
                f'<pivotTableDefinition xmlns="{SPACE}" name="P" cacheId="1" dataCaption="Values">'
                '<location ref="J1:K4" firstHeaderRow="1" firstDataRow="1" firstDataCol="1"/></pivotTableDefinition>',
            ),
            "xl/pivotCache/pivotCacheDefinition1.xml": (
                f"{SHEETML}.pivotCacheDefinition+xml",
                f'<pivotCacheDefinition xmlns="{SPACE}" saveData="0" refreshOnLoad="1"><cacheSource type="worksheet">'
                '<worksheetSource ref="A1:B3" sheet="Survey"/></cacheSource><cacheFields count="0"/>'
                "</pivotCacheDefinition>",
            ),
            "xl/pivotTables/_rels/pivotTable1.xml.rels": (
                "",
                '<Relationships xmlns="http://schemas.openxmlformats.org/package/2006/relationships"><Relationship '
                f'Id="rId1" Type="{OFFICE}/pivotCacheDefinition" Target="../pivotCache/pivotCacheDefinition1.xml"/>'
                "</Relationships>",
            ),
        },
        of_sheet={"xl/pivotTables/pivotTable1.xml": f"{OFFICE}/pivotTable"},
        of_book={"xl/pivotCache/pivotCacheDefinition1.xml": f"{OFFICE}/pivotCacheDefinition"},
        in_book=("</workbook>", '<pivotCaches><pivotCache cacheId="1" r:id="{0}"/></pivotCaches></workbook>'),
    ),
    "slicers": Injected(
        {
            "xl/slicers/slicer1.xml": (
                "vnd.ms-excel.slicer+xml",
                f'<slicers xmlns="{MICROSOFT}/spreadsheetml/2009/9/main"><slicer name="Item" cache="Slicer_Item" '
                'rowHeight="241300"/></slicers>',
            ),
            "xl/slicerCaches/slicerCache1.xml": (
                "vnd.ms-excel.slicerCache+xml",
                f'<slicerCacheDefinition xmlns="{MICROSOFT}/spreadsheetml/2009/9/main" name="Slicer_Item" '
                'sourceName="Item"/>',
            ),
        },
        of_sheet={"xl/slicers/slicer1.xml": f"{MICROSOFT}/2007/relationships/slicer"},
        of_book={"xl/slicerCaches/slicerCache1.xml": f"{MICROSOFT}/2007/relationships/slicerCache"},
        in_sheet=f'<extLst><ext {X14} uri="{{A8765BA9-456A-4dab-B4F3-ACF838C121DE}}"><x14:slicerList>'
        '<x14:slicer r:id="{0}"/></x14:slicerList></ext></extLst>',
    ),
    "threaded comments": Injected(
        {
            "xl/threadedComments/threadedComment1.xml": (
                "vnd.ms-excel.threadedcomments+xml",
                f'<ThreadedComments {THREADS}><threadedComment ref="A1" dT="2024-01-01T00:00:00" personId="{{1}}" '
                'id="{2}"><text>why?</text></threadedComment></ThreadedComments>',
            ),
            "xl/persons/person.xml": (
                "vnd.ms-excel.person+xml",
                f'<personList {THREADS}><person displayName="A. Smith" id="{{1}}"/></personList>',
            ),
        },
        of_sheet={"xl/threadedComments/threadedComment1.xml": f"{MICROSOFT}/2017/10/relationships/threadedComment"},
        of_book={"xl/persons/person.xml": f"{MICROSOFT}/2017/10/relationships/person"},
    ),
    "validations of 2010": Injected(
        {},
        in_sheet=f'{EXTENSION}<x14:dataValidations count="1"><x14:dataValidation type="list"><x14:formula1><xm:f>'
        "Zones!$A$5:$A$6</xm:f></x14:formula1><xm:sqref>C20:C30</xm:sqref></x14:dataValidation></x14:dataValidations>"
        "</ext></extLst>",
    ),
    "shared formulas and reading aids": Injected(
        {},
        of_cells='<row r="40"><c r="A40"><f t="shared" ref="A40:A41" si="7">B1+1</f><v>2</v></c>'
        '<c r="B40" t="inlineStr"><is><r><t>東</t></r><rPh sb="0" eb="1"><t>ヒガシ</t></rPh></is></c></row>'
        '<row r="41"><c r="A41"><f t="shared" si="7"/><v>3</v></c></row>',
    ),
    "printer settings": Injected(
        {"xl/printerSettings/printerSettings1.bin": (f"{SHEETML}.printerSettings", bytes(range(256)))},
        of_sheet={"xl/printerSettings/printerSettings1.bin": f"{OFFICE}/printerSettings"},
    ),
    "custom XML": Injected(
        {
            "customXml/item1.xml": ("", "<job><number>12</number></job>"),
            "customXml/itemProps1.xml": (
                "vnd.openxmlformats-officedocument.customXmlProperties+xml",
                '<ds:datastoreItem xmlns:ds="http://schemas.openxmlformats.org/officeDocument/2006/customXml" '
                'ds:itemID="{1}"/>',
            ),
        },
        of_book={"customXml/item1.xml": f"{OFFICE}/customXml"},
    ),
    "external links": Injected(
        {
            "xl/externalLinks/externalLink1.xml": (
                f"{SHEETML}.externalLink+xml",
                f'<externalLink xmlns="{SPACE}"><externalBook xmlns:r="{OFFICE}" r:id="rId1"><sheetNames>'
                '<sheetName val="Prices"/></sheetNames></externalBook></externalLink>',
            ),
            "xl/externalLinks/_rels/externalLink1.xml.rels": (
                "",
                '<Relationships xmlns="http://schemas.openxmlformats.org/package/2006/relationships"><Relationship '
                f'Id="rId1" Type="{OFFICE}/externalLinkPath" Target="prices.xlsx" TargetMode="External"/>'
                "</Relationships>",
            ),
        },
        of_book={"xl/externalLinks/externalLink1.xml": f"{OFFICE}/externalLink"},
        in_book=(
            "</sheets>",
            '</sheets><externalReferences><externalReference r:id="{0}"/></externalReferences>',
        ),
    ),
    "list of formulas": Injected(
        {
            "xl/calcChain.xml": (
                f"{SHEETML}.calcChain+xml",
                f'<calcChain xmlns="{SPACE}"><c r="B4" i="12"/><c r="C4"/><c r="D4"/></calcChain>',
            )
        },
        of_book={"xl/calcChain.xml": f"{OFFICE}/calcChain"},
    ),
    "macros": Injected(
        {
            "xl/vbaProject.bin": (
                "vnd.ms-office.vbaProject",
                b"\xd0\xcf\x11\xe0 stands in for macros " + bytes(range(256)),
            )
        },
        of_book={"xl/vbaProject.bin": f"{MICROSOFT}/2006/relationships/vbaProject"},
    ),
    "timelines": Injected(
        {
            "xl/timelines/timeline1.xml": (
                "vnd.ms-excel.timeline+xml",
                f'<timelines xmlns="{MICROSOFT}/spreadsheetml/2010/11/main"/>',
            ),
            "xl/timelineCaches/timelineCache1.xml": (
                "vnd.ms-excel.timelineCache+xml",
                f'<timelineCacheDefinition xmlns="{MICROSOFT}/spreadsheetml/2010/11/main" name="N" sourceName="D"/>',
            ),
        },
        of_sheet={"xl/timelines/timeline1.xml": f"{MICROSOFT}/2011/relationships/timeline"},
        of_book={"xl/timelineCaches/timelineCache1.xml": f"{MICROSOFT}/2011/relationships/timelineCache"},
    ),
    "queries": Injected(
        {
            "xl/connections.xml": (
                f"{SHEETML}.connections+xml",
                f'<connections xmlns="{SPACE}"><connection id="1" name="q" refreshedVersion="6"/></connections>',
            ),
            "xl/queryTables/queryTable1.xml": (
                f"{SHEETML}.queryTable+xml",
                f'<queryTable xmlns="{SPACE}" name="q" connectionId="1"/>',
            ),
            "xl/model/item.data": ("vnd.openxmlformats-officedocument.model+data", bytes(range(99))),
        },
        of_sheet={"xl/queryTables/queryTable1.xml": f"{OFFICE}/queryTable"},
        of_book={
            "xl/connections.xml": f"{OFFICE}/connections",
            "xl/model/item.data": f"{MICROSOFT}/2011/relationships/powerPivotData",
        },
    ),
    "controls and objects": Injected(
        {
            "xl/activeX/activeX1.xml": (
                "vnd.ms-office.activeX+xml",
                f'<ax:ocx xmlns:ax="{MICROSOFT}/2006/activeX" xmlns:r="{OFFICE}" ax:classid="{{1}}" r:id="rId1"/>',
            ),
            "xl/activeX/_rels/activeX1.xml.rels": (
                "",
                '<Relationships xmlns="http://schemas.openxmlformats.org/package/2006/relationships"><Relationship '
                f'Id="rId1" Type="{MICROSOFT}/2006/relationships/activeXControlBinary" Target="activeX1.bin"/>'
                "</Relationships>",
            ),
            "xl/activeX/activeX1.bin": ("vnd.ms-office.activeX", bytes(range(200))),
            "xl/ctrlProps/ctrlProp1.xml": (
                "vnd.ms-excel.controlproperties+xml",
                f'<formControlPr xmlns="{MICROSOFT}/spreadsheetml/2009/9/main" objectType="CheckBox"/>',
            ),
            "xl/embeddings/oleObject1.bin": (
                "vnd.openxmlformats-officedocument.oleObject",
                b"\xd0\xcf\x11\xe0" + bytes(90),
            ),
            "xl/embeddings/Microsoft_Excel_Sheet1.xlsx": (f"{SHEETML}.sheet", b"PK\x03\x04" + bytes(90)),
        },
        of_sheet={
            "xl/activeX/activeX1.xml": f"{OFFICE}/control",
            "xl/ctrlProps/ctrlProp1.xml": f"{OFFICE}/ctrlProp",
            "xl/embeddings/oleObject1.bin": f"{OFFICE}/oleObject",
            "xl/embeddings/Microsoft_Excel_Sheet1.xlsx": f"{OFFICE}/package",
        },
    ),
    "structure protection": Injected(
        {}, in_book=("<bookViews>", '<workbookProtection workbookPassword="DAA7" lockStructure="1"/><bookViews>')
    ),
}


def injected(data: bytes, kinds: Mapping[str, Injected]) -> bytes:
    """The workbook with parts and relations put in by hand; the last sheet but those without cells holds them."""
    parts = unpacked(data)
    sheet = f"xl/worksheets/sheet{sum(name.startswith('xl/worksheets/sheet') for name in parts)}.xml"
    for kind in kinds.values():
        for name, (content_type, content) in kind.parts.items():
            parts[name] = content.encode() if isinstance(content, str) else content
            if content_type:
                override = f'<Override PartName="/{name}" ContentType="application/{content_type}"/></Types>'
                _edit(parts, "[Content_Types].xml", "</Types>", override)
        ids = [_relate(parts, sheet, name, relation) for name, relation in kind.of_sheet.items()]
        own = [_relate(parts, "xl/workbook.xml", name, relation) for name, relation in kind.of_book.items()]
        _edit(parts, sheet, "</sheetData>", f"{kind.of_cells}</sheetData>")
        _edit(parts, sheet, "</worksheet>", kind.in_sheet.replace("{0}", ids[0] if ids else "") + "</worksheet>")
        _edit(parts, "xl/workbook.xml", kind.in_book[0], kind.in_book[1].replace("{0}", own[0] if own else ""))
    if "macros" in kinds:
        macro = "application/vnd.ms-excel.sheet.macroEnabled.main+xml"
        _edit(parts, "[Content_Types].xml", f"application/{SHEETML}.sheet.main+xml", macro)
    return packed(parts)


def _edit(parts: dict[str, bytes], name: str, before: str, after: str) -> None:
    assert before.encode() in parts[name], (name, before)
    parts[name] = parts[name].replace(before.encode(), after.encode(), 1)


def _relate(parts: dict[str, bytes], holder: str, name: str, relation: str) -> str:
    folder, _, base = holder.rpartition("/")
    rels = f"{folder}/_rels/{base}.rels"
    start = b'<Relationships xmlns="http://schemas.openxmlformats.org/package/2006/relationships">'
    parts.setdefault(rels, start + b"</Relationships>")
    number = f"rId{70 + parts[rels].count(b'<Relationship ')}"
    target = posixpath.relpath(name, folder)
    entry = f'<Relationship Id="{number}" Type="{relation}" Target="{target}"/></Relationships>'
    _edit(parts, rels, "</Relationships>", entry)
    return number


# What openpyxl can make


def by_openpyxl(building: Book, path: Path) -> bytes:
    """The building with what openpyxl can put into a workbook."""
    from openpyxl import load_workbook

    book = load_workbook(building.save(path))
    survey: Any = book.create_sheet("Survey", 0)
    for row in (("one", 1), ("two", 2), ("three", 3)):
        survey.append(row)
    chart = BarChart()
    chart.add_data(Reference(survey, min_col=2, min_row=1, max_row=3))
    survey.add_chart(chart, "H2")
    other = BarChart()
    other.add_data(Reference(survey, min_col=2, min_row=1, max_row=3))
    plot: Chartsheet = book.create_chartsheet("Plot")
    plot.add_chart(other)
    survey["B1"].comment = Comment("as measured", "A. Smith")
    bar = DataBarRule("min", None, "max", None, color="FF0072B2")  # type: ignore[no-untyped-call]
    survey["D1"] = ArrayFormula("D1:D3", "=B1:B3*2")
    survey.conditional_formatting.add("B1:B3", bar)
    choice = DataValidation("list", formula1="Zones!$A$5:$A$6")
    choice.add("C1")
    survey.add_data_validation(choice)
    survey.append(["Item", "Price"])
    survey.append(["a", 2])
    survey.add_table(Table(displayName="Prices", ref="A4:B5"))
    survey.print_title_rows = "1:2"
    survey.print_area = "A1:H40"
    survey.oddFooter.center.text = "&P of &N"
    survey.protection.sheet = True
    survey["E1"].hyperlink = "https://example.org"
    survey.freeze_panes = "A2"
    book.defined_names["Areas"] = DefinedName("Areas", attr_text="Survey!$B$1:$B$3")
    book.create_sheet("Quiet").sheet_state = "hidden"
    book.create_sheet("Silent").sheet_state = "veryHidden"
    book.security = WorkbookProtection(lockStructure=True)
    book.active = 3
    return saved(book)


def saved(book: Workbook) -> bytes:
    buffer = BytesIO()
    book.save(buffer)
    return buffer.getvalue()


# What has to hold


def unpacked(data: bytes) -> dict[str, bytes]:
    with ZipFile(BytesIO(data)) as archive:
        return {name: archive.read(name) for name in archive.namelist()}


def packed(parts: Mapping[str, bytes]) -> bytes:
    buffer = BytesIO()
    with ZipFile(buffer, "w", ZIP_DEFLATED) as archive:
        for name, content in parts.items():
            archive.writestr(name, content)
    return buffer.getvalue()


def run(path: Path) -> str:
    result = CliRunner().invoke(main, ["run", str(path)])
    assert result.exit_code == 0, (result.output, result.exception)
    return result.stderr


def titles(data: bytes) -> list[str]:
    return [item.get("name", "") for item in etree.fromstring(unpacked(data)["xl/workbook.xml"]).iter(f"{MAIN}sheet")]


def views(data: bytes) -> list[tuple[str, str]]:
    """Active and first sheet of every window."""
    found = etree.fromstring(unpacked(data)["xl/workbook.xml"]).iter(f"{MAIN}workbookView")
    return [(item.get("activeTab", "0"), item.get("firstSheet", "0")) for item in found]


@pytest.fixture
def keeps_all(tell: Tell, in_order: Callable[[bytes], None]) -> KeepsAll:
    """Calculate a workbook twice and compare it with what it was."""

    def calculate(path: Path, data: bytes) -> None:
        path.write_bytes(data)
        before, cells = unpacked(data), read_cells(path)
        run(path)
        once = path.read_bytes()
        after = unpacked(once)
        kept = before.keys() - INDEX_PARTS
        changed = {name for name in kept if after.get(name) != before[name]}
        tell("zoo: {} workbooks, {} parts, {} parts changed or lost", 1, len(kept), len(changed))
        assert changed == set()
        assert read_cells(path) == cells
        assert titles(once) == [*titles(data), *RESULTS]
        assert views(once) == views(data)
        assert owned_sheets(path) == set(RESULTS)
        in_order(packed({name: after[name] for name in after.keys() - kept}))
        run(path)
        assert path.read_bytes() == once

    return calculate


@pytest.mark.parametrize("feature", XLSXWRITER, ids=lambda feature: feature.__name__)
def test_what_xlsxwriter_makes_is_kept(
    tmp_path: Path, cottage: Book, feature: Callable[[Any, Any], None], keeps_all: KeepsAll
) -> None:
    data = written(cottage, feature)
    plain = written(cottage)
    assert unpacked(data) != unpacked(plain)
    keeps_all(tmp_path / "book.xlsx", data)


@pytest.mark.parametrize("kind", INJECTED)
def test_what_no_python_writer_makes_is_kept(tmp_path: Path, cottage: Book, kind: str, keeps_all: KeepsAll) -> None:
    data = injected(written(cottage), {kind: INJECTED[kind]})
    path = tmp_path / ("book.xlsm" if kind == "macros" else "book.xlsx")
    keeps_all(path, data)


def test_the_workbook_of_all_kinds_is_kept(tmp_path: Path, cottage: Book, keeps_all: KeepsAll) -> None:
    keeps_all(tmp_path / "book.xlsm", injected(written(cottage, *XLSXWRITER), INJECTED))


def test_what_openpyxl_makes_is_kept(tmp_path: Path, cottage: Book, keeps_all: KeepsAll) -> None:
    keeps_all(tmp_path / "book.xlsx", by_openpyxl(cottage, tmp_path / "plain.xlsx"))


@pytest.mark.parametrize("maker", ["XlsxWriter and by hand", "openpyxl"])
def test_libreoffice_in_between(
    tmp_path: Path, cottage: Book, convert: Convert, maker: str, keeps_all: KeepsAll
) -> None:
    """What LibreOffice saved is kept like any workbook, and after it saved results they are known again."""
    data = {
        "XlsxWriter and by hand": lambda: injected(written(cottage, *XLSXWRITER), INJECTED),
        "openpyxl": lambda: by_openpyxl(cottage, tmp_path / "plain.xlsx"),
    }[maker]()
    path, folder = tmp_path / "book.xlsx", tmp_path / "office"
    folder.mkdir()
    path.write_bytes(data)
    keeps_all(tmp_path / "again.xlsx", convert(path, folder).read_bytes())
    (folder / "book.xlsx").unlink()
    run(path)
    names = titles(path.read_bytes())
    again = convert(path, folder)
    before, cells = unpacked(again.read_bytes()), read_cells(again)
    assert titles(again.read_bytes()) == names
    assert owned_sheets(again) == set(RESULTS)
    run(again)
    after = unpacked(again.read_bytes())
    assert titles(again.read_bytes()) == names
    assert read_cells(again) == cells
    ours = before.keys() - after.keys() | {name for name in before if before[name] != after.get(name)}
    users = _reachable(before, set(names) - set(RESULTS))
    assert ours & users <= INDEX_PARTS
    once = again.read_bytes()
    run(again)
    assert again.read_bytes() == once


def _reachable(parts: Mapping[str, bytes], wanted: set[str]) -> set[str]:
    """Parts that these sheets and the workbook use."""
    targets = _relations(parts, "xl/workbook.xml")
    sheets = _sheet_parts(parts)
    start = [part for part in targets.values() if part not in sheets.values()]
    found = _reachable_from(parts, *start, *(part for title, part in sheets.items() if title in wanted))
    assert len(found) > len(wanted)
    return found


def _reachable_from(parts: Mapping[str, bytes], *start: str) -> set[str]:
    waiting, found = list(start), set[str]()
    while waiting:
        part = waiting.pop()
        if part not in found:
            found.add(part)
            waiting += _relations(parts, part).values()
    return found


def _relations(parts: Mapping[str, bytes], part: str) -> dict[str, str]:
    folder, _, base = part.rpartition("/")
    rels = parts.get(f"{folder}/_rels/{base}.rels")
    items = [] if rels is None else [item for item in etree.fromstring(rels) if item.get("TargetMode") != "External"]
    return {
        item.get("Id", ""): posixpath.normpath(posixpath.join("/", folder, item.get("Target", "")))[1:]
        for item in items
    }


# Formulas of the user on results


def texts(path: Path, sheet: str) -> dict[tuple[int, int], str]:
    """The labels of a result sheet by their place."""
    from openpyxl import load_workbook

    rows = load_workbook(path)[sheet].iter_rows()
    cells = [cell for row in rows for cell in row if isinstance(cell.value, str)]
    return {
        (cell.row, cell.column): re.sub(r"[\d.,]+", "#", str(cell.value)) for cell in cells if str(cell.value) != "–"
    }


@pytest.mark.parametrize("sheet", ["Monthly need", "Monthly balance", "Solar gains"])
def test_result_cells_keep_their_places_while_the_zones_stay(tmp_path: Path, cottage: Book, sheet: str) -> None:
    cottage.sheets["Mine"] = {(1, 1): f"='{sheet}'!C8"}
    first, second = cottage.save(tmp_path / "first.xlsx"), tmp_path / "second.xlsx"
    run(first)
    changed: dict[str, Any] = {
        "Zones!E5": 90,
        "Usage!B5": 17,
        "Usage!C5": 22,
        "Openings!E5": 2.2,
        "Air systems!D5": 1.5,
    }
    changed |= {"Build-ups!D6": 30, "Envelope!F8": 0.5}
    cottage.change(changed).save(second)
    run(second)
    assert texts(first, sheet) == texts(second, sheet)


def test_a_formula_on_a_result_follows_the_figures(tmp_path: Path, cottage: Book, convert: Convert) -> None:
    """A formula on a month's need, worked out by LibreOffice over two runs of the same file."""
    path, folder = cottage.save(tmp_path / "book.xlsx"), tmp_path / "office"
    folder.mkdir()
    run(path)
    place = _january(path)
    cottage.sheets["Mine"] = {(1, 1): f"='Monthly need'!{place}*1000"}
    cottage.save(path)
    figures = []
    for area in (60, 95):
        path.write_bytes(_with_area(path.read_bytes(), 60, area))
        mine = _part_of(path, "Mine")
        run(path)
        figures.append(_result(path, place))
        assert _part_of(path, "Mine") == mine
        again = convert(path, folder)
        assert read_cells(again)["Mine"][1, 1] == Cell(pytest.approx(figures[-1] * 1000), "number")  # type: ignore[arg-type]
        again.unlink()
    assert _january(path) == place
    assert figures[0] != figures[1]


def pointers(book: Any, sheet: Any) -> None:
    """All that may point at result sheets."""
    book.define_name("Heat", "='Monthly need'!$C$8")
    chart = book.add_chart({"type": "column"})
    chart.add_series({"values": "='Monthly need'!$C$8:$N$8"})
    sheet.insert_chart("H2", chart)
    sheet.write_url("A10", "internal:'Monthly need'!C8", string="the need")
    sheet.write_formula("A11", "=SUM('Monthly need'!C8:N8)", None, 0)
    sheet.write_formula("A12", "=Heat+Summary!B8", None, 0)
    cold = {"type": "formula", "criteria": "='Monthly need'!$C$8>1", "format": book.add_format({"bold": 1})}
    sheet.conditional_format("A13", cold)
    sheet.data_validation("A14", {"validate": "list", "source": "='Monthly need'!$A$8:$A$9"})


@pytest.mark.filterwarnings("ignore:Unknown worksheet reference")
def test_what_points_at_results_keeps_pointing(
    tmp_path: Path, cottage: Book, convert: Convert, keeps_all: KeepsAll
) -> None:
    """Formulas, names, charts, links, conditional formats and dropdowns, also after LibreOffice saved them."""
    path, folder = tmp_path / "book.xlsx", tmp_path / "office"
    folder.mkdir()
    keeps_all(path, written(cottage, pointers))
    assert _pointing(path) == {"names": 1, "formulas": 3, "links": 1, "conditions": 1, "dropdowns": 1, "charts": 1}
    again = convert(path, folder)
    assert _pointing(again) == _pointing(path)
    run(again)
    assert _pointing(again) == _pointing(path)
    assert titles(again.read_bytes()) == titles(path.read_bytes())


def _pointing(path: Path) -> dict[str, int]:
    """How often the user's parts name the sheet Monthly need, and by what."""
    parts = unpacked(path.read_bytes())
    survey = _sheet_parts(parts)["Survey"]
    used = _reachable_from(parts, survey)
    texts = {name: parts[name].decode().replace("&apos;", "'") for name in (*used, "xl/workbook.xml")}
    assert not any("#REF!" in text for text in texts.values())
    at = r"[^<\"]*Monthly need'!"
    found = {
        "names": re.findall(rf'name="Heat"[^>]*>{at}', texts["xl/workbook.xml"]),
        "formulas": re.findall(rf"<f(?:\s[^>]*)?>(?:{at}|Heat\+)", texts[survey]),
        "links": re.findall(rf'location="{at}', texts[survey]),
        "conditions": re.findall(rf"<formula>{at}", texts[survey]),
        "dropdowns": re.findall(rf"<formula1>{at}", texts[survey]),
        "charts": [name for name in used if "/charts/chart" in name and re.search(rf"<c:f>{at}", texts[name])],
    }
    return {kind: len(places) for kind, places in found.items()}


def test_formulas_on_results_are_pointed_out(tmp_path: Path, cottage: Book) -> None:
    """LibreOffice trusts stored values: the file stays as it is, so the user is told."""
    cottage.sheets["Mine"] = {(1, 1): "='Monthly need'!C8"}
    cottage.sheets["Cost"] = {(1, 1): "=Summary!B9*0.3"}
    path = cottage.save(tmp_path / "book.xlsx")
    assert run(path) == ""
    assert run(path) == (
        "Formulas on Mine, Cost use result sheets: Excel works them out anew when it opens the file, "
        "LibreOffice when you press Ctrl+Shift+F9.\n"
    )


def _january(path: Path) -> str:
    """Cell of the first zone's heating need in January."""
    from openpyxl import load_workbook

    sheet = load_workbook(path)["Monthly need"]
    cells = {str(cell.value): cell for row in sheet.iter_rows() for cell in row if cell.value is not None}
    return f"{cells['Jan'].column_letter}{cells['Heating need [kWh]'].row + 1}"


def _with_area(data: bytes, old: int, new: int) -> bytes:
    """The workbook with another floor area of the first zone, as if typed over."""
    parts = unpacked(data)
    part = _sheet_parts(parts)["Zones"]
    before = parts[part]
    parts[part] = re.sub(rb'(<c r="E5"[^>]*><v>)%d(</v>)' % old, rb"\g<1>%d\g<2>" % new, before)
    assert old == new or parts[part] != before
    return packed(parts)


def _part_of(path: Path, title: str) -> bytes:
    parts = unpacked(path.read_bytes())
    return parts[_sheet_parts(parts)[title]]


def _sheet_parts(parts: Mapping[str, bytes]) -> dict[str, str]:
    """Name of each sheet's part."""
    targets = _relations(parts, "xl/workbook.xml")
    sheets = etree.fromstring(parts["xl/workbook.xml"]).iter(f"{MAIN}sheet")
    return {item.get("name", ""): targets[item.get(f"{{{OFFICE}}}id", "")] for item in sheets}


def _result(path: Path, cell: str) -> float:
    from openpyxl import load_workbook

    value = load_workbook(path, data_only=True)["Monthly need"][cell].value
    assert isinstance(value, int | float)
    return float(value)
