"""Functions over the rows of a child table: one value a parent row, and the child row that decided it."""

from __future__ import annotations

from collections.abc import Callable

import numpy as np
from numpy.typing import NDArray

Floats = NDArray[np.float64]
Integers = NDArray[np.int64]
RowFunction = Callable[[list[Floats], Integers, int], tuple[Floats, Integers]]
"""Operands over the child rows, the parent row of each, the number of parents -> result and deciding child row."""

NO_ROW = -1


def _extreme(values: list[Floats], parent: Integers, parents: int, *, greatest: bool) -> tuple[Floats, Integers]:
    number = values[0]
    usable = np.flatnonzero((parent >= 0) & ~np.isnan(number))
    order = usable[np.lexsort((usable, -number[usable] if greatest else number[usable], parent[usable]))]
    first = np.ones(len(order), dtype=bool)
    first[1:] = parent[order][1:] != parent[order][:-1]
    chosen = order[first]
    result = np.full(parents, np.nan)
    deciding = np.full(parents, NO_ROW, dtype=np.int64)
    result[parent[chosen]] = number[chosen]
    deciding[parent[chosen]] = chosen
    return result, deciding


def greatest(values: list[Floats], parent: Integers, parents: int) -> tuple[Floats, Integers]:
    """Greatest known value of the child rows.

    >>> result, deciding = greatest([np.array([3.0, 5.0, np.nan])], np.array([0, 0, 1]), 2)
    >>> result.tolist(), deciding.tolist()
    ([5.0, nan], [1, -1])
    """
    return _extreme(values, parent, parents, greatest=True)


def least(values: list[Floats], parent: Integers, parents: int) -> tuple[Floats, Integers]:
    """Least known value of the child rows."""
    return _extreme(values, parent, parents, greatest=False)


def total(values: list[Floats], parent: Integers, parents: int) -> tuple[Floats, Integers]:
    """Sum of the child rows; missing where one of them is missing or where there is none.

    >>> total([np.array([3.0, 5.0, np.nan])], np.array([0, 0, 1]), 3)[0].tolist()
    [8.0, nan, nan]
    """
    number = values[0]
    linked = parent >= 0
    result = np.full(parents, np.nan)
    sums = np.bincount(parent[linked], weights=np.nan_to_num(number[linked]), minlength=parents)
    members = np.bincount(parent[linked], minlength=parents)
    lacking = np.bincount(parent[linked], weights=np.isnan(number[linked]).astype(float), minlength=parents)
    whole = (members > 0) & (lacking == 0)
    result[whole] = sums[whole]
    return result, np.full(parents, NO_ROW, dtype=np.int64)


def count(values: list[Floats], parent: Integers, parents: int) -> tuple[Floats, Integers]:
    """Number of child rows with a known value; zero where there is none."""
    usable = (parent >= 0) & ~np.isnan(values[0])
    return np.bincount(parent[usable], minlength=parents).astype(float), np.full(parents, NO_ROW, dtype=np.int64)


def median(values: list[Floats], parent: Integers, parents: int) -> tuple[Floats, Integers]:
    """Median of the known values of the child rows.

    >>> median([np.array([1.0, 9.0, 2.0, np.nan])], np.array([0, 0, 0, 0]), 1)[0].tolist()
    [2.0]
    """
    number = values[0]
    usable = np.flatnonzero((parent >= 0) & ~np.isnan(number))
    order = usable[np.lexsort((number[usable], parent[usable]))]
    members = np.bincount(parent[order], minlength=parents)
    starts = np.concatenate(([0], np.cumsum(members)[:-1])).astype(np.int64)
    result = np.full(parents, np.nan)
    some = np.flatnonzero(members > 0)
    ordered = number[order]
    low = ordered[starts[some] + (members[some] - 1) // 2]
    high = ordered[starts[some] + members[some] // 2]
    result[some] = (low + high) / 2
    return result, np.full(parents, NO_ROW, dtype=np.int64)


def greatest_deviation(values: list[Floats], parent: Integers, parents: int) -> tuple[Floats, Integers]:
    """Greatest deviation from the median of the child rows, as a share of that median.

    >>> result, deciding = greatest_deviation([np.array([100.0, 100.0, 130.0])], np.array([0, 0, 0]), 1)
    >>> round(result.item(), 3), deciding.item()
    (0.3, 2)
    """
    number = values[0]
    middle = median(values, parent, parents)[0]
    linked = parent >= 0
    share = np.full(len(number), np.nan)
    with np.errstate(all="ignore"):
        own = middle[parent[linked]]
        share[linked] = np.where(own != 0, np.abs(number[linked] - own) / np.abs(own), np.nan)
    alone = count(values, parent, parents)[0] < 2
    result, deciding = greatest([share], parent, parents)
    result[alone] = np.nan
    deciding[alone] = NO_ROW
    return result, deciding


def greatest_robust_score(values: list[Floats], parent: Integers, parents: int) -> tuple[Floats, Integers]:
    """Greatest distance from the median in scaled median absolute deviations, these taken as at least 5 % of it."""
    number = values[0]
    middle = median(values, parent, parents)[0]
    linked = parent >= 0
    distance = np.full(len(number), np.nan)
    distance[linked] = np.abs(number[linked] - middle[parent[linked]])
    # 1.4826 makes the median absolute deviation of normal data equal its standard deviation
    scale = np.maximum(1.4826 * median([distance], parent, parents)[0], 0.05 * np.abs(middle))
    score = np.full(len(number), np.nan)
    with np.errstate(all="ignore"):
        own = scale[parent[linked]]
        score[linked] = np.where(own > 0, distance[linked] / own, np.nan)
    return greatest([score], parent, parents)


def greatest_spread_of_copies(values: list[Floats], parent: Integers, parents: int) -> tuple[Floats, Integers]:
    """Among child rows (three or more) that share one first value: greatest ratio of their second values.

    >>> result, deciding = greatest_spread_of_copies(
    ...     [np.array([600.0, 600.0, 600.0, 50.0]), np.array([100.0, 200.0, 300.0, 9.0])], np.zeros(4, int), 1)
    >>> result.item(), deciding.item()
    (3.0, 0)
    """
    setting, size = values
    usable = np.flatnonzero((parent >= 0) & ~np.isnan(setting) & ~np.isnan(size) & (size > 0))
    order = usable[np.lexsort((size[usable], setting[usable], parent[usable]))]
    fresh = np.ones(len(order), dtype=bool)
    fresh[1:] = (parent[order][1:] != parent[order][:-1]) | (setting[order][1:] != setting[order][:-1])
    first = np.flatnonzero(fresh)
    last = np.append(first[1:], len(order)) - 1
    members = last - first + 1
    spread = np.full(len(setting), np.nan)
    if len(first):
        spread[order[first]] = np.where(members >= 3, size[order[last]] / size[order[first]], 1.0)
    return greatest([spread], parent, parents)


def any_yes(values: list[Floats], parent: Integers, parents: int) -> tuple[Floats, Integers]:
    """1 where a child row is yes, 0 where all are no, missing where none is yes and one is unknown."""
    linked = parent >= 0
    result, deciding = greatest(values, parent, parents)
    unknown = np.bincount(parent[linked], weights=np.isnan(values[0][linked]).astype(float), minlength=parents) > 0
    result = np.where(np.isnan(result), 0.0, result)
    return np.where((result <= 0) & unknown, np.nan, result), deciding
