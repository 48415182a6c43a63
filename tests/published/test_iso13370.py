"""ISO 13370 against published tables of floors, a verified three-dimensional case, and vectors worked out apart."""

from __future__ import annotations

import csv
from pathlib import Path

import numpy as np
import pytest

from heatledger.standards.iso13370 import (
    SOILS,
    additional_thickness,
    characteristic_dimension,
    edge_transmittance,
    equivalent_thickness,
    periodic_depth,
    slab_transmittance,
    suspended_floor_transmittance,
    transmittance_with_edge,
    underfloor_transmittance,
)
from heatledger.standards.iso13370_basement import heated_basement, unheated_basement_transmittance
from heatledger.standards.iso13370_monthly import (
    PHASES,
    PeriodicCoefficients,
    coldest_month,
    equivalent_temperature,
    heated_basement_periodic,
    monthly_heat_flow,
    slab_periodic,
    suspended_floor_periodic,
    unheated_basement_periodic,
)

FLOORS = Path(__file__).parent / "data" / "clay_floors.csv"

# Cells that the formula misses by 0.01, as (perimeter over area, resistance): the rows of 1.5 and 2.0 each one,
# where the second branch governs; five of the row of 2.5, which was recalled without certainty.
MISSED = {(1.0, 1.5), (0.95, 2.0), (0.2, 2.5), (0.3, 2.5), (0.75, 2.5), (0.85, 2.5), (0.9, 2.5)}

SAND = SOILS["sand or gravel"]


def clay_floors() -> list[tuple[float, float, float]]:
    with FLOORS.open(encoding="utf-8") as file:
        rows = csv.DictReader(line for line in file if not line.startswith("#"))
        return [(float(r["perimeter_over_area"]), float(r["resistance"]), float(r["transmittance"])) for r in rows]


def clay_floor(ratio: float, resistance: float) -> float:
    thickness = equivalent_thickness(0.3, 1.5, resistance)
    return float(slab_transmittance(characteristic_dimension(1.0, ratio), thickness, 1.5))


def test_clay_floors_equal_the_table() -> None:
    # Source and certainty in the head of the file; printed to 0.01. 113 of 120 cells agree, seven miss by one digit.
    cells = clay_floors()
    missed = {
        (ratio, resistance)
        for ratio, resistance, printed in cells
        if abs(clay_floor(ratio, resistance) - printed) > 0.0055
    }
    assert len(cells) == 120
    assert missed == MISSED
    assert max(abs(clay_floor(ratio, resistance) - printed) for ratio, resistance, printed in cells) < 0.0155


def test_an_l_shaped_floor_on_clay() -> None:
    # Read at briangwilliams.us, "example: solid ground floor over clay subsoil": nearest row 0.55, printed 0.74.
    area, perimeter = 10.2 * 6.7 - 3.5 * 2.7, 2 * (10.2 + 6.7)
    assert perimeter / area == pytest.approx(0.57, abs=0.005)
    assert round(clay_floor(0.55, 0.0), 2) == 0.74
    assert clay_floor(perimeter / area, 0.0) == pytest.approx(0.761, abs=0.0005)


@pytest.mark.parametrize(
    ("length", "width", "printed"),
    # IHVE Guide (1977), section A3, four exposed edges, read in the copy of nzdl.org: another theory, so 10 %.
    [
        (150, 60, 0.11),
        (60, 60, 0.15),
        (60, 30, 0.21),
        (60, 15, 0.32),
        (30, 30, 0.26),
        (30, 15, 0.36),
        (15, 15, 0.45),
        (15, 7.5, 0.62),
        (7.5, 7.5, 0.76),
    ],
)
def test_an_older_table_agrees_within_a_tenth(length: float, width: float, printed: float) -> None:
    span = characteristic_dimension(length * width, 2 * (length + width))
    assert float(slab_transmittance(span, equivalent_thickness(0.3, 1.4, 0.0), 1.4)) == pytest.approx(printed, rel=0.10)


def test_a_slab_in_three_dimensions() -> None:
    # IEA ground-coupling comparison, case GC10a (NREL/TP-550-43388): 12 m × 12 m, λ 1.9, 20 K, edge strip 0.24 m, no
    # slab resistance; inputs recalled from memory. Analytical 2432.6 W (recalled); verified numerical results read in
    # the published tables: 2425, 2427 and 2431.8 W.
    flow = 144 * 20 * float(slab_transmittance(characteristic_dimension(144, 48), 0.24, 1.9))
    assert [flow] * 4 == pytest.approx([2432.6, 2425.0, 2427.0, 2431.8], rel=0.05)


