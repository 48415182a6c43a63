"""What a build-up does with heat: resistances, temperatures, storage, and two build-ups side by side."""

from __future__ import annotations

from collections.abc import Mapping

from heatledger.balance.capacity import effective_thickness_capacity, face_capacities, swing_of
from heatledger.balance.constructions import Construction, Constructions, Position
from heatledger.building.model import Layer, Project
from heatledger.results import BuildUpComparison, BuildUpResult, LayerResult, Months
from heatledger.standards.iso13788 import steady_profile

__all__ = ["build_up_comparison", "build_up_results"]

ALIKE = 0.005
"""Figures that differ by less than this share count as equal. [-]"""


def build_up_results(
    constructions: Constructions, project: Project, outdoor: Months, drops: Mapping[Position, float]
) -> tuple[BuildUpResult, ...]:
    """Every build-up in every position: layers, U, temperatures at design conditions, storage.

    Parameters
    ----------
    constructions : Constructions
        Build-ups in their positions.
    project : Project
        Has the design temperatures.
    outdoor : ndarray, shape (12,)
        The coldest of these months stands outside where no design temperature is given, and their mean under a
        floor on the ground, whose soil takes no part here. [°C]
    drops : mapping of position to float
        Share of the difference between inside and outdoors that falls across a build-up between two zones. [-]

    Returns
    -------
    tuple of BuildUpResult
    """
    inside, outside = _design_temperatures(project, outdoor)
    grounded = {found.position for found in constructions.of_floor.values()}
    grounded -= {found.position for found in constructions.of_element.values()}
    return tuple(
        _result(found, inside, float(outdoor.mean()), "to the ground")
        if found.position in grounded
        else _result(found, inside, inside - drops.get(found.position, 1.0) * (inside - outside))
        for found in constructions.used
    )


def build_up_comparison(
    constructions: Constructions, project: Project, outdoor: Months, drops: Mapping[Position, float]
) -> BuildUpComparison | None:
    """The two build-ups named on Project in one position; None if none are named."""
    if constructions.compared is None:
        return None
    inside, outside = _design_temperatures(project, outdoor)
    behind = inside - drops.get(constructions.compared[0].position, 1.0) * (inside - outside)
    first, second = (_result(found, inside, behind) for found in constructions.compared)
    return BuildUpComparison(first, second, _verdict(first, second))


def _design_temperatures(project: Project, outdoor: Months) -> tuple[float, float]:
    """Inside and outside. [°C]"""
    outside = float(outdoor.min()) if project.design_outside is None else project.design_outside
    return project.design_inside, outside


def _result(found: Construction, inside: float, outside: float, behind: str = "") -> BuildUpResult:
    swing, storage = swing_of(found, *found.surfaces), face_capacities(found)
    profile = steady_profile(found.resistances, *found.surfaces, inside, outside)
    layers = found.build_up.layers
    beyond = (0.0,) * (len(layers) - len(found.layers))
    behind = behind or ("to another zone" if found.facing == "zone" else "outdoors")
    return BuildUpResult(
        name=found.build_up.name,
        heat_flow=f"{found.direction}, {behind}",
        layers=tuple(
            LayerResult(_words(layer), layer.thickness * 1000, layer.conductivity or None, resistance)
            for layer, resistance in zip(layers, (*found.resistances, *beyond), strict=True)
        ),
        thickness=sum(layer.thickness for layer in layers) * 1000,
        resistance=found.total,
        upper_limit=found.limits.upper,
        lower_limit=found.limits.lower,
        error=max(100 * found.limits.error, 0.0),
        correction=found.corrections.total,
        u_value=found.u_value,
        internal_heat_capacity=storage[0] / 1000,
        outer_heat_capacity=storage[1] / 1000,
        effective_heat_capacity=effective_thickness_capacity(found) / 1000,
        time_constant=storage[0] / found.u_value / 3600,
        inside_capacity=swing.inside_capacity / 1000,
        outside_capacity=swing.outside_capacity / 1000,
        inside_admittance=swing.inside_admittance,
        outside_admittance=swing.outside_admittance,
        periodic_transmittance=swing.periodic_transmittance,
        decrement_factor=swing.decrement_factor,
        time_shift=swing.time_shift,
        heat_flux=profile.heat_flux,
        temperature_factor=profile.surface_factor,
        inside_surface_temperature=profile.inner_surface,
        surface_temperatures=tuple(float(temperature) for temperature in profile.temperatures),
    )


def _words(layer: Layer) -> str:
    """Material of a layer with what bridges or hollows it."""
    words = layer.material
    if layer.voids:
        words += f", {layer.voids.share * 100:g} % voids"
    if layer.second:
        words += f", {layer.second.share * 100:g} % {layer.second.material}"
    return words if layer.taper == "none" else f"{words}, tapered"


def _verdict(first: BuildUpResult, second: BuildUpResult) -> str:
    """Which of two holds heat better, in words."""
    less = _better(first, second, 1 / first.u_value, 1 / second.u_value)
    longer = _better(first, second, first.time_constant, second.time_constant)
    low, high = sorted((first.u_value, second.u_value))
    losses = f"U {low:.2f} against {high:.2f} W/(m²·K)"
    short, long = sorted((first.time_constant, second.time_constant))
    constants = f"time constant {long:.0f} against {short:.0f} h"
    if not less and not longer:
        return f"Both hold heat equally well ({losses}; {constants})."
    if less == longer:
        return f"'{less}' holds heat better: it loses less ({losses}) and keeps it longer ({constants})."
    if not longer:
        return f"'{less}' holds heat better: it loses less ({losses}); both keep it as long ({constants})."
    if not less:
        return f"'{longer}' holds heat better: it keeps it longer ({constants}); both lose as much ({losses})."
    return f"'{less}' loses less heat ({losses}); '{longer}' keeps it longer once heating stops ({constants})."


def _better(first: BuildUpResult, second: BuildUpResult, of_first: float, of_second: float) -> str:
    """Name of the build-up with the larger figure; empty if they are alike."""
    if abs(of_first - of_second) <= ALIKE * max(of_first, of_second):
        return ""
    return first.name if of_first > of_second else second.name
