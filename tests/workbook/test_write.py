from __future__ import annotations

import errno
import os
import random
import signal
import stat
import subprocess
import sys
import textwrap
import time
from collections.abc import Callable, Iterator
from pathlib import Path

import pytest

from heatledger.errors import InputError, Problem
from heatledger.workbook.files import create, lock_notes, write_whole

CLOSE = "Close the file in your spreadsheet program, or give another name with --output."
LOCKED = (
    "book.xlsx: found that it may not be written (it is open elsewhere, or it or its folder is read-only); "
    f"expected a file that may be written. {CLOSE}"
)


posix = pytest.mark.skipif(os.name != "posix", reason="Windows has no such rights, links and signals")


@pytest.fixture
def target(tmp_path: Path) -> Iterator[Path]:
    """A file that is there, alone in its folder before and after."""
    path = tmp_path / "book.xlsx"
    path.write_bytes(b"old")
    yield path
    assert [name for name in os.listdir(tmp_path) if name.endswith(".tmp")] == []


def refusal(action: Callable[[], object]) -> str:
    with pytest.raises(InputError) as caught:
        action()
    assert len(caught.value.problems) == 1
    return str(caught.value)


@posix
def test_the_file_is_replaced_and_keeps_its_rights(target: Path) -> None:
    target.chmod(0o640)
    write_whole(target, b"new")
    assert target.read_bytes() == b"new"
    assert stat.S_IMODE(target.stat().st_mode) == 0o640


@posix
def test_a_new_file_gets_the_usual_rights(target: Path) -> None:
    new, usual = target.with_name("new.xlsx"), target.with_name("usual")
    usual.write_bytes(b"")
    write_whole(new, b"new")
    assert new.stat().st_mode == usual.stat().st_mode


@posix
def test_a_link_stays_a_link(target: Path) -> None:
    link = target.with_name("link.xlsx")
    link.symlink_to(target.name)
    write_whole(link, b"new")
    assert link.is_symlink()
    assert target.read_bytes() == b"new"
    target.unlink()
    write_whole(link, b"newer")
    assert link.is_symlink()
    assert target.read_bytes() == b"newer"


def test_what_is_not_verified_is_not_written(target: Path) -> None:
    problem = Problem("nonsense", "sense", "Think.", file="book.xlsx")
    seen: list[bytes] = []

    def verify(path: Path) -> None:
        seen.append(path.read_bytes())
        raise InputError([problem])

    assert refusal(lambda: write_whole(target, b"new", verify)) == str(problem)
    assert seen == [b"new"]
    assert target.read_bytes() == b"old"


@pytest.mark.parametrize("step", ["fsync", "replace", "chmod"])
@pytest.mark.parametrize(
    ("code", "sentence"),
    [
        (errno.EACCES, LOCKED),
        (errno.EPERM, LOCKED),
        (
            errno.EROFS,
            "book.xlsx: found a disk that can only be read; expected a disk that can be written. "
            "Give another name with --output.",
        ),
        (
            errno.ENOSPC,
            "book.xlsx: found no room left on the disk; expected room for the whole workbook. "
            "Free some space, or give another name with --output.",
        ),
        (
            errno.EIO,
            "book.xlsx: found that it cannot be written (Input/output error); expected a place that can be written. "
            "Give another name with --output.",
        ),
    ],
)
def test_a_failing_step_leaves_the_file_as_it_was(
    target: Path, monkeypatch: pytest.MonkeyPatch, step: str, code: int, sentence: str
) -> None:
    def fail(*_arguments: object, **_options: object) -> None:
        raise OSError(code, os.strerror(code))

    monkeypatch.setattr(Path if step == "chmod" else os, step, fail)
    assert refusal(lambda: write_whole(target, b"new")) == sentence
    assert target.read_bytes() == b"old"


