"""Native charts: axes shown, units in the titles, fonts named, colours that differ in grey as well."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from typing import Any, Literal, cast

from openpyxl.chart import BarChart, ScatterChart
from openpyxl.chart.axis import ChartLines, NumericAxis
from openpyxl.chart.data_source import (
    AxDataSource,
    NumData,
    NumDataSource,
    NumFmt,
    NumRef,
    NumVal,
    StrData,
    StrRef,
    StrVal,
)
from openpyxl.chart.label import DataLabelList
from openpyxl.chart.layout import Layout
from openpyxl.chart.legend import Legend
from openpyxl.chart.marker import Marker
from openpyxl.chart.series import Series, SeriesLabel, XYSeries
from openpyxl.chart.shapes import GraphicalProperties
from openpyxl.chart.text import RichText, Text
from openpyxl.chart.title import Title
from openpyxl.drawing.colors import ColorChoice
from openpyxl.drawing.fill import PatternFillProperties
from openpyxl.drawing.line import LineProperties
from openpyxl.drawing.spreadsheet_drawing import AnchorMarker, TwoCellAnchor
from openpyxl.drawing.text import (
    CharacterProperties,
    Font,
    Paragraph,
    ParagraphProperties,
    RegularTextRun,
    RichTextProperties,
)
from openpyxl.worksheet.worksheet import Worksheet

from heatledger.inputs.cells import reference
from heatledger.workbook.look import FONT, INK, RULE
from heatledger.workbook.references import quoted

__all__ = [
    "BLUE",
    "GREEN",
    "GREY",
    "ORANGE",
    "SKY",
    "VERMILLION",
    "YELLOW",
    "Area",
    "Bars",
    "Curve",
    "add_bars",
    "add_columns",
    "add_curves",
]

BLUE, ORANGE, GREEN, SKY, VERMILLION, YELLOW = "0072B2", "E69F00", "009E73", "56B4E9", "D55E00", "F0E442"
"""Palette of Okabe and Ito (2008), Color Universal Design."""
GREY = "E2E2E2"
"""Lighter than all others in a print without colours, where its rim tells it from the paper."""


@dataclass(frozen=True)
class Area:
    """Cells of a sheet side by side or one below the other."""

    row: int
    column: int
    last_row: int
    last_column: int

    @classmethod
    def across(cls, row: int, first: int, last: int) -> Area:
        """Cells of a row."""
        return cls(row, first, row, last)

    @classmethod
    def down(cls, column: int, first: int, last: int) -> Area:
        """Cells of a column."""
        return cls(first, column, last, column)

    def formula(self, sheet: Worksheet) -> str:
        """Reference with the sheet's name."""
        corners = (reference(self.row, self.column), reference(self.last_row, self.last_column))
        fixed = [f"${corner.rstrip('0123456789')}${corner.lstrip(_LETTERS)}" for corner in corners]
        return f"{quoted(sheet.title)}!{':'.join(dict.fromkeys(fixed))}"

    def values(self, sheet: Worksheet) -> list[object]:
        """What the cells hold, row by row."""
        return [
            sheet.cell(row, column).value
            for row in range(self.row, self.last_row + 1)
            for column in range(self.column, self.last_column + 1)
        ]


_LETTERS = "ABCDEFGHIJKLMNOPQRSTUVWXYZ"


@dataclass(frozen=True)
class Bars:
    """One series: its name or the cell that holds it, its values and its colour; hatched to differ in grey as well."""

    name: Area | str
    values: Area
    colour: str
    hatched: bool = False


@dataclass(frozen=True)
class Curve:
    """One series of points: its name, where they stand along the level axis, their values, and its look."""

    name: str
    places: Area
    values: Area
    colour: str
    dashed: bool = False


def add_columns(
    sheet: Worksheet,
    place: Area,
    titles: tuple[str, str],
    categories: Area,
    series: Sequence[Bars],
    *,
    stacked: bool = False,
) -> None:
    """Upright columns, month by month.

    Parameters
    ----------
    sheet : Worksheet
        Holds the cells and gets the chart.
    place : Area
        Cells it covers, so that it is as wide as the table whatever the font.
    titles : tuple of str
        Of the chart and of the value axis, the latter with its unit.
    categories : Area
        Names below the columns.
    series : sequence of Bars
    stacked : bool
        Columns on top of each other instead of side by side.
    """
    chart = _chart(sheet, "col", titles, categories, series)
    chart.gapWidth = 50
    if stacked:
        chart.grouping, chart.overlap = "stacked", 100
    _place(sheet, chart, place)


