"""Temperatures of all zones: set-points where there is conditioning, a heat balance where there is none."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import replace

import numpy as np
from numpy.typing import NDArray

from heatledger.balance.paths import HeatPath

__all__ = ["adjustment_factors", "zone_temperatures"]


def zone_temperatures(
    paths: Sequence[HeatPath],
    set_points: NDArray[np.float64],
    air_coefficients: NDArray[np.float64],
    outdoor: NDArray[np.float64],
    gains: NDArray[np.float64],
) -> NDArray[np.float64]:
    """Solve the linear heat balance of all unconditioned zones together, month by month.

    Parameters
    ----------
    paths : sequence of HeatPath
        Transmission paths of all zones.
    set_points : ndarray, shape (zones, 12)
        Set-points of the conditioned zones; NaN marks an unconditioned one. [°C]
    air_coefficients : ndarray, shape (zones, 12)
        Heat carried by outdoor air per kelvin. [W/K]
    outdoor : ndarray, shape (12,)
        Outdoor temperature. [°C]
    gains : ndarray, shape (zones, 12)
        Mean heat gains. [W]

    Returns
    -------
    ndarray, shape (zones, 12)
        Temperature of every zone. [°C]

    References
    ----------
    EN ISO 13789:2017, 7 and annex; ISO 13790:2008, annex A: Σ H·(θ_x − θ_u) + Φ_gn = 0 for each zone u.
    """
    temperatures = set_points.copy()
    free = np.flatnonzero(np.isnan(set_points).all(axis=1))
    if not free.size:
        return temperatures
    position = {int(zone): place for place, zone in enumerate(free)}
    matrix = np.zeros((12, free.size, free.size))
    supply = np.zeros((12, free.size))
    for zone, place in position.items():
        matrix[:, place, place] += air_coefficients[zone]
        supply[:, place] += air_coefficients[zone] * outdoor + gains[zone]
    for path in paths:
        place = position.get(path.zone, -1)
        if place < 0:
            continue
        matrix[:, place, place] += path.coefficient
        behind = -1 if path.other is None else position.get(path.other, -1)
        if behind >= 0:
            matrix[:, place, behind] -= path.coefficient
        else:
            known = path.temperature if path.temperature is not None else temperatures[path.other]
            supply[:, place] += path.coefficient * known
    temperatures[free] = np.linalg.solve(matrix, supply[:, :, None])[:, :, 0].T
    return temperatures


def adjustment_factors(
    paths: Sequence[HeatPath], conditioned: NDArray[np.bool_], air_coefficients: NDArray[np.float64]
) -> NDArray[np.float64]:
    """Factor b of every unconditioned zone: its share of the temperature drop to outdoors, without gains.

    Parameters
    ----------
    paths, air_coefficients
        As in :func:`zone_temperatures`.
    conditioned : ndarray of bool, shape (zones,)
        Which zones have a set-point.

    Returns
    -------
    ndarray, shape (zones,)
        b = (θ_i − θ_u)/(θ_i − θ_e) with all conditioned zones equally warm; 0 for a conditioned zone. [-]

    References
    ----------
    EN ISO 13789:2017, 7.4: b = H_ue/(H_iu + H_ue) for a single space.
    """
    unit = np.repeat(np.where(conditioned, 1.0, np.nan)[:, None], 12, axis=1)
    cold = [replace(path, temperature=np.zeros(12)) if path.other is None else path for path in paths]
    steady = np.repeat(air_coefficients.mean(axis=1)[:, None], 12, axis=1)
    warmth = zone_temperatures(cold, unit, steady, np.zeros(12), np.zeros_like(steady))
    return np.asarray(1 - warmth[:, 0])
