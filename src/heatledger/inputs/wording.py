"""The words in which a typed value is given back to the user, and the mend that is offered."""

from __future__ import annotations

import math
import re
import unicodedata
from collections.abc import Iterable, Sequence
from datetime import date
from difflib import SequenceMatcher, get_close_matches
from functools import lru_cache
from typing import cast

from heatledger.inputs.cells import Cell
from heatledger.inputs.columns import COMPASS, Column, plain
from heatledger.inputs.typed_numbers import mend_text
from heatledger.inputs.words import MONTHS, OTHER_WORDS

__all__ = [
    "chosen_word",
    "compass_word",
    "describe",
    "did_you_mean",
    "folded",
    "mend",
    "month_numbers",
    "nearest",
    "typed_name",
]

_MONTHS = tuple(name.casefold() for name in MONTHS)
_MOST_OFFERED = 4
_MISSPELT = 0.75
"""Likeness from which a word is a misspelt one rather than another that holds it."""
_LONGEST = 60
"""Letters of a typed text that a sentence gives back."""


def describe(cell: Cell | None) -> str:
    """What stands in a cell, as the user would say it.

    >>> describe(Cell("1,2", "text")), describe(Cell(True, "boolean")), describe(None)
    ("the text '1,2'", 'the logical value TRUE', 'an empty cell')
    """
    if cell is None:
        return "an empty cell"
    match cell.kind:
        case "number":
            return _number(cell.value) if isinstance(cell.value, float | int) else str(cell.value)
        case "text":
            return f"the text '{_shortened(str(cell.value))}'"
        case "boolean":
            return f"the logical value {str(cell.value).upper()}"
        case "date":
            return f"the {'time' if str(cell.value)[2:3] == ':' else 'date'} {cell.value}"
        case "error":
            return f"the error value {cell.value}"
        case "uncalculated":
            return "a formula without a stored value"
        case "merged":
            return "a cell merged with the one above"


def mend(cell: Cell, column: Column) -> str:
    """The way out for a cell whose content is of the wrong kind."""
    of_numbers = column.kind in {"number", "integer", "azimuth"}
    match cell.kind:
        case "error":
            return "Mend the formula or type the value."
        case "uncalculated":
            return "Open and save the file in your spreadsheet program, then run again."
        case "merged":
            return "Split the merged cells and fill in each."
        case "date":
            meant = _before_it_was_a_date(str(cell.value), column)
            likely = f": {meant}, if that was typed" if meant else ""
            return f"Format the cell as {'a number' if of_numbers else 'text'} and type the value again{likely}."
        case "boolean":
            word = chosen_word(str(cell.value), column.choices)
            return f"Did you mean '{word}'?" if word else f"Type {column.expected}."
    return mend_text(str(cell.value), column)


def _before_it_was_a_date(shown: str, column: Column) -> str:
    """What a spreadsheet program took for a date or a time; empty if nothing is likely.

    >>> _before_it_was_a_date("2025-05-09", Column("Months", "months"))
    '5-9 or 9-5'
    """
    if column.unit.startswith("h") and shown.endswith(":00:00"):
        return str(int(shown[:2]))
    try:
        day = date.fromisoformat(shown)
    except ValueError:
        return ""
    if column.kind == "months" and day.day <= 12:
        return " or ".join(dict.fromkeys((f"{day.month}-{day.day}", f"{day.day}-{day.month}")))
    point = column.kind == "number" and day.year >= 2000  # earlier ones are numbers in the format of a date
    return f"{day.day}.{day.month}" if point else ""


def compass_word(typed: str) -> str:
    """Compass direction meant by a word written out; empty if none is.

    >>> compass_word("South-East"), compass_word("up")
    ('SE', '')
    """
    letters = "".join(letter for letter in typed.upper() if letter.isalpha())
    for word in ("NORTH", "SOUTH", "WEST", "EAST", "NORD", "SÜD", "SUD", "OST"):
        letters = letters.replace(word, word[0].replace("O", "E"))
    return letters if letters in COMPASS else ""


