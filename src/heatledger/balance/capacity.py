"""Internal heat capacity of every zone."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from heatledger.balance.constructions import Construction, Constructions
from heatledger.building.model import Building, Zone
from heatledger.errors import InputError, Problem
from heatledger.standards.iso13786 import DynamicProperties, dynamic_properties, effective_capacity
from heatledger.standards.iso13790 import CAPACITY_CLASSES

__all__ = ["effective_thickness_capacity", "face_capacities", "heat_capacities", "swing_of"]

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
    inside, outside = construction.surfaces
    inner = swing_of(construction, 0.0, outside).inside_capacity
    outer = swing_of(construction, inside, 0.0).outside_capacity
    return inner, outer


def swing_of(construction: Construction, inside: float, outside: float) -> DynamicProperties:
    """Response to a daily swing between two surface resistances. [m²·K/W]

    Raises
    ------
    InputError
        If the layers are so thick and heavy that the method finds nothing to pass.
    """
    capacities = [part.capacity for part in construction.slices]
    try:
        return dynamic_properties(construction.slice_resistances, capacities, inside, outside)
    except ValueError as error:
        name, origin = construction.build_up.name, construction.build_up.layers[0].origin
        expected = "layers through which some heat passes within a day"
        fix = "Correct thicknesses, and densities and specific heats on sheet Materials."
        place = {"sheet": origin.sheet, "cell": origin.cell("thickness"), "column": "Thickness [mm]"}
        raise InputError([Problem(f"too much mass in '{name}'", expected, fix, **place)]) from error


def effective_thickness_capacity(construction: Construction) -> float:
    """Capacity of the inside by effective thickness, a check beside :func:`face_capacities`. [J/(m²·K)]"""
    parts = [
        (part.thickness, part.thickness / resistance, part.capacity / part.thickness)
        for part, resistance in zip(construction.slices, construction.slice_resistances, strict=True)
        if part.thickness and resistance
    ]
    thicknesses, conductivities, volumetric = zip(*parts, strict=True) if parts else ((), (), ())
    return effective_capacity(thicknesses, conductivities, volumetric, [1.0] * len(parts))


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
        if floor.wall_area:
            inner, _ = by_position[constructions.of_basement_wall[floor.name].position]
            capacities[index[floor.zone]] += inner * floor.wall_area
    return capacities
