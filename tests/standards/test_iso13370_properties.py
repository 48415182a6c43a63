"""Continuity and order of the ground's formulas, and the limits of their numbers."""

from __future__ import annotations

from collections.abc import Callable

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from heatledger.standards.iso13370 import (
    additional_thickness,
    characteristic_dimension,
    edge_transmittance,
    equivalent_thickness,
    slab_transmittance,
    underfloor_transmittance,
)
from heatledger.standards.iso13370_basement import heated_basement
from heatledger.standards.iso13370_monthly import (
    coldest_month,
    equivalent_temperature,
    heated_basement_periodic,
    slab_periodic,
    temperature_amplitude,
)

spans = st.floats(min_value=1.0, max_value=40.0)
conductivities = st.floats(min_value=0.5, max_value=4.0)
thicknesses = st.floats(min_value=0.2, max_value=20.0)


@settings(max_examples=40, deadline=None)
@given(spans, conductivities)
def test_the_branches_of_the_slab_meet_within_their_rounding(span: float, conductivity: float) -> None:
    # The constants of the standard are rounded: at d_t = B′ the first branch gives 2·ln(π + 1)/(π + 1) = 0.686248, the
    # second 1/1.457 = 0.686342 times λ/B′, a step of 0.0136 % upwards.
    below = float(slab_transmittance(span, span * (1 - 1e-12), conductivity))
    above = float(slab_transmittance(span, span, conductivity))
    assert above / below == pytest.approx(1.000136, abs=1e-6)


@settings(max_examples=40, deadline=None)
@given(spans, thicknesses, conductivities)
def test_a_better_floor_loses_less_but_for_that_step(span: float, thickness: float, conductivity: float) -> None:
    worse = float(slab_transmittance(span, thickness, conductivity))
    better = float(slab_transmittance(span, thickness * 1.1, conductivity))
    assert 0 < better < worse


def basement_floor(span: float, depth: float, thickness: float) -> float:
    area = 100.0
    basement = heated_basement(area, 2 * area / span, depth, 2.0, floor_thickness=thickness, wall_thickness=1.0)
    return float(basement.floor)


@settings(max_examples=30, deadline=None)
@given(st.floats(min_value=3.0, max_value=30.0), st.floats(min_value=0.1, max_value=5.0))
def test_the_branches_of_the_basement_floor_meet(span: float, depth: float) -> None:
    meeting = span - depth / 2
    steps = basement_floor(span, depth, meeting * (1 + 1e-9)) / basement_floor(span, depth, meeting * (1 - 1e-9))
    assert steps == pytest.approx(1.000136, abs=1e-6)


@settings(max_examples=30, deadline=None)
@given(thicknesses, st.floats(min_value=0.1, max_value=5.0))
def test_the_branches_of_the_basement_wall_meet(thickness: float, depth: float) -> None:
    walls = [
        float(heated_basement(100, 40, depth, 2, floor_thickness=thickness, wall_thickness=thickness * part).wall)
        for part in (1 - 1e-9, 1.0, 1 + 1e-9)
    ]
    assert walls == pytest.approx([walls[1]] * 3, rel=1e-7)


def test_a_basement_of_no_depth_is_a_slab() -> None:
    assert basement_floor(5.0, 1e-9, 0.72) == pytest.approx(float(slab_transmittance(5.0, 0.72, 2.0)), rel=1e-7)
    slab = slab_periodic(100.0, 40.0, 0.72, 2.0, 3.2)
    basement = heated_basement_periodic(100.0, 40.0, 1e-9, 2.0, 3.2, floor_thickness=0.72, wall_thickness=1.0)
    assert tuple(map(float, basement)) == pytest.approx(tuple(map(float, slab)), rel=1e-6)


@settings(max_examples=40, deadline=None)
@given(st.floats(min_value=0.0, max_value=10.0), st.floats(min_value=0.0, max_value=10.0), thicknesses, st.booleans())
def test_edge_insulation_never_costs(depth: float, more: float, thickness: float, vertical: bool) -> None:
    psi = float(edge_transmittance(depth, thickness, more, 2.0, vertical=vertical))
    assert psi <= 0
    bare = slab_periodic(100.0, 40.0, thickness, 2.0, 3.2)
    edged = slab_periodic(100.0, 40.0, thickness, 2.0, 3.2, edge_depth=depth, additional=more, vertical=vertical)
    assert float(edged.outside) <= float(bare.outside) * (1 + 1e-12)
    assert float(edged.inside) == float(bare.inside)


def test_edge_insulation_of_no_depth_changes_nothing() -> None:
    assert float(edge_transmittance(0.0, 0.72, 2.95, 2.0, vertical=True)) == 0.0


def test_arrays_run_through_at_once() -> None:
    spans_ = characteristic_dimension([100.0, 144.0], [40.0, 48.0])
    assert spans_.tolist() == [5.0, 6.0]
    assert slab_transmittance(spans_, equivalent_thickness(0.3, [1.5, 2.0], [0.5, 8.0]), [1.5, 2.0]).shape == (2,)


@settings(max_examples=30, deadline=None)
@given(
    st.lists(st.floats(min_value=-30, max_value=40), min_size=12, max_size=12),
    st.floats(min_value=0, max_value=1),
    st.floats(min_value=0, max_value=3),
)
def test_the_ground_keeps_the_mean_of_the_year(monthly: list[float], ratio: float, lag: float) -> None:
    ground = equivalent_temperature(50.0, 50.0 * ratio, monthly, lag)
    assert ground.mean() == pytest.approx(np.mean(monthly), abs=1e-9)
    assert np.ptp(ground) <= np.ptp(monthly) + 1e-9


def test_the_amplitude_is_half_the_span_of_the_months() -> None:
    assert float(temperature_amplitude([1, 2, 5, 9, 13, 17, 19, 18, 14, 9, 4, 2])) == 9.0


@pytest.mark.parametrize(
    ("call", "message"),
    [
        (lambda: characteristic_dimension(100, 0), "the exposed perimeter must be above 0"),
        (lambda: characteristic_dimension(100, -4), "the exposed perimeter must be above 0"),
        (lambda: characteristic_dimension(0, 40), "the area must be above 0"),
        (lambda: equivalent_thickness(-0.3, 2, 0), "the wall thickness must not be negative"),
        (lambda: equivalent_thickness(0.3, 0, 0), "the ground's conductivity must be above 0"),
        (lambda: slab_transmittance(5, 0, 2), "the equivalent thickness must be above 0"),
        (
            lambda: additional_thickness(0.01, 0.1, 2),
            "the edge insulation must resist more than the ground that it replaces",
        ),
        (
            lambda: edge_transmittance(-1, 1, 1, 2, vertical=False),
            "the depth of the edge insulation must not be negative",
        ),
        (
            lambda: underfloor_transmittance(
                5, height=-1, wall_transmittance=1, openings=0, wind_speed=4, shielding=0.05
            ),
            "the height must not be negative",
        ),
        (
            lambda: heated_basement(100, 40, 0, 2, floor_thickness=1, wall_thickness=1),
            "the depth must be above 0",
        ),
        (lambda: equivalent_temperature(0, 1, np.zeros(12), 1), "H_g must be above 0"),
        (lambda: equivalent_temperature(1, 1, np.zeros(11), 1), "the temperatures must be those of 12 months"),
        (lambda: coldest_month(91), "the latitude must lie between -90 and 90"),
    ],
)
def test_messages(call: Callable[[], object], message: str) -> None:
    with pytest.raises(ValueError) as caught:  # noqa: PT011  the whole text is compared below
        call()
    assert str(caught.value) == message
