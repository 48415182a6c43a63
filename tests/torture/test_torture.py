"""Harmed workbooks, killed processes, full disks, missing rights: always a sentence, never a lost file."""

from __future__ import annotations

import contextlib
import json
import os
import re
import shutil
import subprocess
import sys
import tempfile
import textwrap
from collections.abc import Iterator
from datetime import date
from pathlib import Path
from typing import TYPE_CHECKING, Any

import pytest
from click.testing import CliRunner

from heatledger.assess import read_inputs
from heatledger.cli import main
from heatledger.inputs.rows import SHEETS
from heatledger.inputs.workbook_rows import check_rows
from heatledger.workbook.reader import owned_sheets, read_cells

if TYPE_CHECKING:
    from tests.conftest import Book

ROOT = Path(__file__).parents[2]
CASES = int(os.environ.get("HEATLEDGER_FUZZ_CASES", "500"))
SEED = int(os.environ.get("HEATLEDGER_FUZZ_SEED", "5"))
LARGE = 7
posix = pytest.mark.skipif(os.name != "posix", reason="Windows has no such limits, rights and signals")


def module(name: str, *arguments: object) -> subprocess.Popen[str]:
    """A script of this folder in a process of its own."""
    command = [sys.executable, "-m", f"tests.torture.{name}", *map(str, arguments)]
    quiet = {**os.environ, "OPENBLAS_NUM_THREADS": "1", "OMP_NUM_THREADS": "1"}
    return subprocess.Popen(command, cwd=ROOT, env=quiet, stdout=subprocess.PIPE, stderr=subprocess.PIPE, text=True)


@pytest.fixture
def house(cottage: Book, tmp_path: Path) -> Path:
    """A sound workbook with a sheet of the user."""
    cottage.sheets["Survey"] = {(1, 1): "Mine", (1, 2): date(2024, 1, 2), (2, 1): 3.5}
    return cottage.save(tmp_path / "house.xlsx")


@posix
def test_no_harm_to_a_workbook_does_harm(house: Path, capsys: pytest.CaptureFixture[str]) -> None:
    """Each case: a sentence or sound results, in 10 s and 1 GB, and no workbook changed that was refused."""
    drawn = CASES - LARGE
    half = drawn // 2 + 15  # the large ones take as long as thirty others
    shares = [(0, half, ()), (half, drawn - half, ("--large", "few"))]
    with contextlib.ExitStack() as running:
        workers = [
            running.enter_context(
                module("fuzz", house, "--seed", SEED, "--first", first, "--cases", cases, "--json", *more)
            )
            for first, cases, more in shares
        ]
        for worker in workers:
            running.callback(worker.kill)
        heard = [worker.communicate(timeout=120 + CASES) for worker in workers]
    assert all(output for output, _ in heard), [errors[-3000:] for _, errors in heard]
    counts: list[dict[str, Any]] = [json.loads(output) for output, _ in heard]
    faults = {
        kind: [fault for count in counts for fault in count[kind]]
        for kind in ("tracebacks", "changed", "unsound", "slow")
    }
    cases, peak = sum(count["cases"] for count in counts), max(count["peak"] for count in counts)
    longest = max(count["longest"] for count in counts)
    with capsys.disabled():
        print(
            f"\n{cases} cases, {len(faults['tracebacks'])} tracebacks, {len(faults['changed'])} changed inputs",
            file=sys.stderr,
        )
        print(f"longest {longest:.1f} s, at most {peak} MB", file=sys.stderr)
    assert faults == {"tracebacks": [], "changed": [], "unsound": [], "slow": []}
    assert cases == CASES
    assert peak < 1000
    statuses = {status: sum(count["statuses"].get(status, 0) for count in counts) for status in ("0", "1")}
    assert min(statuses.values()) > CASES / 5  # neither all sound nor all refused


