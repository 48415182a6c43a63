"""How columns are declared, and what their declaration says to the user."""

from __future__ import annotations

import re

import pytest

from heatledger.inputs.columns import COMPASS, SheetRow
from heatledger.inputs.rows import SHEETS, ElementRow, GlazedUnitRow, OpeningRow, ProjectRow, ZoneRow

EVERY = [
    pytest.param(model, field, id=f"{model.sheet}-{field}") for model in SHEETS for field in model.columns()
]  # one case for each column of the workbook


@pytest.mark.parametrize(("model", "field"), EVERY)
def test_every_column_is_fit_for_the_template(model: type[SheetRow], field: str) -> None:
    column = model.columns()[field]

    assert column.title == column.title.strip()
    assert column.help.endswith((".", "…")), "a help note is made of sentences"
    assert "  " not in column.help
    assert not (column.required and column.default is not None)
    assert bool(column.choices) or column.kind != "choice"
    if column.kind in {"name"}:
        assert column.names_from in {sheet.sheet for sheet in SHEETS}
    if column.default is not None:
        assert column.default_note, "a default states where it comes from"


@pytest.mark.parametrize("model", SHEETS, ids=lambda model: str(model.sheet))
def test_titles_stand_once(model: type[SheetRow]) -> None:
    titles = [column.title.casefold() for column in model.columns().values()]

    assert len(set(titles)) == len(titles)


@pytest.mark.parametrize(("model", "field"), EVERY)
def test_defaults_pass_their_own_bounds(model: type[SheetRow], field: str) -> None:
    column = model.columns()[field]
    if not isinstance(column.default, float | int):
        return

    assert column.at_least is None or column.default >= column.at_least
    assert column.above is None or column.default > column.above
    assert column.at_most is None or column.default <= column.at_most


def test_units_are_of_the_agreed_set() -> None:
    units = {column.unit for model in SHEETS for column in model.columns().values()}

    agreed = {"", "-", "%", "°", "°C", "m", "mm", "m²", "m³", "h", "h/d", "W", "1/h", "1/h or m³/(h·m²)"}
    agreed |= {"W/K", "W/(m·K)", "W/(m²·K)", "kJ/(m²·K)", "J/(kg·K)", "kg/m³", "kWh/(m²·a)", "m³/h", "m³/(h·m²)"}
    agreed |= {"m²·K/W", "m²/m", "m/s", "mm²", "mm²/m", "1/m²", "mm/d", "W·d/(m²·K·mm)"}
    agreed |= {"m/s", "m²/m", "m²·K/W", "W/m²"}
    agreed |= {"d", "W/(m³/h)", "kWh/m²"}
    assert units <= agreed


@pytest.mark.parametrize(
    ("model", "field", "sentence"),
    [
        (OpeningRow, "width", "a number above 0 and at most 50"),
        (OpeningRow, "count", "a whole number from 1 to 10000"),
        (ZoneRow, "air_volume", "a number above 0 and at most 10000000"),
        (ZoneRow, "conditioning", "one of: heated, heated and cooled, unconditioned"),
        (ZoneRow, "name", "a text"),
        (GlazedUnitRow, "g_value", "a number from 0 to 1"),
        (ElementRow, "zone", "a name from sheet Zones"),
        (ElementRow, "faces", "outdoors, neighbour, or a name from sheet Zones"),
        (ElementRow, "azimuth", "degrees from north clockwise, 0 to 360, or a compass direction such as N, NNE, NE"),
    ],
)
def test_what_a_cell_should_hold_in_words(model: type[SheetRow], field: str, sentence: str) -> None:
    assert model.columns()[field].expected == sentence


def test_a_label_holds_title_and_unit() -> None:
    assert OpeningRow.columns()["width"].label == "Width [m]"
    assert OpeningRow.columns()["name"].label == "Opening"


def test_a_row_knows_its_cells() -> None:
    row = OpeningRow(name="O-1", element="W", glazed_unit="G", width=1.0, height=1.0)
    row.placed(8, {"name": 2, "width": 30})

    assert (row.cell(), row.cell("width"), row.cell("height"), row.row_number) == ("B8", "AD8", "B8", 8)


def test_a_project_line_knows_its_cell() -> None:
    row = ProjectRow(project="P", weather="W")
    row.placed(0, {"project": 4, "weather": 9})

    assert (row.cell("weather"), row.cell("project")) == ("B9", "B4")


def test_the_compass_turns_clockwise_from_north() -> None:
    assert [COMPASS.index(word) * 22.5 for word in ("N", "E", "S", "W", "SSE")] == [0, 90, 180, 270, 157.5]
    assert all(re.fullmatch("[NESW]{1,3}", word) for word in COMPASS)
