"""Over whole fleets, from workbook to verdict, every core check reaches each verdict that it has."""

from __future__ import annotations

from collections import defaultdict

import pytest

from audit.checks.entry import Check
from audit.checks.verdicts import VERDICT_NAMES
from tests.proofs.fleets import Audits

NO_SUCH_VERDICT = {
    ("register-tag-unique", "unproven"): "a row without a tag is no motor of the list that the reader gives",
    ("active-group-judged", "breach"): "the reader judges no group that is stated as not active: it asks which one is",
}
"""Verdicts that no workbook brings about, though the worked cases of the check show them; and why."""


def always_applies(check: Check) -> bool:
    """Tell whether nothing in a check can make it not applicable."""
    unconditional = any(requirement.when is None for requirement in check.requirements)
    return check.when_text == "yes" and unconditional and not check.evidence and check.unless_found is None


@pytest.fixture(scope="module")
def reached(audits: Audits) -> dict[str, set[str]]:
    """Give the verdicts that each core check reaches on some row of some fleet."""
    found: dict[str, set[str]] = defaultdict(set)
    for audit in audits.values():
        for outcome in audit.outcomes:
            if outcome.check.pack == "core" and outcome.check.stage == "rows":
                found[outcome.check.name] |= {name for name, count in outcome.counts().items() if count}
    return found


def test_every_core_check_reaches_each_of_its_verdicts(audits: Audits, reached: dict[str, set[str]]) -> None:
    lacking = []
    for name, found in reached.items():
        check = audits["sample"].catalogue.named(name)[0]
        wanted = set(VERDICT_NAMES) - ({"not applicable"} if always_applies(check) else set())
        wanted -= {verdict for exempt, verdict in NO_SUCH_VERDICT if exempt == name}
        lacking += [(name, verdict) for verdict in sorted(wanted - found)]
    assert lacking == []


def test_exceptions_are_still_exceptions(reached: dict[str, set[str]]) -> None:
    assert [exempt for exempt in NO_SUCH_VERDICT if exempt[1] in reached[exempt[0]]] == []


def test_checks_of_ranges_find_something_somewhere_and_nothing_on_sound_fleets(audits: Audits) -> None:
    # they judge ranges, not rows, and so have no verdicts of rows: found or not found
    checks = [check.name for check in audits["sample"].catalogue.checks if check.stage == "ranges"]
    assert checks
    found = {
        fleet: {audit.outcomes[code.outcome].check.name for code in audit.codes} & set(checks)
        for fleet, audit in audits.items()
    }
    assert found["sound twin"] == set()
    assert found["sample"] | found["disturbed"] == set(checks)


@pytest.mark.parametrize("fleet", ["sample", "disturbed", "disturbed with gaps", "situations"])
def test_verdicts_of_each_check_add_up_to_the_rows_of_its_subject(audits: Audits, fleet: str) -> None:
    audit = audits[fleet]
    for outcome in audit.outcomes:
        if outcome.check.stage == "rows":
            assert sum(outcome.counts().values()) == audit.fleet.rows(outcome.check.subject), outcome.check.key
