"""Texts of the trade to numbers. Expected values are what an engineer reads; spellings from trade usage."""

from __future__ import annotations

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from audit.intake.celltext import CellKind, read_number_text


@pytest.mark.parametrize(
    ("text", "number", "unit"),
    [
        ("37 kW", 37, "kW"),
        ("3,3kV", 3.3, "kV"),
        ("250ms", 250, "ms"),
        ("12 cyc", 12, "cyc"),
        ("6 x FLA", 6, "x FLA"),
        ("6XFLA", 6, "x FLA"),
        ("1.15×In", 1.15, "x In"),
        ("1.2 In", 1.2, "x In"),
        ("650 %FLA", 650, "% FLA"),
        ("100 % of FLA", 100, "% FLA"),
        ("1.2 x CT", 1.2, "x CT"),
        ("85%", 85, "%"),
        ("5.0 A sec", 5, "A sec"),
        ("40 °C", 40, "°C"),
        ("5 1/min", 5, "1/min"),
        ("1 250,5 A", 1250.5, "A"),
        ("1\u202f250\u00a0A", 1250, "A"),
        ("1’250.5", 1250.5, ""),
        ("−5", -5, ""),
        (" 5. ", 5, ""),
        ("7 1/2 HP", 7.5, "HP"),
        ("7-1/2 hp", 7.5, "hp"),
        ("1/2 HP", 0.5, "HP"),
        ("7½", 7.5, ""),
        ("2 min 30 s", 150, "s"),
        ("1 h 30 min", 5400, "s"),
        ("0:02:30", 150, "s"),
        ("6k6", 6.6, "kV"),
    ],
)
def test_a_number_with_its_unit_is_read(text, number, unit):
    read = read_number_text(text)
    assert (read.kind, read.unit_text) == (CellKind.NUMBER, unit)
    assert read.number == pytest.approx(number, rel=1e-15)
    assert read.text == text


@pytest.mark.parametrize(
    ("text", "number", "relation", "qualifier"),
    [
        ("<=600%", 600, "<=", ""),
        ("≤ 600 %", 600, "<=", ""),
        ("max. 600 %", 600, "<=", ""),
        ("min. 5 s", 5, ">=", ""),
        ("~40", 40, "~", ""),
        ("6.5xFLC +20%", 6.5, "", "+20%"),
        ("415±10%", 415, "", "±10%"),
        ("15@100%V", 15, "", "@ 100%V"),
        ("110kW (150hp)", 110, "", "(150hp)"),
        ("40*", 40, "", "*"),
        ("5 s hot", 5, "", "hot"),
    ],
)
def test_what_stands_beside_a_value_is_kept_and_remarked(text, number, relation, qualifier):
    read = read_number_text(text)
    assert (read.kind, read.number, read.relation, read.qualifier) == (CellKind.NUMBER, number, relation, qualifier)
    assert read.remark


@pytest.mark.parametrize(
    ("text", "numbers"),
    [
        ("380-415", (380, 415)),
        ("63 A to 90 A", (63, 90)),
        ("63 – 90 A", (63, 90)),
        ("0.5..1.2", (0.5, 1.2)),
        ("1 - 2", (1, 2)),
    ],
)
def test_a_range_gives_both_ends_and_no_value(text, numbers):
    read = read_number_text(text)
    assert (read.kind, read.numbers) == (CellKind.RANGE, numbers)
    assert math.isnan(read.number)


@pytest.mark.parametrize(
    ("text", "numbers"),
    [
        ("90/100", (90, 100)),
        ("12/18", (12, 18)),
        ("94.5/94.8/93.9", (94.5, 94.8, 93.9)),
        ("1,5/2,5", (1.5, 2.5)),
        ("400/690 Δ/Y", (400, 690)),
        ("400\n500", (400, 500)),
        ("200-5A", (200, 5)),
        ("4200:120", (4200, 120)),
        ("5 A, 10 A", (5, 10)),
    ],
)
def test_several_values_are_all_given_and_none_is_chosen(text, numbers):
    read = read_number_text(text)
    assert (read.kind, read.numbers) == (CellKind.SEVERAL, numbers)
    assert math.isnan(read.number)
    assert len(read.parts) == len(numbers)


