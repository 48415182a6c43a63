"""Spaces beside spaces, through the whole engine: closed forms for temperatures, factors b and heat flows."""

from __future__ import annotations

from collections.abc import Callable
from typing import TYPE_CHECKING, Any

import numpy as np
import pytest

from heatledger.balance.calculate import calculate
from heatledger.building.model import Building
from heatledger.errors import InputError
from heatledger.results import Results

if TYPE_CHECKING:
    from tests.conftest import Book

OUTDOOR = np.array([-2.0, 0, 5, 9, 14, 18, 21, 20, 16, 10, 4, -1])
HOURS = np.array([31, 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31]) * 24.0

Run = Callable[..., Results]


@pytest.fixture(scope="module")
def run(building: Callable[[Any], Building], flat_sky: Any) -> Run:
    """Calculate zones from their set-point (None: unconditioned) and elements (name, zone, faces, W/K)."""

    def calculated(
        zones: dict[str, float | None],
        elements: list[tuple[str, str, str, float]],
        *,
        gains: dict[str, float] | None = None,
        bridges: list[dict[str, Any]] | None = None,
    ) -> Results:
        usages: list[dict[str, Any]] = [
            {"name": f"Use {name}", "appliances": watts * 8.76} for name, watts in (gains or {}).items()
        ]
        set_points: dict[str, Any] = {"heating_set_point": 20.0, "cooling_set_point": 26.0}
        rows: list[dict[str, Any]] = [
            {
                **{"name": name, "floor_area": 1.0, "air_volume": 2.5, "leakage": 0.0, "heat_capacity": 200.0},
                **{"conditioning": "unconditioned" if set_point is None else "heated", "heating_set_point": set_point},
                "usage": f"Use {name}" if name in (gains or {}) else "" if set_point is None else "Idle",
            }
            for name, set_point in zones.items()
        ]
        # A level floor over open air sees neither sun nor sky; 1 m² of a U of 1 W/(m²·K) for each W/K.
        walls = [
            {
                **{"name": name, "zone": zone, "faces": faces, "kind": "floor", "area": coefficient},
                **{"u_value": 1.0, "absorptance": 0.0},
            }
            for name, zone, faces, coefficient in elements
        ]
        values = {
            "Project": [{"project": "P", "weather": "x", "method": "ISO 13790:2008"}],
            "Zones": rows,
            "Usage": [usage | set_points for usage in [{"name": "Idle"}, *usages]],
            "Envelope": walls,
            "Thermal bridges": bridges or [],
        }
        return calculate(building(values), flat_sky(OUTDOOR))

    return calculated


ROOM_OVER_THREE = [
    ("Ceiling", "Room", "Loft", 10.0),
    ("Hatch", "Loft", "Stair", 20.0),
    ("Steps", "Stair", "Cellar", 20.0),
    ("Vault", "Cellar", "outdoors", 10.0),
]


def test_a_chain_of_three_unheated_spaces_is_a_row_of_resistances(run: Run) -> None:
    """Room 20 °C – 10 – loft – 20 – stair – 20 – cellar – 10 W/K – outdoors: R = 0.1 + 0.05 + 0.05 + 0.1 = 0.3 K/W.

    Behind a third, a half and two thirds of the drop; the room loses 1/0.3 = 3.3333 W/K.
    """
    results = run({"Room": 20.0, "Loft": None, "Stair": None, "Cellar": None}, ROOM_OVER_THREE)
    for name, factor in (("Loft", 1 / 3), ("Stair", 1 / 2), ("Cellar", 2 / 3)):
        assert results.zone(name).adjustment_factor == pytest.approx(factor, abs=1e-12)
        assert results.zone(name).temperature == pytest.approx(20 - factor * (20 - OUTDOOR), abs=1e-9)
    room = results.zone("Room")
    assert room.transmission_coefficient == pytest.approx(10 / 3, abs=1e-9)
    assert room.transmission_heating == pytest.approx((20 - OUTDOOR) / 0.3 * HOURS / 1000, abs=1e-9)


def test_the_order_of_zones_and_the_side_an_element_is_entered_from_change_nothing(run: Run) -> None:
    turned = [
        (name, faces, zone, coefficient) if faces != "outdoors" else (name, zone, faces, coefficient)
        for name, zone, faces, coefficient in reversed(ROOM_OVER_THREE)
    ]
    results = run({"Cellar": None, "Stair": None, "Loft": None, "Room": 20.0}, turned)
    assert results.zone("Room").transmission_heating == pytest.approx((20 - OUTDOOR) / 0.3 * HOURS / 1000, abs=1e-9)
    assert results.zone("Cellar").adjustment_factor == pytest.approx(2 / 3, abs=1e-12)


PARTED = [
    ("Wall 1", "Warm", "outdoors", 10.0),
    ("Wall 2", "Cool", "outdoors", 10.0),
    ("Partition", "Warm", "Cool", 5.0),
]


