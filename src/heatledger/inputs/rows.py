"""The input sheets: one row model per sheet, in the order of the workbook."""

from __future__ import annotations

from dataclasses import dataclass
from typing import ClassVar, Literal, TypeAlias, get_args

from heatledger.inputs.cells import reference
from heatledger.inputs.columns import SheetRow, azimuth, choice, integer, months, name_from, number, text
from heatledger.inputs.shadingrows import ObstructionRow, ShadingDeviceRow

__all__ = [
    "AIR_LAYERS",
    "MONTHLY_TABLE",
    "MONTHS",
    "NEIGHBOUR",
    "OUTDOORS",
    "SHEETS",
    "AirSystemRow",
    "BuildUpRow",
    "ElementRow",
    "GlazedUnitRow",
    "GroundFloorRow",
    "MaterialRow",
    "MonthlyClimateRow",
    "ObstructionRow",
    "OpeningRow",
    "ProjectRow",
    "Rows",
    "ShadingDeviceRow",
    "ThermalBridgeRow",
    "UsageRow",
    "ZoneRow",
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


class ProjectRow(SheetRow):
    """What holds for the whole building; labels in column A, values in column B."""

    sheet: ClassVar[str] = "Project"
    purpose: ClassVar[str] = "What holds for the whole building. Fill in column B."
    unique: ClassVar[bool] = False
    required_sheet: ClassVar[bool] = True
    labelled: ClassVar[bool] = True

    project: str = text("Project", help="Name of the building or job, printed on every result page.", required=True)
    client: str = text("Client", help="Printed on the summary.")
    assessor: str = text("Assessor", help="Printed on the summary.")
    job_number: str = text("Job number", help="Printed on the summary.")
    address: str = text("Address", help="Printed on the summary.")
    weather: str = text(
        "Weather",
        help="Name of a shipped climate (see: heatledger weather list); or the path of an hourly file as seen from the "
        "folder of this workbook (EPW, TMY3, TMY2, PVGIS, NSRDB); or: monthly table, for sheet Monthly climate.",
        required=True,
    )
    altitude: float | None = number(
        "Altitude",
        unit="m",
        help="Of the building, above sea level. Thinner air carries less heat. Empty: altitude of the weather file; "
        "sea level with a monthly table.",
        default_note="altitude of the weather file",
        ge=-430,
        le=5500,
    )
    latitude: float | None = number(
        "Latitude",
        unit="°",
        help="North positive. Needed with a monthly table, else only to correct the weather file. Empty: as in the "
        "weather file.",
        default_note="latitude of the weather file",
        ge=-66,
        le=72,
    )
    longitude: float | None = number(
        "Longitude",
        unit="°",
        help="East positive. Only to correct what the weather file states. Empty: as in the weather file; with a "
        "monthly table, in the middle of the time zone.",
        default_note="longitude of the weather file",
        ge=-180,
        le=180,
    )
    time_zone: float | None = number(
        "Time zone",
        unit="h",
        help="Standard time ahead of UTC. Only to correct what the weather file states. Empty: as in the weather file; "
        "with a monthly table, by the longitude.",
        default_note="time zone of the weather file",
        ge=-12,
        le=14,
    )
    ground_reflectance: float = number(
        "Ground reflectance",
        unit="-",
        help="Share of the sunlight that the ground before the façades reflects. Grass or paving 0.2, snow 0.7.",
        default=0.2,
        default_note="common practice",
        ge=0,
        le=1,
    )
    site_exposure: Literal["open", "normal", "sheltered"] = choice(
        "Site exposure",
        help="To wind. Open: country or high-rise. Normal: suburb, trees around. Sheltered: city centre, forest.",
        default="normal",
        default_note="moderate shielding, ISO 13789:1999",
    )
    dimensions: Literal["internal", "overall internal", "external"] = choice(
        "Dimensions measured",
        help="How areas were taken. The linear transmittances must belong to the same kind of dimensions (ISO 14683).",
        default="external",
        default_note="common practice",
    )
    air_density: Literal["at site altitude", "sea level"] = choice(
        "Air density",
        help="At site altitude follows the pressure of the place; sea level keeps 1200 J/(m³·K) everywhere.",
        default="at site altitude",
        default_note="physics; some codes prescribe sea level",
    )
    glass_angle: Literal["by standard factor", "by hour"] = choice(
        "Angle of incidence",
        help="Sun through glass at an angle. By standard factor: 0.9 of the g-value. By hour: the angle of every hour "
        "(Karlsson and Roos 2000); needs hourly weather.",
        default="by standard factor",
        default_note="F_w = 0.9, ISO 13790:2008, 11.4.2",
    )
    design_inside: float = number(
        "Design inside temperature",
        unit="°C",
        help="For the temperatures inside the build-ups on sheet Build-up results; changes no need.",
        default=20.0,
        default_note="common practice",
        ge=5,
        le=35,
    )
    design_outside: float | None = number(
        "Design outside temperature",
        unit="°C",
        help="For the temperatures inside the build-ups. Empty: mean of the coldest month.",
        default_note="mean of the coldest month",
        ge=-60,
        le=30,
    )
    compared: str = name_from("Build-ups", "Compare build-up", help="Set side by side on sheet Build-up results.")
    compared_with: str = name_from("Build-ups", "With build-up", help="The second one of the comparison.")
    method: Literal["EN ISO 52016-1:2017", "ISO 13790:2008"] = choice(
        "Method",
        help="Monthly method. The newer edition leaves out the need of months with far too much gain or loss.",
        default="EN ISO 52016-1:2017",
        default_note="current edition",
    )

    def cell(self, field: str = "") -> str:
        """Value cell of a label; labels stand in column A, values in column B."""
        return reference(self._positions.get(field, 1), 2)


class ZoneRow(SheetRow):
    """A space with one set-point."""

    sheet: ClassVar[str] = "Zones"
    purpose: ClassVar[str] = "One row per zone: a space, or several, with one set-point and one use."
    required_sheet: ClassVar[bool] = True

    name: str = text("Zone", help="Unique name, e.g. Flat 1.", required=True)
    conditioning: Literal["heated", "heated and cooled", "unconditioned"] = choice(
        "Conditioning",
        help="Unconditioned: stairs, lofts, cellars, garages. Their temperature is calculated.",
        required=True,
    )
    usage: str = name_from("Usage", "Usage", help="Row of sheet Usage. May stay empty for an unconditioned zone.")
    air_system: str = name_from(
        "Air systems",
        "Air system",
        help="Row of sheet Air systems. Empty: leakage only, which is not enough fresh air.",
    )
    floor_area: float = number(
        "Floor area", unit="m²", help="Useful floor area of the zone.", required=True, gt=0, le=1_000_000
    )
    air_volume: float = number(
        "Air volume",
        unit="m³",
        help="Inner volume: floor area times clear height.",
        required=True,
        gt=0,
        le=10_000_000,
    )
    thermal_mass: Literal["from build-ups", "very light", "light", "medium", "heavy", "very heavy"] = choice(
        "Thermal mass",
        help="From build-ups: calculated from the layers (ISO 13786). Or a class of ISO 13790:2008, table 12.",
        default="from build-ups",
        default_note="calculated by ISO 13786",
    )
    heat_capacity: float | None = number(
        "Heat capacity",
        unit="kJ/(m²·K)",
        help="Per floor area. A figure here replaces the thermal mass column.",
        gt=0,
        le=2000,
    )
    heating_set_point: float | None = number(
        "Heating set-point",
        unit="°C",
        help="Replaces the set-point of the usage for this zone.",
        default_note="",
        ge=0,
        le=40,
    )
    cooling_set_point: float | None = number(
        "Cooling set-point", unit="°C", help="Replaces the set-point of the usage for this zone.", ge=0, le=60
    )
    leakage: float = number(
        "Leakage n50",
        unit="1/h",
        help="Air changes at 50 Pa, best from a pressure test. Typical: 1 new and tight, 3 ordinary new, 6 older, "
        "10 leaky (common practice, no source).",
        default=6.0,
        default_note="common practice for an untested older building, no source",
        ge=0,
        le=50,
    )
    exposed_facades: Literal["one", "several"] = choice(
        "Exposed façades",
        help="How many façades of the zone stand in the wind.",
        default="several",
        default_note="the usual case, more infiltration",
    )


class UsageRow(SheetRow):
    """Set-points, people and appliances of a kind of use."""

    sheet: ClassVar[str] = "Usage"
    purpose: ClassVar[str] = "Set-points, people, appliances and fresh air of each kind of use. Change or add rows."
    required_sheet: ClassVar[bool] = True

    name: str = text("Usage", help="Unique name. The prefilled rows follow ISO 13790:2008, table G.12.", required=True)
    heating_set_point: float = number(
        "Heating set-point",
        unit="°C",
        help="Temperature kept in the heating season.",
        required=True,
        ge=0,
        le=40,
    )
    cooling_set_point: float = number(
        "Cooling set-point",
        unit="°C",
        help="Temperature not to be passed in summer.",
        required=True,
        ge=0,
        le=60,
    )
    setback: float | None = number(
        "Setback temperature",
        unit="°C",
        help="Kept in hours, on days and in months without use. Needed where these are given.",
        ge=0,
        le=40,
    )
    heated_hours: float = number(
        "Heated hours per day",
        unit="h",
        help="At the heating set-point on a day in use; the setback temperature holds in the others.",
        default=24.0,
        default_note="day and night",
        gt=0,
        le=24,
    )
    days_in_use: float = number(
        "Days in use per week",
        unit="d",
        help="Days a week at the set-points; on the others the setback temperature holds and nothing is cooled.",
        default=7.0,
        default_note="every day",
        gt=0,
        le=7,
    )
    area_per_person: float | None = number(
        "Floor area per person",
        unit="m²",
        help="Empty: no people.",
        default_note="no people",
        gt=0,
        le=10_000,
    )
    heat_per_person: float = number(
        "Heat per person",
        unit="W",
        help="Sensible heat of one person present. Seated about 70, light work 80–100.",
        default=70.0,
        default_note="ISO 13790:2008, table G.12, dwellings",
        ge=0,
        le=1000,
    )
    presence: float = number(
        "Presence",
        unit="h/d",
        help="Hours a day people are present, mean of all days of the year.",
        default=12.0,
        default_note="ISO 13790:2008, table G.12, dwellings",
        ge=0,
        le=24,
    )
    appliances: float = number(
        "Appliances",
        unit="kWh/(m²·a)",
        help="Electricity per floor area. The prefilled figures include lighting.",
        default=0.0,
        default_note="none stated",
        ge=0,
        le=5000,
    )
    lighting: float = number(
        "Lighting",
        unit="kWh/(m²·a)",
        help="Electricity of lighting where it is not part of the appliances figure.",
        default=0.0,
        default_note="none stated",
        ge=0,
        le=1000,
    )
    share_released: float = number(
        "Share released in zone",
        unit="%",
        help="Share of the electricity that ends as heat in the zone.",
        default=100.0,
        default_note="all of it stays",
        ge=0,
        le=100,
    )
    air_per_person: float = number(
        "Outdoor air per person",
        unit="m³/h",
        help="Counts with rate basis usage, for all people while the system runs. Typical 15–36; local code decides.",
        default=0.0,
        default_note="none stated",
        ge=0,
        le=1000,
    )
    air_per_area: float = number(
        "Outdoor air per floor area",
        unit="m³/(h·m²)",
        help="Counts with rate basis usage, while the system runs. Typical 0.7 in dwellings; local code decides.",
        default=0.0,
        default_note="none stated",
        ge=0,
        le=500,
    )
    months_out_of_use: tuple[int, ...] = months(
        "Months out of use",
        help="Holidays, such as 7-8: heated to the setback temperature only, not cooled, nobody there, air system off.",
    )


class AirSystemRow(SheetRow):
    """How outdoor air comes in."""

    sheet: ClassVar[str] = "Air systems"
    purpose: ClassVar[str] = "How outdoor air reaches the zones."

    name: str = text("Air system", help="Unique name, e.g. Windows, Heat recovery unit.", required=True)
    kind: Literal["natural", "extract", "supply", "balanced"] = choice(
        "Kind",
        help="Natural: windows and shafts; the larger of rate and leakage counts. Others: fans; leakage comes on top.",
        required=True,
    )
    rate_basis: Literal["air changes", "floor area", "usage"] = choice(
        "Rate basis",
        help="Air changes: rate in 1/h of the air volume. Floor area: rate in m³/(h·m²). Usage: people and area "
        "of the usage; the rate stays empty.",
        default="air changes",
        default_note="rate read as air changes per hour",
    )
    rate: float | None = number(
        "Rate",
        unit="1/h or m³/(h·m²)",
        help="While running. Dwellings about 0.5 1/h (common practice); local code decides.",
        default_note="",
        ge=0,
        le=1000,
    )
    running_hours: float = number(
        "Running hours per day",
        unit="h",
        help="Mean over the week.",
        default=24.0,
        default_note="runs day and night",
        ge=0,
        le=24,
    )
    heat_recovery: float = number(
        "Heat recovery",
        unit="%",
        help="Temperature efficiency of a balanced system, as tested. Typical 70–85 (common practice, no source).",
        default=0.0,
        default_note="no heat recovery",
        ge=0,
        le=98,
    )
    bypass: YesNo = choice(
        "Bypass in cooling",
        help="Yes: heat recovery is off when cooling is needed.",
        default="yes",
        default_note="usual in new units",
    )
    frost_limit: float | None = number(
        "Frost limit",
        unit="°C",
        help="Outdoor temperature below which heat recovery is held back, lest the exhaust freezes. Empty: no limit.",
        default_note="no limit",
        ge=-30,
        le=10,
    )
    fan_power: float = number(
        "Specific fan power",
        unit="W/(m³/h)",
        help="Of all fans per outdoor air flow. Extract 0.15, balanced 0.3–0.45 (common practice, no source).",
        default=0.0,
        default_note="not stated",
        ge=0,
        le=5,
    )
    night_cooling: float = number(
        "Night cooling",
        unit="1/h",
        help="Additional air change for 8 hours of the night, counted against the cooling need at the mean outdoor "
        "temperature of the month. Needs months.",
        default=0.0,
        default_note="none",
        ge=0,
        le=20,
    )
    night_cooling_months: tuple[int, ...] = months(
        "Night cooling months", help="Such as 5-9. Local security, noise and rain decide whether windows can stay open."
    )


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


class GroundFloorRow(SheetRow):
    """A floor in contact with the ground."""

    sheet: ClassVar[str] = "Ground floors"
    purpose: ClassVar[str] = "Floors on the ground, calculated with the ground beneath them (ISO 13370)."

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


class MonthlyClimateRow(SheetRow):
    """A month of a climate that is known by its monthly means and sums."""

    sheet: ClassVar[str] = "Monthly climate"
    purpose: ClassVar[str] = (
        "Twelve months of a place without an hourly file. Counts only if Weather on sheet Project is: monthly table."
    )

    month: Month = choice("Month", help="January to December, each once.", required=True)
    temperature: float | None = number(
        "Mean outdoor temperature",
        unit="°C",
        help="Mean of the month, day and night. Needed if the table counts.",
        ge=-60,
        le=50,
    )
    irradiation: float | None = number(
        "Global horizontal irradiation",
        unit="kWh/m²",
        help="Sum of the month on the horizontal, direct and diffuse: the mean of a day times the days. 1 kWh = 3.6 "
        "MJ. Needed if the table counts.",
        ge=0,
        le=400,
    )
    diffuse_share: float | None = number(
        "Diffuse share",
        unit="%",
        help="Of the global horizontal irradiation. Empty: estimated hour by hour (Erbs, Klein and Duffie 1982).",
        default_note="estimated hour by hour (Erbs, Klein and Duffie 1982)",
        ge=0,
        le=100,
    )


SHEETS: tuple[type[SheetRow], ...] = (
    ProjectRow,
    ZoneRow,
    UsageRow,
    AirSystemRow,
    MaterialRow,
    BuildUpRow,
    GlazedUnitRow,
    ElementRow,
    OpeningRow,
    ObstructionRow,
    ShadingDeviceRow,
    GroundFloorRow,
    ThermalBridgeRow,
    MonthlyClimateRow,
)
"""The input sheets in the order of the workbook."""


@dataclass(frozen=True)
class Rows:
    """The checked rows of every input sheet."""

    project: ProjectRow
    zones: tuple[ZoneRow, ...]
    usages: tuple[UsageRow, ...]
    air_systems: tuple[AirSystemRow, ...]
    materials: tuple[MaterialRow, ...]
    build_ups: tuple[BuildUpRow, ...]
    glazed_units: tuple[GlazedUnitRow, ...]
    elements: tuple[ElementRow, ...]
    openings: tuple[OpeningRow, ...]
    obstructions: tuple[ObstructionRow, ...]
    shading_devices: tuple[ShadingDeviceRow, ...]
    ground_floors: tuple[GroundFloorRow, ...]
    thermal_bridges: tuple[ThermalBridgeRow, ...]
    monthly_climate: tuple[MonthlyClimateRow, ...] = ()

    def of(self, sheet: str) -> tuple[SheetRow, ...]:
        """All rows of an input sheet."""
        tables: tuple[tuple[SheetRow, ...], ...] = (
            (self.project,),
            self.zones,
            self.usages,
            self.air_systems,
            self.materials,
            self.build_ups,
            self.glazed_units,
            self.elements,
            self.openings,
            self.obstructions,
            self.shading_devices,
            self.ground_floors,
            self.thermal_bridges,
            self.monthly_climate,
        )
        return dict(zip((model.sheet for model in SHEETS), tables, strict=True))[sheet]
