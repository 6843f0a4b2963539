"""Curves given as points and logs of changes."""

from __future__ import annotations

from tests.intake.conftest import values

MOTORS = [
    ["Tag", "kW", "Volts", "FLA (A)", "Fuse", "MCC"],
    ["P-101", 110, 400, 200, "F 400", "MCC-1"],
    ["P-102", 150, 400, 265, "F 400", "MCC-1"],
]


def test_points_of_a_thermal_limit_become_the_curve_of_their_motor(gathered):
    points = [
        ["Motor", "Current (x FLA)", "Time (s)", "Hot/Cold"],
        ["P-101", 3, 60, "hot"],
        ["P-101", 2, 150, "hot"],
        ["P-101", 3, 90, "cold"],
    ]
    read = gathered({"Motors": MOTORS, "Limits": points})
    # 2 and 3 times 200 A
    assert values(read, "hot_limit_curve") == {"P-101": "400 A: 150 s; 600 A: 60 s"}
    assert values(read, "cold_limit_curve") == {"P-101": "600 A: 90 s"}


def test_points_of_a_fuse_become_the_curves_of_all_motors_behind_it(gathered):
    points = [
        ["Fuse", "Current (kA)", "Melting time (s)", "Total clearing time (ms)"],
        ["F 400", 1.2, 40, 45000],
        ["F 400", 6, 0.01, 20],
    ]
    read = gathered({"Motors": MOTORS, "Fuses": points})
    assert values(read, "fuse_melting_curve") == dict.fromkeys(["P-101", "P-102"], "1200 A: 40 s; 6000 A: 0.01 s")
    assert values(read, "fuse_clearing_curve")["P-102"] == "1200 A: 45 s; 6000 A: 0.02 s"


def test_points_of_an_unknown_motor_are_complained_about(gathered):
    points = [["Motor", "Current (A)", "Hot (s)"], ["P-999", 600, 60], ["P-999", 900, 20]]
    read = gathered({"Motors": MOTORS, "Limits": points})
    assert any("p-999" in complaint.found for complaint in read.complaints)


def test_a_change_log_gives_the_last_day_of_each_kind_of_change(gathered):
    log = [
        ["Date", "Tag", "What changed"],
        ["2025-02-03", "P-101", "Motor rewound"],
        ["2026-02-03", "P-101", "Motor replaced by spare"],
        ["2026-01-05", "P-102", "CTs changed to 300/5"],
        ["2026-01-06", "MCC-1", "Transformer replaced"],
        ["2026-01-07", "P-102", "Paint"],
    ]
    buses = [["Bus", "System Voltage (V)", "Fault Max (kA)"], ["MCC-1", 400, 30]]
    read = gathered({"Motors": MOTORS, "Buses": buses, "Log": log})
    # days since 1 January 1970: 3 February 2026 is 20487, 5 January 2026 is 20458
    assert values(read, "motor_replaced_date") == {"P-101": 20487}
    assert values(read, "ct_changed_date") == {"P-102": 20458}
    assert values(read, "supply_changed_date") == {"MCC-1": 20459}
