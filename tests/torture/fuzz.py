"""Harms workbooks in every way and lets the command calculate them; more cases on demand.

    python -m tests.torture.fuzz --cases 5000 --seed 7

A case passes if the exit status is 0 or 1 without a traceback, within the limits of time and memory; if the status is 1
the workbook is as it was, if it is 0 the workbook opens again and holds every part that it held.
"""

from __future__ import annotations

import argparse
import faulthandler
import gc
import json
import os
import random
import re
import sys
import tempfile
import time
import traceback
import warnings
from collections import Counter
from dataclasses import dataclass, field
from functools import partial
from pathlib import Path

from click.testing import CliRunner, Result

SECONDS = 10.0
"""Longest time of processor that one case may take. [s]"""
MEGABYTES = 1000
"""Most memory that the process may ever hold. [MB]"""
HANGING = 120.0
"""Time on the clock after which a case ends the process and shows where it stood. [s]"""


@dataclass
class Count:
    """What came of the cases."""

    cases: int = 0
    statuses: Counter[int] = field(default_factory=Counter)
    tracebacks: list[str] = field(default_factory=list)
    changed: list[str] = field(default_factory=list)
    unsound: list[str] = field(default_factory=list)
    slow: list[str] = field(default_factory=list)
    last: float = 0.0
    longest: float = 0.0
    peak: int = 0


def harmed(seed: int, number: int, bases: list[bytes]) -> tuple[str, bytes]:
    """Name and bytes of a case: the same for the same seed and number."""
    from tests.torture.mutations import KINDS, draws, unpacked

    chance = random.Random(f"{seed}/{number}")
    kind = chance.choice(list(draws()))
    base = chance.choices(bases, [8] + [1] * (len(bases) - 1))[0]
    return f"case {number} of seed {seed}, {kind}", KINDS[kind][0](chance, unpacked(base))


def large(name: str, base: bytes) -> tuple[str, bytes]:
    """Name and bytes of a workbook that is small on disk and large in memory."""
    from tests.torture.mutations import LARGE_KINDS, unpacked

    return name, LARGE_KINDS[name](random.Random(0), unpacked(base))


def large_names(text: str | None) -> list[str]:
    """Those asked for: ``few`` stands for the ones that are quick to make."""
    from tests.torture.mutations import FEW_LARGE, LARGE_KINDS

    if text == "few":
        return list(FEW_LARGE)
    return [] if text is None else [name for name in LARGE_KINDS if text in name]


def try_case(name: str, data: bytes, folder: Path, count: Count) -> Result:
    """Calculate one workbook and note what is wrong with that."""
    import resource  # Windows has none

    from heatledger.cli import main

    path = folder / "case.xlsx"
    path.write_bytes(data)
    report = ["--report", str(folder / "report.xlsx")] if count.cases % 3 == 0 else []
    before, started = sorted(os.listdir(folder)), time.process_time()
    faulthandler.dump_traceback_later(HANGING, exit=True)
    result = CliRunner().invoke(main, ["run", str(path), *report])
    faulthandler.cancel_dump_traceback_later()
    took = time.process_time() - started
    count.cases += 1
    count.last, count.longest = took, max(count.longest, took)
    count.peak = resource.getrusage(resource.RUSAGE_SELF).ru_maxrss // 1000
    count.statuses[result.exit_code] += 1
    _judge(name, data, path, result, count)
    if took > SECONDS:
        count.slow.append(f"{name}: {took:.1f} s")
    (folder / "report.xlsx").unlink(missing_ok=True)
    if sorted(os.listdir(folder)) != before:
        count.changed.append(f"{name}: files {sorted(os.listdir(folder))}")
    return result


