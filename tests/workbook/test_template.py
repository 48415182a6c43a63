"""The input workbook: every column once, dropdowns, bounds, help, print set-up, and that it reads back."""

from __future__ import annotations

import re
import shutil
import subprocess
from collections.abc import Mapping, Sequence
from io import BytesIO
from pathlib import Path
from typing import Any
from zipfile import ZipFile

import pytest
from openpyxl import Workbook, load_workbook
from openpyxl.utils import range_boundaries

from heatledger.inputs.cells import column_letters
from heatledger.inputs.columns import Column, SheetRow
from heatledger.inputs.prefilled import blank_values, example_values
from heatledger.inputs.rows import SHEETS, ElementRow, ProjectRow
from heatledger.inputs.workbook_rows import check_rows
from heatledger.workbook.guide import CAUTIONS
from heatledger.workbook.reader import read_cells
from heatledger.workbook.template import build_template

TABLES = [model for model in SHEETS if model is not ProjectRow]
COLUMNS = [(model, field, column) for model in TABLES for field, column in model.columns().items()]
SPARE = 300
LONGEST_PROMPT = 215
"""A prompt is read at a glance, else not at all. [characters]"""
VALUES: dict[str, list[dict[str, object]]] = {
    "Project": [{"project": "Mill & Mews", "client": "=Client", "weather": "somewhere", "altitude": 270}],
    "Zones": [
        {
            "name": "Flat 1",
            "conditioning": "heated",
            "usage": "Dwelling",
            "floor_area": 62.5,
            "air_volume": 156.25,
            "leakage": 3.0,
        },
        {"name": "Stair", "conditioning": "unconditioned", "floor_area": 20, "air_volume": 80},
    ],
    "Usage": [{"name": "Dwelling", "heating_set_point": 20, "cooling_set_point": 26}],
    "Materials": [{"name": "Brick", "conductivity": 0.8, "source": "declared"}],
    "Build-ups": [
        {"name": "Wall", "layer": 1, "material": "Brick", "thickness": 240},
        {"name": "Wall", "layer": 2, "material": "unventilated air layer", "thickness": 40},
        {"name": "Inner wall", "layer": 1, "material": "Brick", "thickness": 115},
    ],
    "Glazed units": [],
    "Envelope": [
        {"name": "W-south", "zone": "Flat 1", "kind": "wall", "faces": "outdoors", "build_up": "Wall", "area": 40,
         "azimuth": "SSE"},
        {"name": "W-stair", "zone": "Flat 1", "kind": "partition", "faces": "Stair", "build_up": "Wall", "area": 12},
        {"name": "W-north", "zone": "Stair", "kind": "wall", "faces": "outdoors", "build_up": "Wall", "area": 20,
         "azimuth": 0.0},
    ],
}  # fmt: skip


@pytest.fixture(scope="module")
def data() -> bytes:
    return build_template(VALUES)


@pytest.fixture(scope="module")
def book(data: bytes) -> Workbook:
    return load_workbook(BytesIO(data))


def position(model: type[SheetRow], field: str) -> int:
    return list(model.columns()).index(field) + 1


def validation(book: Workbook, model: type[SheetRow], field: str) -> Any:
    """The one validation on the first input cell of a column."""
    cell = book[model.sheet].cell(6, position(model, field)).coordinate
    found = [each for each in book[model.sheet].data_validations.dataValidation if cell in each.sqref]
    assert len(found) == 1, (model.sheet, field)
    return found[0]


def rules(book: Workbook, sheet: str) -> dict[str, list[str]]:
    """Formulas of the conditional formats by the cells they stand on."""
    found: Any = book[sheet].conditional_formatting
    return {str(each.sqref): [rule.formula[0] for rule in each.rules] for each in found}


def last_row(sheet: str) -> int:
    """A year has twelve months; every other sheet has its spare rows."""
    return 17 if sheet == "Monthly climate" else 5 + len(VALUES.get(sheet, [])) + SPARE


