"""Grids of cells as they come out of a file, before anybody looks for headers."""

from __future__ import annotations

from dataclasses import dataclass, field
from pathlib import Path

import numpy as np
from numpy.typing import NDArray

from audit.fleet.addresses import pack
from audit.intake.cells import CellValue
from audit.refusal import Refusal


def no_cells() -> NDArray[np.int64]:
    """Give an empty, sorted set of packed cells."""
    return np.empty(0, dtype=np.int64)


@dataclass(frozen=True)
class SheetGrid:
    """One sheet: `rows[0][0]` is cell A1, every row is as long as the widest.

    `percent_cells` and `struck_cells` are sorted packed addresses with sheet index 0; `notes` says in
    plain words what could not be told about this sheet.
    """

    name: str
    rows: list[list[CellValue]]
    hidden: bool = False
    hidden_rows: frozenset[int] = frozenset()
    hidden_columns: frozenset[int] = frozenset()
    merged: tuple[tuple[int, int, int, int], ...] = ()
    percent_cells: NDArray[np.int64] = field(default_factory=no_cells)
    struck_cells: NDArray[np.int64] = field(default_factory=no_cells)
    decimal_comma: bool | None = None
    notes: tuple[str, ...] = ()

    @property
    def height(self) -> int:
        """Number of rows."""
        return len(self.rows)

    @property
    def width(self) -> int:
        """Number of columns."""
        return len(self.rows[0]) if self.rows else 0

    def column(self, column: int, first_row: int = 1, last_row: int | None = None) -> list[CellValue]:
        """Values of a column from `first_row` to `last_row`, both counted from 1 and included."""
        return [row[column - 1] for row in self.rows[first_row - 1 : last_row]]

    def percent_in_column(self, column: int, first_row: int = 1, last_row: int | None = None) -> NDArray[np.bool_]:
        """Tell per cell of `column(...)` whether it is shown as a percentage (0.85 shown as 85 %)."""
        return self._marked(self.percent_cells, column, first_row, last_row)

    def struck_in_column(self, column: int, first_row: int = 1, last_row: int | None = None) -> NDArray[np.bool_]:
        """Tell per cell of `column(...)` whether its text is struck through as a whole."""
        return self._marked(self.struck_cells, column, first_row, last_row)

    def _marked(
        self, marked: NDArray[np.int64], column: int, first_row: int, last_row: int | None
    ) -> NDArray[np.bool_]:
        last_row = self.height if last_row is None else min(last_row, self.height)
        if not marked.size or last_row < first_row:
            return np.zeros(max(last_row - first_row + 1, 0), dtype=bool)
        return np.isin(pack(0, np.arange(first_row, last_row + 1), column), marked)


@dataclass(frozen=True)
class WorkbookGrids:
    """All sheets of one file, with the hash of exactly the bytes that were read."""

    path: Path
    sha256: str
    sheets: list[SheetGrid]
    date_1904: bool = False
    remarks: tuple[str, ...] = ()


class UnreadableWorkbook(Refusal):
    """A file that cannot be read, or that it would not be safe to read."""

    def __init__(self, path: Path, found: str, expected: str, advice: str) -> None:
        super().__init__(path, found, expected, advice)
        self.path = path
        self.found = found
        self.expected = expected
        self.advice = advice

    def __str__(self) -> str:
        """Give one message: place, what was found, what is accepted, what to do."""
        return f"{self.path.name}: {self.found}; expected {self.expected}. {self.advice}"
