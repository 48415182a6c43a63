"""One zone worked out by hand, month by month, to 0.01 kWh.

The zone: 100 m², H_tr 100 W/K (200 m² of a floor over open air at U 0.5, which sees no sky and absorbs no sun),
H_ve 40 W/K (120 m³/h at sea level), gains 1500 W, C 15.12 MJ/K, so τ = 15.12e6/3600/140 = 30 h and a = 3.
With a = 3 the utilisation factor is (1 + γ + γ²)/(1 + γ + γ² + γ³).

January by hand: 744 h; Q_ht = 140·22·744/1000 = 2291.52; Q_gn = 1.5·744 = 1116; γ = 0.487013;
η = (1 + 0.487013 + 0.237182)/(1.724195 + 0.115511) = 0.937212; Q_H = 2291.52 − 0.937212·1116 = 1245.59 kWh.
The other months were worked out the same way with exact fractions.
"""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

import numpy as np
import pytest

from heatledger.balance.calculate import calculate
from heatledger.building.model import Building

OUTDOOR = np.array([-2.0, 0, 5, 9, 14, 18, 21, 20, 16, 10, 4, -1])
HEATING = [1245.5909, 952.0106, 603.4946, 288.2368, 53.5585, 1.0678, 0, 0, 13.4081, 234.1019, 666.9019, 1149.2324]
COOLING = [39.4477, 42.7022, 77.8724, 118.6992, 233.5056, 396.9927]
COOLING += [624.8341, 544.5985, 298.5502, 138.5720, 67.8105, 43.1331]
# With the cut-offs of EN ISO 52016-1: γ_H of June and September and 1/γ_C of November to February exceed 2.
HEATING_CUT = [value if month not in {5, 8} else 0 for month, value in enumerate(HEATING)]
COOLING_CUT = [value if month not in {0, 1, 10, 11} else 0 for month, value in enumerate(COOLING)]


def zone_values(method: str) -> dict[str, list[dict[str, Any]]]:
    project = {"project": "Hand", "weather": "x", "air_density": "sea level", "method": method}
    usage = {"name": "Use", "heating_set_point": 20.0, "cooling_set_point": 26.0, "appliances": 131.4}
    system = {"name": "Air", "kind": "natural", "rate": 0.5}
    zone: dict[str, Any] = {"name": "Z", "conditioning": "heated and cooled", "usage": "Use", "air_system": "Air"}
    zone |= {"floor_area": 100.0, "air_volume": 240.0, "heat_capacity": 151.2, "leakage": 0.0}
    floor: dict[str, Any] = {
        "name": "F",
        "zone": "Z",
        "kind": "floor",
        "faces": "outdoors",
        "u_value": 0.5,
        "area": 200.0,
    }
    floor |= {"absorptance": 0.0}
    return {
        "Project": [project],
        "Zones": [zone],
        "Usage": [usage],
        "Air systems": [system],
        "Envelope": [floor],
    }


@pytest.mark.parametrize(
    ("method", "heating", "cooling"),
    [("ISO 13790:2008", HEATING, COOLING), ("EN ISO 52016-1:2017", HEATING_CUT, COOLING_CUT)],
)
def test_needs_of_the_hand_calculated_zone(
    building: Callable[[Any], Building], flat_sky: Any, method: str, heating: list[float], cooling: list[float]
) -> None:
    zone = calculate(building(zone_values(method)), flat_sky(OUTDOOR)).zone("Z")
    assert zone.time_constant == pytest.approx(30.0, abs=1e-9)
    assert zone.exponent == pytest.approx(3.0, abs=1e-9)
    assert zone.transmission_coefficient == pytest.approx(100.0, abs=1e-9)
    assert zone.ventilation_coefficient == pytest.approx(40.0, abs=1e-9)
    assert zone.transmission_heating[0] == pytest.approx(100 * 22 * 0.744, abs=0.01)
    assert zone.ventilation_heating[0] == pytest.approx(40 * 22 * 0.744, abs=0.01)
    assert zone.internal_gains[0] == pytest.approx(1116.0, abs=0.01)
    assert zone.gain_utilisation[0] == pytest.approx(0.937212, abs=1e-6)
    assert zone.heating_need == pytest.approx(heating, abs=0.01)
    assert zone.cooling_need == pytest.approx(cooling, abs=0.01)
