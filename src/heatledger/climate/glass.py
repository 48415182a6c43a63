"""How much less light glass lets in at an angle than at right angles."""

from __future__ import annotations

from functools import cache

import numpy as np
from numpy.typing import ArrayLike

from heatledger.climate.model import FloatArray

__all__ = ["angular_transmission", "hemispherical_transmission"]

CATEGORY = 4.0
"""Category q of ordinary clear and low-emissivity glass in the model of Karlsson and Roos [-]."""


def angular_transmission(cosine: ArrayLike, panes: int) -> FloatArray:
    """Solar transmittance of glazing at an angle over that at right angles.

    Parameters
    ----------
    cosine : array_like
        Cosine of the angle of incidence; nothing passes where it is not positive. [-]
    panes : int
        Number of panes. [-]

    Returns
    -------
    ndarray, shape of ``cosine``
        1 at right angles, 0 at grazing light. [-]

    References
    ----------
    J. Karlsson and A. Roos, Modelling the angular behaviour of the total solar energy transmittance of windows,
    Solar Energy 69 (2000) 321-329; recalled from memory.

    Examples
    --------
    >>> angular_transmission([1.0, 0.5, 0.0], 2).round(3).tolist()
    [1.0, 0.874, 0.0]
    """
    z = np.arccos(np.clip(np.asarray(cosine, dtype=np.float64), 0.0, 1.0)) / (np.pi / 2)
    q, p = CATEGORY, float(panes)
    a, b = 8.0, 0.25 / q
    alpha, beta, gamma = 5.2 + 0.7 * q, 2.0, (5.26 + 0.06 * p) + (0.73 + 0.04 * p) * q
    return np.asarray(np.clip(1.0 - a * z**alpha - b * z**beta - (1.0 - a - b) * z**gamma, 0.0, 1.0))


@cache
def hemispherical_transmission(panes: int) -> float:
    """Mean of :func:`angular_transmission` for light that comes evenly from everywhere [-].

    >>> round(hemispherical_transmission(2), 3)
    0.893
    """
    # Rings of equal weight: the square of the sine is spread evenly.
    square = (np.arange(2000) + 0.5) / 2000
    return float(angular_transmission(np.sqrt(1.0 - square), panes).mean())
