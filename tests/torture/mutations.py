"""Every kind of harm that a workbook may come to, each drawn with a seed.

A kind is a function of a random generator and the parts of a sound workbook; it gives the bytes of the harmed file.
"""

from __future__ import annotations

import random
import re
from collections.abc import Callable, Iterator
from io import BytesIO
from typing import TypeAlias, cast
from zipfile import ZIP_DEFLATED, ZipFile

from lxml import etree

__all__ = ["FEW_LARGE", "KINDS", "LARGE_KINDS", "Parts", "draws", "packed", "unpacked"]

Parts: TypeAlias = dict[str, bytes]
Kind: TypeAlias = Callable[[random.Random, Parts], bytes]

SPACE = "http://schemas.openxmlformats.org/spreadsheetml/2006/main"
MAIN = f"{{{SPACE}}}"
RELATION_ID = "{http://schemas.openxmlformats.org/officeDocument/2006/relationships}id"
WORKBOOK, RELATIONS = "xl/workbook.xml", "xl/_rels/workbook.xml.rels"

TEXTS = (
    *("", " ", "abc", "1,2", "12 mm", "35 %", "1 000", "1.000,5", "−5", "½", "٣", "0x10", "1_000", "1e999", "--1"),
    *("NaN", "nan", "inf", "-Infinity", "TRUE", "None", "N/A", "#REF!", "2024-02-30", "31/12/2023", "8:30"),
    *("=1+1", '=HYPERLINK("http://a","b")', "+1", "-1", "@a", "'5", '"', "<b>&amp;</b>", "]]>", "%s {0} {x}", "\\"),
    *("😀", "👩‍👩‍👧", "\u202eabc", "\u200b", "\ufeff", "é" * 300, "a" * 40_000, "日本語", "\t", "a\nb", "  House  "),
    *("_x0000_", "_x0007_", "_x000B_", "_xD800_", "_xFFFF_", "_x0041_", "../../etc/passwd", "/dev/zero", "C:\\a.epw"),
    *("a/b" * 2000, ".", "..", "/", "~", "monthly table", "outdoors", "neighbour", "House", "Loft", "Wall", "heated"),
)
NUMBERS = (
    *("0", "-0.0", "-1", "1", "0.5", "3.7", "5E-324", "1E-300", "1E10", "1E20", "1E300", "-1E300", "1E308", "1E400"),
    *("NaN", "nan", "INF", "-inf", "1_000", " 5 ", "1,5", "", "abc", "0x1F", "45000", "1e", "９", "1" * 5000),
)
OTHERS = (
    *('<c t="b"><v>1</v></c>', '<c t="b"><v>maybe</v></c>', '<c t="e"><v>#REF!</v></c>', '<c t="e"><v>#N/A</v></c>'),
    *('<c t="d"><v>2023-03-15</v></c>', '<c t="d"><v>yesterday</v></c>', "<c><f>A1</f></c>", "<c><f>A1</f><v/></c>"),
    *('<c t="str"><f>A1</f><v></v></c>', '<c t="str"><f>A1</f><v>12</v></c>', "<c><f>1/0</f><v>4</v></c>", "<c/>"),
    *('<c t="zzz"><v>1</v></c>', '<c s="99999"><v>1</v></c>', '<c s="-1"><v>1</v></c>', '<c s="a"><v>1</v></c>'),
    *('<c t="s"><v>99999</v></c>', '<c t="s"><v>-1</v></c>', '<c t="s"><v>a</v></c>', "<c><v>1</v><v>2</v></c>"),
    *('<c t="inlineStr"/>', '<c t="inlineStr"><is/></c>', '<c t="inlineStr"><is><r><t>a</t></r><r/></is></c>'),
    *('<c><f t="array" ref="A1:XFD1048576">1</f><v>1</v></c>', '<c><f t="shared" si="0"/><v>2</v></c>', "<x/>"),
)
ATTRIBUTES = ("", "-1", "0", "1", "99999999999999999999", "NaN", "abc", "A1:XFD1048576", "#REF!", "../..", "rId1", "😀")


def unpacked(data: bytes) -> Parts:
    with ZipFile(BytesIO(data)) as archive:
        return {name: archive.read(name) for name in archive.namelist()}


