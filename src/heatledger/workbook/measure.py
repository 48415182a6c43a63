"""What a cell can hold and how much room it takes."""

from __future__ import annotations

import math
import re
import unicodedata
from collections.abc import Iterable

from openpyxl.cell.cell import ILLEGAL_CHARACTERS_RE

__all__ = ["DASH", "LINE", "clean_text", "digits_for", "line_count", "shortened", "text_width"]

DASH = "–"
"""Shown for a number that does not exist."""
LINE = 14.0
"""Height of a text line of the body font. [pt]"""
MOST_CHARACTERS = 32_767
"""A cell holds no more, in any spreadsheet program."""
_NO_XML = re.compile("[\ud800-\udfff\ufffe\uffff]")
"""What XML cannot hold besides control characters: halves of pairs and the two that are none."""
_LOOKS_ESCAPED = re.compile("_(?=x[0-9A-Fa-f]{4}_)")


def clean_text(text: str) -> str:
    """Text as a cell can hold it: without control characters, not over-long.

    >>> clean_text("one" + chr(7) + " two" + chr(0xFFFF))
    'one two'
    """
    plain = _NO_XML.sub("", ILLEGAL_CHARACTERS_RE.sub("", text))
    plain = _LOOKS_ESCAPED.sub("_x005F_", plain)
    return plain if len(plain) <= MOST_CHARACTERS else plain[: MOST_CHARACTERS - 1] + "…"


def digits_for(values: Iterable[float | None]) -> str:
    """Number format by the size of the largest value; zero shows as a dash.

    >>> digits_for([12000.0, 3.0]), digits_for([0.25])
    ('#,##0;-#,##0;"–"', '0.00;-0.00;"–"')
    """
    sizes = [abs(value) for value in values if value is not None and math.isfinite(value)]
    largest = max(sizes, default=0.0)
    digits = "#,##0" if largest >= 100 else "0.0" if largest >= 10 else "0.00"
    return f'{digits};-{digits};"{DASH}"'


_SIGN_WIDTHS = {
    sign: width
    for signs, width in (
        ("ijl'", 0.4),
        (" !,./:;·|Ift[]", 0.5),
        ('()-r`"*', 0.65),
        ("cksvxyzJ", 0.9),
        ("ABEKPSVXY&+<=>", 1.2),
        ("CDHNRUw", 1.3),
        ("GOQ", 1.4),
        ("Mm%…—", 1.6),
        ("W@", 1.8),
    )
    for sign in signs
}
"""Widths of signs in digits of the body font, rounded to its classes; other small letters are as wide as a digit."""
_SPACE = _SIGN_WIDTHS[" "]


def text_width(text: str) -> float:
    """Width of a text in column units, which are digits of the body font.

    >>> round(text_width("2048"), 1), round(text_width("little"), 1), round(text_width("閲覧"), 1)
    (4.0, 3.2, 3.6)
    """
    return sum(_SIGN_WIDTHS.get(sign) or _other_width(sign) for sign in text)


def _other_width(sign: str) -> float:
    """East Asian signs are squares of the font's size, capitals of any script wider than its digits."""
    if unicodedata.east_asian_width(sign) in "WF":
        return 1.8
    return 1.25 if sign.isupper() else 1.0


def shortened(text: str, most: int) -> str:
    """A text without its middle, if it is too long: names in a series differ at their ends.

    >>> shortened("Flat on the upper floor, number 12", 20)
    'Flat on th… number 12'
    """
    if len(text) <= most:
        return text
    half = most // 2
    return f"{text[: most - half].rstrip()}…{text[-half:]}"


def line_count(text: str, width: float, size: float = 10, bold: bool = False) -> int:
    """Lines a text takes in a column of a width, counted on the safe side: on screens letters run wider."""
    room = max((width - 1) * 10 / size / (1.12 if bold else 1.04), 1)
    return sum(_wrapped(line, room) for line in text.split("\n"))


def _wrapped(line: str, room: float) -> int:
    lines, used = 1, 0.0
    for word in line.split(" "):
        width = text_width(word)
        if used and used + _SPACE + width > room:
            lines, used = lines + 1, 0.0
        used += width + (_SPACE if used else 0)
        while used > room:
            lines, used = lines + 1, used - room
    return lines
