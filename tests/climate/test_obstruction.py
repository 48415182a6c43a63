"""Shadows and views by plane geometry, each in closed form."""

from __future__ import annotations

import numpy as np
import pytest

from heatledger.climate.obstruction import (
    Obstructions,
    above_skyline,
    lit_share,
    no_obstructions,
    plane_axes,
    sector_of,
    towards,
    views,
)

WIDTH, HEIGHT = 1.2, 1.5


def before(**parts: float | list[float]) -> Obstructions:
    """One opening of 1.2 m by 1.5 m with some parts before it."""
    fields = {"width": WIDTH, "height": HEIGHT} | parts
    return no_obstructions(1)._replace(**{name: np.atleast_1d(np.array(part)) for name, part in fields.items()})


def around(**parts: float) -> Obstructions:
    """One opening with the same skyline all around."""
    return before(**parts)._replace(skyline=np.full((1, 8), parts["skyline"]))


def lit(obstruction: Obstructions, azimuth: float, height: float, tilt: float = 90.0) -> float:
    """Lit share of an opening that faces south, with the sun at an azimuth and a height."""
    across, along, out = plane_axes(tilt, 180.0) @ towards([90.0 - height], [azimuth])
    return float(lit_share(obstruction, across / out, along / out)[0, 0])


@pytest.mark.parametrize(
    ("azimuth", "height", "shaded"),
    [
        (180.0, 60.0, 0.5 * np.sqrt(3) - 0.2),  # 0.5·tan 60° below the overhang, of which 0.2 m on the wall
        (210.0, 45.0, 0.5 / np.cos(np.radians(30)) - 0.2),  # profile angle: tan 45°/cos 30°
        (180.0, 15.0, 0.0),  # 0.13 m, all of it on the wall above the opening
        (180.0, 80.0, HEIGHT),  # 2.6 m, more than the opening is high
    ],
)
def test_the_shadow_of_an_overhang(azimuth: float, height: float, shaded: float) -> None:
    overhang = before(overhang_depth=0.5, overhang_distance=0.2)
    assert lit(overhang, azimuth, height) == pytest.approx(1 - shaded / HEIGHT, abs=1e-12)


@pytest.mark.parametrize(("azimuth", "shaded"), [(210.0, np.tan(np.radians(30)) - 0.1), (150.0, 0.0), (183.0, 0.0)])
def test_a_fin_shades_from_its_own_side_at_any_height_of_the_sun(azimuth: float, shaded: float) -> None:
    """Seen from outside a south wall, the west is on the left."""
    fin = before(left_fin_depth=1.0, left_fin_distance=0.1)
    for height in (5.0, 30.0, 70.0):
        assert lit(fin, azimuth, height) == pytest.approx(1 - shaded / WIDTH, abs=1e-12)
    mirrored = before(right_fin_depth=1.0, right_fin_distance=0.1)
    assert lit(mirrored, 360.0 - azimuth, 30.0) == pytest.approx(1 - shaded / WIDTH, abs=1e-12)


def test_shadows_of_overhang_and_fin_leave_a_rectangle() -> None:
    both = before(overhang_depth=0.5, left_fin_depth=0.4)
    high = 1 - 0.5 * np.tan(np.radians(40)) / np.cos(np.radians(50)) / HEIGHT
    assert lit(both, 230.0, 40.0) == pytest.approx(high * (1 - 0.4 * np.tan(np.radians(50)) / WIDTH), abs=1e-12)


def test_a_reveal_shades_from_all_four_sides() -> None:
    reveal = before(reveal_depth=0.2)
    jamb = 1 - 0.2 * np.tan(np.radians(45)) / WIDTH
    head = 1 - 0.2 * np.tan(np.radians(30)) / np.cos(np.radians(45)) / HEIGHT
    assert lit(reveal, 135.0, 30.0) == pytest.approx(jamb * head, abs=1e-12)
    assert lit(reveal, 225.0, 30.0) == pytest.approx(jamb * head, abs=1e-12)
    # A rooflight of 30° before a sun 20° high: 40° from its normal, below it, so that the sill shades.
    assert lit(reveal, 180.0, 20.0, tilt=30.0) == pytest.approx(1 - 0.2 * np.tan(np.radians(40)) / HEIGHT, abs=1e-12)


