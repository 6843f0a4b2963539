"""Verdicts that can no longer be given, with what is lacking; and those that can be given now."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from audit.checks.entry import Severity
from audit.checks.verdicts import BREACH, MEETS, UNPROVEN, VERDICT_NAMES, data_lacking
from audit.findings.collect import NOT_CALCULABLE, label_of
from audit.findings.comparison.alignment import Pair
from audit.findings.comparison.chains import Chains
from audit.findings.comparison.changes import Changes
from audit.findings.comparison.moves import Move, outcomes_by_key
from audit.findings.comparison.steps import Chain

_SETTLED = (VERDICT_NAMES[MEETS], VERDICT_NAMES[BREACH])
_OPEN = VERDICT_NAMES[UNPROVEN]


@dataclass(frozen=True, slots=True)
class ProofChange:
    """A verdict that was lost, or that was reached, for want or by gain of data."""

    subject: str
    name: str
    motor: str
    check: str
    severity: Severity
    says: str
    before: str
    after: str
    lacking: tuple[str, ...]
    chain: Chain


def proofs(
    pair: Pair, changes: Changes, chains: Chains, moved: Iterable[Move]
) -> tuple[tuple[ProofChange, ...], tuple[ProofChange, ...]]:
    """Give the verdicts that can no longer be given, and those that can be given now."""
    outcomes = outcomes_by_key(pair.after)
    lost: list[ProofChange] = []
    won: list[ProofChange] = []
    lacks: dict[str, dict[str, NDArray[np.bool_]]] = {}
    for move in moved:
        if move.what != "verdict" or _OPEN not in (move.before, move.after):
            continue
        is_lost = move.after == _OPEN and move.before in _SETTLED
        is_won = move.before == _OPEN and move.after in _SETTLED
        if not is_lost and not is_won:
            continue
        outcome = outcomes[move.check, 0]
        lacking: tuple[str, ...] = ()
        if is_lost:
            if move.check not in lacks:
                lacks[move.check] = data_lacking(outcome, pair.after.workings)
            data = [name for name, mask in lacks[move.check].items() if mask[move.row]]
            lacking = tuple(label_of(name, pair.after.workings) for name in sorted(data)) or (NOT_CALCULABLE,)
        ways = chains.of_nodes(move.nodes, move.subject, move.row)
        (lost if is_lost else won).append(
            ProofChange(
                move.subject,
                pair.keys(move.subject)[move.row],
                changes.motor_of(pair.after, move.subject, move.row),
                move.check,
                outcome.check.severity,
                outcome.check.says,
                str(move.before),
                str(move.after),
                lacking,
                ways[0] if ways else (),
            )
        )
    return tuple(lost), tuple(won)
