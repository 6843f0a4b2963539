"""A comparison as plain data."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import asdict
from math import isfinite
from typing import Any

from audit.cautions import CAUTIONS
from audit.findings.audit import Audit
from audit.findings.comparison import Comparison
from audit.findings.comparison.changes import Change
from audit.findings.comparison.provable import ProofChange
from audit.findings.comparison.standing import FindingChange
from audit.findings.comparison.steps import Chain, chain_words
from audit.findings.comparison.touched import Touched
from audit.fleet.addresses import Place
from audit.report.record.parts import tool_version

COMPARISON_VERSION = 1


def comparison_part(comparison: Comparison) -> dict[str, Any]:
    """Give a whole comparison."""
    return {
        "comparison_version": COMPARISON_VERSION,
        "tool_version": tool_version(),
        "cautions": list(CAUTIONS),
        "before": _side(comparison.before, comparison.sources[0]),
        "after": _side(comparison.after, comparison.sources[1]),
        "moved_by_more_than_pct": comparison.share_pct,
        "supposed": [asdict(one) for one in comparison.supposed],
        "notices": list(comparison.notices),
        "counts": {
            "changed": len(comparison.changed),
            "rows": len(comparison.rows),
            "findings": comparison.standing_counts(),
            "touched": len(comparison.touched),
            "no_longer_provable": len(comparison.no_longer_provable),
            "provable_now": len(comparison.provable_now),
            "looked_at": sum(len(one.names) for one in comparison.looked_at),
            "by_hand": sum(not one.names for one in comparison.looked_at),
        },
        "changed": [_change(change) for change in comparison.changed],
        "rows": [asdict(row) for row in comparison.rows],
        "starts": [asdict(change) for change in comparison.starts],
        "relays": [asdict(relay) for relay in comparison.relays],
        "findings": [_finding(finding) for finding in comparison.findings],
        "touched": [_touched(one) for one in comparison.touched],
        "no_longer_provable": _proofs(comparison.no_longer_provable),
        "provable_now": _proofs(comparison.provable_now),
        "looked_at": [asdict(one) for one in comparison.looked_at],
    }


def _side(audit: Audit, source: str) -> dict[str, Any]:
    return {
        "fleet": audit.fleet.site,
        "source": source,
        "audited_on": audit.audited_on.isoformat(),
        "motors": audit.fleet.rows("motor"),
        "packs": list(audit.packs_in_scope),
        "inputs": [{"file": item.file, "sha256": item.sha256} for item in audit.fleet.inputs],
        "by_severity": audit.by_severity(),
    }


def _place(place: Place | None) -> dict[str, str] | None:
    return None if place is None else place._asdict()


def _change(change: Change) -> dict[str, Any]:
    return {
        "subject": change.subject,
        "name": change.name,
        "motor": change.motor,
        "quantity": change.quantity,
        "label": change.label,
        "role": change.role,
        "kind": change.kind,
        "unit": change.unit,
        "before": change.before,
        "after": change.after,
        "before_text": change.before_text,
        "after_text": change.after_text,
        "before_cell": _place(change.before_cell),
        "after_cell": _place(change.after_cell),
        "follows": list(change.follows),
    }


def _rounded(value: float | None) -> float | None:
    return None if value is None or not isfinite(value) else round(value, 4)


def _finding(finding: FindingChange) -> dict[str, Any]:
    part = asdict(finding)
    part["margin_before_pct"] = _rounded(finding.margin_before_pct)
    part["margin_after_pct"] = _rounded(finding.margin_after_pct)
    return part


def chain_part(chain: Chain) -> list[dict[str, Any]]:
    """Give the steps of a chain, the changed datum first."""
    return [{**asdict(step), "share_pct": _rounded(step.share_pct), "says": step.words()} for step in chain]


def _touched(one: Touched) -> dict[str, Any]:
    return {
        "subject": one.subject,
        "name": one.name,
        "motor": one.motor,
        "what": one.move.what,
        "check": one.move.check,
        "function": one.move.function,
        "setting": one.move.setting,
        "end": one.move.end,
        "before": _plain(one.move.before),
        "after": _plain(one.move.after),
        "before_text": one.before_text,
        "after_text": one.after_text,
        "chain": chain_part(one.chain),
        "says": one.words(),
        "further": one.further,
    }


def _plain(value: str | float | None) -> str | float | None:
    return value if isinstance(value, str) else _rounded(value)


def _proofs(proofs: Iterable[ProofChange]) -> list[dict[str, Any]]:
    return [
        {**asdict(proof), "chain": chain_part(proof.chain), "because": " -> ".join(chain_words(proof.chain))}
        for proof in proofs
    ]
