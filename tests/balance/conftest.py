"""Buildings from rows, without a file, and a climate that needs no weather."""

from __future__ import annotations

from collections.abc import Callable, Mapping, Sequence
from dataclasses import dataclass, field
from typing import Any, TypeAlias

import numpy as np
import pytest
from numpy.typing import ArrayLike, NDArray

from heatledger.building.model import Building
from heatledger.building.resolve import resolve
from heatledger.inputs.rows import SHEETS, Rows

Values: TypeAlias = Mapping[str, Sequence[Mapping[str, Any]]]


@dataclass(frozen=True)
class FlatSky:
    """A climate whose planes all receive the same irradiation."""

    temperature: NDArray[np.float64]
    sun: NDArray[np.float64] = field(default_factory=lambda: np.zeros(12))
    name: str = "made for the test"
    source: str = ""
    latitude: float = 45.0
    longitude: float = 8.0
    altitude: float = 0.0
    time_zone: float = 1.0
    notes: tuple[str, ...] = ()

    @property
    def horizontal_irradiation(self) -> NDArray[np.float64]:
        return self.sun

    def irradiation(self, tilt: ArrayLike, azimuth: ArrayLike, ground_reflectance: float) -> NDArray[np.float64]:
        return np.repeat(self.sun[None, :], len(np.asarray(tilt)), axis=0)


def building_of(values: Values) -> Building:
    """A building from rows by sheet name; blank cells take their defaults."""
    tables: dict[str, list[Any]] = {sheet.sheet: [] for sheet in SHEETS}
    for model in SHEETS:
        for row_number, row in enumerate(values.get(model.sheet, ()), start=5):
            positions = {name: column for column, name in enumerate(model.columns(), start=1)}
            tables[model.sheet].append(model.model_validate(dict(row)).placed(row_number, positions))
    (project,) = tables.pop("Project")
    return resolve(Rows(project, *(tuple(rows) for rows in tables.values())))


@pytest.fixture(scope="session")
def building() -> Callable[[Values], Building]:
    return building_of


@pytest.fixture(scope="session")
def flat_sky() -> type[FlatSky]:
    return FlatSky
