"""Readers of hourly weather files, each stating how its format labels the hours.

Whether a file keeps to it is proved by closure afterwards.
"""

from __future__ import annotations

import csv
import re
from collections.abc import Mapping
from io import BytesIO, StringIO
from pathlib import Path
from tempfile import TemporaryDirectory
from typing import Any

import numpy as np
import pandas as pd
from numpy.typing import NDArray
from pvlib import iotools

from heatledger.climate.model import FloatArray
from heatledger.climate.readings import Readings
from heatledger.climate.sun import Site
from heatledger.errors import InputError, Problem

__all__ = ["read_epw", "read_nsrdb", "read_pvgis_series", "read_pvgis_year", "read_tmy2", "read_tmy3"]

PVLIB_NAMES = {
    "temp_air": "temperature",
    "ghi": "global_horizontal",
    "dni": "direct_normal",
    "dhi": "diffuse_horizontal",
    "relative_humidity": "relative_humidity",
    "temp_dew": "dew_point",
    "wind_speed": "wind_speed",
    "ghi_infrared": "horizontal_infrared",
    "IR(h)": "horizontal_infrared",
}
"""Names of pvlib's readers and ours."""

TMY2_NAMES = {
    "DryBulb": ("temperature", 10.0),
    "GHI": ("global_horizontal", 1.0),
    "DNI": ("direct_normal", 1.0),
    "DHI": ("diffuse_horizontal", 1.0),
    "RHum": ("relative_humidity", 1.0),
    "DewPoint": ("dew_point", 10.0),
    "Wspd": ("wind_speed", 10.0),
}
"""Names of the TMY2 reader, which keeps the file's tenths, ours, and the divisor."""

EPW_OFFSET = re.compile(r"^COMMENTS [12],.*Irradiance Time Offset \(h\):\s*(-?[\d.]+)", re.MULTILINE)
"""What PVGIS writes into an EPW file, whose rows are then in UTC, whatever the time zone in its first line."""


def read_epw(text: str) -> Readings:
    """Read an EPW file: hour 1 is the hour that ends at 1:00, so the sun stands half an hour after its start.

    One that PVGIS wrote has satellite pictures of an instant that its comment states from the end of the hour.
    """
    # A leap year makes 29 February a date in every file; the labels are taken from the columns anyway.
    frame, head = iotools.read_epw(StringIO(text), coerce_year=2004)
    seen = EPW_OFFSET.search(text[:20_000])
    labels = frame[["month", "day", "hour"]].to_numpy(dtype=np.int64)
    source = (
        f"EPW file of the user; data type {str(head['data_type']).strip()}, station {str(head['WMO_code']).strip()}."
    )
    place = _place(head["city"], head["state-prov"], head["country"])
    offset = 1.0 + float(seen[1]) if seen else 0.5
    return Readings(place, source, _site(head), offset, labels, _columns(frame), utc=bool(seen))


def read_tmy3(text: str) -> Readings:
    """Read a TMY3 file: hours are labelled at their end, 24:00 or 0:00 of the next day for the last."""
    frame, head = iotools.read_tmy3(StringIO(text))
    ends = pd.to_timedelta(frame["Time (HH:MM)"].astype(str) + ":00")
    # pvlib moves 29 February to 1 March, so the labels are taken from the columns as they stand.
    days = pd.to_datetime(frame["Date (MM/DD/YYYY)"], format="%m/%d/%Y")
    starts = pd.DatetimeIndex(days + ends) - pd.Timedelta("1h")
    source = f"TMY3 file of the user; station {head['USAF']}."
    return Readings(_place(head["Name"], head["State"]), source, _site(head), 0.5, _labels(starts), _columns(frame))


def read_tmy2(text: str) -> Readings:
    """Read a TMY2 file: hours are labelled at their end, 1 to 24."""
    with TemporaryDirectory() as folder:  # pvlib's reader takes nothing but a path
        path = Path(folder) / "hours.tm2"
        path.write_text(text, encoding="latin-1", errors="replace")
        frame, head = iotools.read_tmy2(path)
    columns = {ours: frame[name].to_numpy(dtype=np.float64) / divisor for name, (ours, divisor) in TMY2_NAMES.items()}
    labels = frame[["month", "day", "hour"]].to_numpy(dtype=np.int64)
    source = f"TMY2 file of the user; station {head['WBAN']}."
    return Readings(_place(head["City"], head["State"]), source, _site(head), 0.5, labels, columns)


def read_pvgis_year(text: str) -> Readings:
    """Read a typical year of PVGIS, CSV or JSON: rows in UTC; older files do not state when their light was seen."""
    if text.lstrip().startswith("{"):
        frame, head = iotools.read_pvgis_tmy(StringIO(text), pvgis_format="json")
    else:
        frame, head = iotools.read_pvgis_tmy(BytesIO(text.encode()), pvgis_format="csv")
    inputs = head["inputs"]
    inputs = {**inputs, **inputs.get("location", {})}
    offset = inputs.get("irradiance time offset", inputs.get("irradiance_time_offset"))
    years = [month["year"] for month in head["months_selected"]]
    source = f"PVGIS file of the user; typical months of {min(years)} to {max(years)}."
    return _pvgis(source, inputs, None if offset is None else float(offset), frame)


