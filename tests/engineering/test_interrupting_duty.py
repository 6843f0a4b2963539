"""Interrupting duty: what a higher X/R asks of a breaker."""

from __future__ import annotations

import pytest
from hypothesis import given
from hypothesis import strategies as st

from audit.engineering.interrupting_duty import interrupting_duty_by_peak_ka, interrupting_duty_by_rms_ka
from audit.engineering.offset_current import offset_peak_half_cycle_ratio, offset_rms_ratio

x_to_r = st.floats(0.5, 100)


@given(st.floats(1, 100), x_to_r, x_to_r)
def test_duty_is_never_below_the_fault_current(fault_ka, in_fault, in_test):
    assert interrupting_duty_by_peak_ka(fault_ka, in_fault, in_test) >= fault_ka
    assert interrupting_duty_by_rms_ka(fault_ka, in_fault, in_test, 3) >= fault_ka


@given(st.floats(1, 100), x_to_r)
def test_fault_no_worse_than_the_test_asks_for_no_more(fault_ka, in_test):
    for in_fault in (in_test, in_test / 2):
        assert interrupting_duty_by_peak_ka(fault_ka, in_fault, in_test).item() == fault_ka
        assert interrupting_duty_by_rms_ka(fault_ka, in_fault, in_test, 3).item() == fault_ka


@given(st.floats(1, 100), x_to_r, st.floats(1.01, 5))
def test_breaker_rated_for_the_duty_sees_in_its_test_what_the_fault_brings(fault_ka, in_test, times):
    in_fault = times * in_test
    peak = interrupting_duty_by_peak_ka(fault_ka, in_fault, in_test) * offset_peak_half_cycle_ratio(in_test)
    assert peak == pytest.approx(fault_ka * offset_peak_half_cycle_ratio(in_fault), rel=1e-9)
    rms = interrupting_duty_by_rms_ka(fault_ka, in_fault, in_test, 2) * offset_rms_ratio(in_test, 2)
    assert rms == pytest.approx(fault_ka * offset_rms_ratio(in_fault, 2), rel=1e-9)


@pytest.mark.parametrize(("x_to_r_of_fault", "factor"), [(8.27, 1.04), (11.72, 1.09), (20.0, 1.14)])
def test_multiplying_factors_of_low_voltage_breakers_are_those_of_the_handbooks(x_to_r_of_fault, factor):
    # IEEE C37.13 and handbooks, unfused power breakers tested at 15 per cent power factor: 12, 8.5 and 5 per
    # cent power factor; from memory, two decimals printed
    assert interrupting_duty_by_peak_ka(1, x_to_r_of_fault, 6.59).item() == pytest.approx(factor, abs=0.0101)
