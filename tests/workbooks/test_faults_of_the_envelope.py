"""Faults of layers, glazed units and the comparison: the sentences a user meets, by their full text."""

from __future__ import annotations

from typing import TYPE_CHECKING

import pytest

if TYPE_CHECKING:
    from tests.conftest import Book, Changes

TITLES: Changes = {
    **{"Build-ups!E4": "Second material", "Build-ups!F4": "Second share", "Build-ups!G4": "Void width"},
    **{"Build-ups!H4": "Void depth", "Build-ups!I4": "Void share", "Build-ups!J4": "Void rows"},
    **{"Build-ups!K4": "Inner emissivity", "Build-ups!L4": "Outer emissivity", "Build-ups!M4": "Air layer openings"},
    **{"Build-ups!N4": "Fasteners", "Build-ups!O4": "Fastener conductivity", "Build-ups!P4": "Fastener cross-section"},
    **{"Build-ups!Q4": "Fastener depth", "Build-ups!R4": "Gaps in insulation", "Build-ups!S4": "Rain on roof"},
    **{"Build-ups!T4": "Drainage factor f·x", "Build-ups!U4": "Taper"},
    **{"Glazed units!E4": "Glazing U-value", "Glazed units!F4": "Frame U-value", "Glazed units!G4": "Edge ψ"},
    **{"Glazed units!H4": "Frame width", "Glazed units!I4": "Panes", "Glazed units!J4": "Gap"},
    **{"Glazed units!K4": "Gas", "Glazed units!L4": "Coating emissivity", "Glazed units!M4": "Shutter resistance"},
    **{"Glazed units!N4": "Shutter air permeability", "Glazed units!O4": "Shutter closed share"},
    **{"Project!A10": "Compare build-up", "Project!A11": "With build-up"},
    **{"Project!A12": "Design inside temperature", "Project!A13": "Design outside temperature"},
}
AIR: Changes = {"Build-ups!C6": "unventilated air layer", "Build-ups!D6": 50}
STUD: Changes = {"Build-ups!E6": "Brick", "Build-ups!F6": 12}
VOIDS: Changes = {"Build-ups!G5": 60, "Build-ups!H5": 60, "Build-ups!I5": 50}
PARTS: Changes = {"Glazed units!B5": None, "Glazed units!E5": 1.1, "Glazed units!F5": 1.4, "Glazed units!G5": 0.06}
PANES: Changes = {**PARTS, "Glazed units!E5": None, "Glazed units!I5": 2, "Glazed units!J5": 16}

SOUND: dict[str, Changes] = {
    "stud": STUD,
    "a share of nothing without material": {"Build-ups!F6": 0},
    "one percent": {**STUD, "Build-ups!F6": 1},
    "the whole share": {**STUD, "Build-ups!F6": 100},
    "battens in an air layer": {**AIR, **STUD},
    "voids": VOIDS,
    "one percent of voids": {**VOIDS, "Build-ups!I5": 1},
    "voids with joints": {**VOIDS, "Build-ups!E5": "Concrete", "Build-ups!F5": 6},
    "bright air layer": {**AIR, "Build-ups!K6": 0.05},
    "fasteners": {"Build-ups!N6": 4, "Build-ups!P6": 12.6, "Build-ups!Q6": 60},
    "defaults typed out": {**AIR, "Build-ups!R6": "none", "Build-ups!U6": "none", "Build-ups!J6": 1},
    "inverted and tapered roof": {"Build-ups!S6": 2, "Build-ups!T6": 0.02, "Build-ups!U6": "rectangle"},
    "shipped material": {"Build-ups!C6": "mineral wool 0.035"},
    "shipped second material": {**STUD, "Build-ups!E6": "Timber, softwood 500"},
    "glazed unit of parts": PARTS,
    "glazed unit of panes": PANES,
    "single pane": {**PANES, "Glazed units!I5": 1, "Glazed units!J5": None, "Glazed units!G5": None},
    "leaf without glass": {
        **{"Glazed units!B5": None, "Glazed units!D5": 100, "Glazed units!F5": 1.8},
    },
    "frameless": {**PARTS, "Glazed units!F5": None, "Glazed units!D5": 0},
    "frame width with a whole unit": {"Glazed units!H5": 100},
    "shutter": {"Glazed units!M5": 0.1, "Glazed units!N5": "tight", "Glazed units!O5": 50},
    "comparison": {"Project!B10": "Wall", "Project!B11": "slab"},
}

