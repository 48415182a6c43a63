"""Hourly temperatures about the mean of a month.

The monthly method needs the mean alone. The swing is there so that degree days and whatever reads hours find
temperatures of a likely spread. Formulas are recalled from memory.
"""

from __future__ import annotations

import numpy as np

from heatledger.climate.model import DAYS_OF_MONTH, FloatArray

__all__ = ["daily_means", "daily_swing"]

LOGISTIC_STEEPNESS = 3.396
"""Of the distribution of daily means that the degree-day formula of Erbs, Klein and Beckman implies [-]."""


def daily_means(monthly: FloatArray) -> tuple[FloatArray, ...]:
    """Mean temperatures of the days of each month, the coldest first, twelve arrays. [°C]

    References
    ----------
    Erbs, Klein and Beckman 1983, Estimation of degree-days and ambient temperature bin data from monthly-average
    temperatures, ASHRAE Journal 25: the standard deviation of monthly means is 1.45 - 0.0290 mean + 0.0664 times
    that of the year's twelve, and the degree days follow a logistic distribution of daily means.
    """
    deviation = np.maximum(1.45 - 0.0290 * monthly + 0.0664 * monthly.std(ddof=1), 0.3)
    return tuple(
        mean + spread * np.sqrt(days) / LOGISTIC_STEEPNESS * _logistic(days)
        for mean, spread, days in zip(monthly, deviation, DAYS_OF_MONTH, strict=True)
    )


def daily_swing(clearness: FloatArray, solar_time: FloatArray) -> FloatArray:
    """Departure of the hours from the mean of their day, by the clearness of the month. [K]

    Parameters
    ----------
    clearness : ndarray, shape (n, 1)
        Of the month. [-]
    solar_time : ndarray, shape (24,)
        After midnight. [h]

    References
    ----------
    Erbs, Klein and Beckman 1983, as above: the range of the mean day is 25.8 K times the clearness less 5.21 K, its
    shape a sum of four cosines.
    """
    angle = 2 * np.pi * (solar_time - 1.0) / 24.0
    waves = ((0.4632, 1, 3.805), (0.0984, 2, 0.360), (0.0168, 3, 0.822), (0.0138, 4, 3.513))
    shape = sum(height * np.cos(number * angle - lag) for height, number, lag in waves)
    swing: FloatArray = np.maximum(25.8 * clearness - 5.21, 0.0) * shape
    return swing


def _logistic(days: int) -> FloatArray:
    """Middles of equal shares of a logistic distribution of steepness 1; they sum to zero."""
    shares = (np.arange(days) + 0.5) / days
    return np.log(shares / (1.0 - shares))
