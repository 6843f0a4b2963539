"""A copy of ours given as input: known as one, and annotated anew without anything doubled."""

from __future__ import annotations

import re
from collections.abc import Callable
from pathlib import Path

import pytest
from lxml import etree
from openpyxl import load_workbook

from audit.report.workbook.patch import (
    Mark,
    annotate_copy,
    is_our_output,
    our_sheet_names,
    strip_our_note,
)
from tests.report.workbook.patch.fidelity import compare
from tests.report.workbook.patch.workbooks import MAIN, plain_parts, read_parts, rich_parts, with_notes, write_parts

Write = Callable[..., Path]
pytestmark = pytest.mark.filterwarnings("ignore:.*extension is not supported:UserWarning")
FIRST = [
    Mark("Motors", 2, 2, "FFC7CE", "pickup 900 A"),
    Mark("Motors", 4, 3, "FFEB9C", "another"),
    Mark("Motors", 9, 9, "FFC7CE", "blank cell"),
]
SECOND = [Mark("Motors", 2, 2, "FFEB9C", "pickup 1,020 A"), Mark("Motors", 6, 1, "FFC7CE", "new finding")]


@pytest.fixture
def source(workbook: Write) -> Path:
    return workbook(rich_parts())


@pytest.fixture
def once(source: Path, report: Path, tmp_path: Path) -> Path:
    target = tmp_path / "once.xlsx"
    annotate_copy(source, target, FIRST, report)
    return target


def test_copy_is_recognised_and_the_original_is_not(source: Path, once: Path, tmp_path: Path) -> None:
    assert is_our_output(once)
    assert our_sheet_names(once) == {"Cover", "Findings", "Motors (audit)"}
    assert not is_our_output(source)
    assert our_sheet_names(source) == set()
    stray = tmp_path / "stray.xlsx"
    stray.write_bytes(b"PK\x03\x04 no archive")
    assert not is_our_output(stray)
    assert our_sheet_names(tmp_path / "absent.xlsx") == set()


def test_recognised_after_a_library_saved_it(once: Path, tmp_path: Path) -> None:
    book = load_workbook(once)
    book["Findings"].title = "Findings of 2024"
    book.save(tmp_path / "saved.xlsx")
    assert is_our_output(tmp_path / "saved.xlsx")
    assert our_sheet_names(tmp_path / "saved.xlsx") == {"Cover", "Findings of 2024", "Motors (audit)"}


def test_same_marks_again_change_nothing_in_any_part(once: Path, report: Path, tmp_path: Path) -> None:
    twice, thrice = tmp_path / "twice.xlsx", tmp_path / "thrice.xlsx"
    outcome = annotate_copy(once, twice, FIRST, report)
    annotate_copy(twice, thrice, FIRST, report)
    assert outcome.replaced_earlier
    before, after, later = read_parts(once), read_parts(twice), read_parts(thrice)
    assert set(before) == set(after) == set(later)
    # what lists parts may list them in another order
    lists = {"[Content_Types].xml", "xl/_rels/workbook.xml.rels", "xl/workbook.xml"}
    assert {name for name in before if before[name] != after[name]} <= lists
    assert {name: len(later[name]) for name in later} == {name: len(after[name]) for name in after}


def test_other_marks_replace_the_first_ones(source: Path, once: Path, report: Path, tmp_path: Path) -> None:
    """The copy of the copy differs from the site's own workbook in nothing but the second marks."""
    twice = tmp_path / "twice.xlsx"
    annotate_copy(once, twice, SECOND, report)
    # the blank cell that the first run put in stays, blank and without a fill
    compare(source, twice, [*SECOND, FIRST[2]], added_in_front=3)
    sheet = load_workbook(twice)["Motors"]
    assert sheet["C4"].fill.fill_type is None
    assert sheet["I9"].fill.fill_type is None
    assert sheet["C4"].comment is None
    assert "900 A" not in sheet["B2"].comment.text
    assert strip_our_note(sheet["B2"].comment.text) == "Checked on site "
    assert sheet["B2"].fill.fgColor.rgb == "FFFFEB9C"


def test_no_marks_give_the_sites_own_cells_back(source: Path, once: Path, tmp_path: Path) -> None:
    bare = tmp_path / "bare.xlsx"
    annotate_copy(once, bare, [], None)
    # the blank cell that was put in stays, blank and without a fill
    compare(source, bare, [FIRST[2]], added_in_front=0)
    assert read_parts(bare)["xl/comments1.xml"].count(b"<comment ") == 1
    assert {name for name in read_parts(bare) if "charts" in name or "tables" in name} == set()


