"""Three values: what is missing never becomes a yes or a number, and a settled outcome needs no further datum."""

from __future__ import annotations

import itertools

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from numpy.typing import NDArray

from audit.derivation.functions import FUNCTIONS
from audit.expression.functions import Function, Functions
from audit.expression.lacking import lacking
from audit.expression.nodes import Node
from audit.expression.parse import parse
from audit.expression.values import NO, UNKNOWN, YES, Value, evaluate


class FixedScope:
    """Names with one row of values."""

    functions: Functions = FUNCTIONS

    def __init__(self, **values: float | bool | None) -> None:
        self.columns = {name: _value(value) for name, value in values.items()}

    def rows(self) -> int:
        return 1

    def value(self, name: str) -> Value:
        return self.columns[name]

    def over_rows(self, function: Function, operands: tuple[Node, ...]) -> Value:
        raise AssertionError("no child rows here")


def _value(value: float | bool | None) -> Value:
    basis = np.ones(1, dtype=np.int8)
    if isinstance(value, bool) or value is None:
        code = UNKNOWN if value is None else YES if value else NO
        return Value("truth", np.array([code], dtype=np.int8), basis)
    return Value("number", np.array([value], dtype=float), basis)


def truth(text: str, **values: float | bool | None) -> int:
    return int(evaluate(parse(text), FixedScope(**values)).values[0])


def number(text: str, **values: float) -> float:
    return float(evaluate(parse(text), FixedScope(**values)).values[0])


@pytest.mark.parametrize(("first", "second"), list(itertools.product([True, False, None], repeat=2)))
def test_and_is_the_least_and_or_the_greatest_of_its_operands(first: bool | None, second: bool | None) -> None:
    # Kleene's three-valued logic, written out: no < unknown < yes
    order = {False: NO, None: UNKNOWN, True: YES}
    assert truth("a and b", a=first, b=second) == min(order[first], order[second])
    assert truth("a or b", a=first, b=second) == max(order[first], order[second])
    assert truth("not a", a=first) == YES - order[first]


@pytest.mark.parametrize("operator", ["<", "<=", ">", ">=", "==", "!="])
def test_a_missing_number_makes_every_comparison_unknown(operator: str) -> None:
    assert truth(f"a {operator} b", a=float("nan"), b=1.0) == UNKNOWN


def test_a_setting_typed_at_its_limit_meets_it() -> None:
    assert truth("a >= 1.7 * b", a=1020.0, b=600.0) == YES
    assert truth("a >= 1.1 * b", a=3.3, b=3.0) == YES
    assert truth("a > 1.1 * b", a=3.3, b=3.0) == NO


def test_division_by_nothing_gives_nothing() -> None:
    assert np.isnan(number("a / b", a=1.0, b=0.0))


def test_greater_serves_with_either_operand_alone() -> None:
    assert number("greater(a, b)", a=float("nan"), b=3.0) == 3.0
    assert np.isnan(number("greater(a, b)", a=float("nan"), b=float("nan")))


def test_a_function_with_a_missing_operand_is_missing() -> None:
    # the cold trip time is infinite below pickup; a missing current must not look like that
    assert np.isnan(number("thermal_trip_time_cold_s(i, p, t)", i=float("nan"), p=105.0, t=1200.0))
    assert number("thermal_trip_time_cold_s(i, p, t)", i=100.0, p=105.0, t=1200.0) == float("inf")


def test_choose_needs_only_the_side_that_is_chosen() -> None:
    assert number("choose(c, a, b)", c=True, a=1.0, b=float("nan")) == 1.0
    assert np.isnan(number("choose(c, a, b)", c=None, a=1.0, b=2.0))


def names_lacking(text: str, **values: float | bool | None) -> set[str]:
    return set(lacking(parse(text), FixedScope(**values), np.ones(1, dtype=bool)))


def test_only_what_could_settle_the_outcome_is_lacking() -> None:
    assert names_lacking("a and b", a=False, b=None) == set()
    assert names_lacking("a or b", a=True, b=None) == set()
    assert names_lacking("a and b", a=True, b=None) == {"b"}
    assert names_lacking("a > b", a=1.0, b=float("nan")) == {"b"}
    assert names_lacking("greater(a, b) > c", a=float("nan"), b=1.0, c=float("nan")) == {"c"}


TRUTHS = st.sampled_from([True, False, None])


@given(
    a=TRUTHS,
    b=TRUTHS,
    c=TRUTHS,
    text=st.sampled_from(["a and not b or c", "(a or b) and not c", "not (a and b and c)"]),
)
def test_a_settled_outcome_stays_when_an_unknown_is_learnt(
    a: bool | None, b: bool | None, c: bool | None, text: str
) -> None:
    before = truth(text, a=a, b=b, c=c)
    if before == UNKNOWN:
        return
    options = [[v] if v is not None else [True, False] for v in (a, b, c)]
    after: NDArray[np.int8] = np.array([truth(text, a=x, b=y, c=z) for x, y, z in itertools.product(*options)])
    assert (after == before).all()
