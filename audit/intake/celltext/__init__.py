"""Text of cells to values, a column at a time."""

from audit.intake.celltext.columns import (
    NumberColumn,
    cell_text,
    read_number_cells,
    read_number_column,
    read_text_cells,
)
from audit.intake.celltext.dates import find_day_first, read_date_cells
from audit.intake.celltext.numerals import find_decimal_comma
from audit.intake.celltext.quantities import read_number_text
from audit.intake.celltext.reading import KIND_CODES, KINDS, CellKind, CellReading
from audit.intake.celltext.truths import read_truth_cells

__all__ = [
    "KINDS",
    "KIND_CODES",
    "CellKind",
    "CellReading",
    "NumberColumn",
    "cell_text",
    "find_day_first",
    "find_decimal_comma",
    "read_date_cells",
    "read_number_cells",
    "read_number_column",
    "read_number_text",
    "read_text_cells",
    "read_truth_cells",
]
