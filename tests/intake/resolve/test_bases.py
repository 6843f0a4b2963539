"""Multiples, per cents and secondary values become primary ones; what they rest on is worked out by hand."""

from __future__ import annotations

import numpy as np
import pytest

MOTOR = {
    "motor": "P-1", "relay": "R-1", "bus": "B-1", "full_load_a": "100 A", "rated_voltage_v": "6.6 kV",
    "ct_primary_a": "150 A", "ct_secondary_a": "5 A", "vt_primary_v": "6600 V", "vt_secondary_v": "110 V",
    "vt_connection": "line-to-line", "earth_ct_primary_a": "50 A", "earth_ct_secondary_a": "1 A",
}  # fmt: skip
RELAY = {
    "relay_tag": "R-1", "relay_full_load_a": "102 A", "relay_ct_primary_a": "200 A", "relay_ct_secondary_a": "5 A",
    "relay_vt_primary_v": "6900 V", "relay_vt_secondary_v": "115 V", "relay_earth_source": "core balance",
    "relay_earth_ct_primary_a": "60 A", "relay_earth_ct_secondary_a": "1 A",
}  # fmt: skip
BUS = {"bus_name": "B-1", "bus_nominal_v": "7200 V", "bus_frequency_hz": "60 Hz"}


def value(fleet, quantity, subject="relay"):
    return fleet.tables[subject].columns[quantity].values[0]


def plant(site, motor=None, relay=None, bus=None):
    return (
        site()
        .add("motor", [{**MOTOR, **(motor or {})}])
        .add("relay", [{**RELAY, **(relay or {})}])
        .add("bus", [{**BUS, **(bus or {})}])
        .fleet()
    )


@pytest.mark.parametrize(
    ("quantity", "written", "primary"),
    [
        ("jam_trip_pickup_a", "2 x FLA", 204.0),  # 2 x 102, the relay's own full load
        ("jam_trip_pickup_a", "200 % FLA", 204.0),
        ("jam_trip_pickup_a", "1.2 x CT", 240.0),  # 1.2 x 200, the CT set in the relay
        ("jam_trip_pickup_a", "120 % CT", 240.0),
        ("jam_trip_pickup_a", "8 A sec", 240.0),  # 8 x 150 / 5, the fitted CT
        ("jam_trip_pickup_a", "240 A pri", 240.0),
        ("jam_trip_pickup_a", "0.24 kA", 240.0),
        ("relay_full_load_a", "0.51 x CT", 102.0),  # 0.51 x 200
        ("relay_full_load_a", "3.4 A sec", 102.0),  # 3.4 x 150 / 5
        ("earth_fault_trip_pickup_a", "10 % CBCT", 6.0),  # 0.1 x 60
        ("earth_fault_trip_pickup_a", "0.1 x CT", 6.0),  # a core-balance source: the earth-fault CT is meant
        ("earth_fault_trip_pickup_a", "0.12 A sec", 6.0),  # 0.12 x 50 / 1
        ("earth_fault_trip_pickup_a", "120 mA sec", 6.0),
        ("undervoltage_trip_pickup_v", "80 % motor Un", 5280.0),  # 0.8 x 6600
        ("undervoltage_trip_pickup_v", "0.8 pu of system voltage", 5760.0),  # 0.8 x 7200
        ("undervoltage_trip_pickup_v", "80 % VT", 5520.0),  # 0.8 x 6900
        ("undervoltage_trip_pickup_v", "88 V sec", 5280.0),  # 88 x 6600 / 110
        ("jam_trip_delay_s", "30 cyc", 0.5),  # 30 / 60 Hz
        ("unbalance_trip_pickup_pct", "0.15 x FLA", 15.0),
        ("unbalance_trip_pickup_pct", "15 % CT", 15.0 * 200 / 102),
    ],
)
def test_settings_become_primary_values(site, quantity, written, primary):
    assert value(plant(site, relay={quantity: written}), quantity) == pytest.approx(primary, rel=1e-9)


@pytest.mark.parametrize(
    ("subject", "quantity", "written", "own"),
    [
        ("motor", "locked_rotor_a", "6 x FLA", 600.0),  # the motor's full load, not the relay's
        ("motor", "locked_rotor_a", "650 %", 650.0),
        ("motor", "lowest_start_voltage_pct", "5280 V", 80.0),
        ("motor", "lowest_start_voltage_pct", "75 % of system voltage", 75.0 * 7200 / 6600),
        ("bus", "fault_max_ka", "250 MVA", 20.047),  # 250 / (sqrt 3 x 7.2 kV)
    ],
)
def test_data_become_values_of_the_table(site, subject, quantity, written, own):
    fleet = plant(site, **{subject: {quantity: written}})
    assert value(fleet, quantity, subject) == pytest.approx(own, rel=1e-4)


