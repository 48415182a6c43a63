"""Faults of weather files: each that is repaired with its note, each that is not with its sentence."""

from __future__ import annotations

from collections.abc import Callable
from pathlib import Path

import numpy as np
import pandas as pd
import pytest

from heatledger.climate.files import open_climate
from heatledger.climate.hourly import HourlyClimate, Hours
from heatledger.climate.table import hourly_table
from heatledger.errors import InputError

WriteEpw = Callable[..., str]
Change = Callable[[pd.DataFrame], pd.DataFrame]
TEMPERATURE, GLOBAL, DIRECT, DIFFUSE = 6, 13, 14, 15
"""Columns of an EPW file."""
NOON = 20 * 24 + 11
"""The hour before noon on 21 January, a clear day."""
OF_DIRECT_AND_DIFFUSE = "worked out from the direct and the diffuse one."


@pytest.fixture
def changed(tmp_path: Path, write_epw: WriteEpw) -> Callable[..., HourlyClimate]:
    def write_and_open(change: Change, time_zone: float | None = None) -> HourlyClimate:
        return open_climate(write_epw(change), tmp_path, time_zone=time_zone)

    return write_and_open


@pytest.fixture
def message(tmp_path: Path, write_epw: WriteEpw) -> Callable[..., str]:
    def sentence(change: Change | None = None) -> str:
        with pytest.raises(InputError) as caught:
            open_climate(write_epw(change), tmp_path)
        return str(caught.value)

    return sentence


Changed = Callable[..., HourlyClimate]
Message = Callable[..., str]


def put(column: int, rows: slice | list[int], value: str | float) -> Change:
    def change(frame: pd.DataFrame) -> pd.DataFrame:
        frame = frame.astype({column: object})
        frame.iloc[rows, column] = value
        return frame

    return change


def both(*changes: Change) -> Change:
    def change(frame: pd.DataFrame) -> pd.DataFrame:
        for each in changes:
            frame = each(frame)
        return frame

    return change


# --- rows ---------------------------------------------------------------------------------------------------------


def test_a_leap_day_is_left_out(changed: Changed, golden: HourlyClimate) -> None:
    def with_leap_day(frame: pd.DataFrame) -> pd.DataFrame:
        end = 59 * 24
        leap_day = frame.iloc[end - 24 : end].copy()
        leap_day[2], leap_day[TEMPERATURE] = 29, 55.0
        return pd.concat([frame.iloc[:end], leap_day, frame.iloc[end:]])

    climate = changed(with_leap_day)
    assert climate.notes == ("29 February was left out of the weather file: months are of a 365-day year.",)
    assert climate.temperature == pytest.approx(golden.temperature, abs=1e-9)


def test_typical_months_of_different_years_are_one_year(changed: Changed, golden: HourlyClimate) -> None:
    def of_many_years(frame: pd.DataFrame) -> pd.DataFrame:
        frame[0] = 1990 + frame[1].astype(int)
        return frame

    climate = changed(of_many_years)
    assert climate.notes == ()
    assert climate.hours.temperature.tolist() == golden.hours.temperature.tolist()


def test_an_hour_that_stands_twice(changed: Changed, golden: HourlyClimate) -> None:
    def twice(frame: pd.DataFrame) -> pd.DataFrame:
        again = put(TEMPERATURE, [0], 40.0)(frame.iloc[[1000]])
        return pd.concat([frame.iloc[:1001], again, frame.iloc[1001:]])

    climate = changed(twice)
    assert climate.notes == (
        "1 hour stands twice in the weather file (first: hour 17 of 11 February); the first of each was taken.",
    )
    assert climate.hours.temperature.tolist() == golden.hours.temperature.tolist()


def test_clocks_put_forward_and_back(changed: Changed) -> None:
    """A file in the time of the clock on the wall lacks an hour in spring and has one twice in autumn."""

    def by_the_clock(frame: pd.DataFrame) -> pd.DataFrame:
        return frame.iloc[[*range(2018), *range(2019, 7346), 7345, *range(7346, 8760)]]

    assert changed(by_the_clock).notes == (
        "1 hour stands twice in the weather file (first: hour 2 of 3 November); the first of each was taken.",
        "1 hour is missing in the weather file (first: hour 3 of 26 March).",
        "1 hour of the weather file has no usable outdoor temperature (first: hour 3 of 26 March): filled in from the "
        "hours around.",
    )


def test_hours_out_of_order(changed: Changed, golden: HourlyClimate) -> None:
    climate = changed(lambda frame: frame.iloc[[*range(5000, 8760), *range(5000)]])
    assert climate.notes == ("The hours of the weather file stand out of order and were sorted.",)
    assert climate.hours.temperature.tolist() == golden.hours.temperature.tolist()


