"""Settings in lists and blocks."""

from __future__ import annotations

import pytest

from tests.intake.conftest import units, values

MOTORS = [
    ["Tag", "kW", "Volts", "FLA", "Relay"],
    ["P-101", 110, 400, 195, "R-101"],
    ["P-102", 150, 400, 265, "R-102"],
    ["P-103", 37, 400, 67, None],
]


def read(gathered, rows, name="Settings"):
    return gathered({"Motors": MOTORS, name: rows})


def test_columns_of_a_list_may_stand_in_any_order(gathered):
    rows = [
        ["Units", "Present value", "Remarks", "Parameter", "IED"],
        ["x FLA", 8, "ok", "50 Pickup", "R-101"],
        ["ms", 50, "ok", "50 Time Delay", "R-101"],
    ]
    made = read(gathered, rows)
    assert values(made, "short_circuit_trip_pickup_a") == {"R-101": 8}
    assert units(made, "short_circuit_trip_pickup_a") == {("x", "full_load")}
    assert units(made, "short_circuit_trip_delay_s") == {("ms", "")}


def test_relay_and_function_are_carried_down_a_list(gathered):
    rows = [
        ["Relay", "Function", "Setting", "Value"],
        ["R-101", "51LR", "Pickup", "2.5 x FLA"],
        [None, None, "Delay", "2 s"],
        [None, "46", "Pickup", "15 %"],
        ["R-102", "46", "Pickup", "20 %"],
    ]
    made = read(gathered, rows)
    assert values(made, "jam_trip_delay_s") == {"R-101": 2}
    assert values(made, "unbalance_trip_pickup_pct") == {"R-101": 15, "R-102": 20}


def test_a_part_is_not_read_without_its_function(gathered):
    rows = [
        ["Relay", "Setting", "Value"],
        ["R-101", "Pickup", 8],
        ["R-101", "46 Pickup", "15 %"],
        ["R-101", "46 delay", 3],
    ]
    made = read(gathered, rows)
    pickups = [name for name in set(made.readings["quantity"]) if name.endswith("pickup_a")]
    assert pickups == []
    assert values(made, "unbalance_trip_pickup_pct") == {"R-101": 15}


def test_setting_groups_of_a_list_are_kept_apart(gathered):
    rows = [
        ["Relay", "Group", "Setting", "Value"],
        ["R-101", 1, "I>> set", "8 x FLA"],
        ["R-101", 2, "I>> set", "9 x FLA"],
        ["R-101", 1, "46 delay", "3 s"],
    ]
    made = read(gathered, rows).readings.query("quantity == 'short_circuit_trip_pickup_a'")
    assert dict(zip(made["group"], made["number"], strict=True)) == {"1": 8, "2": 9}
    assert made["record"].nunique() == 2


def test_setting_groups_in_headers_are_kept_apart(gathered):
    rows = [["Relay", "CT Primary", "50 PU Group 1 (A)", "50 PU Group 2 (A)"], ["R-101", 200, 1560, 1750]]
    made = read(gathered, rows).readings
    pickups = made.query("quantity == 'short_circuit_trip_pickup_a'")
    assert dict(zip(pickups["group"], pickups["number"], strict=True)) == {"1": 1560, "2": 1750}
    tagged = made[made["record"].isin(pickups["record"]) & (made["quantity"] == "relay_tag")]
    assert tagged["text"].tolist() == ["R-101", "R-101"]


def test_a_unit_that_does_not_fit_is_complained_about(gathered):
    rows = [["Relay", "Setting", "Value", "Unit"], ["R-101", "46 Pickup", 15, "kV"], ["R-101", "46 Delay", 3, "s"]]
    made = read(gathered, rows)
    assert values(made, "unbalance_trip_pickup_pct") == {}
    assert any("'kV'" in complaint.found and complaint.cell == "C2" for complaint in made.complaints)


def test_what_is_set_now_wins_over_what_was_found(gathered):
    rows = [
        ["Relay", "Setting", "As found", "As left"],
        ["R-101", "46 Pickup", "30 %", "15 %"],
        ["R-101", "46 Delay", "3 s", "3 s"],
    ]
    made = read(gathered, rows)
    assert values(made, "unbalance_trip_pickup_pct") == {"R-101": 15}
    assert any("'As left' is read" in complaint.found for complaint in made.complaints)


BLOCK = [["49 Pickup", "1.05 x FLA"], ["I>> set", "8 x FLA"], ["I>> delay", "50 ms"]]


@pytest.mark.parametrize(
    ("name", "above"),
    [
        ("R-101", []),
        ("Sheet1", [["Relay", "R-101"]]),
        ("Sheet1", [["Relay: R-101"]]),
        ("Sheet1", [["Settings of relay R-101 (P-101)"], []]),
        ("Sheet1", [["Works A"], ["Relay Tag", None, "R-101"], []]),
    ],
)
def test_the_relay_of_a_block_is_named_in_many_ways(gathered, name, above):
    made = read(gathered, [*above, *BLOCK], name)
    assert values(made, "short_circuit_trip_pickup_a") == {"R-101": 8}


