"""What is said on the terminal, and how."""

from __future__ import annotations

import os
import sys
from collections import Counter
from collections.abc import Collection, Iterator, Sequence
from contextlib import contextmanager, suppress
from dataclasses import dataclass, replace
from io import TextIOWrapper
from pathlib import Path
from typing import cast

import click

from heatledger.errors import Problem
from heatledger.listing import listed, sheets_of

__all__ = ["Speaker", "list_problems", "print_any_letter", "shown", "tell", "with_paths"]


@dataclass(frozen=True)
class Speaker:
    """Says as much as was asked for."""

    quiet: bool = False
    verbose: bool = False

    def result(self, line: str) -> None:
        """What was done, on standard output."""
        if not self.quiet:
            click.echo(line)

    def detail(self, line: str) -> None:
        """What was read, written or replaced, where it was asked for."""
        if self.verbose:
            tell(line)

    @contextmanager
    def progress(self, step: str) -> Iterator[None]:
        """What takes the time, for a person at a terminal; the line is gone when it is done."""
        shows = sys.stderr.isatty() and not self.quiet
        if shows:
            click.echo(f"{step} ...", err=True, nl=False)
        try:
            yield
        finally:
            if shows:
                click.echo(f"\r{' ' * (len(step) + 4)}\r", err=True, nl=False)


def print_any_letter() -> None:
    """Letters that the terminal does not know are printed as question marks, not refused."""
    with suppress(AttributeError):  # not every stream can be set
        cast("TextIOWrapper", sys.stdout).reconfigure(errors="replace")


def tell(line: str) -> None:
    """A line on standard error, in colour only at a terminal and unless NO_COLOR is set."""
    click.echo(line, err=True, color=False if os.environ.get("NO_COLOR") else None)


def list_problems(problems: Sequence[Problem], outcome: str = "nothing was written") -> None:
    """Problems by sheet, the worst first; headings and colour for a person at a terminal."""
    at_terminal = sys.stderr.isatty()
    for sheet, group in sheets_of(listed(problems)):
        if at_terminal and sheet:
            tell(click.style(sheet, bold=True))
        for one in group:
            place, _, rest = str(one.merged).partition(": found ")
            tell(f"{click.style(place, fg='yellow')}: found {rest}")
    count = len(problems)
    tell(f"{count} {'problem' if count == 1 else 'problems'}; {outcome}.")


def with_paths(problems: Sequence[Problem], paths: Collection[Path]) -> list[Problem]:
    """Problems of files that were given on the command line, named as seen from the current folder."""
    names = Counter(path.name for path in paths)
    by_name = {path.name: shown(path) for path in paths if names[path.name] == 1}
    return [replace(problem, file=by_name.get(problem.file, problem.file)) for problem in problems]


def shown(path: Path) -> str:
    """A path as seen from the current folder, if it lies below it."""
    try:
        return str(path.resolve().relative_to(Path.cwd()))
    except ValueError:
        return str(path)
