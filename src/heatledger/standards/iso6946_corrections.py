"""ISO 6946:2017, annexes E and F: tapered layers, and corrections for gaps, fasteners and inverted roofs."""

from __future__ import annotations

from collections.abc import Iterable
from typing import Literal

import numpy as np
from numpy.typing import ArrayLike, NDArray

from heatledger.standards._guards import not_negative, positive

__all__ = [
    "GAP_LEVELS",
    "GapLevel",
    "corrected_transmittance",
    "fastener_correction",
    "gap_correction",
    "inverted_roof_correction",
    "tapered_rectangle",
    "tapered_triangle",
    "tapered_triangle_thick_apex",
    "tapered_triangle_thin_apex",
]

GapLevel = Literal["none", "minor", "major"]
"""Gaps in the insulation: none that matter; bridging the layer but not letting air circulate; letting it circulate
on the warm side."""

GAP_LEVELS: dict[GapLevel, float] = {"none": 0.00, "minor": 0.01, "major": 0.04}
"""Correction ΔU″ of each level. [W/(m²·K)] ISO 6946:2017, annex F.2, table F.1."""

FASTENER_COEFFICIENT = 0.8
"""Coefficient α of a fastener through the whole insulation. [-] ISO 6946:2017, annex F.3.2."""

DRAINAGE_FACTOR = 0.04
"""Drainage factor times heat loss factor, f·x, single layer with butt joints under open covering.
[W·d/(m²·K·mm)] ISO 6946:2017, annex F.4."""

NEGLIGIBLE_SHARE = 0.03
"""Corrections of no more than this share of U need not be applied. [-] ISO 6946:2017, 6.5.2."""


def gap_correction(level: GapLevel, insulation_resistance: float, total_resistance: float) -> float:
    """Correction for gaps in the insulation, ΔU_g = ΔU″·(R_1/R_tot)².

    Parameters
    ----------
    level : {"none", "minor", "major"}
        Gaps: none, minor or major.
    insulation_resistance, total_resistance : float
        Resistance R_1 of the layer with gaps, of a bridged layer its equivalent resistance; total resistance R_tot
        without any correction. [m²·K/W]

    Returns
    -------
    float
        ΔU_g. [W/(m²·K)]

    Raises
    ------
    ValueError
        If the level is unknown or R_1 is not between 0 and R_tot.

    References
    ----------
    ISO 6946:2017, annex F.2.
    """
    if level not in GAP_LEVELS:
        raise ValueError(f"unknown level of gaps: {level!r}")
    return GAP_LEVELS[level] * _squared_part(insulation_resistance, total_resistance)


def fastener_correction(
    *,
    conductivity: float,
    cross_section: float,
    number: float,
    insulation_thickness: float,
    insulation_resistance: float,
    total_resistance: float,
    penetration: float | None = None,
) -> float:
    """Correction for fasteners through the insulation, ΔU_f = α·λ_f·A_f·n_f/d_0·(R_1/R_tot)².

    Parameters
    ----------
    conductivity : float
        Conductivity λ_f of the fastener. [W/(m·K)]
    cross_section : float
        Cross-section A_f of one fastener. [m²]
    number : float
        Fasteners per area, n_f. [1/m²]
    insulation_thickness : float
        Thickness d_0 of the insulation that they pierce. [m]
    insulation_resistance, total_resistance : float
        Resistance R_1 of that insulation, of a bridged layer its equivalent resistance; total resistance R_tot without
        any correction. [m²·K/W]
    penetration : float, optional
        Length d_1 within the insulation, if they are recessed; left out, they pierce all of it. [m]

    Returns
    -------
    float
        ΔU_f. [W/(m²·K)]

    Raises
    ------
    ValueError
        If a number is negative, a thickness not positive, or R_1 is not between 0 and R_tot.

    References
    ----------
    ISO 6946:2017, annex F.3.2; α = 0.8 through the whole, 0.8·d_1/d_0 recessed. None for ties across an empty
    cavity or fasteners of less than 1 W/(m·K). Not valid where both ends touch metal sheets.

    Examples
    --------
    >>> anchor = {"conductivity": 50.0, "cross_section": 2e-5, "number": 5.0}
    >>> insulation = {"insulation_thickness": 0.1, "insulation_resistance": 2.5}
    >>> round(fastener_correction(**anchor, **insulation, total_resistance=3.0), 4)
    0.0278
    """
    depth = float(positive("the thickness of the insulation", insulation_thickness))
    not_negative("a figure of the fasteners", [conductivity, cross_section, number])
    reached = 1.0 if penetration is None else float(not_negative("the length of the fasteners", penetration)) / depth
    coefficient = FASTENER_COEFFICIENT * reached
    part = _squared_part(insulation_resistance, total_resistance)
    return coefficient * conductivity * cross_section * number / depth * part


