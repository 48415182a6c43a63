"""Which format a weather file has, by what stands in it, not by its name."""

from __future__ import annotations

import csv
import re
from collections.abc import Callable
from typing import NamedTuple

from heatledger.climate.checked import checked_climate
from heatledger.climate.hourly import HourlyClimate
from heatledger.climate.readers import (
    read_epw,
    read_nsrdb,
    read_pvgis_series,
    read_pvgis_year,
    read_tmy2,
    read_tmy3,
)
from heatledger.climate.readings import Readings
from heatledger.climate.table import FIRST_LINE, read_table
from heatledger.errors import InputError, Problem

__all__ = ["FORMATS", "decode", "read_climate"]

LONGEST_LINE = 20_000
"""An hour takes a few hundred letters; the readers take minutes over a line of millions."""
FORMATS = "an EPW, TMY3, TMY2, PVGIS or NSRDB file or an hourly table of heatledger"
_PACKED = {b"PK\x03\x04": "a packed file (zip) or a workbook", b"\x1f\x8b": "a packed file (gzip)"}
"""What a file is that begins with these bytes."""


class _Format(NamedTuple):
    """What a kind of file is called, what it begins with, and its reader."""

    title: str
    beginning: re.Pattern[str]
    reader: Callable[[str], Readings]


_FORMATS = (
    _Format("an hourly table of heatledger", re.compile(re.escape(FIRST_LINE)), read_table),
    _Format("an EPW file", re.compile(r"LOCATION,", re.IGNORECASE), read_epw),
    _Format("a TMY3 file", re.compile(r"[^\n]*\n[^\n]*Date \(MM/DD/YYYY\)"), read_tmy3),
    _Format("a TMY2 file", re.compile(r" ?\d{5} .{22} [A-Z ]{2} +-?\d+ [NS] *\d+ +\d+ [EW] *\d+"), read_tmy2),
    _Format("a PVGIS file", re.compile(r"Latitude \(decimal degrees\):(?s:.{1,600})\ntime\(UTC\),"), read_pvgis_year),
    _Format("a PVGIS file", re.compile(r"Latitude \(decimal degrees\):"), read_pvgis_series),
    _Format("a PVGIS file", re.compile(r'\s*\{(?s:.{1,4000})"tmy_hourly"'), read_pvgis_year),
    _Format("a PVGIS file", re.compile(r'\s*\{(?s:.{1,4000})"hourly"'), read_pvgis_series),
    _Format("an NSRDB file", re.compile(r"Source,Location ID,"), read_nsrdb),
)


def read_climate(content: bytes, moved: Callable[[Readings], Readings] = lambda readings: readings) -> HourlyClimate:
    """Read a weather file of any known format.

    Parameters
    ----------
    content : bytes
        The whole file.
    moved : callable, optional
        Puts what the user states of the place in the place of what the file states, before anything is checked.

    Raises
    ------
    InputError
        If the format is unknown, the file cannot be read, or its year has faults.
    """
    for beginning, packed in _PACKED.items():
        if content.startswith(beginning):
            raise InputError([Problem(packed, FORMATS, "Unpack it and give the weather file inside.")])
    if not content.strip():
        raise InputError([Problem("an empty file", FORMATS, "Download the file again.")])
    text = decode(content)
    known = _format(text)
    if not text.lstrip().startswith("{") and max(map(len, text.split("\n"))) > LONGEST_LINE:
        found = f"{known.title} with a line of more than {LONGEST_LINE:,} letters"
        raise InputError([Problem(found, FORMATS, "Download the file again.")])
    try:
        readings = known.reader(text)
    except (AttributeError, KeyError, IndexError, TypeError, ValueError, RecursionError, csv.Error) as error:
        reason = f"{type(error).__name__}: {error}".splitlines()[0]
        fix = "Download the file again, or save it anew with the program it comes from."
        raise InputError([Problem(f"{known.title} that cannot be read ({reason})", FORMATS, fix)]) from error
    return checked_climate(moved(readings))


def decode(content: bytes) -> str:
    """Text of a file in UTF-8 or, as most real EPW files are, in Latin-1; lines end in one way.

    >>> decode("Besançon".encode("latin-1"))
    'Besançon'
    """
    try:
        text = content.decode("utf-8-sig")
    except UnicodeDecodeError:
        text = content.decode("latin-1")
    return text.replace("\r\n", "\n").replace("\r", "\n")


def _format(text: str) -> _Format:
    for known in _FORMATS:
        if known.beginning.match(text):
            return known
    fix = "Give an hourly weather file of one of these formats."
    raise InputError([Problem("a file of another kind", FORMATS, fix)])
