"""What passes between zones and into the ground, as the sheets show it."""

from __future__ import annotations

from dataclasses import dataclass
from io import BytesIO
from typing import TYPE_CHECKING, Any

import numpy as np
import pytest
from openpyxl import Workbook, load_workbook

from heatledger.balance.calculate import calculate
from heatledger.building.resolve import resolve
from heatledger.results import GroundFloorResult, Results, label_of
from heatledger.workbook.printed import shares_in_tenths
from heatledger.workbook.result_sheets import build_result_sheets

if TYPE_CHECKING:
    from tests.conftest import Book


@dataclass(frozen=True)
class Overcast:
    """A climate of the northern half without sun."""

    temperature = 9 - 8 * np.cos(2 * np.pi * np.arange(12) / 12)
    horizontal_irradiation = np.zeros(12)
    name, source, notes = "made for the test", "", ()
    latitude, longitude, altitude, time_zone = 50.0, 8.0, 0.0, 1.0

    def irradiation(self, tilt: Any, azimuth: Any, ground_reflectance: float) -> Any:
        return np.zeros((len(tilt), 12))


@pytest.fixture
def results(cottage: Book) -> Results:
    """The sound workbook with its loft heated to 16 °C, below a house of 20 °C."""
    changes: dict[str, Any] = {"Zones!B6": "heated", "Zones!C6": "Dwelling", "Zones!I6": 16}
    return calculate(resolve(cottage.change(changes).rows()), Overcast())  # type: ignore[arg-type]


@pytest.fixture
def book(results: Results) -> Workbook:
    return load_workbook(BytesIO(build_result_sheets(results)))


def column(book: Workbook, sheet: str, number: int) -> list[Any]:
    return [cell.value for (cell,) in book[sheet].iter_rows(min_col=number, max_col=number)]


def test_what_passes_between_conditioned_zones_is_no_part_of_the_sum(book: Workbook, results: Results) -> None:
    names = column(book, "Element losses", 2)
    total = names.index("Sum")
    heads: list[Any] = column(book, "Element losses", 1)
    last = heads.index("Between conditioned zones: heat that the building does not lose") - 2
    leaving, below = names[total + 1 : last + 1], names[last + 1 :]
    assert total == names.index("Element") + 1
    assert "Ceiling" not in leaving
    assert {"South wall", "North wall", "Roof", "Window", "Floor", "Eaves"} <= set(leaving)
    assert [name for name in below if name] == ["Ceiling", "Ceiling"]
    assert heads[total + 1 : last + 1] == list(range(1, len(leaving) + 1))
    assert heads[last + 3] is None
    assert column(book, "Element losses", 10)[last + 3] == "–"
    shown: list[Any] = column(book, "Element losses", 9)
    printed = shown[total + 1 : last + 1]
    assert shown[total] == pytest.approx(sum(printed))
    exact = sum(row.loss for row in results.element_losses if not row.between_zones)
    assert shown[total] == pytest.approx(exact, abs=0.5)
    assert column(book, "Element losses", 10)[total] == pytest.approx(100.0)


def test_the_summary_leaves_them_out_and_its_shares_are_a_hundred_as_printed(book: Workbook) -> None:
    names, kwh, share = (column(book, "Summary", number) for number in (1, 2, 4))
    first, total = names.index("Walls"), names.index("Sum")
    assert kwh[names.index("Partitions")] == 0
    assert kwh[total] == pytest.approx(sum(kwh[first:total]))
    assert sum(round(10 * value) for value in share[first:total]) == 1000
    assert share[total] == pytest.approx(100.0)


def test_a_ground_floor_has_its_block_on_the_monthly_balance(book: Workbook, results: Results) -> None:
    (floor,) = results.ground_floors
    titles = column(book, "Monthly balance", 1)
    top = titles.index("Floor · slab on ground · House")
    for place, name in enumerate(("temperature", "heat_flow_heating", "heat_flow_cooling"), start=top + 1):
        assert titles[place] == label_of(GroundFloorResult, name)
        months = [book["Monthly balance"].cell(place + 1, month).value for month in range(2, 14)]
        assert months == pytest.approx(getattr(floor, name).tolist())
    facts = {
        titles[row]: values[row]
        for titles, values in (
            [column(book, "Monthly balance", number) for number in pair] for pair in ((1, 2), (4, 8), (10, 14))
        )
        for row in range(top + 4, top + 7)
    }
    assert facts["Characteristic dimension B′ [m]"] == pytest.approx(60 / 16)
    assert facts["Steady coefficient H_g [W/K]"] == pytest.approx(floor.coefficient)
    assert facts["Periodic coefficient inside H_pi [W/K]"] == pytest.approx(floor.inside_periodic_coefficient)
    assert facts["Periodic coefficient outside H_pe [W/K]"] == pytest.approx(floor.outside_periodic_coefficient)
    assert facts["Lag behind the outdoor temperature β [months]"] == 1


def test_ground_floors_are_written_to_json(results: Results) -> None:
    (floor,) = results.to_json()["ground_floors"]
    assert floor["name"] == "Floor"
    assert len(floor["temperature"]) == len(floor["heat_flow_heating"]) == 12


@pytest.mark.parametrize(
    ("parts", "shares"),
    [
        ([2.0, 1.0, 1.0], [50.0, 25.0, 25.0]),
        ([1.0, 1.0, 1.0, 0.0], [33.4, 33.3, 33.3, 0.0]),
        ([110.0, -10.0], [110.0, -10.0]),
        ([1.0, 1.0, 1.0, 1.0, 1.0, 1.0, 1.0], [14.3, 14.3, 14.3, 14.3, 14.3, 14.3, 14.2]),
        ([0.0, 0.0], [0.0, 0.0]),
        ([], []),
    ],
)
def test_shares_as_printed_add_up_to_a_hundred(parts: list[float], shares: list[float]) -> None:
    assert shares_in_tenths(parts) == pytest.approx(shares)
