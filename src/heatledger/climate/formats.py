"""Readers of hourly weather files, chosen by what stands in the file, not by its name.

Each states how its format labels the hours; whether a file keeps to it is proved by closure afterwards.
"""

from __future__ import annotations

from collections.abc import Callable
from io import StringIO

import numpy as np
import pandas as pd
from pvlib import iotools

from heatledger.climate.hourly import HourlyClimate
from heatledger.climate.model import FloatArray
from heatledger.climate.readings import Readings, checked_climate
from heatledger.climate.sun import Site
from heatledger.climate.table import FIRST_LINE, read_table
from heatledger.errors import InputError, Problem

__all__ = ["decode", "read_climate", "read_epw", "read_tmy3"]

PVLIB_NAMES = {
    "temperature": "temp_air",
    "global_horizontal": "ghi",
    "direct_normal": "dni",
    "diffuse_horizontal": "dhi",
    "relative_humidity": "relative_humidity",
    "dew_point": "temp_dew",
    "wind_speed": "wind_speed",
    "horizontal_infrared": "ghi_infrared",
}
"""Our names of the columns and those of pvlib's readers."""

FORMATS = "an EPW file, a TMY3 file or an hourly table of heatledger"


def read_climate(content: bytes) -> HourlyClimate:
    """Read a weather file of any known format.

    Raises
    ------
    InputError
        If the format is unknown, the file cannot be read, or its year has faults.
    """
    text = decode(content)
    kind, reader = _format(text)
    try:
        readings = reader(text)
    except (KeyError, IndexError, TypeError, ValueError) as error:
        reason = f"{type(error).__name__}: {error}".splitlines()[0]
        fix = "Download the file again, or save it anew with the program it comes from."
        raise InputError([Problem(f"{kind} that cannot be read ({reason})", FORMATS, fix)]) from error
    return checked_climate(readings)


def decode(content: bytes) -> str:
    """Text of a file in UTF-8 or, as most real EPW files are, in Latin-1.

    >>> decode("Besançon".encode("latin-1"))
    'Besançon'
    """
    try:
        return content.decode("utf-8-sig")
    except UnicodeDecodeError:
        return content.decode("latin-1")


def read_epw(text: str) -> Readings:
    """Read an EPW file: hour 1 is the hour that ends at 1:00, so the sun stands half an hour after its start."""
    frame, head = iotools.read_epw(StringIO(text))
    place = _place(head["city"], head["state-prov"], head["country"])
    labels = frame[["month", "day", "hour"]].to_numpy(dtype=np.int64)
    source = (
        f"EPW file of the user; data type {str(head['data_type']).strip()}, station {str(head['WMO_code']).strip()}."
    )
    return Readings(place, source, _site(head), 0.5, labels, _columns(frame))


def read_tmy3(text: str) -> Readings:
    """Read a TMY3 file: hours are labelled at their end, 24:00 or 0:00 of the next day for the last."""
    frame, head = iotools.read_tmy3(StringIO(text))
    ends = pd.to_timedelta(frame["Time (HH:MM)"].astype(str) + ":00")
    # pvlib moves 29 February to 1 March, so the labels are taken from the columns as they stand.
    starts = pd.DatetimeIndex(pd.to_datetime(frame["Date (MM/DD/YYYY)"], format="%m/%d/%Y") + ends) - pd.Timedelta("1h")
    labels = np.column_stack([starts.month, starts.day, starts.hour + 1]).astype(np.int64)
    place = _place(head["Name"], head["State"])
    source = f"TMY3 file of the user; station {head['USAF']}."
    return Readings(place, source, _site(head), 0.5, labels, _columns(frame))


def _format(text: str) -> tuple[str, Callable[[str], Readings]]:
    first, second = (*text.split("\n", 2)[:2], "")[:2]
    if first.startswith(FIRST_LINE):
        return "an hourly table of heatledger", read_table
    if first.upper().startswith("LOCATION,"):
        return "an EPW file", read_epw
    if "Date (MM/DD/YYYY)" in second:
        return "a TMY3 file", read_tmy3
    fix = "Give an hourly weather file of one of these formats."
    raise InputError([Problem("a file of another kind", FORMATS, fix)])


def _place(*parts: str) -> str:
    """Name of a place from what is known of it; empty if nothing is."""
    words = [part.strip().strip('"') for part in parts]
    return ", ".join(word for word in words if word.casefold() not in {"", "-", "unknown"})


def _site(head: dict[str, float]) -> Site:
    return Site(*(float(head[name]) for name in ("latitude", "longitude", "altitude", "TZ")))


def _columns(frame: pd.DataFrame) -> dict[str, FloatArray]:
    return {
        ours: pd.to_numeric(frame[name], errors="coerce").to_numpy(dtype=np.float64)
        for ours, name in PVLIB_NAMES.items()
        if name in frame
    }
