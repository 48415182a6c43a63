"""Fixed words of the input sheets."""

from __future__ import annotations

from typing import Literal, TypeAlias, get_args

__all__ = [
    "AIR_LAYERS",
    "IN_THE_GROUND",
    "MONTHLY_TABLE",
    "MONTHS",
    "NEIGHBOUR",
    "OTHER_WORDS",
    "OUTDOORS",
    "Month",
    "YesNo",
]

OUTDOORS = "outdoors"
"""What an element faces when outdoor air is behind it."""
NEIGHBOUR = "neighbour"
"""What an element faces when a space at the same temperature is behind it: no heat passes."""
AIR_LAYERS = ("unventilated air layer", "slightly ventilated air layer", "well ventilated air layer")
"""Words of the Material column that stand for an air layer; the two words `air layer` may be left out."""

MONTHLY_TABLE = "monthly table"
"""What stands under Weather where sheet Monthly climate is the weather."""
Month: TypeAlias = Literal[
    "January", "February", "March", "April", "May", "June",
    "July", "August", "September", "October", "November", "December",
]  # fmt: skip
MONTHS: tuple[Month, ...] = get_args(Month)
"""January first."""

YesNo: TypeAlias = Literal["yes", "no"]

OTHER_WORDS: dict[str, frozenset[str]] = {
    "yes": frozenset({"y", "ja", "oui", "si", "true", "x", "1", "on"}),
    "no": frozenset({"n", "nein", "non", "false", "0", "off", "none"}),
    "unconditioned": frozenset({"unheated", "not heated", "no", "none", "cold"}),
    "heated and cooled": frozenset({"cooled", "conditioned", "air-conditioned", "air conditioned", "both"}),
    OUTDOORS: frozenset({"outside", "external", "exterior", "outdoor air", "outside air", "air", "ambient"}),
    NEIGHBOUR: frozenset({"adiabatic", "next door"}),
    AIR_LAYERS[0]: frozenset({"air", "air gap", "air layer", "air space", "cavity", "still air"}),
}
"""What people type for a fixed word. It is offered, not read: the word decides too much."""
IN_THE_GROUND = frozenset({"ground", "soil", "earth", "on ground", "against ground"})
"""What people type where an element does not face air."""
