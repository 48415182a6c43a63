"""Obstructions, movable shading and glass at an angle in the balance of a room."""

from __future__ import annotations

from collections.abc import Callable
from pathlib import Path
from typing import Any

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from heatledger.balance.calculate import calculate
from heatledger.building.model import Building
from heatledger.building.shading import SECTOR_FIELDS, fabrics
from heatledger.climate.files import open_climate
from heatledger.climate.hourly import HourlyClimate
from heatledger.climate.monthly import MonthlyClimate
from heatledger.climate.obstruction import SECTORS, no_obstructions
from heatledger.climate.surfaces import Sunlight, Surfaces
from heatledger.errors import InputError
from heatledger.inputs.columns import SheetRow
from heatledger.inputs.rows import ObstructionRow, ShadingDeviceRow
from heatledger.results import Results

Build = Callable[[Any], Building]
FLAT = np.full(12, 100.0)


@pytest.fixture(scope="module")
def golden() -> HourlyClimate:
    return open_climate("Golden CO", Path())


def room(building: Build, climate: Any, **changes: Any) -> Results:
    """A cooled room with a south wall of 30 m² and a window of 2.0 m by 1.5 m, g = 0.6, a quarter frame."""
    wall = {"name": "W", "zone": "Z", "kind": "wall", "faces": "outdoors", "u_value": 0.5, "area": 30.0}
    window = {"name": "O", "element": "W", "glazed_unit": "G", "width": 2.0, "height": 1.5}
    zone = {"name": "Z", "conditioning": "heated and cooled", "usage": "U", "floor_area": 30.0, "air_volume": 75.0}
    obstructions, devices = changes.get("obstructions", []), changes.get("devices", [])
    values = {
        "Project": [{"project": "P", "weather": "x", "method": "ISO 13790:2008"} | changes.get("project", {})],
        "Zones": [zone | {"heat_capacity": 150.0}],
        "Usage": [{"name": "U", "heating_set_point": 20.0, "cooling_set_point": 26.0}],
        "Glazed units": [{"name": "G", "u_value": 1.5, "g_value": 0.6, "frame_share": 25.0} | changes.get("unit", {})],
        "Envelope": [wall | {"azimuth": 180.0, "absorptance": 0.6} | changes.get("wall", {})],
        "Openings": changes.get("openings", [window | changes.get("window", {})]),
        "Obstructions": [{"name": "X"} | obstruction for obstruction in obstructions],
        "Shading devices": [{"name": "D"} | device for device in devices],
    }
    return calculate(building(values), climate)


def notes(results: Results, kind: str) -> list[str]:
    return [note.text for note in results.notes if note.kind == kind]


def single(climate: HourlyClimate, threshold: float = np.inf, **parts: float) -> Sunlight:
    """The window asked of the climate alone."""
    before = {name: np.array([part]) for name, part in ({"width": 2.0, "height": 1.5} | parts).items()}
    row = no_obstructions(1)._replace(**before)
    asked = Surfaces(np.array([90.0]), np.array([180.0]), row, np.array([threshold]), np.zeros(1, np.intp))
    return climate.sunlight(asked, 0.2)


def test_an_obstruction_cuts_the_gains_by_its_factor_at_the_real_size(building: Build, golden: HourlyClimate) -> None:
    """0.9·0.6·0.75·3 m² = 1.215 m² collect what is left of the irradiation."""
    overhang = {"overhang_depth": 1.0, "overhang_distance": 0.3}
    (found,) = room(building, golden, obstructions=[overhang], window={"obstruction": "x"}).opening_gains
    expected = single(golden, reflectance=0.2, **overhang)
    assert found.obstruction == "X"
    assert found.irradiation == pytest.approx(expected.free[0])
    assert found.obstruction_factor == pytest.approx(expected.received[0] / expected.free[0])
    assert found.gains == pytest.approx(1.215 * expected.received[0])
    assert found.gains_cooling == pytest.approx(found.gains)
    assert 0.3 < found.obstruction_factor.min() < found.obstruction_factor.max() < 0.95


def test_an_opening_without_its_own_takes_the_obstruction_of_its_element(
    building: Build, golden: HourlyClimate
) -> None:
    window = {"element": "W", "glazed_unit": "G", "width": 2.0, "height": 1.5}
    both = room(
        building,
        golden,
        obstructions=[{"horizon_south": 30.0}, {"name": "Open"}],
        wall={"obstruction": "X"},
        openings=[window | {"name": "A"}, window | {"name": "B", "obstruction": "Open"}],
    )
    inherited, own = both.opening_gains
    assert (inherited.obstruction, own.obstruction) == ("X", "Open")
    assert inherited.obstruction_factor.min() < 0.6
    assert own.obstruction_factor == pytest.approx(np.ones(12))


