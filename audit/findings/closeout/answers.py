"""What a contractor typed, read with all its sloppiness: a likely slip is asked, never converted."""

from __future__ import annotations

import re
from dataclasses import dataclass
from datetime import date, datetime
from enum import StrEnum

from audit.findings.closeout.returned import ReturnedCell
from audit.fleet.column import NO, UNKNOWN, YES
from audit.intake.celltext import CellKind, read_number_text
from audit.intake.celltext.words import folded
from audit.intake.resolve.codes import UNREAD, choice_of, truth_of
from audit.vocabulary.quantities import Quantity
from audit.vocabulary.spellings import UnitReading, read_unit

DITTO = frozenset(
    {
        '"',
        "''",
        "'",
        "”",
        "“",
        "〃",
        "do",
        "do.",
        "ditto",
        "dto",
        "dto.",
        ",,",
        '-"-',
        '- " -',
        "-''-",
        "same",
        "as above",
    }
)
_WORDS_FOR_DONE = frozenset({"x", "✓", "✔", "√", "t", "in", "used", "fitted"})
_TWO_NUMBERS = re.compile(
    r"\d(?:[\d.,' ]*\d)?\D*?(?:/|;|->|→|=>|\bor\b|\bto\b|\bwas\b|\bnow\b|\band\b|\n)\D*?\d", re.IGNORECASE
)


class AnswerKind(StrEnum):
    """What an answer turned out to be."""

    NOTHING = "nothing"
    VALUE = "value"
    WORDS = "words"
    ASKED = "asked"


@dataclass(frozen=True, slots=True)
class Answer:
    """A cell of the contractor, read.

    `number` is that of a VALUE; a setting in words has its code in `code` (yes, no, place of a choice) and its text.
    `unit` is the unit typed with it, None where none was. `question` says what must be asked.
    """

    kind: AnswerKind
    written: str = ""
    number: float = float("nan")
    code: int = UNREAD
    unit: UnitReading | None = None
    off: bool = False
    question: str = ""
    remark: str = ""

    @property
    def is_value(self) -> bool:
        """Tell whether there is a value to judge."""
        return self.kind is AnswerKind.VALUE


def read_answer(cell: ReturnedCell, unit_cell: str, quantity: Quantity, decimal_comma: bool | None) -> Answer:
    """Read what was typed for a setting, with the unit that stands in its own column."""
    text = cell.text()
    remark = f"'{cell.struck}' is struck through and left out" if cell.struck else ""
    if not text:
        return Answer(AnswerKind.NOTHING, remark=remark)
    if isinstance(cell.value, (date, datetime)):
        return _asked(text, "the cell holds a date: which value was left?")
    if folded(text) in DITTO or text.casefold() in DITTO:
        return _asked(text, "a ditto mark points at another row, and rows may have been sorted: which value was left?")
    answer = (
        _number(cell, text, unit_cell, quantity, decimal_comma) if quantity.kind == "number" else _word(text, quantity)
    )
    if remark:
        answer = Answer(answer.kind, answer.written, answer.number, answer.code, answer.unit, answer.off,
                        answer.question, "; ".join(filter(None, (answer.remark, remark))))  # fmt: skip
    return answer


def _asked(text: str, question: str) -> Answer:
    return Answer(AnswerKind.ASKED, text, question=question)


def _number(cell: ReturnedCell, text: str, unit_cell: str, quantity: Quantity, decimal_comma: bool | None) -> Answer:
    if isinstance(cell.value, bool):
        return Answer(AnswerKind.WORDS, text)
    if isinstance(cell.value, (int, float)):
        number, typed = float(cell.value), ""
        if cell.per_cent:
            number, typed = float(f"{number * 100:.10g}"), "%"
        return _with_unit(text, number, typed, unit_cell, quantity)
    reading = read_number_text(text, decimal_comma)
    if reading.kind in (CellKind.SEVERAL, CellKind.RANGE) or _TWO_NUMBERS.search(text):
        return _asked(text, f"'{text}' holds more than one value: which was left?")
    if reading.kind is CellKind.AMBIGUOUS:
        return _asked(text, f"'{text}' may be {reading.numbers[0]:g} or {reading.numbers[-1]:g}: which was left?")
    if reading.kind is CellKind.NUMBER:
        if reading.relation:
            return _asked(text, f"'{text}' is a bound, not a value: which value was left?")
        return _with_unit(text, reading.number, reading.unit_text, unit_cell, quantity)
    if reading.kind is CellKind.OFF:
        return Answer(AnswerKind.VALUE, text, off=True)
    return Answer(AnswerKind.WORDS, text)


def _with_unit(text: str, number: float, typed: str, unit_cell: str, quantity: Quantity) -> Answer:
    in_cell = read_unit(typed, quantity) if typed else None
    beside = read_unit(unit_cell, quantity) if unit_cell else None
    for said, read in ((typed, in_cell), (unit_cell, beside)):
        if said and read is None:
            return _asked(text, f"'{said}' is no unit of {quantity.label}: in which unit is it?")
    if in_cell is not None and beside is not None and not _same(in_cell, beside):
        return _asked(text, f"'{typed}' stands in the cell and '{unit_cell}' in the column of units: which is it?")
    return Answer(AnswerKind.VALUE, text, number, unit=beside or in_cell)


def _same(one: UnitReading, other: UnitReading) -> bool:
    return one.unit == other.unit and ("" in (one.base, other.base) or one.base == other.base)


def _word(text: str, quantity: Quantity) -> Answer:
    word = folded(text)
    if quantity.kind == "truth":
        code = UNKNOWN if word in _WORDS_FOR_DONE else truth_of(text, quantity.part)
        if code in (YES, NO):
            return Answer(AnswerKind.VALUE, text, code=code)
    elif quantity.kind == "choice":
        code, within = choice_of(quantity, text)
        if code != UNREAD and not within:
            return Answer(AnswerKind.VALUE, text, code=code)
    elif quantity.kind == "text" and word not in ("ok", "done", "set", "yes", "as issued"):
        return Answer(AnswerKind.VALUE, text)
    return Answer(AnswerKind.WORDS, text)
