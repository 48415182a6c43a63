"""Faulty workbooks, made by code: the sentences a user meets, by their full text, from cells and from a real file."""

from __future__ import annotations

from datetime import date
from pathlib import Path
from typing import TYPE_CHECKING

import pytest

from heatledger.errors import InputError
from heatledger.inputs.cells import Cell
from heatledger.inputs.workbook_rows import check_rows
from heatledger.workbook.reader import read_cells

if TYPE_CHECKING:
    from tests.conftest import Book, Changes

FAULTS: dict[str, tuple[Changes, list[str]]] = {
    # cells of the wrong kind
    "decimal comma": (
        {"Openings!E5": "1,2"},
        [
            "Openings!E5  Width [m]: found the text '1,2';"
            " expected a number above 0 and at most 50. Type 1.2 as a number.",
        ],
    ),
    "number with the unit of the column": (
        {"Build-ups!D5": "250 mm"},
        [
            "Build-ups!D5  Thickness [mm]: found the text '250 mm';"
            " expected a number above 0 and at most 5000. Type 250 as a number.",
        ],
    ),
    "number with another unit": (
        {"Openings!E5": "1200 mm"},
        [
            "Openings!E5  Width [m]: found the text '1200 mm';"
            " expected a number above 0 and at most 50. Type 1.2 for 1200 mm.",
        ],
    ),
    "percent as text": (
        {"Glazed units!D5": "35 %"},
        [
            "Glazed units!D5  Frame share [%]: found the text '35 %';"
            " expected a number from 0 to 100, in percent. Type 35 as a number.",
        ],
    ),
    "percent as text where a share belongs": (
        {"Glazed units!C5": "60 %"},
        [
            "Glazed units!C5  g-value [-]: found the text '60 %'; expected a number from 0 to 1. Type 0.6 for 60 %.",
        ],
    ),
    "percent stored as a fraction": (
        {"Air systems!F6": 0.8},
        [
            "Air systems!F6  Heat recovery [%]: found 0.8;"
            " expected 0, or a number above 1 and at most 98, in percent. Type 80 for 80 %.",
        ],
    ),
    "comma that may group thousands": (
        {"Zones!E5": "1,200"},
        [
            "Zones!E5  Floor area [m²]: found the text '1,200';"
            " expected a number above 0 and at most 1000000. Type 1200 or 1.200 as a number.",
        ],
    ),
    "words in a number cell": (
        {"Zones!E5": "about sixty"},
        [
            "Zones!E5  Floor area [m²]: found the text 'about sixty';"
            " expected a number above 0 and at most 1000000. Type a number, without unit or words.",
        ],
    ),
    "number with a unit in a cell without unit": (
        {"Openings!D5": "2 pieces"},
        [
            "Openings!D5  Number: found the text '2 pieces';"
            " expected a whole number from 1 to 10000. Type 2 alone, as a number.",
        ],
    ),
    "text of two lines": (
        {"Zones!E5": "sixty\nor so"},
        [
            "Zones!E5  Floor area [m²]: found the text 'sixty or so';"
            " expected a number above 0 and at most 1000000. Type a number, without unit or words.",
        ],
    ),
    "long text": (
        {"Zones!E5": "to be measured on site once the scaffolding of the neighbours has gone"},
        [
            "Zones!E5  Floor area [m²]: found the text 'to be measured on site once the scaffolding of the neighbou…';"
            " expected a number above 0 and at most 1000000. Type a number, without unit or words.",
        ],
    ),
    "date": (
        {"Zones!E5": date(2024, 2, 1)},
        [
            "Zones!E5  Floor area [m²]: found the date 2024-02-01;"
            " expected a number above 0 and at most 1000000."
            " Format the cell as a number and type the value again: 1.2, if that was typed.",
        ],
    ),
    "date in a name": (
        {"Zones!A6": date(2024, 2, 1)},
        [
            "Zones!A6  Zone: found the date 2024-02-01;"
            " expected a text. Format the cell as text and type the value again.",
        ],
    ),
    "boolean": (
        {"Zones!I5": True},
        [
            "Zones!I5  Heating set-point [°C]: found the logical value TRUE;"
            " expected a number from 0 to 40. Type a number from 0 to 40.",
        ],
    ),
    "boolean in a dropdown": (
        {"Air systems!G6": True},
        [
            "Air systems!G6  Bypass in cooling: found the logical value TRUE;"
            " expected one of: yes, no. Did you mean 'yes'?",
        ],
    ),
    "error value": (
        {"Envelope!G5": "#REF!"},
        [
            "Envelope!G5  Area [m²]: found the error value #REF!;"
            " expected a number above 0 and at most 1000000. Mend the formula or type the value.",
        ],
    ),
    "formula that was never calculated": (
        {"Envelope!G5": "=4*5"},
        [
            "Envelope!G5  Area [m²]: found a formula without a stored value;"
            " expected a number above 0 and at most 1000000."
            " Open and save the file in your spreadsheet program, then run again.",
        ],
    ),
    "broken number": (
        {"Envelope!G5": Cell("1.2.3", "text")},
        [
            "Envelope!G5  Area [m²]: found the text '1.2.3';"
            " expected a number above 0 and at most 1000000. Type a number, without unit or words.",
        ],
    ),
    "fraction where a whole number belongs": (
        {"Openings!D5": 2.5},
        [
            "Openings!D5  Number: found 2.5; expected a whole number from 1 to 10000. Type a whole number.",
        ],
    ),
    "words where a whole number belongs": (
        {"Build-ups!B5": "first"},
        [
            "Build-ups!B5  Layer: found the text 'first';"
            " expected a whole number from 1 to 50. Type a number, without unit or words.",
        ],
    ),
    # bounds
    "zero area": (
        {"Envelope!G5": 0},
        [
            "Envelope!G5  Area [m²]: found 0;"
            " expected a number above 0 and at most 1000000. Type a value in m² within these limits.",
        ],
    ),
    "far too large": (
        {"Zones!F5": 2e7},
        [
            "Zones!F5  Air volume [m³]: found 20000000;"
            " expected a number above 0 and at most 10000000. Type a value in m³ within these limits.",
        ],
    ),
    "negative thickness": (
        {"Build-ups!D5": -250},
        [
            "Build-ups!D5  Thickness [mm]: found -250;"
            " expected a number above 0 and at most 5000. Type a value in mm within these limits.",
        ],
    ),
    "recovery above the limit": (
        {"Air systems!F6": 120},
        [
            "Air systems!F6  Heat recovery [%]: found 120;"
            " expected a number from 0 to 98, in percent. Type a value in % within these limits.",
        ],
    ),
    "share above one": (
        {"Glazed units!C5": 60},
        [
            "Glazed units!C5  g-value [-]: found 60; expected a number from 0 to 1. Type 0.6 if 60 % is meant.",
        ],
    ),
    "azimuth beyond the circle": (
        {"Envelope!H6": 400},
        [
            "Envelope!H6  Azimuth [°]: found 400;"
            " expected degrees from north clockwise, 0 to 360, or a compass direction such as N, NNE, NE."
            " Count clockwise from north: 90 is east, 180 south, 270 west.",
        ],
    ),
    "layer zero": (
        {"Build-ups!B7": 0},
        [
            "Build-ups!B7  Layer: found 0; expected a whole number from 1 to 50. Correct the value.",
        ],
    ),
    # required cells and words
    "empty required cell": (
        {"Zones!E5": None},
        [
            "Zones!E5  Floor area [m²]: found an empty cell;"
            " expected a number above 0 and at most 1000000. Fill in the cell.",
        ],
    ),
    "white space in a required cell": (
        {"Zones!E5": "  "},
        [
            "Zones!E5  Floor area [m²]: found an empty cell;"
            " expected a number above 0 and at most 1000000. Fill in the cell.",
        ],
    ),
    "missing name": (
        {"Thermal bridges!A5": None},
        [
            "Thermal bridges!A5  Thermal bridge: found an empty cell;"
            " expected a text. Fill in the name, or clear the whole row.",
        ],
    ),
    "missing project name": (
        {"Project!B4": None},
        [
            "Project!B4  Project: found an empty cell; expected a text. Fill in the cell.",
        ],
    ),
    "wrong word": (
        {"Envelope!C5": "wal"},
        [
            "Envelope!C5  Kind: found the text 'wal';"
            " expected one of: wall, roof, floor, door, partition. Did you mean 'wall'?",
        ],
    ),
    "unknown word": (
        {"Zones!B5": "warm"},
        [
            "Zones!B5  Conditioning: found the text 'warm';"
            " expected one of: heated, heated and cooled, unconditioned. Choose from the list of the cell.",
        ],
    ),
    "wrong word on Project": (
        {"Project!B8": "sheltred"},
        [
            "Project!B8  Site exposure: found the text 'sheltred';"
            " expected one of: open, normal, sheltered. Did you mean 'sheltered'?",
        ],
    ),
    "unknown azimuth": (
        {"Envelope!H5": "sunny"},
        [
            "Envelope!H5  Azimuth [°]: found the text 'sunny';"
            " expected degrees from north clockwise, 0 to 360, or a compass direction such as N, NNE, NE."
            " Type degrees, or one of: N, NNE, NE, ENE, E, ESE, SE, SSE, S, SSW, SW, WSW, W, WNW, NW, NNW.",
        ],
    ),
    "azimuth written out": (
        {"Envelope!H5": "South-East"},
        [
            "Envelope!H5  Azimuth [°]: found the text 'South-East';"
            " expected degrees from north clockwise, 0 to 360, or a compass direction such as N, NNE, NE."
            " Did you mean 'SE'?",
        ],
    ),
    "azimuth with a degree sign": (
        {"Envelope!H5": "180°"},
        [
            "Envelope!H5  Azimuth [°]: found the text '180°';"
            " expected degrees from north clockwise, 0 to 360, or a compass direction such as N, NNE, NE."
            " Type 180 as a number.",
        ],
    ),
    # names
    "zone that does not exist": (
        {"Envelope!B5": "Hous"},
        [
            "Envelope!B5  Zone: found 'Hous'; expected a name from sheet Zones. Did you mean 'House'?",
        ],
    ),
    "zone unlike any other": (
        {"Envelope!B8": "Conservatory"},
        [
            "Envelope!B8  Zone: found 'Conservatory';"
            " expected a name from sheet Zones."
            " Add 'Conservatory' to sheet Zones, or choose from the list of the cell.",
        ],
    ),
    "faces an unknown space": (
        {"Envelope!D8": "outdoor"},
        [
            "Envelope!D8  Faces: found 'outdoor';"
            " expected outdoors, neighbour, or a name from sheet Zones. Did you mean 'outdoors'?",
        ],
    ),
    "build-up without layers": (
        {"Envelope!E5": "Cavity brickwork"},
        [
            "Envelope!E5  Build-up: found 'Cavity brickwork';"
            " expected a name from sheet Build-ups."
            " Add 'Cavity brickwork' to sheet Build-ups, or choose from the list of the cell.",
        ],
    ),
    "unknown material": (
        {"Build-ups!C6": "Wolle"},
        [
            "Build-ups!C6  Material: found 'Wolle';"
            " expected unventilated air layer, slightly ventilated air layer, "
            "well ventilated air layer, or a name from sheet Materials."
            " Did you mean 'Wool'?",
        ],
    ),
    "unknown usage": (
        {"Zones!C5": "Office"},
        [
            "Zones!C5  Usage: found 'Office';"
            " expected a name from sheet Usage. Add 'Office' to sheet Usage, or choose from the list of the cell.",
        ],
    ),
    "unknown air system": (
        {"Zones!D5": "Window"},
        [
            "Zones!D5  Air system: found 'Window'; expected a name from sheet Air systems. Did you mean 'Windows'?",
        ],
    ),
    "unknown element": (
        {"Openings!B5": "Southwall"},
        [
            "Openings!B5  Element: found 'Southwall'; expected a name from sheet Envelope. Did you mean 'South wall'?",
        ],
    ),
    "unknown glazed unit": (
        {"Openings!C5": "Triple"},
        [
            "Openings!C5  Glazed unit: found 'Triple';"
            " expected a name from sheet Glazed units."
            " Add 'Triple' to sheet Glazed units, or choose from the list of the cell.",
        ],
    ),
    "unknown zone of a bridge and a floor": (
        {"Ground floors!B5": "Cellar", "Thermal bridges!B5": "Cellar"},
        [
            "Ground floors!B5  Zone: found 'Cellar';"
            " expected a name from sheet Zones. Add 'Cellar' to sheet Zones, or choose from the list of the cell.",
            "Thermal bridges!B5  Zone: found 'Cellar';"
            " expected a name from sheet Zones. Add 'Cellar' to sheet Zones, or choose from the list of the cell.",
        ],
    ),
    "duplicate name": (
        {"Envelope!A6": " south WALL"},
        [
            "Envelope!A6  Element: found 'south WALL' a second time, first in A5;"
            " expected each name once. Rename one of the two rows.",
        ],
    ),
    "zone named outdoors": (
        {"Zones!A6": "Outdoors", "Envelope!B8": "House", "Envelope!D7": "outdoors"},
        [
            "Zones!A6  Zone: found 'Outdoors'; expected a name other than outdoors and neighbour. Rename the zone.",
        ],
    ),
    # between cells and sheets
    "both build-up and U-value": (
        {"Envelope!F5": 0.35},
        [
            "Envelope!F5  U-value [W/(m²·K)]: found both the build-up 'Wall' and the U-value 0.35;"
            " expected one of the two. Clear one of the two cells.",
        ],
    ),
    "neither build-up nor U-value": (
        {"Ground floors!F5": None},
        [
            "Ground floors!F5  Build-up: found neither a build-up nor a U-value;"
            " expected one of the two. Choose a build-up or type a U-value.",
        ],
    ),
    "missing azimuth": (
        {"Envelope!H6": None},
        [
            "Envelope!H6  Azimuth [°]: found an empty cell;"
            " expected the direction of an element that faces outdoors."
            " Type degrees from north clockwise, or N, NE, E …",
        ],
    ),
    "missing azimuth of a tilted roof": (
        {"Envelope!H8": None},
        [
            "Envelope!H8  Azimuth [°]: found an empty cell;"
            " expected the direction of an element that faces outdoors."
            " Type degrees from north clockwise, or N, NE, E …",
        ],
    ),
    "openings larger than their element": (
        {"Openings!D5": 12},
        [
            "Envelope!G5  Area [m²]: found 20 m² with 21.60 m² of openings in 'South wall';"
            " expected an area that holds its openings."
            " Correct the gross area, or the sizes and number on sheet Openings.",
        ],
    ),
    "gap in the layers": (
        {"Build-ups!B6": 3},
        [
            "Build-ups!B6  Layer: found layer 3 of 'Wall';"
            " expected layer 2. Number the layers from 1 without gaps, the inside layer first.",
        ],
    ),
    "layer twice": (
        {"Build-ups!B6": 1},
        [
            "Build-ups!B6  Layer: found layer 1 of 'Wall' a second time;"
            " expected layer 2. Number the layers from 1 without gaps, the inside layer first.",
        ],
    ),
    "set-points of a usage crossed": (
        {"Usage!B5": 28},
        [
            "Usage!C5  Cooling set-point [°C]: found 28 °C for heating and 26 °C for cooling;"
            " expected cooling not below heating. Correct one of the two set-points.",
        ],
    ),
    "set-points of a zone crossed": (
        {"Zones!I5": 27},
        [
            "Zones!I5  Heating set-point [°C]: found 27 °C for heating and 26 °C for cooling;"
            " expected cooling not below heating. Correct one of the two set-points.",
        ],
    ),
    "cooling set-point of a zone below the usage": (
        {"Zones!J5": 19},
        [
            "Zones!J5  Cooling set-point [°C]: found 20 °C for heating and 19 °C for cooling;"
            " expected cooling not below heating. Correct one of the two set-points.",
        ],
    ),
    "heat recovery on extract": (
        {"Air systems!B6": "extract"},
        [
            "Air systems!F6  Heat recovery [%]: found 80 % for a system of kind extract;"
            " expected 0 or an empty cell, since only a balanced system recovers heat."
            " Clear the cell, or set the kind to balanced.",
        ],
    ),
    "fans without rate": (
        {"Air systems!D6": None},
        [
            "Air systems!D6  Rate [1/h or m³/(h·m²)]: found an empty cell;"
            " expected the rate of a system with fans. Fill in the rate, or choose rate basis usage.",
        ],
    ),
    "rate beside rate basis usage": (
        {"Air systems!C6": "usage"},
        [
            "Air systems!D6  Rate [1/h or m³/(h·m²)]: found 1.2;"
            " expected an empty cell, since the rate follows the usage."
            " Clear the rate, or choose another rate basis.",
        ],
    ),
    "rate of usage without usage": (
        {"Zones!D6": "Fans", "Air systems!C6": "usage", "Air systems!D6": None},
        [
            "Zones!C6  Usage: found an empty cell;"
            " expected a usage, since the air system's rate follows it."
            " Choose a usage, or an air system with another rate basis.",
        ],
    ),
    "heated zone without usage": (
        {"Zones!C5": None},
        [
            "Zones!C5  Usage: found an empty cell;"
            " expected the usage of a conditioned zone. Choose a row of sheet Usage.",
        ],
    ),
    "no heated zone": (
        {"Zones!B5": "unconditioned"},
        [
            "Zones!B5  Conditioning: found unconditioned zones only;"
            " expected at least one heated zone. Set the conditioning of at least one zone to heated.",
        ],
    ),
    "no zone at all": (
        {
            **{f"{sheet}!{row}:{row}": None for sheet in ("Zones", "Envelope", "Openings") for row in range(5, 9)},
            **{"Ground floors!5:5": None, "Thermal bridges!5:5": None},
        },
        ["Zones: found no zone; expected at least one heated zone. Fill in a row for each zone."],
    ),
    "heated zone without envelope": (
        {"Zones!A7": "Annexe", "Zones!B7": "heated", "Zones!C7": "Dwelling", "Zones!E7": 20, "Zones!F7": 50},
        [
            "Zones!A7  Zone: found 'Annexe' without envelope;"
            " expected at least one element or ground floor. Add the elements of 'Annexe' to sheet Envelope,"
            " inner walls to other zones included.",
        ],
    ),
    "heated zone with inner walls only": (
        {
            **{"Zones!A7": "Annexe", "Zones!B7": "heated", "Zones!C7": "Dwelling", "Zones!E7": 20, "Zones!F7": 50},
            **{"Envelope!A9": "Inner wall", "Envelope!B9": "Annexe", "Envelope!C9": "partition"},
            **{"Envelope!D9": "Annexe", "Envelope!E9": "Wall", "Envelope!G9": 10},
        },
        [
            "Zones!A7  Zone: found 'Annexe' without envelope;"
            " expected at least one element or ground floor. Add the elements of 'Annexe' to sheet Envelope,"
            " inner walls to other zones included.",
        ],
    ),
    "unconditioned zone without heat path": (
        {"Envelope!7:7": None, "Envelope!D8": "neighbour"},
        [
            "Zones!A6  Zone: found 'Loft' without any heat path;"
            " expected an element to outdoors or to a conditioned zone, or a ground floor."
            " Add the elements of 'Loft' to sheet Envelope.",
        ],
    ),
    "bridge half filled": (
        {"Thermal bridges!D5": None, "Thermal bridges!E5": 3},
        [
            "Thermal bridges!D5  Linear transmittance ψ [W/(m·K)]: found an empty cell;"
            " expected length and ψ together. Fill in the cell.",
            "Thermal bridges!F5  Point transmittance χ [W/K]: found an empty cell;"
            " expected number and χ together. Fill in the cell.",
        ],
    ),
    "bridge of nothing": (
        {"Thermal bridges!C5": None, "Thermal bridges!D5": None},
        [
            "Thermal bridges!C5  Length [m]: found neither a linear nor a point bridge;"
            " expected one of the two. Fill in length and ψ, or number and χ.",
        ],
    ),
    # ground floors by type
    "negative perimeter": (
        {"Ground floors!E5": -32},
        [
            "Ground floors!E5  Exposed perimeter [m]: found -32;"
            " expected a number above 0 and at most 100000. Type a value in m within these limits.",
        ],
    ),
    "heated basement without depth and wall": (
        {"Ground floors!C5": "heated basement"},
        [
            "Ground floors!S5  Basement depth [m]: found an empty cell;"
            " expected the basement depth of a heated basement. Fill in the cell.",
            "Ground floors!T5  Basement wall: found an empty cell;"
            " expected the basement wall of a heated basement. Fill in the cell.",
        ],
    ),
    "basement of no depth": (
        {"Ground floors!C5": "heated basement", "Ground floors!S5": 0, "Ground floors!T5": "Wall"},
        [
            "Ground floors!S5  Basement depth [m]: found 0;"
            " expected a number above 0 and at most 20. Type a value in m within these limits.",
        ],
    ),
    "unheated basement half filled": (
        {"Ground floors!C5": "unheated basement", "Ground floors!S5": 2, "Ground floors!T5": "Walls"},
        [
            "Ground floors!N5  Height above ground [m]: found an empty cell;"
            " expected the height above ground of an unheated basement. Fill in the cell.",
            "Ground floors!O5  Wall U-value above ground [W/(m²·K)]: found an empty cell;"
            " expected the wall U-value above ground of an unheated basement. Fill in the cell.",
            "Ground floors!T5  Basement wall: found 'Walls';"
            " expected a name from sheet Build-ups. Did you mean 'Wall'?",
            "Ground floors!U5  Basement volume [m³]: found an empty cell;"
            " expected the basement volume of an unheated basement. Fill in the cell.",
        ],
    ),
    "unheated basement wholly below ground": (
        {
            **{"Ground floors!C5": "unheated basement", "Ground floors!N5": 0, "Ground floors!S5": 2},
            **{"Ground floors!T5": "Wall", "Ground floors!U5": "110 m³"},
        },
        [
            "Ground floors!U5  Basement volume [m³]: found the text '110 m³';"
            " expected a number above 0 and at most 1000000. Type 110 as a number.",
        ],
    ),
    "suspended floor without its fields": (
        {"Ground floors!C5": "suspended"},
        [
            "Ground floors!N5  Height above ground [m]: found an empty cell;"
            " expected the height above ground of a suspended floor. Fill in the cell.",
            "Ground floors!O5  Wall U-value above ground [W/(m²·K)]: found an empty cell;"
            " expected the wall U-value above ground of a suspended floor. Fill in the cell.",
            "Ground floors!P5  Vent area [m²/m]: found an empty cell;"
            " expected the vent area of a suspended floor. Fill in the cell.",
        ],
    ),
    "fields of other types on a slab": (
        {"Ground floors!N5": 0.4, "Ground floors!Q5": 4, "Ground floors!T5": "Wall", "Ground floors!V5": 0.3},
        [
            "Ground floors!N5  Height above ground [m]: found 0.4;"
            " expected an empty cell for a slab on ground. Clear the cell, or correct the type.",
            "Ground floors!Q5  Wind speed [m/s]: found 4;"
            " expected an empty cell for a slab on ground. Clear the cell, or correct the type.",
            "Ground floors!T5  Basement wall: found 'Wall';"
            " expected an empty cell for a slab on ground. Clear the cell, or correct the type.",
            "Ground floors!V5  Basement air change [1/h]: found 0.3;"
            " expected an empty cell for a slab on ground. Clear the cell, or correct the type.",
        ],
    ),
    "edge insulation and volume of a heated basement": (
        {
            **{"Ground floors!C5": "heated basement", "Ground floors!S5": 2, "Ground floors!T5": "Wall"},
            **{"Ground floors!J5": "vertical", "Ground floors!U5": 100},
        },
        [
            "Ground floors!J5  Edge insulation: found 'vertical';"
            " expected an empty cell for a heated basement. Clear the cell, or correct the type.",
            "Ground floors!U5  Basement volume [m³]: found 100;"
            " expected an empty cell for a heated basement. Clear the cell, or correct the type.",
        ],
    ),
    "edge insulation half filled": (
        {"Ground floors!J5": "horizontal", "Ground floors!L5": 1.5},
        [
            "Ground floors!K5  Edge depth [m]: found an empty cell;"
            " expected the edge depth of horizontal edge insulation. Fill in the cell.",
            "Ground floors!M5  Edge thickness [mm]: found an empty cell;"
            " expected the edge thickness of horizontal edge insulation. Fill in the cell.",
        ],
    ),
    "edge insulation not chosen": (
        {"Ground floors!K5": 0.6},
        [
            "Ground floors!K5  Edge depth [m]: found 0.6;"
            " expected an empty cell without edge insulation. Clear the cell, or choose the edge insulation.",
        ],
    ),
    "edge insulation worse than the ground": (
        {"Ground floors!J5": "vertical", "Ground floors!K5": 1, "Ground floors!L5": 0.04, "Ground floors!M5": 100},
        [
            "Ground floors!L5  Edge resistance [m²·K/W]: found 0.04 for 100 mm;"
            " expected more than the 0.05 m²·K/W of as much sand or gravel. Correct the resistance or the thickness.",
        ],
    ),
    "bridge to its own zone": (
        {"Thermal bridges!G5": "HOUSE"},
        [
            "Thermal bridges!G5  Faces: found 'HOUSE', the bridge's own zone;"
            " expected outdoors or another zone. Choose the zone on the other side, or clear the cell.",
        ],
    ),
    "bridge to an unknown zone": (
        {"Thermal bridges!G5": "Loff"},
        [
            "Thermal bridges!G5  Faces: found 'Loff';"
            " expected outdoors, or a name from sheet Zones. Did you mean 'Loft'?",
        ],
    ),
    "cluster of unconditioned zones cut off": (
        {
            **{"Zones!A7": "Stair", "Zones!B7": "unconditioned", "Zones!E7": 10, "Zones!F7": 25},
            **{"Envelope!7:7": None, "Envelope!D8": "Stair", "Envelope!H8": None},
        },
        [
            "Zones!A6  Zone: found 'Loft' without any heat path;"
            " expected an element to outdoors or to a conditioned zone, or a ground floor."
            " Add the elements of 'Loft' to sheet Envelope.",
            "Zones!A7  Zone: found 'Stair' without any heat path;"
            " expected an element to outdoors or to a conditioned zone, or a ground floor."
            " Add the elements of 'Stair' to sheet Envelope.",
        ],
    ),
    # sheets and titles
    "missing sheet": (
        {"Envelope": None},
        [
            "Envelope: found no such sheet; expected a sheet named Envelope. Copy it from a fresh template.",
        ],
    ),
    "missing usage sheet": (
        {"Usage": None},
        [
            "Usage: found no such sheet; expected a sheet named Usage. Copy it from a fresh template.",
        ],
    ),
    "renamed required sheet": (
        {"Zones": "Zone list"},
        [
            "Zones: found no such sheet; expected a sheet named Zones. Rename 'Zone list' to 'Zones'.",
        ],
    ),
    "renamed optional sheet": (
        {"Openings": "Opening"},
        [
            "Openings: found no such sheet; expected a sheet named Openings. Rename 'Opening' to 'Openings'.",
        ],
    ),
    "missing column": (
        {"Zones!E4": None},
        [
            "Zones  Floor area [m²]: found no title 'Floor area';"
            " expected the column Floor area. Add it, or copy the titles from a fresh template.",
        ],
    ),
    "renamed column": (
        {"Zones!E4": "Floor aera"},
        [
            "Zones  Floor area [m²]: found no title 'Floor area';"
            " expected the column Floor area. Rename 'Floor aera' to 'Floor area'.",
        ],
    ),
    "renamed optional column": (
        {"Envelope!J4": "Solar absorbtance"},
        [
            "Envelope  Solar absorptance [-]: found no title 'Solar absorptance';"
            " expected the column Solar absorptance. Rename 'Solar absorbtance' to 'Solar absorptance'.",
        ],
    ),
    "renamed label": (
        {"Project!A5": "Weather file"},
        [
            "Project  Weather: found no title 'Weather';"
            " expected the label Weather. Rename 'Weather file' to 'Weather'.",
        ],
    ),
    "missing label": (
        {"Project!A5": None, "Project!B5": None},
        [
            "Project  Weather: found no title 'Weather';"
            " expected the label Weather. Add it, or copy the titles from a fresh template.",
        ],
    ),
    "label twice": (
        {"Project!A10": "Weather", "Project!B10": "Miami FL"},
        [
            "Project!A10  Weather: found the title 'Weather' a second time;"
            " expected each title once. Rename or delete one of the two.",
        ],
    ),
    "title twice": (
        {"Openings!G4": "Width"},
        [
            "Openings!G4  Width [m]: found the title 'Width' a second time;"
            " expected each title once. Rename or delete one of the two.",
        ],
    ),
    "no header row": (
        {"Thermal bridges!4:4": None},
        [
            "Thermal bridges: found no header row;"
            " expected a row with the titles Thermal bridge, Zone."
            " Copy the header row from a fresh template, or restore the titles.",
        ],
    ),
    "changed unit": (
        {"Build-ups!D3": "cm"},
        [
            "Build-ups!D3  Thickness [mm]: found the unit 'cm';"
            " expected 'mm'. Convert the values to mm and restore the unit.",
        ],
    ),
    "changed unit on Project": (
        {"Project!C6": "ft"},
        [
            "Project!C6  Altitude [m]: found the unit 'ft';"
            " expected 'm'. Convert the values to m and restore the unit.",
        ],
    ),
    # obstructions and movable shading
    "unknown obstruction": (
        {"Openings!G5": "Streat"},
        [
            "Openings!G5  Obstruction: found 'Streat'; expected a name from sheet Obstructions. Did you mean 'Street'?",
        ],
    ),
    "unknown shading device": (
        {"Openings!H5": "Curtain"},
        [
            "Openings!H5  Movable shading: found 'Curtain'; expected a name from sheet Shading devices."
            " Add 'Curtain' to sheet Shading devices, or choose from the list of the cell.",
        ],
    ),
    "obstruction of an inner element": (
        {"Envelope!K7": "Street"},
        [
            "Envelope!K7  Obstruction: found 'Street' on an element that faces 'Loft';"
            " expected an empty cell, since no sun falls there. Clear the cell.",
        ],
    ),
    "obstruction and shading of an inner opening": (
        {"Openings!B6": "Ceiling", "Openings!G6": "Street", "Openings!H6": "Awning"},
        [
            "Openings!G6  Obstruction: found 'Street' on an opening in 'Ceiling';"
            " expected an empty cell, since no sun falls there. Clear the cell.",
            "Openings!H6  Movable shading: found 'Awning' on an opening in 'Ceiling';"
            " expected an empty cell, since no sun falls there. Clear the cell.",
        ],
    ),
    "skyline beyond the zenith": (
        {"Obstructions!B5": 95},
        [
            "Obstructions!B5  Horizon S [°]: found 95; expected a number from 0 to 90."
            " Type a value in ° within these limits.",
        ],
    ),
    "distances without depth": (
        {"Obstructions!C5": None, "Obstructions!F5": 0.2},
        [
            "Obstructions!C5  Overhang depth [m]: found no depth, with a distance of 0.3 m;"
            " expected the depth of the overhang. Fill in the depth, or clear the distance.",
            "Obstructions!E5  Left fin depth [m]: found no depth, with a distance of 0.2 m;"
            " expected the depth of the left fin. Fill in the depth, or clear the distance.",
        ],
    ),
    "shading without factor and device": (
        {"Shading devices!B5": None},
        [
            "Shading devices!B5  Reduction factor [-]: found neither a factor nor a device;"
            " expected one of the two. Type the factor, or choose a device.",
        ],
    ),
    "shading with factor and device": (
        {"Shading devices!C5": "white curtain 70 %"},
        [
            "Shading devices!C5  Device: found both the factor 0.3 and the device 'white curtain 70 %';"
            " expected one of the two. Clear one of the two cells.",
        ],
    ),
    "shading controlled by months without months": (
        {"Shading devices!E5": "months"},
        [
            "Shading devices!G5  Months: found an empty cell;"
            " expected the months of a device controlled by months."
            " Type the first and the last month, such as 5-9.",
        ],
    ),
    "shading used in no mode": (
        {"Shading devices!I5": "no"},
        [
            "Shading devices!I5  Used in cooling: found no in heating and in cooling;"
            " expected yes in heating, in cooling or in both."
            " Choose yes in one of the two columns, or delete the device.",
        ],
    ),
    # several at once, in the order of the workbook
    "many at once": (
        {
            "Thermal bridges!B5": "Hause",
            "Openings!E5": "1,2",
            "Envelope!G7": None,
            "Envelope!C7": "ceiling",
            "Envelope!B6": "Hose",
            "Build-ups!D6": "100mm",
            "Zones!E5": "#VALUE!",
            "Project!B5": None,
        },
        [
            "Project!B5  Weather: found an empty cell; expected a text. Fill in the cell.",
            "Zones!E5  Floor area [m²]: found the error value #VALUE!;"
            " expected a number above 0 and at most 1000000. Mend the formula or type the value.",
            "Build-ups!D6  Thickness [mm]: found the text '100mm';"
            " expected a number above 0 and at most 5000. Type 100 as a number.",
            "Envelope!B6  Zone: found 'Hose'; expected a name from sheet Zones. Did you mean 'House'?",
            "Envelope!C7  Kind: found the text 'ceiling';"
            " expected one of: wall, roof, floor, door, partition. Choose from the list of the cell.",
            "Envelope!G7  Area [m²]: found an empty cell;"
            " expected a number above 0 and at most 1000000. Fill in the cell.",
            "Openings!E5  Width [m]: found the text '1,2';"
            " expected a number above 0 and at most 50. Type 1.2 as a number.",
            "Thermal bridges!B5  Zone: found 'Hause'; expected a name from sheet Zones. Did you mean 'House'?",
        ],
    ),
    "two faults of one row": (
        {"Envelope!G5": "20 m2", "Envelope!E5": None, "Envelope!H5": None},
        [
            "Envelope!E5  Build-up: found neither a build-up nor a U-value;"
            " expected one of the two. Choose a build-up or type a U-value.",
            "Envelope!G5  Area [m²]: found the text '20 m2';"
            " expected a number above 0 and at most 1000000. Type 20 as a number.",
            "Envelope!H5  Azimuth [°]: found an empty cell;"
            " expected the direction of an element that faces outdoors."
            " Type degrees from north clockwise, or N, NE, E …",
        ],
    ),
}


@pytest.mark.parametrize("name", FAULTS)
def test_every_fault_is_told_in_full(cottage: Book, name: str) -> None:
    changes, sentences = FAULTS[name]

    assert cottage.change(changes).problems() == sentences


@pytest.mark.parametrize("name", FAULTS)
def test_a_real_file_gives_the_same_sentences(cottage: Book, name: str, tmp_path: Path) -> None:
    changes, sentences = FAULTS[name]
    file = cottage.change(changes).save(tmp_path / "faulty.xlsx")

    with pytest.raises(InputError) as caught:
        check_rows(read_cells(file))

    assert str(caught.value).split("\n") == sentences
