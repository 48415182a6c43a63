"""Packages that are spelled in unusual ways, as other programs write them: the same promises hold."""

from __future__ import annotations

import re
from collections.abc import Callable
from contextlib import closing
from io import BytesIO, RawIOBase
from pathlib import Path
from typing import TYPE_CHECKING
from zipfile import ZIP_BZIP2, ZIP_DEFLATED, ZIP_STORED, ZipFile, ZipInfo

import pytest
from lxml import etree
from openpyxl import load_workbook

from heatledger.errors import InputError
from heatledger.workbook.graft import graft
from heatledger.workbook.reader import owned_sheets, read_cells

if TYPE_CHECKING:
    from tests.conftest import Tell

    InOrder = Callable[[bytes], None]

Parts = dict[str, bytes]
SPACE = "http://schemas.openxmlformats.org/spreadsheetml/2006/main"
OFFICE = "http://schemas.openxmlformats.org/officeDocument/2006/relationships"
TYPES, BOOK, RELATIONS, STYLES = "[Content_Types].xml", "xl/workbook.xml", "xl/_rels/workbook.xml.rels", "xl/styles.xml"
INDEX = (TYPES, BOOK, RELATIONS, STYLES)
RELATIONS_TYPE = "application/vnd.openxmlformats-package.relationships+xml"


def edited(parts: Parts, name: str, before: str, after: str) -> Parts:
    new = re.sub(before.encode(), after.encode(), parts[name])
    assert new != parts[name], (name, before)
    return {**parts, name: new}


def prefixed(data: bytes) -> bytes:
    """The same XML with a prefix on every tag."""
    root = etree.fromstring(data)
    new = etree.Element(root.tag, nsmap={"x": etree.QName(root).namespace or "", "rel": OFFICE})
    for key, value in root.attrib.items():
        new.set(key, value)
    new.extend(list(root))
    etree.cleanup_namespaces(new, keep_ns_prefixes=["x", "rel"])
    return etree.tostring(new, xml_declaration=True, encoding="UTF-8", standalone=True)


def prefixes(parts: Parts) -> Parts:
    tagged = {name: prefixed(data) if name in INDEX or "/sheet" in name else data for name, data in parts.items()}
    assert b"<x:sheets>" in tagged[BOOK]
    assert b"<x:xf " in tagged[STYLES]
    return tagged


def utf_16(parts: Parts) -> Parts:
    def spelled(data: bytes) -> bytes:
        text = etree.tostring(etree.fromstring(data), encoding="unicode")
        return f'<?xml version="1.0" encoding="UTF-16"?>{text}'.encode("utf-16")

    return {name: spelled(data) if name.endswith((".xml", ".rels")) else data for name, data in parts.items()}


def byte_order_marks(parts: Parts) -> Parts:
    return {name: b"\xef\xbb\xbf" + data if name in INDEX else data for name, data in parts.items()}


def line_breaks_and_comments(parts: Parts) -> Parts:
    for name in INDEX:
        root = etree.fromstring(parts[name])
        root.insert(1, etree.Comment("a remark"))
        etree.indent(root)
        parts[name] = etree.tostring(root, xml_declaration=True, encoding="UTF-8")
    return parts


def absolute_targets(parts: Parts) -> Parts:
    return edited(parts, RELATIONS, 'Target="', 'Target="/xl/')


def renamed(parts: Parts, name: str, spelling: str) -> Parts:
    """The first sheet in a part of this name, which the index spells in another way."""
    parts[name] = parts.pop("xl/worksheets/sheet1.xml")
    parts[name.replace("worksheets/", "worksheets/_rels/") + ".rels"] = parts.pop("xl/worksheets/_rels/sheet1.xml.rels")
    parts = edited(parts, RELATIONS, 'worksheets/sheet1.xml"', f'worksheets/{spelling}"')
    return edited(parts, TYPES, 'worksheets/sheet1.xml"', f'worksheets/{spelling}"')


