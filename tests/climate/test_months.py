"""Months of an hourly climate, the given monthly climate, and the summary."""

from __future__ import annotations

import numpy as np
import pandas as pd
import pytest

from heatledger.climate.hourly import HourlyClimate
from heatledger.climate.model import Climate
from heatledger.climate.monthly import MonthlyClimate
from heatledger.climate.summary import monthly_summary
from heatledger.errors import InputError

SOUTH = [130.0, 110, 125, 90, 90, 85, 85, 95, 115, 125, 110, 115]
GLOBAL = [78.0, 89, 144, 144, 196, 218, 208, 186, 155, 114, 74, 64]
COLD = [0.0, -1, 6, 6, 15, 23, 22, 23, 19, 10, 3, 1]


@pytest.fixture
def table() -> MonthlyClimate:
    return MonthlyClimate("Hill", COLD, GLOBAL, {(90, 180): SOUTH}, latitude=40.0, altitude=1650.0)


def test_months_are_those_of_the_calendar(golden: HourlyClimate) -> None:
    index = pd.date_range("2001-01-01", periods=8760, freq="h")
    hours = pd.DataFrame({"t": golden.hours.temperature, "g": golden.hours.global_horizontal}, index)
    assert golden.temperature == pytest.approx(hours["t"].resample("MS").mean().to_numpy(), abs=1e-9)
    assert golden.horizontal_irradiation == pytest.approx(hours["g"].resample("MS").sum().to_numpy() / 1000, abs=1e-9)


def test_degree_days_are_from_daily_means(golden: HourlyClimate) -> None:
    daily = (
        pd.Series(golden.hours.temperature, pd.date_range("2001-01-01", periods=8760, freq="h")).resample("D").mean()
    )
    expected = (18.0 - daily).clip(lower=0.0).resample("MS").sum()
    assert golden.heating_degree_days(18.0) == pytest.approx(expected.to_numpy(), abs=1e-9)


def test_degree_days_from_monthly_means_are_a_lower_bound(golden: HourlyClimate) -> None:
    from_months = MonthlyClimate("Golden", golden.temperature, golden.horizontal_irradiation, {})
    lower, daily = from_months.heating_degree_days(18.0), golden.heating_degree_days(18.0)
    assert (lower <= daily + 1e-9).all()
    # January is cold throughout, so both are (18 - mean)·31.
    assert lower[0] == pytest.approx(daily[0], rel=1e-9)


def test_both_climates_serve_as_a_climate(golden: HourlyClimate, table: MonthlyClimate) -> None:
    climates: list[Climate] = [golden, table]
    assert [climate.altitude for climate in climates] == [1876.0, 1650.0]


def test_given_planes_come_back(table: MonthlyClimate) -> None:
    assert table.irradiation([0, 90, 90], [45, 180, 540], 0.2).tolist() == [GLOBAL, SOUTH, SOUTH]
    assert table.irradiation([], [], 0.2).shape == (0, 12)
    assert table.temperature.tolist() == COLD


def test_a_plane_that_was_not_given(table: MonthlyClimate) -> None:
    with pytest.raises(InputError) as caught:
        table.irradiation([90, 90, 90], [180, 0, 0], 0.2)
    assert str(caught.value) == (
        "Hill: found no irradiation for the plane of tilt 90° and azimuth 0°; expected one of the planes given (plane "
        "of tilt 0° and azimuth 0°, plane of tilt 90° and azimuth 180°). Add the twelve values of this plane to the "
        "monthly climate."
    )


def test_rows_that_are_not_twelve_plausible_numbers() -> None:
    with pytest.raises(InputError) as caught:
        MonthlyClimate("Hill", [np.nan] * 12, [1.0] * 11, {(90, 180): [-1.0] * 12})
    assert str(caught.value).splitlines() == [
        "Hill  horizontal irradiation: found 11 values; expected twelve numbers, none of them negative. Give one value "
        "per month.",
        f"Hill  plane of tilt 90° and azimuth 180°: found the values {[-1.0] * 12}; expected twelve numbers, none of "
        "them negative. Give one value per month.",
        f"Hill  temperature: found the values {[np.nan] * 12}; expected twelve numbers. Give one value per month.",
    ]


def test_summary_of_a_climate(golden: HourlyClimate) -> None:
    columns = monthly_summary(golden)
    assert [(column.title, column.unit) for column in columns] == [
        ("Temperature", "°C"),
        ("Degree days below 18 °C", "K·d"),
        ("Horizontal", "kWh/m²"),
        ("North", "kWh/m²"),
        ("East", "kWh/m²"),
        ("South", "kWh/m²"),
        ("West", "kWh/m²"),
    ]
    assert columns[0].year == pytest.approx(golden.hours.temperature.mean(), abs=1e-9)
    assert columns[2].year == pytest.approx(golden.hours.global_horizontal.sum() / 1000, abs=1e-9)
    sides = golden.irradiation([90] * 4, [0, 90, 180, 270], 0.2)
    assert [column.values.tolist() for column in columns[3:]] == sides.tolist()
    assert [column.year for column in columns[3:]] == pytest.approx(sides.sum(axis=1))
