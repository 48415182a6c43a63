"""Monthly needs of test cases 600 (light) and 900 (heavy) against the published ranges.

Source: ANSI/ASHRAE 140-2020, base cases; building data recalled from memory, monthly ranges read in the published
result tables (``data/cases_600_900_monthly.csv``), climate of Denver computed from its public TMY3 file.

The ranges come from hourly programs. A monthly method with whole-building utilisation factors cannot meet them month
by month: it knows nothing of the swing within a day, of the inside film the cases prescribe or of sun that leaves
again through the glass. Bands for the year: heating ±30 %, cooling −10 % to +70 % about the mean of the published
results; and the ordering of the cases, of the months and of the seasons.
"""

from __future__ import annotations

import csv
from pathlib import Path
from typing import Any

import numpy as np
import pytest
from numpy.typing import NDArray

import heatledger
from heatledger.results import ZoneResult
from heatledger.workbook.template import build_template

DATA = Path(__file__).parent / "data"


def table(name: str) -> list[dict[str, str]]:
    with (DATA / name).open(encoding="utf-8") as file:
        return list(csv.DictReader(line for line in file if not line.startswith("#")))


def published(case: str, quantity: str, column: str) -> NDArray[np.float64]:
    rows = table("cases_600_900_monthly.csv")
    return np.array([float(row[column]) for row in rows if row["case"] == case and row["quantity"] == quantity])


def denver() -> heatledger.MonthlyClimate:
    rows = table("denver_725650_monthly.csv")
    months = {name: [float(row[name]) for row in rows] for name in rows[0] if name != "month"}
    planes = {(90.0, angle): months[side] for side, angle in SIDES.items()} | {(180.0, 0.0): [0.0] * 12}
    return heatledger.MonthlyClimate(
        "Denver", months["temperature"], months["horizontal"], planes, latitude=39.833, longitude=-104.65, altitude=1650
    )


SIDES = {"south": 180.0, "east": 90.0, "west": 270.0, "north": 0.0}


def values(case: str) -> dict[str, list[dict[str, Any]]]:
    """The case as an assessor would type it."""
    layers = [row for row in table("cases_600_900_layers.csv") if row["case"] == case]
    materials = {f"{row['material']} {row['element']}": row for row in layers}
    walls = {"south": 21.6, "east": 16.2, "west": 16.2, "north": 21.6}
    wall = {"zone": "Room", "kind": "wall", "faces": "outdoors", "build_up": "wall", "absorptance": 0.6}
    level = {"zone": "Room", "faces": "outdoors", "area": 48.0}
    return {
        "Project": [{"project": f"Case {case}", "weather": "given", "altitude": 1650.0}],
        "Zones": [
            {
                "name": "Room",
                "conditioning": "heated and cooled",
                "usage": "Case",
                "air_system": "Air",
                "floor_area": 48.0,
                "air_volume": 129.6,
                "leakage": 0.0,
            }
        ],
        # 200 W of constant gains on 48 m²: 36.5 kWh/(m²·a)
        "Usage": [{"name": "Case", "heating_set_point": 20.0, "cooling_set_point": 27.0, "appliances": 36.5}],
        "Air systems": [{"name": "Air", "kind": "natural", "rate": 0.5}],
        "Materials": [
            {
                "name": name,
                "conductivity": float(row["conductivity"]),
                **{key: float(row[key]) for key in ("density", "specific_heat") if row[key]},
            }
            for name, row in materials.items()
        ],
        "Build-ups": [
            {
                "name": row["element"],
                "layer": int(row["layer"]),
                "material": f"{row['material']} {row['element']}",
                "thickness": 1000 * float(row["thickness"]),
            }
            for row in layers
        ],
        # Double clear pane of the editions from 2020: U 2.10, SHGC 0.769, no frame.
        "Glazed units": [{"name": "Pane", "u_value": 2.10, "g_value": 0.769, "frame_share": 0.0}],
        "Envelope": [
            *({**wall, "name": side, "area": area, "azimuth": SIDES[side]} for side, area in walls.items()),
            {**level, "name": "roof", "kind": "roof", "build_up": "roof", "absorptance": 0.6},
            {**level, "name": "floor", "kind": "floor", "build_up": "floor", "absorptance": 0.0},
        ],
        "Openings": [
            {"name": "windows", "element": "south", "glazed_unit": "Pane", "count": 2, "width": 3.0, "height": 2.0}
        ],
    }


@pytest.fixture(scope="module")
def rooms(tmp_path_factory: pytest.TempPathFactory) -> dict[str, ZoneResult]:
    folder = tmp_path_factory.mktemp("cases")
    found = {}
    for case in ("600", "900"):
        path = folder / f"{case}.xlsx"
        path.write_bytes(build_template(values(case)))
        found[case] = heatledger.assess(path, denver()).zone("Room")
    return found


@pytest.mark.parametrize("case", ["600", "900"])
def test_heating_of_the_year_lies_in_the_band(rooms: dict[str, ZoneResult], case: str) -> None:
    mean = published(case, "heating", "mean").sum()
    assert 0.7 * mean <= rooms[case].heating_need.sum() <= 1.3 * mean


@pytest.mark.parametrize("case", ["600", "900"])
def test_cooling_of_the_year_lies_in_the_band(rooms: dict[str, ZoneResult], case: str) -> None:
    mean = published(case, "cooling", "mean").sum()
    assert 0.9 * mean <= rooms[case].cooling_need.sum() <= 1.7 * mean


def test_the_light_case_needs_more_of_both(rooms: dict[str, ZoneResult]) -> None:
    assert rooms["600"].heating_need.sum() > rooms["900"].heating_need.sum()
    assert rooms["600"].cooling_need.sum() > rooms["900"].cooling_need.sum()
    assert (rooms["600"].heating_need >= rooms["900"].heating_need).all()


@pytest.mark.parametrize("case", ["600", "900"])
@pytest.mark.parametrize("quantity", ["heating", "cooling"])
def test_months_rank_as_published(rooms: dict[str, ZoneResult], case: str, quantity: str) -> None:
    """Rank correlation of the twelve months with the published means."""
    ours = getattr(rooms[case], f"{quantity}_need")
    theirs = published(case, quantity, "mean")
    ranks = [np.argsort(np.argsort(months)) - 5.5 for months in (ours, theirs)]
    assert float(ranks[0] @ ranks[1]) / float(ranks[0] @ ranks[0]) > 0.8


@pytest.mark.parametrize("case", ["600", "900"])
def test_no_heating_where_none_is_published(rooms: dict[str, ZoneResult], case: str) -> None:
    nearly_none = published(case, "heating", "max") < 20
    assert (rooms[case].heating_need[nearly_none] < 20).all()


@pytest.mark.parametrize(("element", "published_u"), [("wall", 0.514), ("roof", 0.318), ("floor", 0.039)])
def test_transmittances_with_the_films_of_the_cases(element: str, published_u: float) -> None:
    """Layers of case 600 with the inside and outside films 8.29 and 29.3 W/(m²·K) that the cases prescribe."""
    layers = [row for row in table("cases_600_900_layers.csv") if (row["case"], row["element"]) == ("600", element)]
    resistance = sum(float(row["thickness"]) / float(row["conductivity"]) for row in layers)
    assert 1 / (1 / 8.29 + 1 / 29.3 + resistance) == pytest.approx(published_u, abs=5e-4)
