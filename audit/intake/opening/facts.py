"""What a look beside the reader tells about a sheet: its extent, and what the reader leaves out."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from dataclasses import dataclass, field
from pathlib import Path

import numpy as np
from numpy.typing import NDArray

from audit.fleet.addresses import a1, pack
from audit.intake.cells import CellError, UncachedFormula
from audit.intake.opening.bounds import MAXIMUM_GRID_CELLS, SHEET_COLUMNS, SHEET_ROWS
from audit.intake.opening.grids import UnreadableWorkbook, no_cells

Cell = tuple[int, int]


@dataclass
class SheetFacts:
    """Facts of one sheet; rows and columns from 1.

    `markers` are the cells that show an error or hold a formula without a saved result. `percent` and
    `struck` are packed cells by the format they are shown in, in pieces.
    """

    last_row: int = 0
    last_column: int = 0
    hidden_rows: set[int] = field(default_factory=set)
    hidden_columns: set[int] = field(default_factory=set)
    merged: list[tuple[int, int, int, int]] = field(default_factory=list)
    markers: dict[Cell, CellError | UncachedFormula] = field(default_factory=dict)
    percent: list[NDArray[np.int64]] = field(default_factory=list)
    struck: list[NDArray[np.int64]] = field(default_factory=list)
    notes: list[str] = field(default_factory=list)

    def reach(self, row: int, column: int) -> None:
        """Enlarge the extent to a cell with content."""
        self.last_row = max(self.last_row, row)
        self.last_column = max(self.last_column, column)


@dataclass(frozen=True)
class WorkbookFacts:
    """Facts of all sheets by their names, and of the workbook."""

    sheets: Mapping[str, SheetFacts]
    date_1904: bool = False
    own_sheets: frozenset[str] = frozenset()
    remarks: tuple[str, ...] = ()


def packed(cells: Iterable[Cell]) -> NDArray[np.int64]:
    """Packed addresses of cells, with sheet index 0."""
    pairs = np.array(list(cells), dtype=np.int64)
    return pack(0, pairs[:, 0], pairs[:, 1]) if pairs.size else no_cells()


def united(pieces: list[NDArray[np.int64]]) -> NDArray[np.int64]:
    """Sorted packed addresses of all pieces."""
    return np.unique(np.concatenate(pieces)) if pieces else no_cells()


def check_extent(path: Path, sheets: Mapping[str, SheetFacts]) -> None:
    """Refuse a workbook whose sheets span more cells than can be read: a reader keeps every one of them."""
    total = 0
    for name, facts in sheets.items():
        total += facts.last_row * facts.last_column
        if total > MAXIMUM_GRID_CELLS:
            raise too_far(path, name, facts.last_row, facts.last_column, total)


def check_reach(path: Path, sheet: str, facts: SheetFacts) -> None:
    """Refuse a sheet as soon as it alone reaches too far, or beyond what a sheet can hold."""
    total = facts.last_row * facts.last_column
    if facts.last_row > SHEET_ROWS or facts.last_column > SHEET_COLUMNS or total > MAXIMUM_GRID_CELLS:
        raise too_far(path, sheet, facts.last_row, facts.last_column, total)


def too_far(path: Path, sheet: str, row: int, column: int, total: int) -> UnreadableWorkbook:
    """Refusal of a workbook that spans too many cells."""
    return UnreadableWorkbook(
        path,
        f"sheet '{sheet}' reaches as far as cell {a1(row, column)}; with it the workbook spans {total:,} cells",
        f"at most {MAXIMUM_GRID_CELLS:,}",
        "Look for a stray entry far below or to the right of the table (Ctrl+End goes to the last cell), delete "
        "those rows and columns, and save.",
    )
