"""Shading between panes against the tabulated devices inside and outside."""

from __future__ import annotations

import pytest

from heatledger.building.shading import fabrics
from heatledger.standards.en13363 import integrated_g_value


@pytest.mark.parametrize("name", fabrics())
def test_between_the_panes_it_keeps_out_more_than_inside_and_less_than_outside(name: str) -> None:
    """ISO 13790:2008, annex G, recalled from memory, against EN 13363-1: two sources; double low-e glass."""
    fabric = fabrics()[name]
    between = float(integrated_g_value(0.6, 1.4, fabric.transmittance, fabric.absorptance)) / 0.6
    assert fabric.outside - 0.02 <= between <= fabric.inside + 0.02


def test_hand_calculation() -> None:
    """g 0.5, U 1.5: G = 1/(1/1.5 + 1/3) = 1; 0.5·0.2 + 0.5·(0.3 + 0.5·0.5)·1/3 = 0.191667."""
    assert float(integrated_g_value(0.5, 1.5, 0.2, 0.3)) == pytest.approx(0.5 * 0.2 + 0.5 * 0.55 / 3, rel=1e-12)


def test_a_device_that_takes_and_passes_more_than_everything() -> None:
    with pytest.raises(ValueError, match="transmittance and absorptance of a device exceed 1 together"):
        integrated_g_value(0.5, 1.5, 0.7, 0.4)
