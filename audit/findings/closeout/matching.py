"""Rows of work and rows that came back, joined by key; what was typed, read and set beside what was issued."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass, field, replace
from datetime import date

from audit.findings.closeout.answers import Answer, AnswerKind, read_answer
from audit.findings.closeout.returned import ReturnedCell, ReturnedRow, ReturnedSheet
from audit.findings.closeout.slips import likely_slip
from audit.findings.handover.rows import WorkRow
from audit.findings.handover.written import WrittenSetting
from audit.fleet.folding import exact, loose
from audit.intake.celltext import CellKind, find_day_first, find_decimal_comma, read_date_cells
from audit.intake.resolve.units import Way, plan_of
from audit.vocabulary.quantities import Quantity, vocabulary
from audit.vocabulary.spellings import UnitReading, name_of

NOTHING = Answer(AnswerKind.NOTHING)
_STEP_SLACK = 1.000001


@dataclass(frozen=True)
class Matched:
    """A row of work with what came back for it; numbers are in the export's own unit."""

    work: WorkRow
    row: ReturnedRow | None
    issued: Answer = NOTHING
    as_found: Answer = NOTHING
    as_left: Answer = NOTHING
    done_on: date | None = None
    question: str = ""
    """What must be asked before the as-left value can be judged."""
    unit_missing: bool = False
    remarks: tuple[str, ...] = field(default=())

    @property
    def usable(self) -> bool:
        """Tell whether there is an as-left value that may be judged."""
        return self.as_left.is_value and not self.question


@dataclass(frozen=True)
class Matches:
    """All rows of work, matched, and the keys that came back without one."""

    rows: tuple[Matched, ...]
    unknown_keys: tuple[str, ...]
    remarks: tuple[str, ...]


def match(work: Sequence[WorkRow], sheet: ReturnedSheet, stamp: str, judged_from: Mapping[str, str]) -> Matches:
    """Join what came back with the work; `stamp` and `judged_from` are those of the present audit."""
    by_key: dict[str, list[ReturnedRow]] = {}
    for row in sheet.rows:
        by_key.setdefault(row.key, []).append(row)
    reader = _Reader(sheet, work, judged_from)
    matched = [reader.matched(row, by_key.get(row.key, [])) for row in work]
    remarks = list(sheet.remarks)
    if sheet.stamps and _state_of(stamp) not in [_state_of(one) for one in sheet.stamps]:
        remarks.append(
            f"the sheet was issued from another state of the fleet or by other rules ({sheet.stamps[0]}, now {stamp}): "
            "rows whose present value or range moved since say so"
        )
    known = {row.key for row in work}
    return Matches(tuple(_shared(matched)), tuple(key for key in by_key if key not in known), tuple(remarks))


def _state_of(stamp: str) -> str:
    """Give the part of a stamp that tells the state of the fleet, without the day."""
    return stamp.rpartition(":")[2]


def same_value(one: float, other: float, written: WrittenSetting, steps: float = 1.0) -> bool:
    """Tell whether two numbers in the export's unit are the same to within so many steps."""
    step = written.step if written.step == written.step else 1e-6 * max(abs(one), abs(other))
    return abs(one - other) <= steps * step * _STEP_SLACK


def same_answer(one: Answer, other: Answer, work: WorkRow) -> bool:
    """Tell whether two values of a setting say the same."""
    if work.kind == "number":
        if one.off or other.off:
            return one.off and other.off
        return same_value(one.number, other.number, work.written)
    if work.kind in ("truth", "choice"):
        return one.code == other.code
    return exact(one.written) == exact(other.written)


def present_answer(work: WorkRow) -> Answer:
    """Give the present value as an answer, to be compared with others."""
    written = work.written
    if work.kind == "number":
        if written.number != written.number:
            return Answer(AnswerKind.VALUE if written.written else AnswerKind.NOTHING, written.written, off=True)
        return Answer(AnswerKind.VALUE, written.written, written.number)
    from_text = read_answer(ReturnedCell(written.written), "", vocabulary().quantities[work.setting], None)
    return from_text if from_text.is_value else Answer(AnswerKind.NOTHING, written.written)


def unchanged(answer: Answer, work: WorkRow) -> bool:
    """Tell whether a value is the present one, to half a step."""
    present = present_answer(work)
    if present.kind is AnswerKind.NOTHING:
        return False
    if work.kind == "number" and not (answer.off or present.off):
        return same_value(answer.number, present.number, work.written, 0.5)
    return same_answer(answer, present, work)


