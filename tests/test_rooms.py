"""Who may import whom: data goes one way through the rooms."""

from __future__ import annotations

import ast
import subprocess
import sys
from collections.abc import Iterator
from pathlib import Path

import pytest

import heatledger

ROOT = Path(heatledger.__file__).parent

ALLOWED = {
    "errors": set(),
    "places": set(),
    "results": {"errors"},
    "inputs": {"errors", "places"},
    "building": {"inputs", "errors"},
    "climate": {"errors", "places"},
    "standards": set(),
    "balance": {"building", "climate", "standards", "results", "errors", "inputs"},
    "workbook": {"inputs", "results", "errors", "listing"},
    "assess": {"balance", "building", "climate", "errors", "inputs", "results", "workbook"},
    "__main__": {"cli"},
    "listing": {"errors"},
    "terminal": {"errors", "listing"},
    "cli": {"assess", "climate", "errors", "inputs", "results", "terminal", "workbook"},
}
"""Rooms each room may import."""

HEAVY = {
    "openpyxl": {"workbook"},
    "lxml": {"workbook"},
    "zipfile": {"workbook"},
    "pandas": {"climate", "results"},
    "pvlib": {"climate"},
    "click": {"cli", "terminal"},
    "pydantic": {"inputs"},
}
"""Libraries and files formats that only some rooms know."""


def modules() -> list[Path]:
    return sorted(path for path in ROOT.rglob("*.py") if path.parent != ROOT or path.stem != "__init__")


def room_of(path: Path) -> str:
    return path.relative_to(ROOT).parts[0].removesuffix(".py")


def imported(path: Path) -> Iterator[str]:
    for node in ast.walk(ast.parse(path.read_text(encoding="utf-8"))):
        if isinstance(node, ast.Import):
            yield from (alias.name for alias in node.names)
        elif isinstance(node, ast.ImportFrom) and node.module:
            yield node.module


def test_every_room_is_named() -> None:
    assert {room_of(path) for path in modules()} == set(ALLOWED)


@pytest.mark.parametrize("path", modules(), ids=lambda path: str(path.relative_to(ROOT)))
def test_rooms_import_only_what_stands_before_them(path: Path) -> None:
    room = room_of(path)
    for name in imported(path):
        parts = name.split(".")
        if parts[0] == "heatledger" and len(parts) > 1:
            assert parts[1] == room or parts[1] in ALLOWED[room], f"{path.name} imports {name}"
        if parts[0] in HEAVY:
            assert room in HEAVY[parts[0]], f"{path.name} imports {name}"


@pytest.mark.parametrize("arguments", [["--help"], ["--version"], ["run", "--help"]])
def test_help_imports_nothing_heavier_than_click(arguments: list[str]) -> None:
    code = (
        "import sys; sys.argv[1:] = ARGS\n"
        "from heatledger.cli import main\n"
        "try: main()\n"
        "except SystemExit: pass\n"
        "heavy = {'numpy', 'pandas', 'pvlib', 'openpyxl', 'lxml', 'pydantic', 'scipy'} & set(sys.modules)\n"
        "print('HEAVY', sorted(heavy))\n"
    ).replace("ARGS", repr(arguments))
    done = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True)
    assert done.stdout.splitlines()[-1] == "HEAVY []"


def test_public_names_are_those_that_can_be_imported() -> None:
    for name in heatledger.__all__:
        assert getattr(heatledger, name) is not None
