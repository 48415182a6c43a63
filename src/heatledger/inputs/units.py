"""Units as people spell them, and what a value typed in another one means."""

from __future__ import annotations

import unicodedata

from heatledger.inputs.columns import Column, plain

__all__ = ["converted", "is_unit_of", "unit_meant", "within_limits", "wrong_size"]

_SIZES: dict[str, tuple[str, float]] = {
    **{"m": ("m", 1.0), "cm": ("m", 0.01), "mm": ("m", 0.001), "in": ("m", 0.0254), "ft": ("m", 0.3048)},
    **{"m²": ("m²", 1.0), "cm²": ("m²", 1e-4), "mm²": ("m²", 1e-6), "ft²": ("m²", 0.09290304)},
    **{"m³": ("m³", 1.0), "l": ("m³", 0.001), "ft³": ("m³", 0.028316846592)},
    **{"m²/m": ("m²/m", 1.0), "%": ("-", 0.01), "-": ("-", 1.0), "°": ("°", 1.0), "°C": ("°C", 1.0), "°F": ("°F", 1.0)},
    **{"K": ("K", 1.0), "h": ("h", 1.0), "d": ("d", 1.0), "h/d": ("h/d", 1.0), "W": ("W", 1.0), "kW": ("W", 1000.0)},
    **{"BTU/h": ("W", 0.29307107), "W/m²": ("W/m²", 1.0), "W/K": ("W/K", 1.0), "mW/K": ("W/K", 0.001)},
    **{"W/(m·K)": ("W/(m·K)", 1.0), "mW/(m·K)": ("W/(m·K)", 0.001), "W/(m²·K)": ("W/(m²·K)", 1.0)},
    **{"BTU/(h·ft²·°F)": ("W/(m²·K)", 5.678263), "m²·K/W": ("m²·K/W", 1.0)},
    **{"kJ/(m²·K)": ("kJ/(m²·K)", 1.0), "Wh/(m²·K)": ("kJ/(m²·K)", 3.6)},
    **{"J/(kg·K)": ("J/(kg·K)", 1.0), "kJ/(kg·K)": ("J/(kg·K)", 1000.0), "Wh/(kg·K)": ("J/(kg·K)", 3600.0)},
    **{"kg/m³": ("kg/m³", 1.0), "g/cm³": ("kg/m³", 1000.0), "lb/ft³": ("kg/m³", 16.018463)},
    **{"1/h": ("1/h", 1.0), "m³/h": ("m³/h", 1.0), "l/s": ("m³/h", 3.6), "m³/s": ("m³/h", 3600.0)},
    **{"m³/(h·m²)": ("m³/(h·m²)", 1.0), "l/(s·m²)": ("m³/(h·m²)", 3.6)},
    **{"W/(m³/h)": ("W/(m³/h)", 1.0), "Wh/m³": ("W/(m³/h)", 1.0), "kW/(m³/s)": ("W/(m³/h)", 1 / 3.6)},
    **{"kWh/(m²·a)": ("kWh/(m²·a)", 1.0), "kWh/m²": ("kWh/m²", 1.0), "MJ/m²": ("kWh/m²", 1 / 3.6)},
}
"""What each unit measures, and its size.

Inch, foot and pound are those of the agreement of 1959, Btu is that of steam tables.
"""
_SPELLINGS = {
    **{"qm": "m²", "sqm": "m²", "m2": "m²", "cbm": "m³", "ltr": "l", "litre": "l", "litres": "l"},
    **{'"': "in", "inch": "in", "inches": "in", "'": "ft", "feet": "ft", "foot": "ft", "sqft": "ft²", "cuft": "ft³"},
    **{"metre": "m", "metres": "m", "meter": "m", "meters": "m", "percent": "%", "pct": "%"},
    **{"deg": "°", "degree": "°", "degrees": "°", "c": "°C", "degc": "°C", "celsius": "°C", "f": "°F", "degf": "°F"},
    **{"/h": "1/h", "h-1": "1/h", "ach": "1/h", "hour": "h", "hours": "h", "hrs": "h", "hr": "h", "days": "d"},
    **{"watt": "W", "watts": "W", "w/m/k": "W/(m·K)", "w/m2/k": "W/(m²·K)", "kwh/m2/a": "kWh/(m²·a)"},
    **{"btu/hft2f": "BTU/(h·ft²·°F)", "btu/hft2°f": "BTU/(h·ft²·°F)", "m3/h/m2": "m³/(h·m²)"},
}
_SHORTEST_IN_MILLIMETRES = 400.0
"""Openings and edges shorter than this were rather typed in centimetres. [mm]"""
_LEAST_ABSOLUTE, _LEAST_FAHRENHEIT = 250.0, 50.0
"""From here on a temperature out of bounds was rather typed in kelvin, or in °F."""
_SLIPS: dict[str, tuple[tuple[float, str], ...]] = {
    "m": ((1000, "mm"), (100, "cm")),
    "mm": ((0.001, "m"),),
    "-": ((100, "%"),),
    "W/(m·K)": ((1000, "mW/(m·K)"),),
    "J/(kg·K)": ((0.001, "kJ/(kg·K)"),),
}
"""What a value is divided by if it was typed in another unit, by the unit of the column."""


