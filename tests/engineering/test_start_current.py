"""Start currents: round trips and missing data."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from audit.engineering.start_current import (
    largest_apparent_power_ratio,
    locked_rotor_from_multiple_a,
    locked_rotor_from_power_ratio_multiple,
    start_current_at_rated_a,
    start_current_at_voltage_a,
)


@given(st.floats(1, 1e4), st.floats(0.5, 1.2))
def test_a_record_led_back_to_rated_voltage_gives_the_record_again(current_a, voltage_pu):
    rated = start_current_at_rated_a(current_a, voltage_pu)
    assert start_current_at_voltage_a(rated, voltage_pu) == pytest.approx(current_a, rel=1e-12)


def test_apparent_power_ratio_agrees_with_the_current_it_stands_for():
    # by definition: 75 kW, 400 V, 0.945, 0.86: IN = 133.2 A (P / (sqrt3 V eta pf)); 7 times is 646 kVA, 8.613 kVA/kW
    ratio = 3**0.5 * 400 * 7 * 133.202 / 75_000
    assert locked_rotor_from_power_ratio_multiple(ratio, 0.945, 0.86) == pytest.approx(7.0, abs=1e-4)


@given(st.floats(0.4, 630), st.floats(0.4, 630))
def test_larger_motors_are_allowed_no_more(one, other):
    low, high = min(one, other), max(one, other)
    assert largest_apparent_power_ratio(high) <= largest_apparent_power_ratio(low)


def test_outside_the_table_and_without_data_it_is_missing():
    assert np.isnan(largest_apparent_power_ratio([0.37, 631, np.nan])).all()
    assert np.isnan(locked_rotor_from_multiple_a([np.nan, 6, 0], [100, np.nan, 100])).all()
    assert np.isnan(locked_rotor_from_power_ratio_multiple([8, 8, np.nan], [94.5, 0.9, 0.9], [0.86, 0, 0.8])).all()
    assert np.isnan(start_current_at_rated_a([600, 600, np.nan], [0.0, np.nan, 1.0])).all()
