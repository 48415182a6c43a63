"""Files of every format, written from a shipped climate in the form their publishers give them, read back.

The PVGIS and NSRDB forms follow files that come with the source distribution of pvlib.
"""

from __future__ import annotations

import gzip
import json
from collections.abc import Callable
from pathlib import Path

import numpy as np
import pandas as pd
import pvlib
import pytest

from heatledger.climate.files import open_climate
from heatledger.climate.formats import read_climate
from heatledger.climate.hourly import HourlyClimate
from heatledger.errors import InputError

WriteEpw = Callable[..., str]
FORMATS = "an EPW, TMY3, TMY2, PVGIS or NSRDB file or an hourly table of heatledger"
PVLIB_DATA = Path(pvlib.__file__).parent / "data"
PVGIS_COLUMNS = ("T2m", "RH", "G(h)", "Gb(n)", "Gd(h)", "IR(h)", "WS10m", "WD10m", "SP")
SERIES_COLUMNS = ("Gb(i)", "Gd(i)", "Gr(i)", "H_sun", "T2m", "WS10m", "Int")
OFFSET = "Irradiance Time Offset (h): 0.1761\n"
TWO_ROWS = "The weather file has 2 rows an hour; their means were taken."
DIRECT_FROM_REST = (
    " of the weather file have no usable direct normal irradiance (first: hour 9 of 1 January): worked out from the "
    "global and the diffuse one."
)


@pytest.fixture(scope="module")
def piedmont() -> HourlyClimate:
    return open_climate("Piedmont IT", Path())


@pytest.fixture
def opened(tmp_path: Path) -> Callable[[str], HourlyClimate]:
    def write_and_open(text: str) -> HourlyClimate:
        (tmp_path / "mine.txt").write_text(text, encoding="utf-8")
        return open_climate("mine.txt", tmp_path)

    return write_and_open


Opened = Callable[[str], HourlyClimate]


def message(text: str, folder: Path) -> str:
    (folder / "mine.txt").write_text(text, encoding="utf-8")
    with pytest.raises(InputError) as caught:
        open_climate("mine.txt", folder)
    return str(caught.value)


def utc_rows(climate: HourlyClimate, minute: int = 0) -> pd.DataFrame:
    """Rows of PVGIS: in UTC, one hour behind Piedmont, each month with a year of its own."""
    starts = pd.date_range("2001-01-01", periods=8760, freq="h")
    hours = climate.hours
    assert hours.relative_humidity is not None
    assert hours.horizontal_infrared is not None
    frame = pd.DataFrame(
        {
            "time(UTC)": [f"{2004 + start.month}{start:%m%d:%H}{minute:02d}" for start in starts],
            "T2m": np.roll(hours.temperature, -1),
            "RH": np.roll(hours.relative_humidity, -1),
            "G(h)": np.roll(hours.global_horizontal, -1),
            "Gb(n)": np.roll(hours.direct_normal, -1),
            "Gd(h)": np.roll(hours.diffuse_horizontal, -1),
            "IR(h)": np.roll(hours.horizontal_infrared, -1),
        }
    )
    return frame.assign(WS10m=1.0, WD10m=0.0, SP=98000.0)


def pvgis_csv(climate: HourlyClimate, offset: str = OFFSET) -> str:
    site = climate.site
    head = f"Latitude (decimal degrees): {site.latitude:.3f}\nLongitude (decimal degrees): {site.longitude:.3f}\n"
    head += f"Elevation (m): {site.altitude:.1f}\n{offset}month,year\n"
    head += "".join(f"{month},{2004 + month}\n" for month in range(1, 13))
    return head + utc_rows(climate).to_csv(index=False) + "\nT2m: 2-m air temperature (degree Celsius)\n"


def pvgis_json(climate: HourlyClimate) -> str:
    site = climate.site
    location = {"latitude": site.latitude, "longitude": site.longitude, "elevation": site.altitude}
    rows = utc_rows(climate).to_dict("records")
    months = [{"month": month, "year": 2004 + month} for month in range(1, 13)]
    return json.dumps(
        {
            "inputs": {"location": {**location, "irradiance_time_offset": 0.1761}},
            "outputs": {"months_selected": months, "tmy_hourly": rows},
            "meta": {"inputs": {}, "outputs": {}},
        }
    )


