"""Faults of set-backs, months, fans and night cooling: the sentences a user meets, by their full text."""

from __future__ import annotations

from datetime import date
from typing import TYPE_CHECKING

import pytest

if TYPE_CHECKING:
    from tests.conftest import Book, Changes

TITLES: Changes = {
    **{"Usage!I4": "Setback temperature", "Usage!J4": "Heated hours per day", "Usage!K4": "Days in use per week"},
    **{"Usage!L4": "Months out of use", "Air systems!H4": "Frost limit", "Air systems!I4": "Specific fan power"},
    **{"Air systems!J4": "Night cooling", "Air systems!K4": "Night cooling months"},
}
MONTHS = "months as numbers or words, such as 5-9, 11-2, Jun-Aug or 7"
NO_SETBACK = (
    "Usage!I5  Setback temperature [°C]: found an empty cell; expected the temperature kept in hours, on days or "
    "in months without use. Fill in the cell."
)

FAULTS: dict[str, tuple[Changes, str]] = {
    "hours without setback": (
        {"Usage!J5": 16},
        NO_SETBACK,
    ),
    "days without setback": (
        {"Usage!K5": 5},
        NO_SETBACK,
    ),
    "months without setback": (
        {"Usage!L5": "7-8"},
        NO_SETBACK,
    ),
    "setback above the set-point": (
        {"Usage!I5": 21},
        "Usage!I5  Setback temperature [°C]: found 21 °C with a heating set-point of 20 °C; expected a setback not "
        "above the heating set-point. Correct one of the two temperatures.",
    ),
    "too many hours": (
        {"Usage!I5": 16, "Usage!J5": 25},
        "Usage!J5  Heated hours per day [h]: found 25; expected a number above 0 and at most 24. "
        "Type a value in h within these limits.",
    ),
    "months as words that are none": (
        {"Usage!I5": 16, "Usage!L5": "summer"},
        f"Usage!L5  Months out of use: found the text 'summer'; expected {MONTHS}. "
        "Type the first and the last month, such as 5-9.",
    ),
    "months that became a date": (
        {"Usage!I5": 16, "Usage!L5": date(2026, 5, 9)},
        f"Usage!L5  Months out of use: found the date 2026-05-09; expected {MONTHS}. "
        "Format the cell as text and type the value again: 5-9 or 9-5, if that was typed.",
    ),
    "a thirteenth month": (
        {"Usage!I5": 16, "Usage!L5": 13},
        f"Usage!L5  Months out of use: found 13; expected {MONTHS}. Type the first and the last month, such as 5-9.",
    ),
    "night cooling without months": (
        {"Air systems!J5": 2},
        "Air systems!K5  Night cooling months: found an empty cell; expected the months of the night cooling. "
        "Type them, such as 5-9.",
    ),
    "months without night cooling": (
        {"Air systems!K5": "5-9"},
        "Air systems!J5  Night cooling [1/h]: found no air change; expected the air change of the night cooling. "
        "Fill in the air change, or clear the months.",
    ),
    "fans of a natural system": (
        {"Air systems!I5": 0.3},
        "Air systems!I5  Specific fan power [W/(m³/h)]: found 0.3 W/(m³/h) for a natural system; "
        "expected 0 or an empty cell. Clear the cell, or correct the kind.",
    ),
    "frost limit without recovery": (
        {"Air systems!H5": -3},
        "Air systems!H5  Frost limit [°C]: found -3 °C without heat recovery; "
        "expected an empty cell without heat recovery. Clear the cell, or fill in the heat recovery.",
    ),
}


@pytest.mark.parametrize("name", FAULTS)
def test_every_fault_is_told_in_full(cottage: Book, name: str) -> None:
    changes, sentence = FAULTS[name]
    assert cottage.change({**TITLES, **changes}).problems() == [sentence]


@pytest.mark.parametrize(
    ("typed", "months"),
    [("5-9", (5, 6, 7, 8, 9)), ("Nov to Feb", (11, 12, 1, 2)), (7, (7,)), ("6, 8", (6, 8)), ("July", (7,))],
)
def test_months_are_read_as_numbers_and_words(cottage: Book, typed: str | float, months: tuple[int, ...]) -> None:
    rows = cottage.change({**TITLES, "Usage!I5": 16, "Usage!L5": typed}).rows()
    assert rows.usages[0].months_out_of_use == months