@pytest.mark.parametrize(("soil", "printed"), [("clay or silt", 2.2), ("sand or gravel", 3.2), ("rock", 4.2)])
def test_periodic_depths(soil: str, printed: float) -> None:
    # ISO 13370:2007, annex A, table of δ; recalled from memory (certain).
    assert periodic_depth(SOILS[soil]) == pytest.approx(printed, abs=0.05)


# Vectors worked out apart from the project from the formulas of ISO 13370:2007, recalled from memory:
# λ 2.0, ρc 2e6, A 100 m², P 40 m, w 0.3 m, R_si 0.17, R_se 0.04.
@pytest.mark.parametrize(
    ("resistance", "thickness", "transmittance", "inside", "outside"),
    [(0.0, 0.72, 0.7615, 71.558, 49.906), (2.5, 5.72, 0.2498, 26.763, 13.041)],
)
def test_slab_vectors(resistance: float, thickness: float, transmittance: float, inside: float, outside: float) -> None:
    slab = equivalent_thickness(0.3, SAND.conductivity, resistance)
    assert float(slab) == pytest.approx(thickness, abs=1e-12)
    assert float(slab_transmittance(5.0, slab, 2.0)) == pytest.approx(transmittance, abs=5e-5)
    swing = slab_periodic(100.0, 40.0, slab, 2.0, periodic_depth(SAND))
    assert (float(swing.inside), float(swing.outside)) == pytest.approx((inside, outside), abs=5e-4)


@pytest.mark.parametrize(("vertical", "psi", "transmittance"), [(False, -0.4010, 0.6011), (True, -0.5692, 0.5338)])
def test_edge_insulation_vectors(vertical: bool, psi: float, transmittance: float) -> None:
    more = additional_thickness(1.5, 0.05, 2.0)
    assert float(more) == pytest.approx(2.95, abs=1e-12)
    edge = edge_transmittance(1.0, 0.72, more, 2.0, vertical=vertical)
    assert float(edge) == pytest.approx(psi, abs=5e-5)
    slab = slab_transmittance(5.0, 0.72, 2.0)
    assert float(transmittance_with_edge(slab, edge, 5.0)) == pytest.approx(transmittance, abs=5e-5)


def test_suspended_floor_vector() -> None:
    ground = slab_transmittance(5.0, equivalent_thickness(0.3, 2.0, 0.0), 2.0)
    space = underfloor_transmittance(
        5.0, height=0.5, wall_transmittance=1.7, openings=0.003, wind_speed=4.0, shielding=0.05
    )
    assert float(space) == pytest.approx(0.5140, abs=5e-5)
    assert float(suspended_floor_transmittance(0.3, ground, space)) == pytest.approx(0.2429, abs=5e-5)


def test_heated_basement_vector() -> None:
    floor = equivalent_thickness(0.3, 2.0, 0.5)
    wall = equivalent_thickness(0.0, 2.0, 1.0, inside_resistance=0.13)
    assert (float(floor), float(wall)) == pytest.approx((1.72, 2.34), abs=1e-12)
    basement = heated_basement(100.0, 40.0, 2.5, 2.0, floor_thickness=floor, wall_thickness=wall)
    assert tuple(map(float, basement)) == pytest.approx((0.3938, 0.4456, 0.4197), abs=5e-5)


def test_a_poor_basement_wall_counts_with_its_own_thickness() -> None:
    # By hand, d_w 1.0 below d_t 1.72: 2·2/(π·2.5)·(1 + 0.5·1.0/3.5)·ln 3.5 = 0.509296·1.142857·1.252763 = 0.72917.
    basement = heated_basement(100.0, 40.0, 2.5, 2.0, floor_thickness=1.72, wall_thickness=1.0)
    assert float(basement.wall) == pytest.approx(0.72917, abs=1e-5)


def test_unheated_basement_by_hand() -> None:
    # By hand from the basement above: A·U_bf 39.38, z·P·U_bw 44.56, h·P·U_w 0.5·40·1.0 = 20, 0.33·0.3·250 = 24.75 W/K:
    # together 128.69 W/K, 1.2869 on the floor; 1/(1/0.5 + 1/1.2869) = 0.3601.
    basement = heated_basement(100.0, 40.0, 2.5, 2.0, floor_thickness=1.72, wall_thickness=2.34)
    floor = unheated_basement_transmittance(
        100.0, 40.0, 2.5, basement, floor_transmittance=0.5, height=0.5, wall_transmittance=1.0, air_volume=250.0
    )
    assert float(floor) == pytest.approx(0.3601, abs=1e-4)


