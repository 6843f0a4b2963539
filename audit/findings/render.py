"""Render a finding from its code: present value, permissible range, reason with numbers, cells, assumptions."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import replace

from audit.checks.entry import Check, Requirement
from audit.checks.ranges import NO_CHECK, SettingRange
from audit.checks.slips import slip_in_words
from audit.checks.verdicts import Outcome
from audit.derivation.trace import Step, Trace, shown_number
from audit.derivation.workings import CHILD_OF
from audit.expression.nodes import Name, names_over_rows
from audit.findings.audit import Audit
from audit.findings.causes import causes_in_words
from audit.findings.figures import is_outside, known_or_none, margin_pct, range_text
from audit.findings.finding import Finding, FindingCell, FindingCode
from audit.findings.past import identity_of
from audit.findings.places import motor_row_of, place_of
from audit.findings.reasons import Reasons
from audit.fleet.column import NO_CELL
from audit.vocabulary.units import DIMENSIONLESS, Unit


class FindingRenderer:
    """Renders the findings of one audit."""

    def __init__(self, audit: Audit) -> None:
        self.audit = audit
        self.trace = Trace(audit.workings)
        self._groups = {name: FindingRenderer(group) for name, group in audit.other_groups.items()}
        self._reasons = Reasons(audit.workings, self.trace)
        self._accepted = {one.code: one for one in audit.accepted if one.code is not None}

    def all(self) -> Iterator[Finding]:
        """Render every finding, in order."""
        for code in self.audit.codes:
            yield self.finding(code)

    def finding(self, code: FindingCode) -> Finding:
        """Render one finding."""
        of_group = self._groups.get(code.group, self)
        outcome = of_group.audit.outcomes[code.outcome]
        of_range = outcome.check.stage == "ranges"
        finding = self._with_past(self._of_range(code, outcome.check) if of_range else of_group._breach(code, outcome))
        accepted = self._accepted.get(code)
        if accepted is None:
            return finding
        return replace(finding, status="accepted" if accepted.holds else "returned")

    def _with_past(self, finding: Finding) -> Finding:
        """Add how the finding stands to the record of an earlier audit."""
        previous = self.audit.previous
        key = identity_of(finding.subject, finding.name, finding.check, finding.judges, finding.setting_group)
        past = previous.pasts.get(key) if previous is not None else None
        if past is None:
            return replace(finding, since=self.audit.audited_on.isoformat())
        return replace(finding, status=past.status, since=past.since, audits=past.audits)

    def _breach(self, code: FindingCode, outcome: Outcome) -> Finding:
        check = outcome.check
        judged = outcome.judged[code.requirement]
        requirement = judged.requirement
        deciding = int(judged.deciding[code.row]) if judged.deciding is not None else -1
        motor_row = motor_row_of(self.audit.workings, check.subject, code.row, deciding)
        setting = requirement.setting() or ""
        unit = self._reasons.unit(requirement)
        band = self.audit.ranges.get(setting) if check.subject == "motor" else None
        low, high, low_by, high_by, state = self._band(band, code)
        steps = list(self._steps(check, requirement, code.row, deciding))
        place = place_of(self.audit.workings, motor_row, check.subject, code.row)
        present, present_text = self._reasons.present(requirement, code, check.subject, unit)
        return Finding(
            key=self._key(check, place.motor or self._name(check.subject, code.row), setting, code.group),
            subject=check.subject,
            name=self._name(check.subject, code.row),
            motor=place.motor,
            service=place.service,
            relay=place.relay,
            bus=place.bus,
            cubicle=place.cubicle,
            function=check.function,
            check=check.key,
            pack=check.pack,
            severity=check.severity,
            says=check.says,
            judges=setting,
            label=self._reasons.label(requirement, check),
            present=present,
            present_text=present_text,
            unit=unit.symbol,
            low=low,
            high=high,
            range_text=self._range_text(requirement, code, low, high, unit),
            low_set_by=low_by,
            high_set_by=high_by,
            range_state=state,
            margin_pct=None if requirement.kind == "must_be" else margin_pct(code.present, low, high),
            because=self._reasons.because(requirement, code, check, present_text, unit)
            + causes_in_words(outcome, code, deciding, unit, self.trace),
            why=check.why,
            remedy=check.remedy,
            source=check.source,
            cells=self._cells(steps),
            assumptions=tuple(dict.fromkeys(step.note for step in steps if step.note)),
            provisional=bool(outcome.provisional[code.row]),
            setting_group=code.group,
        )

    def _of_range(self, code: FindingCode, check: Check) -> Finding:
        band = list(self.audit.ranges.values())[code.requirement]
        quantity = self.audit.workings.quantities[band.setting]
        unit = quantity.unit or DIMENSIONLESS
        place = place_of(self.audit.workings, code.row, "motor", code.row)
        low_by, high_by = self._set_by(band, code.row)
        present = code.present
        if check.slips:
            figures = (present, code.low, code.high)
            slip = slip_in_words(check, unit, figures, code.row, self.audit.workings)
            because = f"{quantity.label} {shown_number(present, quantity)}, outside its range; {slip}"
        else:
            low, high = shown_number(code.low, quantity), shown_number(code.high, quantity)
            because = f"{low_by} wants at least {low}, {high_by} wants at most {high}: no value satisfies both"
        return Finding(
            key=self._key(check, place.motor, band.setting, ""),
            subject="motor",
            name=place.motor,
            motor=place.motor,
            service=place.service,
            relay=place.relay,
            bus=place.bus,
            cubicle=place.cubicle,
            function=quantity.function or check.function,
            check=check.key,
            pack=check.pack,
            severity=check.severity,
            says=check.says,
            judges=band.setting,
            label=quantity.label,
            present=None if present != present else present,
            present_text="not known" if present != present else shown_number(present, quantity),
            unit=unit.symbol,
            low=code.low,
            high=code.high,
            range_text=range_text(code.low, code.high, unit) if check.slips else "none",
            low_set_by=low_by,
            high_set_by=high_by,
            range_state="" if check.slips else "conflict",
            margin_pct=margin_pct(present, code.low, code.high) if check.slips else None,
            because=because,
            why=check.why,
            remedy=check.remedy,
            source=check.source,
            cells=self._cells(list(self.trace.steps(Name(band.setting), "motor", code.row))),
            assumptions=(),
            provisional=False,
            setting_group="",
        )

    def _key(self, check: Check, name: str, setting: str, group: str) -> str:
        parts = [name, check.key, setting] if not group else [name, check.key, setting, f"group {group}"]
        return "|".join(parts)

    def _name(self, subject: str, row: int) -> str:
        return self.audit.fleet.tables[subject].keys[row]

    def _band(self, band: SettingRange | None, code: FindingCode) -> tuple[float | None, float | None, str, str, str]:
        if band is None or not band.bounded()[code.row]:
            return known_or_none(code.low), known_or_none(code.high), "", "", ""
        low_by, high_by = self._set_by(band, code.row)
        low, high = known_or_none(float(band.low[code.row])), known_or_none(float(band.high[code.row]))
        state = [word for word, holds in band.states() if holds[code.row]]
        # an observation bound is no end of the range: show the band that it prefers
        if not is_outside(code.present, low, high):
            low = code.low if code.low == code.low else low
            high = code.high if code.high == code.high else high
        return low, high, low_by, high_by, ", ".join(state)

    def _range_text(
        self, requirement: Requirement, code: FindingCode, low: float | None, high: float | None, unit: Unit
    ) -> str:
        if requirement.kind == "must_be":
            return self._reasons.switch_word(requirement, requirement.text == "on")
        ends = {"above": low == code.low, "below": high == code.high}
        return range_text(low, high, unit, beyond=ends.get(requirement.kind, False))

    def _set_by(self, band: SettingRange, row: int) -> tuple[str, str]:
        names = []
        for ends in (band.low_check, band.high_check):
            number = int(ends[row])
            names.append("" if number == NO_CHECK else self.audit.outcomes[number].check.key)
        return names[0], names[1]

    def _steps(self, check: Check, requirement: Requirement, row: int, deciding: int) -> Iterator[Step]:
        seen: set[tuple[str, int]] = set()
        child = CHILD_OF.get(check.subject)
        for node in (requirement.judged, requirement.bound):
            if node is None:
                continue
            if deciding >= 0 and child is not None:
                for name in names_over_rows(node, self.trace.of_rows):
                    yield from self.trace.steps(Name(name), child, deciding, seen)
            yield from self.trace.steps(node, check.subject, row, seen)

    def _cells(self, steps: list[Step]) -> tuple[FindingCell, ...]:
        cells = []
        for step in steps:
            place = self.audit.fleet.book.place(step.cell) if step.cell != NO_CELL else None
            if place is not None:
                cells.append(FindingCell(place.file, place.sheet, place.cell, step.name))
        return tuple(cells)
