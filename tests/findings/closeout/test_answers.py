"""What contractors type, read: each expected reading follows from the cell alone."""

from __future__ import annotations

from datetime import datetime

import pytest

from audit.findings.closeout.answers import AnswerKind, read_answer
from audit.findings.closeout.returned import ReturnedCell
from audit.findings.closeout.slips import likely_slip
from audit.findings.handover.written import WrittenSetting
from audit.fleet.column import NO, YES
from audit.vocabulary.quantities import vocabulary

QUANTITIES = vocabulary().quantities
DELAY = QUANTITIES["jam_trip_delay_s"]
PICKUP = QUANTITIES["jam_trip_pickup_a"]
SWITCH = QUANTITIES["jam_trip_on"]


def setting(number: float, factor: float = 1.0, base: str = "") -> WrittenSetting:
    return WrittenSetting("jam_trip_pickup_a", "Jam", f"{number:g}", "A", "a", base, number, factor, 0.0, 0.01, None)


@pytest.mark.parametrize(
    ("typed", "beside", "number", "unit"),
    [
        (4.8, "s", 4.8, "s"),
        ("4,8", "s", 4.8, "s"),
        ("4.8 s", "", 4.8, "s"),
        ("4800 ms", "", 4800, "ms"),
        (" 4.8 ", "sec", 4.8, "s"),
        ("4.8s", "s", 4.8, "s"),
    ],
)
def test_a_value_keeps_its_number_and_the_unit_typed(typed: object, beside: str, number: float, unit: str) -> None:
    answer = read_answer(ReturnedCell(typed), beside, DELAY, None)
    assert (answer.kind, answer.number) == (AnswerKind.VALUE, number)
    assert answer.unit is not None
    assert answer.unit.unit == unit


def test_a_per_cent_cell_is_a_number_of_per_cent() -> None:
    """A cell that shows 5 % holds 0.05."""
    answer = read_answer(ReturnedCell(0.05, per_cent=True), "% FLA", PICKUP, None)
    assert (answer.number, answer.unit.unit if answer.unit else "") == (5.0, "pct")


@pytest.mark.parametrize("typed", ["ok", "done", "Done.", "as issued", "set", "n/a", "see report", True])
def test_words_are_no_value(typed: object) -> None:
    assert read_answer(ReturnedCell(typed), "s", DELAY, None).kind is AnswerKind.WORDS


@pytest.mark.parametrize(
    "typed",
    ['"', "''", "do.", "ditto", "4.8 / 5", "3.5 -> 4.8", "was 3.5 now 4.8", "4.8;5", "4 to 5", ">4", "~4",
     datetime(2026, 5, 1)],
)  # fmt: skip
def test_what_may_mean_several_things_is_asked(typed: object) -> None:
    answer = read_answer(ReturnedCell(typed), "s", DELAY, None)
    assert answer.kind is AnswerKind.ASKED
    assert answer.question


def test_a_thousands_mark_or_a_decimal_one_is_asked() -> None:
    assert read_answer(ReturnedCell("1,250"), "A", PICKUP, None).kind is AnswerKind.ASKED
    assert read_answer(ReturnedCell("1,250"), "A", PICKUP, False).number == 1250
    assert read_answer(ReturnedCell("1,250"), "A", PICKUP, True).number == 1.25


def test_units_that_contradict_or_do_not_fit_are_asked() -> None:
    assert read_answer(ReturnedCell("4.8 s"), "ms", DELAY, None).kind is AnswerKind.ASKED
    assert read_answer(ReturnedCell(4.8), "kg", DELAY, None).kind is AnswerKind.ASKED


def test_struck_text_counts_for_nothing_and_is_said() -> None:
    answer = read_answer(ReturnedCell(None, "4.8"), "s", DELAY, None)
    assert answer.kind is AnswerKind.NOTHING
    assert "4.8" in answer.remark


@pytest.mark.parametrize(("typed", "code"), [("ON", YES), ("Enabled", YES), ("off", NO), ("N", NO), ("Y", YES)])
def test_a_switch_is_read_in_the_words_of_the_trade(typed: str, code: int) -> None:
    assert read_answer(ReturnedCell(typed), "", SWITCH, None).code == code


@pytest.mark.parametrize("typed", ["✓", "x", "ok", "done"])
def test_a_tick_says_that_something_was_done_not_what(typed: str) -> None:
    assert read_answer(ReturnedCell(typed), "", SWITCH, None).kind is AnswerKind.WORDS


@pytest.mark.parametrize(
    ("typed", "expected", "factor", "base"),
    [
        (50.0, 0.05, 1.0, ""),  # ms for s
        (0.5, 30.0, 1.0, ""),  # min for s
        (120.0, 1.2, 1.0, ""),  # % for a multiple
        (81.0, 0.81, 100.0, "secondary"),  # primary for secondary, CT 100:1
        (3.0, 0.05, 1.0, ""),  # cycles at 60 Hz
    ],
)
def test_slips_of_unit_and_side_are_seen(typed: float, expected: float, factor: float, base: str) -> None:
    assert likely_slip(typed, expected, setting(expected, factor, base))


def test_another_value_is_no_slip() -> None:
    assert likely_slip(5.1, 4.8, setting(4.8)) == ""
    assert likely_slip(0.0, 4.8, setting(4.8)) == ""