def read_pvgis_series(text: str) -> Readings:
    """Read hours of one year from PVGIS, CSV or JSON: stamps in UTC are the instants at which the light was seen.

    Raises
    ------
    InputError
        If they are for a plane that is not level.
    """
    kind = "json" if text.lstrip().startswith("{") else "csv"
    frame, head = iotools.read_pvgis_hourly(StringIO(text), pvgis_format=kind)
    slope = _slope(head["inputs"])
    if slope != 0:
        found = (
            "irradiance of a plane that follows the sun"
            if np.isnan(slope)
            else f"irradiance of a plane of slope {slope:g}°"
        )
        fix = "Download the hours of PVGIS again with slope 0, or its typical year."
        raise InputError([Problem(found, "irradiance of the horizontal", fix)])
    if "poa_global" not in frame:
        frame["poa_global"] = frame["poa_direct"] + frame["poa_sky_diffuse"] + frame["poa_ground_diffuse"]
    frame = frame.rename(columns={"poa_global": "ghi", "poa_sky_diffuse": "dhi"})
    minute = float(pd.DatetimeIndex(frame.index).minute[0])
    inputs = {**head["inputs"], **head["inputs"].get("location", {})}
    return _pvgis("PVGIS hourly series of the user.", inputs, minute / 60.0, frame)


def read_nsrdb(text: str) -> Readings:
    """Read a file of the National Solar Radiation Database: stamps are the instants at which the light was seen.

    Raises
    ------
    ValueError
        If its head holds no numbers where they are expected.
    """
    lines = text.splitlines()
    head = dict(zip(*(next(csv.reader([line])) for line in lines[:2]), strict=False))
    names = ("Latitude", "Longitude", "Elevation", "Time Zone", "Local Time Zone")
    latitude, longitude, altitude, stamped, local = (float(head[name]) for name in names)
    # pvlib's reader takes whole numbers only, but India stands at 5.5 h.
    whole = {**head, "Elevation": "0", "Time Zone": "0", "Local Time Zone": "0"}
    lines[:2] = [",".join(whole), ",".join(f'"{value}"' for value in whole.values())]
    frame, _ = iotools.read_nsrdb_psm4(StringIO("\n".join(lines) + "\n"))
    site = Site(latitude, longitude, altitude, local if stamped == 0 else stamped)
    offset = float(np.unique(frame["Minute"]).mean()) / 60.0
    labels = frame[["Month", "Day", "Hour"]].to_numpy(dtype=np.int64) + np.array([0, 0, 1])
    place = _place(head.get("City", ""), head.get("State", ""), head.get("Country", ""))
    source = f"National Solar Radiation Database, file of the user; point {head.get('Location ID', '').strip()}."
    utc = stamped == 0 and local != 0
    return Readings(place, source, site, offset, labels, _columns(frame), utc=utc)


def _pvgis(source: str, place: Mapping[str, Any], offset: float | None, frame: pd.DataFrame) -> Readings:
    """Readings of PVGIS, which knows no time zone: that of the sun."""
    latitude, longitude, altitude = (float(place[name]) for name in ("latitude", "longitude", "elevation"))
    site = Site(latitude, longitude, altitude, float(round(longitude / 15.0)))
    stamps = pd.DatetimeIndex(frame.index)
    return Readings("", source, site, offset, _labels(stamps), _columns(frame), utc=True)


def _slope(inputs: Mapping[str, Any]) -> float:
    """Tilt of the plane of a series; NaN for one that turns."""
    if "mounting_system" in inputs:
        plane = inputs["mounting_system"].get("fixed", {"slope": {"value": "nan"}})
        return float(plane["slope"]["value"])
    return float(re.findall(r"-?[\d.]+", inputs.get("Slope", "nan")[:20] + " nan")[0])


def _place(*parts: str) -> str:
    """Name of a place from what is known of it; empty if nothing is."""
    words = [part.strip().strip('"') for part in parts]
    return ", ".join(word for word in words if word.casefold() not in {"", "-", "unknown"})


def _site(head: Mapping[str, float]) -> Site:
    return Site(*(float(head[name]) for name in ("latitude", "longitude", "altitude", "TZ")))


def _labels(starts: pd.DatetimeIndex) -> NDArray[np.int64]:
    return np.column_stack([starts.month, starts.day, starts.hour + 1]).astype(np.int64)


def _columns(frame: pd.DataFrame) -> dict[str, FloatArray]:
    return {
        ours: pd.to_numeric(frame[name], errors="coerce").to_numpy(dtype=np.float64)
        for name, ours in PVLIB_NAMES.items()
        if name in frame
    }
