"""Rules of sheet Build-ups: which cells of a layer belong together, and which layers of a build-up."""

from __future__ import annotations

from collections.abc import Callable, Iterator, Sequence
from typing import TypeAlias

from heatledger.errors import Problem
from heatledger.inputs.checking import problem_at
from heatledger.inputs.columns import plain
from heatledger.inputs.rows import AIR_LAYERS, BuildUpRow
from heatledger.inputs.wording import folded

__all__ = ["BUILD_UP_RULES", "layers_together", "uses"]

GREATEST_AIR_LAYER = 300.0
"""Thickest air layer or deepest void of the method. [mm] ISO 6946:2017, 6.9.1."""
WIDEST_VOID = 10.0
"""Width of a void over its depth, at most. [-] ISO 6946:2017, annex D.4."""
MOST_SECTIONS = 65_536
"""Combinations of bridged sections that are worked out, at most."""

_WELL_VENTILATED = AIR_LAYERS[2]
_VOID_FIELDS = ("void_width", "void_depth", "void_share", "void_rows")
_FASTENER_FIELDS = ("fastener_section", "fastener_conductivity", "fastener_depth")
_OF_MATERIALS = (*_VOID_FIELDS, "fasteners", *_FASTENER_FIELDS, "gaps", "rain", "drainage", "taper")


def uses(row: BuildUpRow, field: str) -> bool:
    """Whether a cell with a default counts in its layer."""
    match field:
        case "void_rows":
            return row.void_depth is not None
        case "inner_emissivity" | "outer_emissivity":
            return row.material in AIR_LAYERS[:2] or row.void_width is not None
        case "air_openings":
            return row.material == AIR_LAYERS[1]
        case "fastener_conductivity":
            return row.fasteners is not None
        case "drainage":
            return row.rain is not None
    return False


def _typed(row: BuildUpRow, field: str) -> bool:
    """Whether a cell was filled in with more than its default."""
    return field in row.model_fields_set and getattr(row, field) != type(row).columns()[field].default


def _second(row: BuildUpRow) -> Iterator[Problem]:
    if row.second_material and row.second_share is None:
        expected = f"the share of the face that '{row.second_material}' takes"
        yield problem_at(row, "second_share", "an empty cell", expected, "Type the share in percent.")
    if row.second_share and not row.second_material:
        expected = f"the second material that takes {plain(row.second_share)} % of the face"
        fix = "Choose the material, or clear the share."
        yield problem_at(row, "second_material", "an empty cell", expected, fix)
    if row.second_material and row.material == _WELL_VENTILATED:
        expected = "an empty cell, since a well ventilated air layer counts as outdoor air"
        fix = "Clear the second material and its share."
        yield problem_at(row, "second_material", f"'{row.second_material}'", expected, fix)


def _air(row: BuildUpRow) -> Iterator[Problem]:
    if row.material not in AIR_LAYERS:
        return
    if row.thickness > GREATEST_AIR_LAYER:
        expected = f"an air layer of at most {plain(GREATEST_AIR_LAYER)} mm"
        fix = "Enter a thicker space as an unconditioned zone on sheet Zones."
        yield problem_at(row, "thickness", f"{plain(row.thickness)} mm of air", expected, fix)
    for field in _OF_MATERIALS:
        if _typed(row, field):
            found, title = str(getattr(row, field)), row.columns()[field].title
            value = found if isinstance(getattr(row, field), str) else plain(getattr(row, field))
            expected = "an empty cell in an air layer"
            yield problem_at(row, field, value, expected, f"Clear {title}, or choose the material of a solid layer.")


def _surfaces(row: BuildUpRow) -> Iterator[Problem]:
    """Cells that speak of air in a layer that has none."""
    airy = row.material in AIR_LAYERS or any(_typed(row, field) for field in _VOID_FIELDS)
    for field in ("inner_emissivity", "outer_emissivity"):
        if _typed(row, field) and not airy:
            fix = "Type it in the row of the air layer that the face bounds."
            expected = "an empty cell, since the layer holds no air"
            yield problem_at(row, field, plain(getattr(row, field)), expected, fix)
    if _typed(row, "air_openings") and row.material != AIR_LAYERS[1]:
        expected = f"an empty cell, since only a {AIR_LAYERS[1]} has openings to state"
        yield problem_at(row, "air_openings", plain(row.air_openings), expected, "Clear the cell, or choose the layer.")


def _voids(row: BuildUpRow) -> Iterator[Problem]:
    if row.material in AIR_LAYERS or not any(_typed(row, field) for field in _VOID_FIELDS):
        return
    for field, other in (("void_width", "void_share"), ("void_share", "void_width")):
        if getattr(row, field) is None:
            expected = "void width and void share together"
            fix = "Fill in the cell, or clear all cells of the voids."
            if getattr(row, other) is not None or field == "void_width":
                yield problem_at(row, field, "an empty cell", expected, fix)
    if row.void_depth is None and row.void_rows > 1:
        expected = f"the depth of one void, since there are {row.void_rows} rows"
        yield problem_at(row, "void_depth", "an empty cell", expected, "Fill in the cell.")
        return
    yield from _void_sizes(row, row.thickness if row.void_depth is None else row.void_depth)