def test_an_interrupt_leaves_the_file_as_it_was(target: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    def interrupt(*_arguments: object) -> None:
        raise KeyboardInterrupt

    monkeypatch.setattr(os, "fsync", interrupt)
    with pytest.raises(KeyboardInterrupt):
        write_whole(target, b"new")
    assert target.read_bytes() == b"old"


def test_a_read_only_file_is_not_replaced(target: Path) -> None:
    target.chmod(0o444)
    assert refusal(lambda: write_whole(target, b"new")) == LOCKED
    assert target.read_bytes() == b"old"


def test_a_folder_is_no_target(tmp_path: Path) -> None:
    (tmp_path / "jobs").mkdir()
    assert refusal(lambda: write_whole(tmp_path / "jobs", b"new")) == (
        "jobs: found a folder; expected a file name. Give another name with --output."
    )
    for nameless in (Path("/"), Path()):
        assert lock_notes(nameless) == ()
        assert refusal(lambda: write_whole(nameless, b"new")) == (  # noqa: B023
            f"{nameless}: found a folder; expected a file name. Give another name with --output."
        )


@posix
def test_a_device_is_no_target(tmp_path: Path) -> None:
    """Whoever may write everywhere would else put a file in the place of /dev/null."""
    pipe = tmp_path / "pipe"
    os.mkfifo(pipe)
    assert refusal(lambda: write_whole(pipe, b"new")) == (
        "pipe: found that it cannot be written (it is a device, not a file); expected a place that can be written. "
        "Give another name with --output."
    )
    assert stat.S_ISFIFO(pipe.stat().st_mode)


@posix
@pytest.mark.parametrize("folder", ["none", "book.xlsx"])
def test_a_missing_folder_is_told(target: Path, folder: str) -> None:
    assert refusal(lambda: write_whole(target.parent / folder / "new.xlsx", b"new")) == (
        "new.xlsx: found that its folder does not exist; expected an existing folder. "
        "Make the folder first, or give another name with --output."
    )


@posix
def test_a_long_name_is_told(target: Path) -> None:
    name = "n" * 300
    assert refusal(lambda: write_whole(target.with_name(name), b"new")) == (
        f"{name}: found a name that is too long; expected a shorter name. Give another name with --output."
    )


def test_a_full_disk_leaves_the_file_as_it_was(target: Path) -> None:
    resource = pytest.importorskip("resource")
    old = resource.getrlimit(resource.RLIMIT_FSIZE)
    resource.setrlimit(resource.RLIMIT_FSIZE, (100_000, old[1]))
    try:
        sentence = refusal(lambda: write_whole(target, bytes(1_000_000)))
    finally:
        resource.setrlimit(resource.RLIMIT_FSIZE, old)
    assert sentence == (
        "book.xlsx: found no room left on the disk; expected room for the whole workbook. "
        "Free some space, or give another name with --output."
    )
    assert target.read_bytes() == b"old"


# Killed in the middle


def killed(target: Path, patch: str) -> int:
    """Exit code of a process that dies while it writes."""
    program = f"""
        import os, signal, sys
        from pathlib import Path
        from heatledger.workbook import files
        def die(*_arguments, **_options):
            os.kill(os.getpid(), signal.SIGKILL)
        {patch}
        files.write_whole(Path(sys.argv[1]), b"new" * 1_000_000, verify)
    """
    arguments = [sys.executable, "-c", textwrap.dedent(program), str(target)]
    return subprocess.run(arguments, check=False, timeout=60).returncode


@posix
@pytest.mark.parametrize(
    ("patch", "survivor"),
    [
        ("os.fsync = die; verify = None", b"old"),
        ("verify = die", b"old"),
        ("Path.chmod = die; verify = None", b"old"),
        ("os.replace = die; verify = None", b"old"),
        ("files._sync_folder = die; verify = None", b"new" * 1_000_000),
    ],
)
def test_a_kill_leaves_a_whole_file(tmp_path: Path, patch: str, survivor: bytes) -> None:
    path = tmp_path / "book.xlsx"
    path.write_bytes(b"old")
    assert killed(path, patch) == -signal.SIGKILL
    assert path.read_bytes() == survivor


@posix
def test_a_kill_at_any_moment_leaves_a_whole_file(tmp_path: Path) -> None:
    path = tmp_path / "book.xlsx"
    versions = (bytes([65]) * 3_000_000, bytes([66]) * 3_000_000)
    path.write_bytes(versions[0])
    program = """
        import sys
        from pathlib import Path
        from heatledger.workbook.files import write_whole
        print("ready", flush=True)
        while True:
            for letter in (65, 66):
                write_whole(Path(sys.argv[1]), bytes([letter]) * 3_000_000)
    """
    chance = random.Random(12)
    for _ in range(8):
        arguments = [sys.executable, "-c", textwrap.dedent(program), str(path)]
        with subprocess.Popen(arguments, stdout=subprocess.PIPE) as process:
            assert process.stdout is not None
            process.stdout.readline()
            time.sleep(chance.uniform(0, 0.05))
            process.kill()
        assert path.read_bytes() in versions


def test_what_a_killed_run_left_behind_goes_after_an_hour(tmp_path: Path) -> None:
    old, young, foreign = (
        tmp_path / f".heatledger-{name}.tmp" for name in ("0123456789abcdef", "fedcba9876543210", "notes of mine")
    )
    for path, age in ((old, 3700), (young, 60), (foreign, 9000)):
        path.write_bytes(b"half")
        os.utime(path, (time.time() - age,) * 2)
    write_whole(tmp_path / "book.xlsx", b"new")
    assert sorted(tmp_path.iterdir()) == sorted([young, foreign, tmp_path / "book.xlsx"])


# A fresh workbook


def test_a_new_workbook_is_written(tmp_path: Path) -> None:
    create(tmp_path / "new.xlsx", b"template")
    assert (tmp_path / "new.xlsx").read_bytes() == b"template"


def test_a_workbook_that_is_there_is_kept_unless_forced(target: Path) -> None:
    assert refusal(lambda: create(target, b"template")) == (
        "book.xlsx: found a file of this name; expected a new name. "
        "Give another name, or overwrite the file with --force."
    )
    assert target.read_bytes() == b"old"
    create(target, b"template", force=True)
    assert target.read_bytes() == b"template"


def test_a_new_workbook_is_not_told_of_options_it_lacks(target: Path) -> None:
    target.chmod(0o444)
    assert refusal(lambda: create(target, b"template", force=True)) == LOCKED.replace(" with --output", "")
    assert refusal(lambda: create(target.parent, b"template")).endswith("expected a file name. Give another name.")


# Open elsewhere


@pytest.mark.parametrize("sign", ["~$book.xlsx", ".~lock.book.xlsx#"])
def test_lock_files_are_noticed(target: Path, sign: str) -> None:
    assert lock_notes(target) == ()
    target.with_name(sign).touch()
    assert lock_notes(target) == (
        f"book.xlsx seems to be open in another program (there is a file {sign}): "
        "close it there without saving, then open it again.",
    )


def test_a_name_too_long_for_lock_files_has_none(target: Path) -> None:
    assert lock_notes(target.with_name("n" * 255)) == ()
