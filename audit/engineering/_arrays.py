"""What every formula here does with its arguments: floats that broadcast, NaN for missing."""

from __future__ import annotations

import numpy as np
import numpy.typing as npt

Floats = npt.NDArray[np.float64]
Integers = npt.NDArray[np.int64]
Values = npt.ArrayLike


def floats(*values: Values) -> list[Floats]:
    """Return the values as float64 arrays of one common shape."""
    return [np.array(part) for part in np.broadcast_arrays(*(np.asarray(v, dtype=np.float64) for v in values))]


def present(*values: Floats) -> npt.NDArray[np.bool_]:
    """Tell where none of the values is missing."""
    known = ~np.isnan(values[0])
    for value in values[1:]:
        known = known & ~np.isnan(value)
    return known


def looked_up(table: Values, code: Floats) -> Floats:
    """Return the table's entry at each whole-number code; missing where the code is none of the table's."""
    entries = np.asarray(table, dtype=np.float64)
    known = present(code) & (code >= 0) & (code < len(entries)) & (code == np.floor(code))
    return np.append(entries, np.nan)[np.where(known, code, len(entries)).astype(np.int64)]


def code_of(name: str, codes: dict[str, int], subject: str) -> int:
    """Return the code that a name stands for; spelling in capitals or not is the same."""
    found = codes.get(" ".join(name.casefold().split()))
    if found is None:
        accepted = ", ".join(sorted(codes))
        raise ValueError(f"{name!r} is not {subject}. Accepted: {accepted}.")
    return found
