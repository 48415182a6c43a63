"""Where the methods of the envelope reach their limits, how it was worked out, and whose material values count."""

from __future__ import annotations

from collections.abc import Iterator

from heatledger.balance.constructions import Construction, Constructions
from heatledger.building.model import Building, Layer
from heatledger.results import Note
from heatledger.standards.iso6946_bridged import GREATEST_LIMIT_RATIO

__all__ = ["envelope_checks", "envelope_methods", "material_sources"]

METAL = 5.0
"""A second material of more conductivity is taken for metal. [W/(m·K)] Above all stone and concrete (ISO 10456)."""
INSULATION = 0.08
"""A material of more conductivity is no insulation. [W/(m·K)] Common practice; the standards give no number."""
GREATEST_ERROR = 5.0
"""Estimated error of a resistance from which it is pointed out. [%] Common practice, no source."""


def envelope_checks(building: Building, constructions: Constructions) -> Iterator[Note]:
    """Build-ups at the limits of their methods.

    Parameters
    ----------
    building : Building
        The building.
    constructions : Constructions
        Its build-ups in their positions.

    Yields
    ------
    Note
        Of kind check, each with the cell it speaks of; once for a build-up that stands in several positions.
    """
    told: set[Note] = set()
    for found in constructions.used:
        for note in (*_limits(found), *_layers(found)):
            if note not in told:
                told.add(note)
                yield note
    yield from _weightless(building)
    yield from _ventilated_inside(building)
    yield from _rain_on_no_roof(building)


def _check(layer: Layer, field: str, text: str) -> Note:
    place = f"{layer.origin.name}, layer {layer.origin.layer}"
    return Note("check", f"{place}: {text}", layer.origin.sheet, layer.origin.cell(field))


def _limits(found: Construction) -> Iterator[Note]:
    """Distance between the two limits of the resistance."""
    bridged = next((layer for layer in found.layers if layer.second or layer.voids), None)
    if bridged is None:
        return
    field = "second_material" if bridged.second else "void_width"
    ratio, error = found.limits.upper / found.limits.lower, 100 * found.limits.error
    name, origin = found.build_up.name, bridged.origin
    if not found.limits.applies:
        text = (
            f"{name}: the upper limit of the resistance is {ratio:.2f} times the lower one; the method for bridged "
            f"layers holds up to {GREATEST_LIMIT_RATIO:g} (ISO 6946:2017, 6.7.2). Use a two- or three-dimensional "
            "calculation (ISO 10211)."
        )
        yield Note("check", text, origin.sheet, origin.cell(field))
    elif error > GREATEST_ERROR:
        text = (
            f"{name}: the resistance may be wrong by up to {error:.1f} %, since its upper and lower limit lie apart "
            "(ISO 6946:2017, 6.7.2)."
        )
        yield Note("check", text, origin.sheet, origin.cell(field))


def _layers(found: Construction) -> Iterator[Note]:
    for layer in found.layers:
        if layer.second and layer.second.conductivity > METAL and 0 < layer.second.share < 1:
            text = (
                f"bridged by metal ({layer.second.material}); the method for bridged layers leaves this out "
                "(ISO 6946:2017, 6.7.2). Use a declared or calculated U-value (ISO 10211), or enter thin fixings as "
                "fasteners."
            )
            yield _check(layer, "second_material", text)
        if layer.fasteners and layer.conductivity > INSULATION:
            text = (
                f"fasteners count in insulation; {layer.material} with {layer.conductivity:g} W/(m·K) is none "
                "(ISO 6946:2017, annex F)."
            )
            yield _check(layer, "fasteners", text)
    for layer in found.build_up.layers[len(found.layers) :]:
        for field, given in (("fasteners", layer.fasteners), ("rain", layer.rain), ("gaps", layer.gaps != "none")):
            if given:
                text = "it stands outside a well ventilated air layer, so this correction does not count."
                yield _check(layer, field, text)


def _weightless(building: Building) -> Iterator[Note]:
    """Materials without density or specific heat, in build-ups from which a zone takes its heat capacity."""
    by_layers = [zone for zone in building.zones if zone.thermal_mass == "from build-ups"]
    taking = {zone.name for zone in by_layers if zone.heat_capacity is None}
    used = [e.build_up for e in building.elements if e.build_up and {e.zone, e.faces} & taking]
    used += [f.build_up for f in building.ground_floors if f.build_up and f.zone in taking]
    told: set[str] = set()
    for layer in (layer for build_up in used for layer in build_up.layers):
        if not layer.air and not layer.density and layer.material not in told:
            told.add(layer.material)
            text = f"{layer.material} has no density or no specific heat on sheet Materials, so it stores no heat."
            yield _check(layer, "material", text)


def _ventilated_inside(building: Building) -> Iterator[Note]:
    """Air layers open to outdoors in an element that does not face it."""
    told: set[str] = set()
    for element in building.elements:
        if element.build_up is None or element.faces_outdoors or element.build_up.name in told:
            continue
        told.add(element.build_up.name)
        for layer in element.build_up.layers:
            if layer.air in {"slightly ventilated", "well ventilated"}:
                text = f"{layer.material} open to outdoors, yet {element.name} does not face outdoors."
                yield _check(layer, "material", text)


def _rain_on_no_roof(building: Building) -> Iterator[Note]:
    told: set[str] = set()
    for element in building.elements:
        if element.build_up is None or (element.faces_outdoors and element.tilt < 60) or element.build_up.name in told:
            continue
        told.add(element.build_up.name)
        for layer in element.build_up.layers:
            if layer.rain:
                yield _check(layer, "rain", f"rain runs under it, yet {element.name} is no roof under the open sky.")


def envelope_methods() -> tuple[str, ...]:
    """How the envelope is worked out, one line each."""
    return (
        "U-values of build-ups: ISO 6946:2017, mean of upper and lower limit; neighbouring layers bridged by the same "
        "second material with the same share count as one stud, other bridges cross each other.",
        "Air layers and voids of blocks: ISO 6946:2017, 6.9 and annex D; ventilated layers by their openings.",
        "Corrections for gaps, fasteners and rain on inverted roofs: ISO 6946:2017, annex F, left out where they come "
        "to 3 % of U or less; tapered layers: annex E.",
        "Openings at their real size: ISO 10077-1:2017, whole units as declared or from glass, frame and edge; glass "
        "from 4 mm panes: EN 673:2011, at the tilt of its element; closed shutters by air permeability.",
        "Heat capacity from layers: ISO 13786:2017, 24 h, from the surface without its film, both faces of partitions "
        "inside a zone, plus 10 kJ/(m²·K) of floor for air and furniture.",
        "Temperatures inside build-ups: ISO 13788:2012, one-dimensional, at the design temperatures of sheet Project; "
        "between zones with their share of the drop to outdoors, by factor b; bridged layers by their mean resistance.",
    )


def material_sources(building: Building) -> Iterator[Note]:
    """Materials with the user's own values, and those that were taken from the shipped table."""
    for material in building.materials:
        told = (
            f"Material {material.name}: own values ({material.source})."
            if material.own
            else f"Material {material.name}: no row on sheet Materials, taken from the shipped table "
            f"({material.source})."
        )
        yield Note("source", told, material.sheet, material.cell)
