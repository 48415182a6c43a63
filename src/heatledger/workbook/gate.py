"""What is no workbook we can read is refused here, before any parser meets it."""

from __future__ import annotations

import re
import struct
import zlib
from collections.abc import Iterator
from contextlib import contextmanager
from pathlib import Path
from xml.parsers.expat import ExpatError
from zipfile import BadZipFile, ZipFile

from lxml import etree

from heatledger.errors import InputError, Problem
from heatledger.workbook.package import MAIN, TYPES_PART, Package, PartTooLargeError

__all__ = ["read_package", "readable"]

LARGEST_UNPACKED = 200_000_000
"""Size of all parts together. [bytes]"""
MOST_PARTS = 2000
WORKBOOK = "an .xlsx or .xlsm workbook"
SAVE_AS = "Open it in your spreadsheet program and save it as .xlsx."
SAVE_AGAIN = "Open the file in your spreadsheet program, save it again, and try once more."
_OLD_OFFICE = b"\xd0\xcf\x11\xe0"
_BROKEN_ZIP = (BadZipFile, zlib.error, EOFError, struct.error, ValueError, OverflowError, NotImplementedError)
_BROKEN_XML = (etree.LxmlError, ExpatError, LookupError, ValueError, TypeError, AttributeError)
_DOCTYPE = re.compile(rb"(?>\s+|<\?.*?\?>|<!--.*?-->)*+<!DOCTYPE", re.DOTALL)
_LONGEST_PROLOGUE = 2_000_000
"""Bytes in which a document type is sought; behind them the parsers refuse it in what is read."""
_BYTE_ORDER_MARKS = b"\xef\xbb\xbf\xff\xfe\0"


def read_package(path: Path) -> Package:
    """Every part of a workbook, checked; each part is unpacked once."""
    with _file_errors(path):
        _check_first_bytes(path)
        with _open_archive(path) as archive:
            _check_sizes(path, archive)
            package = Package(archive)
    _check_kind(path, package)
    return package


@contextmanager
def readable(path: Path, sheet: str = "") -> Iterator[None]:
    """Turn whatever a broken part causes into a problem of the file."""
    try:
        yield
    except PartTooLargeError as error:
        fix = "Clear the formats of empty rows and columns, or copy the input sheets into a new workbook."
        found = f"a part that is too large ({error})"
        problem = Problem(found, "a workbook of usual size", fix, sheet=sheet, file=path.name)
        raise InputError([problem]) from error
    except _BROKEN_XML as error:
        found = f"a part that cannot be read ({type(error).__name__})"
        problem = Problem(found, "a sound workbook", SAVE_AGAIN, sheet=sheet, file=path.name)
        raise InputError([problem]) from error


def _refusal(path: Path, found: str, fix: str, expected: str = WORKBOOK) -> InputError:
    return InputError([Problem(found, expected, fix, file=path.name or str(path))])


@contextmanager
def _file_errors(path: Path) -> Iterator[None]:
    try:
        yield
    except (FileNotFoundError, NotADirectoryError) as error:
        fix = "Check the name and the folder, or make a workbook with: heatledger new NAME.xlsx"
        raise _refusal(path, "no such file", fix) from error
    except PermissionError as error:
        fix = "Close it in other programs, or ask its owner for the right to read it."
        raise _refusal(path, "a file that may not be read", fix, "a file you may read") from error
    except OSError as error:
        cause = error.strerror or error
        raise _refusal(
            path, f"a file that cannot be read ({cause})", "Copy it to another place and try again."
        ) from error


def _check_first_bytes(path: Path) -> None:
    if path.is_dir():
        raise _refusal(path, "a folder", "Give the workbook inside the folder.")
    if path.exists() and not path.is_file():
        raise _refusal(path, "a device, not a file", "Give the workbook itself.")
    with path.open("rb") as file:
        head = file.read(4096)
        if head.startswith(b"PK"):
            return
        rest = file.read(LARGEST_UNPACKED) if head.startswith(_OLD_OFFICE) else b""
    if not head:
        raise _refusal(path, "an empty file", "Take a copy that still has its content.")
    if head.startswith(_OLD_OFFICE):
        raise _old_office(path, head + rest)
    raise _refusal(path, _other_kind(head), SAVE_AS)


def _old_office(path: Path, data: bytes) -> InputError:
    def holds(stream: str) -> bool:
        return stream.encode("utf-16-le") in data

    if holds("EncryptedPackage"):
        return _refusal(path, "a workbook locked with a password", "Save it without the password, and try again.")
    if holds("Workbook") or holds("Book"):
        return _refusal(path, "a workbook in the old .xls format", SAVE_AS)
    return _refusal(path, "an old office file that is no workbook", "Give the workbook itself.")


