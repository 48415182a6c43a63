"""Odd workbooks that are no fault: what a user may do to the sheets without changing the result."""

from __future__ import annotations

from pathlib import Path
from typing import TYPE_CHECKING

import pytest

from heatledger.inputs.cells import Cell
from heatledger.inputs.workbook_rows import check_rows
from heatledger.workbook.reader import read_cells

if TYPE_CHECKING:
    from tests.conftest import Book, Changes, Value

ODDITIES: dict[str, Changes] = {
    "own column with a note": {"Openings!H4": "Remarks", "Openings!H5": "check on site", "Openings!I6": 3.5},
    "own column between": {"Zones!M4": "Tenant", "Zones!M5": "J. Doe", "Zones!M8": "left over"},
    "words in the rows above": {"Envelope!A2": "Survey of May", "Envelope!G2": "Area", "Envelope!C1": 2024},
    "other case and outer spaces": {
        **{"Envelope!B5": " house ", "Envelope!B6": "HOUSE", "Envelope!D5": "Outdoors ", "Zones!B5": "HEATED"},
        **{"Openings!B5": "south WALL", "Build-ups!C6": "wool ", "Build-ups!A6": "WALL", "Envelope!H5": "s"},
    },
    "titles in other case, with line breaks": {"Zones!E4": "FLOOR\nAREA ", "Envelope!A4": "element"},
    "labels in other case": {"Project!A5": " weather "},
    "empty cells that hold white space": {"Zones!A7": "  ", "Envelope!F5": " ", "Thermal bridges!E5": "\n"},
    "spare rows between": {"Envelope!A12": None, "Envelope!J14": "  "},
    "unit written in brackets": {"Build-ups!D3": "[mm]", "Envelope!G3": "gross"},
    "rate in one of its units": {"Air systems!D3": "1/h"},
    "sheets of the user": {"Survey!A1": "Zone", "Survey!B1": "="},
    "azimuth of a level element left out": {"Envelope!I8": 0, "Envelope!H8": None},
    "set-points that are equal": {"Usage!C5": 20},
    "openings that fill their element": {"Openings!D5": 1, "Openings!E5": 10, "Openings!F5": 2},
    "layers in any order": {"Build-ups!B5": 2, "Build-ups!B6": 1},
    "whole number stored with a fraction of nought": {"Openings!D5": 2.0},
    "natural air without rate": {"Air systems!D5": None},
    "unconditioned zone tied through another": {
        **{"Zones!A7": "Eaves", "Zones!B7": "unconditioned", "Zones!E7": 5, "Zones!F7": 12},
        **{"Envelope!A9": "Hatch", "Envelope!B9": "Eaves", "Envelope!C9": "partition", "Envelope!D9": "Loft"},
        **{"Envelope!F9": 2, "Envelope!G9": 1},
    },
}


@pytest.mark.parametrize("name", ODDITIES)
def test_oddities_are_no_problem(cottage: Book, name: str) -> None:
    cottage.sheets["Survey"] = {}

    assert cottage.change(ODDITIES[name]).problems() == []


def test_names_typed_as_numbers_are_names(cottage: Book) -> None:
    changes: dict[str, Value] = {"Zones!A5": 101, "Zones!A6": "102", "Envelope!D7": 102, "Envelope!B8": 102.0}
    changes |= {f"Envelope!B{row}": "101" for row in (5, 6, 7)} | {"Ground floors!B5": 101, "Thermal bridges!B5": 101}

    rows = cottage.change(changes).rows()

    assert [zone.name for zone in rows.zones] == ["101", "102"]
    assert [element.zone for element in rows.elements] == ["101", "101", "101", "102"]


def test_moved_columns_and_rows_read_alike(cottage: Book) -> None:
    expected = cottage.rows()
    for sheet in list(cottage.sheets)[1:]:
        last = max(column for _, column in cottage.sheets[sheet])
        moved = {(row + 3, 2 * last - column): value for (row, column), value in cottage.sheets[sheet].items()}
        cottage.sheets[sheet] = moved

    rows = cottage.rows()

    for sheet in cottage.sheets:
        assert [row.model_dump() for row in rows.of(sheet)] == [row.model_dump() for row in expected.of(sheet)]


def test_a_problem_names_the_cell_of_a_moved_column(cottage: Book) -> None:
    openings = cottage.sheets["Openings"]
    cottage.sheets["Openings"] = {(row + 2, column + 3): value for (row, column), value in openings.items()}

    assert cottage.change({"Openings!H7": -1}).problems() == [
        "Openings!H7  Width [m]: found -1; expected a number above 0 and at most 50. "
        "Type a value in m within these limits.",
    ]


def test_sheet_names_in_any_case_are_found(cottage: Book) -> None:
    assert cottage.change({"Zones": "ZONES", "Air systems": " air Systems"}).problems() == []


def test_empty_optional_sheets_may_be_left_out(cottage: Book) -> None:
    cottage.change({"Thermal bridges": None, "Ground floors": None, "Openings": None, "Glazed units": None})
    cottage.sheets["Ground floors"] = {}

    rows = cottage.rows()

    assert (rows.thermal_bridges, rows.ground_floors, rows.openings, rows.glazed_units) == ((), (), (), ())


def test_a_row_at_fault_brings_no_follow_on_problem(cottage: Book) -> None:
    """One layer, the only element of a zone and its only opening are at fault: each is told once."""
    changes: Changes = {
        **{"Zones!A7": "Annexe", "Zones!B7": "heated", "Zones!C7": "Dwelling", "Zones!E7": 20, "Zones!F7": 50},
        **{"Envelope!A9": "Annexe wall", "Envelope!B9": "Annexe", "Envelope!C9": "wall", "Envelope!D9": "outdoors"},
        **{"Envelope!E9": "Wall", "Envelope!G9": "?", "Envelope!H9": "E", "Build-ups!D5": "?", "Usage!B5": "?"},
    }

    assert [problem.split(":")[0] for problem in cottage.change(changes).problems()] == [
        "Usage!B5  Heating set-point [°C]",
        "Build-ups!D5  Thickness [mm]",
        "Envelope!G9  Area [m²]",
    ]


def test_a_misspelt_zone_of_the_only_element_is_told_once(cottage: Book) -> None:
    cottage.change({"Envelope!7:7": None, "Envelope!B8": "Loff"})

    assert cottage.problems() == [
        "Envelope!B8  Zone: found 'Loff'; expected a name from sheet Zones. Did you mean 'Loft'?"
    ]


def test_a_sound_workbook_reads_alike_from_a_real_file(cottage: Book, tmp_path: Path) -> None:
    file = cottage.save(tmp_path / "cottage.xlsx")

    assert check_rows(read_cells(file)) == cottage.rows()


def test_a_number_that_is_none_is_refused(cottage: Book) -> None:
    """No spreadsheet program stores one, but a program that writes files may."""
    assert cottage.change({"Envelope!G5": Cell(float("nan"), "number")}).problems() == [
        "Envelope!G5  Area [m²]: found a value that is no finite number; "
        "expected a number above 0 and at most 1000000. Type a value in m² within these limits."
    ]