class _Reader:
    def __init__(self, sheet: ReturnedSheet, work: Sequence[WorkRow], judged_from: Mapping[str, str]) -> None:
        self._comma = find_decimal_comma([text for name in ("as_left", "as_found") for text in sheet.column(name)])
        self._day_first = find_day_first(sheet.column("date"))
        self._tags = {exact(row.finding.motor): row.finding.motor for row in work}
        self._judged_from = judged_from

    def matched(self, work: WorkRow, rows: Sequence[ReturnedRow]) -> Matched:
        if not rows:
            return Matched(work, None)
        readings = [self._one(work, row) for row in rows]
        answered = [reading for reading in readings if reading.as_left.kind is not AnswerKind.NOTHING]
        if len(answered) < 2:
            return (answered or readings)[0]
        first, values = answered[0], [reading.as_left for reading in answered]
        alike = all(a.kind is values[0].kind and (not a.is_value or same_answer(a, values[0], work)) for a in values)
        if alike:
            return first
        said = " and ".join(f"'{answer.written}'" for answer in values)
        return _asking(first, f"the row stands more than once, with {said}: which was left?")

    def _one(self, work: WorkRow, row: ReturnedRow) -> Matched:
        quantity = vocabulary().quantities[work.setting]
        unit = row.text("unit")
        issued = read_answer(row.cell("issued"), "", quantity, self._comma)
        found = read_answer(row.cell("as_found"), unit, quantity, self._comma)
        left = read_answer(row.cell("as_left"), unit, quantity, self._comma)
        remarks = [answer.remark for answer in (issued, found, left) if answer.remark]
        question, missing = left.question, False
        if work.kind == "number":
            issued, _, _ = _in_export_unit(issued, work, quantity, trusted=True)
            found, _, _ = _in_export_unit(found, work, quantity, trusted=False)
            left, asked, missing = _in_export_unit(left, work, quantity, trusted=False)
            question = question or asked or _slip(left, issued, work)
        question = question or self._mixed_up(work, row)
        then = row.text("judged_from")
        if then and then != self._judged_from.get(work.key, then):
            remarks.append(f"an old revision: issued for {then}, now {self._judged_from[work.key]}")
        tag = row.text("motor")
        if tag and loose(tag) != loose(work.finding.motor or work.finding.name) and not question:
            remarks.append(f"the tag reads '{tag}' now; the key says {work.finding.motor}")
        return Matched(work, row, issued, found, left, self._day(row), question, missing, tuple(remarks))

    def _mixed_up(self, work: WorkRow, row: ReturnedRow) -> str:
        """A tag of another motor beside this key: the columns may have been sorted apart."""
        tag = exact(row.text("motor"))
        if tag and tag != exact(work.finding.motor) and tag in self._tags:
            return (
                f"the row has the tag of {self._tags[tag]} and the key of {work.finding.motor}: columns may have been "
                "sorted apart, whose value is it?"
            )
        return ""

    def _day(self, row: ReturnedRow) -> date | None:
        value = row.cell("date").value
        reading = read_date_cells([value], day_first=self._day_first)[0]
        return reading.moment.date() if reading.kind is CellKind.DATE and reading.moment else None


def _in_export_unit(answer: Answer, work: WorkRow, quantity: Quantity, *, trusted: bool) -> tuple[Answer, str, bool]:
    """Give the value in the unit and base of the export, what must be asked, and whether the unit is missing."""
    written = work.written
    if not answer.is_value or answer.off:
        return answer, "", False
    if answer.unit is None:
        return answer, "", bool(written.unit) and not trusted
    if _is_own(answer.unit, written, quantity):
        return answer, "", False
    asked = f"it is not in {written.unit or 'the unit of the export'}: which value does the relay show?"
    if answer.unit.base == "" and written.base == "secondary":
        return answer, f"'{answer.written}' may be primary or secondary; {asked}", False
    plan = plan_of(quantity.name, answer.unit.unit, answer.unit.base)
    if plan.way is not Way.PLAIN or not written.factor > 0:
        return answer, f"'{answer.written}': {asked}", False
    number = written.number_for((answer.number + plan.offset) * plan.factor)
    remark = f"'{answer.written}' taken as {number:g} {written.unit}, by the unit typed with it"
    return (
        Answer(AnswerKind.VALUE, answer.written, number, unit=answer.unit, remark=remark),
        "",
        False,
    )


def _is_own(unit: UnitReading, written: WrittenSetting, quantity: Quantity) -> bool:
    own = written.unit_code or (name_of(quantity.unit) if quantity.unit else "")
    if unit.unit != own and not (own == "1" and unit.unit == "x"):
        return False
    ratio = unit.unit in ("x", "pct")
    return unit.base == written.base or (unit.base == "" and (ratio or written.base in ("", "primary")))


def _slip(left: Answer, issued: Answer, work: WorkRow) -> str:
    if not left.is_value or left.off or unchanged(left, work):
        return ""
    expected = issued.number if issued.is_value else work.written.number
    if expected != expected or same_value(left.number, expected, work.written):
        return ""
    slip = likely_slip(left.number, expected, work.written)
    return f"a likely slip, {slip}" if slip else ""


def _asking(matched: Matched, question: str) -> Matched:
    return replace(matched, question=question)


def _shared(rows: Sequence[Matched]) -> list[Matched]:
    """Let an answer for a setting count for every finding that speaks of the same setting."""
    answered: dict[str, Matched] = {}
    issued: dict[str, Matched] = {}
    for row in rows:
        if row.as_left.kind is not AnswerKind.NOTHING:
            answered.setdefault(row.work.setting_key, row)
        if row.issued.kind is not AnswerKind.NOTHING:
            issued.setdefault(row.work.setting_key, row)
    result = []
    for row in rows:
        if row.row is not None and row.issued.kind is AnswerKind.NOTHING and row.work.setting_key in issued:
            row = replace(row, issued=issued[row.work.setting_key].issued)
        source = answered.get(row.work.setting_key)
        if row.row is not None and row.as_left.kind is AnswerKind.NOTHING and source is not None:
            said = f"answered in the row of {source.work.finding.check}, which speaks of the same setting"
            row = replace(source, work=row.work, row=row.row, issued=row.issued, remarks=(*row.remarks, said))
        result.append(row)
    return result
