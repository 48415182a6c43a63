"""What is said on the terminal, and how."""

from __future__ import annotations

import os
import sys
from collections.abc import Sequence
from dataclasses import dataclass
from pathlib import Path

import click

from heatledger.errors import Problem
from heatledger.listing import listed, sheets_of

__all__ = ["Speaker", "list_problems", "shown", "tell"]


@dataclass(frozen=True)
class Speaker:
    """Says as much as was asked for."""

    quiet: bool
    verbose: bool

    def result(self, line: str) -> None:
        """What was done, on standard output."""
        if not self.quiet:
            click.echo(line)

    def detail(self, line: str) -> None:
        """What was read, written or replaced, where it was asked for."""
        if self.verbose:
            tell(line)

    def progress(self, step: str) -> None:
        """What takes the time, for a person at a terminal."""
        if sys.stderr.isatty() and not self.quiet:
            tell(step)


def tell(line: str) -> None:
    """A line on standard error, in colour only at a terminal and unless NO_COLOR is set."""
    click.echo(line, err=True, color=False if os.environ.get("NO_COLOR") else None)


def list_problems(problems: Sequence[Problem]) -> None:
    """Problems by sheet, the worst first; headings and colour for a person at a terminal."""
    at_terminal = sys.stderr.isatty()
    for sheet, group in sheets_of(listed(problems)):
        if at_terminal and sheet:
            tell(click.style(sheet, bold=True))
        for one in group:
            place, _, rest = str(one.merged).partition(": found ")
            tell(f"{click.style(place, fg='yellow')}: found {rest}")
    count = len(problems)
    tell(f"{count} {'problem' if count == 1 else 'problems'}; nothing was written.")


def shown(path: Path) -> str:
    """A path as seen from the current folder, if it lies below it."""
    try:
        return str(path.resolve().relative_to(Path.cwd()))
    except ValueError:
        return str(path)
