"""The sheet Build-up results: an overview, two build-ups side by side, then each one with its temperatures."""

from __future__ import annotations

from dataclasses import replace

from openpyxl.worksheet.worksheet import Worksheet

from heatledger.results import BuildUpComparison, BuildUpResult, LayerResult, Results, label_of
from heatledger.workbook.canvas import Canvas
from heatledger.workbook.charts import BLUE, VERMILLION, Area, Curve, add_curves
from heatledger.workbook.look import BODY, HEAD, HEAD_NUMBER, LONG, NUMBER, SECTION, SMALL
from heatledger.workbook.monthly import head
from heatledger.workbook.pages import print_setup

__all__ = ["write_build_ups"]

REMARK = (
    "U-values with surface resistances and corrections (ISO 6946), storage for a swing of 24 h (ISO 13786), "
    "temperatures at the design temperatures of sheet Project (ISO 13788). κ/U: heat capacity inside over U."
)
HEADER_ROW = 5
OVERVIEW = (
    "name",
    "heat_flow",
    "thickness",
    "resistance",
    "u_value",
    "internal_heat_capacity",
    "time_constant",
    "time_shift",
    "decrement_factor",
    "inside_surface_temperature",
    "temperature_factor",
)
LAYER = ("thickness", "conductivity", "resistance")
FACTS = (
    ("upper_limit", "lower_limit", "error", "correction", "heat_flux", "outer_heat_capacity"),
    (
        "effective_heat_capacity",
        "inside_capacity",
        "outside_capacity",
        "inside_admittance",
        "outside_admittance",
        "periodic_transmittance",
    ),
)
"""What the overview leaves out, in two columns."""
HOLDS_BETTER = {
    "thickness": 0,
    "u_value": -1,
    "heat_flux": -1,
    "internal_heat_capacity": 1,
    "time_constant": 1,
    "time_shift": 1,
    "decrement_factor": -1,
    "periodic_transmittance": -1,
    "inside_admittance": 0,
    "inside_surface_temperature": 1,
    "temperature_factor": 1,
}
"""Figures of the comparison: 1 where more holds heat better, -1 where less does, 0 where it decides nothing."""
_DIGITS = {
    "thickness": "#,##0.0",
    "conductivity": "0.000",
    "resistance": "0.000",
    "upper_limit": "0.000",
    "lower_limit": "0.000",
    "error": "0.0",
    "correction": "0.000",
    "u_value": "0.000",
    "internal_heat_capacity": "0.0",
    "outer_heat_capacity": "0.0",
    "effective_heat_capacity": "0.0",
    "inside_capacity": "0.0",
    "outside_capacity": "0.0",
    "time_constant": "#,##0",
    "inside_admittance": "0.00",
    "outside_admittance": "0.00",
    "periodic_transmittance": "0.000",
    "decrement_factor": "0.00",
    "time_shift": "0.0",
    "heat_flux": "0.0",
    "inside_surface_temperature": "0.0",
    "temperature_factor": "0.00",
}
_WIDTHS = (46, 27, 13, 14, 15, 17, 14, 12, 13, 16, 16)
_CHART = (7, 11)
"""First and last column of a chart."""
_HELPERS = 13
"""First of the columns behind the charts, outside the printed area."""
_FILM = 20.0
"""Distance at which the air beside a surface is drawn. [mm]"""
_HEADING = replace(SECTION, wrap=True)
_BESIDE, _HEAD_BESIDE = replace(BODY, indent=1), replace(HEAD, indent=1)
"""Texts that follow a number."""
_ALIKE = 0.005
"""Figures that differ by less than this share count as equal."""


