"""How well each element, opening and ground floor insulates: build-ups as they stand in the building."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, replace
from functools import partial
from typing import TypeAlias

from heatledger.balance.openings import OpeningProperties, opening_properties
from heatledger.balance.sections import Slice, slices_of
from heatledger.building.model import Building, BuildUp, Element, Layer
from heatledger.standards.iso6946 import (
    Direction,
    Facing,
    SurfaceResistances,
    direction_of_heat_flow,
    surface_resistances,
)
from heatledger.standards.iso6946_air import slightly_ventilated_resistance
from heatledger.standards.iso6946_bridged import TotalResistance, mean_resistances, total_resistance
from heatledger.standards.iso6946_corrections import (
    corrected_transmittance,
    fastener_correction,
    gap_correction,
    inverted_roof_correction,
    tapered_rectangle,
    tapered_triangle_thick_apex,
    tapered_triangle_thin_apex,
)

__all__ = ["Construction", "Constructions", "Corrections", "Position", "construct", "construction"]

_TAPERS = {
    "rectangle": tapered_rectangle,
    "triangle thick at apex": tapered_triangle_thick_apex,
    "triangle thin at apex": tapered_triangle_thin_apex,
}


Position: TypeAlias = tuple[str, Direction, Facing]
"""Build-up, direction of heat flow, and what is behind."""


@dataclass(frozen=True)
class Corrections:
    """Additions to the transmittance. [W/(m²·K)]"""

    gaps: float = 0.0
    fasteners: float = 0.0
    rain: float = 0.0

    @property
    def total(self) -> float:
        """ΔU. [W/(m²·K)]"""
        return self.gaps + self.fasteners + self.rain


@dataclass(frozen=True)
class Construction:
    """A build-up in one position, inside first; layers beyond a well ventilated cavity are left out."""

    build_up: BuildUp
    direction: Direction
    facing: Facing
    surfaces: SurfaceResistances
    """With the layers they add up to the total resistance. [m²·K/W]"""
    slices: tuple[Slice, ...]
    slice_resistances: tuple[float, ...]
    """Equivalent resistance of each slice. [m²·K/W]"""
    limits: TotalResistance
    total: float
    """Total resistance, before corrections. [m²·K/W]"""
    corrections: Corrections

    @property
    def position(self) -> Position:
        """What tells it from other positions and build-ups."""
        return self.build_up.name, self.direction, self.facing

    @property
    def layers(self) -> tuple[Layer, ...]:
        """Layers that take part."""
        return self.build_up.layers[: layers_inside(self.build_up.layers, "well ventilated")]

    @property
    def resistances(self) -> tuple[float, ...]:
        """Equivalent resistance of each layer that takes part. [m²·K/W]"""
        return _by_layer(self.slices, self.slice_resistances, len(self.layers))

    @property
    def u_value(self) -> float:
        """Thermal transmittance with its corrections. [W/(m²·K)]"""
        found = self.corrections
        return corrected_transmittance(1 / self.total, (found.gaps, found.fasteners, found.rain))

    @property
    def without_surfaces(self) -> float:
        """Resistance from face to face that gives the corrected transmittance. [m²·K/W]"""
        return max(1 / self.u_value - sum(self.surfaces), 0.0)


@dataclass(frozen=True)
class Constructions:
    """What was worked out for the elements, openings and ground floors."""

    u_values: dict[str, float]
    """By element name. [W/(m²·K)]"""
    of_element: dict[str, Construction]
    """By element name, where a build-up is given."""
    of_floor: dict[str, Construction]
    """By ground floor name, where a build-up is given; without the ground."""
    of_basement_wall: dict[str, Construction]
    """Walls in the ground, by ground floor name."""
    openings: dict[str, OpeningProperties]
    """By opening name."""
    compared: tuple[Construction, Construction] | None = None
    """The two build-ups to be set side by side, both in the position that the first one has in the building."""

    @property
    def used(self) -> tuple[Construction, ...]:
        """Every build-up in every position it has, once, by name."""
        in_ground = [*self.of_floor.values(), *self.of_basement_wall.values()]
        all_of_them = [*self.of_element.values(), *in_ground, *(self.compared or ())]
        distinct = {found.position: found for found in all_of_them}
        return tuple(distinct[key] for key in sorted(distinct))


def construct(building: Building) -> Constructions:
    """Work out the U-value of every element and opening.

    Parameters
    ----------
    building : Building
        The building.

    Returns
    -------
    Constructions
    """
    known: dict[Position, Construction] = {}

    def placed(build_up: BuildUp, direction: Direction, facing: Facing) -> Construction:
        key = (build_up.name, direction, facing)
        if key not in known:
            known[key] = construction(build_up, direction, facing)
        return known[key]

    of_element = {
        element.name: placed(element.build_up, direction_of_heat_flow(element.tilt), _facing(element))
        for element in building.elements
        if element.build_up is not None
    }
    u_values = {
        element.name: of_element[element.name].u_value if element.build_up else element.u_value or 0.0
        for element in building.elements
    }
    of_floor = {
        floor.name: placed(floor.build_up, "down", "outdoors")
        for floor in building.ground_floors
        if floor.build_up is not None
    }
    of_basement_wall = {
        floor.name: placed(floor.basement_wall, "horizontal", "outdoors")
        for floor in building.ground_floors
        if floor.basement_wall is not None
    }
    openings = {
        opening.name: opening_properties(opening, element.tilt)
        for element in building.elements
        for opening in element.openings
    }
    found = Constructions(u_values, of_element, of_floor, of_basement_wall, openings)
    pair = building.project.compared
    if pair is None:
        return found
    positions = [other.position for other in (*of_element.values(), *of_floor.values())]
    _, direction, facing = next(
        (position for position in positions if position[0] == pair[0].name), ("", "horizontal", "outdoors")
    )
    return replace(found, compared=(placed(pair[0], direction, facing), placed(pair[1], direction, facing)))


def _facing(element: Element) -> Facing:
    return "outdoors" if element.faces_outdoors else "zone"


def construction(build_up: BuildUp, direction: Direction, facing: Facing) -> Construction:
    """A build-up in one position.

    A well ventilated air layer and all layers outside it are left out and still air stands before the face
    beyond; a slightly ventilated one lies between that and an unventilated one by its openings (ISO 6946:2017, 6.9).
    A tapered layer adds to the resistance of all others what its mean U asks for (annex E).
    """
    layers = build_up.layers[: layers_inside(build_up.layers, "well ventilated")]
    slices = slices_of(layers, direction)
    sheltered = surface_resistances(direction, "ventilated cavity")
    surfaces = surface_resistances(direction, facing) if len(layers) == len(build_up.layers) else sheltered
    vented = _Ventilation.of(layers)
    tapered = next((number for number, layer in enumerate(layers) if layer.taper != "none"), None)
    even = tuple(part for part in slices if part.layer != tapered)
    base = vented.total(even, surfaces, sheltered)
    effective = vented.surfaces(surfaces, sheltered)
    means = mean_resistances([part.sections for part in slices])
    weighted = [mean * vented.weight(part.layer) for part, mean in zip(slices, means, strict=True)]
    limits, total = base, base.total
    if tapered is not None:
        taper = sum(value for part, value in zip(slices, weighted, strict=True) if part.layer == tapered)
        limits, total = _with_taper(base, taper, layers[tapered].taper)
    shown = [total - base.total if part.layer == tapered else w for part, w in zip(slices, weighted, strict=True)]
    bridged = [part.is_bridged and part.layer != tapered for part in slices]
    resistances = _adding_up_to(total - sum(effective), shown, bridged)
    found = Construction(build_up, direction, facing, effective, slices, resistances, limits, total, Corrections())
    return replace(found, corrections=_corrections(found, _by_layer(slices, shown, len(layers))))


@dataclass(frozen=True)
class _Ventilation:
    """The first slightly ventilated air layer of some layers: its index, and how far it counts as well ventilated."""

    layer: int
    share: float

    @classmethod
    def of(cls, layers: tuple[Layer, ...]) -> _Ventilation:
        """None of them leaves the layers as they are."""
        number = layers_inside(layers, "slightly ventilated")
        if number == len(layers):
            return cls(number, 0.0)
        # between resistances of 1 and 2 the standard's own interpolation gives the share
        return cls(number, float(slightly_ventilated_resistance(layers[number].air_openings, 1.0, 2.0)) - 1)

    def weight(self, layer: int) -> float:
        """Share of a layer's resistance that counts."""
        return 1.0 if layer < self.layer else 1 - self.share

    def surfaces(self, still: SurfaceResistances, sheltered: SurfaceResistances) -> SurfaceResistances:
        """Surface resistances between the two states of the air layer."""
        return SurfaceResistances(
            still.inside, (1 - self.share) * still.outside + self.share * sheltered.outside if self.share else still[1]
        )

    def total(
        self, slices: tuple[Slice, ...], still: SurfaceResistances, sheltered: SurfaceResistances
    ) -> TotalResistance:
        """Limits of the total resistance, between the two states of the air layer."""
        unventilated = total_resistance([part.sections for part in slices], still)
        if not self.share:
            return unventilated
        inner = [part.sections for part in slices if part.layer < self.layer]
        ventilated = total_resistance(inner, sheltered)
        mixed = (still + self.share * (open_ - still) for still, open_ in zip(unventilated, ventilated, strict=True))
        return TotalResistance(*mixed)


