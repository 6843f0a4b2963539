"""Lay the accepted deviations of a site on an audit: what is accepted, and what returns and why."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import replace
from datetime import date

from audit.findings.accepted import Accepted, Deviation, DeviationTable
from audit.findings.audit import Audit
from audit.findings.finding import Finding, FindingCode
from audit.findings.render import FindingRenderer
from audit.fleet.folding import exact
from audit.intake.celltext import CellKind, read_number_text

SAME = 1e-3
"""Relative difference up to which a value or an end is what it was when it was accepted: tables round."""


def with_accepted(audit: Audit, table: DeviationTable | None) -> Audit:
    """Give the audit with the deviations that its site accepted."""
    if table is None:
        return audit
    renderer = FindingRenderer(audit)
    by_place: dict[tuple[str, str], list[FindingCode]] = {}
    for code in audit.codes:
        check = audit.outcomes[code.outcome].check
        for name in {exact(check.key), exact(check.name)}:
            by_place.setdefault((name, exact(audit.fleet.tables[check.subject].keys[code.row])), []).append(code)
    found: list[Accepted] = []
    for deviation in table.rows:
        codes = by_place.get((exact(deviation.check), exact(deviation.motor)), [])
        matching = list(_matching(deviation, codes, renderer))
        found += [
            Accepted(deviation, code, _returns(deviation, finding, audit.audited_on)) for code, finding in matching
        ]
        if not matching:
            found.append(Accepted(deviation, None))
    return replace(audit, accepted=tuple(found), accepted_table=table)


def _matching(
    deviation: Deviation, codes: Iterable[FindingCode], renderer: FindingRenderer
) -> Iterable[tuple[FindingCode, Finding]]:
    for code in codes:
        finding = renderer.finding(code)
        if not deviation.setting or exact(deviation.setting) in (exact(finding.judges), exact(finding.label)):
            yield code, finding


def _returns(deviation: Deviation, finding: Finding, today: date) -> str:
    """Say why an accepted finding counts again, or nothing."""
    if not deviation.reason:
        return "no reason is given"
    if not deviation.accepted_by:
        return "nobody's name is given"
    if deviation.until is None:
        return deviation.problem
    if deviation.until < today:
        return f"it was accepted until {deviation.until.isoformat()}"
    if deviation.value and not _same_text(deviation.value, finding):
        return f"the value was {deviation.value} when it was accepted, now {finding.present_text}"
    for end, then, now in (("low", deviation.low, finding.low), ("high", deviation.high, finding.high)):
        if then is not None and (now is None or now != now or not _near(then, now)):
            shown = "none" if now is None or now != now else f"{now:g}"
            return f"the {end} end of the range was {then:g} when it was accepted, now {shown}"
    return ""


def _same_text(then: str, finding: Finding) -> bool:
    if isinstance(finding.present, float) and not isinstance(finding.present, bool):
        reading = read_number_text(then)
        return reading.kind is CellKind.NUMBER and _near(reading.number, finding.present)
    return exact(then) == exact(finding.present_text)


def _near(one: float, other: float) -> bool:
    return abs(one - other) <= SAME * max(abs(one), abs(other), 1e-12)
