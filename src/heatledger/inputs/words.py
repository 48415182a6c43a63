"""Fixed words of the input sheets."""

from __future__ import annotations

from typing import Literal, TypeAlias, get_args

__all__ = ["AIR_LAYERS", "MONTHLY_TABLE", "MONTHS", "NEIGHBOUR", "OUTDOORS", "Month", "YesNo"]

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
