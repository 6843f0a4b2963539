"""How findings stand on both sides, what can no longer be proven, and what has to be looked at again."""

from __future__ import annotations

from collections.abc import Callable
from pathlib import Path

import pytest

from audit.checks.catalogue import Catalogue
from audit.findings.audit import Audit
from audit.findings.comparison import Comparison, compare
from audit.findings.comparison.impact_table import read_impact_table
from audit.limits.limits import BadRule
from tests.findings.comparison.conftest import MOTOR, RELAY, numbered, plant

Judge = Callable[..., Audit]
DEVICE = "device-interrupts-bus-fault"


def standing(comparison: Comparison, check: str) -> dict[str, str]:
    return {one.name: one.standing for one in comparison.findings if one.check == check}


def test_a_device_that_no_longer_breaks_the_fault_is_a_new_finding(judged: Judge) -> None:
    comparison = compare(judged(**plant(2)), judged(**plant(2, fault_max_ka=26)))
    assert standing(comparison, DEVICE) == {"P-1": "new", "P-2": "new"}
    assert standing(compare(judged(**plant(2, fault_max_ka=26)), judged(**plant(2))), DEVICE) == {
        "P-1": "gone",
        "P-2": "gone",
    }


def test_a_margin_that_falls_is_worse_and_one_that_rises_better(judged: Judge) -> None:
    # 25 / 26 - 1 = -3.8 %; 25 / 30 - 1 = -16.7 %
    low, high = judged(**plant(1, fault_max_ka=26)), judged(**plant(1, fault_max_ka=30))
    (worse,) = [one for one in compare(low, high).findings if one.check == DEVICE]
    assert worse.standing == "worse"
    assert (worse.margin_before_pct, worse.margin_after_pct) == pytest.approx((-3.846, -16.667), abs=0.001)
    assert standing(compare(high, low), DEVICE) == {"P-1": "better"}


def test_a_finding_that_stays_is_still_there(judged: Judge) -> None:
    broken = plant(1, fault_max_ka=26)
    assert standing(compare(judged(**broken), judged(**broken)), DEVICE) == {"P-1": "still there"}


def test_a_gone_finding_says_why(judged: Judge) -> None:
    after = plant(3, fault_max_ka=26)
    after["motor"][0]["interrupting_rating_ka"] = 31.5
    after["motor"][1]["switching_device"] = "fused_switch"
    del after["motor"][2], after["relay"][2]
    gone = compare(judged(**plant(3, fault_max_ka=26)), judged(**after)).findings
    why = {one.name: one.why_gone for one in gone if one.check == DEVICE and one.standing == "gone"}
    assert why["P-1"] == "meets now"
    assert why["P-3"] == "motor removed"


def test_a_finding_whose_datum_is_gone_is_not_gone(judged: Judge) -> None:
    after = plant(1, fault_max_ka=None)
    comparison = compare(judged(**plant(1, fault_max_ka=26)), judged(**after))
    assert standing(comparison, DEVICE) == {"P-1": "no longer provable"}
    (lost,) = [one for one in comparison.no_longer_provable if one.check == DEVICE]
    assert (lost.before, lost.after) == ("breach", "unproven")
    assert lost.lacking == ("greatest three-phase fault current at the bus",)
    assert next(step.quantity for step in lost.chain) == "fault_max_ka"
    won = compare(judged(**after), judged(**plant(1, fault_max_ka=26))).provable_now
    assert ("P-1", DEVICE, "breach") in {(one.name, one.check, one.after) for one in won}


def test_moves_within_the_share_are_left_alone(judged: Judge) -> None:
    # 25 / 20 - 1 = 25 %; 25 / 20.1 - 1 = 24.4 %: 0.6 points
    before, after = judged(**plant(1)), judged(**plant(1, fault_max_ka=20.1))
    assert compare(before, after, share_pct=1.0).touched == ()
    assert [one.move.check for one in compare(before, after, share_pct=0.5).touched] == [DEVICE]


def looked(comparison: Comparison, change: str) -> dict[str, set[str]]:
    found: dict[str, set[str]] = {}
    for one in comparison.looked_at:
        if one.change == change:
            found.setdefault(one.check, set()).update(one.names)
    return found


