"""EN 673:2011: thermal transmittance of glazing from its panes and gas fillings."""

from __future__ import annotations

from collections.abc import Sequence
from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from heatledger.standards._guards import not_negative, positive

__all__ = [
    "GASES",
    "UNCOATED_EMISSIVITY",
    "Gap",
    "Gas",
    "gap_conductances",
    "gas_mixture",
    "glazing_transmittance",
]


class Gas(NamedTuple):
    """Properties of a gas at 10 °C and sea level."""

    density: float
    """ρ. [kg/m³]"""
    viscosity: float
    """Dynamic viscosity μ. [kg/(m·s)]"""
    conductivity: float
    """λ. [W/(m·K)]"""
    specific_heat: float
    """c. [J/(kg·K)]"""


GASES: dict[str, Gas] = {
    "air": Gas(1.232, 1.761e-5, 2.496e-2, 1008.0),
    "argon": Gas(1.699, 2.164e-5, 1.684e-2, 519.0),
    "krypton": Gas(3.560, 2.400e-5, 0.900e-2, 245.0),
    "sulphur hexafluoride": Gas(6.360, 1.459e-5, 1.275e-2, 614.0),
}
"""Gases at 10 °C. EN 673:2011, table 1; recalled from memory."""

UNCOATED_EMISSIVITY = 0.837
"""Corrected emissivity of uncoated soda lime glass. [-] EN 673:2011, 5.3."""

STEFAN_BOLTZMANN = 5.67e-8
"""[W/(m²·K⁴)] EN 673:2011, clause 4."""

MEAN_TEMPERATURE = 283.0
"""Mean temperature of the gas. [K] EN 673:2011, 7."""

TEMPERATURE_DIFFERENCE = 15.0
"""Between the outermost panes' faces towards the gas, all gaps together. [K] EN 673:2011, 7."""

GLASS_CONDUCTIVITY = 1.0
"""[W/(m·K)] EN 673:2011, 7."""

INSIDE_RESISTANCE = 0.13
"""[m²·K/W] EN 673:2011, 7, rounded as in ISO 10077-1."""

OUTSIDE_RESISTANCE = 0.04
"""[m²·K/W] EN 673:2011, 7."""

GRAVITY = 9.81
"""[m/s²]"""

CONVECTION_TILTS = (0.0, 45.0, 90.0)
CONVECTION_FACTORS = (0.16, 0.10, 0.035)
CONVECTION_EXPONENTS = (0.28, 0.31, 0.38)
"""Factor A and exponent n of the Nusselt number at 0°, 45° and 90°, heat flowing upwards. [-] EN 673:2011, 6.3."""


class Gap(NamedTuple):
    """A gas filling between two panes, and the faces that look into it."""

    width: float
    """Distance of the panes. [m]"""
    gas: str = "air"
    """Name in :data:`GASES`."""
    gas_share: float = 0.9
    """Volume share of the gas, the rest is air. [-]"""
    inner_emissivity: float = UNCOATED_EMISSIVITY
    """Of the face nearer the room. [-]"""
    outer_emissivity: float = UNCOATED_EMISSIVITY
    """Of the face nearer the open air. [-]"""


def gas_mixture(gas: str, share: float = 0.9) -> Gas:
    """Properties of a gas mixed with air, in proportion to volume.

    Parameters
    ----------
    gas : str
        Name in :data:`GASES`.
    share : float
        Volume share of the gas, 0 to 1. [-]

    Returns
    -------
    Gas
        Mixture at 10 °C.

    Raises
    ------
    ValueError
        If the gas is unknown or the share lies outside 0 to 1.

    References
    ----------
    EN 673:2011, 6.4.
    """
    if gas not in GASES:
        raise ValueError(f"unknown gas: {gas!r}")
    if not 0 <= share <= 1:
        raise ValueError("the share of the gas must lie between 0 and 1")
    return Gas(*(share * own + (1 - share) * air for own, air in zip(GASES[gas], GASES["air"], strict=True)))


