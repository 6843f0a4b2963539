"""The parts of the record as plain data, one part a function."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import asdict
from importlib.metadata import PackageNotFoundError, version
from math import isfinite
from typing import Any

import numpy as np

from audit.cautions import CAUTIONS
from audit.checks.ranges import NO_CHECK
from audit.findings.accepted import Accepted
from audit.findings.audit import Audit
from audit.findings.costs import costs_of_complaints
from audit.findings.finding import Finding
from audit.findings.render import FindingRenderer
from audit.findings.trends import drifts

RECORD_VERSION = 2
"""1: findings and readings. 2: the values of the fleet beside them, and since when each finding stands."""


def tool_version() -> str:
    """Give the version of the installed tool."""
    try:
        return version("motor-audit")
    except PackageNotFoundError:
        return "from source"


def head(audit: Audit) -> dict[str, Any]:
    """Give what was audited, when, by which rules, and the counts."""
    counts = audit.counts()
    return {
        "record_version": RECORD_VERSION,
        "audited_on": audit.audited_on.isoformat(),
        "tool_version": tool_version(),
        "fleet": audit.fleet.site,
        "cautions": list(CAUTIONS),
        "previous": previous(audit),
        "inputs": [{"file": item.file, "sha256": item.sha256} for item in audit.fleet.inputs],
        "rules": {
            "version": tool_version(),
            "packs": list(audit.packs_in_scope),
            "packs_out_of_scope": list(audit.packs_out_of_scope),
            "overrides": [
                {"kind": c.kind, "name": c.name, "was": c.was, "now": c.now, "reason": c.reason}
                for c in audit.catalogue.changes
            ],
        },
        "counts": {
            "motors": audit.fleet.rows("motor"),
            "checks": len(audit.check_names()),
            "meets": counts["meets"],
            "breach": counts["breach"],
            "unproven": counts["unproven"],
            "not_applicable": counts["not applicable"],
            "no_evidence": audit.without_evidence(),
            "provisional": audit.provisional(),
            "by_severity": audit.by_severity(),
            "accepted": sum(one.holds for one in audit.accepted),
        },
        "accepted_deviations": accepted_deviations(audit),
    }


def accepted_deviations(audit: Audit) -> dict[str, Any] | None:
    """Give the site's table of accepted deviations, and what became of each row."""
    table = audit.accepted_table
    if table is None:
        return None
    rows = [
        {
            "row": one.deviation.row,
            "motor": one.deviation.motor,
            "check": one.deviation.check,
            "setting": one.deviation.setting,
            "reason": one.deviation.reason,
            "accepted_by": one.deviation.accepted_by,
            "until": one.deviation.until.isoformat() if one.deviation.until else None,
            "state": standing(one),
        }
        for one in audit.accepted
    ]
    return {"file": table.file, "sha256": table.sha256, "rows": rows}


def standing(accepted: Accepted) -> str:
    """Say what became of an accepted deviation."""
    if accepted.code is None:
        return "no longer found"
    return f"returned: {accepted.returned_because}" if accepted.returned_because else "accepted"


def number_or_none(value: float | None) -> float | None:
    """Give a number that JSON can hold."""
    return None if value is None or not isfinite(value) else value


def finding_part(finding: Finding) -> dict[str, Any]:
    """Give one finding to the contract of the record."""
    present = finding.present
    if isinstance(present, float) and not isinstance(present, bool):
        present = number_or_none(present)
    return {
        "key": finding.key,
        "subject": finding.subject,
        "name": finding.name,
        "motor": finding.motor,
        "service": finding.service,
        "relay": finding.relay,
        "bus": finding.bus,
        "cubicle": finding.cubicle,
        "function": finding.function,
        "check": finding.check,
        "pack": finding.pack,
        "severity": finding.severity,
        "says": finding.says,
        "judges": finding.judges,
        "label": finding.label,
        "present": present,
        "unit": finding.unit,
        "low": number_or_none(finding.low),
        "high": number_or_none(finding.high),
        "low_set_by": finding.low_set_by,
        "high_set_by": finding.high_set_by,
        "range_state": finding.range_state,
        "margin_pct": None if finding.margin_pct is None else number_or_none(round(finding.margin_pct, 4)),
        "because": finding.because,
        "why": finding.why,
        "remedy": finding.remedy,
        "source": finding.source,
        "cells": [{"file": c.file, "sheet": c.sheet, "cell": c.cell, "quantity": c.quantity} for c in finding.cells],
        "assumptions": list(finding.assumptions),
        "provisional": finding.provisional,
        "setting_group": finding.setting_group,
        "status": finding.status,
        "since": finding.since,
        "audits": finding.audits,
    }


def findings(audit: Audit) -> Iterator[dict[str, Any]]:
    """Give the findings one by one."""
    renderer = FindingRenderer(audit)
    for finding in renderer.all():
        yield finding_part(finding)


