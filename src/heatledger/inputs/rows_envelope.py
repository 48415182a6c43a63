"""The sheets of glass, of the faces of the zones and of the openings in them."""

from __future__ import annotations

from typing import ClassVar, Literal

from heatledger.inputs.columns import SheetRow, azimuth, choice, integer, name_from, number, text
from heatledger.inputs.words import NEIGHBOUR, OUTDOORS

__all__ = ["ElementRow", "GlazedUnitRow", "OpeningRow"]


class GlazedUnitRow(SheetRow):
    """Glass and frame of a kind of opening."""

    sheet: ClassVar[str] = "Glazed units"
    purpose: ClassVar[str] = "Glass with its frame, as used by the openings."

    name: str = text("Glazed unit", help="Unique name, e.g. Double, low-e, timber.", required=True)
    u_value: float | None = number(
        "U-value",
        unit="W/(m²·K)",
        help="Of the whole unit as declared (ISO 10077-1). Old double 2.8, low-e double 1.3, triple 0.8. Or leave it "
        "empty and give the parts.",
        gt=0,
        le=10,
    )
    g_value: float = number(
        "g-value",
        unit="-",
        help="Of the glass at normal incidence. Single 0.85, double 0.75, low-e double 0.67, triple low-e 0.50 "
        "(ISO 13790:2008, annex G).",
        required=True,
        ge=0,
        le=1,
    )
    frame_share: float = number(
        "Frame share",
        unit="%",
        help="Share of the opening taken by the frame. Windows 20–30, large panes 15. A solid door leaf: 100.",
        default=30.0,
        default_note="ISO 10077-1, tabulated windows",
        ge=0,
        le=100,
    )
    glazing_u_value: float | None = number(
        "Glazing U-value",
        unit="W/(m²·K)",
        help="Of the pane without its edge, as declared (EN 673). Or leave it empty and give the panes.",
        gt=0,
        le=6,
    )
    frame_u_value: float | None = number(
        "Frame U-value",
        unit="W/(m²·K)",
        help="Timber 1.4–2.0, PVC 1.2–2.0, metal with thermal break 2.0–4.0 (ISO 10077-1, annex).",
        gt=0,
        le=10,
    )
    edge: float | None = number(
        "Edge ψ",
        unit="W/(m·K)",
        help="Of the glass edge, timber or PVC frame: aluminium spacer 0.08, improved 0.06 (ISO 10077-1, annex).",
        ge=0,
        le=0.5,
    )
    frame_width: float | None = number(
        "Frame width",
        unit="mm",
        help="Seen width of the frame on all sides, applied to the size of each opening. Replaces the frame share.",
        gt=0,
        le=500,
    )
    panes: int | None = integer("Panes", help="Number of panes, 1 to 4, for U by EN 673.", ge=1, le=4)
    gap: float | None = number("Gap", unit="mm", help="Between the panes.", gt=0, le=50)
    gas: Literal["air", "argon", "krypton"] = choice(
        "Gas",
        help="In the gaps, filled to 90 %.",
        default="air",
        default_note="ordinary filling",
    )
    coating: float | None = number(
        "Coating emissivity",
        unit="-",
        help="Of one low-emissivity coating in each gap. Empty: uncoated.",
        default_note="uncoated glass, 0.837 (EN 673)",
        gt=0,
        le=0.837,
    )
    shutter_resistance: float | None = number(
        "Shutter resistance",
        unit="m²·K/W",
        help="Of the shutter: aluminium roller 0.01, wood or plastic roller 0.10, with foam 0.15, wood 25 mm 0.20.",
        ge=0,
        le=0.3,
    )
    shutter_tightness: Literal["very high", "high", "average", "low", "tight"] = choice(
        "Shutter air permeability",
        help="Of the closed shutter in the reveal (ISO 10077-1, 2006 edition 5.3, annex H).",
        default="average",
        default_note="ISO 10077-1",
    )
    shutter_share: float = number(
        "Shutter closed share",
        unit="%",
        help="Share of the year's temperature difference with the shutter closed; every night about 60 (common "
        "practice, no source).",
        default=60.0,
        default_note="closed every night, common practice, no source",
        ge=0,
        le=100,
    )


