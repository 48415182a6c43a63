"""The commands: exit status, sentences, files."""

from __future__ import annotations

import json
import re
from collections.abc import Iterator
from pathlib import Path

import click
import pytest
from click.testing import CliRunner, Result
from openpyxl import load_workbook

import heatledger
from heatledger.cli import main

RESULT_SHEETS = [
    *("Summary", "Monthly need", "Monthly balance", "Element losses"),
    *("Solar gains", "Build-up results", "Notes"),
]


def invoke(*arguments: str | Path) -> Result:
    return CliRunner().invoke(main, [str(argument) for argument in arguments])


def commands(group: click.Group = main, prefix: str = "") -> Iterator[tuple[str, click.Command]]:
    for name, command in group.commands.items():
        yield f"{prefix}{name}", command
        if isinstance(command, click.Group):
            yield from commands(command, f"{prefix}{name} ")


@pytest.fixture(scope="module")
def example(tmp_path_factory: pytest.TempPathFactory) -> Path:
    path = tmp_path_factory.mktemp("cli") / "example.xlsx"
    assert invoke("new", path, "--example").exit_code == 0
    return path


@pytest.mark.parametrize(
    ("name", "command"), list(commands()), ids=lambda value: value if isinstance(value, str) else ""
)
def test_every_command_has_help_and_an_example(name: str, command: click.Command) -> None:
    text = command.get_help(click.Context(command, info_name=name))
    assert "Example:" in text
    assert f"heatledger {name}" in text
    assert all(getattr(option, "help", None) for option in command.params if isinstance(option, click.Option))


def test_new_never_overwrites_without_force(tmp_path: Path) -> None:
    path = tmp_path / "house.xlsx"
    path.write_text("mine")
    refused = invoke("new", path)
    assert refused.exit_code == 1
    assert refused.stderr == (
        f"{path}: found a file of this name; expected a new name. "
        "Give another name, or overwrite the file with --force.\n1 problem; nothing was written.\n"
    )
    assert path.read_text() == "mine"
    assert invoke("new", path, "--force").output == f"Wrote {path}.\n"
    assert "Zones" in load_workbook(path).sheetnames


def test_a_blank_workbook_asks_for_what_is_missing(tmp_path: Path) -> None:
    path = tmp_path / "blank.xlsx"
    invoke("new", path)
    before = path.read_bytes()
    for command in ("check", "run"):
        result = invoke(command, path)
        assert result.exit_code == 1
        assert result.stdout == ""
        assert "Project!B" in result.stderr
        assert result.stderr.endswith("problems; nothing was written.\n")
    assert path.read_bytes() == before


def test_check_says_what_it_read(example: Path) -> None:
    result = invoke("check", example)
    assert result.exit_code == 0, result.stderr
    assert re.fullmatch(
        rf"{re.escape(str(example))}: no problems\. \d+ zones, \d+ elements, weather \S.*\.\n", result.output
    )


def test_run_into_another_file_leaves_the_workbook_alone(example: Path, tmp_path: Path) -> None:
    before = example.read_bytes()
    target, figures = tmp_path / "results.xlsx", tmp_path / "results.json"
    result = invoke("run", example, "--output", target, "--json", figures)
    assert result.exit_code == 0, result.stderr
    assert f"Wrote {target}. " in result.output
    assert example.read_bytes() == before
    names = load_workbook(target).sheetnames
    assert [name for name in names if name in RESULT_SHEETS] == RESULT_SHEETS
    written = json.loads(figures.read_text(encoding="utf-8"))
    assert written == heatledger.assess(example).to_json()


