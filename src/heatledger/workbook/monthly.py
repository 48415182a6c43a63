"""Sums, means and words for twelve months, as several result sheets show them."""

from __future__ import annotations

from collections.abc import Iterable, Sequence

import numpy as np

from heatledger.results import Months, Results, ZoneResult
from heatledger.workbook.canvas import Canvas
from heatledger.workbook.look import LONG, MONTHS, PURPOSE, TITLE, Style

__all__ = ["conditioned", "head", "months_of_need", "sum_of", "year_mean"]

DAYS = np.array([31, 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31], dtype=np.float64)
SHARE_THAT_COUNTS = 0.01
"""A month counts as one of heating or cooling from this share of the year's need on."""
_REMARK = Style(colour=PURPOSE.colour)


def head(canvas: Canvas, results: Results, title: str, remark: str) -> None:
    """Rows 1 to 3 of a result sheet: title, project, and what the figures are."""
    project = results.project
    last = len(canvas.widths)
    parts = (project.project, project.address, project.job_number, results.climate.name)
    canvas.put(1, 1, title, TITLE)
    canvas.height(1, 24)
    for row, text, style in ((2, " · ".join(part for part in parts if part), LONG), (3, remark, _REMARK)):
        canvas.merged(row, 1, last, text, style)
        canvas.fit_merged(row, 1, last, text)


def conditioned(results: Results) -> list[ZoneResult]:
    """Zones that are heated or cooled."""
    return [zone for zone in results.zones if zone.conditioning != "unconditioned"]


def sum_of(zones: Iterable[ZoneResult], field: str) -> Months:
    """Sum of a monthly figure over zones; what does not exist counts nothing."""
    total = np.zeros(12)
    for zone in zones:
        total += np.nan_to_num(getattr(zone, field), nan=0.0, posinf=0.0, neginf=0.0)
    return total


def year_mean(months: Months) -> float:
    """Mean of the year, each month by its days."""
    return float(np.average(months, weights=DAYS))


def months_of_need(need: Months) -> str:
    """The months in which there is a need, as a reader would say it.

    >>> months_of_need(np.array([9, 8, 5, 0, 0, 0, 0, 0, 0, 2, 6, 9.0]))
    'Oct–Mar'
    """
    counts = need > SHARE_THAT_COUNTS * max(float(np.sum(need)), 1e-9)
    if counts.all() or not counts.any():
        return "all year" if counts.all() else "none"
    return ", ".join(_span(run) for run in _runs(counts.tolist()))


def _runs(counts: Sequence[bool]) -> list[list[int]]:
    """Months in a row, across the turn of the year, in the order in which they begin."""
    runs: list[list[int]] = []
    for start in range(12):
        if counts[start] and not counts[start - 1]:
            run = [start]
            while counts[(run[-1] + 1) % 12]:
                run.append((run[-1] + 1) % 12)
            runs.append(run)
    return runs


def _span(run: list[int]) -> str:
    return MONTHS[run[0]] if len(run) == 1 else f"{MONTHS[run[0]]}–{MONTHS[run[-1]]}"
