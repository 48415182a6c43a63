"""What must hold for every build-up, and the limits of the formulas."""

from __future__ import annotations

from collections.abc import Callable

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from heatledger.standards.iso6946 import (
    SurfaceResistances,
    black_body_coefficient,
    direction_of_heat_flow,
    layer_resistance,
    surface_resistances,
)
from heatledger.standards.iso6946_air import air_layer_resistance, air_void_resistance, void_radiation_factor
from heatledger.standards.iso6946_bridged import (
    Layer,
    Section,
    block_layers,
    bridged,
    homogeneous,
    lower_limit,
    mean_resistances,
    total_resistance,
    upper_limit,
)
from heatledger.standards.iso6946_corrections import (
    corrected_transmittance,
    fastener_correction,
    gap_correction,
    inverted_roof_correction,
    tapered_rectangle,
    tapered_triangle,
    tapered_triangle_thick_apex,
    tapered_triangle_thin_apex,
)

WALL = SurfaceResistances(0.13, 0.04)

resistances = st.floats(min_value=0.0, max_value=20.0)
shares = st.floats(min_value=0.0, max_value=1.0)
patterns = st.sampled_from(["", "", "studs"])


@st.composite
def layers(draw: st.DrawFn) -> list[Layer]:
    """Up to five layers, any of them bridged; those of the pattern have one share."""
    stud_share = draw(shares)
    build_up = []
    for _ in range(draw(st.integers(min_value=0, max_value=5))):
        pattern = draw(patterns)
        share = stud_share if pattern else draw(shares)
        build_up.append(bridged(draw(resistances), draw(resistances), share, pattern))
    return build_up


@settings(max_examples=60, deadline=None)
@given(layers())
def test_the_upper_limit_is_never_below_the_lower(build_up: list[Layer]) -> None:
    limits = total_resistance(build_up, WALL)
    assert limits.upper >= limits.lower * (1 - 1e-12)
    assert 0 <= limits.error + 1e-12 < 1


@settings(max_examples=60, deadline=None)
@given(layers(), st.integers(min_value=0, max_value=4), st.floats(min_value=0.0, max_value=5.0))
def test_a_better_insulant_never_raises_the_transmittance(build_up: list[Layer], place: int, more: float) -> None:
    if not build_up:
        return
    place %= len(build_up)
    main, second = build_up[place].sections
    better = Layer((Section(main.share, main.resistance + more), second), build_up[place].pattern)
    mended = [*build_up[:place], better, *build_up[place + 1 :]]
    before, after = total_resistance(build_up, WALL), total_resistance(mended, WALL)
    assert after.transmittance <= before.transmittance * (1 + 1e-12)
    assert after.upper >= before.upper * (1 - 1e-12)
    assert after.lower >= before.lower * (1 - 1e-12)


@settings(max_examples=40, deadline=None)
@given(resistances, resistances)
def test_shares_of_none_and_all_are_homogeneous(first: float, second: float) -> None:
    rest = homogeneous(0.3)
    none = total_resistance([rest, bridged(first, second, 0.0)], WALL)
    whole = total_resistance([rest, bridged(first, second, 1.0)], WALL)
    assert none == pytest.approx(total_resistance([rest, homogeneous(first)], WALL), rel=1e-12)
    assert whole == pytest.approx(total_resistance([rest, homogeneous(second)], WALL), rel=1e-12)


@settings(max_examples=40, deadline=None)
@given(layers())
def test_the_order_of_layers_does_not_matter(build_up: list[Layer]) -> None:
    assert total_resistance(build_up[::-1], WALL) == pytest.approx(total_resistance(build_up, WALL), rel=1e-12)


def test_layers_of_one_pattern_have_one_path_for_each_section() -> None:
    # By hand: two layers 1.0 / 0.2, half and half, surfaces 0.17. Aligned: paths 2.17 and 0.57;
    # crossing: 2.17, twice 1.37, 0.57 at a quarter each.
    aligned = [bridged(1.0, 0.2, 0.5, "studs"), bridged(1.0, 0.2, 0.5, "studs")]
    crossing = [bridged(1.0, 0.2, 0.5), bridged(1.0, 0.2, 0.5)]
    assert upper_limit(aligned, WALL) == pytest.approx(1 / (0.5 / 2.17 + 0.5 / 0.57), rel=1e-12)
    assert upper_limit(crossing, WALL) == pytest.approx(1 / (0.25 / 2.17 + 0.5 / 1.37 + 0.25 / 0.57), rel=1e-12)
    assert lower_limit(aligned, WALL) == lower_limit(crossing, WALL) == pytest.approx(0.17 + 2 / 3, rel=1e-12)


