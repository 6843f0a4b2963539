"""Drift of starts: against a general statistics library, one motor and many."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import assume, given
from hypothesis import strategies as st
from scipy.stats import kendalltau, theilslopes

from audit.engineering.drift import (
    kendall_probability,
    kendall_probability_by_group,
    theil_sen_slope,
    theil_sen_slope_by_group,
)

records = st.lists(st.tuples(st.integers(0, 400), st.integers(40, 90)), min_size=2, max_size=45)


@given(records)
def test_slope_is_that_of_the_statistics_library(pairs):
    dates, tenths = np.array(pairs, dtype=float).T
    assume(np.ptp(dates) > 0)
    with np.errstate(invalid="ignore"):  # the library's confidence band, not wanted here, fails on many ties
        expected = theilslopes(tenths / 10, dates).slope
    assert theil_sen_slope(dates, tenths / 10) == pytest.approx(expected, rel=1e-9, abs=1e-12)


@given(records)
def test_probability_is_that_of_the_statistics_library(pairs):
    dates, tenths = np.array(pairs, dtype=float).T
    assume(np.ptp(dates) > 0)
    assume(np.ptp(tenths) > 0)
    # exact for small samples without ties, else normal with tie correction, as the library chooses by itself
    assert kendall_probability(dates, tenths) == pytest.approx(kendalltau(dates, tenths).pvalue, rel=1e-6)


@given(st.permutations(range(33)))
def test_exact_probability_holds_up_to_thirty_three_records(order):
    expected = kendalltau(range(33), order, method="exact").pvalue
    assert kendall_probability(np.arange(33), order) == pytest.approx(expected, rel=1e-9)


def test_many_motors_at_once_give_what_each_gives_alone():
    generator = np.random.default_rng(20240314)
    sizes = generator.integers(0, 40, 60)
    group = np.repeat(np.arange(60), sizes)
    dates = generator.integers(0, 300, group.size).astype(float)
    values = np.round(5 + 0.002 * dates + generator.normal(0, 0.2, group.size), 1)
    shuffled = generator.permutation(group.size)
    slopes = theil_sen_slope_by_group(group[shuffled], dates[shuffled], values[shuffled], 60)
    chances = kendall_probability_by_group(group[shuffled], dates[shuffled], values[shuffled], 60)
    for motor in range(60):
        mine = group == motor
        assert slopes[motor] == pytest.approx(float(theil_sen_slope(dates[mine], values[mine])), nan_ok=True)
        assert chances[motor] == pytest.approx(float(kendall_probability(dates[mine], values[mine])), nan_ok=True)


def test_a_planted_drift_is_found_and_noise_alone_is_not():
    # 0.01 s a day on 0.05 s of scatter over 200 days; the same scatter without drift
    generator = np.random.default_rng(7)
    days = np.arange(0, 200, 10.0)
    scatter = generator.normal(0, 0.05, days.size)
    assert theil_sen_slope(days, 5 + 0.01 * days + scatter) == pytest.approx(0.01, abs=0.001)
    assert kendall_probability(days, 5 + 0.01 * days + scatter) < 0.001
    assert kendall_probability(days, 5 + scatter) > 0.05


def test_one_wild_record_does_not_move_the_slope():
    days = np.arange(12.0)
    values = 5 + 0.1 * days
    values[4] = 60.0
    assert theil_sen_slope(days, values) == pytest.approx(0.1)


def test_records_with_a_missing_half_are_left_out():
    days, values = [0, 1, 2, 3, np.nan], [5.0, np.nan, 7.0, 8.0, 99.0]
    assert theil_sen_slope(days, values) == theil_sen_slope([0, 2, 3], [5.0, 7.0, 8.0])


def test_too_little_or_too_like_is_missing():
    group = [0, 1, 1, 2, 2, -1, np.nan, 9]
    dates = [0, 5, 5, 1, 2, 3, 3, 3]
    values = [5, 5, 6, 4, 4, 1, 1, 1]
    # one record; two on one date; two alike (slope known, trend not); no record at all
    assert theil_sen_slope_by_group(group, dates, values, 4).tolist() == pytest.approx(
        [np.nan, np.nan, 0.0, np.nan], nan_ok=True
    )
    assert np.isnan(kendall_probability_by_group(group, dates, values, 4)).all()
