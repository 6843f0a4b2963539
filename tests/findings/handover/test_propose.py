"""The proposed value lies inside the range, on a step, and changes no more than it must."""

from __future__ import annotations

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from audit.findings.handover.propose import MARGIN, inside, propose_number
from audit.findings.handover.written import WrittenSetting


def written(number: float, factor: float, step: float) -> WrittenSetting:
    return WrittenSetting("q", "header", f"{number:g}", "x CT", "x", "ct", number, factor, 0.0, step, None)


def test_too_low_goes_to_the_low_end_and_the_margin() -> None:
    """By hand: 5 % above 1,020 A is 1,071 A; at 250 A a multiple that is 4.284, the next step of 0.1 is 4.3."""
    assert propose_number(900, 1020, 4350, written(3.6, 250, 0.1), "A").value == 4.3


def test_too_high_goes_to_the_high_end_and_the_margin() -> None:
    """By hand: 5 % below 11.32 s is 10.754 s; the next step of 0.1 below is 10.7."""
    assert propose_number(15, 5.7, 11.32, written(15, 1, 0.1), "s").value == 10.7


def test_a_narrow_range_gives_its_middle() -> None:
    """By hand: 5 % below 75.75 lies below the middle, 75."""
    assert propose_number(100, 74.25, 75.75, written(100, 1, 1), "A").value == 75


def test_an_empty_range_and_a_range_without_a_step_give_none() -> None:
    assert propose_number(3, 5, 4, written(3, 1, 0.1), "s").value is None
    assert propose_number(3, 4.2, 4.8, written(3, 1, 1.0), "s").value is None
    assert propose_number(3, 4, 8, written(3, math.nan, 0.1), "s").value is None


@given(low=st.floats(0.1, 1e4), width=st.floats(1.0, 3.0), present=st.floats(0.01, 1e5), factor=st.floats(0.01, 1e3))
def test_whatever_is_proposed_lies_inside(low: float, width: float, present: float, factor: float) -> None:
    one = written(present / factor, factor, 0.01)
    value = propose_number(present, low, low * width, one, "A").value
    if value is not None:
        assert isinstance(value, float)
        assert inside(one.primary(value), low, low * width)
        assert value == pytest.approx(round(value / 0.01) * 0.01)


def test_the_margin_is_the_one_that_is_told() -> None:
    assert f"{MARGIN:.0%}" in propose_number(900, 1020, None, written(3.6, 250, 0.1), "A").how
