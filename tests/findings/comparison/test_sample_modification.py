"""The modification of the sample gives the comparison that was worked out by hand, no more and no less."""

from __future__ import annotations

import csv
from collections.abc import Iterator
from datetime import date

import pytest

from audit.findings.comparison import Comparison, compare
from audit.findings.comparison.steps import Chain
from audit.pipeline import audit_path
from audit.rule_folder import sample_folder

AUDITED_ON = date(2026, 11, 30)
AFTER = sample_folder() / "after_modification"
Row = tuple[str, ...]


@pytest.fixture(scope="module")
def comparison() -> Comparison:
    before = audit_path(sample_folder(), audited_on=AUDITED_ON)
    return compare(before, audit_path(AFTER, audited_on=AUDITED_ON))


def chain_text(chain: Chain) -> str:
    return " -> ".join(f"{step.subject} {step.name} {step.quantity or step.after}" for step in chain)


def percent(value: float | None) -> str:
    return "" if value is None else f"{value:.1f} %"


def rows_of(comparison: Comparison) -> Iterator[Row]:
    """Give the comparison as the table has it."""
    for one in comparison.changed:
        yield one.kind, one.subject, one.name, one.quantity, one.before_text, one.after_text, ""
    for row in comparison.rows:
        yield row.kind, row.subject, row.name, "", "", "", ""
    for finding in comparison.findings:
        if finding.standing in ("worse", "better"):
            margins = percent(finding.margin_before_pct), percent(finding.margin_after_pct)
            yield finding.standing, finding.subject, finding.name, finding.check, *margins, ""
        elif finding.standing != "still there":
            yield finding.standing, finding.subject, finding.name, finding.check, "", finding.why_gone, ""
    for moved in comparison.touched:
        yield (
            "touched", moved.subject, moved.name, moved.what, moved.before_text, moved.after_text,
            chain_text(moved.chain),
        )  # fmt: skip
    for part, proofs in (
        ("no longer provable", comparison.no_longer_provable),
        ("provable now", comparison.provable_now),
    ):
        for proof in proofs:
            yield part, proof.subject, proof.name, proof.check, proof.before, proof.after, chain_text(proof.chain)
    for change in dict.fromkeys((one.subject, one.name, one.change) for one in comparison.looked_at):
        yield "looked at", *change, "", "", ""


def test_the_comparison_is_the_one_worked_out_by_hand(comparison: Comparison) -> None:
    # changes.csv lists what was changed; margins by IEC 60909 and the adiabatic equation of IEC 60364-4-43, the score
    # of the peers by median and 1.4826 times the median absolute deviation, all worked out beside this project
    with (AFTER / "expected_comparison.csv").open(encoding="utf-8", newline="") as file:
        expected = {tuple(row.values()) for row in csv.DictReader(file)}
    found = set(rows_of(comparison))
    assert sorted(found - expected) == [], "found, not expected"
    assert sorted(expected - found) == [], "expected, not found"
