"""Build-ups as rows of a workbook against published examples, hand calculation and one another."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any, TypeAlias

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from heatledger.balance.calculate import calculate
from heatledger.balance.constructions import Construction, construct
from heatledger.building.model import Building

Layer: TypeAlias = Callable[..., dict[str, Any]]
Placed: TypeAlias = Callable[..., Construction]

STUD = {"second_material": "Timber", "second_share": 15.0}


@pytest.fixture(scope="module")
def placed(building: Callable[[Any], Building], wall_rows: Callable[..., Any]) -> Placed:
    """The one element of a room, from its layers."""

    def of(*layers: dict[str, Any], **element: Any) -> Construction:
        return construct(building(wall_rows(layers, **element))).of_element["W"]

    return of


def test_timber_frame_example(placed: Placed, make_layer: Layer) -> None:
    """UK Approved Document L1 (2002), appendix B, recalled from memory: 3.476, 3.304, 3.390, U 0.30 with gaps 0.006.

    The air layer by formula, 0.18441 instead of the rounded 0.18 of the example, moves the limits by 0.005.
    """
    found = placed(
        make_layer("Plasterboard", 12.5),
        make_layer("Wool", 140, **STUD, gaps="bridging"),
        make_layer("Plywood", 9),
        make_layer("unventilated", 50),
        make_layer("Brick", 102),
    )
    assert found.limits.upper == pytest.approx(3.476 + 0.005, abs=0.001)
    assert found.limits.lower == pytest.approx(3.304 + 0.005, abs=0.001)
    assert found.corrections.gaps == pytest.approx(0.00636 * (3.390 / 3.395) ** 2, abs=0.00002)
    assert found.u_value == 1 / found.total  # 2.2 % may be left out
    assert round(found.u_value + found.corrections.total, 2) == 0.30


def test_dry_lining_example(placed: Placed, make_layer: Layer) -> None:
    """The same source, fairly sure: two layers bridged across one another, 3.390, 2.973, U 0.31."""
    found = placed(
        make_layer("Plasterboard", 12.5),
        make_layer("Wool", 89, second_material="Timber", second_share=11.8),
        make_layer("Aerated block", 100, second_material="Mortar", second_share=6.7),
        make_layer("unventilated", 50),
        make_layer("Brick", 102),
    )
    assert (found.limits.upper, found.limits.lower) == pytest.approx((3.390 + 0.004, 2.973 + 0.004), abs=0.001)
    assert round(found.u_value, 2) == 0.31


def test_layers_add_up_to_the_total_resistance(placed: Placed, make_layer: Layer) -> None:
    """Also with bridged, hollow, tapered and slightly ventilated layers at once."""
    block = {"void_width": 40.0, "void_depth": 40.0, "void_share": 60.0, "void_rows": 2}
    found = placed(
        make_layer("Plasterboard", 12.5),
        make_layer("Wool", 100, **STUD),
        make_layer("Stone", 150, second_material="Mortar", second_share=5.0, **block),
        make_layer("Insulation", 80, taper="rectangle"),
        make_layer("slightly ventilated", 40),
        make_layer("Brick", 102),
    )
    assert sum(found.resistances) + sum(found.surfaces) == pytest.approx(found.total, rel=1e-12)
    assert found.limits.lower < found.total < found.limits.upper
    assert len(found.resistances) == 6
    assert len(found.slices) == 5 + 5
    assert min(found.resistances) > 0


def test_neighbouring_layers_of_one_stud_run_through(placed: Placed, make_layer: Layer) -> None:
    """By hand, R_si 0.13, R_se 0.04: two layers of 70 mm with one stud are one of 140 mm; crossing studs are not.

    Upper limit through: 0.85/(0.17 + 3.684211) + 0.15/(0.17 + 1.076923) = 0.340834 → 2.933978.
    """
    through = placed(make_layer("Wool", 70, **STUD), make_layer("Wool", 70, **STUD))
    whole = placed(make_layer("Wool", 140, **STUD))
    crossing = placed(make_layer("Wool", 70, **STUD), make_layer("Wool", 70, **STUD | {"second_share": 15.001}))
    assert through.limits.upper == pytest.approx(2.933978, abs=2e-6)
    assert tuple(through.limits) == pytest.approx(tuple(whole.limits), rel=1e-12)
    assert crossing.limits.upper > through.limits.upper + 0.1
    assert crossing.limits.lower == pytest.approx(through.limits.lower, rel=1e-4)


def test_a_stud_does_not_run_through_another_layer(placed: Placed, make_layer: Layer) -> None:
    apart = placed(make_layer("Wool", 70, **STUD), make_layer("Plywood", 9), make_layer("Wool", 70, **STUD))
    together = placed(make_layer("Wool", 70, **STUD), make_layer("Wool", 70, **STUD), make_layer("Plywood", 9))
    assert apart.limits.upper > together.limits.upper + 0.1


def test_a_block_with_voids(placed: Placed, make_layer: Layer) -> None:
    """By hand: E 1/(2/0.9 − 1) = 0.818182, factor of a square void ½(1 + √2 − 1) = 0.707107, so the void resists
    1/(1.25 + 5.1·0.818182·0.707107) = 0.238063 m²·K/W; webs 0.05, shells twice 0.05.

    Lower: 0.17 + 0.1 + 1/(0.5/0.238063 + 0.5/0.05) = 0.352643; upper: 1/(0.5/0.508063 + 0.5/0.32) = 0.392676.
    """
    voids = {"void_width": 50.0, "void_depth": 50.0, "void_share": 50.0}
    found = placed(make_layer("Stone", 150, **voids))
    assert found.limits.lower == pytest.approx(0.352643, abs=2e-6)
    assert found.limits.upper == pytest.approx(0.392676, abs=2e-6)


def test_bright_voids_resist_more_and_different_faces_count_as_their_mean(placed: Placed, make_layer: Layer) -> None:
    """E of 0.2 and 0.9 is 1/(5 + 1/0.9 − 1) = 0.195652, also the other way round."""
    voids = {"void_width": 50.0, "void_depth": 50.0, "void_share": 50.0}
    one = placed(make_layer("Stone", 150, **voids, inner_emissivity=0.2))
    other = placed(make_layer("Stone", 150, **voids, outer_emissivity=0.2))
    void = 1 / (1.25 + 5.1 * 0.195652 * 0.707107)
    assert one.limits.lower == pytest.approx(0.27 + 1 / (0.5 / void + 0.5 / 0.05), abs=2e-6)
    assert other.total == pytest.approx(one.total, rel=1e-12)


def test_joints_of_a_block_lie_beside_its_shells_and_webs(placed: Placed, make_layer: Layer) -> None:
    """By hand: joint 6 % of λ 0.88 through 150 mm, 0.170455; shells and row as above.

    Upper: 0.47/(0.17 + 0.15) + 0.47/(0.17 + 0.338063) + 0.06/(0.17 + 0.170455) = 2.570067 → 0.389095.
    """
    voids = {"void_width": 50.0, "void_depth": 50.0, "void_share": 50.0}
    found = placed(make_layer("Stone", 150, **voids, second_material="Mortar", second_share=6.0))
    assert found.limits.upper == pytest.approx(0.389095, abs=2e-6)


@pytest.mark.parametrize(("emissivity", "resistance"), [(0.9, 0.1844), (0.2, 0.4449), (0.05, 0.6651)])
def test_bright_faces_of_an_air_layer(placed: Placed, make_layer: Layer, emissivity: float, resistance: float) -> None:
    """ISO 6946:2017, annex D, 50 mm, level: h_a 1.25 and 5.1·E with E 0.8182, 0.1957, 0.0497: by hand."""
    found = placed(make_layer("unventilated", 50, inner_emissivity=emissivity))
    assert found.resistances[0] == pytest.approx(resistance, abs=0.00006)


def test_battens_bridge_an_air_layer(placed: Placed, make_layer: Layer) -> None:
    """By hand, lower limit: sections of 10 % timber and 90 % air, R_g = 1/(1.25 + 4.172727) = 0.184409."""
    found = placed(make_layer("unventilated", 25, second_material="Timber", second_share=10.0))
    lower = 0.17 + 1 / (0.9 / 0.184409 + 0.1 / (0.025 / 0.13))
    assert found.limits.lower == pytest.approx(lower, abs=1e-6)


@pytest.mark.parametrize(("openings", "share"), [(500.0, 0.0), (750.0, 0.25), (1000.0, 0.5), (1500.0, 1.0)])
def test_a_slightly_ventilated_layer_lies_between(
    placed: Placed, make_layer: Layer, openings: float, share: float
) -> None:
    """ISO 6946:2017, 6.9.3."""

    def cladded(air: str, **more: Any) -> Construction:
        return placed(make_layer("Wool", 100, **STUD), make_layer(air, 40, **more), make_layer("Brick", 102))

    still, open_ = cladded("unventilated"), cladded("well ventilated")
    found = cladded("slightly ventilated", air_openings=openings)
    assert found.total == pytest.approx((1 - share) * still.total + share * open_.total, rel=1e-12)
    assert sum(found.resistances) + sum(found.surfaces) == pytest.approx(found.total, rel=1e-12)
    assert open_.surfaces == (0.13, 0.13)
    assert len(open_.resistances) == 1


@pytest.mark.parametrize(
    ("taper", "expected"),
    [("rectangle", 0.462098), ("triangle thick at apex", 0.565595), ("triangle thin at apex", 0.358601)],
)
def test_tapered_layers(placed: Placed, make_layer: Layer, taper: str, expected: float) -> None:
    """ISO 6946:2017, annex E, R_0 1 and R_2 3 (worked out apart from the project): 34.4 mm of λ 0.04 with 0.14."""
    found = placed(make_layer("Insulation", 34.4), make_layer("Insulation", 120, taper=taper), kind="roof")
    assert found.u_value == pytest.approx(expected, abs=5e-7)


def test_corrections(placed: Placed, make_layer: Layer) -> None:
    """By hand: R_tot 0.17 + 2.5 + 0.33 = 3; 0.8·50·12e-6·4/0.1·(2.5/3)² = 0.013333, major gaps 0.04·(2.5/3)²."""
    ties = {"fasteners": 4.0, "fastener_section": 12.0}
    insulation, rest = {"material": "Insulation", "thickness": 100.0}, make_layer("Stone", 330)
    tied = placed(insulation | ties, rest)
    assert tied.corrections.fasteners == pytest.approx(0.0133333, abs=5e-7)
    assert tied.u_value == pytest.approx(1 / 3 + 0.0133333, abs=5e-7)
    assert tied.without_surfaces == pytest.approx(1 / (1 / 3 + 0.0133333) - 0.17, abs=5e-6)
    gaps = placed(insulation | {"gaps": "circulating"}, rest)
    assert gaps.u_value == pytest.approx(1 / 3 + 0.04 * 6.25 / 9, abs=1e-9)
    recessed = placed(insulation | ties | {"fastener_depth": 60.0}, rest)
    assert recessed.corrections.fasteners == pytest.approx(0.008, abs=5e-7)
    thin = placed(insulation | ties | {"fastener_conductivity": 17.0}, rest)
    assert thin.corrections.fasteners == pytest.approx(0.0133333 * 17 / 50, abs=5e-7)
    assert thin.u_value == pytest.approx(1 / 3, abs=1e-9)  # 1.4 % is left out


def test_rain_on_an_inverted_roof(placed: Placed, make_layer: Layer) -> None:
    """By hand: R_tot 0.14 + 3 + 0.86 = 4; 2 mm/d · 0.04 · (3/4)² = 0.045."""
    found = placed(make_layer("Stone", 860), make_layer("Insulation", 120, rain=2.0), kind="roof")
    assert found.u_value == pytest.approx(0.25 + 0.045, abs=1e-9)
    drained = placed(make_layer("Stone", 860), make_layer("Insulation", 120, rain=2.0, drainage=0.02), kind="roof")
    assert drained.u_value == pytest.approx(0.25 + 0.0225, abs=1e-9)


def test_a_correction_outside_a_ventilated_cavity_does_not_count(placed: Placed, make_layer: Layer) -> None:
    found = placed(
        make_layer("Wool", 100), make_layer("well ventilated", 40), make_layer("Insulation", 50, gaps="circulating")
    )
    assert found.corrections.total == 0.0


def test_two_build_ups_are_compared_in_the_position_of_the_first(
    building: Callable[[Any], Building], wall_rows: Callable[..., Any], make_layer: Layer
) -> None:
    rows = wall_rows([make_layer("Stone", 200)], kind="roof")
    rows["Build-ups"].append({"name": "Spare", "layer": 1, "material": "Wool", "thickness": 100.0})
    rows["Project"][0] |= {"compared": "wall", "compared_with": "spare"}
    found = construct(building(rows))
    assert found.compared is not None
    assert [other.position for other in found.compared] == [("Wall", "up", "outdoors"), ("Spare", "up", "outdoors")]
    assert [other.build_up.name for other in found.used] == ["Spare", "Wall"]
    rows["Project"][0] |= {"compared": "Spare", "compared_with": "Wall"}
    found = construct(building(rows))
    assert found.compared is not None
    assert {other.position[1] for other in found.compared} == {"horizontal"}


thicknesses = st.floats(20, 300)
shares = st.floats(0, 100)


@st.composite
def bridged_walls(draw: st.DrawFn) -> list[dict[str, Any]]:
    """Two or three layers, some of them bridged, hollow or of air."""
    layers = []
    for _ in range(draw(st.integers(2, 3))):
        found: dict[str, Any] = {"material": draw(st.sampled_from(["Wool", "Stone", "Aerated block", "unventilated"]))}
        found["thickness"] = draw(thicknesses)
        if draw(st.booleans()):
            found |= {"second_material": draw(st.sampled_from(["Timber", "Mortar"])), "second_share": draw(shares)}
        if found["material"] == "Stone" and draw(st.booleans()):
            found |= {"void_width": 10.0, "void_depth": 10.0, "void_share": draw(st.floats(1, 99)), "void_rows": 2}
        layers.append(found)
    return layers


@given(layers=bridged_walls())
@settings(max_examples=60, deadline=None)
def test_the_upper_limit_is_never_below_the_lower(layers: list[dict[str, Any]], placed: Placed) -> None:
    found = placed(*layers)
    assert found.limits.upper >= found.limits.lower * (1 - 1e-12)
    assert sum(found.resistances) + sum(found.surfaces) == pytest.approx(found.total, rel=1e-9)


@given(layers=bridged_walls(), better=st.floats(0.2, 0.99), name=st.sampled_from(["Wool", "Stone", "Timber"]))
@settings(max_examples=40, deadline=None)
def test_a_better_insulant_never_raises_the_loss_of_the_wall(
    layers: list[dict[str, Any]],
    better: float,
    name: str,
    building: Callable[[Any], Building],
    wall_rows: Callable[..., Any],
    flat_sky: Any,
) -> None:
    """Through the whole engine; without corrections, which a better insulant may lift above the 3 % that count."""
    rows = wall_rows(layers)
    before = calculate(building(rows), flat_sky(np.full(12, 5.0)))
    material = next(row for row in rows["Materials"] if row["name"] == name)
    material["conductivity"] *= better
    after = calculate(building(rows), flat_sky(np.full(12, 5.0)))
    assert after.build_ups[0].u_value <= before.build_ups[0].u_value * (1 + 1e-12)
    losses = [next(loss for loss in found.element_losses if loss.name == "W") for found in (before, after)]
    assert losses[1].coefficient <= losses[0].coefficient * (1 + 1e-12)


@given(thickness=thicknesses, kind=st.sampled_from(["Wool", "Stone", "unventilated"]))
@settings(max_examples=30, deadline=None)
def test_shares_of_nothing_and_of_all_equal_the_homogeneous_walls(
    thickness: float, kind: str, building: Callable[[Any], Building], wall_rows: Callable[..., Any], flat_sky: Any
) -> None:
    """Through the whole engine: U, storage and response."""

    def result(**layer: Any) -> tuple[float, ...]:
        rows = wall_rows([{"material": "Brick", "thickness": 100.0}, {"thickness": thickness, **layer}])
        (found,) = calculate(building(rows), flat_sky(np.full(12, 5.0))).build_ups
        return found.u_value, found.internal_heat_capacity, found.time_shift, found.error

    second = {"second_material": "Timber"}
    nothing = result(material=kind, second_share=0.0, **second)
    assert nothing == pytest.approx(result(material=kind), rel=1e-9, abs=1e-9)
    everything = result(material=kind, second_share=100.0, **second)
    assert everything == pytest.approx(result(material="Timber"), rel=1e-9, abs=1e-9)