def packed(parts: Parts, level: int = 1) -> bytes:
    buffer = BytesIO()
    with ZipFile(buffer, "w", ZIP_DEFLATED, compresslevel=level) as archive:
        for name, content in parts.items():
            archive.writestr(name, content)
    return buffer.getvalue()


# Cells


def cell_replaced(chance: random.Random, parts: Parts) -> bytes:
    """One cell with wrong content, or up to four."""
    for _ in range(chance.choice((1, 1, 1, 2, 4))):
        with _sheet(chance, parts) as sheet:
            cells = list(sheet.root.iter(f"{MAIN}c"))
            if cells:
                _replace(chance.choice(cells), _content(chance))
    return packed(parts)


def cell_misplaced(chance: random.Random, parts: Parts) -> bytes:
    """A cell or row whose name is nonsense, or that of another."""
    with _sheet(chance, parts) as sheet:
        item = chance.choice(list(sheet.root.iter(f"{MAIN}c", f"{MAIN}row")))
        names = (
            "",
            "E",
            "5",
            "e8",
            "ZZZZZZZ9",
            "A0",
            "A-1",
            "$A$5",
            "A1:B2",
            "A5",
            "B6",
            "日1",
            "3",
            "0",
            "-2",
            "1E2",
            "999999999999",
        )
        item.set("r", chance.choice(names))
    return packed(parts)


def far_cell(chance: random.Random, parts: Parts) -> bytes:
    """A value, or only a format, at the far corner."""
    with _sheet(chance, parts) as sheet:
        value = chance.choice(("<v>1</v>", "", "<is><t>a</t></is>"))
        kind = ' t="inlineStr"' if "is" in value else ""
        name = chance.choice(("XFD1048576", "XFD5", "A1048576", "B20001", "SG6"))
        digits = re.sub(r"\D", "", name)
        row = f'<row xmlns="{SPACE}" r="{digits}"><c r="{name}"{kind}>{value}</c></row>'
        _data(sheet.root).append(etree.fromstring(row))
    return packed(parts)


# Rows, columns, sheets


def row_repeated(chance: random.Random, parts: Parts) -> bytes:
    """A row once more, or three hundred times, behind the last or in its own place."""
    with _sheet(chance, parts) as sheet:
        data = _data(sheet.root)
        if not len(data):
            return packed(parts)
        row = chance.choice(list(data))
        moved = chance.random() < 0.8
        last = max(int(item.get("r", "0")) for item in data)
        for number in range(1, chance.choice((1, 1, 2, 300)) + 1):
            copy = etree.fromstring(etree.tostring(row))
            if moved:
                copy.set("r", str(last + number))
                for cell in copy:
                    cell.set("r", re.sub(r"\d+", "", cell.get("r", "A")) + str(last + number))
            data.append(copy)
    return packed(parts)


def row_removed(chance: random.Random, parts: Parts) -> bytes:
    """Without one row, its titles or units perhaps."""
    with _sheet(chance, parts) as sheet:
        data = _data(sheet.root)
        if len(data):
            data.remove(chance.choice(list(data)))
    return packed(parts)


def columns_swapped(chance: random.Random, parts: Parts) -> bytes:
    """Two columns in each other's place, whole or in one row only."""
    with _sheet(chance, parts) as sheet:
        one, other = chance.sample("ABCDEFGH", 2)
        swap = {one: other, other: one}
        rows = list(_data(sheet.root))
        for row in rows if chance.random() < 0.5 else rows[3:4]:
            for cell in row:
                letters = re.sub(r"\d", "", cell.get("r", ""))
                cell.set("r", cell.get("r", "").replace(letters, swap.get(letters, letters)))
    return packed(parts)


def sheet_removed(chance: random.Random, parts: Parts) -> bytes:
    """A sheet gone from the list, from the relations, from the parts or from all of them."""
    title, part = chance.choice(list(_titles(parts).items()))
    what = chance.randrange(4)
    book, relations = etree.fromstring(parts[WORKBOOK]), etree.fromstring(parts[RELATIONS])
    entry = next(item for item in book.iter(f"{MAIN}sheet") if item.get("name") == title)
    if what in {0, 3}:
        cast("etree._Element", entry.getparent()).remove(entry)
    if what in {1, 3}:
        relations.remove(next(item for item in relations if item.get("Id") == entry.get(RELATION_ID)))
    if what in {2, 3}:
        del parts[part]
    parts |= {WORKBOOK: etree.tostring(book), RELATIONS: etree.tostring(relations)}
    return packed(parts)


