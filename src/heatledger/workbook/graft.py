"""Puts freshly built result sheets into a workbook and leaves all its other parts as they are.

Only the content types, the workbook part, its relations and the styles change.
Sheets of ours carry a hidden workbook-level name and are replaced in their place.
"""

from __future__ import annotations

import os
import posixpath
import re
from collections.abc import Collection, Iterable
from dataclasses import dataclass, replace
from functools import partial
from pathlib import Path
from xml.sax.saxutils import unescape

from heatledger.errors import InputError, Problem
from heatledger.workbook.donor import DonorCopier
from heatledger.workbook.files import lock_notes, write_whole
from heatledger.workbook.gate import read_package, readable
from heatledger.workbook.index import Index
from heatledger.workbook.package import Package, SheetEntry, dump, main
from heatledger.workbook.readback import Judged, read_back
from heatledger.workbook.references import marker_name, rename_sheets, sheets_in
from heatledger.workbook.styles import EMPTY_STYLES, StyleMerger

__all__ = ["GraftReport", "graft"]

_CHAINED_SHEET = re.compile(rb"""\si=["'](\d+)""")
"""Number of a sheet in the list of formulas, which may hold a million entries."""
_FORMULA = re.compile(rb"<(?:x:)?f(?:\s[^<>]*)?>([^<]+)<")
"""A formula in a cell; those of sparklines, charts and links have other tags and need no working out."""
_ENDINGS = {
    "vnd.openxmlformats-officedocument.spreadsheetml.sheet.main": (".xlsx", "a workbook without macros"),
    "vnd.ms-excel.sheet.macroEnabled.main": (".xlsm", "a workbook with macros"),
}
"""Ending that Excel expects of a workbook, by its content type."""
_STYLES_TYPE = "application/vnd.openxmlformats-officedocument.spreadsheetml.styles+xml"


@dataclass(frozen=True)
class GraftReport:
    """What was done to the workbook.

    Parameters
    ----------
    titles : dict of str to str
        Present name of each result sheet, by the name it was built with.
    added, replaced, dropped : tuple of str
        Present names of new sheets, of those written over, and of our earlier ones that went.
    notes : tuple of str
        Sentences for the user.
    """

    titles: dict[str, str]
    added: tuple[str, ...]
    replaced: tuple[str, ...]
    dropped: tuple[str, ...]
    notes: tuple[str, ...]


def graft(original: Path, donor: bytes, target: Path) -> GraftReport:
    """Write a workbook with new result sheets; the same input gives the same bytes.

    A sheet of ours keeps its place and the name that the user may have given it.
    A new sheet whose name a sheet of the user has gets another name.

    Parameters
    ----------
    original : Path
        The user's workbook; it is only read.
    donor : bytes
        A workbook that holds the result sheets and nothing else.
    target : Path
        File to write, often the original itself.

    Raises
    ------
    InputError
        If the original is no sound workbook, or the target cannot be written or
        has the name of another kind of file; the target is then as it was.
    """
    package = read_package(original)
    _check_ending(package, original, target)
    results = Package.from_bytes(donor)
    with readable(original):
        report = _merge(package, results)
    notes = report.notes + lock_notes(target)
    judged = Judged(target.name, frozenset(report.titles.values()), package)
    write_whole(target, package.to_bytes(), partial(read_back, original=original, judged=judged))
    return replace(report, notes=notes)


def _check_ending(package: Package, original: Path, target: Path) -> None:
    """Excel opens no copy whose name promises another kind of workbook."""
    kind = package.content_types()[package.workbook].removesuffix("+xml").rpartition("/")[2]
    ending, words = _ENDINGS.get(kind, ("", ""))
    itself = os.path.exists(target) and os.path.samefile(original, target)
    if ending and target.suffix.lower() != ending and not (itself or os.path.isdir(target)):
        found = f"the ending '{target.suffix}'" if target.suffix else "a name without an ending"
        fix = f"Give the name {target.with_suffix(ending).name}."
        raise InputError([Problem(found, f"the ending {ending} of {words}", fix, file=target.name)])


def _merge(package: Package, donor: Package) -> GraftReport:
    index = Index(package)
    markers = _markers(donor)
    owned = index.owned()
    kept = {markers[marker]: entry for marker, entry in owned.items() if marker in markers}
    dropped = [entry for marker, entry in owned.items() if marker not in markers]
    code_names = {title: _code_name(package, entry) for title, entry in kept.items()}
    _forget(package, index, owned.values())
    for entry in dropped:
        index.remove(entry)
    index.clear_names(entry.title for entry in kept.values())
    titles = _titles(donor, index, kept)
    _copy_sheets(package, donor, index, titles, kept=kept, code_names=code_names)
    _copy_names(donor, index, titles)
    index.store()
    return GraftReport(
        titles,
        added=tuple(new for old, new in titles.items() if old not in kept),
        replaced=tuple(new for old, new in titles.items() if old in kept),
        dropped=tuple(entry.title for entry in dropped),
        notes=(*_notes(index, titles, kept), *_formula_notes(package, titles, kept)),
    )


