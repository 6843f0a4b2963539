"""Files made to harm a reader: refused before any reader opens them. Each is opened in a process of its own."""

from __future__ import annotations

import struct
import zipfile
import zlib

import pytest

from audit.intake.opening import UnreadableWorkbook, open_workbook

SHEET = "xl/worksheets/sheet1.xml"


def with_cell(cell: bytes):
    return lambda sheet: sheet.replace(b"</sheetData>", b'<row r="%s">%s</row></sheetData>' % (row_of(cell), cell))


def row_of(cell: bytes) -> bytes:
    return bytes(code for code in cell.partition(b'r="')[2].partition(b'"')[0] if chr(code).isdigit())


@pytest.mark.parametrize("cell", ["XFD1048576", "A20000000", "ZZZ3"])
def test_a_stray_far_cell_is_named(cell, workbook, edited, opened_apart):
    edited(workbook, {SHEET: with_cell(b'<c r="%s"><v>1</v></c>' % cell.encode())})
    (said,) = opened_apart(workbook)
    assert said.startswith("refused")
    assert "'Motors'" in said
    assert "stray entry" in said
    if cell == "XFD1048576":
        assert cell in said


def test_a_stray_far_cell_in_a_namespaced_sheet_is_found_too(workbook, edited, opened_apart):
    def prefixed(sheet: bytes) -> bytes:
        far = with_cell(b'<c r="XFD1048576"><v>1</v></c>')(sheet)
        return far.replace(b"<worksheet", b"<!-- kept --><worksheet")

    edited(workbook, {SHEET: prefixed})
    assert opened_apart(workbook)[0].startswith("refused")


def test_a_far_cell_that_only_carries_a_format_does_no_harm(workbook, edited):
    edited(workbook, {SHEET: with_cell(b'<c r="XFD1048576" s="0"/>')})
    sheet = open_workbook(workbook).sheets[0]
    assert (sheet.height, sheet.width) == (3, 3)


def test_a_sheet_that_lies_about_its_extent_is_read(workbook, edited, opened_apart):
    edited(workbook, {SHEET: lambda sheet: sheet.replace(b'ref="A1:C3"', b'ref="A1:XFD1048576"')})
    assert opened_apart(workbook) == ["read 1 sheets"]


def test_a_sheet_that_is_not_listed_as_one_is_bounded_all_the_same(workbook, edited, opened_apart):
    edited(
        workbook,
        {
            SHEET: with_cell(b'<c r="XFD1048576"><v>1</v></c>'),
            "xl/_rels/workbook.xml.rels": lambda part: part.replace(b"relationships/worksheet", b"relationships/other"),
        },
    )
    assert opened_apart(workbook)[0].startswith("refused")


@pytest.mark.parametrize(
    "part", [SHEET, "xl/workbook.xml", "xl/sharedStrings.xml", "[Content_Types].xml", "xl/styles.xml"]
)
@pytest.mark.parametrize(
    "declared",
    [
        b'<!DOCTYPE x [<!ENTITY a "aaaaaaaaaa"><!ENTITY b "&a;&a;&a;&a;&a;&a;&a;&a;&a;&a;">]>',
        b'<!DOCTYPE x SYSTEM "file:///etc/hostname">',
    ],
)
def test_a_document_type_is_refused_in_every_part(part, declared, workbook, edited):
    def declare(content: bytes) -> bytes:
        head, mark, rest = content.partition(b"?>")
        return head + mark + declared + rest if mark else declared + content

    edited(workbook, {part: declare})
    with pytest.raises(UnreadableWorkbook, match="document type or entities"):
        open_workbook(workbook)


def test_a_document_type_in_utf_16_is_refused(workbook, edited):
    def declare(content: bytes) -> bytes:
        text = content.decode("utf-8")
        return (
            '<?xml version="1.0" encoding="UTF-16"?><!DOCTYPE x [<!ENTITY a "a">]>' + text[text.index("<worksheet") :]
        ).encode("utf-16")

    edited(workbook, {SHEET: declare})
    with pytest.raises(UnreadableWorkbook, match="document type or entities"):
        open_workbook(workbook)


