"""Hears the large parts of a workbook element by element; memory does not grow with their size."""

from __future__ import annotations

import re
from collections.abc import Callable, Mapping
from dataclasses import dataclass
from typing import TypeAlias
from xml.parsers import expat

from heatledger.workbook.package import PartTooLargeError, main

__all__ = ["Budget", "StoredCell", "column_number", "hear_cells", "hear_strings", "unescaped"]

_DATA, _ROW, _CELL, _VALUE, _FORMULA, _INLINE, _STRING, _TEXT, _AID, _MERGED = (
    main(tag)[1:] for tag in ("sheetData", "row", "c", "v", "f", "is", "si", "t", "rPh", "mergeCell")
)
"""Tags as the parser spells them: ``namespace}tag``. ``rPh`` holds reading aids of East Asian text."""
_PIECE = 1_000_000
"""Length of what the parser is given at a time. [bytes]"""
_ANY_ROW = re.compile(rb"<row[\s/>]")
_EMPTY_ROW = re.compile(rb'<row r="\d+"[^<>]*/>')
_LONGEST_TAG = 8_000_000
_MOST_MERGED = 1000
_ESCAPED = re.compile("_x([0-9A-Fa-f]{4})_")


@dataclass
class Budget:
    """What may still be heard of all sheets, or of the shared strings.

    Parameters
    ----------
    elements : int
        Rows, cells and what stands in them, empty ones too; a million formatted rows are a common slip.
    letters : int
        Letters of all texts.
    """

    elements: int = 2_500_000
    letters: int = 50_000_000


StoredCell: TypeAlias = tuple[Mapping[str, str], str | None, bool]
"""Attributes of a cell, its stored text and whether it has a formula."""


def hear_cells(data: bytes, budget: Budget, keep: Callable[[int, int, StoredCell], None]) -> list[str]:
    """Give row, column and content of every cell of a worksheet to ``keep``; the ranges of merged cells."""
    cells = _Cells(budget, keep)
    cells.hear(_without_empty_rows(data))
    return cells.merged


def hear_strings(data: bytes, budget: Budget) -> list[str]:
    """Texts of the shared strings: their runs joined, without reading aids."""
    strings = _Strings(budget)
    strings.hear(data)
    return strings.found


def _without_empty_rows(data: bytes) -> bytes:
    """The part without rows that only have a format: a million of them would take seconds.

    >>> _without_empty_rows(b'<row r="1" ht="15"/><row r="2"><c/></row>' * 30_000).count(b"<row")
    30000
    >>> _without_empty_rows(b'<row r="1"/><row><c/></row>' * 40_000).count(b"<row")  # numbered by what stands before
    80000
    """
    numbered = data.count(b'<row r="') == len(_ANY_ROW.findall(data))
    if len(data) < _PIECE or not numbered or b"<![CDATA[" in data:
        return data
    return _EMPTY_ROW.sub(b"", data)


class _Hearer:
    """Follows the texts of string items; what else there is, subclasses hear."""

    def __init__(self, budget: Budget) -> None:
        self._budget = budget
        self._words: list[str] | None = None
        self._runs: list[str] = []
        self._aids = 0
        self._parser = expat.ParserCreate(namespace_separator="}")
        self._parser.buffer_text = True
        self._parser.StartDoctypeDeclHandler = _refuse
        self._parser.StartElementHandler = self._counted
        self._parser.EndElementHandler = self.end
        self._parser.CharacterDataHandler = self._text

    def hear(self, data: bytes) -> None:
        """Follow the whole part, piece by piece: the parser's time grows with the square of one endless tag."""
        view = memoryview(data)
        for start in range(0, len(view), _PIECE):
            self._parser.Parse(view[start : start + _PIECE], False)
            if start - self._parser.CurrentByteIndex > _LONGEST_TAG:
                raise PartTooLargeError("a tag of more than 8 MB")
        self._parser.Parse(b"", True)

    def _counted(self, tag: str, attributes: dict[str, str]) -> None:
        self._budget.elements -= 1
        if self._budget.elements < 0:
            raise PartTooLargeError("more than 2,500,000 rows, cells and texts, empty ones included")
        self.start(tag, attributes)

    def start(self, tag: str, attributes: dict[str, str]) -> None:
        if tag == _TEXT and not self._aids:
            self._words = []
        elif tag == _AID:
            self._aids += 1

    def end(self, tag: str) -> None:
        if tag == _TEXT and not self._aids:
            self._runs.append(self._heard())
        elif tag == _AID:
            self._aids -= 1

    def _text(self, words: str) -> None:
        if self._words is None:
            return
        self._budget.letters -= len(words)
        if self._budget.letters < 0:
            raise PartTooLargeError("more than 50,000,000 letters")
        self._words.append(words)

    def _heard(self) -> str:
        words, self._words = self._words, None
        return "".join(words or ())

    def _string(self) -> str:
        runs, self._runs = self._runs, []
        return unescaped("".join(runs))


