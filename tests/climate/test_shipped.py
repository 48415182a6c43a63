"""The shipped climates: whole, plausible, closing, and true to the packages they came with."""

from __future__ import annotations

import re
from pathlib import Path

import numpy as np
import pandas as pd
import pvlib
import pytest
from pvlib import iotools

from heatledger.climate.files import open_climate
from heatledger.climate.hourly import HourlyClimate
from heatledger.climate.shipped import shipped_climates, shipped_file
from heatledger.places import shipped_folder

NAMES = (
    *("Golden CO", "Greensboro NC", "Miami FL", "Moffat County CO", "New York NY", "Piedmont IT"),
    "Sand Point AK",
)
SOURCES = shipped_folder("weather").joinpath("SOURCES.md").read_text(encoding="utf-8")
PVLIB_DATA = Path(pvlib.__file__).parent / "data"

PLAUSIBLE = {
    "temperature": (-40.0, 45.0),  # °C
    "global_horizontal": (0.0, 1150.0),  # W/m²: below the solar constant times a clear sky and bright clouds
    "direct_normal": (0.0, 1110.0),  # W/m²: at most 0.8 of the solar constant of 1367 W/m²
    "diffuse_horizontal": (0.0, 700.0),  # W/m²
    "relative_humidity": (0.0, 100.0),  # %
    "wind_speed": (0.0, 30.0),  # m/s
    "horizontal_infrared": (150.0, 500.0),  # W/m²: a black body at -46 to 33 °C
}


@pytest.fixture(scope="module", params=NAMES)
def climate(request: pytest.FixtureRequest) -> HourlyClimate:
    return open_climate(request.param, Path())


def test_every_climate_of_this_page_is_shipped_and_no_other() -> None:
    assert shipped_climates() == NAMES


def test_hours_are_whole_and_plausible(climate: HourlyClimate) -> None:
    for name, (least, most) in PLAUSIBLE.items():
        values = getattr(climate.hours, name)
        if values is not None:
            assert values.shape == (8760,), name
            assert not np.isnan(values).any(), name
            assert least <= values.min() <= values.max() <= most, name


def test_humidity_and_wind_are_kept(climate: HourlyClimate) -> None:
    assert climate.hours.relative_humidity is not None
    assert climate.hours.wind_speed is not None
    assert (climate.hours.horizontal_infrared is not None) == (climate.name == "Piedmont IT")


def test_direct_sun_only_by_day(climate: HourlyClimate) -> None:
    # An hour's light may come from its part with the sun up: half an hour is at most 7.5° of height.
    night = climate.sun.zenith > 98.0
    assert climate.hours.direct_normal[night].max() == 0
    assert climate.hours.global_horizontal[night].max() == 0


def test_closure_is_the_published_one(climate: HourlyClimate) -> None:
    """Figures and their two decimals as SOURCES.md states them, in per cent."""
    row = next(line for line in SOURCES.splitlines() if line.startswith(f"| {climate.name} |"))
    stated = [float(number) for number in re.findall(r"([\d.]+) %", row)]
    measured = [100.0 * climate.closure_errors[shift] for shift in (0.0, -0.5, 0.5)]
    assert measured == pytest.approx(stated, abs=0.0051)


def test_closure_proves_the_hour(climate: HourlyClimate) -> None:
    # Right instants: 0.10 to 0.90 %, the largest for TMY2, whose parts were modelled and rounded apart. Half an
    # hour off: 3.4 % and more. 1 % stands between, with a factor of three to the nearest wrong one.
    assert climate.closure_errors[0.0] < 0.01
    assert min(error for shift, error in climate.closure_errors.items() if shift) > 0.03


def test_there_is_nothing_to_note(climate: HourlyClimate) -> None:
    assert climate.notes == ()


def test_files_are_small_and_say_whose_they_are(climate: HourlyClimate) -> None:
    path = shipped_file(climate.name)
    assert path is not None
    assert path.stat().st_size < 500_000
    assert f"| `{path.name}` |" in SOURCES
    head = [line for line in path.read_text(encoding="utf-8").splitlines() if line.startswith("#")]
    titles = [line[2:].partition(":")[0] for line in head[1:6]]
    assert titles == ["Name", "Source", "Publisher", "Period", "Terms"]
    assert all(line.partition(": ")[2] for line in head[1:])


@pytest.mark.parametrize(("name", "file"), [("Greensboro NC", "723170TYA.CSV"), ("Sand Point AK", "703165TY.csv")])
def test_tmy3_climates_hold_what_the_package_holds(name: str, file: str) -> None:
    frame, meta = iotools.read_tmy3(PVLIB_DATA / file)
    climate = open_climate(name, Path())
    assert climate.site == (meta["latitude"], meta["longitude"], meta["altitude"], meta["TZ"])
    assert_same_hours(climate, frame["temp_air"], frame[["ghi", "dni", "dhi"]])


def test_the_tmy2_climate_holds_what_the_package_holds(tmp_path: Path) -> None:
    # The reader takes seconds for the whole file, so the first forty days and the last stand for it.
    lines = (PVLIB_DATA / "12839.tm2").read_text(encoding="ascii").splitlines(keepends=True)
    (tmp_path / "part.tm2").write_text("".join(lines[: 1 + 960] + lines[-24:]), encoding="ascii")
    frame, meta = iotools.read_tmy2(tmp_path / "part.tm2")
    climate = open_climate("Miami FL", Path())
    assert climate.site == pytest.approx((meta["latitude"], meta["longitude"], meta["altitude"], meta["TZ"]), abs=1e-4)
    part = np.r_[0:960, 8736:8760]
    assert climate.hours.temperature[part] == pytest.approx(frame["DryBulb"].to_numpy() / 10.0, abs=1e-9)
    light = np.column_stack(climate.hours.light)[part]
    assert light.tolist() == frame[["GHI", "DNI", "DHI"]].to_numpy().tolist()


def assert_same_hours(climate: HourlyClimate, temperature: pd.Series[float], light: pd.DataFrame) -> None:
    assert climate.hours.temperature == pytest.approx(temperature.to_numpy(), abs=0.05)
    assert np.column_stack(climate.hours.light) == pytest.approx(light.to_numpy(), abs=0.5)
