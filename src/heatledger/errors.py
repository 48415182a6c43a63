"""What a user can cause and repair: problems that build their own sentence.

A problem is data. It is collected with all the others of one run and raised
once, in an :class:`InputError`, before anything is calculated or written.
"""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass

__all__ = ["InputError", "Problem"]


@dataclass(frozen=True)
class Problem:
    """One thing to mend: where it is, what was found, what is expected, how to mend it.

    Parameters
    ----------
    found : str
        What stands there, as the user would describe it, e.g. ``the text '1,2'``.
    expected : str
        What should stand there, e.g. ``a number above 0``.
    fix : str
        One full sentence that tells the way out.
    sheet, cell, column : str, optional
        Sheet name, cell such as ``E8`` and column title with unit, where they apply.
    file : str, optional
        File name, where the problem is a file rather than a cell.

    Examples
    --------
    >>> print(Problem("the text '1,2'", "a number above 0", "Type 1.2 as a number.",
    ...               sheet="Openings", cell="E8", column="Width [m]"))
    Openings!E8  Width [m]: found the text '1,2'; expected a number above 0. Type 1.2 as a number.
    >>> print(Problem("a plain text file", "an .xlsx or .xlsm workbook", "Give the workbook.",
    ...               file="notes.txt"))
    notes.txt: found a plain text file; expected an .xlsx or .xlsm workbook. Give the workbook.
    """

    found: str
    expected: str
    fix: str
    sheet: str = ""
    cell: str = ""
    column: str = ""
    file: str = ""

    @property
    def place(self) -> str:
        """Where the problem stands, as a user reads it."""
        cell = f"{self.sheet}!{self.cell}" if self.sheet and self.cell else self.sheet
        return "  ".join(part for part in (self.file, cell, self.column) if part)

    def __str__(self) -> str:
        return f"{self.place}: found {self.found}; expected {self.expected}. {self.fix}"


class InputError(Exception):
    """Raised once with every problem that was found.

    Parameters
    ----------
    problems : iterable of Problem
        In the order in which a user would mend them.
    """

    def __init__(self, problems: Iterable[Problem]) -> None:
        self.problems: tuple[Problem, ...] = tuple(problems)
        super().__init__("\n".join(str(problem) for problem in self.problems))
