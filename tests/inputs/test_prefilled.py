"""What a new workbook holds: standard profiles, materials, and an example whose areas and volumes close."""

from __future__ import annotations

import csv
from collections import Counter, defaultdict
from importlib import resources
from typing import TYPE_CHECKING

import pytest

from heatledger.inputs.columns import SheetRow
from heatledger.inputs.prefilled import blank_values, example_values
from heatledger.inputs.rows import SHEETS, ElementRow, Rows, UsageRow

if TYPE_CHECKING:
    from tests.conftest import Book

STREET, EAST, GARDEN, WEST = 157.5, 67.5, 337.5, 247.5
"""The four directions of the example. [°]"""


@pytest.fixture
def rows(example: Book) -> Rows:
    return example.rows()


def test_a_blank_workbook_holds_the_standard_profiles_and_the_materials_only() -> None:
    values = blank_values()

    assert set(values) == {"Usage", "Materials", "Monthly climate"}
    assert len(values["Materials"]) > 100


def test_the_standard_profiles_are_those_of_the_standard() -> None:
    """ISO 13790:2008, table G.12, recalled from memory: three of its columns."""
    profiles = {row["name"]: row for row in blank_values()["Usage"]}

    assert len(profiles) == 12
    assert profiles["Apartment block"] == {
        **{"name": "Apartment block", "heating_set_point": 20.0, "cooling_set_point": 26.0, "area_per_person": 40.0},
        **{"heat_per_person": 70.0, "presence": 12.0, "appliances": 30.0, "share_released": 70.0, "air_per_area": 0.7},
    }
    assert profiles["Office"]["area_per_person"] == 20.0
    assert profiles["Office"]["presence"] == 6.0
    assert profiles["Indoor pool"]["heating_set_point"] == profiles["Indoor pool"]["cooling_set_point"] == 28.0


def test_people_of_the_profiles_give_the_heat_per_area_of_the_standard() -> None:
    """ISO 13790:2008, table G.12, recalled from memory, states the product too, W/m², printed to two digits."""
    printed = {
        **{"Single-family house": 1.2, "Apartment block": 1.8, "Office": 4.0, "Education": 7.0, "Hospital": 2.7},
        **{"Restaurant": 20.0, "Trade": 9.0, "Sports": 5.0, "Meeting hall": 16.0, "Industrial": 5.0},
        **{"Warehouse": 1.0, "Indoor pool": 3.0},
    }

    for row in blank_values()["Usage"]:
        usage = UsageRow.model_validate(row)
        assert usage.area_per_person is not None
        assert usage.heat_per_person / usage.area_per_person == pytest.approx(printed[usage.name], abs=0.06)


@pytest.mark.parametrize("model", SHEETS, ids=lambda model: str(model.sheet))
def test_every_table_of_the_example_has_titles_of_its_sheet(model: type[SheetRow]) -> None:
    """A misspelt field would be left out in silence."""
    path = "example/" + model.sheet.casefold().replace(" ", "_").replace("-", "_") + ".csv"
    text = (resources.files("heatledger") / "data" / path).read_text(encoding="utf-8")
    lines = [line for line in text.splitlines() if not line.startswith("#")]

    assert text.startswith("# ")
    assert set(next(csv.reader(lines))) <= set(model.columns())


def test_the_example_has_no_problem(example: Book) -> None:
    assert example.problems() == []


def test_the_example_is_as_large_as_promised(rows: Rows) -> None:
    assert len(rows.zones) >= 4
    assert len(rows.elements) >= 30
    assert sum(opening.count for opening in rows.openings) >= 20
    assert {system.kind for system in rows.air_systems} >= {"natural", "balanced"}
    assert {element.azimuth for element in rows.elements} >= {STREET, EAST, GARDEN, WEST}


