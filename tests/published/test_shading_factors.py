"""Tabulated shading factors and shares of movable shading: plausibility only, since their climates differ.

Source: EN 832 and ISO 13790:2008, annex G, and UNI/TS 11300-1:2008, table 15, recalled from memory (`data/`). The
tables do not state their weather, their share of diffuse light or what they do with it. Agreement reached with
Piedmont IT (45° N, October to April):

- horizon, south, with all diffuse light left whole: 0.00, 0.04, 0.07 and 0.05 below the table at 10°, 20°, 30°, 40°;
- the same as the engine takes it, the bright sky about the sun hidden with the sun and the rest by its view factor, the
  obstruction as bright as a fifth of what it hides: 0.03 to 0.24 below;
- overhang, south, as the engine takes it: 0.08 and 0.04 below at 30° and 45°, 0.02 above at 60°;
- movable shading at 300 W/m²: north exact; south within 0.11; east within 0.20; west within 0.33 (November), its
  mean over the year within 0.065.
"""

from __future__ import annotations

import csv
from pathlib import Path

import numpy as np
import pytest
from numpy.typing import NDArray

from heatledger.climate.files import open_climate
from heatledger.climate.hourly import HourlyClimate
from heatledger.climate.model import month_of_hour
from heatledger.climate.obstruction import Obstructions, above_skyline, no_obstructions, sector_of, towards
from heatledger.climate.planes import plane_irradiance
from heatledger.climate.surfaces import Sunlight, Surfaces

DATA = Path(__file__).parent / "data"
SEASON = [9, 10, 11, 0, 1, 2, 3]
SIDES = {"N": 0.0, "E": 90.0, "S": 180.0, "W": 270.0}
Floats = NDArray[np.float64]


def table(name: str) -> list[dict[str, str]]:
    lines = (DATA / name).read_text(encoding="utf-8").splitlines()
    return list(csv.DictReader(line for line in lines if not line.startswith("#")))


def factors(kind: str, side: str) -> dict[float, float]:
    """Printed factors at 45° north by angle."""
    return {
        float(row["angle_deg"]): float(row["factor"])
        for row in table("shading_factors.csv")
        if (row["kind"], row["latitude_N"], row["orientation"]) == (kind, "45", side)
    }


@pytest.fixture(scope="module")
def piedmont() -> HourlyClimate:
    return open_climate("Piedmont IT", Path())


def asked(climate: HourlyClimate, before: Obstructions, azimuth: Floats, threshold: float = np.inf) -> Sunlight:
    count = len(azimuth)
    upright = Surfaces(np.full(count, 90.0), azimuth, before, np.full(count, threshold), np.zeros(count, np.intp))
    return climate.sunlight(upright, 0.2)


def season(found: Sunlight) -> Floats:
    return np.asarray(found.received[:, SEASON].sum(axis=1) / found.free[:, SEASON].sum(axis=1))


def test_horizon_before_a_south_wall_with_the_diffuse_light_left_whole(piedmont: HourlyClimate) -> None:
    printed = factors("horizon", "S")
    lit = np.asarray((piedmont.hours.global_horizontal > 0) & np.isin(month_of_hour(), SEASON))
    sun, light = piedmont.sun.at(lit), tuple(values[lit] for values in piedmont.hours.light)
    parts = plane_irradiance([90.0], [180.0], sun, (light[0], light[1], light[2]), ground_reflectance=0.2)
    direction = towards(sun.zenith, sun.azimuth)
    skyline = np.repeat(np.array(list(printed))[:, None], 8, axis=1)
    beam = (parts.beam * above_skyline(skyline, sector_of(direction), direction[2])).sum(axis=1)
    diffuse = parts.sky.sum() + parts.ground.sum()
    found = (beam + diffuse) / (parts.beam.sum() + diffuse)
    assert found == pytest.approx(list(printed.values()), abs=0.08)


def test_horizon_as_the_engine_takes_it_falls_as_in_the_table(piedmont: HourlyClimate) -> None:
    for side, azimuth in (("S", 180.0), ("E/W", 90.0), ("N", 0.0)):
        printed = factors("horizon", side)
        skyline = np.repeat(np.array(list(printed))[:, None], 8, axis=1)
        count = len(printed)
        before = no_obstructions(count)._replace(skyline=skyline, reflectance=np.full(count, 0.2))
        found = season(asked(piedmont, before, np.full(count, azimuth)))
        below = np.array(list(printed.values())) - found
        assert found[0] == pytest.approx(1.0, abs=1e-12)
        assert (below[1:] > 0.02).all()
        assert (below < 0.32).all()


def test_overhang_above_a_south_wall(piedmont: HourlyClimate) -> None:
    """The angle stands at the middle of the opening, between the wall and the edge of the overhang."""
    printed = factors("overhang", "S")
    depth = 0.5 * np.tan(np.radians(list(printed)))
    before = no_obstructions(len(printed))._replace(overhang_depth=depth, reflectance=np.full(len(printed), 0.2))
    found = season(asked(piedmont, before, np.full(len(printed), 180.0)))
    assert found == pytest.approx(list(printed.values()), abs=0.09)


@pytest.mark.parametrize(("side", "within", "mean"), [("N", 0.005, 0.005), ("S", 0.12, 0.05), ("E", 0.2, 0.08)])
def test_share_of_movable_shading(piedmont: HourlyClimate, side: str, within: float, mean: float) -> None:
    (row,) = [row for row in table("movable_shading_shares.csv") if row["side"] == side]
    printed = [float(row[str(month)]) for month in range(1, 13)]
    found = asked(piedmont, no_obstructions(1), np.array([SIDES[side]]), 300.0)
    shares = found.bright[0] / found.received[0]
    assert shares == pytest.approx(printed, abs=within)
    assert float(shares.mean()) == pytest.approx(float(np.mean(printed)), abs=mean)


def test_share_of_movable_shading_on_the_west(piedmont: HourlyClimate) -> None:
    """The table drops to 0.30 in November and 0.39 in January, which the climate of this test does not show."""
    (row,) = [row for row in table("movable_shading_shares.csv") if row["side"] == "W"]
    printed = np.array([float(row[str(month)]) for month in range(1, 13)])
    found = asked(piedmont, no_obstructions(1), np.array([270.0]), 300.0)
    difference = found.bright[0] / found.received[0] - printed
    assert np.abs(difference[1:10]).max() < 0.07
    assert np.abs(difference).max() < 0.33
    assert abs(float(difference.mean())) < 0.07
