"""The same fleet gives the same findings, whatever its units, the order of its rows and the names of its files."""

from __future__ import annotations

import random
from collections import Counter
from collections.abc import Callable
from pathlib import Path

import pytest

from audit.findings.audit import Audit
from audit.findings.render import FindingRenderer
from audit.pipeline import audit_path
from tests.proofs.fleets import AUDITED_ON, Audits
from tests.proofs.other_units import PLAIN, PRIMARY, RELATIVE, US, write_in_other_units
from tests.sites.tarnholt.sample import sample_site
from tests.sites.writing.site_folder import write_site

HOW_IT_IS_WRITTEN = ("setting-base-stated",)
"""Checks of the writing itself: they apply to settings written as multiples, and to no others."""
OTHER_NAMES = {
    "motor_list.xlsx": "z_drives.xlsx",
    "relay_settings_switchgear.xlsx": "y_read_out.xlsx",
    "relay_settings_lv_mcc.xlsx": "b_read_out.xlsx",
    "bus_list.xlsx": "c_boards.xlsx",
    "start_records_mv.csv": "a_starts.csv",
    "start_records_lv.xlsx": "x_starts.xlsx",
}
"""New names, under which the files come in another order."""


def write_in_other_order(folder: Path) -> None:
    """Write the sample with the rows of all lists shuffled and its files renamed."""
    site, chance = sample_site().site, random.Random(3)
    for rows in (site.buses, site.motors, site.relays, site.starts):
        chance.shuffle(rows)
    write_site(site, folder)
    for name, other in OTHER_NAMES.items():
        (folder / name).rename(folder / other)


WAYS: dict[str, Callable[[Path], None]] = {
    "hp, kV, ms, ft; all settings in amperes, volts, seconds": lambda folder: write_in_other_units(
        sample_site().site, folder, PRIMARY, US
    ),
    "PS, A, min; settings as other multiples, secondary values, cycles": lambda folder: write_in_other_units(
        sample_site().site, folder, RELATIVE, PLAIN
    ),
    "rows and files in another order": write_in_other_order,
}


@pytest.fixture(scope="module", params=WAYS)
def otherwise(request: pytest.FixtureRequest, tmp_path_factory: pytest.TempPathFactory) -> Audit:
    """Give the audit of the sample written in another way."""
    folder = tmp_path_factory.mktemp("otherwise") / "site"
    WAYS[request.param](folder)
    return audit_path(folder, audited_on=AUDITED_ON)


def found(audit: Audit) -> Counter[tuple[str, str, str, str]]:
    """Give the findings by what they are about."""
    return Counter((f.subject, f.name, f.check, f.severity) for f in FindingRenderer(audit).all())


def verdicts(audit: Audit) -> dict[tuple[str, str], int]:
    """Give every verdict by check and row."""
    return {
        (outcome.check.key, key): verdict
        for outcome in audit.outcomes
        if outcome.check.stage == "rows" and outcome.check.name not in HOW_IT_IS_WRITTEN
        for key, verdict in zip(audit.fleet.tables[outcome.check.subject].keys, outcome.verdict.tolist(), strict=True)
    }


def written(audit: Audit) -> set[tuple[str, str]]:
    """Give the units and bases in which something is written at least thirty times."""
    readings = audit.fleet.readings
    kinds = readings[readings["state"] == "value"].groupby(["unit", "base"], observed=True).size()
    return {(str(unit), str(base)) for (unit, base), count in kinds.items() if count >= 30}


def test_the_other_ways_are_other_ways(audits: Audits, otherwise: Audit) -> None:
    as_usual, now = written(audits["sample"]), written(otherwise)
    assert {("kw", ""), ("x", "full_load"), ("x", "ct"), ("v", "secondary")} <= as_usual
    in_amperes = {("hp", ""), ("kv", ""), ("ft", ""), ("lbft2", ""), ("mohm", "")}
    relative = {("ps", ""), ("a", "secondary"), ("pct", "full_load"), ("pct", "motor_voltage"), ("cycles", "")}
    assert now == as_usual or in_amperes <= now or relative <= now
    assert not (in_amperes <= now and {("x", "ct"), ("a", "secondary")} & now)


def test_findings_are_the_same(audits: Audits, otherwise: Audit) -> None:
    assert sum(found(audits["sample"]).values()) > 200
    assert found(otherwise) == found(audits["sample"])


def test_every_verdict_is_the_same(audits: Audits, otherwise: Audit) -> None:
    before, after = verdicts(audits["sample"]), verdicts(otherwise)
    assert before.keys() == after.keys()
    assert [(where, before[where], after[where]) for where in before if before[where] != after[where]] == []


def test_present_values_and_bounds_are_the_same(audits: Audits, otherwise: Audit) -> None:
    # settings are written to seven figures
    before = {finding.key: finding for finding in FindingRenderer(audits["sample"]).all()}
    numbers = 0
    for finding in FindingRenderer(otherwise).all():
        was = before[finding.key]
        for now, then in ((finding.present, was.present), (finding.low, was.low), (finding.high, was.high)):
            if isinstance(now, float) and isinstance(then, float):
                assert now == pytest.approx(then, rel=1e-5, abs=1e-9), finding.key
                numbers += 1
    assert numbers > 200
