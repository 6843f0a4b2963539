"""What cannot be used is withheld with its place and its likely cause, and hides nothing else."""

from __future__ import annotations

import numpy as np
import pytest

from audit.intake.resolve import resolve


def column(fleet, subject, quantity):
    return fleet.tables[subject].columns[quantity].values


def motors(site, **cells):
    rows = [{"motor": "P-1", **cells}, {"motor": "P-2", "full_load_a": "100 A", "rated_power_kw": "55 kW"}]
    return site().add("motor", rows).fleet()


@pytest.mark.parametrize(
    ("quantity", "written", "cause"),
    [
        ("full_load_a", "100 kA", "A"),
        ("rated_power_kw", "55000 kW", "W"),
        ("safe_stall_hot_s", "12000 s", "ms"),
        ("rated_voltage_v", "6.6 V", "kV"),
        ("interrupting_rating_ka", "25000 kA", "A"),
        ("safe_stall_hot_s", "0.2 s", "min"),
    ],
)
def test_an_implausible_value_is_withheld_and_its_slip_is_named(site, quantity, written, cause):
    fleet = motors(site, **{quantity: written})
    assert np.isnan(column(fleet, "motor", quantity)[0])
    complaint = fleet.complaints[0]
    assert (complaint.quantity, complaint.key, complaint.cell, complaint.weight) == (quantity, "P-1", "B2", "withheld")
    assert complaint.advice.split("plausible as ")[1].split(":")[0].split(" or ")[0] == cause
    assert fleet.questions[0].answers == (f'unit = "{cause}"',)


def test_one_bad_row_never_hides_the_others(site):
    rows = [{"motor": f"P-{n}", "full_load_a": "100 A", "starting_method": "DOL", "must_run": "no"} for n in range(30)]
    rows[3]["full_load_a"] = "100 kA"
    rows[7]["starting_method"] = "by hand"
    rows[9]["must_run"] = "maybe"
    rows[11]["full_load_a"] = "#REF!"
    fleet = site().add("motor", rows).fleet()
    assert np.flatnonzero(np.isnan(column(fleet, "motor", "full_load_a"))).tolist() == [3, 11]
    assert np.flatnonzero(column(fleet, "motor", "starting_method") < 0).tolist() == [7]
    assert np.flatnonzero(column(fleet, "motor", "must_run") == 1).tolist() == [9]
    assert {complaint.key for complaint in fleet.complaints} == {"P-3", "P-7", "P-9"}  # #REF! is complained of before


def test_a_unit_of_something_else_is_complained_of_once_a_column(site):
    rows = [{"motor": f"P-{n}", "full_load_a": "100 kV"} for n in range(5)]
    fleet = site().add("motor", rows).fleet()
    assert np.isnan(column(fleet, "motor", "full_load_a")).all()
    assert len(fleet.complaints) == 1
    assert "4 more" in fleet.complaints[0].found


def test_a_word_that_is_no_choice_names_the_choices(site):
    fleet = motors(site, motor_kind="cagey")
    assert column(fleet, "motor", "motor_kind")[0] == -1
    assert fleet.complaints[0].expected == "cage, wound_rotor or synchronous"


@pytest.mark.parametrize(
    ("quantity", "written", "read"),
    [
        ("efficiency_pct", 0.945, 94.5),
        ("power_factor", 86, 0.86),
        ("service_factor", 115, 1.15),
        ("locked_rotor_ratio", 650, 6.5),
    ],
)
def test_fractions_and_per_cents_are_told_apart_where_only_one_is_possible(site, quantity, written, read):
    fleet = motors(site, **{quantity: written})
    assert column(fleet, "motor", quantity)[0] == pytest.approx(read)
    assert [complaint.weight for complaint in fleet.complaints] == ["remark"]


def test_a_count_is_never_taken_for_per_cent(site):
    fleet = motors(site, poles=400)
    assert np.isnan(column(fleet, "motor", "poles")[0])


@pytest.mark.parametrize(
    ("quantity", "written"),
    [
        ("thermal_pickup_a", 1.05),
        ("thermal_pickup_a", 105),
        ("short_circuit_trip_pickup_a", 8),
        ("jam_trip_pickup_a", 2),
        ("undercurrent_trip_pickup_a", 0.6),
        ("undervoltage_trip_pickup_v", 80),
        ("earth_fault_trip_pickup_a", 0.2),
        ("heating_time_constant_s", 35),
    ],
)
def test_bare_numbers_that_cannot_be_amperes_volts_or_seconds_are_asked(site, quantity, written):
    fleet = site().add("motor", [{"motor": "P-1", "full_load_a": "300 A", "rated_voltage_v": "6600 V"}])
    fleet = fleet.add("relay", [{"relay_tag": "P-1", quantity: written}]).fleet()
    assert np.isnan(column(fleet, "relay", quantity)[0])
    assert [str(written) in question.about for question in fleet.questions] == [True]
    assert fleet.complaints == ()


