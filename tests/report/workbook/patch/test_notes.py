"""Notes: below what stands there, in a box large enough; threads and others' drawings are left alone."""

from __future__ import annotations

import re
from collections.abc import Callable
from pathlib import Path

import pytest
from lxml import etree
from openpyxl import load_workbook

from audit.report.workbook.patch import Mark, annotate_copy, strip_our_note
from audit.report.workbook.patch.notes import note_text
from tests.report.workbook.patch.fidelity import compare
from tests.report.workbook.patch.workbooks import (
    CONTENT,
    HEAD,
    MAIN,
    UNCLOSED_CONTROL,
    VML,
    VML_EXCEL,
    Parts,
    declare,
    note_shape,
    plain_parts,
    read_parts,
    relationships,
    vml,
    with_notes,
)

Write = Callable[..., Path]
ROWS = '<row r="2"><c r="B2" s="1"><v>900</v></c><c r="C2"><v>1</v></c></row>'
THREADS = "http://schemas.microsoft.com/office/2017/10/relationships/threadedComment"


def annotated(source: Path, marks: list[Mark]) -> Path:
    target = source.with_name("copy.xlsx")
    annotate_copy(source, target, marks, None)
    compare(source, target, marks, added_in_front=0)
    return target


def comments(path: Path) -> dict[str, etree._Element]:
    root = etree.fromstring(read_parts(path)["xl/comments1.xml"])
    return {comment.get("ref", ""): comment for comment in root.iter(f"{{{MAIN}}}comment")}


def shapes(content: bytes) -> dict[tuple[int, int], etree._Element]:
    """Shapes of notes by row and column."""
    found = {}
    for shape in etree.fromstring(content, etree.XMLParser(recover=True)).iter(f"{{{VML}}}shape"):
        row, column = (shape.findtext(f".//{{{VML_EXCEL}}}{name}") for name in ("Row", "Column"))
        if row is not None and column is not None:
            found[int(row) + 1, int(column) + 1] = shape
    return found


def height_pt(shape: etree._Element) -> float:
    measure = re.search(r"height:([\d.]+)pt", shape.get("style", ""))
    assert measure
    return float(measure[1])


def test_note_goes_below_the_existing_one(workbook: Write) -> None:
    source = workbook(with_notes(plain_parts(ROWS)))
    comment = comments(annotated(source, [Mark("Motors", 2, 2, "FFC7CE", "pickup too low")]))["B2"]
    runs = comment.findall(f"{{{MAIN}}}text/{{{MAIN}}}r")
    original = comments(source)["B2"].findall(f"{{{MAIN}}}text/{{{MAIN}}}r")
    assert [etree.tostring(run, method="c14n") for run in runs[:2]] == [
        etree.tostring(run, method="c14n") for run in original
    ]
    assert len(runs) == 3
    assert "pickup too low" in note_text(comment)
    assert strip_our_note(note_text(comment)) == "Checked on site "
    assert comment.get("authorId") == "0"


def test_box_of_an_existing_note_grows_and_keeps_its_look(workbook: Write) -> None:
    source = workbook(with_notes(plain_parts(ROWS)))
    target = annotated(source, [Mark("Motors", 2, 2, "FFC7CE", "a long line of words " * 30)])
    before, after = (shapes(read_parts(path)["xl/drawings/vmlDrawing1.vml"])[2, 2] for path in (source, target))
    assert height_pt(after) > height_pt(before)
    assert after.get("fillcolor") == "#ccffcc"
    anchors = [shape.findtext(f".//{{{VML_EXCEL}}}Anchor", "").split(",") for shape in (before, after)]
    assert int(anchors[1][6]) > int(anchors[0][6])  # the last row that the box reaches


def test_new_notes_get_text_author_and_box(workbook: Write) -> None:
    target = annotated(workbook(plain_parts(ROWS)), [Mark("Motors", 2, 3, "FFC7CE", "one\ntwo")])
    comment = load_workbook(target)["Motors"]["C2"].comment
    assert comment.author == "Settings audit"
    assert "one\ntwo" in comment.text
    assert strip_our_note(comment.text) == ""
    drawing = next(content for name, content in read_parts(target).items() if name.endswith(".vml"))
    assert set(shapes(drawing)) == {(2, 3)}


def test_note_text_is_kept_to_the_letter(workbook: Write) -> None:
    said = "=1+1 <b> & _x0041_ \x07 \ttab"
    target = annotated(workbook(plain_parts(ROWS)), [Mark("Motors", 2, 3, "FFC7CE", said)])
    stored = note_text(comments(target)["C2"])
    # ST_Xstring, ISO/IEC 29500-1, 22.9.2.19: _xHHHH_ stands for a character
    read = re.sub(r"_x([0-9A-F]{4})_", lambda found: chr(int(found[1], 16)), stored)
    assert said in read


def test_fill_without_a_note_adds_no_note(workbook: Write) -> None:
    target = annotated(workbook(plain_parts(ROWS)), [Mark("Motors", 2, 2, "FFC7CE", "")])
    assert not [name for name in read_parts(target) if "comments" in name or name.endswith(".vml")]


