"""Readings in arrays, a column of a sheet at a time, and the frame that they make together."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from typing import Any

import numpy as np
import pandas as pd
from numpy.typing import NDArray

FIELDS = (
    "table",
    "record",
    "quantity",
    "group",
    "state",
    "number",
    "text",
    "unit",
    "base",
    "written",
    "cell",
    "header",
)
VALUE, OFF, NOT_USED, PENDING, BAD = "value", "off", "not_used", "pending", "bad"
Objects = NDArray[Any]
Integers = NDArray[np.int64]


@dataclass
class Readings:
    """Readings of one quantity from cells that stand together: arrays of one length."""

    quantity: str
    record: Integers
    state: Objects
    number: NDArray[np.float64]
    text: Objects
    unit: Objects
    base: Objects
    written: Objects
    cell: Integers
    header: str = ""
    table: str = ""
    group: Objects | str = ""

    def __len__(self) -> int:
        return len(self.record)

    def part(self, rows: NDArray[Any], quantity: str | None = None) -> Readings:
        """Give some of the readings, chosen by a mask or by their places."""
        return Readings(
            quantity or self.quantity,
            self.record[rows],
            self.state[rows],
            self.number[rows],
            self.text[rows],
            self.unit[rows],
            self.base[rows],
            self.written[rows],
            self.cell[rows],
            self.header,
            self.table,
            self.group if isinstance(self.group, str) else self.group[rows],
        )


def objects(values: Sequence[Any], size: int | None = None) -> Objects:
    """Give an array of objects; a single value is repeated."""
    array = np.empty(len(values) if size is None else size, dtype=object)
    array[:] = values
    return array


def filled(value: Any, size: int) -> Objects:
    """Give an array that holds one object throughout."""
    array = np.empty(size, dtype=object)
    array.fill(value)
    return array


def frame(blocks: Sequence[Readings]) -> pd.DataFrame:
    """Give one row a reading; the order is that of the blocks."""
    used = [block for block in blocks if len(block)]
    columns: dict[str, list[Any]] = {name: [] for name in FIELDS}
    for block in used:
        size = len(block)
        for name in ("table", "quantity", "header"):
            columns[name].append(filled(getattr(block, name), size))
        columns["group"].append(filled(block.group, size) if isinstance(block.group, str) else block.group)
        for name in ("record", "state", "number", "text", "unit", "base", "written", "cell"):
            columns[name].append(getattr(block, name))
    data: dict[str, Any] = {}
    for name in FIELDS:
        if name in ("record", "cell"):
            data[name] = np.concatenate(columns[name]) if used else np.empty(0, dtype=np.int64)
        elif name == "number":
            data[name] = np.concatenate(columns[name]) if used else np.empty(0)
        else:
            values = np.concatenate(columns[name]) if used else np.empty(0, dtype=object)
            data[name] = pd.Series(values, dtype=object)
    return pd.DataFrame(data)