def test_heat_between_two_set_points_cancels(run: Run) -> None:
    """5 W/K between 20 and 16 °C: 20 W from the warm to the cool zone, all year, in heating mode."""
    results = run({"Warm": 20.0, "Cool": 16.0}, PARTED)
    warm, cool = results.zone("Warm"), results.zone("Cool")
    assert warm.transmission_heating == pytest.approx((10 * (20 - OUTDOOR) + 20) * HOURS / 1000, abs=1e-9)
    assert cool.transmission_heating == pytest.approx((10 * (16 - OUTDOOR) - 20) * HOURS / 1000, abs=1e-9)
    together = 10 * (20 - OUTDOOR) + 10 * (16 - OUTDOOR)
    assert warm.transmission_heating + cool.transmission_heating == pytest.approx(together * HOURS / 1000, abs=1e-9)
    # neither counts the other as a loss to outdoors; in cooling mode both stand at 26 °C
    assert (warm.transmission_coefficient, cool.transmission_coefficient) == pytest.approx((10.0, 10.0))
    assert warm.transmission_cooling == pytest.approx(cool.transmission_cooling, abs=1e-9)


def test_shares_of_losses_leave_out_what_stays_between_conditioned_zones(run: Run) -> None:
    """By hand: losses in the months with heating are 10 W/K times the degree hours below 20 and 16 °C of each zone."""
    results = run({"Warm": 20.0, "Cool": 16.0}, PARTED)
    leaving = [row for row in results.element_losses if not row.between_zones]
    inside = [row for row in results.element_losses if row.between_zones]
    assert [(row.name, row.zone) for row in leaving] == [("Wall 1", "Warm"), ("Wall 2", "Cool")]
    assert sum(row.share for row in leaving) == pytest.approx(100.0, abs=1e-9)
    assert [(row.name, row.zone, row.share) for row in inside] == [
        ("Partition", "Warm", 0.0),
        ("Partition", "Cool", 0.0),
    ]
    season = results.zone("Warm").heating_need > 0
    assert leaving[0].loss == pytest.approx(float(np.sum(10 * (20 - OUTDOOR) * HOURS / 1000, where=season)))
    assert results.element_losses[:2] == tuple(leaving)


CONSERVATORY = [
    ("Wall", "Room", "outdoors", 10.0),
    ("Glazing", "Room", "Porch", 10.0),
    ("Glass", "Porch", "outdoors", 40.0),
]


def test_people_in_an_unheated_space_warm_its_neighbour(run: Run) -> None:
    """100 W over 50 W/K: the porch is 2 K warmer, so the room loses 10·2 = 20 W less; b stays 40/50."""
    zones = {"Room": 20.0, "Porch": None}
    idle, busy = run(zones, CONSERVATORY), run(zones, CONSERVATORY, gains={"Porch": 100.0})
    assert busy.zone("Porch").temperature - idle.zone("Porch").temperature == pytest.approx(np.full(12, 2.0))
    saved = idle.zone("Room").transmission_heating - busy.zone("Room").transmission_heating
    assert saved == pytest.approx(20 * HOURS / 1000, abs=1e-9)
    assert (busy.zone("Room").heating_need <= idle.zone("Room").heating_need).all()
    assert [found.zone("Porch").adjustment_factor for found in (idle, busy)] == pytest.approx([0.8, 0.8])


def test_sun_on_an_unheated_space_warms_its_neighbour(building: Callable[[Any], Building], flat_sky: Any) -> None:
    """A dark wall of the porch collects α·R_se·U·A = 0.9·0.04·1·40 = 1.44 m² of sun less the sky's loss.

    The sky takes R_se·U·A·h_r·11 K/2 = 0.04·40·4.14·5.5 = 36.43 W from an upright face.
    """
    sun = np.full(12, 100.0)
    zone = {"floor_area": 10.0, "air_volume": 25.0, "leakage": 0.0, "heat_capacity": 200.0}
    wall = {"kind": "wall", "u_value": 1.0, "azimuth": 180.0}
    values = {
        "Project": [{"project": "P", "weather": "x"}],
        "Zones": [
            {**zone, "name": "Room", "conditioning": "heated", "usage": "Use"},
            {**zone, "name": "Porch", "conditioning": "unconditioned"},
        ],
        "Usage": [{"name": "Use", "heating_set_point": 20.0, "cooling_set_point": 26.0}],
        "Envelope": [
            {**wall, "name": "Glazing", "zone": "Room", "faces": "Porch", "area": 10.0},
            {**wall, "name": "Wall", "zone": "Porch", "faces": "outdoors", "area": 40.0, "absorptance": 0.9},
        ],
    }
    results = calculate(building(values), flat_sky(OUTDOOR, sun))
    power = 1.44 * sun * 1000 / HOURS - 0.04 * 40 * 4.14 * 5.5
    assert results.zone("Porch").solar_gains == pytest.approx(power * HOURS / 1000, abs=1e-6)
    temperature = (10 * 20 + 40 * OUTDOOR + power) / 50
    assert results.zone("Porch").temperature == pytest.approx(temperature, abs=1e-9)
    assert results.zone("Room").transmission_heating == pytest.approx(10 * (20 - temperature) * HOURS / 1000, abs=1e-6)


