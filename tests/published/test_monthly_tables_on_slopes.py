"""Published monthly tables of slopes against hours made from their horizontal row alone.

The tables were made with a uniform sky and one mean day for each month; ours have the sky of Perez and days from dull
to clear. So they differ in method, and the bounds state the difference that was measured.

Sources: for 42.075° N, 1.821° E, 609 m, the NASA Surface meteorology and Solar Energy tables (22 years), read as
reproduced by others; for Madison, J. A. Duffie and W. A. Beckman, Solar Engineering of Thermal Processes, Example
2.19.1 (2.20.1 in the 5th edition): the statement was seen in an excerpt, the figures are recalled from memory.
"""

from __future__ import annotations

import numpy as np
import pytest
from numpy.typing import NDArray

from heatledger.climate.hourly import HourlyClimate
from heatledger.climate.model import DAYS_OF_MONTH, month_of_hour
from heatledger.climate.monthly_table import monthly_table_climate
from heatledger.climate.planes import SkyModel, plane_irradiance

HORIZONTAL_42 = [1.81, 2.77, 3.92, 4.66, 5.44, 6.28, 6.56, 5.67, 4.51, 2.96, 2.00, 1.56]
SLOPE_42 = [3.20, 4.07, 4.84, 4.78, 4.99, 5.46, 5.83, 5.59, 5.21, 4.10, 3.35, 2.95]
"""South slope of 42°; both kWh/(m²·d)."""
OPTIMUM_TILT_42 = [64, 55, 42, 24, 12, 4, 10, 20, 36, 51, 61, 66]
"""Tilt to the south with the most irradiation [°]."""

HORIZONTAL_MADISON = [6.44, 9.89, 12.86, 16.05, 21.36, 23.04, 22.58, 20.33, 14.59, 10.48, 6.37, 5.74]
SLOPE_MADISON = [13.7, 17.2, 15.8, 14.7, 16.6, 16.5, 16.8, 17.5, 15.6, 15.2, 11.4, 12.7]
"""South slope of 60°; both MJ/(m²·d)."""
DIFFUSE_MADISON = [0.409, 0.366, 0.435, 0.453, 0.390, 0.381, 0.376, 0.368, 0.423, 0.390, 0.458, 0.409]
"""Monthly diffuse share that the book works out [-]."""
REFLECTANCE_MADISON = [0.7, 0.7, 0.4, 0.2, 0.2, 0.2, 0.2, 0.2, 0.2, 0.2, 0.2, 0.4]

Floats = NDArray[np.float64]
DAYS = np.array(DAYS_OF_MONTH)


@pytest.fixture(scope="module")
def pyrenees() -> HourlyClimate:
    sums = np.array(HORIZONTAL_42) * DAYS
    return monthly_table_climate("Pyrenees", [10.0] * 12, sums, latitude=42.075, longitude=1.821, altitude=609.0)


def madison(sky: SkyModel, diffuse_share: list[float] | None = None) -> Floats:
    """Daily irradiation of the slope [MJ/m²] with the ground of each month."""
    sums = np.array(HORIZONTAL_MADISON) * DAYS / 3.6
    climate = monthly_table_climate(
        "Madison", [10.0] * 12, sums, latitude=43.0, longitude=-89.4, altitude=270.0, diffuse_share=diffuse_share
    )
    reflectance = np.array(REFLECTANCE_MADISON)[month_of_hour()]
    parts = plane_irradiance(
        [60.0], [180.0], climate.sun, climate.hours.light, ground_reflectance=reflectance, sky_model=sky
    )
    daily: Floats = np.bincount(month_of_hour(), (parts.beam + parts.sky + parts.ground)[0]) * 0.0036 / DAYS
    return daily


def year(daily: Floats | list[float]) -> float:
    return float((np.asarray(daily) * DAYS).sum() / 365)


def test_the_slope_of_42_degrees(pyrenees: HourlyClimate) -> None:
    """Measured: the year +3.5 %, months -1.7 to +5.6 %. Klein's mean days with a uniform sky give the year to 0.1 %."""
    slope = pyrenees.irradiation([42.0], [180.0], 0.2)[0] / DAYS
    assert year(slope) == pytest.approx(year(SLOPE_42), rel=0.04)
    assert slope == pytest.approx(SLOPE_42, rel=0.06)


def test_the_best_tilt_of_each_month(pyrenees: HourlyClimate) -> None:
    """About the best tilt the irradiation hardly changes: what is printed as best comes within 1 % of our best."""
    tilts = np.arange(0.0, 91.0)
    irradiation = pyrenees.irradiation(tilts, np.full(91, 180.0), 0.2)
    at_printed = irradiation[OPTIMUM_TILT_42, np.arange(12)]
    assert (at_printed > 0.99 * irradiation.max(axis=0)).all()


def test_madison_with_the_sky_of_perez() -> None:
    """Measured: the year +3.6 %, months -3.7 to +8.7 %."""
    slope = madison("perez")
    assert year(slope) == pytest.approx(year(SLOPE_MADISON), rel=0.04)
    assert slope == pytest.approx(SLOPE_MADISON, rel=0.09)


def test_madison_with_the_books_sky_and_diffuse_share() -> None:
    """What is left is the spread of direct light over the day, which Klein's ratio puts too near sunset in winter.

    Measured: the year -0.9 %, months -6.6 to +4.3 %.
    """
    slope = madison("isotropic", DIFFUSE_MADISON)
    assert year(slope) == pytest.approx(year(SLOPE_MADISON), rel=0.015)
    assert slope == pytest.approx(SLOPE_MADISON, rel=0.07)