def test_sheets_stand_in_the_agreed_order(book: Workbook) -> None:
    agreed = "Project Zones Usage Air_systems Materials Build-ups Glazed_units Envelope Openings Obstructions "
    agreed += "Shading_devices Ground_floors Thermal_bridges Monthly_climate"
    assert [name.replace(" ", "_") for name in book.sheetnames] == ["Guide", *agreed.split(), "Lists"]
    assert [sheet.title for sheet in book if sheet.sheet_state != "visible"] == ["Lists"]


@pytest.mark.parametrize("values", [{}, VALUES])
def test_the_file_is_the_same_for_the_same_values(values: Mapping[str, Sequence[Mapping[str, object]]]) -> None:
    assert build_template(values) == build_template(values)


def test_the_author_is_heatledger_and_no_time_of_writing_is_kept(data: bytes) -> None:
    with ZipFile(BytesIO(data)) as package:
        assert {entry.date_time for entry in package.infolist()} == {(1980, 1, 1, 0, 0, 0)}
        properties = package.read("docProps/core.xml")
    assert set(re.findall(rb">([\d-]+T[\d:]+Z)<", properties)) == {b"2000-01-01T00:00:00Z"}
    assert re.findall(rb"<dc:creator[^>]*>([^<]*)<", properties) == [b"heatledger"]


@pytest.mark.parametrize("model", TABLES)
def test_every_column_stands_once_with_its_unit_above(book: Workbook, model: type[SheetRow]) -> None:
    sheet = book[model.sheet]
    columns = list(model.columns().values())
    assert [cell.value for cell in sheet[5]] == [column.title for column in columns]
    assert [cell.value or "" for cell in sheet[4]] == [column.unit for column in columns]
    beside = "B2" if model.sheet in {"Build-ups", "Ground floors"} else "A2"  # column A is repeated on a second page
    assert (sheet["A1"].value, sheet[beside].value) == (model.sheet, model.purpose)


def test_project_lists_labels_values_units_and_notes(book: Workbook) -> None:
    sheet = book["Project"]
    rows = [[cell.value or "" for cell in row] for row in sheet.iter_rows(min_row=4, max_col=4)]
    columns = list(ProjectRow.columns().values())
    assert [row[0] for row in rows] == [column.title for column in columns]
    assert [row[2] for row in rows] == [column.unit for column in columns]
    assert all(str(row[3]).startswith(column.help) for row, column in zip(rows, columns, strict=True))
    assert [sheet["B4"].value, sheet["B5"].value, sheet["B10"].value] == ["Mill & Mews", "=Client", 270]


@pytest.mark.parametrize(("model", "field", "column"), COLUMNS)
def test_help_stands_beside_the_cell_and_on_the_title(
    book: Workbook, model: type[SheetRow], field: str, column: Column
) -> None:
    found = validation(book, model, field)
    assert found.showInputMessage
    assert found.prompt.startswith(column.help)
    assert len(found.prompt) <= LONGEST_PROMPT
    assert 0 < len(found.promptTitle) <= 32
    note = book[model.sheet].cell(5, position(model, field)).comment
    assert note is not None
    assert note.text.startswith(column.label)
    assert column.help in note.text
    assert column.expected in note.text
    assert column.default_note in note.text or "Empty:" in column.help


@pytest.mark.parametrize(("model", "field", "column"), COLUMNS)
def test_validations_cover_the_spare_rows(book: Workbook, model: type[SheetRow], field: str, column: Column) -> None:
    first, top, last, bottom = range_boundaries(str(validation(book, model, field).sqref))
    assert (first, last) == (position(model, field),) * 2
    assert (top, bottom) == (6, last_row(model.sheet))


