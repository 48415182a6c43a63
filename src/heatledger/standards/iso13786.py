"""ISO 13786:2017: how layers pass on and store a sinusoidal swing of temperature."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import ArrayLike, NDArray

from heatledger.standards._guards import not_negative, positive

__all__ = [
    "EFFECTIVE_THICKNESS",
    "INSULATION_CONDUCTIVITY",
    "DynamicProperties",
    "areal_capacity",
    "dynamic_properties",
    "effective_capacity",
    "penetration_depth",
    "transfer_matrix",
]

EFFECTIVE_THICKNESS: dict[float, float] = {1.0: 0.02, 24.0: 0.10, 168.0: 0.25}
"""Greatest thickness that takes part in storage [m] by period [h]. ISO 13786:2017, annex C (2007: annex A)."""

INSULATION_CONDUCTIVITY = 0.08
"""A layer of less conductivity counts as insulation. [W/(m·K)] Common practice; the standard gives no number."""

FINEST_STEP = 0.25
"""Step of the phase angle that is followed to tell a lag from the same lag less a period. [rad]"""

GREATEST_ARGUMENT = 300.0
"""Sum of d/δ beyond which nothing passes and the hyperbolic functions overflow. [-]"""


@dataclass(frozen=True)
class DynamicProperties:
    """Response of an element to a sinusoidal swing, surface resistances as given."""

    transmittance: float
    """Steady transmittance U. [W/(m²·K)]"""
    inside_admittance: float
    """Amplitude of Y_11. [W/(m²·K)]"""
    inside_admittance_lead: float
    """Lead of the heat flow on the temperature, inside. [h]"""
    outside_admittance: float
    """Amplitude of Y_22. [W/(m²·K)]"""
    outside_admittance_lead: float
    """Lead of the heat flow on the temperature, outside. [h]"""
    periodic_transmittance: float
    """Amplitude of Y_12. [W/(m²·K)]"""
    decrement_factor: float
    """Periodic transmittance over U. [-]"""
    time_shift: float
    """Time by which the heat flow inside lags the swing outside, positive; the standard's Δt_f is negative. [h]"""
    inside_capacity: float
    """Areal heat capacity of the inner face, κ_1. [J/(m²·K)]"""
    outside_capacity: float
    """Areal heat capacity of the outer face, κ_2. [J/(m²·K)]"""
    surface_factor: float
    """Heat that the inner surface hands back to the room, amplitude of 1 − R_si·Y_11. [-]"""
    surface_factor_lag: float
    """Time by which it lags. [h]"""


def penetration_depth(
    conductivity: ArrayLike, density: ArrayLike, specific_heat: ArrayLike, period: float = 24.0
) -> NDArray[np.float64]:
    """Depth at which a swing has fallen to 1/e, δ = √(λT/(πρc)).

    Parameters
    ----------
    conductivity : array_like
        λ. [W/(m·K)]
    density : array_like
        ρ. [kg/m³]
    specific_heat : array_like
        c. [J/(kg·K)]
    period : float
        Period of the swing T. [h]

    Returns
    -------
    ndarray
        δ. [m]

    Raises
    ------
    ValueError
        If a number is not positive.

    References
    ----------
    ISO 13786:2017, 3.2.
    """
    seconds = positive("the period", period) * 3600
    volumetric = positive("the density", density) * positive("the specific heat", specific_heat)
    return np.sqrt(positive("the conductivity", conductivity) * seconds / (np.pi * volumetric))


def areal_capacity(thickness: ArrayLike, density: ArrayLike, specific_heat: ArrayLike) -> NDArray[np.float64]:
    """Heat capacity of a layer per area, d·ρ·c.

    Parameters
    ----------
    thickness : array_like
        d. [m]
    density : array_like
        ρ. [kg/m³]
    specific_heat : array_like
        c. [J/(kg·K)]

    Returns
    -------
    ndarray
        Capacity. [J/(m²·K)]

    Raises
    ------
    ValueError
        If a number is negative.

    References
    ----------
    Definition; with the resistance it describes a layer fully, as d/δ = √(πRC/T).
    """
    mass = not_negative("the thickness", thickness) * not_negative("the density", density)
    return mass * not_negative("the specific heat", specific_heat)


