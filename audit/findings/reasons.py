"""What a finding says of the value that it judges: its label, its unit, the value in words, and why it fails."""

from __future__ import annotations

from audit.checks.entry import Check, Requirement
from audit.checks.wording import BOUND_WORDS
from audit.derivation.recipes import lookup_for
from audit.derivation.trace import Trace, shown_number
from audit.derivation.workings import Workings
from audit.expression.nodes import Name, Node, names_in
from audit.expression.text import render
from audit.expression.units import UnitCheck
from audit.findings.figures import with_unit
from audit.findings.finding import FindingCode
from audit.vocabulary.quantities import Quantity
from audit.vocabulary.units import DIMENSIONLESS, Unit


class Reasons:
    """Words for what the checks of one fleet judge."""

    def __init__(self, workings: Workings, trace: Trace) -> None:
        self._workings, self._trace = workings, trace
        self._meanings = lookup_for(workings.quantities, workings.limits)

    def unit(self, requirement: Requirement) -> Unit:
        """Give the unit of what a requirement judges."""
        if isinstance(requirement.judged, Name):
            quantity = self._workings.quantities.get(requirement.judged.name)
            if quantity is not None and quantity.unit is not None:
                return quantity.unit
        if requirement.judged is None:
            return DIMENSIONLESS
        checker = UnitCheck(self._meanings.get, self._meanings, self._workings.functions)
        return checker.meaning(requirement.judged).unit or DIMENSIONLESS

    def label(self, requirement: Requirement, check: Check) -> str:
        """Name what a requirement judges."""
        if check.judged_as:
            setting = self._workings.quantities.get(check.each or "")
            return check.judged_as.replace("{label}", setting.label if setting else "")
        quantity = self._quantity(requirement)
        if quantity is not None:
            return quantity.label
        return "" if requirement.judged is None else render(requirement.judged, self._trace.label_of, self._trace.reads)

    def present(
        self, requirement: Requirement, code: FindingCode, subject: str, unit: Unit
    ) -> tuple[float | bool | str | None, str]:
        """Give the value that is judged, and the same in words."""
        if requirement.kind == "must_be":
            on = code.present > 0
            return on, self.switch_word(requirement, on)
        quantity = self._quantity(requirement)
        if quantity is not None and quantity.kind != "number":
            text = self._trace.text_of(subject, code.row, quantity.name)
            return text, text
        if code.present != code.present:
            return None, ""
        if quantity is not None:
            return code.present, shown_number(code.present, quantity)
        return code.present, with_unit(code.present, unit)

    def because(self, requirement: Requirement, code: FindingCode, check: Check, present_text: str, unit: Unit) -> str:
        """Say what was found and what is wanted, with the numbers put in."""
        label = self.label(requirement, check)
        if requirement.kind == "must_be":
            return f"{label}: {present_text}, wanted: {self.switch_word(requirement, requirement.text == 'on')}"
        if requirement.kind == "must_be_stated":
            return f"{label} is not stated"
        assert requirement.bound is not None
        if requirement.kind == "requires":
            return "; ".join(self._facts(requirement.bound, check.subject, code.row))
        numbers = self._trace.numbers_in(requirement.bound, check.subject, code.row)
        if requirement.kind == "equals":
            return f"{label} is {present_text}, wanted is {numbers}{_within(code, unit)}"
        limit = with_unit(code.low if requirement.kind in ("at_least", "above") else code.high, unit)
        workings = limit if isinstance(requirement.bound, Name) else f"{numbers} = {limit}"
        judged = self._judged_numbers(requirement, check, code, present_text)
        return f"{label} {judged}, {BOUND_WORDS[requirement.kind]} {workings} wanted"

    def _quantity(self, requirement: Requirement) -> Quantity | None:
        return self._workings.quantities.get(requirement.setting() or "")

    def switch_word(self, requirement: Requirement, on: bool) -> str:
        """Settings are on or off; facts are so or not."""
        quantity = self._quantity(requirement)
        if quantity is None or quantity.role == "setting":
            return "on" if on else "off"
        return "yes" if on else "no"

    def _facts(self, node: Node, subject: str, row: int) -> list[str]:
        """Give the facts that a requirement asks for, each with what was found."""
        names = [name for name in names_in(node) if name in self._workings.quantities]
        return [f"{self._trace.label_of(name)}: {self._trace.text_of(subject, row, name)}" for name in names]

    def _judged_numbers(self, requirement: Requirement, check: Check, code: FindingCode, shown: str) -> str:
        if requirement.judged is None or check.judged_as or isinstance(requirement.judged, Name):
            return shown
        return f"{self._trace.numbers_in(requirement.judged, check.subject, code.row)} = {shown}"


def _within(code: FindingCode, unit: Unit) -> str:
    if code.low != code.low or code.high <= code.low:
        return ""
    return f" ({with_unit(code.low, unit)} to {with_unit(code.high, unit)})"
