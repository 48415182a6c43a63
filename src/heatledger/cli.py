"""The commands: parse, call one library function, print."""

from __future__ import annotations

import json
import os
import sys
from collections.abc import Callable, Mapping, Sequence
from contextlib import AbstractContextManager, nullcontext
from functools import wraps
from itertools import combinations
from pathlib import Path
from typing import TYPE_CHECKING, Any, TypeVar, cast

import click

from heatledger import __version__
from heatledger.errors import InputError, Problem
from heatledger.terminal import Speaker, list_problems, print_any_letter, shown, tell, with_paths

if TYPE_CHECKING:
    from heatledger.results import Results

__all__ = ["main"]

INTERRUPTED = 130
"""Exit status of what was stopped with Ctrl+C, as shells have it."""
EXIT_STATUS = (
    "Exit status: 0 done; 1 the workbook or the weather has problems, all of them listed, and nothing was written; "
    "2 wrong use of the command; 130 stopped with Ctrl+C."
)
Command = TypeVar("Command", bound=Callable[..., Any])
WORKBOOK = click.Path(path_type=Path, readable=False)
"""What may not be read is told as any other problem of a file."""
REPORT = click.option(
    "--report", type=WORKBOOK, help="If there are problems, write a copy of FILE with a sheet that links to each."
)


def _problems_to_exit_status(command: Command) -> Command:
    """List every problem on standard error and end with status 1."""

    @wraps(command)
    def wrapped(*args: Any, **kwargs: Any) -> None:
        _check_names(kwargs)
        report: Path | None = kwargs.pop("report", None)
        paths = [path for path in kwargs.values() if isinstance(path, Path)]
        try:
            command(*args, **kwargs)
        except InputError as error:
            problems = with_paths(error.problems, paths)
            if report is None:
                list_problems(problems)
            else:
                list_problems(problems, "no results were written")
                _write_report(kwargs["file"], error.problems, report)
            sys.exit(1)
        except KeyboardInterrupt:
            tell("Stopped. No file was left half written.")
            sys.exit(INTERRUPTED)
        if report and not kwargs["quiet"]:
            click.echo("No report was written: there are no problems.")

    return cast("Command", wrapped)


def _check_names(options: Mapping[str, Any]) -> None:
    """Refuse a file that is to be written in the place of another one of the same command."""
    names = {"file": "FILE", "output": "--output", "json_file": "--json", "report": "--report"}
    given = {name: os.path.realpath(options[key]) for key, name in names.items() if options.get(key)}
    for one, other in combinations(given, 2):
        if given[one] == given[other] and (one, other) != ("FILE", "--output"):
            raise click.UsageError(f"{one} and {other} are the same file: {shown(Path(given[one]))}.")


def _json(results: Results, file: Path | None) -> AbstractContextManager[None]:
    """Write the results as JSON once the workbook is written: both or none."""
    from heatledger.workbook.files import staged

    if file is None:
        return nullcontext()
    text = json.dumps(results.to_json(), ensure_ascii=False, indent=1, allow_nan=False)
    return staged(file, f"{text}\n".encode(), elsewhere="give another name with --json")


def _write_report(file: Path, problems: Sequence[Problem], report: Path) -> None:
    """A copy of the workbook with a sheet Problems; says so where the file cannot be copied."""
    from heatledger.workbook.graft import graft
    from heatledger.workbook.problems_sheet import build_problems_sheet

    try:
        graft(file, build_problems_sheet(problems, file.name), report)
    except InputError as error:
        for problem in with_paths([one for one in error.problems if one not in problems], [report]):
            tell(str(problem))
        tell("No report was written.")
    else:
        tell(f"Wrote {shown(report)}: a copy with a sheet Problems.")


def _tell_read(say: Speaker, file: Path, weather: str) -> None:
    say.detail(f"Read {shown(file)}.")
    say.detail(f"Read weather {weather}")


def _how_much(command: Command) -> Command:
    """Options for how much is said."""
    quiet = click.option("--quiet", "-q", is_flag=True, help="Print problems only.")
    verbose = click.option("--verbose", "-v", is_flag=True, help="Print what was read, written and replaced.")
    return quiet(verbose(command))


@click.group(context_settings={"help_option_names": ["-h", "--help"]}, epilog=EXIT_STATUS)
@click.version_option(__version__)
def main() -> None:
    """Monthly heating and cooling need of a building, from a filled-in workbook.

    \b
    Example:
      heatledger new house.xlsx
      heatledger check house.xlsx
      heatledger run house.xlsx
    """
    print_any_letter()