def transfer_matrix(resistances: ArrayLike, capacities: ArrayLike, period: float = 24.0) -> NDArray[np.complex128]:
    """Heat transfer matrix Z of layers, from the inner to the outer face.

    Parameters
    ----------
    resistances : array_like, shape (layers,)
        Resistance of each layer, inside first; surfaces and air layers as layers without capacity. [m²·K/W]
    capacities : array_like, shape (layers,)
        Heat capacity of each layer, 0 for none. [J/(m²·K)]
    period : float
        Period of the swing T; infinity gives the steady state. [h]

    Returns
    -------
    ndarray, shape (2, 2)
        (θ_2, q_2) = Z·(θ_1, q_1); its determinant is 1. Units of the elements 1, m²·K/W, W/(m²·K), 1.

    Raises
    ------
    ValueError
        If the shapes differ, a number is negative, the period is not positive, or a swing so short meets so
        thick a mass that nothing measurable passes.

    References
    ----------
    ISO 13786:2017, 7.2: Z_11 = cosh q, Z_12 = −R·sinh(q)/q, Z_21 = −q·sinh(q)/R with q = (1 + j)·d/δ, which is the
    complex form of the printed real and imaginary parts.
    """
    resistance, capacity = _layers(resistances, capacities)
    if not period > 0:
        raise ValueError("the period must be above 0")
    return _product(_layer_matrices(resistance, capacity, np.asarray(2 * np.pi / (period * 3600))))


def dynamic_properties(
    resistances: ArrayLike,
    capacities: ArrayLike,
    inside_resistance: float,
    outside_resistance: float,
    period: float = 24.0,
) -> DynamicProperties:
    """Admittances, periodic transmittance, lag and heat capacities of an element.

    Parameters
    ----------
    resistances : array_like, shape (layers,)
        Resistance of each layer, inside first. [m²·K/W]
    capacities : array_like, shape (layers,)
        Heat capacity of each layer, 0 for air. [J/(m²·K)]
    inside_resistance, outside_resistance : float
        Surface resistances; 0 gives the properties from surface to surface. [m²·K/W]
    period : float
        Period of the swing T. [h]

    Returns
    -------
    DynamicProperties
        All of them.

    Raises
    ------
    ValueError
        As :func:`transfer_matrix`; also if the total resistance is 0.

    References
    ----------
    ISO 13786:2017, 7.2 to 7.4. One-dimensional; for a bridged layer enter its equivalent resistance and the
    capacity weighted by share. A partition inside a zone stores with both faces, κ_1 + κ_2.

    Examples
    --------
    >>> concrete = dynamic_properties([0.2 / 1.8], [0.2 * 2400 * 1000], 0.13, 0.04)
    >>> round(concrete.decrement_factor, 4), round(concrete.time_shift, 3), round(concrete.inside_capacity)
    (0.5136, 5.676, 86168)
    """
    resistance, capacity = _layers(resistances, capacities)
    resistance = np.concatenate([[inside_resistance], resistance, [outside_resistance]])
    capacity = np.concatenate([[0.0], capacity, [0.0]])
    transmittance = 1 / float(positive("the total resistance", np.sum(not_negative("a resistance", resistance))))
    matrix = transfer_matrix(resistance, capacity, period)
    (z11, z12), (_, z22) = matrix
    inside, outside, across = -z11 / z12, -z22 / z12, -1 / z12
    surface = 1 - inside_resistance * inside
    hours = period / (2 * np.pi)
    return DynamicProperties(
        transmittance=transmittance,
        inside_admittance=float(abs(inside)),
        inside_admittance_lead=float(hours * np.angle(inside)),
        outside_admittance=float(abs(outside)),
        outside_admittance_lead=float(hours * np.angle(outside)),
        periodic_transmittance=float(abs(across)),
        decrement_factor=float(abs(across)) / transmittance,
        time_shift=hours * _lag_angle(resistance, capacity, period),
        inside_capacity=float(hours * 3600 * abs((z11 - 1) / z12)),
        outside_capacity=float(hours * 3600 * abs((z22 - 1) / z12)),
        surface_factor=float(abs(surface)),
        surface_factor_lag=float(-hours * np.angle(surface)),
    )