class _Strings(_Hearer):
    def __init__(self, budget: Budget) -> None:
        super().__init__(budget)
        self.found: list[str] = []

    def end(self, tag: str) -> None:
        super().end(tag)
        if tag == _STRING:
            self.found.append(self._string())


class _Cells(_Hearer):
    def __init__(self, budget: Budget, keep: Callable[[int, int, StoredCell], None]) -> None:
        super().__init__(budget)
        self._keep = keep
        self._row = self._column = 0
        self._attributes: dict[str, str] = {}
        self._stored: str | None = None
        self._formula = False
        self.merged: list[str] = []

    def start(self, tag: str, attributes: dict[str, str]) -> None:
        if tag == _CELL:
            name = attributes.get("r")
            self._column = column_number(name) if name else self._column + 1
            self._attributes, self._stored, self._formula = attributes, None, False
        elif tag == _VALUE:
            self._words = []
        elif tag == _ROW:
            self._start_row(attributes.get("r"))
        elif tag == _FORMULA:
            self._formula = True
        else:
            super().start(tag, attributes)

    def _start_row(self, number: str | None) -> None:
        self._row = int(number or self._row + 1)
        if self._row < 1:
            raise ValueError("a row before the first")
        self._column = 0

    def end(self, tag: str) -> None:
        if tag == _CELL:
            self._keep(self._row, self._column, (self._attributes, self._stored, self._formula))
        elif tag == _VALUE:
            self._stored = self._heard()
        elif tag == _INLINE:
            self._stored = self._string()
        elif tag == _DATA:
            self._stop()
        else:
            super().end(tag)

    def _stop(self) -> None:
        """Behind the rows only merged cells are of interest, but all has to be sound."""
        self._parser.StartElementHandler = self._behind
        self._parser.EndElementHandler = None
        self._parser.CharacterDataHandler = None

    def _behind(self, tag: str, attributes: dict[str, str]) -> None:
        if tag == _MERGED and len(self.merged) < _MOST_MERGED:
            self.merged.append(attributes.get("ref", ""))


def column_number(name: str) -> int:
    """Number of the column that a cell name begins with, counted from 1.

    >>> column_number("AB12")
    28
    """
    column = 0
    for letter in name:
        if not "A" <= letter <= "Z":
            break
        column = column * 26 + ord(letter) - 64
    if not column:
        raise ValueError("a cell name without letters")
    return column


def _refuse(*_declaration: object) -> None:
    raise ValueError("a document type")


def unescaped(text: str) -> str:
    r"""Text without the escapes of the file format; half a pair of escapes has no letter.

    >>> unescaped("a_x000D_b"), unescaped("_xD83D__xDE00_"), unescaped("_xD800_")
    ('a\rb', '😀', '�')
    """
    if "_x" not in text:
        return text
    plain = _ESCAPED.sub(lambda match: chr(int(match[1], 16)), text)
    return plain.encode("utf-16-le", "surrogatepass").decode("utf-16-le", "replace")
