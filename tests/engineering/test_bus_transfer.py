"""Bus transfer: differences of phasors and the decay of residual voltage."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from audit.engineering.bus_transfer import (
    greatest_transfer_angle_deg,
    least_dead_time_s,
    residual_voltage_pu,
    transfer_resultant_pu,
    volts_per_hertz_pu,
)

levels = st.floats(0.05, 1.3)


@given(levels, levels, st.floats(-360, 360))
def test_resultant_is_the_length_of_the_difference_of_two_phasors(source, residual, angle):
    difference = abs(source - residual * np.exp(1j * np.radians(angle)))
    assert transfer_resultant_pu(source, residual, angle).item() == pytest.approx(difference, abs=1e-7)


@given(levels, levels, st.floats(0.1, 2.5))
def test_resultant_at_the_greatest_angle_is_the_limit(source, residual, limit):
    angle = greatest_transfer_angle_deg(source, residual, limit).item()
    reached = transfer_resultant_pu(source, residual, angle).item()
    if angle == 180:
        assert reached <= limit * (1 + 1e-9)
    elif angle == 0:
        assert reached >= limit * (1 - 1e-9)
    else:
        assert reached == pytest.approx(limit, rel=1e-5)


@given(st.floats(0.01, 10), st.floats(0.01, 5))
def test_dead_time_comes_back_from_the_residual_voltage(dead_time, time_constant):
    level = residual_voltage_pu(dead_time, time_constant)
    if level > 1e-12:
        assert least_dead_time_s(level, time_constant).item() == pytest.approx(dead_time, rel=1e-6)


def test_residual_voltage_of_a_quarter_is_safe_at_any_angle():
    # common practice: 25 per cent, worst case 1.25, within 1.33
    assert greatest_transfer_angle_deg(1.0, 0.25, 1.33).item() == 180


def test_slowing_motors_keep_more_flux_than_voltage():
    # by hand: 0.7 of the voltage at 0.9 of the frequency, 0.778
    assert volts_per_hertz_pu(0.7, 0.9).item() == pytest.approx(0.778, abs=5e-4)
