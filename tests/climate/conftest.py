"""An hourly file in EPW form, written from a climate, to be spoiled by the tests."""

from __future__ import annotations

from collections.abc import Callable
from pathlib import Path
from typing import Any

import pandas as pd
import pytest

from heatledger.climate.files import open_climate
from heatledger.climate.hourly import HourlyClimate

Change = Callable[[pd.DataFrame], pd.DataFrame]
HEAD_AFTER_PLACE = [
    "DESIGN CONDITIONS,0",
    "TYPICAL/EXTREME PERIODS,0",
    "GROUND TEMPERATURES,0",
    "HOLIDAYS/DAYLIGHT SAVINGS,No,0,0,0",
    "COMMENTS 1,made by a test",
    "COMMENTS 2,",
    "DATA PERIODS,1,1,Data,Sunday, 1/ 1,12/31",
]
EPW_COLUMNS = 35


def epw_text(climate: HourlyClimate, place: str, change: Change | None = None) -> str:
    """An EPW file of a climate: hour 1 ends at 1:00; codes for missing values where the climate has none."""
    hours = climate.hours
    days = pd.date_range("2001-01-01", periods=8760, freq="h")
    frame = pd.DataFrame("0", index=range(8760), columns=range(EPW_COLUMNS), dtype=object)
    columns: dict[int, Any] = {
        0: days.year, 1: days.month, 2: days.day, 3: days.hour + 1, 4: 60,
        6: hours.temperature, 7: 99.9, 8: hours.relative_humidity, 9: 101325, 12: 9999,
        13: hours.global_horizontal, 14: hours.direct_normal, 15: hours.diffuse_horizontal, 21: hours.wind_speed,
    }  # fmt: skip
    for column, values in columns.items():
        frame[column] = values
    frame[5] = "?9?9?9?9"
    if change:
        frame = change(frame)
    site = climate.site
    first = f"LOCATION,{place},made,722190,{site.latitude},{site.longitude},{site.time_zone},{site.altitude}"
    return "\n".join([first, *HEAD_AFTER_PLACE]) + "\n" + frame.to_csv(index=False, header=False, lineterminator="\n")


@pytest.fixture(scope="session")
def golden() -> HourlyClimate:
    return open_climate("Golden CO", Path())


@pytest.fixture
def write_epw(tmp_path: Path, golden: HourlyClimate) -> Callable[..., str]:
    def write(change: Change | None = None, place: str = "Testville,TS,TST", encoding: str = "utf-8") -> str:
        (tmp_path / "mine.epw").write_bytes(epw_text(golden, place, change).encode(encoding))
        return "mine.epw"

    return write