def inverted_roof_correction(
    precipitation: float,
    insulation_resistance: float,
    total_resistance: float,
    drainage_factor: float = DRAINAGE_FACTOR,
) -> float:
    """Correction for rain under the insulation of an inverted roof, ΔU_r = p·f·x·(R_1/R_tot)².

    Parameters
    ----------
    precipitation : float
        Mean rain of the heating season p. [mm/d]
    insulation_resistance, total_resistance : float
        Resistance R_1 of the insulation above the membrane; total resistance without correction. [m²·K/W]
    drainage_factor : float
        Product f·x. [W·d/(m²·K·mm)]

    Returns
    -------
    float
        ΔU_r. [W/(m²·K)]

    Raises
    ------
    ValueError
        If a number is negative or R_1 is not between 0 and R_tot.

    References
    ----------
    ISO 6946:2017, annex F.4; for extruded polystyrene, and for the heating need only.
    """
    not_negative("precipitation and drainage", [precipitation, drainage_factor])
    return precipitation * drainage_factor * _squared_part(insulation_resistance, total_resistance)


def corrected_transmittance(transmittance: float, corrections: Iterable[float]) -> float:
    """Return U with its corrections, unless they come to no more than 3 % of it.

    Parameters
    ----------
    transmittance : float
        Transmittance U before corrections. [W/(m²·K)]
    corrections : iterable of float
        Corrections ΔU. [W/(m²·K)]

    Returns
    -------
    float
        Corrected transmittance U_c. [W/(m²·K)]

    Raises
    ------
    ValueError
        If a number is negative.

    References
    ----------
    ISO 6946:2017, 6.5.2.

    Examples
    --------
    >>> round(corrected_transmittance(0.3, [0.005, 0.005]), 3), corrected_transmittance(0.3, [0.009])
    (0.31, 0.3)
    """
    addition = float(np.sum(not_negative("a correction", list(corrections))))
    base = float(not_negative("the transmittance", transmittance))
    return base + addition if addition > NEGLIGIBLE_SHARE * base * (1 + 1e-9) else base


def tapered_rectangle(base_resistance: ArrayLike, taper_resistance: ArrayLike) -> NDArray[np.float64]:
    """Mean U of a rectangle whose insulation falls evenly to nothing, ln(1 + R_2/R_0)/R_2.

    Parameters
    ----------
    base_resistance : array_like
        Total resistance R_0 without the tapered layer, surfaces included. [m²·K/W]
    taper_resistance : array_like
        Greatest resistance R_2 of the tapered layer; 0 gives 1/R_0. [m²·K/W]

    Returns
    -------
    ndarray
        Transmittance U. [W/(m²·K)]

    Raises
    ------
    ValueError
        If R_0 is not positive or R_2 is negative.

    References
    ----------
    ISO 6946:2017, annex E.2.1; falls of up to 5 %.

    Examples
    --------
    >>> round(float(tapered_rectangle(1.0, 3.0)), 6)
    0.462098
    """
    base, ratio = _taper(base_resistance, taper_resistance)
    series = 1 - ratio / 2 + ratio**2 / 3
    safe = np.where(ratio < 1e-5, 1.0, ratio)
    return np.where(ratio < 1e-5, series, np.log1p(safe) / safe) / base


