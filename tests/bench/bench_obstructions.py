"""Time of many openings behind different obstructions against one series of sun positions; asserts nothing.

Run: python tests/bench/bench_obstructions.py
"""

from __future__ import annotations

import time
from collections.abc import Callable
from pathlib import Path

import numpy as np

from heatledger.climate.files import open_climate
from heatledger.climate.obstruction import Obstructions
from heatledger.climate.sun import sun_path
from heatledger.climate.surfaces import Surfaces

REPEATS = 5
OPENINGS = 500


def best(action: Callable[[], object]) -> float:
    """Shortest of some runs. [s]"""
    times = []
    for _ in range(REPEATS):
        start = time.perf_counter()
        action()
        times.append(time.perf_counter() - start)
    return min(times)


def openings(planes: int, *, watched: bool) -> Surfaces:
    """Upright openings in some directions, each behind an obstruction of its own."""
    draw = np.random.default_rng(1)
    lengths = {
        name: draw.uniform(0.0, 1.5, OPENINGS) for name in Obstructions._fields if name.endswith(("depth", "distance"))
    }
    before = Obstructions(
        width=draw.uniform(0.6, 2.5, OPENINGS),
        height=draw.uniform(0.6, 2.5, OPENINGS),
        skyline=draw.uniform(0.0, 45.0, (OPENINGS, 8)),
        reflectance=np.full(OPENINGS, 0.2),
        **lengths,
    )
    azimuth = np.linspace(0.0, 359.0, planes)[np.arange(OPENINGS) % planes]
    threshold = np.full(OPENINGS, 300.0 if watched else np.inf)
    panes = np.full(OPENINGS, 2 if watched else 0)
    return Surfaces(np.full(OPENINGS, 90.0), azimuth, before, threshold, panes)


def main() -> None:
    climate = open_climate("Golden CO", Path())
    position = best(lambda: sun_path(climate.site))
    print(f"one series of sun positions: {1000 * position:.1f} ms")
    for planes in (4, 50, 500):
        for watched, words in ((False, "obstructions"), (True, "with movable shading and glass by hour")):
            surfaces = openings(planes, watched=watched)
            took = best(lambda s=surfaces: climate.sunlight(s, 0.2))  # type: ignore[misc]
            print(f"{OPENINGS} in {planes:3} planes, {words}: {1000 * took:6.1f} ms, ratio {took / position:.1f}")


if __name__ == "__main__":
    main()