def test_a_layer_of_three_sections() -> None:
    # By hand: shares 0.5, 0.3, 0.2 of R 2, 1, 0.5: mean 1/(0.25 + 0.3 + 0.4).
    layer = Layer((Section(0.5, 2.0), Section(0.3, 1.0), Section(0.2, 0.5)))
    assert mean_resistances([layer, homogeneous(0.7)]) == pytest.approx([1 / 0.95, 0.7], rel=1e-12)


def test_a_section_without_resistance_shorts_the_layer() -> None:
    assert mean_resistances([bridged(1.0, 0.0, 0.1), homogeneous(0.0)]) == [0.0, 0.0]


def test_a_metal_bridge_leaves_the_method() -> None:
    # ISO 6946:2017, 6.7.2.1: steel of 0.2 % through 100 mm of insulation, ratio of the limits 1.5 at most.
    limits = total_resistance([bridged(2.5, 0.1 / 50, 0.002)], WALL)
    assert limits.upper / limits.lower > 1.5
    assert not limits.applies


def test_a_block_of_shell_voids_and_web() -> None:
    # By hand: 200 mm of λ 0.5, one row of 100 mm: shells of 50 mm, R 0.1; web 0.2; void 100 deep, 50 wide 0.2612.
    shell, row, back = block_layers(0.2, 0.5, void_depth=0.1, void_width=0.05, void_share=0.4)
    assert shell == back
    assert shell.sections[0].resistance == pytest.approx(0.1)
    assert [section.share for section in row.sections] == pytest.approx([0.6, 0.4])
    assert [section.resistance for section in row.sections] == pytest.approx([0.2, 0.2612], abs=5e-5)


def test_a_block_that_is_all_void_has_no_shells() -> None:
    layers_ = block_layers(0.05, 0.5, void_depth=0.05, void_width=0.05, void_share=1.0)
    assert total_resistance(layers_, WALL).total == pytest.approx(0.17 + 0.2381, abs=5e-5)


def test_a_wide_void_of_a_block_is_an_air_layer() -> None:
    row = block_layers(0.2, 0.5, void_depth=0.03, void_width=0.4, void_share=0.9)[1]
    assert row.sections[1].resistance == pytest.approx(float(air_layer_resistance(0.03, "horizontal")))


@settings(max_examples=40, deadline=None)
@given(st.floats(min_value=0.001, max_value=0.3), st.floats(min_value=0.001, max_value=3.0))
def test_a_void_never_resists_less_than_the_layer(depth: float, width: float) -> None:
    assert 0.5 < float(void_radiation_factor(depth, width)) < 1
    if width <= 10 * depth:
        assert air_void_resistance(depth, width, "up") >= air_layer_resistance(depth, "up")


def test_foil_raises_the_resistance_of_an_air_layer() -> None:
    # By hand: 25 mm, horizontal: h_a 1.25, E = 1/(1/0.9 + 1/0.05 − 1) = 0.049724: 1/(1.25 + 0.25359) = 0.6651.
    foil = air_layer_resistance(0.025, "horizontal", outer_emissivity=0.05)
    assert float(foil) == pytest.approx(0.6651, abs=5e-5)


def test_a_great_temperature_difference_stirs_the_air() -> None:
    # By hand, 50 mm, E·h_r0 4.1727, 20 K: horizontal h_a 0.73·20^⅓ = 1.9815; up 3.0945; down
    # 0.09·0.05^−0.187·20^0.44 = 0.09·1.7510·3.7363 = 0.5888.
    values = [
        float(air_layer_resistance(0.05, "horizontal", temperature_difference=20.0)),
        float(air_layer_resistance(0.05, "up", temperature_difference=20.0)),
        float(air_layer_resistance(0.05, "down", temperature_difference=20.0)),
    ]
    assert values == pytest.approx([0.16249, 0.13760, 0.21002], abs=1e-5)
    assert air_layer_resistance(0.05, "up", temperature_difference=5.0) == air_layer_resistance(0.05, "up")


@settings(max_examples=40, deadline=None)
@given(st.floats(min_value=0.05, max_value=10.0), st.floats(min_value=0.0, max_value=20.0), shares)
def test_tapered_layers_lie_between_their_extremes(base: float, thick: float, part: float) -> None:
    values = [
        float(tapered_rectangle(base, thick)),
        float(tapered_triangle_thick_apex(base, thick)),
        float(tapered_triangle_thin_apex(base, thick)),
        tapered_triangle(base, part * thick, thick),
    ]
    assert all(1 / (base + thick) * (1 - 1e-9) <= value <= 1 / base * (1 + 1e-9) for value in values)
    assert values[2] <= values[3] * (1 + 1e-6)
    assert values[3] <= values[1] * (1 + 1e-6)


