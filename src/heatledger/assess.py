"""The whole way from a workbook to results: start reading here.

The rooms are imported where they are used, since pandas and pvlib alone take a second.
"""

from __future__ import annotations

from collections.abc import Callable
from pathlib import Path
from typing import TYPE_CHECKING

from heatledger.errors import InputError, Problem

if TYPE_CHECKING:
    from heatledger.building.model import Building
    from heatledger.climate.model import Climate
    from heatledger.inputs.rows import Rows
    from heatledger.results import Results

__all__ = ["assess", "assess_building", "read_inputs", "read_workbook"]


def assess(path: str | Path, climate: Climate | None = None) -> Results:
    """Calculate the monthly heating and cooling need of the building in a workbook.

    Parameters
    ----------
    path : str or Path
        A filled-in workbook, .xlsx or .xlsm. It is only read.
    climate : Climate, optional
        Used instead of the weather that the workbook names.

    Returns
    -------
    Results
        Energies in kWh per month, January first.

    Raises
    ------
    InputError
        With every problem of the workbook and its weather; nothing was calculated.
    """
    return assess_building(*read_inputs(path, climate))


def assess_building(building: Building, climate: Climate) -> Results:
    """Calculate the monthly heating and cooling need of a building that was read before."""
    from heatledger.balance.calculate import calculate  # noqa: PLC0415

    return calculate(building, climate)


def read_inputs(path: str | Path, climate: Climate | None = None) -> tuple[Building, Climate]:
    """Read the building of a workbook and its weather.

    Raises
    ------
    InputError
        With every problem of either.
    """
    opened = [climate] if climate else []

    def weather_problems(rows: Rows) -> tuple[Problem, ...]:
        try:
            opened.extend(_open_weather(rows, Path(path).parent))
        except InputError as error:
            return error.problems
        return ()

    building = _read(path, (lambda _: ()) if climate else weather_problems)
    return building, opened[0]


def read_workbook(path: str | Path) -> Building:
    """Read the building of a workbook: names resolved, in SI units.

    Raises
    ------
    InputError
        With every problem of the workbook.
    """
    return _read(path, lambda _: ())


def _read(path: str | Path, weather_check: Callable[[Rows], tuple[Problem, ...]]) -> Building:
    from heatledger.building.resolve import resolve  # noqa: PLC0415
    from heatledger.inputs.rows import SHEETS  # noqa: PLC0415
    from heatledger.inputs.workbook_rows import check_rows  # noqa: PLC0415
    from heatledger.workbook.reader import read_cells  # noqa: PLC0415

    cells = read_cells(Path(path), wanted=[model.sheet for model in SHEETS])
    return resolve(check_rows(cells, weather_check))


def _open_weather(rows: Rows, folder: Path) -> tuple[Climate, ...]:
    """The climate that sheet Project names; none if it is a monthly table with gaps, which are told elsewhere."""
    from heatledger.climate.files import open_climate  # noqa: PLC0415
    from heatledger.inputs.rules_monthly_climate import uses_monthly_table  # noqa: PLC0415

    project = rows.project
    if uses_monthly_table(rows):
        return _monthly_table(rows)
    climate = open_climate(
        project.weather,
        folder,
        latitude=project.latitude,
        longitude=project.longitude,
        time_zone=project.time_zone,
        sheet=project.sheet,
        cell=project.cell("weather"),
    )
    return (climate,)


def _monthly_table(rows: Rows) -> tuple[Climate, ...]:
    from heatledger.building.monthlytable import monthly_table  # noqa: PLC0415
    from heatledger.climate.monthly_table import monthly_table_climate  # noqa: PLC0415
    from heatledger.inputs.rows import MonthlyClimateRow  # noqa: PLC0415

    table, project = monthly_table(rows), rows.project
    if table is None or project.latitude is None:
        return ()
    climate = monthly_table_climate(
        "Monthly table",
        table.temperature,
        table.irradiation,
        latitude=project.latitude,
        longitude=project.longitude,
        time_zone=project.time_zone,
        altitude=project.altitude,
        diffuse_share=table.diffuse_share,
        source="Sheet Monthly climate of the workbook.",
        sheet=MonthlyClimateRow.sheet,
        cells=table.cells,
    )
    return (climate,)
