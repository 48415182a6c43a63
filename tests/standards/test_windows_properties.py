"""What must hold for every window, and the limits of the formulas."""

from __future__ import annotations

from collections.abc import Callable

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from heatledger.standards.en673 import GASES, Gap, gap_conductances, gas_mixture, glazing_transmittance
from heatledger.standards.iso10077 import (
    frame_width,
    shutter_resistance,
    transmittance_with_shutter,
    window_parts,
    window_transmittance,
)

sizes = st.floats(min_value=0.3, max_value=6.0)
transmittances = st.floats(min_value=0.3, max_value=7.0)


@settings(max_examples=40, deadline=None)
@given(sizes, sizes, st.floats(min_value=0.0, max_value=0.95))
def test_the_frame_takes_its_share(width: float, height: float, share: float) -> None:
    parts = window_parts(width, height, frame_width(width, height, share))
    assert float(parts.frame_share) == pytest.approx(share, abs=1e-9)
    assert float(parts.frame_area + parts.glass_area) == pytest.approx(width * height)


@settings(max_examples=40, deadline=None)
@given(sizes, sizes, st.floats(min_value=0.0, max_value=0.9), transmittances, transmittances)
def test_a_window_without_edge_lies_between_glass_and_frame(
    width: float, height: float, share: float, glass: float, frame: float
) -> None:
    parts = window_parts(width, height, frame_width(width, height, share))
    whole = float(window_transmittance(parts, glass, frame))
    assert min(glass, frame) * (1 - 1e-9) <= whole <= max(glass, frame) * (1 + 1e-9)


def test_openings_run_through_at_once() -> None:
    parts = window_parts([1.0, 2.0], [1.0, 1.5], 0.1)
    assert parts.glass_perimeter == pytest.approx([3.2, 6.2])
    # by hand: (0.64·1.0 + 0.36·2.0 + 3.2·0.05)/1 = 1.52
    assert window_transmittance(parts, 1.0, 2.0, 0.05)[0] == pytest.approx(1.52)


@settings(max_examples=30, deadline=None)
@given(
    st.sampled_from(list(GASES)), st.floats(min_value=0.004, max_value=0.03), st.floats(min_value=0.03, max_value=0.8)
)
def test_a_lower_emissivity_and_one_more_pane_help(gas: str, width: float, emissivity: float) -> None:
    plain, coated = Gap(width, gas), Gap(width, gas, inner_emissivity=emissivity)
    assert glazing_transmittance([0.004] * 2, [coated]) < glazing_transmittance([0.004] * 2, [plain])
    assert glazing_transmittance([0.004] * 3, [coated, plain]) < glazing_transmittance([0.004] * 2, [coated])


def test_a_level_glazing_loses_more() -> None:
    gap = [Gap(0.016, "argon", inner_emissivity=0.05)]
    upright, sloped, level = (glazing_transmittance([0.004] * 2, gap, tilt) for tilt in (90.0, 45.0, 0.0))
    assert upright < sloped < level


def test_the_temperature_difference_is_shared_by_resistance() -> None:
    # A wide and a narrow gap of air pass one flux q, so that q/h_1 + q/h_2 is 15 K. With h = r + a·ΔT^0.38 above the
    # onset of convection: two wide ones at 7.5 K each give a and r, and the balance is checked from them.
    wide, narrow = Gap(0.03), Gap(0.006)
    at_half = gap_conductances([wide, wide])[0]
    still = gap_conductances([narrow, narrow])[0]
    radiation = 3.69955
    convection = (at_half - radiation) / 7.5**0.38
    together = gap_conductances([wide, narrow])
    flux = 15.0 / np.sum(1 / together)
    assert together[1] == pytest.approx(still, rel=1e-9)
    assert together[0] == pytest.approx(radiation + convection * (flux / together[0]) ** 0.38, rel=1e-5)


def test_the_order_of_gaps_does_not_matter() -> None:
    gaps = [Gap(0.006, "air"), Gap(0.016, "argon", outer_emissivity=0.05)]
    there, back = gap_conductances(gaps), gap_conductances(gaps[::-1])
    assert there == pytest.approx(back[::-1], rel=1e-6)


def test_a_narrow_gap_only_conducts() -> None:
    # By hand: λ 0.02496/0.002 m plus 4·5.67e-8·283³/(2/0.837 − 1) = 12.48 + 3.6995.
    assert gap_conductances([Gap(0.002)]) == pytest.approx([16.1795], abs=1e-4)


def test_a_gas_share_of_none_is_air() -> None:
    assert gas_mixture("krypton", 0.0) == pytest.approx(GASES["air"])
    assert gas_mixture("argon", 0.9).density == pytest.approx(0.9 * 1.699 + 0.1 * 1.232)


@pytest.mark.parametrize(
    ("call", "message"),
    [
        (lambda: window_parts(1.0, 1.0, 0.5), "the frame must be narrower than half the opening"),
        (lambda: window_parts(0.0, 1.0, 0.1), "the width must be above 0"),
        (lambda: frame_width(1.0, 1.0, 1.0), "the frame share must be below 1"),
        (lambda: frame_width(1.0, 1.0, -0.1), "the frame share must not be negative"),
        (
            lambda: window_transmittance(window_parts(1, 1, 0.1), -1, 1),
            "the glazing transmittance must not be negative",
        ),
        (lambda: shutter_resistance("ajar", 0.1), "unknown air permeability of a shutter: 'ajar'"),  # type: ignore[arg-type]
        (lambda: shutter_resistance("low", 0.31), "the resistance of the shutter must not be above 0.3"),
        (lambda: transmittance_with_shutter(0.0, 0.1), "the transmittance must be above 0"),
        (lambda: gas_mixture("neon"), "unknown gas: 'neon'"),
        (lambda: gas_mixture("argon", 1.1), "the share of the gas must lie between 0 and 1"),
        (lambda: glazing_transmittance([0.004], [Gap(0.01)]), "a glazing has one pane more than gaps"),
        (lambda: gap_conductances([Gap(0.0)]), "the width of a gap must be above 0"),
        (lambda: gap_conductances([Gap(0.01)], 91), "the tilt must lie between 0 and 90"),
        (lambda: gap_conductances([Gap(0.01, inner_emissivity=1.1)]), "an emissivity must not be above 1"),
    ],
)
def test_messages(call: Callable[[], object], message: str) -> None:
    with pytest.raises(ValueError) as caught:  # noqa: PT011  the whole text is compared below
        call()
    assert str(caught.value) == message
