"""Floors on the ground: steady and yearly-swinging heat flow through the soil, by type of floor."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from heatledger.balance.constructions import Construction, Constructions
from heatledger.building.model import Building, GroundFloor
from heatledger.results import Months
from heatledger.standards.iso6946 import surface_resistances
from heatledger.standards.iso13370 import (
    SOILS,
    WIND_SHIELDING,
    Soil,
    additional_thickness,
    characteristic_dimension,
    edge_transmittance,
    equivalent_thickness,
    periodic_depth,
    slab_transmittance,
    suspended_floor_transmittance,
    transmittance_with_edge,
    underfloor_transmittance,
)
from heatledger.standards.iso13370_basement import (
    BasementTransmittance,
    heated_basement,
    unheated_basement_transmittance,
)
from heatledger.standards.iso13370_monthly import (
    PHASES,
    FloorKind,
    PeriodicCoefficients,
    coldest_month,
    equivalent_temperature,
    heated_basement_periodic,
    monthly_heat_flow,
    slab_periodic,
    suspended_floor_periodic,
    unheated_basement_periodic,
)

__all__ = ["GroundCoupling", "ground_couplings"]


@dataclass(frozen=True)
class GroundCoupling:
    """A ground floor as a heat path: what it loses to the ground, steadily and with the swings of the year."""

    kind: FloorKind
    area: float
    """That loses heat: of the floor, with the walls of a heated basement. [m²]"""
    dimension: float
    """Characteristic dimension B′. [m]"""
    thickness: float
    """Equivalent thickness of the lowest floor: d_t, under a suspended floor d_g. [m]"""
    u_value: float
    """On that area. [W/(m²·K)]"""
    periodic: PeriodicCoefficients
    """H_pi and H_pe. [W/K]"""
    outdoor: Months
    """[°C]"""
    coldest: int
    """Month in which the open air is coldest by convention."""

    @property
    def coefficient(self) -> float:
        """H_g. [W/K]"""
        return self.u_value * self.area

    @property
    def phases(self) -> tuple[float, float]:
        """Lead of the swing inside, and lag of the swing outside. [months]"""
        return PHASES[self.kind]

    @property
    def temperature(self) -> Months:
        """Equivalent temperature of the ground for a constant temperature inside. [°C]"""
        lag = self.phases[1]
        return equivalent_temperature(self.coefficient, self.periodic.outside, self.outdoor, lag, self.coldest)

    def heat_flow(self, inside: Months) -> Months:
        """Heat flow into the ground: the standard's for the mean inside, with H_g for departures from it. [W]"""
        mean = float(np.mean(inside))
        constant = np.full(12, mean)
        steady = monthly_heat_flow(self.coefficient, self.periodic, constant, self.outdoor, self.phases, self.coldest)
        return np.asarray(steady + self.coefficient * (inside - mean))


def ground_couplings(
    building: Building, constructions: Constructions, outdoor: Months, latitude: float
) -> dict[str, GroundCoupling]:
    """Work out how every ground floor couples its zone to the ground.

    Parameters
    ----------
    building : Building
        The building.
    constructions : Constructions
        Build-ups of the floors.
    outdoor : ndarray, shape (12,)
        Monthly outdoor temperature. [°C]
    latitude : float
        Of the place; tells the coldest month. [°]

    Returns
    -------
    dict of str to GroundCoupling
        By ground floor name.
    """
    coldest = coldest_month(latitude)
    couplings: dict[str, GroundCoupling] = {}
    for floor in building.ground_floors:
        found = _coupled(
            floor,
            _floor_resistance(floor, constructions.of_floor.get(floor.name)),
            constructions.of_basement_wall.get(floor.name),
            WIND_SHIELDING[building.project.exposure],
        )
        span = float(characteristic_dimension(floor.area, floor.perimeter))
        area = floor.area + floor.wall_area
        couplings[floor.name] = GroundCoupling(
            found.kind, area, span, found.thickness, found.u_value, found.periodic, outdoor, coldest
        )
    return couplings


@dataclass(frozen=True)
class _Ground:
    """What the standard finds for one floor."""

    kind: FloorKind
    thickness: float
    u_value: float
    periodic: PeriodicCoefficients


def _floor_resistance(floor: GroundFloor, found: Construction | None) -> float:
    """Of the floor construction alone, without surface resistances. [m²·K/W]"""
    if found is not None:
        return found.without_surfaces
    return max(1 / floor.u_value - sum(surface_resistances("down")), 0.0) if floor.u_value else 0.0


def _coupled(floor: GroundFloor, resistance: float, wall: Construction | None, shielding: float) -> _Ground:
    soil = SOILS[floor.soil]
    if floor.type == "suspended":
        return _suspended(floor, soil, resistance, shielding)
    if wall is None:
        return _slab(floor, soil, resistance)
    if floor.type == "heated basement":
        return _heated_basement(floor, soil, resistance, wall)
    return _unheated_basement(floor, soil, resistance, wall)


