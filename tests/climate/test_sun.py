"""The sun's path and the proof that hours are read at the right instant."""

from __future__ import annotations

import numpy as np
import pytest

from heatledger.climate.closure import SHIFTS, closure_error, closure_errors, closure_note
from heatledger.climate.hourly import HourlyClimate
from heatledger.climate.sun import Site, cos_zenith, sun_path

PLACES = [Site(39.73, -105.18, 1876, -7), Site(55.3, -160.5, 7, -9), Site(-33.9, 151.2, 20, 10), Site(0, 0, 0, 0)]


@pytest.mark.parametrize("site", PLACES)
@pytest.mark.parametrize("shift", [-1.0, 0.5, 1.0])
def test_turning_the_hour_angle_gives_the_sun_of_another_instant(site: Site, shift: float) -> None:
    turned = cos_zenith(sun_path(site), site.latitude, shift)
    later = np.cos(np.radians(sun_path(site, 0.5 + shift).zenith))
    both_up = (later > 0.17) & (np.cos(np.radians(sun_path(site).zenith)) > 0.17)
    # Declination moves 0.017° in an hour at most and refraction 0.05° at 10° of height: 0.001 in the cosine.
    assert np.abs(turned - later)[both_up].max() < 0.001


@pytest.mark.parametrize("site", PLACES)
def test_the_sun_is_highest_at_solar_noon(site: Site) -> None:
    zenith = sun_path(site).zenith.reshape(365, 24)
    noon = 12.0 - (site.longitude / 15.0 - site.time_zone)
    # The equation of time moves solar noon by at most 17 minutes, and the middle of the hour lies within 30.
    assert np.abs(zenith.argmin(axis=1) + 0.5 - noon).max() <= 0.5 + 17 / 60


def test_light_that_adds_up_has_no_error() -> None:
    cos_z, direct = np.array([0.5, 0.9, 0.1]), np.array([400.0, 800.0, 900.0])
    diffuse = np.array([50.0, 60.0, 70.0])
    assert closure_error((direct * cos_z + diffuse, direct, diffuse), cos_z) == 0


def test_the_error_is_that_of_the_light_and_leaves_the_low_sun_out() -> None:
    cos_z = np.array([0.5, 0.5, 0.1])
    light = (np.array([300.0, 100.0, 900.0]), np.array([400.0, 200.0, 0.0]), np.array([70.0, 10.0, 0.0]))
    # |300 - 200 - 70| + |100 - 100 - 10| = 40 of 400.
    assert closure_error(light, cos_z) == pytest.approx(0.1, abs=1e-12)


def test_light_of_another_instant_is_found(golden: HourlyClimate) -> None:
    sun = golden.sun
    up = np.maximum(cos_zenith(sun, golden.latitude, 0.5), 0.0)
    day = np.sign(up)
    light = (600.0 * up + 100.0 * day, 600.0 * day, 100.0 * day)
    errors = closure_errors(light, sun, golden.latitude)
    assert tuple(errors) == SHIFTS
    assert min(errors, key=lambda shift: errors[shift]) == 0.5


@pytest.mark.parametrize(
    ("errors", "note"),
    [
        ({-1.0: 0.0, -0.5: 0.0, 0.0: 0.02, 0.5: 0.1, 1.0: 0.1}, None),
        (
            {-1.0: 0.1, -0.5: 0.01, 0.0: 0.06, 0.5: 0.1, 1.0: 0.1},
            "The hours of the weather file seem to be read at the wrong instant: global irradiance differs from its "
            "direct and diffuse parts by 6.0 % as read, but by 1.0 % with the sun 30 minutes earlier. Check time zone, "
            "longitude and hour convention of the file.",
        ),
        (
            {-1.0: 0.1, -0.5: 0.04, 0.0: 0.06, 0.5: 0.1, 1.0: 0.1},
            "In the weather file global irradiance differs from its direct and diffuse parts by 6.0 % over the year, "
            "and no shift of the hours brings them together. Check its solar data.",
        ),
    ],
)
def test_the_note_of_the_closure(errors: dict[float, float], note: str | None) -> None:
    assert closure_note(errors) == note
