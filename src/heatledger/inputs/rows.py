"""The input sheets in the order of the workbook; each row model stands in a module beside this one."""

from __future__ import annotations

from dataclasses import dataclass

from heatledger.inputs.columns import SheetRow
from heatledger.inputs.rows_climate import MonthlyClimateRow
from heatledger.inputs.rows_envelope import ElementRow, GlazedUnitRow, OpeningRow
from heatledger.inputs.rows_ground import GroundFloorRow, ThermalBridgeRow
from heatledger.inputs.rows_layers import BuildUpRow, MaterialRow
from heatledger.inputs.rows_project import ProjectRow
from heatledger.inputs.rows_shading import ObstructionRow, ShadingDeviceRow
from heatledger.inputs.rows_zones import AirSystemRow, UsageRow, ZoneRow
from heatledger.inputs.words import AIR_LAYERS, MONTHLY_TABLE, MONTHS, NEIGHBOUR, OUTDOORS

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
