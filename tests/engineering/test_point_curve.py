"""Curves given as points: against plain interpolation on logarithms, and every kind of unusable row."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from audit.engineering.point_curve import current_on_curves_a, time_on_curve_s, time_on_curves_s

NAN = np.nan
points = st.lists(
    st.tuples(st.floats(1.01, 2), st.floats(1.01, 3)), min_size=2, max_size=8
)  # factors from one point to the next


def curve(factors: list[tuple[float, float]]) -> tuple[np.ndarray, np.ndarray]:
    steps = np.array(factors)
    return 100 * np.cumprod(steps[:, 0]), 1000 / np.cumprod(steps[:, 1])


@given(points, st.floats(0, 1))
def test_between_the_points_it_is_straight_on_log_log_paper(factors, share):
    currents, times = curve(factors)
    at = np.exp(np.log(currents[0]) + share * np.log(currents[-1] / currents[0]))
    at = float(np.clip(at, currents[0], currents[-1]))
    expected = np.exp(np.interp(np.log(at), np.log(currents), np.log(times)))
    assert time_on_curve_s(at, currents, times) == pytest.approx(expected, rel=1e-9)


@given(st.lists(points, min_size=1, max_size=5), st.floats(100, 20000))
def test_many_curves_at_once_read_like_one_at_a_time(fleet, at):
    width = max(len(factors) for factors in fleet)
    currents, times = np.full((len(fleet), width), NAN), np.full((len(fleet), width), NAN)
    for row, factors in enumerate(fleet):
        currents[row, : len(factors)], times[row, : len(factors)] = curve(factors)
    got = time_on_curves_s(np.full(len(fleet), at), currents, times)
    alone = [float(time_on_curve_s(at, *curve(factors))) for factors in fleet]
    assert got.tolist() == pytest.approx(alone, nan_ok=True, rel=1e-12)


@given(points, st.floats(0, 1))
def test_reading_current_at_time_undoes_reading_time_at_current(factors, share):
    currents, times = curve(factors)
    at = currents[0] + share * (currents[-1] - currents[0])
    time = time_on_curve_s(at, currents, times)
    back = current_on_curves_a(np.clip(time, times[-1], times[0]).reshape(1), [currents], [times])
    assert back.item() == pytest.approx(at, rel=1e-9)


def test_points_themselves_are_read_exactly():
    assert time_on_curve_s([300, 450, 600], [300, 450, 600], [40.1, 20.2, 10.3]).tolist() == [40.1, 20.2, 10.3]


def test_nothing_is_extrapolated():
    assert np.isnan(time_on_curve_s([299.9, 600.1, NAN], [300, 600], [40, 10])).all()


def test_at_a_vertical_step_the_later_point_counts():
    # an instantaneous part drawn at 400 A from 20 s down to 0.1 s
    assert time_on_curve_s(400, [300, 400, 400, 600], [40, 20, 0.1, 0.1]) == 0.1


@pytest.mark.parametrize(
    ("currents", "times"),
    [
        ([300, NAN, 600], [40, NAN, 10]),
        ([300, 450, NAN], [40, NAN, NAN]),
        ([300, 250, 600], [40, 20, 10]),
        ([0, 450, 600], [40, 20, 10]),
        ([300, 450, 600], [40, -20, 10]),
        ([NAN, NAN, NAN], [NAN, NAN, NAN]),
    ],
    ids=["gap inside", "half a point", "falling current", "zero current", "negative time", "no points"],
)
def test_an_unusable_curve_gives_missing_and_leaves_the_others_alone(currents, times):
    got = time_on_curves_s([450, 450], [currents, [300, 450, 600]], [times, [40, 20, 10]])
    assert np.isnan(got[0])
    assert got[1] == 20


def test_several_currents_per_curve_keep_their_shape():
    got = time_on_curves_s([[300, 600], [300, 700]], [[300, 600], [300, 600]], [[40, 10], [8, 2]])
    assert np.isnan(got[1, 1])
    assert got.ravel()[:3].tolist() == [40, 10, 8]
