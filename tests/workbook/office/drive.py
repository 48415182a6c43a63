"""Drives LibreOffice as a person does: cells are typed in and copied. Runs under a Python that knows ``uno``.

    python drive.py ADDRESS STEPS

STEPS is a JSON file with a list of steps: ["open", file], ["type", sheet, cell, text], ["copy", sheet, cells],
["paste", sheet, cell], ["sort", sheet, cell], ["insert", sheet, cell], ["save", file]; a step works on the document
opened last, "switch" goes back to the first one.
"""

from __future__ import annotations

import json
import sys
import time
from pathlib import Path
from typing import Any


def connected(address: str) -> Any:
    import uno  # type: ignore[import-not-found]

    local = uno.getComponentContext()
    resolver = local.ServiceManager.createInstanceWithContext("com.sun.star.bridge.UnoUrlResolver", local)
    for _ in range(120):
        try:
            return resolver.resolve(f"uno:{address};urp;StarOffice.ComponentContext")
        except Exception:
            time.sleep(0.5)
    raise SystemExit("LibreOffice does not answer")


def properties(**values: object) -> tuple[Any, ...]:
    from com.sun.star.beans import PropertyValue  # type: ignore[import-not-found]

    return tuple(PropertyValue(Name=name, Value=value) for name, value in values.items())


class Office:
    def __init__(self, context: Any) -> None:
        create = context.ServiceManager.createInstanceWithContext
        self.desktop = create("com.sun.star.frame.Desktop", context)
        self.dispatcher = create("com.sun.star.frame.DispatchHelper", context)
        self.documents: list[Any] = []

    def _do(self, command: str, **values: object) -> None:
        frame = self.documents[-1].getCurrentController().getFrame()
        self.dispatcher.executeDispatch(frame, f".uno:{command}", "", 0, properties(**values))

    def _go(self, sheet: str, cells: str) -> None:
        controller = self.documents[-1].getCurrentController()
        controller.setActiveSheet(self.documents[-1].Sheets.getByName(sheet))
        self._do("GoToCell", ToPoint=cells)

    def open(self, file: str) -> None:
        self.documents.append(self.desktop.loadComponentFromURL(Path(file).as_uri(), "_blank", 0, ()))

    def close(self) -> None:
        self.documents.pop().close(True)

    def switch(self) -> None:
        self.documents.reverse()

    def type(self, sheet: str, cell: str, text: str) -> None:
        self._go(sheet, cell)
        self._do("EnterString", StringName=text)

    def copy(self, sheet: str, cells: str) -> None:
        self._go(sheet, cells)
        self._do("Copy")

    def paste(self, sheet: str, cell: str) -> None:
        self._go(sheet, cell)
        self._do("Paste")

    def sort(self, sheet: str, cell: str) -> None:
        self._go(sheet, cell)
        self._do("SortDescending")

    def insert(self, sheet: str, cell: str) -> None:
        self._go(sheet, cell)
        self._do("InsertRowsBefore")

    def save(self, file: str) -> None:
        kind = properties(FilterName="Calc MS Excel 2007 XML", Overwrite=True)
        self.documents[-1].storeToURL(Path(file).as_uri(), kind)


def main(address: str, steps: str) -> None:
    office = Office(connected(address))
    try:
        for name, *arguments in json.loads(Path(steps).read_text(encoding="utf-8")):
            getattr(office, name)(*arguments)
    finally:
        office.desktop.terminate()


if __name__ == "__main__":
    main(*sys.argv[1:])
