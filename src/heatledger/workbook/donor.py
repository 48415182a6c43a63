"""Copies sheets of a donor workbook, with all they point at, into another package."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from copy import deepcopy

from lxml import etree

from heatledger.workbook.package import Element, Package, dump, main, parse, required
from heatledger.workbook.references import rename_sheets
from heatledger.workbook.styles import StyleMerger

__all__ = ["DonorCopier"]

_FORMULAS = {"f", "formula", "formula1", "formula2"}
"""Elements whose text is a formula: cells, charts, conditional formats, data validations."""


class DonorCopier:
    """Copies donor parts under free names and makes them fit their new home.

    Parameters
    ----------
    package, donor : Package
        Where to and where from.
    styles : StyleMerger
        Finds the new index of each style.
    renames : mapping of str to str
        New names of donor sheets by their old ones, casefolded.
    names : iterable of str
        Defined names of the workbook, casefolded; tables must not share them.
    """

    def __init__(
        self,
        package: Package,
        donor: Package,
        styles: StyleMerger,
        renames: Mapping[str, str],
        names: Iterable[str],
    ) -> None:
        self._package = package
        self._donor = donor
        self._styles = styles
        self._renames = renames
        self._types = donor.content_types()
        self._copied: dict[str, str] = {}
        shared = donor.related(donor.workbook, "sharedStrings")
        self._strings = list(donor.xml(shared)) if shared else []
        tables = [package.xml(part) for part in package.parts if "/tables/" in part and part.endswith(".xml")]
        self._table_id = max([0, *(int(required(table, "id")) for table in tables)])
        self._table_names = {*names, *(required(table, "displayName").casefold() for table in tables)}

    def sheet(self, part: str, code_name: str | None = None) -> str:
        """Copy a sheet; ``code_name`` is the macro module that belongs to its place."""
        return self._copy(part, code_name)

    def _copy(self, part: str, code_name: str | None = None) -> str:
        if part in self._copied:
            return self._copied[part]
        new = self._copied[part] = self._package.free_name(part)
        self._package.add(new, b"", self._types[part])
        self._package.parts[new] = self._fitted(part, code_name)
        self._copy_relations(part, new)
        return new

    def _copy_relations(self, part: str, new: str) -> None:
        holder = self._donor.relations_part(part)
        if holder not in self._donor.parts:
            return
        root = self._donor.xml(holder)
        for item, relation in zip(root, self._donor.relations(part), strict=True):
            if not relation.external:
                item.set("Target", f"/{self._copy(relation.target)}")
            elif relation.target.startswith("#"):
                item.set("Target", "#" + rename_sheets(relation.target[1:], self._renames))
        self._package.add(self._package.relations_part(new), dump(root))

    def _fitted(self, part: str, code_name: str | None) -> bytes:
        data = self._donor.parts[part]
        if not self._types[part].endswith("+xml"):
            return data
        root = parse(data)
        for element in list(root.iter(etree.Element)):
            self._fit(element)
        if root.tag == main("worksheet") and code_name:
            _set_code_name(root, code_name)
        return dump(root)

    def _fit(self, element: Element) -> None:
        tag = etree.QName(element).localname
        if tag in _FORMULAS and element.text:
            element.text = rename_sheets(element.text, self._renames)
        elif tag == "hyperlink" and element.get("location"):
            element.set("location", rename_sheets(required(element, "location"), self._renames))
        elif tag == "sheetView":
            element.attrib.pop("tabSelected", "")
        elif tag == "table":
            self._fit_table(element)
        self._fit_style(element)

    def _fit_style(self, element: Element) -> None:
        if element.tag == main("c"):
            element.set("s", self._styles.cell(int(element.get("s", "0"))))
            if element.get("t") == "s":
                self._make_inline(element)
        elif element.tag == main("row") and element.get("s"):
            element.set("s", self._styles.cell(int(element.attrib["s"])))
        elif element.tag == main("col") and element.get("style"):
            element.set("style", self._styles.cell(int(element.attrib["style"])))
        else:
            for key in element.attrib:
                if str(key).lower().endswith("dxfid"):
                    element.set(key, self._styles.conditional(int(element.attrib[key])))

    def _make_inline(self, cell: Element) -> None:
        """Put the text of a shared string into its cell."""
        text = deepcopy(self._strings[int(cell.findtext(main("v")) or "")])
        text.tag = main("is")
        for child in list(cell):
            cell.remove(child)
        cell.set("t", "inlineStr")
        cell.append(text)

    def _fit_table(self, table: Element) -> None:
        self._table_id += 1
        name = required(table, "displayName")
        while name.casefold() in self._table_names:
            name += "_"
        self._table_names.add(name.casefold())
        table.set("id", str(self._table_id))
        table.set("displayName", name)
        table.set("name", name)


def _set_code_name(sheet: Element, code_name: str) -> None:
    properties = sheet.find(main("sheetPr"))
    if properties is None:
        properties = etree.Element(main("sheetPr"))
        sheet.insert(0, properties)
    properties.set("codeName", code_name)
