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
    """The values as float64, missing unless greater than zero and finite.

    Examples
    --------
    >>> above_zero([2.0, 0.0, -1.0, float("inf")]).tolist()
    [2.0, nan, nan, nan]
    """
    numbers = floats(values)
    return np.where((numbers > 0) & (numbers < np.inf), numbers, np.nan)


def zero_or_more(values: ArrayLike) -> Floats:
    """The values as float64, missing where negative or infinite.

    Examples
    --------
    >>> zero_or_more([2.0, 0.0, -1.0, float("inf")]).tolist()
    [2.0, 0.0, nan, nan]
    """
    numbers = floats(values)
    return np.where((numbers >= 0) & (numbers < np.inf), numbers, np.nan)


def zero_to_infinity(values: ArrayLike) -> Floats:
    """The values as float64, missing where negative: for a ratio whose divisor may vanish, such as X/R.

    Examples
    --------
    >>> zero_to_infinity([2.0, -1.0, float("inf")]).tolist()
    [2.0, nan, inf]
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


def together(*values: ArrayLike) -> list[Floats]:
    """The values as float64 arrays of one common shape.

    Examples
    --------
    >>> [part.tolist() for part in together([1, 2], 3)]
    [[1.0, 2.0], [3.0, 3.0]]
    """
    return [np.array(part) for part in np.broadcast_arrays(*(floats(value) for value in values))]


def present(*values: Floats) -> NDArray[np.bool_]:
    """Where none of the values is missing.

    Examples
    --------
    >>> present(floats([1, None, 3]), floats([1, 2, None])).tolist()
    [True, False, False]
    """
    known = ~np.isnan(values[0])
    for value in values[1:]:
        known = known & ~np.isnan(value)
    return known


def entry_at(table: ArrayLike, codes: ArrayLike) -> Floats:
    """The table's entry at each whole-number code, counted from zero; missing for a code the table has not.

    Examples
    --------
    >>> entry_at([10, 20], [0, 1, -1, 2, 0.5]).tolist()
    [10.0, 20.0, nan, nan, nan]
    """
    entries, places = floats(table), floats(codes)
    known = (places >= 0) & (places < len(entries)) & (places == np.floor(places))
    return np.append(entries, np.nan)[np.where(known, places, len(entries)).astype(np.int64)]


def code_of(name: str, codes: Mapping[str, int], subject: str) -> int:
    """The code that a name stands for, whatever its case; a name without one is refused.

    Examples
    --------
    >>> code_of("10A", {"10": 0, "10a": 1}, "a trip class")
    1
    """
    found = codes.get(" ".join(name.casefold().split()))
    if found is None:
        raise ValueError(f"{name!r} is not {subject}. Accepted: {', '.join(codes)}.")
    return found