@main.command()
@click.argument("file", type=WORKBOOK)
@click.option("--example", is_flag=True, help="Fill in the example building.")
@click.option("--force", is_flag=True, help="Overwrite FILE if it exists.")
@_problems_to_exit_status
def new(file: Path, *, example: bool, force: bool) -> None:
    """Write a blank workbook to fill in.

    \b
    Example:
      heatledger new house.xlsx
      heatledger new example.xlsx --example
    """
    from heatledger.climate.shipped import shipped_climates
    from heatledger.inputs.prefilled import blank_values, example_values
    from heatledger.workbook.files import create
    from heatledger.workbook.template import build_template

    values = example_values() if example else blank_values()
    with Speaker().progress("Writing the workbook"):
        create(file, build_template(values, shipped_climates()), force=force)
    click.echo(f"Wrote {shown(file)}.")


@main.command(epilog=EXIT_STATUS)
@click.argument("file", type=WORKBOOK)
@REPORT
@_how_much
@_problems_to_exit_status
def check(file: Path, *, quiet: bool, verbose: bool) -> None:
    """Read FILE and its weather and list every problem; nothing is calculated or written.

    \b
    Example:
      heatledger check house.xlsx
      heatledger check house.xlsx --report house-problems.xlsx
    """
    from heatledger.assess import read_inputs

    say = Speaker(quiet=quiet, verbose=verbose)
    with say.progress("Reading"):
        building, climate = read_inputs(file)
    _tell_read(say, file, f"{climate.name}: {climate.source}")
    counts = f"{len(building.zones)} zones, {len(building.elements)} elements"
    say.result(f"{shown(file)}: no problems. {counts}, weather {climate.name}.")


@main.command(epilog=EXIT_STATUS)
@click.argument("file", type=WORKBOOK)
@click.option("--output", type=WORKBOOK, help="Write the workbook with results here and leave FILE as it is.")
@click.option("--json", "json_file", type=WORKBOOK, help="Also write the results as JSON.")
@REPORT
@_how_much
@_problems_to_exit_status
def run(file: Path, *, output: Path | None, json_file: Path | None, quiet: bool, verbose: bool) -> None:
    """Calculate the building in FILE and write the result sheets into it.

    \b
    Example:
      heatledger run house.xlsx
      heatledger run house.xlsx --output house-results.xlsx --json house.json
    """
    from heatledger.assess import assess
    from heatledger.workbook.graft import graft
    from heatledger.workbook.result_sheets import build_result_sheets

    say = Speaker(quiet=quiet, verbose=verbose)
    target = output or file
    with say.progress("Reading and calculating"):
        results = assess(file)
    _tell_read(say, file, f"{results.climate.name}: {results.climate.source}")
    with say.progress("Writing the result sheets"), _json(results, json_file):
        report = graft(file, build_result_sheets(results), target)
    if json_file:
        say.detail(f"Wrote {shown(json_file)}.")
    for done, sheets in (("Added", report.added), ("Replaced", report.replaced), ("Removed", report.dropped)):
        if sheets:
            say.detail(f"{done} sheets: {', '.join(sheets)}.")
    for note in report.notes:
        tell(note)
    heating, cooling = results.building.heating_need.sum(), results.building.cooling_need.sum()
    checks = sum(note.kind == "check" for note in results.notes)
    say.result(f"Heating need {heating:.0f} kWh, cooling need {cooling:.0f} kWh a year.")
    asks = "point asks" if checks == 1 else "points ask"
    say.result(f"Wrote {shown(target)}. {checks} {asks} for a second look: sheet Notes.")


@main.group()
def weather() -> None:
    """Shipped climates.

    \b
    Example:
      heatledger weather list
      heatledger weather show "Golden CO"
    """


@weather.command("list")
def weather_list() -> None:
    """List the shipped climates.

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
    """Print the twelve months of a shipped climate or of an hourly file.

    \b
    Example:
      heatledger weather show "Golden CO"
      heatledger weather show measured.epw
    """
    from heatledger.climate.files import open_climate
    from heatledger.climate.summary import summary_lines

    with Speaker().progress("Reading the weather"):
        lines = summary_lines(open_climate(name, Path()))
    for line in lines:
        click.echo(line)