def _key(unit: str) -> str:
    """A unit without signs that people leave out."""
    bare = unicodedata.normalize("NFKC", unit).casefold().replace("^", "").replace("−", "-")
    return "".join(letter for letter in bare if letter not in " ·.*()[]×⋅∙•")


_MEANT = {**{_key(unit): unit for unit in _SIZES}, **_SPELLINGS}


def unit_meant(typed: str) -> str:
    """The unit a spelling stands for, as the sheets write it; empty if it is none.

    >>> unit_meant("W/m2K"), unit_meant("sq ft"), unit_meant("pieces")
    ('W/(m²·K)', 'ft²', '')
    """
    return _MEANT.get(_key(typed), "")


def is_unit_of(unit: str, column: Column) -> bool:
    """Whether a column takes values in a unit.

    >>> is_unit_of("Wh/m³", Column("Specific fan power", "number", "W/(m³/h)"))
    True
    """
    return any(_SIZES[unit] == _SIZES.get(own) for own in column.unit.split(" or "))


def converted(value: float, unit: str, column: Column) -> float | None:
    """A value in another unit as the column takes it; None if the unit measures something else.

    >>> converted(12.0, "cm", Column("Thickness", "number", "mm"))
    120.0
    """
    if (unit, column.unit) == ("°F", "°C"):
        return (value - 32) / 1.8
    kind, size = _SIZES[unit]
    own_kind, own_size = _SIZES.get(column.unit, ("", 1.0))
    return float(f"{value * size / own_size:.6g}") if kind == own_kind else None


def within_limits(value: float, column: Column) -> bool:
    """Whether a value lies within the bounds of its column."""
    return (
        (column.above is None or value > column.above)
        and (column.at_least is None or value >= column.at_least)
        and (column.below is None or value < column.below)
        and (column.at_most is None or value <= column.at_most)
    )


def wrong_size(value: float, column: Column) -> str:
    """Mend for a value out of bounds: its likely meaning in another unit, else the plain one.

    >>> wrong_size(1200.0, Column("Width", "number", "m", above=0, at_most=50))
    'Type 1.2 if 1200 mm is meant.'
    """
    for meant, unit in _meanings(value, column):
        if within_limits(meant, column):
            return f"Type {plain(float(f'{meant:.6g}'))} if {plain(value)} {unit} is meant."
    if column.kind == "azimuth":
        return "Count clockwise from north: 90 is east, 180 south, 270 west."
    return f"Type a value in {column.unit} within these limits." if column.unit.strip("-") else "Correct the value."


def _meanings(value: float, column: Column) -> list[tuple[float, str]]:
    """What a value may mean, each with the unit it would have been typed in."""
    if column.unit == "°C":
        kelvin = [(round(value - 273.15, 1), "K")] if value > _LEAST_ABSOLUTE else []
        return kelvin + ([(round((value - 32) / 1.8, 1), "°F")] if value >= _LEAST_FAHRENHEIT else [])
    if column.unit == "m" and (column.at_least or 0) < 0:  # a height above the sea
        return [(round(0.3048 * value), "ft")]
    slips = _SLIPS.get(column.unit, ())
    return [(value / size, unit) for size, unit in slips if unit != "mm" or value >= _SHORTEST_IN_MILLIMETRES]
