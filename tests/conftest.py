"""A small sound workbook, written out cell by cell, and the means to change it."""

from __future__ import annotations

import re
from collections import defaultdict
from collections.abc import Callable, Mapping
from dataclasses import dataclass, field
from datetime import date
from pathlib import Path
from typing import TypeAlias, cast

import pytest

from heatledger.errors import InputError
from heatledger.inputs.cells import Cell
from heatledger.inputs.rows import Rows
from heatledger.inputs.workbook_rows import check_rows

Value: TypeAlias = str | float | bool | date | Cell | None
Changes: TypeAlias = Mapping[str, Value]
"""``Sheet!E5`` and its value (None clears), ``Sheet!5:5`` and None, ``Sheet`` and its new name (None removes)."""
Grid: TypeAlias = tuple[tuple[Value, ...], ...]
Tell: TypeAlias = Callable[..., None]
"""``tell("{} cases, {} tracebacks", 1, 0)``: a line for the end of the run."""
_TOLD = "told"

COTTAGE: dict[str, Grid] = {
    "Project": (
        ("Project",),
        (),
        (),
        ("Project", "Moss Cottage"),
        ("Weather", "Golden CO"),
        ("Altitude", 120, "m"),
        ("Ground reflectance", 0.2, "-"),
        ("Site exposure", "normal"),
        ("Method", "ISO 13790:2008"),
    ),
    "Zones": (
        ("Zones",),
        (),
        (None, None, None, None, "m²", "m³", None, "kJ/(m²·K)", "°C", "°C", "1/h"),
        (
            *("Zone", "Conditioning", "Usage", "Air system", "Floor area", "Air volume", "Thermal mass"),
            *("Heat capacity", "Heating set-point", "Cooling set-point", "Leakage n50", "Exposed façades"),
        ),
        ("House", "heated", "Dwelling", "Windows", 60, 150),
        ("Loft", "unconditioned", None, None, 50, 110),
    ),
    "Usage": (
        ("Usage",),
        (),
        (None, "°C", "°C", "m²", "W", "h/d", "kWh/(m²·a)", "%"),
        (
            *("Usage", "Heating set-point", "Cooling set-point", "Floor area per person", "Heat per person"),
            *("Presence", "Appliances", "Share released in zone"),
        ),
        ("Dwelling", 20, 26, 40, 70, 12, 30, 70),
    ),
    "Air systems": (
        ("Air systems",),
        (),
        (None, None, None, "1/h or m³/(h·m²)", "h", "%"),
        ("Air system", "Kind", "Rate basis", "Rate", "Running hours per day", "Heat recovery", "Bypass in cooling"),
        ("Windows", "natural", "air changes", 0.5),
        ("Fans", "balanced", "floor area", 1.2, 24, 80, "yes"),
    ),
    "Materials": (
        ("Materials",),
        (),
        (None, "W/(m·K)", "kg/m³", "J/(kg·K)"),
        ("Material", "Conductivity", "Density", "Specific heat", "Source"),
        ("Brick", 0.77, 1700, 1000),
        ("Wool", 0.035, 30, 1030),
        ("Concrete", 1.65, 2200, 1000),
    ),
    "Build-ups": (
        ("Build-ups",),
        (),
        (None, None, None, "mm"),
        ("Build-up", "Layer", "Material", "Thickness"),
        ("Wall", 1, "Brick", 250),
        ("Wall", 2, "Wool", 100),
        ("Slab", 1, "Concrete", 200),
    ),
    "Glazed units": (
        ("Glazed units",),
        (),
        (None, "W/(m²·K)", "-", "%"),
        ("Glazed unit", "U-value", "g-value", "Frame share"),
        ("Double", 1.3, 0.6, 30),
    ),
    "Envelope": (
        ("Envelope",),
        (),
        (None, None, None, None, None, "W/(m²·K)", "m²", "°", "°", "-"),
        (
            *("Element", "Zone", "Kind", "Faces", "Build-up", "U-value", "Area", "Azimuth", "Tilt"),
            *("Solar absorptance", "Obstruction"),
        ),
        ("South wall", "House", "wall", "outdoors", "Wall", None, 20, "S"),
        ("North wall", "House", "wall", "outdoors", "Wall", None, 20, 0),
        ("Ceiling", "House", "partition", "Loft", None, 0.3, 60, None, 0),
        ("Roof", "Loft", "roof", "outdoors", None, 2.5, 40, "S", 45),
    ),
    "Openings": (
        ("Openings",),
        (),
        (None, None, None, None, "m", "m"),
        ("Opening", "Element", "Glazed unit", "Number", "Width", "Height", "Obstruction", "Movable shading"),
        ("Window", "South wall", "Double", 2, 1.2, 1.5),
        ("Skylight", "Roof", "Double", None, 0.8, 1),
    ),
    "Obstructions": (
        ("Obstructions",),
        (),
        (None, "°", "m", "m", "m", "m", "-"),
        (
            *("Obstruction", "Horizon S", "Overhang depth", "Overhang distance", "Left fin depth"),
            *("Left fin distance", "Reflectance"),
        ),
        ("Street", 25, 1.2, 0.3),
    ),
    "Shading devices": (
        ("Shading devices",),
        (),
        (None, "-", None, None, None, "W/m²"),
        (
            *("Shading device", "Reduction factor", "Device", "Place", "Control", "Irradiance threshold", "Months"),
            *("Used in heating", "Used in cooling"),
        ),
        ("Awning", 0.3),
    ),
    "Ground floors": (
        ("Ground floors",),
        (),
        (
            *(None, None, None, "m²", "m", None, "W/(m²·K)", "m", None, None, "m", "m²·K/W", "mm", "m", "W/(m²·K)"),
            *("m²/m", "m/s", "m²·K/W", "m", None, "m³", "1/h"),
        ),
        (
            *("Ground floor", "Zone", "Type", "Area", "Exposed perimeter", "Build-up", "U-value"),
            *("Wall thickness", "Soil", "Edge insulation", "Edge depth", "Edge resistance", "Edge thickness"),
            *("Height above ground", "Wall U-value above ground", "Vent area", "Wind speed", "Ground insulation"),
            *("Basement depth", "Basement wall", "Basement volume", "Basement air change"),
        ),
        ("Floor", "House", "slab on ground", 60, 32, "Slab", None, 0.35),
    ),
    "Thermal bridges": (
        ("Thermal bridges",),
        (),
        (None, None, "m", "W/(m·K)", None, "W/K"),
        ("Thermal bridge", "Zone", "Length", "Linear transmittance ψ", "Number", "Point transmittance χ", "Faces"),
        ("Eaves", "House", 20, 0.1),
    ),
}


