"""Problems as a person reads them: sheet by sheet, the worst first, repeats merged."""

from __future__ import annotations

import re
from collections.abc import Iterable, Iterator, Sequence
from dataclasses import dataclass, replace
from itertools import groupby

from heatledger.errors import Problem

__all__ = ["Listed", "listed", "sheets_of"]

_VALUE = re.compile(r"'[^']*'|[-+−]?\d[\d.,]*")
"""What differs between problems that are alike: quoted texts and numbers."""


@dataclass(frozen=True)
class Listed:
    """One problem, or several alike in one column."""

    problem: Problem
    """The first of them."""
    cells: tuple[str, ...]
    alike: bool
    """Whether what was found is the same in all of them."""

    @property
    def count(self) -> int:
        """How many problems it stands for."""
        return max(len(self.cells), 1)

    @property
    def range(self) -> str:
        """Their cells, e.g. ``E8:E40``."""
        return ", ".join(_runs(self.cells)) if len(self.cells) > 1 else self.problem.cell

    @property
    def merged(self) -> Problem:
        """One problem that speaks of all of them."""
        more = "" if self.alike or self.count == 1 else f" and {self.count - 1} more like it"
        return replace(self.problem, cell=self.range, found=f"{self.problem.found}{more}")


def listed(problems: Iterable[Problem]) -> list[Listed]:
    """Merge problems that are alike and put the worst first.

    Parameters
    ----------
    problems : iterable of Problem
        In the order of the workbook.

    Returns
    -------
    list of Listed
        Grouped by sheet; a sheet that cannot be read at all before one with faulty cells; in a sheet a missing
        column before a faulty cell.
    """
    groups: dict[tuple[str, ...], list[Problem]] = {}
    for number, problem in enumerate(problems):
        key = _likeness(problem) if problem.cell else (str(number),)
        groups.setdefault(key, []).append(problem)
    merged = [_merge(group) for group in groups.values()]
    sheets = list(dict.fromkeys(one.problem.sheet for one in merged))
    worst = {sheet: min(_severity(one.problem) for one in merged if one.problem.sheet == sheet) for sheet in sheets}

    def order(one: Listed) -> tuple[int, int, int]:
        sheet = one.problem.sheet
        return worst[sheet], sheets.index(sheet), _severity(one.problem)

    return sorted(merged, key=order)


def sheets_of(found: Sequence[Listed]) -> Iterator[tuple[str, list[Listed]]]:
    """The list, sheet by sheet; the name is empty for problems of a file."""
    for sheet, group in groupby(found, key=lambda one: one.problem.sheet):
        yield sheet, list(group)


def _severity(problem: Problem) -> int:
    """0 for a file or a sheet, 1 for a column, 2 for a cell."""
    if problem.cell:
        return 2
    return 1 if problem.column else 0


def _likeness(problem: Problem) -> tuple[str, ...]:
    """What alike problems share."""
    found, fix = (_VALUE.sub("#", text) for text in (problem.found, problem.fix))
    return problem.file, problem.sheet, problem.column, problem.expected, found, fix


def _merge(group: list[Problem]) -> Listed:
    cells = tuple(problem.cell for problem in group if problem.cell)
    return Listed(group[0], cells, len({(problem.found, problem.fix) for problem in group}) == 1)


def _runs(cells: Sequence[str]) -> Iterator[str]:
    """Cells of a column as ranges.

    >>> list(_runs(["E8", "E9", "E10", "E12"]))
    ['E8:E10', 'E12']
    """
    start = previous = cells[0]
    for cell in [*cells[1:], ""]:
        if cell and _follows(previous, cell):
            previous = cell
            continue
        yield start if start == previous else f"{start}:{previous}"
        start = previous = cell


def _follows(cell: str, other: str) -> bool:
    (column, row), (other_column, other_row) = _split(cell), _split(other)
    return column == other_column and other_row == row + 1


def _split(cell: str) -> tuple[str, int]:
    letters = cell.rstrip("0123456789")
    return letters, int(cell[len(letters) :] or 0)
