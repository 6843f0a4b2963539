"""Gather findings from outcomes: every breach, and every conflict of a permissible range."""

from __future__ import annotations

from collections.abc import Mapping, Sequence

import numpy as np

from audit.checks.entry import SEVERITIES, Check
from audit.checks.ranges import SettingRange
from audit.checks.slips import range_hits
from audit.checks.verdicts import BREACH, MEETS, NOT_APPLICABLE, UNPROVEN, Outcome
from audit.derivation.workings import Workings
from audit.expression.values import NO
from audit.findings.finding import FindingCode


def with_exceptions(outcomes: Sequence[Outcome]) -> list[Outcome]:
    """Withdraw the breaches of checks that another finding replaces in the same row."""
    by_name = {outcome.check.name: outcome for outcome in outcomes}
    result = []
    for outcome in outcomes:
        other = by_name.get(outcome.check.unless_found or "")
        if other is None or len(other.verdict) != len(outcome.verdict):
            result.append(outcome)
            continue
        replaced = (other.verdict == BREACH) & (outcome.verdict != UNPROVEN)
        verdict = np.where(replaced, NOT_APPLICABLE, outcome.verdict).astype(np.int8)
        settled = (verdict == MEETS) | (verdict == BREACH)
        result.append(
            Outcome(
                outcome.check,
                verdict,
                outcome.provisional & settled,
                outcome.no_evidence,
                np.where(replaced, NO, outcome.applies).astype(np.int8),
                outcome.judged,
            )
        )
    return result


def breaches(outcomes: Sequence[Outcome], group: str = "") -> list[FindingCode]:
    """Give the code of each breach: the first requirement that is broken, its figures, and every further one."""
    codes = []
    for number, outcome in enumerate(outcomes):
        rows = np.flatnonzero(outcome.verdict == BREACH)
        for row in rows.tolist():
            place = outcome.decisive(row)
            judged = outcome.judged[place]
            codes.append(
                FindingCode(
                    number,
                    row,
                    place,
                    float(judged.present[row]),
                    float(judged.low[row]),
                    float(judged.high[row]),
                    group,
                )
            )
    return codes


def of_ranges(outcome: int, check: Check, ranges: Mapping[str, SettingRange], workings: Workings) -> list[FindingCode]:
    """Give the code of each range in which a check of ranges finds something."""
    codes = []
    for place, band in enumerate(ranges.values()):
        present = workings.column(band.subject, band.setting).values
        for row in np.flatnonzero(range_hits(check, band, workings)).tolist():
            codes.append(
                FindingCode(outcome, row, place, float(present[row]), float(band.low[row]), float(band.high[row]))
            )
    return codes


def in_order(codes: Sequence[FindingCode], outcomes: Sequence[Outcome]) -> tuple[FindingCode, ...]:
    """Order findings by severity, then by check, then by row."""
    rank = {severity: place for place, severity in enumerate(SEVERITIES)}
    return tuple(
        sorted(
            codes, key=lambda code: (rank[outcomes[code.outcome].check.severity], code.outcome, code.row, code.group)
        )
    )
