"""Openings at their real size: whole units, glass with frame and edge, panes, shutters."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

import numpy as np
import pytest

from heatledger.balance.calculate import calculate
from heatledger.building.model import Building
from heatledger.results import Results

Run = Callable[..., Results]

PARTS = {"glazing_u_value": 1.1, "frame_u_value": 1.4, "edge": 0.08}


@pytest.fixture(scope="module")
def run(building: Callable[[Any], Building], flat_sky: Any, wall_rows: Callable[..., Any]) -> Run:
    """One opening in the wall of a room, of 1.23 by 1.48 m unless told otherwise."""

    def calculated(tilt: float = 90.0, width: float = 1.23, height: float = 1.48, **unit: Any) -> Results:
        rows = wall_rows([{"material": "Wool", "thickness": 100.0}], tilt=tilt)
        rows["Glazed units"] = [{"name": "G", "g_value": 0.6} | unit]
        opening = {"name": "O", "element": "W", "glazed_unit": "G", "count": 2, "width": width, "height": height}
        rows["Openings"] = [opening]
        return calculate(building(rows), flat_sky(np.full(12, 5.0), np.full(12, 100.0)))

    return calculated


def u_value(results: Results) -> float:
    (found,) = results.opening_gains
    loss = next(loss for loss in results.element_losses if loss.name == "O")
    assert loss.u_value == found.u_value
    assert loss.coefficient == pytest.approx(found.u_value * found.area, rel=1e-12)
    return found.u_value


def test_a_whole_unit_counts_as_declared(run: Run) -> None:
    assert u_value(run(u_value=1.3)) == 1.3
    assert u_value(run(u_value=1.3, width=0.6)) == 1.3


@pytest.mark.parametrize(
    ("glazing", "frame", "share", "edge", "printed"),
    # ISO 10077-1:2006, tables F.1 to F.4, 1.23 by 1.48 m; recalled from memory (certain).
    [(3.3, 1.4, 30.0, 0.06, 2.9), (5.7, 2.2, 20.0, 0.0, 5.0), (1.1, 1.4, 30.0, 0.08, 1.4)],
)
def test_a_unit_of_parts_equals_the_table(
    run: Run, glazing: float, frame: float, share: float, edge: float, printed: float
) -> None:
    found = u_value(run(glazing_u_value=glazing, frame_u_value=frame, frame_share=share, edge=edge))
    assert found == pytest.approx(printed, abs=0.0501)


def test_a_frame_of_one_width_takes_more_of_a_small_opening(run: Run) -> None:
    """By hand, frame 100 mm: 1 by 1 m leaves 0.8 by 0.8 m, 36 % frame, edge 3.2 m; 0.5 by 1 m leaves 0.24 m², 52 %.

    U: 0.64·1.1 + 0.36·1.4 + 3.2·0.08 = 1.464; (0.24·1.1 + 0.26·1.4 + 2.2·0.08)/0.5 = 1.608.
    Sun: 0.9·0.6·0.64·2 m² and 0.9·0.6·0.24·2 m², 100 kWh/m² a month.
    """
    large = run(width=1.0, height=1.0, frame_width=100.0, **PARTS)
    small = run(width=0.5, height=1.0, frame_width=100.0, **PARTS)
    assert (u_value(large), u_value(small)) == pytest.approx((1.464, 1.608), abs=1e-9)
    assert large.opening_gains[0].gains[0] == pytest.approx(0.54 * 0.64 * 200, abs=1e-9)
    assert small.opening_gains[0].gains[0] == pytest.approx(0.54 * 0.24 * 200, abs=1e-9)


def test_the_frame_width_counts_for_the_sun_of_a_whole_unit(run: Run) -> None:
    found = run(u_value=1.3, width=1.0, height=1.0, frame_width=100.0)
    assert found.opening_gains[0].gains[0] == pytest.approx(0.54 * 0.64 * 200, abs=1e-9)


@pytest.mark.parametrize(
    ("panes", "printed"),
    # ISO 10077-1:2006, table C.2, recalled from memory; printed to 0.1.
    [
        ({"panes": 2, "gap": 12.0}, 2.8),
        ({"panes": 2, "gap": 16.0, "gas": "argon", "coating": 0.1}, 1.4),
        ({"panes": 2, "gap": 8.0, "gas": "krypton", "coating": 0.05}, 1.3),
        ({"panes": 3, "gap": 12.0, "gas": "argon", "coating": 0.05}, 0.8),
        ({"panes": 1}, 5.7),
    ],
)
def test_glass_from_its_panes(run: Run, panes: dict[str, Any], printed: float) -> None:
    """The frame is left out to see the glass alone."""
    found = u_value(run(frame_share=0.0, edge=0.0, **panes))
    assert found == pytest.approx(printed, abs=0.10)


def test_level_glass_loses_more(run: Run) -> None:
    """EN 673:2011, 6.3: convection grows with the slope; beyond upright it stays as it is upright."""
    glass = {"frame_share": 0.0, "edge": 0.0, "panes": 2, "gap": 16.0, "gas": "argon", "coating": 0.05}
    level, sloped, upright, leaning = (u_value(run(tilt=tilt, **glass)) for tilt in (0.0, 45.0, 90.0, 100.0))
    assert level > sloped > upright
    assert leaning == upright


def test_a_leaf_without_glass_is_all_frame(run: Run) -> None:
    found = run(frame_share=100.0, frame_u_value=1.8)
    assert u_value(found) == 1.8
    assert not found.opening_gains[0].gains.any()


@pytest.mark.parametrize(("share", "expected"), [(0.0, 2.8), (60.0, 0.6 / 0.522143 + 0.4 * 2.8), (100.0, 1 / 0.522143)])
def test_a_shutter_counts_while_it_is_closed(run: Run, share: float, expected: float) -> None:
    """By hand, average air permeability: ΔR 0.55·0.1 + 0.11 = 0.165; 1/2.8 + 0.165 = 0.522143 m²·K/W."""
    found = run(u_value=2.8, shutter_resistance=0.1, shutter_share=share)
    assert u_value(found) == pytest.approx(expected, abs=1e-6)


def test_sky_losses_and_notes_follow_the_opening(run: Run) -> None:
    """The unit's note names the opening where U depends on its size."""
    found = run(glazing_u_value=0.3, frame_u_value=0.5, edge=0.0)
    texts = [note.text for note in found.notes if note.kind == "check" and note.sheet == "Glazed units"]
    assert texts == ["G: the U-value is 0.36 W/(m²·K) in O; usual for a glazed unit is 0.5 to 6 W/(m²·K)."]
