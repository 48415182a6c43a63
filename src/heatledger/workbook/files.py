"""Writing that never harms the file that is there."""

from __future__ import annotations

import errno
import os
import re
import secrets
import stat
import time
from collections.abc import Callable, Iterator
from contextlib import contextmanager, suppress
from pathlib import Path

from heatledger.errors import InputError, Problem

__all__ = ["create", "lock_notes", "staged", "write_whole"]

_FULL = {errno.ENOSPC, errno.EFBIG, getattr(errno, "EDQUOT", errno.ENOSPC)}
_LEFT_BEHIND = re.compile(r"\.heatledger-[0-9a-f]{16}\.tmp")
_LONG_AGO = 3600.0
"""Age from which a temporary file of ours is left behind. [s]"""
_ELSEWHERE = "give another name with --output"


def create(target: Path, data: bytes, *, force: bool = False) -> None:
    """Write a new workbook; one that is there is kept unless ``force`` is given."""
    if target.exists() and not target.is_dir() and not force:
        fix = "Give another name, or overwrite the file with --force."
        raise InputError([Problem("a file of this name", "a new name", fix, file=target.name)])
    write_whole(target, data, elsewhere="give another name")


def write_whole(
    target: Path, data: bytes, verify: Callable[[Path], object] | None = None, elsewhere: str = _ELSEWHERE
) -> None:
    """Write a file whole or not at all.

    The data go to a new file beside the target, reach the disk, are verified and
    then take the target's place in one step. The target keeps its access rights.

    Parameters
    ----------
    target : Path
        File to write; where it is a link, the file behind it.
    data : bytes
        The whole content.
    verify : callable, optional
        Raises an InputError if the file written beside the target is not sound.
    elsewhere : str
        How the user names another target, for the sentence of a problem.

    Raises
    ------
    InputError
        If the target cannot be written; it is then as it was.
    """
    with staged(target, data, verify, elsewhere):
        pass


@contextmanager
def staged(
    target: Path, data: bytes, verify: Callable[[Path], object] | None = None, elsewhere: str = _ELSEWHERE
) -> Iterator[None]:
    """As :func:`write_whole`, but the data take their place only when the body of the ``with`` has ended well."""
    place = Path(os.path.realpath(target))
    beside = place.parent / f".heatledger-{secrets.token_hex(8)}.tmp"
    try:
        with _told(target, elsewhere):
            _fill(beside, data, verify, _old_status(place))
        yield
        with _told(target, elsewhere):
            os.replace(beside, place)
    finally:
        with suppress(OSError):
            beside.unlink(missing_ok=True)
    _sync_folder(place.parent)
    _remove_left_behind(place.parent)


@contextmanager
def _told(target: Path, elsewhere: str) -> Iterator[None]:
    try:
        yield
    except OSError as error:
        raise InputError([_problem(target, error, elsewhere)]) from error


def lock_notes(target: Path) -> tuple[str, ...]:
    """A sentence for each sign that another program has the target open."""
    signs = (target.parent / f"~${target.name}", target.parent / f".~lock.{target.name}#")
    return tuple(
        f"{target.name} seems to be open in another program (there is a file {sign.name}): "
        "close it there without saving, then open it again."
        for sign in signs
        if _is_there(sign)
    )


def _is_there(path: Path) -> bool:
    try:
        return path.exists()
    except OSError:  # the name is too long
        return False


def _fill(beside: Path, data: bytes, verify: Callable[[Path], object] | None, replaced: os.stat_result | None) -> None:
    with beside.open("xb") as file:
        file.write(data)
        file.flush()
        os.fsync(file.fileno())
    if verify is not None:
        verify(beside)
    if replaced is not None:
        _keep_rights(beside, replaced)


def _remove_left_behind(folder: Path) -> None:
    """Take away what a run that was killed left long ago; a younger file may belong to another run."""
    with suppress(OSError):
        for path in folder.glob(".heatledger-*.tmp"):
            if _LEFT_BEHIND.fullmatch(path.name) and time.time() - path.stat().st_mtime > _LONG_AGO:
                path.unlink()


def _old_status(target: Path) -> os.stat_result | None:
    """Status of the file that is to be replaced, if there is one and it may be."""
    try:
        status = target.stat()
    except FileNotFoundError:
        return None
    if stat.S_ISDIR(status.st_mode):
        raise IsADirectoryError(errno.EISDIR, os.strerror(errno.EISDIR))
    if not stat.S_ISREG(status.st_mode):
        raise OSError(errno.ENODEV, "it is a device, not a file")
    if not status.st_mode & (stat.S_IWUSR | stat.S_IWGRP | stat.S_IWOTH) or not os.access(target, os.W_OK):
        raise PermissionError(errno.EACCES, os.strerror(errno.EACCES))
    return status


def _keep_rights(path: Path, old: os.stat_result) -> None:
    with suppress(OSError, AttributeError):  # Windows has no owners; others may not give files away
        os.chown(path, old.st_uid, old.st_gid)
    path.chmod(stat.S_IMODE(old.st_mode))


def _sync_folder(folder: Path) -> None:
    with suppress(OSError):  # Windows cannot open folders
        handle = os.open(folder, os.O_RDONLY)
        try:
            os.fsync(handle)
        finally:
            os.close(handle)


def _problem(target: Path, error: OSError, elsewhere: str) -> Problem:
    found, expected, fix = _causes(error, elsewhere)
    return Problem(found, expected, fix, file=target.name or str(target))


def _causes(error: OSError, elsewhere: str) -> tuple[str, str, str]:
    other = elsewhere[0].upper() + elsewhere[1:] + "."
    if error.errno in _FULL:
        return "no room left on the disk", "room for the whole workbook", f"Free some space, or {elsewhere}."
    if error.errno == errno.EROFS:
        return "a disk that can only be read", "a disk that can be written", other
    if error.errno == errno.ENAMETOOLONG:
        return "a name that is too long", "a shorter name", other
    if isinstance(error, IsADirectoryError):
        return "a folder", "a file name", other
    if isinstance(error, (FileNotFoundError, NotADirectoryError)):
        return "that its folder does not exist", "an existing folder", f"Make the folder first, or {elsewhere}."
    if isinstance(error, PermissionError):
        found = "that it may not be written (it is open elsewhere, or it or its folder is read-only)"
        return found, "a file that may be written", f"Close the file in your spreadsheet program, or {elsewhere}."
    return f"that it cannot be written ({error.strerror or error})", "a place that can be written", other
