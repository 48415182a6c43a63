from __future__ import annotations

import random
import re
import tracemalloc
import zipfile
from collections.abc import Callable, Mapping
from io import BytesIO
from pathlib import Path

import pytest

from heatledger.errors import InputError
from heatledger.workbook import gate
from heatledger.workbook.gate import read_package

WORKBOOK = "expected an .xlsx or .xlsm workbook."
SAVE_AS = "Open it in your spreadsheet program and save it as .xlsx."
DAMAGED = (
    "book.xlsx: found a damaged or incomplete file; expected a whole workbook. "
    "Take an undamaged copy, or let your spreadsheet program repair it and save it as .xlsx."
)
Inject = Callable[[bytes, Mapping[str, bytes], Mapping[str, tuple[str, str]]], bytes]


def refusal(path: Path) -> str:
    with pytest.raises(InputError) as caught:
        read_package(path)
    assert len(caught.value.problems) == 1
    return str(caught.value)


@pytest.fixture
def book(tmp_path: Path) -> Callable[[bytes], Path]:
    def write(data: bytes) -> Path:
        path = tmp_path / "book.xlsx"
        path.write_bytes(data)
        return path

    return write


def zipped(parts: Mapping[str, bytes]) -> bytes:
    buffer = BytesIO()
    with zipfile.ZipFile(buffer, "w", zipfile.ZIP_DEFLATED) as archive:
        for name, data in parts.items():
            archive.writestr(name, data)
    return buffer.getvalue()


def test_sound_workbooks_pass(book: Callable[[bytes], Path], plain_book: bytes, rich_book: bytes, donor: bytes) -> None:
    for data in (plain_book, rich_book, donor):
        read_package(book(data))


def test_a_missing_file_is_named(tmp_path: Path) -> None:
    assert refusal(tmp_path / "none.xlsx") == (
        f"none.xlsx: found no such file; {WORKBOOK} "
        "Check the name and the folder, or make a workbook with: heatledger new NAME.xlsx"
    )


def test_a_file_below_a_file_is_missing(book: Callable[[bytes], Path]) -> None:
    assert refusal(book(b"text") / "none.xlsx").startswith("none.xlsx: found no such file;")


def test_a_folder_is_refused(tmp_path: Path) -> None:
    (tmp_path / "jobs").mkdir()
    assert refusal(tmp_path / "jobs") == f"jobs: found a folder; {WORKBOOK} Give the workbook inside the folder."
    assert refusal(Path()) == f".: found a folder; {WORKBOOK} Give the workbook inside the folder."


def test_a_device_is_refused() -> None:
    if not Path("/dev/null").exists():
        pytest.skip("this system has no /dev/null")
    assert refusal(Path("/dev/null")) == f"null: found a device, not a file; {WORKBOOK} Give the workbook itself."


def test_a_name_that_is_too_long_is_refused(tmp_path: Path) -> None:
    name = "n" * 300
    assert refusal(tmp_path / name) == (
        f"{name}: found a file that cannot be read (File name too long); {WORKBOOK} "
        "Copy it to another place and try again."
    )


def test_a_file_without_the_right_to_read_is_refused(
    book: Callable[[bytes], Path], monkeypatch: pytest.MonkeyPatch
) -> None:
    def refuse(*_arguments: object) -> None:
        raise PermissionError(13, "Permission denied")

    path = book(b"PK")
    monkeypatch.setattr(Path, "open", refuse)
    assert refusal(path) == (
        "book.xlsx: found a file that may not be read; expected a file you may read. "
        "Close it in other programs, or ask its owner for the right to read it."
    )


@pytest.mark.parametrize(
    ("data", "found", "fix"),
    [
        (b"", "an empty file", "Take a copy that still has its content."),
        (b"Zone;Floor area\nW;12,5\n", "a plain text file", SAVE_AS),
        ("Zone;Fläche\n".encode("utf-16"), "a file of another kind", SAVE_AS),
        (b"\xef\xbb\xbf<!DOCTYPE html><html></html>", "a web page", SAVE_AS),
        (b"\n<html><table></table></html>", "a web page", SAVE_AS),
        (b'<?xml version="1.0"?><Workbook/>', "a plain XML file", SAVE_AS),
        (b"%PDF-1.7", "a PDF file", SAVE_AS),
        (b"\x89PNG\r\n\0\0", "a file of another kind", SAVE_AS),
        (
            b"\xd0\xcf\x11\xe0" + bytes(508) + "Workbook".encode("utf-16-le"),
            "a workbook in the old .xls format",
            SAVE_AS,
        ),
        (
            b"\xd0\xcf\x11\xe0" + bytes(9000) + "EncryptedPackage".encode("utf-16-le"),
            "a workbook locked with a password",
            "Save it without the password, and try again.",
        ),
        (b"\xd0\xcf\x11\xe0" + bytes(508), "an old office file that is no workbook", "Give the workbook itself."),
        (
            zipped({"mimetype": b"application/vnd.oasis.opendocument.spreadsheet"}),
            "an OpenDocument file (.ods)",
            SAVE_AS,
        ),
        (
            zipped({"photo.png": b"png"}),
            "a zip file that is no workbook",
            "Unpack it first and give the workbook inside.",
        ),
        (b"PK\x05\x06" + bytes(18), "a zip file that is no workbook", "Unpack it first and give the workbook inside."),
    ],
)
def test_files_of_another_kind_are_told_apart(book: Callable[[bytes], Path], data: bytes, found: str, fix: str) -> None:
    assert refusal(book(data)) == f"book.xlsx: found {found}; {WORKBOOK} {fix}"


