"""Which title of a sheet stands for which field, and what is wrong with the titles."""

from __future__ import annotations

import re
from collections.abc import Callable, Collection, Iterable, Mapping
from dataclasses import dataclass, field

from heatledger.errors import Problem
from heatledger.inputs.cells import Cell
from heatledger.inputs.columns import Column, SheetRow
from heatledger.inputs.titles import column_titles, read_title, title_of
from heatledger.inputs.wording import folded, nearest

__all__ = ["Headings", "find_fields"]

_ALIKE = 0.75
"""Likeness from which a title is taken for a renamed one although its column may be absent."""


@dataclass
class Headings:
    """Where the fields of a sheet stand: their columns, or their rows on a sheet with labels."""

    model: type[SheetRow]
    cell: Callable[[int], str]
    """Name of the cell of a title by its place."""
    positions: dict[str, int] = field(default_factory=dict)
    problems: list[Problem] = field(default_factory=list)
    lost: set[str] = field(default_factory=set)
    """Fields whose title seems to have been changed."""

    @property
    def complete(self) -> bool:
        """Whether every required column was found."""
        return all(name in self.positions for name, column in self.model.columns().items() if column.required)

    def take(self, name: str, place: int, title: Cell) -> None:
        """A title for a field that has none yet."""
        column = self.model.columns()[name]
        if name in self.positions:
            return
        if title_of(title).fits(column):
            self.positions[name] = place
        else:
            self.tell(column, place, f"the title '{title.value}'", f"'{column.title}'", _other_unit(column))
            self.lost.add(name)

    def twice(self, name: str, place: int) -> None:
        """A title that stands already."""
        column = self.model.columns()[name]
        fix = "Rename or delete one of the two."
        self.tell(column, place, f"the title '{column.title}' a second time", "each title once", fix)

    def tell(self, column: Column, place: int, found: str, expected: str, fix: str) -> None:
        """A problem of a title that stands at a place."""
        cell = self.cell(place)
        self.problems.append(Problem(found, expected, fix, self.model.sheet, cell, column.label))

    def miss(self, others: Iterable[Cell]) -> None:
        """Required titles that are absent, and optional ones that seem to have been renamed."""
        words = [" ".join(str(cell.value).split()) for cell in others]
        for name, column in self.model.columns().items():
            close = "" if name in self.positions or name in self.lost else _renamed(column, words)
            if close or (column.required and name not in self.positions and name not in self.lost):
                self.problems.append(_missing(self.model, column, close))
                self.lost.add(name)


def find_fields(
    model: type[SheetRow], titles: Mapping[int, Cell], cell: Callable[[int], str], headings: Collection[int] = ()
) -> Headings:
    """Find every field: by its very title, else by one that only lacks signs or states the unit.

    Parameters
    ----------
    model : type of SheetRow
        The sheet's row model.
    titles : mapping of int to Cell
        What may be a title, by column or row.
    cell : callable
        Name of the cell of a title by its place.
    headings : collection of int
        Places at which a title may stand a second time.
    """
    found, fields = Headings(model, cell), column_titles(model)
    loose: list[tuple[str, int, Cell]] = []
    for place, title in titles.items():
        name = fields.get(title_of(title).key)
        if name is None:
            continue
        if not _is_very(title, model.columns()[name]):
            loose.append((name, place, title))
        elif name not in found.positions:
            found.positions[name] = place
        elif place not in headings:
            found.twice(name, place)
    for name, place, title in loose:
        found.take(name, place, title)
    _take_either(found, titles)
    found.miss(title for title in titles.values() if title_of(title).key not in fields)
    return found


def _take_either(found: Headings, titles: Mapping[int, Cell]) -> None:
    """A title that stands over two fields at once."""
    title, *names = found.model.either
    place = next((place for place, cell in titles.items() if title and title_of(cell) == read_title(title)), None)
    for name in names if place is not None else ():
        found.positions.setdefault(name, place or 0)


def _is_very(title: Cell, column: Column) -> bool:
    """Whether a title is ours without regard to case and to line breaks within it."""
    return " ".join(str(title.value).split()).casefold() == column.title.casefold()


def _other_unit(column: Column) -> str:
    convert = f"Convert the values to {column.unit} and rename" if column.unit.strip("-") else "Rename"
    return f"{convert} the title to '{column.title}'."


def _renamed(column: Column, words: list[str]) -> str:
    """The unknown title that seems to stand for a column: it resembles it, or has all words of a required one."""
    if not column.required:
        return nearest(column.title, words, _ALIKE)
    longer = (word for word in words if re.search(rf"\b{re.escape(folded(column.title))}\b", folded(word)))
    return nearest(column.title, words) or next(longer, "")


def _missing(model: type[SheetRow], column: Column, close: str) -> Problem:
    hint = f"Rename '{close}' to '{column.title}'" if close else "Add it, or copy the titles from a fresh template"
    expected = f"the {'label' if model.labelled else 'column'} {column.title}"
    return Problem(f"no title '{column.title}'", expected, f"{hint}.", sheet=model.sheet, column=column.label)
