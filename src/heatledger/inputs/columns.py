"""Declaring a sheet column: once, for the template, the reader, the error text and the column reference."""

from __future__ import annotations

from dataclasses import dataclass, replace
from functools import cache
from typing import Any, ClassVar, Literal, Self, TypeAlias, cast, get_args

from pydantic import BaseModel, ConfigDict, Field, PrivateAttr
from pydantic.fields import FieldInfo

from heatledger.inputs.cells import reference

__all__ = [
    "COMPASS",
    "Column",
    "SheetRow",
    "azimuth",
    "choice",
    "integer",
    "months",
    "name_from",
    "number",
    "plain",
    "text",
]

ColumnKind: TypeAlias = Literal["text", "number", "integer", "choice", "name", "azimuth", "months"]
"""``name`` refers to the first column of another sheet; ``months`` is a range such as 5-9, read as month numbers."""

COMPASS = ("N", "NNE", "NE", "ENE", "E", "ESE", "SE", "SSE", "S", "SSW", "SW", "WSW", "W", "WNW", "NW", "NNW")
"""Compass directions an azimuth may be typed as, clockwise from north in steps of 22.5°."""


@dataclass(frozen=True)
class Column:
    """A column of a sheet, or a labelled line of the Project sheet.

    Parameters
    ----------
    title, unit, help : str
        As shown in the header row, the row above it and the help note.
    kind : ColumnKind
        What the cell may hold.
    required : bool
        Whether the cell may stay empty.
    default : object
        What an empty cell means; None if nothing is assumed.
    default_note : str
        Words for a default that depends on other cells, or the source of the default.
    choices : tuple of str
        Words of the dropdown.
    names_from : str
        Sheet whose first column lists the allowed names.
    above, at_least, below, at_most : float, optional
        Bounds of a number.
    small_share : bool
        Whether 1 in a column of percent means one percent; elsewhere it is taken for 100 % stored as a fraction.
    """

    title: str
    kind: ColumnKind
    unit: str = ""
    help: str = ""
    required: bool = False
    default: object = None
    default_note: str = ""
    choices: tuple[str, ...] = ()
    names_from: str = ""
    above: float | None = None
    at_least: float | None = None
    below: float | None = None
    at_most: float | None = None
    small_share: bool = False

    @property
    def label(self) -> str:
        """Title with unit, e.g. ``Width [m]``."""
        return f"{self.title} [{self.unit}]" if self.unit else self.title

    @property
    def bounds(self) -> str:
        """The limits of a number in words, empty without limits."""
        if self.at_least is not None and self.at_most is not None:
            return f"from {plain(self.at_least)} to {plain(self.at_most)}"
        lower = _limit("above", self.above) or _limit("at least", self.at_least)
        upper = _limit("below", self.below) or _limit("at most", self.at_most)
        return " and ".join(limit for limit in (lower, upper) if limit)

    @property
    def expected(self) -> str:
        """What the cell should hold, in words."""
        match self.kind:
            case "number" | "integer":
                what = "a whole number" if self.kind == "integer" else "a number"
                return f"{what} {self.bounds}".rstrip() + (", in percent" if self.unit == "%" else "")
            case "choice":
                return f"one of: {', '.join(self.choices)}"
            case "name":
                words = "".join(f"{word}, " for word in self.choices)
                return f"{words + 'or ' if words else ''}a name from sheet {self.names_from}"
            case "azimuth":
                return "degrees from north clockwise, 0 to 360, or a compass direction such as N, NNE, NE"
            case "months":
                return "months as numbers or words, such as 5-9, 11-2, Jun-Aug or 7"
            case "text":
                return "a text"


def _limit(words: str, value: float | None) -> str:
    return "" if value is None else f"{words} {plain(value)}"


def plain(value: float) -> str:
    """A number as a user would type it.

    >>> plain(1_000_000.0), plain(0.1 + 0.2)
    ('1000000', '0.3')
    """
    return f"{value:.12g}"


def _field(column: Column, default: object = None, **constraints: float | None) -> Any:
    given = {key: value for key, value in constraints.items() if value is not None}
    extra = cast("dict[str, Any]", {"column": column})
    return Field(... if column.required else default, json_schema_extra=extra, **cast("dict[str, Any]", given))


def text(title: str, *, help: str, required: bool = False) -> Any:  # noqa: A002 - the trade word of the header note
    """Declare a text column; an empty optional cell is an empty text."""
    return _field(Column(title, "text", help=help, required=required), default="", min_length=1 if required else 0)


