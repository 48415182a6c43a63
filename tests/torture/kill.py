"""Kills a process that writes a workbook, at moments drawn at random; the file is always the old or the new one, whole.

python -m tests.torture.kill BASE.xlsx FOLDER --kills 1000 --seed 3
"""

from __future__ import annotations

import argparse
import os
import random
import signal
import time
from collections import Counter
from collections.abc import Callable
from pathlib import Path


def versions(base: Path, folder: Path) -> tuple[bytes, bytes]:
    """The calculated workbook, with and without a picture of 3 MB that makes writing last."""
    from tests.torture.mutations import packed, unpacked

    from heatledger.assess import assess
    from heatledger.workbook.graft import graft
    from heatledger.workbook.result_sheets import build_result_sheets

    first = folder / "first.xlsx"
    graft(base, build_result_sheets(assess(base)), first)
    parts = unpacked(first.read_bytes())
    parts["xl/media/image9.png"] = random.Random(1).randbytes(3_000_000)
    return first.read_bytes(), packed(parts)


def whole(data: bytes, path: Path) -> Callable[[], None]:
    """Writes the file once, verified as a run does."""
    from heatledger.workbook.files import write_whole
    from heatledger.workbook.gate import check_package

    return lambda: write_whole(path, data, check_package)


def killed(actions: list[Callable[[], None]], moment: float) -> None:
    """Repeat the actions in a process of its own until it is killed."""
    ready, go = os.pipe()
    child = os.fork()
    if child == 0:
        try:
            os.write(go, b"x")
            while True:
                for action in actions:
                    action()
        finally:
            os._exit(1)  # only the signal may end it
    os.read(ready, 1)
    time.sleep(moment)
    os.kill(child, signal.SIGKILL)
    _, status = os.waitpid(child, 0)
    os.close(ready)
    os.close(go)
    assert os.WIFSIGNALED(status), "the writer ended by itself"


def main() -> None:
    parser = argparse.ArgumentParser(description=__doc__, formatter_class=argparse.RawDescriptionHelpFormatter)
    parser.add_argument("base", type=Path)
    parser.add_argument("folder", type=Path)
    parser.add_argument("--kills", type=int, default=100)
    parser.add_argument("--seed", type=int, default=8)
    chosen = parser.parse_args()
    both = versions(chosen.base, chosen.folder)
    target, chance = chosen.folder / "target.xlsx", random.Random(chosen.seed)
    actions = [whole(data, target) for data in both]
    started = time.monotonic()
    for action in (*actions, *actions, actions[0]):
        action()
    span = time.monotonic() - started  # both files twice: a moment within may meet either
    found: Counter[str] = Counter()
    for _ in range(chosen.kills):
        killed(actions, chance.uniform(0.0, span))
        found[
            "small" if target.read_bytes() == both[0] else "large" if target.read_bytes() == both[1] else "broken"
        ] += 1
    left = len(list(chosen.folder.glob(".heatledger-*.tmp")))
    print(f"{chosen.kills} kills, {found['broken']} broken files, {dict(found)}, {left} left behind")


if __name__ == "__main__":
    main()
