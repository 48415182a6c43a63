"""Results as they are printed: rounded once, so that every sum on paper is the sum of its parts.

A figure is rounded here and nowhere else, hence it reads the same on every sheet. The sums are formed from
the rounded parts; the parts are rounded so that their grand total is the exact one, rounded.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import fields, replace
from typing import Any, cast

import numpy as np
from numpy.typing import ArrayLike, NDArray

from heatledger.results import ElementLoss, OpeningGains, Results, ZoneResult
from heatledger.workbook.measure import DASH
from heatledger.workbook.monthly import conditioned, sum_of

__all__ = ["ROUNDED", "energy_digits", "energy_text", "in_steps", "printed", "shares_in_tenths"]

ROUNDED = "Rounded so that sums add up as printed."
"""Stands on every sheet with sums."""
TENTH = 0.1
_ENERGIES = [item.name for item in fields(ZoneResult) if item.metadata["unit"] == "kWh"]
_SEASONS = ("heating_season", "cooling_season")


def printed(results: Results) -> Results:
    """The same results with every figure that is summed up rounded to what is shown.

    Energies are whole kWh, or tenths and hundredths in a building that hardly needs any; floor areas, coefficients,
    shares and months of a season are tenths.
    """
    step = _energy_step(results)
    zones = _zones(results, step)
    inside = [zone for zone in zones if zone.conditioning != "unconditioned"]
    building = replace(
        results.building,
        floor_area=round(sum(zone.floor_area for zone in inside), 1),
        heating_need=_tidy(sum_of(inside, "heating_need"), step),
        cooling_need=_tidy(sum_of(inside, "cooling_need"), step),
    )
    return replace(
        results,
        zones=zones,
        building=building,
        element_losses=_element_losses(results.element_losses, step),
        opening_gains=_opening_gains(results.opening_gains, step),
    )


def energy_digits(results: Results) -> str:
    """Number format of every energy in the workbook; nothing shows as a dash.

    The same for the results and for what :func:`printed` makes of them.
    """
    digits = {1.0: "#,##0", 0.1: "#,##0.0", 0.01: "#,##0.00"}[_energy_step(results)]
    return f'{digits};-{digits};"{DASH}"'


def energy_text(results: Results, energy: float) -> str:
    """An energy within a sentence, with as many digits as in the tables."""
    decimals = energy_digits(results).partition(";")[0].partition(".")[2]
    return f"{energy:,.{len(decimals)}f}"


def in_steps(values: ArrayLike, step: float) -> NDArray[np.float64]:
    """Multiples of a step near to the values; their sum is the exact sum, rounded.

    Those that lose most by rounding down are rounded up, as many as the sum asks for. What does not exist stays so.

    >>> in_steps([1.4, 1.4, 1.4], 1.0).tolist()
    [2.0, 1.0, 1.0]
    """
    exact = np.asarray(values, dtype=np.float64) / step
    scaled = np.where(np.isfinite(exact), exact, 0.0)
    # 0.1 + 0.2 is not less than 0.3, nor is a float more than its last digits.
    whole = np.floor(scaled + 1e-9)
    missing = int(np.floor(np.sum(scaled) + 0.5 + 1e-9) - np.sum(whole))
    order = np.argsort(-(scaled - whole), axis=None, kind="stable")[: max(missing, 0)]
    whole.flat[order] += 1
    return _tidy(np.where(np.isfinite(exact), whole, exact) * step, step)


def shares_in_tenths(parts: Sequence[float]) -> list[float]:
    """Shares of a sum in percent, rounded to tenths that add up to 100; zeros if there is nothing to share.

    >>> shares_in_tenths([1.0, 1.0, 1.0])
    [33.4, 33.3, 33.3]
    """
    total = sum(parts)
    if total <= 0:
        return [0.0] * len(parts)
    shares: list[float] = in_steps([100 * part / total for part in parts], TENTH).tolist()
    return shares


def _energy_step(results: Results) -> float:
    zones = conditioned(results)
    flows = [sum_of(zones, name) for name in ("heating_need", "cooling_need", "transmission_heating")]
    largest = float(np.max(np.abs(flows), initial=0.0))
    # As if rounded already: what is printed must ask for the same step.
    return 1.0 if largest >= 99.95 else 0.1 if largest >= 9.995 else 0.01


def _tidy(values: ArrayLike, step: float) -> NDArray[np.float64]:
    """Without the dust of adding up decimals, and without a minus before zero."""
    exact = np.asarray(values, dtype=np.float64)
    tidy: NDArray[np.float64] = np.asarray(np.round(exact, round(-np.log10(step))) + 0.0, dtype=np.float64)
    return tidy


def _zones(results: Results, step: float) -> tuple[ZoneResult, ...]:
    """Conditioned zones are rounded together, since they are summed up; the others are rounded one by one."""
    inside = conditioned(results)
    areas = in_steps([zone.floor_area for zone in inside], TENTH).tolist()
    tables = {name: in_steps([getattr(zone, name) for zone in inside], step) for name in _ENERGIES}
    place, zones = 0, []
    for zone in results.zones:
        months = {name: in_steps(getattr(zone, name), TENTH) for name in _SEASONS}
        if zone.conditioning != "unconditioned":
            months |= {name: table[place] for name, table in tables.items()}
            zones.append(replace(zone, floor_area=areas[place], **cast("Any", months)))
            place += 1
        else:
            months |= {name: in_steps(getattr(zone, name), step) for name in _ENERGIES}
            zones.append(replace(zone, **cast("Any", months)))
    return tuple(zones)


def _element_losses(losses: Sequence[ElementLoss], step: float) -> tuple[ElementLoss, ...]:
    """What leaves the building is summed up; what passes between its zones is not."""
    leaving = [loss for loss in losses if not loss.between_zones]
    columns = (
        in_steps([loss.coefficient for loss in leaving], TENTH).tolist(),
        in_steps([loss.loss for loss in leaving], step).tolist(),
        shares_in_tenths([loss.loss for loss in leaving]),
    )
    rounded = iter(zip(*columns, strict=True))
    made = []
    for loss in losses:
        if loss.between_zones:
            coefficient, flow, share = loss.coefficient, float(in_steps([loss.loss], step)[0]), loss.share
        else:
            coefficient, flow, share = next(rounded)
        made.append(replace(loss, coefficient=coefficient, loss=flow, share=share))
    return tuple(made)


def _opening_gains(openings: Sequence[OpeningGains], step: float) -> tuple[OpeningGains, ...]:
    """Gains are summed up over months and openings, the sun on a plane over months only."""
    gains, cooling = (
        in_steps([getattr(opening, name) for opening in openings], step) for name in ("gains", "gains_cooling")
    )
    return tuple(
        replace(
            opening,
            irradiation=in_steps(opening.irradiation, 1.0),
            gains=gains[place],
            gains_cooling=cooling[place],
        )
        for place, opening in enumerate(openings)
    )