def _judge(name: str, data: bytes, path: Path, result: Result, count: Count) -> None:
    if (
        result.exit_code not in {0, 1}
        or "Traceback" in result.output
        or not isinstance(result.exception, SystemExit | None)
    ):
        shown = "".join(traceback.format_exception(*result.exc_info)) if result.exc_info else result.output
        count.tracebacks.append(f"{name}: exit status {result.exit_code}\n{shown[-3000:]}")
    elif result.exit_code == 1 and not re.search(
        r"\d problems?; (nothing was|no results were) written\.", result.output
    ):
        count.tracebacks.append(f"{name}: no sentence\n{result.output[-3000:]}")
    if result.exit_code == 0:
        flaw = _flaw(data, path)
        if flaw:
            count.unsound.append(f"{name}: {flaw}")
    elif path.read_bytes() != data:
        count.changed.append(name)


def _flaw(data: bytes, path: Path) -> str:
    """What keeps the result from being opened, or what it lost."""
    from tests.torture.mutations import unpacked

    from heatledger.errors import InputError
    from heatledger.workbook.reader import owned_sheets

    try:
        owned = owned_sheets(path)
    except InputError as error:
        return str(error)
    if len(owned) <= 5:
        return f"only {len(owned)} result sheets"
    new = unpacked(path.read_bytes())
    lost = [name for name, part in unpacked(data).items() if new.get(name) != part and not _is_index(name)]
    return f"other parts {lost}" if lost else ""


def _is_index(name: str) -> bool:
    """Whether a part lists the others or holds the formats, which grow, or is a folder, which is no part."""
    return name.endswith((".rels", "[Content_Types].xml", "workbook.xml", "styles.xml", "/"))


def bases(given: list[Path]) -> list[bytes]:
    """The sound workbooks: the first is drawn most often."""
    from heatledger.inputs.prefilled import example_values
    from heatledger.workbook.template import build_template

    return [path.read_bytes() for path in given] or [build_template(example_values())]


def arguments() -> argparse.Namespace:
    parser = argparse.ArgumentParser(description=__doc__, formatter_class=argparse.RawDescriptionHelpFormatter)
    parser.add_argument("base", nargs="*", type=Path, help="sound workbooks to harm; default: the example")
    parser.add_argument("--seed", type=int, default=5)
    parser.add_argument("--first", type=int, default=0, help="number of the first case")
    parser.add_argument("--cases", type=int, default=500)
    parser.add_argument(
        "--large",
        nargs="?",
        const="",
        metavar="TEXT",
        help="then the small files of a large content whose name has TEXT",
    )
    parser.add_argument("--verbose", action="store_true", help="print the outcome of every case")
    parser.add_argument("--json", action="store_true", help="print the count as JSON")
    parser.add_argument("--keep", type=Path, help="keep the harmed workbooks in this folder")
    return parser.parse_args()


def main() -> int:
    chosen = arguments()
    warnings.simplefilter("error")
    sound = bases(chosen.base)
    count = Count()
    numbers = range(chosen.first, chosen.first + chosen.cases)
    cases = [partial(harmed, chosen.seed, number, sound) for number in numbers]
    cases += [partial(large, name, sound[0]) for name in large_names(chosen.large)]
    with tempfile.TemporaryDirectory() as folder:
        for case in cases:
            title, data = case()
            if chosen.keep:
                (chosen.keep / f"{title}.xlsx").write_bytes(data)
            result = try_case(title, data, Path(folder), count)
            if chosen.verbose:
                words = (result.stderr.splitlines() or [""])[0][:200]
                print(f"{title}: {result.exit_code}, {count.last:.1f} s, {count.peak} MB: {words}", flush=True)
            del result  # its traceback holds the whole workbook
            gc.collect()
    print(json.dumps(vars(count)) if chosen.json else told(count))
    return int(bool(count.tracebacks or count.changed or count.unsound or count.slow or count.peak > MEGABYTES))


def told(count: Count) -> str:
    faults = [*count.tracebacks, *count.changed, *count.unsound, *count.slow]
    counted = f"{count.cases} cases, {len(count.tracebacks)} tracebacks, {len(count.changed)} changed inputs"
    more = f"{len(count.unsound)} unsound results, {len(count.slow)} too slow"
    limits = f"longest {count.longest:.1f} s, at most {count.peak} MB, exit statuses {dict(count.statuses)}"
    return "\n".join([*faults, f"{counted}, {more}, {limits}"])


if __name__ == "__main__":
    sys.exit(main())
