"""Intermittency and season: values of the standard's formulas and their limits.

Formulas recalled from memory (ISO 13790:2008, 13.2 and 7.4); the values below are worked out by hand from them.
"""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from heatledger.standards.iso13790_use import heating_regime, limit_ratio, reduction_factor, season_fraction


@pytest.mark.parametrize(
    ("ratio", "constant", "share", "expected"),
    [
        (0.5, 40.0, 0.6, 0.775),  # 1 − 3·15/40·0.5·0.4
        (0.8, 40.0, 5 / 7, 0.742857),  # 1 − 3·15/40·0.8·2/7
        (2.0, 20.0, 0.5, 0.5),  # not below the share
        (0.0, 20.0, 0.5, 1.0),  # without gains nothing is saved by this formula
        (np.nan, 20.0, 0.5, 0.5),  # nothing is lost
        (-0.3, 20.0, 0.5, 1.0),  # the sky takes more than the sun gives
        (3.0, 20.0, 1.0, 1.0),
    ],
)
def test_reduction_factor(ratio: float, constant: float, share: float, expected: float) -> None:
    assert float(reduction_factor(ratio, constant, share)) == pytest.approx(expected, abs=1e-6)


@pytest.mark.parametrize(
    ("constant", "swing", "shortest", "longest", "regime"),
    [
        (50.0, 4.0, 0.0, 0.0, "continuous"),
        (50.0, 0.0, 8.0, 8.0, "continuous"),
        (24.1, 4.0, 8.0, 8.0, "continuous"),
        (24.0, 4.0, 8.0, 8.0, "reduced need"),
        (24.0, 2.9, 8.0, 8.0, "mean set-point"),
        (1.5, 4.0, 8.0, 8.0, "mean set-point"),
        (1.6, 4.0, 8.0, 8.0, "reduced need"),
        (100.0, 4.0, 14.0, 62.0, "reduced need"),
        (187.0, 4.0, 14.0, 62.0, "continuous"),
    ],
)
def test_regimes(constant: float, swing: float, shortest: float, longest: float, regime: str) -> None:
    assert heating_regime(constant, swing, shortest, longest) == regime


def test_limit_of_the_season() -> None:
    """(a + 1)/a: 1.5 at a = 2, 1.25 at a = 4."""
    assert limit_ratio([2.0, 4.0]).tolist() == [1.5, 1.25]


def test_a_month_between_its_ends() -> None:
    """Ratios 0.5, 1.0, 2.0, limit 1.25, the middle month: ends 0.75 and 1.5; f = 0.5 + 0.5·(1.25 − 1)/(1.5 − 1)."""
    ratios = [0.5] * 4 + [1.0, 2.0, 2.0, 2.0] + [0.5] * 4
    assert season_fraction(ratios, 1.25)[4] == pytest.approx(0.75)


def test_a_month_above_the_limit_counts_in_part() -> None:
    """Ratios 0.5, 1.5, 2.5, limit 1.25: ends 1.0 and 2.0; f = 0.5·(1.25 − 1)/(1.5 − 1)."""
    ratios = [0.5] * 4 + [1.5, 2.5, 2.5, 2.5] + [0.5] * 4
    assert season_fraction(ratios, 1.25)[4] == pytest.approx(0.25)


@pytest.mark.parametrize(("ratios", "sum_of_year"), [([0.2] * 12, 12.0), ([3.0] * 12, 0.0), ([np.nan] * 12, 0.0)])
def test_all_or_nothing(ratios: list[float], sum_of_year: float) -> None:
    assert season_fraction(ratios, 1.3).sum() == sum_of_year


def test_a_month_without_losses_takes_the_larger_neighbour() -> None:
    ratios = np.array([0.2] * 5 + [2.0, np.nan, 3.0] + [0.2] * 4)
    filled = ratios.copy()
    filled[6] = 3.0
    assert season_fraction(ratios, 1.3).tolist() == season_fraction(filled, 1.3).tolist()


@given(st.lists(st.floats(0, 20), min_size=12, max_size=12), st.floats(1.01, 2.0))
def test_fractions_lie_between_none_and_all(ratios: list[float], limit: float) -> None:
    fractions = season_fraction(ratios, limit)
    assert ((fractions >= 0) & (fractions <= 1)).all()
    assert season_fraction(ratios, limit * 1.1).sum() >= fractions.sum() - 1e-9


def test_what_cannot_be() -> None:
    with pytest.raises(ValueError, match="the time constant must be positive"):
        reduction_factor(0.5, 0.0, 0.5)
    with pytest.raises(ValueError, match="the share must lie between 0 and 1"):
        reduction_factor(0.5, 20.0, 1.5)