def test_every_row_of_the_example_is_used(rows: Rows) -> None:
    """Nothing stands in the example that an assessor would wonder about."""
    used = {zone.usage for zone in rows.zones} | {zone.air_system for zone in rows.zones}
    own = [row["name"] for row in example_values()["Usage"] if row not in blank_values()["Usage"]]

    assert {system.name for system in rows.air_systems} <= used
    assert set(own) <= used
    build_ups = {element.build_up for element in rows.elements} | {floor.build_up for floor in rows.ground_floors}
    build_ups |= {floor.basement_wall for floor in rows.ground_floors}
    assert {layer.name for layer in rows.build_ups} == build_ups - {""}
    assert {unit.name for unit in rows.glazed_units} == {opening.glazed_unit for opening in rows.openings}
    behind = {row.obstruction for row in rows.openings} | {element.obstruction for element in rows.elements}
    assert {obstruction.name for obstruction in rows.obstructions} == behind - {""}
    assert {device.name for device in rows.shading_devices} == {opening.shading for opening in rows.openings} - {""}
    conditioned = {zone.name for zone in rows.zones if zone.conditioning != "unconditioned"}
    assert {bridge.zone for bridge in rows.thermal_bridges} == conditioned


def _areas(rows: Rows) -> dict[tuple[str, str], float]:
    """Gross area of every pair of sides; a wall to outdoors by its direction."""
    areas: dict[tuple[str, str], float] = defaultdict(float)
    for element in rows.elements:
        areas[element.zone, _side(element)] += element.area
    return areas


def _side(element: ElementRow) -> str:
    level = element.kind == "roof" or element.tilt is not None
    return f"{element.faces} {element.azimuth if not level else 'up'}" if element.faces == "outdoors" else element.faces


def test_the_areas_of_the_example_close(rows: Rows) -> None:
    """Perimeter times storey height, by hand: house 14.0 by 9.0 m, storeys 3.4 and 3.0 m, stair 2.5 by 4.0 m,
    wing 6.0 by 7.0 m of which 5.0 m touch the workshop."""
    areas = _areas(rows)
    storey, upper = 3.4, 3.0

    assert areas["Workshop", f"outdoors {STREET}"] == pytest.approx(14.0 * storey)
    assert areas["Workshop", f"outdoors {GARDEN}"] == pytest.approx((14.0 - 2.5) * storey)
    assert areas["Workshop", f"outdoors {EAST}"] == pytest.approx((9.0 - 5.0) * storey)
    assert areas["Workshop", "neighbour"] == pytest.approx(9.0 * storey)
    assert areas["Workshop", "Reading room"] == pytest.approx(5.0 * storey)
    assert areas["Workshop", "Stair"] == pytest.approx((4.0 + 2.5 + 4.0) * storey)
    assert areas["Workshop", "Flat 1"] + areas["Workshop", "Flat 2"] == pytest.approx(14.0 * 9.0 - 2.5 * 4.0)
    assert areas["Reading room", f"outdoors {WEST}"] == pytest.approx(2.0 * storey)
    assert sum(
        areas["Reading room", f"outdoors {direction}"] for direction in (STREET, EAST, GARDEN, WEST)
    ) == pytest.approx((2 * 6.0 + 2 * 7.0 - 5.0) * storey)
    assert areas["Reading room", "outdoors up"] == pytest.approx(6.0 * 7.0)
    flats = [(areas[flat, f"outdoors {STREET}"], areas[flat, f"outdoors {GARDEN}"]) for flat in ("Flat 1", "Flat 2")]
    assert sum(street for street, _ in flats) == pytest.approx(14.0 * upper)
    assert sum(garden for _, garden in flats) == pytest.approx((14.0 - 2.5) * upper)
    assert areas["Flat 2", f"outdoors {EAST}"] == pytest.approx(9.0 * upper)
    assert areas["Flat 1", "Stair"] + areas["Flat 2", "Stair"] == pytest.approx((4.0 + 2.5 + 4.0) * upper)
    assert areas["Stair", f"outdoors {GARDEN}"] == pytest.approx(2.5 * (storey + upper))
    under_roof = [areas[zone, "Roof space"] for zone in ("Flat 1", "Flat 2", "Stair")]
    assert sum(under_roof) == pytest.approx(14.0 * 9.0)
    assert areas["Workshop", "Flat 1"] == areas["Flat 1", "Roof space"]


def test_the_roof_of_the_example_closes(rows: Rows) -> None:
    """Two slopes of 40° over 9.0 m: 4.5 m/cos 40° = 5.874 m each, ridge 4.5 m·tan 40° = 3.776 m above the eaves."""
    areas = {element.name: element.area for element in rows.elements}

    assert areas["L-street slope"] == areas["L-garden slope"] == pytest.approx(14.0 * 5.874, abs=0.01)
    assert areas["L-east gable"] == areas["L-party gable"] == pytest.approx(9.0 * 3.776 / 2, abs=0.01)


