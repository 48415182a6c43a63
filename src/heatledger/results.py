"""The results of an assessment: frozen dataclasses whose fields carry title and unit.

Energies are kWh per calendar month, January first; temperatures °C; coefficients W/K.
"""

from __future__ import annotations

from dataclasses import dataclass, field, fields
from typing import TYPE_CHECKING, Any, Literal, TypeAlias

import numpy as np
from numpy.typing import NDArray

if TYPE_CHECKING:
    import pandas as pd

__all__ = [
    "BuildUpComparison",
    "BuildUpResult",
    "BuildingResult",
    "ClimateResult",
    "ElementLoss",
    "GroundFloorResult",
    "LayerResult",
    "Months",
    "Note",
    "NoteKind",
    "OpeningGains",
    "ProjectResult",
    "Results",
    "ZoneResult",
    "label_of",
]

Months: TypeAlias = NDArray[np.float64]
"""Twelve values, January first."""

NoteKind: TypeAlias = Literal["check", "default", "method", "source"]
"""check: asks for a second look; default: a blank cell's meaning; method: step and edition; source: of data."""


def _quantity(title: str, unit: str = "") -> Any:
    return field(metadata={"title": title, "unit": unit})


def label_of(result: type, name: str) -> str:
    """Title with unit of a field of a result class, e.g. ``Heating need [kWh]``.

    >>> label_of(ZoneResult, "heating_need")
    'Heating need [kWh]'
    """
    metadata = next(item.metadata for item in fields(result) if item.name == name)
    return f"{metadata['title']} [{metadata['unit']}]" if metadata["unit"] else str(metadata["title"])


@dataclass(frozen=True)
class ProjectResult:
    """What was assessed, for the head of every page."""

    project: str = _quantity("Project")
    client: str = _quantity("Client")
    assessor: str = _quantity("Assessor")
    job_number: str = _quantity("Job number")
    address: str = _quantity("Address")
    method: str = _quantity("Method")
    dimensions: str = _quantity("Dimensions measured")
    altitude: float = _quantity("Altitude", "m")
    air_heat_capacity: float = _quantity("Heat capacity of air", "J/(m³·K)")


@dataclass(frozen=True)
class ClimateResult:
    """The climate of the place, month by month."""

    name: str = _quantity("Weather")
    source: str = _quantity("Source")
    latitude: float = _quantity("Latitude", "°")
    longitude: float = _quantity("Longitude", "°")
    temperature: Months = _quantity("Outdoor temperature", "°C")
    horizontal_irradiation: Months = _quantity("Global horizontal irradiation", "kWh/m²")


@dataclass(frozen=True)
class ZoneResult:
    """One zone, month by month. Needs of an unconditioned zone are zero.

    Heat transfer and gains are those that enter the balance; for an unconditioned zone they are those at its
    own temperature in heating mode.
    """

    name: str = _quantity("Zone")
    conditioning: str = _quantity("Conditioning")
    floor_area: float = _quantity("Floor area", "m²")
    heating_need: Months = _quantity("Heating need", "kWh")
    cooling_need: Months = _quantity("Cooling need", "kWh")
    transmission_heating: Months = _quantity("Transmission in heating mode", "kWh")
    ventilation_heating: Months = _quantity("Ventilation in heating mode", "kWh")
    transmission_cooling: Months = _quantity("Transmission in cooling mode", "kWh")
    ventilation_cooling: Months = _quantity("Ventilation in cooling mode", "kWh")
    solar_gains: Months = _quantity("Solar gains less sky losses", "kWh")
    """In heating mode."""
    solar_gains_cooling: Months = _quantity("Solar gains less sky losses in cooling mode", "kWh")
    internal_gains: Months = _quantity("Internal gains", "kWh")
    heating_spared: Months = _quantity("Spared by reduced heating hours", "kWh")
    """Heating need at all hours less that in the hours of use."""
    gain_ratio: Months = _quantity("Gains to losses in heating, γ_H", "-")
    gain_utilisation: Months = _quantity("Utilisation of gains, η_H", "-")
    loss_ratio: Months = _quantity("Gains to losses in cooling, γ_C", "-")
    loss_utilisation: Months = _quantity("Utilisation of losses, η_C", "-")
    heating_season: Months = _quantity("Share of the month in the heating season", "-")
    cooling_season: Months = _quantity("Share of the month in the cooling season", "-")
    fan_electricity: Months = _quantity("Fan electricity", "kWh")
    heating_use: str = _quantity("Heating over the week")
    cooling_use: str = _quantity("Cooling over the week")
    exponent: float = _quantity("Numerical parameter a (heating)", "-")
    time_constant: float = _quantity("Time constant τ", "h")
    heat_capacity: float = _quantity("Heat capacity", "kJ/K")
    transmission_coefficient: float = _quantity("Transmission coefficient", "W/K")
    ventilation_coefficient: float = _quantity("Ventilation coefficient, annual mean", "W/K")
    heating_set_point: float = _quantity("Heating set-point", "°C")
    cooling_set_point: float = _quantity("Cooling set-point", "°C")
    temperature: Months = _quantity("Temperature in heating mode", "°C")
    adjustment_factor: float = _quantity("Adjustment factor b", "-")


