"""Every way heat can take out of a zone: a coefficient and the temperature behind it."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import dataclass
from functools import partial
from typing import TYPE_CHECKING

import numpy as np

from heatledger.balance.constructions import Constructions
from heatledger.balance.ground import GroundCoupling
from heatledger.building.model import Building, Element, GroundFloor, ThermalBridge

if TYPE_CHECKING:
    from heatledger.results import Months

__all__ = ["HeatPath", "heat_paths"]


@dataclass(frozen=True)
class HeatPath:
    """One heat path of a zone, seen from that zone."""

    zone: int
    """Index of the zone."""
    name: str
    kind: str
    faces: str
    area: float | None
    """[m²]"""
    u_value: float | None
    """[W/(m²·K)]"""
    coefficient: float
    """H. [W/K]"""
    other: int | None = None
    """Index of the zone behind, if a zone is behind."""
    temperature: Months | None = None
    """Monthly temperature behind, where it is known beforehand. [°C]"""


def heat_paths(
    building: Building, constructions: Constructions, ground: Mapping[str, GroundCoupling], outdoor: Months
) -> tuple[HeatPath, ...]:
    """All transmission paths of all zones.

    Parameters
    ----------
    building : Building
        The building.
    constructions : Constructions
        U-values.
    ground : mapping of str to GroundCoupling
        By ground floor name.
    outdoor : ndarray, shape (12,)
        Monthly outdoor temperature. [°C]

    Returns
    -------
    tuple of HeatPath
        A partition or thermal bridge between two zones stands twice, once seen from either side.
    """
    index = {zone.name: number for number, zone in enumerate(building.zones)}
    paths: list[HeatPath] = []
    for element in building.elements:
        paths += _element_paths(element, constructions, index, outdoor)
    paths += [_ground_path(floor, index[floor.zone], ground[floor.name]) for floor in building.ground_floors]
    for bridge in building.thermal_bridges:
        paths += _bridge_paths(bridge, index, outdoor)
    return tuple(paths)


def _ground_path(floor: GroundFloor, zone: int, coupling: GroundCoupling) -> HeatPath:
    return HeatPath(
        zone,
        floor.name,
        "ground floor",
        "ground",
        coupling.area,
        coupling.u_value,
        coupling.coefficient,
        None,
        coupling.temperature,
    )


def _bridge_paths(bridge: ThermalBridge, index: dict[str, int], outdoor: Months) -> Iterator[HeatPath]:
    """The bridge; from both sides if a zone is behind."""
    here, there = index[bridge.zone], index.get(bridge.faces)
    temperature = outdoor if there is None else None
    seen = partial(HeatPath, name=bridge.name, kind="thermal bridge", area=None, u_value=None)
    yield seen(zone=here, faces=bridge.faces, coefficient=bridge.coefficient, other=there, temperature=temperature)
    if there is not None:
        yield seen(zone=there, faces=bridge.zone, coefficient=bridge.coefficient, other=here)


def _element_paths(
    element: Element, constructions: Constructions, index: dict[str, int], outdoor: Months
) -> Iterator[HeatPath]:
    """The element without its openings, and each of its openings; from both sides if a zone is behind."""
    if element.faces in {"neighbour", element.zone}:
        return
    u_value = constructions.u_values[element.name]
    parts = [(element.name, element.kind, element.net_area, u_value)]
    parts += [
        (opening.name, "opening", opening.area, constructions.openings[opening.name].u_value)
        for opening in element.openings
    ]
    here = index[element.zone]
    for name, kind, area, u in parts:
        if element.faces_outdoors:
            yield HeatPath(here, name, kind, "outdoors", area, u, u * area, None, outdoor)
            continue
        there = index[element.faces]
        yield HeatPath(here, name, kind, element.faces, area, u, u * area, there)
        yield HeatPath(there, name, kind, element.zone, area, u, u * area, here)


def transfer(path: HeatPath, temperatures: np.ndarray, hours: Months) -> Months:
    """Heat that leaves the zone along a path in each month.

    Parameters
    ----------
    path : HeatPath
        The path.
    temperatures : ndarray, shape (zones, 12)
        Temperature of every zone. [°C]
    hours : ndarray, shape (12,)
        Hours of the months. [h]

    Returns
    -------
    ndarray, shape (12,)
        [kWh]
    """
    behind = temperatures[path.other] if path.temperature is None else path.temperature
    return np.asarray(path.coefficient * (temperatures[path.zone] - behind) * hours / 1000)
