"""The parts of an .xlsx package, their relations and content types."""

from __future__ import annotations

import posixpath
import re
from collections.abc import Iterator
from io import BytesIO
from itertools import count
from typing import NamedTuple
from urllib.parse import quote, unquote
from zipfile import ZIP_DEFLATED, ZIP_STORED, ZipFile, ZipInfo

from lxml import etree

__all__ = [
    "MAIN",
    "MOST_MARKS",
    "OFFICE",
    "RELATIONS",
    "TYPES_PART",
    "Element",
    "Package",
    "PartTooLargeError",
    "Relation",
    "SheetEntry",
    "dump",
    "main",
    "parse",
    "required",
]

Element = etree._Element
"""An XML element."""
MAIN = "http://schemas.openxmlformats.org/spreadsheetml/2006/main"
"""Namespace of workbooks and sheets (ECMA-376 Part 1, transitional)."""
OFFICE = "http://schemas.openxmlformats.org/officeDocument/2006/relationships"
"""Namespace of relation ids and types."""
RELATIONS = "http://schemas.openxmlformats.org/package/2006/relationships"
TYPES = "http://schemas.openxmlformats.org/package/2006/content-types"
TYPES_PART = "[Content_Types].xml"
RELATIONS_TYPE = "application/vnd.openxmlformats-package.relationships+xml"
FIXED_TIME = (1980, 1, 1, 0, 0, 0)
MOST_MARKS = 2_000_000
"""Tags and attributes of a part that is held as a tree; each takes up to 300 bytes of memory."""
MOST_MARKS_OF_TYPES = 100_000
"""The same for the content types, which are parsed again and again: there is about one for each part."""


class PartTooLargeError(ValueError):
    """A part that would take too much memory."""


class Relation(NamedTuple):
    """A relation of a part; ``target`` is a part name, or an address if ``external``."""

    id: str
    kind: str
    target: str
    external: bool


class SheetEntry(NamedTuple):
    """A sheet as the workbook lists it."""

    title: str
    part: str
    kind: str
    element: Element


def main(tag: str) -> str:
    """Tag in the namespace of workbooks."""
    return f"{{{MAIN}}}{tag}"


def parse(data: bytes) -> Element:
    """Root of an XML part, without comments; entities are never expanded, nothing is fetched."""
    parser = etree.XMLParser(resolve_entities=False, no_network=True, remove_comments=True, remove_pis=True)
    root = etree.fromstring(data, parser)
    if root.getroottree().docinfo.internalDTD is not None:
        raise ValueError("a document type")
    return root


def required(element: Element, key: str) -> str:
    """An attribute that has to be there."""
    return str(element.attrib[key])


def dump(root: Element) -> bytes:
    """An XML part, written the same way each time."""
    return etree.tostring(root, xml_declaration=True, encoding="UTF-8", standalone=True)


