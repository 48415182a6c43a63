"""Air flows of a zone, worked out by hand from the rules of the method."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

import numpy as np
import pytest

from heatledger.balance.air import AirExchange, air_exchange, air_heat_capacity
from heatledger.building.model import Building

EVEN = np.ones(12)
OUTDOOR = np.array([-10.0, -5, 0, 5, 10, 15, 18, 18, 12, 8, 2, -8])


def exchange(building: Callable[[Any], Building], system: dict[str, Any] | None, **zone: Any) -> AirExchange:
    """200 m³, n50 5 1/h at a normal site with several façades: leakage 200·5·0.07 = 70 m³/h."""
    more = zone.pop("usage", {})
    row = {"name": "Z", "conditioning": "heated", "usage": "U", "floor_area": 80.0, "air_volume": 200.0}
    row |= {"leakage": 5.0, "air_system": "S" if system else "", "usage": zone.pop("usage_name", "U")} | zone
    usage = {"name": "U", "heating_set_point": 20.0, "cooling_set_point": 26.0, "area_per_person": 20.0}
    usage |= {"air_per_person": 30.0, "air_per_area": 0.5, "presence": 12.0} | more
    found = building(
        {
            "Project": [{"project": "P", "weather": "x"}],
            "Zones": [row],
            "Usage": [usage],
            "Air systems": [{"name": "S"} | system] if system else [],
        }
    )
    return air_exchange(found.zones[0], found.project, 1200.0, OUTDOOR)


def test_leakage_alone(building: Callable[[Any], Building]) -> None:
    air = exchange(building, None)
    assert air.leakage == pytest.approx(EVEN * 70)
    assert air.supplied == pytest.approx(EVEN * 0)
    assert air.heating == pytest.approx(EVEN * 70 / 3)
    assert air.cooling == pytest.approx(EVEN * 70 / 3)


@pytest.mark.parametrize(("rate", "flow"), [(0.2, 70.0), (0.5, 100.0), (None, 70.0)])
def test_a_natural_system_takes_the_larger_of_rate_and_leakage(
    building: Callable[[Any], Building], rate: float | None, flow: float
) -> None:
    air = exchange(building, {"kind": "natural", "rate": rate})
    assert air.leakage + air.supplied == pytest.approx(EVEN * flow)
    assert air.heating == pytest.approx(EVEN * flow / 3)


def test_a_balanced_system_recovers_heat_and_bypasses_it_in_cooling(building: Callable[[Any], Building]) -> None:
    """100 m³/h with 80 % recovered and 70 m³/h of leakage: (70 + 20)/3 in heating, 170/3 in cooling."""
    air = exchange(building, {"kind": "balanced", "rate": 0.5, "heat_recovery": 80.0})
    assert air.heating == pytest.approx(EVEN * 90 / 3)
    assert air.cooling == pytest.approx(EVEN * 170 / 3)


def test_without_a_bypass_recovery_stays_on(building: Callable[[Any], Building]) -> None:
    air = exchange(building, {"kind": "balanced", "rate": 0.5, "heat_recovery": 80.0, "bypass": "no"})
    assert air.cooling == pytest.approx(EVEN * 90 / 3)


def test_an_extract_system_lowers_leakage_while_it_runs(building: Callable[[Any], Building]) -> None:
    """200 m³/h for 12 h. Running: 70/(1 + 15/0.07·(200/1000)²) = 70/9.571429 = 7.313433; mean (7.313433 + 70)/2."""
    air = exchange(building, {"kind": "extract", "rate": 1.0, "running_hours": 12.0})
    assert air.supplied == pytest.approx(EVEN * 100.0)
    assert air.leakage == pytest.approx(EVEN * (7.313433 + 70) / 2, abs=1e-6)


@pytest.mark.parametrize(
    ("system", "flow"),
    [
        ({"rate_basis": "floor area", "rate": 1.5}, 120.0),
        # 4 people at 30 m³/h and 80 m² at 0.5 m³/(h·m²)
        ({"rate_basis": "usage"}, 160.0),
    ],
)
def test_rates_by_floor_area_and_by_usage(
    building: Callable[[Any], Building], system: dict[str, Any], flow: float
) -> None:
    assert exchange(building, {"kind": "balanced"} | system).supplied == pytest.approx(EVEN * flow)


@pytest.mark.parametrize(("words", "capacity"), [("sea level", 1200.0), ("at site altitude", 1200 * 0.887)])
def test_air_is_thinner_at_altitude(building: Callable[[Any], Building], words: str, capacity: float) -> None:
    """898.7 hPa at 1000 m against 1013.25 hPa: ISO 2533:1975, tables; recalled from memory."""
    project = building({"Project": [{"project": "P", "weather": "x", "air_density": words}]}).project
    assert air_heat_capacity(project, 1000.0) == pytest.approx(capacity, rel=5e-4)


def test_below_the_frost_limit_no_more_heat_is_recovered(building: Callable[[Any], Building]) -> None:
    """At −10 °C with the limit at −5 °C: 100 m³/h carry 100/3·(1 − 0.8·25/30) W/K instead of 100/3·0.2."""
    system = {"kind": "balanced", "rate": 0.5, "heat_recovery": 80.0, "frost_limit": -5.0}
    air = exchange(building, system, leakage=0.0)
    assert air.heating[:3] == pytest.approx([100 / 3 * (1 - 0.8 * 25 / 30), 20 / 3, 20 / 3])


def test_night_cooling_counts_eight_hours_in_its_months_and_only_in_cooling(
    building: Callable[[Any], Building],
) -> None:
    """3 1/h of 200 m³ for 8 of 24 h are 200 m³/h more, 200/3 W/K."""
    system = {"kind": "natural", "rate": 0.5, "night_cooling": 3.0, "night_cooling_months": (6, 7, 8)}
    air = exchange(building, system)
    assert air.cooling == pytest.approx([100 / 3] * 5 + [300 / 3] * 3 + [100 / 3] * 4)
    assert air.heating == pytest.approx(EVEN * 100 / 3)


def test_fans_use_electricity_by_flow_and_hours(building: Callable[[Any], Building]) -> None:
    """0.4 W/(m³/h) at 100 m³/h are 40 W: 29.76 kWh in January."""
    air = exchange(building, {"kind": "balanced", "rate": 0.5, "fan_power": 0.4})
    assert air.fan_electricity[:2] == pytest.approx([29.76, 26.88])


def test_a_zone_out_of_use_only_leaks(building: Callable[[Any], Building]) -> None:
    usage = {"setback": 12.0, "months_out_of_use": (7, 8)}
    air = exchange(building, {"kind": "balanced", "rate": 0.5}, usage=usage)
    assert air.supplied == pytest.approx([100.0] * 6 + [0.0] * 2 + [100.0] * 4)
    assert air.leakage == pytest.approx(EVEN * 70)


def test_warm_nights_do_not_cool(building: Callable[[Any], Building]) -> None:
    """A cooling set-point of 16 °C lies below the 18 °C of July and August: only June's night air is let in."""
    system = {"kind": "natural", "rate": 0.5, "night_cooling": 3.0, "night_cooling_months": (6, 7, 8)}
    air = exchange(building, system, cooling_set_point=16.0)
    assert air.cooling == pytest.approx([100 / 3] * 5 + [300 / 3] + [100 / 3] * 6)


def test_a_frost_limit_does_not_count_without_a_set_point(building: Callable[[Any], Building]) -> None:
    system = {"kind": "balanced", "rate": 0.5, "heat_recovery": 80.0, "frost_limit": -5.0}
    air = exchange(building, system, leakage=0.0, conditioning="unconditioned", usage_name="")
    assert air.heating == pytest.approx(EVEN * 20 / 3)
