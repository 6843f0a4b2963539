"""Thermal level over starts, runs and rests: against the differential equation and step-by-step counting."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import assume, given
from hypothesis import strategies as st
from scipy.integrate import solve_ivp

from audit.engineering.thermal_level import thermal_level_after_pu, thermal_level_over_sequence_pu
from audit.engineering.thermal_sequence import (
    cooling_time_s,
    permitted_starts,
    start_heat_pu,
    waiting_time_until_start_s,
)


def level_by_integration(level: float, target: float, time_constant_s: float, duration_s: float) -> float:
    solution = solve_ivp(
        lambda _t, theta: (target - theta) / time_constant_s, (0, duration_s), [level], rtol=1e-11, atol=1e-12
    )
    return float(solution.y[0, -1])


def test_a_day_of_starts_runs_and_rests_solves_the_differential_equation():
    # two motors at once, heating 600 s / 900 s, cooling three times as long; start, run, rest, start, rest
    targets = np.array([[36.0, 0.7, 0.0, 36.0, 0.0], [25.0, 0.5, 0.0, 20.0, 0.0]])
    constants = np.array([[600.0, 600.0, 1800.0, 600.0, 1800.0], [900.0, 900.0, 2700.0, 900.0, 2700.0]])
    durations = np.array([[8.0, 3600.0, 900.0, 6.0, 7200.0], [10.0, 300.0, 60.0, 12.0, 600.0]])
    initial = np.array([0.0, 0.3])
    got = thermal_level_over_sequence_pu(initial, targets, constants, durations)
    for motor in range(2):
        level = initial[motor]
        for step in range(5):
            level = level_by_integration(level, targets[motor, step], constants[motor, step], durations[motor, step])
            assert got[motor, step] == pytest.approx(level, rel=1e-8)


@given(st.floats(0, 1), st.floats(0, 50), st.floats(1, 1e4), st.floats(0, 1e4), st.floats(0, 1))
def test_a_step_may_be_cut_in_two_anywhere(level, target, constant_s, duration_s, share):
    whole = thermal_level_after_pu(level, target, constant_s, duration_s)
    half = thermal_level_after_pu(level, target, constant_s, duration_s * share)
    assert thermal_level_after_pu(half, target, constant_s, duration_s * (1 - share)) == pytest.approx(
        whole, rel=1e-9, abs=1e-12
    )


def counted_starts(rise: float, start_kept: float, rest_kept: float, level: float, up_to: int) -> int:
    """Count starts one by one until one ends at the trip."""
    for number in range(up_to):
        level = rise + level * start_kept
        if level >= 1.0:
            return number
        level *= rest_kept
    return up_to


@given(st.floats(1.5, 8), st.floats(1, 30), st.floats(100, 3000), st.floats(0, 0.99), st.floats(0, 3600))
def test_permitted_starts_are_those_counted_one_by_one(multiple, start_s, constant_s, level, rest_s):
    cooling_s = 3 * constant_s
    rise = float(start_heat_pu(multiple, start_s, 1, constant_s))
    start_kept, rest_kept = np.exp(-start_s / constant_s), np.exp(-rest_s / cooling_s)
    counted = counted_starts(rise, start_kept, rest_kept, level, 2000)
    assume(counted < 2000)
    # a level that meets the trip to the last digit may be counted either way
    assume(counted_starts(rise * (1 + 1e-9), start_kept, rest_kept, level, 2001) == counted)
    assume(counted_starts(rise * (1 - 1e-9), start_kept, rest_kept, level, 2001) == counted)
    assert permitted_starts(multiple, start_s, 1, constant_s, level, rest_s, cooling_s) == counted


def test_starts_with_long_rests_are_permitted_without_end():
    # by hand: a start adds 36 (1 - exp(-8/600)) = 0.477; two hours at tau 1 h leave exp(-2) = 0.135 of it,
    # so the level settles at 0.477 / (1 - 0.135 * 0.987) = 0.55
    assert permitted_starts(6, 8, 1, 600, 0, 7200, 3600) == np.inf


def test_a_start_too_hot_for_a_cold_motor_is_never_permitted():
    # by hand: 36 * (1 - exp(-20 / 600)) = 1.18
    assert permitted_starts(6, 20, 1, 600) == 0
    assert waiting_time_until_start_s(0.5, 6, 20, 1, 600, 3600) == np.inf


@given(st.floats(0.01, 1.5), st.floats(2, 8), st.floats(1, 15), st.floats(200, 3000))
def test_after_the_waiting_time_one_start_goes_through(level, multiple, start_s, constant_s):
    heat = float(start_heat_pu(multiple, start_s, 1, constant_s))
    assume(heat < 0.999)
    wait = waiting_time_until_start_s(level, multiple, start_s, 1, constant_s, 2 * constant_s)
    rested = thermal_level_after_pu(level, 0, 2 * constant_s, wait)
    assert permitted_starts(multiple, start_s, 1, constant_s, rested) >= 1


def test_a_cool_motor_need_not_wait():
    assert cooling_time_s([0.2, 0.0], 0.5, 3600).tolist() == [0.0, 0.0]


def test_from_a_missing_step_on_the_level_is_missing():
    levels = thermal_level_over_sequence_pu(0, [36, np.nan, 0], 600, [8, 60, 60])
    assert np.isnan(levels).tolist() == [False, True, True]


def test_missing_inputs_give_missing_counts_and_waits():
    assert np.isnan(permitted_starts([np.nan, 6], 8, 1, [600, np.nan])).all()
    assert np.isnan(waiting_time_until_start_s([np.nan, 1], 6, 8, [1, np.nan], 600, 3600)).all()
