"""ISO 13790:2008, intermittent use and length of the season, monthly method.

Recalled from memory, the limits of the three regimes less surely than the formulas.
"""

from __future__ import annotations

from typing import Literal, TypeAlias

import numpy as np
from numpy.typing import ArrayLike, NDArray

from heatledger.standards.iso13790 import REFERENCE_TIME_CONSTANT

__all__ = ["Regime", "heating_regime", "limit_ratio", "reduction_factor", "season_fraction"]

Regime: TypeAlias = Literal["continuous", "mean set-point", "reduced need"]
"""How intermittent heating is reckoned."""

REDUCTION_SLOPE = 3.0
"""Empirical factor b of the reduction. [-] ISO 13790:2008, 13.2.2.1 and 13.2.2.2."""

SMALL_SWING = 3.0
"""Difference between normal and reduced set-point below which their mean counts. [K] ISO 13790:2008, 13.2.1."""

QUICK = 0.2
"""Time constant per shortest reduced period below which the mean counts. [-] ISO 13790:2008, 13.2.1."""

SLOW = 3.0
"""Time constant per longest reduced period above which the normal set-point counts. [-] ISO 13790:2008, 13.2.1."""


def heating_regime(time_constant: float, swing: float, shortest_reduced: float, longest_reduced: float) -> Regime:
    """Regime of a zone whose set-point is reduced at times.

    Parameters
    ----------
    time_constant : float
        τ of the zone. [h]
    swing : float
        Normal less reduced set-point. [K]
    shortest_reduced, longest_reduced : float
        Shortest and longest period at the reduced set-point; 0 for none. [h]

    Returns
    -------
    str
        ``continuous``: the normal set-point counts, since the zone hardly cools down; ``mean set-point``: the
        mean over time counts, since it follows at once or the swing is small; ``reduced need``: in between.

    References
    ----------
    ISO 13790:2008, 13.2.1.

    Examples
    --------
    >>> heating_regime(100.0, 4.0, 8.0, 8.0), heating_regime(20.0, 2.0, 8.0, 8.0), heating_regime(20.0, 4.0, 8.0, 8.0)
    ('continuous', 'mean set-point', 'reduced need')
    """
    if longest_reduced <= 0 or swing <= 0 or time_constant > SLOW * longest_reduced:
        return "continuous"
    if swing < SMALL_SWING or time_constant < QUICK * shortest_reduced:
        return "mean set-point"
    return "reduced need"


def reduction_factor(balance_ratio: ArrayLike, time_constant: float, normal_share: float) -> NDArray[np.float64]:
    """Need of an intermittently conditioned zone against the same zone conditioned continuously.

    Parameters
    ----------
    balance_ratio : array_like, shape (..., 12)
        γ_H in heating, γ_C in cooling; NaN where nothing is lost. [-]
    time_constant : float
        τ of the zone. [h]
    normal_share : float
        Share f of the hours of the week at the normal heating set-point, or of its days with cooling. [-]

    Returns
    -------
    ndarray
        1 − 3·(15 h/τ)·γ·(1 − f), not below f and not above 1. [-]

    Raises
    ------
    ValueError
        If the time constant is not positive or the share lies outside 0 to 1.

    References
    ----------
    ISO 13790:2008, 13.2.2.1 and 13.2.2.2.

    Examples
    --------
    >>> round(float(reduction_factor(0.5, 40.0, 0.6)), 4), round(float(reduction_factor(0.8, 40.0, 5 / 7)), 6)
    (0.775, 0.742857)
    """
    if time_constant <= 0:
        raise ValueError("the time constant must be positive")
    if not 0 <= normal_share <= 1:
        raise ValueError("the share must lie between 0 and 1")
    ratio = np.nan_to_num(np.asarray(balance_ratio, dtype=float), nan=np.inf, posinf=np.inf)
    slope = REDUCTION_SLOPE * REFERENCE_TIME_CONSTANT / time_constant * (1 - normal_share)
    reduction = slope * np.maximum(ratio, 0.0) if slope else np.zeros(ratio.shape)
    return np.asarray(np.clip(1 - reduction, normal_share, 1.0))


def limit_ratio(exponent: ArrayLike) -> NDArray[np.float64]:
    """Ratio at which a month is half in the season, (a + 1)/a.

    Parameters
    ----------
    exponent : array_like
        Numerical parameter a. [-]

    Returns
    -------
    ndarray
        γ_lim. [-]

    References
    ----------
    ISO 13790:2008, 7.4.1.
    """
    power = np.asarray(exponent, dtype=float)
    return np.asarray((power + 1) / power)


def season_fraction(ratio: ArrayLike, limit: float) -> NDArray[np.float64]:
    """Fraction of each month that belongs to the heating (or cooling) season.

    Parameters
    ----------
    ratio : array_like, shape (12,)
        γ_H for heating, 1/γ_C for cooling. NaN, negative or infinite where nothing is lost (gained): such a month
        takes the larger ratio of the nearest months on either side that have one. [-]
    limit : float
        γ_lim. [-]

    Returns
    -------
    ndarray, shape (12,)
        Between 0 and 1; their sum is the length of the season in months. [-]

    References
    ----------
    ISO 13790:2008, 7.4.1: the ratio at the start of a month is the mean of it and the month before.

    Examples
    --------
    >>> season_fraction([0.2] * 6 + [3.0] * 6, 1.4).round(3).tolist()[4:8]
    [1.0, 0.929, 0.0, 0.0]
    """
    months = _filled(np.asarray(ratio, dtype=float))
    if months is None:
        return np.zeros(12)
    before, after = (months + np.roll(months, 1)) / 2, (months + np.roll(months, -1)) / 2
    low, high = np.minimum(before, after), np.maximum(before, after)
    fraction = np.where(high < limit, 1.0, 0.0)
    partly = (low <= limit) & (high >= limit)
    above = partly & (months > limit)
    below = partly & (months <= limit)
    fraction[above] = 0.5 * (limit - low[above]) / (months[above] - low[above])
    rise = high[below] - months[below]
    fraction[below] = 0.5 + 0.5 * np.divide(limit - months[below], rise, out=np.ones(rise.shape), where=rise > 0)
    return np.clip(fraction, 0.0, 1.0)


def _filled(months: NDArray[np.float64]) -> NDArray[np.float64] | None:
    """Ratios with those that do not exist taken from the nearest months; None if no month has one."""
    valid = np.isfinite(months) & (months >= 0)
    if not valid.any():
        return None
    filled = months.copy()
    for month in np.flatnonzero(~valid):
        ahead = next(step for step in range(1, 12) if valid[(month + step) % 12])
        behind = next(step for step in range(1, 12) if valid[(month - step) % 12])
        filled[month] = max(months[(month + ahead) % 12], months[(month - behind) % 12])
    return filled
