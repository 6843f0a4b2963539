"""From year to year: new, repeated, returned; cleared, and with what; settings that changed without a reason."""

from __future__ import annotations

import json
from collections.abc import Callable
from datetime import date
from pathlib import Path
from typing import Any

import pytest

from audit.checks.catalogue import Catalogue, load_catalogue
from audit.findings.audit import Audit
from audit.findings.render import FindingRenderer
from audit.fleet.build import fleet_of
from audit.pipeline import audit_fleet, since_record
from audit.refusal import Refusal
from audit.report.record.read import read_record
from audit.report.record.write import write_record
from tests.findings.comparison.conftest import plant

DEVICE = "device-interrupts-bus-fault"
Year = Callable[..., Audit]


@pytest.fixture(scope="module")
def catalogue() -> Catalogue:
    return load_catalogue()


@pytest.fixture
def year(catalogue: Catalogue, tmp_path: Path) -> Year:
    """Audit a plant in a year, knowing the record of the one before; each leaves its own record."""

    def run(of: int, tables: dict[str, Any], previous: int | None = None, day: date | None = None) -> Audit:
        audit = audit_fleet(fleet_of(**tables), catalogue, audited_on=day or date(of, 11, 30))
        if previous is not None:
            audit = since_record(audit, read_record(tmp_path / str(previous)))
        write_record(audit, tmp_path / str(of))
        return audit

    return run


def standing(audit: Audit, check: str = DEVICE) -> dict[str, tuple[str, str, int]]:
    found = [finding for finding in FindingRenderer(audit).all() if finding.check == check]
    return {finding.motor: (finding.status, finding.since, finding.audits) for finding in found}


def cleared(audit: Audit, check: str = DEVICE) -> dict[str, tuple[str, str, int, str]]:
    assert audit.previous is not None
    told = [one for one in audit.previous.cleared if one.check == check]
    return {one.name: (one.how, one.since, one.audits, one.cleared_on) for one in told}


def test_without_an_earlier_record_a_finding_is_open(year: Year) -> None:
    assert standing(year(2024, plant(1, fault_max_ka=26))) == {"P-1": ("open", "2024-11-30", 1)}


def test_findings_are_new_or_repeated_with_their_count(year: Year) -> None:
    year(2024, plant(1, fault_max_ka=26))
    second = year(2025, plant(2, fault_max_ka=26), 2024)
    assert standing(second) == {"P-1": ("repeated", "2024-11-30", 2), "P-2": ("new", "2025-11-30", 1)}
    third = year(2026, plant(2, fault_max_ka=26), 2025)
    assert standing(third) == {"P-1": ("repeated", "2024-11-30", 3), "P-2": ("repeated", "2025-11-30", 2)}


def test_a_finding_that_went_is_cleared_with_what_changed_and_may_return(year: Year) -> None:
    year(2023, plant(1, fault_max_ka=26))
    second = year(2024, plant(1, fault_max_ka=20), 2023)
    assert standing(second) == {}
    assert cleared(second) == {"P-1": ("meets now", "2023-11-30", 1, "2024-11-30")}
    assert second.previous is not None
    (one,) = [entry for entry in second.previous.cleared if entry.check == DEVICE]
    assert one.what_changed == ("bus B-1: greatest three-phase fault current at the bus down 23 % (26 kA to 20 kA)",)
    third = year(2025, plant(1, fault_max_ka=20), 2024)
    assert cleared(third) == {"P-1": ("meets now", "2023-11-30", 1, "2024-11-30")}
    fourth = year(2026, plant(1, fault_max_ka=27), 2025)
    assert standing(fourth) == {"P-1": ("returned", "2023-11-30", 2)}


def test_a_finding_that_cannot_be_proven_for_a_year_was_never_cleared(year: Year) -> None:
    year(2024, plant(1, fault_max_ka=26))
    second = year(2025, plant(1, fault_max_ka=None), 2024)
    assert cleared(second) == {"P-1": ("no longer provable", "2024-11-30", 1, "")}
    third = year(2026, plant(1, fault_max_ka=26), 2025)
    assert standing(third) == {"P-1": ("repeated", "2024-11-30", 2)}


def test_a_removed_motor_clears_its_findings(year: Year) -> None:
    year(2024, plant(2, fault_max_ka=26))
    assert cleared(year(2025, plant(1, fault_max_ka=26), 2024))["P-2"][0] == "motor removed"


def test_a_second_run_of_the_same_day_counts_no_further_audit(year: Year) -> None:
    year(2024, plant(1, fault_max_ka=26))
    again = year(2025, plant(1, fault_max_ka=26), 2024, date(2024, 11, 30))
    assert standing(again) == {"P-1": ("repeated", "2024-11-30", 1)}


def test_a_later_record_is_no_previous_one(year: Year) -> None:
    year(2026, plant(1))
    with pytest.raises(Refusal, match="after this audit's day 2025-11-30"):
        year(2025, plant(1), 2026)


def test_a_record_of_version_one_tells_findings_apart(year: Year, catalogue: Catalogue, tmp_path: Path) -> None:
    year(2024, plant(1, fault_max_ka=26))
    (tmp_path / "2024" / "values.jsonl.gz").unlink()
    file = tmp_path / "2024" / "findings.json"
    content = json.loads(file.read_text("utf-8"))
    content["record_version"] = 1
    del content["cleared"]
    for finding in content["findings"]:
        del finding["since"], finding["audits"]
    file.write_text(json.dumps(content), "utf-8")
    second = year(2025, plant(2, fault_max_ka=26), 2024)
    assert standing(second) == {"P-1": ("repeated", "2024-11-30", 2), "P-2": ("new", "2025-11-30", 1)}
    assert second.previous is not None
    assert second.previous.notices == ("the previous record holds no values: what changed cannot be told",)


def drifted(audit: Audit) -> dict[str, str]:
    assert audit.previous is not None
    return {one.relay: one.explained_by for one in audit.previous.settings}


def test_a_setting_that_changed_without_a_listed_change_is_shown(year: Year) -> None:
    year(2024, plant(3))
    after = plant(3)
    for relay in after["relay"]:
        relay["start_timer_delay_s"] = 11
    after["motor"][1]["motor_replaced_date"] = date(2025, 3, 1)
    after["motor"][2]["motor_replaced_date"] = date(2023, 3, 1)
    second = year(2025, after, 2024)
    assert drifted(second) == {
        "R-1": "",
        "R-2": "date of the last replacement or rewind of the motor",
        "R-3": "",
    }


def test_a_setting_changed_as_a_finding_asked_is_explained(year: Year) -> None:
    # the start takes 6 s, the timer 5 s: start-timer-outlasts-start asks for more
    before = plant(1)
    before["relay"][0]["start_timer_delay_s"] = 5
    first = year(2024, before)
    assert "P-1" in standing(first, "start-timer-outlasts-start")
    second = year(2025, plant(1), 2024)
    assert "start-timer-outlasts-start" in drifted(second)["R-1"]
