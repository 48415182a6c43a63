"""Result sheets from made-up results: places, sums, texts, charts, print set-up, rendering."""

from __future__ import annotations

import re
import shutil
import subprocess
from dataclasses import fields, replace
from io import BytesIO
from itertools import pairwise
from pathlib import Path
from typing import Any, get_args
from zipfile import ZipFile

import numpy as np
import pytest
from lxml import etree
from openpyxl import Workbook, load_workbook
from openpyxl.worksheet.worksheet import Worksheet

from heatledger.inputs.rows import ElementRow
from heatledger.results import (
    BuildingResult,
    BuildUpComparison,
    BuildUpResult,
    ClimateResult,
    ElementLoss,
    LayerResult,
    Note,
    OpeningGains,
    ProjectResult,
    Results,
    ZoneResult,
    label_of,
)
from heatledger.workbook.guide import CAUTIONS
from heatledger.workbook.monthly import months_of_need
from heatledger.workbook.printed import printed
from heatledger.workbook.result_sheets import RESULT_SHEETS, build_result_sheets
from heatledger.workbook.summary_words import LOSS_GROUPS

MONTHS = ["Jan", "Feb", "Mar", "Apr", "May", "Jun", "Jul", "Aug", "Sep", "Oct", "Nov", "Dec"]
OUTDOOR = np.array([1.2, 2.5, 6.0, 10.1, 14.6, 18.2, 19.6, 19.1, 15.4, 10.2, 5.3, 2.1])
COLD = (20 - OUTDOOR) / 18.8
WARM = np.clip(OUTDOOR - 15, 0, None) / 5.3
SUN = np.array([28, 44, 80, 112, 140, 150, 158, 138, 98, 62, 32, 22]) / 158
DRAWING = "{http://schemas.openxmlformats.org/drawingml/2006/chart}"


def _zone(name: str, conditioning: str, area: float) -> ZoneResult:
    none = np.zeros(12)
    off = conditioning == "unconditioned"
    solar, internal = 3.2 * area * SUN, np.full(12, 0.9 * area)
    losses, gains = 14.0 * area * COLD, solar + internal
    ratio = gains / losses
    utilisation = (1 - ratio**3.4) / (1 - ratio**4.4)
    need = none if off else (losses - utilisation * gains) / 1.1
    cooling = 1.8 * area * WARM if conditioning == "heated and cooled" else none
    return ZoneResult(
        name=name,
        conditioning=conditioning,
        floor_area=area,
        heating_need=need,
        cooling_need=cooling,
        transmission_heating=0.65 * losses,
        ventilation_heating=0.35 * losses,
        transmission_cooling=0.65 * (losses + 2.5 * area),
        ventilation_cooling=0.35 * (losses + 2.5 * area),
        solar_gains=solar,
        solar_gains_cooling=0.8 * solar,
        internal_gains=internal,
        heating_spared=0.1 * need,
        gain_ratio=ratio,
        gain_utilisation=utilisation,
        loss_ratio=gains / (losses + 2.5 * area),
        loss_utilisation=np.clip(SUN, 0, 1),
        heating_season=np.where(need > 0, 1.0, 0.0),
        cooling_season=np.where(cooling > 0, 1.0, 0.0),
        fan_electricity=np.full(12, 0.1 * area),
        heating_use="reduced need",
        cooling_use="continuous",
        exponent=3.4,
        time_constant=36.2,
        heat_capacity=165 * area,
        transmission_coefficient=0.9 * area,
        ventilation_coefficient=0.48 * area,
        heating_set_point=20.0,
        cooling_set_point=26.0,
        temperature=OUTDOOR + 6 if off else np.full(12, 20.0),
        adjustment_factor=0.62,
    )


def _opening(name: str, zone: str, azimuth: float) -> OpeningGains:
    shaded = azimuth > 0
    return OpeningGains(
        name=name,
        zone=zone,
        azimuth=azimuth,
        tilt=90.0,
        area=1.8,
        u_value=1.3,
        g_value=0.58,
        angle_factor=0.9,
        obstruction="Balcony" if shaded else "",
        shading_device="Awning" if shaded else "",
        irradiation=158 * SUN,
        obstruction_factor=1 - 0.3 * SUN * shaded,
        shading_factor_heating=np.ones(12),
        shading_factor_cooling=1 - 0.5 * SUN * shaded,
        gains=42.0 * SUN,
        gains_cooling=42.0 * SUN * (1 - 0.5 * SUN * shaded),
    )


def _losses(zones: list[ZoneResult], each: int) -> tuple[ElementLoss, ...]:
    kinds = ["wall", "opening", "roof", "ground floor", "air leakage", "ventilation", "thermal bridge", "partition"]
    rows = [
        (f"{kind.capitalize()} {number + 1}", zone.name, kind, 900.0 * zone.floor_area / (place * 7 + number + 9))
        for zone in zones
        if zone.conditioning != "unconditioned"
        for place, kind in enumerate(kinds)
        for number in range(each)
    ]
    inside = [zone for zone in zones if zone.conditioning != "unconditioned"]
    total = sum(float(np.sum(zone.transmission_heating + zone.ventilation_heating)) for zone in inside)
    scale = total / sum(loss for *_, loss in rows)
    ranked = sorted(rows, key=lambda row: -row[-1])
    return tuple(
        ElementLoss(
            name, zone, kind, "outdoors", 24.5, 0.31, loss * scale / 80, loss * scale, 100 * loss * scale / total
        )
        for name, zone, kind, loss in ranked
    )


