"""Titles of columns as people write them: other case, no accents, no Greek letter, a unit in brackets."""

from __future__ import annotations

import re
import unicodedata
from functools import lru_cache
from typing import NamedTuple

from heatledger.inputs.cells import Cell
from heatledger.inputs.columns import Column, SheetRow
from heatledger.inputs.units import is_unit_of, unit_meant
from heatledger.inputs.wording import folded

__all__ = ["Title", "column_titles", "read_title", "title_of"]

_LONGEST = 80
"""Letters of the longest text that may be a title; longer ones are notes."""
_IN_BRACKETS = re.compile(r"(.+?)\s*[(\[](.+)[)\]]\W*")
_SYMBOLS = re.compile(r"[ψχ]|\b(?:psi|chi)\b")


class Title(NamedTuple):
    """What is left of a title."""

    key: str
    unit: str = ""
    """The unit that stands in it, as the sheets write units."""

    def fits(self, column: Column) -> bool:
        """Whether the unit is that of the column, or none is given."""
        return not self.unit or is_unit_of(self.unit, column) or self.unit == (column.unit or "-")


@lru_cache(maxsize=20_000)
def read_title(text: str) -> Title:
    """The form in which titles are compared, and the unit in it.

    >>> read_title("Linear transmittance ψ") == read_title("LINEAR-TRANSMITTANCE:")
    True
    >>> read_title("Area (m2)"), read_title("Area, m²")
    (Title(key='area', unit='m²'), Title(key='area', unit='m²'))
    """
    bare = folded(text.replace("_", " "))
    if len(bare) > _LONGEST:
        return Title("")
    match = _IN_BRACKETS.fullmatch(bare)
    words, _, last = bare.rpartition(" ")
    behind = (words, last) if len(last) > 1 or not last.isalpha() else ("", "")  # Horizon W is no power
    for title, unit in ((match[1], match[2]) if match else ("", ""), behind):
        if title and unit_meant(unit):
            return Title(_key(title), unit_meant(unit))
    return Title(_key(bare))


def column_titles(model: type[SheetRow]) -> dict[str, str]:
    """Fields of a sheet by the form in which titles are compared."""
    return {read_title(column.title).key: field for field, column in model.columns().items()}


def _key(title: str) -> str:
    letters = unicodedata.normalize("NFD", _SYMBOLS.sub("", title))
    return "".join(letter for letter in letters if letter.isalnum())


def title_of(cell: Cell) -> Title:
    """The title a cell may hold."""
    return read_title(cell.value) if isinstance(cell.value, str) else Title("")
