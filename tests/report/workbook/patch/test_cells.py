"""Marked cells: their own format with the fill, in whatever way the sheet is written."""

from __future__ import annotations

from collections.abc import Callable
from pathlib import Path

import pytest
from lxml import etree
from openpyxl import load_workbook

from audit.report.workbook.patch import Mark, annotate_copy
from tests.report.workbook.patch.fidelity import compare
from tests.report.workbook.patch.workbooks import HEAD, MAIN, plain_parts, read_parts

FILL = "FFC7CE"
Write = Callable[..., Path]
pytestmark = pytest.mark.filterwarnings("ignore:.*extension is not supported:UserWarning")

ROWS = (
    '<row r="2" spans="2:3"><c r="B2" s="1"><v>900</v></c><c r="D2" t="str"><f>B2&amp;"a &gt; b"</f><v>x</v></c></row>'
    '<row r="5" s="2" customFormat="1"><c r="A5"/></row><row r="6" s="2"/>'
)
COLUMNS = '<dimension ref="B2:D5"/><cols><col min="6" max="7" width="9" style="3"/></cols>'


def annotated(source: Path, *cells: tuple[int, int], note: str = "") -> Path:
    target = source.with_name("copy.xlsx")
    marks = [Mark("Motors", row, column, FILL, note) for row, column in cells]
    annotate_copy(source, target, marks, None)
    compare(source, target, marks, added_in_front=0)
    return target


def formats(path: Path) -> dict[str, tuple[dict[str, str], list[str]]]:
    """Attributes and children of each cell's format, the fill apart, by address."""
    parts = read_parts(path)
    cell_formats = etree.fromstring(parts["xl/styles.xml"]).findall(f"{{{MAIN}}}cellXfs/{{{MAIN}}}xf")
    found = {}
    for cell in etree.fromstring(parts["xl/worksheets/sheet1.xml"]).iter(f"{{{MAIN}}}c"):
        chosen = cell_formats[int(cell.get("s", "0"))]
        attributes = {key: value for key, value in chosen.attrib.items() if key not in {"fillId", "applyFill"}}
        found[cell.get("r", "")] = (attributes, [etree.tostring(child, method="c14n").decode() for child in chosen])
    return found


def test_marked_cell_keeps_its_format_beside_the_fill(workbook: Write) -> None:
    source = workbook(plain_parts(ROWS, COLUMNS))
    target = annotated(source, (2, 2))
    cell = load_workbook(target)["Motors"]["B2"]
    assert cell.fill.fgColor.rgb == f"FF{FILL}"
    assert cell.fill.fill_type == "solid"
    assert formats(target)["B2"] == formats(source)["B2"]


def test_other_cells_with_the_same_format_are_left_alone(workbook: Write) -> None:
    rows = '<row r="1"><c r="A1" s="1"><v>1</v></c><c r="B1" s="1"><v>2</v></c></row>'
    sheet = load_workbook(annotated(workbook(plain_parts(rows)), (1, 1)))["Motors"]
    assert sheet["B1"].fill.fgColor.rgb == "FFDDEBF7"  # what the workbook gave it


@pytest.mark.parametrize(
    ("cell", "address", "expected"),
    [
        ((2, 3), "C2", 0),  # between two cells of a row: no format to inherit
        ((2, 6), "F2", 3),  # the column's format
        ((5, 6), "F5", 2),  # a row's format goes before the column's
        ((6, 6), "F6", 3),  # a row whose format is not custom has none
        ((1, 1), "A1", 0),  # a row before all rows
        ((3, 7), "G3", 3),  # a row between rows
        ((9, 9), "I9", 0),  # a row below all rows
    ],
)
def test_blank_cell_inherits_and_stands_in_order(
    workbook: Write, cell: tuple[int, int], address: str, expected: int
) -> None:
    target = annotated(workbook(plain_parts(ROWS, COLUMNS)), cell)
    parts = read_parts(target)
    given = etree.fromstring(parts["xl/styles.xml"]).findall(f"{{{MAIN}}}cellXfs/{{{MAIN}}}xf")
    wanted = {key: value for key, value in given[expected].attrib.items() if key not in {"fillId", "applyFill"}}
    assert formats(target)[address][0] == wanted
    rows = list(etree.fromstring(parts["xl/worksheets/sheet1.xml"]).iter(f"{{{MAIN}}}row"))
    numbers = [int(row.get("r", "0")) for row in rows]
    assert numbers == sorted(set(numbers))
    for row in rows:
        letters = [child.get("r", "").rstrip("0123456789") for child in row]
        assert letters == sorted(set(letters))  # single letters here


def test_extent_grows_with_added_cells(workbook: Write) -> None:
    target = annotated(workbook(plain_parts(ROWS, COLUMNS)), (9, 9), (1, 3))
    assert b'<dimension ref="B1:I9"/>' in read_parts(target)["xl/worksheets/sheet1.xml"]


def test_merged_cells_are_marked_at_their_corner(workbook: Write) -> None:
    merged = '<mergeCells count="1"><mergeCell ref="B2:C4"/></mergeCells>'
    source = workbook(plain_parts(ROWS, after=merged))
    target = source.with_name("copy.xlsx")
    marks = [Mark("Motors", 4, 3, FILL, "one"), Mark("Motors", 2, 2, "FFEB9C", "two")]
    outcome = annotate_copy(source, target, marks, None)
    cell = load_workbook(target)["Motors"]["B2"]
    assert outcome.moved == {("Motors", "C4"): "B2"}
    assert cell.fill.fgColor.rgb == f"FF{FILL}"  # the first of several marks
    assert cell.comment.text.index("one") < cell.comment.text.index("two")


