"""The sample: its findings are the planted ones, no more and no less; its sound twin is silent."""

from __future__ import annotations

import csv
import json
from collections import Counter
from datetime import date
from pathlib import Path

import pytest

from audit.findings.audit import Audit
from audit.findings.render import FindingRenderer
from audit.pipeline import audit_path
from audit.report.record.write import write_record
from audit.rule_folder import sample_folder

AUDITED_ON = date(2026, 11, 30)
SAMPLE = sample_folder()


def table(path: Path) -> list[dict[str, str]]:
    with path.open(encoding="utf-8", newline="") as stream:
        return list(csv.DictReader(stream))


@pytest.fixture(scope="module")
def sample() -> Audit:
    return audit_path(SAMPLE, audited_on=AUDITED_ON)


@pytest.fixture(scope="module")
def sound() -> Audit:
    return audit_path(SAMPLE / "sound", audited_on=AUDITED_ON)


def found(audit: Audit) -> Counter[tuple[str, str, str]]:
    return Counter(
        (f.name if f.subject in ("bus", "relay") else f.motor or f.name, f.check.split("/")[0], f.severity)
        for f in FindingRenderer(audit).all()
    )


def settled(planted: list[dict[str, str]], seen: Counter[tuple[str, str, str]]) -> Counter[tuple[str, str, str]]:
    """Give the planted findings; where a group's finding may name any of several motors, the one that was named."""
    result: Counter[tuple[str, str, str]] = Counter()
    for row in planted:
        options = [(name.strip(), row["check"], row["severity"]) for name in row["subject_key"].split(";")]
        result[next((option for option in options if option in seen), options[0])] += 1
    return result


def test_the_findings_of_the_sample_are_the_planted_defects(sample: Audit) -> None:
    seen = found(sample)
    planted = settled(table(SAMPLE / "planted_defects.csv"), seen)
    assert sorted((seen - planted).items()) == [], "found, not planted"
    assert sorted((planted - seen).items()) == [], "planted, not found"


def test_defects_are_planted_over_at_least_thirty_checks() -> None:
    rows = table(SAMPLE / "planted_defects.csv")
    assert len({row["check"] for row in rows}) >= 30


def test_the_sound_twin_gives_nothing_but_the_observations_that_the_table_names(sound: Audit) -> None:
    rows = table(SAMPLE / "sound" / "expected_observations.csv")
    expected = Counter((row["subject_key"], row["check"], "observation") for row in rows)
    assert found(sound) == expected


def test_each_core_check_ends_in_meets_on_some_row_of_the_sound_twin(sound: Audit) -> None:
    meets: Counter[str] = Counter()
    for outcome in sound.outcomes:
        if outcome.check.stage == "rows" and outcome.check.pack == "core":
            meets[outcome.check.name] += outcome.counts()["meets"]
    assert [name for name, number in meets.items() if not number] == []


def test_the_four_verdicts_of_each_check_add_up_to_the_rows_of_its_subject(sample: Audit) -> None:
    for outcome in sample.outcomes:
        if outcome.check.stage == "rows":
            assert sum(outcome.counts().values()) == sample.fleet.rows(outcome.check.subject), outcome.check.key


def test_every_finding_says_what_where_and_why(sample: Audit) -> None:
    for finding in FindingRenderer(sample).all():
        assert finding.because, finding.key
        assert finding.remedy, finding.key
        assert finding.source, finding.key


def test_the_same_inputs_give_the_same_bytes(sample: Audit, tmp_path: Path) -> None:
    again = audit_path(SAMPLE, audited_on=AUDITED_ON)
    first = [path.read_bytes() for path in write_record(sample, tmp_path / "first")]
    second = [path.read_bytes() for path in write_record(again, tmp_path / "second")]
    assert first == second


def test_the_record_counts_what_it_lists(sample: Audit, tmp_path: Path) -> None:
    write_record(sample, tmp_path)
    record = json.loads((tmp_path / "findings.json").read_text("utf-8"))
    assert sum(record["counts"]["by_severity"].values()) == len(record["findings"])
    assert len({finding["key"] for finding in record["findings"]}) == len(record["findings"])