def _build_up(name: str, layers: int, u_value: float = 0.28) -> BuildUpResult:
    materials = ["Gypsum plaster", "Brick 1800", "Mineral wool, board", "Air layer, unventilated", "Lime render"]
    rows = tuple(LayerResult(materials[k % 5], 15.0 + 60 * k, None if k == 3 else 0.7, 0.3) for k in range(layers))
    return BuildUpResult(
        name=name,
        heat_flow="horizontal, outdoors",
        layers=rows,
        thickness=sum(row.thickness for row in rows),
        resistance=0.17 + 0.3 * layers,
        upper_limit=3.6,
        lower_limit=3.4,
        error=2.9,
        correction=0.012,
        u_value=u_value,
        internal_heat_capacity=61.4,
        outer_heat_capacity=12.3,
        effective_heat_capacity=58.0,
        time_constant=61.4 / u_value / 3.6,
        inside_capacity=48.2,
        outside_capacity=11.1,
        inside_admittance=3.51,
        outside_admittance=0.92,
        periodic_transmittance=0.061,
        decrement_factor=0.218,
        time_shift=9.4,
        heat_flux=30 * u_value,
        temperature_factor=0.96,
        inside_surface_temperature=18.9,
        surface_temperatures=tuple(np.linspace(20, -10, layers + 3).tolist()),
    )


def make_results(zones: int = 4, project: str = "Reading room & workshop", name: str = "Zone {}") -> Results:
    """Results of a plausible building; the last of several zones is an unheated stair."""
    kinds = ["heated", "heated and cooled"]
    made = [_zone(name.format(k + 1), kinds[k % 2], 60.0 + 7 * k) for k in range(max(zones - 1, 1))]
    if zones > 1:
        made.append(_zone("Stair", "unconditioned", 18.0))
    inside = [zone for zone in made if zone.conditioning != "unconditioned"]
    building = BuildingResult(
        sum(zone.floor_area for zone in inside),
        np.sum([zone.heating_need for zone in inside], axis=0),
        np.sum([zone.cooling_need for zone in inside], axis=0),
    )
    openings = tuple(_opening(f"O-{k + 1:02}", zone.name, 45.0 * k) for zone in inside for k in range(3))
    notes = (
        Note("check", "The floor height of 1.7 m lies outside 2 to 6 m.", "Zones", "F6"),
        Note("default", "Leakage n50 [1/h]: 6 (common practice for an untested older building).", "Zones", "K6"),
        Note("default", "=SUM(A1) stays a text.", "Air systems", "F7"),
        Note("method", "Utilisation of gains: ISO 13790:2008, 12.2.1.", "", ""),
        Note("source", "Weather: a made-up typical year.", "Project", "B9"),
    )
    pair = (_build_up("Outer wall, brick, insulated", 4), _build_up("Roof", 5, 0.2))
    return Results(
        ProjectResult(project, "=Client", "A. Assessor", "2026-017", "1 Long Lane", "EN ISO 52016-1:2017", "external",
                      270.0, 1162.0),
        ClimateResult("made-up", "none", 45.0, 8.0, OUTDOOR, 158 * SUN),
        tuple(made),
        building,
        _losses(made, 3),
        openings,
        pair,
        notes,
        BuildUpComparison(*pair, "'Roof' holds heat better."),
    )  # fmt: skip


@pytest.fixture(scope="module")
def results() -> Results:
    """As printed; what rounding does is tested on its own."""
    return printed(make_results())


@pytest.fixture(scope="module")
def data() -> bytes:
    return build_result_sheets(make_results())


@pytest.fixture(scope="module")
def book(data: bytes) -> Workbook:
    return load_workbook(BytesIO(data))


def texts(sheet: Worksheet) -> list[str]:
    return [cell.value for row in sheet.iter_rows() for cell in row if isinstance(cell.value, str)]


def row_of(sheet: Worksheet, label: str, after: int = 0) -> int:
    return next(row for row in range(after + 1, sheet.max_row + 1) if sheet.cell(row, 1).value == label)


def numbers(sheet: Worksheet, row: int, first: int, count: int = 12) -> list[Any]:
    return [sheet.cell(row, column).value for column in range(first, first + count)]


def test_sheets_stand_in_the_agreed_order(book: Workbook) -> None:
    agreed = "Summary Monthly_need Monthly_balance Element_losses Solar_gains Build-up_results Notes"
    assert [title.replace(" ", "_") for title in book.sheetnames] == agreed.split()
    assert book.sheetnames == list(RESULT_SHEETS)


def test_the_file_is_the_same_for_the_same_results(data: bytes) -> None:
    assert build_result_sheets(make_results()) == data


def test_monthly_need_holds_every_zone_and_its_sums(book: Workbook, results: Results) -> None:
    sheet = book["Monthly need"]
    for field in ("heating_need", "cooling_need"):
        top = row_of(sheet, label_of(ZoneResult, field))
        for place, zone in enumerate(results.zones[:-1], start=1):
            need = getattr(zone, field)
            assert sheet.cell(top + place, 1).value == zone.name
            assert numbers(sheet, top + place, 3) == pytest.approx(need.tolist())
            assert sheet.cell(top + place, 15).value == pytest.approx(need.sum())
            assert sheet.cell(top + place, 16).value == pytest.approx(need.sum() / zone.floor_area)
        total = row_of(sheet, "Building", top)
        above = [numbers(sheet, row, 3, 13) for row in range(top + 1, total)]
        assert numbers(sheet, total, 3, 13) == pytest.approx(np.sum(above, axis=0).tolist())


