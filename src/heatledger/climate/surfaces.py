"""Surfaces that the sun meets behind obstructions, and what reaches them."""

from __future__ import annotations

from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from heatledger.climate.model import FloatArray
from heatledger.climate.obstruction import Obstructions

__all__ = ["Sunlight", "Surfaces"]


class Surfaces(NamedTuple):
    """Openings or walls with what stands before them; fields of shape (n,).

    Attributes
    ----------
    tilt, azimuth : ndarray
        0 = facing up, 90 = upright; from north, clockwise. [°]
    before : Obstructions
        Of n openings.
    threshold : ndarray
        Irradiance of the surface from which on its movable shading is drawn; infinite where there is none. [W/m²]
    panes : ndarray
        Panes of the glass whose transmission at an angle is followed by hour; 0 where it is not. [-]
    """

    tilt: FloatArray
    azimuth: FloatArray
    before: Obstructions
    threshold: FloatArray
    panes: NDArray[np.intp]

    def at(self, which: slice | NDArray[np.intp]) -> Surfaces:
        """The same for the chosen surfaces."""
        tilt, azimuth, before, threshold, panes = self
        return Surfaces(tilt[which], azimuth[which], before.at(which), threshold[which], panes[which])


class Sunlight(NamedTuple):
    """Irradiation of n surfaces in each month, fields of shape (n, 12) [kWh/m²].

    Attributes
    ----------
    free : ndarray
        As if nothing stood before the surface.
    received : ndarray
        Past the obstruction, with what it reflects.
    passed : ndarray
        The part of ``received`` that glass lets in at its angles, over what it lets in at right angles; all of it
        where the glass is not followed by hour.
    bright : ndarray
        The part of ``received`` in hours above the threshold; none of it without a threshold.
    """

    free: FloatArray
    received: FloatArray
    passed: FloatArray
    bright: FloatArray
