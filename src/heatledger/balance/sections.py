"""Layers of a build-up as the standards take them: slices with their sections and their heat capacity."""

from __future__ import annotations

from collections.abc import Iterator
from typing import NamedTuple

from heatledger.building.model import Layer, SecondMaterial, Voids
from heatledger.standards import iso6946_bridged
from heatledger.standards.iso6946 import Direction, layer_resistance
from heatledger.standards.iso6946_air import air_layer_resistance
from heatledger.standards.iso6946_bridged import Section, block_layers, bridged, homogeneous
from heatledger.standards.iso13786 import areal_capacity

__all__ = ["Slice", "slices_of"]

MEAN_THICKNESS = {"none": 1.0, "rectangle": 1 / 2, "triangle thick at apex": 1 / 3, "triangle thin at apex": 2 / 3}
"""Mean thickness of a tapered layer over its greatest one, by its shape in plan. [-] Geometry."""


class Slice(NamedTuple):
    """A part of a layer over the whole face; a block with voids has several, all other layers one."""

    layer: int
    """Index of its layer."""
    thickness: float
    """[m]"""
    sections: iso6946_bridged.Layer
    capacity: float
    """[J/(m²·K)]"""

    @property
    def is_bridged(self) -> bool:
        """Whether it has sections side by side."""
        return len(self.sections.sections) > 1


def slices_of(layers: tuple[Layer, ...], direction: Direction) -> tuple[Slice, ...]:
    """Slices of layers, inside first.

    Parameters
    ----------
    layers : tuple of Layer
        Inside first. Neighbouring layers bridged by the same second material with the same share count as one stud
        that runs through; all other bridges cross each other.
    direction : {"up", "horizontal", "down"}
        Direction of heat flow.

    Returns
    -------
    tuple of Slice
    """
    return tuple(
        part
        for number, (layer, pattern) in enumerate(zip(layers, _patterns(layers), strict=True))
        for part in (
            _block(number, layer, layer.voids, direction)
            if layer.voids
            else (_plain(number, layer, direction, pattern),)
        )
    )


def _patterns(layers: tuple[Layer, ...]) -> Iterator[str]:
    """Name that the layers of one stud share."""
    stud, before = "", None
    for number, layer in enumerate(layers):
        second = None if layer.voids else layer.second
        stud = stud if second is not None and second == before else f"stud {number}"
        before = second
        yield stud


def _plain(number: int, layer: Layer, direction: Direction, pattern: str) -> Slice:
    """A layer of one material or of air, perhaps bridged."""
    resistance = (
        air_layer_resistance(
            layer.thickness,
            direction,
            inner_emissivity=layer.inner_emissivity,
            outer_emissivity=layer.outer_emissivity,
        )
        if layer.air
        else layer_resistance(layer.thickness, layer.conductivity)
    )
    mean_thickness = layer.thickness * MEAN_THICKNESS[layer.taper]
    capacity = float(areal_capacity(mean_thickness, layer.density, layer.specific_heat))
    second = layer.second
    if second is None:
        return Slice(number, layer.thickness, homogeneous(float(resistance)), capacity)
    across = float(layer_resistance(layer.thickness, second.conductivity))
    sections = bridged(float(resistance), across, second.share, pattern)
    return Slice(number, layer.thickness, sections, _with_second(capacity, layer.thickness, second))


def _with_second(capacity: float, thickness: float, second: SecondMaterial | None) -> float:
    """Capacity of a slice whose face is shared with a second material. [J/(m²·K)]"""
    if second is None:
        return capacity
    own = float(areal_capacity(thickness, second.density, second.specific_heat))
    return (1 - second.share) * capacity + second.share * own


def _block(number: int, layer: Layer, voids: Voids, direction: Direction) -> Iterator[Slice]:
    """Shells, void rows and webs of a block, perhaps with joints of a second material."""
    parts = block_layers(
        layer.thickness,
        layer.conductivity,
        void_depth=voids.depth,
        void_width=voids.width,
        void_share=voids.share,
        direction=direction,
        rows=voids.rows,
        emissivity=_mean_emissivity(layer),
    )
    shell = max(layer.thickness - voids.rows * voids.depth, 0.0) / (voids.rows + 1)
    for part in parts:
        is_row = len(part.sections) > 1
        thickness, solid = (voids.depth, 1 - voids.share) if is_row else (shell, 1.0)
        capacity = solid * float(areal_capacity(thickness, layer.density, layer.specific_heat))
        sections = _jointed(part, thickness, layer.second, voids.share)._replace(pattern=f"block {number}")
        yield Slice(number, thickness, sections, _with_second(capacity, thickness, layer.second))


def _jointed(
    part: iso6946_bridged.Layer, thickness: float, second: SecondMaterial | None, void_share: float
) -> iso6946_bridged.Layer:
    """A slice of a block beside its joints; a shell is cut where voids stand behind it, so that all slices match."""
    sections = part.sections
    if len(sections) == 1:
        sections = (Section(1 - void_share, sections[0].resistance), Section(void_share, sections[0].resistance))
    if second is not None:
        joint = Section(second.share, float(layer_resistance(thickness, second.conductivity)))
        sections = (*(Section((1 - second.share) * share, value) for share, value in sections), joint)
    return iso6946_bridged.Layer(sections)


def _mean_emissivity(layer: Layer) -> float:
    """Emissivity that both faces of a void may have to exchange as much as the two different ones: 2/(1/ε1 + 1/ε2)."""
    return 2 / (1 / layer.inner_emissivity + 1 / layer.outer_emissivity)
