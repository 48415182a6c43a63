"""What a cell can hold, free of any file format.

The workbook room reads files into these; this room turns them into checked rows.
"""

from __future__ import annotations

from collections.abc import Mapping
from typing import Literal, NamedTuple, TypeAlias

__all__ = ["Cell", "CellKind", "Cells", "column_letters", "reference"]

CellKind: TypeAlias = Literal["number", "text", "boolean", "date", "error", "uncalculated", "merged"]
"""Kind of a stored value; ``uncalculated`` is a formula without one, ``merged`` a cell joined to one above it."""


class Cell(NamedTuple):
    """A stored value and its kind; empty cells do not occur."""

    value: float | str | bool | None
    kind: CellKind


Cells: TypeAlias = Mapping[tuple[int, int], Cell]
"""The filled cells of a sheet by (row, column), both counted from 1."""


def column_letters(column: int) -> str:
    """Letters of a column counted from 1.

    >>> column_letters(1), column_letters(28)
    ('A', 'AB')
    """
    letters = ""
    while column:
        column, place = divmod(column - 1, 26)
        letters = chr(65 + place) + letters
    return letters


def reference(row: int, column: int) -> str:
    """Cell name, e.g. ``E8``.

    >>> reference(8, 5)
    'E8'
    """
    return f"{column_letters(column)}{row}"
