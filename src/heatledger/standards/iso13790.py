"""ISO 13790:2008, monthly method: gains, utilisation factors, needs, internal heat capacity.

The same formulas stand in EN ISO 52016-1:2017, 6.6, with two cut-offs that :mod:`heatledger.standards.iso52016` adds.
"""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike, NDArray

__all__ = [
    "CAPACITY_CLASSES",
    "gain_utilisation_heating",
    "glazed_gain_area",
    "loss_utilisation_cooling",
    "monthly_cooling_need",
    "monthly_heating_need",
    "numerical_parameter",
    "opaque_gain_area",
    "sky_loss",
    "time_constant",
]

CAPACITY_CLASSES: dict[str, float] = {
    "very light": 80_000.0,
    "light": 110_000.0,
    "medium": 165_000.0,
    "heavy": 260_000.0,
    "very heavy": 370_000.0,
}
"""Internal heat capacity per floor area of each class. [J/(m²·K)] ISO 13790:2008, 12.3.1.2, table 12."""

REFERENCE_PARAMETER = 1.0
"""Numerical parameter a of a zone without heat capacity, monthly method. [-] ISO 13790:2008, tables 9 and 10."""

REFERENCE_TIME_CONSTANT = 15.0
"""Reference time constant of the monthly method. [h] ISO 13790:2008, tables 9 and 10."""

ANGLE_FACTOR = 0.9
"""Glass at all angles against normal incidence, F_w. [-] ISO 13790:2008, 11.4.2."""

EXTERNAL_SURFACE_RESISTANCE = 0.04
"""[m²·K/W] ISO 6946:2017, table 7."""

EXTERNAL_RADIATIVE_COEFFICIENT = 4.14
"""Radiative coefficient of outer surfaces, emissivity 0.9 at 10 °C. [W/(m²·K)] EN ISO 13789:2017, table 8."""

SKY_TEMPERATURE_DIFFERENCE = 11.0
"""Outdoor air less sky, intermediate climates. [K] ISO 13790:2008, 11.4.6."""


def time_constant(heat_capacity: ArrayLike, heat_transfer_coefficient: ArrayLike) -> NDArray[np.float64]:
    """Time in which a zone left alone loses 63 % of its temperature difference.

    Parameters
    ----------
    heat_capacity : array_like, shape (...)
        Internal heat capacity C_m. [J/K]
    heat_transfer_coefficient : array_like, shape (...)
        Transmission and ventilation together, H_tr + H_ve. [W/K]

    Returns
    -------
    ndarray
        Time constant τ. [h]

    Raises
    ------
    ValueError
        If a coefficient is not positive.

    References
    ----------
    ISO 13790:2008, 12.2.1.3.
    """
    coefficient = np.asarray(heat_transfer_coefficient, dtype=float)
    if np.any(coefficient <= 0):
        raise ValueError("the heat transfer coefficient must be positive")
    return np.asarray(np.asarray(heat_capacity, dtype=float) / 3600 / coefficient)


def numerical_parameter(time_constant: ArrayLike) -> NDArray[np.float64]:
    """Exponent of the utilisation factors, a = 1 + τ/15 h.

    Parameters
    ----------
    time_constant : array_like, shape (...)
        Time constant τ of the zone. [h]

    Returns
    -------
    ndarray
        Numerical parameter a. [-]

    Raises
    ------
    ValueError
        If a time constant is negative.

    References
    ----------
    ISO 13790:2008, 12.2.1.1 and tables 9 and 10, monthly method; unchanged in EN ISO 52016-1:2017, 6.6.

    Examples
    --------
    >>> float(numerical_parameter(30.0))
    3.0
    """
    hours = np.asarray(time_constant, dtype=float)
    if np.any(hours < 0):
        raise ValueError("the time constant must not be negative")
    return REFERENCE_PARAMETER + hours / REFERENCE_TIME_CONSTANT


