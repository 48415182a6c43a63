"""Kills processes at moments drawn at random; the workbook is always the old or the new one, whole.

    python -m tests.torture.kill BASE.xlsx FOLDER --kills 1000 --runs 200 --seed 3

``--kills`` counts kills of a process that does nothing but write, ``--runs`` kills of whole runs of the command.
"""

from __future__ import annotations

import argparse
import json
import os
import random
import signal
import time
from collections import Counter
from collections.abc import Callable
from itertools import cycle
from pathlib import Path

Action = Callable[[], object]


def killed(act: Action, moment: float) -> None:
    """Act in a process of its own that is killed at a moment, if it has not ended. [s]"""
    ready, go = os.pipe()
    child = os.fork()
    if child == 0:
        try:
            os.write(go, b"x")
            act()
        finally:
            os._exit(0)
    os.read(ready, 1)
    time.sleep(moment)
    os.kill(child, signal.SIGKILL)
    os.waitpid(child, 0)
    os.close(ready)
    os.close(go)


def took(act: Action) -> float:
    """Time of one go. [s]"""
    started = time.monotonic()
    act()
    return time.monotonic() - started


def run(path: Path) -> None:
    """The command on a workbook, in this process."""
    from click.testing import CliRunner

    from heatledger.cli import main

    assert CliRunner().invoke(main, ["run", str(path)]).exit_code == 0


def writing_killed(base: Path, folder: Path, kills: int, chance: random.Random) -> Counter[str]:
    """Kill a process that writes the result with the one and with the other picture of 3 MB, over and over."""
    from tests.torture.mutations import packed, unpacked

    from heatledger.workbook.files import write_whole
    from heatledger.workbook.gate import read_package

    target = folder / "written.xlsx"
    target.write_bytes(base.read_bytes())
    run(target)
    parts = unpacked(target.read_bytes())
    pictures = {"one": random.Random(1).randbytes(3_000_000), "other": random.Random(2).randbytes(3_000_000)}
    versions = {packed(parts | {"xl/media/image9.png": picture}): name for name, picture in pictures.items()}

    def write_all() -> None:
        for data in versions:
            write_whole(target, data, read_package)

    def write_for_ever() -> None:
        for _ in cycle("x"):
            write_all()

    write_all()
    span = 2.5 * took(write_all)
    found = Counter(one=0, other=0, broken=0)
    for _ in range(kills):
        killed(write_for_ever, chance.uniform(0.0, span))
        found[versions.get(target.read_bytes(), "broken")] += 1
    return found


def runs_killed(base: Path, folder: Path, kills: int, chance: random.Random) -> Counter[str]:
    """Kill whole runs of the command in their second half, in which they write."""
    target, old = folder / "run.xlsx", base.read_bytes()
    target.write_bytes(old)
    run(target)
    versions = {old: "old", target.read_bytes(): "new"}
    target.write_bytes(old)
    span = took(lambda: run(target))
    found = Counter(old=0, new=0, broken=0)
    for _ in range(kills):
        target.write_bytes(old)
        killed(lambda: run(target), chance.uniform(0.5, 1.2) * span)
        found[versions.get(target.read_bytes(), "broken")] += 1
    return found


def main() -> None:
    parser = argparse.ArgumentParser(description=__doc__, formatter_class=argparse.RawDescriptionHelpFormatter)
    parser.add_argument("base", type=Path)
    parser.add_argument("folder", type=Path)
    parser.add_argument("--kills", type=int, default=100)
    parser.add_argument("--runs", type=int, default=30)
    parser.add_argument("--seed", type=int, default=8)
    chosen = parser.parse_args()
    chance = random.Random(chosen.seed)
    writing = writing_killed(chosen.base, chosen.folder, chosen.kills, chance)
    runs = runs_killed(chosen.base, chosen.folder, chosen.runs, chance)
    print(json.dumps({"writing": writing, "runs": runs}))


if __name__ == "__main__":
    main()
