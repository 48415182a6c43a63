"""The project's own hourly file: plain CSV with its site and its terms in the head."""

from __future__ import annotations

from collections.abc import Mapping
from io import StringIO

import numpy as np
import pandas as pd

from heatledger.climate.hourly import Hours
from heatledger.climate.readings import Readings
from heatledger.climate.sun import Site

__all__ = ["FIRST_LINE", "hourly_table", "read_table"]

FIRST_LINE = "# Hourly climate of heatledger"
"""By which the format is recognised."""

COLUMNS = {
    "Temperature [°C]": ("temperature", 1),
    "Global horizontal [W/m²]": ("global_horizontal", 0),
    "Direct normal [W/m²]": ("direct_normal", 0),
    "Diffuse horizontal [W/m²]": ("diffuse_horizontal", 0),
    "Relative humidity [%]": ("relative_humidity", 0),
    "Dew point [°C]": ("dew_point", 1),
    "Wind speed [m/s]": ("wind_speed", 1),
    "Horizontal infrared [W/m²]": ("horizontal_infrared", 0),
}
"""Title of each column, the field of :class:`Hours` it holds, and the decimals written."""

SUN_OFFSET = "Sun after the start of the hour [h]"


def hourly_table(hours: Hours, site: Site, sun_offset: float, head: Mapping[str, str]) -> str:
    """The text of an hourly file.

    Parameters
    ----------
    hours : Hours
        Readings; those that are None get no column.
    site : Site
        Latitude, longitude [°], altitude [m] and time zone [h].
    sun_offset : float
        Instant after the start of the hour at which the sun stands for the hour's light. [h]
    head : mapping of str to str
        ``Name`` and ``Source`` at least; further lines such as ``Terms`` are for the reader.
    """
    places = {
        "Latitude [°]": f"{site.latitude:.10g}",
        "Longitude [°]": f"{site.longitude:.10g}",
        "Altitude [m]": f"{site.altitude:.10g}",
        "Time zone [h]": f"{site.time_zone:.10g}",
        SUN_OFFSET: f"{sun_offset:g}",
    }
    lines = [FIRST_LINE, *(f"# {title}: {text}" for title, text in {**head, **places}.items())]
    return "\n".join(lines) + "\n" + _frame(hours).to_csv(index=False, lineterminator="\n")


def read_table(text: str) -> Readings:
    """Read the project's own hourly file; hours run from their label's start, the sun as its head states."""
    head = dict(_head_line(line) for line in text.splitlines() if line.startswith("#"))
    frame = pd.read_csv(StringIO(text), comment="#")
    site = Site(*(float(head[title]) for title in ("Latitude [°]", "Longitude [°]", "Altitude [m]", "Time zone [h]")))
    columns = {
        name: pd.to_numeric(frame[title], errors="coerce").to_numpy(dtype=np.float64)
        for title, (name, _) in COLUMNS.items()
        if title in frame
    }
    labels = frame[["Month", "Day", "Hour"]].fillna(0).to_numpy(dtype=np.int64)  # a row that was cut
    return Readings(head["Name"], head.get("Source", ""), site, float(head[SUN_OFFSET]), labels, columns)


def _head_line(line: str) -> tuple[str, str]:
    title, _, text = line.lstrip("# ").partition(":")
    return title.strip(), text.strip()


def _frame(hours: Hours) -> pd.DataFrame:
    days = pd.date_range("2001-01-01", periods=len(hours.temperature), freq="h")
    frame = pd.DataFrame({"Month": days.month, "Day": days.day, "Hour": days.hour + 1})
    for title, (name, decimals) in COLUMNS.items():
        values = getattr(hours, name)
        if values is not None:
            rounded = pd.Series(values).round(decimals)
            frame[title] = rounded if decimals else rounded.astype("Int64")
    return frame
