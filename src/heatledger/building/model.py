"""What a building is made of: frozen, in SI units, names resolved; each part knows the row it came from."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal, TypeAlias

from heatledger.building.defaults import DefaultUsed
from heatledger.building.monthlytable import MonthlyTable
from heatledger.building.shading import Obstruction, ShadingDevice
from heatledger.inputs.rows import (
    BuildUpRow,
    ElementRow,
    GlazedUnitRow,
    GroundFloorRow,
    OpeningRow,
    ProjectRow,
    ThermalBridgeRow,
    UsageRow,
    ZoneRow,
)

__all__ = [
    "AirSystem",
    "BuildUp",
    "Building",
    "EdgeInsulation",
    "Element",
    "Fasteners",
    "GlazedUnit",
    "GroundFloor",
    "Layer",
    "MaterialSource",
    "Opening",
    "Panes",
    "Project",
    "SecondMaterial",
    "Shutter",
    "ThermalBridge",
    "Usage",
    "Voids",
    "Zone",
]

AirLayer: TypeAlias = Literal["", "unventilated", "slightly ventilated", "well ventilated"]
"""Kind of an air layer; empty for a layer of material."""

GapLevel: TypeAlias = Literal["none", "minor", "major"]
"""Gaps in insulation: none, through the layer, with air moving behind it."""

ShutterTightness: TypeAlias = Literal["very high", "high", "average", "low", "tight"]
"""Air permeability of a closed shutter."""


@dataclass(frozen=True)
class SecondMaterial:
    """What bridges a layer, and the share of the face it takes [-]; figures as of a layer."""

    material: str
    conductivity: float
    density: float
    specific_heat: float
    share: float


@dataclass(frozen=True)
class Voids:
    """Air voids of a block: width and depth of one [m], share of the face in each row [-], rows of them."""

    width: float
    depth: float
    share: float
    rows: int


@dataclass(frozen=True)
class Fasteners:
    """Metal through insulation: number [1/m²], conductivity [W/(m·K)], cross-section of one [m²], length in it [m]."""

    number: float
    conductivity: float
    cross_section: float
    depth: float | None
    """None: through the whole layer."""


@dataclass(frozen=True)
class Layer:
    """One layer of a build-up: thickness [m], conductivity [W/(m·K)], density [kg/m³], specific heat [J/(kg·K)]."""

    material: str
    thickness: float
    conductivity: float
    density: float
    specific_heat: float
    air: AirLayer
    origin: BuildUpRow
    second: SecondMaterial | None = None
    voids: Voids | None = None
    inner_emissivity: float = 0.9
    outer_emissivity: float = 0.9
    """Of the faces of an air layer or of voids. [-]"""
    air_openings: float = 1000.0
    """Of a slightly ventilated air layer. [mm²/m]"""
    fasteners: Fasteners | None = None
    gaps: GapLevel = "none"
    rain: float | None = None
    """Under the insulation of an inverted roof. [mm/d]"""
    drainage: float = 0.04
    """Share of the rain that is drained times what it takes along. [W·d/(m²·K·mm)]"""
    taper: str = "none"
    """Shape in plan of a layer that falls to nothing; its thickness is the greatest one."""


@dataclass(frozen=True)
class BuildUp:
    """Layers of an opaque element, inside first."""

    name: str
    layers: tuple[Layer, ...]


@dataclass(frozen=True)
class Panes:
    """Glass for U by EN 673: number of panes, gap between them [m], its gas, emissivity of the coating [-]."""

    number: int
    gap: float
    gas: str
    coating: float | None
    """None: no coating."""


@dataclass(frozen=True)
class Shutter:
    """A shutter: own resistance [m²·K/W], air permeability when closed, share of the time it is closed [-]."""

    resistance: float
    tightness: ShutterTightness
    closed_share: float


@dataclass(frozen=True)
class GlazedUnit:
    """Glass with frame: g at normal incidence [-], and U of the whole or what it is made of [W/(m²·K)]."""

    name: str
    u_value: float | None
    """Of the whole, as declared; None: from its parts."""
    g_value: float
    frame_share: float
    """[-]"""
    origin: GlazedUnitRow
    frame_width: float | None = None
    """Replaces the frame share. [m]"""
    glazing_u_value: float | None = None
    frame_u_value: float | None = None
    edge: float = 0.0
    """ψ of the glass edge. [W/(m·K)]"""
    panes: Panes | None = None
    shutter: Shutter | None = None


@dataclass(frozen=True)
class Opening:
    """Alike windows, doors or rooflights: size of one [m] and their number."""

    name: str
    glazed_unit: GlazedUnit
    width: float
    height: float
    count: int
    obstruction: Obstruction | None
    """Its own, else that of its element."""
    shading: ShadingDevice | None
    origin: OpeningRow

    @property
    def area(self) -> float:
        """Of all of them. [m²]"""
        return self.count * self.width * self.height


@dataclass(frozen=True)
class Element:
    """An opaque face: gross area [m²], azimuth and tilt [°], U-value [W/(m²·K)] where no build-up is given."""

    name: str
    zone: str
    kind: str
    faces: str
    """``outdoors``, ``neighbour`` or the name of the zone behind; the own zone for an inner partition."""
    build_up: BuildUp | None
    u_value: float | None
    gross_area: float
    azimuth: float | None
    tilt: float
    absorptance: float
    openings: tuple[Opening, ...]
    obstruction: Obstruction | None
    """Only its skyline counts for the element itself."""
    origin: ElementRow

    @property
    def net_area(self) -> float:
        """Area without openings. [m²]"""
        return max(self.gross_area - sum(opening.area for opening in self.openings), 0.0)

    @property
    def faces_outdoors(self) -> bool:
        """Whether outdoor air, sun and sky are behind it."""
        return self.faces == "outdoors"


@dataclass(frozen=True)
class EdgeInsulation:
    """A strip along the edge of a slab: its width or depth [m], resistance [m²·K/W], thickness [m]."""

    vertical: bool
    depth: float
    resistance: float
    thickness: float


@dataclass(frozen=True)
class GroundFloor:
    """A floor with the ground beneath it; what its type has no use for is 0 or None."""

    name: str
    zone: str
    type: str
    area: float
    """[m²]"""
    perimeter: float
    """Exposed. [m]"""
    build_up: BuildUp | None
    """Of the floor of the zone."""
    u_value: float | None
    """Where no build-up is given, with the surface resistances 0.17 and 0.04 m²·K/W. [W/(m²·K)]"""
    wall_thickness: float
    """[m]"""
    soil: str
    edge: EdgeInsulation | None
    height: float
    """Of the space below, above the ground outside. [m]"""
    outer_wall_u_value: float
    """Of the space below, above the ground outside. [W/(m²·K)]"""
    vent_area: float
    """[m²/m]"""
    wind_speed: float
    """[m/s]"""
    ground_resistance: float
    """Of the floor of the space below. [m²·K/W]"""
    depth: float
    """Of the basement's floor below the ground outside. [m]"""
    basement_wall: BuildUp | None
    """In the ground."""
    basement_volume: float
    """[m³]"""
    basement_air_change: float
    """[1/h]"""
    origin: GroundFloorRow

    @property
    def wall_area(self) -> float:
        """Walls in the ground that enclose the zone itself. [m²]"""
        return self.depth * self.perimeter if self.type == "heated basement" else 0.0


