"""Trip-class bands: order of the edges, the two standards, and the reach of I2t."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from audit.engineering.thermal_model import thermal_time_constant_s, thermal_trip_time_cold_s
from audit.engineering.trip_class import (
    TRIP_CLASS_10A,
    trip_class_greatest_time_s,
    trip_class_least_time_s,
    trip_class_warm_time_s,
    trip_standard_code,
)

IEC, NEMA = 0, 1
classes = st.sampled_from([5.0, TRIP_CLASS_10A, 10.0, 15.0, 20.0, 25.0, 30.0, 40.0])


@given(st.floats(1.5, 20), classes, st.sampled_from([IEC, NEMA]))
def test_the_lower_edge_is_never_above_the_upper(multiple, trip_class, standard):
    least = trip_class_least_time_s(multiple, trip_class, standard)
    assert least <= trip_class_greatest_time_s(multiple, trip_class, standard)


@given(st.floats(1.0, 20), st.floats(1.0, 20), classes)
def test_more_current_never_moves_an_edge_up(one, other, trip_class):
    low, high = min(one, other), max(one, other)
    for edge in (trip_class_least_time_s, trip_class_greatest_time_s):
        assert edge(high, trip_class) <= edge(low, trip_class)


def test_a_nema_class_at_six_times_is_a_quicker_relay_than_the_iec_class_at_7_2_times():
    # by hand: 10 s at 6 times is 10 * (6 / 7.2)^2 = 6.94 s at 7.2 times, where IEC allows 10 s
    assert trip_class_greatest_time_s(7.2, 10, NEMA) == pytest.approx(6.944, abs=0.001)
    assert trip_class_greatest_time_s(7.2, 10, IEC) == pytest.approx(10.0)


@pytest.mark.parametrize(("multiple", "excess"), [(2.0, 0.23), (3.0, 0.08)])
def test_a_first_order_relay_overruns_the_upper_edge_no_more_than_documented(multiple, excess):
    # first-order relay through 10 s at 7.2 times that finally trips at the standard's 1.2 times
    constant = thermal_time_constant_s(10.0, 7.2, 1.2)
    time = thermal_trip_time_cold_s(multiple, 1.2, constant)
    assert 1.0 < time / trip_class_greatest_time_s(multiple, 10) < 1 + excess


@pytest.mark.parametrize(("trip_class", "allowed_s"), [(10, 240), (20, 480), (30, 720)])
def test_the_warm_limit_at_one_and_a_half_times_is_about_the_same_i2t(trip_class, allowed_s):
    # published independently of the 7.2 point: 10 * (7.2 / 1.5)^2 = 230 s against 240 s
    assert trip_class_warm_time_s(trip_class) == allowed_s
    assert trip_class_greatest_time_s(1.5, trip_class) == pytest.approx(allowed_s, rel=0.05)


def test_below_the_setting_the_relay_must_not_trip_and_need_not():
    assert trip_class_least_time_s([0.0, 1.0, 1.05], 10).tolist() == [np.inf] * 3
    assert trip_class_greatest_time_s([0.0, 1.0, 1.19], 10).tolist() == [np.inf] * 3


def test_a_class_the_standard_does_not_list_takes_the_wider_band():
    # class 15: not quicker than class 10's lower edge, not slower than its own name
    assert trip_class_least_time_s(7.2, 15) == 4.0
    assert trip_class_greatest_time_s(7.2, 15) == 15.0
    assert np.isnan(trip_class_warm_time_s(15))


def test_missing_or_unknown_gives_missing():
    for edge in (trip_class_least_time_s, trip_class_greatest_time_s):
        assert np.isnan(edge([np.nan, 6, 6, 6, -1], [10, np.nan, 10, 10, 10], [0, 0, np.nan, 2, 0])).all()
    assert np.isnan(trip_class_least_time_s(6, [4, 0, -1])).all()
    assert np.isnan(trip_class_greatest_time_s(6, [0, -1])).all()


def test_a_standard_by_another_name_is_refused_with_the_accepted_ones():
    with pytest.raises(ValueError, match=r"'DIN' is not a standard of trip classes. Accepted: iec, nema"):
        trip_standard_code("DIN")
