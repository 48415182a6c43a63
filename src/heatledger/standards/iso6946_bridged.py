"""ISO 6946:2017, 6.7.2: total resistance of a build-up with bridged layers, by its upper and lower limit.

One way serves every build-up: without a bridged layer the two limits are the plain sum.
"""

from __future__ import annotations

from collections.abc import Sequence
from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from heatledger.standards._guards import not_negative, positive
from heatledger.standards.iso6946 import SURFACE_EMISSIVITY, Direction, SurfaceResistances, layer_resistance
from heatledger.standards.iso6946_air import WIDEST_VOID, air_layer_resistance, air_void_resistance

__all__ = [
    "GREATEST_LIMIT_RATIO",
    "MOST_SECTIONS",
    "Layer",
    "Section",
    "TotalResistance",
    "block_layers",
    "bridged",
    "homogeneous",
    "lower_limit",
    "mean_resistances",
    "total_resistance",
    "upper_limit",
]

GREATEST_LIMIT_RATIO = 1.5
"""Upper over lower limit beyond which the method does not apply. [-] ISO 6946:2017, 6.7.2.1."""

MOST_SECTIONS = 65_536
"""Combined sections of one build-up that are worked out, at most. [-] Sixteen layers bridged independently."""

SHORT_CIRCUIT = 1e-12
"""A section of less resistance shorts its layer. [m²·K/W] Far below any sheet of metal."""


class Section(NamedTuple):
    """A part of a layer: its share of the face [-] and its resistance [m²·K/W]."""

    share: float
    resistance: float


class Layer(NamedTuple):
    """Sections of one layer, side by side, their shares adding up to 1.

    Layers that bear the same non-empty ``pattern`` have the same sections in the same places, one behind the
    other (a stud through two layers of insulation). All others cross each other: each section of one lies
    before each section of the other in proportion to the shares.
    """

    sections: tuple[Section, ...]
    pattern: str = ""


class TotalResistance(NamedTuple):
    """Limits of the total resistance, surface to surface included [m²·K/W]."""

    upper: float
    lower: float

    @property
    def total(self) -> float:
        """Total resistance R_tot, the mean of the limits [m²·K/W]."""
        return (self.upper + self.lower) / 2

    @property
    def transmittance(self) -> float:
        """Thermal transmittance U, before corrections [W/(m²·K)]."""
        return 1 / self.total

    @property
    def error(self) -> float:
        """Greatest relative error of the mean, (upper − lower)/(2·R_tot) [-]."""
        return (self.upper - self.lower) / (2 * self.total)

    @property
    def applies(self) -> bool:
        """Whether the ratio of the limits lies within the 1.5 that the method allows."""
        return self.upper <= GREATEST_LIMIT_RATIO * self.lower


def homogeneous(resistance: float) -> Layer:
    """Return a layer without bridging.

    Parameters
    ----------
    resistance : float
        Thermal resistance of the layer. [m²·K/W]

    Returns
    -------
    Layer
        The layer.

    Raises
    ------
    ValueError
        If the resistance is negative.

    References
    ----------
    ISO 6946:2017, 6.7.1.
    """
    return Layer((Section(1.0, float(not_negative("a resistance", resistance))),))


def bridged(resistance: float, second_resistance: float, second_share: float, pattern: str = "") -> Layer:
    """Return a layer of two materials side by side.

    Parameters
    ----------
    resistance, second_resistance : float
        Resistances of the main and the second material over the thickness of the layer. [m²·K/W]
    second_share : float
        Share of the face that the second material takes, 0 to 1. [-]
    pattern : str, optional
        Name that layers share whose second materials lie one behind the other.

    Returns
    -------
    Layer
        The layer.

    Raises
    ------
    ValueError
        If a resistance is negative or the share lies outside 0 to 1.

    References
    ----------
    ISO 6946:2017, 6.7.2. Not for insulation bridged by metal, which the method leaves out.
    """
    if not 0 <= second_share <= 1:
        raise ValueError("the share of the second material must lie between 0 and 1")
    not_negative("a resistance", [resistance, second_resistance])
    return Layer((Section(1 - second_share, resistance), Section(second_share, second_resistance)), pattern)