def test_of_an_obstruction_only_the_horizon_counts_for_an_element(building: Build, golden: HourlyClimate) -> None:
    without = room(building, golden, openings=[])
    parts = {"overhang_depth": 2.0, "reveal_depth": 0.5, "left_fin_depth": 2.0}
    near = room(building, golden, openings=[], obstructions=[parts], wall={"obstruction": "X"})
    far = room(building, golden, openings=[], obstructions=[parts | {"horizon_south": 40.0}], wall={"obstruction": "X"})
    assert near.zone("Z").solar_gains == pytest.approx(without.zone("Z").solar_gains)
    assert (far.zone("Z").solar_gains < without.zone("Z").solar_gains).all()
    text = (
        "W: of the obstruction 'X' only the horizon counts for an element; overhang, fins and reveal count for "
        "openings that name it."
    )
    assert text in notes(near, "check")
    assert text not in notes(room(building, golden, obstructions=[parts], wall={"obstruction": "X"}), "check")


def test_what_was_done_is_said(building: Build, golden: HourlyClimate) -> None:
    obstruction = (
        "Obstructions: lit share of each opening in every hour for the sun and the bright sky around it; view factors "
        "for the rest of the sky and the ground; what is hidden shines with the reflectance times the brightness of "
        "what it hides. Losses to the sky are those of an open sky."
    )
    shading = (
        "Movable shading: ISO 13790:2008, 11.4.3, weighted by the sun on the plane of the opening in the hours above "
        "the threshold, separately for heating and cooling."
    )
    glass = "Sun through glass: 0.9·g (ISO 13790:2008, 11.4.2), by the share of glass in each opening."
    plain = notes(room(building, golden), "method")
    shaded = room(
        building,
        golden,
        obstructions=[{"horizon_south": 20.0}],
        devices=[{"reduction_factor": 0.3}],
        window={"obstruction": "X", "shading": "D"},
    )
    assert glass in plain
    assert not {obstruction, shading} & set(plain)
    assert {obstruction, shading, glass} <= set(notes(shaded, "method"))
    defaults = [text for text in notes(shaded, "default") if text.startswith(("Reflectance", "Irradiance", "Used"))]
    assert defaults == [
        "Reflectance [-] of X: empty, taken as 0.2 (one fifth, the rule of the split-flux method of daylighting "
        "(Hopkinson and others 1966)).",
        "Irradiance threshold [W/m²] of D: empty, taken as 300 (ISO 13790:2008, annex G).",
        "Used in heating of D: empty, taken as no (while heating is needed the sun is welcome; glare is left aside).",
        "Used in cooling of D: empty, taken as yes (what movable shading is for).",
    ]


def test_movable_shading_by_irradiance_counts_in_cooling_only_unless_told(
    building: Build, golden: HourlyClimate
) -> None:
    """ISO 13790:2008, 11.4.3: [(1 − f)·g + f·0.3·g]/g = 1 − 0.7·f, f of the plane behind its obstruction."""
    overhang = {"overhang_depth": 0.6}
    common: dict[str, Any] = {"obstructions": [overhang], "window": {"obstruction": "X", "shading": "D"}}
    bare = room(building, golden, obstructions=[overhang], window={"obstruction": "X"})
    usual = room(building, golden, devices=[{"reduction_factor": 0.3}], **common)
    both = room(building, golden, devices=[{"reduction_factor": 0.3, "used_in_heating": "yes"}], **common)
    sun = single(golden, 300.0, reflectance=0.2, **overhang)
    factor = 1 - 0.7 * sun.bright[0] / sun.received[0]
    (found,) = usual.opening_gains
    assert found.shading_factor_heating == pytest.approx(np.ones(12))
    assert found.shading_factor_cooling == pytest.approx(factor)
    assert found.gains_cooling == pytest.approx(factor * found.gains)
    assert both.opening_gains[0].shading_factor_heating == pytest.approx(factor)
    without, shaded, always = (results.zone("Z") for results in (bare, usual, both))
    assert shaded.solar_gains == pytest.approx(without.solar_gains)
    # In high summer the overhang leaves no hour bright.
    assert (shaded.solar_gains_cooling <= without.solar_gains_cooling).all()
    assert shaded.solar_gains_cooling[0] < 0.6 * without.solar_gains_cooling[0]
    assert shaded.heating_need == pytest.approx(without.heating_need)
    assert shaded.cooling_need.sum() < 0.8 * without.cooling_need.sum()
    assert always.heating_need.sum() > 1.05 * without.heating_need.sum()
    assert always.cooling_need == pytest.approx(shaded.cooling_need)