@pytest.mark.parametrize(
    ("model", "field", "column"), [each for each in COLUMNS if each[2].kind in {"number", "integer"}]
)
def test_numbers_carry_their_bounds_and_a_plain_stop(
    book: Workbook, model: type[SheetRow], field: str, column: Column
) -> None:
    found = validation(book, model, field)
    assert found.type == ("whole" if column.kind == "integer" else "decimal")
    assert (found.operator, found.errorStyle or "stop", found.showErrorMessage) == ("between", "stop", True)
    low, high = float(found.formula1), float(found.formula2)
    assert found.error == f"Type {column.expected}."
    if column.at_least is not None:
        assert low == column.at_least
    if column.above is not None:
        assert column.above < low < column.above + 1e-6
    if column.at_most is not None:
        assert high == column.at_most


def test_choices_are_dropdowns(book: Workbook) -> None:
    choices = [each for each in COLUMNS if each[2].kind == "choice"]
    for model, field, column in choices:
        found = validation(book, model, field)
        assert (found.type, found.formula1) == ("list", f'"{",".join(column.choices)}"')
        assert len(found.formula1) <= 255
        assert found.showErrorMessage
    assert len(choices) >= 8


def test_names_come_from_the_hidden_lists(book: Workbook) -> None:
    for model, field, column in COLUMNS:
        if column.kind == "name":
            found = validation(book, model, field)
            assert found.type == "list"
            assert found.formula1 in book.defined_names
            assert found.errorStyle == "warning"


def test_a_name_is_asked_about_only_where_its_sheet_is_filled_in_before(book: Workbook) -> None:
    order = [model.sheet for model in SHEETS]
    for model, field, column in COLUMNS:
        if column.kind == "name":
            before = order.index(column.names_from) < order.index(model.sheet)
            assert validation(book, model, field).showErrorMessage == before
    zone = validation(book, ElementRow, "zone")
    assert (zone.errorTitle, zone.error) == ("Please check", "Sheet Zones has no such name yet. Keep it?")


def test_every_list_has_a_name_of_its_own(book: Workbook) -> None:
    kinds = {(column.names_from, column.choices) for _, _, column in COLUMNS if column.kind == "name"}
    names = {validation(book, model, field).formula1 for model, field, column in COLUMNS if column.kind == "name"}
    assert len(names) == len(kinds)


def test_a_direction_may_be_a_word_or_degrees(book: Workbook) -> None:
    model = next(model for model in SHEETS if model.sheet == "Envelope")
    found = validation(book, model, "azimuth")
    assert (found.type, found.formula1, bool(found.showErrorMessage)) == ("list", "list_compass", False)


def test_project_choices_and_bounds(book: Workbook) -> None:
    found = {str(each.sqref): each for each in book["Project"].data_validations.dataValidation}
    assert found["B10"].type == "decimal"
    assert found["B15"].formula1 == '"open,normal,sheltered"'


def test_the_weather_is_offered_and_a_path_may_be_typed() -> None:
    book = load_workbook(BytesIO(build_template({}, ["Miami FL", "Piedmont IT"])))
    found = {str(each.sqref): each for each in book["Project"].data_validations.dataValidation}["B9"]
    assert (found.type, found.formula1) == ("list", '"Miami FL,Piedmont IT,monthly table"')
    assert not found.showErrorMessage


def test_many_climates_go_into_the_hidden_lists() -> None:
    names = [f"Climate of the place number {number}" for number in range(20)]
    book = load_workbook(BytesIO(build_template({}, names)))
    found = {str(each.sqref): each for each in book["Project"].data_validations.dataValidation}["B9"]
    cells = book.defined_names[found.formula1].attr_text.split("$")[1]
    assert [cell.value for cell in book["Lists"][cells]][2:23] == [*names, "monthly table"]


