"""Hours made from a table of twelve months: exact sums, a fixed sequence, and how near they come to real hours."""

from __future__ import annotations

from collections.abc import Sequence
from pathlib import Path

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from heatledger.climate import monthly_table
from heatledger.climate.clearness import clearest_day, daily_clearness
from heatledger.climate.files import open_climate
from heatledger.climate.hourly import HourlyClimate
from heatledger.climate.model import DAYS_OF_MONTH, FloatArray, month_of_hour
from heatledger.climate.monthly_table import monthly_table_climate
from heatledger.climate.shipped import shipped_climates
from heatledger.climate.sun import Site
from heatledger.errors import InputError
from heatledger.inputs import rows

WARM = [1.0, 2, 6, 10, 14, 18, 20, 19, 15, 10, 5, 2]
SUNNY = [31.0, 47, 86, 118, 150, 157, 164, 140, 100, 63, 34, 25]
"""kWh/m², of a place at 47° N."""
SIDES = ([90.0, 90.0, 90.0, 90.0, 45.0], [180.0, 0.0, 90.0, 270.0, 180.0])
"""South, north, east, west, and 45° to the south."""


def table_of(climate: HourlyClimate, diffuse_share: Sequence[float] | None = None) -> HourlyClimate:
    """A climate turned into a table of twelve months and back."""
    return monthly_table_climate(
        climate.name,
        climate.temperature,
        climate.horizontal_irradiation,
        latitude=climate.latitude,
        longitude=climate.longitude,
        time_zone=climate.time_zone,
        altitude=climate.altitude,
        diffuse_share=diffuse_share,
    )


@pytest.fixture(scope="module")
def errors() -> dict[str, FloatArray]:
    """Relative error of each side and month for each shipped climate, and of the year as a thirteenth column."""
    found = {}
    for name in shipped_climates():
        climate = open_climate(name, Path())
        true, made = (each.irradiation(*SIDES, 0.2) for each in (climate, table_of(climate)))
        months, year = made / true - 1.0, made.sum(axis=1) / true.sum(axis=1) - 1.0
        found[name] = np.column_stack([months, year])
    return found


def of_year(errors: dict[str, FloatArray], side: int) -> FloatArray:
    return np.array([each[side, 12] for each in errors.values()])


def of_months(errors: dict[str, FloatArray], side: int) -> FloatArray:
    """Root mean square over the months, one for each climate."""
    return np.array([np.sqrt((each[side, :12] ** 2).mean()) for each in errors.values()])


# Measured over the seven shipped climates: year, median and largest; root mean square of the months, largest.
# south +0.5 to -1.2 median -1.1, largest 3.7 (Moffat County), months 7.0; 45° south 2.1 and 5.0; north 5.3 and 9.8;
# east 11.2 and 11.1, west 7.9 and 10.0, both at Golden, whose mornings are clearer than its afternoons.
# The bounds are those that the method was published or asked for with; all are kept.


def test_south_walls(errors: dict[str, FloatArray]) -> None:
    assert -0.02 < np.median(of_year(errors, 0)) < 0.0
    assert np.abs(of_year(errors, 0)).max() < 0.05
    assert of_months(errors, 0).max() < 0.08


def test_roofs_of_45_degrees_to_the_south(errors: dict[str, FloatArray]) -> None:
    assert np.abs(of_year(errors, 4)).max() < 0.03
    assert of_months(errors, 4).max() < 0.06


def test_north_walls(errors: dict[str, FloatArray]) -> None:
    assert np.abs(of_year(errors, 1)).max() < 0.06
    assert of_months(errors, 1).max() < 0.10


@pytest.mark.parametrize("side", [2, 3])
def test_east_and_west_walls(errors: dict[str, FloatArray], side: int) -> None:
    assert np.abs(of_year(errors, side)).max() < 0.12
    assert of_months(errors, side).max() < 0.12


def test_one_mean_day_would_be_far_worse(monkeypatch: pytest.MonkeyPatch) -> None:
    """What the mix of days is for: without it a south wall in New York loses a tenth of its winter sun."""
    climate = open_climate("New York NY", Path())
    monkeypatch.setattr(monthly_table, "daily_clearness", lambda mean, days: np.full(days, mean))
    monkeypatch.setattr(monthly_table, "hourly_spread", np.zeros_like)
    true, made = (each.irradiation([90.0], [180.0], 0.2)[0] for each in (climate, table_of(climate)))
    winter = [0, 1, 10, 11]
    assert made[winter].sum() < 0.9 * true[winter].sum()


@pytest.mark.parametrize("name", ["Golden CO", "Piedmont IT", "Sand Point AK"])
def test_a_diffuse_share_brings_the_hours_nearer(name: str) -> None:
    """With the true share of each month a north wall, which has little else, comes within 5 % a year."""
    climate = open_climate(name, Path())
    shares = sums(climate.hours.diffuse_horizontal) / sums(climate.hours.global_horizontal)
    made = table_of(climate, shares.tolist())
    assert sums(made.hours.diffuse_horizontal) == pytest.approx(sums(climate.hours.diffuse_horizontal), rel=1e-9)
    true = climate.irradiation([90.0], [0.0], 0.2).sum()
    assert made.irradiation([90.0], [0.0], 0.2).sum() == pytest.approx(true, rel=0.05)
    assert "diffuse share by the table" in made.source


