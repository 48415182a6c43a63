"""Make the shipped climates from the packages that carry their data; run by hand.

Fetch the two packages into one folder, then run this script with that folder:

    pip download --no-deps --no-binary :all: pvlib==0.16.1 -d packages
    pip download --no-deps --only-binary :all: pvdeg==0.7.4 -d packages
    python weather/rebuild.py packages

The CSV files are written beside this script; SOURCES.md tells what they are.
"""

from __future__ import annotations

import json
import sys
import tarfile
import tempfile
import zipfile
from collections.abc import Iterator
from pathlib import Path

import numpy as np
import pandas as pd
from pvlib import atmosphere, iotools

from heatledger.climate.hourly import Hours
from heatledger.climate.model import FloatArray
from heatledger.climate.sun import Site
from heatledger.climate.table import hourly_table

PVLIB = "pvlib-0.16.1"
PVDEG = "pvdeg-0.7.4-py3-none-any.whl"
LABORATORY = "National Renewable Energy Laboratory"
PUBLIC_DATA = "Public data of the United States Department of Energy; see SOURCES.md"
NSRDB_TERMS = "Free to use and pass on if the National Solar Radiation Database is named; see SOURCES.md"

Climate = tuple[str, Hours, Site, float, dict[str, str]]


def main() -> None:
    """Write every climate beside this script."""
    packages = Path(sys.argv[1])
    for stem, hours, site, sun_offset, head in climates(packages):
        text = hourly_table(hours, site, sun_offset, head)
        path = Path(__file__).parent / f"{stem}.csv"
        path.write_text(text, encoding="utf-8", newline="\n")
        print(f"{path.name}: {len(text.encode()) / 1000:.0f} kB")


def climates(packages: Path) -> Iterator[Climate]:
    """Every shipped climate from the packages."""
    with tempfile.TemporaryDirectory() as folder:
        with tarfile.open(packages / f"{PVLIB}.tar.gz") as archive:
            archive.extractall(folder, filter="data")
        with zipfile.ZipFile(packages / PVDEG) as wheel:
            wheel.extractall(folder)
        data, tests = (Path(folder) / PVLIB / part for part in ("pvlib/data", "tests/data"))
        yield tmy3(data / "723170TYA.CSV", "greensboro-nc", "Greensboro NC", "Piedmont Triad International Airport")
        yield tmy3(data / "703165TY.csv", "sand-point-ak", "Sand Point AK", "Sand Point")
        yield tmy2(data / "12839.tm2")
        yield pvgis(tests / "tmy_45.000_8.000_2005_2023.csv")
        yield moffat(tests / "test_psm4_tmy-2023.csv")
        yield pvdeg(Path(folder) / "pvdeg/data", "golden", "golden-co", "Golden CO")
        yield pvdeg(Path(folder) / "pvdeg/data", "nyc", "new-york-ny", "New York NY")


def tmy3(path: Path, stem: str, name: str, station: str) -> Climate:
    """TMY3: hours labelled at their end, so the sun stands half an hour after the start."""
    frame, meta = iotools.read_tmy3(path)
    years = sorted(set(pd.to_datetime(frame["Date (MM/DD/YYYY)"], format="%m/%d/%Y").dt.year))
    head = {
        "Name": name,
        "Source": f"TMY3 typical year of station {meta['USAF']} {station}.",
        "Publisher": f"{LABORATORY}, National Solar Radiation Data Base 1991-2005 update",
        "Period": f"typical months of {years[0]} to {years[-1]}",
        "Terms": PUBLIC_DATA,
    }
    hours = Hours(
        _column(frame, "temp_air"),
        *_light(frame, "ghi", "dni", "dhi"),
        relative_humidity=_column(frame, "relative_humidity"),
        wind_speed=_column(frame, "wind_speed"),
    )
    return stem, hours, _site(meta), 0.5, head


def tmy2(path: Path) -> Climate:
    """TMY2: hours labelled at their end; temperature, humidity and wind in tenths where whole numbers are kept."""
    frame, meta = iotools.read_tmy2(path)
    years = sorted({1900 + int(year) for year in frame["year"]})
    head = {
        "Name": "Miami FL",
        "Source": "TMY2 typical year of station 12839 Miami.",
        "Publisher": f"{LABORATORY}, National Solar Radiation Data Base 1961-1990",
        "Period": f"typical months of {years[0]} to {years[-1]}",
        "Terms": PUBLIC_DATA,
    }
    hours = Hours(
        frame["DryBulb"].to_numpy() / 10.0,
        *_light(frame, "GHI", "DNI", "DHI"),
        relative_humidity=_column(frame, "RHum"),
        wind_speed=frame["Wspd"].to_numpy() / 10.0,
    )
    return "miami-fl", hours, _site(meta), 0.5, head


