"""The commands: parse, call one library function, print."""

from __future__ import annotations

import json
import sys
from collections.abc import Callable
from functools import wraps
from pathlib import Path
from typing import Any, TypeVar, cast

import click

from heatledger import __version__
from heatledger.errors import InputError

__all__ = ["main"]

Command = TypeVar("Command", bound=Callable[..., Any])
WORKBOOK = click.Path(path_type=Path)


def _problems_to_exit_status(command: Command) -> Command:
    """List every problem on standard error and end with status 1."""

    @wraps(command)
    def wrapped(*args: Any, **kwargs: Any) -> Any:
        try:
            return command(*args, **kwargs)
        except InputError as error:
            count = len(error.problems)
            for problem in error.problems:
                click.echo(str(problem), err=True)
            click.echo(f"{count} {'problem' if count == 1 else 'problems'}; nothing was written.", err=True)
            sys.exit(1)

    return cast("Command", wrapped)


@click.group(context_settings={"help_option_names": ["-h", "--help"]})
@click.version_option(__version__)
def main() -> None:
    r"""Monthly heating and cooling need of a building, from a filled-in workbook.

    \b
    Example:
      heatledger new house.xlsx
      heatledger check house.xlsx
      heatledger run house.xlsx
    """


@main.command()
@click.argument("file", type=WORKBOOK)
@click.option("--example", is_flag=True, help="Fill in the example building.")
@click.option("--force", is_flag=True, help="Overwrite FILE if it exists.")
@_problems_to_exit_status
def new(file: Path, *, example: bool, force: bool) -> None:
    r"""Write a blank workbook to fill in.

    \b
    Example:
      heatledger new house.xlsx
      heatledger new example.xlsx --example
    """
    from heatledger.inputs.prefilled import blank_values, example_values
    from heatledger.workbook.files import create
    from heatledger.workbook.template import build_template

    create(file, build_template(example_values() if example else blank_values()), force=force)
    click.echo(f"Wrote {file}.")


@main.command()
@click.argument("file", type=WORKBOOK)
@_problems_to_exit_status
def check(file: Path) -> None:
    r"""Read FILE and its weather and list every problem; nothing is calculated or written.

    \b
    Example:
      heatledger check house.xlsx
    """
    from heatledger.assess import read_inputs

    building, climate = read_inputs(file)
    counts = f"{len(building.zones)} zones, {len(building.elements)} elements"
    click.echo(f"{file}: no problems. {counts}, weather {climate.name}.")


@main.command()
@click.argument("file", type=WORKBOOK)
@click.option("--output", type=WORKBOOK, help="Write the workbook with results here and leave FILE as it is.")
@click.option("--json", "json_file", type=WORKBOOK, help="Also write the results as JSON.")
@_problems_to_exit_status
def run(file: Path, output: Path | None, json_file: Path | None) -> None:
    r"""Calculate the building in FILE and write the result sheets into it.

    \b
    Example:
      heatledger run house.xlsx
      heatledger run house.xlsx --output house-results.xlsx --json house.json
    """
    from heatledger.assess import assess
    from heatledger.workbook.files import write_whole
    from heatledger.workbook.graft import graft
    from heatledger.workbook.result_sheets import build_result_sheets

    target = output or file
    _progress("Reading and calculating …")
    results = assess(file)
    _progress("Writing the result sheets …")
    report = graft(file, build_result_sheets(results), target)
    if json_file:
        text = json.dumps(results.to_json(), ensure_ascii=False, indent=1, allow_nan=False)
        write_whole(json_file, f"{text}\n".encode())
    for note in report.notes:
        click.echo(note, err=True)
    heating, cooling = results.building.heating_need.sum(), results.building.cooling_need.sum()
    checks = sum(note.kind == "check" for note in results.notes)
    click.echo(f"Heating need {heating:.0f} kWh, cooling need {cooling:.0f} kWh a year.")
    click.echo(
        f"Wrote {target}. {checks} {'point asks' if checks == 1 else 'points ask'} for a second look: sheet Notes."
    )


def _progress(step: str) -> None:
    """Tell a person at a terminal what takes the time."""
    if sys.stderr.isatty():
        click.echo(step, err=True)


@main.group()
def weather() -> None:
    r"""Shipped climates.

    \b
    Example:
      heatledger weather list
      heatledger weather show "Golden CO"
    """


@weather.command("list")
def weather_list() -> None:
    r"""List the shipped climates.

    \b
    Example:
      heatledger weather list
    """
    from heatledger.climate.shipped import shipped_climates

    for name in shipped_climates():
        click.echo(name)


@weather.command("show")
@click.argument("name")
@_problems_to_exit_status
def weather_show(name: str) -> None:
    r"""Print the twelve months of a shipped climate or of an hourly file.

    \b
    Example:
      heatledger weather show "Golden CO"
      heatledger weather show measured.epw
    """
    from heatledger.climate.files import open_climate
    from heatledger.climate.model import MONTH_NAMES
    from heatledger.climate.summary import monthly_summary

    climate = open_climate(name, Path())
    columns = monthly_summary(climate)
    click.echo(f"{climate.name}, {climate.latitude:.2f}°, {climate.longitude:.2f}°, {climate.altitude:.0f} m")
    for note in climate.notes:
        click.echo(note)
    titles = [f"{column.title} [{column.unit}]" for column in columns]
    click.echo("  ".join(["month    ", *titles]))
    for month, label in enumerate((*MONTH_NAMES, "year")):
        values = [column.values[month] if month < len(MONTH_NAMES) else column.year for column in columns]
        cells = [f"{value:{len(title)}.1f}" for value, title in zip(values, titles, strict=True)]
        click.echo("  ".join([f"{label:9}", *cells]))
