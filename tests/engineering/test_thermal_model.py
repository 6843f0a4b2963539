"""Thermal model: against the differential equation, and what must hold for any motor."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from scipy.integrate import solve_ivp

from audit.engineering.thermal_model import (
    running_weight_from_stall_ratio,
    steady_thermal_level_pu,
    thermal_time_constant_s,
    thermal_trip_time_cold_s,
    thermal_trip_time_from_level_s,
    thermal_trip_time_hot_s,
)

currents = st.floats(0.0, 1e4)
pickups = st.floats(0.1, 1e3)
constants = st.floats(1.0, 1e4)


def trip_time_by_integration_s(level: float, current_a: float, pickup_a: float, time_constant_s: float) -> float:
    """Solve d theta / dt = ((I / Ip)^2 - theta) / tau up to theta = 1."""

    def rate(_time: float, theta: np.ndarray) -> np.ndarray:
        return ((current_a / pickup_a) ** 2 - theta) / time_constant_s

    def trips(_time: float, theta: np.ndarray) -> float:
        return theta[0] - 1.0

    trips.terminal = True
    solution = solve_ivp(
        rate, (0, 20 * time_constant_s), [level], events=trips, rtol=1e-11, atol=1e-12, method="DOP853"
    )
    return float(solution.t_events[0][0])


@pytest.mark.parametrize("current_a", [106.0, 150.0, 600.0])
@pytest.mark.parametrize("time_constant_s", [300.0, 1800.0])
def test_cold_trip_time_solves_the_differential_equation(current_a, time_constant_s):
    expected = trip_time_by_integration_s(0.0, current_a, 105.0, time_constant_s)
    assert thermal_trip_time_cold_s(current_a, 105, time_constant_s) == pytest.approx(expected, rel=1e-7)


@pytest.mark.parametrize("prior_a", [30.0, 80.0, 100.0])
@pytest.mark.parametrize("weight", [0.3, 1.0])
def test_hot_trip_time_solves_the_differential_equation(prior_a, weight):
    expected = trip_time_by_integration_s(weight * (prior_a / 110) ** 2, 550.0, 110.0, 900.0)
    assert thermal_trip_time_hot_s(550, prior_a, 110, 900, weight) == pytest.approx(expected, rel=1e-7)


@given(currents, currents, pickups, constants)
def test_a_warm_motor_never_trips_later_than_a_cold_one(current_a, prior_a, pickup_a, constant_s):
    hot = thermal_trip_time_hot_s(current_a, prior_a, pickup_a, constant_s)
    assert hot <= thermal_trip_time_cold_s(current_a, pickup_a, constant_s)


@given(currents, pickups, constants, st.floats(1.001, 10))
def test_more_current_never_trips_later(current_a, pickup_a, constant_s, factor):
    slower = thermal_trip_time_cold_s(current_a, pickup_a, constant_s)
    assert thermal_trip_time_cold_s(current_a * factor, pickup_a, constant_s) <= slower


@given(st.floats(1.05, 50), pickups, constants)
def test_time_constant_is_read_back_from_any_point_of_its_curve(multiple, pickup_a, constant_s):
    time = thermal_trip_time_cold_s(multiple * pickup_a, pickup_a, constant_s)
    assert thermal_time_constant_s(time, multiple * pickup_a, pickup_a) == pytest.approx(constant_s, rel=1e-9)


def test_at_the_pickup_it_never_trips_and_just_above_it_takes_long():
    # edge: the standard's curve has its asymptote at the pickup
    assert thermal_trip_time_cold_s([99, 100], 100, 600).tolist() == [np.inf, np.inf]
    assert thermal_trip_time_cold_s(100.001, 100, 600) > 10 * 600


def test_an_earlier_load_above_the_pickup_leaves_no_time_at_all():
    # edge: (110 / 100)^2 = 1.21 of the thermal capacity
    assert thermal_trip_time_hot_s([600, 50], 110, 100, 600).tolist() == [0.0, 0.0]
    assert thermal_trip_time_from_level_s(1.0, 600, 100, 600) == 0.0


def test_running_weight_keeps_the_data_sheets_ratio_of_hot_to_cold_stall():
    # published rule: full-load heat counted by 1 - hot / cold; exact for I^2 t, here at 20 times the pickup
    for ratio in (0.25, 0.5, 0.9):
        weight = running_weight_from_stall_ratio(ratio, 1.15)
        hot = thermal_trip_time_hot_s(2000, 100, 115, 600, weight)
        assert hot / thermal_trip_time_cold_s(2000, 115, 600) == pytest.approx(ratio, rel=0.005)


def test_running_weight_is_within_one_and_a_half_per_cent_at_six_times_the_pickup():
    ratios = np.linspace(0.2, 1.0, 81)
    weight = running_weight_from_stall_ratio(ratios)
    got = thermal_trip_time_hot_s(6, 1, 1, 600, weight) / thermal_trip_time_cold_s(6, 1, 600)
    assert (np.abs(got / ratios - 1) < 0.015).all()


@pytest.mark.parametrize("place", range(5))
def test_a_missing_input_gives_a_missing_time(place):
    given_values = [600.0, 90.0, 100.0, 600.0, 1.0]
    given_values[place] = np.nan
    assert np.isnan(thermal_trip_time_hot_s(*given_values))


def test_impossible_inputs_give_a_missing_time():
    assert np.isnan(thermal_trip_time_cold_s([-1, 600, 600], [100, 0, 100], [600, 600, -5])).all()
    assert np.isnan(steady_thermal_level_pu([-1.0, 1.0], [1.0, 0.0])).all()


def test_arguments_broadcast_over_the_fleet():
    assert thermal_trip_time_cold_s(np.full((3, 1), 600), np.full(4, 100), 600).shape == (3, 4)