def pvgis(path: Path) -> Climate:
    """PVGIS: UTC rows whose light is that of a satellite picture some minutes after the full hour."""
    lines = path.read_text(encoding="utf-8").splitlines()
    offset = float(lines[3].rpartition(":")[2])
    first = next(number for number, line in enumerate(lines) if line.startswith("time(UTC)"))
    frame = pd.read_csv(path, skiprows=first, nrows=8760)
    years = sorted({int(stamp[:4]) for stamp in frame["time(UTC)"]})
    frame = frame.loc[np.roll(frame.index, 1)]  # 23:00 UTC is the first hour of the local day
    head = {
        "Name": "Piedmont IT",
        "Source": "PVGIS typical year at 45° N 8° E, © European Union 2001-2025, Joint Research Centre, CC BY 4.0.",
        "Publisher": "European Commission, Joint Research Centre, PVGIS",
        "Period": f"typical months of {years[0]} to {years[-1]}",
        "Terms": "CC BY 4.0, https://creativecommons.org/licenses/by/4.0/ ; changed: rows in local time, rounded",
    }
    hours = Hours(
        _column(frame, "T2m"),
        *_light(frame, "G(h)", "Gb(n)", "Gd(h)"),
        relative_humidity=_column(frame, "RH"),
        wind_speed=_column(frame, "WS10m"),
        horizontal_infrared=_column(frame, "IR(h)"),
    )
    return "piedmont-it", hours, Site(45.0, 8.0, 250.0, 1.0), offset, head


def moffat(path: Path) -> Climate:
    """NSRDB: half-hour stamps in local standard time; the file has no head, so the altitude is from its pressure."""
    frame = pd.read_csv(path)
    altitude = round(float(atmosphere.pres2alt(100.0 * frame["Pressure"].mean())), -1)
    head = _nsrdb_head("Moffat County CO", "40.51° N 108.54° W", frame)
    hours = Hours(
        _column(frame, "Temperature"),
        *_light(frame, "GHI", "DNI", "DHI"),
        relative_humidity=_column(frame, "Relative Humidity"),
        wind_speed=_column(frame, "Wind Speed"),
    )
    return "moffat-county-co", hours, Site(40.5137, -108.5449, altitude, -7.0), 0.5, head


def pvdeg(data: Path, key: str, stem: str, name: str) -> Climate:
    """NSRDB as another package carries it, its head in a JSON file."""
    meta = json.loads((data / f"meta_{key}.json").read_text(encoding="utf-8"))
    frame = pd.read_csv(data / f"psm4_{key}.csv")
    hours = Hours(
        _column(frame, "temp_air"),
        *_light(frame, "ghi", "dni", "dhi"),
        relative_humidity=_column(frame, "relative_humidity"),
        wind_speed=_column(frame, "wind_speed"),
    )
    site = Site(meta["latitude"], meta["longitude"], meta["altitude"], meta["tz"])
    head = _nsrdb_head(name, f"{meta['latitude']}° N {-meta['longitude']}° W", frame)
    return stem, hours, site, 0.5, head


def _nsrdb_head(name: str, place: str, frame: pd.DataFrame) -> dict[str, str]:
    return {
        "Name": name,
        "Source": f"Typical year of the National Solar Radiation Database at {place}, physical solar model 4.",
        "Publisher": f"{LABORATORY} (now National Laboratory of the Rockies)",
        "Period": f"typical months of {frame['Year'].min()} to {frame['Year'].max()}",
        "Terms": NSRDB_TERMS,
    }


def _site(meta: dict[str, float]) -> Site:
    return Site(meta["latitude"], round(meta["longitude"], 4), meta["altitude"], meta["TZ"])


def _light(frame: pd.DataFrame, *names: str) -> tuple[FloatArray, FloatArray, FloatArray]:
    global_horizontal, direct_normal, diffuse_horizontal = (_column(frame, name) for name in names)
    return global_horizontal, direct_normal, diffuse_horizontal


def _column(frame: pd.DataFrame, name: str) -> FloatArray:
    """Numbers as they stand; -0.0 of one source becomes 0, a code of missing wind becomes NaN."""
    values = frame[name].to_numpy(dtype=np.float64) + 0.0
    return np.where(values <= -999, np.nan, values)


if __name__ == "__main__":
    main()
