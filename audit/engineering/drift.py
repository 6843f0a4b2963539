"""Drift of recorded values over the dates: robust slope and its significance, for every motor at once."""

from __future__ import annotations

from collections.abc import Iterator
from functools import cache
from math import erfc, factorial

import numpy as np
import numpy.typing as npt
from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, floats, together

_EXACT_UP_TO = 33
_PAIRS_AT_ONCE = 4_000_000

Rows = npt.NDArray[np.int64]


def _by_size(
    group_index: ArrayLike, dates_d: ArrayLike, values: ArrayLike, group_count: int
) -> Iterator[tuple[Rows, Floats, Floats]]:
    """Give groups of equal size together: their numbers, and dates and values with one group a row."""
    groups, dates, numbers = together(group_index, dates_d, values)
    usable = (groups >= 0) & (groups < group_count) & ~np.isnan(dates) & ~np.isnan(numbers)
    group, dates, numbers = groups[usable].astype(np.int64), dates[usable], numbers[usable]
    order = np.lexsort((dates, group))
    dates, numbers = dates[order], numbers[order]
    sizes = np.bincount(group, minlength=group_count)
    begins = np.cumsum(sizes) - sizes
    for size in np.unique(sizes[sizes >= 2]):
        same = np.flatnonzero(sizes == size)
        at_once = max(1, _PAIRS_AT_ONCE // (int(size) * (int(size) - 1) // 2))
        for start in range(0, len(same), at_once):
            members = same[start : start + at_once]
            rows = begins[members][:, None] + np.arange(size)
            yield members, dates[rows], numbers[rows]


def _pairs(dates: Floats, numbers: Floats) -> tuple[Floats, Floats]:
    earlier, later = np.triu_indices(dates.shape[1], 1)
    return dates[:, later] - dates[:, earlier], numbers[:, later] - numbers[:, earlier]


def _tie_sums(table: Floats) -> tuple[Floats, Floats, Floats]:
    """Per row the sums of c(c-1), c(c-1)(c-2) and c(c-1)(2c+5) over its runs of c equal values."""
    ordered = np.sort(table, axis=1)
    new_run = np.ones(ordered.shape, dtype=bool)
    new_run[:, 1:] = ordered[:, 1:] != ordered[:, :-1]
    run = np.cumsum(new_run.ravel()) - 1
    row_of_run = np.repeat(np.arange(len(table)), new_run.sum(axis=1))
    c = np.bincount(run).astype(np.float64)
    pairs, triples, spread = c * (c - 1), c * (c - 1) * (c - 2), c * (c - 1) * (2 * c + 5)
    rows = len(table)
    return (
        floats(np.bincount(row_of_run, pairs, rows)),
        floats(np.bincount(row_of_run, triples, rows)),
        floats(np.bincount(row_of_run, spread, rows)),
    )


@cache
def _exact_probabilities(size: int) -> tuple[float, ...]:
    """Chance that a random order of this size has at most 0, 1, 2, ... discordant pairs."""
    ways = np.ones(1)
    for length in range(2, size + 1):
        ways = np.convolve(ways, np.ones(length))
    return tuple(np.cumsum(ways) / factorial(size))


def theil_sen_slope_by_group(group_index: ArrayLike, dates_d: ArrayLike, values: ArrayLike, group_count: int) -> Floats:
    """Robust slope of each motor's values over their dates.

    median of (y_j - y_i) / (x_j - x_i) over all pairs with different dates

    Parameters
    ----------
    group_index : array_like
        Motor of each value, counted from zero; a negative or missing one leaves the value out. [code]
    dates_d : array_like
        Date of each value in days from any common origin. [d]
    values : array_like
        The values, start times for one. [any]
    group_count : int
        Number of motors. [1]

    Returns
    -------
    ndarray
        Slope per motor. [any/d]

    Notes
    -----
    Up to 29 % of wild values do not move it. A missing date or value leaves that record out; a motor without
    two different dates is missing. The work grows with the square of a motor's records.

    Examples
    --------
    0.01 s a day and one wild value. By hand: of the ten slopes the median is 0.01.

    >>> theil_sen_slope_by_group([0] * 5, [0, 10, 20, 30, 40], [5, 5.1, 9.9, 5.3, 5.4], 1).round(4).tolist()
    [0.01]

    References
    ----------
    Sen, Estimates of the regression coefficient based on Kendall's tau, J. Am. Stat. Assoc. 63 (1968).
    """
    slope = np.full(group_count, np.nan)
    for members, dates, numbers in _by_size(group_index, dates_d, values, group_count):
        run, rise = _pairs(dates, numbers)
        with np.errstate(divide="ignore", invalid="ignore"):
            ordered = np.sort(np.where(run > 0, rise / run, np.nan), axis=1)
        known = (run > 0).sum(axis=1)
        lower, upper = np.maximum(known - 1, 0) // 2, known // 2
        row = np.arange(len(members))
        upper = np.minimum(upper, ordered.shape[1] - 1)
        slope[members] = (ordered[row, lower] + ordered[row, upper]) / 2
    return slope


def theil_sen_slope(dates_d: ArrayLike, values: ArrayLike) -> Floats:
    """Robust slope of one motor's values over their dates.

    median of (y_j - y_i) / (x_j - x_i) over all pairs with different dates

    Parameters
    ----------
    dates_d : array_like
        Date of each value in days from any common origin. [d]
    values : array_like
        The values, start times for one. [any]

    Returns
    -------
    ndarray
        Slope. [any/d]

    Notes
    -----
    As theil_sen_slope_by_group.

    Examples
    --------
    Slopes 1, 2 and 1.5 by hand, median 1.5.

    >>> theil_sen_slope([0, 1, 2], [0, 1, 3]).item()
    1.5

    References
    ----------
    Sen, Estimates of the regression coefficient based on Kendall's tau, J. Am. Stat. Assoc. 63 (1968).
    """
    dates = floats(dates_d)
    return theil_sen_slope_by_group(np.zeros(dates.shape), dates, values, 1).reshape(())


def kendall_probability_by_group(
    group_index: ArrayLike, dates_d: ArrayLike, values: ArrayLike, group_count: int
) -> Floats:
    """Chance that values without any trend would follow the dates at least as closely, for each motor.

    two-sided, of S = concordant less discordant pairs

    Parameters
    ----------
    group_index : array_like
        Motor of each value, counted from zero; a negative or missing one leaves the value out. [code]
    dates_d : array_like
        Date of each value in days from any common origin. [d]
    values : array_like
        The values, start times for one. [any]
    group_count : int
        Number of motors. [1]

    Returns
    -------
    ndarray
        Probability; below 0.05 the trend counts as significant. [1]

    Notes
    -----
    Exact up to 33 records without ties, else the normal approximation with tie correction, rough below ten
    records. Missing with fewer than two records or where all dates or all values are the same.

    Examples
    --------
    Four values that rise throughout. By hand: one order of 24 rises, one falls: 2 / 24 = 0.083.

    >>> kendall_probability_by_group([0] * 4, [0, 1, 2, 3], [5.0, 5.1, 5.2, 5.4], 1).round(3).tolist()
    [0.083]

    References
    ----------
    Kendall, Rank Correlation Methods, exact distribution and variance of S with ties.
    """
    probability = np.full(group_count, np.nan)
    for members, dates, numbers in _by_size(group_index, dates_d, values, group_count):
        size = dates.shape[1]
        run, rise = _pairs(dates, numbers)
        agreement = (np.sign(run) * np.sign(rise)).sum(axis=1)
        x_pairs, x_triples, x_spread = _tie_sums(dates)
        y_pairs, y_triples, y_spread = _tie_sums(numbers)
        whole = float(size * (size - 1))
        variance = (whole * (2 * size + 5) - x_spread - y_spread) / 18 + x_pairs * y_pairs / (2 * whole)
        if size > 2:
            variance += x_triples * y_triples / (9 * whole * (size - 2))
        constant = (x_pairs == whole) | (y_pairs == whole)
        score = np.abs(agreement) / np.sqrt(np.where(constant, 1.0, variance))
        chance = np.array([erfc(z / 2**0.5) for z in score])
        if size <= _EXACT_UP_TO:
            at_most = np.array(_exact_probabilities(size))
            fewer = ((whole / 2 - np.abs(agreement)) / 2).astype(np.int64)
            exact = np.minimum(2 * at_most[np.clip(fewer, 0, len(at_most) - 1)], 1.0)
            chance = np.where((x_pairs == 0) & (y_pairs == 0), exact, chance)
        probability[members] = np.where(constant, np.nan, chance)
    return probability


def kendall_probability(dates_d: ArrayLike, values: ArrayLike) -> Floats:
    """Chance that values without any trend would follow the dates at least as closely, for one motor.

    two-sided, of S = concordant less discordant pairs

    Parameters
    ----------
    dates_d : array_like
        Date of each value in days from any common origin. [d]
    values : array_like
        The values, start times for one. [any]

    Returns
    -------
    ndarray
        Probability; below 0.05 the trend counts as significant. [1]

    Notes
    -----
    As kendall_probability_by_group.

    Examples
    --------
    Five values that rise throughout. By hand: 2 / 120 = 0.017.

    >>> kendall_probability([0, 1, 2, 3, 4], [1, 2, 3, 4, 5]).round(3).item()
    0.017

    References
    ----------
    Kendall, Rank Correlation Methods, exact distribution and variance of S with ties.
    """
    dates = floats(dates_d)
    return kendall_probability_by_group(np.zeros(dates.shape), dates, values, 1).reshape(())
