"""Temperatures and dynamics of build-ups as results, and two of them side by side."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any, TypeAlias

import numpy as np
import pytest

from heatledger.balance.calculate import calculate
from heatledger.building.model import Building
from heatledger.results import Results

Layer: TypeAlias = Callable[..., dict[str, Any]]
Run: TypeAlias = Callable[..., Results]

OUTDOOR = np.array([-2.0, 0, 5, 9, 14, 18, 21, 20, 16, 10, 4, -1])


@pytest.fixture(scope="module")
def run(building: Callable[[Any], Building], flat_sky: Any, wall_rows: Callable[..., Any]) -> Run:
    def calculated(*layers: dict[str, Any], other: dict[str, Any] | None = None, **project: Any) -> Results:
        rows = wall_rows(layers)
        if other:
            rows["Build-ups"].append({"name": "Other", "layer": 1} | other)
            project |= {"compared": "Wall", "compared_with": "Other"}
        rows["Project"][0] |= project
        return calculate(building(rows), flat_sky(OUTDOOR))

    return calculated


def test_temperatures_at_the_design_temperatures(run: Run, make_layer: Layer) -> None:
    """By hand: R 0.13 + 0.2 + 2.5 + 0.04 = 2.87, 33 K: 11.49826 W/m²; steps of 1.49477, 2.29965, 28.74564, 0.45993."""
    results = run(make_layer("Stone", 200), make_layer("Insulation", 100), design_inside=21.0, design_outside=-12.0)
    (found,) = results.build_ups
    assert found.heat_flux == pytest.approx(11.49826, abs=5e-6)
    assert found.inside_surface_temperature == pytest.approx(21 - 1.49477, abs=5e-6)
    assert found.temperature_factor == pytest.approx(1 - 0.13 / 2.87, abs=1e-9)
    expected = np.cumsum([21.0, -1.49477, -2.29965, -28.74564, -0.45993])
    assert found.surface_temperatures == pytest.approx(expected.tolist(), abs=2e-5)


def test_without_a_design_temperature_the_coldest_month_stands_outside(run: Run, make_layer: Layer) -> None:
    (found,) = run(make_layer("Stone", 200)).build_ups
    assert (found.surface_temperatures[0], found.surface_temperatures[-1]) == pytest.approx((20.0, -2.0))


def test_no_difference_of_temperature_drives_no_heat(run: Run, make_layer: Layer) -> None:
    (found,) = run(make_layer("Stone", 200), design_outside=20.0).build_ups
    assert found.heat_flux == 0.0
    assert found.temperature_factor == pytest.approx(1 - 0.13 * 1 / 0.37)


def test_limits_error_and_corrections_are_shown(run: Run, make_layer: Layer) -> None:
    """Stud wall by hand: upper 2.933978; lower 0.17 + 1/(0.85/3.684211 + 0.15/1.076923)."""
    stud = {"second_material": "Timber", "second_share": 15.0}
    (found,) = run(make_layer("Wool", 140, **stud, gaps="circulating")).build_ups
    lower = 0.17 + 1 / (0.85 / 3.684211 + 0.15 / 1.076923)
    assert (found.upper_limit, found.lower_limit) == pytest.approx((2.933978, lower), abs=2e-6)
    mean = (2.933978 + lower) / 2
    assert found.resistance == pytest.approx(mean, abs=2e-6)
    assert found.error == pytest.approx(100 * (2.933978 - lower) / 2 / mean, abs=1e-4)
    assert found.correction == pytest.approx(0.04 * ((lower - 0.17) / mean) ** 2, abs=1e-6)
    assert found.u_value == pytest.approx(1 / mean + found.correction, abs=1e-6)


def test_layers_are_named_with_what_is_in_them(run: Run, make_layer: Layer) -> None:
    voids = {"void_width": 50.0, "void_depth": 50.0, "void_share": 45.0}
    (found,) = run(
        make_layer("Stone", 150, **voids),
        make_layer("Wool", 100, second_material="Timber", second_share=12.5),
        make_layer("Insulation", 100, taper="rectangle"),
        make_layer("well ventilated", 40),
        make_layer("Brick", 100),
    ).build_ups
    assert [layer.material for layer in found.layers] == [
        "Stone, 45 % voids",
        "Wool, 12.5 % Timber",
        "Insulation, tapered",
        "well ventilated air layer",
        "Brick",
    ]
    assert [layer.resistance for layer in found.layers[3:]] == [0.0, 0.0]
    assert len(found.surface_temperatures) == 3 + 3


def test_the_better_of_two_in_words(run: Run, make_layer: Layer) -> None:
    """U by hand: 1/(0.17 + 0.2) = 2.70 and 1/(0.17 + 2.5) = 0.37; wool stores almost nothing."""
    results = run(make_layer("Stone", 200), other=make_layer("Insulation", 100))
    assert results.comparison is not None
    assert (results.comparison.first.name, results.comparison.second.name) == ("Wall", "Other")
    constants = sorted(found.time_constant for found in results.build_ups)
    assert results.comparison.verdict == (
        "'Other' loses less heat (U 0.37 against 2.70 W/(m²·K)); 'Wall' keeps it longer once heating stops "
        f"(time constant {constants[1]:.0f} against {constants[0]:.0f} h)."
    )


@pytest.mark.parametrize(
    ("material", "thickness", "words"),
    [
        ("Stone", 400, "'Other' holds heat better: it loses less (U 1.75 against 2.70 W/(m²·K)) and keeps it longer ("),
        ("Stone", 100, "'Wall' holds heat better: it loses less (U 2.70 against 3.70 W/(m²·K)) and keeps it longer ("),
        ("Stone", 200, "Both hold heat equally well (U 2.70 against 2.70 W/(m²·K); time constant 19 against 19 h)."),
    ],
)
def test_one_that_is_better_in_both(run: Run, make_layer: Layer, material: str, thickness: float, words: str) -> None:
    comparison = run(make_layer("Stone", 200), other=make_layer(material, thickness)).comparison
    assert comparison is not None
    assert comparison.verdict.startswith(words)


def test_the_comparison_is_part_of_the_plain_results(run: Run, make_layer: Layer) -> None:
    plain = run(make_layer("Stone", 200), other=make_layer("Wool", 100)).to_json()["comparison"]
    assert plain["second"]["name"] == "Other"
    assert plain["first"]["layers"][0]["material"] == "Stone"
    assert run(make_layer("Stone", 200)).to_json()["comparison"] is None


def test_a_cladding_alone_leaves_the_surfaces(run: Run, make_layer: Layer) -> None:
    """ISO 6946:2017, 6.9.4: nothing inside the cavity, so R_si twice, 0.26 m²·K/W; it stores nothing."""
    (found,) = run(make_layer("well ventilated", 40), make_layer("Brick", 100), design_outside=-6.0).build_ups
    assert found.u_value == pytest.approx(1 / 0.26)
    assert found.surface_temperatures == pytest.approx((20.0, 7.0, -6.0))
    assert (found.internal_heat_capacity, found.time_constant) == (0.0, 0.0)


def test_under_a_floor_on_the_ground_stands_the_mean_of_the_year(
    building: Callable[[Any], Building], flat_sky: Any, wall_rows: Callable[..., Any], make_layer: Layer
) -> None:
    rows = wall_rows([make_layer("Concrete", 200)])
    floor = {"name": "F", "zone": "Z", "type": "slab on ground", "area": 50.0, "perimeter": 30.0, "build_up": "Wall"}
    rows["Ground floors"] = [floor]
    ground, wall = calculate(building(rows), flat_sky(OUTDOOR)).build_ups
    assert (ground.heat_flow, wall.heat_flow) == ("down, to the ground", "horizontal, outdoors")
    assert ground.surface_temperatures[-1] == pytest.approx(OUTDOOR.mean())
    assert wall.surface_temperatures[-1] == pytest.approx(-2.0)
