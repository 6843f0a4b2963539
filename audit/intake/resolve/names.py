"""Joining names between tables: exactly after trimming and case-folding, or folded where that is unique."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, field

import numpy as np
from numpy.typing import NDArray

from audit.fleet.column import NO_ROW, Integers
from audit.fleet.folding import exact as exact
from audit.fleet.folding import loose as loose

AMBIGUOUS = -2


@dataclass
class Names:
    """The names that the rows of a table go by; a name of several rows is ambiguous unless they are alike."""

    rows: dict[str, int] = field(default_factory=dict)

    def add(self, name: str, row: int, *, first_counts: bool = False) -> None:
        """Let a row go by a name; of two rows of one name the first counts, or neither."""
        folded = exact(name)
        if folded in self.rows and self.rows[folded] != row:
            if not first_counts:
                self.rows[folded] = AMBIGUOUS
        else:
            self.rows[folded] = row


@dataclass(frozen=True)
class Joined:
    """For each child the row it means (NO_ROW for none), and which of them joined folded or ambiguously."""

    rows: Integers
    folded: NDArray[np.bool_]
    ambiguous: NDArray[np.bool_]


def join(children: Sequence[str | None], parents: Names) -> Joined:
    """Join the names of children to the rows of a table.

    >>> parents = Names()
    >>> for row, name in enumerate(["P-101", "CV 101 A", "F 1", "F-1"]):
    ...     parents.add(name, row)
    >>> join(["p-101 ", "cv-101a", "F1", "X", None], parents).rows.tolist()
    [0, 1, -1, -1, -1]
    """
    size = len(children)
    rows = np.full(size, NO_ROW, dtype=np.int64)
    folded = np.zeros(size, dtype=bool)
    ambiguous = np.zeros(size, dtype=bool)
    parent_loose: dict[str, list[str]] = {}
    for parent in parents.rows:
        parent_loose.setdefault(loose(parent), []).append(parent)
    child_loose: dict[str, set[str]] = {}
    names = [exact(child) if child is not None else None for child in children]
    distinct = {name for name in names if name is not None}
    for name in distinct:
        child_loose.setdefault(loose(name), set()).add(name)
    met = {name: _meet(name, parents, parent_loose, child_loose) for name in distinct}
    for index, child in enumerate(names):
        if child is not None:
            rows[index], folded[index], ambiguous[index] = met[child]
    return Joined(rows, folded, ambiguous)


def _meet(
    name: str, parents: Names, parent_loose: dict[str, list[str]], child_loose: dict[str, set[str]]
) -> tuple[int, bool, bool]:
    row = parents.rows.get(name)
    if row is not None:
        return (NO_ROW, False, True) if row == AMBIGUOUS else (row, False, False)
    candidates = parent_loose.get(loose(name), [])
    if not candidates:
        return NO_ROW, False, False
    if len(candidates) > 1 or len(child_loose[loose(name)]) > 1 or parents.rows[candidates[0]] == AMBIGUOUS:
        return NO_ROW, False, True
    return parents.rows[candidates[0]], True, False
