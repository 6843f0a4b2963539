"""Line current of a compensated motor, held against phasors."""

import cmath
import math

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from audit.engineering.motor_capacitor import compensated_current_a


@given(current=st.floats(1, 2000), factor=st.floats(0.05, 1.0), capacitor=st.floats(0, 1000))
def test_line_current_is_the_phasor_sum(current: float, factor: float, capacitor: float) -> None:
    # motor current lags the voltage by acos(pf), capacitor current leads by a right angle
    motor = cmath.rect(current, -math.acos(factor))
    expected = abs(motor + 1j * capacitor)
    assert compensated_current_a(current, factor, capacitor).item() == pytest.approx(expected, rel=1e-9, abs=1e-6)


def test_current_is_least_where_the_capacitor_takes_all_reactive_current() -> None:
    # 100 A at 0.6: 80 A reactive; what is left is 60 A
    capacitors = np.arange(0.0, 161.0)
    line = compensated_current_a(100, 0.6, capacitors)
    assert line.argmin() == 80
    assert line.min() == pytest.approx(60)


@pytest.mark.parametrize("case", [(np.nan, 0.8, 1), (100, np.nan, 1), (100, 0.8, np.nan), (100, 1.1, 1), (-1, 0.8, 1)])
def test_missing_or_impossible_inputs_give_missing(case: tuple[float, float, float]) -> None:
    assert np.isnan(compensated_current_a(*case))
