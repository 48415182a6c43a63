"""Ground floors of every type through the whole engine, against vectors worked out apart from the project.

The floor of the vectors: A 100 m², P 40 m (B′ = 5 m), walls 0.3 m thick, sand or gravel (λ 2.0, ρc 2e6, so
δ = 3.1665 m), R_si 0.17, R_se 0.04. Formulas of ISO 13370:2007, recalled from memory; U printed to four digits.
"""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from heatledger.balance.calculate import calculate
from heatledger.building.model import Building
from heatledger.inputs.rules_ground_floors import SOIL_CONDUCTIVITIES
from heatledger.results import GroundFloorResult, Note, Results
from heatledger.standards.iso13370 import SOILS
from heatledger.standards.iso13370_monthly import PeriodicCoefficients, monthly_heat_flow

OUTDOOR = 10 - 9 * np.cos(2 * np.pi * np.arange(12) / 12)
HOURS = np.array([31, 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31]) * 24.0
WOOL = 0.04
"""Conductivity of the one material, so that 10 mm resist as much as 0.25 m²·K/W."""
SHEET = 1e-3
"""A floor that resists nothing. [mm]"""

Run = Callable[..., Results]


@pytest.fixture(scope="module")
def run(building: Callable[[Any], Building], flat_sky: Any) -> Run:
    """Calculate one heated zone of 20 and 26 °C that stands on a ground floor and has nothing else around it."""

    def calculated(
        thickness: float,
        wall: float = 40.0,
        conductivity: float = WOOL,
        latitude: float = 45.0,
        outdoor: Any = OUTDOOR,
        **floor: Any,
    ) -> Results:
        zone = {"name": "Z", "conditioning": "heated and cooled", "usage": "Use", "floor_area": 100.0}
        ground = {"name": "G", "zone": "Z", "type": "slab on ground", "area": 100.0, "perimeter": 40.0}
        layers = [
            {"name": name, "layer": 1, "material": "Wool", "thickness": layer}
            for name, layer in (("Floor", thickness), ("Wall", wall))
        ]
        values = {
            "Project": [{"project": "P", "weather": "x", "site_exposure": floor.pop("site_exposure", "normal")}],
            "Zones": [{**zone, "air_volume": 250.0, "leakage": 0.0}],
            "Usage": [{"name": "Use", "heating_set_point": 20.0, "cooling_set_point": 26.0}],
            "Materials": [{"name": "Wool", "conductivity": conductivity, "density": 2000.0, "specific_heat": 1000.0}],
            "Build-ups": layers,
            "Ground floors": [{"build_up": "Floor", **ground, **floor}],
        }
        return calculate(building(values), flat_sky(outdoor, latitude=latitude))

    return calculated


SUSPENDED = {
    **{"type": "suspended", "height_above_ground": 0.5, "outer_wall_u_value": 1.7, "vent_area": 0.003},
    **{"wind_speed": 4.0},
}
HEATED = {"type": "heated basement", "basement_depth": 2.5, "basement_wall": "Wall"}
UNHEATED = {
    **{"type": "unheated basement", "basement_depth": 2.5, "basement_wall": "Wall", "ground_resistance": 0.5},
    **{"height_above_ground": 0.5, "outer_wall_u_value": 1.0, "basement_volume": 250.0},
}
HORIZONTAL = {"edge_insulation": "horizontal", "edge_depth": 1.0, "edge_resistance": 1.5, "edge_thickness": 50.0}
VERTICAL = {**HORIZONTAL, "edge_insulation": "vertical"}

# Thickness of the wool in the floor [mm], fields, and d, U, H_g, H_pi, H_pe, lag. The floor over the suspended space
# has U_f 0.3, so R = 1/0.3 − 0.34; that over the cellar U_f 0.5.
VECTORS: dict[str, tuple[float, dict[str, Any], tuple[float, ...]]] = {
    "slab": (SHEET, {}, (0.72, 0.7615, 76.15, 71.558, 49.906, 1)),
    "insulated slab": (100.0, {}, (5.72, 0.2498, 24.98, 26.763, 13.041, 1)),
    "horizontal edge": (SHEET, HORIZONTAL, (0.72, 0.6011, 60.11, 71.558, 41.378, 1)),
    "vertical edge": (SHEET, VERTICAL, (0.72, 0.5338, 53.38, 71.558, 35.159, 2)),
    "suspended": ((1 / 0.3 - 0.34) * WOOL * 1000, SUSPENDED, (0.72, 0.2429, 24.29, 23.774, 21.023, 0)),
    "heated basement": (20.0, HEATED, (1.72, 0.4197, 83.94, 101.873, 41.692, 1)),
    "unheated basement": ((1 / 0.5 - 0.34) * WOOL * 1000, UNHEATED, (1.72, 0.3601, 36.01, 38.691, 20.928, 1)),
}


