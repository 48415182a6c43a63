"""Limits of numbers that the formulas of several standards share."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike, NDArray

__all__ = ["not_negative", "positive"]


def positive(name: str, values: ArrayLike) -> NDArray[np.float64]:
    """Return the values as floats; ValueError unless every one is above 0 and finite."""
    numbers = np.asarray(values, dtype=float)
    if not np.all((numbers > 0) & np.isfinite(numbers)):
        raise ValueError(f"{name} must be above 0")
    return numbers


def not_negative(name: str, values: ArrayLike) -> NDArray[np.float64]:
    """Return the values as floats; ValueError unless every one is 0 or more and finite."""
    numbers = np.asarray(values, dtype=float)
    if not np.all((numbers >= 0) & np.isfinite(numbers)):
        raise ValueError(f"{name} must not be negative")
    return numbers