FAULTS: dict[str, tuple[Changes, str]] = {
    # second material
    "share above 100 %": (
        {**STUD, "Build-ups!F6": 120},
        "Build-ups!F6  Second share [%]: found 120; expected a number from 0 to 100, in percent. "
        "Type a value in % within these limits.",
    ),
    "share below 0": (
        {**STUD, "Build-ups!F6": -5},
        "Build-ups!F6  Second share [%]: found -5; expected a number from 0 to 100, in percent. "
        "Type a value in % within these limits.",
    ),
    "share stored as a fraction": (
        {**STUD, "Build-ups!F6": 0.12},
        "Build-ups!F6  Second share [%]: found 0.12; expected 0, or a number above 1 and at most 100, in percent. "
        "Type 12 for 12 %.",
    ),
    "second material without share": (
        {"Build-ups!E6": "Brick"},
        "Build-ups!F6  Second share [%]: found an empty cell; expected the share of the face that 'Brick' takes. "
        "Type the share in percent.",
    ),
    "share without second material": (
        {"Build-ups!F6": 12},
        "Build-ups!E6  Second material: found an empty cell; expected the second material that takes 12 % of the "
        "face. Choose the material, or clear the share.",
    ),
    "unknown second material": (
        {**STUD, "Build-ups!E6": "Bricks"},
        "Build-ups!E6  Second material: found 'Bricks'; expected a name from sheet Materials. Did you mean 'Brick'?",
    ),
    "second material that resembles a shipped one": (
        {**STUD, "Build-ups!E6": "Timber, softwood 50"},
        "Build-ups!E6  Second material: found 'Timber, softwood 50'; expected a name from sheet Materials. "
        "Did you mean 'Timber, softwood 450' or 'Timber, softwood 500'?",
    ),
    "air as the second material": (
        {**STUD, "Build-ups!E6": "Unventilated air layer"},
        "Build-ups!E6  Second material: found 'Unventilated air layer'; expected a material. "
        "Choose the air layer as Material, and what bridges it as Second material.",
    ),
    "second material in a well ventilated air layer": (
        {**AIR, **STUD, "Build-ups!C6": "well ventilated air layer"},
        "Build-ups!E6  Second material: found 'Brick'; expected an empty cell, since a well ventilated air layer "
        "counts as outdoor air. Clear the second material and its share.",
    ),
    # air layers
    "air layer above 300 mm": (
        {**AIR, "Build-ups!D6": 350},
        "Build-ups!D6  Thickness [mm]: found 350 mm of air; expected an air layer of at most 300 mm. "
        "Enter a thicker space as an unconditioned zone on sheet Zones.",
    ),
    "voids in an air layer": (
        {**AIR, "Build-ups!G6": 60},
        "Build-ups!G6  Void width [mm]: found 60; expected an empty cell in an air layer. "
        "Clear Void width, or choose the material of a solid layer.",
    ),
    "gaps in an air layer": (
        {**AIR, "Build-ups!R6": "bridging"},
        "Build-ups!R6  Gaps in insulation: found bridging; expected an empty cell in an air layer. "
        "Clear Gaps in insulation, or choose the material of a solid layer.",
    ),
    "fasteners in an air layer": (
        {**AIR, "Build-ups!N6": 4},
        "Build-ups!N6  Fasteners [1/m²]: found 4; expected an empty cell in an air layer. "
        "Clear Fasteners, or choose the material of a solid layer.",
    ),
    "emissivity of a solid layer": (
        {"Build-ups!K6": 0.05},
        "Build-ups!K6  Inner emissivity [-]: found 0.05; expected an empty cell, since the layer holds no air. "
        "Type it in the row of the air layer that the face bounds.",
    ),
    "emissivity of nothing": (
        {**AIR, "Build-ups!L6": 0},
        "Build-ups!L6  Outer emissivity [-]: found 0; expected a number above 0 and at most 1. Correct the value.",
    ),
    "openings of an unventilated air layer": (
        {**AIR, "Build-ups!M6": 800},
        "Build-ups!M6  Air layer openings [mm²/m]: found 800; expected an empty cell, since only a slightly "
        "ventilated air layer has openings to state. Clear the cell, or choose the layer.",
    ),
    # voids
    "void wider than the rule's limit": (
        {**VOIDS, "Build-ups!G5": 650},
        "Build-ups!G5  Void width [mm]: found 650 mm wide and 60 mm deep; expected at most 10 times the depth, here "
        "600 mm. Enter a wider space as an air layer in a row of its own.",
    ),
    "voids without share": (
        {**VOIDS, "Build-ups!I5": None},
        "Build-ups!I5  Void share [%]: found an empty cell; expected void width and void share together. "
        "Fill in the cell, or clear all cells of the voids.",
    ),
    "voids without width": (
        {**VOIDS, "Build-ups!G5": None},
        "Build-ups!G5  Void width [mm]: found an empty cell; expected void width and void share together. "
        "Fill in the cell, or clear all cells of the voids.",
    ),
    "voids of the whole face": (
        {**VOIDS, "Build-ups!I5": 100},
        "Build-ups!I5  Void share [%]: found 100; expected a number above 0 and below 100, in percent. "
        "Type a value in % within these limits.",
    ),
    "void rows without depth": (
        {**VOIDS, "Build-ups!H5": None, "Build-ups!J5": 3},
        "Build-ups!H5  Void depth [mm]: found an empty cell; expected the depth of one void, since there are 3 rows. "
        "Fill in the cell.",
    ),
    "void rows deeper than the layer": (
        {**VOIDS, "Build-ups!J5": 5},
        "Build-ups!H5  Void depth [mm]: found 5 rows of 60 mm in a layer of 250 mm; expected void rows that fit into "
        "the layer. Correct the thickness, the depth or the number of rows.",
    ),
    "void deeper than the method covers": (
        {**VOIDS, "Build-ups!D5": 400, "Build-ups!H5": 350},
        "Build-ups!H5  Void depth [mm]: found voids 350 mm deep; expected a depth of at most 300 mm. "
        "Enter so large a space as an unconditioned zone on sheet Zones.",
    ),
    # corrections and taper
    "fasteners without cross-section": (
        {"Build-ups!N6": 4},
        "Build-ups!P6  Fastener cross-section [mm²]: found an empty cell; expected the cross-section of one fastener. "
        "Fill in the cell: 4 mm thick 12.6, 6 mm 28.3.",
    ),
    "cross-section without fasteners": (
        {"Build-ups!P6": 12.6},
        "Build-ups!N6  Fasteners [1/m²]: found an empty cell; expected the number of fasteners per area. "
        "Fill in the cell, or clear all cells of the fasteners.",
    ),
    "fasteners longer than the layer": (
        {"Build-ups!N6": 4, "Build-ups!P6": 12.6, "Build-ups!Q6": 140},
        "Build-ups!Q6  Fastener depth [mm]: found 140 mm in a layer of 100 mm; expected at most the thickness of the "
        "layer. Correct one of the two.",
    ),
    "drainage without rain": (
        {"Build-ups!T6": 0.02},
        "Build-ups!S6  Rain on roof [mm/d]: found an empty cell; expected the rain on an inverted roof. "
        "Fill in the cell, or clear the drainage factor.",
    ),
    "two layers with rain": (
        {"Build-ups!S5": 2, "Build-ups!S6": 2},
        "Build-ups!S6  Rain on roof [mm/d]: found another layer with rain under it in 'Wall', besides layer 1; "
        "expected one layer with rain under it in a build-up. Clear the cell, or join the layers.",
    ),
    "two tapered layers": (
        {"Build-ups!U5": "rectangle", "Build-ups!U6": "triangle thin at apex"},
        "Build-ups!U6  Taper: found another tapered layer in 'Wall', besides layer 1; expected one tapered layer in a "
        "build-up. Clear the cell, or join the layers.",
    ),
    "tapered layer with studs": (
        {**STUD, "Build-ups!U6": "rectangle"},
        "Build-ups!U6  Taper: found rectangle with a second material; expected a tapered layer of one material. "
        "Enter the part of even thickness as a layer of its own, or clear the taper.",
    ),
    # glazed units
    "glazed unit twice": (
        {**PARTS, "Glazed units!B5": 1.3},
        "Glazed units!B5  U-value [W/(m²·K)]: found both the U-value 1.3 of the whole unit and Glazing U-value, Frame "
        "U-value, Edge ψ; expected the whole unit or its parts. Clear the U-value, or clear the cells of the parts.",
    ),
    "glazed unit of nothing": (
        {"Glazed units!B5": None},
        "Glazed units!B5  U-value [W/(m²·K)]: found neither a U-value nor parts; expected one of the two. "
        "Type the U-value of the whole unit, or give the glazing, the frame and the edge.",
    ),
    "glass twice": (
        {**PARTS, "Glazed units!I5": 2, "Glazed units!J5": 16},
        "Glazed units!E5  Glazing U-value [W/(m²·K)]: found both the glazing U-value 1.1 and Panes, Gap; "
        "expected one of the two. Clear the glazing U-value, or clear the cells of the panes.",
    ),
    "parts without glass": (
        {**PARTS, "Glazed units!E5": None},
        "Glazed units!E5  Glazing U-value [W/(m²·K)]: found neither a glazing U-value nor panes; "
        "expected one of the two. Type the glazing U-value, or give the panes.",
    ),
    "parts without frame": (
        {**PARTS, "Glazed units!F5": None},
        "Glazed units!F5  Frame U-value [W/(m²·K)]: found an empty cell; expected the U-value of the frame of a unit "
        "given by its parts. Fill in the cell.",
    ),
    "parts without edge": (
        {**PARTS, "Glazed units!G5": None},
        "Glazed units!G5  Edge ψ [W/(m·K)]: found an empty cell; expected the ψ of the glass edge of a unit given by "
        "its parts. Fill in the cell: 0.08 for aluminium, 0.06 for improved spacers.",
    ),
    "panes without gap": (
        {**PANES, "Glazed units!J5": None},
        "Glazed units!J5  Gap [mm]: found an empty cell; expected the gap between the 2 panes. "
        "Fill in the cell, such as 16.",
    ),
    "gap without panes": (
        {**PANES, "Glazed units!I5": None},
        "Glazed units!I5  Panes: found an empty cell; expected the number of panes to go with Gap. Fill in the cell.",
    ),
    "single pane with a coating": (
        {**PANES, "Glazed units!I5": 1, "Glazed units!J5": None, "Glazed units!L5": 0.1},
        "Glazed units!L5  Coating emissivity [-]: found 0.1 for a single pane; expected an empty cell, since a single "
        "pane has no gap. Clear the cell, or correct the number of panes.",
    ),
    "single pane with gas": (
        {**PANES, "Glazed units!I5": 1, "Glazed units!J5": None, "Glazed units!K5": "argon"},
        "Glazed units!K5  Gas: found argon for a single pane; expected an empty cell, since a single "
        "pane has no gap. Clear the cell, or correct the number of panes.",
    ),
    "shutter without resistance": (
        {"Glazed units!O5": 50},
        "Glazed units!M5  Shutter resistance [m²·K/W]: found an empty cell; expected the resistance of the shutter to "
        "go with Shutter closed share. Fill in the cell, or clear the other cells of the shutter.",
    ),
    "shutter of too much resistance": (
        {"Glazed units!M5": 0.8},
        "Glazed units!M5  Shutter resistance [m²·K/W]: found 0.8; expected a number from 0 to 0.3. "
        "Type a value in m²·K/W within these limits.",
    ),
    "frame that fills its opening": (
        {"Glazed units!H5": 400},
        "Openings!E6  Width [m]: found an opening of 0.8 m by 1 m with a frame of 400 mm all round; "
        "expected an opening that leaves room for glass. Correct its size, or the frame width of 'Double'.",
    ),
    # comparison and design temperatures
    "one build-up to compare": (
        {"Project!B10": "Wall"},
        "Project!B11  With build-up: found an empty cell; expected the other build-up of the comparison. "
        "Choose a build-up, or clear both cells.",
    ),
    "a build-up with itself": (
        {"Project!B10": "Wall", "Project!B11": "wall"},
        "Project!B11  With build-up: found 'wall' twice; expected two different build-ups. Choose another build-up.",
    ),
    "an unknown build-up to compare": (
        {"Project!B10": "Wall", "Project!B11": "Slap"},
        "Project!B11  With build-up: found 'Slap'; expected a name from sheet Build-ups. Did you mean 'Slab'?",
    ),
    "design temperature out of bounds": (
        {"Project!B12": -5},
        "Project!B12  Design inside temperature [°C]: found -5; expected a number from 5 to 35. "
        "Type a value in °C within these limits.",
    ),
}