def series(climate: HourlyClimate) -> pd.DataFrame:
    """A PVGIS series of a level plane; its stamps are the minute of the picture."""
    frame = utc_rows(climate, minute=10)
    frame["time"] = ["2005" + stamp[4:] for stamp in frame["time(UTC)"]]
    frame["Gb(i)"], frame["Gd(i)"], frame["Gr(i)"] = frame["G(h)"] - frame["Gd(h)"], frame["Gd(h)"], 0.0
    return frame.assign(H_sun=0.0, Int=0.0)[["time", *SERIES_COLUMNS]]


def series_csv(climate: HourlyClimate, slope: str = "0 deg.") -> str:
    site = climate.site
    head = f"Latitude (decimal degrees):\t{site.latitude:.3f}\nLongitude (decimal degrees):\t{site.longitude:.3f}\n"
    head += f"Elevation (m):\t{site.altitude:.0f}\nRadiation database:\tPVGIS-SARAH\n\n\nSlope: {slope} \n"
    return head + "Azimuth: 0 deg. \n" + series(climate).to_csv(index=False) + "\nH_sun: Sun height (degree)\n"


def series_json(climate: HourlyClimate, mounting: dict[str, object]) -> str:
    site = climate.site
    location = {"latitude": site.latitude, "longitude": site.longitude, "elevation": site.altitude}
    return json.dumps(
        {
            "inputs": {"location": location, "mounting_system": mounting},
            "outputs": {"hourly": series(climate).to_dict("records")},
            "meta": {"inputs": {}, "outputs": {}},
        }
    )


def nsrdb(climate: HourlyClimate, minutes: tuple[int, ...] = (30,), zones: tuple[str, str] = ("-7", "-7")) -> str:
    """A file of the National Solar Radiation Database, every stamp of an hour with the hour's values."""
    site, hours = climate.site, climate.hours
    head = "Source,Location ID,City,State,Country,Latitude,Longitude,Time Zone,Elevation,Local Time Zone\n"
    head += f"NSRDB,479494,-,-,-,{site.latitude},{site.longitude},{zones[0]},{site.altitude:.0f},{zones[1]}\n"
    starts = pd.date_range("2001-01-01", periods=8760, freq="h").repeat(len(minutes))
    values = {"GHI": hours.global_horizontal, "DNI": hours.direct_normal, "DHI": hours.diffuse_horizontal}
    columns = {"Temperature": hours.temperature, **values}
    frame = pd.DataFrame({name: np.repeat(column, len(minutes)) for name, column in columns.items()})
    frame = frame.assign(Year=2019, Month=starts.month, Day=starts.day, Hour=starts.hour, Minute=np.tile(minutes, 8760))
    return head + frame[["Year", "Month", "Day", "Hour", "Minute", *columns]].to_csv(index=False)


def assert_same_light(found: HourlyClimate, expected: HourlyClimate) -> None:
    assert np.array_equal(found.hours.temperature, expected.hours.temperature)
    assert np.column_stack(found.hours.light) == pytest.approx(np.column_stack(expected.hours.light), abs=1e-9)
    assert found.sun_offset == pytest.approx(expected.sun_offset, abs=1e-9)
    assert found.site == expected.site
    assert found.closure_errors[0.0] < 0.01
    assert min(error for shift, error in found.closure_errors.items() if shift) > 0.03


def test_a_typical_year_of_pvgis_as_csv(opened: Opened, piedmont: HourlyClimate) -> None:
    climate = opened(pvgis_csv(piedmont))
    assert (climate.name, climate.notes) == ("mine", ())
    assert climate.source == "PVGIS file of the user; typical months of 2005 to 2016."
    assert_same_light(climate, piedmont)
    assert climate.hours.horizontal_infrared is not None


def test_a_typical_year_of_pvgis_as_json(opened: Opened, piedmont: HourlyClimate) -> None:
    climate = opened(pvgis_json(piedmont))
    assert climate.notes == ()
    assert_same_light(climate, piedmont)


