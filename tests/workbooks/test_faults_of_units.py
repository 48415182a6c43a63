"""Values typed in another unit: the likely meaning is offered, by the full sentence."""

from __future__ import annotations

from typing import TYPE_CHECKING

import pytest

if TYPE_CHECKING:
    from tests.conftest import Book, Changes

FAULTS: dict[str, tuple[Changes, str]] = {
    "conductivity in milliwatts": (
        {"Materials!B6": 35},
        "Materials!B6  Conductivity [W/(m·K)]: found 35 for a density of 30 kg/m³; "
        "expected at most 1 for a material below 300 kg/m³. "
        "Type 0.035 if mW/(m·K) were meant, or correct the density.",
    ),
    "insulation in metres": (
        {"Build-ups!D6": 0.1},
        "Build-ups!D6  Thickness [mm]: found 0.1 mm of 'Wool'; expected a thickness in millimetres. "
        "Type 100 if 0.1 m is meant.",
    ),
    "brick in metres": (
        {"Build-ups!D5": 0.25},
        "Build-ups!D5  Thickness [mm]: found 0.25 mm of 'Brick'; expected a thickness in millimetres. "
        "Type 250 if 0.25 m is meant.",
    ),
    "width in millimetres": (
        {"Openings!E5": 1200},
        "Openings!E5  Width [m]: found 1200; expected a number above 0 and at most 50. Type 1.2 if 1200 mm is meant.",
    ),
    "width in centimetres": (
        {"Openings!E5": 120},
        "Openings!E5  Width [m]: found 120; expected a number above 0 and at most 50. Type 1.2 if 120 cm is meant.",
    ),
    "g-value in percent": (
        {"Glazed units!C5": 60},
        "Glazed units!C5  g-value [-]: found 60; expected a number from 0 to 1. Type 0.6 if 60 % is meant.",
    ),
    "set-point in Fahrenheit": (
        {"Usage!B5": 68},
        "Usage!B5  Heating set-point [°C]: found 68; expected a number from 0 to 40. Type 20 if 68 °F is meant.",
    ),
    "zone colder than its setback": (
        {"Usage!I4": "Setback temperature", "Usage!I5": 18, "Zones!I5": 16},
        "Zones!I5  Heating set-point [°C]: found 16 °C with a setback temperature of 18 °C in its usage; "
        "expected a set-point not below the setback. "
        "Correct one of the two temperatures, or give the zone another usage.",
    ),
}


@pytest.mark.parametrize("name", FAULTS)
def test_the_likely_meaning_is_offered(cottage: Book, name: str) -> None:
    changes, sentence = FAULTS[name]
    assert cottage.change(changes).problems() == [sentence]


@pytest.mark.parametrize(
    "material",
    [
        *("Breather membrane", "Vapour retarder, polyamide", "Polyethylene, low density (foil)", "Aluminium foil"),
        *("Roofing membrane, PVC", "Bitumen sheet", "Steel", "Polyethylene, high density"),
    ],
)
def test_thin_sheets_are_no_slip(cottage: Book, material: str) -> None:
    """A foil of 0.2 mm is what it is."""
    changes: Changes = {"Build-ups!A8": "Wall", "Build-ups!B8": 3, "Build-ups!C8": material, "Build-ups!D8": 0.2}
    assert len(cottage.change(changes).rows().build_ups) == 4
