"""The sheets of the zones, their use and their air."""

from __future__ import annotations

from typing import ClassVar, Literal

from heatledger.inputs.columns import SheetRow, choice, months, name_from, number, text
from heatledger.inputs.words import YesNo

__all__ = ["AirSystemRow", "UsageRow", "ZoneRow"]


class ZoneRow(SheetRow):
    """A space with one set-point."""

    sheet: ClassVar[str] = "Zones"
    purpose: ClassVar[str] = "One row per zone: a space, or several, with one set-point and one use."
    required_sheet: ClassVar[bool] = True

    name: str = text("Zone", help="Unique name, e.g. Flat 1.", required=True)
    conditioning: Literal["heated", "heated and cooled", "unconditioned"] = choice(
        "Conditioning",
        help="Unconditioned: stairs, lofts, cellars, garages. Their temperature is calculated.",
        required=True,
    )
    usage: str = name_from("Usage", "Usage", help="Row of sheet Usage. May stay empty for an unconditioned zone.")
    air_system: str = name_from(
        "Air systems",
        "Air system",
        help="Row of sheet Air systems. Empty: leakage only, which is not enough fresh air.",
    )
    floor_area: float = number(
        "Floor area", unit="m²", help="Useful floor area of the zone.", required=True, gt=0, le=1_000_000
    )
    air_volume: float = number(
        "Air volume",
        unit="m³",
        help="Inner volume: floor area times clear height.",
        required=True,
        gt=0,
        le=10_000_000,
    )
    thermal_mass: Literal["from build-ups", "very light", "light", "medium", "heavy", "very heavy"] = choice(
        "Thermal mass",
        help="From build-ups: calculated from the layers (ISO 13786). Or a class of ISO 13790:2008, table 12.",
        default="from build-ups",
        default_note="calculated by ISO 13786",
    )
    heat_capacity: float | None = number(
        "Heat capacity",
        unit="kJ/(m²·K)",
        help="Per floor area. A figure here replaces the thermal mass column.",
        gt=0,
        le=2000,
    )
    heating_set_point: float | None = number(
        "Heating set-point",
        unit="°C",
        help="Replaces the set-point of the usage for this zone.",
        default_note="",
        ge=0,
        le=40,
    )
    cooling_set_point: float | None = number(
        "Cooling set-point", unit="°C", help="Replaces the set-point of the usage for this zone.", ge=0, le=60
    )
    leakage: float = number(
        "Leakage n50",
        unit="1/h",
        help="Air changes at 50 Pa, best from a pressure test. Typical: 1 new and tight, 3 ordinary new, 6 older, "
        "10 leaky (common practice, no source).",
        default=6.0,
        default_note="common practice for an untested older building, no source",
        ge=0,
        le=50,
    )
    exposed_facades: Literal["one", "several"] = choice(
        "Exposed façades",
        help="How many façades of the zone stand in the wind.",
        default="several",
        default_note="the usual case, more infiltration",
    )


