"""Generated files against their generators."""

from __future__ import annotations

from pathlib import Path

from heatledger.climate.shipped import shipped_climates
from heatledger.inputs.prefilled import blank_values, example_values
from heatledger.inputs.reference import column_reference
from heatledger.places import shipped_folder
from heatledger.workbook.template import build_template

TEMPLATES: Path = shipped_folder("templates")


def test_the_blank_template_is_what_its_generator_writes() -> None:
    assert (TEMPLATES / "building.xlsx").read_bytes() == build_template(blank_values(), shipped_climates())


def test_the_example_is_what_its_generator_writes() -> None:
    assert (TEMPLATES / "example.xlsx").read_bytes() == build_template(example_values(), shipped_climates())


def test_the_column_reference_is_what_its_generator_writes() -> None:
    assert (TEMPLATES / "COLUMNS.md").read_text(encoding="utf-8") == column_reference()