def test_a_block_may_name_its_motor_instead(gathered):
    made = read(gathered, [["Motor Tag", "P-103"], *BLOCK], "Sheet1").readings
    record = made.query("quantity == 'short_circuit_trip_pickup_a'")["record"].item()
    named = made[(made["record"] == record) & (made["quantity"] == "motor")]
    assert named["text"].tolist() == ["P-103"]


def test_blocks_below_each_other_each_have_their_relay(gathered):
    made = read(gathered, [["Relay", "R-101"], *BLOCK, [], ["Relay", "R-102"], ["I>> set", "9 x FLA"]])
    assert values(made, "short_circuit_trip_pickup_a") == {"R-101": 8, "R-102": 9}


def test_headings_of_functions_name_the_settings_below(gathered):
    rows = [
        ["R-101"],
        ["50 SHORT CIRCUIT", None, None, "51G Ground fault"],
        ["Pickup", 8, "x FLA", "Pickup", 5, "A"],
        ["Delay", 50, "ms", "Delay", 0.2, "s"],
        ["Mech Jam", None, None, "Unbalance"],
        ["Pickup", 2.5, "x FLA", "Pickup", 15, "%"],
        ["Delay", 2, "s", "Delay", 5, "s"],
    ]
    made = read(gathered, rows, "Sheet1")
    assert values(made, "short_circuit_trip_pickup_a") == {"R-101": 8}
    assert values(made, "earth_fault_trip_delay_s") == {"R-101": 0.2}
    assert values(made, "jam_trip_delay_s") == {"R-101": 2}
    assert values(made, "unbalance_trip_pickup_pct") == {"R-101": 15}
    assert units(made, "short_circuit_trip_delay_s") == {("ms", "")}


def test_the_group_of_a_block_is_named_beside_its_label(gathered):
    made = read(gathered, [["Relay", "R-101"], ["Setting Group", 2], *BLOCK], "Sheet1").readings
    assert set(made.query("quantity == 'short_circuit_trip_pickup_a'")["group"]) == {"2"}


def test_off_not_used_zero_pending_and_blank_are_five_things(gathered):
    rows = [
        ["Relay", "51LR PU (x FLA)", "51LR TD (s)"],
        ["R-101", "OFF", "-"],
        ["R-102", "TBC", 0],
        ["R-103", None, 2],
        ["R-104", 0, 2],
        ["R-105", "disabled", "N/A"],
    ]
    made = read(gathered, rows)
    assert values(made, "jam_trip_pickup_a") == {"R-101": "off", "R-102": "pending", "R-104": "bad", "R-105": "off"}
    assert values(made, "jam_trip_delay_s") == {
        "R-101": "not_used",
        "R-102": 0,
        "R-103": 2,
        "R-104": 2,
        "R-105": "not_used",
    }
    assert [question.cell for question in made.questions] == ["B5"]


def test_a_table_of_outputs_says_what_each_element_opens(gathered):
    rows = [
        ["Relay", "Element", "Trips"],
        ["R-101", "50", "Breaker"],
        ["R-101", "49 Thermal overload", "Contactor"],
        ["R-102", "51G", "Contactor"],
    ]
    made = read(gathered, rows, "Outputs")
    assert values(made, "short_circuit_opens") == {"R-101": "Breaker"}
    assert values(made, "thermal_opens") == {"R-101": "Contactor"}
    assert values(made, "earth_fault_opens") == {"R-102": "Contactor"}


ACROSS = [
    ["Settings as issued"],
    ["Setting", "Unit", "R-101", "R-102", "R-103"],
    ["CT primary", "A", 200, 300, 100],
    ["50 SHORT CIRCUIT"],
    ["Pickup", "x FLA", 8, 9, "OFF"],
    ["Delay", "ms", 50, 60, "-"],
    ["46 Pickup", "%", 15, None, 20],
]


def test_settings_down_and_relays_across_are_read_for_each_relay(gathered):
    made = read(gathered, ACROSS)
    assert values(made, "short_circuit_trip_pickup_a") == {"R-101": 8, "R-102": 9, "R-103": "off"}
    assert values(made, "unbalance_trip_pickup_pct") == {"R-101": 15, "R-103": 20}
    assert values(made, "relay_ct_primary_a") == {"R-101": 200, "R-102": 300, "R-103": 100}
    assert units(made, "short_circuit_trip_delay_s") >= {("ms", "")}


def test_a_column_of_ranges_beside_the_values_is_no_relay(gathered):
    rows = [["Name", "Set", "Range"], *([name, value, "0.1 to 99"] for name, value in BLOCK)]
    made = read(gathered, rows, "R-102")
    assert values(made, "short_circuit_trip_pickup_a") == {"R-102": 8}


@pytest.mark.parametrize(
    ("name", "above"), [("R-102", []), ("Sheet1", [["Relay:", "R-102"], []]), ("Sheet1", [["Relay R-102, as left"]])]
)
def test_a_list_without_a_column_of_relays_is_that_of_the_sheet(gathered, name, above):
    rows = [
        *above,
        ["Function", "Setting", "Value", "Unit"],
        ["50", "Pickup", 8, "x FLA"],
        ["50", "Delay", 50, "ms"],
        ["46", "Pickup", 15, "%"],
    ]
    made = read(gathered, rows, name)
    assert values(made, "short_circuit_trip_pickup_a") == {"R-102": 8}
    assert values(made, "unbalance_trip_pickup_pct") == {"R-102": 15}