def month_numbers(typed: str) -> tuple[int, ...]:
    """Months of a text such as ``5-9``, ``11-2``, ``Jun to Aug`` or ``3, 7``; empty if it means none.

    >>> month_numbers("11-2"), month_numbers("June to August"), month_numbers("3, 7"), month_numbers("13")
    ((11, 12, 1, 2), (6, 7, 8), (3, 7), ())
    """
    found: list[int] = []
    for part in re.split(r"[,;]", typed.casefold()):
        ends = [_month(word) for word in re.split(r"[-–—]|\bto\b", part)]
        if None in ends or len(ends) > 2:
            return ()
        first, last = cast("int", ends[0]), cast("int", ends[-1])
        found += [(first + step - 1) % 12 + 1 for step in range((last - first) % 12 + 1)]
    return tuple(dict.fromkeys(found))


def _month(word: str) -> int | None:
    """Number of a month typed as a number or by three letters or more."""
    typed = word.strip(" .")
    if typed.isdigit():
        return int(typed) if 1 <= int(typed) <= 12 else None
    return next((place for place, name in enumerate(_MONTHS, 1) if len(typed) > 2 and name.startswith(typed)), None)


def nearest(word: str, known: Iterable[str], likeness: float = 0.6) -> str:
    """The known word that resembles the typed one most; empty if none does.

    >>> nearest("Flat 11", ["Flat 1", "Stair"])
    'Flat 1'
    """
    return next(iter(_alike(word, known, likeness)), "")


def did_you_mean(word: str, known: Iterable[str], likeness: float = 0.6) -> str:
    """A question for the known words that resemble the typed one most; empty without any.

    >>> did_you_mean("Flat 3", ["Flat 1", "Flat 2", "Stair"])
    "Did you mean 'Flat 1' or 'Flat 2'?"
    """
    words = _alike(word, known, likeness)
    offered = " or ".join(f"'{each}'" for each in words)
    if len(words) == _MOST_OFFERED:
        return f"Choose from the list of the cell, such as '{words[0]}'."
    return f"Did you mean {offered}?" if words else ""


def _alike(word: str, known: Iterable[str], likeness: float) -> list[str]:
    """The known words that resemble a word most, in their order; several only if they do so equally."""
    by_folded = {folded(name): name for name in known}
    typed = folded(word)
    close = get_close_matches(typed, by_folded, n=_MOST_OFFERED, cutoff=likeness)
    ratios = {name: SequenceMatcher(None, name, typed).ratio() for name in close}
    return [name for key, name in by_folded.items() if key in ratios and ratios[key] == max(ratios.values())]


def chosen_word(typed: str, words: Sequence[str]) -> str:
    """The word of a short list that is meant by another one; empty if none is.

    >>> chosen_word("external wall", ("wall", "roof")), chosen_word("unheated", ("heated", "unconditioned"))
    ('wall', 'unconditioned')
    """
    bare = folded(typed)
    other = [word for word in words if bare in OTHER_WORDS.get(word, ())]
    near = [word for word in (nearest(typed, words, _MISSPELT),) if word]
    within = [word for word in words if re.search(rf"\b{re.escape(word)}\b", bare)]
    meant = other or near or within or [nearest(typed, words)]
    return meant[0] if len(meant) == 1 else ""


@lru_cache(maxsize=50_000)
def folded(name: str) -> str:
    """The form in which names are compared: without regard to case, spaces, and what cannot be seen.

    >>> folded(" Café\u00a0 1\u200b") == folded("CAFE\u0301 1")
    True
    """
    usual = unicodedata.normalize("NFKC", name)
    seen = usual if usual.isascii() else "".join(letter for letter in usual if unicodedata.category(letter) != "Cf")
    return " ".join(seen.split()).casefold()


def typed_name(cell: Cell) -> str:
    """Text of a cell; a name typed as a number keeps its digits.

    >>> typed_name(Cell(101.0, "number")), typed_name(Cell(" Flat 1 ", "text"))
    ('101', 'Flat 1')
    """
    return f"{cell.value:.15g}" if isinstance(cell.value, float) else str(cell.value).strip()


def _number(value: float) -> str:
    return plain(value) if math.isfinite(value) else "a value that is no finite number"


def _shortened(text: str) -> str:
    """A text on one line, its end left out if it is long."""
    line = " ".join(text.split()) if "\n" in text or len(text) > _LONGEST else text
    return line if len(line) <= _LONGEST else line[: _LONGEST - 1].rstrip() + "…"
