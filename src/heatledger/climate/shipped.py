"""The climates that come with the package; light, since it reads only their heads."""

from __future__ import annotations

from pathlib import Path

from heatledger.places import shipped_folder

__all__ = ["shipped_climates", "shipped_file"]


def shipped_climates() -> tuple[str, ...]:
    """Names of the shipped climates, in alphabetical order.

    >>> "Golden CO" in shipped_climates()
    True
    """
    return tuple(sorted(_files()))


def shipped_file(name: str) -> Path | None:
    """File of a shipped climate, case and outer spaces ignored; None if there is none of that name."""
    wanted = name.strip().casefold()
    return next((path for title, path in _files().items() if title.casefold() == wanted), None)


def _files() -> dict[str, Path]:
    return {_name(path): path for path in shipped_folder("weather").glob("*.csv")}


def _name(path: Path) -> str:
    with path.open(encoding="utf-8") as lines:
        return next(line.partition(":")[2].strip() for line in lines if line.startswith("# Name:"))
