"""From the cells of a workbook to checked rows of every sheet, with all problems at once."""

from __future__ import annotations

from collections.abc import Callable, Iterable, Mapping, Sequence
from typing import TypeVar, cast

from heatledger.errors import InputError, Problem
from heatledger.inputs.cells import Cells
from heatledger.inputs.checking import check_record
from heatledger.inputs.columns import SheetRow
from heatledger.inputs.crosschecks import cross_check
from heatledger.inputs.names import Typed, check_names
from heatledger.inputs.rowchecks import check_row
from heatledger.inputs.rows import (
    SHEETS,
    AirSystemRow,
    BuildUpRow,
    ElementRow,
    GlazedUnitRow,
    GroundFloorRow,
    MaterialRow,
    MonthlyClimateRow,
    ObstructionRow,
    OpeningRow,
    ProjectRow,
    Rows,
    ShadingDeviceRow,
    ThermalBridgeRow,
    UsageRow,
    ZoneRow,
)
from heatledger.inputs.tables import Record, Table, header_row, read_labels, read_table
from heatledger.inputs.wording import folded, nearest

__all__ = ["check_rows"]

Row = TypeVar("Row", bound=SheetRow)


def check_rows(sheets: Mapping[str, Cells], weather_check: Callable[[Rows], Iterable[Problem]] = lambda _: ()) -> Rows:
    """Check every input sheet of a workbook.

    Parameters
    ----------
    sheets : mapping of str to Cells
        Filled cells by sheet name; names are matched without regard to case.
    weather_check : callable, optional
        Finds problems of the weather that a sound Project sheet names, so that they are told in the same run.

    Returns
    -------
    Rows

    Raises
    ------
    InputError
        With every problem of every sheet, in the order of the sheets and rows.
    """
    collector = _Collector(sheets)
    project = collector.labels(ProjectRow)
    names_weather = not collector.problems
    rows = Rows(
        project,
        collector.table(ZoneRow),
        collector.table(UsageRow),
        collector.table(AirSystemRow),
        collector.table(MaterialRow),
        collector.table(BuildUpRow),
        collector.table(GlazedUnitRow),
        collector.table(ElementRow),
        collector.table(OpeningRow),
        collector.table(ObstructionRow),
        collector.table(ShadingDeviceRow),
        collector.table(GroundFloorRow),
        collector.table(ThermalBridgeRow),
        collector.table(MonthlyClimateRow),
    )
    absent = frozenset(model.sheet for model in SHEETS if folded(model.sheet) not in collector.sheets)
    typed = Typed(collector.records, frozenset(collector.unreadable), absent)
    weather_problems = weather_check(rows) if names_weather else ()
    problems = [*weather_problems, *collector.problems, *check_names(typed), *cross_check(rows, typed)]
    if problems:
        raise InputError(sorted(problems, key=_place_order))
    return rows


class _Collector:
    """Reads sheet after sheet and keeps every problem and every record."""

    def __init__(self, sheets: Mapping[str, Cells]) -> None:
        self.sheets = {folded(name): cells for name, cells in sheets.items()}
        ours = {folded(model.sheet) for model in SHEETS}
        self.others = {name: cells for name, cells in sheets.items() if folded(name) not in ours}
        self.problems: list[Problem] = []
        self.records: dict[str, Sequence[Record]] = {}
        self.unreadable: set[str] = set()

    def table(self, model: type[Row]) -> tuple[Row, ...]:
        """Checked rows of a sheet with a header row."""
        table = self._table(model)
        rows = [self._row(model, record) for record in table.records]
        return tuple(row for row in rows if row is not None)

    def labels(self, model: type[Row]) -> Row:
        """The checked row of a sheet with labels in column A; an empty one if it is at fault."""
        table = self._table(model)
        row = self._row(model, table.records[0]) if table.records else None
        return row if row is not None else cast("Row", model.model_construct())

    def _row(self, model: type[Row], record: Record) -> Row | None:
        checked = check_record(model, record)
        self.problems += checked.problems
        self.problems += check_row(checked)
        return checked.row

    def _table(self, model: type[SheetRow]) -> Table:
        """Records of a sheet; none if it is absent, which is a problem if it is required or seems renamed."""
        cells = self.sheets.get(folded(model.sheet))
        if cells is not None:
            table = read_labels(model, cells) if model.labelled else read_table(model, cells)
        else:
            table = _absent(model, self.others)
        self.problems += table.problems
        self.records[model.sheet] = table.records
        if not table.complete:
            self.unreadable.add(model.sheet)
        return table


def _absent(model: type[SheetRow], others: Mapping[str, Cells]) -> Table:
    renamed = nearest(model.sheet, others, 0.6 if model.required_sheet else 0.75) or _with_titles(model, others)
    if not model.required_sheet and not renamed:
        return Table()
    fix = f"Rename '{renamed}' to '{model.sheet}'." if renamed else "Copy it from a fresh template."
    problem = Problem("no such sheet", f"a sheet named {model.sheet}", fix, sheet=model.sheet)
    return Table(problems=(problem,), complete=False)


def _with_titles(model: type[SheetRow], others: Mapping[str, Cells]) -> str:
    """The first sheet of another name that has all the required titles."""
    if model.labelled:
        return ""
    tables = ((name, read_table(model, cells)) for name, cells in others.items() if header_row(model, cells))
    return next((name for name, table in tables if table.complete and table.records), "")


def _place_order(problem: Problem) -> tuple[int, int, int, str]:
    """Sheets in the order of the workbook, then rows, then columns."""
    order = [model.sheet for model in SHEETS]
    sheet = order.index(problem.sheet) if problem.sheet in order else len(order)
    letters = problem.cell.rstrip("0123456789")
    return sheet, int(problem.cell[len(letters) :] or 0), len(letters), letters