def sums(values: FloatArray) -> FloatArray:
    return np.bincount(month_of_hour(), values).astype(np.float64)


@pytest.mark.parametrize("name", shipped_climates())
def test_degree_days_are_estimated_from_the_spread_of_daily_means(name: str) -> None:
    """Measured: 0.2 to 3.4 % where the year has more than 1000 K·d; the monthly means alone give up to 3.5 % less."""
    climate = open_climate(name, Path())
    true, made = (each.heating_degree_days(18.0).sum() for each in (climate, table_of(climate)))
    assert made == pytest.approx(true, rel=0.04, abs=40.0)


def test_sums_and_means_are_those_of_the_table() -> None:
    climate = monthly_table_climate("Hill", WARM, SUNNY, latitude=47.0, longitude=8.0, altitude=450.0)
    assert climate.temperature == pytest.approx(np.array(WARM), abs=1e-9)
    assert climate.horizontal_irradiation == pytest.approx(np.array(SUNNY), rel=1e-12)
    assert climate.notes == ()
    assert climate.closure_errors[0.0] < 1e-12
    assert climate.source == (
        "Monthly table given by the user. Hours built from it: days by Bendt, Collares-Pereira and Rabl, hours by "
        "Collares-Pereira and Rabl, diffuse share by Erbs, Klein and Duffie, daily temperatures by Erbs, Klein and "
        "Beckman."
    )


def test_the_sequence_is_fixed() -> None:
    one, other = (monthly_table_climate("Hill", WARM, SUNNY, latitude=47.0) for _ in range(2))
    for name in ("temperature", "global_horizontal", "direct_normal", "diffuse_horizontal"):
        assert np.array_equal(getattr(one.hours, name), getattr(other.hours, name)), name


def test_clear_and_dull_days_are_spread_over_the_month() -> None:
    """Ten days of a fixed order are as clear as the month within a sixth; ascending, they would differ threefold."""
    climate = monthly_table_climate("Hill", WARM, SUNNY, latitude=47.0)
    outside = monthly_table._year(climate.site).outside.sum(axis=1)
    clearness = climate.hours.global_horizontal.reshape(365, 24).sum(axis=1) / outside
    for month in np.split(clearness, np.cumsum(DAYS_OF_MONTH)[:-1]):
        thirds = [part.mean() for part in np.array_split(month, 3)]
        assert thirds == pytest.approx([month.mean()] * 3, rel=1 / 6)


@pytest.mark.parametrize(
    ("place", "site"),
    [
        ({}, Site(47.0, 0.0, 0.0, 0.0)),
        ({"longitude": 8.0}, Site(47.0, 8.0, 0.0, 1.0)),
        ({"time_zone": -7.0}, Site(47.0, -105.0, 0.0, -7.0)),
        ({"longitude": -3.7, "time_zone": 1.0}, Site(47.0, -3.7, 0.0, 1.0)),
    ],
)
def test_clock_and_longitude_fit_each_other(place: dict[str, float], site: Site) -> None:
    climate = monthly_table_climate(
        "Hill", WARM, SUNNY, latitude=47.0, longitude=place.get("longitude"), time_zone=place.get("time_zone")
    )
    assert climate.site == site
    assert climate.notes == ("The altitude is not given: that of the sea is assumed.",)
    # Hours that start at other instants of the sun's day sample it otherwise: measured, 5.2 % in the December of a west
    # wall, 1.0 % a year.
    reference = monthly_table_climate("Hill", WARM, SUNNY, latitude=47.0)
    found, expected = (each.irradiation(*SIDES, 0.2) for each in (climate, reference))
    assert found == pytest.approx(expected, rel=0.06)
    assert found.sum(axis=1) == pytest.approx(expected.sum(axis=1), rel=0.015)


@pytest.mark.parametrize("share", [0.0, 0.3, 0.7, 1.0])
def test_any_diffuse_share_is_kept(share: float) -> None:
    climate = monthly_table_climate("Hill", WARM, SUNNY, latitude=47.0, diffuse_share=[share] * 6 + [None] * 6)
    found = sums(climate.hours.diffuse_horizontal) / sums(climate.hours.global_horizontal)
    assert found[:6] == pytest.approx([share] * 6, abs=1e-12)
    assert climate.hours.direct_normal.min() >= 0
    assert climate.hours.direct_normal.max() < 1400
    assert climate.closure_errors[0.0] < 1e-12