def _with_taper(base: TotalResistance, taper: float, shape: str) -> tuple[TotalResistance, float]:
    """Limits and total resistance with a tapered layer of a greatest resistance. [m²·K/W]"""
    mean = partial(_TAPERS[shape], taper_resistance=taper)
    return TotalResistance(1 / float(mean(base.upper)), 1 / float(mean(base.lower))), 1 / float(mean(base.total))


def _adding_up_to(total: float, resistances: list[float], bridged: list[bool]) -> tuple[float, ...]:
    """Equivalent resistances of slices: what their sum lacks goes to the bridged ones in proportion. [m²·K/W]"""
    if not any(bridged):
        return tuple(resistances)
    lacking = total - sum(resistances)
    of_bridged = sum(value for value, is_bridged in zip(resistances, bridged, strict=True) if is_bridged)
    even = 1 / bridged.count(True)
    return tuple(
        value + lacking * (value / of_bridged if of_bridged else even) if is_bridged else value
        for value, is_bridged in zip(resistances, bridged, strict=True)
    )


def _by_layer(slices: Sequence[Slice], resistances: Sequence[float], count: int) -> tuple[float, ...]:
    """Sums of the slices of each layer. [m²·K/W]"""
    sums = [0.0] * count
    for part, resistance in zip(slices, resistances, strict=True):
        sums[part.layer] += resistance
    return tuple(sums)


def _corrections(found: Construction, resistances: Sequence[float]) -> Corrections:
    """Sum over the layers that take part, each with its resistance between even temperatures. [m²·K/W]"""
    gaps = fasteners = rain = 0.0
    for layer, resistance in zip(found.layers, resistances, strict=True):
        part = min(resistance, found.total)
        gaps += gap_correction(layer.gaps, part, found.total)
        if layer.fasteners is not None:
            fasteners += fastener_correction(
                conductivity=layer.fasteners.conductivity,
                cross_section=layer.fasteners.cross_section,
                number=layer.fasteners.number,
                insulation_thickness=layer.thickness,
                insulation_resistance=part,
                total_resistance=found.total,
                penetration=layer.fasteners.depth,
            )
        if layer.rain is not None:
            rain += inverted_roof_correction(layer.rain, part, found.total, layer.drainage)
    return Corrections(gaps, fasteners, rain)


def layers_inside(layers: tuple[Layer, ...], air: str) -> int:
    """Number of layers inside the first air layer of a kind; all of them if there is none."""
    return next((number for number, layer in enumerate(layers) if layer.air == air), len(layers))