def previous(audit: Audit) -> dict[str, Any] | None:
    """Give what was compared with an earlier record, None where none was given."""
    if audit.previous is None:
        return None
    return {"audited_on": audit.previous.audited_on, "notices": list(audit.previous.notices)}


def cleared(audit: Audit) -> Iterator[dict[str, Any]]:
    """Give the findings of earlier audits that are not found any more."""
    for one in audit.previous.cleared if audit.previous is not None else ():
        yield asdict(one)


def setting_changes(audit: Audit) -> Iterator[dict[str, Any]]:
    """Give the settings that changed since the earlier record, and what explains each."""
    for one in audit.previous.settings if audit.previous is not None else ():
        yield asdict(one)


def trends(audit: Audit) -> Iterator[dict[str, Any]]:
    """Give the start times and start currents that drift toward a limit."""
    for drift in drifts(audit.workings):
        yield asdict(drift)


def unproven(audit: Audit) -> Iterator[dict[str, Any]]:
    """Give what is unproven, grouped by check and missing data."""
    for group in audit.unproven:
        subject = _subject_of(audit, group.check)
        keys = audit.fleet.tables[subject].keys
        yield {
            "check": group.check,
            "severity": group.severity,
            "subject": subject,
            "lacking": list(group.lacking),
            "rows": [keys[row] for row in group.rows.tolist()],
        }


def _subject_of(audit: Audit, check_key: str) -> str:
    return next(outcome.check.subject for outcome in audit.outcomes if outcome.check.key == check_key)


def ranges(audit: Audit) -> Iterator[dict[str, Any]]:
    """Give every permissible range with at least one end."""
    keys = audit.fleet.tables["motor"].keys
    for band in audit.ranges.values():
        quantity = audit.workings.quantities[band.setting]
        present = audit.workings.column("motor", band.setting).values
        states = band.states()
        for row in np.flatnonzero(band.bounded()).tolist():
            yield {
                "motor": keys[row],
                "setting": band.setting,
                "unit": quantity.unit.symbol if quantity.unit else "",
                "present": number_or_none(float(present[row])),
                "low": number_or_none(float(band.low[row])),
                "low_set_by": _check_key(audit, int(band.low_check[row])),
                "high": number_or_none(float(band.high[row])),
                "high_set_by": _check_key(audit, int(band.high_check[row])),
                "preferred_low": number_or_none(float(band.preferred_low[row])),
                "preferred_high": number_or_none(float(band.preferred_high[row])),
                "state": ", ".join(word for word, holds in states if holds[row]),
            }


def _check_key(audit: Audit, number: int) -> str:
    return "" if number == NO_CHECK else audit.outcomes[number].check.key


def data_to_collect(audit: Audit) -> Iterator[dict[str, Any]]:
    """Give the data that would settle most, most urgent first."""
    for wanted in audit.data_to_collect:
        keys = audit.fleet.tables[wanted.subject].keys
        yield {
            "datum": wanted.datum,
            "label": wanted.label,
            "subject": wanted.subject,
            "verdicts": wanted.verdicts(),
            "by_severity": dict(wanted.by_severity),
            "checks": list(wanted.checks),
            "rows": [keys[row] for row in wanted.rows.tolist()],
        }


def per_check(audit: Audit) -> dict[str, dict[str, Any]]:
    """Give the four counts of each check, which add up to the rows of its subject."""
    result: dict[str, dict[str, Any]] = {}
    for outcome in audit.outcomes:
        if outcome.check.stage == "ranges":
            continue
        counts = outcome.counts()
        result[outcome.check.key] = {
            "subject": outcome.check.subject,
            "pack": outcome.check.pack,
            "severity": outcome.check.severity,
            "rows": len(outcome.verdict),
            "meets": counts["meets"],
            "breach": counts["breach"],
            "unproven": counts["unproven"],
            "not_applicable": counts["not applicable"],
            "no_evidence": int(outcome.no_evidence.sum()),
            "provisional": int(outcome.provisional.sum()),
        }
    return result


def complaints(audit: Audit) -> Iterator[dict[str, Any]]:
    """Give what could not be used of the inputs."""
    costs = costs_of_complaints(audit)
    for item, cost in zip(audit.fleet.complaints, costs, strict=True):
        yield {
            "weight": item.weight,
            "file": item.file,
            "sheet": item.sheet,
            "cell": item.cell,
            "found": item.found,
            "expected": item.expected,
            "advice": item.advice,
            "quantity": item.quantity,
            "subject": item.subject,
            "key": item.key,
            "costs": list(cost),
        }


def questions(audit: Audit) -> Iterator[dict[str, Any]]:
    """Give what the reader did not guess."""
    for item in audit.fleet.questions:
        yield {
            "file": item.file,
            "sheet": item.sheet,
            "cell": item.cell,
            "about": item.about,
            "ask": item.ask,
            "answers": list(item.answers),
        }
