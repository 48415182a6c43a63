"""Names across sheets: each once, and each reference to a row that exists."""

from __future__ import annotations

from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass, field

from heatledger.errors import Problem
from heatledger.inputs.checking import meant_word, placed_row, problem_at
from heatledger.inputs.columns import Column, SheetRow
from heatledger.inputs.prefilled import shipped_materials
from heatledger.inputs.rows import AIR_LAYERS, SHEETS, MaterialRow
from heatledger.inputs.tables import Record
from heatledger.inputs.wording import did_you_mean, folded, typed_name
from heatledger.inputs.words import IN_THE_GROUND, NEIGHBOUR, OTHER_WORDS, OUTDOORS

__all__ = ["Typed", "check_names"]


@dataclass(frozen=True)
class Typed:
    """What stands in the sheets, right or at fault, so that one fault is told once.

    Parameters
    ----------
    records : mapping of str to sequence of Record
        By sheet name.
    unreadable : frozenset of str
        Sheets that are absent although required, or lack a required column.
    absent : frozenset of str
        Sheets that the workbook does not hold.
    """

    records: Mapping[str, Sequence[Record]] = field(default_factory=dict)
    unreadable: frozenset[str] = frozenset()
    absent: frozenset[str] = frozenset()

    def words(self, sheet: str, name: str) -> list[str]:
        """Texts of a column."""
        found = (record.cells.get(name) for record in self.records.get(sheet, ()))
        return [typed_name(cell) for cell in found if cell is not None]


def check_names(typed: Typed) -> Iterator[Problem]:
    """Names that stand twice, and references that resolve to nothing."""
    nowhere: dict[str, Problem] = {}
    for model in SHEETS:
        records = typed.records.get(model.sheet, ())
        if model.unique:
            yield from _duplicates(model, records)
        for name, column in model.columns().items():
            if column.kind == "name" and column.names_from not in typed.unreadable:
                for problem in _references(model, name, column, typed):
                    if column.names_from in typed.absent:
                        nowhere.setdefault(column.names_from, _no_sheet(column.names_from, problem))
                    else:
                        yield problem
    yield from nowhere.values()


def _no_sheet(sheet: str, first: Problem) -> Problem:
    """One problem for all names that would stand on a sheet that is absent."""
    expected = f"a sheet named {sheet}, which {first.sheet}!{first.cell} refers to"
    return Problem("no such sheet", expected, "Copy it from a fresh template.", sheet=sheet)


def _duplicates(model: type[SheetRow], records: Sequence[Record]) -> Iterator[Problem]:
    seen: dict[str, Record] = {}
    for record in records:
        name = _named(record, model.key())
        first = seen.setdefault(folded(name), record) if name else record
        if first is not record:
            found = f"'{name}' a second time, first in {placed_row(model, first).cell()}"
            fix = "Rename one of the two rows."
            yield problem_at(placed_row(model, record), model.key(), found, "each name once", fix)


def _references(model: type[SheetRow], name: str, column: Column, typed: Typed) -> Iterator[Problem]:
    """Unknown names; where a name of the other sheet is at fault, only those that resemble a known one."""
    target = next(sheet for sheet in SHEETS if sheet.sheet == column.names_from)
    names = [_named(record, target.key()) for record in typed.records.get(target.sheet, ())]
    known = [*column.choices, *filter(None, names)]
    allowed = {folded(word) for word in known}
    for record in typed.records.get(model.sheet, ()):
        word = meant_word(_named(record, name), column.choices)
        if not word or folded(word) in allowed:
            continue
        if target is MaterialRow and folded(word) in shipped_materials():
            continue
        found, row = f"'{word}'", placed_row(model, record)
        if meant_word(word, AIR_LAYERS) in AIR_LAYERS:
            fix = f"Choose the air layer as Material, and what bridges it as {column.title}."
            yield problem_at(row, name, found, "a material", fix)
            continue
        likely = _likely(word, column, known)
        if likely or all(names):
            fix = likely or f"Add '{word}' to sheet {column.names_from}, or choose from the list of the cell."
            yield problem_at(row, name, found, column.expected, fix)


def _likely(word: str, column: Column, known: Sequence[str]) -> str:
    """The mend for a name that is no name but a word of ours, or that resembles a known one."""
    if folded(word) in IN_THE_GROUND and OUTDOORS in column.choices:
        return "Move it to sheet Ground floors, which also takes the walls of a basement."
    if folded(word) in {OUTDOORS, NEIGHBOUR}:
        return "Choose from the list of the cell."
    for fixed in column.choices:
        if folded(word) in OTHER_WORDS.get(fixed, ()):
            return f"Did you mean '{fixed}'?"
    shipped = [row.name for row in shipped_materials().values()] if column.names_from == MaterialRow.sheet else []
    return did_you_mean(word, known) or did_you_mean(word, shipped, 0.75)


def _named(record: Record, name: str) -> str:
    """Name in a cell; empty if the cell holds none, which is a problem of its own."""
    cell = record.cells.get(name)
    return typed_name(cell) if cell is not None and cell.kind in {"text", "number"} else ""