@dataclass(frozen=True)
class ElementLoss:
    """One heat path of a conditioned zone and what it loses while the zone needs heating."""

    name: str = _quantity("Element")
    zone: str = _quantity("Zone")
    kind: str = _quantity("Kind")
    faces: str = _quantity("Faces")
    area: float | None = _quantity("Net area", "m²")
    u_value: float | None = _quantity("U-value", "W/(m²·K)")
    coefficient: float = _quantity("Coefficient", "W/K")
    loss: float = _quantity("Loss in months with heating", "kWh/a")
    share: float = _quantity("Share of losses", "%")
    """Of the heat that leaves the conditioned zones; 0 for a path between two of them."""
    between_zones: bool = field(default=False, metadata={"title": "Between conditioned zones", "unit": ""})
    """Whether the path leads to another conditioned zone, so that the building loses nothing by it."""


@dataclass(frozen=True)
class GroundFloorResult:
    """One ground floor by ISO 13370: what it loses steadily, with the swings of the year, and month by month."""

    name: str = _quantity("Ground floor")
    zone: str = _quantity("Zone")
    type: str = _quantity("Type")
    area: float = _quantity("Area that loses heat", "m²")
    characteristic_dimension: float = _quantity("Characteristic dimension B′", "m")
    equivalent_thickness: float = _quantity("Equivalent thickness d_t, of a suspended floor d_g", "m")
    u_value: float = _quantity("U-value with the ground", "W/(m²·K)")
    coefficient: float = _quantity("Steady coefficient H_g", "W/K")
    inside_periodic_coefficient: float = _quantity("Periodic coefficient inside H_pi", "W/K")
    outside_periodic_coefficient: float = _quantity("Periodic coefficient outside H_pe", "W/K")
    lag: float = _quantity("Lag behind the outdoor temperature β", "months")
    temperature: Months = _quantity("Equivalent temperature of the ground", "°C")
    heat_flow_heating: Months = _quantity("Heat flow into the ground in heating mode", "W")
    heat_flow_cooling: Months = _quantity("Heat flow into the ground in cooling mode", "W")


@dataclass(frozen=True)
class OpeningGains:
    """One row of openings and the sun it lets in."""

    name: str = _quantity("Opening")
    zone: str = _quantity("Zone")
    azimuth: float | None = _quantity("Azimuth", "°")
    tilt: float = _quantity("Tilt", "°")
    area: float = _quantity("Area", "m²")
    u_value: float = _quantity("U-value", "W/(m²·K)")
    g_value: float = _quantity("g-value with angle", "-")
    angle_factor: float = _quantity("Factor of the angle F_w", "-")
    """Mean of the year, weighted by the sun that arrives."""
    obstruction: str = _quantity("Obstruction")
    shading_device: str = _quantity("Movable shading")
    irradiation: Months = _quantity("Irradiation on its plane", "kWh/m²")
    """As if nothing stood before it."""
    obstruction_factor: Months = _quantity("Shading factor of the obstruction", "-")
    shading_factor_heating: Months = _quantity("Factor of movable shading in heating mode", "-")
    shading_factor_cooling: Months = _quantity("Factor of movable shading in cooling mode", "-")
    gains: Months = _quantity("Solar gains", "kWh")
    """In heating mode."""
    gains_cooling: Months = _quantity("Solar gains in cooling mode", "kWh")


@dataclass(frozen=True)
class LayerResult:
    """One layer of a build-up, inside first."""

    material: str = _quantity("Material")
    thickness: float = _quantity("Thickness", "mm")
    conductivity: float | None = _quantity("Conductivity", "W/(m·K)")
    resistance: float = _quantity("Resistance", "m²·K/W")


@dataclass(frozen=True)
class BuildUpResult:
    """One build-up as it is used: with the surface resistances of the heat flow through it."""

    name: str = _quantity("Build-up")
    heat_flow: str = _quantity("Heat flow")
    layers: tuple[LayerResult, ...] = _quantity("Layers")
    thickness: float = _quantity("Thickness", "mm")
    resistance: float = _quantity("Total resistance", "m²·K/W")
    upper_limit: float = _quantity("Upper limit of the resistance", "m²·K/W")
    lower_limit: float = _quantity("Lower limit of the resistance", "m²·K/W")
    error: float = _quantity("Greatest error of the resistance", "%")
    correction: float = _quantity("Corrections ΔU", "W/(m²·K)")
    u_value: float = _quantity("U-value", "W/(m²·K)")
    internal_heat_capacity: float = _quantity("Heat capacity inside, 24 h", "kJ/(m²·K)")
    """As the balance takes it, from the inner surface, without its film."""
    outer_heat_capacity: float = _quantity("Heat capacity outside, 24 h", "kJ/(m²·K)")
    effective_heat_capacity: float = _quantity("Heat capacity, effective thickness", "kJ/(m²·K)")
    time_constant: float = _quantity("Time constant κ/U", "h")
    """Heat capacity inside over U."""
    inside_capacity: float = _quantity("Areal capacity inside κ1", "kJ/(m²·K)")
    outside_capacity: float = _quantity("Areal capacity outside κ2", "kJ/(m²·K)")
    inside_admittance: float = _quantity("Admittance inside", "W/(m²·K)")
    outside_admittance: float = _quantity("Admittance outside", "W/(m²·K)")
    periodic_transmittance: float = _quantity("Periodic transmittance", "W/(m²·K)")
    decrement_factor: float = _quantity("Decrement factor", "-")
    time_shift: float = _quantity("Time shift", "h")
    heat_flux: float = _quantity("Heat flux", "W/m²")
    temperature_factor: float = _quantity("Temperature factor f_Rsi", "-")
    inside_surface_temperature: float = _quantity("Inside surface temperature", "°C")
    surface_temperatures: tuple[float, ...] = _quantity("Temperatures from inside air to outside air", "°C")