def tapered_triangle_thick_apex(base_resistance: ArrayLike, taper_resistance: ArrayLike) -> NDArray[np.float64]:
    """Mean U of a triangle, thickest at its apex, 2/R_2·[(1 + R_0/R_2)·ln(1 + R_2/R_0) − 1].

    Parameters
    ----------
    base_resistance, taper_resistance : array_like
        R_0 and R_2, as in :func:`tapered_rectangle`. [m²·K/W]

    Returns
    -------
    ndarray
        Transmittance U. [W/(m²·K)]

    Raises
    ------
    ValueError
        If R_0 is not positive or R_2 is negative.

    References
    ----------
    ISO 6946:2017, annex E.2.2; falls of up to 5 %.

    Examples
    --------
    >>> round(float(tapered_triangle_thick_apex(1.0, 3.0)), 6)
    0.565595
    """
    base, ratio = _taper(base_resistance, taper_resistance)
    series = 1 - ratio / 3 + ratio**2 / 6
    safe = np.where(ratio < 1e-4, 1.0, ratio)
    return np.where(ratio < 1e-4, series, 2 / safe * ((1 + 1 / safe) * np.log1p(safe) - 1)) / base


def tapered_triangle_thin_apex(base_resistance: ArrayLike, taper_resistance: ArrayLike) -> NDArray[np.float64]:
    """Mean U of a triangle, thinnest at its apex, 2/R_2·[1 − R_0/R_2·ln(1 + R_2/R_0)].

    Parameters
    ----------
    base_resistance, taper_resistance : array_like
        R_0 and R_2, as in :func:`tapered_rectangle`. [m²·K/W]

    Returns
    -------
    ndarray
        Transmittance U. [W/(m²·K)]

    Raises
    ------
    ValueError
        If R_0 is not positive or R_2 is negative.

    References
    ----------
    ISO 6946:2017, annex E.2.3; falls of up to 5 %.

    Examples
    --------
    >>> round(float(tapered_triangle_thin_apex(1.0, 3.0)), 6)
    0.358601
    """
    base, ratio = _taper(base_resistance, taper_resistance)
    series = 1 - 2 * ratio / 3 + ratio**2 / 2
    safe = np.where(ratio < 1e-4, 1.0, ratio)
    return np.where(ratio < 1e-4, series, 2 / safe * (1 - np.log1p(safe) / safe)) / base


def tapered_triangle(base_resistance: float, middle_resistance: float, taper_resistance: float) -> float:
    """Mean U of a triangle with three different thicknesses at its corners, nothing at the thinnest.

    Parameters
    ----------
    base_resistance : float
        Total resistance R_0 without the tapered layer, surfaces included. [m²·K/W]
    middle_resistance, taper_resistance : float
        Resistance of the tapered layer at the middle corner, R_1, and at the thickest, R_2. [m²·K/W]

    Returns
    -------
    float
        Transmittance U. [W/(m²·K)]

    Raises
    ------
    ValueError
        If R_0 is not positive or R_1 is not between 0 and R_2.

    References
    ----------
    ISO 6946:2017, annex E.2.4; falls of up to 5 %. R_1 = 0 and R_1 = R_2 are the two triangles above.

    Examples
    --------
    >>> round(tapered_triangle(1.0, 1.2, 3.0), 6)
    0.447653
    """
    r0 = float(positive("the base resistance", base_resistance))
    r1, r2 = (float(value) for value in not_negative("a tapered resistance", [middle_resistance, taper_resistance]))
    if r1 > r2:
        raise ValueError("the middle corner must not be thicker than the thickest")
    # close to an even layer and to the two special triangles the formula divides by a difference that vanishes
    if r2 < 1e-3 * r0:
        mean = r0 + (r1 + r2) / 3
        return 1 / mean + (r1**2 + r2**2 - r1 * r2) / 18 / mean**3
    if r1 <= 1e-6 * r2:
        return float(tapered_triangle_thick_apex(r0, r2))
    if r2 - r1 <= 1e-6 * r2:
        return float(tapered_triangle_thin_apex(r0, r2))
    terms = r0 * r1 * np.log1p(r2 / r0) - r0 * r2 * np.log1p(r1 / r0) + r1 * r2 * np.log((r0 + r2) / (r0 + r1))
    return float(2 * terms / (r1 * r2 * (r2 - r1)))


def _taper(base: ArrayLike, taper: ArrayLike) -> tuple[NDArray[np.float64], NDArray[np.float64]]:
    """R_0, and R_2/R_0."""
    resistance = positive("the base resistance", base)
    return resistance, not_negative("the tapered resistance", taper) / resistance


def _squared_part(part: float, total: float) -> float:
    """(R_1/R_tot)², the weight of a correction."""
    if not 0 <= part <= total or total <= 0:
        raise ValueError("the resistance of the insulation must lie between 0 and the total resistance")
    return (part / total) ** 2
