"""What is on and what is off, from a column of its own or from what stands at the pickup."""

from __future__ import annotations

import numpy as np
import pytest

from audit.fleet.column import ASSUMED, NO, STATED, UNKNOWN, YES


def relay(site, **cells):
    fleet = site().add("motor", [{"motor": "P-1", "full_load_a": 100}]).add("relay", [{"relay_tag": "P-1", **cells}])
    return fleet.fleet()


def columns(fleet):
    return fleet.tables["relay"].columns


@pytest.mark.parametrize(
    ("pickup", "code", "basis"),
    [
        ("200 A", YES, STATED),
        ("OFF", NO, STATED),
        ("disabled", NO, STATED),
        ("-", NO, ASSUMED),
        ("N/A", NO, ASSUMED),
        ("TBC", UNKNOWN, STATED),
        ("abt 40 or so", UNKNOWN, STATED),
        (None, UNKNOWN, STATED),
    ],
)
def test_the_pickup_tells_whether_the_element_is_on(site, pickup, code, basis):
    found = columns(relay(site, jam_trip_pickup_a=pickup))
    assert found["jam_trip_on"].values.tolist() == [code]
    assert found["jam_trip_on"].basis.tolist() == [basis]
    if pickup is not None:
        assert found["jam_trip_on"].cell.tolist() == found["jam_trip_pickup_a"].cell.tolist()
    assert np.isnan(found["jam_trip_pickup_a"].values[0]) == (pickup != "200 A")


def test_the_delay_tells_where_there_is_no_pickup(site):
    found = columns(relay(site, start_timer_delay_s="12 s", jam_trip_delay_s="OFF"))
    assert found["start_timer_on"].values.tolist() == [YES]
    assert found["jam_trip_on"].values.tolist() == [NO]


@pytest.mark.parametrize(
    ("written", "trip", "alarm"),
    [("Yes", YES, YES), ("Trip", YES, YES), ("Alarm only", NO, YES), ("Trip + Alarm", YES, YES), ("0", NO, YES)],
)
def test_an_own_column_goes_before_the_pickup(site, written, trip, alarm):
    found = columns(
        relay(site, unbalance_trip_on=written, unbalance_trip_pickup_pct="15 %", unbalance_alarm_pickup_pct="10 %")
    )
    assert found["unbalance_trip_on"].values.tolist() == [trip]
    assert found["unbalance_alarm_on"].values.tolist() == [alarm]


def test_alarm_only_says_that_the_alarm_is_on(site):
    found = columns(relay(site, unbalance_trip_on="Alarm", unbalance_trip_pickup_pct="15 %"))
    assert found["unbalance_alarm_on"].values.tolist() == [YES]
    found = columns(relay(site, unbalance_trip_on="Yes", unbalance_trip_pickup_pct="15 %"))
    assert found["unbalance_alarm_on"].values.tolist() == [UNKNOWN]


def test_on_beside_a_pickup_that_says_off_is_a_complaint(site):
    fleet = relay(site, jam_trip_on="Yes", jam_trip_pickup_a="OFF")
    assert columns(fleet)["jam_trip_on"].values.tolist() == [UNKNOWN]
    assert [complaint.quantity for complaint in fleet.complaints] == ["jam_trip_on"]


def test_a_delay_of_nought_is_a_value_where_it_is_plausible(site):
    found = columns(relay(site, short_circuit_trip_pickup_a="1200 A", short_circuit_trip_delay_s="0 s"))
    assert found["short_circuit_trip_delay_s"].values.tolist() == [0.0]


def test_a_word_that_is_neither_yes_nor_no_is_withheld(site):
    fleet = relay(site, jam_trip_on="perhaps", jam_trip_pickup_a="200 A")
    assert columns(fleet)["jam_trip_on"].values.tolist() == [UNKNOWN]
    assert "'perhaps'" in fleet.complaints[0].found


def test_per_cent_of_full_load_at_the_unbalance_pickup_tells_its_base(site):
    base = columns(relay(site, unbalance_trip_pickup_pct="15 % FLA"))["unbalance_base"]
    assert base.choices[base.values[0]] == "full_load"
    assert columns(relay(site, unbalance_trip_pickup_pct="15 %"))["unbalance_base"].values.tolist() == [-1]


@pytest.mark.parametrize(("written", "code"), [(None, NO), ("-", NO), ("yes", YES), ("TBC", UNKNOWN), ("no", NO)])
def test_absent_means_no_for_must_run_but_a_pending_cell_stays_open(site, written, code):
    fleet = site().add("motor", [{"motor": "P-1", "must_run": written}]).fleet()
    assert fleet.tables["motor"].columns["must_run"].values.tolist() == [code]
