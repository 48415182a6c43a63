"""ISO 13788:2012: temperatures in an element at steady state, and the temperature factor of its inner surface."""

from __future__ import annotations

from collections.abc import Sequence
from typing import NamedTuple

import numpy as np
from numpy.typing import ArrayLike, NDArray

from heatledger.standards._guards import not_negative, positive

__all__ = ["MOULD_SURFACE_RESISTANCE", "SteadyProfile", "steady_profile", "temperature_factor"]

MOULD_SURFACE_RESISTANCE = 0.25
"""Inside surface resistance for judging mould on opaque elements. [m²·K/W] ISO 13788:2012, 4.4.1, table 2."""


class SteadyProfile(NamedTuple):
    """Temperatures through an element, from the air inside to the air outside."""

    temperatures: NDArray[np.float64]
    """Inside air, inner surface, each interface, outer surface, outside air; shape (layers + 3,). [°C]"""
    heat_flux: float
    """Heat leaving through the element. [W/m²]"""
    surface_factor: float
    """Temperature factor of the inner surface, f_Rsi = 1 − R_si/R_tot. [-]"""

    @property
    def inner_surface(self) -> float:
        """Temperature of the inner surface [°C]."""
        return float(self.temperatures[1])


def temperature_factor(surface: ArrayLike, inside: ArrayLike, outside: ArrayLike) -> NDArray[np.float64]:
    """Temperature factor of the inner surface, (θ_si − θ_e)/(θ_i − θ_e).

    Parameters
    ----------
    surface, inside, outside : array_like
        Temperatures of the inner surface, of the air inside and outside. [°C]

    Returns
    -------
    ndarray
        f_Rsi. [-]

    Raises
    ------
    ValueError
        If inside and outside are equal.

    References
    ----------
    ISO 13788:2012, 3.1.7.

    Examples
    --------
    >>> round(float(temperature_factor(12.6, 20.0, -5.0)), 2)
    0.7
    """
    difference: NDArray[np.float64] = np.subtract(np.asarray(inside, dtype=float), outside)
    if np.any(difference == 0):
        raise ValueError("the temperature factor needs different temperatures inside and outside")
    excess: NDArray[np.float64] = np.subtract(np.asarray(surface, dtype=float), outside)
    return np.asarray(excess / difference)


def steady_profile(
    resistances: Sequence[float] | NDArray[np.float64],
    inside_resistance: float,
    outside_resistance: float,
    inside_temperature: float,
    outside_temperature: float,
) -> SteadyProfile:
    """Temperatures, heat flux and f_Rsi of layers at steady state.

    Parameters
    ----------
    resistances : sequence of float, shape (layers,)
        Resistance of each layer, inside first. [m²·K/W]
    inside_resistance, outside_resistance : float
        Surface resistances R_si and R_se. [m²·K/W]
    inside_temperature, outside_temperature : float
        Air temperatures. [°C]

    Returns
    -------
    SteadyProfile
        Temperatures, flux and factor.

    Raises
    ------
    ValueError
        If a resistance is negative or all are 0.

    References
    ----------
    ISO 13788:2012, 6.4.2; one-dimensional, so for a bridged layer its equivalent resistance gives a mean.

    Examples
    --------
    >>> profile = steady_profile([2.0], 0.25, 0.25, 20.0, -5.0)
    >>> profile.temperatures.tolist(), profile.heat_flux, profile.surface_factor
    ([20.0, 17.5, -2.5, -5.0], 10.0, 0.9)
    """
    steps = not_negative("a resistance", [inside_resistance, *np.asarray(resistances, dtype=float), outside_resistance])
    total = float(positive("the total resistance", np.sum(steps)))
    flux = (inside_temperature - outside_temperature) / total
    temperatures = inside_temperature - flux * np.concatenate([[0.0], np.cumsum(steps)])
    return SteadyProfile(temperatures, flux, 1 - inside_resistance / total)
