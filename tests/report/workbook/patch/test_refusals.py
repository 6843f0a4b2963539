"""What cannot be copied without loss is refused with its reason, and nothing is left behind."""

from __future__ import annotations

import os
import zipfile
from collections.abc import Callable
from pathlib import Path

import pytest

from audit.report.workbook.patch import CannotPatch, Mark, annotate_copy
from audit.report.workbook.patch import writing as writing_module
from tests.report.workbook.patch.workbooks import MAIN, PACKAGE, Parts, declare, plain_parts, relationships, rich_parts

Write = Callable[..., Path]
MARKS = [Mark("Motors", 1, 1, "FFC7CE", "x")]


def refused(source: Path, pattern: str, target: Path | None = None) -> None:
    folder = source.parent
    before = {path: path.read_bytes() for path in folder.iterdir() if path.is_file()}
    with pytest.raises(CannotPatch, match=pattern):
        annotate_copy(source, target or folder / f"copy{source.suffix}", MARKS, None)
    assert {path: path.read_bytes() for path in folder.iterdir() if path.is_file()} == before


def strict(parts: Parts) -> None:
    parts["_rels/.rels"] = parts["_rels/.rels"].replace(
        b"http://schemas.openxmlformats.org/officeDocument/2006", b"http://purl.oclc.org/ooxml/officeDocument"
    )


def strict_inside(parts: Parts) -> None:
    name = "xl/workbook.xml"
    parts[name] = parts[name].replace(MAIN.encode(), b"http://purl.oclc.org/ooxml/spreadsheetml/main")


def document_type(parts: Parts) -> None:
    name = "xl/worksheets/sheet1.xml"
    parts[name] = parts[name].replace(b"<worksheet", b'<!DOCTYPE x [<!ENTITY a "b">]><worksheet', 1)


def revisions(parts: Parts) -> None:
    parts["xl/revisions/revisionHeaders.xml"] = f'<headers xmlns="{MAIN}"/>'.encode()
    parts["xl/_rels/workbook.xml.rels"] = relationships(
        ("rId1", "worksheet", "worksheets/sheet1.xml"),
        ("rId2", "styles", "styles.xml"),
        ("rId3", "revisionHeaders", "revisions/revisionHeaders.xml"),
    )


def signed(parts: Parts) -> None:
    parts["_xmlsignatures/origin.sigs"] = b""
    declare(parts, "_xmlsignatures/origin.sigs", "application/vnd.openxmlformats-package.digital-signature-origin")
    parts["_rels/.rels"] = relationships(
        ("rId1", "officeDocument", "xl/workbook.xml"),
        ("rId2", f"{PACKAGE}/relationships/digital-signature/origin", "_xmlsignatures/origin.sigs"),
    )


def template(parts: Parts) -> None:
    name = "[Content_Types].xml"
    parts[name] = parts[name].replace(b"sheet.main+xml", b"template.main+xml")


def doubled(parts: Parts) -> None:
    parts["XL/Styles.xml"] = parts["xl/styles.xml"]


def doubled_by_backslash(parts: Parts) -> None:
    parts["xl\\styles.xml"] = parts["xl/styles.xml"]


def escaping(parts: Parts) -> None:
    parts["../evil.txt"] = b"x"


def torn_sheet(parts: Parts) -> None:
    name = "xl/worksheets/sheet1.xml"
    parts[name] = parts[name][: parts[name].index(b"</sheetData>")]


def no_workbook(parts: Parts) -> None:
    del parts["xl/workbook.xml"]


def huge(parts: Parts) -> None:
    parts["xl/media/big.xml"] = b" " * 40_000_000


@pytest.mark.parametrize(
    ("spoil", "reason"),
    [
        (strict, "Strict variant"),
        (strict_inside, "Strict variant"),
        (document_type, "document type"),
        (revisions, "history of revisions"),
        (signed, "digitally signed"),
        (template, "neither an .xlsx nor an .xlsm"),
        (doubled, "have one name|two parts"),
        (doubled_by_backslash, "have one name|two parts"),
        (escaping, "leads out of the archive"),
        (torn_sheet, "cut short"),
        (no_workbook, "holds no workbook"),
        (huge, "times its size"),
    ],
    ids=lambda value: value.__name__ if callable(value) else "",
)
def test_workbook_is_refused_with_its_reason(workbook: Write, spoil: Callable[[Parts], None], reason: str) -> None:
    parts = plain_parts('<row r="1"><c r="A1"><v>1</v></c></row>')
    spoil(parts)
    refused(workbook(parts), reason)


