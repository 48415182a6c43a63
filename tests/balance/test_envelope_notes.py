"""Limits of the methods: a note at the cell, by its full text; and whose material values count."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any, TypeAlias

import numpy as np
import pytest

from heatledger.balance.calculate import calculate
from heatledger.building.model import Building
from heatledger.results import Note

Layer: TypeAlias = Callable[..., dict[str, Any]]
Told: TypeAlias = Callable[..., list[Note]]


@pytest.fixture(scope="module")
def told(building: Callable[[Any], Building], flat_sky: Any, wall_rows: Callable[..., Any]) -> Told:
    """Checks that lead to sheet Build-ups."""

    def of(*layers: dict[str, Any], **element: Any) -> list[Note]:
        results = calculate(building(wall_rows(layers, **element)), flat_sky(np.full(12, 5.0)))
        return [note for note in results.notes if note.kind == "check" and note.sheet == "Build-ups"]

    return of


def test_a_plain_wall_needs_no_second_look(told: Told, make_layer: Layer) -> None:
    assert told(make_layer("Brick", 200), make_layer("Wool", 100)) == []


def test_metal_through_insulation_and_limits_far_apart(told: Told, make_layer: Layer) -> None:
    limits, metal = told(make_layer("Wool", 100, second_material="Steel", second_share=1.0))
    assert limits.text.startswith("Wall: the upper limit of the resistance is ")
    assert limits.text.endswith(
        " times the lower one; the method for bridged layers holds up to 1.5 (ISO 6946:2017, 6.7.2). Use a two- or "
        "three-dimensional calculation (ISO 10211)."
    )
    assert metal.text == (
        "Wall, layer 1: bridged by metal (Steel); the method for bridged layers leaves this out (ISO 6946:2017, "
        "6.7.2). Use a declared or calculated U-value (ISO 10211), or enter thin fixings as fasteners."
    )
    assert {limits.cell, metal.cell} == {"E5"}


def test_an_error_of_more_than_5_percent(told: Told, make_layer: Layer) -> None:
    """Two layers with crossing studs, by hand: upper limit 6.32214, lower 5.52824, so 0.7939/2/5.92519 = 6.7 %."""
    wool = {"material": "Wool", "thickness": 140.0, "second_material": "Timber"}
    (note,) = told(wool | {"second_share": 15.0}, wool | {"second_share": 16.0})
    assert note.text == (
        "Wall: the resistance may be wrong by up to 6.7 %, since its upper and lower limit lie apart (ISO 6946:2017, "
        "6.7.2)."
    )
    assert note.cell == "E5"


def test_fasteners_in_what_is_no_insulation(told: Told, make_layer: Layer) -> None:
    (note,) = told(make_layer("Brick", 200, fasteners=4.0, fastener_section=12.0))
    assert note.text == (
        "Wall, layer 1: fasteners count in insulation; Brick with 0.77 W/(m·K) is none (ISO 6946:2017, annex F)."
    )


def test_corrections_outside_a_ventilated_cavity(told: Told, make_layer: Layer) -> None:
    outer = make_layer("Insulation", 50, gaps="bridging", fasteners=4.0, fastener_section=12.0)
    notes = told(make_layer("Wool", 100), make_layer("well ventilated", 40), outer)
    text = "Wall, layer 3: it stands outside a well ventilated air layer, so this correction does not count."
    assert [note.text for note in notes] == [text, text]
    assert len({note.cell for note in notes}) == 2


def test_air_layers_open_to_outdoors_inside_the_building(told: Told, make_layer: Layer) -> None:
    layers = (make_layer("Wool", 100), make_layer("slightly ventilated", 40), make_layer("Plywood", 9))
    assert told(*layers) == []
    (note,) = told(*layers, faces="neighbour", kind="partition")
    assert note.text == ("Wall, layer 2: slightly ventilated air layer open to outdoors, yet W does not face outdoors.")


def test_rain_on_what_is_no_roof(told: Told, make_layer: Layer) -> None:
    insulation = make_layer("Insulation", 100, rain=2.0)
    assert told(make_layer("Concrete", 200), insulation, kind="roof", tilt=0.0) == []
    (note,) = told(make_layer("Concrete", 200), insulation)
    assert note.text == "Wall, layer 2: rain runs under it, yet W is no roof under the open sky."


def test_sources_of_materials_lead_to_their_cells(
    building: Callable[[Any], Building], flat_sky: Any, wall_rows: Callable[..., Any], make_layer: Layer
) -> None:
    rows = wall_rows([make_layer("Brick", 200), make_layer("Mineral wool 0.035", 100)])
    notes = [
        note
        for note in calculate(building(rows), flat_sky(np.full(12, 5.0))).notes
        if note.kind == "source" and note.text.startswith("Material")
    ]
    source = "conductivity and density: common practice, no source; rest: ISO 10456:2007, table 4"
    assert [note.text for note in notes] == [
        "Material Brick: own values (0.77 W/(m·K), 1700 kg/m³, 800 J/(kg·K)).",
        f"Material Mineral wool 0.035: no row on sheet Materials, taken from the shipped table ({source}).",
    ]
    assert [(note.sheet, note.cell) for note in notes] == [("Materials", "A9"), ("Build-ups", "C6")]