def test_parts_of_several_values_keep_their_own_words():
    read = read_number_text("12 s H / 20 s C")
    assert [(part.number, part.unit_text, part.qualifier) for part in read.parts] == [(12, "s", "H"), (20, "s", "C")]


@pytest.mark.parametrize(
    ("text", "numbers"),
    [("1,234", (1.234, 1234)), ("1.234 A", (1.234, 1234)), ("-1,234", (-1.234, -1234)), ("0:08", (8, 480))],
)
def test_a_text_with_two_meanings_is_asked(text, numbers):
    read = read_number_text(text)
    assert (read.kind, read.numbers) == (CellKind.AMBIGUOUS, numbers)
    assert math.isnan(read.number)
    assert "may be" in read.remark


@pytest.mark.parametrize(
    ("text", "kind"),
    [
        ("", CellKind.MISSING),
        (" \u00a0 ", CellKind.MISSING),
        ("unknown", CellKind.MISSING),
        ("OFF", CellKind.OFF),
        ("Disabled", CellKind.OFF),
        ("∞", CellKind.OFF),
        ("-", CellKind.NOT_USED),
        ("---", CellKind.NOT_USED),
        ("–", CellKind.NOT_USED),
        ("N/A", CellKind.NOT_USED),
        ("n.a.", CellKind.NOT_USED),
        ("TBC", CellKind.TO_BE_CONFIRMED),
        ("t.b.a.", CellKind.TO_BE_CONFIRMED),
        ("?", CellKind.TO_BE_CONFIRMED),
        ("INST", CellKind.INSTANTANEOUS),
        ("Inst.", CellKind.INSTANTANEOUS),
        ("#REF!", CellKind.ERROR),
        ("#####", CellKind.ERROR),
    ],
)
def test_words_instead_of_a_value_are_told_apart(text, kind):
    assert read_number_text(text).kind is kind


@pytest.mark.parametrize(
    "text",
    [
        "abt 40",
        "see note 3",
        "Enabled",
        "F/B",
        "2 + 1 after 30 min",
        "2x9R",
        "1.2.3",
        "5--6",
        "1e999",
        "+-5",
        "% FLA",
        "x" * 500,
    ],
)
def test_what_is_no_number_is_withheld_with_advice(text):
    read = read_number_text(text)
    assert read.kind is CellKind.BAD
    assert math.isnan(read.number)
    assert "write one number" in read.remark


def test_a_zero_is_a_number_and_not_off():
    assert (read_number_text("0").kind, read_number_text("0").number) == (CellKind.NUMBER, 0.0)


@given(
    st.floats(min_value=-1e9, max_value=1e9).filter(lambda value: value == 0 or abs(value) > 1e-5),
    st.sampled_from(["", " ", "\u00a0", "\u202f"]),
    st.sampled_from(["", "A", "kW", "%", "°C", "x FLA", "% FLA", "ms"]),
    st.booleans(),
)
def test_any_number_is_read_back_with_its_unit(value, space, unit, comma):
    text = f"{value:.6f}"
    written = (text.replace(".", ",") if comma else text) + space + unit
    read = read_number_text(written)
    assert (read.kind, read.number, read.unit_text) == (CellKind.NUMBER, float(text), unit)


@given(st.text(max_size=60))
def test_any_text_ends_in_a_reading(text):
    read = read_number_text(text)
    assert math.isnan(read.number) == (read.kind is not CellKind.NUMBER)


@given(st.text(alphabet="0123456789.,-+/ :x%AeE'\n~<=()@", max_size=40))
def test_any_text_of_digits_and_marks_ends_in_a_reading(text):
    read = read_number_text(text)
    assert math.isnan(read.number) == (read.kind is not CellKind.NUMBER)
    assert all(math.isfinite(number) for number in read.numbers)
