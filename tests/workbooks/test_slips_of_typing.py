"""What people type in a hurry: numbers as text, other words, other titles, sheets under another name."""

from __future__ import annotations

from datetime import date
from pathlib import Path
from typing import TYPE_CHECKING

import pytest
from openpyxl import load_workbook

from heatledger.errors import InputError
from heatledger.inputs.cells import Cell
from heatledger.inputs.rows import SHEETS
from heatledger.inputs.titles import column_titles, read_title
from heatledger.inputs.workbook_rows import check_rows
from heatledger.workbook.reader import read_cells

if TYPE_CHECKING:
    from tests.conftest import Book, Changes, Value

NO_TEXT = "Type a number, without unit or words."
NUMBERS: list[tuple[str, str, str]] = [
    ("Zones!E5", "1 000", "Type 1000 as a number."),
    ("Zones!E5", "1\u00a0000,5", "Type 1000.5 as a number."),
    ("Zones!E5", "1\u202f000", "Type 1000 as a number."),
    ("Zones!E5", "1’200", "Type 1200 as a number."),
    ("Zones!E5", "1.200,50", "Type 1200.5 as a number."),
    ("Zones!E5", "1,200.50", "Type 1200.5 as a number."),
    ("Zones!E5", "1.200.000", "Type a value in m² within these limits."),
    ("Zones!E5", "1.200", "Type 1200 or 1.200 as a number."),
    ("Zones!E5", "１２", "Type 12 as a number."),
    ("Zones!E5", "12\u200b", "Type 12 as a number."),
    ("Zones!E5", "½", "Type 0.5 as a number."),
    ("Zones!E5", "12,5 qm", "Type 12.5 as a number."),
    ("Zones!E5", "12 sq m", "Type 12 as a number."),
    ("Zones!E5", "12 m^2", "Type 12 as a number."),
    ("Zones!E5", "100 ft²", "Type 9.2903 for 100 ft²."),
    ("Zones!E5", "approx. 12", "Type 12 alone, as a number."),
    ("Zones!E5", "~12", "Type 12 alone, as a number."),
    ("Zones!E5", "12?", "Type 12 alone, as a number."),
    ("Zones!E5", "12 (estimated)", "Type 12 alone, as a number."),
    ("Zones!E5", "5+7", "Type one number."),
    ("Zones!E5", "10-12", "Type one number."),
    ("Zones!E5", "12 5", "Type one number."),
    ("Zones!E5", "12,,5", NO_TEXT),
    ("Zones!E5", "1.2.3", NO_TEXT),
    ("Zones!E5", "n/a", "Type a number."),
    ("Zones!E5", "12 acres", "Convert it to m² and type the number alone."),
    ("Zones!K5", "-", "Clear the cell to leave it open, or type a number."),
    ("Zones!K5", "TBD", "Clear the cell to leave it open, or type a number."),
    ("Zones!K5", "3 1/h", "Type 3 as a number."),
    ("Zones!K5", "3/h", "Type 3 as a number."),
    ("Zones!K5", "3 ACH", "Type 3 as a number."),
    ("Zones!K5", "-3", "Type a value in 1/h within these limits."),
    ("Zones!I5", "21 degC", "Type 21 as a number."),
    ("Zones!I5", "68 °F", "Type 20 for 68 °F."),
    ("Openings!E5", "4'", "Type 1.2192 for 4 ft."),
    ("Openings!E5", "1,2x1,5", "Type one number."),
    ("Openings!E5", "120", "Type 1.2 if 120 cm is meant."),
    ("Openings!D5", "2x", "Type 2 alone, as a number."),
    ("Build-ups!D5", "0.25 m", "Type 250 for 0.25 m."),
    ("Build-ups!D5", "25 cm", "Type 250 for 25 cm."),
    ("Build-ups!D5", '10"', "Type 254 for 10 in."),
    ("Materials!B5", "0,77 W/mK", "Type 0.77 as a number."),
    ("Materials!B5", "λ=0,77", "Type 0.77 alone, as a number."),
    ("Materials!B5", "770 mW/(m K)", "Type 0.77 for 770 mW/(m·K)."),
    ("Glazed units!B5", "1,3 W/m²K", "Type 1.3 as a number."),
    ("Glazed units!B5", "1.3 W/(m2·K)", "Type 1.3 as a number."),
    ("Glazed units!B5", "<1.3", "Type 1.3 alone, as a number."),
    ("Glazed units!D5", "0,35", "Type 35 for 35 %."),
    ("Glazed units!D5", "130 %", "Type a value in % within these limits."),
    ("Air systems!F6", "0,78", "Type 78 for 78 %."),
    ("Envelope!H6", "180 deg", "Type 180 as a number."),
    ("Envelope!H6", "-90", "Count clockwise from north: 90 is east, 180 south, 270 west."),
    ("Envelope!H6", "Südwest", "Did you mean 'SW'?"),
    ("Envelope!H6", "S/W", "Did you mean 'SW'?"),
]
VALUES: list[tuple[str, Value, str]] = [
    ("Zones!E5", 0, "found 0; expected a number above 0 and at most 1000000. Type a value in m² within these limits."),
    ("Zones!I5", 293, "found 293; expected a number from 0 to 40. Type 19.9 if 293 K is meant."),
    ("Zones!I5", 45, "found 45; expected a number from 0 to 40. Type a value in °C within these limits."),
    ("Project!B6", 9000, "found 9000; expected a number from -430 to 5500. Type 2743 if 9000 ft is meant."),
    ("Materials!D5", 1, "found 1; expected a number from 50 to 5000. Type 1000 if 1 kJ/(kg·K) is meant."),
    (
        "Materials!B5",
        40,
        "found 40 for a density of 1700 kg/m³; expected at most 6 for a material below 2500 kg/m³. "
        "Type 0.04 if mW/(m·K) were meant, or correct the density.",
    ),
    (
        "Air systems!F6",
        1,
        "found 1; expected 0, or a number above 1 and at most 98, in percent. Type the share in percent.",
    ),
    (
        "Air systems!E6",
        Cell("10:00:00", "date"),
        "found the time 10:00:00; expected a number from 0 to 24. "
        "Format the cell as a number and type the value again: 10, if that was typed.",
    ),
    (
        "Openings!E5",
        date(2025, 5, 1),
        "found the date 2025-05-01; expected a number above 0 and at most 50. "
        "Format the cell as a number and type the value again: 1.5, if that was typed.",
    ),
]
FACES = "expected outdoors, neighbour, or a name from sheet Zones."
KINDS = "expected one of: wall, roof, floor, door, partition."
CONDITIONING = "expected one of: heated, heated and cooled, unconditioned."
WORDS: list[tuple[str, str, str]] = [
    ("Envelope!D6", "outside", f"found 'outside'; {FACES} Did you mean 'outdoors'?"),
    ("Envelope!D6", "air", f"found 'air'; {FACES} Did you mean 'outdoors'?"),
    ("Envelope!D6", "adiabatic", f"found 'adiabatic'; {FACES} Did you mean 'neighbour'?"),
    (
        "Envelope!D6",
        "ground",
        f"found 'ground'; {FACES} Move it to sheet Ground floors, which also takes the walls of a basement.",
    ),
    (
        "Envelope!B6",
        "outdoors",
        "found 'outdoors'; expected a name from sheet Zones. Choose from the list of the cell.",
    ),
    ("Envelope!C6", "external wall", f"found the text 'external wall'; {KINDS} Did you mean 'wall'?"),
    ("Envelope!C6", "window", f"found the text 'window'; {KINDS} Choose from the list of the cell."),
    ("Zones!B5", "unheated", f"found the text 'unheated'; {CONDITIONING} Did you mean 'unconditioned'?"),
    (
        "Zones!B5",
        "heated & cooled",
        f"found the text 'heated & cooled'; {CONDITIONING} Did you mean 'heated and cooled'?",
    ),
    ("Zones!B5", "cooled", f"found the text 'cooled'; {CONDITIONING} Did you mean 'heated and cooled'?"),
    ("Air systems!G6", "ja", "found the text 'ja'; expected one of: yes, no. Did you mean 'yes'?"),
    (
        "Build-ups!C5",
        "mineral wool",
        "found 'mineral wool'; expected unventilated air layer, slightly ventilated air layer, well ventilated air "
        "layer, or a name from sheet Materials. Choose from the list of the cell, such as 'Mineral wool 0.032'.",
    ),
    (
        "Build-ups!C5",
        "air gap",
        "found 'air gap'; expected unventilated air layer, slightly ventilated air layer, well ventilated air layer, "
        "or a name from sheet Materials. Did you mean 'unventilated air layer'?",
    ),
]
SAME_NAMES = ["HOUSE", " House ", "House\u00a0", "Hou\u00adse", "House\u200b", "Ｈouse"]
TITLES: dict[str, list[str]] = {
    "Thermal bridges!D4": ["Linear transmittance", "linear transmittance psi", "Linear  transmittance:"],
    "Thermal bridges!F4": ["Point transmittance"],
    "Zones!L4": ["Exposed facades", "EXPOSED FACADES", "Exposed fac\u0327ades"],
    "Zones!E4": ["Floor area [m²]", "Floor area (m2)", "Floor area, m²", "floor_area_m2", "Floor area *"],
    "Envelope!F4": ["U value", "U-value [W/(m²·K)]", "U-Value (W/m²K)"],
    "Glazed units!D4": ["Frame share (%)", "Frame share %"],
    "Openings!D4": ["Number (-)", "number."],
    "Project!A5": ["Weather:", "WEATHER"],
}