def _void_sizes(row: BuildUpRow, depth: float) -> Iterator[Problem]:
    if row.void_rows * depth > row.thickness * (1 + 1e-9):
        rows = "1 row" if row.void_rows == 1 else f"{row.void_rows} rows"
        found = f"{rows} of {plain(depth)} mm in a layer of {plain(row.thickness)} mm"
        fix = "Correct the thickness, the depth or the number of rows."
        yield problem_at(row, "void_depth", found, "void rows that fit into the layer", fix)
    elif depth > GREATEST_AIR_LAYER:
        expected = f"a depth of at most {plain(GREATEST_AIR_LAYER)} mm"
        fix = "Enter so large a space as an unconditioned zone on sheet Zones."
        yield problem_at(row, "void_depth", f"voids {plain(depth)} mm deep", expected, fix)
    elif row.void_width is not None and row.void_width > WIDEST_VOID * depth * (1 + 1e-9):
        found = f"{plain(row.void_width)} mm wide and {plain(depth)} mm deep"
        expected = f"at most {plain(WIDEST_VOID)} times the depth, here {plain(WIDEST_VOID * depth)} mm"
        fix = "Enter a wider space as an air layer in a row of its own."
        yield problem_at(row, "void_width", found, expected, fix)


def _fasteners(row: BuildUpRow) -> Iterator[Problem]:
    if row.material in AIR_LAYERS:
        return
    if row.fasteners is not None and row.fastener_section is None:
        fix = "Fill in the cell: 4 mm thick 12.6, 6 mm 28.3."
        yield problem_at(row, "fastener_section", "an empty cell", "the cross-section of one fastener", fix)
    if row.fasteners is None and any(_typed(row, field) for field in _FASTENER_FIELDS):
        fix = "Fill in the cell, or clear all cells of the fasteners."
        yield problem_at(row, "fasteners", "an empty cell", "the number of fasteners per area", fix)
    if row.fastener_depth is not None and row.fastener_depth > row.thickness:
        found = f"{plain(row.fastener_depth)} mm in a layer of {plain(row.thickness)} mm"
        yield problem_at(row, "fastener_depth", found, "at most the thickness of the layer", "Correct one of the two.")


def _rain(row: BuildUpRow) -> Iterator[Problem]:
    if _typed(row, "drainage") and row.rain is None and row.material not in AIR_LAYERS:
        fix = "Fill in the cell, or clear the drainage factor."
        yield problem_at(row, "rain", "an empty cell", "the rain on an inverted roof", fix)


def _taper(row: BuildUpRow) -> Iterator[Problem]:
    if row.taper == "none" or row.material in AIR_LAYERS:
        return
    if row.second_material or any(_typed(row, field) for field in _VOID_FIELDS):
        what = "a second material" if row.second_material else "voids"
        fix = "Enter the part of even thickness as a layer of its own, or clear the taper."
        yield problem_at(row, "taper", f"{row.taper} with {what}", "a tapered layer of one material", fix)


_Rules: TypeAlias = tuple[tuple[frozenset[str], Callable[[BuildUpRow], Iterator[Problem]]], ...]

BUILD_UP_RULES: _Rules = (
    (frozenset({"material", "second_material", "second_share"}), _second),
    (frozenset({"material", "thickness", *_OF_MATERIALS}), _air),
    (frozenset({"material", "inner_emissivity", "outer_emissivity", "air_openings", *_VOID_FIELDS}), _surfaces),
    (frozenset({"material", "thickness", *_VOID_FIELDS}), _voids),
    (frozenset({"material", "thickness", "fasteners", *_FASTENER_FIELDS}), _fasteners),
    (frozenset({"material", "rain", "drainage"}), _rain),
    (frozenset({"material", "second_material", "taper", *_VOID_FIELDS}), _taper),
)
"""The fields a rule reads, and the rule."""


def layers_together(layers: Sequence[BuildUpRow]) -> Iterator[Problem]:
    """What the layers of one build-up, in order, may not be together."""
    yield from _only_one(layers, "taper", [layer for layer in layers if layer.taper != "none"], "tapered layer")
    yield from _only_one(layers, "rain", [layer for layer in layers if layer.rain], "layer with rain under it")
    sections, before = 1, ("", 0.0)
    for layer in layers:
        second = (folded(layer.second_material), layer.second_share or 0.0)
        is_stud = layer.second_material and layer.void_width is None
        if layer.void_width is not None:
            sections *= 3 if layer.second_material else 2
        elif is_stud and second != before:
            sections *= 2
        before = second if is_stud else ("", 0.0)
    if sections > MOST_SECTIONS:
        found = f"bridges that cross in {sections} combinations in '{layers[0].name}'"
        fix = "Give neighbouring layers the same second material and share where studs run through, or join layers."
        yield problem_at(layers[0], "layer", found, f"at most {MOST_SECTIONS}", fix)


def _only_one(layers: Sequence[BuildUpRow], field: str, marked: Sequence[BuildUpRow], what: str) -> Iterator[Problem]:
    for layer in marked[1:]:
        found = f"another {what} in '{layers[0].name}', besides layer {marked[0].layer}"
        yield problem_at(layer, field, found, f"one {what} in a build-up", "Clear the cell, or join the layers.")