def test_a_binary_workbook_is_refused(book: Callable[[bytes], Path], plain_book: bytes, inject: Inject) -> None:
    kind = ("spreadsheetml.sheet.main+xml", "ms-excel.sheet.binary.macroEnabled.main")
    data = inject(plain_book, {"xl/workbook.xml": b"\x83\x01"}, {"[Content_Types].xml": kind})
    assert refusal(book(data)) == f"book.xlsx: found a binary workbook (.xlsb); {WORKBOOK} {SAVE_AS}"


def test_a_text_document_is_refused(book: Callable[[bytes], Path], plain_book: bytes, inject: Inject) -> None:
    data = inject(plain_book, {"xl/workbook.xml": b'<document xmlns="urn:text"/>'}, {})
    assert refusal(book(data)) == (
        f"book.xlsx: found an office file that is no workbook; {WORKBOOK} Give the workbook itself."
    )


def test_a_strict_workbook_is_refused(book: Callable[[bytes], Path], plain_book: bytes, inject: Inject) -> None:
    strict = (
        "http://schemas.openxmlformats.org/spreadsheetml/2006/main",
        "http://purl.oclc.org/ooxml/spreadsheetml/main",
    )
    assert refusal(book(inject(plain_book, {}, {"xl/workbook.xml": strict}))) == (
        "book.xlsx: found a Strict Open XML workbook; expected a normal .xlsx or .xlsm workbook. "
        "Save it as a normal .xlsx workbook, not as Strict Open XML."
    )


def test_a_signed_workbook_is_refused(book: Callable[[bytes], Path], plain_book: bytes, inject: Inject) -> None:
    kind = "application/vnd.openxmlformats-package.digital-signature-xmlsignature+xml"
    entry = f'<Override PartName="/_xmlsignatures/sig1.xml" ContentType="{kind}"/></Types>'
    data = inject(plain_book, {"_xmlsignatures/sig1.xml": b"<s/>"}, {"[Content_Types].xml": ("</Types>", entry)})
    assert refusal(book(data)) == (
        "book.xlsx: found a digitally signed workbook; expected one without a signature, which new sheets would break. "
        "Take off the signature and try again, or work on an unsigned copy."
    )


def test_a_shared_workbook_is_refused(book: Callable[[bytes], Path], plain_book: bytes, inject: Inject) -> None:
    kind = "http://schemas.openxmlformats.org/officeDocument/2006/relationships/revisionHeaders"
    entry = f'<Relationship Id="rId70" Type="{kind}" Target="revisions/revisionHeaders.xml"/></Relationships>'
    data = inject(
        plain_book,
        {"xl/revisions/revisionHeaders.xml": b"<headers/>"},
        {"xl/_rels/workbook.xml.rels": ("</Relationships>", entry)},
    )
    assert refusal(book(data)) == (
        "book.xlsx: found a shared workbook with tracked changes; expected a workbook of one user at a time. "
        "Stop sharing it in your spreadsheet program (Review, Share Workbook), save it, and try again."
    )


@pytest.mark.parametrize("encoding", ["utf-8", "utf-8-sig", "utf-16", "utf-16-le", "utf-16-be"])
@pytest.mark.parametrize("part", ["xl/worksheets/sheet1.xml", "customXml/item9.xml", "[Content_Types].xml"])
def test_a_document_type_is_refused_in_every_xml_part(
    book: Callable[[bytes], Path], plain_book: bytes, inject: Inject, part: str, encoding: str
) -> None:
    text = '<?xml version="1.0"?>\n<!-- > --> <!DOCTYPE a [<!ENTITY b SYSTEM "file:///etc/passwd">]><a>&b;</a>'
    assert refusal(book(inject(plain_book, {part: text.encode(encoding)}, {}))) == (
        "book.xlsx: found a document type declaration (DOCTYPE), which no spreadsheet program writes; "
        "expected a plain workbook. Do not trust the file; ask its sender for a fresh one."
    )


