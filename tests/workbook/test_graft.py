from __future__ import annotations

import os
import re
import warnings
from collections.abc import Callable, Mapping
from io import BytesIO
from pathlib import Path
from typing import BinaryIO
from zipfile import ZipFile

import pytest
import xlsxwriter  # type: ignore[import-untyped]
from lxml import etree
from openpyxl import Workbook, load_workbook
from openpyxl.workbook.defined_name import DefinedName
from openpyxl.worksheet.hyperlink import Hyperlink

from heatledger.errors import InputError
from heatledger.workbook import readback
from heatledger.workbook.graft import graft
from heatledger.workbook.reader import owned_sheets, read_cells

MAIN = "{http://schemas.openxmlformats.org/spreadsheetml/2006/main}"
INDEX_PARTS = {"[Content_Types].xml", "xl/workbook.xml", "xl/_rels/workbook.xml.rels", "xl/styles.xml"}
Inject = Callable[[bytes, Mapping[str, bytes], Mapping[str, tuple[str, str]]], bytes]
Convert = Callable[..., Path]
Write = Callable[..., Path]


@pytest.fixture
def book(tmp_path: Path) -> Write:
    def write(data: bytes, name: str = "book.xlsx") -> Path:
        path = tmp_path / name
        path.write_bytes(data)
        return path

    return write


def opened(source: Path | BinaryIO, *, data_only: bool = False) -> Workbook:
    """The workbook as openpyxl reads it, without its warnings of what it drops."""
    with warnings.catch_warnings():
        warnings.simplefilter("ignore")
        return load_workbook(source, data_only=data_only)


def parts(source: Path | bytes) -> dict[str, bytes]:
    with ZipFile(BytesIO(source) if isinstance(source, bytes) else source) as archive:
        return {name: archive.read(name) for name in archive.namelist()}


def workbook_part(path: Path) -> etree._Element:
    return etree.fromstring(parts(path)["xl/workbook.xml"])


def sheets(path: Path) -> list[dict[str, str]]:
    return [dict(item.attrib) for item in workbook_part(path).iter(f"{MAIN}sheet")]  # type: ignore[arg-type]


def names(path: Path) -> dict[tuple[str | None, str | None], str | None]:
    found = workbook_part(path).iter(f"{MAIN}definedName")
    return {(item.get("name"), item.get("localSheetId")): item.text for item in found}


def sheet_part(path: Path, title: str) -> str:
    """Name of the part that holds a sheet."""
    number = next(
        value for item in sheets(path) if item["name"] == title for key, value in item.items() if key.endswith("}id")
    )
    relations = etree.fromstring(parts(path)["xl/_rels/workbook.xml.rels"])
    return next(item.get("Target", "") for item in relations if item.get("Id") == number).lstrip("/")


def saved(made: Workbook) -> bytes:
    buffer = BytesIO()
    made.save(buffer)
    return buffer.getvalue()


def titled(*titles: str) -> bytes:
    """A donor with empty sheets of these names."""
    made = Workbook()
    assert made.active is not None
    made.active.title = titles[0]
    for title in titles[1:]:
        made.create_sheet(title)
    return saved(made)


# Nothing of the user is lost


def test_all_parts_but_the_four_index_parts_keep_every_byte_over_two_runs(
    book: Write, rich_book: bytes, donor: bytes, make_donor: Callable[[float], bytes]
) -> None:
    path = book(rich_book, "book.xlsm")
    before, cells = parts(path), read_cells(path)
    assert len(before) > 35
    for results in (donor, make_donor(17.5)):
        report = graft(path, results, path)
        after = parts(path)
        assert {name for name, data in before.items() if after.get(name) != data} == INDEX_PARTS
        assert read_cells(path) == cells
        assert report.titles == {"Summary": "Summary", "Monthly need": "Monthly need"}
        assert report.notes == ()
    assert b"ms-excel.sheet.macroEnabled.main+xml" in after["[Content_Types].xml"]


def test_the_same_run_gives_the_same_file(book: Write, rich_book: bytes, donor: bytes) -> None:
    path = book(rich_book)
    first = graft(path, donor, path)
    once = path.read_bytes()
    second = graft(path, donor, path)
    assert path.read_bytes() == once
    assert (first.added, first.replaced, first.dropped) == (("Summary", "Monthly need"), (), ())
    assert (second.added, second.replaced, second.dropped) == ((), ("Summary", "Monthly need"), ())


