"""What an expression may be: arithmetic, comparison, truth, named functions; everything else is refused."""

from __future__ import annotations

import contextlib

import pytest
from hypothesis import given
from hypothesis import strategies as st

from audit.expression.parse import BadExpression, parse

HOSTILE = [
    "motor.__class__",
    "().__class__.__bases__[0]",
    "__import__('os').system('true')",
    "[x for x in (1, 2)]",
    "lambda: 1",
    "a ** 9",
    "9 ** 9 ** 9",
    "a if b else c",
    "(a := 3)",
    "f'{a}'",
    "'text' * 1000000",
    "a[0]",
    "{1: 2}",
    "a @ b",
    "a % b",
    "a // b",
    "1 < a < 2",
    "f(x=1)",
    "f(*a)",
    "f()",
    "a.b(c)",
    "await a",
    "yield a",
    "1e999",
    "True",
    "None",
    "...",
    "1j",
    "b'a'",
    "a;b",
    "a\nb",
    "a # b",
    "",
    "   ",
    "-" * 100 + "a",
    "(" * 60 + "a" + ")" * 60 + " +" * 3,
    "a + " * 400 + "a",
]


@pytest.mark.parametrize("text", HOSTILE)
def test_everything_but_arithmetic_and_truth_is_refused(text: str) -> None:
    with pytest.raises(BadExpression):
        parse(text)


@given(st.text(max_size=60))
def test_no_text_does_anything_but_parse_or_be_refused(text: str) -> None:
    with contextlib.suppress(BadExpression):
        assert parse(text)


@pytest.mark.parametrize("text", ["1.7 * a_a", "not (x and y) or z", "greater(a, b) >= c - 1", "-a / b == 2"])
def test_what_rules_need_parses(text: str) -> None:
    assert parse(text)