@dataclass
class Book:
    """The cells of a workbook, as a user would type them."""

    sheets: dict[str, dict[tuple[int, int], Value]] = field(default_factory=dict)

    def change(self, changes: Changes) -> Book:
        for place, value in changes.items():
            sheet, _, cell = place.partition("!")
            if not cell:
                moved = self.sheets.pop(sheet)
                if value is not None:
                    self.sheets[str(value)] = moved
            elif ":" in cell:
                row = int(cell.partition(":")[0])
                self.sheets[sheet] = {at: old for at, old in self.sheets[sheet].items() if at[0] != row}
            else:
                self.sheets[sheet][position(cell)] = value
        return self

    def cells(self) -> dict[str, dict[tuple[int, int], Cell]]:
        """What the reader would give."""
        return {
            sheet: {at: stored(value) for at, value in values.items() if value is not None and str(value).strip()}
            for sheet, values in self.sheets.items()
        }

    def rows(self) -> Rows:
        return check_rows(self.cells())

    def problems(self) -> list[str]:
        """The sentences a user would meet."""
        return problems_of(self.cells())

    def save(self, path: Path) -> Path:
        """Write the workbook as a spreadsheet program without stored values would."""
        from openpyxl import Workbook

        book = Workbook()
        book.remove(book.worksheets[0])
        for title, values in self.sheets.items():
            sheet = book.create_sheet(title)
            for at, value in values.items():
                sheet.cell(*at).value = value.value if isinstance(value, Cell) else value
        book.save(path)
        return path


