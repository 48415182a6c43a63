"""What the reader is told: every check, default and source by its full text, with its cell."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

import numpy as np
import pytest

from heatledger.balance.calculate import calculate
from heatledger.building.model import Building
from heatledger.errors import InputError
from heatledger.results import Note

OUTDOOR = np.array([-2.0, 0, 5, 9, 14, 18, 21, 20, 16, 10, 4, -1])
SUN = np.array([40.0, 60, 90, 110, 130, 135, 140, 125, 95, 65, 42, 35])

Values = dict[str, list[dict[str, Any]]]


def sound() -> Values:
    """A zone that no check points at."""
    zone = {"name": "Hall", "conditioning": "heated and cooled", "usage": "Use", "air_system": "Air"}
    return {
        "Project": [{"project": "P", "weather": "x", "dimensions": "internal"}],
        "Zones": [{**zone, "floor_area": 100.0, "air_volume": 260.0, "leakage": 3.0, "thermal_mass": "medium"}],
        "Usage": [{"name": "Use", "heating_set_point": 20.0, "cooling_set_point": 26.0, "air_per_area": 1.0}],
        "Air systems": [{"name": "Air", "kind": "natural", "rate": 0.5}],
        "Glazed units": [{"name": "Double", "u_value": 1.3, "g_value": 0.6, "frame_share": 30.0}],
        "Envelope": [
            {
                **{"name": "Wall", "zone": "Hall", "kind": "wall", "faces": "outdoors", "u_value": 0.3},
                **{"area": 80.0, "azimuth": 180.0, "absorptance": 0.6},
            }
        ],
        "Openings": [{"name": "O", "element": "Wall", "glazed_unit": "Double", "width": 4.0, "height": 3.0}],
        "Thermal bridges": [{"name": "T", "zone": "Hall", "length": 40.0, "linear_transmittance": 0.1}],
    }


@pytest.fixture
def notes(building: Callable[[Any], Building], flat_sky: Any) -> Callable[..., list[Note]]:
    def of(kind: str, changes: dict[str, dict[str, Any]] | None = None, *, without: tuple[str, ...] = ()) -> list[Note]:
        values = {sheet: rows for sheet, rows in sound().items() if sheet not in without}
        for sheet, change in (changes or {}).items():
            values[sheet][0] = values[sheet][0] | change
        found = calculate(building(values), flat_sky(OUTDOOR, SUN)).notes
        return [note for note in found if note.kind == kind]

    return of


def test_a_sound_zone_raises_no_check(notes: Callable[..., list[Note]]) -> None:
    assert notes("check") == []


CHECKS: dict[str, tuple[dict[str, dict[str, Any]], str, str]] = {
    "low floor": (
        {"Zones": {"air_volume": 190.0}, "Air systems": {"rate": 1.0}},
        "Hall: air volume divided by floor area gives 1.90 m; usual is 2 to 6 m.",
        "Zones!F5",
    ),
    "few openings": (
        {"Openings": {"width": 1.0}},
        "Hall: openings are 3.0 % of the floor area; usual is 5 to 50 %.",
        "Zones!E5",
    ),
    "leaky": ({"Zones": {"leakage": 15.0}}, "Hall: leakage n50 is 15 1/h; usual is 0.3 to 12 1/h.", "Zones!K5"),
    "poor wall": (
        {"Envelope": {"u_value": 4.0}},
        "Wall: the U-value is 4 W/(m²·K); usual for a wall is 0.08 to 3 W/(m²·K).",
        "Envelope!F5",
    ),
    "little fresh air": (
        {"Air systems": {"rate": 0.3}},
        "Hall: outdoor air of 78 m³/h on average is less than the 100 m³/h of its usage; too little fresh air harms "
        "health and building. Local codes on hygiene decide.",
        "Zones!D5",
    ),
    "no air system": (
        {"Zones": {"air_system": ""}},
        "Hall: no air system; leakage alone is no planned fresh air. Local codes on hygiene decide.",
        "Zones!D5",
    ),
    "no layers to store heat": (
        {"Zones": {"thermal_mass": "from build-ups"}},
        "Hall: 100 % of its faces have a U-value but no layers, so their heat capacity is missing; choose a class of "
        "thermal mass.",
        "Zones!G5",
    ),
}


@pytest.mark.parametrize("name", CHECKS)
def test_every_check_is_told_with_its_cell(notes: Callable[..., list[Note]], name: str) -> None:
    changes, text, cell = CHECKS[name]
    (note,) = notes("check", changes)
    assert (note.text, f"{note.sheet}!{note.cell}") == (text, cell)


@pytest.mark.parametrize(
    ("dimensions", "why"),
    [
        ("external", "with external dimensions the sum is often near zero, yet single junctions are not"),
        ("internal", "with internal dimensions they add to the loss"),
    ],
)
def test_a_zone_without_bridges(notes: Callable[..., list[Note]], dimensions: str, why: str) -> None:
    (note,) = notes("check", {"Project": {"dimensions": dimensions}}, without=("Thermal bridges",))
    assert note.text == f"Hall: no thermal bridges are entered; {why} (ISO 14683)."


def test_a_zone_that_is_not_cooled_may_overheat(notes: Callable[..., list[Note]]) -> None:
    (note,) = notes("check", {"Zones": {"conditioning": "heated"}, "Usage": {"appliances": 120.0}})
    assert note.text.startswith("Hall: not cooled, but ")
    assert note.text.endswith(
        " kWh/m² a year would have to be removed to stay below 26 °C; "
        "check the risk of overheating with an hourly method."
    )
    assert (note.sheet, note.cell) == ("Zones", "B5")


def test_defaults_that_count_are_listed_once_with_the_first_cell(notes: Callable[..., list[Note]]) -> None:
    told = {note.text: f"{note.sheet}!{note.cell}" for note in notes("default")}
    assert told["Site exposure: empty, taken as normal (moderate shielding, ISO 13789:1999)."].startswith("Project!B")
    assert told["Running hours per day [h] of Air: empty, taken as 24 (runs day and night)."] == "Air systems!E5"
    assert not any("Heat recovery" in text or "Lighting" in text for text in told)


def test_sources_name_weather_and_use(notes: Callable[..., list[Note]]) -> None:
    assert [note.text for note in notes("source")] == ["Weather: made for the test. ", "Usage Use: own values."]


def test_night_cooling_is_explained_where_there_is_any(notes: Callable[..., list[Note]]) -> None:
    line = (
        "Night cooling: its air change for 8 hours a night at the mean outdoor temperature of the month, never beyond "
        "the need. Nights are cooler, but a building stores only so much cold: check with an hourly method."
    )
    assert line not in [note.text for note in notes("method")]
    with_it = notes("method", {"Air systems": {"night_cooling": 2.0, "night_cooling_months": (6, 7)}})
    assert line in [note.text for note in with_it]


def test_a_zone_that_loses_nothing_is_refused(building: Callable[[Any], Building], flat_sky: Any) -> None:
    values = sound()
    values["Thermal bridges"][0]["linear_transmittance"] = -2.0
    values["Zones"][0] |= {"air_system": "", "leakage": 0.0}
    with pytest.raises(InputError) as caught:
        calculate(building(values), flat_sky(OUTDOOR, SUN))
    assert str(caught.value) == (
        "Zones!A5  Zone: found no heat loss from 'Hall'; expected a positive sum of transmission and ventilation. "
        "Give it leakage, an air system, or an element or thermal bridge that loses heat, or join it to another zone."
    )


def test_a_roof_with_a_direction_but_no_tilt(notes: Callable[..., list[Note]]) -> None:
    (note,) = notes("check", {"Envelope": {"kind": "roof"}})
    assert note.text == "Wall: an azimuth without a tilt; taken as level (0°), so it has no say."
    assert (note.sheet, note.cell) == ("Envelope", "H5")


def test_a_fan_that_runs_too_briefly_is_told(notes: Callable[..., list[Note]]) -> None:
    """100 m³/h are asked for while people are there, half of the day; 2 h of 500 m³/h are 42 m³/h."""
    system = {"kind": "balanced", "rate_basis": "floor area", "rate": 5.0, "running_hours": 2.0}
    (note,) = notes("check", {"Air systems": system, "Zones": {"leakage": 0.3, "exposed_facades": "one"}})
    assert note.text == (
        "Hall: outdoor air of 43 m³/h on average is less than the 100 m³/h of its usage; too little fresh air harms "
        "health and building. Local codes on hygiene decide."
    )


def test_a_window_to_another_zone_gets_no_sun(notes: Callable[..., list[Note]]) -> None:
    found = notes("check", {"Envelope": {"faces": "neighbour"}})
    assert "O: no sun is counted, since Wall does not face outdoors." in [note.text for note in found]


def test_the_limits_of_the_air_are_told(notes: Callable[..., list[Note]]) -> None:
    system = {"kind": "balanced", "heat_recovery": 80.0, "frost_limit": -3.0, "fan_power": 0.3}
    lines = [note.text for note in notes("method", {"Air systems": system})]
    assert "Air carries 1200 J/(m³·K), at the altitude of the weather file, 0 m (ISO 2533:1975)." in lines
    assert "Fan electricity is reported; its heat is not counted among the gains." in lines
    assert "Cooling need: sensible heat only; drying the air takes more." in lines
    assert (
        "Frost limit of heat recovery: by the mean outdoor temperature of the month, in conditioned zones; colder "
        "hours of milder months are not seen."
    ) in lines


def test_a_material_that_stores_nothing_is_told(building: Callable[[Any], Building], flat_sky: Any) -> None:
    values = sound()
    values["Zones"][0]["thermal_mass"] = "from build-ups"
    values["Envelope"][0] |= {"u_value": None, "build_up": "Wall"}
    values["Materials"] = [{"name": "Own brick", "conductivity": 0.5}]
    values["Build-ups"] = [{"name": "Wall", "layer": 1, "material": "Own brick", "thickness": 365.0}]
    found = calculate(building(values), flat_sky(OUTDOOR, SUN)).notes
    text = "Own brick has no density or no specific heat on sheet Materials, so it stores no heat."
    assert [(note.sheet, note.cell) for note in found if note.kind == "check" and text in note.text] == [
        ("Build-ups", "C5")
    ]
