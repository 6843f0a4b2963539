"""Take-over current: the crossing of a fuse curve with a definite time."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from audit.engineering.fuse import takeover_current_a
from audit.engineering.point_curve import time_on_curves_s

# an invented fuse, total clearing: 500 A 100 s, 900 A 10 s, 1.6 kA 1 s, 3 kA 0.1 s, 6 kA 0.02 s
CURRENTS = [[500.0, 900.0, 1600.0, 3000.0, 6000.0]]
TIMES = [[100.0, 10.0, 1.0, 0.1, 0.02]]


@given(st.floats(0.021, 99))
def test_fuse_has_the_time_of_relay_and_contactor_at_the_crossing(time_s):
    crossing = takeover_current_a([time_s], CURRENTS, TIMES)
    assert time_on_curves_s(crossing, CURRENTS, TIMES).item() == pytest.approx(time_s, rel=1e-9)


def test_slower_relay_lowers_the_crossing():
    times = np.linspace(0.03, 50, 300)
    crossing = takeover_current_a(times, np.repeat(CURRENTS, 300, 0), np.repeat(TIMES, 300, 0))
    assert (np.diff(crossing) < 0).all()


def test_crossing_outside_the_points_is_not_known():
    assert np.isnan(takeover_current_a([0.01, 200.0], CURRENTS * 2, TIMES * 2)).all()


def test_relay_without_delay_is_not_a_time():
    assert np.isnan(takeover_current_a([0.0, np.nan], CURRENTS * 2, TIMES * 2)).all()