def test_a_document_type_in_a_picture_or_a_text_is_no_danger(
    book: Callable[[bytes], Path], plain_book: bytes, inject: Inject
) -> None:
    kind = ("</Types>", '<Default Extension="svg" ContentType="image/svg+xml"/></Types>')
    parts = {"xl/media/a.svg": b"<!DOCTYPE svg><svg/>", "customXml/item1.xml": b"<a><![CDATA[<!DOCTYPE a>]]></a>"}
    read_package(book(inject(plain_book, parts, {"[Content_Types].xml": kind})))


def test_a_document_type_is_sought_in_linear_time(
    book: Callable[[bytes], Path], plain_book: bytes, inject: Inject
) -> None:
    comments = b"<!-- -->" * 200_000 + b"<a/>"
    read_package(book(inject(plain_book, {"customXml/item1.xml": comments}, {})))


def test_unpacked_size_is_bounded_before_unpacking(
    book: Callable[[bytes], Path], plain_book: bytes, inject: Inject
) -> None:
    path = book(inject(plain_book, {"customXml/item1.xml": bytes(201_000_000)}, {}))
    tracemalloc.start()
    found = refusal(path)
    peak = tracemalloc.get_traced_memory()[1]
    tracemalloc.stop()
    assert re.sub(r"found \d+", "found N", found) == (
        "book.xlsx: found N MB when unpacked; expected at most 200 MB. "
        "Take out large pictures and formatted empty rows, or copy the input sheets into a new workbook."
    )
    assert peak < 10_000_000


def test_a_size_that_the_file_understates_is_damage(
    book: Callable[[bytes], Path], plain_book: bytes, inject: Inject
) -> None:
    data = inject(plain_book, {"customXml/item1.xml": b"<a/>" * 100_000}, {})
    size = (400_000).to_bytes(4, "little")
    assert data.count(size) == 2
    assert refusal(book(data.replace(size, (4).to_bytes(4, "little")))) == DAMAGED


def test_the_number_of_parts_is_bounded(book: Callable[[bytes], Path]) -> None:
    assert refusal(book(zipped({f"{number}.xml": b"" for number in range(2001)}))) == (
        "book.xlsx: found 2,001 parts in one file; expected at most 2,000. Copy the input sheets into a new workbook."
    )


def test_a_locked_zip_is_refused(book: Callable[[bytes], Path], plain_book: bytes) -> None:
    data = bytearray(plain_book)
    data[data.index(b"PK\x01\x02") + 8] |= 1
    assert refusal(book(bytes(data))) == (
        f"book.xlsx: found a zip file locked with a password; {WORKBOOK} Unpack it first and give the workbook inside."
    )


def test_two_parts_of_one_name_are_damage(book: Callable[[bytes], Path], plain_book: bytes, inject: Inject) -> None:
    assert refusal(book(inject(plain_book, {"XL/Workbook.xml": b"<a/>"}, {}))) == DAMAGED


def test_an_incomplete_file_is_refused_wherever_it_ends(book: Callable[[bytes], Path], plain_book: bytes) -> None:
    for length in range(4, len(plain_book), 499):
        assert refusal(book(plain_book[:length])) == DAMAGED


def test_a_flipped_bit_in_any_part_is_found(book: Callable[[bytes], Path], plain_book: bytes) -> None:
    with zipfile.ZipFile(BytesIO(plain_book)) as archive:
        entries = archive.infolist()
    for entry in entries:
        data = bytearray(plain_book)
        start = entry.header_offset + 30 + len(entry.filename.encode())
        data[start + entry.compress_size // 2] ^= 0x10
        assert refusal(book(bytes(data))) == DAMAGED


def test_any_flipped_bit_ends_in_a_sentence(book: Callable[[bytes], Path], plain_book: bytes) -> None:
    chance = random.Random(6)
    refused = 0
    for _ in range(300):
        data = bytearray(plain_book)
        data[chance.randrange(len(data))] ^= 1 << chance.randrange(8)
        try:
            read_package(book(bytes(data)))
        except InputError:
            refused += 1
    assert refused > 200


def test_a_part_that_is_no_xml_is_told(book: Callable[[bytes], Path], plain_book: bytes, inject: Inject) -> None:
    assert refusal(book(inject(plain_book, {"xl/workbook.xml": b"<workbook"}, {}))) == (
        "book.xlsx: found a part that cannot be read (XMLSyntaxError); expected a sound workbook. "
        "Open the file in your spreadsheet program, save it again, and try once more."
    )


def test_each_part_is_unpacked_once(
    book: Callable[[bytes], Path], rich_book: bytes, monkeypatch: pytest.MonkeyPatch
) -> None:
    names: list[str] = []
    read = zipfile.ZipFile.read

    def counted(archive: zipfile.ZipFile, entry: zipfile.ZipInfo) -> bytes:
        names.append(entry.filename)
        return read(archive, entry)

    monkeypatch.setattr(zipfile.ZipFile, "read", counted)
    package = gate.read_package(book(rich_book))
    assert names == list(package.parts)
