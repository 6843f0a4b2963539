"""Offset currents against the differential equation of the R-L circuit, solved step by step."""

from __future__ import annotations

from math import pi, sqrt

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from scipy.integrate import quad, solve_ivp

from audit.engineering.offset_current import (
    offset_first_peak_ratio,
    offset_peak_half_cycle_ratio,
    offset_rms_half_cycle_ratio,
    offset_rms_ratio,
    x_to_r_from_offset_rms_ratio,
    x_to_r_from_power_factor_ratio,
    x_to_r_from_time_constant_ratio,
)
from audit.engineering.peak_short_circuit import short_circuit_peak_ka, short_circuit_peak_ratio

X_TO_R = (1.0, 3.0, 6.59, 10.0, 17.0, 25.0, 50.0)
any_x_to_r = st.floats(0.05, 500)


def current_of_the_circuit(x_to_r: float, closing_angle: float):
    """Solve x di/da + r i = sqrt(2) sin(a + closing angle) with |r + jx| = 1, so that the steady rms is 1."""
    phase = np.arctan(x_to_r)
    resistance, reactance = np.cos(phase), np.sin(phase)

    def slope(angle, current):
        return (sqrt(2) * np.sin(angle + closing_angle) - resistance * current) / reactance

    return solve_ivp(slope, (0, 4 * pi), [0.0], rtol=1e-10, atol=1e-12, dense_output=True).sol


@pytest.mark.parametrize("x_to_r", X_TO_R)
def test_first_peak_is_that_of_the_differential_equation(x_to_r):
    angles = np.linspace(0, 2 * pi, 200_001)
    peak = current_of_the_circuit(x_to_r, 0.0)(angles)[0].max()
    assert offset_first_peak_ratio(x_to_r).item() == pytest.approx(peak, rel=1e-7)


@pytest.mark.parametrize("x_to_r", X_TO_R)
def test_no_other_closing_angle_gives_a_higher_first_peak(x_to_r):
    angles = np.linspace(0, 2 * pi, 2001)
    peaks = [np.abs(current_of_the_circuit(x_to_r, closing)(angles)[0]).max() for closing in (-0.3, 0.2, 0.8, 1.6)]
    assert max(peaks) < offset_first_peak_ratio(x_to_r).item()


@pytest.mark.parametrize("x_to_r", X_TO_R)
def test_current_half_a_cycle_into_the_offset_wave_is_that_of_the_differential_equation(x_to_r):
    # greatest offset: closed a quarter cycle before the steady current peaks; its crest is half a cycle later
    phase = np.arctan(x_to_r)
    current = current_of_the_circuit(x_to_r, phase - pi / 2)(pi)[0]
    assert offset_peak_half_cycle_ratio(x_to_r).item() == pytest.approx(current, rel=1e-7)


@pytest.mark.parametrize("x_to_r", [5.0, 20.0, 60.0])
@pytest.mark.parametrize("cycles", [0.25, 0.5, 1.0, 3.0])
def test_rms_is_that_of_a_steady_wave_on_the_offset_of_the_moment(x_to_r, cycles):
    # over one cycle of sqrt(2) cos(a) + d the mean square is 1 + d^2, d the offset frozen at that moment
    offset = sqrt(2) * np.exp(-2 * pi * cycles / x_to_r)
    mean_square = quad(lambda angle: (sqrt(2) * np.cos(angle) + offset) ** 2, 0, 2 * pi)[0] / (2 * pi)
    assert offset_rms_ratio(x_to_r, cycles).item() == pytest.approx(sqrt(mean_square), rel=1e-9)


@given(any_x_to_r, st.floats(0.05, 3))
def test_x_to_r_is_found_again_from_its_rms_factor(x_to_r, cycles):
    factor = offset_rms_ratio(x_to_r, cycles)
    if factor - 1 > 1e-6:  # below, the factor no longer carries the digits of X/R
        assert x_to_r_from_offset_rms_ratio(factor, cycles).item() == pytest.approx(x_to_r, rel=1e-6)


@given(any_x_to_r, st.floats(1.01, 3))
def test_more_x_to_r_always_means_more_offset(x_to_r, times):
    for factor in (offset_rms_half_cycle_ratio, offset_peak_half_cycle_ratio, offset_first_peak_ratio):
        assert factor(times * x_to_r) >= factor(x_to_r)
    assert short_circuit_peak_ratio(times * x_to_r) >= short_circuit_peak_ratio(x_to_r)


@given(any_x_to_r)
def test_factors_stay_between_no_offset_and_no_decay(x_to_r):
    assert 1 <= offset_rms_half_cycle_ratio(x_to_r) <= sqrt(3)
    assert sqrt(2) <= offset_peak_half_cycle_ratio(x_to_r) <= offset_first_peak_ratio(x_to_r) + 1e-12
    assert offset_first_peak_ratio(x_to_r) <= 2 * sqrt(2) + 1e-12


def test_offset_dies_away():
    assert (np.diff(offset_rms_ratio(20, np.linspace(0, 10, 200))) < 0).all()


def test_circuit_of_pure_resistance_has_no_offset():
    assert offset_rms_ratio(0, 0.5).item() == 1
    assert offset_first_peak_ratio(0).item() == pytest.approx(sqrt(2), rel=1e-9)
    assert offset_peak_half_cycle_ratio(0).item() == pytest.approx(sqrt(2), rel=1e-9)


def test_factor_that_no_circuit_can_have_has_no_x_to_r():
    # below 1 the current would have less than its symmetrical rms; above sqrt(3) the offset would grow
    assert np.isnan(x_to_r_from_offset_rms_ratio([0.99, 1.7321], 0.5)).all()
    assert x_to_r_from_offset_rms_ratio(1, 0.5).item() == 0
    assert x_to_r_from_offset_rms_ratio(sqrt(3), 0.5).item() > 1e9  # no decay at all


@given(st.floats(0.01, 1))
def test_power_factor_and_x_to_r_are_cosine_and_tangent_of_one_angle(power_factor):
    angle = np.arccos(power_factor)
    assert x_to_r_from_power_factor_ratio(power_factor).item() == pytest.approx(np.tan(angle), abs=1e-7, rel=1e-9)


def test_time_constant_is_that_of_inductance_over_resistance():
    # by hand: 1 mH and 20 milliohm, 50 ms; X = 314.159 * 0.001 = 0.314159 ohm, X/R = 15.708
    assert x_to_r_from_time_constant_ratio(0.05, 50).item() == pytest.approx(15.708, abs=5e-4)


@given(st.floats(3, 100))
def test_peak_factor_of_the_standard_lies_close_to_the_exact_first_peak(x_to_r):
    # IEC 60909 fits its factor to the exact peak with a constant frequency: within 0.6 per cent from X/R 3 up
    assert sqrt(2) * short_circuit_peak_ratio(x_to_r) == pytest.approx(offset_first_peak_ratio(x_to_r), rel=0.006)


def test_peak_current_is_factor_times_amplitude():
    # by hand: without resistance 2 * sqrt(2) * 10 = 28.28 kA
    assert short_circuit_peak_ka(10, np.inf).item() == pytest.approx(28.284, abs=5e-4)
