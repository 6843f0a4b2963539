"""Accepted deviations are shown apart while they hold, and count again when they no longer do."""

from __future__ import annotations

from datetime import date
from pathlib import Path

import pytest

from audit.checks.catalogue import load_catalogue
from audit.findings.accepted import read_deviations
from audit.findings.accepting import with_accepted
from audit.findings.audit import Audit
from audit.findings.render import FindingRenderer
from audit.fleet.build import fleet_of
from audit.intake.opening import find_workbooks
from audit.pipeline import audit_fleet
from audit.refusal import Refusal

TODAY = date(2026, 10, 1)
HEADER = "motor,check,setting,reason,accepted by,until,value,low,high\n"
CHECK = "short-circuit-rides-through-start"


@pytest.fixture(scope="module")
def audit() -> Audit:
    """1.7 x 600 A = 1,020 A must be ridden through (rules/50-short-circuit.toml); the pickup is 900 A."""
    motor: dict[str, object] = {"motor": "P-1", "locked_rotor_a": 600, "full_load_a": 100, "rated_voltage_v": 400}
    motor["starting_method"] = "direct"
    relay = {"short_circuit_trip_on": True, "short_circuit_trip_pickup_a": 900, "relay_tag": "R-1"}
    found = audit_fleet(fleet_of(motor=[motor], relay=[relay]), load_catalogue(), audited_on=TODAY)
    assert CHECK in {found.outcomes[code.outcome].check.key for code in found.codes}
    return found


def accepted(audit: Audit, folder: Path, row: str) -> tuple[Audit, str]:
    (folder / "accepted_deviations.csv").write_text(HEADER + row + "\n", encoding="utf-8")
    result = with_accepted(audit, read_deviations(folder))
    status = {finding.check: finding.status for finding in FindingRenderer(result).all()}[CHECK]
    return result, status


def test_an_accepted_finding_is_kept_and_not_counted(audit: Audit, tmp_path: Path) -> None:
    result, status = accepted(audit, tmp_path, f"p-1,{CHECK},,trips seen never,C. Engineer,2027-06-30,900,1020,")
    assert status == "accepted"
    assert len(result.codes) == len(audit.codes)
    assert sum(result.by_severity().values()) == sum(audit.by_severity().values()) - 1


@pytest.mark.parametrize(
    ("row", "because"),
    [
        (f"P-1,{CHECK},,,C. Engineer,2027-06-30,,,", "no reason"),
        (f"P-1,{CHECK},,  ,C. Engineer,2027-06-30,,,", "no reason"),
        (f"P-1,{CHECK},,old,C. Engineer,2026-09-30,,,", "until 2026-09-30"),
        (f"P-1,{CHECK},,old,,2027-06-30,,,", "nobody"),
        (f"P-1,{CHECK},,old,C. Engineer,soon,,,", "'soon'"),
        (f"P-1,{CHECK},,old,C. Engineer,2027-06-30,850,,", "850"),
        (f"P-1,{CHECK},,old,C. Engineer,2027-06-30,900,1100,", "low end"),
    ],
)
def test_it_returns_when_what_was_accepted_no_longer_stands(
    audit: Audit, tmp_path: Path, row: str, because: str
) -> None:
    result, status = accepted(audit, tmp_path, row)
    assert status == "returned"
    assert because in result.accepted[0].returned_because
    assert result.by_severity() == audit.by_severity()


def test_its_last_day_still_counts(audit: Audit, tmp_path: Path) -> None:
    assert accepted(audit, tmp_path, f"P-1,{CHECK},,old,C. Engineer,2026-10-01,,,")[1] == "accepted"


def test_another_motor_or_setting_is_not_accepted(audit: Audit, tmp_path: Path) -> None:
    for row in (f"P-2,{CHECK},,x,C. E.,2027-06-30,,,", f"P-1,{CHECK},jam_trip_delay_s,x,C. E.,2027-06-30,,,"):
        result, status = accepted(audit, tmp_path, row)
        assert status == "open"
        assert result.accepted[0].code is None


def test_the_table_is_no_data_of_the_site(tmp_path: Path) -> None:
    (tmp_path / "accepted_deviations.csv").write_text(HEADER, encoding="utf-8")
    (tmp_path / "motors.csv").write_text("Tag,kW\n", encoding="utf-8")
    assert [file.name for file in find_workbooks(tmp_path)] == ["motors.csv"]


def test_a_table_without_a_needed_column_is_refused(tmp_path: Path) -> None:
    (tmp_path / "accepted_deviations.csv").write_text("motor,check,reason\nP-1,x,y\n", encoding="utf-8")
    with pytest.raises(Refusal, match="'accepted by' is lacking"):
        read_deviations(tmp_path)
