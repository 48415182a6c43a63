"""Identities of the heat transfer matrix, and the limits of its numbers."""

from __future__ import annotations

from collections.abc import Callable

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from heatledger.standards.iso13786 import areal_capacity, dynamic_properties, effective_capacity, transfer_matrix
from heatledger.standards.iso13788 import steady_profile, temperature_factor

layers = st.lists(
    st.tuples(st.floats(min_value=0.0, max_value=6.0), st.floats(min_value=0.0, max_value=5e5)), min_size=1, max_size=5
).filter(lambda pairs: sum(np.sqrt(resistance * capacity) for resistance, capacity in pairs) < 3000)


@settings(max_examples=60, deadline=None)
@given(layers, st.sampled_from([1.0, 24.0, 168.0, 8760.0]))
def test_the_determinant_is_one(pairs: list[tuple[float, float]], period: float) -> None:
    resistances, capacities = np.array(pairs).T
    (z11, z12), (z21, z22) = transfer_matrix(resistances, capacities, period)
    scale = abs(z11 * z22) + abs(z12 * z21)
    assert abs(z11 * z22 - z12 * z21 - 1) < 1e-10 * max(scale, 1)


@settings(max_examples=60, deadline=None)
@given(layers)
def test_turning_the_wall_round_swaps_its_faces(pairs: list[tuple[float, float]]) -> None:
    resistances, capacities = np.array(pairs).T
    wall = dynamic_properties(resistances, capacities, 0.1, 0.1)
    turned = dynamic_properties(resistances[::-1], capacities[::-1], 0.1, 0.1)
    assert turned.inside_admittance == pytest.approx(wall.outside_admittance, rel=1e-9)
    assert turned.inside_capacity == pytest.approx(wall.outside_capacity, rel=1e-9, abs=1e-6)
    assert turned.periodic_transmittance == pytest.approx(wall.periodic_transmittance, rel=1e-9)
    assert turned.time_shift == pytest.approx(wall.time_shift, abs=1e-6)


@settings(max_examples=60, deadline=None)
@given(layers)
def test_a_swing_without_end_is_the_steady_state(pairs: list[tuple[float, float]]) -> None:
    resistances, capacities = np.array(pairs).T
    wall = dynamic_properties(resistances, capacities, 0.13, 0.04, period=1e15)
    assert wall.decrement_factor == pytest.approx(1.0, abs=1e-6)
    assert wall.inside_admittance == pytest.approx(wall.transmittance, rel=1e-6)
    assert wall.outside_admittance == pytest.approx(wall.transmittance, rel=1e-6)
    still = transfer_matrix(resistances, capacities, np.inf)
    assert still == pytest.approx(np.array([[1, -resistances.sum()], [0, 1]]), abs=1e-9)


@settings(max_examples=40, deadline=None)
@given(layers)
def test_a_wall_damps_and_delays(pairs: list[tuple[float, float]]) -> None:
    resistances, capacities = np.array(pairs).T
    wall = dynamic_properties(resistances, capacities, 0.13, 0.04)
    assert 0 < wall.decrement_factor <= 1 + 1e-9
    assert wall.time_shift >= -1e-9


@settings(max_examples=40, deadline=None)
@given(st.floats(min_value=0.01, max_value=5.0), st.floats(min_value=1e3, max_value=5e5))
def test_one_layer_equals_its_halves(resistance: float, capacity: float) -> None:
    whole = transfer_matrix([resistance], [capacity])
    halves = transfer_matrix([resistance / 2] * 2, [capacity / 2] * 2)
    assert halves == pytest.approx(whole, rel=1e-8)


@pytest.mark.parametrize("depth", [0.3, 0.6, 0.9, 1.5, 3.0])
def test_the_lag_of_a_thick_wall_is_followed_over_half_a_day(depth: float) -> None:
    # A deep wall behaves as an endless one: the phase grows by 24/2π h for each depth of penetration
    # (0.1514 m for λ 2.0, ρc 2.4e6), so 0.3 m more of it delay by 0.3/0.1514·3.8197 = 7.57 h.
    def lag(thickness: float) -> float:
        return dynamic_properties([thickness / 2.0], [thickness * 2.4e6], 0.13, 0.04).time_shift

    assert lag(depth + 0.3) - lag(depth) == pytest.approx(7.57, abs=0.15)
    assert dynamic_properties([depth / 8.0] * 4, [depth * 6e5] * 4, 0.13, 0.04).time_shift == pytest.approx(lag(depth))


def test_a_partition_inside_a_zone_stores_with_both_faces() -> None:
    # Both faces swing together, so a thin partition stores its whole heat capacity: 0.1 m of plasterboard.
    thin = dynamic_properties([0.1 / 0.25], [areal_capacity(0.1, 900.0, 1000.0)], 0.0, 0.0)
    assert thin.inside_capacity + thin.outside_capacity == pytest.approx(0.1 * 900 * 1000, rel=0.05)


def test_a_layer_without_resistance_or_capacity_is_allowed() -> None:
    # A metal sheet stores but does not resist; by hand Z_21 = −jωC, ω = 2π/86400.
    matrix = transfer_matrix([0.0], [1e4])
    assert matrix == pytest.approx(np.array([[1, 0], [-2j * np.pi / 86400 * 1e4, 1]]), abs=1e-12)


@pytest.mark.parametrize(
    ("call", "message"),
    [
        (lambda: transfer_matrix([1.0], [1.0, 2.0]), "the layers must have one resistance and one heat capacity each"),
        (lambda: transfer_matrix([1.0], [-1.0]), "a heat capacity must not be negative"),
        (lambda: transfer_matrix([-1.0], [1.0]), "a resistance must not be negative"),
        (lambda: transfer_matrix([1.0], [1.0], 0.0), "the period must be above 0"),
        (
            lambda: transfer_matrix([50.0], [1e9], 1.0),
            "the period is too short for so much mass: nothing measurable passes",
        ),
        (lambda: dynamic_properties([0.0], [1.0], 0.0, 0.0), "the total resistance must be above 0"),
        (lambda: effective_capacity([0.1], [1.0, 1.0], [1000], [1000]), "the layers must have one figure each"),
        (lambda: steady_profile([0.0], 0.0, 0.0, 20, 0), "the total resistance must be above 0"),
        (
            lambda: temperature_factor(15, 20, 20),
            "the temperature factor needs different temperatures inside and outside",
        ),
    ],
)
def test_messages(call: Callable[[], object], message: str) -> None:
    with pytest.raises(ValueError) as caught:  # noqa: PT011  the whole text is compared below
        call()
    assert str(caught.value) == message
