"""Which row each record speaks of: joins, windings, duplicates, several sheets, setting groups."""

from __future__ import annotations

import numpy as np
import pytest

from audit.fleet.column import NO, UNKNOWN, YES


def column(fleet, subject, quantity):
    return fleet.tables[subject].columns[quantity].values.tolist()


def test_tags_join_trimmed_and_case_folded_without_a_word(site):
    fleet = site().add("motor", [{"motor": "P-101 ", "relay": "r-1"}]).add("relay", [{"relay_tag": "R-1"}])
    fleet = fleet.add("start", [{"start_motor": "p-101", "start_time_s": 4}]).fleet()
    assert fleet.links["motor", "relay"].tolist() == [0]
    assert fleet.links["start", "motor"].tolist() == [0]
    assert fleet.complaints == ()


def test_a_folded_join_is_made_where_unique_and_shown(site):
    fleet = site().add("motor", [{"motor": "CV 101 A"}]).add("start", [{"start_motor": "cv-101a", "start_time_s": 4}])
    fleet = fleet.fleet()
    assert fleet.links["start", "motor"].tolist() == [0]
    assert [(c.weight, "'CV 101 A'" in c.found) for c in fleet.complaints] == [("remark", True)]


def test_a_folded_name_of_two_motors_is_asked_and_not_joined(site):
    fleet = site().add("motor", [{"motor": "P-10-1"}, {"motor": "P-101"}])
    fleet = fleet.add("start", [{"start_motor": "P101", "start_time_s": 4}]).fleet()
    assert fleet.links["start", "motor"].tolist() == [-1]
    assert sum("'P101'" in question.about for question in fleet.questions) == 1


def test_tags_of_one_list_that_are_equal_only_after_folding_are_kept_apart_and_asked(site):
    fleet = site().add("motor", [{"motor": "P-101", "full_load_a": 5}, {"motor": "P 101", "full_load_a": 7}]).fleet()
    assert fleet.tables["motor"].keys == ("P-101", "P 101")
    assert len(fleet.questions) == 1


def test_a_tag_twice_keeps_both_rows_and_says_so(site):
    fleet = site().add("motor", [{"motor": "P-1", "full_load_a": 5}, {"motor": "p-1", "full_load_a": 7}])
    fleet = fleet.add("start", [{"start_motor": "P-1", "start_time_s": 4}]).fleet()
    assert fleet.tables["motor"].keys == ("P-1", "p-1 (2)")
    assert column(fleet, "motor", "full_load_a") == [5.0, 7.0]
    assert fleet.links["start", "motor"].tolist() == [0]
    assert [c.weight for c in fleet.complaints] == ["remark"]


@pytest.mark.parametrize(
    ("differing", "keys"),
    [
        ({"winding": ("low", "high")}, ("P-1 (low)", "P-1 (high)")),
        ({"rated_speed_rpm": (735, 1480)}, ("P-1 (735 r/min)", "P-1 (1480 r/min)")),
        ({"poles": (8, 4)}, ("P-1 (8 poles)", "P-1 (4 poles)")),
    ],
)
def test_rows_that_differ_in_winding_or_speed_are_windings(site, differing, keys):
    name, values = next(iter(differing.items()))
    rows = [{"motor": "P-1", name: value, "full_load_a": 5} for value in values]
    fleet = site().add("motor", rows).add("start", [{"start_motor": "P-1", "start_time_s": 4}]).fleet()
    assert fleet.tables["motor"].keys == keys
    assert [text in key for text, key in zip(column(fleet, "motor", "winding"), keys, strict=True)] == [True, True]
    assert fleet.complaints == ()
    assert fleet.links["start", "motor"].tolist() == [-1]  # which winding was started is asked
    assert len(fleet.questions) == 1


def test_sheets_that_complete_each_other_make_one_motor(site):
    fleet = (
        site()
        .add("motor", [{"motor": "P-1", "rated_power_kw": 55}, {"motor": "P-2", "rated_power_kw": 75}], sheet="list")
        .add(
            "motor", [{"motor": "P-2", "safe_stall_hot_s": 12}, {"motor": "p 1", "safe_stall_hot_s": 15}], sheet="data"
        )
        .fleet()
    )
    assert fleet.tables["motor"].keys == ("P-1", "P-2")
    assert column(fleet, "motor", "safe_stall_hot_s") == [15.0, 12.0]
    assert [c.weight for c in fleet.complaints] == ["remark"]  # the folded join of 'p 1'


