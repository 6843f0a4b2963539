"""Sort every finding of the hand-over into one of nine states, with the reason."""

from __future__ import annotations

import re
from collections.abc import Collection, Mapping
from dataclasses import dataclass, field
from datetime import date
from enum import StrEnum

from audit.checks.verdicts import BREACH, UNPROVEN
from audit.expression.text import plain_number
from audit.findings.audit import Audit
from audit.findings.closeout.answers import Answer, AnswerKind
from audit.findings.closeout.matching import Matched, same_answer, same_value, unchanged
from audit.findings.finding import Finding
from audit.findings.handover.written import WrittenSettings
from audit.fleet.column import NO, NO_CELL, YES
from audit.vocabulary.quantities import vocabulary


class State(StrEnum):
    """Where a finding stands after the work."""

    VERIFIED = "closed and verified"
    REPORTED = "closed as reported"
    OPEN = "still open"
    OUTSIDE = "answered but outside"
    WORDS = "answered in words only"
    DISAGREES = "as-left disagrees with the new export"
    UNASKED = "changed without being asked"
    NOT_ANSWERED = "not answered"
    MISSING = "missing from the sheet"


_ACCEPT = re.compile(r"\b(?:accept\w*|leave as is|deviation)\b", re.IGNORECASE)
CLOSED = (State.VERIFIED, State.REPORTED)
MEANING = {
    State.VERIFIED: "as-left as issued, inside the range, and read from an export dated after the work",
    State.REPORTED: "as-left as issued and inside the range, typed only",
    State.OPEN: "unchanged, not as issued, not settled by the change, or a question is open",
    State.OUTSIDE: "changed, and the checks are still not met",
    State.WORDS: "no value that could be judged",
    State.DISAGREES: "what was typed is not what the relay's own export shows",
    State.UNASKED: "no value was issued, and the setting is another one now",
    State.NOT_ANSWERED: "a value was issued, and nothing was written",
    State.MISSING: "the row did not come back",
}


@dataclass(frozen=True, slots=True)
class Export:
    """The settings read after the work: which files, and the day of each relay's settings."""

    files: tuple[str, ...]
    days: Mapping[str, date]
    """By relay; a relay that the export does not hold is not in it."""
    day_from: str = ""
    """Where the days come from, in words."""


@dataclass(frozen=True, slots=True)
class Sorted:
    """One finding after the work."""

    finding: Finding
    state: State
    reason: str
    matched: Matched | None = None
    left_text: str = ""
    exported_text: str = ""
    questions: tuple[str, ...] = ()
    remarks: tuple[str, ...] = field(default=())

    @property
    def proposes_to_accept(self) -> str:
        """Give the remark that proposes to leave the finding, or ''; it takes effect only in the site's own table."""
        remark = self.matched.row.text("remark") if self.matched is not None and self.matched.row is not None else ""
        return remark if _ACCEPT.search(remark) else ""


