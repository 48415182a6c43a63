"""The number that a text in a number cell most likely means."""

from __future__ import annotations

import re
import unicodedata
from typing import NamedTuple

from heatledger.inputs.columns import Column, plain
from heatledger.inputs.units import converted, is_unit_of, unit_meant, within_limits, wrong_size

__all__ = ["is_number", "mend_text"]

_NOTHING = {*"-–—?./", "--", "---", "n/a", "na", "n.a.", "n/k", "tbd", "tbc", "t.b.d.", "none", "nil", "unknown", "??"}
"""What stands for a value nobody knows yet."""
_ABOUT = re.compile(r"^(?:approx(?:imately)?|about|circa|ca|max|min|[~≈±<>≤≥=]|\w{1,2}\s*=)[.:]?\s*(?=[\d.,+-])", re.I)
_FIGURE = re.compile(r"^([-+]?)((?>\d+(?:[,.']\d+| \d{3}(?!\d))*)|[.,]\d+)(e[-+]?\d+)?\s*((?![.,']\S).*)$", re.I)
_GROUPED = re.compile(r"\d{1,3}([ ,.'])\d{3}(?:\1\d{3})*(?:(?!\1)[.,]\d+)?")
_PLAIN = re.compile(r"\d*[.,]?\d+")
_SEVERAL = re.compile(r"^(?:-|–|—|to|and|x|×|/|\+|;|)\s*\d")
_REMARK = re.compile(r"^(?:\(.*\)|[?*!~]+|est\b.*|pcs\.?|pieces?|x|st|nd|rd|th|no\.?|\.)$", re.IGNORECASE)


class _Typed(NamedTuple):
    """A text taken apart."""

    figures: tuple[str, ...]
    """The number as it should be typed; two where a comma may group thousands or set off decimals; none."""
    rest: str
    """What follows it."""
    about: bool
    """Whether a word such as `about` stands before it."""


def is_number(typed: str) -> bool:
    """Whether a text is a number, perhaps with a unit.

    >>> is_number("0,24 W/m²K"), is_number("12 cm brick")
    (True, False)
    """
    found = _taken_apart(typed)
    return bool(found.figures) and (not found.rest or bool(unit_meant(found.rest)))


def mend_text(typed: str, column: Column) -> str:
    """The way out for a text where a number belongs.

    >>> mend_text("1.200,50", Column("Floor area", "number", "m²"))
    'Type 1200.5 as a number.'
    """
    bare = _readable(typed)
    if bare.casefold() in _NOTHING:
        return "Type a number." if column.required else "Clear the cell to leave it open, or type a number."
    found = _taken_apart(typed)
    if not found.figures:
        return "Type a number, without unit or words."
    if _SEVERAL.match(found.rest) and not unit_meant(found.rest):
        return "Type one number."
    if len(found.figures) > 1:
        return f"Type {' or '.join(found.figures)} as a number."
    return _mend_number(float(found.figures[0]), found, column)


def _mend_number(number: float, found: _Typed, column: Column) -> str:
    unit = unit_meant(found.rest)
    if column.unit == "°" and found.rest.strip("° ").upper() in {"N", "E", "S", "W"}:  # a latitude or longitude
        number, unit = (number if found.rest.strip("° ").upper() in "NE" else -number), "°"
    if not found.rest or (unit and is_unit_of(unit, column)):
        if column.unit == "%" and not found.rest and 0 < number < 1:
            return f"Type {plain(100 * number)} for {plain(100 * number)} %."
        words = "alone, as a number" if found.about else "as a number"
        return f"Type {plain(number)} {words}." if within_limits(number, column) else wrong_size(number, column)
    if unit:
        meant = converted(number, unit, column)
        if meant is not None and within_limits(meant, column):
            return f"Type {plain(meant)} for {plain(number)} {unit}."
    if _REMARK.match(found.rest):
        return f"Type {plain(number)} alone, as a number."
    if column.unit in {"", "-"}:
        return "Type a number, without unit or words."
    return f"Convert it to {column.unit} and type the number alone."


def _readable(typed: str) -> str:
    """The text with usual digits, spaces, quotes and minus signs, and without what cannot be seen."""
    usual = unicodedata.normalize("NFKC", typed.replace("½", ".5").replace("´", "'"))
    seen = "".join(letter for letter in usual if unicodedata.category(letter) != "Cf")
    return " ".join(seen.translate({0x2019: "'", 0x2018: "'", 0x60: "'", 0x2212: "-"}).split())


def _taken_apart(typed: str) -> _Typed:
    bare = _readable(typed)
    start = _ABOUT.match(bare)
    match = _FIGURE.match(bare[start.end() :] if start else bare)
    if match is None:
        return _Typed((), "", about=False)
    sign, figure, power, rest = match.groups()
    texts = _figures(figure, power or "")
    return _Typed(tuple(f"{sign.strip('+')}{text}" for text in texts), rest.strip(), about=start is not None)


def _figures(figure: str, power: str) -> tuple[str, ...]:
    """What digits with separators may mean."""
    grouped = _GROUPED.fullmatch(figure)
    if grouped and not power and not figure.startswith("0"):
        separator = grouped[1]
        whole = figure.replace(separator, "").replace(",", ".")
        single = figure.count(separator) == 1 and separator in ",." and "." not in whole
        return (whole, figure.replace(",", ".")) if single else (whole,)
    return (figure.replace(",", ".") + power,) if _PLAIN.fullmatch(figure) else ()
