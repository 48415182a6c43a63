"""The sheets of materials and of the layers made from them."""

from __future__ import annotations

from typing import ClassVar, Literal

from heatledger.inputs.columns import SheetRow, choice, integer, name_from, number, text
from heatledger.inputs.words import AIR_LAYERS

__all__ = ["BuildUpRow", "MaterialRow"]


class MaterialRow(SheetRow):
    """A material of a layer."""

    sheet: ClassVar[str] = "Materials"
    purpose: ClassVar[str] = "Materials of the build-ups. Change the prefilled rows or add your own."

    name: str = text("Material", help="Unique name, e.g. Brick 1800.", required=True)
    conductivity: float = number(
        "Conductivity",
        unit="W/(m·K)",
        help="Design value. Insulants 0.02–0.05, timber 0.13, brick 0.4–0.9, concrete 1.2–2.5 (ISO 10456).",
        required=True,
        gt=0.001,
        le=500,
    )
    density: float | None = number(
        "Density",
        unit="kg/m³",
        help="Needed for the heat capacity. Empty: the layer stores no heat.",
        default_note="stores no heat",
        gt=0,
        le=15000,
    )
    specific_heat: float | None = number(
        "Specific heat",
        unit="J/(kg·K)",
        help="Needed for the heat capacity. Mineral materials 1000, timber 1600 (ISO 10456).",
        default_note="stores no heat",
        ge=50,
        le=5000,
    )
    source: str = text("Source", help="Where the values come from: standard, declaration, test report.")


class BuildUpRow(SheetRow):
    """One layer of a build-up."""

    sheet: ClassVar[str] = "Build-ups"
    purpose: ClassVar[str] = "Layers of the opaque elements, one row per layer, the inside layer first."
    unique: ClassVar[bool] = False

    name: str = text("Build-up", help="The same name on every layer of the build-up.", required=True)
    layer: int = integer("Layer", help="1 is the inside layer; counted without gaps.", required=True, ge=1, le=50)
    material: str = name_from(
        "Materials",
        "Material",
        help="Row of sheet Materials, a shipped material, or an air layer.",
        required=True,
        words=AIR_LAYERS,
    )
    thickness: float = number(
        "Thickness", unit="mm", help="Of the layer; of a tapered layer, at its thickest.", required=True, gt=0, le=5000
    )
    second_material: str = name_from(
        "Materials",
        "Second material",
        help="Studs, rafters, battens or joints that bridge the layer; with its share. Neighbouring layers with the "
        "same one and the same share count as one stud that runs through, others cross.",
    )
    second_share: float | None = number(
        "Second share",
        unit="%",
        help="Of the face taken by the second material. Timber studs 12–15, rafters 8–12 (common practice, no source).",
        ge=0,
        le=100,
        small_share=True,
    )
    void_width: float | None = number(
        "Void width",
        unit="mm",
        help="Air voids in a block: size of one across the heat flow. The material is that of the solid part.",
        gt=0,
        le=2000,
    )
    void_depth: float | None = number(
        "Void depth",
        unit="mm",
        help="Size of one void in the direction of heat flow. Empty: the whole thickness.",
        default_note="the whole thickness",
        gt=0,
        le=1000,
    )
    void_share: float | None = number(
        "Void share",
        unit="%",
        help="Of the face taken by voids, in each row of voids.",
        gt=0,
        lt=100,
        small_share=True,
    )
    void_rows: int = integer(
        "Void rows", help="Rows of voids behind each other.", default=1, default_note="a single one", ge=1, le=50
    )
    inner_emissivity: float = number(
        "Inner emissivity",
        unit="-",
        help="Of the face on the inside of an air layer or void. Bright foil 0.05–0.2 if it stays clean.",
        default=0.9,
        default_note="ordinary surface, ISO 6946:2017, annex C",
        gt=0,
        le=1,
    )
    outer_emissivity: float = number(
        "Outer emissivity",
        unit="-",
        help="Of the face on the outside of an air layer or void.",
        default=0.9,
        default_note="ordinary surface, ISO 6946:2017, annex C",
        gt=0,
        le=1,
    )
    air_openings: float = number(
        "Air layer openings",
        unit="mm²/m",
        help="Of a slightly ventilated air layer to outdoors, per metre of length (upright) or per m² (level).",
        default=1000.0,
        default_note="middle of the range of ISO 6946:2017, 6.9.3",
        ge=500,
        le=1500,
    )
    fasteners: float | None = number(
        "Fasteners", unit="1/m²", help="Metal fixings or ties through this insulation layer.", gt=0, le=100
    )
    fastener_conductivity: float = number(
        "Fastener conductivity",
        unit="W/(m·K)",
        help="Steel 50, stainless steel 17 (ISO 10456).",
        default=50.0,
        default_note="steel, ISO 10456",
        ge=1,
        le=400,
    )
    fastener_section: float | None = number(
        "Fastener cross-section", unit="mm²", help="Of one fastener: 4 mm thick 12.6, 6 mm 28.3.", gt=0, le=10_000
    )
    fastener_depth: float | None = number(
        "Fastener depth",
        unit="mm",
        help="Of the part of the layer that the fastener passes. Empty: the whole layer.",
        default_note="the whole layer",
        gt=0,
        le=1000,
    )
    gaps: Literal["none", "bridging", "circulating"] = choice(
        "Gaps in insulation",
        help="Bridging: gaps through the layer. Circulating: and air can move behind it (ISO 6946:2017, annex F).",
        default="none",
        default_note="level 0, joints closed",
    )
    rain: float | None = number(
        "Rain on roof",
        unit="mm/d",
        help="Inverted roof: mean precipitation in the heating season that runs under this insulation layer.",
        gt=0,
        le=50,
    )
    drainage: float = number(
        "Drainage factor f·x",
        unit="W·d/(m²·K·mm)",
        help="Inverted roof: share drained times the extra loss. 0.04 open butt joints (ISO 6946:2017, annex F).",
        default=0.04,
        default_note="single layer with butt joints, ISO 6946:2017, annex F",
        ge=0,
        le=0.04,
    )
    taper: Literal["none", "rectangle", "triangle thick at apex", "triangle thin at apex"] = choice(
        "Taper",
        help="Of a layer that falls to nothing: in plan a rectangle, or a triangle whose apex is thick or thin.",
        default="none",
        default_note="even thickness",
    )