def test_another_target_leaves_the_original_alone(book: Write, rich_book: bytes, donor: bytes, tmp_path: Path) -> None:
    path = book(rich_book, "book.xlsm")
    graft(path, donor, tmp_path / "other.xlsm")
    assert path.read_bytes() == rich_book
    graft(path, donor, path)
    assert path.read_bytes() == (tmp_path / "other.xlsm").read_bytes()


@pytest.mark.parametrize(
    ("macros", "name", "sentence"),
    [
        (
            True,
            "copy.xlsx",
            "copy.xlsx: found the ending '.xlsx'; expected the ending .xlsm of a workbook with macros. "
            "Give the name copy.xlsm.",
        ),
        (
            False,
            "copy.xlsm",
            "copy.xlsm: found the ending '.xlsm'; expected the ending .xlsx of a workbook without macros. "
            "Give the name copy.xlsx.",
        ),
        (
            False,
            "copy",
            "copy: found a name without an ending; expected the ending .xlsx of a workbook without macros. "
            "Give the name copy.xlsx.",
        ),
    ],
)
def test_a_copy_that_excel_would_not_open_is_refused(
    book: Write,
    plain_book: bytes,
    rich_book: bytes,
    donor: bytes,
    tmp_path: Path,
    macros: bool,
    name: str,
    sentence: str,
) -> None:
    path = book(rich_book if macros else plain_book)
    with pytest.raises(InputError) as caught:
        graft(path, donor, tmp_path / name)
    assert str(caught.value) == sentence
    assert os.listdir(tmp_path) == ["book.xlsx"]
    with pytest.raises(InputError, match=r"found the ending '\.txt'"):  # longer than a path may be
        graft(path, donor, tmp_path / f"{'n' * 300}.txt")
    graft(path, donor, path)  # its own name is the user's choice
    graft(path, donor, tmp_path / ("COPY.XLSM" if macros else "COPY.XLSX"))


def test_parts_of_the_user_keep_their_date(book: Write, rich_book: bytes, donor: bytes) -> None:
    path = book(rich_book)
    graft(path, donor, path)
    with ZipFile(BytesIO(rich_book)) as old, ZipFile(path) as new:
        dates = {entry.filename: entry.date_time for entry in new.infolist()}
        assert len(set(dates.values())) > 1
        assert {entry.filename: entry.date_time for entry in old.infolist()}.items() <= dates.items()


def test_styles_do_not_grow_in_a_file_of_other_namespaces_and_line_breaks(
    book: Write, rich_book: bytes, donor: bytes, inject: Inject
) -> None:
    more = ("<styleSheet ", '<styleSheet xmlns:x14="http://schemas.microsoft.com/office/spreadsheetml/2009/9/main" ')
    path = book(inject(rich_book, {}, {"xl/styles.xml": more}))
    graft(path, donor, path)
    once = path.read_bytes()
    graft(path, donor, path)
    assert path.read_bytes() == once
    loose = parts(path)["xl/styles.xml"].replace(b"</font>", b"</font>\n").replace(b"</xf>", b"</xf>\n")
    path.write_bytes(inject(path.read_bytes(), {"xl/styles.xml": loose}, {}))
    graft(path, donor, path)
    assert parts(path)["xl/styles.xml"].count(b"<font>") == loose.count(b"<font>")


def test_old_styles_keep_their_index(book: Write, rich_book: bytes, donor: bytes) -> None:
    path = book(rich_book)
    graft(path, donor, path)
    old, new = (etree.fromstring(source["xl/styles.xml"]) for source in (parts(rich_book), parts(path)))
    for section in old:
        grown = new.find(section.tag)
        assert grown is not None
        assert [etree.tostring(item, method="c14n") for item in section] == [
            etree.tostring(item, method="c14n") for item in list(grown)[: len(section)]
        ]
        if grown.get("count"):
            assert int(grown.get("count", "")) == len(grown)


