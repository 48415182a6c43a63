"""Checks of the sheet `Monthly climate`, which counts only where Weather says so."""

from __future__ import annotations

from collections.abc import Iterator

from heatledger.errors import Problem
from heatledger.inputs.checking import problem_at
from heatledger.inputs.names import Typed
from heatledger.inputs.rows import MONTHLY_TABLE, MONTHS, MonthlyClimateRow, Rows
from heatledger.inputs.wording import folded

__all__ = ["monthly_climate_problems", "uses_monthly_table"]

SINCE = f"since Weather is '{MONTHLY_TABLE}'"


def uses_monthly_table(rows: Rows) -> bool:
    """Whether the weather is the sheet's; a Project sheet at fault names none."""
    return folded(str(getattr(rows.project, "weather", ""))) == MONTHLY_TABLE


def monthly_climate_problems(rows: Rows, typed: Typed) -> Iterator[Problem]:
    """Twelve whole months and a latitude."""
    if not uses_monthly_table(rows):
        return
    if rows.project.latitude is None:
        fix = "Fill in the latitude, north positive."
        yield problem_at(rows.project, "latitude", "an empty cell", f"the latitude of the place, {SINCE}", fix)
    yield from _missing_months(rows, typed)
    for row in rows.monthly_climate:
        for field in ("temperature", "irradiation"):
            if getattr(row, field) is None:
                expected = f"{row.columns()[field].expected}, {SINCE}"
                yield problem_at(row, field, "an empty cell", expected, "Fill in the cell.")


def _missing_months(rows: Rows, typed: Typed) -> Iterator[Problem]:
    """Months without a row; while a row is at fault its month may be the one that is missing."""
    sheet = MonthlyClimateRow.sheet
    if sheet in typed.unreadable or len(rows.monthly_climate) < len(typed.records.get(sheet, ())):
        return
    given = {row.month for row in rows.monthly_climate}
    missing = [month for month in MONTHS if month not in given]
    if missing:
        found = "no rows" if len(missing) == len(MONTHS) else f"no row for {', '.join(missing)}"
        yield Problem(found, f"a row for each month, {SINCE}", "Fill in the twelve months.", sheet=sheet)
