"""How well each element and ground floor insulates: build-ups as they stand in the building."""

from __future__ import annotations

from dataclasses import dataclass

from heatledger.building.model import Building, BuildUp, Element, GroundFloor, Layer
from heatledger.results import Months
from heatledger.standards.iso6946 import (
    Direction,
    Facing,
    SurfaceResistances,
    direction_of_heat_flow,
    layer_resistance,
    surface_resistances,
)
from heatledger.standards.iso6946_air import air_layer_resistance, slightly_ventilated_resistance
from heatledger.standards.iso6946_bridged import homogeneous, total_resistance
from heatledger.standards.iso13370 import (
    SOILS,
    characteristic_dimension,
    equivalent_thickness,
    periodic_depth,
    slab_transmittance,
)
from heatledger.standards.iso13370_monthly import PHASES, coldest_month, equivalent_temperature, slab_periodic

__all__ = ["Construction", "Constructions", "GroundCoupling", "construct", "layer_resistances"]

SLIGHTLY_VENTILATED_OPENINGS = 1000.0
"""Openings of a slightly ventilated air layer where none are stated: the middle of its range. [mm²/m]"""


@dataclass(frozen=True)
class Construction:
    """A build-up in one position: resistances from inside to outside. [m²·K/W]"""

    build_up: BuildUp
    direction: Direction
    facing: Facing
    surfaces: SurfaceResistances
    resistances: tuple[float, ...]
    total: float

    @property
    def position(self) -> tuple[str, Direction, Facing]:
        """What tells it from other positions and build-ups."""
        return self.build_up.name, self.direction, self.facing

    @property
    def u_value(self) -> float:
        """Thermal transmittance. [W/(m²·K)]"""
        return 1 / self.total


@dataclass(frozen=True)
class GroundCoupling:
    """A ground floor as a heat path: U with the ground, H_g and the equivalent temperature behind it."""

    u_value: float
    """[W/(m²·K)]"""
    coefficient: float
    """[W/K]"""
    temperature: Months
    """[°C]"""


@dataclass(frozen=True)
class Constructions:
    """What was worked out for the elements and ground floors."""

    u_values: dict[str, float]
    """By element name. [W/(m²·K)]"""
    of_element: dict[str, Construction]
    """By element name, where a build-up is given."""
    of_floor: dict[str, Construction]
    """By ground floor name, where a build-up is given; without the ground."""
    ground: dict[str, GroundCoupling]
    """By ground floor name."""

    @property
    def used(self) -> tuple[Construction, ...]:
        """Every build-up in every position it has, once, by name."""
        all_of_them = [*self.of_element.values(), *self.of_floor.values()]
        distinct = {found.position: found for found in all_of_them}
        return tuple(distinct[key] for key in sorted(distinct))


def construct(building: Building, outdoor: Months, latitude: float) -> Constructions:
    """Work out the U-value of every element and the ground coupling of every ground floor.

    Parameters
    ----------
    building : Building
        The building.
    outdoor : ndarray, shape (12,)
        Monthly outdoor temperature. [°C]
    latitude : float
        Of the place; tells the coldest month. [°]

    Returns
    -------
    Constructions
    """
    of_element = {
        element.name: construction(element.build_up, direction_of_heat_flow(element.tilt), _facing(element))
        for element in building.elements
        if element.build_up is not None
    }
    u_values = {
        element.name: of_element[element.name].u_value if element.build_up else element.u_value or 0.0
        for element in building.elements
    }
    of_floor = {
        floor.name: construction(floor.build_up, "down", "outdoors")
        for floor in building.ground_floors
        if floor.build_up is not None
    }
    ground = {floor.name: _ground_coupling(floor, outdoor, latitude) for floor in building.ground_floors}
    return Constructions(u_values, of_element, of_floor, ground)


def _facing(element: Element) -> Facing:
    return "outdoors" if element.faces_outdoors else "zone"


def construction(build_up: BuildUp, direction: Direction, facing: Facing) -> Construction:
    """A build-up in one position.

    A well ventilated air layer and all layers outside it are left out and still air stands before the face
    beyond; a slightly ventilated one lies half way between that and an unventilated one (ISO 6946:2017, 6.9).
    """
    surfaces = surface_resistances(direction, facing)
    resistances = layer_resistances(build_up.layers, direction)
    sheltered = surface_resistances(direction, "ventilated cavity")
    inner = _layers_inside(build_up.layers, "well ventilated")
    if inner < len(build_up.layers):
        resistances, surfaces = resistances[:inner], sheltered
    total = total_resistance([homogeneous(value) for value in resistances], surfaces).total
    slightly = _layers_inside(build_up.layers, "slightly ventilated")
    if slightly < len(resistances):
        without = total_resistance([homogeneous(value) for value in resistances[:slightly]], sheltered).total
        total = float(slightly_ventilated_resistance(SLIGHTLY_VENTILATED_OPENINGS, total, without))
    return Construction(build_up, direction, facing, surfaces, resistances, total)


def _layers_inside(layers: tuple[Layer, ...], air: str) -> int:
    """Number of layers inside the first air layer of a kind; all of them if there is none."""
    return next((number for number, layer in enumerate(layers) if layer.air == air), len(layers))


def layer_resistances(layers: tuple[Layer, ...], direction: Direction) -> tuple[float, ...]:
    """Resistance of each layer. [m²·K/W]"""
    return tuple(
        float(
            air_layer_resistance(layer.thickness, direction)
            if layer.air
            else layer_resistance(layer.thickness, layer.conductivity)
        )
        for layer in layers
    )


def _ground_coupling(floor: GroundFloor, outdoor: Months, latitude: float) -> GroundCoupling:
    """Slab on the ground with its soil, at a constant temperature inside."""
    soil = SOILS[floor.soil]
    thickness = equivalent_thickness(floor.wall_thickness, soil.conductivity, _floor_resistance(floor))
    u_value = slab_transmittance(characteristic_dimension(floor.area, floor.perimeter), thickness, soil.conductivity)
    periodic = slab_periodic(floor.area, floor.perimeter, thickness, soil.conductivity, periodic_depth(soil))
    coefficient = float(u_value) * floor.area
    _, lag = PHASES["slab"]
    temperature = equivalent_temperature(coefficient, periodic.outside, outdoor, lag, coldest_month(latitude))
    return GroundCoupling(float(u_value), coefficient, temperature)


def _floor_resistance(floor: GroundFloor) -> float:
    """Of the floor construction alone, without surface resistances. [m²·K/W]"""
    if floor.build_up is not None:
        return sum(layer_resistances(floor.build_up.layers, "down"))
    return max(1 / floor.u_value - sum(surface_resistances("down")), 0.0) if floor.u_value else 0.0
