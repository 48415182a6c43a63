"""Heat transfer by air: ISO 13789:1999 annex (EN 832) for leakage, ISO 13790:2008, 9.3 for the coefficient."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike, NDArray

__all__ = ["AIR_HEAT_CAPACITY", "SHIELDING", "infiltration", "recovered_share", "ventilation_coefficient"]

AIR_HEAT_CAPACITY = 1200.0
"""Heat capacity of air per volume at sea level. [J/(m³·K)] ISO 13790:2008, 9.3.1."""

SHIELDING: dict[tuple[str, bool], tuple[float, float]] = {
    ("open", True): (0.10, 15.0),
    ("normal", True): (0.07, 15.0),
    ("sheltered", True): (0.04, 15.0),
    ("open", False): (0.03, 20.0),
    ("normal", False): (0.02, 20.0),
    ("sheltered", False): (0.01, 20.0),
}
"""Shielding coefficients e and f by site and by whether several façades are exposed. [-]
ISO 13789:1999, annex (= EN 832:1998, annex F); recalled from memory."""


def infiltration(
    volume: ArrayLike,
    leakage: ArrayLike,
    shielding: tuple[float, float],
    flow_imbalance: ArrayLike = 0.0,
) -> NDArray[np.float64]:
    """Air that leaks in through gaps, from the air changes at 50 Pa.

    Parameters
    ----------
    volume : array_like
        Air volume of the zone. [m³]
    leakage : array_like
        Air changes at 50 Pa, n50. [1/h]
    shielding : tuple of float
        Coefficients e and f of :data:`SHIELDING`. [-]
    flow_imbalance : array_like, optional
        Supply less extract flow of fans. [m³/h]

    Returns
    -------
    ndarray
        Flow V·n50·e/(1 + f/e·((V_sup − V_ext)/(V·n50))²). [m³/h]

    References
    ----------
    ISO 13789:1999, annex; EN 832:1998, annex F; recalled from memory.

    Examples
    --------
    >>> round(float(infiltration(200.0, 3.0, SHIELDING["normal", True])), 6)
    42.0
    """
    e, f = shielding
    at_50_pascal = np.asarray(volume, dtype=float) * np.asarray(leakage, dtype=float)
    ratio = np.divide(flow_imbalance, at_50_pascal, out=np.zeros_like(at_50_pascal), where=at_50_pascal > 0)
    return np.asarray(at_50_pascal * e / (1 + f / e * ratio**2))


def recovered_share(
    efficiency: float, inside: float, outdoor: ArrayLike, frost_limit: float | None = None
) -> NDArray[np.float64]:
    """Share of the ventilation heat that a heat recovery gives back.

    Parameters
    ----------
    efficiency : float
        Temperature efficiency η. [-]
    inside : float
        Temperature of the exhaust. [°C]
    outdoor : array_like, shape (12,)
        Monthly mean outdoor temperature. [°C]
    frost_limit : float, optional
        Outdoor temperature below which no more heat is recovered than at it, lest the exhaust freezes. [°C]

    Returns
    -------
    ndarray, shape (12,)
        η; below the limit η·(θ_i − θ_limit)/(θ_i − θ_e). [-]

    Notes
    -----
    Common practice, no source. With monthly means, hours below the limit in milder months do not show.

    Examples
    --------
    >>> recovered_share(0.8, 20.0, [-10.0, 0.0, 10.0], -5.0).round(4).tolist()
    [0.6667, 0.8, 0.8]
    """
    temperatures = np.asarray(outdoor, dtype=float)
    if frost_limit is None or not inside > frost_limit:
        return np.full(temperatures.shape, efficiency)
    held_back = np.maximum(inside - temperatures, inside - frost_limit)
    return np.asarray(efficiency * (inside - frost_limit) / held_back)


def ventilation_coefficient(
    flow: ArrayLike, air_heat_capacity: ArrayLike, recovered_share: ArrayLike = 0.0
) -> NDArray[np.float64]:
    """Heat that an air flow carries per kelvin.

    Parameters
    ----------
    flow : array_like
        Air flow from outdoors. [m³/h]
    air_heat_capacity : array_like
        Per volume, ρc. [J/(m³·K)]
    recovered_share : array_like, optional
        Temperature efficiency of the heat recovery. [-]

    Returns
    -------
    ndarray
        Coefficient ρc·q·(1 − η). [W/K]

    References
    ----------
    ISO 13790:2008, 9.3.1 and 9.3.3.4.
    """
    return np.asarray(np.asarray(flow) / 3600 * np.asarray(air_heat_capacity) * (1 - np.asarray(recovered_share)))
