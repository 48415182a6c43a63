"""Where the files shipped beside the code lie."""

from __future__ import annotations

from pathlib import Path
from typing import Literal

__all__ = ["shipped_folder"]


def shipped_folder(name: Literal["templates", "weather"]) -> Path:
    """Folder of shipped files: inside an installed package, at the top of a checkout.

    >>> shipped_folder("weather").name
    'weather'
    """
    package = Path(__file__).resolve().parent
    installed = package / name
    return installed if installed.is_dir() else package.parents[1] / name
