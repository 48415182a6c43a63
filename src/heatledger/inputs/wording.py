"""The words in which a typed value is given back to the user, and the mend that is offered."""

from __future__ import annotations

import math
import re
from collections.abc import Iterable
from difflib import get_close_matches
from typing import cast

from heatledger.inputs.cells import Cell
from heatledger.inputs.columns import COMPASS, Column, plain
from heatledger.inputs.words import MONTHS

__all__ = [
    "as_number",
    "compass_word",
    "describe",
    "folded",
    "mend",
    "month_numbers",
    "nearest",
    "typed_name",
    "unit_slip",
]

_NUMBER_IN_TEXT = re.compile(r"^([-+−]?(?:\d+(?:[.,]\d+)?|[.,]\d+))\s*((?![\d.,]).*)$")
_PERHAPS_THOUSANDS = re.compile(r"^[-+−]?[1-9]\d{0,2},\d{3}$")
_MONTHS = tuple(name.casefold() for name in MONTHS)
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
            return f"the date {cell.value}"
        case "error":
            return f"the error value {cell.value}"
        case "uncalculated":
            return "a formula without a stored value"


def mend(cell: Cell, column: Column) -> str:
    """The way out for a cell whose content is of the wrong kind."""
    of_numbers = column.kind in {"number", "integer", "azimuth"}
    match cell.kind:
        case "error":
            return "Mend the formula or type the value."
        case "uncalculated":
            return "Open and save the file in your spreadsheet program, then run again."
        case "date":
            return f"Format the cell as {'a number' if of_numbers else 'text'} and type the value again."
        case "boolean":
            return f"Type {column.expected}."
    return _mend_text(str(cell.value), column)


def _mend_text(typed: str, column: Column) -> str:
    """The way out for a text where a number belongs; a unit of another size is not dropped."""
    number, unit = _split(typed)
    if _PERHAPS_THOUSANDS.match(typed.strip()):
        return f"Type {typed.strip().replace(',', '')} or {typed.strip().replace(',', '.')} as a number."
    if number is None:
        return "Type a number, without unit or words."
    if not unit or unit in column.unit.split(" or "):
        return f"Type {plain(number)} as a number."
    if unit == "%" and column.unit == "-":
        return f"Type {plain(number / 100)} as a number."
    if column.unit in {"", "-"}:
        return "Type a number, without unit or words."
    return f"Convert it to {column.unit} and type the number alone."


def as_number(typed: str) -> float | None:
    """Number that a text such as ``1,2``, ``12 mm`` or ``35 %`` most likely means.

    None if it may mean two numbers: ``1,234`` is either 1.234 or 1234.

    >>> as_number("1,2"), as_number("12 mm"), as_number("about 3"), as_number("1,234")
    (1.2, 12.0, None, None)
    """
    return _split(typed)[0]


def _split(typed: str) -> tuple[float | None, str]:
    """Number and unit of a text."""
    match = _NUMBER_IN_TEXT.match(typed.strip())
    if match is None or _PERHAPS_THOUSANDS.match(match[1]):
        return None, ""
    unit = match[2].strip(" []").replace("m2", "m²").replace("m3", "m³")
    return float(match[1].replace(",", ".").replace("−", "-")), unit


def compass_word(typed: str) -> str:
    """Compass direction meant by a word written out; empty if none is.

    >>> compass_word("South-East"), compass_word("up")
    ('SE', '')
    """
    letters = "".join(letter for letter in typed.upper() if letter.isalpha())
    for word in ("NORTH", "EAST", "SOUTH", "WEST"):
        letters = letters.replace(word, word[0])
    return letters if letters in COMPASS else ""


_SLIPS: dict[str, tuple[tuple[float, str], ...]] = {
    "m": ((1000, "mm"), (100, "cm")),
    "mm": ((0.001, "m"),),
    "-": ((100, "%"),),
    "W/(m·K)": ((1000, "mW/(m·K)"),),
}
"""What a value is divided by if it was typed in another unit, by the unit of the column."""


SHORTEST_IN_MILLIMETRES = 400.0
"""Openings and edges shorter than this were rather typed in centimetres. [mm]"""


def unit_slip(value: float, column: Column) -> str:
    """Mend for a value out of bounds that was typed in another unit; empty if none explains it.

    >>> unit_slip(1200.0, Column("Width", "number", "m", above=0, at_most=50))
    'Type 1.2 if 1200 mm is meant.'
    """
    if column.unit == "°C" and _within((value - 32) / 1.8, column):
        return f"Type {(value - 32) / 1.8:.1f} if {plain(value)} °F is meant."
    for divisor, unit in _SLIPS.get(column.unit, ()):
        if unit == "mm" and value < SHORTEST_IN_MILLIMETRES:
            continue
        if _within(value / divisor, column):
            return f"Type {plain(value / divisor)} if {plain(value)} {unit} is meant."
    return ""


def _within(value: float, column: Column) -> bool:
    return (
        (column.above is None or value > column.above)
        and (column.at_least is None or value >= column.at_least)
        and (column.below is None or value < column.below)
        and (column.at_most is None or value <= column.at_most)
    )


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
    by_folded = {folded(name): name for name in known}
    close = get_close_matches(folded(word), by_folded, n=1, cutoff=likeness)
    return by_folded[close[0]] if close else ""


def folded(name: str) -> str:
    """The form in which names are compared: without regard to case and outer spaces."""
    return name.strip().casefold()


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
