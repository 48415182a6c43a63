"""Full disks, missing rights, files that others hold: a sentence, and the workbook as it was."""

from __future__ import annotations

import os
import shutil
import subprocess
import sys
from collections.abc import Iterator, Sequence
from pathlib import Path
from typing import TYPE_CHECKING

import pytest
from click.testing import CliRunner

from heatledger.cli import main
from heatledger.workbook.reader import owned_sheets

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


def calculated(path: Path, first: str = "", prefix: Sequence[str] = ()) -> tuple[int, str]:
    """Exit status and sentences of a run in a process of its own, which sets limits first."""
    program = f"import sys; from heatledger.cli import main; {first or 'pass'}; main(['run', sys.argv[1]])"
    command = [*prefix, sys.executable, "-c", program, str(path)]
    done = subprocess.run(command, capture_output=True, text=True, check=False, timeout=120)
    return done.returncode, done.stderr


@pytest.fixture(scope="module")
def as_others() -> Sequence[str]:
    """Begins a command that has no more rights than files give to their owner; those of root know none."""
    if os.geteuid():
        return ()
    prefix = ("setpriv", "--bounding-set=-dac_override,-dac_read_search")
    if not shutil.which("setpriv") or subprocess.run([*prefix, "true"], capture_output=True, check=False).returncode:
        pytest.skip("root cannot give up its rights here")
    return prefix


@pytest.fixture
def small_disk(tmp_path: Path) -> Iterator[Path]:
    """A disk of 64 KB."""
    folder = tmp_path / "disk"
    folder.mkdir()
    mount = shutil.which("mount")
    options = [mount or "", "-t", "tmpfs", "-o", "size=64k", "tmpfs", str(folder)]
    if not mount or subprocess.run(options, capture_output=True, check=False).returncode:
        pytest.skip("this user may make no small disk")
    yield folder
    subprocess.run(["umount", str(folder)], check=True)


def test_a_full_disk_is_told(house: Path, small_disk: Path) -> None:
    before = house.read_bytes()
    path = Path(shutil.copy(house, small_disk))
    assert calculated(path) == (1, f"{small_disk}{os.sep}{FULL}")
    assert path.read_bytes() == before
    assert os.listdir(small_disk) == ["house.xlsx"]


@posix
def test_a_full_disk_for_temporary_files_is_no_obstacle(house: Path) -> None:
    assert calculated(house, "import tempfile; tempfile.tempdir = '/no/such/folder'") == (0, "")
    assert len(owned_sheets(house)) == 7


@posix
@pytest.mark.parametrize(
    ("of_file", "of_folder", "sentence"),
    [(0o644, 0o555, LOCKED), (0o444, 0o777, LOCKED), (0o000, 0o777, UNREADABLE), (0o644, 0o000, UNREADABLE)],
    ids=["read-only folder", "read-only file", "unreadable file", "closed folder"],
)
def test_missing_rights_are_told(
    house: Path, as_others: Sequence[str], of_file: int, of_folder: int, sentence: str
) -> None:
    before = house.read_bytes()
    house.chmod(of_file)
    house.parent.chmod(of_folder)
    try:
        assert calculated(house, prefix=as_others) == (1, f"{house.parent}{os.sep}{sentence}")
    finally:
        house.parent.chmod(0o755)
    house.chmod(0o644)
    assert house.read_bytes() == before
    assert os.listdir(house.parent) == ["house.xlsx"]


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