def a_space_in_a_name(parts: Parts) -> Parts:
    return renamed(parts, "xl/worksheets/Sheet 1.xml", "Sheet 1.xml")


def a_space_that_the_index_quotes(parts: Parts) -> Parts:
    return renamed(parts, "xl/worksheets/Sheet 1.xml", "Sheet%201.xml")


def capitals(parts: Parts) -> Parts:
    return renamed(parts, "xl/worksheets/SHEET1.XML", "Sheet1.xml")


def types_of_relations_one_by_one(parts: Parts) -> Parts:
    stated = "".join(
        f'<Override PartName="/{name}" ContentType="{RELATIONS_TYPE}"/>' for name in parts if name.endswith(".rels")
    )
    bare = edited(parts, TYPES, '<Default Extension="rels"[^>]*>', "")
    return edited(bare, TYPES, "</Types>", f"{stated}</Types>")


def a_target_that_is_not_there(parts: Parts) -> Parts:
    more = f'<Relationship Id="rId98" Type="{OFFICE}/calcChain" Target="calcChain.xml"/>'
    more += f'<Relationship Id="rId99" Type="{OFFICE}/image" Target="NULL"/></Relationships>'
    return edited(parts, RELATIONS, "</Relationships>", more)


def relations_of_no_part(parts: Parts) -> Parts:
    return {**parts, "xl/worksheets/_rels/sheet4.xml.rels": parts[RELATIONS]}


def styles_that_nothing_points_at(parts: Parts) -> Parts:
    plain = {
        name: re.sub(rb' s="\d+"|<conditionalFormatting.*</conditionalFormatting>', b"", data)
        if "/sheet" in name
        else data
        for name, data in parts.items()
    }
    return edited(plain, RELATIONS, "<Relationship [^>]*/styles[^>]*>", "")


def no_theme_and_no_properties(parts: Parts) -> Parts:
    kept = {name: data for name, data in parts.items() if "theme" not in name and "docProps" not in name}
    kept = edited(kept, TYPES, "<Override [^>]*(theme|docProps)[^>]*>", "")
    kept = edited(kept, RELATIONS, "<Relationship [^>]*theme[^>]*>", "")
    return edited(kept, "_rels/.rels", "<Relationship [^>]*docProps[^>]*>", "")


IGNORABLE = (
    'xmlns:mc="http://schemas.openxmlformats.org/markup-compatibility/2006" '
    'xmlns:x15="http://schemas.microsoft.com/office/spreadsheetml/2010/11/main" mc:Ignorable="x15"'
)


def all_neighbours_in_the_index(parts: Parts) -> Parts:
    """Every element that may stand around the lists of sheets and names, those lists' own neighbours missing."""
    parts = edited(parts, BOOK, "<workbook ", f"<workbook {IGNORABLE} ")
    choice = '<mc:AlternateContent><mc:Choice Requires="x15"><x15:absPath url="C:/"/></mc:Choice></mc:AlternateContent>'
    parts = edited(parts, BOOK, "<bookViews>", f'{choice}<workbookProtection lockWindows="1"/><bookViews>')
    parts = edited(parts, BOOK, "<definedNames>.*</definedNames>|<calcPr[^>]*>", "")
    parts = edited(parts, BOOK, "</sheets>", '</sheets><functionGroups builtInGroupCount="17"/>')
    view = '<customWorkbookView name="v" guid="{AAAAAAAA-0000-0000-0000-000000000001}" windowWidth="9" '
    view += 'windowHeight="9" activeSheetId="1"/>'
    later = f'<oleSize ref="A1"/><customWorkbookViews>{view}</customWorkbookViews><smartTagPr embed="1"/>'
    later += '<webPublishing codePage="1252"/><fileRecoveryPr autoRecover="0"/><extLst><ext uri="{1}"/></extLst>'
    return edited(parts, BOOK, "</workbook>", f"{later}</workbook>")