class UsageRow(SheetRow):
    """Set-points, people and appliances of a kind of use."""

    sheet: ClassVar[str] = "Usage"
    purpose: ClassVar[str] = "Set-points, people, appliances and fresh air of each kind of use. Change or add rows."
    required_sheet: ClassVar[bool] = True

    name: str = text("Usage", help="Unique name. The prefilled rows follow ISO 13790:2008, table G.12.", required=True)
    heating_set_point: float = number(
        "Heating set-point",
        unit="°C",
        help="Temperature kept in the heating season.",
        required=True,
        ge=0,
        le=40,
    )
    cooling_set_point: float = number(
        "Cooling set-point",
        unit="°C",
        help="Temperature not to be passed in summer.",
        required=True,
        ge=0,
        le=60,
    )
    setback: float | None = number(
        "Setback temperature",
        unit="°C",
        help="Kept in hours, on days and in months without use. Needed where these are given.",
        ge=0,
        le=40,
    )
    heated_hours: float = number(
        "Heated hours per day",
        unit="h",
        help="At the heating set-point on a day in use; the setback temperature holds in the others.",
        default=24.0,
        default_note="day and night",
        gt=0,
        le=24,
    )
    days_in_use: float = number(
        "Days in use per week",
        unit="d",
        help="Days a week at the set-points; on the others the setback temperature holds and nothing is cooled.",
        default=7.0,
        default_note="every day",
        gt=0,
        le=7,
    )
    area_per_person: float | None = number(
        "Floor area per person",
        unit="m²",
        help="Empty: no people.",
        default_note="no people",
        gt=0,
        le=10_000,
    )
    heat_per_person: float = number(
        "Heat per person",
        unit="W",
        help="Sensible heat of one person present. Seated about 70, light work 80–100.",
        default=70.0,
        default_note="ISO 13790:2008, table G.12, dwellings",
        ge=0,
        le=1000,
    )
    presence: float = number(
        "Presence",
        unit="h/d",
        help="Hours a day people are present, mean of all days of the year.",
        default=12.0,
        default_note="ISO 13790:2008, table G.12, dwellings",
        ge=0,
        le=24,
    )
    appliances: float = number(
        "Appliances",
        unit="kWh/(m²·a)",
        help="Electricity per floor area. The prefilled figures include lighting.",
        default=0.0,
        default_note="none stated",
        ge=0,
        le=5000,
    )
    lighting: float = number(
        "Lighting",
        unit="kWh/(m²·a)",
        help="Electricity of lighting where it is not part of the appliances figure.",
        default=0.0,
        default_note="none stated",
        ge=0,
        le=1000,
    )
    share_released: float = number(
        "Share released in zone",
        unit="%",
        help="Share of the electricity that ends as heat in the zone.",
        default=100.0,
        default_note="all of it stays",
        ge=0,
        le=100,
    )
    air_per_person: float = number(
        "Outdoor air per person",
        unit="m³/h",
        help="Counts with rate basis usage, for all people while the system runs. Typical 15–36; local code decides.",
        default=0.0,
        default_note="none stated",
        ge=0,
        le=1000,
    )
    air_per_area: float = number(
        "Outdoor air per floor area",
        unit="m³/(h·m²)",
        help="Counts with rate basis usage, while the system runs. Typical 0.7 in dwellings; local code decides.",
        default=0.0,
        default_note="none stated",
        ge=0,
        le=500,
    )
    months_out_of_use: tuple[int, ...] = months(
        "Months out of use",
        help="Holidays, such as 7-8: heated to the setback temperature only, not cooled, nobody there, air system off.",
    )


class AirSystemRow(SheetRow):
    """How outdoor air comes in."""

    sheet: ClassVar[str] = "Air systems"
    purpose: ClassVar[str] = "How outdoor air reaches the zones."

    name: str = text("Air system", help="Unique name, e.g. Windows, Heat recovery unit.", required=True)
    kind: Literal["natural", "extract", "supply", "balanced"] = choice(
        "Kind",
        help="Natural: windows and shafts; the larger of rate and leakage counts. Others: fans; leakage comes on top.",
        required=True,
    )
    rate_basis: Literal["air changes", "floor area", "usage"] = choice(
        "Rate basis",
        help="Air changes: rate in 1/h of the air volume. Floor area: rate in m³/(h·m²). Usage: people and area "
        "of the usage; the rate stays empty.",
        default="air changes",
        default_note="rate read as air changes per hour",
    )
    rate: float | None = number(
        "Rate",
        unit="1/h or m³/(h·m²)",
        help="While running. Dwellings about 0.5 1/h (common practice); local code decides.",
        default_note="",
        ge=0,
        le=1000,
    )
    running_hours: float = number(
        "Running hours per day",
        unit="h",
        help="Mean over the week.",
        default=24.0,
        default_note="runs day and night",
        ge=0,
        le=24,
    )
    heat_recovery: float = number(
        "Heat recovery",
        unit="%",
        help="Temperature efficiency of a balanced system, as tested. Typical 70–85 (common practice, no source).",
        default=0.0,
        default_note="no heat recovery",
        ge=0,
        le=98,
    )
    bypass: YesNo = choice(
        "Bypass in cooling",
        help="Yes: heat recovery is off when cooling is needed.",
        default="yes",
        default_note="usual in new units",
    )
    frost_limit: float | None = number(
        "Frost limit",
        unit="°C",
        help="Outdoor temperature below which heat recovery is held back, lest the exhaust freezes. Empty: no limit.",
        default_note="no limit",
        ge=-30,
        le=10,
    )
    fan_power: float = number(
        "Specific fan power",
        unit="W/(m³/h)",
        help="Of all fans per outdoor air flow. Extract 0.15, balanced 0.3–0.45 (common practice, no source).",
        default=0.0,
        default_note="not stated",
        ge=0,
        le=5,
    )
    night_cooling: float = number(
        "Night cooling",
        unit="1/h",
        help="Additional air change for 8 hours of the night, counted against the cooling need at the mean outdoor "
        "temperature of the month. Needs months.",
        default=0.0,
        default_note="none",
        ge=0,
        le=20,
    )
    night_cooling_months: tuple[int, ...] = months(
        "Night cooling months", help="Such as 5-9. Local security, noise and rain decide whether windows can stay open."
    )