@pytest.mark.parametrize(("place", "typed", "fix"), NUMBERS)
def test_the_number_meant_is_offered(cottage: Book, place: str, typed: str, fix: str) -> None:
    [problem] = cottage.change({place: typed}).problems()

    assert problem.startswith(place)
    assert problem.partition("; expected ")[2].partition(". ")[2] == fix


@pytest.mark.parametrize(("place", "typed", "sentence"), [*VALUES, *WORDS])
def test_the_meaning_is_offered_in_a_sentence(cottage: Book, place: str, typed: Value, sentence: str) -> None:
    [problem] = cottage.change({place: typed}).problems()

    assert problem.startswith(f"{place}  ")
    assert problem.partition(": ")[2] == sentence


@pytest.mark.parametrize("name", SAME_NAMES)
def test_what_cannot_be_told_apart_is_one_name(cottage: Book, name: str) -> None:
    assert cottage.change({"Envelope!B6": name}).problems() == []


def test_letters_composed_in_two_ways_are_one_name(cottage: Book) -> None:
    cottage.change({"Zones!A6": "Café", "Envelope!A20": None})
    loft = {f"Envelope!{column}{row}": "Cafe\u0301" for column, row in _loft(cottage)}
    assert cottage.change(loft).problems() == []


def _loft(book: Book) -> list[tuple[str, int]]:
    """Cells of sheet Envelope that name the loft."""
    return [("ABCDEFGHIJKL"[at[1] - 1], at[0]) for at, value in book.sheets["Envelope"].items() if value == "Loft"]