def test_the_index_keeps_what_it_held(book: Write, rich_book: bytes, donor: bytes) -> None:
    path = book(rich_book)
    old = workbook_part(path)
    old_sheets, old_names = sheets(path), names(path)
    graft(path, donor, path)
    new = workbook_part(path)
    assert sheets(path)[:3] == old_sheets
    assert old_names.items() <= names(path).items()
    assert [item.tag for item in old] == [item.tag for item in new]
    for tag in ("bookViews", "externalReferences", "workbookPr"):
        one, other = old.find(f"{MAIN}{tag}"), new.find(f"{MAIN}{tag}")
        assert one is not None
        assert other is not None
        assert etree.tostring(one) == etree.tostring(other)


def test_stored_values_and_styles_of_the_user_survive_for_other_readers(
    book: Write, plain_book: bytes, donor: bytes
) -> None:
    path = book(plain_book)
    before = opened(path, data_only=True)["Zones"]
    graft(path, donor, path)
    after = opened(path, data_only=True)["Zones"]
    assert after["B6"].value == 242.75
    for row in before.iter_rows():
        for cell in row:
            other = after[cell.coordinate]
            assert (other.value, other.number_format, other.font.b) == (cell.value, cell.number_format, cell.font.b)


# What the donor holds arrives


def test_result_sheets_arrive_with_values_types_and_styles(book: Write, rich_book: bytes, donor: bytes) -> None:
    path = book(rich_book)
    graft(path, donor, path)
    original, arrived = opened(BytesIO(donor)), opened(path)
    for title in ("Summary", "Monthly need"):
        for row in original[title].iter_rows():
            for cell in row:
                other = arrived[title][cell.coordinate]
                assert (other.value, other.data_type) == (cell.value, cell.data_type)
                assert (other.number_format, other.quotePrefix) == (cell.number_format, cell.quotePrefix)
                assert (other.font.name, other.font.b, other.font.color) == (
                    cell.font.name,
                    cell.font.b,
                    cell.font.color,
                )
    assert arrived["Summary"]["A2"].value == "=cmd()"
    assert arrived["Summary"]["A2"].data_type == "s"
    assert arrived["Summary"]["A1"].comment is not None
    months = arrived["Monthly need"]
    assert months.print_title_rows == "$1:$1"
    assert months.print_area == "'Monthly need'!$A$1:$C$20"
    charts = [sheet._charts for sheet in (arrived["Summary"], months)]  # type: ignore[attr-defined]
    assert [len(drawn) for drawn in charts] == [1, 1]
    (rules,) = [rule for group in months.conditional_formatting for rule in group.rules]
    assert rules.dxf.fill.bgColor.rgb == "FFE69F00"
    assert arrived["Lists"].tables.keys() == {"Prices"}
    assert months.tables.keys() == {"Prices_"}
    assert {table.id for table in (arrived["Lists"].tables["Prices"], months.tables["Prices_"])} == {1, 2}


def test_shared_strings_of_a_donor_become_cell_texts(book: Write, rich_book: bytes) -> None:
    buffer = BytesIO()
    made = xlsxwriter.Workbook(buffer)
    sheet, bold = made.add_worksheet("Summary"), made.add_format({"bold": True})
    sheet.write_column(0, 0, ["one", " two ", "one", "a & b"])
    sheet.write_rich_string(4, 0, "partly ", bold, "bold")
    made.close()
    path = book(rich_book)
    graft(path, buffer.getvalue(), path)
    arrived = opened(path)["Summary"]
    assert [arrived.cell(row, 1).value for row in range(1, 6)] == ["one", " two ", "one", "a & b", "partly bold"]
    assert parts(path)["xl/sharedStrings.xml"] == parts(rich_book)["xl/sharedStrings.xml"]


def test_the_workbook_opens_on_the_users_sheet_and_is_worked_out_anew(
    book: Write, rich_book: bytes, donor: bytes, inject: Inject
) -> None:
    path = book(inject(rich_book, {}, {"xl/workbook.xml": (' fullCalcOnLoad="1"', "")}))
    assert b"tabSelected" in parts(donor)["xl/worksheets/sheet1.xml"]
    graft(path, donor, path)
    calculation = workbook_part(path).find(f"{MAIN}calcPr")
    assert calculation is not None
    assert calculation.get("fullCalcOnLoad") == "1"
    for title in ("Summary", "Monthly need"):
        assert b"tabSelected" not in parts(path)[sheet_part(path, title)]
    assert opened(path).active.title == "Zones"  # type: ignore[union-attr]


# Whose sheet is it