def test_an_overhang_starts_at_the_face_of_the_wall() -> None:
    """Behind a reveal of 0.2 m an overhang of 0.5 m reaches 0.7 m before the glass."""
    shaded = 0.7 * np.tan(np.radians(45)) - 0.3
    found = lit(before(overhang_depth=0.5, overhang_distance=0.3, reveal_depth=0.2), 180.0, 45.0)
    assert found == pytest.approx(1 - shaded / HEIGHT, abs=1e-12)


@pytest.mark.parametrize(
    ("azimuth", "height", "above"),
    [(157.4, 29.9, True), (157.6, 29.9, False), (202.4, 30.1, True), (202.4, 29.9, False), (350.0, 1.0, True)],
)
def test_a_skyline_hides_the_sun_in_its_sector(azimuth: float, height: float, above: bool) -> None:
    skyline = np.array([[0.0, 0.0, 0.0, 10.0, 30.0, 10.0, 0.0, 0.0]])
    direction = towards([90.0 - height], [azimuth])
    assert above_skyline(skyline, sector_of(direction), direction[2])[0, 0] == above


def test_an_open_sector_hides_not_even_a_sun_below_the_horizon() -> None:
    direction = towards([90.3], [90.0])
    assert above_skyline(np.zeros((1, 8)), sector_of(direction), direction[2])[0, 0]


def view(obstruction: Obstructions, tilt: float = 90.0) -> tuple[float, float]:
    sky, ground = views(obstruction, np.array([tilt]), np.array([180.0]))
    return float(sky[0]), float(ground[0])


def test_nothing_before_an_opening_hides_nothing() -> None:
    for tilt in (0.0, 40.0, 90.0, 180.0):
        assert view(before(), tilt) == (1.0, 1.0)


@pytest.mark.parametrize("depth", [0.3, 1.0, 3.0])
def test_the_view_past_an_overhang(depth: float) -> None:
    """Crossed strings: an endless strip H sees one of depth D at its edge by (H + D − √(H² + D²))/(2H), all sky."""
    hidden = (HEIGHT + depth - np.hypot(HEIGHT, depth)) / (2 * HEIGHT)
    assert view(before(overhang_depth=depth)) == pytest.approx((1 - hidden / 0.5, 1.0), abs=0.0015)


@pytest.mark.parametrize("depth", [0.3, 1.0, 3.0])
def test_the_view_between_two_fins(depth: float) -> None:
    """Crossed strings as above, twice, half of it sky and half of it ground."""
    left = 1 - (WIDTH + depth - np.hypot(WIDTH, depth)) / WIDTH
    assert view(before(left_fin_depth=depth, right_fin_depth=depth)) == pytest.approx((left, left), abs=0.0015)


@pytest.mark.parametrize("depth", [0.1, 0.5, 2.0])
def test_the_view_out_of_a_reveal(depth: float) -> None:
    """View factor of equal, parallel, opposite rectangles (J. R. Howell, catalogue of configuration factors, C-11)."""
    x, y = WIDTH / depth, HEIGHT / depth
    a, b = np.sqrt(1 + x**2), np.sqrt(1 + y**2)
    factor = (2 / (np.pi * x * y)) * (
        np.log(np.sqrt((1 + x**2) * (1 + y**2) / (1 + x**2 + y**2)))
        + x * b * np.arctan(x / b)
        + y * a * np.arctan(y / a)
        - x * np.arctan(x)
        - y * np.arctan(y)
    )
    assert view(before(reveal_depth=depth)) == pytest.approx((factor, factor), abs=0.0015)


@pytest.mark.parametrize("height", [10.0, 30.0, 60.0])
def test_the_view_above_a_skyline_all_around(height: float) -> None:
    """Of a level plane cos²h; of an upright one 1 − (2/π)(h + sin h cos h), by integrating the cosine over the sky."""
    h = np.radians(height)
    obstruction = around(skyline=height)
    assert view(obstruction, 0.0)[0] == pytest.approx(np.cos(h) ** 2, abs=0.007)
    assert view(obstruction, 90.0) == pytest.approx((1 - (h + np.sin(h) * np.cos(h)) * 2 / np.pi, 1.0), abs=0.007)


def test_a_wall_up_to_the_zenith_hides_all_of_the_sky() -> None:
    assert view(around(skyline=90.0)) == (0.0, 1.0)