def test_an_unconditioned_zone_follows_the_mode(building: Build, golden: HourlyClimate) -> None:
    """Shading of a sunspace lowers the cooling need of the room behind it, and nothing else."""

    def house(**window: str) -> Results:
        zone = {"usage": "U", "floor_area": 30.0, "air_volume": 75.0, "heat_capacity": 150.0}
        wall = {"kind": "wall", "u_value": 2.0, "area": 20.0, "azimuth": 180.0}
        values = {
            "Project": [{"project": "P", "weather": "x", "method": "ISO 13790:2008"}],
            "Zones": [
                zone | {"name": "Z", "conditioning": "heated and cooled"},
                zone | {"name": "Sun", "conditioning": "unconditioned"},
            ],
            "Usage": [{"name": "U", "heating_set_point": 20.0, "cooling_set_point": 26.0, "appliances": 40.0}],
            "Glazed units": [{"name": "G", "u_value": 2.8, "g_value": 0.75}],
            "Envelope": [
                wall | {"name": "W", "zone": "Z", "faces": "Sun"},
                wall | {"name": "V", "zone": "Sun", "faces": "outdoors"},
            ],
            "Openings": [{"name": "O", "element": "V", "glazed_unit": "G", "width": 6.0, "height": 3.0} | window],
            "Shading devices": [{"name": "D", "reduction_factor": 0.2}],
        }
        return calculate(building(values), golden)

    bare, shaded = house(), house(shading="D")
    assert shaded.zone("Z").cooling_need.sum() < 0.9 * bare.zone("Z").cooling_need.sum()
    assert shaded.zone("Z").heating_need == pytest.approx(bare.zone("Z").heating_need)
    assert shaded.zone("Sun").temperature == pytest.approx(bare.zone("Sun").temperature)


@pytest.mark.parametrize(
    ("months", "drawn"), [((5, 6, 7, 8, 9), [0] * 4 + [1] * 5 + [0] * 3), ((11, 12, 1), [1] + [0] * 9 + [1, 1])]
)
def test_control_by_months_needs_no_hours(
    building: Build, flat_sky: Any, months: tuple[int, ...], drawn: list[int]
) -> None:
    device = {"reduction_factor": 0.25, "control": "months", "months_used": months}
    climate = flat_sky(np.full(12, 10.0), FLAT)
    (found,) = room(building, climate, devices=[device], window={"shading": "D"}).opening_gains
    assert found.shading_factor_cooling == pytest.approx(1 - 0.75 * np.array(drawn))
    assert found.gains == pytest.approx(1.215 * FLAT)


def test_months_limit_a_device_controlled_by_irradiance(building: Build, golden: HourlyClimate) -> None:
    device = {"reduction_factor": 0.0, "months_used": (6, 7, 8)}
    (found,) = room(building, golden, devices=[device], window={"shading": "D"}).opening_gains
    assert (found.shading_factor_cooling[5:8] < 0.6).all()
    assert found.shading_factor_cooling[[0, 1, 2, 3, 4, 8, 9, 10, 11]] == pytest.approx(np.ones(9))


@pytest.mark.parametrize(
    ("device", "place", "reduction"),
    [
        # ISO 13790:2008, annex G, recalled from memory.
        ("white venetian blind 10 %", "inside", 0.30),
        ("white venetian blind 10 %", "outside", 0.15),
        ("coloured fabric 30 %", "inside", 0.57),
        ("aluminium-coated fabric 5 %", "outside", 0.08),
        # EN 13363-1 by hand, g 0.6, U 1.5: G = 1; 0.1 + (0.1 + 0.4·0.8)·1/3 = 0.24.
        ("white venetian blind 10 %", "between", 0.24),
    ],
)
def test_devices_of_the_table(building: Build, flat_sky: Any, device: str, place: str, reduction: float) -> None:
    row = {"device": device, "place": place, "control": "months", "months_used": (1,)}
    climate = flat_sky(np.full(12, 10.0), FLAT)
    (found,) = room(building, climate, devices=[row], window={"shading": "D"}).opening_gains
    assert found.shading_factor_cooling[0] == pytest.approx(reduction, abs=1e-9)