@pytest.mark.parametrize("thick", [0.0, 1e-9, 1e-5, 1e-4, 9.99e-4, 1e-3, 1.001e-3])
def test_tapered_layers_run_smoothly_into_even_ones(thick: float) -> None:
    # First two terms by hand: rectangle 1 − R/2 + R²/3, apex 1 − R/3 + R²/6, 1 − 2R/3 + R²/2 (R_0 = 1).
    assert float(tapered_rectangle(1, thick)) == pytest.approx(1 - thick / 2 + thick**2 / 3, abs=1e-9)
    assert float(tapered_triangle_thick_apex(1, thick)) == pytest.approx(1 - thick / 3 + thick**2 / 6, abs=1e-9)
    assert float(tapered_triangle_thin_apex(1, thick)) == pytest.approx(1 - 2 * thick / 3 + thick**2 / 2, abs=1e-9)
    middle = 1 - thick / 2 + thick**2 * 7 / 24
    assert tapered_triangle(1, thick / 2, thick) == pytest.approx(middle, abs=1e-9)


FASTENERS = {"conductivity": 50.0, "cross_section": 1e-5, "number": 4.0}


@pytest.mark.parametrize(
    ("call", "message"),
    [
        (lambda: direction_of_heat_flow(181), "the tilt must lie between 0 and 180"),
        (lambda: surface_resistances("sideways"), "unknown direction of heat flow: 'sideways'"),  # type: ignore[arg-type]
        (lambda: surface_resistances("up", "attic"), "unknown facing: 'attic'"),  # type: ignore[arg-type]
        (lambda: black_body_coefficient(-300), "the absolute temperature must be above 0"),
        (lambda: layer_resistance(-0.1, 1), "the thickness must not be negative"),
        (lambda: layer_resistance(0.1, 0), "the conductivity must be above 0"),
        (lambda: layer_resistance(0.1, np.nan), "the conductivity must be above 0"),
        (lambda: air_layer_resistance(0.31, "up"), "an air layer must not be thicker than 0.3 m"),
        (lambda: air_layer_resistance(-0.1, "up"), "the thickness of an air layer must not be negative"),
        (lambda: air_layer_resistance(0.1, "north"), "unknown direction of heat flow: 'north'"),  # type: ignore[arg-type]
        (lambda: air_layer_resistance(0.1, "up", inner_emissivity=1.1), "an emissivity must not be above 1"),
        (lambda: air_layer_resistance(0.1, "up", inner_emissivity=0), "an emissivity must be above 0"),
        (
            lambda: air_layer_resistance(0.1, "up", temperature_difference=-1),
            "the temperature difference must not be negative",
        ),
        (lambda: air_void_resistance(0.01, 0.11, "up"), "a void wider than 10 times its depth is an air layer"),
        (lambda: air_void_resistance(0.0, 0.1, "up"), "the void depth must be above 0"),
        (lambda: bridged(1, 1, 1.1), "the share of the second material must lie between 0 and 1"),
        (lambda: homogeneous(-1), "a resistance must not be negative"),
        (lambda: lower_limit([Layer((Section(0.5, 1.0),))], WALL), "the shares of a layer must add up to 1"),
        (
            lambda: upper_limit([bridged(1, 2, 0.1, "studs"), bridged(1, 2, 0.2, "studs")], WALL),
            "layers of the pattern 'studs' must have the same shares",
        ),
        (
            lambda: upper_limit([bridged(1, 2, 0.1)] * 17, WALL),
            "the bridged layers combine to more than 65536 sections",
        ),
        (
            lambda: block_layers(0.1, 0.5, void_depth=0.06, void_width=0.05, void_share=0.5, rows=2),
            "the void rows must be 1 or more and fit into the thickness",
        ),
        (lambda: gap_correction("many", 1, 2), "unknown level of gaps: 'many'"),  # type: ignore[arg-type]
        (
            lambda: gap_correction("minor", 3, 2),
            "the resistance of the insulation must lie between 0 and the total resistance",
        ),
        (
            lambda: fastener_correction(
                **FASTENERS, insulation_thickness=0, insulation_resistance=1, total_resistance=2
            ),
            "the thickness of the insulation must be above 0",
        ),
        (lambda: inverted_roof_correction(-1, 1, 2), "precipitation and drainage must not be negative"),
        (lambda: corrected_transmittance(0.3, [-0.1]), "a correction must not be negative"),
        (lambda: tapered_rectangle(0, 1), "the base resistance must be above 0"),
        (lambda: tapered_triangle(1, 3, 2), "the middle corner must not be thicker than the thickest"),
    ],
)
def test_messages(call: Callable[[], object], message: str) -> None:
    with pytest.raises(ValueError) as caught:  # noqa: PT011  the whole text is compared below
        call()
    assert str(caught.value) == message
