"""The column reference: every column of every input sheet, written from its declaration.

Rebuild with ``python -m heatledger.inputs.reference > templates/COLUMNS.md``.
"""

from __future__ import annotations

from heatledger.inputs.columns import Column
from heatledger.inputs.rows import SHEETS

__all__ = ["column_reference"]


def column_reference() -> str:
    """All columns as a Markdown text, sheet by sheet in the order of the workbook."""
    parts = ["# Columns of the workbook", "", "Required columns are **bold**. A blank optional cell means its default."]
    for model in SHEETS:
        parts += ["", f"## {model.sheet}", "", model.purpose, "", "| column | unit | expected | default | note |"]
        parts += ["|---|---|---|---|---|", *(_line(column) for column in model.columns().values())]
    return "\n".join(parts) + "\n"


def _line(column: Column) -> str:
    title = f"**{column.title}**" if column.required else column.title
    cells = (title, column.unit, column.expected, _default(column), column.help)
    return "| " + " | ".join(cell.replace("|", "\\|") for cell in cells) + " |"


def _default(column: Column) -> str:
    if column.default is None:
        return column.default_note
    shown = f"{column.default:g}" if isinstance(column.default, float) else str(column.default)
    return f"{shown} ({column.default_note})" if column.default_note else shown


if __name__ == "__main__":
    print(column_reference(), end="")