@dataclass(frozen=True)
class BuildUpComparison:
    """Two build-ups in the same position, and which one holds heat better."""

    first: BuildUpResult = _quantity("First build-up")
    second: BuildUpResult = _quantity("Second build-up")
    verdict: str = _quantity("Which holds heat better")


@dataclass(frozen=True)
class BuildingResult:
    """The sum of the zones."""

    floor_area: float = _quantity("Conditioned floor area", "m²")
    heating_need: Months = _quantity("Heating need", "kWh")
    cooling_need: Months = _quantity("Cooling need", "kWh")


@dataclass(frozen=True)
class Note:
    """A default, a method, a source or a check, with the cell it speaks of."""

    kind: NoteKind = _quantity("Kind")
    text: str = _quantity("Note")
    sheet: str = _quantity("Sheet")
    cell: str = _quantity("Cell")


@dataclass(frozen=True)
class Results:
    """Everything an assessment found."""

    project: ProjectResult
    climate: ClimateResult
    zones: tuple[ZoneResult, ...]
    building: BuildingResult
    element_losses: tuple[ElementLoss, ...]
    opening_gains: tuple[OpeningGains, ...]
    build_ups: tuple[BuildUpResult, ...]
    notes: tuple[Note, ...]
    comparison: BuildUpComparison | None = None
    """Where two build-ups are named on Project."""
    ground_floors: tuple[GroundFloorResult, ...] = ()

    def zone(self, name: str) -> ZoneResult:
        """The zone of a name; upper and lower case do not matter.

        Raises
        ------
        KeyError
            If there is no such zone.
        """
        for zone in self.zones:
            if zone.name.casefold() == name.strip().casefold():
                return zone
        raise KeyError(name)

    def to_frame(self) -> pd.DataFrame:
        """Monthly results as a tidy frame: one row per zone, month and quantity.

        Returns
        -------
        pandas.DataFrame
            Columns ``zone``, ``month`` (1 to 12), ``quantity`` (field name), ``unit``, ``value``.
        """
        import pandas as pd  # noqa: PLC0415 - half a second that only frame users pay

        rows = [
            (zone.name, month + 1, item.name, item.metadata["unit"], float(getattr(zone, item.name)[month]))
            for zone in self.zones
            for item in fields(ZoneResult)
            if isinstance(getattr(zone, item.name), np.ndarray)
            for month in range(12)
        ]
        return pd.DataFrame(rows, columns=["zone", "month", "quantity", "unit", "value"])

    def to_json(self) -> dict[str, Any]:
        """The results as plain lists and numbers, ready for :func:`json.dump`.

        Returns
        -------
        dict
            Keys ``project``, ``climate``, ``zones`` (by name), ``building``, ``elements``, ``openings``,
            ``build_ups``, ``comparison`` (None without one), ``ground_floors`` and ``notes``. Energies in kWh per
            month, January first; a number that does not exist, such as the ratio of gains to losses in a month
            without losses, is None.
        """
        zones = {zone.name: _plain(zone, leave_out=("name",)) for zone in self.zones}
        for zone in self.zones:
            if zone.conditioning != "unconditioned":
                zones[zone.name].pop("temperature")
                zones[zone.name].pop("adjustment_factor")
        return {
            "project": _plain(self.project),
            "climate": _plain(self.climate),
            "zones": zones,
            "building": _plain(self.building),
            "elements": [_plain(element) for element in self.element_losses],
            "openings": [_plain(opening) for opening in self.opening_gains],
            "build_ups": [_plain(build_up) for build_up in self.build_ups],
            "comparison": _plain_value(self.comparison),
            "ground_floors": [_plain(floor) for floor in self.ground_floors],
            "notes": [_plain(note) for note in self.notes],
        }


def _plain(result: Any, leave_out: tuple[str, ...] = ()) -> dict[str, Any]:
    return {
        item.name: _plain_value(getattr(result, item.name)) for item in fields(result) if item.name not in leave_out
    }


def _plain_value(value: Any) -> Any:
    if isinstance(value, np.ndarray):
        return [_plain_value(float(number)) for number in value]
    if isinstance(value, float) and not np.isfinite(value):
        return None
    if isinstance(value, tuple):
        return [_plain_value(part) for part in value]
    if hasattr(value, "__dataclass_fields__"):
        return _plain(value)
    return value
