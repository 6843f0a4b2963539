"""Numerals of both decimal marks: read back what was written, never guess between two meanings."""

from __future__ import annotations

from decimal import Decimal

import pytest
from hypothesis import given
from hypothesis import strategies as st

from audit.intake.celltext.numerals import find_decimal_comma, numeral_values

values = st.decimals(min_value=0, max_value=10**9, places=2)


def written(value: Decimal, decimal: str, thousands: str) -> str:
    return f"{value:,.2f}".replace(",", "\0").replace(".", decimal).replace("\0", thousands)


@given(
    values,
    st.sampled_from([(".", ","), (".", "'"), (".", " "), (".", ""), (",", "."), (",", " "), (",", "'"), (",", "")]),
)
def test_two_decimals_are_read_back_whatever_the_separators(value, marks):
    # two decimals can be no group of thousands, so every spelling has one meaning
    assert numeral_values(written(value, *marks)) == (float(value),)


@given(st.integers(10**6, 10**12), st.sampled_from([",", ".", " ", "'"]))
def test_groups_of_thousands_are_read_back(value, thousands):
    assert numeral_values(f"{value:,}".replace(",", thousands)) == (float(value),)


@given(st.integers(1, 999), st.integers(0, 999), st.sampled_from([".", ","]))
def test_three_digits_behind_one_mark_have_two_meanings_until_the_mark_is_known(whole, rest, mark):
    text = f"{whole}{mark}{rest:03d}"
    decimal, thousands = float(f"{whole}.{rest:03d}"), float(whole * 1000 + rest)
    assert numeral_values(text) == (decimal, thousands)
    assert numeral_values(text, decimal_comma=mark == ",") == (decimal,)
    assert numeral_values(text, decimal_comma=mark != ",") == (thousands,)


@pytest.mark.parametrize(
    ("text", "value"), [("0,125", 0.125), ("0.125", 0.125), (".5", 0.5), ("1234,567", 1234.567), ("1.5e3", 1500.0)]
)
def test_what_cannot_be_thousands_is_a_decimal(text, value):
    # by hand: a leading zero, four leading digits or an exponent rule out groups of three
    assert numeral_values(text) == (value,)


@pytest.mark.parametrize("text", ["1.2.3", "1,23,456", "12,34.5", "1.234.56", "192.168.1.10"])
def test_uneven_groups_are_no_numeral(text):
    assert numeral_values(text) == ()


@pytest.mark.parametrize(
    ("texts", "comma"),
    [
        (["3,3 kV", "1,234"], True),
        (["1.250,5"], True),
        (["1.234.567"], True),
        (["0.86", "1,234"], False),
        (["1,250.5 A"], False),
        (["1,234,567"], False),
        (["1,234", "1.234", "12", "text"], None),
        (["3,3", "0.86"], None),
        (["12.03.2025"], None),
    ],
)
def test_the_decimal_mark_of_a_column_is_told_by_its_clear_numerals(texts, comma):
    assert find_decimal_comma(texts) is comma
