"""Workbooks filled in from an older template."""

from __future__ import annotations

from pathlib import Path
from typing import TYPE_CHECKING

from click.testing import CliRunner

from heatledger.assess import read_inputs
from heatledger.cli import main
from heatledger.inputs.rows import SHEETS
from heatledger.inputs.workbook_rows import check_rows
from heatledger.workbook.reader import owned_sheets, read_cells

if TYPE_CHECKING:
    from tests.conftest import Book


FIRST_TEMPLATE = {
    "Project": "Project|Client|Assessor|Job number|Address|Weather|Altitude|Latitude|Longitude|Time zone|"
    "Ground reflectance|Site exposure|Dimensions measured|Air density|Method",
    "Zones": "Zone|Conditioning|Usage|Air system|Floor area|Air volume|Thermal mass|Heat capacity|Heating set-point|"
    "Cooling set-point|Leakage n50|Exposed façades",
    "Usage": "Usage|Heating set-point|Cooling set-point|Floor area per person|Heat per person|Presence|Appliances|"
    "Lighting|Share released in zone|Outdoor air per person|Outdoor air per floor area",
    "Air systems": "Air system|Kind|Rate basis|Rate|Running hours per day|Heat recovery|Bypass in cooling",
    "Materials": "Material|Conductivity|Density|Specific heat|Source",
    "Build-ups": "Build-up|Layer|Material|Thickness",
    "Glazed units": "Glazed unit|U-value|g-value|Frame share",
    "Envelope": "Element|Zone|Kind|Faces|Build-up|U-value|Area|Azimuth|Tilt|Solar absorptance",
    "Openings": "Opening|Element|Glazed unit|Number|Width|Height",
    "Ground floors": "Ground floor|Zone|Type|Area|Exposed perimeter|Build-up|U-value|Wall thickness|Soil",
    "Thermal bridges": "Thermal bridge|Zone|Length|Linear transmittance ψ|Number|Point transmittance χ",
}
"""Sheets and columns of the template that came first; workbooks filled in then are still about."""


def test_a_workbook_of_the_first_template_is_read_with_defaults(cottage: Book, tmp_path: Path) -> None:
    """What was added to the template since is taken as its default, the whole way to the results."""
    for sheet, columns in FIRST_TEMPLATE.items():
        old = columns.split("|")
        cells = cottage.sheets[sheet]
        if sheet == "Project":
            gone = {row for (row, column), value in cells.items() if column == 1 and row > 3 and value not in old}
            cottage.sheets[sheet] = {at: value for at, value in cells.items() if at[0] not in gone}
        else:
            kept = {column for (row, column), value in cells.items() if row == 4 and value in old}
            cottage.sheets[sheet] = {at: value for at, value in cells.items() if at[1] in kept or at[0] < 3}
    cottage.sheets = {sheet: cells for sheet, cells in cottage.sheets.items() if sheet in FIRST_TEMPLATE}
    path = cottage.save(tmp_path / "old.xlsx")
    rows = check_rows(read_cells(path))
    added = 0
    for model in SHEETS:
        old = FIRST_TEMPLATE.get(model.sheet, "").split("|")
        fields = {field: column for field, column in model.columns().items() if column.title not in old}
        for row in rows.of(model.sheet):
            for field in fields:
                assert getattr(row, field) == type(row).model_fields[field].default, (model.sheet, field)
                added += 1
    assert added > 40
    building, climate = read_inputs(path)
    assert [zone.name for zone in building.zones] == ["House", "Loft"]
    assert climate.name == "Golden CO"
    assert CliRunner().invoke(main, ["run", str(path)]).exit_code == 0
    assert len(owned_sheets(path)) == 7


def test_a_column_that_was_always_needed_is_named(cottage: Book, tmp_path: Path) -> None:
    """What has no default is to be added, and the sentence says what and where."""
    path = cottage.change({"Zones!E4": None}).save(tmp_path / "old.xlsx")
    result = CliRunner().invoke(main, ["run", str(path)])
    assert (result.exit_code, result.stderr) == (
        1,
        "Zones  Floor area [m²]: found no title 'Floor area'; expected the column Floor area. "
        "Add it, or copy the titles from a fresh template.\n1 problem; nothing was written.\n",
    )
