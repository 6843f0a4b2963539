"""Files that are no workbooks or not whole: each ends in one message that says what it is and what to do."""

from __future__ import annotations

import io
import tarfile
import zipfile

import pytest

from audit.intake.opening import UnreadableWorkbook, open_workbook
from audit.refusal import Refusal

CASES = {
    "empty.xlsx": (b"", "the file is empty"),
    "paper.xlsx": (b"%PDF-1.7\n%\xe2\xe3\xcf\xd3\n", "a PDF document"),
    "picture.xls": (b"\x89PNG\r\n\x1a\n\0\0\0\rIHDR", "a picture"),
    "table.xls": (b"<html><body><table><tr><td>Tag</td></tr></table></body></html>", "a web page"),
    "old.xls": (
        b'<?xml version="1.0"?><Workbook xmlns="urn:schemas-microsoft-com:office:spreadsheet"/>',
        "an XML document",
    ),
    "text.xlsx": (b"Tag,kW\r\nP-101,37\r\n", "plain text"),
    "noise.xlsx": (bytes(range(256)) * 8, "not a workbook"),
    "noise.csv": (bytes(range(256)) * 8, "not a workbook"),
    "cut.xls": (bytes.fromhex("D0CF11E0A1B11AE1") + b"\0" * 600, "damaged or was cut short"),
    "short.xls": (bytes.fromhex("D0CF11E0A1B11AE1"), "damaged or was cut short"),
    "begun.xlsx": (b"PK\x03\x04" + b"\0" * 40, "damaged or was cut short"),
}


@pytest.mark.parametrize("name", CASES)
def test_what_is_no_workbook_is_named_for_what_it_is(name, tmp_path):
    content, found = CASES[name]
    path = tmp_path / name
    path.write_bytes(content)
    with pytest.raises(UnreadableWorkbook) as refused:
        open_workbook(path)
    assert refused.value.path == path
    assert found in refused.value.found
    assert str(refused.value).startswith(f"{name}: ")
    assert refused.value.expected in str(refused.value)
    assert str(refused.value).endswith(refused.value.advice)


def test_a_refusal_is_of_the_kind_that_ends_without_a_traceback():
    assert issubclass(UnreadableWorkbook, Refusal)


@pytest.mark.parametrize("share", [0.3, 0.6, 0.9, 0.99])
def test_a_workbook_that_was_cut_short_is_refused(share, workbook):
    whole = workbook.read_bytes()
    workbook.write_bytes(whole[: int(len(whole) * share)])
    with pytest.raises(UnreadableWorkbook, match="damaged or was cut short"):
        open_workbook(workbook)


def test_an_altered_part_is_refused(workbook):
    with zipfile.ZipFile(workbook) as archive:
        place = archive.getinfo("xl/worksheets/sheet1.xml").header_offset + 30 + len("xl/worksheets/sheet1.xml") + 20
    content = bytearray(workbook.read_bytes())
    content[place] ^= 0xFF
    workbook.write_bytes(content)
    with pytest.raises(UnreadableWorkbook, match="damaged or was cut short"):
        open_workbook(workbook)


@pytest.mark.parametrize(
    ("names", "found"),
    [
        (["[Content_Types].xml", "word/document.xml"], "a text document"),
        (["[Content_Types].xml", "ppt/presentation.xml"], "a presentation"),
        (["motors.xlsx", "settings.xlsx"], "an archive of files"),
        (["[Content_Types].xml"], "no workbook part"),
        ([], "an empty archive"),
    ],
)
def test_archives_of_other_things_are_told_apart(names, found, tmp_path):
    path = tmp_path / "sent.xlsx"
    with zipfile.ZipFile(path, "w") as archive:
        for name in names:
            archive.writestr(name, "<x/>")
    with pytest.raises(UnreadableWorkbook, match=found):
        open_workbook(path)


def test_another_kind_of_archive_is_refused(tmp_path):
    path = tmp_path / "sent.xlsx"
    packed = io.BytesIO()
    with tarfile.open(fileobj=packed, mode="w:gz") as archive:
        archive.addfile(tarfile.TarInfo("motors.xlsx"), io.BytesIO())
    path.write_bytes(packed.getvalue())
    with pytest.raises(UnreadableWorkbook, match="gzip archive"):
        open_workbook(path)


def test_a_file_above_the_limit_is_refused_unread(tmp_path):
    path = tmp_path / "huge.xlsx"
    with path.open("wb") as file:
        file.truncate(100 * 2**20 + 1)
    with pytest.raises(UnreadableWorkbook, match="100 MB"):
        open_workbook(path)


def test_a_missing_file_and_a_folder_are_refused(tmp_path):
    for path in (tmp_path / "gone.xlsx", tmp_path):
        with pytest.raises(UnreadableWorkbook, match="cannot be read"):
            open_workbook(path)


def test_a_workbook_with_another_ending_is_read_for_what_it_is(workbook):
    assert open_workbook(workbook.rename(workbook.with_suffix(".xls"))).sheets[0].rows[1][0] == "P-101"