def sheet_renamed(chance: random.Random, parts: Parts) -> bytes:
    """A sheet under another name: a slip, one of ours, another sheet's, none."""
    names = (
        "",
        " ",
        "Zone",
        "zones",
        "Summary",
        "Monthly need",
        "Problems",
        "a" * 31,
        "a" * 300,
        "'",
        "]:*?/",
        "😀",
        "Lists",
    )
    book = etree.fromstring(parts[WORKBOOK])
    chance.choice(list(book.iter(f"{MAIN}sheet"))).set("name", chance.choice((*names, *_titles(parts))))
    parts[WORKBOOK] = etree.tostring(book)
    return packed(parts)


def sheet_emptied(chance: random.Random, parts: Parts) -> bytes:
    """A sheet without rows, without anything, or with another sheet's content."""
    with _sheet(chance, parts) as sheet:
        what = chance.randrange(3)
        if what == 0:
            _data(sheet.root).clear()
        elif what == 1:
            sheet.root.clear()
    if what == 2:
        one, other = chance.sample(sorted(_titles(parts).values()), 2)
        parts[one] = parts[other]
    return packed(parts)


def names_harmed(chance: random.Random, parts: Parts) -> bytes:
    """Defined names that are nonsense, our markers too."""
    texts = ("Zones!$A$1", "#REF!", "", "'", "Nowhere!$A$1", "Zones!$A$1:$XFD$1048576", "1/0", "Summary!$A$1")
    names = ("_heatledger_sheet_summary", "_heatledger_sheet_", "_xlnm.Print_Area", "list_zones", "Total", "")
    book = etree.fromstring(parts[WORKBOOK])
    holder = book.find(f"{MAIN}definedNames")
    if holder is None:
        holder = etree.SubElement(book, f"{MAIN}definedNames")
    for _ in range(chance.choice((1, 3))):
        place = chance.choice(("", "0", "1", "99", "-1", "a"))
        name = etree.SubElement(holder, f"{MAIN}definedName", name=chance.choice(names))
        name.text = chance.choice(texts)
        if place:
            name.set("localSheetId", place)
    parts[WORKBOOK] = etree.tostring(book)
    return packed(parts)


# XML


def attribute_harmed(chance: random.Random, parts: Parts) -> bytes:
    """One attribute anywhere changed or gone."""
    name, root = _part(chance, parts)
    items = [item for item in root.iter(etree.Element) if item.attrib]
    if items:
        item = chance.choice(items)
        key = chance.choice(list(item.attrib))
        if chance.random() < 0.4:
            del item.attrib[key]
        else:
            item.set(key, chance.choice(ATTRIBUTES))
    parts[name] = etree.tostring(root)
    return packed(parts)


def element_harmed(chance: random.Random, parts: Parts) -> bytes:
    """One element anywhere gone, doubled, renamed or with another text."""
    name, root = _part(chance, parts)
    items = list(root.iter(etree.Element))
    item, what = chance.choice(items), chance.randrange(4)
    parent = item.getparent()
    if what == 0 and parent is not None:
        parent.remove(item)
    elif what == 1 and parent is not None:
        parent.append(etree.fromstring(etree.tostring(item)))
    elif what == 2:
        item.tag = chance.choice(("{urn:x}c", f"{MAIN}row", "x"))
    else:
        item.text = chance.choice([text for text in TEXTS if _is_xml(text)])
    parts[name] = etree.tostring(root)
    return packed(parts)


def comment_inserted(chance: random.Random, parts: Parts) -> bytes:
    """Comments and processing instructions where no program writes them: sound XML all the same."""
    name = chance.choice([name for name in parts if name.endswith((".xml", ".rels"))])
    ends = [match.end() for match in re.finditer(rb"<(?!\?|!)[^>]*[^/]>", parts[name])]
    place = chance.choice(ends or [len(parts[name])])
    extra = chance.choice((b"<!-- a -->", b"<?a b?>", b"\n  \n"))
    parts[name] = parts[name][:place] + extra + parts[name][place:]
    return packed(parts)


