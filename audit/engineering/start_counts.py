"""Greatest number of starts in any window of time, for every motor at once."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, floats

_SECONDS_PER_MINUTE = 60.0
# below the resolution of records, above what rounding does to ten years of seconds for all motors end to end
_CLOCK_SLACK_S = 1e-3


def _busiest(
    group_index: ArrayLike, instant_s: ArrayLike, group_count: int, window_min: float
) -> tuple[Floats, Floats]:
    """Greatest count per group, and the row of the start that opens that window."""
    groups, instants = floats(group_index), floats(instant_s)
    counts, rows = np.full(group_count, np.nan), np.full(group_count, np.nan)
    belongs = np.flatnonzero((groups >= 0) & (groups < group_count))
    dated = belongs[~np.isnan(instants[belongs])]
    undated_groups = np.unique(groups[belongs[np.isnan(instants[belongs])]]).astype(np.int64)
    if dated.size and window_min > 0:
        order = dated[np.lexsort((instants[dated], groups[dated]))]
        group, instant = groups[order].astype(np.int64), instants[order]
        window = window_min * _SECONDS_PER_MINUTE
        # one rising key for all groups: each group's times begin a window beyond the last group's end
        begins = np.searchsorted(group, np.arange(group_count))
        ends = np.searchsorted(group, np.arange(group_count), side="right")
        span = instant[np.maximum(ends - 1, 0)] - instant[np.minimum(begins, len(order) - 1)]
        offset = np.cumsum(np.where(ends > begins, span, 0.0) + 2 * window)
        key = instant - instant[begins[group]] + (offset - np.where(ends > begins, span, 0.0))[group]
        # half open: two starts exactly one window apart are not in one window
        inside = np.searchsorted(key, key + window - _CLOCK_SLACK_S, side="left") - np.arange(len(order))
        best = np.lexsort((np.arange(len(order)), -inside, group))
        first = best[np.searchsorted(group[best], np.unique(group))]
        counts[group[first]] = inside[first]
        rows[group[first]] = order[first]
    counts[undated_groups] = np.nan
    rows[undated_groups] = np.nan
    return counts, rows


def greatest_starts_in_window(
    group_index: ArrayLike, instant_s: ArrayLike, group_count: int, window_min: float = 60.0
) -> Floats:
    """Greatest number of starts that each motor made within any window of time.

    max over t of the number of starts in [t, t + window)

    Parameters
    ----------
    group_index : array_like
        Motor of each start, counted from zero; a negative or missing one leaves the start out. [code]
    instant_s : array_like
        Instant of each start, in any order, from any common origin. [s]
    group_count : int
        Number of motors. [1]
    window_min : float
        Length of the window. [min]

    Returns
    -------
    ndarray
        Greatest count per motor. [1]

    Notes
    -----
    Half-open window: starts exactly 60 minutes apart are one an hour. A motor without any start, and one with
    a start whose instant is missing, is missing: its count would be too low.

    Examples
    --------
    Starts at 0, 20, 40 and 60 min: never more than three within one hour. The second motor started once.

    >>> greatest_starts_in_window([0, 0, 0, 0, 1], [0, 1200, 2400, 3600, 5], 3).tolist()
    [3.0, 1.0, nan]

    References
    ----------
    Count of starts an hour as data sheets and NEMA MG 1 limit it; the moving window is common practice.
    """
    return _busiest(group_index, instant_s, group_count, window_min)[0]


def first_start_of_busiest_window(
    group_index: ArrayLike, instant_s: ArrayLike, group_count: int, window_min: float = 60.0
) -> Floats:
    """Row of the start that opens each motor's busiest window.

    Parameters
    ----------
    group_index : array_like
        Motor of each start, counted from zero; a negative or missing one leaves the start out. [code]
    instant_s : array_like
        Instant of each start, in any order, from any common origin. [s]
    group_count : int
        Number of motors. [1]
    window_min : float
        Length of the window. [min]

    Returns
    -------
    ndarray
        Row in the given order; the earliest window where several are equally busy. [code]

    Notes
    -----
    Missing where the count is missing.

    Examples
    --------
    The third row given is the earliest start, and all three lie within one hour.

    >>> first_start_of_busiest_window([0, 0, 0], [1200, 2400, 0], 1).tolist()
    [2.0]

    References
    ----------
    Count of starts an hour as data sheets and NEMA MG 1 limit it; the moving window is common practice.
    """
    return _busiest(group_index, instant_s, group_count, window_min)[1]