def test_a_document_type_across_two_pieces_is_seen(workbook, edited):
    padding = b"<!--" + b" " * (4 * 2**20 - 11) + b"-->"
    edited(workbook, {"docProps/app.xml": lambda _: padding + b"<!DOCTYPE x><x/>"})
    with pytest.raises(UnreadableWorkbook, match="document type or entities"):
        open_workbook(workbook)


def test_a_part_that_unpacks_to_a_thousand_times_its_size_is_refused(workbook, edited):
    edited(workbook, {"xl/media/blank.xml": lambda _: b"<x>" + b" " * (40 * 2**20) + b"</x>"})
    with pytest.raises(UnreadableWorkbook, match="times its size"):
        open_workbook(workbook)


def test_a_part_that_unpacks_to_more_than_it_says_is_refused(workbook):
    # the directory says 100 bytes and gives the checksum of the first 100; the stream goes on for 30 MB
    content = b"<x>" + b"y" * (30 * 2**20)
    packer = zlib.compressobj(9, zlib.DEFLATED, -zlib.MAX_WBITS)
    packed = packer.compress(content) + packer.flush()
    with zipfile.ZipFile(workbook, "a") as archive:
        info = zipfile.ZipInfo("xl/more.xml")
        info.compress_type = zipfile.ZIP_STORED
        archive.writestr(info, packed)
    whole = workbook.read_bytes()
    stored = struct.pack("<HHHHIII", 0, 0, 0, 33, zlib.crc32(packed), len(packed), len(packed))
    lying = struct.pack("<HHHHIII", 0, 8, 0, 33, zlib.crc32(content[:100]), len(packed), 100)
    assert whole.count(stored) == 2
    workbook.write_bytes(whole.replace(stored, lying))
    with pytest.raises(UnreadableWorkbook, match="another size"):
        open_workbook(workbook)


@pytest.mark.parametrize("name", ["../outside.xml", "xl/../../outside.xml", "C:/outside.xml", "..\\outside.xml"])
def test_a_name_that_leads_out_of_the_archive_is_refused(name, workbook, edited):
    edited(workbook, {name: lambda _: b"<x/>"})
    with pytest.raises(UnreadableWorkbook, match="leads out of the archive"):
        open_workbook(workbook)


def test_two_parts_of_one_name_are_refused(workbook):
    with zipfile.ZipFile(workbook, "a") as archive:
        archive.writestr("XL/worksheets/SHEET1.xml", b"<worksheet/>")
    with pytest.raises(UnreadableWorkbook, match="one name"):
        open_workbook(workbook)


def test_an_open_document_that_repeats_a_cell_a_billion_times_is_refused(tmp_path, opened_apart):
    path = tmp_path / "repeats.ods"
    office = "urn:oasis:names:tc:opendocument:xmlns:"
    cell = '<table:table-cell office:value-type="float" office:value="1" table:number-columns-repeated="1024"/>'
    content = (
        f'<office:document-content xmlns:office="{office}office:1.0" xmlns:table="{office}table:1.0"><office:body>'
        f'<office:spreadsheet><table:table table:name="Motors"><table:table-row table:number-rows-repeated="1048576">'
        f"{cell}</table:table-row></table:table></office:spreadsheet></office:body></office:document-content>"
    )
    with zipfile.ZipFile(path, "w") as archive:
        archive.writestr("mimetype", "application/vnd.oasis.opendocument.spreadsheet")
        archive.writestr("content.xml", content)
        archive.writestr("META-INF/manifest.xml", "<manifest/>")
    (said,) = opened_apart(path)
    assert said.startswith("refused")
    assert "stray entry" in said