@posix
def test_a_kill_at_a_random_moment_leaves_the_old_or_the_new_file(
    house: Path, tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    output, errors = module("kill", house, tmp_path, "--kills", 100).communicate(timeout=180)
    with capsys.disabled():
        print(f"\n{output.strip()}", file=sys.stderr)
    found = re.match(r"100 kills, 0 broken files, \{'\w+': (\d+), '\w+': (\d+)\}", output)
    assert found, errors[-2000:]
    assert min(int(found[1]), int(found[2])) > 5  # both versions were met


# Disks, rights and locks


FULL = (
    "house.xlsx: found no room left on the disk; expected room for the whole workbook. "
    "Free some space, or give another name with --output.\n1 problem; nothing was written.\n"
)
LOCKED = (
    "house.xlsx: found that it may not be written (it is open elsewhere, or it or its folder is read-only); "
    "expected a file that may be written. Close the file in your spreadsheet program, or give another name with "
    "--output.\n1 problem; nothing was written.\n"
)
UNREADABLE = (
    "house.xlsx: found a file that may not be read; expected a file you may read. "
    "Close it in other programs, or ask its owner for the right to read it.\n1 problem; nothing was written.\n"
)


def run_as(program: str, path: Path, warm: Path) -> tuple[int, str]:
    """Exit status and sentences of a run in a process in which a program sets limits first."""
    text = f"""
        import os, shutil, sys, tempfile
        from pathlib import Path
        from click.testing import CliRunner
        from heatledger.cli import main
        path = Path(sys.argv[1])
        with tempfile.TemporaryDirectory() as folder:  # imports what a run needs while all may be read
            shutil.copy(sys.argv[2], Path(folder) / "warm.xlsx")
            assert CliRunner().invoke(main, ["run", str(Path(folder) / "warm.xlsx")]).exit_code == 0
        {program}
        main(["run", str(path)])
    """
    command = [sys.executable, "-c", textwrap.dedent(text), str(path), str(warm)]
    done = subprocess.run(command, capture_output=True, text=True, check=False, timeout=120)
    return done.returncode, done.stderr


@pytest.fixture
def small_disk(tmp_path: Path) -> Iterator[Path | None]:
    """A disk of 64 KB, if this user may make one."""
    folder = tmp_path / "disk"
    folder.mkdir()
    mount = shutil.which("mount")
    options = [mount or "", "-t", "tmpfs", "-o", "size=64k", "tmpfs", str(folder)]
    made = bool(mount) and subprocess.run(options, capture_output=True, check=False).returncode == 0
    yield folder if made else None
    if made:
        subprocess.run(["umount", str(folder)], check=True)


@posix
def test_a_full_disk_is_told(house: Path, small_disk: Path | None) -> None:
    before = house.read_bytes()
    if small_disk:
        path = Path(shutil.copy(house, small_disk))
        result = CliRunner().invoke(main, ["run", str(path)])
        found = result.exit_code, result.stderr
    else:
        path = house
        found = run_as("import resource; resource.setrlimit(resource.RLIMIT_FSIZE, (20_000, 20_000))", path, house)
    assert found == (1, FULL)
    assert path.read_bytes() == before
    assert [name for name in os.listdir(path.parent) if name.endswith(".tmp")] == []


@posix
@pytest.mark.parametrize(
    ("of_file", "of_folder", "sentence"),
    [(0o644, 0o555, LOCKED), (0o444, 0o777, LOCKED), (0o000, 0o777, UNREADABLE), (0o644, 0o000, UNREADABLE)],
    ids=["read-only folder", "read-only file", "unreadable file", "closed folder"],
)
def test_missing_rights_are_told(house: Path, of_file: int, of_folder: int, sentence: str) -> None:
    before = house.read_bytes()
    with tempfile.TemporaryDirectory() as name:  # the folders of pytest are closed to other users
        os.chmod(name, 0o755)
        folder = Path(name) / "jobs"
        folder.mkdir()
        path = Path(shutil.copy(house, folder))
        path.chmod(of_file)
        folder.chmod(of_folder)
        try:
            other = "if os.geteuid() == 0: os.setgroups([]); os.setegid(65534); os.seteuid(65534)"
            assert run_as(other, path, house) == (1, sentence)
        finally:
            folder.chmod(0o755)
        path.chmod(0o644)
        assert path.read_bytes() == before
        assert os.listdir(folder) == ["house.xlsx"]


@pytest.mark.parametrize("step", ["replace", "open"])
def test_a_file_that_another_program_holds_is_told(house: Path, monkeypatch: pytest.MonkeyPatch, step: str) -> None:
    """As Windows refuses it: at the last step, or already when it is read."""
    before = house.read_bytes()

    def refuse(*_arguments: object, **_options: object) -> None:
        raise PermissionError(13, "The process cannot access the file because it is being used by another process")

    with monkeypatch.context() as patched:
        patched.setattr(os if step == "replace" else Path, step, refuse)
        result = CliRunner().invoke(main, ["run", str(house)])
    assert (result.exit_code, result.stderr) == (1, LOCKED if step == "replace" else UNREADABLE)
    assert house.read_bytes() == before
    assert os.listdir(house.parent) == ["house.xlsx"]


# Weather


FORMATS = "an EPW, TMY3, TMY2, PVGIS or NSRDB file or an hourly table of heatledger"
KIND = f"found a file of another kind; expected {FORMATS}. Give an hourly weather file of one of these formats."
YEAR = "expected 8760 hours. Give a file of one whole year, 1 January to 31 December, one row for each hour."
LONG = f"with a line of more than 20,000 letters; expected {FORMATS}. Download the file again."
HEAD = b"LOCATION,Town,State,ABC,TMY,123456,40.0,-105.0,-7.0,1800.0\n"


def shipped(share: float) -> bytes:
    data = (ROOT / "weather" / "golden-co.csv").read_bytes()
    return data[: data.index(b"\n", int(len(data) * share)) + 1]


WEATHER: dict[str, tuple[bytes, str]] = {
    "empty.epw": (b"", KIND),
    "binary.epw": (bytes(range(256)) * 400, KIND),
    "spaces.txt": (b" " * 1000, KIND),
    "line.epw": (b"a" * 30_000_000, KIND),
    "head.epw": (HEAD, f"found 0 hours; {YEAR}"),
    "long line.epw": (HEAD + b"a," * 15_000_000, f"found an EPW file {LONG}"),
    "long line.csv": (
        b"# Hourly climate of heatledger\n" + b"1," * 10_000_000,
        f"found an hourly table of heatledger {LONG}",
    ),
    "quotes.csv": (b"Source,Location ID," + b'"' * 1_000_000, f"found an NSRDB file {LONG}"),
    "deep.json": (
        b'{"outputs": {"tmy_hourly": ' + b"[" * 100_000,
        "found a PVGIS file that cannot be read (RecursionError: maximum recursion depth exceeded while decoding a "
        f"JSON array from a unicode string); expected {FORMATS}. "
        "Download the file again, or save it anew with the program it comes from.",
    ),
    "cut in a line.csv": (
        shipped(0.8) + b"10,",
        "found 'hour 0 of 0 October' in row 7009 of the hours; expected a day of the calendar and an hour "
        "from 1 to 24. Correct the date, or download the file again.",
    ),
    "cut.csv": (shipped(0.8), f"found 7008 hours; {YEAR}"),
    "packed.epw": (
        b"PK\x03\x04" + bytes(100),
        f"found a packed file (zip) or a workbook; expected {FORMATS}. Unpack it and give the weather file inside.",
    ),
    "large.epw": (
        bytes(50_000_001),
        "found a file of more than 50 MB; expected a weather file of a few MB. Give a file of one year of hours.",
    ),
}


@pytest.mark.parametrize("name", WEATHER)
def test_a_broken_weather_file_is_told(cottage: Book, tmp_path: Path, name: str) -> None:
    data, sentence = WEATHER[name]
    (tmp_path / name).write_bytes(data)
    path = cottage.change({"Project!B5": name}).save(tmp_path / "house.xlsx")
    before = path.read_bytes()
    result = CliRunner().invoke(main, ["run", str(path)])
    assert (result.exit_code, result.stderr) == (
        1,
        f"{name}  Project!B5  Weather: {sentence}\n1 problem; nothing was written.\n",
    )
    assert path.read_bytes() == before


def test_a_name_longer_than_a_path_may_be_is_told(cottage: Book, tmp_path: Path) -> None:
    path = cottage.change({"Project!B5": "w" * 300 + ".epw"}).save(tmp_path / "house.xlsx")
    result = CliRunner().invoke(main, ["run", str(path)])
    assert (result.exit_code, result.stderr) == (
        1,
        f"Project!B5  Weather: found no file '{'w' * 100}…'; expected the path of a weather file. "
        "Correct the path; it starts from the folder of the workbook.\n1 problem; nothing was written.\n",
    )


def test_a_weather_file_that_may_not_be_read_is_told(
    cottage: Book, tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    (tmp_path / "mine.epw").write_bytes(HEAD)
    path = cottage.change({"Project!B5": "mine.epw"}).save(tmp_path / "house.xlsx")

    def refuse(_path: Path) -> bytes:
        raise PermissionError(13, "Permission denied")

    with monkeypatch.context() as patched:
        patched.setattr(Path, "read_bytes", refuse)
        result = CliRunner().invoke(main, ["run", str(path)])
    assert (result.exit_code, result.stderr) == (
        1,
        "mine.epw  Project!B5  Weather: found a file that cannot be opened (Permission denied); "
        "expected a weather file. Close it in other programs and check that you may read it.\n"
        "1 problem; nothing was written.\n",
    )


# Workbooks of the first template


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
