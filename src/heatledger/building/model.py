"""What a building is made of: frozen, in SI units, names resolved; each part knows the row it came from."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal, TypeAlias

from heatledger.building.defaults import DefaultUsed
from heatledger.inputs.rows import (
    ElementRow,
    GlazedUnitRow,
    GroundFloorRow,
    OpeningRow,
    ProjectRow,
    ThermalBridgeRow,
    ZoneRow,
)

__all__ = [
    "AirSystem",
    "BuildUp",
    "Building",
    "Element",
    "GlazedUnit",
    "GroundFloor",
    "Layer",
    "Opening",
    "Project",
    "ThermalBridge",
    "Usage",
    "Zone",
]

AirLayer: TypeAlias = Literal["", "unventilated", "slightly ventilated", "well ventilated"]
"""Kind of an air layer; empty for a layer of material."""


@dataclass(frozen=True)
class Layer:
    """One layer of a build-up: thickness [m], conductivity [W/(m·K)], density [kg/m³], specific heat [J/(kg·K)]."""

    material: str
    thickness: float
    conductivity: float
    density: float
    specific_heat: float
    air: AirLayer


@dataclass(frozen=True)
class BuildUp:
    """Layers of an opaque element, inside first."""

    name: str
    layers: tuple[Layer, ...]


@dataclass(frozen=True)
class GlazedUnit:
    """Glass with frame: U of the whole [W/(m²·K)], g at normal incidence [-], frame share [-]."""

    name: str
    u_value: float
    g_value: float
    frame_share: float
    origin: GlazedUnitRow


@dataclass(frozen=True)
class Opening:
    """Alike windows, doors or rooflights: total area [m²]."""

    name: str
    glazed_unit: GlazedUnit
    area: float
    origin: OpeningRow


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
class GroundFloor:
    """A slab on the ground: area [m²], exposed perimeter [m], wall thickness [m]."""

    name: str
    zone: str
    area: float
    perimeter: float
    build_up: BuildUp | None
    u_value: float | None
    wall_thickness: float
    soil: str
    origin: GroundFloorRow


@dataclass(frozen=True)
class ThermalBridge:
    """Extra heat flow to outdoors: ψ·l + χ·n. [W/K]"""

    name: str
    zone: str
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


@dataclass(frozen=True)
class Usage:
    """Set-points [°C]; people [1/m²], their heat [W] and presence [-]; electricity released [W/m²]; fresh air."""

    name: str
    heating_set_point: float
    cooling_set_point: float
    people_per_area: float
    heat_per_person: float
    presence: float
    electric_gains: float
    air_per_person: float
    """While present. [m³/h]"""
    air_per_area: float
    """[m³/(h·m²)]"""

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
    exposure: Literal["open", "normal", "sheltered"]
    dimensions: str
    sea_level_air: bool
    method: str
    origin: ProjectRow


@dataclass(frozen=True)
class Building:
    """The whole building as the balance takes it."""

    project: Project
    zones: tuple[Zone, ...]
    elements: tuple[Element, ...]
    ground_floors: tuple[GroundFloor, ...]
    thermal_bridges: tuple[ThermalBridge, ...]
    defaults: tuple[DefaultUsed, ...]