def markup_harmed(chance: random.Random, parts: Parts) -> bytes:
    """Entities, document types, unclosed tags, false encodings, deep nesting."""
    name = chance.choice([name for name in parts if name.endswith((".xml", ".rels"))])
    data = parts[name]
    head, laughs = (
        b'<?xml version="1.0"?>',
        b"".join(b'<!ENTITY a%d "%s">' % (n, b"&a%d;" % (n - 1) * 10) for n in range(1, 10)),
    )
    body = data[data.index(b"?>") + 2 :] if data.startswith(b"<?xml") else data
    parts[name] = chance.choice(
        (
            head + b'<!DOCTYPE a [<!ENTITY a0 "ha">' + laughs + b"]>" + body,
            head + b'<!DOCTYPE a [<!ENTITY b SYSTEM "file:///etc/hostname">]>' + body.replace(b"</", b"&b;</", 1),
            head + b'<!DOCTYPE a SYSTEM "http://127.0.0.1:9/a.dtd">' + body,
            body.replace(b"</", b"&nothing;</", 1),
            body.replace(b"</", b"&#0;</", 1),
            data[: chance.randrange(len(data))],
            b'<?xml version="1.0" encoding="UTF-16"?>' + body,
            b'<?xml version="1.0" encoding="nonsense"?>' + body,
            body.decode().encode("utf-16"),
            body.replace(b"</", b"\xff\xfe</", 1),
            b"<a>" * 100_000 + b"</a>" * 100_000,
            b"",
            b"\0" * 100,
            body.replace(b"xmlns", b"xmlms"),
        )
    )
    return packed(parts)


# The file


def bytes_flipped(chance: random.Random, parts: Parts) -> bytes:
    """One bit, ten, or a run of noughts, in the packed file."""
    data = bytearray(packed(parts))
    for _ in range(chance.choice((1, 1, 10))):
        data[chance.randrange(len(data))] ^= 1 << chance.randrange(8)
    if chance.random() < 0.2:
        start = chance.randrange(len(data))
        data[start : start + 200] = bytes(len(data[start : start + 200]))
    return bytes(data)


def bits_of_a_part_flipped(chance: random.Random, parts: Parts) -> bytes:
    """A few bytes changed inside a part, the checksum put right."""
    name = chance.choice(sorted(parts))
    data = bytearray(parts[name])
    for _ in range(chance.choice((1, 3, 20))):
        if data:
            data[chance.randrange(len(data))] = chance.randrange(256)
    parts[name] = bytes(data)
    return packed(parts)


def file_cut(chance: random.Random, parts: Parts) -> bytes:
    """A file that ends early, or begins late, or has something before or behind it."""
    data = packed(parts)
    place = chance.choice((chance.randrange(len(data)), chance.randrange(64), len(data) - chance.randrange(1, 64)))
    return chance.choice((data[:place], data[:place], data[place:], data + b"x" * place, b"x" * place + data))


def part_dropped(chance: random.Random, parts: Parts) -> bytes:
    """One part missing, or two exchanged, or one under a strange name."""
    one, other = chance.sample(sorted(parts), 2)
    what = chance.randrange(4)
    if what == 1:
        parts[one], parts[other] = parts[other], parts[one]
    elif what == 2:
        parts[chance.choice(("../../evil.xml", "/xl/a.xml", "xl\\a.xml", one.upper(), "con", "a/", "😀.xml"))] = parts[
            one
        ]
    else:
        del parts[one]
    return packed(parts)