@pytest.mark.parametrize("model", SHEETS)
def test_titles_are_kept_from_being_typed_over(book: Workbook, model: type[SheetRow]) -> None:
    cells = "A4:A23" if model is ProjectRow else f"A5:{column_letters(len(model.columns()))}5"
    (found,) = [each for each in book[model.sheet].data_validations.dataValidation if str(each.sqref) == cells]
    still_there = "COLUMN(A4)<>COLUMN($A$4)" if model is ProjectRow else "ROW(A5)<>ROW($A$5)"
    assert (found.type, found.formula1, found.errorStyle or "stop") == ("custom", still_there, "stop")
    assert found.showErrorMessage
    assert found.errorTitle == "Please keep the title"
    assert found.error == "The titles tell heatledger what stands where. Press Esc, and type in the pale cells."


def test_the_cursor_stands_where_the_next_value_belongs(book: Workbook) -> None:
    """Typing starts at once: on a title it would destroy it."""
    assert book.active is book["Project"]
    first_empty = {
        "Project": "B6",
        "Zones": "A8",
        "Usage": "A7",
        "Materials": "A7",
        "Build-ups": "A9",
        "Envelope": "A9",
    }
    for model in SHEETS:
        view: Any = book[model.sheet].sheet_view
        cell = first_empty.get(model.sheet, "A6")
        assert {(each.activeCell, each.sqref) for each in view.selection} == {(cell, cell)}
        assert view.pane.activePane == ("bottomLeft" if cell.startswith("A") else "bottomRight")


def test_the_cursor_below_a_long_list_is_in_view() -> None:
    book = load_workbook(BytesIO(build_template(blank_values())))
    view: Any = book["Materials"].sheet_view
    cell = view.selection[-1].activeCell
    assert cell == f"A{6 + len(blank_values()['Materials'])}"
    assert view.pane.topLeftCell == f"B{int(cell[1:]) - 10}"
    assert book["Monthly climate"].sheet_view.selection[-1].activeCell == "B6"
    assert book["Project"].sheet_view.selection[-1].activeCell == "B4"


@pytest.mark.parametrize("model", TABLES)
def test_rows_are_a_table_so_that_sorting_leaves_the_titles(book: Workbook, model: type[SheetRow]) -> None:
    (table,) = book[model.sheet].tables.values()
    assert table.ref == f"A5:{column_letters(len(model.columns()))}{last_row(model.sheet)}"
    assert [column.name for column in table.tableColumns] == [column.title for column in model.columns().values()]
    assert table.autoFilter.ref == table.ref
    assert table.tableStyleInfo is None


@pytest.mark.parametrize(("model", "field", "column"), COLUMNS)
def test_what_is_typed_as_text_stays_text(book: Workbook, model: type[SheetRow], field: str, column: Column) -> None:
    """Months 5-9 would become a date, and room 1.10 the number 1.1; on every row, also far below."""
    place = position(model, field)
    numbers = column.kind in {"number", "integer", "azimuth", "choice"}
    styles: list[Any] = [book[model.sheet].cell(6, place), book[model.sheet].column_dimensions[column_letters(place)]]
    right = column.kind in {"number", "integer", "azimuth"}
    assert [style.number_format for style in styles] == ["General_)" if right else "General" if numbers else "@"] * 2
    assert {style.alignment.horizontal for style in styles} == {"right" if right else "left"}


def test_titles_are_dark_where_required_and_light_where_not(book: Workbook) -> None:
    for model, field, column in COLUMNS:
        cell = book[model.sheet].cell(5, position(model, field))
        assert cell.fill.fgColor.rgb == ("0022384A" if column.required else "00DCE4EA")
    tints = {cell.fill.fgColor.rgb for model in TABLES for row in book[model.sheet]["A6:A17"] for cell in row}
    assert tints == {"00F1EDF6"}


@pytest.mark.parametrize("model", [model for model in TABLES if model.sheet != "Monthly climate"])
def test_further_spare_rows_show_as_the_sheet_fills(book: Workbook, model: type[SheetRow]) -> None:
    """A tint of its own would print them, empty as they are."""
    sheet = book[model.sheet]
    first, last = 6 + 12, last_row(model.sheet)
    assert sheet.max_row == first - 1
    end = column_letters(len(model.columns()))
    (formula,) = rules(book, model.sheet)[f"A{first}:{end}{last}"]
    assert formula == f"COUNTA($A{first - 5}:${end}${last})>0"


