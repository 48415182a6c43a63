"""When a zone is used: monthly set-points, months out of use, regimes of intermittent heating and cooling."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from heatledger.building.model import Usage, Zone
from heatledger.standards.iso13790_use import Regime, heating_regime, reduction_factor

__all__ = ["ZoneUse", "months_in_use", "reduced", "set_points", "zone_use"]

HOURS_OF_DAY = 24.0
"""[h]"""
DAYS_OF_WEEK = 7.0
"""[d]"""


@dataclass(frozen=True)
class ZoneUse:
    """How a zone is heated and cooled over the week."""

    heating: Regime
    cooling: Regime
    normal_share: float
    """Share of the hours of the week at the heating set-point. [-]"""
    day_share: float
    """Share of the days of the week with cooling. [-]"""


def zone_use(zone: Zone, heating_constant: float, cooling_constant: float) -> ZoneUse:
    """Regime of a zone in heating and in cooling.

    Parameters
    ----------
    zone : Zone
        With its usage.
    heating_constant, cooling_constant : float
        Time constant in either mode. [h]

    Returns
    -------
    ZoneUse
    """
    usage = zone.usage
    if usage is None or not zone.conditioned:
        return ZoneUse("continuous", "continuous", 1.0, 1.0)
    night = HOURS_OF_DAY - usage.heated_hours
    days_off = (DAYS_OF_WEEK - usage.days_in_use) * HOURS_OF_DAY
    longest = days_off + night
    shortest = night or longest
    swing = zone.heating_set_point - _setback(zone)
    day_share = usage.days_in_use / DAYS_OF_WEEK
    # Cooling stops on days without use only; it has no reduced set-point, so no mean of set-points either.
    cooling: Regime = "reduced need"
    if days_off == 0 or heating_regime(cooling_constant, np.inf, days_off, days_off) == "continuous":
        cooling = "continuous"
    return ZoneUse(
        heating_regime(heating_constant, swing, shortest, longest),
        cooling,
        day_share * usage.heated_hours / HOURS_OF_DAY,
        day_share,
    )


def months_in_use(zone: Zone) -> NDArray[np.bool_]:
    """Which of the twelve months the zone is used in, shape (12,)."""
    out = zone.usage.months_out_of_use if zone.usage else ()
    return np.array([month not in out for month in range(1, 13)])


def set_points(
    zones: Sequence[Zone], uses: Sequence[ZoneUse], mode: str, outdoor: NDArray[np.float64]
) -> NDArray[np.float64]:
    """Monthly set-points of all zones in a mode.

    Parameters
    ----------
    zones : sequence of Zone
        The zones.
    uses : sequence of ZoneUse
        How each is used.
    mode : str
        ``heating`` or ``cooling``.
    outdoor : ndarray, shape (12,)
        [°C]

    Returns
    -------
    ndarray, shape (zones, 12)
        NaN for an unconditioned zone. In months out of use heating keeps the setback temperature; where outdoors is
        warmer the zone is as warm as that, up to its set-point, lest it cools its neighbours. [°C]
    """
    return np.array([_months(zone, use, mode, outdoor) for zone, use in zip(zones, uses, strict=True)])


def _months(zone: Zone, use: ZoneUse, mode: str, outdoor: NDArray[np.float64]) -> NDArray[np.float64]:
    if not zone.conditioned:
        return np.full(12, np.nan)
    if mode == "cooling":
        return np.full(12, zone.cooling_set_point)
    normal = zone.heating_set_point
    if use.heating == "mean set-point":
        normal = use.normal_share * normal + (1 - use.normal_share) * _setback(zone)
    idle = np.clip(outdoor, _setback(zone), zone.heating_set_point)
    return np.where(months_in_use(zone), normal, idle)


def _setback(zone: Zone) -> float:
    usage: Usage | None = zone.usage
    return zone.heating_set_point if usage is None or usage.setback is None else usage.setback


def reduced(
    need: NDArray[np.float64], ratio: NDArray[np.float64], zone: Zone, use: ZoneUse, mode: str, constant: float
) -> NDArray[np.float64]:
    """Need of a zone with its intermittency and its months out of use.

    Parameters
    ----------
    need : ndarray, shape (12,)
        Need if conditioned continuously. [kWh]
    ratio : ndarray, shape (12,)
        Gains to losses. [-]
    zone : Zone
        The zone.
    use : ZoneUse
        How it is used.
    mode : str
        ``heating`` or ``cooling``.
    constant : float
        Time constant in this mode. [h]

    Returns
    -------
    ndarray, shape (12,)
        [kWh]
    """
    regime, share = (use.heating, use.normal_share) if mode == "heating" else (use.cooling, use.day_share)
    in_use = months_in_use(zone)
    factor = reduction_factor(ratio, constant, share) if regime == "reduced need" else np.ones(12)
    out_of_use = 1.0 if mode == "heating" else 0.0
    return np.asarray(need * np.where(in_use, factor, out_of_use))