@pytest.fixture
def wide(cottage: Book) -> Book:
    """The small workbook with the columns of the envelope."""
    return cottage.change(TITLES)


@pytest.mark.parametrize("name", SOUND)
def test_what_is_right_is_no_problem(wide: Book, name: str) -> None:
    assert wide.change(SOUND[name]).problems() == []


@pytest.mark.parametrize("name", FAULTS)
def test_every_fault_is_told_once_in_full(wide: Book, name: str) -> None:
    changes, sentence = FAULTS[name]

    assert wide.change(changes).problems() == [sentence]


def test_bridges_that_cross_in_too_many_ways_are_told(wide: Book) -> None:
    """Seventeen layers bridged independently are 2¹⁷ combinations."""
    for number in range(17):
        row = 20 + number
        wide.change({f"Build-ups!A{row}": "Stack", f"Build-ups!B{row}": number + 1, f"Build-ups!C{row}": "Wool"})
        wide.change({f"Build-ups!D{row}": 20, f"Build-ups!E{row}": "Brick", f"Build-ups!F{row}": 10 + number})

    assert wide.problems() == [
        "Build-ups!B20  Layer: found bridges that cross in 131072 combinations in 'Stack'; expected at most 65536. "
        "Give neighbouring layers the same second material and share where studs run through, or join layers."
    ]


def test_one_stud_through_many_layers_is_no_problem(wide: Book) -> None:
    for number in range(17):
        row = 20 + number
        wide.change({f"Build-ups!A{row}": "Stack", f"Build-ups!B{row}": number + 1, f"Build-ups!C{row}": "Wool"})
        wide.change({f"Build-ups!D{row}": 20, f"Build-ups!E{row}": "Brick", f"Build-ups!F{row}": 10})

    assert wide.problems() == []
