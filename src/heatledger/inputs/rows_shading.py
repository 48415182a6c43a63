"""The input sheets of what keeps the sun off: obstructions and movable shading."""

from __future__ import annotations

from typing import Any, ClassVar, Literal, TypeAlias

from heatledger.inputs.columns import SheetRow, choice, months, number, text
from heatledger.inputs.words import YesNo

__all__ = ["ObstructionRow", "ShadingDeviceRow"]

Device: TypeAlias = Literal[
    "white venetian blind 5 %",
    "white venetian blind 10 %",
    "white venetian blind 30 %",
    "white curtain 50 %",
    "white curtain 70 %",
    "white curtain 90 %",
    "coloured fabric 10 %",
    "coloured fabric 30 %",
    "coloured fabric 50 %",
    "aluminium-coated fabric 5 %",
]
"""Devices of the table; the figure is the transmittance of the device."""


def _skyline(sector: str, words: str) -> Any:
    return number(
        f"Horizon {sector}",
        unit="°",
        help=f"Angle up to what stands far off in the {words}, in a sector of 45°, from the middle of the opening. "
        f"Its height above there divided by its distance: 0.27 is 15°, 0.58 is 30°, 1 is 45°.",
        default=0.0,
        default_note="open",
        ge=0,
        le=90,
    )


def _length(title: str, words: str, at_most: float = 50.0) -> Any:
    return number(title, unit="m", help=words, default=0.0, default_note="none", ge=0, le=at_most)


class ObstructionRow(SheetRow):
    """What stands before an opening or an element."""

    sheet: ClassVar[str] = "Obstructions"
    purpose: ClassVar[str] = (
        "What stands before openings and elements: the skyline, an overhang, fins, the reveal. One row holds all that "
        "stands before one opening."
    )

    name: str = text("Obstruction", help="Unique name, e.g. Street opposite with balcony.", required=True)
    horizon_north: float = _skyline("N", "north")
    horizon_northeast: float = _skyline("NE", "north-east")
    horizon_east: float = _skyline("E", "east")
    horizon_southeast: float = _skyline("SE", "south-east")
    horizon_south: float = _skyline("S", "south")
    horizon_southwest: float = _skyline("SW", "south-west")
    horizon_west: float = _skyline("W", "west")
    horizon_northwest: float = _skyline("NW", "north-west")
    overhang_depth: float = _length(
        "Overhang depth",
        "How far a balcony or the eaves stand out from the face of the wall. It is taken to reach well past the "
        "opening on both sides. Counts for openings only.",
    )
    overhang_distance: float = _length(
        "Overhang distance", "From the upper edge of the opening up to the underside of the overhang."
    )
    left_fin_depth: float = _length(
        "Left fin depth",
        "How far a fin or wall on the left, seen from outside, stands out from the face. It is taken to reach well "
        "past the opening above and below. Counts for openings only.",
    )
    left_fin_distance: float = _length(
        "Left fin distance", "From the left edge of the opening, as seen from outside, to the fin."
    )
    right_fin_depth: float = _length(
        "Right fin depth",
        "How far a fin or wall on the right, seen from outside, stands out from the face. It is taken to reach well "
        "past the opening above and below. Counts for openings only.",
    )
    right_fin_distance: float = _length(
        "Right fin distance", "From the right edge of the opening, as seen from outside, to the fin."
    )
    reveal_depth: float = _length(
        "Reveal depth",
        "How far the glass stands behind the face of the wall: head, sill and both jambs shade it. Counts for "
        "openings only.",
        5.0,
    )
    reflectance: float = number(
        "Reflectance",
        unit="-",
        help="Brightness of the obstruction as a share of that of the sky or ground it hides.",
        default=0.2,
        default_note="one fifth, the rule of the split-flux method of daylighting (Hopkinson and others 1966)",
        ge=0,
        le=1,
    )


class ShadingDeviceRow(SheetRow):
    """A blind, curtain, awning or shutter that is drawn against the sun."""

    sheet: ClassVar[str] = "Shading devices"
    purpose: ClassVar[str] = "Movable shading of the openings: how much it keeps out and when it is drawn."

    name: str = text("Shading device", help="Unique name, e.g. Awning south.", required=True)
    reduction_factor: float | None = number(
        "Reduction factor",
        unit="-",
        help="g-value with the device drawn divided by g-value without, as declared. Or choose a device of the table.",
        ge=0,
        le=1,
    )
    device: Device | None = choice(
        "Device",
        help="Of the table of ISO 13790:2008, annex G; the figure is the transmittance of the device.",
    )
    place: Literal["outside", "between", "inside"] = choice(
        "Place",
        help="Of a device of the table: outside the glass, between the panes, or inside.",
        default="inside",
        default_note="the usual curtain; the least reduction",
    )
    control: Literal["irradiance", "months"] = choice(
        "Control",
        help="Irradiance: drawn in every hour in which the sun on the opening's plane, behind its obstruction, passes "
        "the threshold. Months: drawn day after day in the months given.",
        default="irradiance",
        default_note="ISO 13790:2008, annex G",
    )
    threshold: float = number(
        "Irradiance threshold",
        unit="W/m²",
        help="Sun on the plane of the opening above which the device is drawn.",
        default=300.0,
        default_note="ISO 13790:2008, annex G",
        ge=0,
        le=1500,
    )
    months_used: tuple[int, ...] = months(
        "Months",
        help="Months in which the device is used, such as 5-9 or 11-3. Needed with control by months.",
        default_note="all year, with control by irradiance",
    )
    used_in_heating: YesNo = choice(
        "Used in heating",
        help="Whether the device also counts for the heating need.",
        default="no",
        default_note="while heating is needed the sun is welcome; glare is left aside",
    )
    used_in_cooling: YesNo = choice(
        "Used in cooling",
        help="Whether the device counts for the cooling need.",
        default="yes",
        default_note="what movable shading is for",
    )
