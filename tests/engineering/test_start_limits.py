"""Limits of starting duty: two tables of one association against each other, and where they end."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from audit.engineering.start_limits import (
    iec_external_inertia_limit_kgm2,
    least_rest_time_s,
    nema_load_inertia_limit_kgm2,
    usual_starts_per_hour,
    usual_starts_times_inertia_kgm2_per_hour,
)
from audit.engineering.unit_factors import KW_PER_HP

LISTED_HP = np.array([1, 1.5, 2, 3, 5, 7.5, 10, 15, 20, 25, 30, 40, 50, 60, 75, 100, 125, 150, 200, 250])


@pytest.mark.parametrize(("poles", "speed_rpm"), [(2, 3600), (4, 1800), (6, 1200)])
def test_starts_times_inertia_of_mg_10_is_the_load_inertia_limit_of_mg_1(poles, speed_rpm):
    # two publications: MG 10's B for one start an hour is MG 1's WK2; printed to two or three digits
    by_formula = nema_load_inertia_limit_kgm2(LISTED_HP * KW_PER_HP, speed_rpm)
    by_table = usual_starts_times_inertia_kgm2_per_hour(LISTED_HP * KW_PER_HP, poles)
    assert (np.abs(by_table / by_formula - 1) < 0.05).all()
    assert (np.abs(by_table / by_formula - 1)[6:] < 0.02).all()


def test_four_poles_allow_twice_the_starts_of_two_and_six_a_little_more():
    # regularity of the published table: A of 2, 4 and 6 poles is 1 : 2 : 2.27, printed to 0.1
    power_kw = LISTED_HP * KW_PER_HP
    two, four, six = (usual_starts_per_hour(power_kw, poles) for poles in (2, 4, 6))
    assert (np.abs(four - 2 * two) <= 0.15).all()
    assert (np.abs(six - 2.27 * two) <= 0.2).all()


@given(st.floats(0.2, 186), st.floats(0.2, 186), st.sampled_from([2, 4, 6]))
def test_the_larger_motor_is_allowed_fewer_starts_and_longer_rest(one, other, poles):
    low, high = min(one, other), max(one, other)
    assert usual_starts_per_hour(high, poles) <= usual_starts_per_hour(low, poles)
    assert least_rest_time_s(high, poles) >= least_rest_time_s(low, poles)


def test_a_power_between_two_rows_reads_the_larger_one():
    # 45 kW = 60.3 hp counts as 60 hp within one per cent; 47 kW = 63 hp reads 75 hp
    assert usual_starts_per_hour([45, 47], 4).tolist() == [6.3, 5.8]


@given(st.floats(1, 150), st.floats(0.001, 10))
def test_inertia_only_ever_lowers_the_starts(power_kw, inertia_kgm2):
    assert usual_starts_per_hour(power_kw, 4, inertia_kgm2) <= usual_starts_per_hour(power_kw, 4)


def test_beyond_the_tables_it_is_missing():
    assert np.isnan(usual_starts_per_hour([200, np.nan, 75, 75, 75], [4, 4, 8, 3, np.nan])).all()
    assert np.isnan(least_rest_time_s([200, 0, 75], [4, 4, 10])).all()
    assert np.isnan(usual_starts_per_hour(75, 4, [-1.0, np.nan])).all()
    assert np.isnan(nema_load_inertia_limit_kgm2([400, 300, 200, 75, 0], [1800, 1200, 900, 3700, 1800])).all()
    assert np.isnan(iec_external_inertia_limit_kgm2([0.3, 700, np.nan, 10, 10], [1, 1, 1, 0, np.nan])).all()