def test_a_typical_year_of_pvgis_as_epw(tmp_path: Path, piedmont: HourlyClimate, write_epw: WriteEpw) -> None:
    """Its rows are in UTC although its first line states a time zone; the comment counts from the end of the hour."""
    rows = utc_rows(piedmont)

    def as_pvgis(frame: pd.DataFrame) -> pd.DataFrame:
        for column, name in ((6, "T2m"), (8, "RH"), (13, "G(h)"), (14, "Gb(n)"), (15, "Gd(h)"), (12, "IR(h)")):
            frame[column] = rows[name].to_numpy()
        return frame

    path = tmp_path / write_epw(as_pvgis)
    text = path.read_text(encoding="utf-8").replace("COMMENTS 2,", "COMMENTS 2,Irradiance Time Offset (h):-0.8239")
    first = "LOCATION,unknown,-,unknown,ECMWF/ERA,unknown,45.000000,8.000000,1,250"
    path.write_text("\n".join([first, *text.splitlines()[1:]]) + "\n", encoding="utf-8")
    climate = open_climate(path.name, tmp_path)
    assert climate.notes == ()
    assert_same_light(climate, piedmont)


def test_a_typical_year_of_pvgis_that_does_not_state_its_minute(opened: Opened, piedmont: HourlyClimate) -> None:
    # 0.1761 h are 10.6 minutes; the nearest of the steps of five minutes is found.
    climate = opened(pvgis_csv(piedmont, offset=""))
    assert climate.sun_offset == pytest.approx(10 / 60)
    assert climate.notes == (
        "The weather file does not state at which minute of the hour its light was seen; global, direct and diffuse "
        "irradiance agree best 10 minutes after the full hour, to 0.2 %.",
    )


@pytest.mark.parametrize("kind", ["csv", "json"])
def test_a_series_of_pvgis(opened: Opened, piedmont: HourlyClimate, kind: str) -> None:
    level: dict[str, object] = {"fixed": {"slope": {"value": 0, "optimal": False}}}
    climate = opened(series_csv(piedmont) if kind == "csv" else series_json(piedmont, level))
    assert climate.source == "PVGIS hourly series of the user."
    assert climate.sun_offset == pytest.approx(10 / 60)
    assert climate.horizontal_irradiation == pytest.approx(piedmont.horizontal_irradiation, rel=1e-9)
    # The stamp is cut to the minute, and direct light follows from the rest: a south wall agrees within 1 %.
    assert climate.irradiation([90], [180], 0.2) == pytest.approx(piedmont.irradiation([90], [180], 0.2), rel=0.01)
    (note,) = climate.notes
    assert note.partition(" hours")[2] == DIRECT_FROM_REST


def test_a_series_of_pvgis_for_a_slope(tmp_path: Path, piedmont: HourlyClimate) -> None:
    assert message(series_csv(piedmont, "30 deg."), tmp_path) == (
        "mine.txt  Weather: found irradiance of a plane of slope 30°; expected irradiance of the horizontal. Download "
        "the hours of PVGIS again with slope 0, or its typical year."
    )


def test_a_series_of_pvgis_for_a_plane_that_follows_the_sun(tmp_path: Path, piedmont: HourlyClimate) -> None:
    assert message(series_json(piedmont, {"two_axis": {"slope": {"value": "-"}}}), tmp_path) == (
        "mine.txt  Weather: found irradiance of a plane that follows the sun; expected irradiance of the horizontal. "
        "Download the hours of PVGIS again with slope 0, or its typical year."
    )


def test_a_file_of_the_solar_radiation_database(opened: Opened, golden: HourlyClimate) -> None:
    climate = opened(nsrdb(golden))
    assert climate.notes == ()
    assert climate.source == "National Solar Radiation Database, file of the user; point 479494."
    assert_same_light(climate, golden)


def test_the_database_with_half_hours(opened: Opened, golden: HourlyClimate) -> None:
    """The means of two stamps belong to the instant between them."""
    climate = opened(nsrdb(golden, minutes=(15, 45)))
    assert climate.notes == (TWO_ROWS,)
    assert_same_light(climate, golden)


