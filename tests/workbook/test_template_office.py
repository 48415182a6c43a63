"""The template in LibreOffice: warnings fire where they should, rows are typed, copied and sorted as by hand."""

from __future__ import annotations

import json
import shutil
import subprocess
import sys
from collections.abc import Callable, Mapping, Sequence
from io import BytesIO
from pathlib import Path
from typing import Any, TypeAlias

import pytest
from openpyxl import Workbook, load_workbook
from openpyxl.formula.translate import Translator

from heatledger.inputs.cells import column_letters, reference
from heatledger.inputs.prefilled import blank_values, example_values
from heatledger.inputs.rows import SHEETS, ProjectRow, Rows
from heatledger.inputs.workbook_rows import check_rows
from heatledger.workbook.reader import read_cells
from heatledger.workbook.slips import MISSING, SLIP
from heatledger.workbook.template import build_template

DRIVE = Path(__file__).parent / "office" / "drive.py"
MODELS = {model.sheet: model for model in SHEETS}
TABLES = [model for model in SHEETS if model is not ProjectRow]
Values: TypeAlias = dict[str, list[dict[str, object]]]
Step: TypeAlias = tuple[str, ...]

FAULTY: Values = {
    "Project": [{"project": "Faulty house"}],
    "Zones": [
        {"name": "Flat 1", "conditioning": "heated", "floor_area": "62,5", "air_volume": 150},
        {"name": "flat 1 ", "conditioning": "heated", "usage": "Ofice", "floor_area": 20, "air_volume": 50,
         "heating_set_point": 26, "cooling_set_point": 20},
        {"name": "Stair", "conditioning": "warm", "floor_area": 20},
    ],
    "Usage": [
        {"name": "Office", "heating_set_point": 21, "cooling_set_point": 20, "setback": 25, "days_in_use": 5},
        {"name": "School", "heating_set_point": 20, "cooling_set_point": 26, "heated_hours": 12,
         "months_out_of_use": 45},
    ],
    "Air systems": [
        {"name": "Fan", "kind": "balanced", "heat_recovery": 0.78, "night_cooling": 1},
        {"name": "Windows", "kind": "natural"},
    ],
    "Materials": [
        {"name": "Wool", "conductivity": 40, "density": 30},
        {"name": "Steel", "conductivity": 50, "density": 7800},
        {"name": "Brick", "conductivity": 0.8, "density": 1800},
        {"name": "Membrane", "conductivity": 0.22, "density": 270},
    ],
    "Build-ups": [
        {"name": "Wall", "layer": 1, "material": "Wool", "thickness": 0.1},
        {"name": "Wall", "layer": 1, "material": "Steel", "thickness": 0.7},
        {"name": "Wall", "layer": 2.5, "material": "Wol", "thickness": 9000, "second_share": 12},
        {"name": "Wall", "layer": 3, "material": "unventilated air layer", "thickness": 40, "second_material": "Steel"},
        {"name": "Floor", "layer": 1, "material": "Brick", "thickness": 0.24},
        {"name": "Floor", "layer": 2, "material": "Membrane", "thickness": 0.5},
    ],
    "Glazed units": [
        {"name": "Double", "u_value": 1.3, "g_value": 60, "frame_share": 0.3},
        {"name": "Double", "g_value": 0.6},
    ],
    "Envelope": [
        {"name": "W1", "zone": "Flat 1", "kind": "wall", "faces": "outdoors", "build_up": "Wall", "area": 2,
         "azimuth": "South"},
        {"name": "W2", "zone": "Flat 2", "kind": "wall", "faces": "outdoors", "area": 12},
        {"name": "W3", "zone": "Flat 1", "kind": "roof", "faces": "outdoors", "build_up": "Wall", "u_value": 0.3,
         "area": 20},
    ],
    "Openings": [
        {"name": "O1", "element": "W1", "glazed_unit": "Double", "count": 2, "width": 1.2, "height": 1.5},
        {"name": "O2", "element": "W3", "glazed_unit": "Triple", "width": 1.2, "height": 1500},
        {"element": "W3", "glazed_unit": "Double", "width": 1, "height": 1},
    ],
    "Obstructions": [{"name": "Street", "horizon_east": 100}],
    "Shading devices": [
        {"name": "Blind", "control": "months"},
        {"name": "Awning", "device": "white venetian blind 10 %", "reduction_factor": 0.4},
    ],
    "Ground floors": [
        {"name": "G1", "zone": "Flat 1", "type": "suspended", "area": 50, "perimeter": 20, "height_above_ground": 0},
    ],
    "Thermal bridges": [{"name": "T1", "zone": "Flat 1", "length": 4}, {"name": "T2", "zone": "Flat 1"}],
}  # fmt: skip