def number(
    title: str,
    *,
    unit: str = "",
    help: str,  # noqa: A002
    required: bool = False,
    default: float | None = None,
    default_note: str = "",
    gt: float | None = None,
    ge: float | None = None,
    lt: float | None = None,
    le: float | None = None,
    small_share: bool = False,
) -> Any:
    """Declare a column of numbers with their bounds."""
    column = Column(
        title,
        "number",
        unit,
        help,
        required,
        default,
        default_note,
        above=gt,
        at_least=ge,
        below=lt,
        at_most=le,
        small_share=small_share,
    )
    return _field(column, default, gt=gt, ge=ge, lt=lt, le=le)


def integer(
    title: str,
    *,
    unit: str = "",
    help: str,  # noqa: A002
    required: bool = False,
    default: int | None = None,
    default_note: str = "",
    ge: int,
    le: int,
) -> Any:
    """Declare a column of whole numbers."""
    return _field(
        Column(title, "integer", unit, help, required, default, default_note, at_least=ge, at_most=le),
        default,
        ge=ge,
        le=le,
    )


def choice(
    title: str,
    *,
    help: str,  # noqa: A002
    required: bool = False,
    default: str | None = None,
    default_note: str = "",
) -> Any:
    """Declare a dropdown; its words are the ``Literal`` the field is annotated with."""
    return _field(Column(title, "choice", "", help, required, default, default_note), default)


def name_from(
    sheet: str,
    title: str,
    *,
    help: str,  # noqa: A002
    required: bool = False,
    words: tuple[str, ...] = (),
) -> Any:
    """Declare a column that refers to the first column of another sheet, or holds one of a few words."""
    return _field(Column(title, "name", help=help, required=required, choices=words, names_from=sheet), default="")


def months(title: str, *, help: str, default_note: str = "") -> Any:  # noqa: A002
    """Declare a column of calendar months; an empty cell means none."""
    return _field(Column(title, "months", help=help, default_note=default_note), default=())


def azimuth(title: str, *, help: str, default_note: str) -> Any:  # noqa: A002
    """Declare a direction: degrees from north clockwise or a compass word."""
    return _field(Column(title, "azimuth", "°", help, default_note=default_note, at_least=0, at_most=360), ge=0, le=360)


class SheetRow(BaseModel):
    """A row of an input sheet as typed; units as in the header."""

    model_config = ConfigDict(frozen=True, strict=True, extra="forbid", allow_inf_nan=False)

    sheet: ClassVar[str]
    purpose: ClassVar[str]
    """One sentence that stands under the sheet's title."""
    unique: ClassVar[bool] = True
    """Whether the first column is a name that may stand only once."""
    required_sheet: ClassVar[bool] = False
    """Whether a workbook without this sheet is at fault."""
    either: ClassVar[tuple[str, str, str]] = ("", "", "")
    """A title over texts of one field and numbers of another, e.g. Build-up or U-value, and the two fields."""
    labelled: ClassVar[bool] = False
    """Whether the sheet holds one record, its labels in column A and values in column B."""

    _row: int = PrivateAttr(default=0)
    _positions: dict[str, int] = PrivateAttr(default_factory=dict)

    @classmethod
    def columns(cls) -> dict[str, Column]:
        """Columns of the sheet by field name, in the order of the template."""
        return _columns(cls)

    @classmethod
    def key(cls) -> str:
        """Field of the first column."""
        return next(iter(cls.model_fields))

    def placed(self, row: int, positions: dict[str, int]) -> Self:
        """Remember where this row stands: its row number and the column of each field."""
        self._row, self._positions = row, positions
        return self

    @property
    def row_number(self) -> int:
        """Row of the sheet in which this row stands."""
        return self._row

    def has(self, field: str) -> bool:
        """Whether the sheet has a column for a field; taken for granted of a row without a place."""
        return field in self._positions or not self._positions or self.labelled

    def cell(self, field: str = "") -> str:
        """Cell of a field, e.g. ``E8``; the first column's cell if the field has no column."""
        column = self._positions.get(field) or self._positions.get(self.key(), 1)
        return reference(max(self._row, 1), column)


@cache
def _columns(model: type[SheetRow]) -> dict[str, Column]:
    """Worked out once for each sheet; asked for at every row."""
    return {field: _column(info) for field, info in model.model_fields.items()}


def _column(info: FieldInfo) -> Column:
    column = cast("dict[str, Column]", info.json_schema_extra)["column"]
    if column.kind != "choice":
        return column
    return replace(column, choices=_literal_words(info.annotation))


def _literal_words(annotation: object) -> tuple[str, ...]:
    words: list[str] = []
    for part in get_args(annotation):
        words.extend([part] if isinstance(part, str) else _literal_words(part))
    return tuple(words)
