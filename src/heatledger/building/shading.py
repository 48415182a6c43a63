"""Obstructions and movable shading in SI units."""

from __future__ import annotations

import csv
from collections.abc import Mapping
from dataclasses import dataclass
from functools import cache
from importlib import resources

from heatledger.inputs.rows import ObstructionRow, ShadingDeviceRow

__all__ = [
    "OPEN",
    "SECTOR_FIELDS",
    "Fabric",
    "Obstruction",
    "ShadingDevice",
    "fabrics",
    "resolve_obstruction",
    "resolve_shading_device",
]

SECTOR_FIELDS = (
    *("horizon_north", "horizon_northeast", "horizon_east", "horizon_southeast"),
    *("horizon_south", "horizon_southwest", "horizon_west", "horizon_northwest"),
)
"""Columns of the skyline, clockwise from north."""


@dataclass(frozen=True)
class Obstruction:
    """What stands before an opening: skyline by sector clockwise from north [°], lengths [m], reflectance [-]."""

    name: str
    skyline: tuple[float, ...]
    overhang_depth: float
    overhang_distance: float
    left_fin_depth: float
    """Left and right as seen from outside."""
    left_fin_distance: float
    right_fin_depth: float
    right_fin_distance: float
    reveal_depth: float
    reflectance: float

    @property
    def near(self) -> bool:
        """Whether it has parts that shade by the size of the opening."""
        return max(self.overhang_depth, self.left_fin_depth, self.right_fin_depth, self.reveal_depth) > 0


OPEN = Obstruction("", (0.0,) * len(SECTOR_FIELDS), 0.0, 0.0, 0.0, 0.0, 0.0, 0.0, 0.0, 0.0)
"""Nothing stands before the opening."""


@dataclass(frozen=True)
class Fabric:
    """A device of the table: absorptance, transmittance, and reduction of g when it hangs inside or outside [-]."""

    absorptance: float
    transmittance: float
    inside: float
    outside: float


@dataclass(frozen=True)
class ShadingDevice:
    """Movable shading: how much of g is left behind it, and when it is drawn."""

    name: str
    reduction: float | None
    """g with the device over g without; None for a fabric between the panes, which depends on the glass. [-]"""
    fabric: Fabric | None
    threshold: float | None
    """Irradiance of the opening's plane above which it is drawn; None: drawn all through its months. [W/m²]"""
    months: tuple[int, ...]
    """In which it is used; 1 is January."""
    in_heating: bool
    in_cooling: bool
    origin: ShadingDeviceRow


@cache
def fabrics() -> Mapping[str, Fabric]:
    """The devices of the table by name.

    >>> fabrics()["white curtain 70 %"].inside
    0.8
    """
    table = resources.files("heatledger") / "data" / "shading_devices.csv"
    lines = [line for line in table.read_text(encoding="utf-8").splitlines() if not line.startswith("#")]
    names = ("absorptance", "transmittance", "inside", "outside")
    return {row["device"]: Fabric(*(float(row[name]) for name in names)) for row in csv.DictReader(lines)}


def resolve_obstruction(row: ObstructionRow) -> Obstruction:
    """The obstruction of a row."""
    return Obstruction(
        row.name,
        tuple(getattr(row, field) for field in SECTOR_FIELDS),
        row.overhang_depth,
        row.overhang_distance,
        row.left_fin_depth,
        row.left_fin_distance,
        row.right_fin_depth,
        row.right_fin_distance,
        row.reveal_depth,
        row.reflectance,
    )


def resolve_shading_device(row: ShadingDeviceRow) -> ShadingDevice:
    """The shading device of a row."""
    fabric = fabrics()[row.device] if row.device else None
    tabulated = {"inside": fabric.inside, "outside": fabric.outside} if fabric else {}
    return ShadingDevice(
        row.name,
        row.reduction_factor if row.reduction_factor is not None else tabulated.get(row.place),
        fabric,
        row.threshold if row.control == "irradiance" else None,
        row.months_used or tuple(range(1, 13)),
        row.used_in_heating == "yes",
        row.used_in_cooling == "yes",
        row,
    )