def test_hours_that_are_missing(changed: Changed, golden: HourlyClimate) -> None:
    climate = changed(lambda frame: frame.drop(index=range(NOON, NOON + 3)))
    assert climate.notes == (
        "3 hours are missing in the weather file (first: hour 12 of 21 January).",
        "3 hours of the weather file have no usable outdoor temperature (first: hour 12 of 21 January): filled in from "
        "the hours around.",
        "3 hours of the weather file have no usable sunlight (first: hour 12 of 21 January): filled in from the "
        "clearness of the hours around.",
    )
    before, after = golden.hours.temperature[[NOON - 1, NOON + 3]]
    assert climate.hours.temperature[NOON : NOON + 3] == pytest.approx(np.linspace(before, after, 5)[1:-1])
    # The day is clear throughout, so its neighbours tell the light of the hours between; the split by Erbs gives clear
    # hours a sixth of diffuse light, where this dry place 1900 m high has a twelfth.
    light = slice(NOON, NOON + 3)
    assert climate.hours.global_horizontal[light] == pytest.approx(golden.hours.global_horizontal[light], rel=0.03)
    assert climate.hours.direct_normal[light] == pytest.approx(golden.hours.direct_normal[light], rel=0.12)


def test_a_gap_across_the_end_of_the_year(changed: Changed, golden: HourlyClimate) -> None:
    climate = changed(lambda frame: frame.iloc[2:-1])
    before, after = golden.hours.temperature[[-2, 2]]
    expected = np.linspace(before, after, 5)[1:-1]
    assert climate.hours.temperature[[-1, 0, 1]] == pytest.approx(expected)


def test_a_day_of_24_hours_only(message: Message) -> None:
    assert message(lambda frame: frame.iloc[:24]) == (
        "mine.epw  Weather: found 24 hours; expected 8760 hours. Give a file of one whole year, 1 January to 31 "
        "December, one row for each hour."
    )


def test_two_years(message: Message) -> None:
    assert message(lambda frame: pd.concat([frame, frame])) == (
        "mine.epw  Weather: found 17520 hours, about 2.0 years; expected one year of hours. Give a typical year, or "
        "cut one year out of the file."
    )


@pytest.mark.parametrize(
    ("column", "value", "found"),
    [
        (1, 13, "'hour 1 of 1 of month 13' in row 1 of the hours"),
        (2, 31, "'hour 1 of 31 April' in row 2161 of the hours"),
        (3, 25, "'hour 25 of 1 January' in row 1 of the hours"),
    ],
)
def test_a_day_that_is_none(tmp_path: Path, golden: HourlyClimate, column: int, value: int, found: str) -> None:
    text = hourly_table(golden.hours, golden.site, 0.5, {"Name": "Mine"})
    head, rows = text.splitlines()[:8], [line.split(",") for line in text.splitlines()[8:]]
    rows[2160 if value == 31 else 0][column - 1] = str(value)
    (tmp_path / "mine.csv").write_text("\n".join([*head, *map(",".join, rows)]) + "\n", encoding="utf-8")
    with pytest.raises(InputError) as caught:
        open_climate("mine.csv", tmp_path)
    assert str(caught.value) == (
        f"mine.csv  Weather: found {found}; expected a day of the calendar and an hour from 1 to 24. Correct the date, "
        "or download the file again."
    )


# --- values -------------------------------------------------------------------------------------------------------


@pytest.mark.parametrize("code", [99.9, 9999, -9900, "", "abc"])
def test_codes_for_a_missing_temperature(changed: Changed, golden: HourlyClimate, code: str | float) -> None:
    climate = changed(put(TEMPERATURE, [5], code))
    assert climate.notes == (
        "1 hour of the weather file has no usable outdoor temperature (first: hour 6 of 1 January): filled in from the "
        "hours around.",
    )
    assert climate.hours.temperature[5] == pytest.approx(golden.hours.temperature[[4, 6]].mean())


def test_six_hours_are_filled_in_and_seven_are_not(changed: Changed, message: Message) -> None:
    assert changed(put(TEMPERATURE, slice(5, 11), 99.9)).notes == (
        "6 hours of the weather file have no usable outdoor temperature (first: hour 6 of 1 January): filled in from "
        "the hours around.",
    )
    assert message(put(TEMPERATURE, slice(5, 12), 99.9)) == (
        "mine.epw  Weather: found 7 hours without a usable outdoor temperature, 7 in a row (first: 99.9 at hour 6 of 1 "
        "January); expected values from -90 to 60 °C without gaps of more than 6 h. Fill in the missing outdoor "
        "temperature of the weather file or give another file."
    )


