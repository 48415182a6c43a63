"""Weather by name or by file, and every sentence a user can meet on the way."""

from __future__ import annotations

from collections.abc import Callable
from pathlib import Path

import numpy as np
import pandas as pd
import pvlib
import pytest

from heatledger.climate import files
from heatledger.climate.files import open_climate, shipped_climates
from heatledger.climate.hourly import HourlyClimate, Hours
from heatledger.climate.table import hourly_table
from heatledger.errors import InputError

WriteEpw = Callable[..., str]
PVLIB_DATA = Path(pvlib.__file__).parent / "data"
FORMATS = "an EPW, TMY3, TMY2, PVGIS or NSRDB file or an hourly table of heatledger"


def message(weather: str, folder: Path) -> str:
    with pytest.raises(InputError) as caught:
        open_climate(weather, folder)
    return str(caught.value)


def test_shipped_climates_are_listed_by_name() -> None:
    assert shipped_climates() == (
        "Golden CO",
        "Greensboro NC",
        "Miami FL",
        "Moffat County CO",
        "New York NY",
        "Piedmont IT",
        "Sand Point AK",
    )


def test_a_name_is_matched_without_case_and_outer_spaces(tmp_path: Path) -> None:
    assert open_climate("  golden co ", tmp_path).name == "Golden CO"


def test_a_name_nearly_right_gets_the_nearest_one(tmp_path: Path) -> None:
    assert message("Greensbro NC", tmp_path) == (
        "Weather: found the text 'Greensbro NC'; expected the name of a shipped climate, the path of a weather file, "
        "or 'monthly table'. Did you mean 'Greensboro NC'?"
    )


def test_a_monthly_table_nearly_named(tmp_path: Path) -> None:
    assert message("monthly tabel", tmp_path) == (
        "Weather: found the text 'monthly tabel'; expected the name of a shipped climate, the path of a weather file, "
        "or 'monthly table'. Did you mean 'monthly table'?"
    )


def test_a_name_like_no_other_gets_the_list(tmp_path: Path) -> None:
    assert message("xyz", tmp_path) == (
        "Weather: found the text 'xyz'; expected the name of a shipped climate, the path of a weather file, or "
        "'monthly table'. Shipped climates are Golden CO, Greensboro NC, Miami FL, Moffat County CO, New York NY, "
        "Piedmont IT, Sand Point AK."
    )


def test_a_missing_file(tmp_path: Path) -> None:
    assert message("no.epw", tmp_path) == (
        "Weather: found no file 'no.epw'; expected the path of a weather file. Correct the path; it starts from the "
        "folder of the workbook."
    )


def test_a_folder(tmp_path: Path) -> None:
    (tmp_path / "data").mkdir()
    assert message("data", tmp_path) == (
        "Weather: found the folder 'data'; expected a weather file. Add the name of the weather file to the path."
    )


def test_problems_point_at_the_cell_of_the_workbook(tmp_path: Path) -> None:
    with pytest.raises(InputError) as caught:
        open_climate("no.epw", tmp_path, sheet="Project", cell="B7")
    assert str(caught.value).startswith("Project!B7  Weather: found no file 'no.epw';")


@pytest.mark.parametrize("content", [b"hello", b"\x89PNG\r\n\x1a\n\x00\xff", b"a,b\n1,2\n"])
def test_a_file_of_another_kind(tmp_path: Path, content: bytes) -> None:
    (tmp_path / "mine.epw").write_bytes(content)
    assert message("mine.epw", tmp_path) == (
        f"mine.epw  Weather: found a file of another kind; expected {FORMATS}. Give an hourly weather file of one of "
        "these formats."
    )


def test_a_damaged_epw_file(tmp_path: Path) -> None:
    (tmp_path / "mine.epw").write_text("LOCATION,A,B,C,D,E,north,0,0,0\n", encoding="utf-8")
    assert message("mine.epw", tmp_path) == (
        "mine.epw  Weather: found an EPW file that cannot be read (ValueError: could not convert string to float: "
        f"'north'); expected {FORMATS}. Download the file again, or save it anew with the program it comes from."
    )


def test_a_damaged_tmy3_file(tmp_path: Path) -> None:
    (tmp_path / "mine.csv").write_text(
        '1,"A",NC,-5,36,-80,1\nDate (MM/DD/YYYY),Other\n01/01/1990,1\n', encoding="utf-8"
    )
    assert message("mine.csv", tmp_path) == (
        "mine.csv  Weather: found a TMY3 file that cannot be read (KeyError: 'Time (HH:MM)'); expected "
        f"{FORMATS}. Download the file again, or save it anew with the program it comes from."
    )