def effective_capacity(
    thicknesses: Sequence[float],
    conductivities: Sequence[float],
    densities: Sequence[float],
    specific_heats: Sequence[float],
    greatest_thickness: float = EFFECTIVE_THICKNESS[24.0],
) -> float:
    """Areal heat capacity of the inner face by effective thickness, beside the transfer matrix as a check.

    Parameters
    ----------
    thicknesses : sequence of float, shape (layers,)
        Thickness of each layer, inside first. [m]
    conductivities : sequence of float
        λ of each; for an air layer its thickness over its resistance. [W/(m·K)]
    densities : sequence of float
        ρ of each. [kg/m³]
    specific_heats : sequence of float
        c of each. [J/(kg·K)]
    greatest_thickness : float
        Thickness that takes part at most, see :data:`EFFECTIVE_THICKNESS`. [m]

    Returns
    -------
    float
        κ_1. [J/(m²·K)]

    Raises
    ------
    ValueError
        If a number is negative or the lengths differ.

    References
    ----------
    ISO 13786:2017, annex C: the least of the greatest thickness, half the element, and what lies before the
    first insulation. It leaves the surface resistance out, so it stands beside κ_1 worked out with R_si = 0.

    Examples
    --------
    >>> effective_capacity([0.2, 0.1], [1.8, 0.04], [2400, 30], [1000, 1400])
    240000.0
    """
    depths = not_negative("the thickness", thicknesses)
    volumetric = not_negative("the density", densities) * not_negative("the specific heat", specific_heats)
    insulating = not_negative("the conductivity", conductivities) < INSULATION_CONDUCTIVITY
    if not depths.shape == volumetric.shape == insulating.shape:
        raise ValueError("the layers must have one figure each")
    before_insulation = float(np.sum(depths[: int(np.argmax(insulating))] if np.any(insulating) else depths))
    reach = min(float(not_negative("the greatest thickness", greatest_thickness)), float(np.sum(depths)) / 2)
    left = min(reach, before_insulation)
    starts = np.cumsum(depths) - depths
    return float(np.sum(np.clip(left - starts, 0, depths) * volumetric))


def _layers(resistances: ArrayLike, capacities: ArrayLike) -> tuple[NDArray[np.float64], NDArray[np.float64]]:
    resistance = not_negative("a resistance", resistances)
    capacity = not_negative("a heat capacity", capacities)
    if resistance.ndim != 1 or resistance.shape != capacity.shape:
        raise ValueError("the layers must have one resistance and one heat capacity each")
    return resistance, capacity


def _layer_matrices(
    resistance: NDArray[np.float64], capacity: NDArray[np.float64], frequency: NDArray[np.float64]
) -> NDArray[np.complex128]:
    """Matrices of all layers, shape (..., layers, 2, 2), at angular frequencies of shape (...) [1/s]."""
    argument = np.sqrt(1j * frequency[..., None] * resistance * capacity)
    if np.any(np.sum(argument.real, axis=-1) > GREATEST_ARGUMENT):
        raise ValueError("the period is too short for so much mass: nothing measurable passes")
    flat = np.abs(argument) < 1e-6
    safe = np.where(flat, 1.0, argument)
    slope = np.where(flat, 1 + argument**2 / 6, np.sinh(safe) / safe)
    matrices = np.empty((*argument.shape, 2, 2), dtype=np.complex128)
    matrices[..., 0, 0] = matrices[..., 1, 1] = np.cosh(argument)
    matrices[..., 0, 1] = -resistance * slope
    # q·sinh(q)/R = jωC·sinh(q)/q, which also holds for a layer without resistance
    matrices[..., 1, 0] = -1j * frequency[..., None] * capacity * slope
    return matrices


def _product(matrices: NDArray[np.complex128]) -> NDArray[np.complex128]:
    """Z_N · … · Z_2 · Z_1 over the third axis from the end."""
    result = np.broadcast_to(np.eye(2, dtype=np.complex128), (*matrices.shape[:-3], 2, 2))
    for layer in range(matrices.shape[-3]):
        result = matrices[..., layer, :, :] @ result
    return result


def _lag_angle(resistance: NDArray[np.float64], capacity: NDArray[np.float64], period: float) -> float:
    """Phase by which Y_12 lags, followed from the steady state so that it may exceed half a turn [rad]."""
    frequency = 2 * np.pi / (period * 3600)
    reach = float(np.sum(np.sqrt(frequency * resistance * capacity)))
    # for long walls of many layers the phase follows the root of the frequency
    steps = np.linspace(0, 1, int(np.ceil(2 * reach / FINEST_STEP)) + 8) ** 2
    z12 = _product(_layer_matrices(resistance, capacity, frequency * steps))[..., 0, 1]
    return float(-np.unwrap(np.angle(-1 / z12))[-1])
