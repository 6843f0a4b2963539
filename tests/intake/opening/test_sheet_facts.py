"""What a workbook shows and a plain reader leaves out: errors, missing results, percentages, what is hidden."""

from __future__ import annotations

import hashlib
from datetime import date, datetime, timedelta

import openpyxl
import pytest
from openpyxl.styles import Font
from openpyxl.utils.datetime import CALENDAR_MAC_1904

from audit.fleet.addresses import a1, unpack
from audit.intake.cells import CellError, UncachedFormula
from audit.intake.opening import UnreadableWorkbook, open_workbook

SHEET = "xl/worksheets/sheet1.xml"


def names(addresses):
    _, rows, columns = unpack(addresses)
    return {a1(int(row), int(column)) for row, column in zip(rows, columns, strict=True)}


@pytest.fixture
def site(tmp_path):
    book = openpyxl.Workbook()
    sheet = book.active
    sheet.title = "Motors"
    sheet["B3"], sheet["C4"], sheet["E6"] = "Tag", 0.85, 7
    sheet["C4"].number_format = "0.0%"
    sheet["E6"].number_format = '0" %"'
    sheet["B5"] = "old"
    sheet["B5"].font = Font(strike=True)
    sheet["D4"] = "=C4*100"
    sheet["G8"] = "#REF!"
    sheet["B7"] = "0012"
    sheet["C7"] = date(2025, 4, 3)
    sheet["C8"] = True
    sheet.merge_cells("B1:C2")
    sheet.row_dimensions[5].hidden = True
    sheet.column_dimensions["D"].hidden = True
    book.create_sheet("Notes").sheet_state = "hidden"
    book.create_chartsheet("Picture")
    path = tmp_path / "site.xlsx"
    book.save(path)
    return path


def test_a_grid_begins_at_a1_and_every_row_is_as_wide_as_the_widest(site):
    sheet = open_workbook(site).sheets[0]
    assert sheet.rows[2][1] == "Tag"
    assert sheet.rows[0] == [None] * 7
    assert {len(row) for row in sheet.rows} == {7}
    assert (sheet.height, sheet.width) == (8, 7)


def test_values_keep_their_types(site):
    rows = open_workbook(site).sheets[0].rows
    assert (rows[6][1], rows[6][2], rows[7][2]) == ("0012", date(2025, 4, 3), True)


def test_errors_and_formulas_without_a_saved_result_are_no_blanks(site):
    rows = open_workbook(site).sheets[0].rows
    assert rows[3][3] == UncachedFormula()
    assert rows[7][6] == CellError("#REF!")


def test_percentages_and_struck_text_are_known_cell_by_cell(site):
    sheet = open_workbook(site).sheets[0]
    assert names(sheet.percent_cells) == {"C4"}
    assert names(sheet.struck_cells) == {"B5"}
    assert sheet.column(3, 3, 5) == [None, 0.85, None]
    assert sheet.percent_in_column(3, 3, 5).tolist() == [False, True, False]
    assert sheet.struck_in_column(2).tolist() == [False] * 4 + [True] + [False] * 3


def test_what_is_hidden_or_merged_is_known(site):
    motors, notes = open_workbook(site).sheets
    assert (motors.hidden, notes.hidden) == (False, True)
    assert (motors.hidden_rows, motors.hidden_columns) == ({5}, {4})
    assert motors.merged == ((1, 2, 2, 3),)


def test_chart_sheets_are_left_out(site):
    assert [sheet.name for sheet in open_workbook(site).sheets] == ["Motors", "Notes"]


def test_the_hash_is_that_of_the_file(site):
    assert open_workbook(site).sha256 == hashlib.sha256(site.read_bytes()).hexdigest()


def test_dates_of_the_1904_system_come_out_right(tmp_path):
    book = openpyxl.Workbook()
    book.epoch = CALENDAR_MAC_1904
    book.active["A1"] = datetime(2025, 4, 3)
    book.save(tmp_path / "mac.xlsx")
    opened = open_workbook(tmp_path / "mac.xlsx")
    assert opened.date_1904
    assert opened.sheets[0].rows[0][0] in (date(2025, 4, 3), datetime(2025, 4, 3))