def test_a_file_far_too_large(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    (tmp_path / "mine.epw").write_bytes(b"12")
    monkeypatch.setattr(files, "LARGEST_FILE", 1)
    assert message("mine.epw", tmp_path) == (
        "mine.epw  Weather: found a file of more than 50 MB; expected a weather file of a few MB. Give a file of one "
        "year of hours."
    )


def test_a_file_that_may_not_be_read(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    def refuse(_: Path) -> bytes:
        raise PermissionError(13, "Permission denied")

    (tmp_path / "mine.epw").write_bytes(b"")
    monkeypatch.setattr(Path, "read_bytes", refuse)
    assert message("mine.epw", tmp_path) == (
        "mine.epw  Weather: found a file that cannot be opened (Permission denied); expected a weather file. Close it "
        "in other programs and check that you may read it."
    )


def test_an_epw_file_gives_the_hours_it_was_made_from(
    tmp_path: Path, golden: HourlyClimate, write_epw: WriteEpw
) -> None:
    climate = open_climate(write_epw(), tmp_path)
    assert (climate.name, climate.site, climate.notes) == ("Testville, TS, TST", golden.site, ())
    assert climate.source == "EPW file of the user; data type made, station 722190."
    for name in ("temperature", "global_horizontal", "direct_normal", "diffuse_horizontal", "wind_speed"):
        assert getattr(climate.hours, name).tolist() == getattr(golden.hours, name).tolist()
    assert climate.hours.dew_point is None
    assert climate.hours.horizontal_infrared is None
    assert climate.irradiation([90], [180], 0.2) == pytest.approx(golden.irradiation([90], [180], 0.2), rel=1e-12)


def test_an_epw_file_in_latin_1(tmp_path: Path, write_epw: WriteEpw) -> None:
    climate = open_climate(write_epw(place="Besançon,-,FRA", encoding="latin-1"), tmp_path)
    assert climate.name == "Besançon, FRA"


def test_a_place_without_a_name_is_called_after_its_file(tmp_path: Path, write_epw: WriteEpw) -> None:
    assert open_climate(write_epw(place="unknown,-,unknown"), tmp_path).name == "mine"


def test_the_format_is_known_by_content_not_by_name(tmp_path: Path, write_epw: WriteEpw) -> None:
    (tmp_path / write_epw()).rename(tmp_path / "weather.txt")
    assert open_climate("weather.txt", tmp_path).name == "Testville, TS, TST"


@pytest.mark.parametrize(
    ("file", "name", "station", "shipped"),
    [
        ("723170TYA.CSV", "GREENSBORO PIEDMONT TRIAD INT, NC", 723170, "Greensboro NC"),
        ("703165TY.csv", "SAND POINT, AK", 703165, "Sand Point AK"),
    ],
)
def test_a_tmy3_file_gives_the_shipped_climate(file: str, name: str, station: int, shipped: str) -> None:
    climate, expected = open_climate(file, PVLIB_DATA), open_climate(shipped, PVLIB_DATA)
    assert (climate.name, climate.source) == (name, f"TMY3 file of the user; station {station}.")
    assert climate.site == expected.site
    assert climate.temperature == pytest.approx(expected.temperature, abs=1e-9)
    south = climate.irradiation([90], [180], 0.2)
    assert south == pytest.approx(expected.irradiation([90], [180], 0.2), rel=1e-9)


def test_a_site_off_the_earth(tmp_path: Path, golden: HourlyClimate) -> None:
    site = golden.site._replace(latitude=95.0)
    (tmp_path / "mine.csv").write_text(hourly_table(golden.hours, site, 0.5, {"Name": "Mine"}), encoding="utf-8")
    assert message("mine.csv", tmp_path) == (
        "mine.csv  Weather: found the latitude 95 °; expected a latitude from -90 to 90 °. Correct the latitude in the "
        "weather file or give it on the sheet Project."
    )


def test_the_own_table_keeps_what_was_written(tmp_path: Path, golden: HourlyClimate) -> None:
    hours = Hours(*(values[::-1] for values in (golden.hours.temperature, *golden.hours.light)))
    site = golden.site._replace(longitude=-105.1875)
    text = hourly_table(hours, site, 0.25, {"Name": "Mine", "Source": "Measured: roof."})
    (tmp_path / "mine.csv").write_text(text, encoding="utf-8")
    climate = open_climate("mine.csv", tmp_path)
    assert (climate.name, climate.source, climate.site, climate.sun_offset) == ("Mine", "Measured: roof.", site, 0.25)
    assert np.array_equal(climate.hours.temperature, hours.temperature)
    assert np.array_equal(climate.hours.direct_normal, hours.direct_normal)


def test_the_workbooks_place_replaces_the_files_and_is_noted(tmp_path: Path) -> None:
    climate = open_climate("Golden CO", tmp_path, latitude=39.75, longitude=-105.18, time_zone=-7)
    assert climate.latitude == 39.75
    assert climate.notes == ("The latitude 39.75° of the workbook is used instead of 39.73° of the weather file.",)


def test_a_wrong_time_zone_is_found_by_closure(tmp_path: Path) -> None:
    assert open_climate("Golden CO", tmp_path, time_zone=-6).notes == (
        "The time zone -6 h of the workbook is used instead of -7 h of the weather file.",
        "The hours of the weather file seem to be read at the wrong instant: global irradiance differs from its direct "
        "and diffuse parts by 11.0 % as read, but by 0.1 % with the sun 60 minutes later. Check time zone, longitude "
        "and hour convention of the file.",
    )


def test_parts_that_never_add_up_are_noted(tmp_path: Path, write_epw: WriteEpw) -> None:
    def a_tenth_too_much(frame: pd.DataFrame) -> pd.DataFrame:
        frame[15] = frame[15] + 0.1 * frame[13]
        return frame

    # The file closes to 0.1 % as it is, so a tenth of global more in diffuse is 10 % of global.
    assert open_climate(write_epw(a_tenth_too_much), tmp_path).notes == (
        "In the weather file global irradiance differs from its direct and diffuse parts by 10.0 % over the year, and "
        "no shift of the hours brings them together. Check its solar data.",
    )


def test_a_path_as_typed_on_windows_is_found_everywhere(tmp_path: Path, write_epw: WriteEpw) -> None:
    (tmp_path / "weather files").mkdir()
    (tmp_path / write_epw()).rename(tmp_path / "weather files" / "mine.epw")
    assert open_climate("weather files\\mine.epw", tmp_path).name == "Testville, TS, TST"
    assert message("weather files\\other.epw", tmp_path) == (
        "Weather: found no file 'weather files\\other.epw'; expected the path of a weather file. "
        "Correct the path; it starts from the folder of the workbook."
    )