def gain_utilisation_heating(balance_ratio: ArrayLike, exponent: ArrayLike) -> NDArray[np.float64]:
    """Share of the heat gains that lowers the heating need.

    Parameters
    ----------
    balance_ratio : array_like, shape (..., 12)
        Heat gains divided by heat transfer of each month, γ. [-]
    exponent : array_like, broadcastable to ``balance_ratio``
        Numerical parameter a of the zone. [-]

    Returns
    -------
    ndarray, shape of the broadcast inputs
        Utilisation factor η. [-] A negative ratio gives 1/γ, as the standard prints it.

    Raises
    ------
    ValueError
        If an exponent is not positive.

    References
    ----------
    ISO 13790:2008, 12.2.1.1; at γ = 1 the limit a/(a+1). Written with expm1 of a·ln γ, which keeps
    its digits near γ = 1 and does not overflow for heavy zones.

    Examples
    --------
    >>> gain_utilisation_heating([0.5, 1.0, 2.0], 2.0).round(6).tolist()
    [0.857143, 0.666667, 0.428571]
    """
    ratio, power = np.broadcast_arrays(np.asarray(balance_ratio, dtype=float), np.asarray(exponent, dtype=float))
    if np.any(power <= 0):
        raise ValueError("the exponent must be positive")
    utilisation = np.ones(ratio.shape)
    negative = ratio < 0
    utilisation[negative] = 1 / ratio[negative]
    for part, sign in ((ratio > 0) & (ratio < 1), 1.0), (ratio > 1, -1.0):
        logarithm = sign * np.log(ratio[part])
        share = np.expm1(power[part] * logarithm) / np.expm1((power[part] + 1) * logarithm)
        utilisation[part] = share if sign > 0 else share / ratio[part]
    equal = ratio == 1
    utilisation[equal] = power[equal] / (power[equal] + 1)
    return utilisation


def loss_utilisation_cooling(balance_ratio: ArrayLike, exponent: ArrayLike) -> NDArray[np.float64]:
    """Share of the heat transfer that lowers the cooling need.

    Parameters
    ----------
    balance_ratio : array_like, shape (..., 12)
        Heat gains divided by heat transfer of each month, γ. [-]
    exponent : array_like, broadcastable to ``balance_ratio``
        Numerical parameter a of the zone. [-]

    Returns
    -------
    ndarray, shape of the broadcast inputs
        Utilisation factor η; 1 where γ is not positive and 0 where γ is 0. [-]

    Raises
    ------
    ValueError
        If an exponent is not positive.

    References
    ----------
    ISO 13790:2008, 12.2.1.2. The printed formula equals the heating one at 1/γ.
    """
    ratio, power = np.broadcast_arrays(np.asarray(balance_ratio, dtype=float), np.asarray(exponent, dtype=float))
    utilisation = np.ones(ratio.shape)
    positive = ratio > 0
    utilisation[positive] = gain_utilisation_heating(1 / ratio[positive], power[positive])
    utilisation[ratio == 0] = 0.0
    return utilisation


def monthly_heating_need(heat_transfer: ArrayLike, gains: ArrayLike, exponent: ArrayLike) -> NDArray[np.float64]:
    """Heat to supply in a month, Q_H = Q_ht − η·Q_gn.

    Parameters
    ----------
    heat_transfer : array_like, shape (..., 12)
        Transmission and ventilation at the heating set-point, Q_ht. [kWh]
    gains : array_like, shape (..., 12)
        Internal and solar gains less sky losses, Q_gn. [kWh]
    exponent : array_like, broadcastable
        Numerical parameter a. [-]

    Returns
    -------
    ndarray
        Heating need, never negative. [kWh]

    References
    ----------
    ISO 13790:2008, 7.2.1.1. Negative gains, where the sky takes more than the sun gives, count in full;
    without a net loss to outdoors positive gains leave no heating.
    """
    loss, gain = np.broadcast_arrays(np.asarray(heat_transfer, dtype=float), np.asarray(gains, dtype=float))
    both = (loss > 0) & (gain > 0)
    ratio = np.divide(gain, loss, out=np.ones(loss.shape), where=both)
    with_utilisation = loss - gain_utilisation_heating(ratio, exponent) * gain
    return np.maximum(np.where(both, with_utilisation, np.where(gain <= 0, loss - gain, 0.0)), 0.0)