def test_several_names_that_are_equally_near_are_all_offered(cottage: Book) -> None:
    changes: Changes = {
        **{"Zones!A5": "Flat 1", "Zones!A6": "Flat 2"},
        **{f"Envelope!{column}{row}": "Flat 2" for column, row in _loft(cottage)},
    }
    problems = cottage.change(changes).change({"Envelope!B5": "Flat 3"}).problems()

    assert (
        "Envelope!B5  Zone: found 'Flat 3'; expected a name from sheet Zones. Did you mean 'Flat 1' or 'Flat 2'?"
        in (problems)
    )


@pytest.mark.parametrize(("place", "title"), [(place, title) for place, titles in TITLES.items() for title in titles])
def test_titles_without_signs_or_with_their_unit_are_understood(cottage: Book, place: str, title: str) -> None:
    sound = cottage.rows()
    assert cottage.change({place: title}).problems() == []
    assert cottage.rows() == sound


@pytest.mark.parametrize("model", SHEETS)
def test_titles_of_a_sheet_stay_apart_without_signs(model: type) -> None:
    columns = model.columns()  # type: ignore[attr-defined]
    assert len(column_titles(model)) == len(columns)
    assert not [column.title for column in columns.values() if read_title(column.title).unit]


def test_a_title_with_another_unit_is_told(cottage: Book) -> None:
    assert cottage.change({"Openings!E4": "Width (mm)"}).problems() == [
        "Openings!E4  Width [m]: found the title 'Width (mm)'; expected 'Width'. "
        "Convert the values to m and rename the title to 'Width'."
    ]


def test_a_column_of_their_own_may_state_another_unit(cottage: Book) -> None:
    assert cottage.change({"Openings!K4": "Width (mm)", "Openings!K5": 1200}).problems() == []


def test_a_renamed_title_brings_no_problem_of_its_cells(cottage: Book) -> None:
    assert cottage.change({"Envelope!H4": "Azimut"}).problems() == [
        "Envelope  Azimuth [°]: found no title 'Azimuth'; expected the column Azimuth. Rename 'Azimut' to 'Azimuth'."
    ]
    assert cottage.change({"Envelope!H4": "Azimuth", "Envelope!G4": "Gross area"}).problems() == [
        "Envelope  Area [m²]: found no title 'Area'; expected the column Area. Rename 'Gross area' to 'Area'."
    ]


@pytest.mark.parametrize("sheet", ["Envelope", "Ground floors"])
def test_build_up_and_u_value_may_share_a_column(cottage: Book, sheet: str) -> None:
    sound = [row.model_dump() for row in cottage.rows().of(sheet)]
    cells = cottage.sheets[sheet]
    [build_up] = [column for (row, column), value in cells.items() if row == 4 and value == "Build-up"]
    [u_value] = [column for (row, column), value in cells.items() if row == 4 and value == "U-value"]
    cells[4, build_up], cells[4, u_value] = "Build-up or U-value", "My own remark"
    cells[3, build_up] = None
    for row, column in list(cells):
        if row > 4 and column == u_value and cells[row, column] is not None:
            cells[row, build_up], cells[row, column] = cells[row, column], None

    assert cottage.problems() == []
    assert [row.model_dump() for row in cottage.rows().of(sheet)] == sound