def _slab(floor: GroundFloor, soil: Soil, resistance: float) -> _Ground:
    """Slab on the ground, with or without a strip of insulation along its edge.

    The strip never saves more than the same insulation under the whole floor would, which the formula of the
    standard does not see to: for narrow floors and deep strips it falls below 0.
    """
    ground, delta = soil.conductivity, periodic_depth(soil)
    thickness = float(equivalent_thickness(floor.wall_thickness, ground, resistance))
    span = characteristic_dimension(floor.area, floor.perimeter)
    bare = slab_transmittance(span, thickness, ground)
    strip = floor.edge
    if strip is None:
        periodic = slab_periodic(floor.area, floor.perimeter, thickness, ground, delta)
        return _Ground("slab", thickness, float(bare), periodic)
    more = additional_thickness(strip.resistance, strip.thickness, ground)
    saved = edge_transmittance(strip.depth, thickness, more, ground, vertical=strip.vertical)
    whole = slab_transmittance(span, thickness + more, ground)
    u_value = np.maximum(transmittance_with_edge(bare, saved, span), whole)
    periodic = slab_periodic(
        floor.area,
        floor.perimeter,
        thickness,
        ground,
        delta,
        edge_depth=strip.depth,
        additional=more,
        vertical=strip.vertical,
    )
    kind: FloorKind = "slab with vertical edge insulation" if strip.vertical else "slab with horizontal edge insulation"
    return _Ground(kind, thickness, float(u_value), periodic)


def _suspended(floor: GroundFloor, soil: Soil, resistance: float, shielding: float) -> _Ground:
    """Floor over a space that the wind ventilates."""
    ground = soil.conductivity
    thickness = float(equivalent_thickness(floor.wall_thickness, ground, floor.ground_resistance))
    span = characteristic_dimension(floor.area, floor.perimeter)
    open_air = underfloor_transmittance(
        span,
        height=floor.height,
        wall_transmittance=floor.outer_wall_u_value,
        openings=floor.vent_area,
        wind_speed=floor.wind_speed,
        shielding=shielding,
    )
    above = _between_spaces(resistance)
    u_value = suspended_floor_transmittance(above, slab_transmittance(span, thickness, ground), open_air)
    periodic = suspended_floor_periodic(
        floor.area,
        floor.perimeter,
        ground,
        periodic_depth(soil),
        floor_transmittance=above,
        ground_thickness=thickness,
        underfloor=open_air,
    )
    return _Ground("suspended floor", thickness, float(u_value), periodic)


def _heated_basement(floor: GroundFloor, soil: Soil, resistance: float, wall: Construction) -> _Ground:
    """Floor and walls of a zone below ground; U on both together."""
    thickness, in_wall, steady = _basement(floor, soil, resistance, wall)
    periodic = heated_basement_periodic(
        floor.area,
        floor.perimeter,
        floor.depth,
        soil.conductivity,
        periodic_depth(soil),
        floor_thickness=thickness,
        wall_thickness=in_wall,
    )
    return _Ground("heated basement", thickness, float(steady.effective), periodic)


def _unheated_basement(floor: GroundFloor, soil: Soil, resistance: float, wall: Construction) -> _Ground:
    """Floor of a zone over a cellar that is no zone of its own."""
    thickness, _, steady = _basement(floor, soil, floor.ground_resistance, wall)
    above = _between_spaces(resistance)
    u_value = unheated_basement_transmittance(
        floor.area,
        floor.perimeter,
        floor.depth,
        steady,
        floor_transmittance=above,
        height=floor.height,
        wall_transmittance=floor.outer_wall_u_value,
        air_volume=floor.basement_volume,
        air_changes=floor.basement_air_change,
    )
    periodic = unheated_basement_periodic(
        floor.area,
        floor.perimeter,
        floor.depth,
        soil.conductivity,
        periodic_depth(soil),
        floor_transmittance=above,
        floor_thickness=thickness,
        height=floor.height,
        wall_transmittance=floor.outer_wall_u_value,
        air_volume=floor.basement_volume,
        air_changes=floor.basement_air_change,
    )
    return _Ground("unheated basement", thickness, float(u_value), periodic)


def _basement(
    floor: GroundFloor, soil: Soil, floor_resistance: float, wall: Construction
) -> tuple[float, float, BasementTransmittance]:
    """Equivalent thickness of a basement's floor and of its walls, and what both transmit."""
    ground = soil.conductivity
    thickness = float(equivalent_thickness(floor.wall_thickness, ground, floor_resistance))
    in_wall = float(equivalent_thickness(0.0, ground, wall.without_surfaces, *surface_resistances("horizontal")))
    steady = heated_basement(
        floor.area, floor.perimeter, floor.depth, ground, floor_thickness=thickness, wall_thickness=in_wall
    )
    return thickness, in_wall, steady


def _between_spaces(resistance: float) -> float:
    """U_f of a floor with still air on both faces. [W/(m²·K)]"""
    return 1 / (resistance + sum(surface_resistances("down", "zone")))
