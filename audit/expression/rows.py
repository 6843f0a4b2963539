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


def counted(values: list[Floats]) -> Floats:
    """First operand, missing where a condition is given as second one and does not hold.

    >>> counted([np.array([3.0, 5.0, 7.0]), np.array([1.0, 0.0, np.nan])]).tolist()
    [3.0, nan, nan]
    """
    return values[0] if len(values) == 1 else np.where(values[1] == 1.0, values[0], np.nan)


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


def _of_all(values: list[Floats], parent: Integers, parents: int, *, greatest: bool) -> tuple[Floats, Integers]:
    result, deciding = _extreme(values, parent, parents, greatest=greatest)
    lacking = parent[(parent >= 0) & np.isnan(values[0])]
    result[lacking] = np.nan
    deciding[lacking] = NO_ROW
    return result, deciding


def greatest_of_all(values: list[Floats], parent: Integers, parents: int) -> tuple[Floats, Integers]:
    """Greatest value of the child rows; missing where one of them is missing, for it could be the greatest.

    >>> greatest_of_all([np.array([3.0, 5.0, 2.0, np.nan])], np.array([0, 0, 1, 1]), 2)[0].tolist()
    [5.0, nan]
    """
    return _of_all(values, parent, parents, greatest=True)


def least_of_all(values: list[Floats], parent: Integers, parents: int) -> tuple[Floats, Integers]:
    """Least value of the child rows; missing where one of them is missing, for it could be the least."""
    return _of_all(values, parent, parents, greatest=False)


def beside_greatest(values: list[Floats], parent: Integers, parents: int) -> tuple[Floats, Integers]:
    """Second value of the child row whose first value is the greatest; missing where a first value is missing.

    >>> beside_greatest([np.array([3.0, 5.0]), np.array([7.0, 8.0])], np.array([0, 0]), 1)[0].tolist()
    [8.0]
    """
    return _beside(values, greatest_of_all(values[:1], parent, parents)[1])


def beside_least(values: list[Floats], parent: Integers, parents: int) -> tuple[Floats, Integers]:
    """Second value of the child row whose first value is the least; missing where a first value is missing."""
    return _beside(values, least_of_all(values[:1], parent, parents)[1])


def _beside(values: list[Floats], deciding: Integers) -> tuple[Floats, Integers]:
    found = deciding >= 0
    result = np.full(len(deciding), np.nan)
    result[found] = values[1][deciding[found]]
    return result, deciding


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
    usable = (parent >= 0) & ~np.isnan(counted(values))
    return np.bincount(parent[usable], minlength=parents).astype(float), np.full(parents, NO_ROW, dtype=np.int64)


def median(values: list[Floats], parent: Integers, parents: int) -> tuple[Floats, Integers]:
    """Median of the known values of the child rows.

    >>> median([np.array([1.0, 9.0, 2.0, np.nan])], np.array([0, 0, 0, 0]), 1)[0].tolist()
    [2.0]
    """
    number = counted(values)
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
    """Greatest deviation from the median of the child rows, in per cent of that median.

    A row alone deviates from nothing: none where its condition leaves out all others, else missing.

    >>> result, deciding = greatest_deviation([np.array([100.0, 100.0, 130.0])], np.array([0, 0, 0]), 1)
    >>> round(result.item(), 1), deciding.item()
    (30.0, 2)
    """
    number = counted(values)
    middle = median([number], parent, parents)[0]
    linked = parent >= 0
    share = np.full(len(number), np.nan)
    with np.errstate(all="ignore"):
        own = middle[parent[linked]]
        share[linked] = np.where(own != 0, 100 * np.abs(number[linked] - own) / np.abs(own), np.nan)
    alone = count([number], parent, parents)[0] < 2
    result, deciding = greatest([share], parent, parents)
    result[alone] = np.nan
    deciding[alone] = NO_ROW
    if len(values) > 1:
        left_open = linked & np.isnan(number) & (values[1] != 0.0)
        settled = np.bincount(parent[left_open], minlength=parents) == 0
        result[alone & settled] = 0.0
    return result, deciding


def greatest_robust_score(values: list[Floats], parent: Integers, parents: int) -> tuple[Floats, Integers]:
    """Greatest distance from the median in scaled median absolute deviations, these taken as at least 5 % of it."""
    number = counted(values)
    middle = median([number], parent, parents)[0]
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


def _to_five_figures(number: Floats) -> Floats:
    # a figure written as a secondary value or a multiple comes back with the rounding of its writing
    with np.errstate(divide="ignore", invalid="ignore"):
        step = 10.0 ** (np.floor(np.log10(np.abs(number))) - 4)
        return np.where(number == 0, 0.0, np.round(number / step) * step)


def greatest_spread_of_copies(values: list[Floats], parent: Integers, parents: int) -> tuple[Floats, Integers]:
    """Among child rows (three or more) that share one first value: greatest ratio of their second values.

    >>> result, deciding = greatest_spread_of_copies(
    ...     [np.array([600.0, 600.0, 600.0, 50.0]), np.array([100.0, 200.0, 300.0, 9.0])], np.zeros(4, int), 1)
    >>> result.item(), deciding.item()
    (3.0, 0)
    """
    setting, size = _to_five_figures(counted([values[0], *values[2:]])), values[1]
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