def test_markers_are_hidden_names_of_the_whole_workbook(book: Write, rich_book: bytes, donor: bytes) -> None:
    path = book(rich_book)
    graft(path, donor, path)
    markers = [item for item in workbook_part(path).iter(f"{MAIN}definedName") if "heatledger" in item.get("name", "")]
    assert [(dict(item.attrib), item.text) for item in markers] == [
        ({"name": "_heatledger_sheet_summary", "hidden": "1"}, "'Summary'!$1:$1048576"),
        ({"name": "_heatledger_sheet_monthly_need", "hidden": "1"}, "'Monthly need'!$1:$1048576"),
    ]


def test_markers_of_one_cell_are_known_and_renewed(book: Write, rich_book: bytes, donor: bytes, inject: Inject) -> None:
    """A name of A1 followed the cell to where it was cut and pasted, and the sheet there was taken for ours."""
    path = book(rich_book)
    graft(path, donor, path)
    new = path.read_bytes()
    path.write_bytes(inject(new, {}, {"xl/workbook.xml": ("'Summary'!$1:$1048576", "Summary!$A$1")}))
    graft(path, donor, path)
    assert names(path)["_heatledger_sheet_summary", None] == "'Summary'!$1:$1048576"


def test_a_sheet_of_the_user_with_our_name_is_never_touched(book: Write, donor: bytes) -> None:
    made = Workbook()
    assert made.active is not None
    made.active.title = "MONTHLY NEED"
    made.active["A1"] = "mine"
    path = book(saved(made))
    for _ in range(2):
        report = graft(path, donor, path)
        assert report.titles == {"Summary": "Summary", "Monthly need": "Monthly need (heatledger)"}
        assert [item["name"] for item in sheets(path)] == ["MONTHLY NEED", "Summary", "Monthly need (heatledger)"]
        assert opened(path)["MONTHLY NEED"]["A1"].value == "mine"
        assert owned_sheets(path) == {"Summary", "Monthly need (heatledger)"}
    graft(path, donor, path)


def test_a_new_name_is_told_once_and_followed_everywhere(book: Write, donor: bytes) -> None:
    made = Workbook()
    assert made.active is not None
    made.active.title = "Monthly need"
    path = book(saved(made))
    report = graft(path, donor, path)
    assert report.notes == (
        "A sheet of yours is called Monthly need; the results are on the sheet Monthly need (heatledger).",
    )
    assert graft(path, donor, path).notes == ()
    arrived = opened(path)
    new = "'Monthly need (heatledger)'!"
    summary, months = arrived["Summary"], arrived["Monthly need (heatledger)"]
    assert summary["A3"].hyperlink.location == f"{new}A1"
    assert summary["A4"].hyperlink.target == f"#{new}B2"
    assert summary["A5"].value == f"={new}B3"
    assert summary["A6"].hyperlink.location == "'Zones'!B3"
    assert months.data_validations.dataValidation[0].formula1 == f"{new}$A$2:$A$4"
    assert months.print_area == f"{new}$A$1:$C$20"
    charts = [data.decode() for name, data in parts(path).items() if name.startswith("xl/charts/chart")]
    assert len(charts) == 2
    for chart in charts:
        references = re.findall("<(?:c:)?f>(.*?)</", chart)
        assert references
        assert all(reference.startswith(new) for reference in references)


def test_long_and_repeated_clashes_find_a_free_name(book: Write) -> None:
    path = book(titled("A name as long as a name may be", "a name as long as (heatledger)"))
    report = graft(path, titled("A name as long as a name may be"), path)
    assert report.titles == {"A name as long as a name may be": "A name as long as (heatledger)"} or report.added
    assert len(report.added[0]) <= 31
    assert len({item["name"].casefold() for item in sheets(path)}) == 3


def test_a_sheet_that_the_user_renamed_and_moved_stays_ours(book: Write, rich_book: bytes, donor: bytes) -> None:
    path = book(rich_book)
    graft(path, donor, path)
    made = opened(path)
    made["Summary"].title = "For the client"
    made.defined_names["_heatledger_sheet_summary"].attr_text = "'For the client'!$A$1"
    made.move_sheet("For the client", -3)
    made["Zones"]["H1"] = "='For the client'!B1"
    made.save(path)
    order = [item["name"] for item in sheets(path)]
    assert graft(path, donor, path).titles["Summary"] == "For the client"
    assert [item["name"] for item in sheets(path)] == order
    assert graft(path, titled("Monthly need"), path).dropped == ("For the client",)


