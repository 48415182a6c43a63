"""Openings at their real size: U-value and frame share from what the glazed unit states."""

from __future__ import annotations

from dataclasses import dataclass
from functools import cache

from heatledger.building.model import GlazedUnit, Opening, Panes
from heatledger.standards.en673 import UNCOATED_EMISSIVITY, Gap, glazing_transmittance
from heatledger.standards.iso6946 import direction_of_heat_flow, surface_resistances
from heatledger.standards.iso10077 import (
    WindowParts,
    frame_width,
    shutter_resistance,
    transmittance_with_shutter,
    window_parts,
    window_transmittance,
)

__all__ = ["OpeningProperties", "opening_properties"]

PANE_THICKNESS = 0.004
"""Of glass given by its panes. [m] Common practice; another millimetre changes U_g by less than 1 %."""


@dataclass(frozen=True)
class OpeningProperties:
    """An opening as the balance takes it."""

    u_value: float
    """Mean of open and closed shutter. [W/(m²·K)]"""
    frame_share: float
    """[-]"""
    glazing_u_value: float | None
    """Of the glass alone, where the unit is given by its parts. [W/(m²·K)]"""


def opening_properties(opening: Opening, tilt: float) -> OpeningProperties:
    """Transmittance and frame share of an opening.

    Parameters
    ----------
    opening : Opening
        Its size and glazed unit.
    tilt : float
        Of the element it sits in; counts for glass given by its panes. [°]

    Returns
    -------
    OpeningProperties
    """
    unit = opening.glazed_unit
    parts = _parts(unit, opening)
    share = unit.frame_share if parts is None else float(parts.frame_share)
    glazing = None if unit.u_value is not None else _glazing(unit, tilt)
    u_value = unit.u_value if unit.u_value is not None else _from_parts(unit, parts, glazing)
    return OpeningProperties(_with_shutter(unit, u_value), share, glazing)


def _parts(unit: GlazedUnit, opening: Opening) -> WindowParts | None:
    """None for a leaf without glass."""
    if unit.frame_width is None and unit.frame_share >= 1:
        return None
    width = (
        float(frame_width(opening.width, opening.height, unit.frame_share))
        if unit.frame_width is None
        else unit.frame_width
    )
    return window_parts(opening.width, opening.height, width)


def _glazing(unit: GlazedUnit, tilt: float) -> float | None:
    return _of_panes(unit.panes, min(tilt, 90.0)) if unit.panes else unit.glazing_u_value


@cache
def _of_panes(panes: Panes, tilt: float) -> float:
    """U of glass; heat through level glass is taken to flow upwards. [W/(m²·K)]"""
    emissivity = UNCOATED_EMISSIVITY if panes.coating is None else panes.coating
    gaps = [Gap(panes.gap, panes.gas, inner_emissivity=emissivity)] * (panes.number - 1)
    surfaces = surface_resistances(direction_of_heat_flow(tilt))
    return glazing_transmittance([PANE_THICKNESS] * panes.number, gaps, tilt, surfaces.inside, surfaces.outside)


def _from_parts(unit: GlazedUnit, parts: WindowParts | None, glazing: float | None) -> float:
    frame = unit.frame_u_value or 0.0
    return frame if parts is None else float(window_transmittance(parts, glazing or 0.0, frame, unit.edge))


def _with_shutter(unit: GlazedUnit, u_value: float) -> float:
    """Mean over the time the shutter is closed and open. [W/(m²·K)]"""
    if unit.shutter is None:
        return u_value
    resistance = shutter_resistance(unit.shutter.tightness, unit.shutter.resistance)
    closed = float(transmittance_with_shutter(u_value, resistance))
    return unit.shutter.closed_share * closed + (1 - unit.shutter.closed_share) * u_value
