"""The sheets of ground floors and thermal bridges."""

from __future__ import annotations

from typing import ClassVar, Literal

from heatledger.inputs.columns import SheetRow, choice, integer, name_from, number, text
from heatledger.inputs.words import OUTDOORS

__all__ = ["GroundFloorRow", "ThermalBridgeRow"]


class GroundFloorRow(SheetRow):
    """A floor in contact with the ground."""

    sheet: ClassVar[str] = "Ground floors"
    purpose: ClassVar[str] = "Floors on the ground, calculated with the ground beneath them (ISO 13370)."
    either: ClassVar[tuple[str, str, str]] = ("Build-up or U-value", "build_up", "u_value")

    name: str = text("Ground floor", help="Unique name.", required=True)
    zone: str = name_from("Zones", "Zone", help="The zone above.", required=True)
    type: Literal["slab on ground", "suspended", "heated basement", "unheated basement"] = choice(
        "Type",
        help="Suspended: a ventilated space below. Heated basement: floor and walls of a zone below ground. Unheated "
        "basement: the floor of the zone above a cellar that is no zone of its own.",
        required=True,
    )
    area: float = number("Area", unit="m²", help="Of the floor.", required=True, gt=0, le=1_000_000)
    perimeter: float = number(
        "Exposed perimeter",
        unit="m",
        help="Edge of the floor towards outdoors or an unheated space outside the insulation. A slab shared by zones: "
        "share out the perimeter of the whole slab by floor area.",
        required=True,
        gt=0,
        le=100_000,
    )
    build_up: str = name_from("Build-ups", "Build-up", help="Layers above the ground. Or give a U-value instead.")
    u_value: float | None = number(
        "U-value",
        unit="W/(m²·K)",
        help="Instead of a build-up: of the floor construction alone, without the ground, with the surface "
        "resistances 0.17 and 0.04 m²K/W. Such a floor stores no heat.",
        gt=0,
        le=4.7,
    )
    wall_thickness: float = number(
        "Wall thickness",
        unit="m",
        help="Of the outer walls that stand on the edge.",
        default=0.3,
        default_note="common practice",
        ge=0,
        le=2,
    )
    soil: Literal["clay or silt", "sand or gravel", "rock"] = choice(
        "Soil",
        help="Under the floor. Conductivity 1.5, 2.0 or 3.5 W/(m·K) (ISO 13370, table 7).",
        default="sand or gravel",
        default_note="ISO 13370, where the soil is not known",
    )
    edge_insulation: Literal["none", "horizontal", "vertical"] = choice(
        "Edge insulation", help="Slab on ground: strip along the edge.", default="none", default_note="no strip"
    )
    edge_depth: float | None = number(
        "Edge depth",
        unit="m",
        help="Width of a horizontal or depth of a vertical strip of edge insulation.",
        gt=0,
        le=10,
    )
    edge_resistance: float | None = number(
        "Edge resistance", unit="m²·K/W", help="Of the edge insulation.", gt=0, le=20
    )
    edge_thickness: float | None = number("Edge thickness", unit="mm", help="Of the edge insulation.", gt=0, le=1000)
    height_above_ground: float | None = number(
        "Height above ground",
        unit="m",
        help="Suspended: of the floor above the outside ground. Unheated basement: of its walls above ground.",
        ge=0,
        le=5,
    )
    outer_wall_u_value: float | None = number(
        "Wall U-value above ground",
        unit="W/(m²·K)",
        help="Of the walls around the space below, above ground. Suspended floor and unheated basement.",
        gt=0,
        le=6,
    )
    vent_area: float | None = number(
        "Vent area",
        unit="m²/m",
        help="Suspended: ventilation openings per metre of perimeter. Usual 0.0015 to 0.003.",
        ge=0,
        le=0.1,
    )
    wind_speed: float = number(
        "Wind speed",
        unit="m/s",
        help="Suspended: yearly mean at 10 m height.",
        default=4.0,
        default_note="common practice",
        ge=0,
        le=15,
    )
    ground_resistance: float = number(
        "Ground insulation",
        unit="m²·K/W",
        help="Suspended: resistance of insulation on the ground below. Unheated basement: of its floor.",
        default=0.0,
        default_note="not insulated",
        ge=0,
        le=20,
    )
    basement_depth: float | None = number(
        "Basement depth", unit="m", help="Of the basement floor below the outside ground.", gt=0, le=20
    )
    basement_wall: str = name_from("Build-ups", "Basement wall", help="Layers of the walls in the ground.")
    basement_volume: float | None = number(
        "Basement volume", unit="m³", help="Unheated basement: air volume.", gt=0, le=1_000_000
    )
    basement_air_change: float = number(
        "Basement air change",
        unit="1/h",
        help="Unheated basement.",
        default=0.3,
        default_note="ISO 13370:2017, 7.5; recalled from memory",
        ge=0,
        le=10,
    )


class ThermalBridgeRow(SheetRow):
    """A linear or point thermal bridge to outdoors or to another zone."""

    sheet: ClassVar[str] = "Thermal bridges"
    purpose: ClassVar[str] = "Extra heat flow at edges, junctions and fixings (ISO 14683, ISO 10211)."

    name: str = text("Thermal bridge", help="Unique name, e.g. Eaves south.", required=True)
    zone: str = name_from("Zones", "Zone", help="The zone that loses the heat.", required=True)
    faces: str = name_from(
        "Zones", "Faces", help="Outdoors, or the zone it leads to. Empty: outdoors.", words=(OUTDOORS,)
    )
    length: float | None = number("Length", unit="m", help="Of a linear bridge.", ge=0, le=1_000_000)
    linear_transmittance: float | None = number(
        "Linear transmittance ψ",
        unit="W/(m·K)",
        help="From a catalogue, a calculation by ISO 10211 or ISO 14683; for the dimensions stated on Project.",
        ge=-2,
        le=5,
    )
    count: int | None = integer("Number", help="How many point bridges.", ge=0, le=1_000_000)
    point_transmittance: float | None = number(
        "Point transmittance χ", unit="W/K", help="Of one point bridge.", ge=-5, le=50
    )