@pytest.mark.parametrize("name", VECTORS)
def test_vectors(name: str, run: Run) -> None:
    thickness, fields, (slab, u_value, steady, inside, outside, lag) = VECTORS[name]
    (floor,) = run(thickness, **fields).ground_floors
    assert floor.characteristic_dimension == pytest.approx(5.0)
    assert floor.equivalent_thickness == pytest.approx(slab, abs=1e-4)
    assert floor.u_value == pytest.approx(u_value, abs=6e-5)
    assert floor.coefficient == pytest.approx(steady, abs=0.012)
    assert floor.inside_periodic_coefficient == pytest.approx(inside, abs=2e-3)
    assert floor.outside_periodic_coefficient == pytest.approx(outside, abs=2e-3)
    assert floor.lag == lag


@pytest.mark.parametrize("name", VECTORS)
def test_the_monthly_heat_flow_of_the_standard_is_that_of_the_balance(name: str, run: Run) -> None:
    """Nothing but the ground floor carries heat, so the zone's transmission is its heat flow times the hours."""
    thickness, fields, _ = VECTORS[name]
    results = run(thickness, **fields)
    (floor,), zone = results.ground_floors, results.zone("Z")
    swings = PeriodicCoefficients(
        np.asarray(floor.inside_periodic_coefficient), np.asarray(floor.outside_periodic_coefficient)
    )
    for mode, set_point in (("heating", 20.0), ("cooling", 26.0)):
        flow = monthly_heat_flow(floor.coefficient, swings, np.full(12, set_point), OUTDOOR, (0.0, floor.lag))
        assert getattr(floor, f"heat_flow_{mode}") == pytest.approx(flow, abs=1e-9)
        assert getattr(zone, f"transmission_{mode}") == pytest.approx(flow * HOURS / 1000, abs=1e-6)


@pytest.mark.parametrize(("name", "coldest"), [("slab", 1), ("vertical edge", 2), ("suspended", 0)])
def test_the_ground_is_coldest_after_the_lag_of_the_type(name: str, coldest: int, run: Run) -> None:
    """By hand for the slab in February: 10 − 49.906/76.15·9 = 4.102 °C."""
    thickness, fields, _ = VECTORS[name]
    (floor,) = run(thickness, **fields).ground_floors
    assert floor.temperature.argmin() == coldest
    assert floor.temperature.mean() == pytest.approx(10.0)
    if name == "slab":
        assert floor.temperature[1] == pytest.approx(4.102, abs=1e-3)


@pytest.mark.parametrize("name", VECTORS)
def test_the_south_is_half_a_year_apart(name: str, run: Run) -> None:
    thickness, fields, _ = VECTORS[name]
    (north,) = run(thickness, **fields).ground_floors
    (south,) = run(thickness, latitude=-34.0, outdoor=np.roll(OUTDOOR, 6), **fields).ground_floors
    assert south.temperature == pytest.approx(np.roll(north.temperature, 6), abs=1e-9)
    assert south.heat_flow_heating == pytest.approx(np.roll(north.heat_flow_heating, 6), abs=1e-9)


def test_walls_of_a_heated_basement_store_heat(run: Run) -> None:
    """Heavy layers of 10 mm that conduct well: 20 kJ/(m²·K) on 100 m² of floor and 2.5·40 m² of wall; 10 for air."""
    (zone,) = run(10.0, wall=10.0, conductivity=200.0, **HEATED).zones
    assert zone.heat_capacity == pytest.approx(20 * 100 + 20 * 100 + 10 * 100, rel=0.01)
    assert run(10.0, conductivity=200.0).zones[0].heat_capacity == pytest.approx(20 * 100 + 10 * 100, rel=0.01)


def test_a_floor_by_its_u_value_is_the_floor_by_its_layers(run: Run) -> None:
    """100 mm of wool with 0.17 and 0.04 m²·K/W make U = 1/2.71, for every type."""
    for fields in ({}, SUSPENDED, HEATED, UNHEATED):
        (layers,) = run(100.0, **fields).ground_floors
        (figure,) = run(100.0, **fields, build_up="", u_value=1 / 2.71).ground_floors
        assert figure.u_value == pytest.approx(layers.u_value, rel=1e-12)


@pytest.mark.parametrize(("exposure", "u_value"), [("sheltered", 0.23882), ("open", 0.24856)])
def test_wind_under_a_suspended_floor_follows_the_site(exposure: str, u_value: float, run: Run) -> None:
    """f_w 0.02 and 0.10: U_x = 0.34 + 3.48·f_w = 0.4096 and 0.688; 1/(1/0.3 + 1/(0.7615 + U_x))."""
    thickness, fields, _ = VECTORS["suspended"]
    (floor,) = run(thickness, **fields, site_exposure=exposure).ground_floors
    assert floor.u_value == pytest.approx(u_value, abs=2e-5)


def test_soils_of_the_input_rules_are_those_of_the_standard() -> None:
    assert {name: soil.conductivity for name, soil in SOILS.items()} == SOIL_CONDUCTIVITIES