@pytest.mark.parametrize(
    ("content", "reason"),
    [
        (b"", "empty"),
        (b"PK\x03\x04 cut short", "damaged"),
        (bytes.fromhex("D0CF11E0A1B11AE1") + b"\0" * 600, "damaged|document of another program"),
        (b"Motor;Current\nP-1;5\n", "plain text"),
    ],
)
def test_file_that_is_no_workbook_is_refused(tmp_path: Path, content: bytes, reason: str) -> None:
    source = tmp_path / "motors.xlsx"
    source.write_bytes(content)
    refused(source, reason)


def test_part_with_two_names_is_refused(workbook: Write) -> None:
    source = workbook(plain_parts())
    content = source.read_bytes()
    # the name in the local header, which comes first, no longer is the one in the directory
    source.write_bytes(content.replace(b"xl/styles.xml", b"xl/stylez.xml", 1))
    refused(source, "two names|damaged|differ")


def test_parts_that_share_bytes_are_refused(workbook: Write) -> None:
    source = workbook(plain_parts())
    with zipfile.ZipFile(source) as archive:
        first, second = archive.infolist()[:2]
    content = bytearray(source.read_bytes())
    place = content.rindex(second.filename.encode()) - 4  # offset field of the second entry in the directory
    assert int.from_bytes(content[place : place + 4], "little") == second.header_offset
    content[place : place + 4] = first.header_offset.to_bytes(4, "little")
    source.write_bytes(content)
    refused(source, "share bytes|two names|damaged|one name")


def test_other_suffixes_are_refused(workbook: Write) -> None:
    refused(workbook(plain_parts(), "motors.xlsb"), "only .xlsx and .xlsm")


def test_suffix_is_kept(workbook: Write, tmp_path: Path) -> None:
    refused(workbook(rich_parts(macros=True), "motors.xlsm"), "must end in .xlsm", tmp_path / "copy.xlsx")


def test_source_is_never_written_to(workbook: Write, tmp_path: Path) -> None:
    source = workbook(plain_parts())
    refused(source, "overwritten by its own copy", source)
    refused(source, "overwritten by its own copy", tmp_path / "." / "motors.xlsx")
    linked = tmp_path / "linked.xlsx"
    os.link(source, linked)
    refused(source, "overwritten by its own copy", linked)
    linked.unlink()
    linked.symlink_to(source)
    refused(source, "overwritten by its own copy", linked)


def test_whole_copy_or_none(workbook: Write, tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    source, target = workbook(plain_parts()), tmp_path / "copy.xlsx"
    target.write_bytes(b"what was there before")

    def fail(count: int, length: int, offset: int, comment: bytes) -> bytes:
        raise OSError("no space left on device")

    monkeypatch.setattr(writing_module.entries, "end_of_directory", fail)
    with pytest.raises(OSError, match="no space left"):
        annotate_copy(source, target, MARKS, None)
    assert target.read_bytes() == b"what was there before"
    assert sorted(path.name for path in tmp_path.iterdir()) == ["copy.xlsx", "motors.xlsx"]


def test_same_input_gives_the_same_bytes(workbook: Write, report: Path, tmp_path: Path) -> None:
    source = workbook(rich_parts())
    for name in ("one.xlsx", "two.xlsx"):
        annotate_copy(source, tmp_path / name, MARKS, report)
    assert (tmp_path / "one.xlsx").read_bytes() == (tmp_path / "two.xlsx").read_bytes()


def test_backslashes_in_part_names_are_understood_and_kept(workbook: Write, tmp_path: Path) -> None:
    parts = {name.replace("/", "\\"): content for name, content in plain_parts().items()}
    target = tmp_path / "copy.xlsx"
    annotate_copy(workbook(parts), target, MARKS, None)
    with zipfile.ZipFile(target) as archive:
        assert archive.namelist()[: len(parts)] == list(parts)
