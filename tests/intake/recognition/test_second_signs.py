"""Doubtful headers: read only where a unit, a magnitude or the cells themselves settle them; else asked."""

from __future__ import annotations

import pytest

from tests.intake.conftest import units, values

# P / (sqrt(3) V) is 158.8, 216.5, 259.8 A; the plates say 195, 265, 316 A: 1.23 times that, as for
# efficiency 0.94 and power factor 0.87; locked rotor 6.5 times full load
HEAD = ["Tag", "Rated Power (kW)", "Rated Voltage (V)"]
ROWS = [["P-1", 110, 400], ["P-2", 150, 400], ["P-3", 180, 400]]


def with_column(header, cells, *, above=()):
    return {"Motors": [*above, [*HEAD, header], *([*row, cell] for row, cell in zip(ROWS, cells, strict=True))]}


def asked(read):
    return [column.header for column in read.columns if column.how == "asked"]


@pytest.mark.parametrize("header", ["In", "Amps", "I", "Nominal current"])
def test_a_current_of_the_size_of_the_rating_is_the_full_load_current(gathered, header):
    read = gathered(with_column(header, [195, 265, 316]))
    assert values(read, "full_load_a") == {"P-1": 195, "P-2": 265, "P-3": 316}
    assert read.questions == []


def test_a_current_of_another_size_is_asked(gathered):
    read = gathered(with_column("In", [400, 630, 630]))
    assert "full_load_a" not in set(read.readings["quantity"])
    assert asked(read) == ["In"]


@pytest.mark.parametrize("header", ["Ir", "Ie"])
def test_a_dial_or_contactor_current_is_asked_though_it_is_of_the_right_size(gathered, header):
    read = gathered(with_column(header, [195, 265, 316]))
    assert values(read, "full_load_a") == {}
    assert asked(read) == [header]


@pytest.mark.parametrize("header", ["IS", "Is", "IA", "Inrush"])
def test_a_current_of_some_times_the_rating_is_the_locked_rotor_current(gathered, header):
    read = gathered(with_column(header, [1270, 1720, 2050]))
    assert values(read, "locked_rotor_a") == {"P-1": 1270, "P-2": 1720, "P-3": 2050}


def test_a_doubtful_header_beside_a_sure_one_is_left_unread_without_a_question(gathered):
    sheets = with_column("In", [195, 265, 316])
    sheets["Motors"][0].append("FLA")
    for row, amps in zip(sheets["Motors"][1:], (195, 265, 316), strict=True):
        row.append(amps)
    read = gathered(sheets)
    assert read.questions == []
    assert values(read, "full_load_a") == {"P-1": 195, "P-2": 265, "P-3": 316}


def test_a_unit_row_settles_what_a_header_means(gathered):
    rows = [["Tag", "FLA", "Volts", "LRT"], [None, "A", "V", "sec"], ["P-1", 195, 400, "12/18"]]
    read = gathered({"Motors": rows})
    assert values(read, "safe_stall_hot_s") == {"P-1": 12}
    assert values(read, "safe_stall_cold_s") == {"P-1": 18}
    rows[1][3] = "%"
    rows[2][3] = 180
    read = gathered({"Motors": rows})
    assert values(read, "locked_rotor_torque_ratio") == {"P-1": 180}


def test_units_in_the_cells_settle_what_a_header_means(gathered):
    read = gathered(with_column("Ground CT", ["50/1", "50/1", "50/1"]))
    assert values(read, "earth_ct_primary_a") == {"P-1": 50, "P-2": 50, "P-3": 50}
    rows = [["Tag", "FLA", "Volts", "Size"], ["P-1", 195, 400, "150 hp"], ["P-2", 200, 400, "150 hp"]]
    read = gathered({"Motors": rows})
    assert units(read, "rated_power_kw") == {("hp", "")}


def test_a_number_column_of_counting_items_is_no_tag(gathered):
    read = gathered({"Motors": [["Item", "FLA", "Volts", "kW"], [1, 195, 400, 110], [2, 265, 400, 150]], "More": [
        ["Tag", "FLA", "Volts", "kW"], ["P-9", 195, 400, 110]]})  # fmt: skip
    assert set(values(read, "motor")) == {"P-9"}


def test_item_is_the_tag_where_it_holds_tags(gathered):
    read = gathered({"Motors": [["Item", "FLA", "Volts", "kW"], ["P-1", 195, 400, 110], ["P-2", 265, 400, 150]]})
    assert set(values(read, "motor")) == {"P-1", "P-2"}


