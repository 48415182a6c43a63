"""The workbook part and its relations: the list of sheets and the defined names."""

from __future__ import annotations

import re
from collections.abc import Collection, Iterable
from copy import deepcopy

from lxml import etree

from heatledger.workbook.package import OFFICE, RELATIONS, Element, Package, SheetEntry, dump, main, required
from heatledger.workbook.references import global_markers, is_marker, marker_name, quoted
from heatledger.workbook.styles import section

__all__ = ["Index"]

_ORDER = (
    *("fileVersion", "fileSharing", "workbookPr", "workbookProtection", "bookViews", "sheets"),
    *("functionGroups", "externalReferences", "definedNames", "calcPr", "oleSize"),
    *("customWorkbookViews", "pivotCaches"),
)
_LONGEST_TITLE = 31


class Index:
    """Sheets and names of a workbook that is being changed.

    Parameters
    ----------
    package : Package
        Changed only by :meth:`store`.
    """

    def __init__(self, package: Package) -> None:
        self._package = package
        self._entries = {entry.title.casefold(): entry for entry in package.sheets()}
        self._root = package.xml(package.workbook)
        self._relations = package.xml(package.relations_part(package.workbook))
        self._sheets = section(self._root, "sheets", _ORDER)
        self._names = section(self._root, "definedNames", _ORDER)

    def owned(self) -> dict[str, SheetEntry]:
        """Our sheets by marker; a marker whose sheet is gone does not count."""
        owned: dict[str, SheetEntry] = {}
        for marker, title in global_markers(self._root):
            entry = self._entries.get(title.casefold())
            if entry is not None and entry not in owned.values():
                owned.setdefault(marker, entry)
        return owned

    def free_title(self, title: str, taken: Collection[str] = ()) -> str:
        """The title, or if a sheet has it a like one that is free."""
        used = {required(sheet, "name").casefold() for sheet in self._sheets} | {name.casefold() for name in taken}
        new, number = title, 1
        while new.casefold() in used:
            suffix = " (heatledger)" if number == 1 else f" (heatledger {number})"
            new, number = title[: _LONGEST_TITLE - len(suffix)] + suffix, number + 1
        return new

    @property
    def structure_locked(self) -> bool:
        """Whether the user locked the list of sheets."""
        protection = self._root.find(main("workbookProtection"))
        return protection is not None and protection.get("lockStructure") in {"1", "true"}

    def remove(self, entry: SheetEntry) -> None:
        """Take a sheet off the list; the places that names and views point at move up."""
        place = self._place(entry.title)
        self._relations.remove(self._relation(self._sheets[place]))
        self._sheets.remove(self._sheets[place])
        for name in list(self._names):
            owner = int(name.get("localSheetId", "-1"))
            if owner == place:
                self._names.remove(name)
            elif owner > place:
                name.set("localSheetId", str(owner - 1))
        for view in self._root.iterfind(f"{main('bookViews')}/{main('workbookView')}"):
            for key in ("activeTab", "firstSheet"):
                tab = int(view.get(key, "0"))
                if tab > place or tab == len(self._sheets):
                    view.set(key, str(tab - 1))

    def replace(self, entry: SheetEntry, part: str) -> None:
        """Let a sheet of ours point at a new part; its place, id and name stay."""
        place = self._place(entry.title)
        self._relation(self._sheets[place]).set("Target", f"/{part}")

    def append(self, title: str, part: str, state: str | None) -> None:
        """Add a sheet behind the last."""
        ids = [int(sheet.attrib["sheetId"]) for sheet in self._sheets]
        sheet = etree.SubElement(self._sheets, main("sheet"), name=title, sheetId=str(max([0, *ids]) + 1))
        if state:
            sheet.set("state", state)
        sheet.set(f"{{{OFFICE}}}id", self.relate("worksheet", part))

    def relate(self, kind: str, part: str) -> str:
        """Let the workbook point at a part; the new relation's id."""
        used = [re.fullmatch(r"rId(\d+)", item.get("Id", "")) for item in self._relations]
        new = f"rId{max([0, *(int(match[1]) for match in used if match)]) + 1}"
        attributes = {"Id": new, "Type": f"{OFFICE}/{kind}", "Target": f"/{part}"}
        etree.SubElement(self._relations, f"{{{RELATIONS}}}Relationship", attributes)
        return new

    def unrelate(self, kind: str) -> None:
        """Let the workbook no longer point at parts of a kind."""
        for item in list(self._relations):
            if item.get("Type", "").endswith(f"/{kind}"):
                self._relations.remove(item)

    def table_names(self) -> set[str]:
        """Defined names, casefolded: tables must not share them."""
        return {required(name, "name").casefold() for name in self._names}

    def clear_names(self, titles: Iterable[str]) -> None:
        """Remove all markers, and the print ranges and the like of these sheets."""
        places = {str(self._place(title)) for title in titles}
        for name in list(self._names):
            built_in = required(name, "name").startswith("_xlnm.") and name.get("localSheetId") in places
            if is_marker(name) or built_in:
                self._names.remove(name)

    def add_name(self, name: Element, title: str, text: str) -> None:
        """Add a defined name of a sheet, as a donor has it."""
        new = deepcopy(name)
        new.set("localSheetId", str(self._place(title)))
        new.text = text
        self._names.append(new)

    def mark(self, donor_title: str, title: str) -> None:
        """Mark a sheet as ours: all its rows, since a name of one cell goes along where the cell is cut and pasted."""
        name = etree.SubElement(self._names, main("definedName"), name=marker_name(donor_title), hidden="1")
        name.text = f"{quoted(title)}!$1:$1048576"

    def store(self) -> None:
        """Write both parts; formulas are worked out anew when the file is opened."""
        section(self._root, "calcPr", _ORDER).set("fullCalcOnLoad", "1")
        part = self._package.workbook
        relations = self._package.relations_part(part)
        self._package.parts[part] = dump(self._root)
        self._package.parts[relations] = dump(self._relations)

    def _place(self, title: str) -> int:
        return [required(sheet, "name").casefold() for sheet in self._sheets].index(title.casefold())

    def _relation(self, sheet: Element) -> Element:
        wanted = sheet.get(f"{{{OFFICE}}}id")
        return next(item for item in self._relations if item.get("Id") == wanted)
