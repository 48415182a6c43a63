"""From the word under Weather to a climate: a shipped one or the user's own file."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from dataclasses import replace
from difflib import get_close_matches
from pathlib import Path

from heatledger.climate.formats import read_climate
from heatledger.climate.hourly import HourlyClimate
from heatledger.climate.monthly_table import MONTHLY_TABLE
from heatledger.climate.readings import Readings
from heatledger.climate.shipped import shipped_climates, shipped_file
from heatledger.climate.sun import Site
from heatledger.errors import InputError, Problem

__all__ = ["open_climate", "shipped_climates"]

UNITS = {"latitude": "°", "longitude": "°", "time_zone": " h"}

LONGEST_NAME = 100
"""Letters of a wrong name that a sentence gives back."""
LARGEST_FILE = 50_000_000
"""A year of hours takes 2 MB; much more is something else. [byte]"""


def open_climate(
    weather: str,
    folder: Path,
    *,
    latitude: float | None = None,
    longitude: float | None = None,
    time_zone: float | None = None,
    sheet: str = "",
    cell: str = "",
    column: str = "Weather",
) -> HourlyClimate:
    """Open a shipped climate by its name or an hourly file by its path.

    Parameters
    ----------
    weather : str
        Name of a shipped climate, case and outer spaces ignored, or path of an
        hourly file of a known format.
    folder : Path
        Folder that relative paths start from: that of the workbook.
    latitude, longitude : float, optional
        Used instead of the file's; north and east positive. [°]
    time_zone : float, optional
        Used instead of the file's: local standard time less UTC. [h]
    sheet, cell, column : str, optional
        Where the user named the weather; problems point there.

    Raises
    ------
    InputError
        With every fault of the name or of the file.
    """
    try:
        path = shipped_file(weather) or _own_file(weather, folder)
        place = {"latitude": latitude, "longitude": longitude, "time_zone": time_zone}
        return _read(path, path.name, lambda readings: _placed(readings, place))
    except InputError as error:
        raise InputError(
            replace(problem, sheet=sheet, cell=cell, column=column) for problem in error.problems
        ) from error


def _own_file(weather: str, folder: Path) -> Path:
    name = weather.strip()
    path = folder / name
    for spelling in (path, folder / name.replace("\\", "/")):  # as typed on Windows
        if _is(Path.is_file, spelling):
            return spelling
    if _is(Path.is_dir, path):
        fix = "Add the name of the weather file to the path."
        raise InputError([Problem(f"the folder '{name}'", "a weather file", fix)])
    if path.suffix or "/" in name or "\\" in name:
        fix = "Correct the path; it starts from the folder of the workbook."
        raise InputError([Problem(f"no file '{_shortened(name)}'", "the path of a weather file", fix)])
    raise InputError([_unknown_name(name)])


def _is(kind: Callable[[Path], bool], path: Path) -> bool:
    try:
        return kind(path)
    except (OSError, ValueError):  # longer than a path may be
        return False


def _unknown_name(name: str) -> Problem:
    if name.casefold() == MONTHLY_TABLE:
        fix = "A monthly table stands in a workbook: check or run the workbook."
        return Problem(f"'{name}'", "the name of a shipped climate or the path of a weather file", fix)
    known = {title.casefold(): title for title in (*shipped_climates(), MONTHLY_TABLE)}
    nearest = get_close_matches(name.casefold(), known, n=1)
    names = ", ".join(shipped_climates())
    fix = f"Did you mean '{known[nearest[0]]}'?" if nearest else f"Shipped climates are {names}."
    expected = f"the name of a shipped climate, the path of a weather file, or '{MONTHLY_TABLE}'"
    return Problem(f"the text '{_shortened(name)}'", expected, fix)


def _shortened(name: str) -> str:
    return name if len(name) <= LONGEST_NAME else f"{name[:LONGEST_NAME]}…"


def _read(path: Path, name: str, moved: Callable[[Readings], Readings]) -> HourlyClimate:
    try:
        climate = read_climate(_content(path), moved)
    except OSError as error:
        fix = "Close it in other programs and check that you may read it."
        problem = Problem(f"a file that cannot be opened ({error.strerror})", "a weather file", fix)
        raise InputError([replace(problem, file=name)]) from error
    except InputError as error:
        raise InputError(replace(problem, file=name) for problem in error.problems) from error
    return climate if climate.name else replace(climate, name=path.stem).with_sun(climate.sun)


def _content(path: Path) -> bytes:
    if path.stat().st_size > LARGEST_FILE:
        fix = "Give a file of one year of hours."
        raise InputError([Problem("a file of more than 50 MB", "a weather file of a few MB", fix)])
    return path.read_bytes()


def _placed(readings: Readings, given: Mapping[str, float | None]) -> Readings:
    """The readings at the workbook's place where that differs from the file's, each difference noted."""
    changed = {
        field: value for field, value in given.items() if value is not None and value != getattr(readings.site, field)
    }
    remarks = tuple(
        f"The {field.replace('_', ' ')} {value:g}{UNITS[field]} of the workbook is used instead of "
        f"{getattr(readings.site, field):g}{UNITS[field]} of the weather file."
        for field, value in changed.items()
    )
    site: Site = readings.site._replace(**changed)
    return replace(readings, site=site, remarks=(*readings.remarks, *remarks))
