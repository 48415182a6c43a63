"""EN ISO 52016-1:2017, monthly method: months left out because gains or losses far outweigh the other side."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike, NDArray

__all__ = ["cooling_possible", "heating_possible"]

LARGEST_RATIO = 2.0
"""Ratio of gains to losses in heating, of losses to gains in cooling, above which there is no need. [-]"""


def heating_possible(heat_transfer: ArrayLike, gains: ArrayLike) -> NDArray[np.bool_]:
    """Whether a month can have a heating need.

    Parameters
    ----------
    heat_transfer, gains : array_like, shape (..., 12)
        Q_ht and Q_gn of the month at the heating set-point. [kWh]

    Returns
    -------
    ndarray of bool
        False where γ_H > 2.

    References
    ----------
    EN ISO 52016-1:2017, 6.6.4; recalled from memory.
    """
    return np.asarray(np.asarray(gains) <= LARGEST_RATIO * np.maximum(np.asarray(heat_transfer), 0.0))


def cooling_possible(heat_transfer: ArrayLike, gains: ArrayLike) -> NDArray[np.bool_]:
    """Whether a month can have a cooling need.

    Parameters
    ----------
    heat_transfer, gains : array_like, shape (..., 12)
        Q_ht and Q_gn of the month at the cooling set-point. [kWh]

    Returns
    -------
    ndarray of bool
        False where 1/γ_C > 2.

    References
    ----------
    EN ISO 52016-1:2017, 6.6.5; recalled from memory.
    """
    loss, gain = np.broadcast_arrays(np.asarray(heat_transfer, dtype=float), np.asarray(gains, dtype=float))
    return np.asarray((loss <= 0) | (loss <= LARGEST_RATIO * gain))
