"""The words in which a typed value is given back."""

from __future__ import annotations

import pytest

from heatledger.inputs.cells import Cell, column_letters, reference
from heatledger.inputs.columns import Column
from heatledger.inputs.wording import compass_word, describe, mend, nearest

WIDTH = Column("Width", "number", "m")
SHARE = Column("Share", "number", "%")
G_VALUE = Column("g-value", "number", "-")
COUNT = Column("Number", "integer", at_least=1, at_most=9)
NAME = Column("Zone", "name", names_from="Zones")


@pytest.mark.parametrize(
    ("cell", "words"),
    [
        (None, "an empty cell"),
        (Cell(12.0, "number"), "12"),
        (Cell(1234567.5, "number"), "1234567.5"),
        (Cell(0.1 + 0.2, "number"), "0.3"),
        (Cell(float("nan"), "number"), "a value that is no finite number"),
        (Cell(float("inf"), "number"), "a value that is no finite number"),
        (Cell("1,2", "text"), "the text '1,2'"),
        (Cell("two\nlines", "text"), "the text 'two lines'"),
        (Cell("x" * 70, "text"), f"the text '{'x' * 59}…'"),
        (Cell(False, "boolean"), "the logical value FALSE"),
        (Cell("2024-02-01", "date"), "the date 2024-02-01"),
        (Cell("#DIV/0!", "error"), "the error value #DIV/0!"),
        (Cell(None, "uncalculated"), "a formula without a stored value"),
    ],
)
def test_what_stands_in_a_cell(cell: Cell | None, words: str) -> None:
    assert describe(cell) == words


@pytest.mark.parametrize(
    ("typed", "column", "way_out"),
    [
        ("1,2", WIDTH, "Type 1.2 as a number."),
        ("1.2", WIDTH, "Type 1.2 as a number."),
        ("−1,5", WIDTH, "Type -1.5 as a number."),
        (",5 m", WIDTH, "Type 0.5 as a number."),
        ("12 mm", WIDTH, "Type 0.012 for 12 mm."),
        ("12 W", WIDTH, "Convert it to m and type the number alone."),
        ("35 %", SHARE, "Type 35 as a number."),
        ("35%", G_VALUE, "Type 0.35 for 35 %."),
        ("0.35 W", G_VALUE, "Type a number, without unit or words."),
        ("2 pcs", COUNT, "Type 2 alone, as a number."),
        ("1,250", WIDTH, "Type 1250 or 1.250 as a number."),
        ("0,250", WIDTH, "Type 0.25 as a number."),
        ("1.234,5", WIDTH, "Type 1234.5 as a number."),
        ("n/a", WIDTH, "Clear the cell to leave it open, or type a number."),
        ("NaN", WIDTH, "Type a number, without unit or words."),
    ],
)
def test_the_way_out_of_a_text(typed: str, column: Column, way_out: str) -> None:
    assert mend(Cell(typed, "text"), column) == way_out


@pytest.mark.parametrize(
    ("cell", "column", "way_out"),
    [
        (Cell("#N/A", "error"), WIDTH, "Mend the formula or type the value."),
        (
            Cell(None, "uncalculated"),
            WIDTH,
            "Open and save the file in your spreadsheet program, then run again.",
        ),
        (
            Cell("2024-02-01", "date"),
            WIDTH,
            "Format the cell as a number and type the value again: 1.2, if that was typed.",
        ),
        (Cell("1900-02-01", "date"), WIDTH, "Format the cell as a number and type the value again."),
        (Cell("2024-02-01", "date"), NAME, "Format the cell as text and type the value again."),
        (Cell(True, "boolean"), COUNT, "Type a whole number from 1 to 9."),
        (Cell(True, "boolean"), NAME, "Type a name from sheet Zones."),
    ],
)
def test_the_way_out_of_other_values(cell: Cell, column: Column, way_out: str) -> None:
    assert mend(cell, column) == way_out


@pytest.mark.parametrize(
    ("typed", "word"), [("south", "S"), ("North-West", "NW"), ("SOUTH south east", "SSE"), ("upwards", ""), ("", "")]
)
def test_compass_words(typed: str, word: str) -> None:
    assert compass_word(typed) == word


def test_nearest_keeps_the_spelling_of_the_known_name() -> None:
    assert nearest("flat1 ", ["Flat 1", "Flat 12"]) == "Flat 1"
    assert nearest("Garage", ["Flat 1"]) == ""
    assert nearest("anything", []) == ""


@pytest.mark.parametrize(("column", "letters"), [(1, "A"), (26, "Z"), (27, "AA"), (702, "ZZ"), (703, "AAA")])
def test_column_letters(column: int, letters: str) -> None:
    assert column_letters(column) == letters
    assert reference(7, column) == f"{letters}7"
