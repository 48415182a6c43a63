"""Glass at an angle against published values of clear glazing.

Source: ASHRAE Handbook, Fundamentals, table of solar heat gain coefficients of uncoated clear glass of 3 mm by angle of
incidence, and for diffuse light; recalled from memory. The model follows one curve for every glass of a number of
panes, so it is met within 0.09 at any angle and within 0.045 for diffuse light.
"""

from __future__ import annotations

import numpy as np
import pytest

from heatledger.climate.glass import angular_transmission, hemispherical_transmission

ANGLES = [0.0, 40.0, 50.0, 60.0, 70.0, 80.0]
CLEAR = {
    1: ([0.86, 0.84, 0.82, 0.78, 0.67, 0.42], 0.78),
    2: ([0.76, 0.74, 0.71, 0.64, 0.50, 0.26], 0.66),
    3: ([0.68, 0.65, 0.62, 0.54, 0.39, 0.18], 0.57),
}


@pytest.mark.parametrize("panes", CLEAR)
def test_clear_glass(panes: int) -> None:
    gains, diffuse = np.array(CLEAR[panes][0]), CLEAR[panes][1]
    found = angular_transmission(np.cos(np.radians(ANGLES)), panes)
    assert found == pytest.approx(gains / gains[0], abs=0.09)
    assert hemispherical_transmission(panes) == pytest.approx(diffuse / gains[0], abs=0.045)


def test_nothing_passes_from_behind_and_all_at_right_angles() -> None:
    assert angular_transmission([1.0, 0.0, -0.5], 2).tolist() == pytest.approx([1.0, 0.0, 0.0], abs=1e-12)


@pytest.mark.parametrize("panes", [1, 2, 3, 4])
def test_it_falls_with_the_angle(panes: int) -> None:
    found = angular_transmission(np.cos(np.radians(np.arange(0.0, 91.0))), panes)
    assert (np.diff(found) <= 1e-12).all()
