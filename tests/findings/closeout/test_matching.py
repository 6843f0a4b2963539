"""Rows that came back twice, mixed up, from an old revision, or lost: what is asked and what is said."""

from __future__ import annotations

from datetime import date

import pytest

from audit.checks.catalogue import load_catalogue
from audit.findings.closeout.answers import AnswerKind
from audit.findings.closeout.matching import Matched, match
from audit.findings.closeout.returned import ReturnedCell, ReturnedRow, ReturnedSheet
from audit.findings.handover.rows import WorkRow, work_rows
from audit.findings.render import FindingRenderer
from audit.fleet.build import fleet_of
from audit.pipeline import audit_fleet

CHECK = "short-circuit-rides-through-start"


@pytest.fixture(scope="module")
def work() -> list[WorkRow]:
    motors = [
        {"motor": tag, "full_load_a": 100, "locked_rotor_a": 600, "rated_voltage_v": 400, "starting_method": "direct"}
        for tag in ("P-1", "P-2")
    ]
    relays = [
        {"relay_tag": tag, "short_circuit_trip_on": True, "short_circuit_trip_pickup_a": 700} for tag in ("R-1", "R-2")
    ]
    audit = audit_fleet(fleet_of(motor=motors, relay=relays), load_catalogue(), audited_on=date(2026, 10, 1))
    return [row for row in work_rows(audit, FindingRenderer(audit).all()) if row.finding.check == CHECK]


def returned(row: WorkRow, **cells: object) -> ReturnedRow:
    said = {"motor": row.finding.motor, "issued": 1080, "unit": "A", **cells}
    named = {name: ReturnedCell(value) for name, value in said.items()}
    return ReturnedRow(row.key, "Work!A1", named)


def matched(work: list[WorkRow], *rows: ReturnedRow) -> Matched:
    sheet = ReturnedSheet("back.xlsx", "0", rows, ("stamp:2026-10-01:abc",))
    return match(work, sheet, "stamp:2026-11-01:abc", {row.key: "now" for row in work}).rows[0]


def test_a_row_is_known_by_its_key_wherever_it_stands(work: list[WorkRow]) -> None:
    one = matched(work, returned(work[1], as_left=1), returned(work[0], as_left=1080))
    assert (one.as_left.number, one.question) == (1080, "")


def test_two_answers_that_differ_are_asked_and_equal_ones_are_one(work: list[WorkRow]) -> None:
    assert "more than once" in matched(work, returned(work[0], as_left=1080), returned(work[0], as_left=1100)).question
    assert matched(work, returned(work[0], as_left=1080), returned(work[0], as_left=1080)).question == ""


def test_a_key_beside_another_motors_tag_is_asked(work: list[WorkRow]) -> None:
    assert "sorted apart" in matched(work, returned(work[0], as_left=1080, motor="P-2")).question


def test_a_retyped_tag_is_said(work: list[WorkRow]) -> None:
    one = matched(work, returned(work[0], as_left=1080, motor="pump one"))
    assert one.question == ""
    assert any("pump one" in remark for remark in one.remarks)


def test_an_old_revision_is_said(work: list[WorkRow]) -> None:
    one = matched(work, returned(work[0], as_left=1080, judged_from="then"))
    assert any("old revision" in remark for remark in one.remarks)
    assert not matched(work, returned(work[0], as_left=1080, judged_from="now")).remarks


def test_the_day_alone_makes_no_other_revision(work: list[WorkRow]) -> None:
    sheet = ReturnedSheet("back.xlsx", "0", (), ("stamp:2026-10-01:abc",))
    assert match(work, sheet, "stamp:2026-12-24:abc", {}).remarks == ()
    assert match(work, sheet, "stamp:2026-10-01:xyz", {}).remarks


def test_kiloamperes_are_converted_because_they_are_said(work: list[WorkRow]) -> None:
    one = matched(work, returned(work[0], as_left="1.08 kA", unit=None))
    assert one.question == ""
    assert one.as_left.number == pytest.approx(1080)


def test_a_number_that_lacks_its_unit_and_a_factor_is_asked_not_converted(work: list[WorkRow]) -> None:
    one = matched(work, returned(work[0], as_left=1.08, unit="A"))
    assert "slip" in one.question
    assert one.as_left.number == 1.08
    assert matched(work, returned(work[0], as_left=1080, unit=None)).unit_missing


def test_a_row_that_did_not_come_back_is_nothing(work: list[WorkRow]) -> None:
    one = matched(work, returned(work[1], as_left=1080))
    assert (one.row, one.as_left.kind) == (None, AnswerKind.NOTHING)