def test_lists_of_areas_are_one_list_and_a_tag_in_two_of_them_is_a_duplicate(site):
    rows = [{"motor": "P-1", "rated_power_kw": 55, "full_load_a": 100}]
    fleet = site().add("motor", rows, sheet="area 1").add("motor", rows, sheet="area 2").fleet()
    assert fleet.tables["motor"].keys == ("P-1", "P-1 (2)")


def test_motors_of_one_phase_are_left_out_and_said(site):
    fleet = site().add("motor", [{"motor": "P-1", "phases": "1PH"}, {"motor": "P-2", "phases": 3}]).fleet()
    assert fleet.tables["motor"].keys == ("P-2",)
    assert fleet.complaints[0].key == "P-1"


def test_a_row_without_a_tag_is_complained_of_and_hides_no_other(site):
    fleet = site().add("motor", [{"full_load_a": 5}, {"motor": "P-2", "full_load_a": 7}]).fleet()
    assert fleet.tables["motor"].keys == ("P-2",)
    assert [c.cell for c in fleet.complaints] == ["A2"]


def test_settings_in_motor_rows_belong_to_the_relay_that_the_row_names(site):
    motor = {"motor": "P-1", "relay": "R-1", "full_load_a": 100, "jam_trip_pickup_a": "200 A"}
    fleet = site().add("motor", [motor]).add("relay", [{"relay_tag": "R-1", "jam_trip_delay_s": "2 s"}]).fleet()
    assert fleet.tables["relay"].keys == ("R-1",)
    assert column(fleet, "relay", "jam_trip_pickup_a") == [200.0]
    assert column(fleet, "relay", "jam_trip_delay_s") == [2.0]


def test_settings_in_motor_rows_that_name_no_relay_get_one_of_the_motors_name(site):
    fleet = site().add("motor", [{"motor": "P-1", "jam_trip_delay_s": "2 s"}, {"motor": "P-2"}]).fleet()
    assert fleet.tables["relay"].keys == ("P-1",)
    assert fleet.links["motor", "relay"].tolist() == [0, -1]
    assert fleet.links["relay", "motor"].tolist() == [0]
    assert column(fleet, "motor", "relay") == [None, None]


def test_a_relay_type_under_the_heading_relay_does_not_mix_the_motors_settings(site):
    rows = [{"motor": f"P-{n}", "relay": "type 7", "jam_trip_delay_s": f"{n} s"} for n in (1, 2, 3)]
    fleet = site().add("motor", rows).fleet()
    assert column(fleet, "relay", "jam_trip_delay_s") == [1.0, 2.0, 3.0]
    assert fleet.links["motor", "relay"].tolist() == [0, 1, 2]
    assert any("type 7" in c.found for c in fleet.complaints)


def test_relays_find_their_motor_by_its_tag_or_by_naming_it(site):
    fleet = site().add("motor", [{"motor": "P-1"}, {"motor": "P-2"}, {"motor": "P-3", "cubicle": "K05"}])
    relays = [{"relay_tag": "P-1"}, {"relay_tag": "R-7", "motor": "P-2"}, {"relay_tag": "K05"}, {"relay_tag": "R-9"}]
    fleet = fleet.add("relay", relays).fleet()
    assert fleet.links["motor", "relay"].tolist() == [0, 1, 2]
    assert fleet.links["relay", "motor"].tolist() == [0, 1, 2, -1]
    assert [c.weight for c in fleet.complaints] == ["remark"]  # the join by cubicle


def test_rows_of_settings_without_a_relay_go_by_the_motor_they_name(site):
    fleet = site().add("motor", [{"motor": "P-1", "relay": "R-1"}, {"motor": "P-2"}])
    fleet = fleet.add("relay", [{"relay_tag": "R-1", "jam_trip_delay_s": "2 s"}], sheet="export")
    fleet = fleet.add("relay", [{"motor": "P-1", "thermal_trip_class": 20}, {"motor": "P-2", "thermal_trip_class": 10}])
    fleet = fleet.fleet()
    assert fleet.tables["relay"].keys == ("R-1", "P-2")
    assert column(fleet, "relay", "thermal_trip_class") == [20.0, 10.0]