@pytest.mark.parametrize(
    ("quantity", "written"),
    [("thermal_pickup_a", 315), ("short_circuit_trip_pickup_a", 3000), ("undervoltage_trip_pickup_v", 5280),
     ("earth_fault_trip_pickup_a", 20), ("heating_time_constant_s", 1800), ("jam_trip_delay_s", 2)],
)  # fmt: skip
def test_bare_numbers_that_fit_are_in_the_quantitys_own_unit(site, quantity, written):
    fleet = site().add("motor", [{"motor": "P-1", "full_load_a": "300 A", "rated_voltage_v": "6600 V"}])
    fleet = fleet.add("relay", [{"relay_tag": "P-1", quantity: written}]).fleet()
    assert column(fleet, "relay", quantity)[0] == written
    assert fleet.questions == ()


def test_a_column_of_bare_numbers_speaks_one_language(site):
    # 6 A at a motor of 1.5 A could be amperes, but the other rows of the column are multiples
    loads = (1.5, 120, 210, 300)
    rows = [{"motor": f"P-{n}", "full_load_a": f"{load} A"} for n, load in enumerate(loads)]
    relays = [{"relay_tag": f"P-{n}", "short_circuit_trip_pickup_a": 6} for n in range(4)]
    fleet = site().add("motor", rows).add("relay", relays).fleet()
    assert np.isnan(column(fleet, "relay", "short_circuit_trip_pickup_a")).all()
    assert len(fleet.questions) == 1


def test_two_workbooks_that_disagree_withhold_the_value_and_name_both_cells(site):
    fleet = site().add("motor", [{"motor": "P-1"}])
    fleet = fleet.add("relay", [{"relay_tag": "P-1", "jam_trip_delay_s": "2 s"}], file="a.xlsx")
    fleet = fleet.add("relay", [{"relay_tag": "P-1", "jam_trip_delay_s": "3 s"}], file="b.xlsx").fleet()
    assert np.isnan(column(fleet, "relay", "jam_trip_delay_s")[0])
    assert fleet.tables["relay"].columns["jam_trip_on"].values.tolist() == [2]  # on either way
    complaint = fleet.complaints[0]
    assert complaint.file == "a.xlsx"
    assert "'3 s' in b.xlsx" in complaint.found


def test_one_value_in_two_units_is_no_disagreement(site):
    # 75 kW is sold as 100 hp, 74.6 kW
    us = {"motor": "P-1", "rated_power_kw": "100 hp", "full_load_a": "135 A", "service_factor": 1.15}
    iec = {"motor": "P-1", "rated_power_kw": "75 kW", "poles": 4, "frequency_hz": 50}
    fleet = site().add("motor", [us], sheet="a").add("motor", [iec], sheet="b").fleet()
    assert column(fleet, "motor", "rated_power_kw").tolist() == [75.0]
    assert fleet.complaints == ()
    iec["rated_power_kw"] = "90 kW"
    fleet = site().add("motor", [us], sheet="a").add("motor", [iec], sheet="b").fleet()
    assert np.isnan(column(fleet, "motor", "rated_power_kw")).tolist() == [True]


def test_inertia_without_a_unit_is_asked_under_wk2_and_a_quarter_under_gd2(site):
    gathered = site().add("motor", [{"motor": "P-1", "motor_inertia_kgm2": 40}]).gathered()
    readings = gathered.readings
    readings.loc[readings["quantity"] == "motor_inertia_kgm2", "header"] = "GD2"
    assert column(resolve(gathered), "motor", "motor_inertia_kgm2")[0] == 10.0
    readings.loc[readings["quantity"] == "motor_inertia_kgm2", "header"] = "WK2"
    fleet = resolve(gathered)
    assert np.isnan(column(fleet, "motor", "motor_inertia_kgm2")[0])
    assert 'unit = "lbft2"' in fleet.questions[0].answers


def test_a_known_word_within_a_free_text_is_taken_and_shown(site):
    fleet = motors(site, driven_machine="ID fan, boiler 2")
    machine = fleet.tables["motor"].columns["driven_machine"]
    assert machine.choices[machine.values[0]] == "fan"
    assert fleet.complaints[0].weight == "remark"
    assert column(motors(site, driven_machine="pump house fan"), "motor", "driven_machine")[0] == -1


def test_a_whole_column_of_slips_does_not_drown_the_reader(site):
    rows = [{"motor": f"P-{n}", "full_load_a": "100 kA"} for n in range(200)]
    fleet = site().add("motor", rows).fleet()
    assert np.isnan(column(fleet, "motor", "full_load_a")).all()
    assert len(fleet.complaints) == 21
    assert "(and 179 more of this column)" in fleet.complaints[-1].found  # 200 less 20 shown less the one named
    assert len(fleet.questions) == 1
