"""Fleets from plain rows."""

from __future__ import annotations

import numpy as np
import pytest

from audit.fleet.build import fleet_of
from audit.fleet.column import ASSUMED, NO, RECORDED, STATED, UNKNOWN, YES


def test_values_get_the_codes_of_their_kind():
    fleet = fleet_of(
        motor=[{"motor": "P-1", "full_load_a": 100, "starting_method": "DOL", "motor_replaced_date": "1970-01-03"}],
        relay=[{"jam_trip_on": True, "thermal_trip_on": False}],
    )
    motor, relay = fleet.tables["motor"].columns, fleet.tables["relay"].columns
    assert motor["full_load_a"].values.tolist() == [100.0]
    method = motor["starting_method"]
    assert method.choices[method.values[0]] == "direct_on_line"
    assert motor["motor_replaced_date"].values.tolist() == [2.0]  # two days after 1970-01-01
    assert relay["jam_trip_on"].values.tolist() == [YES]
    assert relay["thermal_trip_on"].values.tolist() == [NO]
    assert relay["unbalance_trip_on"].values.tolist() == [UNKNOWN]


def test_absence_means_no_only_where_the_vocabulary_says_so():
    columns = fleet_of(motor=[{"motor": "P-1"}]).tables["motor"].columns
    assert columns["must_run"].values.tolist() == [NO]
    assert columns["stator_sensors_wired"].values.tolist() == [UNKNOWN]


def test_starts_are_recorded_and_a_basis_may_be_given():
    fleet = fleet_of(
        motor=[{"motor": "P-1", "full_load_a": (100, "assumed"), "rated_power_kw": 55}],
        start=[{"start_time_s": 4}],
    )
    motor = fleet.tables["motor"].columns
    assert motor["full_load_a"].basis.tolist() == [ASSUMED]
    assert motor["rated_power_kw"].basis.tolist() == [STATED]
    assert fleet.tables["start"].columns["start_time_s"].basis.tolist() == [RECORDED]


def test_names_join_and_the_rest_stays_apart():
    fleet = fleet_of(
        motor=[{"motor": "P-1", "relay": "r 1", "bus": "B2"}, {"motor": "P-2", "relay": "none such"}],
        relay=[{"relay_tag": "R 2"}, {"relay_tag": "R 1"}, {"relay_tag": "R 3"}],
        bus=[{"bus_name": "B1"}, {"bus_name": "B2"}],
        start=[{"start_motor": "P-2"}, {"start_motor": "P-9"}],
    )
    assert fleet.links["motor", "relay"].tolist() == [1, -1]
    assert fleet.links["relay", "motor"].tolist() == [-1, 0, -1]
    assert fleet.links["motor", "bus"].tolist() == [1, -1]
    assert fleet.links["start", "motor"].tolist() == [1, -1]


def test_relays_join_by_position_where_nothing_is_named():
    fleet = fleet_of(motor=[{}, {}], relay=[{}, {}])
    assert fleet.links["motor", "relay"].tolist() == [0, 1]
    assert np.array_equal(fleet.parent_rows("relay", "motor"), [0, 1])


@pytest.mark.parametrize(
    "row",
    [{"no_such_quantity": 1}, {"full_load_a": "100"}, {"full_load_a": True}, {"must_run": 1}, {"motor_kind": "cagey"}],
)
def test_a_slip_in_a_row_is_refused(row):
    with pytest.raises(ValueError, match=next(iter(row))):
        fleet_of(motor=[row])
