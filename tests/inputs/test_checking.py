"""From the cells of a record to a checked row."""

from __future__ import annotations

from heatledger.inputs.cells import Cell
from heatledger.inputs.checking import check_record, meant_word
from heatledger.inputs.rows import AIR_LAYERS, AirSystemRow, BuildUpRow, ElementRow, GlazedUnitRow, MaterialRow
from heatledger.inputs.tables import Record


def _record(**cells: object) -> Record:
    stored = {
        field: value
        if isinstance(value, Cell)
        else Cell(value, "text")
        if isinstance(value, str)
        else Cell(float(str(value)), "number")
        for field, value in cells.items()
    }
    return Record(5, stored, {field: place for place, field in enumerate(stored, start=1)})


def test_a_faulty_row_keeps_what_could_be_read() -> None:
    checked = check_record(GlazedUnitRow, _record(name="Double", u_value="1,3", g_value=60))

    assert checked.row is None
    assert checked.at_fault == {"u_value", "g_value"}
    assert checked.partial.name == "Double"
    assert [problem.cell for problem in checked.problems] == ["B5", "C5"]


def test_a_column_that_is_absent_is_told_by_its_title_only() -> None:
    """Not again for each of its rows."""
    checked = check_record(GlazedUnitRow, _record(name="Double", u_value=1.3))

    assert checked.row is None
    assert checked.problems == []
    assert checked.at_fault == {"g_value"}


def test_compass_words_become_degrees() -> None:
    for word, degrees in (("N", 0), ("sse", 157.5), (" W ", 270)):
        cells = {"name": "W", "zone": "Z", "kind": "wall", "faces": "outdoors", "area": 1, "azimuth": word}
        row = check_record(ElementRow, _record(**cells)).row
        assert row is not None
        assert row.azimuth == degrees


def test_air_layers_in_short_and_in_full() -> None:
    for word in ("unventilated", "Unventilated air layer", "unventilated  AIR LAYER ", "air layer, unventilated"):
        assert meant_word(word, AIR_LAYERS) == "unventilated air layer"
    assert meant_word("slightly ventilated", AIR_LAYERS) == "slightly ventilated air layer"
    assert meant_word("Brick", AIR_LAYERS) == "Brick"
    row = check_record(BuildUpRow, _record(name="W", layer=2, material="Well ventilated", thickness=40)).row
    assert row is not None
    assert row.material == "well ventilated air layer"


def test_remarks_may_be_dates_and_numbers() -> None:
    for cell, text in ((Cell("2024-02-01", "date"), "2024-02-01"), (Cell(12.0, "number"), "12")):
        row = check_record(MaterialRow, _record(name="M", conductivity=1, source=cell)).row
        assert row is not None
        assert row.source == text


def test_a_percentage_of_nought_or_a_hundred_is_no_fraction() -> None:
    for share in (0, 1.5, 98):
        assert check_record(AirSystemRow, _record(name="A", kind="balanced", heat_recovery=share)).problems == []
    checked = check_record(AirSystemRow, _record(name="A", kind="balanced", heat_recovery=0.785))
    assert [str(problem) for problem in checked.problems] == [
        "Air systems!C5  Heat recovery [%]: found 0.785; expected 0, or a number above 1 and at most 98, in percent. "
        "Type 78.5 for 78.5 %."
    ]