def test_a_u_value_typed_as_text_in_the_shared_column(cottage: Book) -> None:
    cottage.change({"Envelope!E4": "Build-up or U-value", "Envelope!F4": "Remark", "Envelope!F3": None})
    cottage.change({f"Envelope!E{row}": "0,3 W/m²K" for row in (5, 6, 7, 8)})
    assert cottage.problems()[0] == (
        "Envelope!E5  U-value [W/(m²·K)]: found the text '0,3 W/m²K'; expected a number above 0 and at most 10. "
        "Type 0.3 as a number."
    )


def test_a_copy_of_the_header_row_is_no_row(cottage: Book) -> None:
    titles = {at: value for at, value in cottage.sheets["Openings"].items() if at[0] == 4}
    cottage.sheets["Openings"] |= {(20, column): value for (_, column), value in titles.items()}
    assert cottage.problems() == []


def test_a_remark_or_a_sum_below_the_table_is_told_once(cottage: Book) -> None:
    assert cottage.change({"Envelope!A40": "Areas from the drawings", "Envelope!G42": 240}).problems() == [
        "Envelope!A40  Element: found a row without Zone, Kind, Faces, Area; expected these cells filled in. "
        "Fill them in, or clear the row.",
        "Envelope!A42  Element: found a row without Element, Zone, Kind, Faces; expected these cells filled in. "
        "Fill them in, or clear the row.",
    ]


def test_units_in_another_spelling_are_the_same(cottage: Book) -> None:
    changes: Changes = {"Zones!E3": "m2", "Materials!B3": "W/mK", "Build-ups!D3": "MM"}
    assert cottage.change(changes).problems() == []
    assert cottage.change({"Zones!E3": "sq ft"}).problems() == [
        "Zones!E3  Floor area [m²]: found the unit 'sq ft'; expected 'm²'. "
        "Convert the values to m² and restore the unit."
    ]


@pytest.mark.parametrize(
    ("sheet", "named"), [("Openings", "Windows"), ("Envelope", "Walls"), ("Ground floors", "Slabs")]
)
def test_a_sheet_is_known_by_its_titles(cottage: Book, sheet: str, named: str, tmp_path: Path) -> None:
    """Without its windows a building would be calculated all the same."""
    path = tmp_path / "book.xlsx"
    cottage.change({sheet: named}).save(path)
    with pytest.raises(InputError) as caught:
        check_rows(read_cells(path, wanted=[model.sheet for model in SHEETS]))
    assert str(caught.value.problems[0]) == (
        f"{sheet}: found no such sheet; expected a sheet named {sheet}. Rename '{named}' to '{sheet}'."
    )


def test_names_of_a_sheet_that_is_absent_are_told_once(cottage: Book) -> None:
    assert cottage.change({"Glazed units": None}).problems() == [
        "Glazed units: found no such sheet; expected a sheet named Glazed units, which Openings!C5 refers to. "
        "Copy it from a fresh template."
    ]


def test_an_unknown_face_brings_no_problem_of_its_shade(cottage: Book) -> None:
    assert cottage.change(
        {"Envelope!K4": "Obstruction", "Envelope!K6": "Street", "Envelope!D6": "outdors"}
    ).problems() == [
        "Envelope!D6  Faces: found 'outdors'; expected outdoors, neighbour, or a name from sheet Zones. "
        "Did you mean 'outdoors'?"
    ]


def test_a_column_that_is_absent_is_told_rather_than_its_cells(cottage: Book) -> None:
    assert cottage.change({"Envelope!H4": "Orientation"}).problems()[0] == (
        "Envelope!A5  Azimuth [°]: found no such column; expected the direction of an element that faces outdoors. "
        "Add the column Azimuth, or rename the one that stands for it."
    )
    assert cottage.change({"Envelope!H4": "Azimuth", "Envelope!E4": "Construction"}).problems()[0] == (
        "Envelope!A5  Build-up: found neither a build-up nor a U-value; expected one of the two. "
        "Add the column Build-up, or rename the one that stands for it."
    )


def test_merged_cells_are_told_as_such(cottage: Book, tmp_path: Path) -> None:
    """They look filled; the cells of a remark below the table do not matter."""
    path = cottage.save(tmp_path / "book.xlsx")
    book = load_workbook(path)
    book["Envelope"].merge_cells("B5:B6")
    book["Envelope"].merge_cells("N20:P30")
    book.save(path)
    with pytest.raises(InputError) as caught:
        check_rows(read_cells(path))
    assert str(caught.value) == (
        "Envelope!B6  Zone: found a cell merged with the one above; expected a name from sheet Zones. "
        "Split the merged cells and fill in each."
    )
