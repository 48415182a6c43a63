"""Units and names of sheets Build-ups, Materials and Glazed units, column by column."""

from __future__ import annotations

from typing import TYPE_CHECKING, Any

import pytest

from heatledger.building.glazing import glazed_unit
from heatledger.building.layers import material_sources, resolve_build_ups
from heatledger.building.model import Fasteners, Layer, MaterialSource, Panes, SecondMaterial, Shutter, Voids
from heatledger.building.resolve import resolve
from heatledger.inputs.rows import GlazedUnitRow

if TYPE_CHECKING:
    from tests.conftest import Book

COLUMNS = {
    "Second material": "E",
    "Second share": "F",
    "Void width": "G",
    "Void depth": "H",
    "Void share": "I",
    "Void rows": "J",
    "Inner emissivity": "K",
    "Outer emissivity": "L",
    "Air layer openings": "M",
    "Fasteners": "N",
    "Fastener conductivity": "O",
    "Fastener cross-section": "P",
    "Fastener depth": "Q",
    "Gaps in insulation": "R",
    "Rain on roof": "S",
    "Drainage factor f·x": "T",
    "Taper": "U",
}
"""Where the columns that the small workbook lacks are put."""


def typed(cottage: Book, row: int, **cells: Any) -> Book:
    """The small workbook with cells in a layer, by title with underscores for spaces."""
    for title, letter in COLUMNS.items():
        cottage.change({f"Build-ups!{letter}4": title})
    for title, value in cells.items():
        cottage.change({f"Build-ups!{COLUMNS[title.replace('_', ' ')]}{row}": value})
    return cottage


def layer(book: Book, number: int, name: str = "wall") -> Layer:
    assert book.problems() == []
    return resolve_build_ups(book.rows())[name].layers[number - 1]


def test_a_plain_layer_in_si(cottage: Book) -> None:
    found = layer(cottage, 1)
    assert (found.material, found.thickness, found.conductivity, found.density, found.specific_heat) == (
        *("Brick", 0.25, 0.77, 1700.0, 1000.0),
    )
    assert (found.second, found.voids, found.fasteners, found.gaps, found.taper) == (None, None, None, "none", "none")
    assert found.origin.cell("thickness") == "D5"


def test_second_material_in_si(cottage: Book) -> None:
    found = layer(typed(cottage, 6, Second_material="concrete", Second_share=15), 2)
    assert found.second == SecondMaterial("Concrete", 1.65, 2200.0, 1000.0, 0.15)


def test_voids_in_si(cottage: Book) -> None:
    cells = {"Void width": 60, "Void depth": 80, "Void share": 45, "Void rows": 2}
    assert layer(typed(cottage, 5, **cells), 1).voids == Voids(0.06, 0.08, 0.45, 2)


def test_a_void_without_depth_is_as_deep_as_its_layer(cottage: Book) -> None:
    assert layer(typed(cottage, 5, **{"Void width": 60, "Void share": 45}), 1).voids == Voids(0.06, 0.25, 0.45, 1)


def test_fasteners_in_si(cottage: Book) -> None:
    cells = {"Fasteners": 5, "Fastener conductivity": 17, "Fastener cross-section": 12.6, "Fastener depth": 60}
    found = layer(typed(cottage, 6, **cells), 2).fasteners
    assert found == Fasteners(5.0, 17.0, 12.6 / 1e6, 0.06)


@pytest.mark.parametrize(("word", "level"), [("none", "none"), ("bridging", "minor"), ("circulating", "major")])
def test_gaps_rain_and_taper(cottage: Book, word: str, level: str) -> None:
    cells = {"Gaps in insulation": word, "Rain on roof": 2, "Drainage factor f·x": 0.02, "Taper": "rectangle"}
    found = layer(typed(cottage, 6, **cells), 2)
    assert (found.gaps, found.rain, found.drainage, found.taper) == (level, 2.0, 0.02, "rectangle")


def test_an_air_layer(cottage: Book) -> None:
    cottage.change({"Build-ups!C6": "Slightly ventilated", "Build-ups!D6": 40})
    cells = {"Inner emissivity": 0.05, "Outer emissivity": 0.8, "Air layer openings": 700}
    found = layer(typed(cottage, 6, **cells), 2)
    assert (found.air, found.thickness, found.inner_emissivity, found.outer_emissivity, found.air_openings) == (
        *("slightly ventilated", 0.04, 0.05, 0.8, 700.0),
    )


def test_layers_stand_in_their_order(cottage: Book) -> None:
    cottage.change({"Build-ups!B5": 2, "Build-ups!B6": 1})
    assert [found.material for found in resolve_build_ups(cottage.rows())["wall"].layers] == ["Wool", "Brick"]


def test_a_material_without_density_stores_nothing(cottage: Book) -> None:
    cottage.change({"Materials!C5": None})
    assert (layer(cottage, 1).density, layer(cottage, 1).specific_heat) == (0.0, 0.0)


def test_a_material_without_a_row_is_taken_from_the_shipped_table(cottage: Book) -> None:
    """ISO 10456:2007, table 3: concrete of 2400 kg/m³."""
    cottage.change({"Build-ups!C7": "concrete 2400"})
    found = layer(cottage, 1, "slab")
    assert (found.material, found.conductivity, found.density) == ("Concrete 2400", 2.0, 2400.0)


