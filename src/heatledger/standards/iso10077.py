"""ISO 10077-1:2017: windows from glazing, frame and edge; shutters."""

from __future__ import annotations

from typing import Literal, NamedTuple

import numpy as np
from numpy.typing import ArrayLike, NDArray

from heatledger.standards._guards import not_negative, positive

__all__ = [
    "EDGE_TRANSMITTANCE",
    "SHUTTER_COEFFICIENTS",
    "FrameKind",
    "ShutterTightness",
    "WindowParts",
    "frame_width",
    "shutter_resistance",
    "transmittance_with_shutter",
    "window_parts",
    "window_transmittance",
]

FrameKind = Literal["wood or PVC", "metal with thermal break", "metal without thermal break"]
"""Material of the frame, as the table of edges sorts it."""

EDGE_TRANSMITTANCE: dict[tuple[FrameKind, bool, bool], float] = {
    ("wood or PVC", False, False): 0.06,
    ("wood or PVC", False, True): 0.08,
    ("wood or PVC", True, False): 0.05,
    ("wood or PVC", True, True): 0.06,
    ("metal with thermal break", False, False): 0.08,
    ("metal with thermal break", False, True): 0.11,
    ("metal with thermal break", True, False): 0.06,
    ("metal with thermal break", True, True): 0.08,
    ("metal without thermal break", False, False): 0.02,
    ("metal without thermal break", False, True): 0.05,
    ("metal without thermal break", True, False): 0.01,
    ("metal without thermal break", True, True): 0.04,
}
"""Edge ψ_g by frame, improved spacer (else aluminium or steel) and low-emissivity coating. [W/(m·K)]
ISO 10077-1:2006, tables E.1 and E.2; recalled from memory. Single glass: 0."""

ShutterTightness = Literal["very high", "high", "average", "low", "tight"]
"""Air permeability of a closed shutter: "very high" means leaky."""

SHUTTER_COEFFICIENTS: dict[ShutterTightness, tuple[float, float]] = {
    "very high": (0.0, 0.08),
    "high": (0.25, 0.09),
    "average": (0.55, 0.11),
    "low": (0.80, 0.14),
    "tight": (0.95, 0.17),
}
"""Factor of R_sh [-] and constant [m²·K/W] of ΔR by air permeability. ISO 10077-1:2006, 5.3; recalled."""

GREATEST_SHUTTER_RESISTANCE = 0.3
"""The formulas of ΔR hold for shutters of less than this resistance. [m²·K/W] ISO 10077-1:2006, 5.3."""


class WindowParts(NamedTuple):
    """Parts of an opening filled with one glazed unit, each an array of the openings' shape."""

    glass_area: NDArray[np.float64]
    """A_g. [m²]"""
    frame_area: NDArray[np.float64]
    """A_f. [m²]"""
    glass_perimeter: NDArray[np.float64]
    """Visible edge l_g. [m]"""

    @property
    def frame_share(self) -> NDArray[np.float64]:
        """Share of the frame in the opening [-]."""
        return self.frame_area / (self.frame_area + self.glass_area)


def frame_width(width: ArrayLike, height: ArrayLike, frame_share: ArrayLike) -> NDArray[np.float64]:
    """Width of an even frame all round that takes a share of the opening.

    Parameters
    ----------
    width, height : array_like, shape (...)
        Size of the opening, frame included. [m]
    frame_share : array_like, broadcastable
        Frame area over opening area, from 0 to less than 1. [-]

    Returns
    -------
    ndarray
        Frame width. [m]

    Raises
    ------
    ValueError
        If a size is not positive or a share lies outside [0, 1).

    References
    ----------
    Geometry: (b − 2w)(h − 2w) = (1 − share)·b·h.

    Examples
    --------
    >>> round(float(frame_width(1.23, 1.48, 0.3)), 4)
    0.1096
    """
    breadth, length = positive("the width", width), positive("the height", height)
    share = not_negative("the frame share", frame_share)
    if np.any(share >= 1):
        raise ValueError("the frame share must be below 1")
    # the smaller root, written without the difference of two close numbers
    half = breadth + length
    product = share * breadth * length
    return product / (half + np.sqrt(half**2 - 4 * product))