def add_bars(
    sheet: Worksheet,
    place: Area,
    titles: tuple[str, str],
    categories: Area,
    series: Sequence[Bars],
    *,
    digits: str = "#,##0",
) -> None:
    """Level bars, the first at the top, with their values beside them; parameters as in :func:`add_columns`."""
    chart = _chart(sheet, "bar", titles, categories, series)
    chart.gapWidth = 40
    chart.x_axis.scaling.orientation = "maxMin"
    chart.y_axis.crosses = "max"
    chart.x_axis.tickLblSkip = 1  # every bar keeps its name
    if len(series) == 1:
        _label_values(chart, digits)
    _place(sheet, chart, place)


def add_curves(
    sheet: Worksheet, place: Area, titles: tuple[str, str, str], curves: Sequence[Curve], *, step: float
) -> None:
    """Points joined by straight lines over a level axis of numbers.

    Parameters
    ----------
    sheet, place
        As in :func:`add_columns`.
    titles : tuple of str
        Of the chart, of the level and of the upright axis, these two with their units.
    curves : sequence of Curve
        A second one may be dashed, to be told apart in grey.
    step : float
        Between the figures of the level axis, which begins one step before zero.
    """
    chart = ScatterChart()
    chart.scatterStyle = "lineMarker"
    chart.varyColors = False
    _frame(chart, titles[0], legend=len(curves) > 1)
    chart.series = [_curve(sheet, curve, order) for order, curve in enumerate(curves)]
    _axes(chart, titles[2], upright=True)
    chart.x_axis.title = _title(titles[1], 9)
    chart.x_axis.numFmt = NumFmt("0", sourceLinked=False)
    chart.x_axis.majorGridlines = None
    chart.x_axis.crosses = chart.y_axis.crosses = "min"
    level = cast("NumericAxis", chart.x_axis)
    level.scaling.min, level.majorUnit = -step, step
    _place(sheet, chart, place)


def _curve(sheet: Worksheet, curve: Curve, order: int) -> XYSeries:
    series = XYSeries(idx=order, order=order)
    series.tx = SeriesLabel(v=curve.name)
    series.xVal = AxDataSource(numRef=_numbers(sheet, curve.places))
    series.yVal = NumDataSource(numRef=_numbers(sheet, curve.values))
    line = LineProperties(solidFill=curve.colour, w=22225, prstDash="dash" if curve.dashed else "solid")
    series.graphicalProperties = GraphicalProperties(ln=line)
    fill = GraphicalProperties(solidFill=curve.colour, ln=LineProperties(solidFill=curve.colour))
    series.marker = Marker(symbol="square" if curve.dashed else "circle", size=5, spPr=fill)
    series.smooth = False
    return series


def _label_values(chart: BarChart, digits: str) -> None:
    """Values beside the bars; lines behind them would cross the figures."""
    chart.y_axis.majorGridlines = None
    chart.dataLabels = DataLabelList(
        showVal=True, showSerName=False, showCatName=False, showLegendKey=False, showPercent=False, numFmt=digits
    )
    chart.dataLabels.txPr = _properties(8)


def _chart(
    sheet: Worksheet,
    kind: Literal["col", "bar"],
    titles: tuple[str, str],
    categories: Area,
    series: Sequence[Bars],
) -> BarChart:
    chart = BarChart()
    chart.type = kind
    chart.varyColors = False
    _frame(chart, titles[0], legend=len(series) > 1)
    chart.series = [_series(sheet, categories, bars, order) for order, bars in enumerate(series)]
    _axes(chart, titles[1], upright=kind == "col")
    return chart


def _frame(chart: BarChart | ScatterChart, title: str, *, legend: bool) -> None:
    """What all charts share: title, no border, the legend below if there is something to tell apart."""
    chart.roundedCorners = False
    chart.title = _title(title, 11, bold=True)
    chart.graphical_properties = GraphicalProperties(noFill=True, ln=LineProperties(noFill=True))
    chart.legend = Legend(legendPos="b", overlay=False, txPr=_properties(9)) if legend else None


