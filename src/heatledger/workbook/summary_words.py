"""What the sheet Summary says: the answer, what drives it, what to doubt."""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np

from heatledger.inputs.words import MONTHS
from heatledger.results import ElementLoss, Months, Note, Results
from heatledger.workbook.monthly import conditioned, sum_of
from heatledger.workbook.printed import energy_text, shares_in_tenths

__all__ = ["LOSS_GROUPS", "drivers", "headline", "losses_by_kind", "one_of_each_kind", "second_look"]

LOSS_GROUPS = {
    "wall": "Walls",
    "roof": "Roofs",
    "floor": "Floors",
    "door": "Doors",
    "partition": "Partitions",
    "opening": "Openings",
    "ground floor": "Ground floors",
    "thermal bridge": "Thermal bridges",
    "air leakage": "Air leakage",
    "ventilation": "Ventilation",
}
"""Kinds of losses as the summary names them, in its order."""
MOST_OF_A_CHECK = 190
"""Characters of a check, as two lines hold it."""
_NEEDS = {"heating_need": "heating", "cooling_need": "cooling"}


def headline(results: Results) -> str:
    """What the page says, in one sentence."""
    parts = [_need_in_words(results, field, word) for field, word in _NEEDS.items()]
    return f"Each year the building needs {parts[0]}, and {parts[1]}."


def _need_in_words(results: Results, field: str, word: str) -> str:
    building = results.building
    need: Months = getattr(building, field)
    year = float(np.sum(need))
    if year <= 0:
        return f"no {word}"
    share = f"{year / building.floor_area:,.1f} kWh/m²"
    return f"{energy_text(results, year)} kWh of {word} ({share}), most in {MONTHS[int(np.argmax(need))]}"


def drivers(results: Results) -> tuple[str, ...]:
    """What loses most, what drives the needs, and where they are largest."""
    return _largest_loss(results), _driver_of_heating(results), _driver_of_cooling(results), _neediest_zones(results)


def _largest_loss(results: Results) -> str:
    losses = [loss for loss in results.element_losses if not loss.between_zones]
    if not losses:
        return "Largest single loss: none, no zone is heated."
    top = max(losses, key=lambda loss: loss.loss)
    return (
        f"Largest single loss: {top.name} ({top.kind}, {top.zone}), {energy_text(results, top.loss)} kWh a year, "
        f"{top.share:.0f} % of the losses."
    )


def _driver_of_heating(results: Results) -> str:
    groups = {title: share for title, _, share in losses_by_kind(results.element_losses)}
    if not any(groups.values()):
        return "Main driver of heating: none."
    title = max(groups, key=lambda name: groups[name])
    return f"Main driver of heating: {title.lower()}, {groups[title]:.0f} % of the losses in months with heating."


def _driver_of_cooling(results: Results) -> str:
    """The larger of sun and internal gains while there is a need for cooling."""
    zones = [zone for zone in conditioned(results) if np.nansum(zone.cooling_need) > 0]
    season = results.building.cooling_need > 0
    gains = {
        "solar gains": float(np.sum(sum_of(zones, "solar_gains_cooling"), where=season)),
        "internal gains": float(np.sum(sum_of(zones, "internal_gains"), where=season)),
    }
    total = sum(gains.values())
    if total <= 0:
        return "Main driver of cooling: none, there is no need for cooling."
    name = max(gains, key=lambda key: gains[key])
    share = 100 * gains[name] / total
    return f"Main driver of cooling: {name}, {share:.0f} % of the gains of the cooled zones in months with cooling."


def _neediest_zones(results: Results) -> str:
    """Nothing to compare in a building of one zone."""
    zones = conditioned(results)
    parts = []
    for field, word in _NEEDS.items():
        needs = {zone.name: float(np.sum(getattr(zone, field))) / zone.floor_area for zone in zones}
        name = max(needs, key=lambda zone: needs[zone], default="")
        if name and needs[name] > 0:
            parts.append(f"for {word} {name}, {needs[name]:,.1f} kWh/m² a year")
    return f"Largest need per floor area: {'; '.join(parts)}." if parts and len(zones) > 1 else ""


def losses_by_kind(losses: Sequence[ElementLoss]) -> list[tuple[str, float, float]]:
    """Title, loss [kWh] and share of the sum [%] of each kind of loss, always in the same order.

    What passes between conditioned zones is left out. Shares are rounded so that they add up to 100 as printed.
    """
    sums = dict.fromkeys(LOSS_GROUPS.values(), 0.0)
    for loss in losses:
        if not loss.between_zones:
            sums[LOSS_GROUPS[loss.kind]] += loss.loss
    shares = shares_in_tenths(list(sums.values()))
    return [(title, loss, share) for (title, loss), share in zip(sums.items(), shares, strict=True)]


def second_look(checks: int) -> str:
    """How many checks sheet Notes holds."""
    words = {0: "No figure asks for a second look.", 1: "1 check asks for a second look: see sheet Notes."}
    return words.get(checks, f"{checks} checks ask for a second look: see sheet Notes.")


def one_of_each_kind(checks: Sequence[Note]) -> list[str]:
    """The first check on each column of the workbook, with the number of others on it."""
    alike: dict[tuple[str, str], list[Note]] = {}
    for check in checks:
        alike.setdefault((check.sheet, check.cell.rstrip("0123456789")), []).append(check)
    return [
        _short(first.text) + (f" And {len(others)} more like it." if others else "")
        for first, *others in alike.values()
    ]


def _short(text: str) -> str:
    """A check, cut where it is too long for the page."""
    return text if len(text) <= MOST_OF_A_CHECK else text[: MOST_OF_A_CHECK - 1].rstrip() + "…"