KINDS: dict[str, tuple[Kind, int]] = {
    "cell replaced": (cell_replaced, 30),
    "cell misplaced": (cell_misplaced, 5),
    "far cell": (far_cell, 2),
    "row repeated": (row_repeated, 6),
    "row removed": (row_removed, 4),
    "columns swapped": (columns_swapped, 4),
    "sheet removed": (sheet_removed, 4),
    "sheet renamed": (sheet_renamed, 5),
    "sheet emptied": (sheet_emptied, 3),
    "names harmed": (names_harmed, 5),
    "attribute harmed": (attribute_harmed, 10),
    "element harmed": (element_harmed, 8),
    "comment inserted": (comment_inserted, 4),
    "markup harmed": (markup_harmed, 5),
    "bytes flipped": (bytes_flipped, 4),
    "bits of a part flipped": (bits_of_a_part_flipped, 6),
    "file cut": (file_cut, 3),
    "part dropped": (part_dropped, 5),
}
"""Each kind of harm and how often it is drawn."""


# Small on disk, large in memory


def _bomb(part: str, content: Callable[[], bytes]) -> Kind:
    def kind(_chance: random.Random, parts: Parts) -> bytes:
        parts[_titles(parts).get(part, part)] = content()
        return packed(parts)

    return kind


def _rows(count: int, row: str, row_end: str = "") -> bytes:
    """A worksheet of many rows."""
    rows = "".join(row.format(number) for number in range(1, count + 1))
    return f'<worksheet xmlns="{SPACE}"><sheetData>{rows}{row_end}</sheetData></worksheet>'.encode()


SHEET = f'<worksheet xmlns="{SPACE}">'.encode()
FORMATTED = '<row r="{0}" s="1" customFormat="1" ht="15" customHeight="1"/>'
LARGE_KINDS: dict[str, Kind] = {
    "300 MB of nothing": _bomb("customXml/item1.xml", lambda: bytes(300_000_000)),
    "a million formatted rows": _bomb("Zones", lambda: _rows(1_048_576, FORMATTED)),
    "a million formatted rows of the user": _bomb("Survey", lambda: _rows(1_048_576, FORMATTED)),
    "10 million cells of the user": _bomb("Survey", lambda: _rows(500_000, "<row>" + "<c/>" * 20 + "</row>")),
    "a million filled rows": _bomb("Envelope", lambda: _rows(1_048_576, '<row r="{0}"><c r="A{0}"><v>1</v></c></row>')),
    "one row of 40 million cells": _bomb(
        "Zones", lambda: b"".join([SHEET, b"<sheetData><row>", b"<c/>" * 40_000_000, b"</row></sheetData></worksheet>"])
    ),
    "20 thousand rows of 400 empty cells": _bomb("Openings", lambda: _rows(20_000, "<row>" + "<c/>" * 400 + "</row>")),
    "50 million styles": _bomb(
        "xl/styles.xml", lambda: f'<styleSheet xmlns="{SPACE}">'.encode() + b"<a/>" * 45_000_000 + b"</styleSheet>"
    ),
    "45 million shared strings": lambda chance, parts: _many_strings(parts),
    "45 million content types": _bomb("[Content_Types].xml", lambda: b"<Types>" + b"<a/>" * 45_000_000 + b"</Types>"),
    "45 million merged cells": _bomb(
        "Zones", lambda: f'<worksheet xmlns="{SPACE}"><sheetData/>'.encode() + b"<m/>" * 45_000_000 + b"</worksheet>"
    ),
    "190 MB of white space": _bomb("Zones", lambda: b" " * 190_000_000),
    "190 MB of comments": _bomb("Zones", lambda: b"<!-- a -->" * 19_000_000),
    "one comment of 190 MB": _bomb("Zones", lambda: b"<!--" + b"a" * 190_000_000 + b"-->"),
    "one attribute of 190 MB": _bomb("Zones", lambda: b'<a b="' + b"a" * 190_000_000 + b'"/>'),
    "190 MB of one text": _bomb(
        "Zones", lambda: _rows(1, '<row r="1"><c t="str"><v>' + "a" * 190_000_000 + "</v></c></row>")
    ),
    "3000 zones": lambda chance, parts: _many_zones(parts, 3000),
}


FEW_LARGE = (
    *("300 MB of nothing", "a million formatted rows", "a million filled rows", "one row of 40 million cells"),
    *("50 million styles", "one comment of 190 MB", "3000 zones"),
)
"""Those that are tried each time."""