def test_star_connected_voltage_transformers_count_from_line_to_neutral(site):
    # 50.8 V line to neutral x 60 x sqrt 3 = 5279 V line to line
    fleet = plant(site, motor={"vt_connection": "star"}, relay={"undervoltage_trip_pickup_v": "50.8 V sec"})
    assert value(fleet, "undervoltage_trip_pickup_v") == pytest.approx(50.8 * 60 * 3**0.5)


def test_turns_through_a_window_type_transformer_divide_its_primary(site):
    # 50:5 with two turns is a 25:5
    fleet = plant(
        site,
        motor={"ct_primary_a": "50 A", "ct_turns": 2, "full_load_a": "20 A"},
        relay={"jam_trip_pickup_a": "8 A sec", "relay_full_load_a": "20 A"},
    )
    assert value(fleet, "jam_trip_pickup_a") == pytest.approx(40.0)


def test_secondary_values_go_by_the_relays_ratio_where_the_fitted_one_is_not_known(site):
    fleet = plant(site, motor={"ct_primary_a": None, "ct_secondary_a": None}, relay={"jam_trip_pickup_a": "6 A sec"})
    assert value(fleet, "jam_trip_pickup_a") == pytest.approx(240.0)  # 6 x 200 / 5


def test_residual_earth_fault_settings_go_by_the_phase_transformers(site):
    relay = {"relay_earth_source": "residual", "earth_fault_trip_pickup_a": "0.1 x CT", "jam_trip_pickup_a": "1 A sec"}
    assert value(plant(site, relay=relay), "earth_fault_trip_pickup_a") == pytest.approx(20.0)  # 0.1 x 200
    relay["earth_fault_trip_pickup_a"] = "0.5 A sec"
    assert value(plant(site, relay=relay), "earth_fault_trip_pickup_a") == pytest.approx(15.0)  # 0.5 x 150 / 5


def test_which_transformer_an_earth_fault_multiple_means_is_asked_where_the_source_is_not_known(site):
    fleet = plant(site, relay={"relay_earth_source": None, "earth_fault_trip_pickup_a": "0.1 x CT"})
    assert np.isnan(value(fleet, "earth_fault_trip_pickup_a"))
    assert 'base = "earth_ct"' in fleet.questions[0].answers


def test_a_magnetic_trip_in_multiples_of_full_load_means_the_motors(site):
    fleet = plant(site, relay={"magnetic_trip_a": "11 x FLA"})
    assert value(fleet, "magnetic_trip_a") == pytest.approx(1100.0)


@pytest.mark.parametrize(
    ("written", "gone", "named"),
    [
        ("2 x FLA", {"relay_full_load_a": None}, "full-load setting of the relay"),
        ("1.2 x CT", {"relay_ct_primary_a": None}, "CT primary set in the relay"),
    ],
)
def test_a_missing_base_is_named_and_the_setting_is_missing(site, written, gone, named):
    fleet = plant(site, relay={**gone, "jam_trip_pickup_a": written})
    assert np.isnan(value(fleet, "jam_trip_pickup_a"))
    complaint = next(c for c in fleet.complaints if c.quantity == "jam_trip_pickup_a")
    assert named in complaint.expected
    assert complaint.cell == next(iter(cells_of(fleet, "jam_trip_pickup_a")))


def test_cycles_without_a_frequency_are_missing(site):
    fleet = plant(site, relay={"jam_trip_delay_s": "30 cyc"}, bus={"bus_frequency_hz": None})
    assert np.isnan(value(fleet, "jam_trip_delay_s"))
    assert any("frequency" in complaint.expected for complaint in fleet.complaints)


@pytest.mark.parametrize(
    ("quantity", "written", "answers"),
    [("jam_trip_pickup_a", "2 x In", 2), ("undervoltage_trip_pickup_v", "80 %", 3), ("jam_trip_pickup_a", "200 %", 2)],
)
def test_a_multiple_of_an_unnamed_base_is_asked_and_withheld(site, quantity, written, answers):
    fleet = plant(site, relay={quantity: written})
    assert np.isnan(value(fleet, quantity))
    assert len(fleet.questions) == 1
    assert len(fleet.questions[0].answers) == answers
    assert written in fleet.questions[0].about


def test_one_question_serves_a_whole_column(site):
    relays = [{**RELAY, "relay_tag": f"R-{number}", "jam_trip_pickup_a": "2 x In"} for number in range(1, 40)]
    fleet = site().add("motor", [MOTOR]).add("relay", relays).fleet()
    assert len(fleet.questions) == 1
    assert "38 more" in fleet.questions[0].about


def cells_of(fleet, quantity):
    rows = fleet.readings[fleet.readings["quantity"] == quantity]
    return {fleet.book.place(cell).cell for cell in rows["cell"]}