@pytest.mark.parametrize(
    ("arguments", "sentence"),
    [
        (("run", "{0}", "--json", "{0}"), "FILE and --json are the same file: {0}."),
        (("run", "{0}", "--output", "{1}", "--json", "{1}"), "--output and --json are the same file: {1}."),
        (("run", "{0}", "--report", "{2}"), "FILE and --report are the same file: {0}."),
        (("run", "{0}", "--output", "{1}", "--report", "{1}"), "--output and --report are the same file: {1}."),
        (("check", "{0}", "--report", "{0}"), "FILE and --report are the same file: {0}."),
    ],
)
def test_no_file_is_written_in_the_place_of_another(tmp_path: Path, arguments: tuple[str, ...], sentence: str) -> None:
    path, other = tmp_path / "house.xlsx", tmp_path / "other.xlsx"
    path.write_text("mine")
    around = tmp_path / ".." / tmp_path.name / "house.xlsx"
    result = invoke(*(argument.format(path, other, around) for argument in arguments))
    assert result.exit_code == 2
    assert result.stderr.endswith(f"Error: {sentence.format(path, other)}\n")
    assert path.read_text() == "mine"
    assert not other.exists()


@pytest.mark.parametrize(
    ("output", "figures", "sentence"),
    [
        (
            "results.xlsx",
            "none/house.json",
            "{0}/none/house.json: found that its folder does not exist; expected an existing folder. "
            "Make the folder first, or give another name with --json.",
        ),
        (
            "none/results.xlsx",
            "house.json",
            "{0}/none/results.xlsx: found that its folder does not exist; expected an existing folder. "
            "Make the folder first, or give another name with --output.",
        ),
        (".", "house.json", "{0}: found a folder; expected a file name. Give another name with --output."),
    ],
)
def test_workbook_and_json_are_written_both_or_none(
    example: Path, tmp_path: Path, output: str, figures: str, sentence: str
) -> None:
    result = invoke("run", example, "--output", tmp_path / output, "--json", tmp_path / figures)
    assert (result.exit_code, result.stderr) == (
        1,
        f"{sentence.format(tmp_path)}\n1 problem; nothing was written.\n",
    )
    assert list(tmp_path.iterdir()) == []


def test_a_second_run_gives_the_same_file(example: Path, tmp_path: Path) -> None:
    first, second = tmp_path / "first.xlsx", tmp_path / "second.xlsx"
    assert invoke("run", example, "--output", first).exit_code == 0
    second.write_bytes(first.read_bytes())
    assert invoke("run", second).exit_code == 0
    assert second.read_bytes() == first.read_bytes()


def test_the_written_json_keeps_the_contract(example: Path) -> None:
    written = heatledger.assess(example).to_json()
    assert {"project", "climate", "zones", "building", "notes"} <= set(written)
    assert {"name", "latitude", "longitude", "temperature", "horizontal_irradiation"} <= set(written["climate"])
    assert set(written["building"]) == {"floor_area", "heating_need", "cooling_need"}
    monthly = {"heating_need", "cooling_need", "transmission_heating", "ventilation_heating", "transmission_cooling"}
    monthly |= {"ventilation_cooling", "solar_gains", "internal_gains", "gain_utilisation", "loss_utilisation"}
    single = {"conditioning", "floor_area", "time_constant", "heat_capacity", "transmission_coefficient"}
    for zone in written["zones"].values():
        assert monthly | single | {"ventilation_coefficient"} <= set(zone)
        assert all(len(zone[name]) == 12 for name in monthly)
        assert ("temperature" in zone) == (zone["conditioning"] == "unconditioned")
    assert json.loads(json.dumps(written, allow_nan=False)) == written


def test_wrong_use_ends_with_status_two() -> None:
    assert invoke("run").exit_code == 2
    assert invoke("walk").exit_code == 2


def test_unknown_weather_is_told_with_the_other_problems(tmp_path: Path, example: Path) -> None:
    book = load_workbook(example)
    labels = {cell.value: cell.row for (cell,) in book["Project"]["A1:A40"]}
    book["Project"].cell(labels["Weather"], 2).value = "Goldn CO"
    zones = book["Zones"]
    header = next(row for row in zones.iter_rows() if row[0].value == "Zone")
    area = next(cell for cell in header if cell.value == "Floor area")
    zones.cell(area.row + 1, area.column).value = "large"
    path = tmp_path / "faulty.xlsx"
    book.save(path)
    lines = invoke("check", path).stderr.splitlines()
    assert len(lines) == 3
    assert f"Project!B{labels['Weather']}" in lines[0]
    assert "Did you mean 'Golden CO'?" in lines[0]
    assert lines[1].startswith(f"Zones!{area.column_letter}{area.row + 1}  Floor area [m²]: found the text 'large'")


