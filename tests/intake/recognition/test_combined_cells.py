"""Cells that hold several quantities."""

from __future__ import annotations

import pytest

from tests.intake.conftest import units, values

HEAD = ["Tag", "kW", "Volts", "FLA"]


def column(gathered, header, *cells):
    rows = [[f"P-{i}", 110, 400, 195, cell] for i, cell in enumerate(cells, 1)]
    return gathered({"Motors": [[*HEAD, header], *rows]})


@pytest.mark.parametrize("cell", ["200/5", "200:5", "200-5A", "200 / 5 A", "200/5/5"])
def test_a_ct_ratio_gives_both_rated_currents(gathered, cell):
    read = column(gathered, "CT Ratio", cell)
    assert values(read, "ct_primary_a") == {"P-1": 200}
    assert values(read, "ct_secondary_a") == {"P-1": 5}


def test_a_ct_of_several_turns_or_taps_is_read_as_it_is_connected(gathered):
    read = column(gathered, "CT Ratio", "50:5 (2T)", "600:5 MR @300")
    assert values(read, "ct_primary_a") == {"P-1": 50, "P-2": 300}
    assert values(read, "ct_turns") == {"P-1": 2}


def test_a_ratio_to_one_with_a_colon_is_asked(gathered):
    read = column(gathered, "CTR", "40:1", "200/1")
    assert values(read, "ct_primary_a") == {"P-1": "bad", "P-2": 200}
    assert any("'40:1'" in question.about for question in read.questions)


@pytest.mark.parametrize(
    ("cell", "primary", "secondary"),
    [("4200:120", 4200, 120), ("6600/110", 6600, 110), ("6600/√3:110/√3", 6600, 110)],
)
def test_a_vt_ratio_gives_both_rated_voltages(gathered, cell, primary, secondary):
    read = column(gathered, "PT Ratio", cell)
    assert values(read, "vt_primary_v") == {"P-1": primary}
    assert values(read, "vt_secondary_v") == {"P-1": secondary}


def test_a_bare_ratio_of_turns_of_a_vt_is_asked(gathered):
    read = column(gathered, "PT Ratio", "35:1")
    assert values(read, "vt_primary_v") == {"P-1": "bad"}
    assert len(read.questions) == 1


@pytest.mark.parametrize("cell", ["12/18", "18/12", "12 s H / 18 s C", "18 C / 12 H"])
def test_of_two_stall_times_the_smaller_is_the_hot_one(gathered, cell):
    read = column(gathered, "Safe Stall Time (s)", cell)
    assert values(read, "safe_stall_hot_s") == {"P-1": 12}
    assert values(read, "safe_stall_cold_s") == {"P-1": 18}


def test_one_stall_time_that_says_neither_hot_nor_cold_is_asked(gathered):
    read = column(gathered, "Locked Rotor Time (s)", 15)
    assert values(read, "safe_stall_hot_s") == {"P-1": "bad"}
    assert len(read.questions) == 1


def test_a_stall_time_at_reduced_voltage_is_not_taken_for_one_at_rated_voltage(gathered):
    read = column(gathered, "Safe Stall Hot (s)", "23@80%V", "15@100%V")
    assert values(read, "safe_stall_hot_s") == {"P-1": "bad", "P-2": 15}


@pytest.mark.parametrize("cell", ["3/2", "3 cold 2 hot", "3C/2H", "2H/3C"])
def test_of_two_numbers_of_starts_the_greater_is_from_cold(gathered, cell):
    read = column(gathered, "Starts/Hr", cell)
    assert values(read, "stated_cold_starts") == {"P-1": 3}
    assert values(read, "stated_hot_starts") == {"P-1": 2}
    assert values(read, "stated_starts_per_hour") == {}


def test_alarm_and_trip_in_one_cell_are_parted(gathered):
    read = column(gathered, "Brg Temp Alm/Trip (C)", "90/100", "OFF")
    assert values(read, "bearing_temperature_alarm_c") == {"P-1": 90, "P-2": "off"}
    assert values(read, "bearing_temperature_trip_c") == {"P-1": 100, "P-2": "off"}


def test_a_dial_range_gives_its_ends(gathered):
    read = column(gathered, "OL Range (A)", "63-90 A")
    assert values(read, "overload_range_low_a") == {"P-1": 63}
    assert values(read, "overload_range_high_a") == {"P-1": 90}


@pytest.mark.parametrize(
    ("header", "cell", "mm2", "runs"),
    [
        ("Cable", "3C x 70", 70, None),
        ("Cable Size", "2x(3x240)", 240, 2),
        ("mm2", 95, 95, None),
        ("Cable (AWG)", "2/0", 67.4, None),  # ASTM B258: 2/0 AWG is 67.4 mm2
        ("kcmil", 250, 126.7, None),  # 250 kcmil is 126.7 mm2
    ],
)
def test_cables_are_read_with_their_parallel_runs(gathered, header, cell, mm2, runs):
    read = column(gathered, header, cell)
    assert values(read, "cable_size_mm2")["P-1"] == pytest.approx(mm2, abs=0.05)
    assert values(read, "cable_runs") == ({"P-1": runs} if runs else {})


def test_two_powers_or_two_currents_are_not_guessed_at(gathered):
    read = column(gathered, "Rated Speed (rpm)", "1485/990")
    assert values(read, "rated_speed_rpm") == {"P-1": "bad"}


def test_gd2_is_four_times_the_inertia(gathered):
    read = column(gathered, "GD2 motor (kg m2)", 8)
    assert units(read, "motor_inertia_kgm2") == {("gd2", "")}


def test_a_plate_of_two_voltages_is_settled_by_the_bus(gathered):
    motors = [
        ["Tag", "kW", "Volts", "FLA", "LRA", "MCC"],
        ["P-1", 37, "400/690", "67.5/39", "6.5 x FLA", "MCC-1"],
        ["P-2", 37, "230/400", "117/67.5", "439/760", "MCC-1"],
        ["P-3", 37, "230/460", "124/62", 400, "MCC-9"],
    ]
    buses = [["Bus", "System Voltage (kV)", "Fault Max (kA)"], ["MCC-1", 0.4, 30]]
    read = gathered({"Motors": motors, "Buses": buses})
    assert values(read, "rated_voltage_v") == {"P-1": 400, "P-2": 400, "P-3": "bad"}
    assert values(read, "full_load_a") == {"P-1": 67.5, "P-2": 67.5, "P-3": "bad"}
    assert values(read, "locked_rotor_a")["P-2"] == 439
    withheld = [c.cell for c in read.complaints if c.weight == "withheld"]
    assert withheld == ["C4", "D4"]