def _place(sheet: Worksheet, chart: BarChart | ScatterChart, place: Area) -> None:
    start = AnchorMarker(col=place.column - 1, row=place.row - 1)
    end = AnchorMarker(col=place.last_column, row=place.last_row)
    chart.anchor = cast("Any", TwoCellAnchor(editAs="twoCell", _from=start, to=end))
    sheet.add_chart(chart)


def _axes(chart: BarChart | ScatterChart, unit: str, *, upright: bool) -> None:
    """Axes are told to be shown: without the word some programs hide them."""
    for axis in (chart.x_axis, chart.y_axis):
        axis.delete = False
        axis.txPr = _properties(9)
        axis.graphicalProperties = GraphicalProperties(ln=LineProperties(solidFill="808080", w=6350))
    chart.x_axis.tickLblPos = "low"
    chart.x_axis.numFmt = NumFmt("General", sourceLinked=False)
    chart.y_axis.numFmt = NumFmt("#,##0", sourceLinked=False)
    chart.y_axis.title = _title(unit, 9, upright=upright)
    chart.y_axis.majorGridlines = ChartLines(GraphicalProperties(ln=LineProperties(solidFill=RULE, w=6350)))


def _series(sheet: Worksheet, categories: Area, bars: Bars, order: int) -> Series:
    series = Series(idx=order, order=order)
    name = bars.name
    series.tx = SeriesLabel(v=name) if isinstance(name, str) else SeriesLabel(strRef=_texts(sheet, name))
    series.cat = AxDataSource(strRef=_texts(sheet, categories))
    series.val = NumDataSource(numRef=_numbers(sheet, bars.values))
    series.graphicalProperties = _fill(bars)
    series.invertIfNegative = False
    return series


def _fill(bars: Bars) -> GraphicalProperties:
    if bars.hatched:
        pattern = PatternFillProperties(prst="wdUpDiag", fgClr=_colour(bars.colour), bgClr=_colour("FFFFFF"))
        return GraphicalProperties(pattFill=pattern, ln=LineProperties(solidFill=bars.colour, w=3175))
    # A rim in the colour of the paper would cut the axis at every column of no height.
    rim = LineProperties(solidFill="808080", w=3175) if bars.colour == GREY else LineProperties(noFill=True)
    return GraphicalProperties(solidFill=bars.colour, ln=rim)


def _colour(code: str) -> ColorChoice:
    return ColorChoice(srgbClr=cast("Any", code))


def _texts(sheet: Worksheet, area: Area) -> StrRef:
    """Reference with the values it had, for programs that show a file without calculating it."""
    values = area.values(sheet)
    points = [StrVal(idx=place, v=str(value)) for place, value in enumerate(values) if value is not None]
    return StrRef(f=area.formula(sheet), strCache=StrData(ptCount=len(values), pt=points))


def _numbers(sheet: Worksheet, area: Area) -> NumRef:
    values = area.values(sheet)
    points = [NumVal(idx=place, v=value) for place, value in enumerate(values) if isinstance(value, int | float)]
    return NumRef(f=area.formula(sheet), numCache=NumData(formatCode="General", ptCount=len(values), pt=points))


def _letters(size: float, bold: bool = False) -> CharacterProperties:
    return CharacterProperties(latin=Font(typeface=FONT), sz=int(size * 100), b=bold, solidFill=INK)


def _properties(size: float) -> RichText:
    paragraph = Paragraph(pPr=ParagraphProperties(defRPr=_letters(size)), endParaRPr=_letters(size))
    return RichText(bodyPr=RichTextProperties(), p=[paragraph])


def _title(text: str, size: float, *, bold: bool = False, upright: bool = False) -> Title:
    letters = _letters(size, bold)
    run = RegularTextRun(rPr=letters, t=text)
    body = RichTextProperties(rot=-5400000, vert="horz") if upright else RichTextProperties()
    rich = RichText(bodyPr=body, p=[Paragraph(pPr=ParagraphProperties(defRPr=letters), r=[run])])
    return Title(tx=Text(rich=rich), overlay=False, layout=Layout())
