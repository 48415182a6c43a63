"""Weather files that are broken, cut, packed or something else: a sentence, and the workbook as it was."""

from __future__ import annotations

from pathlib import Path
from typing import TYPE_CHECKING

import pytest
from click.testing import CliRunner

from heatledger.cli import main

if TYPE_CHECKING:
    from tests.conftest import Book

ROOT = Path(__file__).parents[2]

FORMATS = "an EPW, TMY3, TMY2, PVGIS or NSRDB file or an hourly table of heatledger"
KIND = f"found a file of another kind; expected {FORMATS}. Give an hourly weather file of one of these formats."
EMPTY = f"found an empty file; expected {FORMATS}. Download the file again."
YEAR = "expected 8760 hours. Give a file of one whole year, 1 January to 31 December, one row for each hour."
LONG = f"with a line of more than 20,000 letters; expected {FORMATS}. Download the file again."
HEAD = b"LOCATION,Town,State,ABC,TMY,123456,40.0,-105.0,-7.0,1800.0\n"


def shipped(share: float) -> bytes:
    data = (ROOT / "weather" / "golden-co.csv").read_bytes()
    return data[: data.index(b"\n", int(len(data) * share)) + 1]


WEATHER: dict[str, tuple[bytes, str]] = {
    "empty.epw": (b"", EMPTY),
    "binary.epw": (bytes(range(256)) * 400, KIND),
    "spaces.txt": (b" " * 1000, EMPTY),
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
