"""A column: values, how each came to be, and the cell each came from."""

from __future__ import annotations

from dataclasses import dataclass, field
from typing import Any, Literal

import numpy as np
from numpy.typing import NDArray

Floats = NDArray[np.float64]
Bytes = NDArray[np.int8]
Integers = NDArray[np.int64]
Kind = Literal["number", "truth", "choice", "text", "date"]

RECORDED, STATED, CALCULATED, ASSUMED = 0, 1, 2, 3
BASIS_NAMES = ("recorded", "stated", "calculated", "assumed")
NO, UNKNOWN, YES = 0, 1, 2
NO_CELL = -1
NO_ROW = -1


def missing_of(kind: Kind, size: int) -> NDArray[Any]:
    """Give an array of missing values of one kind: NaN, unknown, -1 or None."""
    if kind in ("number", "date"):
        return np.full(size, np.nan)
    if kind == "truth":
        return np.full(size, UNKNOWN, dtype=np.int8)
    if kind == "choice":
        return np.full(size, -1, dtype=np.int16)
    return np.full(size, None, dtype=object)


def is_missing(values: NDArray[Any], kind: Kind) -> NDArray[np.bool_]:
    """Tell which values are missing."""
    if kind in ("number", "date"):
        return np.asarray(np.isnan(values))
    if kind == "truth":
        return np.asarray(values == UNKNOWN)
    if kind == "choice":
        return np.asarray(values < 0)
    return np.array([value is None for value in values], dtype=bool)


@dataclass(frozen=True, slots=True)
class Column:
    """Values of one quantity of one table, row by row.

    `basis` holds the code of the weakest basis beneath a value, `cell` the packed address or NO_CELL.
    A derived column also tells which recipe gave each row and, for group functions, the row that decided.
    """

    kind: Kind
    values: NDArray[Any]
    basis: Bytes
    cell: Integers
    recipe: NDArray[np.int8] | None = None
    deciding: Integers | None = None
    choices: tuple[str, ...] = field(default=())

    @staticmethod
    def empty(kind: Kind, size: int, choices: tuple[str, ...] = ()) -> Column:
        """Give a column without any value."""
        return Column(
            kind,
            missing_of(kind, size),
            np.full(size, STATED, dtype=np.int8),
            np.full(size, NO_CELL, dtype=np.int64),
            choices=choices,
        )

    def __len__(self) -> int:
        return len(self.values)

    def missing(self) -> NDArray[np.bool_]:
        """Tell which rows have no value."""
        return is_missing(self.values, self.kind)

    def gathered(self, rows: Integers) -> Column:
        """Give the values at these rows; NO_ROW gives a missing value."""
        size = len(rows)
        found = rows >= 0
        values = missing_of(self.kind, size)
        basis = np.full(size, STATED, dtype=np.int8)
        cell = np.full(size, NO_CELL, dtype=np.int64)
        source = rows[found]
        values[found] = self.values[source]
        basis[found] = self.basis[source]
        cell[found] = self.cell[source]
        return Column(self.kind, values, basis, cell, choices=self.choices)