@pytest.mark.parametrize("model", SHEETS)
def test_titles_are_frozen_and_repeated_in_print(book: Workbook, model: type[SheetRow]) -> None:
    sheet: Any = book[model.sheet]
    table = model is not ProjectRow
    assert sheet.freeze_panes == ("B6" if table else "B4")
    assert sheet.print_title_rows == ("$4:$5" if table else None)
    upright, wide = model.sheet in {"Materials", "Monthly climate"}, model.sheet in {"Build-ups", "Ground floors"}
    orientation = "portrait" if upright else "landscape"
    assert (sheet.page_setup.paperSize, sheet.page_setup.orientation) == (9, orientation)
    assert sheet.sheet_properties.pageSetUpPr.fitToPage
    assert (sheet.page_setup.fitToWidth, sheet.page_setup.fitToHeight) == (2 if wide else 1, 0)
    assert sheet.print_title_cols == ("$A:$A" if wide else None)
    footer = sheet.oddFooter
    assert (footer.left.text, footer.center.text) == ("Mill && Mews", "&A · &D")
    assert footer.right.text == "Page &P of &N"


@pytest.mark.parametrize(("model", "field", "column"), COLUMNS)
def test_slips_are_marked_on_all_spare_rows(book: Workbook, model: type[SheetRow], field: str, column: Column) -> None:
    letters = column_letters(position(model, field))
    found = rules(book, model.sheet).get(f"{letters}6:{letters}{last_row(model.sheet)}", [])
    own = [formula for formula in found if formula.startswith(f'AND({letters}6<>""')]
    assert len(own) == (column.kind not in {"text", "months"})
    required = [formula for formula in found if formula == f'AND(${letters}6="",COUNTA({started(model)})>0)']
    assert len(required) == column.required


def started(model: type[SheetRow]) -> str:
    return f"$A6:${column_letters(len(model.columns()))}6"


def test_what_a_project_must_not_leave_empty_is_marked(book: Workbook) -> None:
    found = rules(book, "Project")
    assert found["B4"] == ['AND(B4="",COUNTA(B4:B23)>0)']
    assert found["B9"] == ['AND(B9="",COUNTA(B4:B23)>0)']


def test_names_that_stand_twice_are_marked(book: Workbook) -> None:
    twice = 'AND($A6<>"",SUMPRODUCT(--(TRIM($A$6:$A$307)=TRIM($A6)))>1)'
    assert twice in rules(book, "Zones")["A6:A307"]
    assert not [formula for formula in rules(book, "Build-ups")["A6:A308"] if "SUMPRODUCT" in formula]


@pytest.mark.parametrize("model", TABLES)
def test_an_example_stands_in_grey_above_the_units(book: Workbook, model: type[SheetRow]) -> None:
    cells = [cell for cell in book[model.sheet][3] if cell.value]
    given = {field for row in example_values()[model.sheet] for field in row}
    assert len(cells) == len(given)
    assert all(str(cell.value).startswith("e.g. ") for cell in cells)
    assert {(cell.font.italic, cell.font.color.rgb) for cell in cells} == {(True, "0055606A")}


def test_only_guide_and_lists_are_protected_and_without_password(book: Workbook) -> None:
    assert [sheet.title for sheet in book if sheet.protection.sheet] == ["Guide", "Lists"]
    assert all(sheet.protection.password is None for sheet in book)


def test_fonts_are_named_and_colours_plain(book: Workbook) -> None:
    sheets = [sheet for sheet in book if sheet.title != "Lists"]
    cells = [cell for sheet in sheets for row in sheet.iter_rows() for cell in row if cell.value is not None]
    assert {cell.font.name for cell in cells} == {"Arial"}
    assert {cell.font.color.type for cell in cells} == {"rgb"}


