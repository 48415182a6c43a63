"""What stands in a new workbook: the standard profiles, the materials and the filled example."""

from __future__ import annotations

import csv
from collections.abc import Iterator, Mapping
from functools import cache
from importlib import resources
from typing import TypeAlias

from heatledger.inputs.columns import Column, SheetRow
from heatledger.inputs.rows import MONTHS, SHEETS, MaterialRow, MonthlyClimateRow, Rows, UsageRow
from heatledger.inputs.wording import folded

__all__ = ["Values", "blank_values", "example_values", "known_materials", "shipped_materials", "shipped_usages"]

Values: TypeAlias = dict[str, list[dict[str, object]]]
"""Filled cells by sheet name: rows as field name and value."""


def blank_values() -> Values:
    """Rows of a blank workbook: the standard profiles of use, the shipped materials and the names of the months.

    >>> sorted(blank_values())
    ['Materials', 'Monthly climate', 'Usage']
    """
    return {
        UsageRow.sheet: _rows(UsageRow, "usage.csv"),
        MaterialRow.sheet: _rows(MaterialRow, "materials.csv"),
        MonthlyClimateRow.sheet: [{"month": month} for month in MONTHS],
    }


def example_values() -> Values:
    """Rows of the filled example; its own usages and materials stand before the shipped ones."""
    shipped = blank_values()
    return {
        model.sheet: _rows(model, f"example/{_file_name(model)}") + shipped.get(model.sheet, []) for model in SHEETS
    }


@cache
def shipped_materials() -> Mapping[str, MaterialRow]:
    """The shipped materials by folded name, for build-ups whose material has no row of its own.

    >>> shipped_materials()["concrete 2200"].conductivity
    1.65
    """
    rows = (MaterialRow.model_validate(row) for row in _rows(MaterialRow, "materials.csv"))
    return {folded(row.name): row for row in rows}


def known_materials(rows: Rows) -> Mapping[str, MaterialRow]:
    """Materials that a build-up may name, by folded name: the shipped ones, and before them those of the workbook."""
    return {**shipped_materials(), **{folded(row.name): row for row in rows.materials}}


@cache
def shipped_usages() -> Mapping[str, UsageRow]:
    """The standard profiles by folded name, to tell them from the user's own.

    >>> shipped_usages()["office"].appliances
    20.0
    """
    rows = (UsageRow.model_validate(row) for row in _rows(UsageRow, "usage.csv"))
    return {folded(row.name): row for row in rows}


def _file_name(model: type[SheetRow]) -> str:
    """File of a sheet's example rows, e.g. ``air_systems.csv``."""
    return model.sheet.casefold().replace(" ", "_").replace("-", "_") + ".csv"


def _rows(model: type[SheetRow], path: str) -> list[dict[str, object]]:
    """Filled cells of a table of the package; its other columns are not for this sheet."""
    columns = model.columns()
    return [
        {field: _typed(text.strip(), columns[field]) for field, text in row.items() if field in columns and text}
        for row in csv.DictReader(_lines(path))
    ]


def _lines(path: str) -> Iterator[str]:
    """Lines of a table below its head, whose lines begin with #."""
    table = resources.files("heatledger") / "data" / path
    return (line for line in table.read_text(encoding="utf-8").splitlines() if not line.startswith("#"))


def _typed(text: str, column: Column) -> object:
    match column.kind:
        case "number":
            return float(text)
        case "integer":
            return int(text)
        case "azimuth":
            return text if text.isalpha() else float(text)
        case _:
            return text
