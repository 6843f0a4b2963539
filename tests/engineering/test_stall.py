"""Stall times: scaling and edges."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from audit.engineering.stall import stall_time_at_current_s, stall_time_at_voltage_s

NAN = np.nan


@given(st.floats(1, 60), st.floats(10, 1e4), st.floats(10, 1e4), st.floats(10, 1e4))
def test_going_over_a_third_current_changes_nothing(time_s, rated_a, between_a, current_a):
    direct = stall_time_at_current_s(time_s, rated_a, current_a)
    over = stall_time_at_current_s(stall_time_at_current_s(time_s, rated_a, between_a), between_a, current_a)
    assert over == pytest.approx(float(direct), rel=1e-9)


@given(st.floats(1, 60), st.floats(10, 1e4), st.floats(0.3, 1.2))
def test_voltage_scales_as_the_current_that_follows_it(time_s, rated_a, voltage_pu):
    by_current = stall_time_at_current_s(time_s, rated_a, rated_a * voltage_pu)
    assert stall_time_at_voltage_s(time_s, voltage_pu) == pytest.approx(float(by_current), rel=1e-9)


def test_without_current_there_is_no_limit():
    assert stall_time_at_current_s(10, 600, 0) == np.inf


def test_missing_or_impossible_gives_missing():
    assert np.isnan(stall_time_at_current_s([NAN, 10, 10, 10, -1], [6, NAN, 6, 0, 6], [5, 5, NAN, 5, 5])).all()
    assert np.isnan(stall_time_at_voltage_s([NAN, 10], [1, NAN])).all()
