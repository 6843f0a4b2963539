"""Starts in any hour: against counting window by window."""

from __future__ import annotations

import numpy as np
from hypothesis import given
from hypothesis import strategies as st

from audit.engineering.start_counts import first_start_of_busiest_window, greatest_starts_in_window

HOUR_S = 3600
starts = st.lists(st.tuples(st.integers(0, 4), st.integers(0, 6 * HOUR_S)), min_size=1, max_size=60)


def counted(instants: list[int], window_s: int) -> tuple[int, int]:
    """Greatest count over windows that begin with a start, and the earliest such start."""
    counts = [(sum(begin <= t < begin + window_s for t in instants), -begin) for begin in instants]
    most, earliest = max(counts)
    return most, -earliest


@given(starts, st.sampled_from([15, 60, 120]))
def test_it_is_the_count_of_the_busiest_window(records, window_min):
    group, instant = np.array(records).T
    got = greatest_starts_in_window(group, instant, 5, window_min)
    first = first_start_of_busiest_window(group, instant, 5, window_min)
    for motor in range(5):
        mine = instant[group == motor].tolist()
        if not mine:
            assert np.isnan(got[motor])
            assert np.isnan(first[motor])
            continue
        most, begin = counted(mine, window_min * 60)
        assert got[motor] == most
        assert (group[int(first[motor])], instant[int(first[motor])]) == (motor, begin)


@given(starts, st.floats(0, 1.8e9))
def test_the_origin_of_time_does_not_matter(records, origin_s):
    group, instant = np.array(records).T
    moved = greatest_starts_in_window(group, instant + np.round(origin_s), 5)
    assert np.array_equal(moved, greatest_starts_in_window(group, instant, 5), equal_nan=True)


def test_starts_exactly_an_hour_apart_are_one_an_hour():
    # whole seconds of 2024, and a motor with very many records ahead of it to lengthen the common key
    year = 1.704e9 + np.arange(0, 365 * 24, 1) * 3600.0
    group = np.repeat([0, 1], year.size)
    assert greatest_starts_in_window(group, np.tile(year, 2), 2).tolist() == [1.0, 1.0]


def test_starts_just_under_an_hour_apart_are_two_in_an_hour():
    assert greatest_starts_in_window([0, 0], [0.0, 3599.0], 1).tolist() == [2.0]


def test_a_start_without_instant_leaves_its_motor_without_count():
    got = greatest_starts_in_window([0, 0, 1, 1], [0, np.nan, 0, 60], 2)
    assert np.isnan(got[0])
    assert got[1] == 2


def test_starts_of_no_known_motor_are_left_out():
    assert greatest_starts_in_window([-1, np.nan, 7, 0], [0, 0, 0, 0], 1).tolist() == [1.0]


def test_no_records_at_all_is_missing_for_every_motor():
    assert np.isnan(greatest_starts_in_window([], [], 3)).all()