SLIPS = {
    "Zones": "A6 A7 B8 C7 E6 J7",
    "Usage": "C6 D6 O7",
    "Air systems": "F6",
    "Materials": "B6",
    "Build-ups": "B6 B7 B8 C8 D10 D6 D8",
    "Glazed units": "A6 A7 C6 D6",
    "Envelope": "B7 F8 H6",
    "Openings": "A6 A7 A8 C7 F7",
    "Obstructions": "D6",
    "Shading devices": "C7",
}
GAPS = {
    "Project": "B9",
    "Zones": "C6 F8",
    "Usage": "D7",
    "Air systems": "D6 K6",
    "Build-ups": "E8 F9",
    "Glazed units": "B7",
    "Envelope": "E7 F7 H7",
    "Openings": "A8",
    "Shading devices": "B6 C6 G6",
    "Ground floors": "F6 G6 P6",
    "Thermal bridges": "D7 E6",
}


def formulas(book: Workbook, last: Mapping[str, int]) -> list[tuple[str, str, str, str]]:
    """Sheet, cell, colour and formula of each warning, moved to every cell down to a row."""
    found = []
    for sheet in book:
        areas: Any = sheet.conditional_formatting
        for area in areas:
            (cells,) = area.sqref.ranges
            for rule in area.rules:
                colour = (rule.dxf.font.color if rule.dxf.font else rule.dxf.fill.bgColor).rgb[2:]
                if colour in {SLIP, MISSING}:
                    for row in range(cells.min_row, min(cells.max_row, last[sheet.title]) + 1):
                        cell = reference(row, cells.min_col)
                        moved = Translator(f"={rule.formula[0]}", cells.coord.partition(":")[0]).translate_formula(cell)
                        found.append((sheet.title, cell, colour, moved))
    return found


def warnings(values: Values, convert: Callable[..., Path], folder: Path) -> dict[str, dict[str, set[str]]]:
    """Cells that LibreOffice marks, by colour and sheet: every formula is put into a cell of its own sheet."""
    book = load_workbook(BytesIO(build_template(values)))
    last = {model.sheet: 7 + len(values.get(model.sheet, [])) for model in SHEETS} | {"Project": 23}
    asked = formulas(book, last)
    places = []
    for number, (sheet, _, _, formula) in enumerate(asked):
        places.append((sheet, reference(number + 1, 60)))
        book[sheet][places[-1][1]] = formula
    path = folder / "asked.xlsx"
    book.save(path)
    (folder / "answered").mkdir()
    answered = load_workbook(convert(path, folder / "answered"), data_only=True)
    found: dict[str, dict[str, set[str]]] = {SLIP: {}, MISSING: {}}
    for (sheet, cell, colour, formula), (_, place) in zip(asked, places, strict=True):
        answer = answered[sheet][place].value
        assert isinstance(answer, bool), (sheet, cell, formula, answer)
        if answer:
            found[colour].setdefault(sheet, set()).add(cell)
    return found


def test_slips_and_gaps_of_a_faulty_workbook_are_marked(convert: Callable[..., Path], tmp_path: Path) -> None:
    found = warnings(FAULTY, convert, tmp_path)
    assert found[SLIP] == {sheet: set(cells.split()) for sheet, cells in SLIPS.items()}
    assert found[MISSING] == {sheet: set(cells.split()) for sheet, cells in GAPS.items()}


def test_nothing_is_marked_in_the_example(convert: Callable[..., Path], tmp_path: Path) -> None:
    example = example_values()
    used = {row.get(field) for row in example["Build-ups"] for field in ("material", "second_material")}
    example["Materials"] = [row for row in example["Materials"] if row["name"] in used]  # others only take time
    assert warnings(example, convert, tmp_path) == {SLIP: {}, MISSING: {}}


@pytest.fixture(scope="session")
def uno_python() -> str:
    """A Python that can talk to LibreOffice."""
    for program in (sys.executable, "/usr/bin/python3", "/opt/libreoffice/program/python"):
        command = [program, "-c", "import uno"]
        if shutil.which(program) and subprocess.run(command, capture_output=True, check=False).returncode == 0:
            return program
    pytest.skip("no Python with uno is installed (python3-uno)")


