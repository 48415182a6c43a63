"""Sun behind obstructions: against planes without them, at its limits, mirrored, and never more than without."""

from __future__ import annotations

from pathlib import Path
from typing import Any

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from numpy.typing import NDArray

from heatledger.climate.files import open_climate
from heatledger.climate.glass import angular_transmission, hemispherical_transmission
from heatledger.climate.hourly import HourlyClimate, Hours
from heatledger.climate.model import month_of_hour
from heatledger.climate.monthly import MonthlyClimate
from heatledger.climate.obstruction import SECTORS, Obstructions, no_obstructions
from heatledger.climate.planes import plane_irradiance
from heatledger.climate.sun import SunPath
from heatledger.climate.sunlight import sunlight
from heatledger.climate.surfaces import Sunlight, Surfaces
from heatledger.errors import InputError

PLANES: list[tuple[float, float]] = [
    (0, 0),
    (90, 180),
    (90, 0),
    (90, 90),
    (90, 300),
    (45, 180),
    (30, 217),
    (135, 10),
    (180, 0),
]
LENGTHS = ("overhang", "left_fin", "right_fin")
Floats = NDArray[np.float64]


def angles(planes: list[tuple[float, float]]) -> tuple[Floats, Floats]:
    """Tilt and azimuth."""
    tilt, azimuth = np.array(planes, dtype=float).T
    return tilt, azimuth


def surfaces(planes: list[tuple[float, float]], before: Obstructions, threshold: float = np.inf) -> Surfaces:
    tilt, azimuth = angles(planes)
    count = len(planes)
    return Surfaces(tilt, azimuth, before, np.full(count, threshold), np.zeros(count, dtype=np.intp))


def alike(count: int, **parts: Any) -> Obstructions:
    """The same parts before some openings of 1 m by 1 m."""
    made = {name: np.repeat(np.atleast_1d(np.array(part, dtype=float)), count) for name, part in parts.items()}
    if "skyline" in parts:
        made["skyline"] = np.tile(np.broadcast_to(np.array(parts["skyline"], dtype=float), 8), (count, 1))
    return no_obstructions(count)._replace(**made)


@pytest.mark.parametrize("name", ["Golden CO", "Piedmont IT", "Sand Point AK"])
def test_without_obstruction_it_is_the_irradiation_of_the_plane(name: str) -> None:
    climate = open_climate(name, Path())
    found = climate.sunlight(surfaces(PLANES, no_obstructions(len(PLANES))), 0.25)
    tilt, azimuth = angles(PLANES)
    expected = climate.irradiation(tilt, azimuth, 0.25)
    assert found.free == pytest.approx(expected, rel=1e-9, abs=1e-9)
    assert found.received == pytest.approx(expected, rel=1e-9, abs=1e-9)
    assert found.passed == pytest.approx(expected, rel=1e-9, abs=1e-9)
    assert not found.bright.any()


def test_many_surfaces_of_many_planes_get_what_each_gets_alone(golden: HourlyClimate) -> None:
    draw = np.random.default_rng(3)
    count = 45
    parts = {name: draw.uniform(0.0, 1.0, count) for name in Obstructions._fields}
    parts |= {"width": draw.uniform(0.5, 2.0, count), "skyline": draw.uniform(0.0, 50.0, (count, 8))}
    before = Obstructions(**parts)
    planes: list[tuple[float, float]] = [(90.0, 40.0 * (number % 9)) for number in range(count)]
    together = golden.sunlight(surfaces(planes, before, 250.0), 0.2)
    for number in (0, 17, 44):
        one = golden.sunlight(surfaces([planes[number]], before.at(slice(number, number + 1)), 250.0), 0.2)
        for field, single in zip(together, one, strict=True):
            assert field[number] == pytest.approx(single[0], rel=1e-12)