def test_monthly_balance_of_the_building_closes(book: Workbook, results: Results) -> None:
    sheet = book["Monthly balance"]
    assert numbers(sheet, 6, 2) == pytest.approx(OUTDOOR.tolist())
    rows = range(8, 15)
    assert [sheet.cell(row, 1).value for row in rows] == [
        "Heating need [kWh]",
        "Internal gains [kWh]",
        "Solar gains less sky losses [kWh]",
        "Spared by reduced heating hours [kWh]",
        "Transmission [kWh]",
        "Ventilation [kWh]",
        "Gains not used, and rounding [kWh]",
    ]
    flows = np.array([numbers(sheet, row, 2, 13) for row in rows], dtype=float)
    assert flows.sum(axis=0).tolist() == [0.0] * 13
    assert flows[0, 12] == pytest.approx(results.building.heating_need.sum())
    spared = np.sum([zone.heating_spared for zone in results.zones], axis=0)
    assert flows[3, :12].tolist() == pytest.approx(spared.tolist())
    assert not np.any((flows < 0) & (flows > -0.5))


def test_monthly_balance_shows_both_modes_of_a_zone(book: Workbook, results: Results) -> None:
    sheet, zone = book["Monthly balance"], results.zones[1]
    top = row_of(sheet, "Zone 2 · heated and cooled · 67.0 m²")
    shown = "solar_gains internal_gains transmission_heating ventilation_heating gain_utilisation heating_spared "
    shown += "heating_need heating_season solar_gains_cooling "
    shown += "transmission_cooling ventilation_cooling loss_ratio loss_utilisation cooling_need"
    for field in shown.split():
        row = row_of(sheet, label_of(ZoneResult, field), top)
        assert numbers(sheet, row, 2) == pytest.approx(getattr(zone, field).tolist())
    facts = {
        "heating_use": (18, 2),
        "cooling_use": (18, 8),
        "exponent": (18, 14),
        "time_constant": (19, 2),
        "heat_capacity": (19, 8),
        "transmission_coefficient": (19, 14),
        "ventilation_coefficient": (20, 2),
        "heating_set_point": (20, 8),
        "cooling_set_point": (20, 14),
    }
    titles = {2: 1, 8: 4, 14: 10}
    for field, (row, column) in facts.items():
        value = getattr(zone, field)
        assert sheet.cell(top + row, titles[column]).value == label_of(ZoneResult, field)
        assert sheet.cell(top + row, column).value == (value if isinstance(value, str) else pytest.approx(value))


def test_a_temperature_has_a_mean_of_the_year_weighted_by_days(book: Workbook) -> None:
    sheet = book["Monthly balance"]
    days = [31, 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31]
    expected = sum(t * d for t, d in zip(OUTDOOR, days, strict=True)) / 365
    assert sheet.cell(row_of(sheet, "Outdoor temperature [°C]"), 14).value == pytest.approx(expected)


def test_an_unconditioned_zone_shows_temperature_and_factor(book: Workbook) -> None:
    sheet = book["Monthly balance"]
    top = row_of(sheet, "Stair · unconditioned · 18.0 m²")
    below = [sheet.cell(row, 1).value for row in range(top + 1, sheet.max_row + 1)]
    assert "Temperature in heating mode [°C]" in below
    assert "Adjustment factor b [-]" in below
    assert "Heating need [kWh]" not in below


def test_element_losses_are_ranked_and_summed(book: Workbook, results: Results) -> None:
    sheet = book["Element losses"]
    count = len(results.element_losses)
    losses: list[Any] = [sheet.cell(row, 9).value for row in range(26, 26 + count)]
    assert losses == sorted(losses, reverse=True)
    assert sheet.cell(24, 9).value == "Loss in months with heating [kWh/a]"
    assert sheet.cell(25, 2).value == "Sum"
    assert sheet.cell(25, 9).value == pytest.approx(sum(losses))
    assert sheet.cell(25, 10).value == pytest.approx(100)


def test_solar_gains_hold_irradiation_and_gains_of_both_modes(book: Workbook, results: Results) -> None:
    sheet = book["Solar gains"]
    for field in ("irradiation", "gains", "gains_cooling"):
        top = row_of(sheet, label_of(OpeningGains, field))
        assert numbers(sheet, top + 1, 9) == pytest.approx(getattr(results.opening_gains[0], field).tolist())
        assert sheet.cell(top + 1, 8).value == 0.9
        if field != "irradiation":
            total = sum(float(getattr(opening, field).sum()) for opening in results.opening_gains)
            assert sheet.cell(row_of(sheet, "Building", top), 21).value == pytest.approx(total)


@pytest.mark.parametrize(
    ("field", "name"),
    [
        ("obstruction_factor", "Balcony"),
        ("shading_factor_cooling", "Awning"),
    ],
)
def test_solar_gains_hold_the_factors_of_shaded_openings(
    book: Workbook, results: Results, field: str, name: str
) -> None:
    """The first opening has neither; the year's factor is weighted by the sun."""
    sheet, shaded = book["Solar gains"], results.opening_gains[1]
    row = row_of(sheet, label_of(OpeningGains, field)) + 1
    factors = getattr(shaded, field)
    assert [sheet.cell(row, column).value for column in (1, 2, 3)] == [shaded.name, shaded.zone, name]
    assert numbers(sheet, row, 9) == pytest.approx(factors.tolist())
    assert sheet.cell(row, 21).value == pytest.approx((factors * SUN).sum() / SUN.sum())


