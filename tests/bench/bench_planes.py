"""Time of all planes at once against a loop of frames; prints, asserts nothing.

Run: python tests/bench/bench_planes.py
"""

from __future__ import annotations

import time
from collections.abc import Callable
from pathlib import Path

import numpy as np
import pandas as pd
from pvlib import irradiance

from heatledger.climate.files import open_climate
from heatledger.climate.hourly import HourlyClimate
from heatledger.climate.sun import hour_instants, sun_path

REPEATS = 5


def best(action: Callable[[], object]) -> float:
    """Shortest of some runs. [s]"""
    times = []
    for _ in range(REPEATS):
        start = time.perf_counter()
        action()
        times.append(time.perf_counter() - start)
    return min(times)


def frame_loop(climate: HourlyClimate, tilts: np.ndarray, azimuths: np.ndarray) -> None:
    """One pvlib frame for each plane, summed by month."""
    index = hour_instants(climate.time_zone, climate.sun_offset)
    frame = pd.DataFrame(climate.sun._asdict(), index)
    light = [pd.Series(values, index) for values in climate.hours.light]
    for tilt, azimuth in zip(tilts, azimuths, strict=True):
        total = irradiance.get_total_irradiance(
            tilt, azimuth, frame["zenith"], frame["azimuth"], light[1], light[0], light[2],
            dni_extra=frame["extraterrestrial"], airmass=frame["airmass"], albedo=0.2, model="perez",
        )  # fmt: skip
        total["poa_global"].groupby(index.month).sum()


def main() -> None:
    climate = open_climate("Golden CO", Path())
    position = best(lambda: sun_path(climate.site))
    print(f"one series of sun positions: {1000 * position:.1f} ms")
    for planes in (4, 20, 100, 500):
        azimuths = np.linspace(0.0, 359.0, planes)
        tilts = np.full(planes, 90.0)
        ours = best(lambda t=tilts, a=azimuths: climate.irradiation(t, a, 0.2))  # type: ignore[misc]
        line = f"{planes:4} planes: {1000 * ours:7.1f} ms"
        if planes <= 100:
            loop = best(lambda t=tilts, a=azimuths: frame_loop(climate, t, a))  # type: ignore[misc]
            line += f", loop of frames {1000 * loop:7.1f} ms, ratio {loop / ours:.1f}"
        print(line)


if __name__ == "__main__":
    main()
