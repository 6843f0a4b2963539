"""Whom a change touches without any change of their own, each with the chain that leads there."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass

from audit.derivation.recipes import AUDIT_DATE
from audit.expression.text import plain_number
from audit.findings.comparison.alignment import Pair
from audit.findings.comparison.chains import Chains
from audit.findings.comparison.changes import Changes
from audit.findings.comparison.moves import Move
from audit.findings.comparison.steps import Chain, Step, chain_words


@dataclass(frozen=True, slots=True)
class Touched:
    """A verdict, margin or range of a row that moved though nothing of the row's own on its chain changed."""

    subject: str
    name: str
    motor: str
    move: Move
    what: str
    """What moved, in words."""
    before_text: str
    after_text: str
    chain: Chain
    further: int
    """Further changed data that lead there as well."""

    def words(self) -> str:
        """Write the chain: from the changed datum to what moved."""
        return " -> ".join(
            [*chain_words(self.chain), f"{self.name}: {self.what} {self.before_text} to {self.after_text}"]
        )


NOT_FOUND: Chain = (Step("", "", "", "cause not found:", "", "to be looked at by hand"),)
"""Nothing passes by silence: what moved without a changed datum beneath is shown as well."""


def touched(pair: Pair, changes: Changes, chains: Chains, moved: Iterable[Move]) -> tuple[Touched, ...]:
    """Give the moves whose roots are all changes of others."""
    labels = pair.after.workings.quantities
    found = []
    for move in moved:
        ways = chains.of_nodes(move.nodes, move.subject, move.row) or (NOT_FOUND,)
        if any(own(pair, way[0], move) for way in ways) or all(_only_the_day(way) for way in ways):
            continue
        label = labels[move.setting].label if move.setting in labels else ""
        name = pair.keys(move.subject)[move.row]
        motor = changes.motor_of(pair.after, move.subject, move.row)
        texts = _text(pair, move, move.before), _text(pair, move, move.after)
        found.append(Touched(move.subject, name, motor, move, _what(move, label), *texts, ways[0], len(ways) - 1))
    return tuple(found)


def _only_the_day(chain: Chain) -> bool:
    return chain[0].quantity == AUDIT_DATE


def own(pair: Pair, root: Step, move: Move) -> bool:
    """Tell whether a changed datum is of the row itself: a motor's own are its relay's and its starts' as well."""
    if (root.subject, root.name) == (move.subject, pair.keys(move.subject)[move.row]):
        return True
    partner = {"motor": "relay", "relay": "motor"}.get(move.subject)
    if partner is None or root.subject != partner:
        return False
    rows = pair.after.fleet.parent_rows(move.subject, partner)
    at = int(rows[move.row]) if rows is not None and len(rows) else -1
    return at >= 0 and pair.keys(partner)[at] == root.name


def _what(move: Move, label: str) -> str:
    if move.what == "range":
        least = {"low": "least", "high": "greatest"}[move.end]
        return f"{least} permissible {label}"
    return f"{'margin of ' if move.what == 'margin' else ''}{move.check}"


def _text(pair: Pair, move: Move, value: str | float | None) -> str:
    if value is None:
        return "no end"
    if isinstance(value, str):
        return value
    if move.what == "margin":
        return f"{value:.1f} %"
    unit = pair.after.workings.quantities[move.setting].unit
    return f"{plain_number(value)} {unit.symbol if unit else ''}".strip()