@dataclass(frozen=True)
class ThermalBridge:
    """Extra heat flow: ψ·l + χ·n. [W/K]"""

    name: str
    zone: str
    faces: str
    """``outdoors`` or the name of the zone it leads to."""
    coefficient: float
    origin: ThermalBridgeRow


@dataclass(frozen=True)
class AirSystem:
    """How outdoor air comes in: rate [1/h or m³/(h·m²)], running share of the day [-], heat recovery [-]."""

    name: str
    kind: str
    rate_basis: str
    rate: float | None
    running_share: float
    heat_recovery: float
    bypass: bool
    frost_limit: float | None
    """Outdoor temperature below which no more heat is recovered than at it. [°C]"""
    fan_power: float
    """Per outdoor air flow. [W/(m³/h)]"""
    night_cooling: float
    """Additional air change of the night. [1/h]"""
    night_cooling_months: tuple[int, ...]


@dataclass(frozen=True)
class Usage:
    """Set-points [°C]; hours and days in use; people [1/m²], their heat [W] and presence [-]; electricity [W/m²]."""

    name: str
    heating_set_point: float
    cooling_set_point: float
    setback: float | None
    """[°C]"""
    heated_hours: float
    """On a day in use. [h]"""
    days_in_use: float
    """In a week. [d]"""
    months_out_of_use: tuple[int, ...]
    people_per_area: float
    heat_per_person: float
    presence: float
    electric_gains: float
    air_per_person: float
    """While present. [m³/h]"""
    air_per_area: float
    """[m³/(h·m²)]"""
    standard: bool
    """Whether it is one of the shipped standard profiles, unchanged."""
    origin: UsageRow

    @property
    def internal_gains(self) -> float:
        """Mean heat of people and appliances per floor area. [W/m²]"""
        return self.people_per_area * self.heat_per_person * self.presence + self.electric_gains


@dataclass(frozen=True)
class Zone:
    """A space with one set-point: floor area [m²], volume [m³], leakage at 50 Pa [1/h], capacity [J/(m²·K)]."""

    name: str
    conditioning: str
    usage: Usage | None
    air_system: AirSystem | None
    floor_area: float
    volume: float
    thermal_mass: str
    heat_capacity: float | None
    heating_set_point: float
    cooling_set_point: float
    leakage: float
    several_facades: bool
    origin: ZoneRow

    @property
    def conditioned(self) -> bool:
        """Whether the zone is heated."""
        return self.conditioning != "unconditioned"

    @property
    def cooled(self) -> bool:
        """Whether the zone is cooled."""
        return self.conditioning == "heated and cooled"


@dataclass(frozen=True)
class Project:
    """What holds for the whole building."""

    name: str
    client: str
    assessor: str
    job_number: str
    address: str
    weather: str
    altitude: float | None
    latitude: float | None
    longitude: float | None
    time_zone: float | None
    ground_reflectance: float
    glass_by_hour: bool
    """Whether sun through glass follows the angle of every hour."""
    exposure: Literal["open", "normal", "sheltered"]
    dimensions: str
    sea_level_air: bool
    method: str
    design_inside: float
    """For the temperatures inside the build-ups. [°C]"""
    design_outside: float | None
    """None: mean of the coldest month. [°C]"""
    compared: tuple[BuildUp, BuildUp] | None
    """Build-ups to be set side by side."""
    origin: ProjectRow
    monthly_climate: MonthlyTable | None = None
    """Where the weather is a monthly table."""


@dataclass(frozen=True)
class MaterialSource:
    """Where the values of a material in use come from, if not from an unchanged shipped row."""

    name: str
    own: bool
    """Values of the user, else the shipped table because the sheet has no such row."""
    source: str
    sheet: str
    cell: str


@dataclass(frozen=True)
class Building:
    """The whole building as the balance takes it."""

    project: Project
    zones: tuple[Zone, ...]
    elements: tuple[Element, ...]
    ground_floors: tuple[GroundFloor, ...]
    thermal_bridges: tuple[ThermalBridge, ...]
    defaults: tuple[DefaultUsed, ...]
    materials: tuple[MaterialSource, ...]