@pytest.fixture
def drive(uno_python: str, tmp_path: Path) -> Callable[[Sequence[Step], str], None]:
    """Do steps in LibreOffice set to a language; see office/drive.py."""
    program = shutil.which("soffice")
    if program is None:
        pytest.skip("LibreOffice (soffice) is not on the path")

    def run(steps: Sequence[Step], language: str) -> None:
        profile, address = tmp_path / "profile", f"pipe,name=heatledger_{tmp_path.name}"
        (profile / "user").mkdir(parents=True)
        (profile / "user" / "registrymodifications.xcu").write_text(LOCALE.replace("LANGUAGE", language))
        (tmp_path / "steps.json").write_text(json.dumps(steps), encoding="utf-8")
        command = [program, f"-env:UserInstallation={profile.as_uri()}", "--headless", "--norestore"]
        with subprocess.Popen([*command, f"--accept={address};urp;"], stderr=subprocess.DEVNULL) as office:
            arguments = [uno_python, str(DRIVE), address, str(tmp_path / "steps.json")]
            done = subprocess.run(arguments, capture_output=True, text=True, timeout=240, check=False)
            assert done.returncode == 0, done.stderr
            office.wait(60)

    return run


LOCALE = """<?xml version="1.0" encoding="UTF-8"?>
<oor:items xmlns:oor="http://openoffice.org/2001/registry"><item oor:path="/org.openoffice.Setup/L10N">
<prop oor:name="ooSetupSystemLocale" oor:op="fuse"><value>LANGUAGE</value></prop></item></oor:items>"""

TYPED: Values = {
    "Project": [{"project": "House 1-2", "job_number": "007", "weather": "Golden CO", "altitude": 250.5}],
    "Zones": [
        {"name": "1.10", "conditioning": "heated", "usage": "Office", "air_system": "Fan", "floor_area": 120.5,
         "air_volume": 301.25, "leakage": 3.5, "exposed_facades": "one"},
        {"name": "1.1", "conditioning": "unconditioned", "floor_area": 40.0, "air_volume": 52.5},
    ],
    "Air systems": [
        {"name": "Fan", "kind": "balanced", "rate": 0.5, "heat_recovery": 78.5, "night_cooling": 1.0,
         "night_cooling_months": "5-9"},
    ],
    "Build-ups": [
        {"name": "Wall", "layer": 1, "material": "Clay brick 1800", "thickness": 240.0},
        {"name": "Wall", "layer": 2, "material": "Mineral wool 0.035", "thickness": 142.5},
    ],
    "Glazed units": [{"name": "Double", "u_value": 1.3, "g_value": 0.63, "frame_share": 25.0}],
    "Envelope": [
        {"name": "South", "zone": "1.10", "kind": "wall", "faces": "outdoors", "build_up": "Wall", "area": 40.5,
         "azimuth": "SSE"},
        {"name": "To 1.1", "zone": "1.10", "kind": "partition", "faces": "1.1", "u_value": 2.75, "area": 60.25},
        {"name": "Roof", "zone": "1.1", "kind": "roof", "faces": "outdoors", "u_value": 0.35, "area": 70.0,
         "azimuth": 337.5, "tilt": 40.0},
    ],
    "Openings": [{"name": "O-1", "element": "South", "glazed_unit": "Double", "width": 1.25, "height": 1.5}],
}  # fmt: skip


def typed_steps(values: Values, first: Mapping[str, int], comma: bool) -> list[Step]:
    """Each value as keys, in the order of the sheets."""
    steps: list[Step] = []
    for sheet, rows in values.items():
        fields = list(MODELS[sheet].columns())
        for number, row in enumerate(rows):
            for field, value in row.items():
                place = fields.index(field)
                labelled = sheet == ProjectRow.sheet
                cell = reference(4 + place, 2) if labelled else reference(first.get(sheet, 6) + number, 1 + place)
                text = f"{value:g}" if isinstance(value, float) else str(value)
                steps.append(
                    ("type", sheet, cell, text.replace(".", ",") if comma and isinstance(value, float) else text)
                )
    return steps


def saved(path: Path, data: bytes) -> str:
    path.write_bytes(data)
    return str(path)


def rows_of(path: Path) -> Rows:
    return check_rows(read_cells(path, list(MODELS)))


