"""Rows of sheet Glazed units to units in SI."""

from __future__ import annotations

from typing import TYPE_CHECKING

from heatledger.building.model import GlazedUnit, Panes, Shutter

if TYPE_CHECKING:
    from heatledger.inputs.rows import GlazedUnitRow

__all__ = ["glazed_unit"]


def glazed_unit(row: GlazedUnitRow) -> GlazedUnit:
    """A unit as declared, or from the parts it is made of."""
    return GlazedUnit(
        row.name,
        row.u_value,
        row.g_value,
        row.frame_share / 100,
        row,
        frame_width=None if row.frame_width is None else row.frame_width / 1000,
        glazing_u_value=row.glazing_u_value,
        frame_u_value=row.frame_u_value,
        edge=row.edge or 0.0,
        panes=_panes(row),
        shutter=_shutter(row),
    )


def _panes(row: GlazedUnitRow) -> Panes | None:
    return None if row.panes is None else Panes(row.panes, (row.gap or 0.0) / 1000, row.gas, row.coating)


def _shutter(row: GlazedUnitRow) -> Shutter | None:
    if row.shutter_resistance is None:
        return None
    return Shutter(row.shutter_resistance, row.shutter_tightness, row.shutter_share / 100)