def test_factors_that_change_nothing_are_not_shown(book: Workbook) -> None:
    assert label_of(OpeningGains, "shading_factor_heating") not in texts(book["Solar gains"])


def test_build_up_results_hold_a_temperature_behind_every_layer(book: Workbook, results: Results) -> None:
    sheet, build_up = book["Build-up results"], results.build_ups[0]
    top = row_of(sheet, "Inside air")
    count = len(build_up.layers) + 3
    assert [sheet.cell(top + k, 6).value for k in range(count)] == pytest.approx(build_up.surface_temperatures)
    assert [sheet.cell(top + k, 2).value for k in range(count)] == [None, 0, 15, 90, 225, 420, None]
    assert sheet.cell(top + count - 1, 1).value == "Outside air"
    assert sheet.cell(top + 2, 1).value == "Gypsum plaster"
    assert sheet.cell(top + 5, 4).value == "–"


def test_build_up_results_show_every_figure(book: Workbook, results: Results) -> None:
    sheet, build_up = book["Build-up results"], results.build_ups[0]
    titles = {item.name: label_of(BuildUpResult, item.name) for item in fields(BuildUpResult)}
    for name in set(titles) - {"layers", "surface_temperatures"}:
        beside = [
            sheet.cell(cell.row, column).value
            for row in sheet.iter_rows()
            for cell in row
            if cell.value == titles[name]
            for column in range(cell.column + 1, cell.column + 4)
        ]
        below = [
            sheet.cell(cell.row + 1, cell.column).value
            for row in sheet.iter_rows(max_row=5)
            for cell in row
            if cell.value == titles[name]
        ]
        value = getattr(build_up, name)
        shown = value if isinstance(value, str) else pytest.approx(value)
        assert any(found == shown for found in (*beside, *below)), name


def test_layers_beyond_a_ventilated_cavity_have_no_temperature(results: Results) -> None:
    open_ = replace(results.build_ups[0], surface_temperatures=(20.0, 18.0, 17.0, -10.0))
    data = build_result_sheets(replace(results, build_ups=(open_,), comparison=None))
    sheet = load_workbook(BytesIO(data))["Build-up results"]
    top = row_of(sheet, "Inside air")
    assert [sheet.cell(top + k, 6).value for k in range(7)] == [20, 18, 17, -10, "–", "–", -10]


def test_temperature_profiles_are_drawn_over_depth(data: bytes, results: Results) -> None:
    charts = [chart for chart in _charts(data) if chart.find(f".//{DRAWING}scatterChart") is not None]
    assert len(charts) == len(results.build_ups) + 1  # and the two side by side
    values, depths = (
        [[float(point.text or "") for point in chart.iterfind(f".//{DRAWING}{axis}//{DRAWING}v")] for chart in charts]
        for axis in ("yVal", "xVal")
    )
    assert list(results.build_ups[0].surface_temperatures) in [pytest.approx(found) for found in values]
    assert [-20, 0, 15, 90, 225, 420, 440] in depths
    titles = {_words(title) for chart in charts for title in chart.iter(f"{DRAWING}title")}
    assert {"Depth from the inner surface [mm]", "Temperature [°C]", "Temperatures side by side"} <= titles


def test_two_build_ups_stand_side_by_side(book: Workbook, results: Results) -> None:
    sheet = book["Build-up results"]
    assert results.comparison is not None
    assert results.comparison.verdict in texts(sheet)
    row = row_of(sheet, label_of(BuildUpResult, "u_value"))
    assert [sheet.cell(row, column).value for column in (2, 3, 5)] == [0.28, 0.2, "the second"]
    row = row_of(sheet, label_of(BuildUpResult, "time_shift"))
    assert sheet.cell(row, 5).value == "alike"
    row = row_of(sheet, label_of(BuildUpResult, "thickness"))
    assert sheet.cell(row, 5).value is None


def test_notes_are_grouped_and_lead_to_their_cells(book: Workbook) -> None:
    sheet = book["Notes"]
    assert sheet["A3"].value == (
        "A click on a cell's name leads to the cell. Result sheets are written anew at each run: "
        "keep remarks of your own on other sheets."
    )
    groups = [text for text in texts(sheet) if re.search(r": (\d+|none)$", text)]
    assert groups == [
        "Please look at these again: 1",
        "Defaults used for empty cells: 2",
        "Method, step by step: 1",
        "Sources of data: 1",
    ]
    links = {cell.value: cell.hyperlink.location for cell in sheet["A"] if cell.hyperlink}
    assert links == {
        "Zones!F6": "'Zones'!F6",
        "Zones!K6": "'Zones'!K6",
        "Air systems!F7": "'Air systems'!F7",
        "Project!B9": "'Project'!B9",
    }


def test_summary_says_what_matters(book: Workbook, results: Results) -> None:
    shown = texts(book["Summary"])
    need = results.building.heating_need
    top = results.element_losses[0]
    assert "Reading room & workshop" in shown
    assert f"Jan, {need[0]:,.0f} kWh" in shown
    assert (
        f"Largest single loss: {top.name} ({top.kind}, {top.zone}), {top.loss:,.0f} kWh a year, "
        f"{top.share:.0f} % of the losses." in shown
    )
    assert any(text.startswith("Main driver of heating: walls, ") for text in shown)
    assert any(text.startswith("Main driver of cooling: solar gains, ") for text in shown)
    assert "1 check asks for a second look: see sheet Notes." in shown
    assert set(CAUTIONS) <= set(shown)


