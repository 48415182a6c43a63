"""EN 13363-1: solar protection devices with glazing, simplified method."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike, NDArray

__all__ = ["INTEGRATED_CONDUCTANCE", "integrated_g_value"]

INTEGRATED_CONDUCTANCE = 3.0
"""Thermal conductance G_3 from a device between the panes [W/(m²·K)]: EN 13363-1:2003, recalled from memory."""


def integrated_g_value(
    g_value: ArrayLike, u_value: ArrayLike, transmittance: ArrayLike, absorptance: ArrayLike
) -> NDArray[np.float64]:
    """Total energy transmittance of glazing with a solar protection device between its panes.

    Parameters
    ----------
    g_value : array_like
        Of the glazing without device. [-]
    u_value : array_like
        Of the glazing without device. [W/(m²·K)]
    transmittance, absorptance : array_like
        Of the device for sunlight; what is left is reflected. [-]

    Returns
    -------
    ndarray, shape of the broadcast inputs
        [-]

    Raises
    ------
    ValueError
        If transmittance and absorptance exceed 1 together.

    References
    ----------
    EN 13363-1:2003 + A1:2007, device between the panes; recalled from memory.

    Examples
    --------
    >>> round(float(integrated_g_value(0.6, 1.3, 0.1, 0.1)), 3)
    0.136
    """
    g, u, through, taken = (
        np.asarray(value, dtype=np.float64) for value in (g_value, u_value, transmittance, absorptance)
    )
    reflectance = 1 - through - taken
    if np.any(reflectance < -1e-9):  # 1 − 0.9 − 0.1 is no exact zero
        raise ValueError("transmittance and absorptance of a device exceed 1 together")
    conductance = 1 / (1 / u + 1 / INTEGRATED_CONDUCTANCE)
    return np.asarray(g * through + g * (taken + (1 - g) * reflectance) * conductance / INTEGRATED_CONDUCTANCE)
