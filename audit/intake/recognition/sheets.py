"""What the readers of all layouts need to know about the sheet in hand."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, field

import numpy as np

from audit.fleet.addresses import COLUMN_BITS, ROW_BITS, pack
from audit.intake.cells import CellValue
from audit.intake.celltext import cell_text
from audit.intake.gathered import ColumnReading
from audit.intake.opening import SheetGrid
from audit.intake.recognition.blocks import Integers, Readings, filled, objects
from audit.intake.recognition.source import Cells, Source, name_of_cell
from audit.intake.sitemap import MappedSheet
from audit.vocabulary.spellings import UnitReading


@dataclass
class Records:
    """Running numbers of records, unique in a run."""

    following: int = 0

    def take(self, count: int) -> Integers:
        """Give out some numbers."""
        first = self.following
        self.following += count
        return np.arange(first, first + count, dtype=np.int64)


@dataclass
class Sheet:
    """A sheet being read, and everything that comes out of it."""

    grid: SheetGrid
    index: int
    source: Source
    records: Records
    readings: list[Readings] = field(default_factory=list)
    columns: list[ColumnReading] = field(default_factory=list)
    mapped: MappedSheet | None = None

    def address(self, row: int, column: int) -> int:
        """Pack the address of one cell."""
        return (self.index << (ROW_BITS + COLUMN_BITS)) | (row << COLUMN_BITS) | column

    def value(self, row: int, column: int) -> CellValue:
        """Give the value of one cell, None beyond the sheet."""
        if 1 <= row <= self.grid.height and 1 <= column <= self.grid.width:
            return self.grid.rows[row - 1][column - 1]
        return None

    def text(self, row: int, column: int) -> str:
        """Give the text of one cell."""
        return cell_text(self.value(row, column))

    def cells(
        self,
        column: int,
        rows: Sequence[int],
        record: Integers,
        unit: UnitReading | Sequence[UnitReading | None] | None = None,
        header: str = "",
    ) -> Cells:
        """Give the cells of a column in some rows."""
        grid, place = self.grid, column - 1
        address = pack(self.index, np.asarray(rows, dtype=np.int64), column)
        marks = pack(0, np.asarray(rows, dtype=np.int64), column)
        percent = np.isin(marks, grid.percent_cells) if grid.percent_cells.size else None
        struck = np.isin(marks, grid.struck_cells) if grid.struck_cells.size else None
        return Cells([grid.rows[row - 1][place] for row in rows], address, record, unit, percent, struck, header)

    def understood(
        self,
        header: str,
        cell: int,
        table: str,
        quantity: str,
        unit: UnitReading | None,
        sample: str,
        how: str,
    ) -> None:
        """Note how a column was understood."""
        self.columns.append(
            ColumnReading(
                self.source.file,
                self.source.sheet,
                header,
                name_of_cell(cell),
                table,
                quantity,
                unit.unit if unit else "",
                unit.base if unit else "",
                sample,
                how,
            )
        )

    def keep(self, made: Readings, table: str, header: str = "") -> None:
        """Keep readings for a table."""
        made.table = table
        made.header = made.header or header
        if len(made):
            self.readings.append(made)


def said(quantity: str, record: Integers, texts: Sequence[str], cells: Integers, header: str) -> Readings:
    """Give readings of a text quantity that were found outside a column of its own."""
    size = len(record)
    return Readings(
        quantity,
        record,
        filled("value", size),
        np.full(size, np.nan),
        objects(list(texts)),
        filled("", size),
        filled("", size),
        objects(list(texts)),
        cells,
        header,
    )
