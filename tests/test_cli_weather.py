"""The commands that list and show climates."""

from __future__ import annotations

from pathlib import Path

import pytest
from click.testing import CliRunner, Result

from heatledger.cli import main
from heatledger.places import shipped_folder

GOLDEN = """\
Golden CO: 39.73° N, 105.18° W, 1876 m, UTC-7 h
Typical year of the National Solar Radiation Database at 39.73° N 105.18° W, physical solar model 4.

           Temperature  Degree days         Sun     Sun     Sun     Sun     Sun
                            < 18 °C  horizontal   north    east   south    west
                    °C          K·d      kWh/m²  kWh/m²  kWh/m²  kWh/m²  kWh/m²
-------------------------------------------------------------------------------
January           -2.4        631.8        76.7    20.6    53.7   134.9    56.0
February          -1.0        532.5        97.4    23.4    66.2   128.7    61.9
"""
"""Its first lines."""


def weather(*arguments: str) -> Result:
    return CliRunner().invoke(main, ["weather", *arguments])


def test_the_shipped_climates_are_listed() -> None:
    result = weather("list")
    assert result.exit_code == 0
    assert result.output.splitlines() == [
        "Golden CO", "Greensboro NC", "Miami FL", "Moffat County CO", "New York NY", "Piedmont IT", "Sand Point AK",
    ]  # fmt: skip


def test_every_listed_climate_can_be_shown() -> None:
    for name in weather("list").output.splitlines():
        result = weather("show", name)
        assert result.exit_code == 0
        assert result.output.startswith(f"{name}: ")


def test_months_year_and_units_stand_in_columns() -> None:
    result = weather("show", "golden co")
    assert result.exit_code == 0
    assert result.output.startswith(GOLDEN)
    lines = result.output.splitlines()
    table = lines[3:21]
    assert [line.split()[0] for line in table[4:16]] == [
        "January", "February", "March", "April", "May", "June",
        "July", "August", "September", "October", "November", "December",
    ]  # fmt: skip
    assert {len(line) for line in table} == {79}
    assert lines[-1] == "Sun of the sides: upright, ground reflectance 0.2. Degree days from daily means."


def test_the_line_of_the_year_is_the_sum_of_the_months_and_the_mean_of_the_days() -> None:
    lines = weather("show", "Sand Point AK").output.splitlines()
    months = [[float(figure) for figure in line.split()[1:]] for line in lines[7:19]]
    year = [float(figure) for figure in lines[20].split()[1:]]
    assert lines[20].startswith("Year ")
    days = [31, 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31]
    mean = sum(month[0] * count for month, count in zip(months, days, strict=True)) / 365
    # Each figure is rounded to a tenth: twelve halves of it, and the year's own.
    assert year[0] == pytest.approx(mean, abs=0.11)
    for column in range(1, 7):
        assert year[column] == pytest.approx(sum(month[column] for month in months), abs=0.65), column


def test_notes_of_a_file_stand_below_the_table(tmp_path: Path) -> None:
    path = tmp_path / "mine.csv"
    lines = shipped_folder("weather").joinpath("golden-co.csv").read_text(encoding="utf-8").splitlines()
    head = next(number for number, line in enumerate(lines) if line.startswith("Month,"))
    del lines[head + 100]
    path.write_text("\n".join(lines) + "\n", encoding="utf-8")
    result = weather("show", str(path))
    assert result.exit_code == 0
    assert result.output.splitlines()[-3:] == [
        "Sun of the sides: upright, ground reflectance 0.2. Degree days from daily means.",
        "Note: 1 hour is missing in the weather file (first: hour 4 of 5 January).",
        "Note: 1 hour of the weather file has no usable outdoor temperature (first: hour 4 of 5 January): filled in "
        "from the hours around.",
    ]


def test_an_unknown_name() -> None:
    result = weather("show", "Golde")
    assert result.exit_code == 1
    assert result.stdout == ""
    assert result.stderr == (
        "Weather: found the text 'Golde'; expected the name of a shipped climate, the path of a weather file, or "
        "'monthly table'. Did you mean 'Golden CO'?\n1 problem; nothing was written.\n"
    )


def test_a_monthly_table_without_a_workbook() -> None:
    result = weather("show", "Monthly table")
    assert result.exit_code == 1
    assert result.stderr == (
        "Weather: found 'Monthly table'; expected the name of a shipped climate or the path of a weather file. A "
        "monthly table stands in a workbook: check or run the workbook.\n1 problem; nothing was written.\n"
    )
