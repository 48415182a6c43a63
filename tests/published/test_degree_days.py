"""Degree days by their definitions, against stations that publish them.

Sources: the definition of the Netherlands' statistics office CBS (base 18 °C, daily means), seen on its page; the
station Ruhstorf, Germany (ruhstorf-wetter.de, years 2019 and 2008), which prints degree days below 12 °C and the sums
of 20 °C less the daily mean on days below 12 °C, seen.
"""

from __future__ import annotations

from pathlib import Path

import numpy as np
import pytest

from heatledger.climate.files import open_climate
from heatledger.climate.hourly import HourlyClimate, Hours
from heatledger.climate.model import DAYS_OF_MONTH, FloatArray
from heatledger.climate.monthly import MonthlyClimate
from heatledger.climate.monthly_table import monthly_table_climate
from heatledger.climate.shipped import shipped_climates
from heatledger.climate.sun import Site

MONTHS_WITH_HEATING = [0, 1, 2, 3, 4, 8, 9, 10, 11]
BELOW_12 = {
    2019: [386.0, 290.1, 150.4, 41.4, 39.3, 6.8, 55.3, 220.2, 306.9],
    2008: [319.0, 248.9, 227.9, 90.4, 6.3, 44.7, 88.3, 216.4, 326.7],
}
"""Degree days below 12 °C of the months with heating [K·d]."""
FROM_20 = {
    2019: [634.0, 514.2, 398.4, 201.4, 151.3, 38.8, 239.3, 460.2, 554.9],
    2008: [567.0, 480.9, 475.9, 274.4, 46.3, 180.7, 272.3, 448.4, 574.7],
}
"""Sums of 20 °C less the daily mean on the days below 12 °C [K·d]."""
DAYS_BELOW_12 = {2019: [31, 28, 31, 20, 14, 4, 23, 30, 31], 2008: [31, 29, 31, 23, 5, 17, 23, 29, 31]}
DARK = np.zeros(8760)


def of_daily_means(means: FloatArray) -> HourlyClimate:
    return HourlyClimate("Station", "", Site(50.0, 10.0, 0.0, 1.0), Hours(np.repeat(means, 24), DARK, DARK, DARK))


@pytest.mark.parametrize(("mean", "degree_days"), [(10.0, 8.0), (-4.0, 22.0), (20.0, 0.0), (18.0, 0.0)])
def test_the_definition_by_daily_means(mean: float, degree_days: float) -> None:
    """One day of this mean in a year that needs no heating otherwise."""
    means = np.full(365, 25.0)
    means[40] = mean
    assert of_daily_means(means).heating_degree_days(18.0)[1] == pytest.approx(degree_days, abs=1e-9)


@pytest.mark.parametrize("year", [2019, 2008])
def test_the_two_sums_of_a_station(year: int) -> None:
    """A year whose days below 12 °C have the mean that the station's sum implies gives both of its sums."""
    means = np.full(365, 25.0)
    starts = np.concatenate([[0], np.cumsum(DAYS_OF_MONTH)[:-1]])
    for month, counted, total in zip(MONTHS_WITH_HEATING, DAYS_BELOW_12[year], BELOW_12[year], strict=True):
        days = min(counted, DAYS_OF_MONTH[month])  # February 2008 had 29
        means[starts[month] : starts[month] + days] = 12.0 - total / days
    climate = of_daily_means(means)
    below_12 = climate.heating_degree_days(12.0)
    assert below_12[MONTHS_WITH_HEATING] == pytest.approx(BELOW_12[year], abs=1e-6)
    # 20 °C less the mean is 12 °C less the mean and 8 K, on each of these days; sums are printed to 0.1.
    cold = (means < 12.0).astype(np.float64)
    days_below = np.array([part.sum() for part in np.split(cold, starts[1:])])
    if year == 2008:
        days_below[1] = 29
    assert (below_12 + 8.0 * days_below)[MONTHS_WITH_HEATING] == pytest.approx(FROM_20[year], abs=0.11)


@pytest.mark.parametrize("name", shipped_climates())
@pytest.mark.parametrize("base", [12.0, 15.5, 18.0, 20.0])
def test_degree_days_are_convex_in_the_temperature(name: str, base: float) -> None:
    """Twelve means give a lower bound, and so does the table made to hours for the days of its means."""
    climate = open_climate(name, Path())
    months = MonthlyClimate(name, climate.temperature, climate.horizontal_irradiation, {})
    assert (months.heating_degree_days(base) <= climate.heating_degree_days(base) + 1e-9).all()


def test_hours_of_a_table_keep_the_bound() -> None:
    climate = open_climate("Golden CO", Path())
    table = monthly_table_climate("Golden", climate.temperature, climate.horizontal_irradiation, latitude=39.73)
    months = MonthlyClimate("Golden", climate.temperature, climate.horizontal_irradiation, {})
    assert (months.heating_degree_days(18.0) <= table.heating_degree_days(18.0) + 1e-9).all()
