"""Exact identities of the utilisation factors and the values of the standards.

Source of the formulas: ISO 13790:2008, 12.2.1, recalled from memory. The identities follow from the
algebra of the printed formulas and need no data, so their tolerance is that of the arithmetic.
"""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from heatledger.standards.iso13789 import SHIELDING, infiltration, ventilation_coefficient
from heatledger.standards.iso13790 import (
    CAPACITY_CLASSES,
    gain_utilisation_heating,
    loss_utilisation_cooling,
    monthly_cooling_need,
    monthly_heating_need,
    numerical_parameter,
    time_constant,
)
from heatledger.standards.iso52016 import cooling_possible, heating_possible

RATIOS = [0.1, 0.25, 0.5, 0.75, 1.0, 1.5, 2.0, 4.0]
# The closed formula at a = 2 and a = 3 is a ratio of small polynomials:
# a = 2: (1 + γ)/(1 + γ + γ²); a = 3: (1 + γ + γ²)/(1 + γ + γ² + γ³). Worked out as fractions.
AT_15_HOURS = [1.1 / 1.11, 1.25 / 1.3125, 1.5 / 1.75, 1.75 / 2.3125, 2 / 3, 2.5 / 4.75, 3 / 7, 5 / 21]
AT_30_HOURS = [1.11 / 1.111, 1.3125 / 1.328125, 1.75 / 1.875, 2.3125 / 2.734375, 3 / 4, 4.75 / 8.125, 7 / 15, 21 / 85]

ratios = st.floats(min_value=1e-3, max_value=1e3)
exponents = st.floats(min_value=1.0, max_value=40.0)
energies = st.floats(min_value=-5e4, max_value=5e4).map(lambda value: round(value, 3))


@pytest.mark.parametrize(("hours", "expected"), [(15.0, AT_15_HOURS), (30.0, AT_30_HOURS)])
def test_heating_utilisation_equals_the_polynomial_form(hours: float, expected: list[float]) -> None:
    assert gain_utilisation_heating(RATIOS, numerical_parameter(hours)) == pytest.approx(expected, abs=1e-12)


@given(ratios, exponents)
@settings(max_examples=200)
def test_cooling_utilisation_is_the_ratio_times_the_heating_one(ratio: float, exponent: float) -> None:
    heating = gain_utilisation_heating(ratio, exponent)
    assert float(loss_utilisation_cooling(ratio, exponent)) == pytest.approx(float(ratio * heating), rel=1e-12)


@given(ratios, exponents)
@settings(max_examples=200)
def test_utilisation_stays_below_one_and_the_reciprocal(ratio: float, exponent: float) -> None:
    value = float(gain_utilisation_heating(ratio, exponent))
    assert 0 < value <= min(1.0, 1 / ratio) * (1 + 1e-12)


@given(exponents, st.floats(min_value=1e-12, max_value=1e-7))
def test_utilisation_is_continuous_where_gains_equal_losses(exponent: float, step: float) -> None:
    at_one = exponent / (exponent + 1)
    around = gain_utilisation_heating([1 - step, 1.0, 1 + step], exponent)
    assert around == pytest.approx([at_one] * 3, abs=1e-6)


def test_utilisation_reaches_its_limits() -> None:
    assert gain_utilisation_heating([1e-9, 1e9], 3.0) == pytest.approx([1.0, 1e-9], rel=1e-9)


def test_a_negative_ratio_gives_the_reciprocal_as_printed() -> None:
    assert float(gain_utilisation_heating(-0.25, 3.0)) == -4.0


@given(energies, energies, exponents)
@settings(max_examples=300)
def test_needs_differ_by_losses_less_gains(loss: float, gains: float, exponent: float) -> None:
    """Equal set-points, same coefficients, no cut-off: Q_H − Q_C = Q_ht − Q_gn in every month."""
    heating = float(monthly_heating_need(loss, gains, exponent))
    cooling = float(monthly_cooling_need(loss, gains, exponent))
    assert heating - cooling == pytest.approx(loss - gains, abs=1e-12 * (abs(loss) + abs(gains)) + 1e-12)
    assert heating >= 0
    assert cooling >= 0


def test_negative_gains_are_heated_in_full() -> None:
    assert float(monthly_heating_need(100.0, -20.0, 2.0)) == 120.0


def test_gains_without_losses_leave_no_heating_and_are_cooled_in_full() -> None:
    assert float(monthly_heating_need(-50.0, 30.0, 2.0)) == 0.0
    assert float(monthly_cooling_need(-50.0, 30.0, 2.0)) == 80.0


def test_months_far_out_of_balance_are_left_out() -> None:
    """EN ISO 52016-1:2017, 6.6.4 and 6.6.5, recalled from memory: γ_H > 2 no heating; 1/γ_C > 2 no cooling."""
    assert heating_possible([100.0, 100.0, -1.0], [200.0, 200.1, 5.0]).tolist() == [True, False, False]
    assert cooling_possible([200.0, 200.1, -1.0], [100.0, 100.0, 5.0]).tolist() == [True, False, True]


def test_capacity_classes_are_those_of_the_table() -> None:
    """ISO 13790:2008, 12.3.1.2, table 12, recalled from memory. [kJ/(m²·K)]"""
    assert [value / 1000 for value in CAPACITY_CLASSES.values()] == [80, 110, 165, 260, 370]


def test_time_constant_in_hours() -> None:
    """36 MJ/K over 100 W/K: 36e6/100/3600 = 100 h."""
    assert float(time_constant(36e6, 100.0)) == pytest.approx(100.0, rel=1e-15)


@pytest.mark.parametrize(
    ("site", "several", "e"),
    [
        *(("open", True, 0.10), ("normal", True, 0.07), ("sheltered", True, 0.04)),
        *(("open", False, 0.03), ("normal", False, 0.02), ("sheltered", False, 0.01)),
    ],
)
def test_leakage_of_a_balanced_zone(site: str, several: bool, e: float) -> None:
    """ISO 13789:1999 annex, recalled from memory: balanced, moderate shielding gives n50·0.07."""
    assert float(infiltration(250.0, 4.0, SHIELDING[site, several])) == pytest.approx(250 * 4 * e, rel=1e-12)


def test_unbalanced_fans_lower_the_leakage() -> None:
    """e 0.07, f 15, V·n50 = 1000 m³/h, imbalance 100 m³/h: 70/(1 + 15/0.07·0.01) = 70/3.142857 = 22.2727."""
    assert float(infiltration(250.0, 4.0, SHIELDING["normal", True], -100.0)) == pytest.approx(22.272727, abs=1e-6)


def test_air_carries_a_third_of_a_watt_hour() -> None:
    """1200 J/(m³·K) is 0.333 Wh/(m³·K): 300 m³/h carry 100 W/K, with 80 % recovered 20 W/K."""
    assert ventilation_coefficient(300.0, 1200.0, [0.0, 0.8]) == pytest.approx([100.0, 20.0], rel=1e-12)


@pytest.mark.parametrize("exponent", [0.0, -1.0])
def test_an_exponent_must_be_positive(exponent: float) -> None:
    with pytest.raises(ValueError, match="the exponent must be positive"):
        gain_utilisation_heating(0.5, exponent)


def test_time_constants_need_a_positive_coefficient() -> None:
    with pytest.raises(ValueError, match="the heat transfer coefficient must be positive"):
        time_constant(1e6, np.array([10.0, 0.0]))


def test_time_constants_must_not_be_negative() -> None:
    with pytest.raises(ValueError, match="the time constant must not be negative"):
        numerical_parameter(-1.0)
