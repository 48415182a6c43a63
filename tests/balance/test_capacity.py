"""Storage of faces and zones against vectors worked out apart from the project and hand calculation."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any, TypeAlias

import numpy as np
import pytest

from heatledger.balance.calculate import calculate
from heatledger.balance.capacity import effective_thickness_capacity, face_capacities, heat_capacities, swing_of
from heatledger.balance.constructions import Construction, construct
from heatledger.building.model import Building
from heatledger.errors import InputError

Layer: TypeAlias = Callable[..., dict[str, Any]]
Rows: TypeAlias = Callable[..., dict[str, list[dict[str, Any]]]]
Build: TypeAlias = Callable[[Any], Building]
Placed: TypeAlias = Callable[..., Construction]

AIR_AND_FURNITURE = 50 * 10.0
"""Of the room of 50 m². [kJ/K]"""


@pytest.fixture(scope="module")
def placed(building: Build, wall_rows: Rows) -> Placed:
    def of(*layers: dict[str, Any], **element: Any) -> Construction:
        return construct(building(wall_rows(layers, **element))).of_element["W"]

    return of


def test_vectors_through_the_engine(placed: Placed, make_layer: Layer) -> None:
    """Worked out apart from the project from ISO 13786:2017, 7.2: concrete insulated outside, R_si 0.13, R_se 0.04."""
    found = placed(make_layer("Concrete", 200), make_layer("Insulation", 100), make_layer("Render", 5))
    swing = swing_of(found, *found.surfaces)
    assert swing.inside_admittance == pytest.approx(5.9418, abs=5.1e-5)
    assert swing.periodic_transmittance == pytest.approx(0.0606, abs=5.1e-5)
    assert swing.time_shift == pytest.approx(8.1088, abs=5.1e-5)
    assert swing.inside_capacity == pytest.approx(82290, abs=0.6)
    assert swing.outside_capacity == pytest.approx(12480, abs=0.6)
    assert effective_thickness_capacity(found) == pytest.approx(240e3)


def test_storage_of_the_balance_leaves_the_film_out(placed: Placed, make_layer: Layer) -> None:
    """A thin sheet before weightless insulation stores its whole mass: 12.5 mm of 900 kg/m³ and 1000 J/(kg·K)."""
    found = placed(make_layer("Plasterboard", 12.5), make_layer("Weightless", 200))
    inner, outer = face_capacities(found)
    assert inner == pytest.approx(11250, rel=0.01)
    assert outer < 0.1 * inner


def test_capacity_of_a_bridged_layer_is_weighted_by_share(placed: Placed, make_layer: Layer) -> None:
    """By hand: 100 mm of 80 % wool of 30·1000 and 20 % timber of 500·1600: 0.8·3 + 0.2·80 = 18.4 kJ/(m²·K)."""
    found = placed(make_layer("Wool", 100, second_material="Timber", second_share=20.0))
    assert [part.capacity for part in found.slices] == pytest.approx([18400])


def test_voids_store_nothing(placed: Placed, make_layer: Layer) -> None:
    """By hand: 200 mm of 2 MJ/(m³·K), two rows of 60 mm with 50 % voids; shells of 26.667 mm."""
    voids = {"void_width": 60.0, "void_depth": 60.0, "void_share": 50.0, "void_rows": 2}
    found = placed(make_layer("Stone", 200, **voids))
    shell, row = 2e6 * 0.08 / 3, 2e6 * 0.06 * 0.5
    assert [part.capacity for part in found.slices] == pytest.approx([shell, row, shell, row, shell])
    jointed = placed(make_layer("Stone", 200, **voids, second_material="Timber", second_share=10.0))
    assert jointed.slices[1].capacity == pytest.approx(0.9 * row + 0.1 * 0.06 * 500 * 1600)


@pytest.mark.parametrize(("taper", "mean"), [("rectangle", 1 / 2), ("triangle thick at apex", 1 / 3), ("none", 1)])
def test_a_tapered_layer_stores_with_its_mean_thickness(
    placed: Placed, make_layer: Layer, taper: str, mean: float
) -> None:
    found = placed(make_layer("Stone", 100, taper=taper), make_layer("Wool", 100), kind="roof")
    assert found.slices[0].capacity == pytest.approx(200e3 * mean)


def test_layers_outside_a_ventilated_cavity_store_nothing_for_the_room(placed: Placed, make_layer: Layer) -> None:
    wall = (make_layer("Wool", 100), make_layer("well ventilated", 40))
    with_brick, without = placed(*wall, make_layer("Brick", 102)), placed(*wall, make_layer("Plywood", 9))
    assert face_capacities(with_brick) == face_capacities(without)


def _capacity(building: Build, rows: dict[str, list[dict[str, Any]]]) -> list[float]:
    """Of every zone. [kJ/K]"""
    made = building(rows)
    return [float(capacity) / 1000 for capacity in heat_capacities(made, construct(made))]


def test_an_inner_partition_stores_with_both_faces(
    building: Build, wall_rows: Rows, make_layer: Layer, placed: Placed
) -> None:
    """ISO 13786:2017, 7.4: a partition inside a zone; heat passes nowhere, so it shows in no loss."""
    partition = {"kind": "partition", "faces": "Z"}
    layers = [make_layer("Concrete", 100), make_layer("Plasterboard", 12.5)]
    inner, outer = face_capacities(placed(*layers, **partition))
    assert inner != pytest.approx(outer, rel=0.01)
    (found,) = _capacity(building, wall_rows(layers, **partition))
    assert found == pytest.approx((inner + outer) * 30 / 1000 + AIR_AND_FURNITURE, rel=1e-12)


def test_a_partition_between_zones_gives_each_its_face(
    building: Build, wall_rows: Rows, make_layer: Layer, placed: Placed
) -> None:
    layers = [make_layer("Concrete", 100), make_layer("Insulation", 50)]
    rows = wall_rows(layers, kind="partition", faces="Y")
    rows["Zones"].append(rows["Zones"][0] | {"name": "Y"})
    inner, outer = face_capacities(placed(*layers, kind="partition", faces="neighbour"))
    here, there = _capacity(building, rows)
    assert here == pytest.approx(inner * 30 / 1000 + AIR_AND_FURNITURE, rel=1e-12)
    assert there == pytest.approx(outer * 30 / 1000 + AIR_AND_FURNITURE, rel=1e-12)


def test_results_show_both_kinds_of_capacity(
    building: Build, wall_rows: Rows, make_layer: Layer, flat_sky: Any
) -> None:
    """κ with the films, storage of the balance without, and the effective thickness beside."""
    rows = wall_rows([make_layer("Concrete", 200), make_layer("Insulation", 100), make_layer("Render", 5)])
    (found,) = calculate(building(rows), flat_sky(np.full(12, 5.0))).build_ups
    assert found.inside_capacity == pytest.approx(82.290, abs=6e-4)
    assert found.outside_capacity == pytest.approx(12.480, abs=6e-4)
    assert found.effective_heat_capacity == pytest.approx(240.0)
    assert found.internal_heat_capacity == pytest.approx(240.0, rel=0.15)
    assert found.time_constant == pytest.approx(found.internal_heat_capacity / found.u_value / 3.6, rel=1e-12)


def test_so_much_mass_that_nothing_passes_is_told(building: Build, wall_rows: Rows, make_layer: Layer) -> None:
    rows = wall_rows([make_layer("Lead dust", 5000)])
    rows["Materials"].append({"name": "Lead dust", "conductivity": 0.01, "density": 15000.0, "specific_heat": 5000.0})
    with pytest.raises(InputError) as raised:
        _capacity(building, rows)
    assert str(raised.value) == (
        "Build-ups!D5  Thickness [mm]: found too much mass in 'Wall'; expected layers through which some heat passes "
        "within a day. Correct thicknesses, and densities and specific heats on sheet Materials."
    )