def test_the_guide_holds_legend_commands_and_cautions(book: Workbook) -> None:
    words = [cell.value for row in book["Guide"].iter_rows() for cell in row if isinstance(cell.value, str)]
    assert set(CAUTIONS) <= set(words)
    assert {"Dark title", "Light title", "Pale cell"} <= set(words)
    text = " ".join(words)
    for part in ("heatledger check FILE", "heatledger run FILE", "no certificate", "moisture check", "fresh air"):
        assert part in text
    links = [cell.hyperlink.location for row in book["Guide"].iter_rows() for cell in row if cell.hyperlink]
    assert links == [f"'{model.sheet}'!A1" for model in SHEETS]


def test_what_is_filled_in_reads_back(tmp_path: Path, data: bytes) -> None:
    path = tmp_path / "filled.xlsx"
    path.write_bytes(data)
    rows = check_rows(read_cells(path, [model.sheet for model in SHEETS]))
    assert [zone.name for zone in rows.zones] == ["Flat 1", "Stair"]
    assert rows.project.client == "=Client"
    assert rows.elements[0].azimuth == 157.5
    assert rows.build_ups[1].material == "unventilated air layer"


@pytest.mark.skipif(shutil.which("soffice") is None, reason="LibreOffice is not installed")
def test_lists_work_and_pages_render(tmp_path: Path, data: bytes) -> None:
    """The spreadsheet program fills the lists, without repeats, and prints every sheet."""
    book = load_workbook(BytesIO(data))
    for name in list(book.sheetnames):
        book[name].sheet_state = "visible"
    probe = book.create_sheet("Probe", 0)
    envelope, build_ups = ("Envelope", "faces"), ("Build-ups", "material")
    models = {model.sheet: model for model in SHEETS}
    faces, material = (validation(book, models[sheet], field).formula1 for sheet, field in (envelope, build_ups))
    lists = ("list_zones", faces, "list_build_ups", "list_envelope", material)
    for row, name in enumerate(lists, start=1):
        probe.cell(row, 1, f"=ROWS({name})")
        for place in range(1, 6):
            probe.cell(row, 1 + place, f'=IFERROR(INDEX({name},{place}),"")')
    book.save(tmp_path / "probe.xlsx")
    (tmp_path / "template.xlsx").write_bytes(data)
    home = f"-env:UserInstallation=file://{tmp_path / 'office'}"
    for kind, name in (("csv", "probe.xlsx"), ("pdf", "template.xlsx")):
        command = ["soffice", home, "--headless", "--convert-to", kind, "--outdir", str(tmp_path), str(tmp_path / name)]
        subprocess.run(command, check=True, capture_output=True, timeout=180)
    rows = [line.split(",") for line in (tmp_path / "probe.csv").read_text().splitlines()]
    assert [row[0] for row in rows] == ["2", "4", "2", "3", "4"]
    assert rows[0][1:3] == ["Flat 1", "Stair"]
    assert rows[1][1:5] == ["outdoors", "neighbour", "Flat 1", "Stair"]
    assert rows[2][1:3] == ["Wall", "Inner wall"]
    assert rows[4][4] == "Brick"
    command = ["pdftotext", "-layout", str(tmp_path / "template.pdf"), "-"]
    text = subprocess.run(command, check=True, capture_output=True, timeout=60).stdout.decode()
    pages = text.split("\f")[:-1]
    assert all(f"Page {number} of {len(pages)}" in page for number, page in enumerate(pages, start=1))
    assert all("Mill & Mews" in page for page in pages)
    for model in SHEETS:
        own = [page for page in pages if f"{model.sheet} · " in page]
        side_by_side = 2 if model.sheet in {"Build-ups", "Ground floors"} else 1
        assert len(own) == side_by_side, model.sheet
        together = " ".join(own)
        assert all(column.title.split()[0] in together for column in model.columns().values()), model.sheet
        assert all(next(iter(model.columns().values())).title in page for page in own), model.sheet
    assert "###" not in text