@settings(max_examples=10, deadline=None)
@given(
    latitude=st.floats(-66, 72),
    clearness=st.lists(st.floats(0.15, 0.75), min_size=12, max_size=12),
    mean=st.floats(-20, 30),
)
def test_any_place_gets_plausible_hours(latitude: float, clearness: list[float], mean: float) -> None:
    outside = monthly_table._year(Site(latitude, 0.0, 0.0, 0.0)).outside.sum(axis=1)
    months = np.bincount(month_of_hour()[::24], outside) / 1000.0 * clearness
    climate = monthly_table_climate("Anywhere", [mean] * 12, months, latitude=latitude)
    assert climate.horizontal_irradiation == pytest.approx(months, rel=1e-9, abs=1e-9)
    assert climate.temperature == pytest.approx([mean] * 12, abs=1e-9)
    for light in climate.hours.light:
        assert np.isfinite(light).all()
        assert light.min() >= 0
        assert light.max() < 1500  # W/m²


def test_a_mirrored_place_swaps_north_and_south() -> None:
    """Latitude of the other sign and months shifted by six, equally clear.

    The sun outside the atmosphere differs by up to 9 % a month, for the orbit is no circle and the months of the
    calendar do not mirror each other; walls follow it.
    """
    outside = {
        latitude: np.bincount(month_of_hour()[::24], monthly_table._year(Site(latitude, 0, 0, 0)).outside.sum(axis=1))
        for latitude in (47.0, -47.0)
    }
    shifted = np.roll(np.array(SUNNY) / outside[47.0], 6) * outside[-47.0]
    north = monthly_table_climate("Hill", WARM, SUNNY, latitude=47.0)
    south = monthly_table_climate("Hill", WARM[6:] + WARM[:6], shifted, latitude=-47.0)
    walls = north.irradiation([90.0, 90.0], [180.0, 0.0], 0.2)
    mirrored = np.roll(south.irradiation([90.0, 90.0], [0.0, 180.0], 0.2), 6, axis=1)
    sun = np.roll(outside[-47.0], 6) / outside[47.0]
    assert mirrored == pytest.approx(walls * sun, rel=0.04)
    assert mirrored.sum(axis=1) == pytest.approx(walls.sum(axis=1), rel=0.02)


def test_the_polar_night_may_hold_nothing() -> None:
    light = [0.0, 5, 40, 100, 150, 170, 160, 110, 55, 15, 1, 0.1]
    climate = monthly_table_climate("North", [-5.0] * 12, light, latitude=70.0)
    assert climate.horizontal_irradiation[1:11] == pytest.approx(np.array(light[1:11]))


def message(*args: object, **kwargs: object) -> str:
    with pytest.raises(InputError) as caught:
        monthly_table_climate(*args, **kwargs)  # type: ignore[arg-type]
    return str(caught.value)


def test_rows_that_are_not_twelve_plausible_numbers() -> None:
    assert message("Hill", WARM[:11], SUNNY, latitude=47.0) == (
        "Hill  mean outdoor temperature: found 11 values; expected twelve numbers from -90 to 60. Give one value per "
        "month."
    )
    assert message("Hill", WARM, [float("nan")] * 12, latitude=47.0) == (
        f"Hill  global horizontal irradiation: found the values {[float('nan')] * 12}; expected twelve numbers from 0 "
        "to 500. Give one value per month."
    )
    assert message("Hill", WARM, SUNNY, latitude=47.0, diffuse_share=[60.0] * 12) == (
        f"Hill  diffuse share: found the values {[60.0] * 12}; expected twelve numbers from 0 to 1. Give one value per "
        "month."
    )


def test_more_sun_than_there_is_and_the_mean_of_a_day() -> None:
    cells = [f"C{row}" for row in range(6, 18)]
    spoiled = [111.6, *SUNNY[1:6], 5.3, *SUNNY[7:]]
    assert message("Hill", WARM, spoiled, latitude=47.0, sheet="Monthly climate", cells=cells).splitlines() == [
        "Monthly climate!C6  Global horizontal irradiation [kWh/m²]: found 111.6 kWh/m² in January; expected at most "
        "77 kWh/m² at this latitude. "
        "Correct latitude or figure; it is the sum of the month in kWh/m² (1 kWh = 3.6 MJ).",
        "Monthly climate!C12  Global horizontal irradiation [kWh/m²]: found 5.3 kWh/m² in July; expected at least 35 "
        "kWh/m² at this latitude. Correct latitude or figure; it is the sum of the whole month, not the mean of a day.",
    ]


@pytest.mark.parametrize("mean", [0.1, 0.3, 0.42, 0.5, 0.7, 0.78])
def test_days_of_a_month(mean: float) -> None:
    """Their mean is that of the month, and they lie between the dullest day and the clearest."""
    days = daily_clearness(mean, 3000)
    assert days.mean() == pytest.approx(mean, abs=1e-3)
    assert (np.diff(days) > 0).all()
    assert days[0] > 0.05
    assert days[-1] < max(clearest_day(mean), mean + 0.02)


def test_the_word_is_the_workbooks() -> None:
    assert monthly_table.MONTHLY_TABLE == rows.MONTHLY_TABLE