def test_sheets_that_are_no_longer_built_go_and_indexes_follow(book: Write, rich_book: bytes, donor: bytes) -> None:
    path = book(rich_book)
    graft(path, titled("Old results", "Summary"), path)
    made = opened(path)
    made.move_sheet("Old results", -3)
    made["Lists"].print_title_rows = "1:1"
    made.active = made.sheetnames.index("Zones")
    made.save(path)
    assert sheets(path)[0]["name"] == "Old results"
    zones = [key for key, text in names(path).items() if text and text.startswith("'Zones'!$A$1")]
    assert zones == [("_xlnm.Print_Area", "1")]
    report = graft(path, donor, path)
    assert (report.added, report.replaced, report.dropped) == (("Monthly need",), ("Summary",), ("Old results",))
    assert {(key[1], text) for key, text in names(path).items() if key[0] == "_xlnm.Print_Area"} >= {
        ("0", "'Zones'!$A$1:$H$40")
    }
    assert owned_sheets(path) == {"Summary", "Monthly need"}
    view = next(workbook_part(path).iter(f"{MAIN}workbookView"))
    assert sheets(path)[int(view.get("activeTab", "0"))]["name"] == "Zones"


def test_the_slot_of_a_replaced_sheet_stays(
    book: Write, rich_book: bytes, donor: bytes, make_donor: Callable[[float], bytes]
) -> None:
    path = book(rich_book)
    graft(path, donor, path)
    before = sheets(path)
    graft(path, make_donor(1.0), path)
    assert sheets(path) == before
    assert opened(path)["Summary"]["B1"].value == 1.0


def test_a_deleted_result_sheet_comes_back(book: Write, rich_book: bytes, donor: bytes, inject: Inject) -> None:
    path = book(rich_book)
    graft(path, donor, path)
    gone = inject(
        path.read_bytes(), {}, {"xl/workbook.xml": ("'Summary'!$1:$1048576</definedName>", "#REF!</definedName>")}
    )
    path.write_bytes(inject(gone, {}, {"xl/workbook.xml": ('name="Summary"', 'name="Mine now"')}))
    report = graft(path, donor, path)
    assert (report.added, report.replaced) == (("Summary",), ("Monthly need",))
    assert "Mine now" in [item["name"] for item in sheets(path)]


def test_a_copy_of_a_result_sheet_is_the_users(book: Write, rich_book: bytes, donor: bytes, inject: Inject) -> None:
    path = book(rich_book)
    local = (
        "<definedNames>",
        '<definedNames><definedName name="_heatledger_sheet_summary" localSheetId="0">Zones!$A$1</definedName>',
    )
    path.write_bytes(inject(rich_book, {}, {"xl/workbook.xml": local}))
    assert owned_sheets(path) == frozenset()
    graft(path, donor, path)
    assert read_cells(path)["Zones"][3, 1].value == "Workshop"


def test_names_that_the_user_gave_to_cells_of_results_stay(
    book: Write, rich_book: bytes, donor: bytes, inject: Inject
) -> None:
    path = book(rich_book)
    graft(path, donor, path)
    own = (
        "<definedNames>",
        "<definedNames><definedName name=\"Total\">'Summary'!$B$1</definedName>"
        '<definedName name="Here" localSheetId="3">\'Summary\'!$B$1</definedName>',
    )
    path.write_bytes(inject(path.read_bytes(), {}, {"xl/workbook.xml": own}))
    graft(path, donor, path)
    assert names(path)["Total", None] == "'Summary'!$B$1"
    assert names(path)["Here", "3"] == "'Summary'!$B$1"


def test_a_picture_that_other_sheets_use_too_stays(book: Write, rich_book: bytes, donor: bytes, inject: Inject) -> None:
    path = book(rich_book)
    graft(path, donor, path)
    part = sheet_part(path, "Summary")
    holder = f"xl/worksheets/_rels/{part.rpartition('/')[2]}.rels"
    kind = "http://schemas.openxmlformats.org/officeDocument/2006/relationships/image"
    shared = ("</Relationships>", f'<Relationship Id="x" Type="{kind}" Target="../media/image1.png"/></Relationships>')
    path.write_bytes(inject(path.read_bytes(), {}, {holder: shared}))
    graft(path, donor, path)
    assert parts(path)["xl/media/image1.png"] == parts(rich_book)["xl/media/image1.png"]


