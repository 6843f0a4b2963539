"""The record suffices: what was written is read back, older versions too; newer and broken ones are refused."""

from __future__ import annotations

import gzip
import json
from collections.abc import Callable
from datetime import date
from pathlib import Path
from typing import Any

import numpy as np
import pytest

from audit.checks.catalogue import Catalogue, load_catalogue
from audit.findings.audit import Audit
from audit.fleet.build import fleet_of
from audit.fleet.column import Column
from audit.pipeline import audit_fleet, judge_fleet
from audit.refusal import Refusal
from audit.report.record.parts import RECORD_VERSION
from audit.report.record.read import read_record
from audit.report.record.values import from_runs, from_stepped_runs, runs, stepped_runs, verdict_letters
from audit.report.record.write import write_record

DAY = date(2026, 11, 30)
Change = Callable[[dict[str, Any]], None]


@pytest.fixture(scope="module")
def catalogue() -> Catalogue:
    return load_catalogue()


@pytest.fixture(scope="module")
def audit(catalogue: Catalogue) -> Audit:
    motor = {
        "motor": "P-1", "bus": "B-1", "rated_power_kw": 800, "full_load_a": 82.5, "starting_method": "soft_starter",
        "motor_replaced_date": date(2024, 2, 29), "must_run": True, "service": "NA", "driven_machine": None,
    }  # fmt: skip
    relay = {"relay_tag": "R-1", "short_circuit_trip_on": False, "thermal_trip_on": None}
    starts = [{"start_motor": "P-1", "start_moment": "2026-01-01", "start_time_s": (5.5, "recorded")}]
    fleet = fleet_of(motor=[motor, {"motor": 'Ä "2"'}], relay=[relay], bus=[{"bus_name": "B-1"}], start=starts)
    return audit_fleet(fleet, catalogue, audited_on=DAY)


def changed(audit: Audit, folder: Path, change: Change) -> Path:
    write_record(audit, folder)
    file = folder / "findings.json"
    content = json.loads(file.read_text("utf-8"))
    change(content)
    file.write_text(json.dumps(content), "utf-8")
    return file


def same(one: Column, other: Column) -> bool:
    alike = (one.values == other.values) | (one.missing() & other.missing())
    return bool(alike.all() and (one.cell == other.cell).all() and (one.basis == other.basis).all())


def test_a_record_gives_back_the_fleet_as_it_was_judged(audit: Audit, catalogue: Catalogue, tmp_path: Path) -> None:
    write_record(audit, tmp_path)
    record = read_record(tmp_path)
    assert (record.version, record.audited_on, record.site) == (RECORD_VERSION, DAY, "test")
    assert record.fleet is not None
    for subject, table in audit.fleet.tables.items():
        again = record.fleet.tables[subject]
        assert again.keys == table.keys
        for name, column in table.columns.items():
            told = again.columns.get(name) or Column.empty(column.kind, len(table), column.choices)
            if name in again.columns or not column.missing().all():
                assert same(column, told), name
    for link, rows in audit.fleet.links.items():
        assert record.fleet.links[link].tolist() == rows.tolist()
    judged = judge_fleet(record.fleet, catalogue, audited_on=DAY, packs=audit.packs_in_scope)
    assert judged.counts() == audit.counts()
    for outcome in judged.outcomes:
        if outcome.check.stage == "rows":
            assert verdict_letters(outcome) == record.verdicts[outcome.check.key]


def test_the_same_audit_gives_the_same_bytes(audit: Audit, tmp_path: Path) -> None:
    files = [write_record(audit, tmp_path / name) for name in ("one", "two")]
    assert {"findings.json", "findings.csv", "readings.csv.gz", "values.jsonl.gz"} <= {path.name for path in files[0]}
    for one, two in zip(*files, strict=True):
        assert one.read_bytes() == two.read_bytes(), one.name


def test_a_newer_record_is_refused_with_what_to_do(audit: Audit, tmp_path: Path) -> None:
    file = changed(audit, tmp_path, lambda content: content.update(record_version=RECORD_VERSION + 1))
    with pytest.raises(Refusal, match=f"version {RECORD_VERSION + 1}; this tool reads versions 1 to {RECORD_VERSION}"):
        read_record(file)


def test_a_record_of_version_one_is_read_without_values(audit: Audit, tmp_path: Path) -> None:
    def older(content: dict[str, Any]) -> None:
        content["record_version"] = 1
        for finding in content["findings"]:
            del finding["since"], finding["audits"]

    record = read_record(changed(audit, tmp_path, older))
    assert record.fleet is None
    assert [finding["check"] for finding in record.findings()] == [
        audit.outcomes[code.outcome].check.key for code in audit.codes
    ]


@pytest.mark.parametrize(
    ("content", "said"),
    [
        ("{", "this is no record of an audit"),
        ("[]", "names no record_version"),
        ('{"record_version": true}', "names no record_version"),
        ('{"record_version": 1}', "'audited_on' is lacking"),
    ],
)
def test_a_file_that_is_no_record_is_refused(tmp_path: Path, content: str, said: str) -> None:
    file = tmp_path / "findings.json"
    file.write_text(content, "utf-8")
    with pytest.raises(Refusal, match=said):
        read_record(tmp_path)


def test_values_that_were_cut_off_are_refused(audit: Audit, tmp_path: Path) -> None:
    write_record(audit, tmp_path)
    values = tmp_path / "values.jsonl.gz"
    values.write_bytes(values.read_bytes()[:-200])
    with pytest.raises(Refusal, match="the values cannot be read"):
        read_record(tmp_path)


def test_a_choice_keeps_its_word_when_the_tool_knows_more_choices(audit: Audit, tmp_path: Path) -> None:
    write_record(audit, tmp_path)
    file = tmp_path / "values.jsonl.gz"
    lines = [json.loads(line) for line in gzip.decompress(file.read_bytes()).decode("utf-8").splitlines()]
    for line in lines:
        if line.get("quantity") == "starting_method":
            # as an older tool might have written it: fewer choices, so another code for the same word
            line["choices"], line["values"] = ["soft_starter"], [0, -1]
    with gzip.open(file, "wt", encoding="utf-8") as stream:
        stream.writelines(json.dumps(line) + "\n" for line in lines)
    fleet = read_record(tmp_path).fleet
    assert fleet is not None
    method = fleet.tables["motor"].columns["starting_method"]
    assert [method.choices[code] if code >= 0 else None for code in method.values.tolist()] == ["soft_starter", None]


@pytest.mark.parametrize("numbers", [[], [7], [1, 1, 1], [3, 5, 7, -1, -1, 9, 4], list(range(50, 0, -7)), [0, 1, 5, 6]])
def test_runs_give_their_numbers_back(numbers: list[int]) -> None:
    array = np.array(numbers, dtype=np.int64)
    assert from_stepped_runs(stepped_runs(array)).tolist() == numbers
    assert from_runs(runs(array)).tolist() == numbers