def test_threaded_comment_is_never_touched(workbook: Write) -> None:
    parts = with_notes(plain_parts(ROWS))
    parts["xl/comments1.xml"] = parts["xl/comments1.xml"].replace(
        b"R. Engineer", b"tc={4F6C2E1A-0000-4000-8000-000000000001}"
    )
    thread = (
        f'{HEAD}<ThreadedComments xmlns="http://schemas.microsoft.com/office/spreadsheetml/2018/threadedcomments">'
        '<threadedComment ref="B2" dT="2024-01-01T00:00:00.00" personId="{1}" id="{2}"><text>agreed</text>'
        "</threadedComment></ThreadedComments>"
    )
    parts["xl/threadedComments/threadedComment1.xml"] = thread.encode()
    parts["xl/worksheets/_rels/sheet1.xml.rels"] = relationships(
        ("rId1", "vmlDrawing", "../drawings/vmlDrawing1.vml"),
        ("rId2", "comments", "../comments1.xml"),
        ("rId3", THREADS, "../threadedComments/threadedComment1.xml"),
    )
    declare(parts, "xl/threadedComments/threadedComment1.xml", "application/vnd.ms-excel.threadedcomments+xml")
    source = workbook(parts)
    target = source.with_name("copy.xlsx")
    outcome = annotate_copy(source, target, [Mark("Motors", 2, 2, "FFC7CE", "note")], None)
    after = read_parts(target)
    assert outcome.threaded == (("Motors", "B2"),)
    assert outcome.notes_added == outcome.notes_extended == 0
    for name in ("xl/comments1.xml", "xl/threadedComments/threadedComment1.xml", "xl/drawings/vmlDrawing1.vml"):
        assert after[name] == parts[name]
    assert load_workbook(target)["Motors"]["B2"].fill.fgColor.rgb == "FFFFC7CE"


def test_drawing_that_is_not_well_formed_keeps_its_bytes(workbook: Write) -> None:
    drawing = vml(note_shape(1025, 2, 2) + UNCLOSED_CONTROL)
    source = workbook(with_notes(plain_parts(ROWS), drawing))
    marks = [Mark("Motors", 2, 2, "FFC7CE", "one"), Mark("Motors", 2, 3, "FFC7CE", "two")]
    target = annotated(source, marks)
    after = read_parts(target)["xl/drawings/vmlDrawing1.vml"].decode()
    assert after.startswith(drawing[: -len("</xml>")])
    assert after.endswith("</xml>")
    assert set(shapes(after.encode())) == {(2, 2), (2, 3)}
    # annotated again: our shape is replaced, not doubled
    again = target.with_name("again.xlsx")
    annotate_copy(target, again, marks, None)
    assert read_parts(again)["xl/drawings/vmlDrawing1.vml"].decode().count("<x:Column>2</x:Column>") == 1


def two_sheets() -> Parts:
    """Two sheets; the second has a note whose shape lies in block 7 of the shape numbers."""
    parts = with_notes(plain_parts(ROWS), vml(note_shape(7 * 1024 + 1, 2, 2), blocks="7"))
    parts["xl/worksheets/sheet2.xml"] = plain_parts(ROWS)["xl/worksheets/sheet1.xml"]
    parts["xl/workbook.xml"] = parts["xl/workbook.xml"].replace(
        b"</sheets>", b'<sheet name="Relays" sheetId="2" r:id="rId3"/></sheets>'
    )
    parts["xl/_rels/workbook.xml.rels"] = relationships(
        ("rId1", "worksheet", "worksheets/sheet1.xml"),
        ("rId2", "styles", "styles.xml"),
        ("rId3", "worksheet", "worksheets/sheet2.xml"),
    )
    declare(parts, "xl/worksheets/sheet2.xml", f"{CONTENT}.spreadsheetml.worksheet+xml")
    return parts


def test_shape_numbers_are_unique_over_all_sheets_and_fit_their_blocks(workbook: Write) -> None:
    source = workbook(two_sheets())
    target = source.with_name("copy.xlsx")
    marks = [Mark(sheet, row, 9, "FFC7CE", "x") for sheet in ("Motors", "Relays") for row in range(1, 1501)]
    annotate_copy(source, target, marks, None)
    numbers: list[int] = []
    blocks: list[int] = []
    for name, content in read_parts(target).items():
        if name.endswith(".vml"):
            own = [int(found) for found in re.findall(rb'id="_x0000_s(\d+)"', content)]
            listed = re.search(rb'idmap [^>]*data="([\d,]+)"', content)
            assert listed
            own_blocks = [int(block) for block in listed[1].split(b",")]
            # a block holds 1,023 shapes (ECMA-376 part 4, 19.2.2.14 idmap)
            assert {number // 1024 for number in own} <= set(own_blocks)
            numbers += own
            blocks += own_blocks
    assert len(numbers) == len(set(numbers)) == 3001
    assert len(blocks) == len(set(blocks))


def test_pointer_to_boxes_stands_where_the_schema_wants_it(workbook: Write) -> None:
    nested = (
        '<pageMargins left="1" right="1" top="1" bottom="1" header="0" footer="0"/><tableParts count="0"/><extLst>'
        '<ext uri="{0}"><legacyDrawing xmlns="urn:other" id="1"/></ext></extLst>'
    )
    target = annotated(workbook(plain_parts(ROWS, after=nested)), [Mark("Motors", 2, 2, "FFC7CE", "x")])
    root = etree.fromstring(read_parts(target)["xl/worksheets/sheet1.xml"])
    names = [etree.QName(child).localname for child in root]
    assert names == ["sheetData", "pageMargins", "legacyDrawing", "tableParts", "extLst"]


@pytest.mark.parametrize("cell", [(1, 1), (1, 16_384), (1_048_576, 1), (1_048_576, 16_384)])
def test_box_stays_within_the_sheet(workbook: Write, cell: tuple[int, int]) -> None:
    target = annotated(workbook(plain_parts()), [Mark("Motors", *cell, "FFC7CE", "x\n" * 50)])
    drawing = next(content for name, content in read_parts(target).items() if name.endswith(".vml"))
    left, _, top, _, right, _, bottom, _ = map(
        int, shapes(drawing)[cell].findtext(f".//{{{VML_EXCEL}}}Anchor", "").split(",")
    )
    assert 0 <= left < right < 16_384
    assert 0 <= top < bottom < 1_048_576