def test_behind_a_full_wall_only_reflected_light_is_left(golden: HourlyClimate) -> None:
    """The ground before the window as ever, and the wall as bright as its share of the sky that it hides."""
    planes: list[tuple[float, float]] = [(90, 180)] * 3
    wall = alike(3, skyline=90.0)._replace(reflectance=np.array([0.0, 0.5, 1.0]))
    black, grey, white = golden.sunlight(surfaces(planes, wall), 0.2).received
    # But for the few hours at sunrise and sunset in which the file has light without sun.
    assert black == pytest.approx(0.5 * 0.2 * golden.horizontal_irradiation, rel=1e-3)
    assert grey == pytest.approx((black + white) / 2, rel=1e-12)
    assert (white > 1.5 * black).all()


def test_an_endless_overhang_leaves_the_ground_only(golden: HourlyClimate) -> None:
    roof = alike(1, overhang_depth=1e6, reflectance=0.0)
    (found,) = golden.sunlight(surfaces([(90, 180)], roof), 0.2).received
    # But for a few hours in which the file has beam and the sun of the middle of the hour stands below the horizon.
    assert found == pytest.approx(0.5 * 0.2 * golden.horizontal_irradiation, rel=3e-3)


def symmetric_day() -> tuple[SunPath, tuple[Floats, Floats, Floats]]:
    """A clear day at 45° north, 10° of declination, in steps of a quarter of an hour about noon."""
    phi, delta, omega = np.radians(45.0), np.radians(10.0), np.radians((np.arange(96) + 0.5) * 3.75 - 180.0)
    up = np.sin(phi) * np.sin(delta) + np.cos(phi) * np.cos(delta) * np.cos(omega)
    north = np.cos(phi) * np.sin(delta) - np.sin(phi) * np.cos(delta) * np.cos(omega)
    east = -np.cos(delta) * np.sin(omega)
    day = up > 0.02
    up, azimuth = up[day], np.degrees(np.arctan2(east, north))[day] % 360.0
    sun = SunPath(np.degrees(np.arccos(up)), azimuth, np.full(up.shape, 1367.0), 1 / up)
    return sun, (600 * up + 80, np.full(up.shape, 600.0), np.full(up.shape, 80.0))


def test_symmetric_fins_give_east_and_west_the_same_on_a_symmetric_day() -> None:
    sun, light = symmetric_day()
    fins = alike(2, left_fin_depth=0.7, right_fin_depth=0.7, reflectance=0.2)
    asked = surfaces([(90, 90), (90, 270)], fins)
    east, west = sunlight(asked, sun, light, ground_reflectance=0.2, weights=np.ones((len(sun.zenith), 1))).received
    assert east == pytest.approx(west, rel=1e-9)
    one = alike(2, left_fin_depth=0.7, reflectance=0.2)
    east, west = sunlight(
        surfaces([(90, 90), (90, 270)], one), sun, light, ground_reflectance=0.2, weights=np.ones((len(sun.zenith), 1))
    ).received
    # Left of an east window is the south, where the sun is: the single fin tells the two apart.
    assert east[0] < 0.9 * west[0]


def test_the_light_about_the_sun_goes_with_the_beam(golden: HourlyClimate) -> None:
    """Behind a skyline of 30° a north window, which never sees the sun at noon, loses by its view of the sky alone."""
    noon = [(90.0, 0.0)]
    found = golden.sunlight(surfaces(noon, alike(1, skyline=30.0, reflectance=0.0)), 0.0)
    h = np.radians(30.0)
    left = 1 - (h + np.sin(h) * np.cos(h)) * 2 / np.pi
    winter = [0, 1, 10, 11]
    assert found.received[0, winter] / found.free[0, winter] == pytest.approx(np.full(4, left), abs=0.005)


