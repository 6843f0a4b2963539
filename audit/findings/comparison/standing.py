"""Findings on both sides: new, gone, still there, worse, better by margin."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

from audit.checks.entry import SEVERITIES, Severity
from audit.checks.verdicts import UNPROVEN
from audit.findings.audit import Audit
from audit.findings.comparison.alignment import Pair
from audit.findings.comparison.changes import Changes
from audit.findings.comparison.moves import outcomes_by_key
from audit.findings.figures import margin_pct
from audit.findings.finding import FindingCode
from audit.findings.past import Identity, identity_of
from audit.findings.render import FindingRenderer

Standing = Literal["new", "gone", "still there", "worse", "better", "no longer provable"]
STANDINGS: tuple[Standing, ...] = ("new", "worse", "no longer provable", "still there", "better", "gone")
LEAST_STEP_PCT = 0.05
"""A margin that moves by less, in points, stays what it was: figures are shown to a tenth."""


@dataclass(frozen=True, slots=True)
class FindingChange:
    """A finding and how it stands now."""

    standing: Standing
    subject: str
    name: str
    motor: str
    function: str
    check: str
    severity: Severity
    says: str
    setting: str
    label: str
    before_text: str
    """What the finding before said; '' for a new one."""
    after_text: str
    margin_before_pct: float | None
    margin_after_pct: float | None
    why_gone: str = ""


def identity(audit: Audit, code: FindingCode, name: str = "") -> Identity:
    """Give what makes a finding the same finding in another audit, where its row may have another name."""
    check = audit.outcomes[code.outcome].check
    name = name or audit.fleet.tables[check.subject].keys[code.row]
    return identity_of(check.subject, name, check.key, setting_of(audit, code), code.group)


def setting_of(audit: Audit, code: FindingCode) -> str:
    """Give the quantity that a finding judges, '' where it judges an expression."""
    outcome = audit.outcomes[code.outcome]
    if outcome.check.stage == "ranges":
        return list(audit.ranges.values())[code.requirement].setting
    return outcome.judged[code.requirement].requirement.setting() or ""


def _margin(audit: Audit, code: FindingCode) -> float | None:
    outcome = audit.outcomes[code.outcome]
    if outcome.check.stage == "rows" and outcome.judged[code.requirement].requirement.kind == "must_be":
        return None
    low = None if code.low != code.low else code.low
    high = None if code.high != code.high else code.high
    return margin_pct(code.present, low, high)


class Standings:
    """The findings of two audits of a fleet, each with how it stands."""

    def __init__(self, pair: Pair, changes: Changes) -> None:
        self.pair = pair
        self.changes = changes
        self._render = FindingRenderer(pair.before), FindingRenderer(pair.after)
        self._outcomes = outcomes_by_key(pair.after)

    def all(self) -> tuple[FindingChange, ...]:
        """Give every finding of either side, by standing and severity."""
        before = {identity(self.pair.before, code, self._name_now(code)): code for code in self.pair.before.codes}
        after = {identity(self.pair.after, code): code for code in self.pair.after.codes}
        found = [self._one(before.get(key), code) for key, code in after.items()]
        found += [self._one(code, None) for key, code in before.items() if key not in after]
        rank = {severity: place for place, severity in enumerate(SEVERITIES)}
        return tuple(sorted(found, key=lambda one: (STANDINGS.index(one.standing), rank[one.severity])))

    def _name_now(self, code: FindingCode) -> str:
        return self.pair.name_after(self.pair.before.outcomes[code.outcome].check.subject, code.row)

    def _one(self, before: FindingCode | None, after: FindingCode | None) -> FindingChange:
        old = _margin(self.pair.before, before) if before is not None else None
        new = _margin(self.pair.after, after) if after is not None else None
        standing, why = self._standing(before, after, old, new)
        audit, code = (self.pair.after, after) if after is not None else (self.pair.before, before)
        assert code is not None
        check = audit.outcomes[code.outcome].check
        setting = setting_of(audit, code)
        quantity = audit.workings.quantities.get(setting)
        # a finding that stays as it was is told by its name: rendering hundreds of thousands of them takes minutes
        shown = standing != "still there"
        return FindingChange(
            standing=standing,
            subject=check.subject,
            name=audit.fleet.tables[check.subject].keys[code.row],
            motor=self.changes.motor_of(audit, check.subject, code.row),
            function=check.function,
            check=check.key,
            severity=check.severity,
            says=check.says,
            setting=setting,
            label=quantity.label if quantity else "",
            before_text=self._render[0].finding(before).because if before is not None and shown else "",
            after_text=self._render[1].finding(after).because if after is not None and shown else "",
            margin_before_pct=old,
            margin_after_pct=new,
            why_gone=why,
        )

    def _standing(
        self, before: FindingCode | None, after: FindingCode | None, old: float | None, new: float | None
    ) -> tuple[Standing, str]:
        if before is None:
            return "new", ""
        if after is None:
            return self._gone(before)
        if old is None or new is None or abs(new - old) < LEAST_STEP_PCT:
            return "still there", ""
        return ("better" if new > old else "worse"), ""

    def _gone(self, code: FindingCode) -> tuple[Standing, str]:
        """Say why a finding is gone; one that can no longer be proven is not gone."""
        check = self.pair.before.outcomes[code.outcome].check
        row = self.pair.as_after(check.subject, code.row)
        if row < 0:
            return "gone", f"{check.subject} removed"
        outcome = self._outcomes.get((check.key, 0))
        if outcome is None:
            return "gone", "the check is no longer in scope"
        if check.stage == "ranges":
            return "gone", "the range no longer shows it"
        if outcome.verdict[row] == UNPROVEN:
            return "no longer provable", ""
        return "gone", "meets now" if outcome.applies[row] == 2 else "no longer applies"
