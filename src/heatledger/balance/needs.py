"""The balance of every zone: heat transfer, gains, utilisation, need."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from heatledger.balance.months import HOURS
from heatledger.balance.paths import HeatPath, transfer
from heatledger.standards.iso13790 import (
    gain_utilisation_heating,
    loss_utilisation_cooling,
    monthly_cooling_need,
    monthly_heating_need,
)
from heatledger.standards.iso52016 import cooling_possible, heating_possible

__all__ = ["ModeBalance", "mode_balance"]


@dataclass(frozen=True)
class ModeBalance:
    """All zones in one mode, heating or cooling; shapes (zones, 12)."""

    temperature: NDArray[np.float64]
    """[°C]"""
    transmission: NDArray[np.float64]
    """[kWh]"""
    ventilation: NDArray[np.float64]
    """[kWh]"""
    ratio: NDArray[np.float64]
    """Gains to losses γ; NaN where there is no loss. [-]"""
    utilisation: NDArray[np.float64]
    """Of gains in heating, of losses in cooling. [-]"""
    continuous_need: NDArray[np.float64]
    """As if every zone were conditioned in this mode at all hours. [kWh]"""
    need: NDArray[np.float64]
    """As if every zone were conditioned in this mode, in the hours of its use. [kWh]"""

    @property
    def spared(self) -> NDArray[np.float64]:
        """What the hours of use take off the need. [kWh]"""
        return self.continuous_need - self.need


def mode_balance(
    mode: str,
    paths: Sequence[HeatPath],
    temperatures: NDArray[np.float64],
    air_coefficients: NDArray[np.float64],
    outdoor: NDArray[np.float64],
    gains: NDArray[np.float64],
    exponents: NDArray[np.float64],
    *,
    cut_offs: bool,
) -> ModeBalance:
    """Balance all zones in one mode.

    Parameters
    ----------
    mode : str
        ``heating`` or ``cooling``.
    paths : sequence of HeatPath
        Transmission paths of all zones.
    temperatures : ndarray, shape (zones, 12)
        Temperatures of all zones in this mode. [°C]
    air_coefficients : ndarray, shape (zones, 12)
        [W/K]
    outdoor : ndarray, shape (12,)
        [°C]
    gains : ndarray, shape (zones, 12)
        Internal and solar gains less sky losses. [kWh]
    exponents : ndarray, shape (zones, 1)
        Numerical parameter a. [-]
    cut_offs : bool
        Whether months beyond the ratios of EN ISO 52016-1:2017 are left out.

    Returns
    -------
    ModeBalance

    Raises
    ------
    ValueError
        If a temperature is not a number.
    """
    if not np.isfinite(temperatures).all():
        raise ValueError("a zone has no temperature")  # would pass for a month without need
    transmission = np.zeros_like(temperatures)
    for path in paths:
        transmission[path.zone] += transfer(path, temperatures, HOURS)
    ventilation = air_coefficients * (temperatures - outdoor) * HOURS / 1000
    loss = transmission + ventilation
    ratio = np.divide(gains, loss, out=np.full_like(loss, np.nan), where=loss > 0)
    if mode == "heating":
        utilisation, need = _heating(loss, gains, ratio, exponents)
        possible = heating_possible(loss, gains)
    else:
        utilisation, need = _cooling(loss, gains, ratio, exponents)
        possible = cooling_possible(loss, gains)
    need = np.where(possible, need, 0.0) if cut_offs else need
    return ModeBalance(temperatures, transmission, ventilation, ratio, utilisation, need, need)


def _heating(
    loss: NDArray[np.float64], gains: NDArray[np.float64], ratio: NDArray[np.float64], exponents: NDArray[np.float64]
) -> tuple[NDArray[np.float64], NDArray[np.float64]]:
    """Utilisation of the gains: 1 where they are negative, 0 where nothing is lost."""
    utilisation = gain_utilisation_heating(np.where(ratio > 0, ratio, 1.0), exponents)
    utilisation = np.where(gains <= 0, 1.0, np.where(loss <= 0, 0.0, utilisation))
    return utilisation, monthly_heating_need(loss, gains, exponents)


def _cooling(
    loss: NDArray[np.float64], gains: NDArray[np.float64], ratio: NDArray[np.float64], exponents: NDArray[np.float64]
) -> tuple[NDArray[np.float64], NDArray[np.float64]]:
    """Utilisation of the losses: 1 where heat comes in from outdoors, 0 where there are no gains."""
    utilisation = loss_utilisation_cooling(np.where(ratio > 0, ratio, 1.0), exponents)
    utilisation = np.where(loss <= 0, 1.0, np.where(gains <= 0, 0.0, utilisation))
    return utilisation, monthly_cooling_need(loss, gains, exponents)
