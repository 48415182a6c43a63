"""Monthly heating and cooling need of a building, from a filled-in workbook to result sheets."""

from __future__ import annotations

from importlib import import_module
from typing import TYPE_CHECKING, Any

from heatledger.assess import assess, assess_building, read_workbook
from heatledger.errors import InputError, Problem

if TYPE_CHECKING:
    from heatledger.climate.monthly import MonthlyClimate
    from heatledger.climate.monthly_table import monthly_table_climate
    from heatledger.results import Results

__version__ = "0.1.0"

__all__ = [
    "InputError",
    "MonthlyClimate",
    "Problem",
    "Results",
    "__version__",
    "assess",
    "assess_building",
    "monthly_table_climate",
    "read_workbook",
]

_LOADED_WHEN_USED = {
    "MonthlyClimate": "heatledger.climate.monthly",
    "Results": "heatledger.results",
    "monthly_table_climate": "heatledger.climate.monthly_table",
}
"""Names whose modules take time to import; the command line starts without them."""


def __getattr__(name: str) -> Any:
    if name in _LOADED_WHEN_USED:
        return getattr(import_module(_LOADED_WHEN_USED[name]), name)
    raise AttributeError(f"module 'heatledger' has no attribute {name!r}")