def test_a_raised_fault_level_asks_for_every_motor_of_the_bus(judged: Judge) -> None:
    comparison = compare(judged(**plant(2)), judged(**plant(2, fault_max_ka=26)))
    found = looked(comparison, "fault-level-up")
    assert found[DEVICE] == {"P-1", "P-2"}
    assert found["incomer-waits-for-motor"] == {"B-1"}
    verdicts = {one.check: one.verdict for one in comparison.looked_at if one.change == "fault-level-up"}
    assert verdicts[DEVICE] == "breach"
    by_hand = [one.check for one in comparison.looked_at if one.action == "to be looked at by hand"]
    assert "arc-flash labels and study of the board" in by_hand


def test_a_fault_level_that_falls_is_not_one_that_rises(judged: Judge) -> None:
    kinds = {one.change for one in compare(judged(**plant(1)), judged(**plant(1, fault_min_ka=8))).looked_at}
    assert kinds == {"fault-level-down"}


def test_a_motor_put_on_a_drive_asks_for_its_neighbours_and_its_bus(judged: Judge) -> None:
    after = plant(2)
    after["motor"][0]["starting_method"] = "drive"
    found = looked(compare(judged(**plant(2)), judged(**after)), "drive-added")
    assert found["earth-fault-above-charging-current"] >= {"P-2"}
    assert found["incomer-carries-largest-start"] == {"B-1"}


def test_a_check_that_no_pack_holds_is_to_be_looked_at_by_hand(judged: Judge, catalogue: Catalogue) -> None:
    after = plant(1)
    after["relay"][0]["relay_type"] = "MPR-6"
    comparison = compare(judged(**plant(1)), judged(**after))
    words = {one.check for one in comparison.looked_at if one.change == "relay-replaced" and not one.names}
    out = {check.name for check in catalogue.checks if check.pack not in comparison.after.packs_in_scope}
    wanted = {"settings-not-default", "trip-circuit-supervised", "relay-identity-agrees"}
    for name in wanted:
        assert any(word.startswith((name, name.replace("-", " "))) for word in words), name
    assert all("pack" in word for word in words for name in wanted & out if word.startswith(name))


def test_a_motor_that_was_removed_asks_for_those_that_stay(judged: Judge) -> None:
    found = looked(compare(judged(**plant(3)), judged(**plant(2))), "motor-removed")
    assert found[DEVICE] == {"P-1", "P-2"}


def test_an_added_motor_is_looked_at_whole(judged: Judge) -> None:
    after = plant(1)
    after["motor"].append(numbered(MOTOR, "P", 9))
    after["relay"].append(numbered(RELAY, "P", 9))
    comparison = compare(judged(**plant(1)), judged(**after))
    found = looked(comparison, "motor-added")
    applied = {o.check.key for o in comparison.after.outcomes if o.check.subject == "motor" and o.check.stage == "rows"}
    assert applied <= {check for check, names in found.items() if "P-9" in names}


def test_the_table_names_checks_that_exist_or_are_told_as_by_hand(catalogue: Catalogue) -> None:
    known = {check.name: check for check in catalogue.checks}
    for kind in read_impact_table(catalogue):
        matched = [name for look in kind.looks for name in look.matching(known)]
        assert matched, kind.name
        assert [one for look in kind.looks for one in look.unmatched(known) if "*" in one] == [], kind.name


@pytest.mark.parametrize(
    ("text", "said"),
    [
        ('shows_in = [{ subject = "bus", data = ["fault_mx_ka"] }]', "nearest known name is 'fault_max_ka'"),
        ('shows_in = [{ subject = "motor", data = ["starting_method"], becomes = "drives" }]', "'drives' is none"),
        ('shows_in = [{ subject = "bus", date = ["fault_max_ka"] }]', "'date' is not a key"),
        ('shows_in = [{ subject = "bus" }]', "a sign names data"),
    ],
)
def test_a_table_that_is_wrong_is_refused(tmp_path: Path, catalogue: Catalogue, text: str, said: str) -> None:
    file = tmp_path / "change_impact.toml"
    file.write_text(f'[kind]\nsays = "x"\n{text}\nlook = [{{ at = "the bus", checks = ["*"], why = "y" }}]\n', "utf-8")
    with pytest.raises(BadRule, match=said):
        read_impact_table(catalogue, file)
