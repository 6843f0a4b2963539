"""Run-up times: against a general solver of the equation of motion, and where the motor stalls."""

from __future__ import annotations

from math import pi

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from scipy.integrate import quad, solve_ivp

from audit.engineering.kloss import breakdown_slip_pu, kloss_torque_nm, run_up_time_kloss_s
from audit.engineering.run_up import (
    average_accelerating_torque_nm,
    run_up_time_constant_torque_s,
    run_up_time_s,
)

NAN = np.nan


def solved_run_up_s(inertia_kgm2, synchronous_rpm, net_torque_nm, end_pu):
    """Integrate J dw/dt = net torque of the speed in parts of synchronous speed until the end speed."""

    def rate(_t, speed):
        return net_torque_nm(speed) / (inertia_kgm2 * synchronous_rpm * pi / 30)

    def arrives(_t, speed):
        return speed[0] - end_pu

    arrives.terminal = True
    solution = solve_ivp(rate, (0, 1e4), [0.0], events=arrives, rtol=1e-10, atol=1e-12)
    return float(solution.t_events[0][0])


@pytest.mark.parametrize("voltage_pu", [1.0, 0.85])
@pytest.mark.parametrize(("load_nm", "exponent"), [(3000.0, 2.0), (1500.0, 1.0), (1000.0, 0.0)])
def test_kloss_run_up_solves_the_equation_of_motion(voltage_pu, load_nm, exponent):
    def net(x):
        slip = 1 - x
        motor = 2 * 7500 / (slip / 0.12 + 0.12 / slip)
        return voltage_pu**2 * motor - load_nm * x**exponent

    expected = solved_run_up_s(50, 1500, net, 0.95)
    got = run_up_time_kloss_s(50, 1500, 7500, 0.12, load_nm, exponent, 0.95, voltage_pu)
    assert got == pytest.approx(expected, rel=1e-6)


def test_run_up_over_points_solves_the_equation_of_motion():
    # data-sheet like: saddle at 300 r/min, breakdown at 1350
    speed = np.array([0.0, 300.0, 900.0, 1350.0, 1450.0])
    motor = np.array([800.0, 700.0, 900.0, 1400.0, 900.0])
    load = np.array([100.0, 60.0, 200.0, 420.0, 480.0])

    def net(x):
        return np.interp(x * 1500, speed, motor) - np.interp(x * 1500, speed, load)

    expected = quad(lambda n: 20 * pi / 30 / net(n / 1500), 0, 1450, points=speed[1:-1], epsrel=1e-11)[0]
    assert run_up_time_s(20, speed, motor, load) == pytest.approx(expected, rel=1e-9)


def test_motors_with_different_numbers_of_points_are_done_at_once():
    speed = [[0, 500, 1000, 1400], [0, 2900, NAN, NAN]]
    motor = [[300, 250, 280, 400], [50, 80, NAN, NAN]]
    load = [[20, 40, 90, 160], [5, 30, NAN, NAN]]
    got = run_up_time_s([3.0, 0.1], speed, motor, load)
    assert got[0] == run_up_time_s(3.0, speed[0], motor[0], load[0])
    assert got[1] == run_up_time_s(0.1, speed[1][:2], motor[1][:2], load[1][:2])


@given(st.floats(0.1, 100), st.floats(0.3, 1.1), st.floats(0.3, 1.1))
def test_lower_voltage_never_starts_faster(inertia, one, other):
    low, high = min(one, other), max(one, other)
    at = [run_up_time_kloss_s(inertia, 1500, 7500, 0.12, 2500, 2, 0.9, v) for v in (low, high)]
    assert at[0] >= at[1]


def test_a_load_above_the_motor_anywhere_is_a_stall():
    # by hand: at standstill 2 * 7500 / (1 / 0.12 + 0.12) = 1774 N m, less than a conveyor's 1800 N m
    assert run_up_time_kloss_s(50, 1500, 7500, 0.12, [1700, 1800], 0, 0.9)[1] == np.inf
    assert run_up_time_s(5, [0, 500, 1000], [300, 200, 300], [100, 250, 100]) == np.inf
    assert run_up_time_constant_torque_s(5, 1500, [0.0, -10.0]).tolist() == [np.inf, np.inf]


def test_breakdown_slip_puts_rated_torque_at_rated_slip():
    # formula of Kloss at the rated point, breakdown 2.5 times rated torque
    slip = breakdown_slip_pu(0.02, 2.5)
    assert kloss_torque_nm(0.02, 2500, slip) == pytest.approx(1000, rel=1e-12)


def test_the_rule_of_thumb_is_near_the_integral_for_a_motor_it_is_meant_for():
    # trapezium of a motor with 1.5 times locked-rotor and 2.5 times breakdown torque, pump load
    speed = np.linspace(0, 1425, 200)
    motor = np.interp(speed, [0, 1350, 1425], [1500, 2500, 1800])
    load = 900 * (speed / 1500) ** 2
    torque = average_accelerating_torque_nm(1500, 2500, 900)
    assert run_up_time_constant_torque_s(20, 1425, torque) == pytest.approx(
        float(run_up_time_s(20, speed, motor, load)), rel=0.2
    )


@pytest.mark.parametrize(
    ("speed", "motor"),
    [([0, NAN, 1400], [300, 250, 280]), ([0, 1000, 900], [300, 250, 280]), ([0, NAN, NAN], [300, NAN, NAN])],
    ids=["gap", "falling speed", "one point"],
)
def test_unusable_points_give_missing(speed, motor):
    assert np.isnan(run_up_time_s(5, speed, motor, [10, 10, 10] if motor[1] == 250 else [10, NAN, NAN]))


@pytest.mark.parametrize("place", range(8))
def test_a_missing_input_gives_a_missing_time(place):
    values = [50.0, 1500.0, 7500.0, 0.12, 3000.0, 2.0, 0.9, 1.0]
    values[place] = NAN
    assert np.isnan(run_up_time_kloss_s(*values))


def test_a_start_that_counts_as_done_only_at_synchronous_speed_has_no_answer():
    assert np.isnan(run_up_time_kloss_s(50, 1500, 7500, 0.12, 3000, 2, 1.0))
