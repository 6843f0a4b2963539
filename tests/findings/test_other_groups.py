"""Other setting groups: judged as if active, named in the finding, silent where they break nothing of their own."""

from __future__ import annotations

from dataclasses import replace
from datetime import date
from typing import Any

import numpy as np
import pytest

from audit.checks.catalogue import Catalogue, load_catalogue
from audit.findings.finding import Finding
from audit.findings.render import FindingRenderer
from audit.fleet.build import fleet_of
from audit.pipeline import audit_fleet

MOTOR = {
    "overload_device": "motor relay",
    "starting_method": "DOL",
    "full_load_a": 100,
    "running_current_a": 100,
    "locked_rotor_a": 600,
}


@pytest.fixture(scope="module")
def catalogue() -> Catalogue:
    return load_catalogue()


def jam_findings(catalogue: Catalogue, *pickups: float, others: list[int]) -> list[Finding]:
    """Two motors on one relay row each; the further rows are group 2 of the relay of the first motor."""
    relays: list[dict[str, Any]] = [
        {
            "relay_tag": ("R-1", "R-2", "R-1")[row],
            "setting_group": "2" if row > 1 else "1",
            "jam_trip_on": True,
            "jam_trip_pickup_a": a,
        }
        for row, a in enumerate(pickups)
    ]
    motors = [{"motor": "P-1", "relay": "R-1", **MOTOR}, {"motor": "P-2", "relay": "R-2", **MOTOR}]
    fleet = replace(fleet_of(motor=motors, relay=relays), other_groups=(("2", np.array(others)),))
    audit = audit_fleet(fleet, catalogue, audited_on=date(2026, 1, 1))
    return [finding for finding in FindingRenderer(audit).all() if finding.judges == "jam_trip_pickup_a"]


def test_a_group_that_breaks_a_bound_is_named_with_its_own_value(catalogue: Catalogue):
    # at least 1.2 x 100 A = 120 A, at most 0.75 x 600 A = 450 A
    found = jam_findings(catalogue, 200, 200, 115, others=[2, -1])
    assert [(finding.motor, finding.check, finding.setting_group, finding.present) for finding in found] == [
        ("P-1", "jam-pickup-above-load", "2", 115.0)
    ]
    assert "115 A" in found[0].because
    assert found[0].key.endswith("group 2")


def test_a_group_that_breaks_nothing_is_silent(catalogue: Catalogue):
    assert jam_findings(catalogue, 200, 200, 300, others=[2, -1]) == []


def test_what_breaks_alike_in_both_groups_is_said_once(catalogue: Catalogue):
    found = jam_findings(catalogue, 115, 200, 115, others=[2, -1])
    assert [(finding.motor, finding.setting_group) for finding in found] == [("P-1", "")]


def test_both_groups_are_named_where_each_breaks_in_its_own_way(catalogue: Catalogue):
    found = jam_findings(catalogue, 110, 200, 115, others=[2, -1])
    assert sorted((finding.setting_group, finding.present) for finding in found) == [("", 110.0), ("2", 115.0)]


def test_other_groups_do_not_count_in_the_four_verdicts(catalogue: Catalogue):
    fleet = fleet_of(
        motor=[{"motor": "P-1", "relay": "R-1", **MOTOR}],
        relay=[{"relay_tag": "R-1", "jam_trip_on": True, "jam_trip_pickup_a": a} for a in (200, 115)],
    )
    plain = audit_fleet(fleet, catalogue, audited_on=date(2026, 1, 1))
    grouped = audit_fleet(replace(fleet, other_groups=(("2", np.array([1])),)), catalogue, audited_on=date(2026, 1, 1))
    assert grouped.counts() == plain.counts()
    assert len(grouped.codes) == len(plain.codes) + 1