def test_a_formula_whose_saved_result_is_an_empty_text_is_a_blank(site, edited):
    edited(
        site,
        {
            SHEET: lambda sheet: sheet.replace(b"<f>C4*100</f><v></v>", b"<f>C4*100</f><v/>").replace(
                b'<c r="D4"', b'<c r="D4" t="str"'
            )
        },
    )
    assert open_workbook(site).sheets[0].rows[3][3] is None


def test_a_saved_result_is_the_value(site, edited):
    def calculated(sheet: bytes) -> bytes:
        begin = sheet.index(b"<f>C4*100</f>")
        end = sheet.index(b"</c>", begin)
        return sheet[:begin] + b"<f>C4*100</f><v>85</v>" + sheet[end:]

    edited(site, {SHEET: calculated})
    assert open_workbook(site).sheets[0].rows[3][3] == 85.0


def to_prefixed(sheet: bytes) -> bytes:
    text = sheet.decode()
    begin = text.index("<worksheet")
    body = text[begin:].replace('xmlns="', 'xmlns:x="').replace("</", "</x:")
    parts = body.split("<")
    return "<".join(part if not part or part.startswith("/") else f"x:{part}" for part in parts).encode()


def to_comment(sheet: bytes) -> bytes:
    return sheet.replace(b"<sheetData>", b"<!-- <c r='XFD1' --><sheetData>")


def to_single_quotes(sheet: bytes) -> bytes:
    return sheet.replace(b'"', b"'")


def to_style_last(sheet: bytes) -> bytes:
    return sheet.replace(b'<c r="C4" s="1"', b'<c r="C4" t="n" s="1"').replace(b't="n" s="1" t="n"', b't="n" s="1"')


def to_utf_16(sheet: bytes) -> bytes:
    text = sheet.decode()
    return ('<?xml version="1.0" encoding="UTF-16"?>' + text[text.index("<worksheet") :]).encode("utf-16")


def test_a_sheet_that_the_reader_would_take_for_empty_is_refused(site, edited):
    edited(site, {SHEET: to_utf_16})
    with pytest.raises(UnreadableWorkbook, match="UTF-16"):
        open_workbook(site)


@pytest.mark.parametrize("change", [to_prefixed, to_comment, to_single_quotes, to_style_last])
def test_other_spellings_of_the_same_sheet_tell_the_same(change, site, edited):
    before = open_workbook(site).sheets[0]
    edited(site, {SHEET: change})
    after = open_workbook(site).sheets[0]
    assert after.rows == before.rows
    assert names(after.percent_cells) == names(before.percent_cells) == {"C4"}
    assert names(after.struck_cells) == {"B5"}
    assert (after.hidden_rows, after.hidden_columns) == (before.hidden_rows, before.hidden_columns) == ({5}, {4})


@pytest.mark.parametrize(
    ("code", "percent"),
    [
        ("0%", True),
        ("0.00%", True),
        ("#,##0.0 %;[Red]-#,##0.0 %", True),
        ('0.0"%"', False),
        (r"0\%", False),
        ("0.00", False),
    ],
)
def test_a_percent_sign_counts_only_where_it_multiplies(code, percent, tmp_path):
    # ECMA-376 part 1, 18.8.31: a quoted or escaped sign is shown as it stands
    book = openpyxl.Workbook()
    book.active["A1"] = 0.5
    book.active["A1"].number_format = code
    book.save(tmp_path / "one.xlsx")
    assert bool(open_workbook(tmp_path / "one.xlsx").sheets[0].percent_cells.size) is percent


def test_a_span_of_time_beyond_all_limits_spoils_its_own_row_only(tmp_path):
    book = openpyxl.Workbook()
    sheet = book.active
    sheet["B2"], sheet["C2"] = "Tag", "Stall time"
    sheet["B3"], sheet["C3"] = "P-101", 1e10
    sheet["B4"], sheet["C4"] = "P-102", 0.5
    for cell in ("C3", "C4"):
        sheet[cell].number_format = "[h]:mm:ss"
    book.save(tmp_path / "one.xlsx")
    rows = open_workbook(tmp_path / "one.xlsx").sheets[0].rows
    assert rows[0] == [None, None, None]
    assert rows[1] == [None, "Tag", "Stall time"]
    assert all(isinstance(value, CellError) for value in rows[2])
    assert rows[3] == [None, "P-102", timedelta(hours=12)]
