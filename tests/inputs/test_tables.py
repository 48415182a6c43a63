"""Finding the table of a sheet by its titles."""

from __future__ import annotations

from heatledger.inputs.cells import Cell
from heatledger.inputs.rows import BuildUpRow, ProjectRow, ThermalBridgeRow
from heatledger.inputs.tables import read_labels, read_table


def _cells(*lines: tuple[object, ...]) -> dict[tuple[int, int], Cell]:
    return {
        (row, column): Cell(value, "text") if isinstance(value, str) else Cell(float(str(value)), "number")
        for row, line in enumerate(lines, start=1)
        for column, value in enumerate(line, start=1)
        if value is not None
    }


HEADER = ("Build-up", "Layer", "Material", "Thickness")


def test_records_hold_the_cells_of_our_columns_only() -> None:
    table = read_table(BuildUpRow, _cells((*HEADER, "Notes"), ("Wall", 1, "Brick", 250, "x"), (None,) * 4 + ("y",)))

    assert table.complete
    assert table.problems == ()
    assert [record.row for record in table.records] == [2]
    assert table.records[0].cells["thickness"] == Cell(250.0, "number")
    assert table.records[0].positions == {"name": 1, "layer": 2, "material": 3, "thickness": 4}


def test_the_sheet_title_is_not_taken_for_the_header() -> None:
    """Several sheets bear the title of their first column, or of another one, in their heading."""
    table = read_table(BuildUpRow, _cells(("Build-up",), ("Material", "Layer"), HEADER, ("Wall", 1, "Brick", 250)))

    assert [record.row for record in table.records] == [4]


def test_a_header_row_without_the_first_title_is_still_found() -> None:
    table = read_table(BuildUpRow, _cells(("Name of build-up", *HEADER[1:]), ("Wall", 1, "Brick", 250)))

    assert not table.complete
    assert [str(problem) for problem in table.problems] == [
        "Build-ups  Build-up: found no title 'Build-up'; expected the column Build-up. "
        "Rename 'Name of build-up' to 'Build-up'."
    ]


def test_an_empty_optional_sheet_has_no_rows() -> None:
    assert read_table(ThermalBridgeRow, {}).problems == ()


def test_a_sheet_without_titles_says_which_belong_there() -> None:
    table = read_table(ThermalBridgeRow, _cells(("something else",)))

    assert not table.complete
    assert [str(problem) for problem in table.problems] == [
        "Thermal bridges: found no header row; expected a row with the titles Thermal bridge, Zone. "
        "Copy the header row from a fresh template, or restore the titles."
    ]


def test_an_own_unit_in_other_words_is_left_alone() -> None:
    assert read_table(BuildUpRow, _cells((None, None, None, "millimetres"), HEADER)).problems == ()


def test_labels_stand_in_column_a() -> None:
    table = read_labels(ProjectRow, _cells(("Project",), ("Project", "Hut"), ("Weather", None, "Weather"), (None, "x")))

    assert table.complete
    assert table.problems == ()
    assert table.records[0].cells == {"project": Cell("Hut", "text")}
    assert table.records[0].positions == {"project": 2, "weather": 3}
