"""ISO 2533:1975, standard atmosphere: how pressure falls with altitude."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike, NDArray

__all__ = ["pressure_ratio"]


def pressure_ratio(altitude: ArrayLike) -> NDArray[np.float64]:
    """Air pressure against that at sea level.

    Parameters
    ----------
    altitude : array_like
        Above sea level, −430 to 5500 here; the formula holds to 11 000. [m]

    Returns
    -------
    ndarray
        Pressure ratio. [-]

    Raises
    ------
    ValueError
        Outside −1000 to 11 000 m, where the formula of the lowest layer ends.

    References
    ----------
    ISO 2533:1975, lowest layer: 288.15 K, 6.5 K/km, exponent 5.2559.

    Examples
    --------
    >>> round(float(pressure_ratio(1000.0)), 4)
    0.887
    """
    height = np.asarray(altitude, dtype=float)
    if np.any((height < -1000) | (height > 11_000)):
        raise ValueError("the altitude must lie between -1000 and 11000 m")
    return np.asarray((1 - 0.0065 * height / 288.15) ** 5.2559)
