"""From year to year: each finding new, repeated or returned; each old one cleared, with what changed."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import replace
from datetime import date
from typing import Any

from audit.checks.verdicts import UNPROVEN
from audit.expression.values import YES
from audit.findings.audit import Audit
from audit.findings.comparison.alignment import Pair
from audit.findings.comparison.chains import Chains
from audit.findings.comparison.changes import Change, Changes
from audit.findings.comparison.moves import nodes_of, outcomes_by_key
from audit.findings.comparison.standing import identity
from audit.findings.comparison.steps import chain_words
from audit.findings.past import Cleared, Identity, Past, Previous, SettingDrift, identity_of
from audit.fleet.folding import exact
from audit.refusal import Refusal

MOST_CAUSES = 3
PROVABLE_NO_LONGER = "no longer provable"
DATES_OF_CHANGE = (
    "motor_replaced_date", "ct_changed_date", "supply_reterminated_date", "supply_changed_date",
)  # fmt: skip
"""Dates that say when something was changed: a setting that changed with it needs no other reason."""


def with_previous(audit: Audit, recorded: Mapping[str, Any], before: Audit | None) -> Audit:
    """Give an audit that knows the record of the one before; `before` is that record judged by the rules of today.

    Without `before` (a record that holds no values) findings are told apart all the same, causes are not.
    """
    earlier, today = date.fromisoformat(recorded["audited_on"]), audit.audited_on
    if earlier > today:
        raise Refusal(
            f"the previous record is of {earlier.isoformat()}, after this audit's day {today.isoformat()}. "
            "Give the record of an earlier audit, or the day with --on."
        )
    past = _Past(audit, recorded, before)
    return replace(audit, previous=past.told())


class _Past:
    """What one record says of an audit."""

    def __init__(self, audit: Audit, recorded: Mapping[str, Any], before: Audit | None) -> None:
        self.audit = audit
        self.before = before
        self.earlier = str(recorded["audited_on"])
        self.today = audit.audited_on.isoformat()
        self._places: dict[tuple[str, bool], dict[str, int]] = {}
        self.again = 0 if self.earlier == self.today else 1
        """A second run of one audit's day counts no further audit."""
        self.known = {one.identity(): one for one in map(_recorded_cleared, recorded.get("cleared", []))}
        self.site = str(recorded["fleet"])
        if before is not None:
            self.pair = Pair(before, audit)
            self.changes = Changes(self.pair)
            self.chains = Chains(self.pair, self.changes)
        self.found = {self._identity(finding): finding for finding in recorded["findings"]}
        self.outcomes = outcomes_by_key(audit)

    def told(self) -> Previous:
        """Tell everything."""
        present = {identity(self.audit, code) for code in self.audit.codes}
        pasts = {key: self._past(key) for key in sorted(present)}
        cleared = [self._cleared(finding) for key, finding in self.found.items() if key not in present]
        still = {one.identity() for one in cleared}
        for key, one in self.known.items():
            if key not in present and key not in still:
                cleared.append(self._still_cleared(one))
        ordered = sorted(cleared, key=lambda one: (one.cleared_on != self.today, one.identity()))
        return Previous(self.earlier, pasts, tuple(ordered), self._settings(), self._notices())

    def _past(self, key: Identity) -> Past:
        if key in self.found:
            finding = self.found[key]
            return Past("repeated", str(finding.get("since") or self.earlier), _audits(finding) + self.again)
        known = self.known.get(key)
        if known is None:
            return Past("new", self.today, 1)
        # what could not be proven for a while was never cleared
        return Past("repeated" if known.how == PROVABLE_NO_LONGER else "returned", known.since, known.audits + 1)

    def _cleared(self, finding: Mapping[str, Any]) -> Cleared:
        how, row = self._how(finding)
        return Cleared(
            subject=finding["subject"],
            name=finding["name"],
            check=finding["check"],
            setting=finding["judges"],
            setting_group=finding["setting_group"],
            severity=finding["severity"],
            says=finding["says"],
            since=str(finding.get("since") or self.earlier),
            audits=_audits(finding),
            cleared_on="" if how == PROVABLE_NO_LONGER else self.today,
            how=how,
            what_changed=self._what_changed(finding["check"], finding["judges"], finding["subject"], row),
        )

    def _how(self, finding: Mapping[str, Any]) -> tuple[str, int]:
        subject = finding["subject"]
        row = self._row(subject, self._identity(finding)[1])
        if row < 0:
            return f"{subject} removed", row
        outcome = self.outcomes.get((finding["check"], 0))
        if outcome is None:
            return "the check is no longer applied", row
        if outcome.check.stage == "ranges":
            return "the range no longer shows it", row
        if outcome.verdict[row] == UNPROVEN:
            return PROVABLE_NO_LONGER, row
        return ("meets now" if outcome.applies[row] == YES else "no longer applies"), row

    def _what_changed(self, check: str, setting: str, subject: str, row: int) -> tuple[str, ...]:
        outcome = self.outcomes.get((check, 0))
        if self.before is None or outcome is None or row < 0 or self.pair.row_before(subject)[row] < 0:
            return ()
        nodes = nodes_of(outcome, self.outcomes)
        if outcome.check.stage == "ranges":
            nodes = tuple(
                node
                for other in self.audit.outcomes
                if other.check.subject == "motor"
                for judged in other.judged
                if judged.requirement.setting() == setting
                for node in (judged.requirement.judged, judged.requirement.bound)
            )
        ways = self.chains.of_nodes(nodes, subject, row)
        return tuple(chain_words(way)[0] for way in ways[:MOST_CAUSES])

    def _still_cleared(self, one: Cleared) -> Cleared:
        """An earlier entry: one that could not be proven may be cleared by now."""
        if one.how != PROVABLE_NO_LONGER:
            return one
        row = self._row(one.subject, one.name)
        outcome = self.outcomes.get((one.check, 0))
        if row >= 0 and outcome is not None and outcome.check.stage == "rows" and outcome.verdict[row] == UNPROVEN:
            return one
        how = "meets now" if row >= 0 and outcome is not None else "no longer applies"
        return replace(one, how=how, cleared_on=self.today)

    def _row(self, subject: str, name: str, *, before: bool = False) -> int:
        """Give the row that a name has now, or had before, or -1."""
        audit = self.before if before else self.audit
        if (subject, before) not in self._places:
            table = audit.fleet.tables.get(subject) if audit is not None else None
            keys = table.keys if table is not None else ()
            self._places[subject, before] = {exact(key): row for row, key in reversed(list(enumerate(keys)))}
        return self._places[subject, before].get(exact(name), -1)

    def _identity(self, finding: Mapping[str, Any]) -> Identity:
        """Give the identity of a recorded finding, by the name that its row has now."""
        subject, name = finding["subject"], finding["name"]
        old = self._row(subject, name, before=True)
        now = self.pair.name_after(subject, old) if old >= 0 else name
        return identity_of(subject, now, finding["check"], finding["judges"], finding["setting_group"])

    def _settings(self) -> tuple[SettingDrift, ...]:
        if self.before is None:
            return ()
        return tuple(
            self._drift(change)
            for change in self.changes.values
            if change.subject == "relay" and change.role == "setting" and change.kind == "changed"
        )

    def _drift(self, change: Change) -> SettingDrift:
        place = change.after_cell
        return SettingDrift(
            relay=change.name,
            motor=change.motor,
            quantity=change.quantity,
            label=change.label,
            before_text=change.before_text,
            after_text=change.after_text,
            file=place.file if place else "",
            sheet=place.sheet if place else "",
            cell=place.cell if place else "",
            explained_by=self._explanation(change),
        )

    def _explanation(self, change: Change) -> str:
        """Give what says why a setting changed: a listed change since the record, or a finding that asked for it."""
        row = self._row("motor", change.motor) if change.motor else -1
        if row >= 0:
            since = (date.fromisoformat(self.earlier) - date(1970, 1, 1)).days
            for name in DATES_OF_CHANGE:
                day = float(self.audit.workings.column("motor", name).values[row])
                if day >= since:
                    return self.audit.workings.quantities[name].label
        asked = sorted(
            str(finding["check"])
            for finding in self.found.values()
            if finding["judges"] == change.quantity and finding["motor"] == change.motor
        )
        return f"asked for by {', '.join(asked)}" if asked else ""

    def _notices(self) -> tuple[str, ...]:
        told = []
        if self.site != self.audit.fleet.site:
            told.append(f"the previous record is of '{self.site}', this fleet is '{self.audit.fleet.site}'")
        if not self.again:
            told.append("the previous record is of the same day: no further audit is counted")
        if self.before is None:
            told.append("the previous record holds no values: what changed cannot be told")
        return tuple(told)


def _audits(finding: Mapping[str, Any]) -> int:
    return int(finding.get("audits") or 1)


def _recorded_cleared(entry: Mapping[str, Any]) -> Cleared:
    return Cleared(**{**entry, "what_changed": tuple(entry["what_changed"])})