def test_the_list_of_formulas_goes_only_if_it_names_cells_of_ours(
    book: Write, rich_book: bytes, donor: bytes, inject: Inject
) -> None:
    path = book(rich_book)
    graft(path, donor, path)
    number = next(item["sheetId"] for item in sheets(path) if item["name"] == "Summary")
    path.write_bytes(
        inject(path.read_bytes(), {}, {"xl/calcChain.xml": ("</calcChain>", f'<c r="A5" i="{number}"/></calcChain>')})
    )
    graft(path, donor, path)
    after = parts(path)
    assert "xl/calcChain.xml" not in after
    assert b"calcChain" not in after["[Content_Types].xml"] + after["xl/_rels/workbook.xml.rels"]


def test_the_macro_module_of_a_result_sheet_stays_with_it(book: Write, rich_book: bytes, donor: bytes) -> None:
    path = book(rich_book, "book.xlsm")
    graft(path, donor, path)
    data = parts(path)
    part = sheet_part(path, "Summary")
    root = etree.fromstring(data[part])
    properties = root.find(f"{MAIN}sheetPr")
    assert properties is not None
    properties.set("codeName", "Sheet4")
    data[part] = etree.tostring(root)
    with ZipFile(path, "w") as archive:
        for name, content in data.items():
            archive.writestr(name, content)
    graft(path, donor, path)
    assert b'codeName="Sheet4"' in parts(path)[sheet_part(path, "Summary")]


def test_result_sheets_that_could_not_be_told_apart_are_a_fault_of_ours(book: Write, rich_book: bytes) -> None:
    path = book(rich_book)
    with pytest.raises(RuntimeError, match=r"^two result sheets would share a marker$"):
        graft(path, titled("Monthly need", "Monthly-need"), path)
    assert path.read_bytes() == rich_book


def test_names_of_a_whole_donor_are_a_fault_of_ours(book: Write, rich_book: bytes) -> None:
    made = Workbook()
    made.defined_names["Total"] = DefinedName("Total", attr_text="Sheet!$A$1")
    path = book(rich_book)
    with pytest.raises(RuntimeError, match=r"^result sheets hold a name of the whole workbook: Total$"):
        graft(path, saved(made), path)
    assert path.read_bytes() == rich_book


@pytest.mark.parametrize(
    ("formula", "told"),
    [
        ("='Monthly need'!B3*2", True),
        ("=Summary!B1", True),
        ("=[1]Summary!B1", False),
        ("='[1]Monthly need'!B3", False),
        ("=My.Summary!B1", False),
        ('="Summary!"', False),
    ],
)
def test_formulas_that_use_results_are_told_apart(book: Write, donor: bytes, formula: str, told: bool) -> None:
    made = Workbook()
    assert made.active is not None
    made.active["A1"] = formula
    made.active["A2"] = "to the months"
    made.active["A2"].hyperlink = Hyperlink(ref="A2", location="'Monthly need'!A1")
    path = book(saved(made))
    assert graft(path, donor, path).notes == ()
    note = (
        "Formulas on Sheet use result sheets: Excel works them out anew when it opens the file, "
        "LibreOffice when you press Ctrl+Shift+F9."
    )
    assert graft(path, donor, path).notes == ((note,) if told else ())


# Odd workbooks


def test_a_workbook_without_styles_gets_some(book: Write, plain_book: bytes, donor: bytes, inject: Inject) -> None:
    data = inject(plain_book, {}, {"xl/_rels/workbook.xml.rels": ('/styles"', '/stale"')})
    kept = {name: content for name, content in parts(data).items() if name != "xl/styles.xml"}
    path = book(b"")
    with ZipFile(path, "w") as archive:
        for name, content in kept.items():
            archive.writestr(name, re.sub(rb' s="\d+"', b"", content) if "worksheets/sheet" in name else content)
    graft(path, donor, path)
    once = path.read_bytes()
    arrived = opened(path)
    assert arrived["Summary"]["A1"].font.b
    assert not arrived["Zones"]["A3"].font.b
    graft(path, donor, path)
    assert path.read_bytes() == once


