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


MATERIALS: dict[str, tuple[float, float | None, float | None]] = {
    "Plasterboard": (0.25, 900, 1000),
    "Wool": (0.038, 30, 1000),
    "Timber": (0.13, 500, 1600),
    "Plywood": (0.13, 500, 1600),
    "Brick": (0.77, 1700, 800),
    "Aerated block": (0.11, 500, 1000),
    "Mortar": (0.88, 1800, 1000),
    "Concrete": (1.8, 2400, 1000),
    "Stone": (1.0, 2000, 1000),
    "Insulation": (0.04, 30, 1400),
    "Render": (1.0, 1200, 1500),
    "Steel": (50.0, 7800, 450),
    "Weightless": (0.04, None, None),
}
"""Conductivity, density and specific heat of what the tests build with."""
AIR = {name: f"{name} air layer" for name in ("unventilated", "slightly ventilated", "well ventilated")}


def one_wall(layers: Sequence[Mapping[str, Any]], **changes: Any) -> dict[str, list[dict[str, Any]]]:
    """Rows of a heated room with one element; layers in order, changes of its element."""
    element = {"name": "W", "zone": "Z", "kind": "wall", "faces": "outdoors", "build_up": "Wall", "area": 30.0}
    zone = {"name": "Z", "conditioning": "heated", "usage": "U", "floor_area": 50.0, "air_volume": 125.0}
    materials = {
        name: {"name": name, "conductivity": conductivity, "density": density, "specific_heat": heat}
        for name, (conductivity, density, heat) in MATERIALS.items()
    }
    return {
        "Project": [{"project": "P", "weather": "x"}],
        "Zones": [zone],
        "Usage": [{"name": "U", "heating_set_point": 20.0, "cooling_set_point": 26.0}],
        "Materials": [
            {field: float(value) if isinstance(value, int) else value for field, value in row.items()}
            for row in materials.values()
        ],
        "Build-ups": [
            {"name": "Wall", "layer": number, **layer, "material": AIR.get(layer["material"], layer["material"])}
            for number, layer in enumerate(layers, start=1)
        ],
        "Envelope": [element | {"azimuth": 180.0} | changes],
    }


def layer(material: str, thickness: float, **more: Any) -> dict[str, Any]:
    """A row of sheet Build-ups but for its name and number."""
    return {"material": material, "thickness": float(thickness), **more}


@pytest.fixture(scope="session")
def wall_rows() -> Callable[..., dict[str, list[dict[str, Any]]]]:
    return one_wall


@pytest.fixture(scope="session")
def make_layer() -> Callable[..., dict[str, Any]]:
    return layer