def test_sources_tell_own_and_missing_rows(cottage: Book) -> None:
    """Own: a name of the user's, and a shipped name with another value; an unchanged shipped row is no news."""
    cottage.change({"Materials!A6": "Mineral wool 0.035", "Build-ups!C6": "Mineral wool 0.035"})
    cottage.change({"Materials!A7": "Concrete 2200", "Materials!B7": 1.7, "Materials!E7": "test report"})
    cottage.change({"Build-ups!C7": "Concrete 2200"})
    book = typed(cottage, 6, Second_material="Timber, softwood 500", Second_share=12)
    assert book.problems() == []
    assert material_sources(book.rows()) == (
        MaterialSource("Brick", True, "0.77 W/(m·K), 1700 kg/m³, 1000 J/(kg·K)", "Materials", "A5"),
        MaterialSource("Timber, softwood 500", False, "ISO 10456:2007, table 3", "Build-ups", "E6"),
        MaterialSource("Concrete 2200", True, "1.7 W/(m·K), 2200 kg/m³, 1000 J/(kg·K), test report", "Materials", "A7"),
    )


def test_the_design_temperatures_and_the_comparison(cottage: Book) -> None:
    cottage.change({"Project!A10": "Design inside temperature", "Project!B10": 22})
    cottage.change({"Project!A11": "Design outside temperature", "Project!B11": -12})
    cottage.change({"Project!A12": "Compare build-up", "Project!B12": "wall"})
    cottage.change({"Project!A13": "With build-up", "Project!B13": "Slab"})
    project = resolve(cottage.rows()).project
    assert (project.design_inside, project.design_outside) == (22.0, -12.0)
    assert project.compared is not None
    assert [build_up.name for build_up in project.compared] == ["Wall", "Slab"]


def test_without_them_nothing_is_compared(cottage: Book) -> None:
    project = resolve(cottage.rows()).project
    assert (project.design_inside, project.design_outside, project.compared) == (20.0, None, None)


def told_defaults(book: Book) -> set[tuple[str, str]]:
    """Names and columns of the defaults that count on these sheets."""
    assert book.problems() == []
    defaults = resolve(book.rows()).defaults
    return {(found.name, found.column) for found in defaults if found.sheet in {"Build-ups", "Glazed units"}}


def test_defaults_count_only_where_they_enter(cottage: Book) -> None:
    """A plain layer and a whole unit need none; air, fasteners and rain bring theirs."""
    assert told_defaults(cottage) == set()
    cottage.change({"Build-ups!C6": "slightly ventilated air layer", "Build-ups!D6": 40})
    faces = {("Wall", "Inner emissivity [-]"), ("Wall", "Outer emissivity [-]")}
    assert told_defaults(cottage) == faces | {("Wall", "Air layer openings [mm²/m]")}
    book = typed(cottage, 7, Fasteners=4, Rain_on_roof=2)
    book.change({"Build-ups!P7": 12.6})
    slab = {("Slab", "Fastener conductivity [W/(m·K)]"), ("Slab", "Drainage factor f·x [W·d/(m²·K·mm)]")}
    assert told_defaults(book) == faces | {("Wall", "Air layer openings [mm²/m]")} | slab


def test_defaults_of_panes_and_shutters(cottage: Book) -> None:
    titles = ("Panes", "Gap", "Frame U-value", "Edge ψ", "Frame width", "Shutter resistance")
    for letter, title, value in zip("EFGHIJ", titles, (2, 16, 1.4, 0.06, 100, 0.1), strict=True):
        cottage.change({f"Glazed units!{letter}4": title, f"Glazed units!{letter}5": value})
    cottage.change({"Glazed units!B5": None, "Glazed units!D5": None})
    assert told_defaults(cottage) == {
        ("Double", "Gas"),
        ("Double", "Shutter air permeability"),
        ("Double", "Shutter closed share [%]"),
    }


def unit(**cells: Any) -> GlazedUnitRow:
    return GlazedUnitRow.model_validate({"name": "G", "g_value": 0.6} | cells)


def test_a_whole_glazed_unit_in_si() -> None:
    found = glazed_unit(unit(u_value=1.3, frame_share=25.0))
    assert (found.u_value, found.g_value, found.frame_share, found.frame_width) == (1.3, 0.6, 0.25, None)
    assert (found.panes, found.shutter) == (None, None)


def test_the_parts_of_a_glazed_unit_in_si() -> None:
    found = glazed_unit(unit(glazing_u_value=1.1, frame_u_value=1.4, edge=0.06, frame_width=110.0))
    assert (found.glazing_u_value, found.frame_u_value, found.edge, found.frame_width) == (1.1, 1.4, 0.06, 0.11)


def test_panes_and_shutter_in_si() -> None:
    found = glazed_unit(unit(panes=3, gap=14.0, gas="argon", coating=0.05, shutter_resistance=0.15))
    assert found.panes == Panes(3, 0.014, "argon", 0.05)
    assert found.shutter == Shutter(0.15, "average", 0.6)
    other = glazed_unit(unit(shutter_resistance=0.1, shutter_tightness="tight", shutter_share=40.0))
    assert other.shutter == Shutter(0.1, "tight", 0.4)


def test_an_opening_keeps_its_size(cottage: Book) -> None:
    found = resolve(cottage.rows()).elements[0].openings[0]
    assert (found.width, found.height, found.count) == (1.2, 1.5, 2)
    assert found.area == pytest.approx(3.6)