def test_summary_sums_agree(book: Workbook, results: Results) -> None:
    sheet = book["Summary"]
    assert sheet["B6"].value == pytest.approx(results.building.floor_area)
    heating = row_of(sheet, "Heating need [kWh]")
    assert numbers(sheet, heating, 2) == pytest.approx(results.building.heating_need.tolist())
    assert sheet.cell(heating, 14).value == pytest.approx(results.building.heating_need.sum())
    total = row_of(sheet, "Sum")
    walls = row_of(sheet, "Walls")
    groups: list[Any] = [sheet.cell(row, 2).value for row in range(walls, total)]
    assert sheet.cell(total, 2).value == pytest.approx(sum(groups))
    assert sheet.cell(total, 2).value == pytest.approx(sum(loss.loss for loss in results.element_losses))


def test_heat_from_a_warmer_space_keeps_the_shares_at_a_hundred(results: Results) -> None:
    warm = replace(results.element_losses[-1], name="To flat", kind="partition", loss=-800.0, share=-4.8)
    losses = (*results.element_losses, warm)
    sheet = load_workbook(BytesIO(build_result_sheets(replace(results, element_losses=losses))))["Summary"]
    total = row_of(sheet, "Sum")
    assert sheet.cell(total, 2).value == pytest.approx(sum(loss.loss for loss in losses))
    assert sheet.cell(total, 4).value == pytest.approx(100)


def test_every_kind_of_loss_has_its_line() -> None:
    elements = get_args(ElementRow.model_fields["kind"].annotation)
    assert set(LOSS_GROUPS) == {*elements, "opening", "ground floor", "thermal bridge", "air leakage", "ventilation"}


def _needs(*years: float) -> Results:
    """Heating and cooling of a building of one zone of 60 m², all of it in March."""
    march = np.eye(12)[2]
    made = make_results(1)
    need = dict(zip(("heating_need", "cooling_need"), (year * march for year in years), strict=True))
    flows = {"transmission_heating": 100.0 * march}
    zone, building = replace(made.zones[0], **need, **flows), replace(made.building, **need)
    return replace(made, zones=(zone,), building=building)


@pytest.mark.parametrize(
    ("heating", "cooling", "sentence"),
    [
        (
            *(12_345.0, 678.0),
            "Each year the building needs 12,345 kWh of heating (205.8 kWh/m²), most in March, and 678 kWh of cooling "
            "(11.3 kWh/m²), most in March.",
        ),
        (
            *(12_345.0, 0.0),
            "Each year the building needs 12,345 kWh of heating (205.8 kWh/m²), most in March, and no cooling.",
        ),
        (0.0, 0.0, "Each year the building needs no heating, and no cooling."),
    ],
)
def test_summary_begins_with_the_answer(heating: float, cooling: float, sentence: str) -> None:
    sheet = load_workbook(BytesIO(build_result_sheets(_needs(heating, cooling))))["Summary"]
    assert sheet["A7"].value == sentence
    assert sheet["A16"].value is None


def test_sentences_show_small_energies_as_the_tables_do() -> None:
    small = _needs(12.34, 0.0)
    small = replace(small, zones=(replace(small.zones[0], transmission_heating=np.full(12, 5.0)),))
    sheet = load_workbook(BytesIO(build_result_sheets(small)))["Summary"]
    assert sheet["A7"].value.startswith("Each year the building needs 12.3 kWh of heating (0.2 kWh/m²), ")
    assert sheet["H10"].value == "Mar, 12.3 kWh"


def test_summary_names_the_zones_with_the_largest_need(book: Workbook, results: Results) -> None:
    heating, cooling = (
        max(results.zones[:-1], key=lambda zone: getattr(zone, field).sum() / zone.floor_area)
        for field in ("heating_need", "cooling_need")
    )
    shares = (heating.heating_need.sum() / heating.floor_area, cooling.cooling_need.sum() / cooling.floor_area)
    assert book["Summary"]["A16"].value == (
        f"Largest need per floor area: for heating {heating.name}, {shares[0]:.1f} kWh/m² a year; "
        f"for cooling {cooling.name}, {shares[1]:.1f} kWh/m² a year."
    )


def test_summary_quotes_one_check_of_each_kind(results: Results) -> None:
    checks = (
        *(Note("check", f"Zone {number}: low.", "Zones", f"F{number}") for number in range(5, 9)),
        Note("check", "Weather: odd.", "Project", "B9"),
        Note("check", "x" * 300, "Zones", "K6"),
        Note("check", "Zone 2: leaky.", "Zones", "K7"),
    )
    sheet = load_workbook(BytesIO(build_result_sheets(replace(results, notes=checks))))["Summary"]
    top = row_of(sheet, "What to doubt")
    assert [sheet.cell(top + place, 1).value for place in range(1, 5)] == [
        "• Zone 5: low. And 3 more like it.",
        "• Weather: odd.",
        f"• {'x' * 189}… And 1 more like it.",
        "7 checks ask for a second look: see sheet Notes.",
    ]


def test_a_long_note_goes_on_in_the_next_row(results: Results) -> None:
    names = ", ".join(f"Zone {number}" for number in range(1000))
    notes = (Note("default", f"Tilt of {names}: empty.", "Envelope", "H6"),)
    sheet = load_workbook(BytesIO(build_result_sheets(replace(results, notes=notes))))["Notes"]
    parts: list[Any] = [cell.value for cell in sheet["B"][4:] if cell.value]
    assert " ".join(parts) == notes[0].text
    assert len(parts) == 5
    heights = [sheet.row_dimensions[row].height or 0 for row in range(5, sheet.max_row + 1)]
    assert max(heights) < 400


