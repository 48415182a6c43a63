"""Large parts: heard element by element, within bounds."""

from __future__ import annotations

import pytest

from heatledger.workbook.package import PartTooLargeError
from heatledger.workbook.stream import Budget, hear_cells, hear_strings

MAIN = "http://schemas.openxmlformats.org/spreadsheetml/2006/main"


def places(rows: str, budget: Budget | None = None) -> list[tuple[int, int]]:
    found: list[tuple[int, int]] = []
    sheet = f'<worksheet xmlns="{MAIN}"><sheetData>{rows}</sheetData><mergeCells/></worksheet>'
    hear_cells(sheet.encode(), budget or Budget(), lambda row, column, _cell: found.append((row, column)))
    return found


def test_a_million_rows_that_only_have_a_format_take_no_part_of_the_budget() -> None:
    empty = "".join(f'<row r="{row}" ht="15"/>' for row in range(2, 60_000))
    assert places(f'<row r="1"><c r="B1"/></row>{empty}<row r="60000"><c/></row>', Budget(elements=10)) == [
        (1, 2),
        (60_000, 1),
    ]


def test_empty_rows_count_for_those_without_a_number() -> None:
    assert places('<row r="1"/>' * 2 + "<row/>" * 200_000 + "<row><c/></row>") == [(200_002, 1)]


def test_texts_that_look_like_empty_rows_stay() -> None:
    text = '<![CDATA[<row r="1"/>]]>'
    strings = f'<sst xmlns="{MAIN}">' + f"<si><t>{text}</t></si>" * 50_000 + "</sst>"
    assert set(hear_strings(strings.encode(), Budget())) == {'<row r="1"/>'}
    cells: list[str | None] = []
    sheet = f'<worksheet xmlns="{MAIN}"><sheetData><row r="1">' + f'<c t="str"><v>{text}</v></c>' * 50_000
    whole = f"{sheet}</row></sheetData></worksheet>".encode()
    hear_cells(whole, Budget(), lambda _row, _column, cell: cells.append(cell[1]))
    assert set(cells) == {'<row r="1"/>'}


def test_elements_and_letters_are_bounded() -> None:
    with pytest.raises(PartTooLargeError, match=r"^more than 2,500,000 rows, cells and texts, empty ones included$"):
        places("<row>" + "<c/>" * 10 + "</row>", Budget(elements=10))
    with pytest.raises(PartTooLargeError, match=r"^more than 50,000,000 letters$"):
        places('<row><c t="str"><v>abcdef</v></c></row>', Budget(letters=5))


def test_an_endless_tag_is_given_up() -> None:
    with pytest.raises(PartTooLargeError, match=r"^a tag of more than 8 MB$"):
        places("<!--" + "a" * 12_000_000 + "-->")


def test_a_document_type_is_refused_here_too() -> None:
    with pytest.raises(ValueError, match=r"^a document type$"):
        hear_strings(b'<!DOCTYPE a [<!ENTITY b "c">]><a>&b;</a>', Budget())


def test_reading_aids_and_half_escapes() -> None:
    items = '<si><t>one </t></si><si><r><t>a</t></r><r><t>b_xD800_</t></r><rPh sb="0" eb="1"><t>aid</t></rPh></si>'
    assert hear_strings(f'<sst xmlns="{MAIN}">{items}</sst>'.encode(), Budget()) == ["one ", "ab\ufffd"]
