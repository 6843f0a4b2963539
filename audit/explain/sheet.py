"""Lay out the calculation sheet of one motor as plain text that a colleague could sign."""

from __future__ import annotations

from collections.abc import Iterator

from audit.cautions import CAUTIONS
from audit.checks.ranges import NO_CHECK
from audit.checks.verdicts import MEETS, UNPROVEN, VERDICT_NAMES, Judged, Outcome, data_lacking
from audit.checks.wording import requirement_in_words
from audit.derivation.trace import Step, Trace, shown_number
from audit.expression.nodes import Node, names_in
from audit.expression.text import render
from audit.expression.units import nearest
from audit.expression.values import NO, UNKNOWN, YES
from audit.findings.audit import Audit
from audit.findings.collect import label_of
from audit.findings.figures import margin_pct, range_text
from audit.fleet.column import NO_CELL, NO_ROW
from audit.limits.limits import limit_in_words
from audit.refusal import Refusal
from audit.vocabulary.units import DIMENSIONLESS

_ACTIVE_WORDS = {NO: "its condition is not met", UNKNOWN: "whether its condition is met is not known"}


class CalculationSheet:
    """Writes the calculation sheets of one audit."""

    def __init__(self, audit: Audit) -> None:
        self.audit = audit
        self.trace = Trace(audit.workings)

    def motor_row(self, tag: str) -> int:
        """Give the row of a motor by its tag, or refuse with the nearest tag."""
        keys = self.audit.fleet.tables["motor"].keys
        folded = {key.strip().casefold(): row for row, key in enumerate(keys)}
        row = folded.get(tag.strip().casefold())
        if row is None:
            raise Refusal(f"'{tag}' is not a motor of {self.audit.fleet.site}{nearest(tag, keys)}.")
        return row

    def lines(self, tag: str, check_name: str | None = None, *, everything: bool = False) -> Iterator[str]:
        """Give the sheet of one motor line by line: what is not plainly met, all checks that apply, or one."""
        row = self.motor_row(tag)
        outcomes = [outcome for outcome in self.audit.outcomes if outcome.check.stage == "rows"]
        if check_name is not None:
            named = [outcome for outcome in outcomes if check_name in (outcome.check.name, outcome.check.key)]
            if not named:
                known = [outcome.check.name for outcome in outcomes]
                raise Refusal(f"'{check_name}' is not a check in scope{nearest(check_name, known)}.")
            outcomes = named
        yield f"Calculation sheet · motor {self.audit.fleet.tables['motor'].keys[row]} · {self.audit.fleet.site}"
        yield f"audited on {self.audit.audited_on.isoformat()}"
        yield from (f"caution: {caution}" for caution in CAUTIONS)
        yield ""
        met: list[str] = []
        set_aside: list[str] = []
        for outcome in outcomes:
            at = self._row_of(outcome, row)
            if at == NO_ROW:
                continue
            if outcome.verdict[at] == 0 and check_name is None:
                set_aside.append(outcome.check.key)
                continue
            if outcome.verdict[at] == MEETS and not outcome.provisional[at] and not everything and check_name is None:
                met.append(f"{outcome.check.function} {outcome.check.key}")
                continue
            yield from self.check_lines(outcome, at)
            yield ""
        if met:
            yield f"meets, on data stated or recorded: {', '.join(met)}"
        if set_aside:
            yield f"not applicable to this motor: {', '.join(set_aside)}"

    def _row_of(self, outcome: Outcome, motor_row: int) -> int:
        rows = self.audit.fleet.parent_rows("motor", outcome.check.subject)
        return NO_ROW if rows is None else int(rows[motor_row])

    def check_lines(self, outcome: Outcome, row: int) -> Iterator[str]:
        """Give the working of one check in one row."""
        check = outcome.check
        verdict = VERDICT_NAMES[int(outcome.verdict[row])]
        provisional = ", provisional" if outcome.provisional[row] else ""
        name = self.audit.fleet.tables[check.subject].keys[row]
        of = "" if check.subject == "motor" else f" · {check.subject} {name}"
        yield f"{check.function} · {check.key}{of} · {verdict}{provisional} ({check.severity})"
        condition = render(check.when, self._label, self.trace.reads)
        applies = {NO: "no", UNKNOWN: "not known", YES: "yes"}[int(outcome.applies[row])]
        yield f"  applies when: {condition}: {applies}"
        if outcome.applies[row] == NO:
            return
        for judged in outcome.judged:
            yield from self._requirement_lines(outcome, judged, row)
        seen: set[tuple[str, int]] = set()
        steps = list(self._steps(outcome, row, seen))
        if steps:
            yield "  data and workings:"
            yield from (f"    {line}" for step in steps for line in self._step_lines(step))
        limits = dict.fromkeys(name for node in self._nodes(outcome) for name in names_in(node))
        for limit in (self.audit.workings.limits[name] for name in limits if name in self.audit.workings.limits):
            was = f" (site value, in place of {limit.overridden_from:g})" if limit.overridden_from is not None else ""
            yield f"    limit: {limit.says}: {limit_in_words(limit)}{was} [{limit.source}]"
        if outcome.verdict[row] == UNPROVEN:
            lacking = [
                label_of(d, self.audit.workings)
                for d, rows in data_lacking(outcome, self.audit.workings).items()
                if rows[row]
            ]
            yield f"  lacking: {', '.join(lacking) or 'not calculable from the data given'}"
        for note in dict.fromkeys(step.note for step in steps if step.note):
            yield f"  assumption: {note}"
        yield f"  source: {check.source}"
        yield f"  blind spots: {check.blind_spots}"

    def _requirement_lines(self, outcome: Outcome, judged: Judged, row: int) -> Iterator[str]:
        requirement = judged.requirement
        wanted = requirement_in_words(requirement, self._label, self.trace.reads)
        active = int(judged.active[row])
        if active != YES:
            yield f"  wanted: {wanted}: {_ACTIVE_WORDS[active]}"
            return
        holds = {NO: "broken", UNKNOWN: "not known", YES: "held"}[int(judged.holds[row])]
        yield f"  wanted: {wanted}: {holds}"
        subject = outcome.check.subject
        if requirement.bound is not None:
            numbers = self.trace.numbers_in(requirement.bound, subject, row)
            yield f"    bound: {numbers}"
        if requirement.judged is not None:
            yield f"    present: {self.trace.numbers_in(requirement.judged, subject, row)}"
        setting = requirement.setting()
        band = self.audit.ranges.get(setting or "") if subject == "motor" else None
        if band is None or not band.bounded()[row]:
            return
        quantity = self.audit.workings.quantities[band.setting]
        low, high = (None if end != end else float(end) for end in (band.low[row], band.high[row]))
        ends = [
            self.audit.outcomes[int(n)].check.key for n in (band.low_check[row], band.high_check[row]) if n != NO_CHECK
        ]
        flags = [w for w, f in (("provisional", band.provisional), ("moving", band.moving)) if f[row]]
        state = f" ({', '.join(flags)})" if flags else ""
        present = float(self.audit.workings.column("motor", band.setting).values[row])
        margin = margin_pct(present, low, high)
        by = f", set by {' and '.join(dict.fromkeys(ends))}" if ends else ""
        yield f"    permissible range: {range_text(low, high, quantity.unit or DIMENSIONLESS)}{state}{by}"
        if margin is not None:
            yield f"    margin: {margin:+.1f} % of the nearer end; present {shown_number(present, quantity)}"

    def _nodes(self, outcome: Outcome) -> list[Node]:
        nodes: list[Node] = [outcome.check.when]
        for judged in outcome.judged:
            requirement = judged.requirement
            nodes += [n for n in (requirement.when, requirement.judged, requirement.bound, requirement.within) if n]
        return nodes

    def _steps(self, outcome: Outcome, row: int, seen: set[tuple[str, int]]) -> Iterator[Step]:
        for node in self._nodes(outcome):
            yield from self.trace.steps(node, outcome.check.subject, row, seen)

    def _step_lines(self, step: Step) -> Iterator[str]:
        if step.formula:
            source = f" [{step.source}]" if step.source else ""
            yield f"{step.label} = {step.formula}"
            yield f"  = {step.with_numbers} = {step.shown} ({step.basis}){source}"
            return
        place = self.audit.fleet.book.place(step.cell) if step.cell != NO_CELL else None
        if place is not None:
            yield f"{step.label}: {step.shown} ({step.basis}; {place.file} › {place.sheet} › {place.cell})"
        elif step.shown == "not known":
            yield f"{step.label}: not known"
        else:
            yield f"{step.label}: {step.shown} (not stated in any workbook)"

    def _label(self, name: str) -> str:
        limit = self.audit.workings.limits.get(name)
        return limit_in_words(limit) if limit is not None else self.trace.label_of(name)