def test_the_default_style_of_a_workbook_with_bare_styles_stays_plain(
    book: Write, donor: bytes, inject: Inject
) -> None:
    bare = b'<styleSheet xmlns="http://schemas.openxmlformats.org/spreadsheetml/2006/main"/>'
    made = Workbook()
    assert made.active is not None
    made.active["A1"] = "plain"
    path = book(inject(saved(made), {"xl/styles.xml": bare}, {}))
    graft(path, donor, path)
    arrived = opened(path)
    assert arrived["Summary"]["A1"].font.b
    assert not arrived["Sheet"]["A1"].font.b


def test_the_workbook_part_may_stand_elsewhere(book: Write, donor: bytes) -> None:
    moved = {
        name.replace("xl/", "office/").replace("workbook.xml", "main.xml"): data
        for name, data in parts(titled("Mine")).items()
    }
    path = book(b"")
    with ZipFile(path, "w") as archive:
        for name, data in moved.items():
            archive.writestr(name, data.replace(b"xl/", b"office/").replace(b"workbook.xml", b"main.xml"))
    graft(path, donor, path)
    after = parts(path)
    changed = {name for name, data in after.items() if name in moved and data != parts_of_main(moved)[name]}
    assert changed == {"[Content_Types].xml", "office/main.xml", "office/_rels/main.xml.rels", "office/styles.xml"}
    assert owned_sheets(path) == {"Summary", "Monthly need"}
    assert list(read_cells(path)) == ["Mine"]


def parts_of_main(moved: dict[str, bytes]) -> dict[str, bytes]:
    return {
        name: data.replace(b"xl/", b"office/").replace(b"workbook.xml", b"main.xml") for name, data in moved.items()
    }


def test_a_locked_list_of_sheets_is_told(book: Write, rich_book: bytes, donor: bytes, inject: Inject) -> None:
    lock = ("<bookViews>", '<workbookProtection lockStructure="1"/><bookViews>')
    path = book(inject(rich_book, {}, {"xl/workbook.xml": lock}))
    note = "The list of sheets is locked in this workbook; the result sheets were written all the same."
    assert graft(path, donor, path).notes == (note,)


def test_a_workbook_that_is_open_elsewhere_is_told(book: Write, rich_book: bytes, donor: bytes, tmp_path: Path) -> None:
    path = book(rich_book)
    (tmp_path / "~$book.xlsx").touch()
    assert graft(path, donor, path).notes == (
        "book.xlsx seems to be open in another program (there is a file ~$book.xlsx): "
        "close it there without saving, then open it again.",
    )


def test_an_unsound_original_is_a_problem_and_writes_nothing(
    book: Write, rich_book: bytes, donor: bytes, inject: Inject
) -> None:
    data = inject(rich_book, {"xl/styles.xml": b"<styleSheet"}, {})
    path = book(data)
    with pytest.raises(InputError) as caught:
        graft(path, donor, path)
    assert str(caught.value) == (
        "book.xlsx: found a part that cannot be read (XMLSyntaxError); expected a sound workbook. "
        "Open the file in your spreadsheet program, save it again, and try once more."
    )
    assert path.read_bytes() == data


def test_a_result_that_others_cannot_read_is_not_written(
    book: Write, rich_book: bytes, donor: bytes, monkeypatch: pytest.MonkeyPatch
) -> None:
    calls: list[BinaryIO] = []

    def fail(file: BinaryIO, **_options: object) -> Workbook:
        calls.append(file)
        if len(calls) == 1:  # the result; the second is the original
            raise KeyError("no such sheet")
        return opened(file)

    path = book(rich_book)
    monkeypatch.setattr(readback, "load_workbook", fail)
    with pytest.raises(InputError) as caught:
        graft(path, donor, path)
    assert str(caught.value) == (
        "book.xlsx: found that the result cannot be read back (KeyError); expected a sound workbook. "
        "Nothing was changed. Open and save the workbook in your spreadsheet program, and try again."
    )
    assert path.read_bytes() == rich_book
    assert os.listdir(path.parent) == ["book.xlsx"]