def test_frames_are_tidy(example: Path) -> None:
    results = heatledger.assess(example)
    frame = results.to_frame()
    assert list(frame.columns) == ["zone", "month", "quantity", "unit", "value"]
    heating = frame[frame.quantity == "heating_need"]
    assert len(heating) == 12 * len(results.zones)
    assert set(heating.unit) == {"kWh"}
    assert heating.value.sum() == pytest.approx(results.building.heating_need.sum())


def faulty(example: Path, folder: Path) -> Path:
    """The example with two words where floor areas belong."""
    book = load_workbook(example)
    zones = book["Zones"]
    header = next(row for row in zones.iter_rows() if row[0].value == "Zone")
    area = next(cell for cell in header if cell.value == "Floor area")
    for row in (1, 2):
        zones.cell(area.row + row, area.column).value = "large"
    path = folder / "faulty.xlsx"
    book.save(path)
    return path


def test_a_report_is_a_copy_with_a_linked_list(tmp_path: Path, example: Path) -> None:
    path, report = faulty(example, tmp_path), tmp_path / "report.xlsx"
    before = path.read_bytes()
    result = invoke("check", path, "--report", report)
    assert result.exit_code == 1
    assert path.read_bytes() == before
    assert result.stderr.splitlines()[-1] == f"Wrote {report}: a copy with a sheet Problems."
    sheet = load_workbook(report)["Problems"]
    (row,) = [row for row in sheet.iter_rows() if "large" in str(row[2].value)]
    assert row[1].value == "Floor area [m²]"
    assert row[2].value == "the text 'large'"
    assert row[0].hyperlink is not None
    assert row[0].hyperlink.location == f"'Zones'!{str(row[0].value).split(':', maxsplit=1)[0]}"
    assert invoke("run", example, "--report", tmp_path / "none.xlsx", "--output", tmp_path / "x.xlsx").exit_code == 0
    assert not (tmp_path / "none.xlsx").exists()


def test_the_report_goes_with_the_problems(tmp_path: Path, example: Path) -> None:
    """Mended in the copy itself, a run replaces the list by results."""
    report = tmp_path / "report.xlsx"
    invoke("check", faulty(example, tmp_path), "--report", report)
    book = load_workbook(report)
    zones, whole = book["Zones"], load_workbook(example)["Zones"]
    for row in zones.iter_rows():
        for cell in row:
            if cell.value == "large":
                cell.value = whole[cell.coordinate].value
    book.save(report)
    assert invoke("run", report).exit_code == 0
    names = load_workbook(report).sheetnames
    assert "Problems" not in names
    assert "Summary" in names


def test_no_report_of_what_is_no_workbook(tmp_path: Path) -> None:
    path = tmp_path / "notes.xlsx"
    path.write_text("hello")
    result = invoke("check", path, "--report", tmp_path / "report.xlsx")
    assert result.exit_code == 1
    assert result.stderr.splitlines()[-1] == "No report was written."
    assert not (tmp_path / "report.xlsx").exists()


def test_quiet_and_verbose(example: Path, tmp_path: Path) -> None:
    target = tmp_path / "out.xlsx"
    quiet = invoke("run", example, "--output", target, "--quiet")
    assert (quiet.exit_code, quiet.output) == (0, "")
    told = invoke("run", target, "--verbose").stderr.splitlines()
    assert told[0] == f"Read {target}."
    assert told[1].startswith("Read weather Piedmont IT: PVGIS typical year ")
    assert told[2] == f"Replaced sheets: {', '.join(RESULT_SHEETS)}."
    assert invoke("check", example, "--quiet").output == ""


def test_paths_below_the_current_folder_are_told_as_seen_from_it(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    monkeypatch.chdir(tmp_path)
    assert invoke("new", tmp_path / "house.xlsx").output == "Wrote house.xlsx.\n"