def write_build_ups(sheet: Worksheet, results: Results) -> None:
    """Write the sheet."""
    canvas = Canvas(sheet, _WIDTHS)
    head(canvas, results, sheet.title, REMARK)
    canvas.titles(HEADER_ROW, [label_of(BuildUpResult, name) for name in OVERVIEW], text_columns=2)
    row = HEADER_ROW + 1
    for build_up in results.build_ups:
        _overview(canvas, row, build_up)
        row += 1
    blocks = []
    if results.comparison:
        blocks.append((row, _comparison(canvas, row, results.comparison) - 1))
        row = blocks[-1][1] + 1
    for build_up in results.build_ups:
        blocks.append((row, _build_up(canvas, row, build_up) - 1))
        row = blocks[-1][1] + 1
    canvas.keep_together(blocks)
    for column in (_HELPERS, _HELPERS + 1):
        sheet.column_dimensions["MN"[column - _HELPERS]].width = 12
    sheet.print_area = f"A1:K{max(row - 1, HEADER_ROW)}"
    print_setup(sheet, results.project.project)


def _overview(canvas: Canvas, row: int, build_up: BuildUpResult) -> None:
    for place, name in enumerate(OVERVIEW, start=1):
        value = getattr(build_up, name)
        canvas.put(row, place, value, BODY if isinstance(value, str) else NUMBER, _DIGITS.get(name, "General"))
    canvas.fit(row, (build_up.name, build_up.heat_flow))


def _heading(canvas: Canvas, row: int, title: str) -> None:
    canvas.height(row, 12)
    canvas.merged(row + 1, 1, len(canvas.widths), title, _HEADING)
    canvas.fit_merged(row + 1, 1, len(canvas.widths), title, size=11, bold=True)


def _build_up(canvas: Canvas, row: int, build_up: BuildUpResult) -> int:
    """Layers, the temperature behind each, further figures and the chart; gives the row below."""
    _heading(canvas, row, f"{build_up.name} · heat flow {build_up.heat_flow}")
    top = row + 2
    last = _facts(canvas, _layers(canvas, top, build_up), build_up)
    points = _points(canvas, top, build_up)
    name = f"Temperatures in {build_up.name}"
    _profile(canvas, Area(top, _CHART[0], last, _CHART[1]), name, [(build_up, points)])
    return last + 1


def _layers(canvas: Canvas, row: int, build_up: BuildUpResult) -> int:
    """Layers and the temperature behind each, air and surface of the inside first; gives the row below."""
    figures = (label_of(LayerResult, name) for name in LAYER)
    canvas.titles(row, ["Layer", "Depth behind it [mm]", *figures, "Temperature behind it [°C]"])
    temperatures = build_up.surface_temperatures
    missing = len(build_up.layers) + 3 - len(temperatures)
    shown = [*temperatures[:-1], *[temperatures[-1]] * min(missing, 1), *[None] * (missing - 1), temperatures[-1]]
    layers: list[LayerResult | None] = [None, None, *build_up.layers, None]
    names = ["Inside air", "Inside surface", *(layer.material for layer in build_up.layers), _behind(build_up)]
    depth = 0.0
    for name, layer, temperature in zip(names, layers, shown, strict=True):
        row += 1
        depth += layer.thickness if layer else 0.0
        beside = name in {names[0], names[-1]} and layer is None
        _layer(canvas, row, name, layer, (None if beside else depth, temperature))
    return row + 1


def _behind(build_up: BuildUpResult) -> str:
    """What stands behind the last layer."""
    words = {"outdoors": "Outside air", "to the ground": "Ground, mean of the year"}
    return words.get(build_up.heat_flow.partition(", ")[2], "Air on the other side")


def _layer(
    canvas: Canvas, row: int, name: str, layer: LayerResult | None, behind: tuple[float | None, float | None]
) -> None:
    """A layer with the depth and the temperature behind it."""
    depth, temperature = behind
    canvas.put(row, 1, name, BODY)
    canvas.put(row, 2, depth, NUMBER, "#,##0.0")
    for place, field in enumerate(LAYER, start=3):
        value = getattr(layer, field) if layer else None
        canvas.put(row, place, "–" if layer and not value else value, NUMBER, _DIGITS[field])
    canvas.put(row, 6, "–" if temperature is None else temperature, NUMBER, "0.0")
    canvas.fit(row, [name])


