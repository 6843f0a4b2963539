"""One value a row from all the readings that speak of it; readings that contradict each other are withheld."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from typing import Any

import numpy as np
import pandas as pd
from numpy.typing import NDArray

from audit.fleet.column import NO_CELL, Floats, Integers
from audit.intake.gathered import STATES
from audit.intake.resolve.codes import UNREAD
from audit.intake.resolve.ledger import Ledger
from audit.intake.resolve.names import exact
from audit.intake.resolve.rows import LINKING
from audit.vocabulary.quantities import Quantity
from audit.vocabulary.spellings import name_of

NOT_READ = -1
VALUE, OFF, NOT_USED, PENDING, BAD = range(len(STATES))
CODE_OF_STATE: Mapping[str, int] = {state: code for code, state in enumerate(STATES)}
SAME_UNIT, OTHER_UNIT = 1e-6, 0.03
"""Relative differences within which two figures say the same: in one unit, and in two units or on two bases."""
MAY_DIFFER = LINKING | {"service", "area"}
"""Texts that sheets word differently without harm: the first counts."""


@dataclass
class Picked:
    """The value of each row of a table, what the row's cell says, the cell, and the reading it came from."""

    values: NDArray[Any]
    state: NDArray[np.int8]
    cell: Integers
    reading: Integers

    def withhold(self, rows: NDArray[Any], missing: object) -> None:
        """Take the values of these rows away; state and cell stay."""
        self.values[rows] = missing


def pick(
    quantity: Quantity, readings: pd.DataFrame, values: NDArray[Any], missing: NDArray[Any], ledger: Ledger
) -> Picked:
    """Pick for each row the reading that counts: the best rank, a value before a word, the own unit first.

    `values` belong to the readings, `missing` is a column of missing values as long as the table.
    """
    size = len(missing)
    picked = Picked(
        missing,
        np.full(size, NOT_READ, dtype=np.int8),
        np.full(size, NO_CELL, dtype=np.int64),
        np.full(size, NOT_READ, dtype=np.int64),
    )
    if readings.empty:
        return picked
    rows = readings["row"].to_numpy()
    rank = readings["rank"].to_numpy()
    state: NDArray[np.int8] = np.asarray(readings["state"].map(CODE_OF_STATE), dtype=np.int8)
    order = np.lexsort((_foreign(quantity, readings), state, rank, rows))
    first = order[np.unique(rows[order], return_index=True)[1]]
    chosen = np.full(size, NOT_READ, dtype=np.int64)
    chosen[rows[first]] = first
    picked.values[rows[first]] = values[first]
    picked.state[rows[first]] = state[first]
    picked.cell[rows[first]] = readings["cell"].to_numpy()[first]
    picked.reading[rows[first]] = readings["reading"].to_numpy()[first]
    against = chosen[rows]
    rivals = (rank == rank[against]) & (state <= OFF) & (state[against] <= OFF) & (np.arange(len(rows)) != against)
    if rivals.any() and quantity.name not in MAY_DIFFER:
        differ = np.flatnonzero(rivals)
        differ = differ[_contradict(quantity, readings, values, state, differ, against[differ])]
        _complain(quantity, readings, differ, against[differ], ledger)
        picked.withhold(rows[differ], _missing(quantity))
        picked.state[rows[differ[state[differ] != state[against[differ]]]]] = BAD
    return picked


def _foreign(quantity: Quantity, readings: pd.DataFrame) -> NDArray[np.int8]:
    """Tell which readings are in another unit or on a base: they stand behind."""
    if quantity.unit is None:
        return np.zeros(len(readings), dtype=np.int8)
    own = name_of(quantity.unit)
    foreign = ~readings["unit"].isin(["", own]) | ~readings["base"].isin(["", "primary"])
    return np.asarray(foreign, dtype=np.int8)


def _missing(quantity: Quantity) -> object:
    if quantity.kind in ("number", "date"):
        return np.nan
    return UNREAD if quantity.kind in ("truth", "choice") else None


def _contradict(
    quantity: Quantity,
    readings: pd.DataFrame,
    values: NDArray[Any],
    state: NDArray[np.int8],
    one: NDArray[np.intp],
    other: Integers,
) -> NDArray[np.bool_]:
    """Tell where two readings of one row say different things; a value not understood contradicts nothing."""
    if quantity.kind == "text":
        return np.array(
            [
                a is not None and b is not None and exact(a) != exact(b)
                for a, b in zip(values[one], values[other], strict=True)
            ]
        )
    if quantity.kind in ("truth", "choice"):
        known = (values[one] != UNREAD) & (values[other] != UNREAD)
        return np.asarray(known & (values[one] != values[other]))
    written = [readings[name].to_numpy(dtype=object) for name in ("unit", "base")]
    alike = np.logical_and.reduce([column[one] == column[other] for column in written])
    first: Floats = values[one].astype(np.float64)
    second: Floats = values[other].astype(np.float64)
    scale = np.maximum(np.abs(first), np.abs(second))
    apart = np.abs(first - second) > np.where(alike, SAME_UNIT, OTHER_UNIT) * scale
    return np.asarray(apart | (state[one] != state[other]))


def _complain(
    quantity: Quantity, readings: pd.DataFrame, differ: NDArray[np.intp], against: Integers, ledger: Ledger
) -> None:
    written, cells = readings["written"].tolist(), readings["cell"].tolist()
    for one, other in zip(differ.tolist(), against.tolist(), strict=True):
        place = ledger.place(cells[one])
        ledger.complain(
            cells[other],
            f"{quantity.label} is '{written[other]}' here and '{written[one]}' in {place.file}, sheet "
            f"'{place.sheet}', cell {place.cell}",
            "one value for a datum, or the same wherever it stands",
            "Correct one of them; the value counts as missing until then.",
            quantity=quantity.name,
            subject=quantity.subject,
        )
