"""How the commands behave at a terminal and in a pipe: what is said, where, and how they end."""

from __future__ import annotations

import os
import shlex
import subprocess
import sys
from contextlib import suppress
from pathlib import Path

import pytest
from click.testing import CliRunner, Result
from openpyxl import load_workbook

from heatledger.cli import main


def invoke(*arguments: str | Path) -> Result:
    return CliRunner().invoke(main, [str(argument) for argument in arguments])


@pytest.fixture(scope="module")
def example(tmp_path_factory: pytest.TempPathFactory) -> Path:
    path = tmp_path_factory.mktemp("terminal") / "example.xlsx"
    assert invoke("new", path, "--example").exit_code == 0
    return path


def test_help_keeps_the_lines_of_examples_and_tells_the_exit_status() -> None:
    told = invoke("run", "--help").output
    assert "  Example:\n    heatledger run house.xlsx\n" in told
    for command in ((), ("run",), ("check",)):
        words = " ".join(invoke(*command, "--help").output.split())
        assert words.endswith(
            "Exit status: 0 done; 1 the workbook or the weather has problems, all of them listed, and nothing was "
            "written; 2 wrong use of the command; 130 stopped with Ctrl+C."
        )


def test_a_report_of_no_problems_is_not_written(tmp_path: Path, example: Path) -> None:
    report = tmp_path / "report.xlsx"
    result = invoke("check", example, "--report", report)
    assert result.output.splitlines()[-1] == "No report was written: there are no problems."
    assert invoke("check", example, "--report", report, "--quiet").output == ""
    assert not report.exists()


def test_a_second_report_replaces_the_first(tmp_path: Path, example: Path) -> None:
    path = _with_problems(example, tmp_path / "house.xlsx")
    first, second = tmp_path / "first.xlsx", tmp_path / "second.xlsx"
    for source, report in ((path, first), (path, first), (first, second)):
        told = invoke("check", source, "--report", report).stderr.splitlines()
        assert told[-2:] == [
            "1 problem; no results were written.",
            f"Wrote {report}: a copy with a sheet Problems.",
        ]
    assert [name for name in load_workbook(second).sheetnames if "Problems" in name] == ["Problems"]


def test_problems_name_the_file_as_it_was_given(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    (tmp_path / "below").mkdir()
    monkeypatch.chdir(tmp_path / "below")
    missing = " found no such file; expected an .xlsx or .xlsm workbook. Check the name and the folder, "
    for given, told in (("deep/house.xlsx", "deep/house.xlsx"), ("../house.xlsx", "../house.xlsx")):
        assert invoke("check", given).stderr.splitlines()[0] == (
            f"{told}:{missing}or make a workbook with: heatledger new NAME.xlsx"
        )


def test_what_is_stopped_says_so_and_leaves_nothing(
    tmp_path: Path, example: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    def stop(*_: object, **__: object) -> None:
        raise KeyboardInterrupt

    monkeypatch.setattr("heatledger.workbook.graft.write_whole", stop)
    result = invoke("run", example, "--output", tmp_path / "out.xlsx")
    assert (result.exit_code, result.stderr) == (130, "Stopped. No file was left half written.\n")
    assert list(tmp_path.iterdir()) == []


@pytest.mark.parametrize("encoding", ["ascii", "cp437", "latin-1"])
def test_letters_unknown_to_the_terminal_are_no_obstacle(encoding: str) -> None:
    told = run([sys.executable, "-m", "heatledger", "weather", "show", "Piedmont IT"], encoding)
    assert told.returncode == 0
    assert told.stderr == b""
    assert b"PVGIS typical year" in told.stdout


def test_a_closed_pipe_ends_without_a_trace() -> None:
    command = f"{shlex.quote(sys.executable)} -m heatledger weather show 'Piedmont IT' | head -n 1"
    told = run(["sh", "-c", command], "utf-8")
    assert told.stdout.count(b"\n") == 1
    assert told.stderr == b""


def run(command: list[str], encoding: str) -> subprocess.CompletedProcess[bytes]:
    return subprocess.run(
        command, capture_output=True, check=False, env={**os.environ, "PYTHONIOENCODING": encoding}, timeout=120
    )


@pytest.mark.skipif(sys.platform == "win32", reason="pseudo-terminals are of Unix")
def test_progress_shows_at_a_terminal_and_is_erased(tmp_path: Path, example: Path) -> None:
    target = tmp_path / "out.xlsx"
    told = at_terminal("run", example, "--output", target)
    for step in ("Reading and calculating ...", "Writing the result sheets ..."):
        assert f"{step}\r{' ' * len(step)}\r" in told
    assert at_terminal("check", example).startswith("Reading ...\r           \r")
    assert at_terminal("run", example, "--output", target, "--quiet") == ""


@pytest.mark.skipif(sys.platform == "win32", reason="pseudo-terminals are of Unix")
def test_colours_stand_at_a_terminal_only(tmp_path: Path, example: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    path = _with_problems(example, tmp_path / "house.xlsx")
    assert "\x1b[1mOpenings\x1b[0m" in at_terminal("check", path)
    monkeypatch.setenv("NO_COLOR", "1")
    plain = at_terminal("check", path)
    assert "\x1b" not in plain
    assert "Openings\r\nOpenings!E6  Width [m]: found the text '1,2'" in plain
    monkeypatch.delenv("NO_COLOR")
    piped = run([sys.executable, "-m", "heatledger", "check", str(path)], "utf-8")
    assert piped.stderr.startswith(b"Openings!E6  Width [m]: found")


def at_terminal(*arguments: object) -> str:
    """What a command prints where a person sits."""
    import pty

    here, there = pty.openpty()
    with subprocess.Popen(
        [sys.executable, "-m", "heatledger", *map(str, arguments)], stdout=there, stderr=there, stdin=there
    ):
        os.close(there)
        pieces = []
        with suppress(OSError):  # the end of a pseudo-terminal
            while piece := os.read(here, 10_000):
                pieces.append(piece)
    os.close(here)
    return b"".join(pieces).decode()


def _with_problems(example: Path, path: Path) -> Path:
    book = load_workbook(example)
    book["Openings"]["E6"] = "1,2"
    book.save(path)
    return path
