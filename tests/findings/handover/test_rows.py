"""What is issued and what is held back."""

from __future__ import annotations

from datetime import date

import numpy as np
import pytest

from audit.checks.catalogue import load_catalogue
from audit.findings.handover.rows import WorkRow, work_rows
from audit.findings.handover.written import step_of
from audit.findings.render import FindingRenderer
from audit.fleet.build import fleet_of
from audit.pipeline import audit_fleet

MOTOR = {"motor": "P-1", "full_load_a": 100, "rated_voltage_v": 400, "starting_method": "direct", "rated_power_kw": 55}
RELAY = {"relay_tag": "R-1", "short_circuit_trip_on": True, "short_circuit_trip_pickup_a": 700}
CHECK = "short-circuit-rides-through-start"


def row_of(motor: dict[str, object], relay: dict[str, object]) -> WorkRow:
    audit = audit_fleet(fleet_of(motor=[motor], relay=[relay]), load_catalogue(), audited_on=date(2026, 10, 1))
    rows = work_rows(audit, FindingRenderer(audit).all())
    return next(row for row in rows if row.finding.check == CHECK)


def test_an_assumed_datum_holds_the_row_back() -> None:
    """Without a locked-rotor current the start is assumed at 8.5 x 100 A: nothing may be issued on that."""
    row = row_of(MOTOR, RELAY)
    assert row.finding.provisional
    assert row.held.startswith("HELD BACK")
    assert row.proposal.value is None
    assert "provisional" in row.proposal.how


def test_the_datum_that_holds_it_back_is_named() -> None:
    """Nobody says what the cable is made of: the high end, which protects it, may lie elsewhere."""
    row = row_of({**MOTOR, "locked_rotor_a": 600}, RELAY)
    assert "provisional" in row.finding.range_state
    assert "conductor" in row.held


def test_a_row_is_known_by_keys_that_stay() -> None:
    row = row_of({**MOTOR, "locked_rotor_a": 600}, RELAY)
    assert row.low == pytest.approx(1020)  # 1.7 x 600 A
    assert row.key == f"P-1|{CHECK}|short_circuit_trip_pickup_a"
    assert row.setting_key == "R-1|short_circuit_trip_pickup_a"
    assert row.function == "50 short-circuit"


@pytest.mark.parametrize(
    ("numbers", "step"), [([1, 20, 300], 1.0), ([1.25, 0.8], 0.01), ([0.0125], 0.0001), ([1 / 3], 0.0001)]
)
def test_the_step_is_one_of_the_last_digit_written(numbers: list[float], step: float) -> None:
    assert step_of(np.array(numbers, dtype=float)) == pytest.approx(step)