def test_bright_hours_are_those_above_the_threshold(golden: HourlyClimate) -> None:
    """Against every hour's own sum; behind an obstruction the hours are those that it leaves bright."""
    planes: list[tuple[float, float]] = [(90, 180), (90, 90), (30, 180)]
    sun, light = golden.sun, golden.hours.light
    tilt, azimuth = angles(planes)
    hourly = np.sum(plane_irradiance(tilt, azimuth, sun, light, ground_reflectance=0.2), axis=0)
    months = np.eye(12)[month_of_hour()] / 1000.0
    found = golden.sunlight(surfaces(planes, no_obstructions(3), 300.0), 0.2)
    assert found.bright == pytest.approx(np.where(hourly > 300.0, hourly, 0.0) @ months, rel=1e-9)
    overhang = golden.sunlight(surfaces(planes, alike(3, overhang_depth=0.6), 300.0), 0.2)
    assert (overhang.bright < found.bright).all()
    everything = golden.sunlight(surfaces(planes, alike(3, overhang_depth=0.6), 0.0), 0.2)
    assert everything.bright == pytest.approx(everything.received, rel=1e-9)


def test_glass_by_hour_weighs_every_angle(golden: HourlyClimate) -> None:
    """Beam and the light about the sun at their angle, all else by the mean: between the two of a clear June day."""
    asked = surfaces([(90, 180)] * 3, no_obstructions(3))._replace(panes=np.array([0, 2, 3]))
    free, _, passed, _ = golden.sunlight(asked, 0.2)
    assert passed[0] == pytest.approx(free[0])
    share = passed / free
    # In December the sun stands low before a south window, in June it glides along it.
    assert share[1, 11] > 0.93
    assert share[1, 5] < hemispherical_transmission(2)
    assert (share[2] < share[1]).all()
    lowest = float(angular_transmission(np.cos(np.radians(80.0)), 2))
    assert (share[1] > lowest).all()


lengths = st.floats(0.0, 2.0)


@st.composite
def obstructions(draw: st.DrawFn) -> dict[str, Any]:
    parts: dict[str, Any] = {f"{part}_depth": draw(lengths) for part in LENGTHS}
    parts |= {f"{part}_distance": draw(st.floats(0.0, 0.5)) for part in LENGTHS}
    parts |= {"reveal_depth": draw(st.floats(0.0, 0.5)), "width": draw(st.floats(0.3, 3.0))}
    parts |= {"height": draw(st.floats(0.3, 3.0)), "reflectance": draw(st.floats(0.0, 1.0))}
    parts["skyline"] = draw(st.lists(st.floats(0.0, 90.0), min_size=8, max_size=8))
    return parts


@given(parts=obstructions(), tilt=st.floats(0.0, 180.0), azimuth=st.floats(0.0, 360.0))
@settings(max_examples=60, deadline=None)
def test_an_obstruction_never_raises_what_a_surface_receives(
    golden: HourlyClimate, parts: dict[str, Any], tilt: float, azimuth: float
) -> None:
    found = golden.sunlight(surfaces([(tilt, azimuth)], alike(1, **parts), 200.0), 0.2)
    assert (found.received <= found.free * (1 + 1e-12)).all()
    assert (found.received >= -1e-12).all()
    assert (found.bright <= found.received * (1 + 1e-12)).all()


@given(parts=obstructions(), part=st.sampled_from(LENGTHS), more=st.floats(0.1, 1.0), azimuth=st.floats(0.0, 360.0))
@settings(max_examples=40, deadline=None)
def test_a_deeper_part_never_lets_more_through(
    golden: HourlyClimate, parts: dict[str, Any], part: str, more: float, azimuth: float
) -> None:
    deeper = parts | {f"{part}_depth": parts[f"{part}_depth"] + more}
    both = [golden.sunlight(surfaces([(90.0, azimuth)], alike(1, **each)), 0.2).received for each in (parts, deeper)]
    assert (both[1] <= both[0] * (1 + 1e-12)).all()