def test_one_row_a_setting_merges_to_one_relay(site):
    rows = [{"relay_tag": "R-1", "jam_trip_delay_s": "2 s"}, {"relay_tag": "r-1 ", "unbalance_trip_delay_s": "5 s"}]
    fleet = site().add("motor", [{"motor": "P-1", "relay": "R-1"}]).add("relay", rows).fleet()
    assert fleet.tables["relay"].keys == ("R-1",)
    assert column(fleet, "relay", "unbalance_trip_delay_s") == [5.0]


def test_the_active_group_is_judged_and_the_selectable_one_as_well(site):
    rows = [
        {"relay_tag": "R-1", "relay_ct_primary_a": "200 A"},
        {"relay_tag": "R-1", "group_active": "no", "group_selectable": "yes", "jam_trip_delay_s": "1 s"},
        {"relay_tag": "R-1", "group_active": "yes", "jam_trip_delay_s": "2 s"},
    ]
    fleet = site().add("motor", [{"motor": "P-1", "relay": "R-1"}])
    fleet = fleet.add("relay", rows, groups=["", "Group 1", "Group 2"]).fleet()
    assert fleet.tables["relay"].keys == ("R-1 (group 1)", "R-1")
    assert fleet.links["motor", "relay"].tolist() == [1]
    assert column(fleet, "relay", "jam_trip_delay_s") == [1.0, 2.0]
    assert column(fleet, "relay", "relay_ct_primary_a") == [200.0, 200.0]  # said of the whole relay
    assert column(fleet, "relay", "group_active") == [NO, YES]
    assert [(name, rows.tolist()) for name, rows in fleet.other_groups] == [("1", [0])]


def test_an_unknown_active_group_is_asked_and_judged_by_none(site):
    rows = [{"relay_tag": "R-1", "relay_ct_primary_a": 200, "jam_trip_delay_s": f"{n} s"} for n in (1, 2)]
    fleet = site().add("motor", [{"motor": "P-1", "relay": "R-1"}]).add("relay", rows, groups=["A", "B"]).fleet()
    judged = fleet.links["motor", "relay"][0]
    assert fleet.tables["relay"].keys[judged] == "R-1"
    assert np.isnan(column(fleet, "relay", "jam_trip_delay_s")[judged])
    assert column(fleet, "relay", "group_active")[judged] == UNKNOWN
    assert fleet.questions[0].answers == ("A", "B")


def test_bus_data_in_motor_rows_make_one_bus(site):
    rows = [{"motor": f"P-{n}", "bus": "MCC 1", "fault_max_ka": "25 kA"} for n in (1, 2)]
    fleet = site().add("motor", rows).fleet()
    assert fleet.tables["bus"].keys == ("MCC 1",)
    assert fleet.links["motor", "bus"].tolist() == [0, 0]


def test_starts_of_strangers_are_said_once_a_tag(site):
    starts = [{"start_motor": "X-9", "start_time_s": 4}, {"start_motor": "X-9", "start_time_s": 5}, {"start_time_s": 6}]
    fleet = site().add("motor", [{"motor": "P-1"}]).add("start", starts).fleet()
    assert fleet.links["start", "motor"].tolist() == [-1, -1]
    assert [("'X-9'" in c.found, c.cell) for c in fleet.complaints] == [(False, "B4"), (True, "A2")]


def test_a_group_that_may_or_may_not_be_selectable_is_said_to_be_judged_by_nobody(site):
    rows = [{"relay_tag": "R-1", "group_active": active, "jam_trip_delay_s": "1 s"} for active in ("yes", "no")]
    fleet = site().add("motor", [{"motor": "P-1", "relay": "R-1"}]).add("relay", rows, groups=["1", "2"]).fleet()
    assert fleet.other_groups == ()
    assert [("'R-1 (group 2)'" in c.found, c.weight) for c in fleet.complaints] == [(True, "remark")]


def test_a_bus_named_beside_the_relay_serves_a_motor_that_names_none(site):
    fleet = site().add("motor", [{"motor": "P-1", "relay": "R-1"}, {"motor": "P-2", "relay": "R-2", "bus": "B-2"}])
    relays = [{"relay_tag": "R-1", "bus": "B-1"}, {"relay_tag": "R-2", "bus": "B-1"}]
    fleet = fleet.add("relay", relays).add("bus", [{"bus_name": "B-1"}, {"bus_name": "B-2"}]).fleet()
    assert fleet.links["motor", "bus"].tolist() == [0, 1]