def nothing_but_sheets_in_the_index(parts: Parts) -> Parts:
    return edited(parts, BOOK, "(?s)(<workbook [^>]*>).*(<sheets>.*</sheets>).*", r"\1\2</workbook>")


def two_windows(parts: Parts) -> Parts:
    views = '<bookViews><workbookView activeTab="2" firstSheet="1" visibility="hidden"/><workbookView activeTab="0"/>'
    return edited(parts, BOOK, "<bookViews>.*(?=</bookViews>)", views)


def own_colours_and_table_styles(parts: Parts) -> Parts:
    style = '<tableStyle name="Mine" count="1"><tableStyleElement type="wholeTable" dxfId="0"/></tableStyle>'
    parts = edited(parts, STYLES, "<tableStyles[^>]*/>", f'<tableStyles count="1">{style}</tableStyles>')
    colours = (
        '<colors><indexedColors><rgbColor rgb="FFABCDEF"/></indexedColors></colors><extLst><ext uri="{1}"/></extLst>'
    )
    return edited(parts, STYLES, "</styleSheet>", f"{colours}</styleSheet>")


ODD: tuple[Callable[[Parts], Parts], ...] = (
    *(prefixes, utf_16, byte_order_marks, line_breaks_and_comments, absolute_targets, a_space_in_a_name),
    *(a_space_that_the_index_quotes, capitals, types_of_relations_one_by_one, a_target_that_is_not_there),
    *(relations_of_no_part, styles_that_nothing_points_at, no_theme_and_no_properties, all_neighbours_in_the_index),
    *(nothing_but_sheets_in_the_index, two_windows, own_colours_and_table_styles),
)


class _Pipe(RawIOBase):
    """What cannot be rewound: zip entries then state their size behind their data."""

    def __init__(self) -> None:
        self.data = bytearray()

    def writable(self) -> bool:
        return True

    def write(self, data: object) -> int:
        self.data += bytes(data)  # type: ignore[call-overload]
        return len(bytes(data))  # type: ignore[call-overload]


def packed(parts: Parts, compression: int = ZIP_DEFLATED, *, large: bool = False) -> bytes:
    buffer = BytesIO()
    with ZipFile(buffer, "w", compression) as archive:
        for name, data in parts.items():
            entry = ZipInfo(name)
            entry.compress_type = compression
            with archive.open(entry, "w", force_zip64=large) as file:
                file.write(data)
        archive.comment = b"packed by hand"
    return buffer.getvalue()


def with_descriptors(parts: Parts) -> bytes:
    pipe = _Pipe()
    with ZipFile(pipe, "w", ZIP_DEFLATED) as archive:
        for name, data in parts.items():
            archive.writestr(name, data)
    return bytes(pipe.data)


def with_folders(parts: Parts) -> bytes:
    return packed({"xl/": b"", **parts, "[trash]/0000.dat": bytes(9), "__MACOSX/._a": b"a"})


PACKED: dict[str, Callable[[Parts], bytes]] = {
    "stored": lambda parts: packed(parts, ZIP_STORED),
    "bzip2": lambda parts: packed(parts, ZIP_BZIP2),
    "zip64": lambda parts: packed(parts, large=True),
    "sizes behind the data": with_descriptors,
    "folders and foreign parts": with_folders,
}


def unpacked(data: bytes) -> Parts:
    with ZipFile(BytesIO(data)) as archive:
        assert len(set(archive.namelist())) == len(archive.namelist())
        return {name: archive.read(name) for name in archive.namelist() if not name.endswith("/")}


def keeps_all(path: Path, donor: bytes, in_order: InOrder, tell: Tell) -> None:
    before, cells = unpacked(path.read_bytes()), read_cells(path)
    graft(path, donor, path)
    once = path.read_bytes()
    after = unpacked(once)
    used = set(INDEX) if b"/styles" in before[RELATIONS].replace(b"\0", b"") else {*INDEX} - {STYLES}
    kept = before.keys() - used
    changed = {name for name in kept if after.get(name) != before[name]}
    tell("zoo: {} workbooks, {} parts, {} parts changed or lost", 1, len(kept), len(changed))
    assert changed == set()
    assert read_cells(path) == cells
    assert owned_sheets(path) == {"Summary", "Monthly need"}
    in_order(once)
    graft(path, donor, path)
    assert path.read_bytes() == once