@pytest.mark.parametrize("language", ["en-US", "de-DE"])
def test_a_building_typed_by_hand_reads_as_meant(
    language: str, drive: Callable[[Sequence[Step], str], None], tmp_path: Path
) -> None:
    """Decimal point or comma as the language has it; 1.10, 007 and 5-9 stay what they are."""
    blank = saved(tmp_path / "blank.xlsx", build_template(blank_values()))
    steps = [
        ("open", blank),
        *typed_steps(TYPED, {}, comma=language == "de-DE"),
        ("save", str(tmp_path / "typed.xlsx")),
    ]
    drive(steps, language)
    saved(tmp_path / "meant.xlsx", build_template({**blank_values(), **TYPED}))
    assert rows_of(tmp_path / "typed.xlsx") == rows_of(tmp_path / "meant.xlsx")


def test_rows_copied_into_another_workbook_keep_working(
    drive: Callable[[Sequence[Step], str], None], tmp_path: Path
) -> None:
    example, blank = example_values(), blank_values()
    source = saved(tmp_path / "example.xlsx", build_template(example))
    target = saved(tmp_path / "blank.xlsx", build_template(blank))
    steps: list[Step] = [("open", source), ("open", target)]
    for model in SHEETS:
        own, taken = len(example[model.sheet]) - len(blank.get(model.sheet, [])), len(blank.get(model.sheet, []))
        if not own:
            continue
        cells = f"A6:{column_letters(len(model.columns()))}{5 + own}"
        copied, put = ("B4:B23", "B4") if model is ProjectRow else (cells, f"A{6 + taken}")
        steps += [("switch",), ("copy", model.sheet, copied), ("switch",), ("paste", model.sheet, put)]
    drive([*steps, ("save", str(tmp_path / "pasted.xlsx"))], "en-US")
    found, meant = rows_of(tmp_path / "pasted.xlsx"), rows_of(tmp_path / "example.xlsx")
    for name in Rows.__dataclass_fields__:
        rows = [getattr(part, name) for part in (found, meant)]
        shown = [sorted(str(row) for row in part) if isinstance(part, tuple) else str(part) for part in rows]
        assert shown[0] == shown[1], name
    check_whole(tmp_path / "pasted.xlsx")


def check_whole(path: Path) -> None:
    """Every cell ready for input still has its validation and warnings, and every name its cells."""
    book = load_workbook(path)
    names = {name: defined.attr_text for name, defined in book.defined_names.items()}
    assert set(names) == set(load_workbook(BytesIO(build_template({}))).defined_names)
    assert not [text for text in names.values() if "#REF!" in text]
    for model in TABLES:
        sheet: Any = book[model.sheet]
        (table,) = sheet.tables.values()
        last = int(table.ref.rpartition(":")[2].lstrip("ABCDEFGHIJKLMNOPQRSTUVWXYZ"))
        marks = [cells for area in sheet.conditional_formatting for cells in area.sqref.ranges]
        guards = [cells for each in sheet.data_validations.dataValidation for cells in each.sqref.ranges]
        for place, (field, column) in enumerate(model.columns().items(), start=1):
            for row in {6, 7, last} if model.sheet != "Monthly climate" else {6, 17}:
                covered = [any(holds(cells, row, place) for cells in group) for group in (guards, marks)]
                assert covered == [True, True] or column.kind in {"text", "months"}, (model.sheet, field, row)


def holds(cells: Any, row: int, column: int) -> bool:
    return bool(cells.min_row <= row <= cells.max_row and cells.min_col <= column <= cells.max_col)


def test_sorting_and_inserting_leave_titles_and_warnings(
    drive: Callable[[Sequence[Step], str], None], tmp_path: Path
) -> None:
    source = saved(tmp_path / "example.xlsx", build_template(example_values()))
    steps = [("open", source), ("sort", "Envelope", "B8"), ("insert", "Envelope", "A10"), ("insert", "Zones", "A7")]
    drive([*steps, ("save", str(tmp_path / "sorted.xlsx"))], "en-US")
    found, meant = rows_of(tmp_path / "sorted.xlsx"), rows_of(tmp_path / "example.xlsx")
    assert [row.zone for row in found.elements] == sorted((row.zone for row in meant.elements), reverse=True)
    assert {str(row) for row in found.elements} == {str(row) for row in meant.elements}
    assert [row.row_number for row in found.zones][:3] == [6, 8, 9]
    sheet = load_workbook(tmp_path / "sorted.xlsx")["Envelope"]
    assert [cell.value for cell in sheet[5]] == [column.title for column in MODELS["Envelope"].columns().values()]
    check_whole(tmp_path / "sorted.xlsx")