def test_places_do_not_move_when_figures_change() -> None:
    """Other needs, another ranking, other checks, a factor that begins to count: what adds up keeps its cells."""
    results = make_results()
    zones = tuple(
        replace(zone, heating_need=zone.heating_need * 3, heating_use="continuous", heating_spared=np.zeros(12))
        for zone in results.zones
    )
    openings = tuple(replace(opening, shading_factor_heating=np.full(12, 0.9)) for opening in results.opening_gains)
    changed = replace(
        results, zones=zones, element_losses=results.element_losses[3:0:-1], opening_gains=openings, notes=()
    )
    before, after = (load_workbook(BytesIO(build_result_sheets(each))) for each in (results, changed))
    sums: list[Any] = [[book["Element losses"].cell(25, column).value for column in (2, 9)] for book in (before, after)]
    assert [name for name, _ in sums] == ["Sum", "Sum"]
    assert sums[1][1] == pytest.approx(sum(loss.loss for loss in results.element_losses[1:4]), abs=0.5)
    gains = [[cell.value for cell in book["Solar gains"]["A"][:36]] for book in (before, after)]
    assert gains[0] == gains[1]
    assert gains[0].count("Building") == 2
    for title in ("Summary", "Monthly need", "Monthly balance"):
        places = [
            {cell.coordinate: cell.value for row in book[title].iter_rows() for cell in row if cell.column == 1}
            for book in (before, after)
        ]
        moved = {cell for cell, value in places[0].items() if value != places[1].get(cell)}
        words = {str(places[0][cell]).partition(":")[0] for cell in moved}
        allowed = {
            "• The floor height of 1.7 m lies outside 2 to 6 m.",
            "Largest single loss",
            "Largest need per floor area",
            "Main driver of heating",
            "Main driver of cooling",
            before["Summary"]["A7"].value,
            "1 check asks for a second look",
        }
        assert words <= allowed, title


def test_typed_text_stays_text(book: Workbook) -> None:
    cells = [cell for sheet in book for row in sheet.iter_rows() for cell in row if str(cell.value).startswith("=")]
    assert {cell.value for cell in cells} == {"=Client", "=SUM(A1) stays a text."}


def test_no_formula_is_written(data: bytes) -> None:
    with ZipFile(BytesIO(data)) as package:
        sheets = [name for name in package.namelist() if name.startswith("xl/worksheets/sheet")]
        assert all(b"<f>" not in package.read(name) and b"NaN" not in package.read(name) for name in sheets)


def test_what_does_not_exist_shows_as_a_dash(results: Results) -> None:
    broken = replace(results.zones[0], gain_ratio=np.full(12, np.nan), time_constant=float("inf"))
    sheets = load_workbook(BytesIO(build_result_sheets(replace(results, zones=(broken, *results.zones[1:])))))
    sheet = sheets["Monthly balance"]
    top = row_of(sheet, "Zone 1 · heated · 60.0 m²")
    assert numbers(sheet, row_of(sheet, label_of(ZoneResult, "gain_ratio"), top), 2) == ["–"] * 12
    assert sheet.cell(row_of(sheet, label_of(ZoneResult, "time_constant"), top), 2).value == "–"


def test_odd_texts_are_cleaned(results: Results) -> None:
    project = replace(results.project, project="Bell\x07 house", client="x" * 40_000)
    sheet = load_workbook(BytesIO(build_result_sheets(replace(results, project=project))))["Summary"]
    assert sheet["A1"].value == "Bell house"
    assert max(len(text) for text in texts(sheet)) == 32_767


@pytest.mark.parametrize(
    ("need", "words"),
    [
        ([5, 5, 5, 1, 0, 0, 0, 0, 0, 1, 5, 5], "Oct–Apr"),
        ([0, 0, 0, 0, 0, 3, 3, 3, 0, 0, 0, 0], "Jun–Aug"),
        ([9, 0, 0, 9, 0, 0, 0, 0, 0, 0, 0, 0], "Jan, Apr"),
        ([1] * 12, "all year"),
        ([0] * 12, "none"),
    ],
)
def test_months_of_need_in_words(need: list[float], words: str) -> None:
    assert months_of_need(np.array(need, dtype=float)) == words


def _charts(data: bytes) -> list[etree._Element]:
    with ZipFile(BytesIO(data)) as package:
        names = sorted(name for name in package.namelist() if re.fullmatch(r"xl/charts/chart\d+\.xml", name))
        return [etree.fromstring(package.read(name)) for name in names]


def _words(element: etree._Element) -> str:
    return "".join(str(part) for part in element.itertext("{http://schemas.openxmlformats.org/drawingml/2006/main}t"))


def test_charts_show_their_axes_with_units(data: bytes) -> None:
    charts = [chart for chart in _charts(data) if chart.find(f".//{DRAWING}scatterChart") is None]
    assert len(charts) == 6
    for chart in charts:
        for axis in ("catAx", "valAx"):
            assert [found.get("val") for found in chart.iterfind(f".//{DRAWING}{axis}/{DRAWING}delete")] == ["0"]
        units = [_words(title) for title in chart.iterfind(f".//{DRAWING}valAx/{DRAWING}title")]
        assert len(units) == 1
        assert units[0].startswith("kWh")
        assert _words(next(chart.iterfind(f"{DRAWING}chart/{DRAWING}title")))
        assert next(chart.iter(f"{DRAWING}overlay")).get("val") == "0"


