"""What must hold for any building: monotony, signs, scaling, order of rows, sums."""

from __future__ import annotations

import copy
import random
from collections.abc import Callable
from typing import Any, TypeAlias

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from heatledger.balance.calculate import calculate
from heatledger.building.model import Building
from heatledger.results import Results

Values: TypeAlias = dict[str, list[dict[str, Any]]]
Build: TypeAlias = Callable[[Any], Building]

OUTDOOR = np.array([-2.0, 0, 5, 9, 14, 18, 21, 20, 16, 10, 4, -1])
SUN = np.array([40.0, 60, 90, 110, 130, 135, 140, 125, 95, 65, 42, 35])

u_values = st.floats(0.1, 3.0)
areas = st.floats(5.0, 300.0)


@st.composite
def buildings(draw: st.DrawFn) -> Values:
    """Two conditioned zones, one unconditioned, walls, windows, a slab, a partition, a bridge."""
    zones = []
    for name, conditioning in (
        ("A", "heated and cooled"),
        ("B", draw(st.sampled_from(["heated", "heated and cooled"]))),
        ("Loft", "unconditioned"),
    ):
        area = draw(st.floats(20.0, 400.0))
        zone = {"name": name, "conditioning": conditioning, "floor_area": area, "air_volume": 2.6 * area}
        zone |= {"usage": "Use" if name != "Loft" else "", "leakage": draw(st.floats(0.0, 8.0))}
        zone |= {"air_system": draw(st.sampled_from(["", "Windows", "Unit"]))}
        zone |= {"heat_capacity": draw(st.floats(50.0, 500.0))}
        zones.append(zone)
    zones[1]["heating_set_point"] = draw(st.floats(16.0, 22.0))
    walls = []
    for name, zone_name, faces, kind in (
        ("W1", "A", "outdoors", "wall"),
        ("W2", "B", "outdoors", "wall"),
        ("P", "A", "B", "partition"),
        ("C", "A", "Loft", "partition"),
        ("R", "Loft", "outdoors", "roof"),
    ):
        wall = {"name": name, "zone": zone_name, "kind": kind, "faces": faces, "u_value": draw(u_values)}
        wall |= {"area": draw(areas) + 20, "azimuth": 180.0, "absorptance": draw(st.floats(0.0, 0.9))}
        walls.append(wall)
    opening = {"name": "O", "element": "W1", "glazed_unit": "G", "width": 2.0, "height": draw(st.floats(0.5, 10.0))}
    floor = {"name": "S", "zone": "B", "type": "slab on ground", "area": draw(areas), "perimeter": 40.0, "u_value": 0.5}
    return {
        "Project": [{"project": "P", "weather": "x", "method": draw(st.sampled_from(METHODS))}],
        "Zones": zones,
        "Usage": [{"name": "Use", "heating_set_point": 20.0, "cooling_set_point": 26.0, "appliances": 30.0}],
        "Air systems": [
            {"name": "Windows", "kind": "natural", "rate": 0.5},
            {"name": "Unit", "kind": "balanced", "rate": 0.4, "heat_recovery": draw(st.floats(0.0, 90.0))},
        ],
        "Glazed units": [{"name": "G", "u_value": 1.3, "g_value": 0.6}],
        "Envelope": walls,
        "Openings": [opening],
        "Ground floors": [floor],
        "Thermal bridges": [{"name": "T", "zone": "A", "length": 20.0, "linear_transmittance": 0.1}],
    }


METHODS = ["EN ISO 52016-1:2017", "ISO 13790:2008"]


def needs(results: Results) -> dict[str, tuple[list[float], list[float]]]:
    return {zone.name: (zone.heating_need.tolist(), zone.cooling_need.tolist()) for zone in results.zones}


@given(values=buildings())
@settings(max_examples=40, deadline=None)
def test_needs_are_never_negative_and_add_up_to_the_building(values: Values, building: Build, flat_sky: Any) -> None:
    results = calculate(building(values), flat_sky(OUTDOOR, SUN))
    for zone in results.zones:
        assert (zone.heating_need >= 0).all()
        assert (zone.cooling_need >= 0).all()
    heating = sum(zone.heating_need for zone in results.zones)
    cooling = sum(zone.cooling_need for zone in results.zones)
    assert results.building.heating_need == pytest.approx(heating, rel=1e-12, abs=1e-9)
    assert results.building.cooling_need == pytest.approx(cooling, rel=1e-12, abs=1e-9)


@given(values=buildings(), better=st.floats(0.1, 0.99), wall=st.sampled_from(["W1", "W2", "C", "R"]))
@settings(max_examples=40, deadline=None)
def test_more_insulation_never_raises_heating_need(
    values: Values, better: float, wall: str, building: Build, flat_sky: Any
) -> None:
    """For faces that lose heat on balance: without sun on them, since a sunlit dark face may gain more than it loses.

    The method of ISO 13790 without cut-offs, since a cut-off may switch a month off in either direction.
    """
    for row in values["Envelope"]:
        row["absorptance"] = 0.0
    values["Project"][0]["method"] = "ISO 13790:2008"
    before = calculate(building(values), flat_sky(OUTDOOR, SUN)).building.heating_need
    insulated = copy.deepcopy(values)
    row = next(row for row in insulated["Envelope"] if row["name"] == wall)
    row["u_value"] *= better
    after = calculate(building(insulated), flat_sky(OUTDOOR, SUN)).building.heating_need
    assert after.sum() <= before.sum() * (1 + 1e-9) + 1e-9


@given(values=buildings())
@settings(max_examples=40, deadline=None)
def test_doubling_the_building_doubles_the_need(values: Values, building: Build, flat_sky: Any) -> None:
    single = needs(calculate(building(values), flat_sky(OUTDOOR, SUN)))
    double = copy.deepcopy(values)
    extensive = {
        "Zones": ("floor_area", "air_volume"),
        "Envelope": ("area",),
        "Openings": ("width",),
        "Ground floors": ("area", "perimeter"),
        "Thermal bridges": ("length",),
    }
    for sheet, fields in extensive.items():
        for row in double[sheet]:
            for field in fields:
                row[field] *= 2
    for name, (heating, cooling) in needs(calculate(building(double), flat_sky(OUTDOOR, SUN))).items():
        assert heating == pytest.approx([2 * value for value in single[name][0]], rel=1e-9, abs=1e-6)
        assert cooling == pytest.approx([2 * value for value in single[name][1]], rel=1e-9, abs=1e-6)


@given(values=buildings(), seed=st.integers(0, 1000))
@settings(max_examples=40, deadline=None)
def test_the_order_of_rows_never_changes_a_result(values: Values, seed: int, building: Build, flat_sky: Any) -> None:
    shuffled = copy.deepcopy(values)
    for rows in shuffled.values():
        random.Random(seed).shuffle(rows)
    before = needs(calculate(building(values), flat_sky(OUTDOOR, SUN)))
    after = needs(calculate(building(shuffled), flat_sky(OUTDOOR, SUN)))
    for name, (heating, cooling) in before.items():
        assert after[name][0] == pytest.approx(heating, rel=1e-9, abs=1e-6)
        assert after[name][1] == pytest.approx(cooling, rel=1e-9, abs=1e-6)