def monthly_cooling_need(heat_transfer: ArrayLike, gains: ArrayLike, exponent: ArrayLike) -> NDArray[np.float64]:
    """Heat to remove in a month, Q_C = Q_gn − η·Q_ht.

    Parameters
    ----------
    heat_transfer : array_like, shape (..., 12)
        Transmission and ventilation at the cooling set-point, Q_ht. [kWh]
    gains : array_like, shape (..., 12)
        Internal and solar gains less sky losses, Q_gn. [kWh]
    exponent : array_like, broadcastable
        Numerical parameter a. [-]

    Returns
    -------
    ndarray
        Cooling need, never negative. [kWh]

    References
    ----------
    ISO 13790:2008, 7.2.1.2. Heat that comes in from outdoors (Q_ht < 0) counts in full.
    """
    loss, gain = np.broadcast_arrays(np.asarray(heat_transfer, dtype=float), np.asarray(gains, dtype=float))
    both = (loss > 0) & (gain > 0)
    ratio = np.divide(gain, loss, out=np.ones(loss.shape), where=both)
    with_utilisation = gain - loss_utilisation_cooling(ratio, exponent) * loss
    return np.maximum(np.where(both, with_utilisation, np.where(loss <= 0, gain - loss, 0.0)), 0.0)


def glazed_gain_area(area: ArrayLike, g_value: ArrayLike, frame_share: ArrayLike) -> NDArray[np.float64]:
    """Area of a black opening that would let in as much sun as the glazed one.

    Parameters
    ----------
    area : array_like
        Opening with frame. [m²]
    g_value : array_like
        Total solar transmittance at normal incidence, g_n. [-]
    frame_share : array_like
        Share of the opening taken by the frame, F_F. [-]

    Returns
    -------
    ndarray
        Effective collecting area 0.9·g_n·(1 − F_F)·A. [m²]

    References
    ----------
    ISO 13790:2008, 11.4.2 and 11.3.3, without movable shading.
    """
    return np.asarray(ANGLE_FACTOR * np.asarray(g_value) * (1 - np.asarray(frame_share)) * np.asarray(area))


def opaque_gain_area(area: ArrayLike, u_value: ArrayLike, absorptance: ArrayLike) -> NDArray[np.float64]:
    """Area of a black opening that would let in as much sun as the opaque face.

    Parameters
    ----------
    area : array_like
        Opaque area. [m²]
    u_value : array_like
        Thermal transmittance. [W/(m²·K)]
    absorptance : array_like
        Solar absorptance of the outer face, α. [-]

    Returns
    -------
    ndarray
        Effective collecting area α·R_se·U·A. [m²]

    References
    ----------
    ISO 13790:2008, 11.3.4.
    """
    return np.asarray(np.asarray(absorptance) * EXTERNAL_SURFACE_RESISTANCE * np.asarray(u_value) * np.asarray(area))


def sky_loss(area: ArrayLike, u_value: ArrayLike, tilt: ArrayLike) -> NDArray[np.float64]:
    """Extra heat flow from an outer face to the colder sky.

    Parameters
    ----------
    area : array_like
        Face with frame. [m²]
    u_value : array_like
        Thermal transmittance. [W/(m²·K)]
    tilt : array_like
        0 facing up, 90 upright, 180 facing down. [°]

    Returns
    -------
    ndarray
        Heat flow R_se·U·A·h_r·Δθ_sky·F with F = (1 + cos tilt)/2. [W]

    References
    ----------
    ISO 13790:2008, 11.3.5 and 11.4.6; the view factor of a tilted plane joins its values 1 (level) and 0.5 (upright).
    """
    view = (1 + np.cos(np.radians(np.asarray(tilt, dtype=float)))) / 2
    exchange = EXTERNAL_RADIATIVE_COEFFICIENT * SKY_TEMPERATURE_DIFFERENCE * view
    return np.asarray(EXTERNAL_SURFACE_RESISTANCE * np.asarray(u_value) * np.asarray(area) * exchange)