def block_layers(
    thickness: float,
    conductivity: float,
    *,
    void_depth: float,
    void_width: float,
    void_share: float,
    direction: Direction = "horizontal",
    rows: int = 1,
    emissivity: float = SURFACE_EMISSIVITY,
) -> list[Layer]:
    """Return a block with air voids as alternate solid and void layers.

    Parameters
    ----------
    thickness : float
        Thickness of the block in the direction of heat flow. [m]
    conductivity : float
        Conductivity of the solid part. [W/(m·K)]
    void_depth, void_width : float
        Size of a void in the direction of heat flow and across it; a void wider than ten times its depth is
        worked out as an air layer. [m]
    void_share : float
        Share of the face that voids take in each row, 0 to 1. [-]
    direction : {"up", "horizontal", "down"}
        Direction of heat flow.
    rows : int
        Rows of voids one behind the other. [-]
    emissivity : float
        Emissivity of the faces of the voids. [-]

    Returns
    -------
    list of Layer
        Shell, void row, web, void row … shell. The voids of all rows lie one behind the other.

    Raises
    ------
    ValueError
        If the rows are deeper than the block, the share lies outside 0 to 1, or as
        :func:`heatledger.standards.iso6946_air.air_void_resistance`.

    References
    ----------
    ISO 6946:2017, annex D.4 for the voids, 6.7.2 for their combination with the webs.

    Examples
    --------
    >>> layers = block_layers(0.2, 0.5, void_depth=0.05, void_width=0.05, void_share=0.5, rows=2)
    >>> len(layers), round(layers[0].sections[0].resistance, 4)
    (5, 0.0667)
    """
    solid = float(positive("the thickness", thickness)) - rows * void_depth
    if rows < 1 or solid < -1e-9:
        raise ValueError("the void rows must be 1 or more and fit into the thickness")
    is_void = void_width <= WIDEST_VOID * void_depth
    void = (
        air_void_resistance(void_depth, void_width, direction, inner_emissivity=emissivity, outer_emissivity=emissivity)
        if is_void
        else air_layer_resistance(void_depth, direction, inner_emissivity=emissivity, outer_emissivity=emissivity)
    )
    web = float(layer_resistance(void_depth, conductivity))
    shell = homogeneous(float(layer_resistance(max(solid, 0.0) / (rows + 1), conductivity)))
    row = bridged(web, float(void), void_share, f"voids {thickness} {void_depth} {void_width} {void_share}")
    return [shell, *[row, shell] * rows]


def upper_limit(layers: Sequence[Layer], surfaces: SurfaceResistances) -> float:
    """Upper limit of the total resistance: no heat crosses from section to section.

    Parameters
    ----------
    layers : sequence of Layer
        Build-up, inside first; layers may be none.
    surfaces : SurfaceResistances
        Inside and outside surface resistance. [m²·K/W]

    Returns
    -------
    float
        R_tot;upper. [m²·K/W]

    Raises
    ------
    ValueError
        If shares of a layer do not add up to 1, patterns do not match, or sections combine to too many.

    References
    ----------
    ISO 6946:2017, 6.7.2.3.
    """
    shares, resistances = _combined_sections(layers)
    totals = resistances + positive("the sum of the surface resistances", sum(surfaces))
    return float(1 / np.sum(shares / totals))


def lower_limit(layers: Sequence[Layer], surfaces: SurfaceResistances) -> float:
    """Lower limit of the total resistance: every plane along the face has one temperature.

    Parameters
    ----------
    layers : sequence of Layer
        Build-up, inside first; layers may be none.
    surfaces : SurfaceResistances
        Inside and outside surface resistance. [m²·K/W]

    Returns
    -------
    float
        R_tot;lower. [m²·K/W]

    Raises
    ------
    ValueError
        If shares of a layer do not add up to 1.

    References
    ----------
    ISO 6946:2017, 6.7.2.4, with the equivalent resistance of each layer.
    """
    return float(positive("the sum of the surface resistances", sum(surfaces))) + sum(mean_resistances(layers))


