"""Starting methods: against the circuit of a motor as a constant impedance."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from audit.engineering.reduced_voltage import (
    autotransformer_line_current_a,
    autotransformer_motor_current_a,
    soft_start_current_a,
    soft_start_torque_nm,
    star_delta_start_current_a,
    star_delta_start_torque_nm,
    torque_at_voltage_nm,
)

VOLTAGE_V = 400.0


@given(st.floats(0.01, 100))
def test_star_delta_follows_from_the_winding_impedance(winding_ohm):
    in_delta_a = 3**0.5 * VOLTAGE_V / winding_ohm
    in_star_a = VOLTAGE_V / 3**0.5 / winding_ohm
    assert star_delta_start_current_a(in_delta_a) == pytest.approx(in_star_a, rel=1e-12)
    # the winding sees 1 / sqrt(3) of its voltage
    assert star_delta_start_torque_nm(900) == pytest.approx(float(torque_at_voltage_nm(900, 3**-0.5)), rel=1e-12)


@given(st.floats(1, 1e4), st.floats(0.3, 1.0))
def test_autotransformer_keeps_the_apparent_power(locked_rotor_a, tap_pu):
    motor = autotransformer_motor_current_a(locked_rotor_a, tap_pu)
    line = autotransformer_line_current_a(locked_rotor_a, tap_pu)
    assert line * VOLTAGE_V == pytest.approx(float(motor * tap_pu * VOLTAGE_V), rel=1e-12)


@given(st.floats(1, 10), st.floats(10, 500))
def test_a_current_limit_never_exceeds_the_direct_start_and_its_torque_never_the_full_one(limit, full_load_a):
    current = soft_start_current_a(limit, full_load_a, 6 * full_load_a)
    assert current <= 6 * full_load_a
    assert soft_start_torque_nm(900, current, 6 * full_load_a) <= 900


def test_missing_or_impossible_gives_missing():
    assert np.isnan(autotransformer_line_current_a([600, 600, np.nan, 600], [0.0, 1.2, 0.8, np.nan])).all()
    assert np.isnan(soft_start_current_a([np.nan, 3, 3], [100, np.nan, 100], [600, 600, np.nan])).all()
    assert np.isnan(soft_start_torque_nm([900, 900], [300, np.nan], [0, 600])).all()
    assert np.isnan(star_delta_start_current_a([np.nan, -1])).all()
