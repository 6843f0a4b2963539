"""The whole close-out of one hand-over, from matched rows and the fleet as it was left."""

from __future__ import annotations

from collections import Counter
from collections.abc import Mapping, Sequence
from dataclasses import dataclass, replace

from audit.checks.verdicts import evaluate_check
from audit.derivation.hand_over_facts import with_hand_over_facts
from audit.derivation.workings import Workings
from audit.findings.audit import Audit
from audit.findings.closeout.answers import AnswerKind
from audit.findings.closeout.matching import Matched, Matches, same_answer, unchanged
from audit.findings.closeout.states import CLOSED, Export, Sorted, Sorter, State
from audit.findings.comparison.alignment import Pair
from audit.findings.comparison.changes import Change, Changes
from audit.findings.finding import Finding
from audit.findings.gather import breaches, in_order
from audit.findings.render import FindingRenderer
from audit.vocabulary.quantities import vocabulary

PACK = "hand over"


@dataclass(frozen=True)
class CloseOut:
    """What became of a hand-over."""

    before: Audit
    after: Audit
    sheet_file: str
    sheet_sha256: str
    matches: Matches
    items: tuple[Sorted, ...]
    new_findings: tuple[Finding, ...]
    hand_over_findings: tuple[Finding, ...]
    altered: tuple[Change, ...]
    """Settings of touched relays that are not what they were, and that no row asked to change."""
    export: Export | None

    def counts(self) -> dict[State, int]:
        """Count the findings of each state."""
        found = Counter(item.state for item in self.items)
        return {state: found[state] for state in State}

    def is_closed(self) -> bool:
        """Tell whether every finding is closed and nothing new came up."""
        return not self.new_findings and not self.altered and all(item.state in CLOSED for item in self.items)


def close_out(before: Audit, after: Audit, matches: Matches, sheet: tuple[str, str], export: Export | None) -> CloseOut:
    """Sort every finding of `before` by what came back, judged in `after`; `sheet` is the file and its hash."""
    found_before = list(FindingRenderer(before).all())
    found_after = list(FindingRenderer(after).all())
    keys_before, keys_after = {f.key for f in found_before}, {f.key for f in found_after}
    new = tuple(finding for finding in found_after if finding.key not in keys_before)
    asked = {(one.work.relay_key, one.work.setting) for one in matches.rows if one.issued.is_value}
    altered = _altered(before, after, asked, export)
    sorter = Sorter(after, keys_after, {(f.relay, f.judges): f.check for f in new if f.judges}, export)
    by_key = {one.work.key: one for one in matches.rows}
    items = tuple(
        sorter.sorted(by_key[finding.key]) if finding.key in by_key else sorter.without_a_row(finding)
        for finding in found_before
        if finding.status != "accepted"
    )
    told = _told(matches.rows, items, altered, export)
    return CloseOut(
        before=before,
        after=after,
        sheet_file=sheet[0],
        sheet_sha256=sheet[1],
        matches=matches,
        items=items,
        new_findings=new,
        hand_over_findings=tuple(_of_pack(after, told)),
        altered=altered,
        export=export,
    )


def _altered(before: Audit, after: Audit, asked: set[tuple[str, str]], export: Export | None) -> tuple[Change, ...]:
    """Give the settings that an export shows changed without being asked; what follows a base that was is not one."""
    if export is None:
        return ()
    changes = Changes(Pair(before, after)).values
    return tuple(
        change
        for change in changes
        if change.subject == "relay"
        and change.name in export.days
        and change.kind != "follows"
        and change.quantity != "settings_export_date"
        and (change.name, change.quantity) not in asked
    )


def _told(
    rows: Sequence[Matched], items: Sequence[Sorted], altered: Sequence[Change], export: Export | None
) -> dict[str, dict[str, float | bool | None]]:
    """Count for each motor what the hand-over pack judges; what nobody can tell stays unknown."""
    states = {item.finding.key: item.state for item in items}
    told: dict[str, dict[str, float | bool | None]] = {}
    for one in rows:
        if one.row is None or not one.work.finding.motor:
            continue
        facts = told.setdefault(one.work.finding.motor, {"hand_over_returned": True})
        if one.as_found.kind is not AnswerKind.NOTHING:
            facts["as_found_given"] = True
            if one.as_found.is_value:
                _count(facts, "as_found_not_as_recorded", not unchanged(one.as_found, one.work))
        if one.usable and one.issued.is_value:
            _count(facts, "as_left_not_as_issued", not same_answer(one.as_left, one.issued, one.work))
            _count(facts, "as_left_typed_only", states[one.work.key] is not State.VERIFIED)
        if export is not None and one.work.relay_key in export.days:
            facts["later_export_given"] = True
            _count(facts, "altered_unasked", False)
            _count(facts, "test_values_left", False)
    for change in altered:
        facts = told.get(change.motor, {})
        _count(facts, "altered_unasked", True)
        _count(facts, "test_values_left", _may_be_test_value(change))
    return told


def _count(facts: dict[str, float | bool | None], name: str, counts: bool) -> None:
    facts[name] = float(facts.get(name) or 0) + float(counts)


def _may_be_test_value(change: Change) -> bool:
    """An element off that was on, or a number at an end of what is plausible for it."""
    quantity = vocabulary().quantities[change.quantity]
    if quantity.kind == "truth":
        return change.before_text == "yes" and change.after_text == "no"
    return isinstance(change.after, float) and quantity.plausible is not None and change.after in quantity.plausible


def _of_pack(after: Audit, told: Mapping[str, Mapping[str, float | bool | None]]) -> list[Finding]:
    """Judge the hand-over pack over what was counted."""
    fleet = with_hand_over_facts(after.fleet, told)
    old = after.workings
    workings = Workings(fleet, old.quantities, old.recipes, old.limits, old.functions, old.audited_on)
    outcomes = [evaluate_check(check, workings) for check in after.catalogue.checks if check.pack == PACK]
    codes = in_order(breaches(outcomes), outcomes)
    judged = replace(after, fleet=fleet, workings=workings, outcomes=tuple(outcomes), ranges={}, codes=codes)
    return list(FindingRenderer(judged).all())