def test_all_long_gaps_are_told(message: Message) -> None:
    day = slice(24, 48)
    spoiled = both(*(put(column, day, 9999) for column in (TEMPERATURE, GLOBAL, DIRECT, DIFFUSE)))
    assert message(spoiled).splitlines() == [
        "mine.epw  Weather: found 24 hours without a usable outdoor temperature, 24 in a row (first: 9999 at hour 1 of "
        "2 January); expected values from -90 to 60 °C without gaps of more than 6 h. Fill in the missing outdoor "
        "temperature of the weather file or give another file.",
        "mine.epw  Weather: found 10 hours without a usable global horizontal irradiance, 10 in a row (first: 9999 at "
        "hour 8 of 2 January); expected values from 0 to 1500 W/m² without gaps of more than 6 h. Fill in the missing "
        "global horizontal irradiance of the weather file or give another file.",
    ]


def test_missing_light_at_night_is_none(changed: Changed, golden: HourlyClimate) -> None:
    climate = changed(both(*(put(column, slice(0, 5), 9999) for column in (GLOBAL, DIRECT, DIFFUSE))))
    assert climate.notes == ()
    assert climate.hours.global_horizontal.tolist() == golden.hours.global_horizontal.tolist()


def test_a_little_below_zero_at_night_is_zero(changed: Changed) -> None:
    assert changed(put(GLOBAL, [0], -3)).hours.global_horizontal[0] == 0


@pytest.mark.parametrize(
    ("column", "name", "title", "rest"),
    [
        (GLOBAL, "global_horizontal", "global horizontal irradiance", "the direct and the diffuse one"),
        (DIRECT, "direct_normal", "direct normal irradiance", "the global and the diffuse one"),
        (DIFFUSE, "diffuse_horizontal", "diffuse horizontal irradiance", "the global and the direct one"),
    ],
)
def test_a_part_of_the_light_follows_from_the_others(
    changed: Changed, golden: HourlyClimate, column: int, name: str, title: str, rest: str
) -> None:
    climate = changed(put(column, slice(NOON, NOON + 2), 9999))
    assert climate.notes == (
        f"2 hours of the weather file have no usable {title} (first: hour 12 of 21 January): worked out from {rest}.",
    )
    # The parts of the file are rounded to 1 W/m² each: half of it for each of the two others, over cos z of 0.5.
    found, expected = getattr(climate.hours, name), getattr(golden.hours, name)
    assert found[NOON : NOON + 2] == pytest.approx(expected[NOON : NOON + 2], abs=3.0)


@pytest.mark.parametrize("nothing", [0, 9999])
def test_a_column_without_direct_light(changed: Changed, golden: HourlyClimate, nothing: float) -> None:
    climate = changed(put(DIRECT, slice(None), nothing))
    (note,) = climate.notes
    assert note.endswith("no usable direct normal irradiance (first: hour 8 of 1 January): worked out from the global "
                         "and the diffuse one.")  # fmt: skip
    assert climate.irradiation([90], [180], 0.2) == pytest.approx(golden.irradiation([90], [180], 0.2), rel=0.01)


@pytest.mark.parametrize("nothing", [0, 9999])
def test_a_column_without_global_light(changed: Changed, golden: HourlyClimate, nothing: float) -> None:
    climate = changed(put(GLOBAL, slice(None), nothing))
    (note,) = climate.notes
    assert note.endswith(OF_DIRECT_AND_DIFFUSE)
    assert climate.horizontal_irradiation == pytest.approx(golden.horizontal_irradiation, rel=0.005)


def test_global_light_alone_is_split(changed: Changed, golden: HourlyClimate) -> None:
    climate = changed(both(put(DIRECT, slice(None), 9999), put(DIFFUSE, slice(None), 9999)))
    (note,) = climate.notes
    assert note.endswith(
        "hours of the weather file have no usable direct and diffuse irradiance (first: hour 8 of 1 January): global "
        "irradiance was split by Erbs, Klein and Duffie."
    )
    assert climate.horizontal_irradiation.tolist() == golden.horizontal_irradiation.tolist()
    # Measured: 3.0 % less on a south wall over the year, 5.9 % at most in a month.
    south, expected = climate.irradiation([90], [180], 0.2), golden.irradiation([90], [180], 0.2)
    assert south.sum() == pytest.approx(expected.sum(), rel=0.05)
    assert south == pytest.approx(expected, rel=0.1)


def test_direct_light_alone_is_not_enough(message: Message) -> None:
    assert message(both(put(GLOBAL, slice(None), 9999), put(DIFFUSE, slice(None), 9999))) == (
        "mine.epw  Weather: found no global horizontal irradiance in any hour; expected values from 0 to 1500 W/m² "
        "without gaps of more than 6 h. Fill in the missing global horizontal irradiance of the weather file or give "
        "another file."
    )


