"""Unconditioned zones: closed forms for one and for a chain of two."""

from __future__ import annotations

import numpy as np
import pytest
from numpy.typing import NDArray

from heatledger.balance.network import adjustment_factors, zone_temperatures
from heatledger.balance.paths import HeatPath

OUTDOOR = np.linspace(-5.0, 17.0, 12)
NONE = np.zeros((2, 12))


def months(*set_points: float) -> NDArray[np.float64]:
    return np.repeat(np.array(set_points)[:, None], 12, axis=1)


def path(zone: int, coefficient: float, *, other: int | None = None, outdoors: bool = False) -> HeatPath:
    temperature = OUTDOOR if outdoors else None
    return HeatPath(zone, "x", "wall", "", None, None, coefficient, other, temperature)


def test_one_unheated_space_between_room_and_outdoors() -> None:
    """ISO 13789:2017, 7.4: b = H_ue/(H_iu + H_ue) = 30/(10 + 30); θ_u = θ_i − b·(θ_i − θ_e)."""
    paths = [path(0, 10.0, other=1), path(1, 10.0, other=0), path(1, 20.0, outdoors=True)]
    air = np.array([np.full(12, 5.0), np.full(12, 10.0)])
    assert adjustment_factors(paths, np.array([True, False]), air) == pytest.approx([0.0, 0.75], abs=1e-12)
    temperatures = zone_temperatures(paths, months(20.0, np.nan), air, OUTDOOR, NONE)
    assert temperatures[0] == pytest.approx(np.full(12, 20.0))
    assert temperatures[1] == pytest.approx(20 - 0.75 * (20 - OUTDOOR), abs=1e-12)


def test_gains_warm_the_unheated_space() -> None:
    """200 W over 40 W/K are 5 K more."""
    paths = [path(1, 10.0, other=0), path(1, 30.0, outdoors=True)]
    gains = np.array([np.zeros(12), np.full(12, 200.0)])
    without = zone_temperatures(paths, months(20.0, np.nan), NONE, OUTDOOR, NONE)
    with_gains = zone_temperatures(paths, months(20.0, np.nan), NONE, OUTDOOR, gains)
    assert with_gains[1] - without[1] == pytest.approx(np.full(12, 5.0), abs=1e-12)


def test_a_chain_of_two_unheated_spaces_is_a_row_of_resistances() -> None:
    """Room 20 °C – 10 W/K – loft – 20 W/K – stair – 20 W/K – outdoors: R = 0.1 + 0.05 + 0.05 = 0.2 K/W.

    From the room the loft lies behind half of the drop, the stair behind three quarters.
    """
    paths = [
        path(1, 10.0, other=0),
        path(1, 20.0, other=2),
        path(2, 20.0, other=1),
        path(2, 20.0, outdoors=True),
    ]
    air = np.zeros((3, 12))
    temperatures = zone_temperatures(paths, months(20.0, np.nan, np.nan), air, OUTDOOR, air)
    assert temperatures[1] == pytest.approx(20 - 0.5 * (20 - OUTDOOR), abs=1e-12)
    assert temperatures[2] == pytest.approx(20 - 0.75 * (20 - OUTDOOR), abs=1e-12)
    conditioned = np.array([True, False, False])
    assert adjustment_factors(paths, conditioned, air) == pytest.approx([0, 0.5, 0.75], abs=1e-12)


def test_known_temperatures_need_no_solution() -> None:
    temperatures = zone_temperatures([], months(20.0, 18.0), NONE, OUTDOOR, NONE)
    assert temperatures == pytest.approx(np.array([np.full(12, 20.0), np.full(12, 18.0)]))
