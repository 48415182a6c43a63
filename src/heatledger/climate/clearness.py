"""How clear days and hours are spread, known from nothing but the mean clearness of a month.

Clearness is irradiation of the horizontal over that outside the atmosphere. Formulas and coefficients of this module
are recalled from memory; what they give is measured against the shipped climates by the tests.
"""

from __future__ import annotations

import numpy as np

from heatledger.climate.model import FloatArray

__all__ = ["clearest_day", "daily_clearness", "day_shape", "hourly_spread"]

DULLEST_DAY = 0.05
"""Clearness of the dullest day, Bendt, Collares-Pereira and Rabl 1981 [-]."""


def daily_clearness(mean: float, days: int) -> FloatArray:
    """Clearness of the days of a month, the dullest first.

    Days stand at the middles of equal shares of the distribution, so they are the same at each call.

    Parameters
    ----------
    mean : float
        Clearness of the month, above that of the dullest day. [-]
    days : int
        Days of the month.

    Returns
    -------
    ndarray, shape (days,)
        [-]

    References
    ----------
    Bendt, Collares-Pereira and Rabl 1981, The frequency distribution of daily insolation values, Solar Energy 27:
    the density between the dullest and the clearest day is exponential. Its exponent is found from the mean by
    halving an interval, which needs none of the published approximations.

    Examples
    --------
    >>> daily_clearness(0.5, 5).round(2).tolist()
    [0.2, 0.4, 0.54, 0.64, 0.73]
    """
    most = max(clearest_day(mean), mean + 0.02)
    width = most - DULLEST_DAY
    exponent = _exponent((mean - DULLEST_DAY) / width)
    shares = (np.arange(days) + 0.5) / days
    found: FloatArray = DULLEST_DAY + width * np.log1p(shares * np.expm1(exponent)) / exponent
    return found


def clearest_day(mean: float) -> float:
    """Clearness of the clearest day of a month by that of the month. [-]

    References
    ----------
    Hollands and Huget 1983, A probability density function for the clearness index, Solar Energy 30.
    """
    return float(0.6313 + 0.267 * mean - 11.9 * (mean - 0.75) ** 8)


def day_shape(hour_angle: FloatArray, sunset: FloatArray) -> FloatArray:
    """How clear an hour is against its day, but for a factor of the day.

    Parameters
    ----------
    hour_angle, sunset : ndarray, broadcastable
        Hour angle of the hour, and of sunset. [rad]

    Returns
    -------
    ndarray
        Never negative. [-]

    References
    ----------
    Collares-Pereira and Rabl 1979, The average distribution of solar radiation, Solar Energy 22.
    """
    turned = np.sin(sunset - np.pi / 3)
    shape: FloatArray = 0.409 + 0.5016 * turned + (0.6609 - 0.4767 * turned) * np.cos(hour_angle)
    return np.maximum(shape, 0.0)


def hourly_spread(clearness: FloatArray) -> FloatArray:
    """Standard deviation of the clearness of hours about the shape of their day, by that of the day. [-]

    Without it a day of sun and cloud would be one of even haze, with too much diffuse light.

    References
    ----------
    Aguiar and Collares-Pereira 1992, A time-dependent, autoregressive, Gaussian model, Solar Energy 49; its factor
    for the height of the sun, which is near 1 for most light, is left out.
    """
    spread: FloatArray = 0.14 * np.exp(-20.0 * (clearness - 0.35) ** 2)
    return spread


def _exponent(place: float) -> float:
    """Exponent of an exponential density on 0 to 1 whose mean is at ``place``."""
    low, high = -500.0, 500.0
    for _ in range(60):
        middle = (low + high) / 2
        low, high = (middle, high) if _mean(middle) < place else (low, middle)
    middle = (low + high) / 2
    return middle if abs(middle) > 1e-6 else 1e-6


def _mean(exponent: float) -> float:
    if abs(exponent) < 1e-4:
        return 0.5 + exponent / 12
    return float(1.0 / -np.expm1(-exponent) - 1.0 / exponent)