def test_periodic_coefficients_by_hand() -> None:
    # By hand with round numbers: λ 2, δ 2 (λ/δ = 1), A 100, P 40, d 2 where a logarithm occurs: ln 2 = 0.693147.
    # Suspended, U_f 1, U_x 1: H_pi = 100/(1 + 1/2); H_pe = (0.37·40·2·ln 2 + 100)/3.
    suspended = suspended_floor_periodic(
        100.0, 40.0, 2.0, 2.0, floor_transmittance=1.0, ground_thickness=2.0, underfloor=1.0
    )
    edge = 29.6 * 0.693147
    assert tuple(map(float, suspended)) == pytest.approx((66.6667, (edge + 100) / 3), abs=1e-4)
    # Heated basement, z 2: H_pi = (100 + 80)·2/2·√(2/5); H_pe = 29.6·ln 2·(2 − 1/e).
    heated = heated_basement_periodic(100.0, 40.0, 2.0, 2.0, 2.0, floor_thickness=2.0, wall_thickness=2.0)
    assert tuple(map(float, heated)) == pytest.approx((180 * 0.632456, edge * (2 - 0.367879)), abs=1e-3)
    # Unheated basement, z 2, U_f 1, h·P·U_w 20, 0.33·n·V 33: below 180 + 53 W/K.
    unheated = unheated_basement_periodic(
        100.0,
        40.0,
        2.0,
        2.0,
        2.0,
        floor_transmittance=1.0,
        floor_thickness=2.0,
        height=0.5,
        wall_transmittance=1.0,
        air_volume=100.0,
        air_changes=1.0,
    )
    outside = 100 * (edge * (2 - 0.367879) + 53) / 333
    assert tuple(map(float, unheated)) == pytest.approx((100 * 233 / 333, outside), abs=1e-3)
    # Edge insulation to half the depth of penetration upright: the exponential is 1/e; d′ 2 gives ln 1.5.
    upright = slab_periodic(100.0, 40.0, 2.0, 2.0, 2.0, edge_depth=1.0, additional=2.0, vertical=True)
    assert float(upright.outside) == pytest.approx(29.6 * (0.632121 * 0.405465 + 0.367879 * 0.693147), abs=1e-4)
    assert float(upright.inside) == pytest.approx(63.2456, abs=1e-4)


OUTDOORS = 10 - 8 * np.cos(2 * np.pi * np.arange(12) / 12)


def test_the_ground_lags_and_damps_the_open_air() -> None:
    # ISO 13370:2007, annex A: mean 10 °C, half of the swing of 8 K, coldest one month after January.
    ground = equivalent_temperature(80.0, 40.0, OUTDOORS, 1.0)
    assert ground.mean() == pytest.approx(10.0, abs=1e-12)
    assert ground.argmin() == 1
    assert (ground.min(), ground.max()) == pytest.approx((6.0, 14.0))
    assert ground.shape == (12,)


def test_the_southern_hemisphere_is_six_months_apart() -> None:
    assert (coldest_month(52.0), coldest_month(-33.9)) == (1, 7)
    south = equivalent_temperature(80.0, 40.0, np.roll(OUTDOORS, 6), 1.0, coldest_month(-33.9))
    assert south == pytest.approx(np.roll(equivalent_temperature(80.0, 40.0, OUTDOORS, 1.0), 6), abs=1e-12)


def test_several_floors_at_once() -> None:
    lags = [PHASES["slab"][1], PHASES["slab with vertical edge insulation"][1], PHASES["suspended floor"][1]]
    ground = equivalent_temperature([80.0, 80.0, 80.0], [40.0, 20.0, 10.0], OUTDOORS, lags)
    assert ground.shape == (3, 12)
    assert ground.min(axis=1) == pytest.approx([6.0, 8.0, 9.0], abs=1e-12)
    assert ground.argmin(axis=1).tolist() == [1, 2, 0]


def test_the_flow_of_a_constant_room_is_that_of_the_equivalent_temperature() -> None:
    swing = PeriodicCoefficients(np.asarray(70.0), np.asarray(40.0))
    flow = monthly_heat_flow(80.0, swing, np.full(12, 20.0), OUTDOORS, PHASES["slab"])
    assert flow == pytest.approx(80.0 * (20.0 - equivalent_temperature(80.0, 40.0, OUTDOORS, 1.0)), abs=1e-9)


def test_a_room_that_is_colder_in_january_loses_less_then() -> None:
    # By hand: H_g 80·(20 − 10) = 800; January: − 70·2 + 40·8·cos(30°) = − 140 + 277.13.
    swing = PeriodicCoefficients(np.asarray(70.0), np.asarray(40.0))
    room = 20 - 2 * np.cos(2 * np.pi * np.arange(12) / 12)
    assert monthly_heat_flow(80.0, swing, room, OUTDOORS, (0.0, 1.0))[0] == pytest.approx(937.13, abs=0.005)
