"""Current transformers: loop arithmetic and the saturation criterion against the flux of an offset current."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from scipy.integrate import cumulative_trapezoid

from audit.engineering.ct_accuracy import (
    actual_accuracy_limit_ratio,
    ct_offset_voltage_v,
    ct_secondary_voltage_v,
    greatest_unsaturated_multiple,
    offset_saturation_multiple,
)
from audit.engineering.ct_burden import (
    class_voltage_v,
    rated_burden_ohm,
    rated_burden_va,
    standard_burden_ohm,
)

burdens = st.floats(0.05, 20)


@given(burdens, st.sampled_from([1.0, 5.0]))
def test_burden_comes_back_from_volt_amperes_and_from_class_voltage(burden, secondary):
    assert rated_burden_ohm(rated_burden_va(burden, secondary), secondary).item() == pytest.approx(burden)
    assert standard_burden_ohm(class_voltage_v(burden, secondary), secondary).item() == pytest.approx(burden)


@given(st.floats(5, 30), st.floats(0.1, 10), burdens, burdens)
def test_accuracy_limit_keeps_the_internal_voltage(rated, winding, rated_burden, connected):
    # the core does not know the burden: rated and actual limit ask for one and the same internal voltage
    actual = actual_accuracy_limit_ratio(rated, winding, rated_burden, connected)
    assert actual * (winding + connected) == pytest.approx(rated * (winding + rated_burden))


def test_short_circuited_superconductor_has_no_limit_factor():
    assert np.isnan(actual_accuracy_limit_ratio(20, 0, 0.6, 0))


@pytest.mark.parametrize("x_to_r", [5.0, 12.0, 20.0])
def test_offset_needs_the_flux_of_one_plus_x_to_r(x_to_r):
    # flux is the integral of burden times offset current; its peak over that of the symmetrical current
    angle = np.linspace(0, 60 * x_to_r, 400_000)
    offset_part = np.exp(-angle / x_to_r)
    flux = cumulative_trapezoid(offset_part, angle, initial=0)
    # the alternating part adds its own amplitude of 1
    assert ct_offset_voltage_v(1, x_to_r).item() == pytest.approx(1 + flux.max(), rel=1e-3)


@given(burdens, burdens, st.floats(0, 60), st.floats(10, 4000))
def test_greatest_multiple_is_where_the_criterion_reaches_twenty(connected, standard, x_to_r, primary):
    fault = greatest_unsaturated_multiple(connected, standard, x_to_r) * primary
    criterion = offset_saturation_multiple(fault, primary, connected, standard, x_to_r)
    assert criterion.item() == pytest.approx(20, rel=1e-9)


@given(st.floats(1, 50_000), st.floats(10, 4000), burdens, st.floats(0, 60))
def test_both_forms_of_the_criterion_judge_alike(fault, primary, connected, x_to_r):
    # class C200 at 5 A: voltage needed against 200 V, or the criterion against 20
    needed = ct_offset_voltage_v(ct_secondary_voltage_v(fault, primary, 5, connected), x_to_r)
    criterion = offset_saturation_multiple(fault, primary, connected, standard_burden_ohm(200, 5), x_to_r)
    assert needed.item() / 200 == pytest.approx(criterion.item() / 20, rel=1e-9)
