"""Internal heat capacity of every zone."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from heatledger.balance.constructions import Construction, Constructions
from heatledger.building.model import Building, Zone
from heatledger.standards.iso13786 import areal_capacity, dynamic_properties
from heatledger.standards.iso13790 import CAPACITY_CLASSES

__all__ = ["face_capacities", "heat_capacities"]

AIR_AND_FURNITURE = 10_000.0
"""Per floor area, added to the capacity of the build-ups. [J/(m²·K)] EN ISO 52016-1:2017, annex B."""


def heat_capacities(building: Building, constructions: Constructions) -> NDArray[np.float64]:
    """Internal heat capacity of each zone.

    Parameters
    ----------
    building : Building
        The building.
    constructions : Constructions
        Build-ups in their positions.

    Returns
    -------
    ndarray, shape (zones,)
        The user's figure, else that of the class, else the faces' areal capacities (ISO 13786, 24 h) times
        their areas with air and furniture. [J/K]
    """
    faces = _capacity_of_faces(building, constructions)
    return np.array([_capacity(zone, faces[number]) for number, zone in enumerate(building.zones)])


def face_capacities(construction: Construction) -> tuple[float, float]:
    """Heat capacity of both faces of a build-up in its position, for a daily swing.

    Parameters
    ----------
    construction : Construction
        Layers beyond a well ventilated cavity take no part.

    Returns
    -------
    tuple of float
        Inner and outer face. [J/(m²·K)]

    Notes
    -----
    The film of the face in question is left out, as in the effective-thickness method of ISO 13786, annex C, with
    which the numerical parameters of the monthly method were found. With the film a bare concrete face counts for
    little more than half, and the heavy case 900 of ANSI/ASHRAE 140 leaves the band of its published cooling need.
    """
    layers = construction.build_up.layers[: len(construction.resistances)]
    capacities = [
        float(areal_capacity(layer.thickness, layer.density, layer.specific_heat)) if layer.density else 0.0
        for layer in layers
    ]
    inside, outside = construction.surfaces
    inner = dynamic_properties(construction.resistances, capacities, 0.0, outside).inside_capacity
    outer = dynamic_properties(construction.resistances, capacities, inside, 0.0).outside_capacity
    return inner, outer


def _capacity(zone: Zone, faces: float) -> float:
    if zone.heat_capacity is not None:
        return zone.heat_capacity * zone.floor_area
    if zone.thermal_mass in CAPACITY_CLASSES:
        return CAPACITY_CLASSES[zone.thermal_mass] * zone.floor_area
    return faces + AIR_AND_FURNITURE * zone.floor_area


def _capacity_of_faces(building: Building, constructions: Constructions) -> NDArray[np.float64]:
    """Inner face to the element's zone, outer face to the zone behind; an inner partition gives both to its own."""
    index = {zone.name: number for number, zone in enumerate(building.zones)}
    by_position = {found.position: face_capacities(found) for found in constructions.used}
    capacities = np.zeros(len(building.zones))
    for element in building.elements:
        found = constructions.of_element.get(element.name)
        if found is None:
            continue
        inner, outer = by_position[found.position]
        capacities[index[element.zone]] += inner * element.net_area
        if element.faces in index:
            capacities[index[element.faces]] += outer * element.net_area
    for floor in building.ground_floors:
        found = constructions.of_floor.get(floor.name)
        if found is not None:
            inner, _ = by_position[found.position]
            capacities[index[floor.zone]] += inner * floor.area
    return capacities
