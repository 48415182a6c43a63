"""What a row shows only as a whole, as formulas for conditional formats: gaps and cells that contradict others."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

from openpyxl import Workbook
from openpyxl.workbook.defined_name import DefinedName

from heatledger.inputs.cells import column_letters
from heatledger.inputs.columns import SheetRow, plain
from heatledger.inputs.crosschecks import (
    LEAST_OF_STONE,
    LIGHTEST_SHEET,
    LIGHTEST_STONE,
    MOST_OF_INSULATION,
    THINNEST,
)
from heatledger.inputs.rowchecks import LIGHT, MOST_OF_LIGHT, MOST_OF_STONE
from heatledger.inputs.rows import (
    AirSystemRow,
    BuildUpRow,
    ElementRow,
    GlazedUnitRow,
    GroundFloorRow,
    MaterialRow,
    OpeningRow,
    ShadingDeviceRow,
    ThermalBridgeRow,
    UsageRow,
    ZoneRow,
)
from heatledger.inputs.rules_ground_floors import NEEDED
from heatledger.workbook.references import quoted

__all__ = ["Rows", "gaps", "name_columns", "slips"]

_NAMED: dict[str, tuple[type[SheetRow], str]] = {
    "element_names": (ElementRow, "name"),
    "element_areas": (ElementRow, "area"),
    "material_names": (MaterialRow, "name"),
    "material_densities": (MaterialRow, "density"),
    "material_conductivities": (MaterialRow, "conductivity"),
}
"""Columns that formulas on other sheets need; conditional formats reach other sheets through names."""

_NEITHER = 'AND({build_up}="",{u_value}="",COUNTA({row})>0)'
_BOTH = 'AND({build_up}<>"",{u_value}<>"")'
_CROSSED = "AND(COUNT({heating_set_point},{cooling_set_point})=2,{heating_set_point}>{cooling_set_point})"
_DENSITY = "INDEX(material_densities,MATCH(TRIM({material}),material_names,0))"
_CONDUCTIVITY = "INDEX(material_conductivities,MATCH(TRIM({material}),material_names,0))"
_LOOSE = (
    f"AND({_DENSITY}>0,{_DENSITY}<{plain(LIGHTEST_SHEET)},"
    f"OR({_DENSITY}>={plain(LIGHT)},{_CONDUCTIVITY}<={plain(MOST_OF_INSULATION)},{_CONDUCTIVITY}>{plain(MOST_OF_LIGHT)}))"
)
_STONE = (
    f"AND({_DENSITY}>={plain(LIGHTEST_STONE)},"
    f"{_CONDUCTIVITY}>={plain(LEAST_OF_STONE)},{_CONDUCTIVITY}<={plain(MOST_OF_STONE)})"
)
_OPENINGS = 'SUMPRODUCT(({element:}={element})*({count:}+({count:}=""))*{width:}*{height:})'  # an empty number is 1
_UPRIGHT = (
    'IF({tilt}="",OR({kind}="wall",{kind}="door",{kind}="partition"),AND(ISNUMBER({tilt}),{tilt}<>0,{tilt}<>180))'
)

_Marks = tuple[tuple[type[SheetRow], str, str], ...]

_GAPS: _Marks = (
    (ZoneRow, "usage", 'AND({usage}="",OR({conditioning}="heated",{conditioning}="heated and cooled"))'),
    (
        UsageRow,
        "setback",
        'AND({setback}="",OR(AND({heated_hours}<>"",{heated_hours}<24),AND({days_in_use}<>"",{days_in_use}<7),'
        '{months_out_of_use}<>""))',
    ),
    (
        AirSystemRow,
        "rate",
        'AND({rate}="",{rate_basis}<>"usage",OR({kind}="extract",{kind}="supply",{kind}="balanced"))',
    ),
    (AirSystemRow, "night_cooling_months", 'AND({night_cooling_months}="",N({night_cooling})>0)'),
    (BuildUpRow, "second_material", 'AND({second_material}="",N({second_share})>0)'),
    (BuildUpRow, "second_share", 'AND({second_share}="",{second_material}<>"")'),
    (GlazedUnitRow, "u_value", 'AND({u_value}="",{glazing_u_value}="",{frame_u_value}="",{panes}="",COUNTA({row})>0)'),
    (ElementRow, "build_up", _NEITHER),
    (ElementRow, "u_value", _NEITHER),
    (ElementRow, "azimuth", f'AND({{azimuth}}="",{{faces}}="outdoors",{_UPRIGHT})'),
    (ShadingDeviceRow, "reduction_factor", 'AND({reduction_factor}="",{device}="",COUNTA({row})>0)'),
    (ShadingDeviceRow, "device", 'AND({reduction_factor}="",{device}="",COUNTA({row})>0)'),
    (ShadingDeviceRow, "months_used", 'AND({months_used}="",{control}="months")'),
    (GroundFloorRow, "build_up", _NEITHER),
    (GroundFloorRow, "u_value", _NEITHER),
    (
        ThermalBridgeRow,
        "length",
        'AND({length}="",OR({linear_transmittance}<>"",AND({count}="",{point_transmittance}="",COUNTA({row})>0)))',
    ),
    (ThermalBridgeRow, "linear_transmittance", 'AND({linear_transmittance}="",{length}<>"")'),
    (ThermalBridgeRow, "count", 'AND({count}="",{point_transmittance}<>"")'),
    (ThermalBridgeRow, "point_transmittance", 'AND({point_transmittance}="",{count}<>"")'),
)
"""Cells that must not stay empty because of others in their row."""

_SLIPS: _Marks = (
    (ZoneRow, "cooling_set_point", _CROSSED),
    (UsageRow, "cooling_set_point", _CROSSED),
    (UsageRow, "setback", "AND(COUNT({setback},{heating_set_point})=2,{setback}>{heating_set_point})"),
    (
        MaterialRow,
        "conductivity",
        f"AND(N({{density}})>0,N({{density}})<{plain(LIGHT)},N({{conductivity}})>{plain(MOST_OF_LIGHT)})",
    ),
    (
        BuildUpRow,
        "thickness",
        f"AND(N({{thickness}})>0,N({{thickness}})<{plain(THINNEST)},IFERROR(OR({_LOOSE},{_STONE}),FALSE))",
    ),
    (BuildUpRow, "layer", 'AND({layer}<>"",SUMPRODUCT((TRIM({name:})=TRIM({name}))*({layer:}={layer}))>1)'),
    (ElementRow, "u_value", _BOTH),
    (GroundFloorRow, "u_value", _BOTH),
    (ShadingDeviceRow, "device", 'AND({reduction_factor}<>"",{device}<>"")'),
    (
        OpeningRow,
        "name",
        f'AND({{element}}<>"",IFERROR({_OPENINGS}>INDEX(element_areas,MATCH(TRIM({{element}}),element_names,0))'
        "*(1+1E-9),FALSE))",
    ),
)
"""Cells that cannot be right beside others; ``{field:}`` stands for a whole column."""

_TWICE = 'AND({name}<>"",SUMPRODUCT(--(TRIM({name:})=TRIM({name})))>1)'


@dataclass(frozen=True)
class Rows:
    """The rows of a sheet that are typed in: the first and the last one."""

    model: type[SheetRow]
    first: int
    last: int

    @property
    def length(self) -> int:
        """Number of rows."""
        return self.last - self.first + 1

    @property
    def names(self) -> str:
        """Cells of the first column as formulas on other sheets refer to them."""
        return f"{quoted(self.model.sheet)}!$A${self.first}:$A${self.last}"

    def column(self, field: str) -> str:
        """Cells of a column, e.g. ``E6:E305``."""
        letters = self._letters(field)
        return f"{letters}{self.first}:{letters}{self.last}"

    def formula(self, words: str) -> str:
        """A formula for the first row, cells put in place of the fields."""
        end = column_letters(len(self.model.columns()))
        places = {"{row}": f"$A{self.first}:${end}{self.first}"}
        for field in self.model.columns():
            letters = self._letters(field)
            places[f"{{{field}}}"] = f"${letters}{self.first}"
            places[f"{{{field}:}}"] = f"${letters}${self.first}:${letters}${self.last}"
        for word, place in places.items():
            words = words.replace(word, place)
        return words

    def _letters(self, field: str) -> str:
        return column_letters(list(self.model.columns()).index(field) + 1)


def gaps(model: type[SheetRow]) -> Iterator[tuple[str, str]]:
    """Field and formula of each cell that a row must not leave empty."""
    for field, column in model.columns().items():
        if column.required:
            yield field, f'AND({{{field}}}="",COUNTA({{row}})>0)'
    yield from ((field, formula) for kind, field, formula in _GAPS if kind is model)
    if model is GroundFloorRow:
        yield from _by_type()


def _by_type() -> Iterator[tuple[str, str]]:
    """What the types of ground floors need; a floor level with the ground has no wall above it."""
    for field in dict.fromkeys(field for fields in NEEDED.values() for field in fields):
        types = ",".join(f'{{type}}="{kind}"' for kind, fields in NEEDED.items() if field in fields)
        level = ',NOT(AND({height_above_ground}<>"",{height_above_ground}=0))' if field == "outer_wall_u_value" else ""
        yield field, f'AND({{{field}}}="",OR({types}){level})'


def slips(model: type[SheetRow]) -> Iterator[tuple[str, str]]:
    """Field and formula of each cell that cannot be right beside others."""
    if model.unique:
        yield model.key(), _TWICE.replace("name", model.key())
    yield from ((field, formula) for kind, field, formula in _SLIPS if kind is model)


def name_columns(book: Workbook, rows: dict[type[SheetRow], Rows]) -> None:
    """Name the columns that formulas on other sheets need."""
    for name, (model, field) in _NAMED.items():
        cells = rows[model].formula(f"{{{field}:}}")
        book.defined_names[name] = DefinedName(name, attr_text=f"{quoted(model.sheet)}!{cells}")