class ElementRow(SheetRow):
    """An opaque face of a zone."""

    sheet: ClassVar[str] = "Envelope"
    purpose: ClassVar[str] = (
        "The opaque faces of the zones, each entered once. Floors on the ground have their own sheet."
    )
    required_sheet: ClassVar[bool] = True
    either: ClassVar[tuple[str, str, str]] = ("Build-up or U-value", "build_up", "u_value")

    name: str = text("Element", help="Unique name, e.g. W-south.", required=True)
    zone: str = name_from("Zones", "Zone", help="The zone this element encloses.", required=True)
    kind: Literal["wall", "roof", "floor", "door", "partition"] = choice(
        "Kind",
        help="Partition: an inner wall or ceiling between zones. Sets the default tilt.",
        required=True,
    )
    faces: str = name_from(
        "Zones",
        "Faces",
        help="Outdoors; the name of the zone on the other side; neighbour: somebody else's heated space.",
        required=True,
        words=(OUTDOORS, NEIGHBOUR),
    )
    build_up: str = name_from("Build-ups", "Build-up", help="Layers of sheet Build-ups. Or give a U-value instead.")
    u_value: float | None = number(
        "U-value",
        unit="W/(m²·K)",
        help="Instead of a build-up, surface resistances included. Such an element stores no heat.",
        gt=0,
        le=10,
    )
    area: float = number(
        "Area",
        unit="m²",
        help="Gross, openings of sheet Openings included. A door on its own row is no part of its wall.",
        required=True,
        gt=0,
        le=1_000_000,
    )
    azimuth: float | str | None = azimuth(
        "Azimuth",
        help="Direction the outer face looks: 0 north, 90 east, 180 south, 270 west, or N, NNE, NE … Needed for "
        "upright and tilted elements that face outdoors.",
        default_note="not needed for a level element",
    )
    tilt: float | None = number(
        "Tilt",
        unit="°",
        help="0 faces up, 90 upright, 180 faces down. Empty: wall, door and partition 90, roof 0, floor 180.",
        default_note="by kind: wall, door, partition 90; roof 0; floor 180",
        ge=0,
        le=180,
    )
    absorptance: float = number(
        "Solar absorptance",
        unit="-",
        help="Share of sunlight absorbed: light 0.3, medium 0.6, dark 0.9 (ISO 13790:2008, annex G).",
        default=0.6,
        default_note="medium colour, ISO 13790:2008, annex G",
        ge=0,
        le=1,
    )
    obstruction: str = name_from(
        "Obstructions",
        "Obstruction",
        help="Row of sheet Obstructions. Of it only the horizon counts for the element itself; its openings take all "
        "of it, unless they name their own. Empty: open.",
    )


class OpeningRow(SheetRow):
    """One window, glazed door or rooflight."""

    sheet: ClassVar[str] = "Openings"
    purpose: ClassVar[str] = "Windows, glazed doors and rooflights; each sits in an element and takes its direction."

    name: str = text("Opening", help="Unique name, e.g. O-07.", required=True)
    element: str = name_from("Envelope", "Element", help="The element it sits in.", required=True)
    glazed_unit: str = name_from("Glazed units", "Glazed unit", help="Row of sheet Glazed units.", required=True)
    count: int = integer("Number", help="How many alike.", default=1, default_note="a single one", ge=1, le=10_000)
    width: float = number("Width", unit="m", help="Structural opening, frame included.", required=True, gt=0, le=50)
    height: float = number("Height", unit="m", help="Structural opening, frame included.", required=True, gt=0, le=50)
    obstruction: str = name_from(
        "Obstructions", "Obstruction", help="Row of sheet Obstructions. Empty: the obstruction of its element, if any."
    )
    shading: str = name_from(
        "Shading devices", "Movable shading", help="Row of sheet Shading devices. Empty: none is counted."
    )
