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
from heatledger.inputs.wording import folded, nearest, typed_name

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
    """

    records: Mapping[str, Sequence[Record]] = field(default_factory=dict)
    unreadable: frozenset[str] = frozenset()

    def words(self, sheet: str, name: str) -> list[str]:
        """Texts of a column."""
        found = (record.cells.get(name) for record in self.records.get(sheet, ()))
        return [typed_name(cell) for cell in found if cell is not None]


def check_names(typed: Typed) -> Iterator[Problem]:
    """Names that stand twice, and references that resolve to nothing."""
    for model in SHEETS:
        records = typed.records.get(model.sheet, ())
        if model.unique:
            yield from _duplicates(model, records)
        for name, column in model.columns().items():
            if column.kind == "name" and column.names_from not in typed.unreadable:
                yield from _references(model, name, column, typed)


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
        if meant_word(word, AIR_LAYERS) in AIR_LAYERS:
            fix = f"Choose the air layer as Material, and what bridges it as {column.title}."
            yield problem_at(placed_row(model, record), name, f"'{word}'", "a material", fix)
            continue
        close = nearest(word, known) or (_shipped_like(word) if target is MaterialRow else "")
        if close or all(names):
            add = f"Add '{word}' to sheet {column.names_from}, or choose from the list of the cell."
            fix = f"Did you mean '{close}'?" if close else add
            yield problem_at(placed_row(model, record), name, f"'{word}'", column.expected, fix)


def _shipped_like(word: str) -> str:
    """The shipped material that resembles a word."""
    return nearest(word, (row.name for row in shipped_materials().values()), 0.75)


def _named(record: Record, name: str) -> str:
    """Name in a cell; empty if the cell holds none, which is a problem of its own."""
    cell = record.cells.get(name)
    return typed_name(cell) if cell is not None and cell.kind in {"text", "number"} else ""
