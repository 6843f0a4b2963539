"""What a finding says beyond its bound: the slip, the likely cause, the row of a group that decided, dates."""

from __future__ import annotations

from datetime import date
from typing import Any

import pytest

from audit.checks.catalogue import Catalogue, load_catalogue
from audit.findings.finding import Finding
from audit.findings.render import FindingRenderer
from audit.fleet.build import fleet_of
from audit.pipeline import audit_fleet

AUDITED_ON = date(2026, 1, 1)


@pytest.fixture(scope="module")
def catalogue() -> Catalogue:
    return load_catalogue()


def findings(catalogue: Catalogue, check: str, *packs: str, **tables: Any) -> list[Finding]:
    audit = audit_fleet(fleet_of(**tables), catalogue, audited_on=AUDITED_ON, packs=packs)
    return [finding for finding in FindingRenderer(audit).all() if finding.check == check]


def test_kilowatts_taken_for_horsepower_are_named(catalogue: Catalogue):
    # 100 hp (74.57 kW), 400 V, 94.5 %, 0.86: 132.4 A; entered as 100 kW, for which 177.6 A would be right
    motor = {"motor": "P-1", "rated_power_kw": 100, "rated_voltage_v": 400, "efficiency_pct": 94.5}
    found = findings(
        catalogue, "register-full-load-plausible", motor=[{**motor, "power_factor": 0.86, "full_load_a": 132.4}]
    )
    assert [finding.name for finding in found] == ["P-1"]
    assert "multiplied by 1.341 it would fit: kilowatts and horsepower" in found[0].because


def test_an_error_that_no_slip_explains_names_none(catalogue: Catalogue):
    # expected 133.2 A within 10 %; 160 A is 1.2 times too much: no slip of the list
    motor = {"motor": "P-1", "rated_power_kw": 75, "rated_voltage_v": 400, "efficiency_pct": 94.5}
    found = findings(
        catalogue, "register-full-load-plausible", motor=[{**motor, "power_factor": 0.86, "full_load_a": 160}]
    )
    assert len(found) == 1
    assert "it would fit" not in found[0].because


def test_a_setting_entered_in_kiloamperes_is_a_finding_of_its_own(catalogue: Catalogue):
    # between 1.2 x 100 A and 0.75 x 190 A = 142.5 A; 0.13 A is 130 A in kA
    found = findings(
        catalogue,
        "setting-unit-slip",
        motor=[
            {
                "motor": "P-1",
                "overload_device": "motor relay",
                "starting_method": "DOL",
                "full_load_a": 100,
                "running_current_a": 100,
                "locked_rotor_a": 190,
            }
        ],
        relay=[{"jam_trip_on": True, "jam_trip_pickup_a": 0.13}],
    )
    assert [(finding.judges, finding.severity) for finding in found] == [("jam_trip_pickup_a", "inconsistent")]
    assert "multiplied by 1,000 it would fit" in found[0].because
    assert found[0].range_text == "120 to 142.5 A"
    assert found[0].present == 0.13


def sister(number: int, pickup: float) -> tuple[dict[str, object], dict[str, object]]:
    motor = {
        "motor": f"P-{number}",
        "relay": f"R-{number}",
        "motor_make": "Anyone",
        "rated_power_kw": 75,
        "rated_voltage_v": 400,
        "rated_speed_rpm": 1480,
        "starting_method": "DOL",
        "driven_machine": "pump",
        "overload_device": "motor relay",
    }
    return motor, {"relay_tag": f"R-{number}", "jam_trip_on": True, "jam_trip_pickup_a": pickup}


def test_the_sister_that_stands_apart_is_named_with_its_value(catalogue: Catalogue):
    pairs = [sister(1, 200), sister(2, 200), sister(3, 260)]
    found = findings(
        catalogue,
        "sisters-agree/jam_trip_pickup_a",
        motor=[motor for motor, _ in pairs],
        relay=[relay for _, relay in pairs],
    )
    assert [finding.motor for finding in found] == ["P-3"]
    # (260 - 200) / 200 = 30 %
    assert "30 %, at most 10 % wanted" in found[0].because
    assert "jam pickup 260 A" in found[0].because


def test_dates_read_as_dates(catalogue: Catalogue):
    found = findings(
        catalogue,
        "register-relay-file-current",
        motor=[{"motor": "P-1", "relay": "R-1", "ct_changed_date": "2025-10-02"}],
        relay=[{"relay_tag": "R-1", "settings_export_date": "2025-09-01"}],
    )
    assert [finding.because for finding in found] == [
        "date of the settings export 2025-09-01, at least 2025-10-02 wanted"
    ]


@pytest.mark.parametrize(
    ("unbalance_pct", "cause"),
    [(195.0, "one CT reversed"), (52.0, "one CT missing"), (100.0, "one phase of the motor open")],
)
def test_a_metered_unbalance_points_at_its_cause(catalogue: Catalogue, unbalance_pct: float, cause: str):
    # sequence components by hand: one current turned round I2/I1 = 2, one missing 1/2, two equal and opposite 1
    motor = {"full_load_a": 100, "metered_relay_current_a": 80, "metered_unbalance_pct": unbalance_pct}
    found = findings(catalogue, "metered-unbalance-plausible", "metering", motor=[motor])
    assert len(found) == 1
    assert cause in found[0].because


def test_facts_are_said_with_yes_and_no_and_settings_with_on_and_off(catalogue: Catalogue):
    found = findings(catalogue, "register-relay-has-settings", motor=[{"motor": "P-1", "relay": "R-1"}])
    assert found[0].because == "settings of the named relay are found: no, wanted: yes"