@pytest.mark.parametrize(
    "rows",
    [
        '<row><c><v>1</v></c><c s="1"><v>2</v></c></row><row><c><v>3</v></c><c s="1"><v>4</v></c></row>',
        '<row><c r="A1"><v>1</v></c></row><row><c r="A2"><v>3</v></c><c r="B2" s="1"><v>4</v></c></row>',
        "<row r='2' ><c r='A2' ><v>3</v></c ><c s='1' r='B2'\n><v>4</v></c></row >",
        '<row r="2"><!-- <c r="B2"> --><c r="B2" s="1" t="str"><v><![CDATA[<c r="B2"/>]]></v></c></row>',
        '<row r="2"><c r="A2" t="inlineStr"><is><t>&lt;c r="B2"/&gt; s="1"</t></is></c><c r="B2" s="1"/></row>',
        '<row r="2"><c r="A2"><v>3</v><extLst><ext uri="{0}"><c xmlns="urn:other" r="B2"><c r="B2"/></c></ext></extLst>'
        '</c><c r="B2" s="1"><v>4</v></c><extLst><ext uri="{1}"><y:row xmlns:y="urn:y" r="2"/></ext></extLst></row>',
        '<row r="1" f:note="a > b" xmlns:f="urn:f"/><row r="2"><c r="B2" f:x=">" xmlns:f="urn:f" s="1"/></row>',
    ],
    ids=["no addresses", "rows without numbers", "odd spaces", "comment and CDATA", "text", "extensions", "> inside"],
)
def test_cell_is_found_however_it_is_written(workbook: Write, rows: str) -> None:
    source = workbook(plain_parts(rows))
    target = annotated(source, (2, 2), (2, 4))
    cell = load_workbook(target)["Motors"]["B2"]
    assert cell.fill.fgColor.rgb == f"FF{FILL}"
    assert cell.font.b  # of format 1, the cell's own
    assert load_workbook(target)["Motors"]["D2"].fill.fgColor.rgb == f"FF{FILL}"


def test_prefixed_elements_keep_their_prefix(workbook: Write) -> None:
    parts = plain_parts()
    sheet = (
        f'{HEAD}<x:worksheet xmlns:x="{MAIN}"><x:sheetData><x:row r="2"><x:c r="B2" s="1"><x:v>900</x:v></x:c></x:row>'
        "</x:sheetData></x:worksheet>"
    )
    parts["xl/worksheets/sheet1.xml"] = sheet.encode()
    target = annotated(workbook(parts), (2, 2), (2, 3), (4, 1), note="a note")
    written = load_workbook(target)["Motors"]
    for address in ("B2", "C2", "A4"):
        assert written[address].fill.fgColor.rgb == f"FF{FILL}"
        assert written[address].comment is not None
    assert b'<x:row r="4"><x:c r="A4"' in read_parts(target)["xl/worksheets/sheet1.xml"]


def test_sheet_in_utf_16_is_marked(workbook: Write) -> None:
    parts = plain_parts('<row r="2"><c r="B2" s="1" t="str"><v>Ω €</v></c></row>')
    text = parts["xl/worksheets/sheet1.xml"].decode().replace("UTF-8", "UTF-16")
    parts["xl/worksheets/sheet1.xml"] = text.encode("utf-16")
    cell = load_workbook(annotated(workbook(parts), (2, 2)))["Motors"]["B2"]
    assert (cell.value, cell.fill.fgColor.rgb) == ("Ω €", f"FF{FILL}")


def test_missing_styles_are_made(workbook: Write) -> None:
    parts = plain_parts('<row r="2"><c r="B2"><v>900</v></c></row>')
    for name, line in (("[Content_Types].xml", b"styles+xml"), ("xl/_rels/workbook.xml.rels", b"/styles")):
        start = parts[name].rindex(b"<", 0, parts[name].index(line))
        parts[name] = parts[name][:start] + parts[name][parts[name].index(b"/>", start) + 2 :]
    del parts["xl/styles.xml"]
    assert load_workbook(annotated(workbook(parts), (2, 2)))["Motors"]["B2"].fill.fgColor.rgb == f"FF{FILL}"


def test_empty_styles_are_filled_up(workbook: Write) -> None:
    parts = plain_parts('<row r="2"><c r="B2"><v>900</v></c></row>')
    parts["xl/styles.xml"] = f'{HEAD}<styleSheet xmlns="{MAIN}"/>'.encode()
    source = workbook(parts)
    target = source.with_name("copy.xlsx")
    annotate_copy(source, target, [Mark("Motors", 2, 2, FILL, "")], None)
    fills = list(etree.fromstring(read_parts(target)["xl/styles.xml"]).iter(f"{{{MAIN}}}fill"))
    kinds = [fill[0].get("patternType") for fill in fills]
    assert kinds == ["none", "gray125", "solid"]  # the first two are reserved (ISO/IEC 29500-1, 18.8.20)


def test_unknown_sheet_is_named(workbook: Write, tmp_path: Path) -> None:
    with pytest.raises(ValueError, match=r"no sheet 'Pumps'; it has 'Motors'"):
        annotate_copy(workbook(plain_parts()), tmp_path / "copy.xlsx", [Mark("Pumps", 1, 1, FILL, "")], None)


@pytest.mark.parametrize(
    ("row", "column", "fill"), [(0, 1, FILL), (1_048_577, 1, FILL), (1, 16_385, FILL), (1, 1, "red")]
)
def test_impossible_mark_is_refused(row: int, column: int, fill: str) -> None:
    with pytest.raises(ValueError, match=r"no sheet has a cell|not a colour"):
        Mark("Motors", row, column, fill, "")
