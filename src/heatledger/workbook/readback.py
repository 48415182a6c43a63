"""Reads back what was written, as another program would, before it takes the place of the user's file."""

from __future__ import annotations

import warnings
from collections.abc import Mapping
from io import BytesIO
from pathlib import Path
from typing import BinaryIO
from zipfile import BadZipFile, ZipFile

from openpyxl import load_workbook

from heatledger.errors import InputError, Problem
from heatledger.workbook.package import MAIN, MOST_MARKS, Package, PartTooLargeError

__all__ = ["Judged", "read_back"]

EMPTY_SHEET = f'<worksheet xmlns="{MAIN}"><sheetData/></worksheet>'
EMPTY_STRINGS = f'<sst xmlns="{MAIN}"/>'


class Judged:
    """What is to be read back of a workbook.

    Parameters
    ----------
    name : str
        File name for the sentence of a problem.
    titles : frozenset of str
        Result sheets, read cell by cell.
    package : Package
        The workbook as written.
    """

    def __init__(self, name: str, titles: frozenset[str], package: Package) -> None:
        self.name = name
        self.titles = titles
        strings = package.related(package.workbook, "sharedStrings")
        users = [entry.part for entry in package.sheets() if entry.kind == "worksheet" and entry.title not in titles]
        self.stand_ins: Mapping[str, str] = dict.fromkeys(users, EMPTY_SHEET) | (
            {strings: EMPTY_STRINGS} if strings else {}
        )
        """For sheets and texts of the user: they stay byte for byte, and a million rows take a minute to read."""


def read_back(path: Path, *, original: Path, judged: Judged) -> None:
    """Read the file that was written.

    Raises
    ------
    InputError
        If another reader can read the original but not this file.
    """
    cause = _flaw(path, judged, judged.titles)
    if cause and (cause == "BadZipFile" or not _flaw(original, judged)):  # who cannot read the original is no judge
        found = f"that the result cannot be read back ({cause})"
        fix = "Nothing was changed. Open and save the workbook in your spreadsheet program, and try again."
        raise InputError([Problem(found, "a sound workbook", fix, file=judged.name)])


def _flaw(path: Path, judged: Judged, titles: frozenset[str] = frozenset()) -> str:
    """What keeps another reader from reading these sheets."""
    try:
        with path.open("rb") as file:
            lean = _lean(file, judged.stand_ins)
        with warnings.catch_warnings():
            warnings.simplefilter("ignore")  # openpyxl warns of what it would not keep
            book = load_workbook(lean, read_only=True)
        for title in titles:
            for _ in book[title].iter_rows(values_only=True):
                pass
    except OSError:
        raise
    except Exception as error:  # whatever another reader stumbles over
        return type(error).__name__
    return ""


def _lean(file: BinaryIO, stand_ins: Mapping[str, str]) -> BinaryIO:
    """The file without pictures and the like and with stand-ins, after all its checksums were tested."""
    lean = BytesIO()
    with ZipFile(file) as archive, ZipFile(lean, "w") as kept:
        broken = archive.testzip()
        if broken:
            raise BadZipFile(broken)
        for name in archive.namelist():
            if name in stand_ins:
                kept.writestr(name, stand_ins[name])
            elif name.endswith((".xml", ".rels")):
                kept.writestr(name, _of_usual_size(archive.read(name), name))
    return lean


def _of_usual_size(data: bytes, name: str) -> bytes:
    if data.count(b"<") > MOST_MARKS:
        raise PartTooLargeError(name)
    return data
