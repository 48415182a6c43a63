"""What the reader should know of obstructions, movable shading and glass at an angle."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

from heatledger.building.model import Building
from heatledger.results import Note, OpeningGains

__all__ = ["shading_checks", "shading_methods"]


def shading_checks(building: Building) -> Iterator[Note]:
    """Obstructions of which nothing, or not all, can count where they are named."""
    for element in building.elements:
        found = element.obstruction
        inherited = any(opening.obstruction is found for opening in element.openings)
        if found is not None and found.near and not inherited:
            text = (
                f"{element.name}: of the obstruction '{found.name}' only the horizon counts for an element; overhang, "
                "fins and reveal count for openings that name it."
            )
            yield Note("check", text, element.origin.sheet, element.origin.cell("obstruction"))


def shading_methods(building: Building, openings: Sequence[OpeningGains]) -> Iterator[str]:
    """How sun behind obstructions, under movable shading and through glass at an angle was calculated."""
    if any(opening.obstruction for opening in openings) or any(element.obstruction for element in building.elements):
        yield (
            "Obstructions: lit share of each opening in every hour for the sun and the bright sky around it; view "
            "factors for the rest of the sky and the ground; what is hidden shines with the reflectance times the "
            "brightness of what it hides. Losses to the sky are those of an open sky."
        )
    if any(opening.shading_device for opening in openings):
        yield (
            "Movable shading: ISO 13790:2008, 11.4.3, weighted by the sun on the plane of the opening in the hours "
            "above the threshold, separately for heating and cooling."
        )
    yield _glass(building, openings)


def _glass(building: Building, openings: Sequence[OpeningGains]) -> str:
    if not building.project.glass_by_hour:
        return "Sun through glass: 0.9·g (ISO 13790:2008, 11.4.2), by the share of glass in each opening."
    factors = [opening.angle_factor for opening in openings] or [1.0]
    return (
        "Sun through glass: angle of every hour (Karlsson and Roos 2000), the mean of all directions for sky and "
        f"ground; over the year {min(factors):.2f} to {max(factors):.2f} of g instead of 0.9, by the share of glass."
    )
