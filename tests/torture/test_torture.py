"""Harmed workbooks and killed processes: always a sentence or a result, never a lost file."""

from __future__ import annotations

import contextlib
import json
import os
import subprocess
import sys
from collections import Counter
from datetime import date
from pathlib import Path
from typing import TYPE_CHECKING, Any

import pytest

if TYPE_CHECKING:
    from tests.conftest import Book, Tell

ROOT = Path(__file__).parents[2]
CASES = int(os.environ.get("HEATLEDGER_FUZZ_CASES", "500"))
SEED = int(os.environ.get("HEATLEDGER_FUZZ_SEED", "5"))
LARGE = 7
pytestmark = pytest.mark.skipif(os.name != "posix", reason="Windows has no such limits and signals")


def module(name: str, *arguments: object) -> subprocess.Popen[str]:
    """A script of this folder in a process of its own."""
    command = [sys.executable, "-m", f"tests.torture.{name}", *map(str, arguments)]
    quiet = {**os.environ, "OPENBLAS_NUM_THREADS": "1", "OMP_NUM_THREADS": "1"}
    return subprocess.Popen(command, cwd=ROOT, env=quiet, stdout=subprocess.PIPE, stderr=subprocess.PIPE, text=True)


@pytest.fixture
def house(cottage: Book, tmp_path: Path) -> Path:
    """A sound workbook with a sheet of the user."""
    cottage.sheets["Survey"] = {(1, 1): "Mine", (1, 2): date(2024, 1, 2), (2, 1): 3.5}
    return cottage.save(tmp_path / "house.xlsx")


def test_no_harm_to_a_workbook_does_harm(house: Path, tell: Tell) -> None:
    """Each case: a sentence or sound results, in 10 s and 1 GB, and no workbook changed that was refused."""
    drawn = CASES - LARGE
    half = drawn // 2 + 15  # the large ones take as long as thirty others
    shares = [(0, half, ()), (half, drawn - half, ("--large", "few"))]
    with contextlib.ExitStack() as running:
        workers = [
            running.enter_context(
                module("fuzz", house, "--seed", SEED, "--first", first, "--cases", cases, "--json", *more)
            )
            for first, cases, more in shares
        ]
        for worker in workers:
            running.callback(worker.kill)
        heard = [worker.communicate(timeout=300 + 2 * CASES) for worker in workers]
    assert all(output for output, _ in heard), [errors[-3000:] for _, errors in heard]
    counts: list[dict[str, Any]] = [json.loads(output) for output, _ in heard]
    faults = {
        kind: [fault for count in counts for fault in count[kind]]
        for kind in ("tracebacks", "changed", "unsound", "slow")
    }
    cases, peak = sum(count["cases"] for count in counts), max(count["peak"] for count in counts)
    statuses = sum((Counter(count["statuses"]) for count in counts), Counter[str]())
    tell(
        f"{cases} cases, {len(faults['tracebacks'])} tracebacks, {len(faults['changed'])} changed inputs, "
        f"{len(faults['unsound'])} unsound results (seed {SEED}; {statuses['0']} calculated, {statuses['1']} refused; "
        f"at most {max(count['longest'] for count in counts):.1f} s of processor time and {peak} MB)"
    )
    assert faults == {"tracebacks": [], "changed": [], "unsound": [], "slow": []}
    assert cases == CASES
    assert peak < 1000
    assert min(statuses["0"], statuses["1"]) > CASES / 5  # neither all sound nor all refused


def test_a_kill_at_a_random_moment_leaves_the_old_or_the_new_file(house: Path, tmp_path: Path, tell: Tell) -> None:
    output, errors = module("kill", house, tmp_path, "--kills", 100, "--runs", 30).communicate(timeout=600)
    assert output, errors[-3000:]
    writing, runs = json.loads(output)["writing"], json.loads(output)["runs"]
    broken = writing["broken"] + runs["broken"]
    tell(
        f"100 kills of writing and 30 of whole runs, {broken} broken files ({writing['one']} held the one workbook, "
        f"{writing['other']} the other; {runs['old']} the old, {runs['new']} the new)"
    )
    assert broken == 0
    assert writing["one"] + writing["other"] == 100
    assert runs["old"] + runs["new"] == 30
    assert min(writing["one"], writing["other"]) > 5  # both were met
