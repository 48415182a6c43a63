"""Setback, weekends and months out of use through the whole engine."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

import numpy as np
import pytest

from heatledger.balance.calculate import calculate
from heatledger.building.model import Building
from heatledger.results import ZoneResult

OUTDOOR = np.array([-2.0, 0, 5, 9, 14, 18, 21, 20, 16, 10, 4, -1])


def zone_result(
    building: Callable[[Any], Building], flat_sky: Any, capacity: float = 151.2, **usage: Any
) -> ZoneResult:
    """H 140 W/K, gains 1500 W as in the hand-calculated zone; τ 30 h at 151.2 kJ/(m²·K)."""
    row = {"name": "Use", "heating_set_point": 20.0, "cooling_set_point": 26.0, "appliances": 131.4}
    zone = {"name": "Z", "conditioning": "heated and cooled", "usage": "Use", "air_system": "Air"}
    floor = {"name": "F", "zone": "Z", "kind": "floor", "faces": "outdoors", "u_value": 0.5, "area": 200.0}
    values: dict[str, list[dict[str, Any]]] = {
        "Project": [{"project": "P", "weather": "x", "air_density": "sea level", "method": "ISO 13790:2008"}],
        "Zones": [{**zone, "floor_area": 100.0, "air_volume": 240.0, "heat_capacity": capacity, "leakage": 0.0}],
        "Usage": [row | usage],
        "Air systems": [{"name": "Air", "kind": "natural", "rate": 0.5}],
        "Envelope": [{**floor, "absorptance": 0.0}],
    }
    return calculate(building(values), flat_sky(OUTDOOR)).zone("Z")


def test_a_reduced_need_follows_the_ratio_of_gains(building: Callable[[Any], Building], flat_sky: Any) -> None:
    """Nights 22–6 h at 15 °C: τ 30 h > 3·8 h would be continuous, so 12 h nights: reduced, f = 0.5.

    January γ = 0.487013: 1 − 3·15/30·0.487013·0.5 = 0.634740; 1245.5909·0.634740 = 790.63 kWh.
    """
    always = zone_result(building, flat_sky)
    nights = zone_result(building, flat_sky, setback=15.0, heated_hours=12.0)
    assert nights.heating_use == "reduced need"
    assert always.heating_need[0] == pytest.approx(1245.5909, abs=1e-3)
    assert nights.heating_need[0] == pytest.approx(790.63, abs=0.01)


def test_what_reduced_hours_spare_is_a_result_of_its_own(building: Callable[[Any], Building], flat_sky: Any) -> None:
    """January as above: 1245.5909·(1 − 0.634740) = 454.965 kWh.

    February: loss 140 W/K·20 K·672 h = 1881.6 kWh, gains 1008 kWh, γ 0.535714, a = 3, η = (1 − γ³)/(1 − γ⁴) = 0.922212:
    need at all hours 952.011 kWh; 1 − 3·15/30·γ·0.5 = 0.598214, so 382.504 kWh are spared.
    """
    always = zone_result(building, flat_sky)
    nights = zone_result(building, flat_sky, setback=15.0, heated_hours=12.0)
    assert nights.heating_spared[:2].tolist() == pytest.approx([454.965, 382.504], abs=0.001)
    assert (nights.heating_need + nights.heating_spared).tolist() == pytest.approx(always.heating_need.tolist())


def test_only_a_reduced_need_spares(building: Callable[[Any], Building], flat_sky: Any) -> None:
    """Neither does a mean set-point, whose losses are smaller already, nor a month at the setback."""
    mean = zone_result(building, flat_sky, setback=18.0, heated_hours=12.0)
    for other in (zone_result(building, flat_sky), mean):
        assert other.heating_spared.tolist() == [0.0] * 12
    empty = zone_result(building, flat_sky, setback=15.0, heated_hours=12.0, months_out_of_use=(1,))
    assert empty.heating_spared[0] == 0.0
    assert empty.heating_spared[1] > 300


def test_a_slow_zone_keeps_its_set_point(building: Callable[[Any], Building], flat_sky: Any) -> None:
    always = zone_result(building, flat_sky, capacity=400.0)
    nights = zone_result(building, flat_sky, capacity=400.0, setback=15.0, heated_hours=16.0)
    assert nights.heating_use == "continuous"
    assert nights.heating_need == pytest.approx(always.heating_need)


def test_a_small_swing_takes_the_mean_set_point(building: Callable[[Any], Building], flat_sky: Any) -> None:
    """12 h at 18 °C instead of 20 °C is a set-point of 19 °C."""
    nights = zone_result(building, flat_sky, setback=18.0, heated_hours=12.0)
    assert nights.heating_use == "mean set-point"
    assert nights.temperature == pytest.approx(np.full(12, 19.0))
    assert nights.heating_need == pytest.approx(zone_result(building, flat_sky, heating_set_point=19.0).heating_need)


def test_weekends_reduce_cooling(building: Callable[[Any], Building], flat_sky: Any) -> None:
    """Five days: two days off are 48 h; τ 30 h is not above 144 h. July: Q_ht 520.8, γ_C = 1116/520.8 = 2.142857.

    1 − 3·15/30·2.142857·2/7 = 0.0816, so the share of days 5/7 holds: 624.8341·5/7 = 446.310 kWh.
    """
    week = zone_result(building, flat_sky, setback=20.0, days_in_use=5.0)
    assert week.cooling_use == "reduced need"
    assert week.cooling_need[6] == pytest.approx(446.310, abs=0.01)
    assert week.heating_use == "continuous"


def test_a_month_out_of_use_keeps_the_setback_and_is_not_cooled(
    building: Callable[[Any], Building], flat_sky: Any
) -> None:
    """Nobody there, windows shut: only 100 W/K at 12 °C in January, 14 K, 744 h: 1041.6 kWh."""
    holiday = zone_result(building, flat_sky, setback=12.0, months_out_of_use=(1, 7))
    always = zone_result(building, flat_sky)
    assert holiday.internal_gains[[0, 6]].tolist() == [0.0, 0.0]
    assert holiday.temperature[0] == 12.0
    assert holiday.heating_need[0] == pytest.approx(1041.6, abs=1e-6)
    assert holiday.cooling_need[6] == 0.0
    assert always.cooling_need[6] > 600
    assert holiday.heating_need[1] == pytest.approx(always.heating_need[1], rel=0.02)


def test_the_season_is_as_long_as_its_months(building: Callable[[Any], Building], flat_sky: Any) -> None:
    """a = 3, limit 4/3. April, γ = 1080/1108.8 = 0.974; May, γ = 1116/624.96 = 1.786: ends of April 0.810 and 1.380.

    April: 0.5 + 0.5·(1.3333 − 0.9740)/(1.3799 − 0.9740) = 0.9427.
    """
    result = zone_result(building, flat_sky)
    assert result.heating_season[:3].tolist() == [1, 1, 1]
    assert result.heating_season[3] == pytest.approx(0.9427, abs=2e-4)
    assert result.heating_season[6] == 0


def neighbours(building: Callable[[Any], Building], flat_sky: Any, **usage: Any) -> ZoneResult:
    """A flat above a school with a set-back of 10 °C."""
    rows = [
        {"name": "Flat", "heating_set_point": 20.0, "cooling_set_point": 26.0},
        {"name": "School", "heating_set_point": 20.0, "cooling_set_point": 26.0, "setback": 10.0, **usage},
    ]
    zone = {"conditioning": "heated", "floor_area": 80.0, "air_volume": 200.0, "heat_capacity": 150.0, "leakage": 1.0}
    wall = {"kind": "wall", "faces": "outdoors", "u_value": 0.5, "area": 60.0, "azimuth": 0.0, "absorptance": 0.0}
    values: dict[str, list[dict[str, Any]]] = {
        "Project": [{"project": "P", "weather": "x"}],
        "Zones": [{**zone, "name": row["name"], "usage": row["name"]} for row in rows],
        "Usage": rows,
        "Envelope": [
            {**wall, "name": "W1", "zone": "Flat"},
            {**wall, "name": "W2", "zone": "School"},
            {"name": "C", "zone": "School", "kind": "partition", "faces": "Flat", "u_value": 1.5, "area": 80.0},
        ],
    }
    return calculate(building(values), flat_sky(OUTDOOR)).zone("Flat")


def test_an_empty_neighbour_does_not_cool_in_summer(building: Callable[[Any], Building], flat_sky: Any) -> None:
    """In July and August (21 and 20 °C outdoors) an empty school is no colder than outdoors."""
    holidays = neighbours(building, flat_sky, months_out_of_use=(7, 8))
    always = neighbours(building, flat_sky)
    assert holidays.transmission_heating[[6, 7]] == pytest.approx(always.transmission_heating[[6, 7]])
    winter = neighbours(building, flat_sky, months_out_of_use=(1,))
    assert winter.transmission_heating[0] - always.transmission_heating[0] == pytest.approx(1.5 * 80 * 10 * 0.744)