def total_resistance(layers: Sequence[Layer], surfaces: SurfaceResistances) -> TotalResistance:
    """Both limits of the total resistance, with their mean, U and greatest error.

    Parameters
    ----------
    layers : sequence of Layer
        Build-up, inside first, homogeneous or bridged.
    surfaces : SurfaceResistances
        Inside and outside surface resistance. [m²·K/W]

    Returns
    -------
    TotalResistance
        Limits. [m²·K/W]

    Raises
    ------
    ValueError
        As :func:`upper_limit`.

    References
    ----------
    ISO 6946:2017, 6.7.2.2 and 6.7.2.5.

    Examples
    --------
    >>> timber_frame = [homogeneous(0.05), bridged(0.14 / 0.038, 0.14 / 0.13, 0.15), homogeneous(0.381706)]
    >>> limits = total_resistance(timber_frame, SurfaceResistances(0.13, 0.04))
    >>> round(limits.upper, 3), round(limits.lower, 3), round(limits.transmittance, 3)
    (3.476, 3.304, 0.295)
    """
    return TotalResistance(upper_limit(layers, surfaces), lower_limit(layers, surfaces))


def mean_resistances(layers: Sequence[Layer]) -> list[float]:
    """Equivalent resistance of each layer, its sections side by side between two even temperatures.

    Parameters
    ----------
    layers : sequence of Layer
        Build-up, inside first.

    Returns
    -------
    list of float
        One resistance per layer. [m²·K/W]

    Raises
    ------
    ValueError
        If shares of a layer do not add up to 1.

    References
    ----------
    ISO 6946:2017, 6.7.2.4.
    """
    means = []
    for layer in layers:
        shares, resistances = _sections(layer)
        means.append(0.0 if np.any(resistances < SHORT_CIRCUIT) else float(1 / np.sum(shares / resistances)))
    return means


def _sections(layer: Layer) -> tuple[NDArray[np.float64], NDArray[np.float64]]:
    """Shares and resistances of a layer, without sections of no area."""
    shares = not_negative("the share of a section", [section.share for section in layer.sections])
    resistances = not_negative("a resistance", [section.resistance for section in layer.sections])
    if abs(float(np.sum(shares)) - 1) > 1e-6:
        raise ValueError("the shares of a layer must add up to 1")
    return shares[shares > 0], resistances[shares > 0]


def _combined_sections(layers: Sequence[Layer]) -> tuple[NDArray[np.float64], NDArray[np.float64]]:
    """Shares and resistances of the paths through all layers, surface to surface."""
    shares, resistances = np.ones(1), np.zeros(1)
    for own_shares, own_resistances in _aligned(layers):
        if shares.size * own_shares.size > MOST_SECTIONS:
            raise ValueError(f"the bridged layers combine to more than {MOST_SECTIONS} sections")
        shares = np.multiply.outer(shares, own_shares).ravel()
        resistances = np.add.outer(resistances, own_resistances).ravel()
    return shares, resistances


def _aligned(layers: Sequence[Layer]) -> list[tuple[NDArray[np.float64], NDArray[np.float64]]]:
    """Layers of one pattern added section by section into one; all others as they are."""
    single: list[tuple[NDArray[np.float64], NDArray[np.float64]]] = []
    patterns: dict[str, tuple[NDArray[np.float64], NDArray[np.float64]]] = {}
    for layer in layers:
        shares, resistances = _sections(layer)
        if not layer.pattern:
            single.append((shares, resistances))
        elif layer.pattern not in patterns:
            patterns[layer.pattern] = (shares, resistances)
        else:
            first, added = patterns[layer.pattern]
            if first.shape != shares.shape or not np.allclose(first, shares):
                raise ValueError(f"layers of the pattern {layer.pattern!r} must have the same shares")
            patterns[layer.pattern] = (first, added + resistances)
    return [*single, *patterns.values()]
