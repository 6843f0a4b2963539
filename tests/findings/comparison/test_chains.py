"""The way back from what moved to what was changed: through the branch taken, the row that decided, the base."""

from __future__ import annotations

from collections.abc import Callable

from audit.findings.audit import Audit
from audit.findings.comparison import Comparison, compare
from audit.findings.comparison.alignment import Pair
from audit.findings.comparison.chains import Chains
from audit.findings.comparison.changes import Changes
from audit.findings.comparison.moves import Move
from audit.findings.comparison.steps import Step, best
from audit.findings.comparison.touched import touched
from tests.findings.comparison.conftest import MOTOR, RELAY, numbered, plant

Judge = Callable[..., Audit]
DEVICE = "device-interrupts-bus-fault"


def chains(comparison: Comparison) -> dict[tuple[str, str], list[str]]:
    return {
        (one.name, one.what): [f"{step.name} {step.quantity or step.after}" for step in one.chain]
        for one in comparison.touched
    }


def test_a_raised_fault_level_leads_to_every_device_of_the_bus(judged: Judge) -> None:
    # 25 kA devices: margin 25 / 20 - 1 = 25 % before, 25 / 24 - 1 = 4.2 % after
    comparison = compare(judged(**plant()), judged(**plant(fault_max_ka=24)))
    moved = [one for one in comparison.touched if one.move.check == DEVICE]
    assert [one.name for one in moved] == ["P-1", "P-2", "P-3"]
    assert {(one.before_text, one.after_text) for one in moved} == {("25.0 %", "4.2 %")}
    expected = ["B-1 fault_max_ka", "B-1 greatest_fault_at_device_ka"]
    assert [chains(comparison)[one.name, one.what] for one in moved] == [expected] * 3


def test_the_bus_whose_datum_changed_is_not_touched_by_itself(judged: Judge) -> None:
    comparison = compare(judged(**plant()), judged(**plant(fault_max_ka=24)))
    assert "B-1" not in {one.name for one in comparison.touched}


def test_only_the_start_that_decides_leads_to_the_dip_of_the_bus(judged: Judge) -> None:
    # P-2 draws most before and after; P-1 changes as well, but pulls the voltage less
    before, after = plant(2), plant(2)
    before["motor"][1]["locked_rotor_a"] = 800
    after["motor"][0]["locked_rotor_a"] = 500
    after["motor"][1]["locked_rotor_a"] = 1000
    found = chains(compare(judged(**before), judged(**after)))
    assert found["B-1", "margin of bus-dip-bearable"][0] == "P-2 locked_rotor_a"


def test_a_larger_start_that_takes_over_is_named_with_the_one_that_it_replaces(judged: Judge) -> None:
    before, after = plant(2), plant(2)
    before["motor"][1]["locked_rotor_a"] = 600
    after["motor"][0]["locked_rotor_a"] = 1000
    after["motor"][1]["locked_rotor_a"] = 600
    found = chains(compare(judged(**before), judged(**after)))
    assert found["B-1", "margin of bus-dip-bearable"][0] == "P-1 locked_rotor_a"


def test_a_motor_that_is_added_touches_its_bus(judged: Judge) -> None:
    after = plant(3)
    after["motor"].append(numbered(MOTOR, "P", 9, locked_rotor_a=1500))
    after["relay"].append(numbered(RELAY, "P", 9))
    found = chains(compare(judged(**plant(3)), judged(**after)))
    assert found["B-1", "margin of bus-dip-bearable"][0] == "P-9 added"


def test_a_motor_that_goes_touches_its_bus(judged: Judge) -> None:
    before = plant(3)
    before["motor"].append(numbered(MOTOR, "P", 9, locked_rotor_a=1500))
    before["relay"].append(numbered(RELAY, "P", 9))
    found = chains(compare(judged(**before), judged(**plant(3))))
    assert found["B-1", "margin of bus-dip-bearable"][0] == "P-9 removed"


def test_a_motor_that_moves_to_another_bus_is_its_own_change_and_touches_both_buses(judged: Judge) -> None:
    before, after = plant(3), plant(3)
    for state in (before, after):
        state["bus"].append({**state["bus"][0], "bus_name": "B-2"})
        state["motor"].append(numbered(MOTOR, "P", 9, locked_rotor_a=1500))
        state["motor"].append(numbered(MOTOR, "P", 10, bus="B-2"))
        state["relay"] += [numbered(RELAY, "P", 9), numbered(RELAY, "P", 10)]
    after["motor"][3]["bus"] = "B-2"
    comparison = compare(judged(**before), judged(**after))
    found = chains(comparison)
    assert found["B-1", "margin of bus-dip-bearable"][0] == "P-9 bus"
    assert found["B-2", "margin of bus-dip-bearable"][0] == "P-9 bus"
    assert "P-9" not in {one.name for one in comparison.touched}
    assert [(one.name, one.quantity, one.after) for one in comparison.changed] == [("P-9", "bus", "B-2")]


def test_a_change_of_the_motor_s_own_relay_touches_nobody(judged: Judge) -> None:
    after = plant(1)
    after["relay"][0]["short_circuit_trip_pickup_a"] = 700
    comparison = compare(judged(**plant(1)), judged(**after))
    assert comparison.touched == ()
    assert [(one.relay, one.settings) for one in comparison.relays] == [("R-1", ("short-circuit pickup",))]


def test_like_motors_are_touched_when_one_of_them_is_set_otherwise(judged: Judge) -> None:
    # two of three sisters at 900 A, the third at 1100 A: 22 % off the median, 10 % at most
    alike = {
        "motor_make": "Vexmoor Electric", "motor_type": "HV800-4", "rated_speed_rpm": 1488, "driven_machine": "pump",
    }  # fmt: skip
    before, after = plant(3), plant(3)
    for state in (before, after):
        for row in state["motor"]:
            row.update(alike)
    after["relay"][2]["short_circuit_trip_pickup_a"] = 1100
    touched = [one for one in compare(judged(**before), judged(**after)).touched if one.subject == "sisters"]
    assert [(one.what, one.before_text, one.after_text) for one in touched] == [
        ("sisters-agree/short_circuit_trip_pickup_a", "meets", "breach")
    ]
    assert [(step.name, step.quantity) for step in touched[0].chain] == [("R-3", "short_circuit_trip_pickup_a")]


def test_the_shortest_way_from_each_root_is_kept() -> None:
    root, other = Step("bus", "B", "a", "a", "1", "2"), Step("bus", "B", "c", "c", "1", "2")
    between = Step("bus", "B", "b", "b", "1", "2")
    assert best([(root, between), (other,), (root,)]) == ((root,), (other,))


def test_a_step_says_by_how_much_a_number_moved() -> None:
    step = Step("bus", "B2", "fault_max_ka", "greatest fault current", "20 kA", "23.6 kA", 18.0)
    assert step.words() == "bus B2: greatest fault current up 18 % (20 kA to 23.6 kA)"
    assert Step("motor", "P-9", "", "motor", "", "added").words() == "P-9: motor added"


def test_what_moved_without_a_changed_datum_is_shown_as_well(judged: Judge) -> None:
    pair = Pair(judged(**plant(1)), judged(**plant(1)))
    changes = Changes(pair)
    move = Move("motor", 0, "verdict", DEVICE, "50", "", "meets", "breach", nodes=(None,))
    (one,) = touched(pair, changes, Chains(pair, changes), [move])
    assert one.words() == f"cause not found: to be looked at by hand -> P-1: {DEVICE} meets to breach"