@pytest.mark.parametrize("spell", ODD, ids=lambda spell: spell.__name__)
def test_what_is_spelled_oddly_is_kept(
    tmp_path: Path, plain_book: bytes, donor: bytes, spell: Callable[[Parts], Parts], in_order: InOrder, tell: Tell
) -> None:
    path = tmp_path / "book.xlsx"
    path.write_bytes(packed(spell(unpacked(plain_book))))
    keeps_all(path, donor, in_order, tell)


@pytest.mark.parametrize("kind", PACKED)
def test_what_is_packed_oddly_is_kept(
    tmp_path: Path, plain_book: bytes, donor: bytes, kind: str, in_order: InOrder, tell: Tell
) -> None:
    path = tmp_path / "book.xlsx"
    path.write_bytes(PACKED[kind](unpacked(plain_book)))
    keeps_all(path, donor, in_order, tell)
    with closing(load_workbook(path, read_only=True)) as book:
        assert book.sheetnames == ["Zones", "Plot", "Lists", "Summary", "Monthly need"]


def test_what_a_package_lacks_is_made_for_the_new_sheets(tmp_path: Path, plain_book: bytes, donor: bytes) -> None:
    """New relations have a type, and new styles leave the part alone that nothing points at."""
    path = tmp_path / "book.xlsx"
    path.write_bytes(packed(types_of_relations_one_by_one(unpacked(plain_book))))
    graft(path, donor, path)
    assert f'<Default Extension="rels" ContentType="{RELATIONS_TYPE}"/>'.encode() in unpacked(path.read_bytes())[TYPES]
    path.write_bytes(packed(styles_that_nothing_points_at(unpacked(plain_book))))
    graft(path, donor, path)
    assert b"/xl/styles1.xml" in unpacked(path.read_bytes())[RELATIONS]


def refused(path: Path, donor: bytes) -> str:
    """The sentence that refuses a workbook, which stays as it is."""
    before = path.read_bytes()
    with pytest.raises(InputError) as caught:
        graft(path, donor, path)
    assert path.read_bytes() == before
    return str(caught.value)


def test_two_parts_of_one_name_are_refused(tmp_path: Path, plain_book: bytes, donor: bytes) -> None:
    """Nobody knows which one the user's program would read."""
    path = tmp_path / "book.xlsx"
    path.write_bytes(packed(unpacked(plain_book)))
    with pytest.warns(UserWarning, match="Duplicate name"), ZipFile(path, "a") as archive:
        archive.writestr("docProps/app.xml", b"<other/>")
    assert refused(path, donor) == (
        "book.xlsx: found a damaged or incomplete file; expected a whole workbook. "
        "Take an undamaged copy, or let your spreadsheet program repair it and save it as .xlsx."
    )


def test_the_most_cell_styles_that_excel_takes_are_not_passed(tmp_path: Path, plain_book: bytes, donor: bytes) -> None:
    parts = unpacked(plain_book)
    count = parts[STYLES].split(b"<cellXfs")[1].split(b"</cellXfs>")[0].count(b"<xf ")
    more = "".join(
        f'<xf numFmtId="{number}" fontId="0" fillId="0" borderId="0" xfId="0"/>' for number in range(65_490 - count)
    )
    path = tmp_path / "book.xlsx"
    path.write_bytes(packed(edited(parts, STYLES, "</cellXfs>", f"{more}</cellXfs>")))
    assert refused(path, donor) == (
        "book.xlsx: found a part that is too large (more than 65,490 cellXfs); expected a workbook of usual size. "
        "Clear the formats of empty rows and columns, or copy the input sheets into a new workbook."
    )
