"""What the rest of the engine knows of a climate."""

from __future__ import annotations

from typing import TYPE_CHECKING, Protocol, TypeAlias

import numpy as np
from numpy.typing import ArrayLike, NDArray

if TYPE_CHECKING:
    from heatledger.climate.surfaces import Sunlight, Surfaces

__all__ = ["DAYS_OF_MONTH", "HOURS_OF_YEAR", "MONTH_NAMES", "Climate", "FloatArray", "month_of_hour"]

FloatArray: TypeAlias = NDArray[np.float64]

DAYS_OF_MONTH = (31, 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31)
"""Days of the twelve calendar months of a year of 365 days [d]."""

HOURS_OF_YEAR = 8760
"""Hours of a year of 365 days [h]."""

MONTH_NAMES = (
    "January", "February", "March", "April", "May", "June",
    "July", "August", "September", "October", "November", "December",
)  # fmt: skip
"""January first, as on every last axis of twelve."""


class Climate(Protocol):
    """A climate as the balance uses it: twelve calendar months, January first."""

    @property
    def name(self) -> str:
        """Name of the place."""
        ...

    @property
    def source(self) -> str:
        """Where the figures come from, in one or two sentences."""
        ...

    @property
    def latitude(self) -> float:
        """North positive [°]."""
        ...

    @property
    def longitude(self) -> float:
        """East positive [°]."""
        ...

    @property
    def altitude(self) -> float:
        """Above sea level [m]."""
        ...

    @property
    def time_zone(self) -> float:
        """Local standard time less UTC [h]."""
        ...

    @property
    def temperature(self) -> FloatArray:
        """Mean outdoor air temperature of each month, shape (12,) [°C]."""
        ...

    @property
    def horizontal_irradiation(self) -> FloatArray:
        """Global irradiation of the horizontal in each month, shape (12,) [kWh/m²]."""
        ...

    @property
    def notes(self) -> tuple[str, ...]:
        """What was repaired or replaced and what asks for a second look, one sentence or two each."""
        ...

    def irradiation(self, tilt: ArrayLike, azimuth: ArrayLike, ground_reflectance: float) -> FloatArray:
        """Irradiation of planes in each month.

        Parameters
        ----------
        tilt : array_like, shape (n,)
            0 = facing up, 90 = upright. [°]
        azimuth : array_like, shape (n,)
            From north, clockwise. [°]
        ground_reflectance : float
            Share of the global irradiance that the ground reflects. [-]

        Returns
        -------
        ndarray, shape (n, 12)
            Beam, sky and ground-reflected together. [kWh/m²]
        """
        ...

    def sunlight(self, surfaces: Surfaces, ground_reflectance: float) -> Sunlight:
        """Irradiation of surfaces behind obstructions, under movable shading, or through glass at an angle.

        Parameters
        ----------
        surfaces : Surfaces
            n of them.
        ground_reflectance : float
            Share of the global irradiance that the ground reflects. [-]

        Returns
        -------
        Sunlight
            Fields of shape (n, 12). [kWh/m²]

        Raises
        ------
        InputError
            If the climate holds no hours to follow the sun through.
        """
        ...

    def heating_degree_days(self, base: float) -> FloatArray:
        """Degree days of each month below a base temperature in °C, shape (12,) [K·d]."""
        ...


def month_of_hour() -> NDArray[np.intp]:
    """Month (0 = January) of each hour of a year of 365 days.

    >>> month_of_hour()[[0, 743, 744, -1]].tolist()
    [0, 0, 1, 11]
    """
    return np.repeat(np.arange(12), np.multiply(DAYS_OF_MONTH, 24))
