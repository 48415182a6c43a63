"""Rounding for print: parts that make up their sums, in every table."""

from __future__ import annotations

from dataclasses import replace
from typing import TYPE_CHECKING, Any

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from heatledger.balance.calculate import calculate
from heatledger.building.resolve import resolve
from heatledger.results import Results
from heatledger.workbook.printed import energy_digits, in_steps, printed

if TYPE_CHECKING:
    from tests.conftest import Book


class Mild:
    """A climate with sun all over the sky."""

    temperature = 10 - 9 * np.cos(2 * np.pi * np.arange(12) / 12)
    horizontal_irradiation = np.full(12, 90.0)
    name, source, notes = "made for the test", "", ()
    latitude, longitude, altitude, time_zone = 50.0, 8.0, 0.0, 1.0

    def irradiation(self, tilt: Any, azimuth: Any, ground_reflectance: float) -> Any:
        return np.full((len(tilt), 12), 61.7)


@pytest.fixture
def results(cottage: Book) -> Results:
    changes: dict[str, Any] = {"Zones!B6": "heated", "Zones!C6": "Dwelling", "Zones!I6": 16}
    return calculate(resolve(cottage.change(changes).rows()), Mild())  # type: ignore[arg-type]


@pytest.mark.parametrize(
    ("values", "step", "expected"),
    [
        ([1.4, 1.4, 1.4], 1.0, [2, 1, 1]),
        ([0.5, 0.5], 1.0, [1, 0]),
        ([2.6, 2.6, 0.0], 1.0, [3, 2, 0]),
        ([-1.4, 2.4], 1.0, [-1, 2]),
        ([0.1, 0.2], 0.1, [0.1, 0.2]),
        ([np.nan, 1.2], 1.0, [np.nan, 1]),
        ([], 1.0, []),
    ],
)
def test_parts_make_up_the_rounded_sum(values: list[float], step: float, expected: list[float]) -> None:
    assert in_steps(values, step).tolist() == pytest.approx(expected, nan_ok=True)


@settings(max_examples=60, deadline=None)
@given(st.lists(st.floats(-1e5, 1e5), min_size=1, max_size=40))
def test_no_part_moves_by_a_step_and_nothing_stays_nothing(values: list[float]) -> None:
    rounded = in_steps([*values, 0.0], 1.0)
    assert np.max(np.abs(rounded - [*values, 0.0])) < 1.0 + 1e-6
    assert abs(np.sum(rounded) - sum(values)) <= 0.5 + 1e-6
    assert rounded[-1] in {0.0, 1.0}
    assert in_steps(rounded, 1.0).tolist() == rounded.tolist()


def test_the_building_is_the_sum_of_its_zones_and_keeps_its_year(results: Results) -> None:
    shown = printed(results)
    for field in ("heating_need", "cooling_need"):
        zones = [getattr(zone, field) for zone in shown.zones]
        assert getattr(shown.building, field).tolist() == np.sum(zones, axis=0).tolist()
        exact = np.sum(getattr(results.building, field))
        assert np.sum(getattr(shown.building, field)) == round(float(exact))


def test_losses_make_up_their_sum_and_their_shares_a_hundred(results: Results) -> None:
    leaving = [loss for loss in printed(results).element_losses if not loss.between_zones]
    exact = sum(loss.loss for loss in results.element_losses if not loss.between_zones)
    assert sum(loss.loss for loss in leaving) == round(exact)
    assert sum(round(10 * loss.share) for loss in leaving) == 1000


def test_the_exact_results_are_left_alone(results: Results) -> None:
    before = results.to_json()
    printed(results)
    assert results.to_json() == before


@pytest.mark.parametrize(
    ("factor", "digits"),
    [(1.0, '#,##0;-#,##0;"–"'), (0.01, '#,##0.0;-#,##0.0;"–"'), (0.001, '#,##0.00;-#,##0.00;"–"')],
)
def test_small_energies_keep_their_decimals(results: Results, factor: float, digits: str) -> None:
    names = ("heating_need", "cooling_need", "transmission_heating")
    zones = tuple(replace(zone, **{name: getattr(zone, name) * factor for name in names}) for zone in results.zones)
    small = replace(results, zones=zones)
    assert energy_digits(small) == digits
    assert energy_digits(printed(small)) == digits
