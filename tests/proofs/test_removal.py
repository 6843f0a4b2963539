"""Data taken away decide nothing: no verdict becomes 'meets' or 'breach' by what is no longer known."""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest

from audit.checks.entry import Check
from audit.checks.verdicts import BREACH, MEETS, VERDICT_NAMES
from audit.expression.parse import parse
from tests.proofs.fleets import Audits
from tests.proofs.removal import (
    Judged,
    another_source,
    breach_out_of_unproven,
    data_beneath,
    held_either_way,
    newly_decided,
    read_otherwise,
)

ABSENCE_SAYS_SOMETHING = {
    ("motor_replaced_date", "register-relay-file-current"): "no date given: no change of the motor is stated",
    ("ct_changed_date", "register-relay-file-current"): "no date given: no change of the CTs is stated",
    ("stated_starts_per_hour", "recorded-starts-within-usual"): "where the data sheet says nothing the usual counts",
    ("overcurrent_trip_on", "thermal-beats-cold-stall"): "an export that does not mention the element has none",
    ("overcurrent_trip_on", "thermal-beats-hot-stall"): "an export that does not mention the element has none",
}
"""Data whose absence is meant to say something, the check that hears it, and why."""
COMPARISONS = ("sisters", "peers")
"""Groups compare the members that are known; they take part where a datum is taken from all of them."""
IDENTITY = ("motor", "relay_tag", "bus_name", "start_motor")


@pytest.fixture(scope="module")
def judged(audits: Audits) -> Judged:
    """Give the fleet whose data are disturbed, so that all verdicts occur."""
    audit = audits["disturbed"]
    return Judged.of(audit.catalogue, audit.fleet)


@pytest.fixture(scope="module")
def checks(judged: Judged) -> list[Check]:
    """Give the core checks that judge rows, without those that ask whether a datum is stated: its lack breaks them."""
    rows = [check for check in judged.catalogue.checks if check.pack == "core" and check.stage == "rows"]
    asking = [check for check in rows if any(one.kind == "must_be_stated" for one in check.requirements)]
    assert len(asking) < 5
    return [check for check in rows if check not in asking]


def _offences(check: Check, datum: str, before: Judged, after: Judged) -> list[str]:
    old, new = before.outcome(check), after.outcome(check)
    bad = (newly_decided(old, new) & ~held_either_way(old, new)) | breach_out_of_unproven(old, new)
    if bad.any():
        bad &= ~another_source(check, before, after)
    keys = before.workings.fleet.tables[check.subject].keys
    was, now = old.verdict, new.verdict
    return [
        f"{keys[row]}: {check.key} without {datum}: {VERDICT_NAMES[was[row]]} to {VERDICT_NAMES[now[row]]}"
        for row in np.flatnonzero(bad)
        if (datum, check.name) not in ABSENCE_SAYS_SOMETHING
    ]


def test_a_datum_taken_from_half_of_the_rows_decides_nothing(judged: Judged, checks: list[Check]) -> None:
    chance = np.random.default_rng(1)
    single = [check for check in checks if check.subject not in COMPARISONS]
    beneath = {check.key: judged.catalogue.names_beneath(check) for check in single}
    data = [name for name in data_beneath(judged.catalogue, single, judged.fleet) if name not in IDENTITY]
    assert len(data) > 150
    offences: list[str] = []
    for datum in data:
        size = judged.fleet.rows(judged.catalogue.quantities[datum].subject)
        after = judged.without(datum, chance.uniform(size=size) < 0.5)
        for check in single:
            if datum in beneath[check.key]:
                offences += _offences(check, datum, judged, after)
    assert offences == []


def test_a_judged_setting_taken_from_all_rows_leaves_nothing_settled(judged: Judged, checks: list[Check]) -> None:
    settings = {
        name
        for check in checks
        for requirement in check.requirements
        if (name := requirement.setting()) is not None and judged.catalogue.quantities[name].role == "setting"
    }
    taken = [name for name in data_beneath(judged.catalogue, checks, judged.fleet) if name in settings]
    assert len(taken) > 40
    still: list[tuple[str, str]] = []
    for setting in taken:
        size = judged.fleet.rows(judged.catalogue.quantities[setting].subject)
        after = judged.without(setting, np.ones(size, dtype=bool))
        for check in checks:
            if {requirement.setting() for requirement in check.requirements} == {setting}:
                outcome = after.outcome(check)
                if np.isin(outcome.verdict, (MEETS, BREACH)).any():
                    still.append((check.key, setting))
    assert still == []


def test_blank_cells_in_the_workbooks_decide_nothing(audits: Audits, judged: Judged, checks: list[Check]) -> None:
    # every twelfth cell of all workbooks blanked, hence several data of a motor at once
    gaps = audits["disturbed with gaps"]
    after = Judged.of(gaps.catalogue, gaps.fleet)
    assert judged.workings.fleet.tables["motor"].keys == after.workings.fleet.tables["motor"].keys
    offences, changed = [], 0
    heard = {name for _, name in ABSENCE_SAYS_SOMETHING}
    for check in checks:
        if check.subject == "motor" and check.name not in heard:
            old, new = judged.outcome(check), after.outcome(check)
            changed += int((old.verdict != new.verdict).sum())
            bad = newly_decided(old, new) & ~held_either_way(old, new)
            if bad.any():
                bad &= ~another_source(check, judged, after) & ~read_otherwise(check, judged, after)
            offences += [(check.key, row) for row in np.flatnonzero(bad)]
    assert changed > 1000
    assert offences == []


def test_a_clamp_that_swallows_a_missing_value_is_noticed(judged: Judged) -> None:
    # the greater of a missing and a known value is the known one: this trip time would be 0 s without the ratio
    name = "thermal_longest_warm_stall_s"
    recipe = judged.catalogue.recipes[name]
    way = replace(recipe.ways[0], node=parse("greater(whole - hot_level_pu, no_weight) * thermal_longest_cold_stall_s"))
    catalogue = replace(judged.catalogue, recipes={**judged.catalogue.recipes, name: replace(recipe, ways=(way,))})
    before = Judged.of(catalogue, judged.fleet)
    after = before.without("hot_cold_ratio", np.ones(judged.fleet.rows("relay"), dtype=bool))
    assert _offences(catalogue.named("thermal-beats-hot-stall")[0], "hot_cold_ratio", before, after)


def test_exceptions_concern_checks_that_rest_on_the_datum(judged: Judged) -> None:
    for datum, name in ABSENCE_SAYS_SOMETHING:
        assert datum in judged.catalogue.names_beneath(judged.catalogue.named(name)[0])