def test_the_table_holds_every_device_of_the_list() -> None:
    assert tuple(fabrics()) == ShadingDeviceRow.columns()["device"].choices
    for fabric in fabrics().values():
        assert 0 < fabric.outside <= fabric.inside < 1
        assert fabric.absorptance + fabric.transmittance <= 1 + 1e-9


def test_sectors_stand_in_the_order_of_the_compass() -> None:
    titles = [ObstructionRow.columns()[field].title for field in SECTOR_FIELDS]
    assert titles == [f"Horizon {sector}" for sector in SECTORS]


def test_glass_by_hour_is_reported_per_opening(building: Build, golden: HourlyClimate) -> None:
    by_hour = {"project": {"glass_angle": "by hour"}}
    standard = room(building, golden).opening_gains[0]
    (found,) = room(building, golden, **by_hour).opening_gains
    assert standard.angle_factor == pytest.approx(0.9)
    assert standard.g_value == pytest.approx(0.54)
    # A south window in Golden: much sun at steep angles; two panes.
    assert 0.82 < found.angle_factor < 0.9
    assert found.g_value == pytest.approx(0.6 * found.angle_factor)
    assert found.gains.sum() == pytest.approx(0.75 * 3.0 * 0.6 * found.angle_factor * found.irradiation.sum())
    assert found.gains[11] / standard.gains[11] > 1.0 > found.gains[5] / standard.gains[5]
    panes = {"unit": {"u_value": None, "panes": 3, "gap": 12.0, "frame_u_value": 1.4, "edge": 0.06}}
    (triple,) = room(building, golden, **by_hour, **panes).opening_gains
    assert triple.angle_factor < found.angle_factor
    text = (
        "Sun through glass: angle of every hour (Karlsson and Roos 2000), the mean of all directions for sky and "
        f"ground; over the year {found.angle_factor:.2f} to {found.angle_factor:.2f} of g instead of 0.9, by the share "
        "of glass."
    )
    assert text in notes(room(building, golden, **by_hour), "method")


@pytest.mark.parametrize(
    "changes",
    [
        {"obstructions": [{"horizon_south": 20.0}], "window": {"obstruction": "X"}},
        {"devices": [{"reduction_factor": 0.3}], "window": {"shading": "D"}},
        {"project": {"glass_angle": "by hour"}},
    ],
    ids=["obstruction", "shading by irradiance", "glass by hour"],
)
def test_a_table_of_months_is_refused_where_hours_are_needed(building: Build, changes: dict[str, Any]) -> None:
    climate = MonthlyClimate("Hill", np.full(12, 5.0), FLAT, {(90, 180): FLAT})
    with pytest.raises(InputError) as caught:
        room(building, climate, **changes)
    assert str(caught.value) == (
        "Hill: found a table of months; expected a climate of hours, since obstructions, shading by irradiance and "
        "glass by hour follow the sun. Give hourly weather, or leave these out."
    )


lengths = st.floats(0.0, 2.0)


@given(
    parts=st.fixed_dictionaries(
        {"overhang_depth": lengths, "left_fin_depth": lengths, "right_fin_depth": lengths, "reveal_depth": lengths}
        | {"reflectance": st.floats(0.0, 1.0), **dict.fromkeys(SECTOR_FIELDS, st.floats(0.0, 90.0))}
    ),
    azimuth=st.floats(0.0, 360.0),
    tilt=st.floats(0.0, 180.0),
)
@settings(max_examples=25, deadline=None)
def test_an_obstruction_never_raises_gains(
    building: Build, golden: HourlyClimate, parts: dict[str, float], azimuth: float, tilt: float
) -> None:
    wall = {"azimuth": azimuth, "tilt": tilt}
    free = room(building, golden, wall=wall).zone("Z")
    behind = room(building, golden, wall=wall | {"obstruction": "X"}, obstructions=[parts]).zone("Z")
    assert (behind.solar_gains <= free.solar_gains + 1e-9).all()
    assert (behind.solar_gains_cooling <= free.solar_gains_cooling + 1e-9).all()


def test_every_column_of_the_new_sheets_tells_how_to_fill_it_in() -> None:
    models: tuple[type[SheetRow], ...] = (ObstructionRow, ShadingDeviceRow)
    for model in models:
        assert all(len(column.help) > 20 for column in model.columns().values())