@pytest.mark.parametrize(
    ("header", "cells", "quantity", "expected"),
    [
        ("50", ["8 x FLA", "OFF", "9 x FLA"], "short_circuit_trip_pickup_a", {"P-1": 8, "P-2": "off", "P-3": 9}),
        ("50", ["Y", "N", "Y"], "short_circuit_trip_on", {"P-1": "Y", "P-2": "N", "P-3": "Y"}),
        ("48", ["12 s", "10 s", "-"], "start_timer_delay_s", {"P-1": 12, "P-2": 10, "P-3": "not_used"}),
        ("46", ["15 %", "20 %", "TBC"], "unbalance_trip_pickup_pct", {"P-1": 15, "P-2": 20, "P-3": "pending"}),
        ("38", ["95 °C", "90 °C", "203 °F"], "bearing_temperature_trip_c", {"P-1": 95, "P-2": 90, "P-3": 203}),
        ("I>>", [1560, 2120, 2528], "short_circuit_trip_pickup_a", {"P-1": 1560, "P-2": 2120, "P-3": 2528}),
        ("GF", ["5 A", "INST", "5 A"], "earth_fault_trip_pickup_a", {"P-1": 5, "P-2": "bad", "P-3": 5}),
    ],
)
def test_the_cells_below_an_element_tell_which_part_they_hold(gathered, header, cells, quantity, expected):
    assert values(gathered(with_column(header, cells)), quantity) == expected


def test_bare_numbers_below_an_element_are_asked(gathered):
    read = gathered(with_column("51LR", [300, 400, 500]))
    assert asked(read) == ["51LR"]
    assert not any(name.startswith("jam") for name in read.readings["quantity"])


def test_two_columns_for_one_quantity_are_asked_and_withheld(gathered):
    sheets = with_column("FLA", [195, 265, 316])
    sheets["Motors"][0].append("Rated Current")
    for row in sheets["Motors"][1:]:
        row.append(99)
    read = gathered(sheets)
    assert values(read, "full_load_a") == {}
    assert any("both claim" in question.about for question in read.questions)


def test_power_in_kw_and_hp_side_by_side_is_read_once(gathered):
    rows = [["Tag", "HP", "kW", "FLA", "Volts"], ["P-1", 150, 112, 195, 400], ["P-2", 200, 149, 265, 400]]
    read = gathered({"Motors": rows})
    assert read.questions == []
    assert values(read, "rated_power_kw") == {"P-1": 150, "P-2": 200}
    rows[2][2] = 110
    assert values(gathered({"Motors": rows}), "rated_power_kw") == {}


def test_a_near_miss_is_proposed_and_not_used(gathered):
    read = gathered(with_column("Full Load Curent", [195, 265, 316]))
    assert values(read, "full_load_a") == {}
    assert [c.how for c in read.columns if c.header == "Full Load Curent"] == ["proposed: full_load_a"]


def test_a_length_without_unit_is_asked_among_us_units_and_said_among_others(gathered):
    us = [["Tag", "HP", "FLA", "Volts", "Cable Length"], ["P-1", 150, 195, 460, 300]]
    read = gathered({"Motors": us})
    assert values(read, "cable_length_m") == {}
    assert asked(read) == ["Cable Length"]
    iec = [["Tag", "kW", "FLC", "Volts", "Cable Length"], ["P-1", 110, 195, 400, 300]]
    read = gathered({"Motors": iec})
    assert values(read, "cable_length_m") == {"P-1": 300}
    assert any("'Cable Length' has no unit" in complaint.found for complaint in read.complaints)


def test_letters_tell_a_code_from_a_design_where_only_one_has_them(gathered):
    read = gathered(with_column("Code", ["F", "G", "F"]))
    assert values(read, "locked_rotor_kva_letter") == {"P-1": "F", "P-2": "G", "P-3": "F"}
    read = gathered(with_column("Code", ["B", "B", "A"]))
    assert asked(read) == ["Code"]


def test_a_class_is_told_by_what_it_says(gathered):
    assert values(gathered(with_column("Class", ["F", "F/B", "H"])), "insulation_class")["P-2"] == "F/B"
    assert values(gathered(with_column("Class", ["IE3", "IE3", "IE2"])), "efficiency_class")["P-1"] == "IE3"
    assert values(gathered(with_column("Class", [10, 20, 10])), "overload_trip_class")["P-2"] == 20


def test_the_protection_class_of_an_enclosure_is_no_trip_class(gathered):
    read = gathered(with_column("Protection Class", ["IP55", "IP55", "IP23"]))
    assert "overload_trip_class" not in set(read.readings["quantity"])
