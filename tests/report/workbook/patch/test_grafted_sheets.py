"""Sheets built apart stand in the copy as they were built, and never hold a formula."""

from __future__ import annotations

import re
from collections.abc import Callable
from pathlib import Path

import pytest
from lxml import etree
from openpyxl import Workbook, load_workbook
from openpyxl.comments import Comment
from openpyxl.worksheet.worksheet import Worksheet
from python_calamine import CalamineWorkbook

from audit.report.workbook.patch import annotate_copy, names_for_report, storable_text
from tests.report.workbook.patch.workbooks import CONTENT, MAIN, plain_parts, read_parts, rich_parts

Write = Callable[..., Path]
pytestmark = pytest.mark.filterwarnings("ignore:.*extension is not supported:UserWarning")


@pytest.fixture
def copy(workbook: Write, report: Path, tmp_path: Path) -> Path:
    """The report in a workbook whose own sheet is called Motors too."""
    target = tmp_path / "copy.xlsx"
    annotate_copy(workbook(plain_parts('<row r="1"><c r="A1"><v>7</v></c></row>')), target, [], report)
    return target


def sheet(path: Path, name: str) -> Worksheet:
    found = load_workbook(path)[name]
    assert isinstance(found, Worksheet)
    return found


@pytest.mark.parametrize(
    ("first", "expected"),
    [
        (True, ["Cover", "Findings", "Motors (audit)", "Motors"]),
        (False, ["Motors", "Cover", "Findings", "Motors (audit)"]),
    ],
)
def test_sheets_stand_before_or_after_the_users_own(
    workbook: Write, report: Path, tmp_path: Path, first: bool, expected: list[str]
) -> None:
    target = tmp_path / "copy.xlsx"
    outcome = annotate_copy(workbook(plain_parts()), target, [], report, first=first)
    assert outcome.sheet_names == {"Cover": "Cover", "Findings": "Findings", "Motors": "Motors (audit)"}
    assert load_workbook(target).sheetnames == CalamineWorkbook.from_path(target).sheet_names == expected


def test_names_are_told_beforehand(workbook: Write, report: Path, tmp_path: Path) -> None:
    source, target = workbook(plain_parts()), tmp_path / "copy.xlsx"
    wanted = ["Cover", "Findings", "Motors"]
    outcome = annotate_copy(source, target, [], report)
    assert names_for_report(source, wanted) == outcome.sheet_names
    assert names_for_report(target, wanted) == outcome.sheet_names  # its own earlier sheets are not in the way


def test_values_and_looks_are_those_of_the_report(copy: Path, report: Path) -> None:
    for name in ("Cover", "Findings"):
        built, grafted = sheet(report, name), sheet(copy, name)
        for row in built.iter_rows():
            for cell in row:
                other = grafted[cell.coordinate]
                if cell.data_type != "f" and cell.value != "_x0041_":
                    assert other.value == cell.value
                assert (other.font.b, other.font.sz, other.font.name) == (cell.font.b, cell.font.sz, cell.font.name)
                assert other.number_format == cell.number_format
                assert other.fill.fgColor.rgb == cell.fill.fgColor.rgb
        assert grafted.freeze_panes == built.freeze_panes
        assert [str(merged) for merged in grafted.merged_cells.ranges] == [
            str(each) for each in built.merged_cells.ranges
        ]
        assert grafted.column_dimensions["A"].width == built.column_dimensions["A"].width
        assert grafted.protection.sheet == built.protection.sheet
        assert grafted.page_setup.orientation == built.page_setup.orientation
        assert grafted.print_title_rows == built.print_title_rows
        assert grafted.print_area == built.print_area


def test_conditional_formats_and_choices_are_carried_over(copy: Path, report: Path) -> None:
    built, grafted = sheet(report, "Findings"), sheet(copy, "Findings")
    rules = [rule for group in grafted.conditional_formatting for rule in group.rules]
    originals = [rule for group in built.conditional_formatting for rule in group.rules]
    assert [rule.type for rule in rules] == [rule.type for rule in originals] == ["dataBar", "cellIs"]
    assert rules[1].dxf.fill.bgColor.rgb == originals[1].dxf.fill.bgColor.rgb
    assert rules[0].dataBar.color.rgb == originals[0].dataBar.color.rgb
    choices = grafted.data_validations.dataValidation[0]
    assert choices.formula1 == "'Motors (audit)'!$A$1:$A$3"


def test_links_follow_renamed_sheets(copy: Path) -> None:
    cover = sheet(copy, "Cover")
    assert cover["A2"].hyperlink.location == "'Motors (audit)'!A1"
    assert cover["A3"].hyperlink.target == "https://example.org/standard"


def test_text_never_becomes_a_formula(copy: Path) -> None:
    findings = sheet(copy, "Findings")
    said = ["=1+1", "+2 A", "-5 A", "@x", "\tt"]
    for row, text in enumerate(said, start=2):
        cell = findings.cell(row, 3)
        assert (cell.value, cell.data_type) == (text, "s") or cell.data_type == "inlineStr"
        assert cell.quotePrefix  # it stays text when someone edits the cell
    assert not findings["C8"].quotePrefix
    read = CalamineWorkbook.from_path(copy).get_sheet_by_name("Findings").to_python()
    assert [row[2] for row in read[1:8]] == [*said, "_x0041_", "plain"]
    for name, content in read_parts(copy).items():
        if name.startswith("xl/worksheets/sheet"):
            assert not list(etree.fromstring(content).iter(f"{{{MAIN}}}f"))


