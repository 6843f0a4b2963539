"""Run worked cases through the real evaluator: a small fleet is made of what a case gives."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from dataclasses import dataclass, replace
from datetime import date
from typing import Any

import numpy as np

from audit.checks.catalogue import Catalogue
from audit.checks.entry import Case, Check
from audit.checks.ranges import permissible_ranges
from audit.checks.slips import range_hits
from audit.checks.verdicts import VERDICT_NAMES, evaluate_check
from audit.derivation.register_facts import with_register_facts
from audit.derivation.workings import Workings
from audit.expression.units import nearest
from audit.fleet.build import column_of, fleet_of
from audit.fleet.column import NO_ROW
from audit.fleet.fleet import Fleet, Table
from audit.limits.limits import BadRule

_KEYS = ("motor", "motors", "starts", "bus", "group", "audited_on")
AUDITED_ON = date(2026, 1, 1)
"""Day of the audit in cases that name none."""


@dataclass(frozen=True, slots=True)
class CaseResult:
    """What a worked case gave, beside what it must give."""

    check: Check
    case: Case
    found: str

    def holds(self) -> bool:
        """Tell whether the case gives what it says."""
        return self.found == self.case.gives


def run_cases(catalogue: Catalogue) -> list[CaseResult]:
    """Run every worked case of every check."""
    return [run_case(catalogue, check, case) for check in catalogue.checks for case in check.cases]


def run_case(catalogue: Catalogue, check: Check, case: Case) -> CaseResult:
    """Run one worked case."""
    workings = case_workings(catalogue, check, case)
    if check.stage == "ranges":
        return CaseResult(check, case, _in_ranges(catalogue, check, workings))
    outcome = evaluate_check(check, workings)
    found = VERDICT_NAMES[int(outcome.verdict[0])] if len(outcome.verdict) else "no row"
    return CaseResult(check, case, found)


def _in_ranges(catalogue: Catalogue, check: Check, workings: Workings) -> str:
    """Judge the ranges that all other checks leave to the first motor of a case; unproven where none has two ends."""
    outcomes = [evaluate_check(other, workings) for other in catalogue.checks if other.stage == "rows"]
    bands = permissible_ranges(outcomes, workings).values()
    if any(range_hits(check, band, workings)[0] for band in bands):
        return "breach"
    closed = [~np.isnan(band.low[0]) and ~np.isnan(band.high[0]) and not band.assumed_end[0] for band in bands]
    return "meets" if any(closed) else "unproven"


def case_workings(catalogue: Catalogue, check: Check, case: Case) -> Workings:
    """Make the fleet of a case, with the derived quantities that it gives put in place of their recipes."""
    unknown = sorted(set(case.given) - set(_KEYS))
    if unknown:
        raise BadRule(check.file, check.name, f"'{unknown[0]}' is not a key of a case{nearest(unknown[0], _KEYS)}")
    motors = _repeated(case.given.get("motors", [case.given.get("motor", {})]))
    rows: dict[str, list[dict[str, Any]]] = {
        "motor": [{} for _ in motors],
        "relay": [{"relay_tag": f"relay {number}"} for number, _ in enumerate(motors)],
        "bus": [{}],
        "start": [],
    }
    derived: dict[str, dict[int, Any]] = {}

    def put(name: str, value: Any, row: int) -> None:
        quantity = catalogue.quantities.get(name)
        if quantity is None:
            problem = f"a case gives '{name}', which is not a known name{nearest(name, catalogue.quantities)}"
            raise BadRule(check.file, check.name, problem)
        at = row if quantity.subject in ("motor", "relay", "start") else 0
        if quantity.role == "derived":
            derived.setdefault(name, {})[at] = value
        else:
            rows[quantity.subject][at][name] = value

    for row, given in enumerate(motors):
        for name, value in given.items():
            put(name, value, row)
    for name, value in {**case.given.get("bus", {}), **case.given.get("group", {})}.items():
        put(name, value, 0)
    for row, given in enumerate(case.given.get("starts", [])):
        rows["start"].append({})
        for name, value in given.items():
            put(name, value, row)
    fleet = _with_one_group(fleet_of(rows["motor"], rows["relay"], rows["bus"], rows["start"]), len(motors))
    workings = Workings(
        with_register_facts(fleet),
        catalogue.quantities,
        catalogue.recipes,
        catalogue.limits,
        catalogue.functions,
        case.given.get("audited_on", AUDITED_ON),
    )
    for name, values in derived.items():
        quantity = catalogue.quantities[name]
        size = fleet.rows(quantity.subject)
        workings.preset(name, column_of(quantity, [values.get(row) for row in range(size)]))
    return workings


def _repeated(motors: Iterable[Mapping[str, Any]]) -> list[Mapping[str, Any]]:
    """Give the motors of a case; one with the key `times` stands for so many alike."""
    return [
        {name: value for name, value in given.items() if name != "times"}
        for given in motors
        for _ in range(int(given.get("times", 1)))
    ]


def _with_one_group(fleet: Fleet, motors: int) -> Fleet:
    everyone = np.zeros(motors, dtype=np.int64)
    tables = {**fleet.tables, "sisters": Table("sisters", ("group",), {}), "peers": Table("peers", ("group",), {})}
    starts = np.where(fleet.links["start", "motor"] == NO_ROW, 0, fleet.links["start", "motor"])
    links = {
        **fleet.links,
        ("motor", "sisters"): everyone,
        ("motor", "peers"): everyone,
        ("motor", "bus"): everyone,
        ("start", "motor"): starts,
    }
    return replace(fleet, tables=tables, links=links)