class Package:
    """All parts of a workbook in memory, in the order of the file.

    Parameters
    ----------
    archive : ZipFile
        Open for reading; every part is read, so its checksum is tested too.
    """

    def __init__(self, archive: ZipFile) -> None:
        entries = [entry for entry in archive.infolist() if not entry.is_dir()]
        self.parts = {entry.filename: archive.read(entry) for entry in entries}
        self._entries = {entry.filename: entry for entry in entries}
        self._names = {name.lower(): name for name in self.parts}
        if len(self._names) != len(entries):
            raise ValueError("two parts have the same name")

    @classmethod
    def from_bytes(cls, data: bytes) -> Package:
        """Package of a workbook held in memory."""
        with ZipFile(BytesIO(data)) as archive:
            return cls(archive)

    def to_bytes(self) -> bytes:
        """The whole file; parts that came from a file keep its date, new ones get a fixed one."""
        buffer = BytesIO()
        with ZipFile(buffer, "w", ZIP_DEFLATED) as archive:
            for name, data in self.parts.items():
                archive.writestr(self._entry(name), data)
        return buffer.getvalue()

    def _entry(self, name: str) -> ZipInfo:
        old = self._entries.get(name)
        entry = ZipInfo(name, old.date_time if old else FIXED_TIME)
        entry.compress_type = ZIP_STORED if old and old.compress_type == ZIP_STORED else ZIP_DEFLATED
        entry.create_system = old.create_system if old else 0
        entry.external_attr = old.external_attr if old else 0
        return entry

    def name(self, part: str) -> str:
        """The part's name as the file spells it; part names do not distinguish case, nor "%20" from a space."""
        spellings = (part, unquote(part), quote(part))
        return next((self._names[name.lower()] for name in spellings if name.lower() in self._names), part)

    def xml(self, part: str) -> Element:
        """Root of an XML part that is small enough for it."""
        data = self.parts[part]
        if data.count(b"<") + data.count(b"=") > (MOST_MARKS_OF_TYPES if part == TYPES_PART else MOST_MARKS):
            raise PartTooLargeError(part)
        return parse(data)

    def relations_part(self, part: str) -> str:
        """Name of the part that holds a part's relations."""
        folder, name = posixpath.split(part)
        return self.name(posixpath.join(folder, "_rels", f"{name}.rels"))

    def relations(self, part: str = "") -> list[Relation]:
        """Relations of a part, or of the package."""
        holder = self.relations_part(part)
        return [self._relation(part, item) for item in self.xml(holder)] if holder in self.parts else []

    def _relation(self, part: str, item: Element) -> Relation:
        target, external = item.get("Target", ""), item.get("TargetMode") == "External"
        if not external:
            path = posixpath.normpath(posixpath.join("/", posixpath.dirname(part), target))
            target = self.name(path.lstrip("/"))
        return Relation(required(item, "Id"), item.get("Type", "").rpartition("/")[2], target, external)

    def related(self, part: str, kind: str) -> str | None:
        """First part of a kind that a part points at."""
        return next((item.target for item in self.relations(part) if item.kind == kind), None)

    @property
    def workbook(self) -> str:
        """Name of the workbook part."""
        part = self.related("", "officeDocument")
        if part is None:
            raise KeyError("officeDocument")
        return part

    def sheets(self) -> Iterator[SheetEntry]:
        """Sheets of every kind, in the order of the tabs."""
        relations = {item.id: item for item in self.relations(self.workbook)}
        for element in self.xml(self.workbook).iterfind(f"{main('sheets')}/{main('sheet')}"):
            relation = relations[required(element, f"{{{OFFICE}}}id")]
            yield SheetEntry(required(element, "name"), relation.target, relation.kind, element)

    def content_types(self) -> dict[str, str]:
        """Content type of every part that has one."""
        root = self.xml(TYPES_PART)
        stated = {item.get("PartName", "").lower(): item.get("ContentType", "") for item in root}
        usual = {item.get("Extension", "").lower(): item.get("ContentType", "") for item in root}
        kinds = {}
        for name in self.parts:
            extension = posixpath.splitext(name)[1][1:].lower()
            kinds[name] = stated.get(f"/{name.lower()}") or usual.get(extension, "")
        return kinds

    def add(self, part: str, data: bytes, content_type: str = "") -> None:
        """Add a part; only relations may go without a content type."""
        self.parts[part] = data
        self._names[part.lower()] = part
        types = self.xml(TYPES_PART)
        if content_type:
            etree.SubElement(types, f"{{{TYPES}}}Override", PartName=f"/{part}", ContentType=content_type)
        elif not any(item.get("Extension", "").lower() == "rels" for item in types):
            types.insert(0, etree.Element(f"{{{TYPES}}}Default", Extension="rels", ContentType=RELATIONS_TYPE))
        self.parts[TYPES_PART] = dump(types)

    def remove(self, parts: set[str]) -> None:
        """Take parts out, with their relations and content types."""
        types = self.xml(TYPES_PART)
        gone = {f"/{part.lower()}" for part in parts}
        for item in list(types):
            if item.get("PartName", "").lower() in gone:
                types.remove(item)
        self.parts[TYPES_PART] = dump(types)
        for name in [*parts, *(self.relations_part(part) for part in parts)]:
            self.parts.pop(name, None)
            self._entries.pop(name, None)
            self._names.pop(name.lower(), None)

    def free_name(self, like: str) -> str:
        """The first numbered part name of this form that is not taken, nor that of its relations."""
        stem, extension = posixpath.splitext(like)
        stem = re.sub(r"\d+$", "", stem)
        names = (f"{stem}{number}{extension}" for number in count(1))
        return next(name for name in names if {name.lower(), self.relations_part(name).lower()}.isdisjoint(self._names))