def test_who_cannot_read_the_original_is_no_judge_of_the_result(
    book: Write, rich_book: bytes, donor: bytes, inject: Inject
) -> None:
    # openpyxl gives up on a name that belongs to a chart sheet, which is sound and which it even writes itself
    name = ("<definedNames>", '<definedNames><definedName name="Here" localSheetId="1">Zones!$A$1</definedName>')
    path = book(inject(rich_book, {}, {"xl/workbook.xml": name}))
    with pytest.raises(AttributeError):
        opened(BytesIO(path.read_bytes()))
    graft(path, donor, path)
    assert owned_sheets(path) == {"Summary", "Monthly need"}


# Other programs in between


def test_our_sheets_are_known_again_after_openpyxl_saved_the_file(book: Write, rich_book: bytes, donor: bytes) -> None:
    path = book(rich_book)
    graft(path, donor, path)
    opened(path).save(path)
    assert owned_sheets(path) == {"Summary", "Monthly need"}
    order = [item["name"] for item in sheets(path)]
    report = graft(path, donor, path)
    assert (report.added, report.replaced) == ((), ("Summary", "Monthly need"))
    assert [item["name"] for item in sheets(path)] == order
    once = path.read_bytes()
    graft(path, donor, path)
    assert path.read_bytes() == once


def test_our_sheets_are_known_again_after_libreoffice_saved_the_file(
    book: Write, rich_book: bytes, donor: bytes, convert: Convert, tmp_path: Path
) -> None:
    path = book(rich_book)
    graft(path, donor, path)
    (tmp_path / "office").mkdir()
    again = convert(path, tmp_path / "office")
    assert owned_sheets(again) == {"Summary", "Monthly need"}
    assert read_cells(again)["Zones"][3, 2].value == 120.5
    before = parts(again)
    report = graft(again, donor, again)
    assert (report.added, report.replaced) == ((), ("Summary", "Monthly need"))
    assert opened(again)["Summary"]["B1"].value == 5300.0
    after = parts(again)
    users = {name for name in before if not name.startswith("xl/") or "sharedStrings" in name or "theme" in name}
    assert all(after[name] == before[name] for name in users - INDEX_PARTS)
    once = again.read_bytes()
    graft(again, donor, again)
    assert again.read_bytes() == once


def test_libreoffice_works_out_the_users_formulas_over_results(
    book: Write, plain_book: bytes, donor: bytes, convert: Convert, tmp_path: Path
) -> None:
    made = Workbook()
    assert made.active is not None
    made.active["A1"] = "=Summary!B1*2"
    path = book(saved(made))
    graft(path, donor, path)
    (tmp_path / "office").mkdir()
    assert read_cells(convert(path, tmp_path / "office"))["Sheet"][1, 1].value == 10600.0


# Hostile or worn-out indexes


def test_comments_in_the_styles_are_no_styles(book: Write, rich_book: bytes, donor: bytes, inject: Inject) -> None:
    """They used to be counted as styles, and to compare one ended the process."""
    edits = {
        "xl/styles.xml": ("<cellXfs", "<!-- a --><?b c?><cellXfs"),
        "xl/workbook.xml": ("<sheets>", "<sheets><!-- a -->"),
    }
    path = book(inject(inject(rich_book, {}, edits), {}, {"xl/styles.xml": ("<xf ", "<!-- a --><?b c?><xf ")}))
    graft(path, donor, path)
    assert owned_sheets(path) == {"Summary", "Monthly need"}
    assert opened(path)["Summary"]["A1"].font.b


@pytest.mark.parametrize(
    ("content", "found"),
    [
        ("<fonts>" + "<font/>" * 65_491 + "</fonts>", "more than 65,490 fonts"),
        ("<fonts>" + '<font a="1"/>' * 1_000_001 + "</fonts>", "xl/styles.xml"),
    ],
)
def test_styles_without_end_are_refused(
    book: Write, rich_book: bytes, donor: bytes, inject: Inject, content: str, found: str
) -> None:
    data = inject(rich_book, {"xl/styles.xml": f'<styleSheet xmlns="{MAIN[1:-1]}">{content}</styleSheet>'.encode()}, {})
    path = book(data)
    with pytest.raises(InputError) as caught:
        graft(path, donor, path)
    assert str(caught.value) == (
        f"book.xlsx: found a part that is too large ({found}); expected a workbook of usual size. "
        "Clear the formats of empty rows and columns, or copy the input sheets into a new workbook."
    )
    assert path.read_bytes() == data
