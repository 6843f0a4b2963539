"""A sound plant is silent: four kinds of fleets, 200 motors each, from workbook to finding."""

from __future__ import annotations

from collections import Counter

import pytest

from audit.findings.audit import Audit
from audit.findings.render import FindingRenderer
from tests.proofs.fleets import SOUND_FLEETS, Audits

OBSERVATIONS: dict[str, dict[tuple[str, str], str]] = {
    "low_voltage_works": {},
    "high_voltage_plant": {},
    "fused_contactors": {},
    "mixed_starters": {},
}
"""For each fleet the observations on it, by motor and check, each with its reason. There are none."""

LACKING: dict[str, dict[str, str]] = {
    "low_voltage_works": {},
    "high_voltage_plant": {},
    "fused_contactors": {
        "register-trip-reaches-output": "low-voltage relays without an earth-fault input export no such element, so "
        "that it is not known to be off",
    },
    "mixed_starters": {
        "register-trip-reaches-output": "as on the fused contactors",
    },
}
"""For each fleet the checks that may stay unproven on it with the data that such sites have, and what is lacking."""

GREATEST_UNPROVEN_SHARE = 0.03
"""Of the pairs of motor and check that apply."""


def unproven_share(audit: Audit) -> float:
    """Give the share of unproven verdicts among those that apply."""
    counts = audit.counts()
    return counts["unproven"] / (counts["unproven"] + counts["meets"] + counts["breach"])


@pytest.mark.parametrize("fleet", SOUND_FLEETS)
def test_no_alarm_and_only_the_observations_that_the_table_names(audits: Audits, fleet: str) -> None:
    findings = list(FindingRenderer(audits[fleet]).all())
    assert [(f.name, f.check, f.because) for f in findings if f.severity != "observation"] == []
    observed = Counter((f.motor or f.name, f.check.split("/")[0]) for f in findings if f.severity == "observation")
    assert observed == Counter(OBSERVATIONS[fleet].keys())
    assert all(reason.strip() for reason in OBSERVATIONS[fleet].values())


@pytest.mark.parametrize("fleet", SOUND_FLEETS)
def test_workbooks_are_read_without_a_question_or_a_withheld_value(audits: Audits, fleet: str) -> None:
    read = audits[fleet].fleet
    assert read.rows("motor") == 200
    assert read.questions == ()
    assert [complaint.sentence() for complaint in read.complaints if complaint.weight != "remark"] == []


@pytest.mark.parametrize("fleet", SOUND_FLEETS)
def test_what_stays_unproven_is_little_and_its_reason_is_known(audits: Audits, fleet: str) -> None:
    audit = audits[fleet]
    share = unproven_share(audit)
    print(f"{fleet}: {share:.2%} unproven of {sum(audit.counts().values()) - audit.counts()['not applicable']}")
    assert share <= GREATEST_UNPROVEN_SHARE
    core = {outcome.check.name for outcome in audit.outcomes if outcome.counts()["unproven"]}
    assert core <= set(LACKING[fleet])


@pytest.mark.parametrize("fleet", SOUND_FLEETS)
def test_most_checks_have_something_to_judge(audits: Audits, fleet: str) -> None:
    # silence proves nothing where nothing was judged: on each kind of plant each motor meets at least ten checks
    audit = audits[fleet]
    met = sum((outcome.verdict == 2).astype(int) for outcome in audit.outcomes if len(outcome.verdict) == 200)
    assert met.min() >= 10


def test_every_core_check_ends_in_meets_on_a_sound_fleet(audits: Audits) -> None:
    fleets = (*SOUND_FLEETS, "sound twin")
    meets: Counter[str] = Counter()
    for fleet in fleets:
        for outcome in audits[fleet].outcomes:
            if outcome.check.pack == "core" and outcome.check.stage == "rows":
                meets[outcome.check.name] += outcome.counts()["meets"]
    assert [name for name, count in meets.items() if not count] == []
