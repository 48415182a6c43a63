"""Sun, sky and people against hand calculation, and planes against a direct pvlib calculation."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

import numpy as np
import pytest

from heatledger.balance.calculate import calculate
from heatledger.building.model import Building
from heatledger.results import Results

SUN = np.full(12, 100.0)
OUTDOOR = np.full(12, 10.0)


def room(building: Callable[[Any], Building], flat_sky: Any, **changes: Any) -> Results:
    wall = {"name": "W", "zone": "Z", "kind": "wall", "faces": "outdoors", "u_value": 0.5, "area": 30.0}
    wall |= {"azimuth": 180.0, "absorptance": 0.6} | changes.pop("wall", {})
    usage = {"name": "U", "heating_set_point": 20.0, "cooling_set_point": 26.0} | changes.pop("usage", {})
    zone = {"name": "Z", "conditioning": "heated", "usage": "U", "floor_area": 50.0, "air_volume": 125.0}
    values = {
        "Project": [{"project": "P", "weather": "x"}],
        "Zones": [zone | {"heat_capacity": 100.0}],
        "Usage": [usage],
        "Glazed units": [{"name": "G", "u_value": 1.5, "g_value": 0.6, "frame_share": 25.0}],
        "Envelope": [wall],
        "Openings": changes.pop("openings", []),
    }
    return calculate(building(values), flat_sky(OUTDOOR, SUN))


def test_an_opaque_wall_gains_by_its_absorptance_and_loses_to_the_sky(
    building: Callable[[Any], Building], flat_sky: Any
) -> None:
    """0.6·0.04·0.5·30 = 0.36 m² collect 36 kWh; the sky takes 0.04·0.5·30·4.14·11·0.5 = 13.662 W, 744 h: 10.1645."""
    gains = room(building, flat_sky).zone("Z").solar_gains
    assert gains[0] == pytest.approx(36 - 0.013662 * 744, abs=1e-9)


@pytest.mark.parametrize(("tilt", "view"), [(0.0, 1.0), (60.0, 0.75), (90.0, 0.5), (180.0, 0.0)])
def test_the_view_of_the_sky_falls_with_tilt(
    building: Callable[[Any], Building], flat_sky: Any, tilt: float, view: float
) -> None:
    """ISO 13790:2008, 11.3.5: form factor 1 for level, 0.5 for upright."""
    gains = room(building, flat_sky, wall={"tilt": tilt, "absorptance": 0.0}).zone("Z").solar_gains
    assert gains[0] == pytest.approx(-0.04 * 0.5 * 30 * 4.14 * 11 * view * 0.744, abs=1e-9)


def test_a_window_lets_in_sun_through_its_glass(building: Callable[[Any], Building], flat_sky: Any) -> None:
    """Two of 1.2 × 1.5 m: 3.6 m²; 0.9·0.6·0.75·3.6 = 1.458 m²; 145.8 kWh."""
    opening = {"name": "O", "element": "W", "glazed_unit": "G", "count": 2, "width": 1.2, "height": 1.5}
    results = room(building, flat_sky, openings=[opening])
    (found,) = results.opening_gains
    assert found.area == pytest.approx(3.6)
    assert found.g_value == pytest.approx(0.54)
    assert found.gains == pytest.approx(np.full(12, 145.8), abs=1e-9)
    wall = 0.6 * 0.04 * 0.5 * 26.4 * 100 - 0.04 * 0.5 * 26.4 * 22.77 * 0.744
    glass = 145.8 - 0.04 * 1.5 * 3.6 * 22.77 * 0.744
    assert results.zone("Z").solar_gains[0] == pytest.approx(wall + glass, abs=1e-9)


def test_people_and_appliances(building: Callable[[Any], Building], flat_sky: Any) -> None:
    """ISO 13790:2008, table G.12, office, recalled: 80 W, 20 m², 6 h/d = 1.0 W/m²; 20 kWh/(m²·a) of which 90 %.

    50 m²: 50 W of people and 18 kWh/m² = 900 kWh/a of appliances.
    """
    usage = {"area_per_person": 20.0, "heat_per_person": 80.0, "presence": 6.0, "appliances": 15.0, "lighting": 5.0}
    gains = room(building, flat_sky, usage=usage | {"share_released": 90.0}).zone("Z").internal_gains
    assert gains.sum() == pytest.approx(50 * 8.76 + 900, abs=1e-9)
    assert gains[1] == pytest.approx((50 * 8.76 + 900) * 28 / 365, abs=1e-9)
