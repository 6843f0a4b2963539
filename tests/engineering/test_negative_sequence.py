"""Unbalanced currents: against symmetrical components of phasors."""

from __future__ import annotations

import cmath
from math import pi, sqrt

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from audit.engineering.negative_sequence import (
    conservative_unbalance_weight,
    equivalent_current_a,
    open_phase_equivalent_current_a,
    open_phase_line_current_a,
    open_phase_sequence_current_a,
    typical_unbalance_weight,
    unbalance_heating_time_s,
)

TURN = cmath.exp(2j * pi / 3)


def sequence_currents(a: complex, b: complex, c: complex) -> tuple[float, float]:
    """Positive and negative sequence after Fortescue."""
    return abs(a + TURN * b + TURN**2 * c) / 3, abs(a + TURN**2 * b + TURN * c) / 3


@given(st.floats(0.1, 1e4))
def test_an_open_phase_has_equal_sequence_currents_of_line_over_root_three(line_a):
    positive, negative = sequence_currents(0, line_a, -line_a)
    assert positive == pytest.approx(negative, rel=1e-12)
    assert open_phase_sequence_current_a(line_a) == pytest.approx(negative, rel=1e-12)


@given(st.floats(0.1, 1e4), st.floats(0, 15))
def test_equivalent_current_of_an_open_phase_follows_from_its_sequence_currents(line_a, weight):
    positive, negative = sequence_currents(0, line_a, -line_a)
    expected = equivalent_current_a(positive, negative, weight)
    assert open_phase_equivalent_current_a(line_a, weight) == pytest.approx(expected, rel=1e-12)


def test_the_same_power_on_two_lines_takes_root_three_times_the_current():
    # sqrt(3) V I = V I' for the same voltage and power factor
    assert open_phase_line_current_a(60.0) == pytest.approx(sqrt(3) * 60.0)


@given(st.floats(1e-3, 1e3), st.floats(0, 1e3), st.floats(0, 15))
def test_unbalance_never_lowers_the_equivalent_current(positive_a, negative_a, weight):
    assert equivalent_current_a(positive_a, negative_a, weight) >= positive_a * (1 - 1e-12)


def test_no_negative_sequence_can_be_borne_without_end():
    assert unbalance_heating_time_s(0, 100, 40) == np.inf


def test_a_missing_or_impossible_input_gives_a_missing_value():
    assert np.isnan(typical_unbalance_weight([np.nan, 0.0, -5.0])).all()
    assert np.isnan(conservative_unbalance_weight(np.nan))
    assert np.isnan(equivalent_current_a([np.nan, 1, 1], [1, np.nan, 1], [1, 1, np.nan])).all()
    assert np.isnan(unbalance_heating_time_s([np.nan, 1, 1, -1], [1, 0, 1, 1], [1, 1, np.nan, 1])).all()