def test_notes_that_were_all_ours_leave_no_parts_behind(workbook: Write, tmp_path: Path) -> None:
    once, bare = tmp_path / "once.xlsx", tmp_path / "bare.xlsx"
    annotate_copy(workbook(plain_parts()), once, [Mark("Motors", 2, 2, "FFC7CE", "x")], None)
    annotate_copy(once, bare, [], None)
    assert not [name for name in read_parts(bare) if "comments" in name or name.endswith(".vml")]
    assert b"legacyDrawing" not in read_parts(bare)["xl/worksheets/sheet1.xml"]


def test_fills_are_undone_after_formats_were_renumbered(workbook: Write, tmp_path: Path) -> None:
    """A spreadsheet program numbers formats anew when it saves; the fill itself tells what was there before."""
    once, bare = tmp_path / "once.xlsx", tmp_path / "bare.xlsx"
    rows = '<row r="2"><c r="B2" s="1"><v>900</v></c></row>'
    annotate_copy(workbook(plain_parts(rows)), once, [Mark("Motors", 2, 2, "FFC7CE", "")], None)
    parts = read_parts(once)
    styles = etree.fromstring(parts["xl/styles.xml"])
    formats = styles.find(f"{{{MAIN}}}cellXfs")
    assert formats is not None
    used = formats[-1]
    for other in list(formats)[1:-1]:
        formats.remove(other)
    assert list(formats)[1] is used
    parts["xl/styles.xml"] = etree.tostring(styles)
    parts["xl/worksheets/sheet1.xml"] = parts["xl/worksheets/sheet1.xml"].replace(b's="4"', b's="1"')
    annotate_copy(write_parts(tmp_path / "renumbered.xlsx", parts), bare, [], None)
    cell = load_workbook(bare)["Motors"]["B2"]
    assert cell.fill.fgColor.rgb == "FFDDEBF7"
    assert cell.number_format == '0.0" A"'


def test_sheet_of_the_users_with_the_name_of_ours_survives(once: Path, report: Path, tmp_path: Path) -> None:
    book = load_workbook(once)
    del book["Findings"]
    book.create_sheet("Findings")["A1"] = "the user's own"
    book.save(tmp_path / "changed.xlsx")
    annotate_copy(tmp_path / "changed.xlsx", tmp_path / "twice.xlsx", FIRST, report)
    twice = load_workbook(tmp_path / "twice.xlsx")
    assert twice["Findings"]["A1"].value == "the user's own"
    assert "Findings (audit)" in twice.sheetnames


def test_text_written_around_our_note_stays(workbook: Write, report: Path, tmp_path: Path) -> None:
    once, twice = tmp_path / "once.xlsx", tmp_path / "twice.xlsx"
    rows = '<row r="2"><c r="B2" s="1"><v>900</v></c></row>'
    mark = Mark("Motors", 2, 2, "FFC7CE", "finding")
    annotate_copy(workbook(with_notes(plain_parts(rows))), once, [mark], report)
    parts = read_parts(once)
    end = b"</t></r></text></comment>"
    assert end in parts["xl/comments1.xml"]
    parts["xl/comments1.xml"] = parts["xl/comments1.xml"].replace(
        end, b"</t></r><r><t>\nagreed, R.E.</t></r></text></comment>"
    )
    annotate_copy(write_parts(tmp_path / "answered.xlsx", parts), twice, [mark], report)
    text = load_workbook(twice)["Motors"]["B2"].comment.text
    assert text.count("finding") == 1
    assert strip_our_note(text) == "Checked on site \nagreed, R.E."


def test_calculation_chain_that_names_our_sheet_goes_with_it(once: Path, report: Path, tmp_path: Path) -> None:
    """A program adds our sheets to the chain when someone types a formula there; a chain to nowhere is damage."""
    parts = read_parts(once)
    cover = re.search(rb'<sheet name="Cover" sheetId="(\d+)"', parts["xl/workbook.xml"])
    assert cover
    entry = b'<c r="B9" i="' + cover[1] + b'"/></calcChain>'
    parts["xl/calcChain.xml"] = parts["xl/calcChain.xml"].replace(b"</calcChain>", entry)
    annotate_copy(write_parts(tmp_path / "typed.xlsx", parts), tmp_path / "twice.xlsx", FIRST, report)
    after = read_parts(tmp_path / "twice.xlsx")
    assert "xl/calcChain.xml" not in after
    assert b"calcChain" not in after["xl/_rels/workbook.xml.rels"] + after["[Content_Types].xml"]
