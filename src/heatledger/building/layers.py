"""Rows of sheet Build-ups to layers in SI units, with the materials they are made of."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Iterator, Mapping
from typing import TYPE_CHECKING

from heatledger.building.model import BuildUp, Fasteners, Layer, MaterialSource, SecondMaterial, Voids
from heatledger.inputs.columns import plain
from heatledger.inputs.prefilled import known_materials, shipped_materials
from heatledger.inputs.rows import AIR_LAYERS
from heatledger.inputs.wording import folded

if TYPE_CHECKING:
    from heatledger.building.model import AirLayer, GapLevel
    from heatledger.inputs.rows import BuildUpRow, MaterialRow, Rows

__all__ = ["material_sources", "resolve_build_ups"]

_AIR: dict[str, AirLayer] = dict(
    zip(AIR_LAYERS, ("unventilated", "slightly ventilated", "well ventilated"), strict=True)
)
_GAPS: dict[str, GapLevel] = {"none": "none", "bridging": "minor", "circulating": "major"}


def resolve_build_ups(rows: Rows) -> dict[str, BuildUp]:
    """Every build-up by its folded name, layers in their order.

    Parameters
    ----------
    rows : Rows
        Checked rows. A material that sheet Materials lacks is taken from the shipped table.

    Returns
    -------
    dict of str to BuildUp
    """
    materials = known_materials(rows)
    layers: dict[str, list[BuildUpRow]] = defaultdict(list)
    for row in rows.build_ups:
        layers[folded(row.name)].append(row)
    return {
        name: BuildUp(
            found[0].name, tuple(_layer(row, materials) for row in sorted(found, key=lambda layer: layer.layer))
        )
        for name, found in layers.items()
    }


def material_sources(rows: Rows) -> tuple[MaterialSource, ...]:
    """Materials in use whose values are the user's, or that sheet Materials lacks."""
    own, shipped = {folded(row.name): row for row in rows.materials}, shipped_materials()
    first_use: dict[str, tuple[str, str]] = {}
    for row in rows.build_ups:
        for field in ("material", "second_material"):
            name = getattr(row, field)
            if name and name not in _AIR:
                first_use.setdefault(folded(name), (row.sheet, row.cell(field)))
    return tuple(
        found for name, place in first_use.items() for found in _source(own.get(name), shipped.get(name), place)
    )


def _source(own: MaterialRow | None, shipped: MaterialRow | None, place: tuple[str, str]) -> Iterator[MaterialSource]:
    if own is None and shipped is not None:
        yield MaterialSource(shipped.name, own=False, source=shipped.source, sheet=place[0], cell=place[1])
    elif own is not None and (shipped is None or _values(own) != _values(shipped)):
        yield MaterialSource(own.name, own=True, source=_own_values(own), sheet=own.sheet, cell=own.cell())


def _values(row: MaterialRow) -> tuple[float | None, ...]:
    return row.conductivity, row.density, row.specific_heat


def _own_values(row: MaterialRow) -> str:
    figures = zip(_values(row), ("W/(m·K)", "kg/m³", "J/(kg·K)"), strict=True)
    told = [f"{plain(value)} {unit}" for value, unit in figures if value is not None]
    return ", ".join([*told, row.source] if row.source else told)


def _layer(row: BuildUpRow, materials: Mapping[str, MaterialRow]) -> Layer:
    air = _AIR.get(row.material, "")
    name, conductivity, density, specific_heat = (
        (row.material, 0.0, 0.0, 0.0) if air else _figures(materials[folded(row.material)])
    )
    return Layer(
        name,
        row.thickness / 1000,
        conductivity,
        density,
        specific_heat,
        air,
        row,
        second=_second(row, materials),
        voids=_voids(row),
        inner_emissivity=row.inner_emissivity,
        outer_emissivity=row.outer_emissivity,
        air_openings=row.air_openings,
        fasteners=_fasteners(row),
        gaps=_GAPS[row.gaps],
        rain=row.rain,
        drainage=row.drainage,
        taper=row.taper,
    )


def _figures(material: MaterialRow) -> tuple[str, float, float, float]:
    """Name, conductivity, density and specific heat; a material that lacks one of the last two stores nothing."""
    if material.density is None or material.specific_heat is None:
        return material.name, material.conductivity, 0.0, 0.0
    return material.name, material.conductivity, material.density, material.specific_heat


def _second(row: BuildUpRow, materials: Mapping[str, MaterialRow]) -> SecondMaterial | None:
    if not row.second_material:
        return None
    return SecondMaterial(*_figures(materials[folded(row.second_material)]), (row.second_share or 0.0) / 100)


def _voids(row: BuildUpRow) -> Voids | None:
    if row.void_width is None or row.void_share is None:
        return None
    depth = row.thickness if row.void_depth is None else row.void_depth
    return Voids(row.void_width / 1000, depth / 1000, row.void_share / 100, row.void_rows)


def _fasteners(row: BuildUpRow) -> Fasteners | None:
    if row.fasteners is None or row.fastener_section is None:
        return None
    depth = None if row.fastener_depth is None else row.fastener_depth / 1000
    return Fasteners(row.fasteners, row.fastener_conductivity, row.fastener_section / 1e6, depth)
