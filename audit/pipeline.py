"""The whole job as one function: read, derive, judge, gather."""

from __future__ import annotations

from collections.abc import Callable, Iterable
from dataclasses import replace
from datetime import date
from pathlib import Path

import numpy as np

from audit.checks.catalogue import CORE, Catalogue, load_catalogue
from audit.checks.entry import Check
from audit.checks.ranges import permissible_ranges
from audit.checks.verdicts import NOT_APPLICABLE, Outcome, evaluate_check
from audit.derivation.groups import with_groups
from audit.derivation.register_facts import with_register_facts
from audit.derivation.workings import Workings
from audit.expression.units import nearest
from audit.findings.accepted import read_deviations
from audit.findings.accepting import with_accepted
from audit.findings.audit import Audit
from audit.findings.collect import unproven_and_wanted
from audit.findings.finding import FindingCode
from audit.findings.gather import breaches, in_order, of_ranges, with_exceptions
from audit.findings.history import with_previous
from audit.findings.other_groups import as_if_active, breaches_of_group
from audit.fleet.fleet import Fleet
from audit.intake import read_fleet
from audit.refusal import Refusal
from audit.report.record.read import Record

Progress = Callable[[str], None]


def packs_in_scope(catalogue: Catalogue, fleet: Fleet, wanted: Iterable[str] = ()) -> tuple[str, ...]:
    """Give the packs that apply: core always, others when the fleet has their data or the site asks."""
    of_site = (name for name in fleet.facts.get("packs", "").split(",") if name.strip())
    asked = {name.strip().casefold().replace("-", " ") for name in (*wanted, *of_site)}
    for name in sorted(asked.difference(catalogue.packs())):
        known = ", ".join(catalogue.packs())
        raise Refusal(f"'{name}' is not a pack{nearest(name, catalogue.packs())}. Accepted: {known}.")
    chosen = []
    for name in catalogue.packs():
        evidence = catalogue.pack_evidence.get(name, ())
        has_data = any(_has_data(fleet, catalogue, quantity) for quantity in evidence)
        if name == CORE or name in asked or has_data:
            chosen.append(name)
    return tuple(chosen)


def _has_data(fleet: Fleet, catalogue: Catalogue, name: str) -> bool:
    table = fleet.tables.get(catalogue.quantities[name].subject)
    column = table.columns.get(name) if table else None
    return column is not None and bool((column.cell >= 0).any())


def audit_fleet(fleet: Fleet, catalogue: Catalogue, *, audited_on: date, packs: Iterable[str] = ()) -> Audit:
    """Judge a fleet that was read."""
    return judge_fleet(with_register_facts(with_groups(fleet)), catalogue, audited_on=audited_on, packs=packs)


def judge_fleet(grouped: Fleet, catalogue: Catalogue, *, audited_on: date, packs: Iterable[str] = ()) -> Audit:
    """Judge a fleet that has its groups and the facts of its register."""
    scope = packs_in_scope(catalogue, grouped, packs)
    checks = [check for check in catalogue.checks if check.pack in scope]
    workings = _workings(grouped, catalogue, audited_on)
    outcomes = _judged(checks, workings)
    ranges = permissible_ranges(outcomes, workings)
    codes: list[FindingCode] = breaches(outcomes)
    for number, check in enumerate(checks):
        if check.stage == "ranges":
            codes += of_ranges(number, check, ranges, workings)
    unproven, wanted = unproven_and_wanted(outcomes, workings)
    audit = Audit(
        fleet=grouped,
        catalogue=catalogue,
        workings=workings,
        outcomes=tuple(outcomes),
        ranges=ranges,
        codes=in_order(codes, outcomes),
        unproven=unproven,
        data_to_collect=wanted,
        packs_in_scope=scope,
        packs_out_of_scope=tuple(name for name in catalogue.packs() if name not in scope),
        audited_on=audited_on,
    )
    return _with_other_groups(audit, checks)


def _with_other_groups(audit: Audit, checks: list[Check]) -> Audit:
    """Judge each other setting group that can be selected, and add what breaks in it alone."""
    groups: dict[str, Audit] = {}
    codes = list(audit.codes)
    for name, rows in audit.fleet.other_groups:
        fleet = as_if_active(audit.fleet, rows)
        workings = _workings(fleet, audit.catalogue, audit.audited_on)
        outcomes = _judged(checks, workings)
        ranges = permissible_ranges(outcomes, workings)
        codes += breaches_of_group(name, rows, outcomes, audit.codes, audit.catalogue)
        groups[name] = replace(audit, fleet=fleet, workings=workings, outcomes=tuple(outcomes), ranges=ranges, codes=())
    return replace(audit, codes=in_order(codes, audit.outcomes), other_groups=groups) if groups else audit


def _workings(fleet: Fleet, catalogue: Catalogue, audited_on: date) -> Workings:
    return Workings(fleet, catalogue.quantities, catalogue.recipes, catalogue.limits, catalogue.functions, audited_on)


def _judged(checks: list[Check], workings: Workings) -> list[Outcome]:
    return with_exceptions(
        [_nothing(check) if check.stage == "ranges" else evaluate_check(check, workings) for check in checks]
    )


def _nothing(check: Check) -> Outcome:
    """Checks that look at ranges stand outside the counts."""
    none = np.zeros(0, dtype=np.int8)
    flags = np.zeros(0, dtype=bool)
    return Outcome(check, np.full(0, NOT_APPLICABLE, dtype=np.int8), flags, flags, none, ())


def audit_path(
    path: Path,
    *,
    site_rules: Path | None = None,
    packs: Iterable[str] = (),
    audited_on: date | None = None,
    progress: Progress | None = None,
) -> Audit:
    """Read a fleet folder or workbook and judge it."""
    catalogue = load_catalogue(site_rules)
    fleet = read_fleet(path, progress)
    if progress is not None:
        progress("judging")
    audit = audit_fleet(fleet, catalogue, audited_on=audited_on or date.today(), packs=packs)
    return with_accepted(audit, read_deviations(path))


def since_record(audit: Audit, record: Record) -> Audit:
    """Give an audit that knows what an earlier record said: which findings are new, repeated, returned, cleared."""
    before = None
    if record.fleet is not None:
        scope = audit.packs_in_scope
        before = judge_fleet(record.fleet, audit.catalogue, audited_on=record.audited_on, packs=scope)
    return with_previous(audit, record.content, before)
