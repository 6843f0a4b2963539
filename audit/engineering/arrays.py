"""How every formula here turns what it is given into numbers: float64, not-a-number for missing.

A number that nature does not allow (a negative resistance, a voltage of zero to divide by) is missing too,
so that nothing computed from it can look like a result.
"""

from __future__ import annotations

from collections.abc import Mapping

import numpy as np
from numpy.typing import ArrayLike, NDArray

Floats = NDArray[np.float64]
"""A column of numbers; not-a-number stands for missing."""


def floats(values: ArrayLike) -> Floats:
    """The values as float64; None becomes missing.

    Examples
    --------
    >>> floats([1, None]).tolist()
    [1.0, nan]
    """
    return np.asarray(values, dtype=np.float64)


def above_zero(values: ArrayLike) -> Floats:
    """The values as float64, missing unless greater than zero.

    Examples
    --------
    >>> above_zero([2.0, 0.0, -1.0]).tolist()
    [2.0, nan, nan]
    """
    numbers = floats(values)
    return np.where(numbers > 0, numbers, np.nan)


def zero_or_more(values: ArrayLike) -> Floats:
    """The values as float64, missing where negative.

    Examples
    --------
    >>> zero_or_more([2.0, 0.0, -1.0]).tolist()
    [2.0, 0.0, nan]
    """
    numbers = floats(values)
    return np.where(numbers >= 0, numbers, np.nan)


def within(values: ArrayLike, low: float, high: float) -> Floats:
    """The values as float64, missing outside low to high (both ends belong to it).

    Examples
    --------
    >>> within([0.0, 0.5, 1.2], 0.0, 1.0).tolist()
    [0.0, 0.5, nan]
    """
    numbers = floats(values)
    return np.where((numbers >= low) & (numbers <= high), numbers, np.nan)


def look_up(words: ArrayLike, table: Mapping[str, float]) -> Floats:
    """The table's figure for each word, whatever its case; missing for a word the table has not.

    Examples
    --------
    >>> look_up(["copper", "Aluminium", "", None], {"copper": 1.0, "aluminium": 2.0}).tolist()
    [1.0, 2.0, nan, nan]
    """
    text = np.char.lower(np.char.strip(np.asarray(words, dtype=np.str_)))
    found = np.full(text.shape, np.nan)
    for word, figure in table.items():
        found = np.where(text == word.lower(), figure, found)
    return found