def _many_strings(parts: Parts) -> bytes:
    relations = etree.fromstring(parts[RELATIONS])
    kind = f"{RELATION_ID[1:].partition('}')[0]}/sharedStrings"
    holder = etree.QName(relations).namespace
    etree.SubElement(relations, f"{{{holder}}}Relationship", Id="strings", Type=kind, Target="/xl/many.xml")
    parts[RELATIONS] = etree.tostring(relations)
    parts["xl/many.xml"] = f'<sst xmlns="{SPACE}">'.encode() + b"<a/>" * 45_000_000 + b"</sst>"
    return packed(parts)


def _many_zones(parts: Parts, count: int) -> bytes:
    """The last zone again and again, under names of their own."""
    part = _titles(parts)["Zones"]
    root = etree.fromstring(parts[part])
    last = list(_data(root))[-1]
    start = int(last.get("r", "0"))
    for number in range(start + 1, start + count):
        row = etree.fromstring(etree.tostring(last))
        row.set("r", str(number))
        for cell in row:
            cell.set("r", re.sub(r"\d+", "", cell.get("r", "A")) + str(number))
        _replace(row[0], f'<c t="inlineStr"><is><t>Zone {number}</t></is></c>')
        _data(root).append(row)
    parts[part] = etree.tostring(root)
    return packed(parts)


# Helpers


class _sheet:  # noqa: N801 - read as a word: with _sheet(...) as sheet
    """A sheet drawn at random, written back at the end."""

    def __init__(self, chance: random.Random, parts: Parts) -> None:
        self._parts = parts
        self._name = chance.choice([name for name in _titles(parts).values() if name in parts])
        self.root = etree.fromstring(parts[self._name])

    def __enter__(self) -> _sheet:
        return self

    def __exit__(self, *_error: object) -> None:
        self._parts[self._name] = etree.tostring(self.root)


def _titles(parts: Parts) -> dict[str, str]:
    """Part of each sheet by its name."""
    targets = {item.get("Id"): item.get("Target", "") for item in etree.fromstring(parts[RELATIONS])}
    sheets = etree.fromstring(parts[WORKBOOK]).iter(f"{MAIN}sheet")
    names = {item.get("name", ""): targets[item.get(RELATION_ID)] for item in sheets}
    return {name: target.lstrip("/") if target.startswith("/") else f"xl/{target}" for name, target in names.items()}


def _data(root: etree._Element) -> etree._Element:
    found = root.find(f"{MAIN}sheetData")
    assert found is not None
    return found


def _part(chance: random.Random, parts: Parts) -> tuple[str, etree._Element]:
    """An XML part drawn at random; those that are read are drawn more often."""
    names = [name for name in parts if name.endswith((".xml", ".rels"))]
    index = [name for name in names if "heet" not in name or "worksheets/sheet" in name]
    name = chance.choice(chance.choice((names, index, [WORKBOOK, RELATIONS, "[Content_Types].xml", "xl/styles.xml"])))
    return name, etree.fromstring(parts[name])


def _replace(cell: etree._Element, content: str) -> None:
    new = etree.fromstring(re.sub(r"^<(\w)", rf'<\1 xmlns="{SPACE}"', content))
    if cell.get("r"):
        new.set("r", cell.get("r", ""))
    parent = cell.getparent()
    assert parent is not None
    parent.replace(cell, new)


def _content(chance: random.Random) -> str:
    """A cell of wrong content."""
    kind = chance.randrange(5)
    if kind in {0, 1}:
        text = _escaped(chance.choice(TEXTS))
        return chance.choice((f'<c t="inlineStr"><is><t>{text}</t></is></c>', f'<c t="str"><v>{text}</v></c>'))
    if kind in {2, 3}:
        style = chance.choice(("", "", "", "", ' s="0"', ' s="1"'))
        return f"<c{style}><v>{chance.choice(NUMBERS)}</v></c>"
    return chance.choice(OTHERS)


def _escaped(text: str) -> str:
    return text.replace("&", "&amp;").replace("<", "&lt;").replace(">", "&gt;")


def _is_xml(text: str) -> bool:
    return all(letter in "\t\n" or " " <= letter < "\ufffe" or letter > "\uffff" for letter in text)


def draws() -> Iterator[str]:
    """The kinds, each as often as it is to be drawn."""
    for name, (_, weight) in KINDS.items():
        yield from [name] * weight
