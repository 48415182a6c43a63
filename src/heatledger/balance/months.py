"""The hours of the twelve calendar months of a 365-day year."""

from __future__ import annotations

import numpy as np

from heatledger.climate.model import DAYS_OF_MONTH

__all__ = ["HOURS"]

HOURS = np.multiply(DAYS_OF_MONTH, 24.0)
"""[h]"""