def test_a_table_without_temperature(tmp_path: Path, golden: HourlyClimate) -> None:
    text = hourly_table(golden.hours, golden.site, 0.5, {"Name": "Mine"}).replace("Temperature [°C]", "Something else")
    (tmp_path / "mine.csv").write_text(text, encoding="utf-8")
    with pytest.raises(InputError) as caught:
        open_climate("mine.csv", tmp_path)
    assert str(caught.value) == (
        "mine.csv  Weather: found no column of outdoor temperature; expected values from -90 to 60 °C without gaps of "
        "more than 6 h. Fill in the missing outdoor temperature of the weather file or give another file."
    )


# --- place --------------------------------------------------------------------------------------------------------


def with_zone(tmp_path: Path, write_epw: WriteEpw, zone: str, change: Change | None = None) -> Path:
    path = tmp_path / write_epw(change)
    path.write_text(path.read_text(encoding="utf-8").replace(",-7.0,", f",{zone},", 1), encoding="utf-8")
    return path


def test_a_time_zone_with_the_wrong_sign(tmp_path: Path, golden: HourlyClimate, write_epw: WriteEpw) -> None:
    climate = open_climate(str(with_zone(tmp_path, write_epw, "7.0")), tmp_path)
    assert climate.notes == (
        "The weather file states the time zone 7 h at longitude -105.18°; that of the sun, -7 h, is used, since with "
        "it global, direct and diffuse irradiance agree.",
    )
    assert climate.irradiation([90], [180], 0.2) == pytest.approx(golden.irradiation([90], [180], 0.2), rel=1e-12)


def test_an_impossible_time_zone_that_cannot_be_proved(tmp_path: Path, write_epw: WriteEpw) -> None:
    without_parts = both(put(DIRECT, slice(None), 9999), put(DIFFUSE, slice(None), 9999))
    with pytest.raises(InputError) as caught:
        open_climate(str(with_zone(tmp_path, write_epw, "7.0", without_parts)), tmp_path)
    assert str(caught.value) == (
        "mine.epw  Weather: found the time zone 7 h at longitude -105.18°; expected a time zone within 3.5 h of that "
        "of the sun, -7 h. Correct time zone or longitude in the weather file or give them on the sheet Project."
    )


def test_the_workbooks_time_zone_mends_a_file(tmp_path: Path, golden: HourlyClimate, write_epw: WriteEpw) -> None:
    climate = open_climate(str(with_zone(tmp_path, write_epw, "7.0")), tmp_path, time_zone=-7.0)
    assert climate.notes == ("The time zone -7 h of the workbook is used instead of 7 h of the weather file.",)
    assert climate.site == golden.site


def test_an_hour_off_without_parts_is_seen_at_night(changed: Changed) -> None:
    without_parts = both(put(DIRECT, slice(None), 9999), put(DIFFUSE, slice(None), 9999))
    note = changed(without_parts, time_zone=-8.5).notes[-1]
    assert note == (
        "The weather file has 1.9 % of the sunlight in hours when the sun is down. Check time zone, longitude and the "
        "order of the hours of the weather file."
    )


def test_light_at_night(message: Message) -> None:
    def twelve_hours_late(frame: pd.DataFrame) -> pd.DataFrame:
        for column in (GLOBAL, DIRECT, DIFFUSE):
            frame[column] = np.roll(frame[column].to_numpy(), 12)
        return frame

    assert message(twelve_hours_late) == (
        "mine.epw  Weather: found 92.8 % of the sunlight in hours when the sun is down; expected sunlight by day. "
        "Check time zone, longitude and the order of the hours of the weather file."
    )


def test_a_southern_latitude(tmp_path: Path, golden: HourlyClimate) -> None:
    """The same hours half a year later south of the equator: north and south walls change places.

    The sun is about 7 % stronger in January than in July, and declinations half a year apart mirror each other
    within a degree.
    """
    hours = golden.hours
    half = 182 * 24
    late = Hours(*(np.roll(values, half) for values in (hours.temperature, *hours.light)))
    site = golden.site._replace(latitude=-golden.latitude)
    (tmp_path / "south.csv").write_text(hourly_table(late, site, 0.5, {"Name": "South"}), encoding="utf-8")
    climate = open_climate("south.csv", tmp_path)
    assert climate.notes == ()
    north, south = climate.irradiation([90, 90], [0, 180], 0.2).sum(axis=1)
    assert [south, north] == pytest.approx(golden.irradiation([90, 90], [0, 180], 0.2).sum(axis=1).tolist(), rel=0.02)