def test_the_floors_of_the_example_close(rows: Rows) -> None:
    """Floors by outer dimensions; the edge of the wing is its outer walls, that of the house leaves out two sides.

    The cellar is 5.0 m of the house's length at the party wall, so its edge is 5.0 m at the street and at the garden.
    """
    floors = {floor.name: floor for floor in rows.ground_floors}
    house = [floors[name] for name in ("Workshop floor", "Workshop floor over the cellar", "Stair floor")]
    cellar, wing = house[1], floors["Reading room floor"]

    assert sum(floor.area for floor in house) == pytest.approx(14.0 * 9.0)
    assert sum(floor.perimeter for floor in house) == pytest.approx(2 * 14.0 + 4.0)
    assert (cellar.area, cellar.perimeter) == pytest.approx((5.0 * 9.0, 2 * 5.0))
    assert (wing.area, wing.perimeter) == pytest.approx((6.0 * 7.0, 2 * 6.0 + 2 * 7.0 - 5.0))
    assert {floor.type for floor in floors.values()} == {"slab on ground", "suspended", "unheated basement"}


def test_the_cellar_of_the_example_holds_the_air_between_its_walls(rows: Rows) -> None:
    """5.0 m less 0.38 m of walls by 9.0 m less two walls of 0.51 m; 1.9 and 0.3 m less the vault of 0.22 m."""
    (cellar,) = [floor for floor in rows.ground_floors if floor.type == "unheated basement"]
    height = (cellar.basement_depth or 0.0) + (cellar.height_above_ground or 0.0)

    assert height == pytest.approx(2.2)
    assert cellar.basement_volume == pytest.approx((5.0 - 0.38) * (9.0 - 1.02) * (height - 0.22), abs=0.5)


def test_bridges_to_the_roof_space_are_as_long_as_the_walls_below(rows: Rows) -> None:
    """The party wall is 9.0 m long; half of the stair's walls (4.0 + 2.5 + 4.0 m) stands beside each flat."""
    lengths = {(bridge.zone, bridge.length) for bridge in rows.thermal_bridges if bridge.faces == "Roof space"}

    assert lengths == {("Flat 1", 9.0), ("Flat 1", 5.25), ("Flat 2", 5.25)}


def test_edges_of_floors_are_as_long_as_their_perimeter(rows: Rows) -> None:
    edges: Counter[str] = Counter()
    for bridge in rows.thermal_bridges:
        if bridge.name.startswith(("Slab edge", "Edge of the vault", "Floor edge")):
            edges[bridge.zone] += round(1000 * (bridge.length or 0.0))
    floors: Counter[str] = Counter()
    for floor in rows.ground_floors:
        floors[floor.zone] += round(1000 * floor.perimeter)

    assert edges == {zone: length for zone, length in floors.items() if zone != "Stair"}


def test_floor_areas_and_heights_of_the_example_are_plausible(rows: Rows) -> None:
    """Inner dimensions lie below outer ones, and clear heights below storey heights."""
    outer = {"Workshop": 116.0, "Reading room": 42.0, "Flat 1": 60.25, "Flat 2": 55.75, "Stair": 20.0}
    storeys = {"Workshop": 3.4, "Reading room": 3.4, "Flat 1": 3.0, "Flat 2": 3.0, "Stair": 3.2}

    for zone in rows.zones:
        height = zone.air_volume / zone.floor_area
        assert 2.0 <= height <= 6.0
        if zone.name in outer:
            assert 0.75 * outer[zone.name] < zone.floor_area < 0.95 * outer[zone.name]
            assert storeys[zone.name] - 0.7 < height < storeys[zone.name] - 0.2


def test_window_reveals_of_the_example_are_as_long_as_its_windows(rows: Rows) -> None:
    zones = {element.name: element.zone for element in rows.elements if element.kind == "wall"}
    lengths: Counter[str] = Counter()
    for opening in rows.openings:
        if opening.element in zones:
            edge = round(2 * opening.count * (opening.width + opening.height) * 1000)
            lengths[zones[opening.element]] += edge

    for bridge in rows.thermal_bridges:
        if bridge.name.startswith("Window reveals"):
            assert bridge.length == pytest.approx(lengths[bridge.zone] / 1000)