def test_a_code_for_a_missing_value_in_half_an_hour(opened: Opened, golden: HourlyClimate) -> None:
    """The mean of 9999 and a temperature is none."""
    lines = nsrdb(golden, minutes=(15, 45)).splitlines()
    cells = lines[23].split(",")
    lines[23] = ",".join([*cells[:5], "9999", *cells[6:]])
    assert opened("\n".join(lines) + "\n").notes == (
        TWO_ROWS,
        "1 hour of the weather file has no usable outdoor temperature (first: hour 11 of 1 January): filled in from "
        "the hours around.",
    )


def test_the_database_in_utc(opened: Opened, golden: HourlyClimate) -> None:
    hours = golden.hours
    ahead = HourlyClimate(
        golden.name,
        "",
        golden.site,
        type(hours)(*(np.roll(values, 7) for values in (hours.temperature, *hours.light))),
    )
    climate = opened(nsrdb(ahead, zones=("0", "-7")))
    assert climate.notes == ()
    assert_same_light(climate, golden)


def test_the_database_in_a_zone_of_half_hours(opened: Opened, golden: HourlyClimate) -> None:
    """India stands at 5.5 h; the sun of Golden's longitude plus that of 12.5 h is then the same."""
    moved = HourlyClimate(golden.name, "", golden.site._replace(longitude=-105.18 + 187.5), golden.hours)
    climate = opened(nsrdb(moved, zones=("5.5", "5.5")))
    assert climate.time_zone == 5.5
    assert climate.notes == ()
    assert climate.closure_errors[0.0] < 0.002


def test_a_tmy2_file_gives_the_shipped_climate() -> None:
    climate, expected = open_climate("12839.tm2", PVLIB_DATA), open_climate("Miami FL", Path())
    assert (climate.name, climate.source) == ("MIAMI, FL", "TMY2 file of the user; station 12839.")
    assert climate.notes == ()
    assert climate.site == pytest.approx(expected.site, abs=1e-4)
    assert climate.temperature == pytest.approx(expected.temperature, abs=1e-9)
    assert np.column_stack(climate.hours.light).tolist() == np.column_stack(expected.hours.light).tolist()


def test_lines_that_end_in_the_way_of_windows(opened: Opened, piedmont: HourlyClimate) -> None:
    assert_same_light(opened(pvgis_csv(piedmont).replace("\n", "\r\n")), piedmont)


def test_an_empty_file(tmp_path: Path) -> None:
    assert message("\n", tmp_path) == (
        "mine.txt  Weather: found an empty file; expected an EPW, TMY3, TMY2, PVGIS or NSRDB file or an hourly table "
        "of heatledger. Download the file again."
    )


def test_a_file_packed_by_gzip() -> None:
    with pytest.raises(InputError) as caught:
        read_climate(gzip.compress(b"LOCATION,"))
    assert str(caught.value) == (
        ": found a packed file (gzip); expected an EPW, TMY3, TMY2, PVGIS or NSRDB file or an hourly table of "
        "heatledger. Unpack it and give the weather file inside."
    )


def test_a_packed_file(tmp_path: Path) -> None:
    assert message("PK\x03\x04", tmp_path) == (
        "mine.txt  Weather: found a packed file (zip) or a workbook; expected an EPW, TMY3, TMY2, PVGIS or NSRDB file "
        "or an hourly table of heatledger. Unpack it and give the weather file inside."
    )


@pytest.mark.parametrize(
    ("text", "title", "reason"),
    [
        ("Source,Location ID,City\nNSRDB,1,-\n", "an NSRDB file", "KeyError: 'Latitude'"),
        ('{"outputs": {"tmy_hourly": []}}', "a PVGIS file", "KeyError: 'meta'"),
        ("Latitude (decimal degrees): N\n", "a PVGIS file", r"ValueError: could not convert string to float: ' N\n'"),
    ],
)
def test_damaged_files(tmp_path: Path, text: str, title: str, reason: str) -> None:
    assert message(text, tmp_path) == (
        f"mine.txt  Weather: found {title} that cannot be read ({reason}); expected {FORMATS}. "
        "Download the file again, or save it anew with the program it comes from."
    )
