"""Full disks, missing rights, files that others hold: a sentence, and the workbook as it was."""

from __future__ import annotations

import os
import shutil
import subprocess
import sys
import tempfile
import textwrap
from collections.abc import Iterator
from pathlib import Path
from typing import TYPE_CHECKING

import pytest
from click.testing import CliRunner

from heatledger.cli import main

if TYPE_CHECKING:
    from tests.conftest import Book

posix = pytest.mark.skipif(os.name != "posix", reason="Windows has no such limits and rights")


@pytest.fixture
def house(cottage: Book, tmp_path: Path) -> Path:
    """A sound workbook, alone in its folder."""
    return cottage.save(tmp_path / "house.xlsx")


FULL = (
    "house.xlsx: found no room left on the disk; expected room for the whole workbook. "
    "Free some space, or give another name with --output.\n1 problem; nothing was written.\n"
)
LOCKED = (
    "house.xlsx: found that it may not be written (it is open elsewhere, or it or its folder is read-only); "
    "expected a file that may be written. Close the file in your spreadsheet program, or give another name with "
    "--output.\n1 problem; nothing was written.\n"
)
UNREADABLE = (
    "house.xlsx: found a file that may not be read; expected a file you may read. "
    "Close it in other programs, or ask its owner for the right to read it.\n1 problem; nothing was written.\n"
)


def run_as(program: str, path: Path, warm: Path) -> tuple[int, str]:
    """Exit status and sentences of a run in a process in which a program sets limits first."""
    text = f"""
        import os, shutil, sys, tempfile
        from pathlib import Path
        from click.testing import CliRunner
        from heatledger.cli import main
        path = Path(sys.argv[1])
        with tempfile.TemporaryDirectory() as folder:  # imports what a run needs while all may be read
            shutil.copy(sys.argv[2], Path(folder) / "warm.xlsx")
            assert CliRunner().invoke(main, ["run", str(Path(folder) / "warm.xlsx")]).exit_code == 0
        {program}
        main(["run", str(path)])
    """
    command = [sys.executable, "-c", textwrap.dedent(text), str(path), str(warm)]
    done = subprocess.run(command, capture_output=True, text=True, check=False, timeout=120)
    return done.returncode, done.stderr


@pytest.fixture
def small_disk(tmp_path: Path) -> Iterator[Path | None]:
    """A disk of 64 KB, if this user may make one."""
    folder = tmp_path / "disk"
    folder.mkdir()
    mount = shutil.which("mount")
    options = [mount or "", "-t", "tmpfs", "-o", "size=64k", "tmpfs", str(folder)]
    made = bool(mount) and subprocess.run(options, capture_output=True, check=False).returncode == 0
    yield folder if made else None
    if made:
        subprocess.run(["umount", str(folder)], check=True)


@posix
def test_a_full_disk_is_told(house: Path, small_disk: Path | None) -> None:
    before = house.read_bytes()
    if small_disk:
        path = Path(shutil.copy(house, small_disk))
        result = CliRunner().invoke(main, ["run", str(path)])
        found = result.exit_code, result.stderr
    else:
        path = house
        found = run_as("import resource; resource.setrlimit(resource.RLIMIT_FSIZE, (20_000, 20_000))", path, house)
    assert found == (1, f"{path.parent}{os.sep}{FULL}")
    assert path.read_bytes() == before
    assert [name for name in os.listdir(path.parent) if name.endswith(".tmp")] == []


@posix
@pytest.mark.parametrize(
    ("of_file", "of_folder", "sentence"),
    [(0o644, 0o555, LOCKED), (0o444, 0o777, LOCKED), (0o000, 0o777, UNREADABLE), (0o644, 0o000, UNREADABLE)],
    ids=["read-only folder", "read-only file", "unreadable file", "closed folder"],
)
def test_missing_rights_are_told(house: Path, of_file: int, of_folder: int, sentence: str) -> None:
    before = house.read_bytes()
    with tempfile.TemporaryDirectory() as name:  # the folders of pytest are closed to other users
        os.chmod(name, 0o755)
        folder = Path(name) / "jobs"
        folder.mkdir()
        path = Path(shutil.copy(house, folder))
        path.chmod(of_file)
        folder.chmod(of_folder)
        try:
            other = "if os.geteuid() == 0: os.setgroups([]); os.setegid(65534); os.seteuid(65534)"
            assert run_as(other, path, house) == (1, f"{folder}{os.sep}{sentence}")
        finally:
            folder.chmod(0o755)
        path.chmod(0o644)
        assert path.read_bytes() == before
        assert os.listdir(folder) == ["house.xlsx"]


@pytest.mark.parametrize("step", ["replace", "open"])
def test_a_file_that_another_program_holds_is_told(house: Path, monkeypatch: pytest.MonkeyPatch, step: str) -> None:
    """As Windows refuses it: at the last step, or already when it is read."""
    before = house.read_bytes()

    def refuse(*_arguments: object, **_options: object) -> None:
        raise PermissionError(13, "The process cannot access the file because it is being used by another process")

    with monkeypatch.context() as patched:
        patched.setattr(os if step == "replace" else Path, step, refuse)
        result = CliRunner().invoke(main, ["run", str(house)])
    sentence = LOCKED if step == "replace" else UNREADABLE
    assert (result.exit_code, result.stderr) == (1, f"{house.parent}{os.sep}{sentence}")
    assert house.read_bytes() == before
    assert os.listdir(house.parent) == ["house.xlsx"]
