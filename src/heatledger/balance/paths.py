"""Every way heat can take out of a zone: a coefficient and the temperature behind it."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from typing import TYPE_CHECKING

import numpy as np

from heatledger.balance.constructions import Constructions
from heatledger.building.model import Building, Element

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


def heat_paths(building: Building, constructions: Constructions, outdoor: Months) -> tuple[HeatPath, ...]:
    """All transmission paths of all zones.

    Parameters
    ----------
    building : Building
        The building.
    constructions : Constructions
        U-values and ground couplings.
    outdoor : ndarray, shape (12,)
        Monthly outdoor temperature. [°C]

    Returns
    -------
    tuple of HeatPath
        A partition between two zones stands twice, once seen from either side.
    """
    index = {zone.name: number for number, zone in enumerate(building.zones)}
    paths: list[HeatPath] = []
    for element in building.elements:
        paths += _element_paths(element, constructions, index, outdoor)
    for floor in building.ground_floors:
        ground = constructions.ground[floor.name]
        temperature = ground.temperature
        zone = index[floor.zone]
        paths.append(
            HeatPath(
                zone,
                floor.name,
                "ground floor",
                "ground",
                floor.area,
                ground.u_value,
                ground.coefficient,
                None,
                temperature,
            )
        )
    for bridge in building.thermal_bridges:
        zone = index[bridge.zone]
        paths.append(
            HeatPath(zone, bridge.name, "thermal bridge", "outdoors", None, None, bridge.coefficient, None, outdoor)
        )
    return tuple(paths)


def _element_paths(
    element: Element, constructions: Constructions, index: dict[str, int], outdoor: Months
) -> Iterator[HeatPath]:
    """The element without its openings, and each of its openings; from both sides if a zone is behind."""
    if element.faces in {"neighbour", element.zone}:
        return
    u_value = constructions.u_values[element.name]
    parts = [(element.name, element.kind, element.net_area, u_value)]
    parts += [(opening.name, "opening", opening.area, opening.glazed_unit.u_value) for opening in element.openings]
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