def test_bars_with_figures_beside_them_have_no_lines_behind(data: bytes) -> None:
    for chart in _charts(data):
        labelled = any(found.get("val") == "1" for found in chart.iter(f"{DRAWING}showVal"))
        assert (chart.find(f".//{DRAWING}valAx/{DRAWING}majorGridlines") is None) == labelled


def test_the_balance_differs_in_grey_as_well(data: bytes) -> None:
    """Neighbours in a stack: relative luminance apart by a third, or a hatch (WCAG 2.1, relative luminance)."""
    chart = next(chart for chart in _charts(data) if "Losses and gains" in _words(chart))
    assert [found.get("val") for found in chart.iter(f"{DRAWING}grouping", f"{DRAWING}overlap")] == ["stacked", "100"]
    fills = [series.find(f"{DRAWING}spPr") for series in chart.iter(f"{DRAWING}ser")]
    looks = [(fill[0].tag.endswith("pattFill"), _luminance(fill[0])) for fill in fills if fill is not None]
    assert [hatched for hatched, _ in looks] == [False, False, False, True, False, False, False]
    for above in (looks[:4], looks[4:]):
        for (_, one), (hatched, other) in pairwise(above):
            assert hatched or max(one, other) / min(one, other) > 1.33


def _luminance(fill: etree._Element) -> float:
    code = next(fill.iter("{http://schemas.openxmlformats.org/drawingml/2006/main}srgbClr")).attrib["val"]
    parts = [int(str(code[place : place + 2]), 16) / 255 for place in (0, 2, 4)]
    linear = [part / 12.92 if part <= 0.04045 else ((part + 0.055) / 1.055) ** 2.4 for part in parts]
    return sum(share * part for share, part in zip((0.2126, 0.7152, 0.0722), linear, strict=True))


@pytest.mark.parametrize(("zones", "charts"), [(1, 1), (2, 1), (3, 2)])
def test_zones_are_compared_where_there_are_several(zones: int, charts: int) -> None:
    """One zone, one with a stair that has no need, and two."""
    book = build_result_sheets(make_results(zones))
    titles = [_words(next(chart.iterfind(f"{DRAWING}chart/{DRAWING}title"))) for chart in _charts(book)]
    shown = [title for title in titles if title in {"Building, month by month", "Zones, year per floor area"}]
    assert shown == ["Building, month by month", "Zones, year per floor area"][:charts]


def test_charts_carry_their_values(data: bytes, results: Results) -> None:
    chart = _charts(data)[0]
    series = chart.find(f".//{DRAWING}ser")
    assert series is not None
    formulas = [found.text for found in series.iter(f"{DRAWING}f")]
    assert formulas == ["'Summary'!$A$19", "'Summary'!$B$18:$M$18", "'Summary'!$B$19:$M$19"]
    stored = [float(value.text or "nan") for value in series.iterfind(f"{DRAWING}val//{DRAWING}v")]
    assert stored == pytest.approx(results.building.heating_need.tolist())
    assert [value.text for value in series.iterfind(f"{DRAWING}cat//{DRAWING}v")] == MONTHS


def test_chart_fonts_and_colours_are_named(data: bytes) -> None:
    for chart in _charts(data):
        fonts = {
            found.get("typeface")
            for found in chart.iter("{http://schemas.openxmlformats.org/drawingml/2006/main}latin")
        }
        assert fonts == {"Arial"}
        assert not list(chart.iter("{http://schemas.openxmlformats.org/drawingml/2006/main}schemeClr"))


def test_cells_name_their_font_and_use_plain_colours(book: Workbook) -> None:
    cells = [cell for sheet in book for row in sheet.iter_rows() for cell in row if cell.value is not None]
    assert {cell.font.name for cell in cells} == {"Arial"}
    assert {cell.font.color.type for cell in cells} == {"rgb"}


def test_every_sheet_prints_on_a4_with_its_project_named(book: Workbook) -> None:
    sheets: list[Any] = book.worksheets
    for sheet in sheets:
        assert sheet.page_setup.paperSize == 9
        assert sheet.sheet_properties.pageSetUpPr.fitToPage
        assert sheet.page_setup.fitToWidth == 1
        assert sheet.page_setup.fitToHeight == (1 if sheet.title == "Summary" else 0)
        assert sheet.oddFooter.left.text == "Reading room && workshop"
        assert sheet.oddFooter.center.text == "&A · &D"
        assert sheet.oddFooter.right.text == "Page &P of &N"
    rows = {sheet.title: sheet.print_title_rows for sheet in book}
    assert rows == {
        "Summary": None,
        "Monthly need": "$22:$22",
        "Monthly balance": "$5:$5",
        "Element losses": "$24:$24",
        "Solar gains": "$5:$5",
        "Build-up results": None,
        "Notes": "$4:$4",
    }


def test_a_project_name_of_digits_does_not_change_the_footer_size(results: Results) -> None:
    named = replace(results, project=replace(results.project, project="12 Elm Street"))
    with ZipFile(BytesIO(build_result_sheets(named))) as package:
        footer = etree.fromstring(package.read("xl/worksheets/sheet1.xml")).findtext(".//{*}oddFooter")
    assert footer is not None
    assert footer.startswith('&L&"Arial,Regular"&8 12 Elm Street&C')