def mirrored(climate: HourlyClimate) -> HourlyClimate:
    """The same weather on the other side of the equator, half a year later."""
    site = climate.site
    turned = {name: np.roll(getattr(climate.hours, name), HALF_A_YEAR) for name in FIELDS}
    return HourlyClimate("mirrored", "", site._replace(latitude=-site.latitude), Hours(**turned), climate.sun_offset)


FIELDS = ("temperature", "global_horizontal", "direct_normal", "diffuse_horizontal")


HALF_A_YEAR = 182 * 24
"""Whole days, so that the hours of the day stay. [h]"""
FOUR_WEEKS = np.eye(13)[np.minimum(np.arange(8760) // (24 * 28), 12)] / 1000.0
"""Thirteenths of the year: calendar months half a year apart do not hold the same days."""


@pytest.mark.parametrize("name", ["Golden CO", "Piedmont IT", "Miami FL"])
def test_a_mirrored_site_swaps_north_and_south(name: str) -> None:
    """Four weeks and the same ones half a year later, within the 7 % that the eccentricity of the orbit allows.

    Beam and diffuse light are the same; the sun's declination, the equation of time and the light outside the
    atmosphere differ.
    """
    climate = open_climate(name, Path())
    other = mirrored(climate)
    here = surfaces([(90, 180), (90, 0), (90, 90), (45, 225)], no_obstructions(4))
    there = surfaces([(90, 0), (90, 180), (90, 90), (45, 315)], no_obstructions(4))
    ours = _sums(climate, here, FOUR_WEEKS).free
    theirs = _sums(other, there, np.roll(FOUR_WEEKS, HALF_A_YEAR, axis=0)).free
    assert theirs == pytest.approx(ours, rel=0.07)


@pytest.mark.parametrize("name", ["Golden CO", "Piedmont IT"])
def test_a_mirrored_site_swaps_obstructions_too(name: str) -> None:
    """North for south in the skyline, the left fin for the right one; over the year."""
    climate = open_climate(name, Path())
    skyline = np.array([0.0, 0.0, 20.0, 10.0, 25.0, 5.0, 0.0, 0.0])
    north_for_south = [SECTORS.index(sector) for sector in ("S", "SE", "E", "NE", "N", "NW", "W", "SW")]
    parts = {"overhang_depth": 0.5, "reflectance": 0.2}
    here = alike(2, skyline=skyline, left_fin_depth=0.4, **parts)
    there = alike(2, skyline=skyline[north_for_south], right_fin_depth=0.4, **parts)
    ours = climate.sunlight(surfaces([(90, 180), (45, 225)], here), 0.2)
    theirs = mirrored(climate).sunlight(surfaces([(90, 0), (45, 315)], there), 0.2)
    assert theirs.received.sum(axis=1) == pytest.approx(ours.received.sum(axis=1), rel=0.07)
    # Obstructions that matter, so that a wrong side would tell.
    assert (ours.received.sum(axis=1) < 0.75 * ours.free.sum(axis=1)).all()


def _sums(climate: HourlyClimate, asked: Surfaces, weights: Floats) -> Sunlight:
    return sunlight(asked, climate.sun, climate.hours.light, ground_reflectance=0.2, weights=weights)


def test_a_table_of_months_cannot_follow_the_sun() -> None:
    climate = MonthlyClimate("Hill", [0.0] * 12, [50.0] * 12, {})
    with pytest.raises(InputError) as caught:
        climate.sunlight(surfaces([(90, 180)], no_obstructions(1)), 0.2)
    assert str(caught.value) == (
        "Hill: found a table of months; expected a climate of hours, since obstructions, shading by irradiance and "
        "glass by hour follow the sun. Give hourly weather, or leave these out."
    )


def test_sunlight_of_nothing_is_nothing(golden: HourlyClimate) -> None:
    none = Surfaces(np.zeros(0), np.zeros(0), no_obstructions(0), np.zeros(0), np.zeros(0, dtype=np.intp))
    found: Sunlight = golden.sunlight(none, 0.2)
    assert [field.shape for field in found] == [(0, 12)] * 4
