"""How long `run` takes against the same process doing only its imports, the reading and a plain save.

Prints the ratio of the medians of whole processes, taken in turn; nothing is asserted.
"""

from __future__ import annotations

import statistics
import subprocess
import sys
import tempfile
import time
from pathlib import Path

RUNS = 7
PLAIN = """
import sys
from pathlib import Path
import heatledger.balance.calculate, heatledger.building.resolve, heatledger.climate.files
import heatledger.inputs.workbook_rows, heatledger.workbook.graft, heatledger.workbook.result_sheets
from openpyxl import load_workbook
from heatledger.workbook.reader import read_cells
source, target = map(Path, sys.argv[1:])
read_cells(source)
load_workbook(source).save(target)
"""


def seconds(command: list[str]) -> float:
    begin = time.perf_counter()
    subprocess.run(command, check=True, capture_output=True)
    return time.perf_counter() - begin


def main() -> None:
    with tempfile.TemporaryDirectory() as folder:
        example, target = Path(folder, "example.xlsx"), Path(folder, "target.xlsx")
        tool = [sys.executable, "-m", "heatledger"]
        subprocess.run([*tool, "new", str(example), "--example"], check=True, capture_output=True)
        run = [*tool, "run", str(example), "--output", str(target)]
        plain = [sys.executable, "-c", PLAIN, str(example), str(target)]
        pairs = [(seconds(run), seconds(plain)) for _ in range(RUNS)]
    ratio = statistics.median(one for one, _ in pairs) / statistics.median(other for _, other in pairs)
    print(f"run on the example: {ratio:.2f} × imports, reading and a plain save ({RUNS} runs of each, medians)")


if __name__ == "__main__":
    main()
