"""What could not be judged, turned round: which datum of which motors would settle how many verdicts."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Iterable
from dataclasses import dataclass, field

import numpy as np
from numpy.typing import NDArray

from audit.checks.entry import SEVERITIES, Severity
from audit.checks.verdicts import UNPROVEN, Outcome, data_lacking
from audit.derivation.workings import Workings

TABLE_LABELS = {
    "relay": "settings of the relay",
    "bus": "the bus in the bus list",
    "motor": "the motor in the motor list",
    "start": "start records",
    "sisters": "a group of like motors",
    "peers": "voltage and starting method",
}
NOT_CALCULABLE = "not calculable from the data given"


@dataclass(frozen=True, slots=True)
class UnprovenGroup:
    """The rows of one check that lack the same data."""

    check: str
    severity: Severity
    lacking: tuple[str, ...]
    rows: NDArray[np.int64]


@dataclass(slots=True)
class DatumWanted:
    """A datum that a site can supply, and what it would settle."""

    datum: str
    label: str
    ask: str
    subject: str
    by_severity: dict[Severity, int] = field(default_factory=lambda: dict.fromkeys(SEVERITIES, 0))
    rows: NDArray[np.int64] = field(default_factory=lambda: np.array([], dtype=np.int64))
    checks: tuple[str, ...] = ()

    def verdicts(self) -> int:
        """Count the verdicts that it would help to settle."""
        return sum(self.by_severity.values())

    def rank(self) -> tuple[int, ...]:
        """Give the order: most unsafe verdicts first, then nuisance, and so on."""
        return tuple(-self.by_severity[severity] for severity in SEVERITIES)


def label_of(datum: str, workings: Workings) -> str:
    """Give the label of a datum or of a whole table that is lacking."""
    if datum in TABLE_LABELS and datum not in workings.quantities:
        return TABLE_LABELS[datum]
    if datum in ("relay", "bus", "motor"):
        return TABLE_LABELS[datum]
    quantity = workings.quantities.get(datum)
    return quantity.label if quantity else datum


def unproven_and_wanted(
    outcomes: Iterable[Outcome], workings: Workings
) -> tuple[tuple[UnprovenGroup, ...], tuple[DatumWanted, ...]]:
    """Group what is unproven by check and missing data, and rank the data by what they would settle."""
    groups: list[UnprovenGroup] = []
    wanted: dict[tuple[str, str], DatumWanted] = {}
    touched: dict[tuple[str, str], set[int]] = defaultdict(set)
    checks: dict[tuple[str, str], dict[str, None]] = defaultdict(dict)
    for outcome in outcomes:
        rows = np.flatnonzero(outcome.verdict == UNPROVEN)
        if not len(rows):
            continue
        lacks = data_lacking(outcome, workings)
        groups += _grouped(outcome, lacks, rows)
        for datum, mask in lacks.items():
            key = (datum, outcome.check.subject)
            quantity = workings.quantities.get(datum)
            entry = wanted.setdefault(
                key,
                DatumWanted(
                    datum, label_of(datum, workings), (quantity.ask or "") if quantity else "", outcome.check.subject
                ),
            )
            entry.by_severity[outcome.check.severity] += int(mask.sum())
            touched[key].update(np.flatnonzero(mask).tolist())
            checks[key][outcome.check.name] = None
    for key, entry in wanted.items():
        entry.rows = np.array(sorted(touched[key]), dtype=np.int64)
        entry.checks = tuple(checks[key])
    ranked = sorted(wanted.values(), key=lambda entry: (*entry.rank(), entry.datum, entry.subject))
    return tuple(groups), tuple(ranked)


def _grouped(outcome: Outcome, lacks: dict[str, NDArray[np.bool_]], rows: NDArray[np.int64]) -> list[UnprovenGroup]:
    check = outcome.check
    if not lacks:
        return [UnprovenGroup(check.key, check.severity, (NOT_CALCULABLE,), rows)]
    names = sorted(lacks)
    table = np.stack([lacks[name][rows] for name in names], axis=1)
    patterns, place = np.unique(table, axis=0, return_inverse=True)
    place = place.reshape(-1)
    groups = []
    for number, pattern in enumerate(patterns):
        lacking = tuple(name for name, wanted in zip(names, pattern, strict=True) if wanted)
        groups.append(UnprovenGroup(check.key, check.severity, lacking or (NOT_CALCULABLE,), rows[place == number]))
    return groups