@pytest.fixture(scope="module")
def rendered(tmp_path_factory: pytest.TempPathFactory) -> dict[tuple[int, str], list[str]]:
    """Printed pages of one zone and of 25, on A4 and on Letter."""
    if shutil.which("soffice") is None:
        pytest.skip("LibreOffice is not installed")
    folder = tmp_path_factory.mktemp("pages")
    files = []
    for zones, results in BUILDINGS.items():
        data = build_result_sheets(results)
        for paper, size in (("A4", 9), ("Letter", 1)):
            book = load_workbook(BytesIO(data))
            for sheet in book:
                sheet.page_setup.paperSize = size
            files.append(str(folder / f"{zones}_{paper}.xlsx"))
            book.save(files[-1])
    home = f"-env:UserInstallation=file://{folder / 'office'}"
    convert = ["soffice", home, "--headless", "--convert-to", "pdf", "--outdir", str(folder), *files]
    subprocess.run(convert, check=True, capture_output=True, timeout=180)
    return {
        (zones, paper): _pages(folder / f"{zones}_{paper}.pdf") for zones in BUILDINGS for paper in ("A4", "Letter")
    }


def _buildings() -> dict[int, Results]:
    small = make_results(1, project="Αίθουσα 閲覧室 with a long name", name="Ζώνη {} 閲覧室")
    large = make_results(25, name="A zone with quite a long name, number {}")
    huge = replace(large.zones[0], heating_need=large.zones[0].heating_need * 1e4)
    large = replace(
        large,
        zones=(huge, *large.zones[1:]),
        element_losses=large.element_losses[:40],
        opening_gains=large.opening_gains[:20],
    )
    return {1: small, 25: large}


BUILDINGS = _buildings()


@pytest.mark.parametrize("paper", ["A4", "Letter"])
@pytest.mark.parametrize(("zones", "expected"), [(1, [1, 1, 2, 2, 1, 2, 1]), (25, [1, 3, 14, 3, 6, 2, 1])])
def test_every_page_is_named_and_numbered(
    rendered: dict[tuple[int, str], list[str]], zones: int, paper: str, expected: list[int]
) -> None:
    """Each sheet takes the pages it should; no number is too wide and no zone is missing."""
    pages, results = rendered[zones, paper], BUILDINGS[zones]
    for number, page in enumerate(pages, start=1):
        assert f"Page {number} of {len(pages)}" in page
        assert results.project.project in page
        assert re.search(r" · \d\d/\d\d/\d{2,4} ", page)
    text = "".join(pages)
    assert "###" not in text
    for zone in results.zones:
        assert zone.name.split()[0] in text
    found = [sum(f"{title} · " in page for page in pages) for title in RESULT_SHEETS]
    assert all(abs(one - other) <= 1 for one, other in zip(found, expected, strict=True)), found
    assert found[0] == 1
    if paper == "A4":
        assert found == expected


@pytest.mark.parametrize("paper", ["A4", "Letter"])
def test_no_column_is_cut_off(rendered: dict[tuple[int, str], list[str]], paper: str) -> None:
    pages = rendered[25, paper]
    for title, last in (("Monthly need", "Year"), ("Monthly balance", "Year"), ("Element losses", "losses [%]")):
        own = [page for page in pages if f"{title} · " in page]
        assert last in own[-1]
        assert "Dec" in own[-1] or title == "Element losses"


@pytest.mark.parametrize("paper", ["A4", "Letter"])
def test_two_zones_share_a_page_and_none_is_cut(rendered: dict[tuple[int, str], list[str]], paper: str) -> None:
    balance = [page for page in rendered[25, paper] if "Monthly balance · " in page]
    first_lines = [len(re.findall(r"number \d+ · heated", page)) for page in balance]
    last_lines = [page.count("Ventilation coefficient, annual mean [W/K]") for page in balance]
    assert first_lines == [0, *[2] * 12, 0]
    assert last_lines == [0, *[2] * 12, 1]


@pytest.mark.parametrize("zones", [1, 25])
def test_sums_add_up_as_printed(rendered: dict[tuple[int, str], list[str]], zones: int) -> None:
    """Read off the paper: months make the year, kinds the sum, shares a hundred; sheets agree."""
    pages = rendered[zones, "A4"]
    summary = [line.strip() for line in pages[0].splitlines()]
    heating = next(_figures(line) for line in summary if line.startswith("Heating need [kWh]"))
    assert sum(heating[:12]) == heating[12]
    top = next(place for place, line in enumerate(summary) if line.split()[:1] == ["Loss"])
    total = next(place for place in range(top, len(summary)) if summary[place].startswith("Sum"))
    parts = [_figures(line)[:2] for line in summary[top + 1 : total] if re.match(r"[A-Z][a-z ]+ {3,}[\d–]", line)]
    assert len(parts) == 10
    assert [round(sum(column), 1) for column in zip(*parts, strict=True)] == _figures(summary[total])[:2]
    assert _figures(summary[total])[1] == 100.0
    need = [line for page in pages if "Monthly need · " in page for line in page.splitlines()]
    building = [_figures(line) for line in need if line.strip().startswith("Building ")]
    assert building[0][1:14] == heating
    balance = [line for page in pages if "Monthly balance · " in page for line in page.splitlines()]
    assert next(_figures(line) for line in balance if line.strip().startswith("Heating need [kWh]")) == heating


def _figures(line: str) -> list[float]:
    """Printed numbers of a line; a dash is nothing."""
    words = [word.replace(",", "") for word in re.split(r" {2,}|(?<=\d) |(?<=–) ", line.strip()) if word]
    return [0.0 if word == "–" else float(word) for word in words if re.fullmatch(r"-?[\d.]+|–", word)]


def _pages(pdf: Path) -> list[str]:
    command = ["pdftotext", "-layout", str(pdf), "-"]
    text = subprocess.run(command, check=True, capture_output=True, timeout=60).stdout.decode()
    return text.split("\f")[:-1]