def _facts(canvas: Canvas, row: int, build_up: BuildUpResult) -> int:
    """Further figures in two columns; gives their last row."""
    canvas.height(row, 8)
    for left, right in zip(*FACTS, strict=True):
        row += 1
        canvas.put(row, 1, label_of(BuildUpResult, left), BODY)
        canvas.put(row, 2, getattr(build_up, left), NUMBER, _DIGITS[left])
        canvas.merged(row, 3, 5, label_of(BuildUpResult, right), _BESIDE)
        canvas.put(row, 6, getattr(build_up, right), NUMBER, _DIGITS[right])
        canvas.fit(row, (label_of(BuildUpResult, left),))
    return row


def _points(canvas: Canvas, row: int, build_up: BuildUpResult) -> tuple[Area, Area]:
    """Depth and temperature of every interface, the air of both sides a little before and behind it."""
    temperatures = build_up.surface_temperatures
    depths = [0.0]
    for layer in build_up.layers[: len(temperatures) - 3]:
        depths.append(depths[-1] + layer.thickness)
    depths = [-_FILM, *depths, depths[-1] + _FILM]
    first, last = row + 1, row + len(depths)
    for place, title in enumerate(("Depth [mm]", "Temperature [°C]")):
        canvas.put(row, _HELPERS + place, title, SMALL)
    for place, (depth, temperature) in enumerate(zip(depths, temperatures, strict=True)):
        canvas.put(first + place, _HELPERS, depth, SMALL, "0.0")
        canvas.put(first + place, _HELPERS + 1, temperature, SMALL, "0.0")
    return Area.down(_HELPERS, first, last), Area.down(_HELPERS + 1, first, last)


def _profile(canvas: Canvas, place: Area, title: str, curves: list[tuple[BuildUpResult, tuple[Area, Area]]]) -> None:
    """Temperature against depth, the second build-up dashed."""
    looks = ((BLUE, False), (VERMILLION, True))
    deepest = max(build_up.thickness for build_up, _ in curves)
    add_curves(
        canvas.sheet,
        place,
        (title, "Depth from the inner surface [mm]", "Temperature [°C]"),
        [
            Curve(build_up.name, *points, colour, dashed=dashed)
            for (build_up, points), (colour, dashed) in zip(curves, looks, strict=False)
        ],
        step=50.0 if deepest <= 500 else 100.0 if deepest <= 1200 else 500.0,
    )


def _comparison(canvas: Canvas, row: int, comparison: BuildUpComparison) -> int:
    """Two build-ups side by side, the verdict first; gives the row below."""
    first, second = comparison.first, comparison.second
    _heading(canvas, row, f"Side by side: {first.name} and {second.name} · heat flow {first.heat_flow}")
    row += 2
    canvas.merged(row, 1, len(canvas.widths), comparison.verdict, LONG)
    canvas.fit_merged(row, 1, len(canvas.widths), comparison.verdict)
    top = row = row + 1
    canvas.put(row, 1, "Figure", HEAD)
    canvas.put(row, 2, first.name, HEAD_NUMBER)
    canvas.merged(row, 3, 4, second.name, HEAD_NUMBER)
    canvas.merged(row, 5, 6, "Holds heat better", _HEAD_BESIDE)
    canvas.fit(row, ("", first.name), bold=True)
    for field, direction in HOLDS_BETTER.items():
        row += 1
        one, other = getattr(first, field), getattr(second, field)
        canvas.put(row, 1, label_of(BuildUpResult, field), BODY)
        canvas.put(row, 2, one, NUMBER, _DIGITS[field])
        canvas.merged(row, 3, 4, None, NUMBER)
        canvas.put(row, 3, other, NUMBER, _DIGITS[field])
        canvas.merged(row, 5, 6, _better(direction * one, direction * other), _BESIDE)
        canvas.fit(row, (label_of(BuildUpResult, field),))
    points = (_points(canvas, top, first), _points(canvas, top + len(first.surface_temperatures) + 1, second))
    place = Area(top, _CHART[0], row, _CHART[1])
    _profile(canvas, place, "Temperatures side by side", [(first, points[0]), (second, points[1])])
    return row + 1


def _better(one: float, other: float) -> str:
    """Which of two figures is the larger one, in words."""
    if one == other == 0:
        return ""
    if abs(one - other) <= _ALIKE * max(abs(one), abs(other)):
        return "alike"
    return "the first" if one > other else "the second"