def test_control_characters_can_be_stored() -> None:
    book = Workbook()
    cell = book.worksheets[0]["A1"]
    cell.value = storable_text("a\x00b\x1fc\td\ne")  # openpyxl refuses control characters other than tab and newline
    assert cell.value == "a␀b␟c\td\ne"


def test_chart_and_table_follow_their_sheet(copy: Path) -> None:
    parts = read_parts(copy)
    formulas = re.findall(rb"<(?:c:)?f>([^<]*)<", parts["xl/charts/chart1.xml"])
    assert formulas
    assert all(b"Motors (audit)" in formula for formula in formulas)
    grafted = sheet(copy, "Motors (audit)")
    assert list(grafted.tables) == ["Motors_list"]
    assert len(grafted._charts) == 1


def test_one_format_table_serves_all(copy: Path) -> None:
    """The user's own formats keep their numbers, and no format is there twice."""
    before = etree.fromstring(plain_parts()["xl/styles.xml"]).find(f"{{{MAIN}}}cellXfs")
    after = etree.fromstring(read_parts(copy)["xl/styles.xml"]).find(f"{{{MAIN}}}cellXfs")
    assert before is not None
    assert after is not None
    spelt = [etree.tostring(cell_format, method="c14n") for cell_format in after]
    assert spelt[: len(before)] == [etree.tostring(cell_format, method="c14n") for cell_format in before]
    assert len(set(spelt)) == len(spelt)


def test_positions_of_the_users_sheets_are_corrected(workbook: Write, report: Path, tmp_path: Path) -> None:
    target = tmp_path / "copy.xlsx"
    annotate_copy(workbook(rich_parts()), target, [], report)
    book = load_workbook(target)
    assert book.active is not None
    assert book.active.title == "Motors"
    assert book["Motors"].print_title_rows == "$1:$1"
    assert book["Lists"].defined_names["Kinds"].attr_text == "Lists!$A$1:$A$2"
    assert book["Lists"].sheet_state == "hidden"
    selected = [name for name, part in read_parts(target).items() if b"tabSelected" in part]
    assert selected == ["xl/worksheets/sheet1.xml"]  # two selected sheets would be edited together


def test_titles_in_the_properties_list_the_new_sheets(workbook: Write, report: Path, tmp_path: Path) -> None:
    target = tmp_path / "copy.xlsx"
    annotate_copy(workbook(rich_parts()), target, [], report)
    titles = re.findall(rb"<vt:lpstr>([^<]*)</vt:lpstr>", read_parts(target)["docProps/app.xml"])
    assert titles == [b"Worksheets", b"Cover", b"Findings", b"Motors (audit)", b"Motors", b"Lists"]


def test_every_part_has_a_content_type_and_every_relationship_a_target(copy: Path) -> None:
    parts = read_parts(copy)
    types = etree.fromstring(parts["[Content_Types].xml"])
    defaults = {child.get("Extension", "").lower() for child in types}
    overrides = [child.get("PartName") for child in types if child.get("PartName")]
    assert len(overrides) == len(set(overrides))
    assert {name.lstrip("/") for name in overrides if name} <= set(parts)
    for name in parts:
        assert f"/{name}" in overrides or name.rpartition(".")[2] in defaults
        if name.endswith(".rels"):
            folder = name.replace("_rels/", "").rpartition("/")[0]
            for child in etree.fromstring(parts[name]):
                target = child.get("Target", "")
                if child.get("TargetMode") != "External":
                    assert (target.lstrip("/") if target.startswith("/") else f"{folder}/{target}".lstrip("/")) in parts
    sheets = [name for name in parts if re.fullmatch(r"xl/worksheets/sheet\d+\.xml", name)]
    assert parts["[Content_Types].xml"].count(f"{CONTENT}.spreadsheetml.worksheet+xml".encode()) == len(sheets)


def test_notes_in_a_report_are_refused(workbook: Write, tmp_path: Path) -> None:
    book = Workbook()
    book.worksheets[0]["A1"].comment = Comment("no", "one")
    book.save(tmp_path / "report.xlsx")
    with pytest.raises(ValueError, match="legacyDrawing, which cannot be carried over"):
        annotate_copy(workbook(plain_parts()), tmp_path / "copy.xlsx", [], tmp_path / "report.xlsx")


def test_name_that_the_workbook_has_already_is_refused(workbook: Write, tmp_path: Path) -> None:
    from openpyxl.workbook.defined_name import DefinedName

    book = Workbook()
    book.defined_names["pickups"] = DefinedName("pickups", attr_text="Sheet!$A$1")
    book.save(tmp_path / "report.xlsx")
    with pytest.raises(ValueError, match="'pickups' of its own already"):
        annotate_copy(workbook(rich_parts()), tmp_path / "copy.xlsx", [], tmp_path / "report.xlsx")