def gap_conductances(gaps: Sequence[Gap], tilt: float = 90.0) -> NDArray[np.float64]:
    """Conductance of each gap, gas and radiation together.

    Parameters
    ----------
    gaps : sequence of Gap
        Gas fillings, in order.
    tilt : float
        Tilt of the glazing: 90 upright, 0 level with heat flowing up; between, A and n are interpolated. [°]

    Returns
    -------
    ndarray, shape (gaps,)
        Conductance h_s. [W/(m²·K)]

    Raises
    ------
    ValueError
        If a gap is not positive, an emissivity lies outside (0, 1], the tilt lies outside 0 to 90 or
        as :func:`gas_mixture`.

    References
    ----------
    EN 673:2011, clause 5 and 6. The 15 K are shared among the gaps in proportion to their resistances.
    """
    if not 0 <= tilt <= 90:
        raise ValueError("the tilt must lie between 0 and 90")
    widths = positive("the width of a gap", [gap.width for gap in gaps])
    gases = [gas_mixture(gap.gas, gap.gas_share) for gap in gaps]
    radiation = _radiation(gaps)
    differences = np.full(len(gaps), TEMPERATURE_DIFFERENCE / max(len(gaps), 1))
    conductances = radiation
    for _ in range(20):
        conductances = radiation + _gas_conductances(widths, gases, differences, tilt)
        shared = TEMPERATURE_DIFFERENCE / conductances / np.sum(1 / conductances)
        if np.allclose(shared, differences, rtol=0, atol=1e-6):
            break
        differences = shared
    return conductances


def glazing_transmittance(
    pane_thicknesses: Sequence[float],
    gaps: Sequence[Gap] = (),
    tilt: float = 90.0,
    inside_resistance: float = INSIDE_RESISTANCE,
    outside_resistance: float = OUTSIDE_RESISTANCE,
) -> float:
    """Thermal transmittance of the middle of a glazing.

    Parameters
    ----------
    pane_thicknesses : sequence of float
        Thickness of each pane. [m]
    gaps : sequence of Gap
        Gas fillings between them, one fewer than panes.
    tilt : float
        Tilt of the glazing: 90 upright, 0 level. [°]
    inside_resistance, outside_resistance : float
        Surface resistances. [m²·K/W]

    Returns
    -------
    float
        U_g. [W/(m²·K)]

    Raises
    ------
    ValueError
        If the number of gaps does not fit the panes, or as :func:`gap_conductances`.

    References
    ----------
    EN 673:2011, clause 5, with 1/h_i = 0.13 and 1/h_e = 0.04 m²·K/W as in ISO 10077-1. Emissivities are corrected
    ones; not for gaps under low pressure, nor panes transparent to far infrared.

    Examples
    --------
    >>> low_emissivity = Gap(0.016, "argon", inner_emissivity=0.05)
    >>> round(glazing_transmittance([0.004, 0.004], [low_emissivity]), 2)
    1.17
    """
    panes = positive("the thickness of a pane", list(pane_thicknesses))
    if panes.size != len(gaps) + 1:
        raise ValueError("a glazing has one pane more than gaps")
    surfaces = float(positive("the sum of the surface resistances", inside_resistance + outside_resistance))
    cavities = float(np.sum(1 / gap_conductances(gaps, tilt))) if gaps else 0.0
    return 1 / (surfaces + float(np.sum(panes)) / GLASS_CONDUCTIVITY + cavities)


def _radiation(gaps: Sequence[Gap]) -> NDArray[np.float64]:
    """Radiative conductance of each gap, 4σT³/(1/ε1 + 1/ε2 − 1)."""
    inner = positive("an emissivity", [gap.inner_emissivity for gap in gaps])
    outer = positive("an emissivity", [gap.outer_emissivity for gap in gaps])
    if np.any(inner > 1) or np.any(outer > 1):
        raise ValueError("an emissivity must not be above 1")
    return 4 * STEFAN_BOLTZMANN * MEAN_TEMPERATURE**3 / (1 / inner + 1 / outer - 1)


def _gas_conductances(
    widths: NDArray[np.float64], gases: Sequence[Gas], differences: NDArray[np.float64], tilt: float
) -> NDArray[np.float64]:
    """Conduction and convection of each gap, Nu·λ/s with Nu = A·(Gr·Pr)^n, at least 1."""
    density, viscosity, conductivity, specific_heat = np.array(gases, dtype=float).T
    differences = not_negative("a temperature difference", differences)
    grashof = GRAVITY * widths**3 * differences * density**2 / (MEAN_TEMPERATURE * viscosity**2)
    prandtl = viscosity * specific_heat / conductivity
    factor = float(np.interp(tilt, CONVECTION_TILTS, CONVECTION_FACTORS))
    exponent = float(np.interp(tilt, CONVECTION_TILTS, CONVECTION_EXPONENTS))
    nusselt: NDArray[np.float64] = np.maximum(1.0, factor * (grashof * prandtl) ** exponent)
    return np.asarray(nusselt * conductivity / widths)