@settings(max_examples=25, deadline=None)
@given(wool=st.floats(1.0, 300.0), soil=st.sampled_from(sorted(SOILS)))
def test_a_basement_of_hardly_any_depth_is_a_slab(wool: float, soil: str, run: Run) -> None:
    (slab,) = run(wool, soil=soil).ground_floors
    (basement,) = run(wool, soil=soil, **{**HEATED, "basement_depth": 1e-7}).ground_floors
    assert basement.coefficient == pytest.approx(slab.coefficient, rel=1e-5)
    assert basement.temperature == pytest.approx(slab.temperature, abs=1e-4)


@settings(max_examples=25, deadline=None)
@given(wool=st.floats(1.0, 300.0), kind=st.sampled_from(["horizontal", "vertical"]))
def test_edge_insulation_of_hardly_any_depth_or_gain_is_a_slab(wool: float, kind: str, run: Run) -> None:
    (slab,) = run(wool).ground_floors
    for change in ({"edge_depth": 1e-9}, {"edge_resistance": 0.025 + 1e-9}):
        (edged,) = run(wool, **{**HORIZONTAL, "edge_insulation": kind, **change}).ground_floors
        assert edged.u_value == pytest.approx(slab.u_value, rel=1e-6)
        assert edged.outside_periodic_coefficient == pytest.approx(slab.outside_periodic_coefficient, rel=1e-6)


def _crossing(run: Run, fields: dict[str, Any], meeting: float) -> list[float]:
    """H_g a little below and above a thickness of wool. [W/K]"""
    found: list[GroundFloorResult] = [run(meeting * part, **fields).ground_floors[0] for part in (1 - 1e-9, 1 + 1e-9)]
    return [floor.coefficient for floor in found]


@pytest.mark.parametrize(
    ("fields", "resistance"),
    [({}, (5 - 0.72) / 2), (HORIZONTAL, (5 - 0.72) / 2), (HEATED, (5 - 1.25 - 0.72) / 2)],
    ids=["slab", "edge", "heated basement"],
)
def test_branches_meet_where_the_floor_is_as_thick_as_its_width(
    fields: dict[str, Any], resistance: float, run: Run
) -> None:
    """At d_t = B′ (basement: d_t + z/2) the rounded constants of the standard leave a step of 0.014 %."""
    below, above = _crossing(run, fields, resistance * WOOL * 1000)
    assert above / below == pytest.approx(1.0, abs=1.5e-4)
    assert above != below


def test_a_deep_strip_saves_no_more_than_insulation_under_the_whole_floor(run: Run) -> None:
    """A floor of 20 by 0.5 m (B′ 0.5 m) with a strip of 3 m: the plain formula would give −0.39 W/(m²·K)."""
    narrow = {**VERTICAL, "area": 10.0, "perimeter": 40.0, "edge_depth": 3.0}
    results = run(SHEET, **narrow)
    # d_t + d′ = 0.72 + 2.95 = 3.67 is above B′: λ/(0.457·B′ + d) = 2/(0.2285 + 3.67).
    assert results.ground_floors[0].u_value == pytest.approx(0.51302, abs=1e-5)
    assert texts(results) == [
        "G: area over half of the exposed perimeter is 0.5 m; usual is 2 to 50 m, and outside of it the method for the "
        "ground is less sure. The perimeter counts only where outdoors is beside the floor.",
        "G: the edge insulation reaches 3 m, more than half of the floor's width (0.25 m); its saving is limited to "
        "that of the same insulation under the whole floor.",
    ]


def texts(results: Results) -> list[str]:
    return [note.text for note in ground_notes(results)]


def ground_notes(results: Results) -> list[Note]:
    return [note for note in results.notes if note.kind == "check" and note.sheet == "Ground floors"]


def test_ordinary_ground_floors_ask_for_no_second_look(run: Run) -> None:
    for thickness, fields, _ in VECTORS.values():
        assert texts(run(thickness, **fields)) == []


@pytest.mark.parametrize(
    ("fields", "column", "sentence"),
    [
        (
            {**SUSPENDED, "vent_area": 0.02},
            "vent_area",
            "G: the vent area is 0.02 m²/m; usual is 0.0005 to 0.006 m²/m; a space so open is better entered as "
            "outdoors, the floor on sheet Envelope.",
        ),
        (
            {**SUSPENDED, "vent_area": 0.0},
            "vent_area",
            "G: the vent area is 0 m²/m; usual is 0.0005 to 0.006 m²/m; a space that is hardly aired may be damp.",
        ),
        (
            {**UNHEATED, "basement_volume": 25.0},
            "basement_volume",
            "G: the basement holds 25 m³ of air, but area times depth and height above ground is 300 m³.",
        ),
    ],
)
def test_figures_that_ask_for_a_second_look(
    fields: dict[str, Any], column: str, sentence: str, run: Run, building: Callable[[Any], Building]
) -> None:
    (note,) = ground_notes(run(20.0, **fields))
    letters = {"vent_area": "P", "basement_volume": "U"}
    assert (note.text, note.cell) == (sentence, f"{letters[column]}5")