def bridge(zone: str, faces: str) -> dict[str, Any]:
    """ψ·l + χ·n = 0.5·8 + 3·2 = 10 W/K."""
    linear = {"length": 8.0, "linear_transmittance": 0.5, "count": 2, "point_transmittance": 3.0}
    return {"name": "Junction", "zone": zone, "faces": faces, **linear}


@pytest.mark.parametrize("sides", [("Room", "Loft"), ("Loft", "Room")])
def test_a_bridge_to_an_unheated_space_is_a_path_from_both_sides(sides: tuple[str, str], run: Run) -> None:
    """The ceiling's 10 W/K and the bridge's 10 W/K against 20 W/K to outdoors: b = 20/40, like a ceiling of 20 W/K."""
    elements = [("Ceiling", "Room", "Loft", 10.0), ("Roof", "Loft", "outdoors", 20.0)]
    results = run({"Room": 20.0, "Loft": None}, elements, bridges=[bridge(*sides)])
    assert results.zone("Loft").adjustment_factor == pytest.approx(0.5)
    assert results.zone("Loft").temperature == pytest.approx(20 - 0.5 * (20 - OUTDOOR))
    assert results.zone("Room").transmission_coefficient == pytest.approx(10.0)
    (row,) = [row for row in results.element_losses if row.name == "Junction"]
    assert (row.zone, row.faces, row.coefficient, row.between_zones) == ("Room", "Loft", 10.0, False)


def test_a_bridge_between_conditioned_zones_cancels(run: Run) -> None:
    results = run({"Warm": 20.0, "Cool": 16.0}, PARTED[:2], bridges=[bridge("Cool", "Warm")])
    total = results.zone("Warm").transmission_heating + results.zone("Cool").transmission_heating
    assert total == pytest.approx((10 * (20 - OUTDOOR) + 10 * (16 - OUTDOOR)) * HOURS / 1000, abs=1e-9)
    assert results.zone("Warm").transmission_heating == pytest.approx(
        (10 * (20 - OUTDOOR) + 40) * HOURS / 1000, abs=1e-9
    )
    assert [row.between_zones for row in results.element_losses if row.name == "Junction"] == [True, True]


def test_a_bridge_without_faces_leads_outdoors(run: Run) -> None:
    results = run({"Room": 20.0}, [("Wall", "Room", "outdoors", 10.0)], bridges=[bridge("Room", "")])
    assert results.zone("Room").transmission_coefficient == pytest.approx(20.0)


def test_negative_bridges_that_outweigh_an_unheated_space_are_refused(run: Run) -> None:
    """Ceiling 10, roof 20 and a bridge of −30 W/K leave nothing that would set a temperature of the loft."""
    elements = [("Ceiling", "Room", "Loft", 10.0), ("Roof", "Loft", "outdoors", 20.0)]
    negative = {"name": "Corner", "zone": "Loft", "faces": "", "count": 10, "point_transmittance": -3.0}
    with pytest.raises(InputError) as caught:
        run({"Room": 20.0, "Loft": None}, elements, bridges=[negative])
    assert str(caught.value) == (
        "Zones!A6  Zone: found no heat loss from 'Loft'; expected a positive sum of transmission and ventilation."
        " Give it leakage, an air system, or an element or thermal bridge that loses heat, or join it to another zone."
    )


def test_a_bridge_alone_ties_an_unconditioned_zone(cottage: Book) -> None:
    """The loft of the sound workbook without ceiling and roof is refused, with a bridge to the house it is not."""
    alone = cottage.change({"Envelope!7:7": None, "Envelope!D8": "neighbour", "Envelope!H8": None})
    assert len(alone.problems()) == 1
    assert alone.change({"Thermal bridges!G5": "Loft"}).problems() == []
    # one that carries no heat ties nothing
    assert len(alone.change({"Thermal bridges!C5": 0}).problems()) == 1


def test_factors_and_temperatures_of_unconditioned_zones_are_reported(run: Run) -> None:
    written = run({"Room": 20.0, "Loft": None, "Stair": None, "Cellar": None}, ROOM_OVER_THREE).to_json()["zones"]
    assert written["Stair"]["adjustment_factor"] == pytest.approx(0.5)
    assert written["Stair"]["temperature"] == pytest.approx((20 - 0.5 * (20 - OUTDOOR)).tolist())
    assert "adjustment_factor" not in written["Room"]