def _markers(donor: Package) -> dict[str, str]:
    """Title of each result sheet by its marker."""
    titles = [entry.title for entry in donor.sheets()]
    markers = {marker_name(title): title for title in titles}
    if len(markers) < len(titles):
        raise RuntimeError("two result sheets would share a marker")
    return markers


def _code_name(package: Package, entry: SheetEntry) -> str | None:
    """Name of the macro module of a sheet, which has to stay with its place."""
    properties = package.xml(entry.part).find(main("sheetPr"))
    return None if properties is None else properties.get("codeName")


def _forget(package: Package, index: Index, entries: Collection[SheetEntry]) -> None:
    """Remove our earlier sheets with all that only they use."""
    sheets = {entry.part for entry in entries}
    if not sheets:
        return
    package.remove(_reachable(package, sheets) - _reachable(package, {""}, barred=sheets))
    chain = package.related(package.workbook, "calcChain")
    ids = {(entry.element.get("sheetId") or "").encode() for entry in entries}
    if chain in package.parts and not ids.isdisjoint(_CHAINED_SHEET.findall(package.parts[chain])):
        index.unrelate("calcChain")  # a cell listed there has to exist; the list is rebuilt on opening
        package.remove({chain})


def _reachable(package: Package, start: Iterable[str], barred: Collection[str] = ()) -> set[str]:
    found: set[str] = set()
    waiting = list(start)
    while waiting:
        part = waiting.pop()
        if part not in found and part not in barred:
            found.add(part)
            waiting += [item.target for item in package.relations(part) if not item.external]
    return found


def _titles(donor: Package, index: Index, kept: dict[str, SheetEntry]) -> dict[str, str]:
    titles: dict[str, str] = {}
    for entry in donor.sheets():
        old = entry.title
        titles[old] = kept[old].title if old in kept else index.free_title(old, titles.values())
    return titles


def _copy_sheets(
    package: Package,
    donor: Package,
    index: Index,
    titles: dict[str, str],
    *,
    kept: dict[str, SheetEntry],
    code_names: dict[str, str | None],
) -> None:
    styles_part = _styles_part(package, index)
    styles = package.xml(styles_part)
    merger = StyleMerger(styles, donor.xml(donor.related(donor.workbook, "styles") or ""))
    copier = DonorCopier(package, donor, merger, _renames(titles), index.table_names())
    for entry in donor.sheets():
        part = copier.sheet(entry.part, code_names.get(entry.title))
        if entry.title in kept:
            index.replace(kept[entry.title], part)
        else:
            index.append(titles[entry.title], part, entry.element.get("state"))
    package.parts[styles_part] = dump(styles)


def _styles_part(package: Package, index: Index) -> str:
    part = package.related(package.workbook, "styles")
    if part is None:
        part = posixpath.join(posixpath.dirname(package.workbook), "styles.xml")
        part = package.free_name(part) if package.name(part) in package.parts else part
        package.add(part, EMPTY_STYLES, _STYLES_TYPE)
        index.relate("styles", part)
    return part


def _renames(titles: dict[str, str]) -> dict[str, str]:
    return {old.casefold(): new for old, new in titles.items() if old != new}


def _copy_names(donor: Package, index: Index, titles: dict[str, str]) -> None:
    """Carry over print titles and the like, then mark the sheets."""
    places = list(titles.values())
    for name in donor.xml(donor.workbook).iterfind(f"{main('definedNames')}/{main('definedName')}"):
        place = name.get("localSheetId")
        if place is None:
            raise RuntimeError(f"result sheets hold a name of the whole workbook: {name.get('name')}")
        index.add_name(name, places[int(place)], rename_sheets(name.text or "", _renames(titles)))
    for old, new in titles.items():
        index.mark(old, new)


def _notes(index: Index, titles: dict[str, str], kept: dict[str, SheetEntry]) -> Iterable[str]:
    for old, new in titles.items():
        if old not in kept and old != new:
            yield f"A sheet of yours is called {old}; the results are on the sheet {new}."
    if index.structure_locked:
        yield "The list of sheets is locked in this workbook; the result sheets were written all the same."


def _formula_notes(package: Package, titles: dict[str, str], kept: dict[str, SheetEntry]) -> Iterable[str]:
    """A formula of the user keeps its stored value, since its sheet stays as it is."""
    ours = {titles[old].casefold() for old in kept}
    users = [entry for entry in package.sheets() if entry.kind == "worksheet" and entry.title not in titles.values()]
    found = [entry.title for entry in users if _uses(package.parts[entry.part], ours)]
    if found:
        yield (
            f"Formulas on {', '.join(found)} use result sheets: Excel works them out anew when it opens the file, "
            "LibreOffice when you press Ctrl+Shift+F9."
        )


def _uses(sheet: bytes, titles: set[str]) -> bool:
    """Whether a formula in a cell of a sheet uses one of these sheets."""
    formulas = b"\n".join(match[1] for match in _FORMULA.finditer(sheet) if b"!" in match[1])
    plain = unescape(formulas.decode(errors="replace"), {"&apos;": "'", "&quot;": '"'})
    folded = plain.casefold()
    likely = any(title.replace("'", "''") in folded for title in titles)  # quicker than reading thousands of formulas
    return likely and not titles.isdisjoint(sheets_in(plain))
