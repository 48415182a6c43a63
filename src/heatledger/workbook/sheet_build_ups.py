"""The sheet Build-up results: an overview, then the layers of each build-up with their temperatures."""

from __future__ import annotations

from dataclasses import replace

from openpyxl.worksheet.worksheet import Worksheet

from heatledger.results import BuildUpResult, LayerResult, Results, label_of
from heatledger.workbook.look import BODY, NUMBER, SECTION, Canvas, print_setup
from heatledger.workbook.monthly import head

__all__ = ["write_build_ups"]

REMARK = (
    "Resistances and U-values with surface resistances (ISO 6946), heat capacity of the inside for a swing of 24 h "
    "(ISO 13786). Layers from inside to outside."
)
HEADER_ROW = 5
OVERVIEW = ("name", "heat_flow", "thickness", "resistance", "u_value", "internal_heat_capacity")
LAYER = ("material", "thickness", "conductivity", "resistance")
_DIGITS = {
    "thickness": "#,##0.0",
    "conductivity": "0.000",
    "resistance": "0.000",
    "u_value": "0.000",
    "internal_heat_capacity": "0.0",
}
_HEADING = replace(SECTION, wrap=True)


def write_build_ups(sheet: Worksheet, results: Results) -> None:
    """Write the sheet."""
    canvas = Canvas(sheet, (46, 22, 16, 18, 18, 20))
    head(canvas, results, sheet.title, REMARK)
    canvas.titles(HEADER_ROW, [label_of(BuildUpResult, name) for name in OVERVIEW], text_columns=2)
    row = HEADER_ROW + 1
    for build_up in results.build_ups:
        _overview(canvas, row, build_up)
        row += 1
    blocks = []
    for build_up in results.build_ups:
        first = row
        row = _layers(canvas, first + 1, build_up)
        blocks.append((first, row - 1))
    canvas.keep_together(blocks)
    print_setup(sheet, results.project.project)


def _overview(canvas: Canvas, row: int, build_up: BuildUpResult) -> None:
    for place, name in enumerate(OVERVIEW, start=1):
        value = getattr(build_up, name)
        canvas.put(row, place, value, BODY if isinstance(value, str) else NUMBER, _DIGITS.get(name, "General"))
    canvas.fit(row, (build_up.name, build_up.heat_flow))


def _layers(canvas: Canvas, row: int, build_up: BuildUpResult) -> int:
    """Layers and the temperature behind each, air and surface of the inside first; gives the row below."""
    title = f"{build_up.name} · heat flow {build_up.heat_flow}"
    canvas.merged(row, 1, len(canvas.widths), title, _HEADING)
    canvas.fit_merged(row, 1, len(canvas.widths), title, size=11, bold=True)
    titles = ["Layer", "Number", *(label_of(LayerResult, name) for name in LAYER[1:]), "Temperature behind it [°C]"]
    canvas.titles(row + 1, titles, text_columns=2)
    layers: list[LayerResult | None] = [None, None, *build_up.layers, None]
    names = ["Inside air", "Inside surface", *(layer.material for layer in build_up.layers), "Outside air"]
    temperatures = [*build_up.surface_temperatures, *[None] * len(names)]
    row += 2
    for place, (name, layer) in enumerate(zip(names, layers, strict=True)):
        _layer(canvas, row, (name, "" if layer is None else str(place - 1)), layer, temperatures[place])
        row += 1
    return row


def _layer(
    canvas: Canvas, row: int, names: tuple[str, str], layer: LayerResult | None, temperature: float | None
) -> None:
    canvas.put(row, 1, names[0], BODY)
    canvas.put(row, 2, int(names[1]) if names[1] else None, BODY)
    for place, field in enumerate(LAYER[1:], start=3):
        value = getattr(layer, field) if layer else None
        canvas.put(row, place, "–" if layer and value is None else value, NUMBER, _DIGITS[field])
    canvas.put(row, 6, "–" if temperature is None else temperature, NUMBER, "0.0")
    canvas.fit(row, names[:1])