def problems_of(cells: Mapping[str, Mapping[tuple[int, int], Cell]]) -> list[str]:
    try:
        check_rows(cells)
    except InputError as error:
        return [str(problem) for problem in error.problems]
    return []


def position(cell: str) -> tuple[int, int]:
    """Row and column of a cell name in columns A to Z."""
    match = re.fullmatch(r"([A-Z])(\d+)", cell)
    assert match, cell
    return int(match[2]), ord(match[1]) - 64


def stored(value: Value) -> Cell:
    """The cell that the reader makes of a typed value."""
    match value:
        case Cell():
            return value
        case bool():
            return Cell(value, "boolean")
        case date():
            return Cell(value.isoformat(), "date")
        case str() if value.startswith("="):
            return Cell(None, "uncalculated")
        case str() if re.fullmatch(r"#[A-Z/0]+[!?A]", value):
            return Cell(value, "error")
        case str():
            return Cell(value, "text")
    return Cell(float(value or 0), "number")


def laid_out(grids: Mapping[str, Grid]) -> Book:
    return Book(
        {
            sheet: {
                (row, column): value
                for row, values in enumerate(grid, start=1)
                for column, value in enumerate(values, start=1)
                if value is not None
            }
            for sheet, grid in grids.items()
        }
    )


@pytest.fixture
def cottage() -> Book:
    """A sound workbook of two zones."""
    return laid_out(COTTAGE)


def example_book() -> Book:
    """The filled example in the order of the row models."""
    from heatledger.inputs.prefilled import example_values
    from heatledger.inputs.rows import SHEETS

    values = example_values()
    grids: dict[str, Grid] = {}
    for model in SHEETS:
        columns = model.columns()
        rows = values[model.sheet]
        if model.labelled:
            grids[model.sheet] = tuple((column.title, _plain(rows[0].get(name))) for name, column in columns.items())
        else:
            titles = tuple(column.title for column in columns.values())
            units = tuple(column.unit or None for column in columns.values())
            data = (tuple(_plain(row.get(name)) for name in columns) for row in rows)
            grids[model.sheet] = ((), (), units, titles, *data)
    return laid_out(grids)


def _plain(value: object) -> Value:
    assert value is None or isinstance(value, str | float | int), value
    return value


@pytest.fixture
def example() -> Book:
    """The filled example."""
    return example_book()


@pytest.fixture
def tell(record_property: Callable[[str, object], None]) -> Tell:
    """Say something at the end of the run, in any process; numbers of lines of the same wording are added up."""

    def say(line: str, *numbers: int) -> None:
        record_property(_TOLD, (line, numbers))

    return say


def pytest_terminal_summary(terminalreporter: pytest.TerminalReporter) -> None:
    """Print the lines that tests told."""
    lines = _told(terminalreporter)
    if lines:
        terminalreporter.section("counts")
    for line in lines:
        terminalreporter.write_line(line)


def _told(terminal: pytest.TerminalReporter) -> list[str]:
    reports = (report for group in terminal.stats.values() for report in group)
    ended = [report for report in reports if getattr(report, "when", "") == "teardown"]
    sums: dict[str, list[int]] = defaultdict(list)
    for report in ended:
        for key, value in report.user_properties:
            if key == _TOLD:
                line, numbers = cast(tuple[str, tuple[int, ...]], value)
                sums[line] = [sum(pair) for pair in zip(numbers, sums[line] or [0] * len(numbers), strict=True)]
    return [line.format(*numbers) if numbers else line for line, numbers in sums.items()]
