"""Problems merged and ordered as a person reads them."""

from __future__ import annotations

from heatledger.errors import Problem
from heatledger.listing import listed, sheets_of


def at(cell: str, found: str = "an empty cell", sheet: str = "Openings", column: str = "Width [m]") -> Problem:
    return Problem(found, "a number above 0", "Fill in the cell.", sheet=sheet, cell=cell, column=column)


def texts(*problems: Problem) -> list[str]:
    return [str(one.merged) for one in listed(problems)]


def test_repeats_in_a_column_are_one_line_with_their_range() -> None:
    problems = [at(f"E{row}") for row in (8, 9, 10, 12)]
    assert texts(*problems) == [
        "Openings!E8:E10, E12  Width [m]: found an empty cell; expected a number above 0. Fill in the cell."
    ]
    assert listed(problems)[0].count == 4


def test_alike_values_are_merged_with_the_first_as_example() -> None:
    assert texts(at("E8", "the text '1,2'"), at("E9", "the text '0,9'"), at("E11", "the text '2,0'")) == [
        "Openings!E8:E9, E11  Width [m]: found the text '1,2' and 2 more like it; "
        "expected a number above 0. Fill in the cell."
    ]


def test_unlike_problems_stay_apart() -> None:
    other = at("F9", column="Height [m]")
    assert len(texts(at("E8"), at("E9", "the text '1,2'"), other, at("E8", sheet="Zones"))) == 4


def test_the_worst_stands_first() -> None:
    sheet = Problem("no such sheet", "a sheet named Zones", "Rename it.", sheet="Zones")
    column = Problem("no title 'Width'", "this column", "Add it.", sheet="Openings", column="Width [m]")
    cell, elsewhere = at("E8"), at("B5", sheet="Project", column="Weather")
    order = [one.problem for one in listed([elsewhere, cell, column, sheet])]
    assert order == [sheet, column, cell, elsewhere]
    assert [name for name, _ in sheets_of(listed([elsewhere, cell, column, sheet]))] == ["Zones", "Openings", "Project"]


def test_problems_of_a_file_are_never_merged() -> None:
    first = Problem("a plain text file", "a workbook", "Give the workbook.", file="a.xlsx")
    assert texts(first, first) == [str(first)] * 2
