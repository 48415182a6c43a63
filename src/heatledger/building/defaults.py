"""Which blank cells were taken to mean something, and count in the calculation."""

from __future__ import annotations

from collections.abc import Callable, Iterator
from dataclasses import dataclass

from heatledger.inputs import rules_build_ups, rules_glazed_units, rules_shading
from heatledger.inputs.columns import SheetRow, plain
from heatledger.inputs.rows import (
    OUTDOORS,
    SHEETS,
    AirSystemRow,
    BuildUpRow,
    ElementRow,
    GlazedUnitRow,
    GroundFloorRow,
    MaterialRow,
    ObstructionRow,
    OpeningRow,
    Rows,
    ShadingDeviceRow,
    UsageRow,
    ZoneRow,
)
from heatledger.inputs.rules_ground_floors import uses
from heatledger.inputs.wording import folded

__all__ = ["DefaultUsed", "defaults_that_count"]


@dataclass(frozen=True)
class DefaultUsed:
    """A blank optional cell and what it was taken to mean."""

    sheet: str
    cell: str
    name: str
    """Of the row; empty on the Project sheet."""
    column: str
    value: str
    reason: str


def defaults_that_count(rows: Rows) -> tuple[DefaultUsed, ...]:
    """Declared defaults of blank cells, in the order of the workbook.

    Parameters
    ----------
    rows : Rows
        Checked rows.

    Returns
    -------
    tuple of DefaultUsed
        Rows that nothing refers to, and cells that do not enter the calculation of their row, are left out.
    """
    used = _names_in_use(rows)
    return tuple(
        default
        for model in SHEETS
        for row in rows.of(model.sheet)
        if model not in used or folded(str(getattr(row, model.key()))) in used[model]
        for default in _of_row(row)
    )


def _of_row(row: SheetRow) -> Iterator[DefaultUsed]:
    for field, column in row.columns().items():
        if column.default is None or field in row.model_fields_set or not _counts(row, field):
            continue
        value = plain(column.default) if isinstance(column.default, float) else str(column.default)
        name = "" if row.labelled else str(getattr(row, row.key()))
        yield DefaultUsed(row.sheet, row.cell(field), name, column.label, value, column.default_note)


def _names_in_use(rows: Rows) -> dict[type[SheetRow], set[str]]:
    """Names of the rows that other rows refer to, for the sheets that may hold more than is used."""

    def named(typed: Iterator[str]) -> set[str]:
        return {folded(name) for name in typed}

    return {
        UsageRow: named(zone.usage for zone in rows.zones),
        AirSystemRow: named(zone.air_system for zone in rows.zones),
        MaterialRow: named(name for layer in rows.build_ups for name in (layer.material, layer.second_material)),
        GlazedUnitRow: named(opening.glazed_unit for opening in rows.openings),
        ObstructionRow: named(element.obstruction for element in rows.elements)
        | named(opening.obstruction for opening in rows.openings),
        ShadingDeviceRow: named(opening.shading for opening in rows.openings),
    }


def _counts(row: SheetRow, field: str) -> bool:
    """Whether a field enters the calculation of its row."""
    match row:
        case ElementRow() if field == "absorptance":
            return folded(row.faces) == OUTDOORS
        case GroundFloorRow():
            return uses(row, field)
        case ZoneRow() if field == "thermal_mass":
            return row.heat_capacity is None
        case AirSystemRow():
            return field not in _AIR_SYSTEM_FIELDS or _AIR_SYSTEM_FIELDS[field](row)
        case UsageRow():
            return field in _USAGE_FIELDS and _USAGE_FIELDS[field](row)
        case BuildUpRow():
            return rules_build_ups.uses(row, field)
        case GlazedUnitRow():
            return rules_glazed_units.uses(row, field)
        case ObstructionRow() | ShadingDeviceRow():
            return rules_shading.uses(row, field)
        case OpeningRow():
            return False
    return True


_AIR_SYSTEM_FIELDS: dict[str, Callable[[AirSystemRow], bool]] = {
    "rate_basis": lambda row: row.rate is not None,
    "running_hours": lambda row: row.kind != "natural" or row.rate is not None,
    "heat_recovery": lambda row: row.kind == "balanced",
    "bypass": lambda row: row.heat_recovery > 0,
    "fan_power": lambda row: row.kind != "natural",
    "night_cooling": lambda _: False,
}

_USAGE_FIELDS: dict[str, Callable[[UsageRow], bool]] = {
    "heat_per_person": lambda row: row.area_per_person is not None,
    "presence": lambda row: row.area_per_person is not None,
    "share_released": lambda row: row.appliances + row.lighting > 0,
}
"""A blank figure that adds nothing, such as lighting, is no assumption worth telling."""
