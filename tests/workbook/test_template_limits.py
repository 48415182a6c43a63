"""What spreadsheet programs refuse or cut, asserted on the whole template: they repair such files, or drop parts."""

from __future__ import annotations

import re
from collections import Counter
from io import BytesIO
from itertools import pairwise
from typing import Any
from zipfile import ZipFile

import pytest
from openpyxl import Workbook, load_workbook
from openpyxl.formula import Tokenizer

from heatledger.climate.shipped import shipped_climates
from heatledger.inputs.prefilled import blank_values, example_values
from heatledger.inputs.rows import SHEETS, ProjectRow
from heatledger.workbook.guards import note
from heatledger.workbook.template import build_template

TABLES = [model for model in SHEETS if model is not ProjectRow]

FUNCTIONS = {
    "AND", "COLUMN", "COUNT", "COUNTA", "IF", "IFERROR", "INDEX", "INT", "ISNA", "ISNUMBER", "ISTEXT", "MATCH", "MAX",
    "N", "NOT", "OFFSET", "OR", "ROW", "SUMPRODUCT", "TRIM",
}  # fmt: skip
"""Used by our formulas; all known to every version since 2007, and to LibreOffice."""
MOST = {"promptTitle": 32, "prompt": 255, "errorTitle": 32, "error": 225}
"""Characters that the dialog of a validation takes, in Excel; the file format allows 255 for an error."""
NAME = re.compile(r"[A-Za-z_][A-Za-z0-9_.]{0,254}")
LOOKS_LIKE_A_CELL = re.compile(r"[A-Za-z]{1,3}\d{1,7}|[Rr]\d*([Cc]\d*)?")


@pytest.fixture(scope="module", params=["blank", "example"])
def book(request: pytest.FixtureRequest) -> Workbook:
    values = blank_values() if request.param == "blank" else example_values()
    return load_workbook(BytesIO(build_template(values, shipped_climates())))


def validations(book: Workbook) -> list[tuple[str, Any]]:
    return [(sheet.title, each) for sheet in book for each in sheet.data_validations.dataValidation]


def conditions(book: Workbook) -> list[tuple[str, str]]:
    """Sheet and formula of every conditional format."""
    found: list[tuple[str, str]] = []
    for sheet in book:
        areas: Any = sheet.conditional_formatting
        found += [(sheet.title, rule.formula[0]) for area in areas for rule in area.rules]
    return found


def check_formula(formula: str, book: Workbook) -> None:
    """Functions of every program, plain references, defined names, balanced brackets."""
    assert len(formula) <= 8192
    depth = 0
    for token in Tokenizer(f"={formula}").items:
        depth += {"OPEN": 1, "CLOSE": -1}.get(token.subtype, 0)
        assert 0 <= depth <= 64, formula
        if (token.type, token.subtype) == ("FUNC", "OPEN"):
            assert token.value.rstrip("(") in FUNCTIONS, formula
        if (token.type, token.subtype) == ("OPERAND", "RANGE"):
            assert "[" not in token.value, formula  # structured references stay in their table
            cells = token.value.replace("$", "").rpartition("!")[2]
            assert re.fullmatch(r"[A-Z]{1,3}\d+(:[A-Z]{1,3}\d+)?", cells) or token.value in book.defined_names, formula
    assert depth == 0, formula


def test_validations_keep_within_the_limits(book: Workbook) -> None:
    found = validations(book)
    assert len(found) > 150
    for sheet, each in found:
        for name, most in MOST.items():
            assert len(getattr(each, name) or "") <= most, (sheet, name)
        for formula in filter(None, (each.formula1, each.formula2)):
            assert len(formula) <= 255, (sheet, formula)
            assert "!" not in formula, (sheet, formula)  # other sheets are reached through names
            check_formula(formula, book)


def test_words_of_a_list_hold_no_comma_or_outer_space(book: Workbook) -> None:
    """A comma would part them, whatever the program's own separator is."""
    lists = [each.formula1 for _, each in validations(book) if each.type == "list" and each.formula1.startswith('"')]
    for words in {text.strip('"') for text in lists}:
        assert all(word and word == word.strip() for word in words.split(","))
    assert lists


def test_no_cell_has_two_validations(book: Workbook) -> None:
    """Overlapping ones make the program repair the file."""
    for sheet in book:
        columns: dict[int, list[tuple[int, int]]] = {}
        for cells in (cells for each in sheet.data_validations.dataValidation for cells in each.sqref.ranges):
            for column in range(cells.min_col, cells.max_col + 1):
                columns.setdefault(column, []).append((cells.min_row, cells.max_row))
        for spans in columns.values():
            assert all(above[1] < below[0] for above, below in pairwise(sorted(spans)))


def test_conditions_are_formulas_of_every_program(book: Workbook) -> None:
    found = conditions(book)
    assert len(found) > 200
    for sheet, formula in found:
        assert "!" not in formula, (sheet, formula)
        check_formula(formula, book)


def test_formulas_of_the_lists_are_too(book: Workbook) -> None:
    cells = [cell.value for row in book["Lists"].iter_rows() for cell in row]
    formulas = {re.sub(r"\d+", "1", text): text for text in cells if isinstance(text, str) and text.startswith("=")}
    assert formulas
    for formula in formulas.values():
        check_formula(formula.removeprefix("="), book)


def test_names_are_valid_and_point_at_cells(book: Workbook) -> None:
    tables = [table.displayName for sheet in book for table in sheet.tables.values()]
    names = [*book.defined_names, *tables]
    assert max(Counter(name.casefold() for name in names).values()) == 1
    for name in names:
        assert NAME.fullmatch(name), name
        assert not LOOKS_LIKE_A_CELL.fullmatch(name), name
    for name, defined in book.defined_names.items():
        check_formula(defined.attr_text, book)
        sheets = re.findall(r"(?:'([^']+)'|(\w+))!", defined.attr_text)
        assert sheets, name
        assert {quoted or plain for quoted, plain in sheets} <= set(book.sheetnames)


def test_notes_are_large_enough_for_their_text() -> None:
    """About 50 characters a line of the box, 15 pixels high, as drawn: openpyxl reads no sizes back."""
    with ZipFile(BytesIO(build_template({}))) as package:
        drawings = [package.read(name).decode() for name in package.namelist() if name.endswith(".vml")]
    drawn = [re.findall(r"height:(\d+)px", drawing) for drawing in drawings]
    boxes = [int(height) for heights in drawn for height in heights]
    notes = [note(column).text for model in TABLES for column in model.columns().values()]
    assert len(boxes) == len(notes) > 140
    for text, height in zip(notes, boxes, strict=True):
        assert height >= 15 * sum(len(line) // 50 + 1 for line in text.split("\n")), text
        assert height < 400, text
