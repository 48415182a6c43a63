"""Cell styles of new sheets, appended to those of the workbook; no old index ever moves."""

from __future__ import annotations

from collections.abc import Hashable
from copy import deepcopy

from lxml import etree

from heatledger.workbook.package import MAIN, Element, PartTooLargeError, main, parse, required

__all__ = ["EMPTY_STYLES", "StyleMerger", "section"]

EMPTY_STYLES = f"""<styleSheet xmlns="{MAIN}"><fonts count="1">\
<font><sz val="11"/><name val="Calibri"/></font></fonts>\
<fills count="2"><fill><patternFill patternType="none"/></fill>\
<fill><patternFill patternType="gray125"/></fill></fills>\
<borders count="1"><border/></borders>\
<cellStyleXfs count="1"><xf numFmtId="0" fontId="0" fillId="0" borderId="0"/></cellStyleXfs>\
<cellXfs count="1"><xf numFmtId="0" fontId="0" fillId="0" borderId="0" xfId="0"/></cellXfs>\
<cellStyles count="1"><cellStyle name="Normal" xfId="0" builtinId="0"/></cellStyles></styleSheet>""".encode()
"""The least a styles part holds; fills 0 and 1 are reserved (ECMA-376 Part 1, 18.8.21)."""

_ORDER = (
    *("numFmts", "fonts", "fills", "borders", "cellStyleXfs", "cellXfs"),
    *("cellStyles", "dxfs", "tableStyles", "colors", "extLst"),
)
_MOST_STYLES = 65_490
"""Excel takes no more cell styles (its published limits); comparing more takes long."""
_FIRST_OWN_FORMAT = 164
"""Lower numbers are built-in formats."""


def section(root: Element, tag: str, order: tuple[str, ...]) -> Element:
    """A child by its tag, made in the place that the schema's order gives it."""
    found = root.find(main(tag))
    if found is not None:
        return found
    earlier = {main(name) for name in order[: order.index(tag)]}
    place = max((index + 1 for index, child in enumerate(root) if child.tag in earlier), default=0)
    found = etree.Element(main(tag))
    root.insert(place, found)
    return found


class StyleMerger:
    """Finds or appends donor styles in the styles of a workbook.

    Parameters
    ----------
    styles, donor : Element
        Roots of both style parts; ``styles`` grows.
    """

    def __init__(self, styles: Element, donor: Element) -> None:
        self._styles = styles
        self._donor = donor
        self._known: dict[str, dict[Hashable, int]] = {}
        self._cells: dict[int, str] = {}
        self._codes = {item.get("numFmtId"): item.attrib["formatCode"] for item in donor.iter(main("numFmt"))}
        for basic in parse(EMPTY_STYLES):
            tag = etree.QName(basic).localname
            if not len(section(styles, tag, _ORDER)):
                styles.replace(section(styles, tag, _ORDER), basic)

    def cell(self, index: int) -> str:
        """Index in the workbook of a donor's cell style."""
        if index not in self._cells:
            style = deepcopy(self._donor_item("cellXfs", index))
            for part, tag in (("font", "fonts"), ("fill", "fills"), ("border", "borders")):
                old = self._donor_item(tag, int(style.get(f"{part}Id", "0")))
                style.set(f"{part}Id", str(self._append(tag, old)))
                style.set(f"apply{part.capitalize()}", "1")
            style.set("numFmtId", self._number_format(style.get("numFmtId", "0")))
            style.set("applyNumberFormat", "1")
            style.set("xfId", "0")
            self._cells[index] = str(self._append("cellXfs", style))
        return self._cells[index]

    def conditional(self, index: int) -> str:
        """Index in the workbook of a donor's conditional or table style."""
        return str(self._append("dxfs", self._donor_item("dxfs", index)))

    def _donor_item(self, tag: str, index: int) -> Element:
        return section(self._donor, tag, _ORDER)[index]

    def _append(self, tag: str, item: Element) -> int:
        items = section(self._styles, tag, _ORDER)
        if tag not in self._known:
            _check_number(items, tag)
            self._known[tag] = {}
            for index, old in enumerate(items):
                self._known[tag].setdefault(_canonical(old), index)
        new = deepcopy(item)
        new.tail = None
        known = self._known[tag]
        index = known.setdefault(_canonical(new), len(items))
        if index == len(items):
            items.append(new)
            items.set("count", str(len(items)))
            _check_number(items, tag)
        return index

    def _number_format(self, number: str) -> str:
        code = self._codes.get(number)
        if code is None:
            return number
        formats = section(self._styles, "numFmts", _ORDER)
        for item in formats:
            if item.get("formatCode") == code:
                return required(item, "numFmtId")
        taken = [int(required(item, "numFmtId")) for item in formats]
        new = str(max([_FIRST_OWN_FORMAT - 1, *taken]) + 1)
        etree.SubElement(formats, main("numFmt"), numFmtId=new, formatCode=code)
        formats.set("count", str(len(formats)))
        return new


def _check_number(items: Element, tag: str) -> None:
    if len(items) > _MOST_STYLES:
        raise PartTooLargeError(f"more than {_MOST_STYLES:,} {tag}")


def _canonical(item: Element) -> Hashable:
    """What equal styles share, whatever prefixes and line breaks their files spell them with."""
    children = tuple(_canonical(child) for child in item)
    return item.tag, frozenset(item.attrib.items()), (item.text or "").strip(), children
