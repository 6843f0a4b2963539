"""Lay two audits side by side: which row of the one is which row of the other, and which values differ."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass, field

import numpy as np
from numpy.typing import NDArray

from audit.findings.audit import Audit
from audit.findings.comparison.namesakes import namesakes, paired
from audit.fleet.column import NO_ROW, Column, Integers
from audit.fleet.folding import exact

Mask = NDArray[np.bool_]
SAME = 1e-9
"""Relative difference up to which two numbers are the same: a value written in another unit stays itself."""


def rows_by_key(keys: Sequence[str], of: Sequence[str]) -> Integers:
    """Give for each key its row among others, or NO_ROW; case and doubled spaces do not count.

    >>> rows_by_key(["P-1", "P-3"], ["p-3", "P-2"]).tolist()
    [-1, 0]
    """
    places: dict[str, int] = {}
    for row, key in enumerate(of):
        places.setdefault(exact(key), row)
    return np.array([places.get(exact(key), NO_ROW) for key in keys], dtype=np.int64)


def differ(before: Column, after: Column) -> Mask:
    """Tell where two columns of the same rows say different things; missing is missing on both sides."""
    gone, new = before.missing(), after.missing()
    if after.kind in ("number", "date"):
        old, now = before.values.astype(np.float64), after.values.astype(np.float64)
        with np.errstate(invalid="ignore"):
            apart = np.abs(old - now) > SAME * np.maximum(np.abs(old), np.abs(now))
            apart = np.where(np.isinf(old) | np.isinf(now), old != now, apart)
    elif after.kind == "text":
        apart = np.array(
            [a is not None and b is not None and exact(str(a)) != exact(str(b)) for a, b in _pairs(before, after)],
            dtype=bool,
        )
    elif before.choices != after.choices:
        words = [[*column.choices, ""] for column in (before, after)]
        apart = np.array(words[0])[before.values] != np.array(words[1])[after.values]
    else:
        apart = before.values != after.values
    return np.asarray((gone != new) | (apart & ~gone & ~new), dtype=bool)


def _pairs(before: Column, after: Column) -> zip[tuple[object, ...]]:
    return zip(before.values, after.values, strict=True)


@dataclass
class Pair:
    """Two audits of a fleet, judged by the same rules, and what lies where on either side."""

    before: Audit
    after: Audit
    _rows: dict[str, Integers] = field(default_factory=dict)
    _differ: dict[str, Mask] = field(default_factory=dict)
    _after: dict[str, Integers] = field(default_factory=dict)

    def keys(self, subject: str, *, before: bool = False) -> tuple[str, ...]:
        """Give the keys of the rows of a subject."""
        table = (self.before if before else self.after).fleet.tables.get(subject)
        return table.keys if table is not None else ()

    def row_before(self, subject: str) -> Integers:
        """Give for each row after the same row before, NO_ROW for one that was added."""
        if subject not in self._rows:
            keys = self.keys(subject), self.keys(subject, before=True)
            rows = rows_by_key(*keys)
            for new, old in paired(namesakes(keys[1]), namesakes(keys[0]), self._cost(subject)).items():
                rows[new] = old
            self._rows[subject] = rows
        return self._rows[subject]

    def _cost(self, subject: str) -> Callable[[int, int], int]:
        tables = self.before.fleet.tables[subject].columns, self.after.fleet.tables[subject].columns
        shared = [(tables[0][name], column) for name, column in tables[1].items() if name in tables[0]]

        def cost(old: int, new: int) -> int:
            rows = np.array([old], dtype=np.int64), np.array([new], dtype=np.int64)
            return sum(bool(differ(b.gathered(rows[0]), a.gathered(rows[1]))[0]) for b, a in shared)

        return cost

    def added(self, subject: str) -> list[int]:
        """Give the rows after that were not there before."""
        return np.flatnonzero(self.row_before(subject) == NO_ROW).tolist()

    def removed(self, subject: str) -> list[int]:
        """Give the rows before that are no longer there."""
        kept = np.zeros(len(self.keys(subject, before=True)), dtype=bool)
        rows = self.row_before(subject)
        kept[rows[rows >= 0]] = True
        return np.flatnonzero(~kept).tolist()

    def differs(self, name: str) -> Mask:
        """Tell for each row after of a quantity's table whether its value differs; no for rows that were added."""
        if name not in self._differ:
            after = self.after.workings.home_column(name)
            subject = self.after.workings.quantities[name].subject
            rows = self.row_before(subject)
            before = self.before.workings.home_column(name).gathered(rows)
            self._differ[name] = differ(before, after) & (rows >= 0)
        return self._differ[name]

    def value_before(self, name: str, row: int) -> tuple[Column, int]:
        """Give the column before, and the row in it that is this row after."""
        subject = self.after.workings.quantities[name].subject
        return self.before.workings.home_column(name), int(self.row_before(subject)[row])

    def parents(self, subject: str, home: str, row: int) -> tuple[int, int]:
        """Give the rows of another table that a row of a subject points to: before (as a row after) and after.

        A row that is gone after gives NO_ROW before as well.
        """
        at_after = self.after.fleet.parent_rows(subject, home)
        at_before = self.before.fleet.parent_rows(subject, home)
        old = int(self.row_before(subject)[row])
        now = int(at_after[row]) if at_after is not None else NO_ROW
        was = int(at_before[old]) if at_before is not None and old >= 0 else NO_ROW
        return self.as_after(home, was), now

    def as_after(self, subject: str, row_before: int) -> int:
        """Give the row after that a row before has become, or NO_ROW."""
        if row_before < 0:
            return NO_ROW
        if subject not in self._after:
            rows = self.row_before(subject)
            kept = np.flatnonzero(rows >= 0)
            became = np.full(len(self.keys(subject, before=True)), NO_ROW, dtype=np.int64)
            became[rows[kept]] = kept
            self._after[subject] = became
        return int(self._after[subject][row_before])

    def name_after(self, subject: str, row_before: int) -> str:
        """Give the name that a row before has now; its own where it is gone."""
        row = self.as_after(subject, row_before)
        return self.keys(subject)[row] if row >= 0 else self.keys(subject, before=True)[row_before]
