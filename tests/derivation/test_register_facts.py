"""Facts of the register: what was found, what stands twice, and what stays open."""

from __future__ import annotations

from typing import Any

import numpy as np
import pytest

from audit.derivation.register_facts import REGISTER_FACTS, with_register_facts
from audit.fleet.build import fleet_of
from audit.fleet.column import NO, UNKNOWN, YES
from audit.fleet.fleet import Fleet

SETTINGS = {
    "relay_full_load_a": 100,
    "relay_ct_primary_a": 200,
    "start_timer_delay_s": 10,
    "jam_trip_pickup_a": 200,
    "jam_trip_delay_s": 2,
}


def fact(fleet: Fleet, name: str) -> list[Any]:
    table = with_register_facts(fleet).tables[REGISTER_FACTS[name].subject]
    return [None if value != value else value for value in table.columns[name].values.tolist()]


def test_tags_alike_after_folding_count_together_and_windings_apart():
    fleet = fleet_of(
        motor=[
            {"motor": "P-1"},
            {"motor": " p-1"},
            {"motor": "P-2", "winding": "fast"},
            {"motor": "P-2", "winding": "slow"},
            {"motor": "P-3", "starting_method": "DOL"},
            {"motor": "P-3", "starting_method": "soft starter"},
            {"motor": "P 1"},
        ]
    )
    assert fact(fleet, "rows_with_this_tag") == [2, 2, 1, 1, 1, 1, 1]


def test_settings_are_found_by_name_and_open_where_only_dashes_differ():
    fleet = fleet_of(
        motor=[
            {"motor": "P-1", "relay": "R-1"},
            {"motor": "P-2", "relay": "R2"},
            {"motor": "P-3", "relay": "R-9"},
            {"motor": "P-4", "relay": "R-4"},
        ],
        relay=[{"relay_tag": "R-1", "jam_trip_delay_s": 2}, {"relay_tag": "R-2"}, {"relay_tag": "R-4"}],
    )
    assert fact(fleet, "relay_named") == [YES] * 4
    assert fact(fleet, "settings_found") == [YES, UNKNOWN, NO, NO]


def test_a_motor_without_a_named_relay_has_no_settings_to_find():
    fleet = fleet_of(motor=[{"motor": "P-1"}, {"motor": "P-2"}], relay=[{"relay_tag": "R-1"}])
    assert fact(fleet, "relay_named") == [NO, NO]
    assert fact(fleet, "settings_found") == [NO, NO]
    assert fact(fleet, "settings_expected") == [NO, NO]


def test_other_motors_on_a_relay_leave_out_partners_on_either_side():
    motors = [
        {"motor": "P-1", "relay": "R-1"},
        {"motor": "P-2", "relay": "r-1 ", "duty_standby_with": "p 1"},
        {"motor": "P-3", "relay": "R-2"},
        {"motor": "P-4", "relay": "R-2"},
        {"motor": "P-5", "relay": "R-2"},
        {"motor": "P-6"},
    ]
    assert fact(fleet_of(motor=motors), "other_motors_on_relay") == [0, 0, 2, 2, 2, None]


def test_windings_of_one_motor_are_one_motor_on_their_relay():
    motors = [{"motor": "P-1", "relay": "R-1", "winding": "1"}, {"motor": "P-1", "relay": "R-1", "winding": "2"}]
    assert fact(fleet_of(motor=motors), "other_motors_on_relay") == [0, 0]


@pytest.mark.parametrize(
    ("buses", "expected"),
    [
        pytest.param([{"bus_name": "MCC-1"}, {"bus_name": "MCC-2"}], [YES, UNKNOWN, NO], id="list"),
        pytest.param([], [UNKNOWN] * 3, id="no list"),
    ],
)
def test_a_bus_is_found_in_the_list_or_open_without_one(buses: list[dict[str, str]], expected: list[int]):
    motors = [{"motor": f"P-{n}", "bus": name} for n, name in enumerate(["mcc-1", "MCC 2", "MCC-9"])]
    assert fact(fleet_of(motor=motors, bus=buses), "bus_found") == expected


def test_relay_rows_of_one_tag_are_setting_groups():
    fleet = fleet_of(
        motor=[{"motor": "P-1", "relay": "R-1"}],
        relay=[
            {"relay_tag": "R-1", "setting_group": "1", "group_selectable": True},
            {"relay_tag": "R-1", "setting_group": "2"},
            {"relay_tag": "R-2"},
        ],
    )
    assert fact(fleet, "several_setting_groups") == [YES, YES, NO]
    # of group 1 the other one (2) is open; of group 2 the other one (1) is known
    assert fact(fleet, "other_groups_settled") == [UNKNOWN, YES, YES]


def test_settings_like_those_of_a_spare_relay_of_the_same_type():
    def relay(tag: str, **more: object) -> dict[str, object]:
        return {"relay_tag": tag, "relay_type": "T1", **SETTINGS, **more}

    fleet = fleet_of(
        motor=[{"motor": f"P-{n}", "relay": f"R-{n}"} for n in range(4)],
        relay=[
            relay("R-0"),
            relay("R-1", jam_trip_delay_s=3),
            relay("R-2", relay_type="T2"),
            {"relay_tag": "R-3", "relay_type": "T1", "relay_full_load_a": 100},
            relay("S-1", relay_role="spare"),
        ],
    )
    assert fact(fleet, "same_settings_as_spare")[:4] == [YES, NO, NO, UNKNOWN]


def test_a_change_is_stated_where_its_date_is_given():
    fleet = fleet_of(motor=[{"motor_replaced_date": "2025-01-02"}, {}], bus=[{"supply_changed_date": "2025-01-02"}])
    assert fact(fleet, "motor_change_stated") == [YES, NO]
    assert fact(fleet, "supply_change_stated") == [YES]


def test_a_date_of_change_that_cannot_be_read_leaves_it_open():
    fleet = fleet_of(motor=[{"motor": "P-1"}])
    column = fleet.tables["motor"].columns["ct_changed_date"]
    column.cell[0] = 1234
    assert fact(fleet, "ct_change_stated") == [UNKNOWN]


def test_facts_do_not_alter_what_was_read():
    fleet = fleet_of(motor=[{"motor": "P-1", "full_load_a": 100}], relay=[{"relay_tag": "R-1"}])
    richer = with_register_facts(fleet)
    for subject, table in fleet.tables.items():
        assert {name: richer.tables[subject].columns[name] for name in table.columns} == table.columns
    assert not set(REGISTER_FACTS) & set(fleet.tables["motor"].columns)
    assert np.array_equal(richer.links["motor", "relay"], fleet.links["motor", "relay"])