def window_parts(width: ArrayLike, height: ArrayLike, frame_width: ArrayLike) -> WindowParts:
    """Glass, frame and visible edge of openings with an even frame all round.

    Parameters
    ----------
    width, height : array_like, shape (...)
        Size of the opening, frame included. [m]
    frame_width : array_like, broadcastable
        Width of the frame. [m]

    Returns
    -------
    WindowParts
        Areas [m²] and edge [m].

    Raises
    ------
    ValueError
        If a size is not positive, or the frame leaves no glass.

    References
    ----------
    ISO 10077-1:2017, 6.3. One pane of glass; mullions are not counted.
    """
    breadth, length = positive("the width", width), positive("the height", height)
    frame = not_negative("the frame width", frame_width)
    glass_width, glass_height = breadth - 2 * frame, length - 2 * frame
    if np.any(glass_width <= 0) or np.any(glass_height <= 0):
        raise ValueError("the frame must be narrower than half the opening")
    glass = glass_width * glass_height
    return WindowParts(glass, breadth * length - glass, 2 * (glass_width + glass_height))


def window_transmittance(
    parts: WindowParts,
    glazing_transmittance: ArrayLike,
    frame_transmittance: ArrayLike,
    edge_transmittance: ArrayLike = 0.0,
) -> NDArray[np.float64]:
    """Transmittance of whole windows, (A_g·U_g + A_f·U_f + l_g·ψ_g)/(A_g + A_f).

    Parameters
    ----------
    parts : WindowParts
        Parts of the openings.
    glazing_transmittance, frame_transmittance : array_like, broadcastable
        U_g of the middle of the glazing, and U_f. [W/(m²·K)]
    edge_transmittance : array_like, broadcastable
        Linear transmittance ψ_g of the edge. [W/(m·K)]

    Returns
    -------
    ndarray
        U_w. [W/(m²·K)]

    Raises
    ------
    ValueError
        If a transmittance is negative.

    References
    ----------
    ISO 10077-1:2017, 6.4.1, single windows without opaque panel.

    Examples
    --------
    >>> opening = window_parts(1.23, 1.48, frame_width(1.23, 1.48, 0.3))
    >>> round(float(window_transmittance(opening, 1.1, 1.4, 0.08)), 2)
    1.39
    """
    glass = parts.glass_area * not_negative("the glazing transmittance", glazing_transmittance)
    frame = parts.frame_area * not_negative("the frame transmittance", frame_transmittance)
    edge = parts.glass_perimeter * not_negative("the edge transmittance", edge_transmittance)
    return (glass + frame + edge) / (parts.glass_area + parts.frame_area)


def shutter_resistance(tightness: ShutterTightness, shutter: ArrayLike) -> NDArray[np.float64]:
    """Additional resistance of a closed shutter and the air behind it.

    Parameters
    ----------
    tightness : {"very high", "high", "average", "low", "tight"}
        Air permeability of the closed shutter.
    shutter : array_like
        Resistance R_sh of the shutter itself. [m²·K/W]

    Returns
    -------
    ndarray
        ΔR. [m²·K/W]

    Raises
    ------
    ValueError
        If the class is unknown or the resistance lies outside 0 to 0.3.

    References
    ----------
    ISO 10077-1:2006, 5.3; carried on in ISO 10077-1:2017, annex.

    Examples
    --------
    >>> round(float(shutter_resistance("low", 0.1)), 2)
    0.22
    """
    if tightness not in SHUTTER_COEFFICIENTS:
        raise ValueError(f"unknown air permeability of a shutter: {tightness!r}")
    own = not_negative("the resistance of the shutter", shutter)
    if np.any(own > GREATEST_SHUTTER_RESISTANCE):
        raise ValueError("the resistance of the shutter must not be above 0.3")
    factor, constant = SHUTTER_COEFFICIENTS[tightness]
    return factor * own + constant


def transmittance_with_shutter(transmittance: ArrayLike, resistance: ArrayLike) -> NDArray[np.float64]:
    """Transmittance of a window behind its closed shutter, 1/(1/U_w + ΔR).

    Parameters
    ----------
    transmittance : array_like
        U_w of the window alone. [W/(m²·K)]
    resistance : array_like
        Additional resistance ΔR. [m²·K/W]

    Returns
    -------
    ndarray
        U_ws. [W/(m²·K)]

    Raises
    ------
    ValueError
        If U_w is not positive or ΔR is negative.

    References
    ----------
    ISO 10077-1:2017, 6.4.2.
    """
    return 1 / (
        1 / positive("the transmittance", transmittance) + not_negative("the additional resistance", resistance)
    )
