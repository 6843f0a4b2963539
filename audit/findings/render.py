"""Render a finding from its code: present value, permissible range, reason with numbers, cells, assumptions."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass, replace

import numpy as np

from audit.checks.entry import Check, Requirement
from audit.checks.ranges import NO_CHECK, SettingRange
from audit.checks.slips import slip_in_words
from audit.checks.verdicts import Outcome
from audit.derivation.recipes import lookup_for
from audit.derivation.trace import Step, Trace, day_text, shown_number
from audit.derivation.workings import CHILD_OF
from audit.expression.nodes import Name, Node, names_in, names_over_rows
from audit.expression.text import plain_number, render
from audit.expression.units import UnitCheck
from audit.findings.audit import Audit
from audit.findings.causes import causes_in_words
from audit.findings.finding import Finding, FindingCell, FindingCode
from audit.findings.past import identity_of
from audit.fleet.column import NO_CELL
from audit.vocabulary.quantities import Quantity
from audit.vocabulary.units import DIMENSIONLESS, UNITS, Unit

_BOUND_WORDS = {
    "at_least": "at least",
    "above": "above",
    "at_most": "at most",
    "below": "below",
    "equals": "equal to",
}


@dataclass(frozen=True, slots=True)
class _Place:
    motor: str
    service: str
    relay: str
    bus: str
    cubicle: str


class FindingRenderer:
    """Renders the findings of one audit."""

    def __init__(self, audit: Audit) -> None:
        self.audit = audit
        self.trace = Trace(audit.workings)
        self._groups = {name: FindingRenderer(group) for name, group in audit.other_groups.items()}
        self._meanings = lookup_for(audit.workings.quantities, audit.workings.limits)

    def all(self) -> Iterator[Finding]:
        """Render every finding, in order."""
        for code in self.audit.codes:
            yield self.finding(code)

    def finding(self, code: FindingCode) -> Finding:
        """Render one finding."""
        of_group = self._groups.get(code.group, self)
        outcome = of_group.audit.outcomes[code.outcome]
        of_range = outcome.check.stage == "ranges"
        return self._with_past(self._of_range(code, outcome.check) if of_range else of_group._breach(code, outcome))

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
        motor_row = self._motor_row(check.subject, code.row, deciding)
        setting = requirement.setting() or ""
        quantity = self.audit.workings.quantities.get(setting)
        unit = self._unit(requirement)
        band = self.audit.ranges.get(setting) if check.subject == "motor" else None
        low, high, low_by, high_by, state = self._band(band, code)
        steps = list(self._steps(check, requirement, code.row, deciding))
        place = self._place(motor_row, check.subject, code.row)
        present, present_text = self._present(requirement, code, quantity, unit)
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
            label=self._label(requirement, quantity, check),
            present=present,
            present_text=present_text,
            unit=unit.symbol,
            low=low,
            high=high,
            range_text=requirement.text if requirement.kind == "must_be" else range_text(low, high, unit),
            low_set_by=low_by,
            high_set_by=high_by,
            range_state=state,
            margin_pct=None if requirement.kind == "must_be" else margin_pct(code.present, low, high),
            because=self._because(requirement, code, check, present_text, unit)
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
        place = self._place(code.row, "motor", code.row)
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

    def _motor_row(self, subject: str, row: int, deciding: int) -> int:
        if subject == "motor":
            return row
        if deciding >= 0 and CHILD_OF.get(subject) == "motor":
            return deciding
        if subject == "relay":
            rows = self.audit.fleet.parent_rows("relay", "motor")
            return int(rows[row]) if rows is not None and len(rows) else -1
        return -1

    def _place(self, motor_row: int, subject: str, row: int) -> _Place:
        fleet, workings = self.audit.fleet, self.audit.workings
        bus = self._name("bus", row) if subject == "bus" else ""
        relay = self._name("relay", row) if subject == "relay" else ""
        if motor_row < 0:
            return _Place("", "", relay, bus, "")
        relays = fleet.parent_rows("motor", "relay")
        if relays is not None and len(relays) and relays[motor_row] >= 0:
            relay = relay or fleet.tables["relay"].keys[int(relays[motor_row])]
        texts = {}
        for name in ("service", "bus", "cubicle"):
            value = workings.column("motor", name).values[motor_row]
            texts[name] = str(value) if value is not None else ""
        return _Place(
            fleet.tables["motor"].keys[motor_row], texts["service"], relay, bus or texts["bus"], texts["cubicle"]
        )

    def _unit(self, requirement: Requirement) -> Unit:
        if isinstance(requirement.judged, Name):
            quantity = self.audit.workings.quantities.get(requirement.judged.name)
            if quantity is not None and quantity.unit is not None:
                return quantity.unit
        return self._unit_of_expression(requirement.judged)

    def _unit_of_expression(self, node: Node | None) -> Unit:
        if node is None:
            return DIMENSIONLESS
        checker = UnitCheck(self._meanings.get, self._meanings, self.audit.workings.functions)
        return checker.meaning(node).unit or DIMENSIONLESS

    def _label(self, requirement: Requirement, quantity: Quantity | None, check: Check) -> str:
        if check.judged_as:
            setting = self.audit.workings.quantities.get(check.each or "")
            return check.judged_as.replace("{label}", setting.label if setting else "")
        if quantity is not None:
            return quantity.label
        node = requirement.judged
        if node is None:
            return ""
        return render(node, self.trace.label_of, self._reads)

    def _reads(self, function: str) -> str:
        return self.audit.workings.functions[function].reads or function.replace("_", " ")

    def _present(
        self, requirement: Requirement, code: FindingCode, quantity: Quantity | None, unit: Unit
    ) -> tuple[float | bool | str | None, str]:
        subject = self.audit.outcomes[code.outcome].check.subject
        if requirement.kind == "must_be":
            on = code.present > 0
            return on, self._switch_word(requirement, on)
        if quantity is not None and quantity.kind != "number":
            text = self.trace.text_of(subject, code.row, quantity.name)
            return text, text
        if code.present != code.present:
            return None, ""
        if quantity is not None and quantity.kind == "number":
            return code.present, shown_number(code.present, quantity)
        return code.present, _with_unit(code.present, unit)

    def _switch_word(self, requirement: Requirement, on: bool) -> str:
        """Settings are on or off; facts are so or not."""
        quantity = self.audit.workings.quantities.get(requirement.setting() or "")
        if quantity is None or quantity.role == "setting":
            return "on" if on else "off"
        return "yes" if on else "no"

    def _band(self, band: SettingRange | None, code: FindingCode) -> tuple[float | None, float | None, str, str, str]:
        if band is None or not band.bounded()[code.row]:
            return _known(code.low), _known(code.high), "", "", ""
        low_by, high_by = self._set_by(band, code.row)
        low, high = _known(float(band.low[code.row])), _known(float(band.high[code.row]))
        state = [
            word
            for word, flag in (
                ("provisional", band.provisional),
                ("moving", band.moving),
                ("conflict", band.conflict()),
            )
            if flag[code.row]
        ]
        # an observation bound is no end of the range: show the band that it prefers
        if not _outside(code.present, low, high):
            low = code.low if code.low == code.low else low
            high = code.high if code.high == code.high else high
        return low, high, low_by, high_by, ", ".join(state)

    def _kind(self, code: FindingCode) -> str:
        return self.audit.outcomes[code.outcome].judged[code.requirement].requirement.kind

    def _set_by(self, band: SettingRange, row: int) -> tuple[str, str]:
        names = []
        for ends in (band.low_check, band.high_check):
            number = int(ends[row])
            names.append("" if number == NO_CHECK else self.audit.outcomes[number].check.key)
        return names[0], names[1]

    def _because(self, requirement: Requirement, code: FindingCode, check: Check, present_text: str, unit: Unit) -> str:
        label = self._label(requirement, self.audit.workings.quantities.get(requirement.setting() or ""), check)
        if requirement.kind == "must_be":
            return f"{label}: {present_text}, wanted: {self._switch_word(requirement, requirement.text == 'on')}"
        if requirement.kind == "must_be_stated":
            return f"{label} is not stated"
        assert requirement.bound is not None
        numbers = self.trace.numbers_in(requirement.bound, check.subject, code.row)
        if requirement.kind == "requires":
            return "; ".join(self._facts(requirement.bound, check.subject, code.row))
        bound = code.low if requirement.kind in ("at_least", "above") else code.high
        if requirement.kind == "equals":
            return f"{label} is {present_text}, wanted is {numbers}{_within(code, unit)}"
        limit = _with_unit(bound, unit)
        workings = limit if isinstance(requirement.bound, Name) else f"{numbers} = {limit}"
        judged = self._judged_numbers(requirement, check, code, present_text)
        return f"{label} {judged}, {_BOUND_WORDS[requirement.kind]} {workings} wanted"

    def _facts(self, node: Node, subject: str, row: int) -> list[str]:
        """Give the facts that a requirement asks for, each with what was found."""
        names = [name for name in names_in(node) if name in self.audit.workings.quantities]
        return [f"{self.trace.label_of(name)}: {self.trace.text_of(subject, row, name)}" for name in names]

    def _judged_numbers(self, requirement: Requirement, check: Check, code: FindingCode, shown: str) -> str:
        if requirement.judged is None or check.judged_as or isinstance(requirement.judged, Name):
            return shown
        return f"{self.trace.numbers_in(requirement.judged, check.subject, code.row)} = {shown}"

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


def _known(value: float) -> float | None:
    return None if np.isnan(value) else value


def _outside(present: float, low: float | None, high: float | None) -> bool:
    return (low is not None and present < low) or (high is not None and present > high)


def _with_unit(value: float, unit: Unit) -> str:
    if unit == UNITS["date"]:
        return day_text(value)
    return f"{plain_number(value)} {unit.symbol}".strip()


def _within(code: FindingCode, unit: Unit) -> str:
    if code.low != code.low or code.high <= code.low:
        return ""
    return f" ({_with_unit(code.low, unit)} to {_with_unit(code.high, unit)})"


def range_text(low: float | None, high: float | None, unit: Unit) -> str:
    """Write a permissible range.

    >>> from audit.vocabulary.units import UNITS
    >>> range_text(1020.0, None, UNITS["a"]), range_text(None, None, UNITS["a"])
    ('1,020 A or more', '')
    """
    if low is None and high is None:
        return ""
    if high is None:
        return f"{_with_unit(low or 0.0, unit)} or more"
    if low is None:
        return f"{_with_unit(high, unit)} or less"
    if low == high:
        return _with_unit(low, unit)
    if low > high:
        return f"none ({_with_unit(low, unit)} > {_with_unit(high, unit)})"
    return f"{plain_number(low)} to {_with_unit(high, unit)}"


def margin_pct(present: float, low: float | None, high: float | None) -> float | None:
    """Give the distance to the nearer end in per cent of that end; positive inside the range.

    >>> margin_pct(900.0, 1000.0, None)
    -10.0
    """
    if present != present:
        return None
    margins = []
    if low:
        margins.append((present - low) / low * 100)
    if high:
        margins.append((high - present) / high * 100)
    return min(margins) if margins else None
