"""The whole comparison of two audits of a fleet."""

from __future__ import annotations

from collections import Counter
from collections.abc import Sequence
from dataclasses import dataclass

from audit.findings.audit import Audit
from audit.findings.comparison.alignment import Pair
from audit.findings.comparison.chains import Chains
from audit.findings.comparison.changes import Change, Changes, RowChange
from audit.findings.comparison.impact_table import read_impact_table
from audit.findings.comparison.looked_at import LookedAt, looked_at
from audit.findings.comparison.moves import moves
from audit.findings.comparison.provable import ProofChange, proofs
from audit.findings.comparison.standing import STANDINGS, FindingChange, Standing, Standings
from audit.findings.comparison.starts import StartsChange
from audit.findings.comparison.touched import Touched, touched

DEFAULT_SHARE_PCT = 1.0
"""A margin or an end of a range counts as moved when it moved by more than this share of itself."""


@dataclass(frozen=True, slots=True)
class Supposed:
    """A value that was supposed, not read."""

    subject: str
    name: str
    quantity: str
    label: str
    was: str
    supposed: str


@dataclass(frozen=True, slots=True)
class RelayChange:
    """A relay whose export differs, and in which settings and data."""

    relay: str
    motor: str
    settings: tuple[str, ...]
    """Labels of what says something else."""
    follow: tuple[str, ...]
    """Settings whose own cell says what it said before; their primary value follows a base that changed."""


@dataclass(frozen=True)
class Comparison:
    """What changed between two audits, what it breaks, and whom it touches."""

    before: Audit
    after: Audit
    share_pct: float
    supposed: tuple[Supposed, ...]
    notices: tuple[str, ...]
    sources: tuple[str, str]
    """What each side was read from."""
    changed: tuple[Change, ...]
    rows: tuple[RowChange, ...]
    starts: tuple[StartsChange, ...]
    relays: tuple[RelayChange, ...]
    findings: tuple[FindingChange, ...]
    touched: tuple[Touched, ...]
    no_longer_provable: tuple[ProofChange, ...]
    provable_now: tuple[ProofChange, ...]
    looked_at: tuple[LookedAt, ...]

    def standing_counts(self) -> dict[Standing, int]:
        """Count the findings by how they stand."""
        counted = Counter(finding.standing for finding in self.findings)
        return {standing: counted[standing] for standing in STANDINGS}

    def is_empty(self) -> bool:
        """Tell whether there is no news at all."""
        news = any(finding.standing != "still there" for finding in self.findings)
        proofs = (self.no_longer_provable, self.provable_now)
        parts = (self.changed, self.rows, self.starts, self.touched, self.looked_at, *proofs)
        return not news and not any(parts)


def compare(
    before: Audit,
    after: Audit,
    *,
    share_pct: float = DEFAULT_SHARE_PCT,
    supposed: Sequence[Supposed] = (),
    notices: Sequence[str] = (),
    sources: tuple[str, str] = ("", ""),
) -> Comparison:
    """Compare two audits of a fleet that were judged by the same rules."""
    pair = Pair(before, after)
    changes = Changes(pair)
    chains = Chains(pair, changes)
    moved = list(moves(pair, share_pct))
    lost, won = proofs(pair, changes, chains, moved)
    return Comparison(
        before=before,
        after=after,
        share_pct=share_pct,
        supposed=tuple(supposed),
        notices=tuple(notices),
        sources=sources,
        changed=changes.values,
        rows=changes.rows,
        starts=tuple(changes.starts.values()),
        relays=_relays(changes.values),
        findings=Standings(pair, changes).all(),
        touched=touched(pair, changes, chains, moved),
        no_longer_provable=lost,
        provable_now=won,
        looked_at=looked_at(pair, changes.values, changes.rows, read_impact_table(after.catalogue)),
    )


def _relays(changed: Sequence[Change]) -> tuple[RelayChange, ...]:
    by_relay: dict[str, list[Change]] = {}
    for change in changed:
        if change.subject == "relay":
            by_relay.setdefault(change.name, []).append(change)
    return tuple(
        RelayChange(
            relay,
            of_relay[0].motor,
            tuple(change.label for change in of_relay if change.kind != "follows"),
            tuple(change.label for change in of_relay if change.kind == "follows"),
        )
        for relay, of_relay in by_relay.items()
    )
