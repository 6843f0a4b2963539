"""Motor contribution: proportions, and the classes of R/X in IEC 60909-0."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from audit.engineering.motor_contribution import motor_fault_contribution_ka, motor_x_to_r_ratio


def test_contribution_is_the_current_through_the_motor_impedance():
    # ZM = 6600 / (sqrt(3) * 600) = 6.3509 ohm; driven by 1.1 * 6900 / sqrt(3) = 4382 V: 690.0 A
    impedance = 6600 / (np.sqrt(3) * 600)
    driven = 1.1 * 6900 / np.sqrt(3) / impedance / 1000
    assert motor_fault_contribution_ka(600, 6600, 6900, 1.1).item() == pytest.approx(driven, rel=1e-12)


@given(st.floats(1, 5000), st.floats(1, 10))
def test_contribution_grows_with_the_locked_rotor_current(current, times):
    one, more = motor_fault_contribution_ka([current, times * current], 6600, 6600, 1.1)
    assert more == pytest.approx(times * one, rel=1e-9)


@pytest.mark.parametrize(
    ("power_kw", "voltage_v", "poles", "r_to_x"),
    [
        (2000, 6600, 4, 0.10),  # just 1 MW per pole pair
        (1999, 6600, 4, 0.15),  # just below
        (1001, 6600, 2, 0.10),  # one pole pair
        (5000, 1000, 2, 0.42),  # 1 kV is still low voltage
        (100, 1001, 2, 0.15),  # above it no longer
    ],
)
def test_resistance_over_reactance_goes_by_voltage_and_power_per_pole_pair(power_kw, voltage_v, poles, r_to_x):
    # IEC 60909-0, table of asynchronous motors
    assert motor_x_to_r_ratio(power_kw, voltage_v, poles).item() == pytest.approx(1 / r_to_x, rel=1e-12)
