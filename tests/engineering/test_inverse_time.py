"""Inverse-time curves: against numerical integration, and what must hold for any curve."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import assume, given
from hypothesis import strategies as st
from scipy.integrate import quad

from audit.engineering.inverse_time import (
    INVERSE_CURVE_CODES,
    definite_time_s,
    inverse_curve_code,
    inverse_reset_time_s,
    inverse_time_s,
)
from audit.engineering.inverse_time_varying import inverse_time_varying_s

VERY_INVERSE = inverse_curve_code("IEEE very inverse")
codes = st.sampled_from(sorted(set(INVERSE_CURVE_CODES.values())))
multiples = st.floats(1.01, 25)


@given(multiples, multiples, st.floats(0.05, 15), codes)
def test_more_current_never_trips_later(one, other, multiplier, code):
    low, high = min(one, other), max(one, other)
    assert inverse_time_s(high, 1, multiplier, code) <= inverse_time_s(low, 1, multiplier, code)


@given(multiples, st.floats(0.05, 15), st.floats(0.1, 10), codes)
def test_the_time_is_proportional_to_the_multiplier(multiple, multiplier, factor, code):
    once = inverse_time_s(multiple, 1, multiplier, code)
    assert inverse_time_s(multiple, 1, multiplier * factor, code) == pytest.approx(once * factor, rel=1e-9)


@given(multiples, st.floats(0.05, 15), codes, st.lists(st.floats(0.01, 3), min_size=1, max_size=6))
def test_a_constant_current_cut_into_steps_trips_at_the_constant_current_time(multiple, multiplier, code, cuts):
    steps = [*cuts, 1e6]
    got = inverse_time_varying_s(np.full(len(steps), multiple), steps, 1, multiplier, code)
    assert got == pytest.approx(inverse_time_s(multiple, 1, multiplier, code), rel=1e-9)


def test_a_falling_start_current_trips_when_the_integral_reaches_one():
    # current falls in a straight line from 6 to 2 times the pickup over 40 s; integral by adaptive quadrature
    def share(until_s: float) -> float:
        return quad(lambda t: 1 / float(inverse_time_s(6 - 0.1 * t, 1, 5, VERY_INVERSE)), 0, until_s)[0]

    step = 0.01
    middles = np.arange(step / 2, 40, step)
    trip = inverse_time_varying_s(6 - 0.1 * middles, np.full(middles.shape, step), 1, 5, VERY_INVERSE)
    assert share(float(trip)) == pytest.approx(1.0, abs=1e-4)


def test_below_the_pickup_the_element_runs_back_at_the_published_rate():
    # by hand: half travel in half of 7.0277 s; 7.2 s without current is a third of 21.6 s, so 1/6 is left
    full = float(inverse_time_s(2, 1, 1, VERY_INVERSE))
    reset = float(inverse_reset_time_s(0, 1, 1, VERY_INVERSE))
    got = inverse_time_varying_s([2, 0, 2], [full / 2, 7.2, 100], 1, 1, VERY_INVERSE, reset)
    assert got == pytest.approx(full / 2 + 7.2 + full * (1 - (1 / 2 - 1 / 3)), rel=1e-9)


def test_an_element_that_resets_at_once_begins_anew():
    full = float(inverse_time_s(2, 1, 1, VERY_INVERSE))
    got = inverse_time_varying_s([2, 0, 2], [full * 0.9, 0.1, 100], 1, 1, VERY_INVERSE, 0.0)
    assert got == pytest.approx(full * 0.9 + 0.1 + full, rel=1e-9)


def test_without_reset_the_travel_waits():
    full = float(inverse_time_s(2, 1, 1, VERY_INVERSE))
    got = inverse_time_varying_s([2, 0, 2], [full * 0.9, 500, 100], 1, 1, VERY_INVERSE)
    assert got == pytest.approx(full + 500, rel=1e-9)


def test_steps_that_end_before_the_trip_do_not_trip():
    assert inverse_time_varying_s([2, 2], [1, 1], 1, 1, VERY_INVERSE) == np.inf


def test_a_missing_step_matters_only_before_the_trip():
    before = inverse_time_varying_s([np.nan, 20], [1, 100], 1, 1, VERY_INVERSE)
    after = inverse_time_varying_s([20, np.nan], [100, 1], 1, 1, VERY_INVERSE)
    assert np.isnan(before)
    assert after == pytest.approx(float(inverse_time_s(20, 1, 1, VERY_INVERSE)))


def test_several_elements_are_integrated_at_once():
    code = [VERY_INVERSE, inverse_curve_code("IEC A")]
    got = inverse_time_varying_s(np.full((2, 1), 5.0), np.full((2, 1), 100.0), [1, 1], [1, 1], code)
    assert got.tolist() == pytest.approx(inverse_time_s(5, 1, 1, code).tolist(), rel=1e-12)


@given(st.floats(0, 0.999), st.floats(0, 0.999))
def test_reset_takes_longer_the_nearer_the_current_is_to_the_pickup(one, other):
    assume(abs(one - other) > 1e-6)
    low, high = min(one, other), max(one, other)
    assert inverse_reset_time_s(high, 1, 1, VERY_INVERSE) > inverse_reset_time_s(low, 1, 1, VERY_INVERSE)


def test_above_twenty_times_the_time_is_held_unless_told_otherwise():
    code = inverse_curve_code("IEC C")
    # by hand: 80 / (400 - 1) = 0.2005 s held; 80 / (900 - 1) = 0.0890 s on the bare formula at 30 times
    assert inverse_time_s(30, 1, 1, code) == pytest.approx(0.2005, abs=5e-5)
    assert inverse_time_s(30, 1, 1, code, np.inf) == pytest.approx(0.0890, abs=5e-5)


def test_definite_time_trips_after_its_delay_whatever_the_current():
    assert definite_time_s([1.0, 1.001, 50.0], 1, 2.5).tolist() == [np.inf, 2.5, 2.5]


def test_iec_curves_declare_no_common_reset():
    assert np.isnan(inverse_reset_time_s(0, 1, 1, inverse_curve_code("IEC A")))


def test_missing_or_impossible_gives_missing():
    current, pickup = [np.nan, 5, 5, 5, -1, 5], [1, np.nan, 1, 1, 1, 0]
    assert np.isnan(inverse_time_s(current, pickup, [1, 1, np.nan, 1, 1, 1], [1, 1, 1, np.nan, 1, 1])).all()
    assert np.isnan(inverse_time_s(5, 1, 1, [-1, 8, 1.5])).all()


def test_an_unknown_curve_is_refused():
    with pytest.raises(ValueError, match="'IEC G' is not an inverse-time curve"):
        inverse_curve_code("IEC G")