class Sorter:
    """Sorts the findings of one hand-over."""

    def __init__(
        self, after: Audit, after_keys: Collection[str], new_on: Mapping[tuple[str, str], str], export: Export | None
    ) -> None:
        self._after = after
        self._after_keys = after_keys
        self._new_on = new_on
        self._export = export
        self._written = WrittenSettings(after.fleet) if export is not None else None
        self._outcomes = {outcome.check.key: outcome for outcome in after.outcomes}
        self._rows = {
            subject: {key: row for row, key in enumerate(table.keys)} for subject, table in after.fleet.tables.items()
        }

    def without_a_row(self, finding: Finding) -> Sorted:
        """Sort a finding whose remedy is no setting of a relay: the sheet does not hold it."""
        if finding.key in self._after_keys:
            return Sorted(finding, State.OPEN, "its remedy is no setting of a relay: it is not in the sheet")
        return Sorted(finding, State.REPORTED, "no longer found with the values left; it was not in the sheet")

    def sorted(self, one: Matched) -> Sorted:
        """Sort one row of work."""
        shown = self._exported(one)
        state, reason = self._state(one, shown)
        questions = tuple(filter(None, (one.question,)))
        if one.unit_missing and not one.question and state is not State.VERIFIED:
            questions = (f"unit missing: is '{one.as_left.written}' in {one.work.written.unit}?",)
        remarks = list(one.remarks)
        if one.as_found.is_value and not unchanged(one.as_found, one.work):
            remarks.append(f"as-found '{one.as_found.written}' is not the recorded '{one.work.written.written}'")
        return Sorted(
            one.work.finding,
            state,
            reason,
            one,
            one.as_left.written,
            shown.written if shown is not None else "",
            questions,
            tuple(remarks),
        )

    def _state(self, one: Matched, shown: Answer | None) -> tuple[State, str]:
        issued = one.issued.is_value
        if one.row is None:
            return State.MISSING, "its key did not come back" + self._export_says(one, shown)
        if one.as_left.kind is AnswerKind.NOTHING:
            moved = shown is not None and not unchanged(shown, one.work)
            if not issued:
                if moved:
                    return State.UNASKED, "no value was issued" + self._export_says(one, shown)
                held = f"; {one.work.held}" if one.work.held else ""
                return State.OPEN, f"no value was issued{held}"
            return State.NOT_ANSWERED, "nothing was written" + self._export_says(one, shown)
        if one.as_left.kind is AnswerKind.WORDS:
            return State.WORDS, f"'{one.as_left.written}' is no value" + self._export_says(one, shown)
        if one.question:
            return State.OPEN, "a question is open"
        if shown is not None and not _agree(one.as_left, shown, one):
            return State.DISAGREES, f"typed '{one.as_left.written}', the export shows '{shown.written}'"
        return self._of_value(one, shown, issued)

    def _of_value(self, one: Matched, shown: Answer | None, issued: bool) -> tuple[State, str]:
        same = unchanged(one.as_left, one.work)
        if not issued:
            if same:
                return State.OPEN, "no value was issued, and nothing was changed"
            return State.UNASKED, f"no value was issued, and '{one.as_left.written}' was left"
        if one.unit_missing and shown is None:
            return State.OPEN, "a question is open"
        why = self._not_met(one)
        if why:
            return (State.OPEN, f"unchanged: {why}") if same else (State.OUTSIDE, why)
        if not same_answer(one.as_left, one.issued, one.work):
            return State.OPEN, (
                f"the checks are met, but '{one.issued.written}' was issued and '{one.as_left.written}' was left"
            )
        return self._closed(one, shown)

    def _closed(self, one: Matched, shown: Answer | None) -> tuple[State, str]:
        if shown is None or self._export is None:
            return State.REPORTED, "as issued and inside the range; typed only"
        exported_on = self._export.days[one.work.relay_key]
        if exported_on > self._after.audited_on:
            return State.REPORTED, f"as issued; the export bears a day that is yet to come ({exported_on})"
        if one.done_on is None:
            return State.REPORTED, "as issued, and so in the export, but the day of the work is not known"
        if exported_on < one.done_on:
            return State.REPORTED, f"as issued; the export of {exported_on} is older than the work of {one.done_on}"
        return State.VERIFIED, f"as issued, and so read on {exported_on}"

    def _not_met(self, one: Matched) -> str:
        """Say why the checks are not met with the value left, or nothing."""
        finding = one.work.finding
        if finding.key in self._after_keys:
            return f"{finding.says.lower()} all the same"
        broken = self._new_on.get((finding.relay, one.work.setting))
        if broken:
            return f"it breaks another check: {broken}"
        outcome = self._outcomes.get(finding.check)
        row = self._rows.get(finding.subject, {}).get(finding.name, -1)
        if outcome is None or row < 0 or row >= len(outcome.verdict):
            return ""
        if outcome.verdict[row] == UNPROVEN:
            return "the check cannot be judged with the values left"
        return f"{finding.says.lower()} all the same" if outcome.verdict[row] == BREACH else ""

    def _exported(self, one: Matched) -> Answer | None:
        """Give what the new export shows for the setting, in its present unit."""
        if self._export is None or self._written is None or one.work.relay_key not in self._export.days:
            return None
        fleet = self._after.fleet
        row = self._rows["relay"].get(one.work.relay_key, -1)
        column = fleet.tables["relay"].columns.get(one.work.setting)
        if row < 0 or column is None or column.cell[row] == NO_CELL:
            return None
        quantity = vocabulary().quantities[one.work.setting]
        value = column.values[row]
        if quantity.kind == "number":
            if value != value:
                return Answer(AnswerKind.VALUE, "OFF or not read", off=True)
            own, written = one.work.written, self._written.of(quantity.name, row)
            alike = (own.unit_code, own.base) == (written.unit_code, written.base)
            number = written.number if alike else own.number_for(float(value))
            return Answer(AnswerKind.VALUE, plain_number(number), number)
        if quantity.kind == "truth":
            if value not in (YES, NO):
                return None
            return Answer(AnswerKind.VALUE, "on" if value == YES else "off", code=int(value))
        if quantity.kind == "choice":
            return Answer(AnswerKind.VALUE, column.choices[int(value)] if value >= 0 else "", code=int(value))
        return Answer(AnswerKind.VALUE, str(value or ""))

    def _export_says(self, one: Matched, shown: Answer | None) -> str:
        if shown is None:
            return ""
        if one.issued.is_value and _agree(one.issued, shown, one):
            return f"; the export shows '{shown.written}', as issued"
        return f"; the export shows '{shown.written}'"


def _agree(typed: Answer, shown: Answer, one: Matched) -> bool:
    """Tell whether the export shows what was typed, to half a step."""
    if one.work.kind == "number" and not (typed.off or shown.off):
        return same_value(typed.number, shown.number, one.work.written, 0.5)
    return same_answer(typed, shown, one.work)
