"""Which rows are records, and where tables begin and end."""

from __future__ import annotations

from tests.intake.conftest import values

HEAD = ["Tag", "Service", "kW", "Volts", "FLA"]
P1 = ["P-101A", "Feed pump", 110, 400, 195]
P2 = ["P-102", "Fan", 150, 400, 265]


def said(read):
    return " | ".join(complaint.found for complaint in read.complaints)


def test_sub_headings_name_the_area_of_the_rows_below(gathered):
    read = gathered({"Motors": [HEAD, ["AREA 100 - MILLING"], P1, ["Area 200"], P2]})
    assert values(read, "area") == {"P-101A": "AREA 100 - MILLING", "P-102": "Area 200"}


def test_a_tag_without_any_data_is_a_motor_and_no_sub_heading(gathered):
    read = gathered({"Motors": [HEAD, P1, ["P-103"], P2]})
    assert set(values(read, "motor")) == {"P-101A", "P-103", "P-102"}


def test_totals_notes_and_repeated_headers_are_left_out_and_said(gathered):
    read = gathered(
        {"Motors": [HEAD, P1, ["Sub-total", None, 110], HEAD, P2, ["Total", None, 260], [], ["Notes: as built"]]}
    )
    assert set(values(read, "motor")) == {"P-101A", "P-102"}
    assert "rows 3 and 6 read as totals" in said(read)
    assert "row 4 read as headers that are repeated" in said(read)
    assert "row 8 read as notes" in said(read)


def test_a_row_without_a_tag_is_complained_about(gathered):
    read = gathered({"Motors": [HEAD, P1, [None, "Lost pump", 15, 400, 28], P2]})
    assert set(values(read, "motor")) == {"P-101A", "P-102"}
    assert any(c.weight == "withheld" and "row 3" in c.found for c in read.complaints)


def test_headers_are_found_anywhere_in_the_first_forty_rows(gathered):
    title = [["Works"], [], ["Prepared", "A. B.", "Date", "1 May"], *([[]] * 35)]
    read = gathered({"Motors": [*title, HEAD, P1]})
    assert values(read, "rated_power_kw") == {"P-101A": 110}


def test_a_heading_of_three_rows_is_read_downwards(gathered):
    rows = [
        ["Equipment", None, "Motor", None, None],
        [None, None, "Rated", None, None],
        ["Tag", "Service", "Power (kW)", "Voltage (V)", "Current (A)"],
        P1,
    ]
    read = gathered({"Motors": rows})
    assert values(read, "full_load_a") == {"P-101A": 195}
    assert values(read, "rated_power_kw") == {"P-101A": 110}


def test_several_lists_of_motors_are_one_list(gathered):
    read = gathered({"Area 1": [HEAD, P1], "Area 2": [HEAD, P2]})
    assert values(read, "full_load_a") == {"P-101A": 195, "P-102": 265}


def test_one_table_below_another_is_read_too(gathered):
    rows = [
        HEAD,
        P1,
        [],
        ["Buses"],
        ["Bus", "System Voltage (V)", "Fault Max (kA)", "Earthing"],
        ["B-1", 400, 30, "TN"],
    ]
    read = gathered({"All": rows})
    assert values(read, "bus_nominal_v") == {"B-1": 400}
    assert values(read, "full_load_a") == {"P-101A": 195}


def test_two_motors_in_one_row_have_the_same_readings(gathered):
    read = gathered({"Motors": [HEAD, ["P-101 A/B", "Feed pump", 110, 400, 195]]})
    assert values(read, "full_load_a") == {"P-101 A": 195, "P-101 B": 195}
    assert "read as 2 motors" in said(read)


def test_starts_below_one_tag_belong_to_it_and_the_clock_joins_the_day(gathered):
    starts = [
        ["Tag", "Date", "Time", "Start Time (s)", "Max Current (A)"],
        ["P-102", "2026-03-14", "12:00", 4.2, 1800],
        [None, "2026-03-15", "18:00", 4.3, 1790],
    ]
    read = gathered({"Motors": [HEAD, P2], "Starts": starts})
    rows = read.readings[read.readings["quantity"] == "start_moment"]
    # 14 March 2026 is day 20526 after 1 January 1970
    assert rows["number"].tolist() == [20526.5, 20527.75]
    assert read.readings.query("quantity == 'start_motor'")["text"].tolist() == ["P-102", "P-102"]


def test_a_sheet_of_other_things_is_left_unread_and_said(gathered):
    read = gathered({"Motors": [HEAD, P1], "Spares": [["Part", "Shelf"], ["Seal", "A3"]]})
    assert any(c.sheet == "Spares" and "no table" in c.found for c in read.complaints)


def test_hidden_rows_columns_and_sheets_are_read_and_said(gathered, tmp_path):
    import openpyxl

    from audit.intake import gather

    gathered({"Motors": [HEAD, P1, P2]})
    book = openpyxl.load_workbook(tmp_path / "site.xlsx")
    book["Motors"].row_dimensions[3].hidden = True
    book["Motors"].column_dimensions["E"].hidden = True
    book.create_sheet("Front")
    book["Motors"].sheet_state = "hidden"
    book.save(tmp_path / "site.xlsx")
    read = gather(tmp_path)
    assert values(read, "full_load_a") == {"P-101A": 195, "P-102": 265}
    assert "row 3 hidden" in said(read)
    assert "1 columns are hidden" in said(read)
    assert "the sheet is hidden" in said(read)
