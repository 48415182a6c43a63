"""Sun on planes, hour by hour through frames, as a slow and plain second way."""

from __future__ import annotations

from datetime import timedelta, timezone
from pathlib import Path

import numpy as np
import pandas as pd
import pytest
from pvlib import irradiance, solarposition

from heatledger.climate.files import open_climate
from heatledger.climate.hourly import HourlyClimate
from heatledger.climate.planes import plane_irradiance
from heatledger.climate.shipped import shipped_file

PLANES = [(0, 0), (90, 180), (90, 0), (90, 90), (90, 300), (45, 180), (30, 217), (135, 180), (180, 0)]


def monthly_by_frames(name: str, sun_offset: float, planes: list[tuple[int, int]], reflectance: float) -> pd.DataFrame:
    """Months x planes in kWh/m², straight from the shipped file with one pvlib frame for each plane."""
    path = shipped_file(name)
    assert path is not None
    text = path.read_text(encoding="utf-8")
    head = dict(line[2:].split(": ", 1) for line in text.splitlines() if line.startswith("# ") and ": " in line)
    hours = pd.read_csv(path, comment="#")
    zone = timezone(timedelta(hours=float(head["Time zone [h]"])))
    hours.index = pd.date_range("2001-01-01", periods=8760, freq="h", tz=zone) + pd.Timedelta(hours=sun_offset)
    latitude, longitude, altitude = (
        float(head[f"{word}"]) for word in ("Latitude [°]", "Longitude [°]", "Altitude [m]")
    )
    sun = solarposition.get_solarposition(hours.index, latitude, longitude, altitude)
    extra = irradiance.get_extra_radiation(hours.index.tz_convert("UTC").day_of_year.to_numpy())
    light = [hours[f"{title} [W/m²]"] for title in ("Direct normal", "Global horizontal", "Diffuse horizontal")]
    total = {
        (tilt, azimuth): irradiance.get_total_irradiance(
            tilt, azimuth, sun["apparent_zenith"], sun["azimuth"], *light,
            dni_extra=pd.Series(extra, hours.index), albedo=reflectance, model="perez",
        )["poa_global"]
        for tilt, azimuth in planes
    }  # fmt: skip
    return pd.DataFrame(total).groupby(hours["Month"]).sum() / 1000.0


@pytest.mark.parametrize(("name", "sun_offset"), [("Golden CO", 0.5), ("Sand Point AK", 0.5), ("Piedmont IT", 0.1761)])
def test_planes_and_months_equal_a_frame_for_each(name: str, sun_offset: float) -> None:
    tilts, azimuths = np.transpose(PLANES)
    ours = open_climate(name, Path()).irradiation(tilts, azimuths, 0.25)
    expected = monthly_by_frames(name, sun_offset, PLANES, 0.25)
    assert ours == pytest.approx(expected.to_numpy().T, rel=1e-6, abs=1e-6)


def test_equal_planes_get_equal_sun_whatever_their_order_and_number(golden: HourlyClimate) -> None:
    azimuths = np.arange(0.0, 360.0, 9.0)
    once = golden.irradiation(np.full(40, 60.0), azimuths, 0.2)
    twice = golden.irradiation(np.full(80, 60.0), np.concatenate([azimuths[::-1] + 360.0, azimuths]), 0.2)
    assert twice[:40] == pytest.approx(once[::-1], rel=1e-12)
    assert twice[40:] == pytest.approx(once, rel=1e-12)


def test_one_azimuth_serves_many_tilts(golden: HourlyClimate) -> None:
    assert golden.irradiation([30, 60], 180, 0.2)[1] == pytest.approx(golden.irradiation([60], [180], 0.2)[0])


def test_no_planes_give_no_rows(golden: HourlyClimate) -> None:
    assert golden.irradiation([], [], 0.2).shape == (0, 12)


def test_the_horizontal_gets_the_global_irradiation(golden: HourlyClimate) -> None:
    # Both sides differ by the closure of the file, 0.1 % over the year, more in a single winter month.
    assert golden.irradiation([0], [77], 0.9)[0] == pytest.approx(golden.horizontal_irradiation, rel=0.01)


def test_a_plane_facing_down_sees_only_the_ground(golden: HourlyClimate) -> None:
    reflected = 0.3 * golden.horizontal_irradiation
    # But for the few hours at sunrise and sunset in which the sun of the middle of the hour is still down.
    assert golden.irradiation([180], [0], 0.3)[0] == pytest.approx(reflected, rel=2e-4)


def test_parts_of_the_light_by_hand(golden: HourlyClimate) -> None:
    # Sun 30° above the south: an upright south wall takes cos 30° of the beam, half of a uniform sky,
    # and half of what the ground throws back.
    sun = golden.sun.at(np.arange(8760) == 0)._replace(zenith=np.array([60.0]), azimuth=np.array([180.0]))
    light = (np.array([400.0]), np.array([600.0]), np.array([100.0]))
    parts = plane_irradiance([90], [180], sun, light, ground_reflectance=0.2, sky_model="isotropic")
    assert parts.beam == pytest.approx(np.array([[600.0 * np.sqrt(3) / 2]]))
    assert parts.sky == pytest.approx(np.array([[50.0]]))
    assert parts.ground == pytest.approx(np.array([[40.0]]))
