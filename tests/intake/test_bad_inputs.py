"""Workbooks with something wrong in them: the cell is withheld and named, and every other row is read."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from datetime import date, datetime
from pathlib import Path

import numpy as np
import openpyxl
import pytest

from audit.fleet.column import NO, UNKNOWN, YES
from audit.intake import CannotRead, read_fleet

Sheets = Mapping[str, Sequence[Sequence[object]]]
MOTORS = [
    ["Tag", "kW", "Rated Voltage (V)", "FLC (A)", "LRC (A)", "Safe Stall Time Hot (s)", "Relay", "Starting Method"],
    ["P-101", 55, 400, 100, 650, 12, "R-101", "DOL"],
    ["P-102", 75, 400, 135, 900, 14, "R-102", "DOL"],
    ["P-103", 90, 400, 161, 1050, 15, "R-103", "DOL"],
    ["P-104", 110, 400, 195, 1300, 16, "R-104", "DOL"],
]
SETTINGS = [
    ["Relay", "Relay FLA (A)", "Jam Trip PU (x FLA)", "Jam Trip Delay (s)", "46 Trip Pickup (% FLA)"],
    ["R-101", 100, 2, 2, 15],
    ["R-102", 135, 2, 2, 15],
    ["R-103", 161, 2, 2, 15],
    ["R-104", 195, 2, 2, 15],
]


def fleet_of_sheets(folder: Path, sheets: Sheets, name: str = "site.xlsx"):
    write(folder, sheets, name)
    return read_fleet(folder)


def write(folder: Path, sheets: Sheets, name: str = "site.xlsx") -> Path:
    book = openpyxl.Workbook()
    book.remove(book.active)
    for title, rows in sheets.items():
        sheet = book.create_sheet(title)
        for row in rows:
            sheet.append(list(row))
    book.save(folder / name)
    return folder / name


def edited(rows: Sequence[Sequence[object]], **cells: object) -> list[list[object]]:
    """Rows with some cells changed, named as the spreadsheet program does."""
    copy = [list(row) for row in rows]
    for name, value in cells.items():
        copy[int(name[1:]) - 1][ord(name[0]) - ord("A")] = value
    return copy


def values(fleet, subject, quantity):
    return fleet.tables[subject].columns[quantity].values


def complaints_at(fleet, cell, sheet="Motors"):
    return [c for c in fleet.complaints if (c.sheet, c.cell) == (sheet, cell) and c.weight == "withheld"]


def test_a_sound_site_is_read_without_a_word(tmp_path):
    fleet = fleet_of_sheets(tmp_path, {"Motors": MOTORS, "Settings": SETTINGS})
    assert fleet.complaints == ()
    assert fleet.questions == ()
    assert fleet.tables["motor"].keys == ("P-101", "P-102", "P-103", "P-104")
    assert values(fleet, "motor", "full_load_a").tolist() == [100.0, 135.0, 161.0, 195.0]
    assert values(fleet, "relay", "jam_trip_pickup_a").tolist() == [200.0, 270.0, 322.0, 390.0]
    assert fleet.links["motor", "relay"].tolist() == [0, 1, 2, 3]
    cell = fleet.tables["motor"].columns["full_load_a"].cell[2]
    assert fleet.book.place(cell) == ("site.xlsx", "Motors", "D4")


def test_without_a_motor_list_nothing_can_be_judged(tmp_path):
    write(tmp_path, {"Notes": [["Meeting", "Person"], ["Monday", "someone"]]})
    with pytest.raises(CannotRead) as refused:
        read_fleet(tmp_path)
    assert refused.value.complaint.weight == "stop"
    assert refused.value.complaint.advice


def test_an_empty_folder_and_a_missing_one_are_refused(tmp_path):
    with pytest.raises(CannotRead):
        read_fleet(tmp_path)
    with pytest.raises(CannotRead):
        read_fleet(tmp_path / "none such")


def test_one_unreadable_workbook_among_several_is_said_first_and_the_rest_is_read(tmp_path):
    (tmp_path / "broken.xlsx").write_bytes(b"this is no workbook")
    fleet = fleet_of_sheets(tmp_path, {"Motors": MOTORS})
    assert len(fleet.tables["motor"]) == 4
    assert (fleet.complaints[0].file, fleet.complaints[0].weight) == ("broken.xlsx", "stop")


def test_two_full_load_columns_are_asked_and_withheld(tmp_path):
    rows = [[*row, extra] for row, extra in zip(MOTORS, ["FLA", 101, 136, 160, 196], strict=True)]
    fleet = fleet_of_sheets(tmp_path, {"Motors": rows})
    assert np.isnan(values(fleet, "motor", "full_load_a")).all()
    assert len([question for question in fleet.questions if "FL" in question.about]) == 1
    assert values(fleet, "motor", "locked_rotor_a").tolist() == [650.0, 900.0, 1050.0, 1300.0]


@pytest.mark.parametrize(
    ("written", "why"),
    [
        ("abt 40", "a text where a number belongs"),
        ("100 furlongs", "a unit that nobody knows"),
        ("100 kV", "a unit of something else"),
        ("#REF!", "an error"),
        (date(2024, 3, 1), "a date where a number belongs"),
        (datetime(2024, 3, 1, 12, 0), "a moment where a number belongs"),
        ("see note 3", "a reference elsewhere"),
        (-5, "a negative current"),
        (1e9, "a number far too great"),
        ("=A1+", "a formula that is none"),
        (True, "a truth where a number belongs"),
    ],
)
def test_a_bad_cell_is_withheld_and_named_and_hides_no_other(tmp_path, written, why):
    fleet = fleet_of_sheets(tmp_path, {"Motors": edited(MOTORS, D3=written)})
    full_load = values(fleet, "motor", "full_load_a")
    assert np.isnan(full_load).tolist() == [False, True, False, False], why
    assert full_load[[0, 2, 3]].tolist() == [100.0, 161.0, 195.0]
    assert values(fleet, "motor", "locked_rotor_a")[1] == 900.0
    assert len(complaints_at(fleet, "D3")) == 1
    complaint = complaints_at(fleet, "D3")[0]
    assert complaint.found
    assert complaint.expected
    assert complaint.advice


@pytest.mark.parametrize("written", ["TBC", "", None, "-", "N/A"])
def test_a_cell_without_a_value_is_missing_without_hiding_another(tmp_path, written):
    fleet = fleet_of_sheets(tmp_path, {"Motors": edited(MOTORS, D3=written)})
    assert np.isnan(values(fleet, "motor", "full_load_a")).tolist() == [False, True, False, False]


def test_a_word_that_is_no_starting_method_is_withheld(tmp_path):
    fleet = fleet_of_sheets(tmp_path, {"Motors": edited(MOTORS, H3="by hand")})
    assert (values(fleet, "motor", "starting_method") < 0).tolist() == [False, True, False, False]
    assert len(complaints_at(fleet, "H3")) == 1


def test_a_slip_by_a_thousand_is_withheld_with_its_likely_cause(tmp_path):
    fleet = fleet_of_sheets(tmp_path, {"Motors": edited(MOTORS, F3=14000)})
    assert np.isnan(values(fleet, "motor", "safe_stall_hot_s")).tolist() == [False, True, False, False]
    assert "plausible as ms" in complaints_at(fleet, "F3")[0].advice
    assert any('unit = "ms"' in question.answers for question in fleet.questions)


def test_a_tag_twice_keeps_both_rows(tmp_path):
    fleet = fleet_of_sheets(tmp_path, {"Motors": edited(MOTORS, A3="p-101 ")})
    assert len(fleet.tables["motor"]) == 4
    assert len(set(fleet.tables["motor"].keys)) == 4
    assert values(fleet, "motor", "rated_power_kw").tolist() == [55.0, 75.0, 90.0, 110.0]
    assert any("second time" in complaint.found for complaint in fleet.complaints)


def test_a_relay_that_no_motor_has_stands_alone(tmp_path):
    fleet = fleet_of_sheets(tmp_path, {"Motors": MOTORS, "Settings": edited(SETTINGS, A3="R-999")})
    assert fleet.links["motor", "relay"].tolist() == [0, -1, 2, 3]
    assert fleet.links["relay", "motor"].tolist() == [0, -1, 2, 3]
    assert values(fleet, "relay", "jam_trip_pickup_a").tolist() == [200.0, 270.0, 322.0, 390.0]


def test_off_and_not_used_and_blank_are_three_things(tmp_path):
    fleet = fleet_of_sheets(
        tmp_path, {"Motors": MOTORS, "Settings": edited(SETTINGS, C2="OFF", C3="-", C4=None, D4=None)}
    )
    jam = fleet.tables["relay"].columns["jam_trip_on"]
    assert jam.values.tolist() == [NO, NO, UNKNOWN, YES]
    assert jam.basis.tolist()[:2] == [1, 3]  # stated, assumed


def test_a_missing_base_is_named_for_its_rows_only(tmp_path):
    fleet = fleet_of_sheets(tmp_path, {"Motors": MOTORS, "Settings": edited(SETTINGS, B3=None)})
    assert np.isnan(values(fleet, "relay", "jam_trip_pickup_a")).tolist() == [False, True, False, False]
    assert any("full-load setting of the relay" in c.expected for c in complaints_at(fleet, "C3", "Settings"))


def test_settings_spread_over_two_workbooks_meet(tmp_path):
    write(tmp_path, {"Motors": MOTORS}, "a.xlsx")
    write(tmp_path, {"Export": [row[:3] for row in SETTINGS]}, "b.xlsx")
    write(tmp_path, {"Export": [[row[0], *row[3:]] for row in SETTINGS]}, "c.xlsx")
    fleet = read_fleet(tmp_path)
    assert len(fleet.tables["relay"]) == 4
    assert values(fleet, "relay", "jam_trip_pickup_a").tolist() == [200.0, 270.0, 322.0, 390.0]
    assert values(fleet, "relay", "jam_trip_delay_s").tolist() == [2.0] * 4


def test_every_reading_keeps_its_cell_and_its_words(tmp_path):
    fleet = fleet_of_sheets(tmp_path, {"Motors": MOTORS, "Settings": SETTINGS})
    kept = fleet.readings[(fleet.readings["quantity"] == "jam_trip_pickup_a") & (fleet.readings["key"] == "R-102")]
    reading = kept.iloc[0]
    assert (reading["written"], reading["unit"], reading["base"], reading["value"]) == ("2", "x", "full_load", 270.0)
    assert fleet.book.place(reading["cell"]) == ("site.xlsx", "Settings", "C3")