def _other_kind(head: bytes) -> str:
    start = head.lstrip(_BYTE_ORDER_MARKS).lstrip().lower()
    if start.startswith((b"<!doctype html", b"<html")):
        return "a web page"
    if start.startswith(b"<?xml"):
        return "a plain XML file"
    if start.startswith(b"%pdf"):
        return "a PDF file"
    return "a file of another kind" if b"\0" in head.lstrip(_BYTE_ORDER_MARKS) else "a plain text file"


@contextmanager
def _open_archive(path: Path) -> Iterator[ZipFile]:
    try:
        with ZipFile(path) as archive:
            yield archive
    except _BROKEN_ZIP as error:
        fix = "Take an undamaged copy, or let your spreadsheet program repair it and save it as .xlsx."
        raise _refusal(path, "a damaged or incomplete file", fix, "a whole workbook") from error


def _check_sizes(path: Path, archive: ZipFile) -> None:
    entries = archive.infolist()
    if any(entry.flag_bits & 1 for entry in entries):
        fix = "Unpack it first and give the workbook inside."
        raise _refusal(path, "a zip file locked with a password", fix)
    if len(entries) > MOST_PARTS:
        fix = "Copy the input sheets into a new workbook."
        raise _refusal(path, f"{len(entries):,} parts in one file", fix, f"at most {MOST_PARTS:,}")
    size = sum(entry.file_size for entry in entries)
    if size > LARGEST_UNPACKED:
        fix = "Take out large pictures and formatted empty rows, or copy the input sheets into a new workbook."
        limit = f"at most {LARGEST_UNPACKED / 1e6:,.0f} MB"
        raise _refusal(path, f"{size / 1e6:,.0f} MB when unpacked", fix, limit)


def _check_kind(path: Path, package: Package) -> None:
    if package.parts.get("mimetype", b"").startswith(b"application/vnd.oasis.opendocument"):
        raise _refusal(path, "an OpenDocument file (.ods)", SAVE_AS)
    if TYPES_PART not in package.parts or "_rels/.rels" not in package.parts:
        raise _refusal(path, "a zip file that is no workbook", "Unpack it first and give the workbook inside.")
    _check_doctypes(path, package)
    with readable(path):
        _check_workbook(path, package)


def _check_doctypes(path: Path, package: Package) -> None:
    with readable(path):
        if _has_doctype(package.parts[TYPES_PART]):
            raise _doctype(path)
        kinds = package.content_types()
    for name, data in package.parts.items():
        if kinds[name].endswith("xml") and not kinds[name].startswith("image/") and _has_doctype(data):
            raise _doctype(path)


def _has_doctype(data: bytes) -> bool:
    """Whether XML in UTF-8 or UTF-16 declares a document type, and so perhaps entities."""
    if b"\0" in data[:4]:
        data = data[: 2 * _LONGEST_PROLOGUE].replace(b"\0", b"")
    return _DOCTYPE.match(data[:_LONGEST_PROLOGUE].lstrip(_BYTE_ORDER_MARKS)) is not None


def _doctype(path: Path) -> InputError:
    found = "a document type declaration (DOCTYPE), which no spreadsheet program writes"
    return _refusal(path, found, "Do not trust the file; ask its sender for a fresh one.", "a plain workbook")


def _check_workbook(path: Path, package: Package) -> None:
    part = package.workbook
    kinds = package.content_types()
    if "sheet.binary" in kinds[part]:
        raise _refusal(path, "a binary workbook (.xlsb)", SAVE_AS)
    namespace = etree.QName(package.xml(part)).namespace or ""
    if namespace == "http://purl.oclc.org/ooxml/spreadsheetml/main":
        fix = "Save it as a normal .xlsx workbook, not as Strict Open XML."
        raise _refusal(path, "a Strict Open XML workbook", fix, "a normal .xlsx or .xlsm workbook")
    if namespace != MAIN:
        raise _refusal(path, "an office file that is no workbook", "Give the workbook itself.")
    if any(kind.endswith("digital-signature-xmlsignature+xml") for kind in kinds.values()):
        fix = "Take off the signature and try again, or work on an unsigned copy."
        raise _refusal(
            path, "a digitally signed workbook", fix, "one without a signature, which new sheets would break"
        )
    if any(item.kind == "revisionHeaders" for item in package.relations(part)):
        fix = "Stop sharing it in your spreadsheet program (Review, Share Workbook), save it, and try again."
        raise _refusal(path, "a shared workbook with tracked changes", fix, "a workbook of one user at a time")
