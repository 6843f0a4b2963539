"""Cells that should say yes or no."""

from __future__ import annotations

from collections.abc import Sequence

from audit.intake.cells import CellValue
from audit.intake.celltext.columns import cell_text, not_a_value
from audit.intake.celltext.reading import MISSING, CellKind, CellReading
from audit.intake.celltext.words import NO, YES, folded, kind_of_word

EXPECTED = "write yes or no, or leave the cell empty"


def read_truth_cells(cells: Sequence[CellValue]) -> list[CellReading]:
    """Readings of a column of yes and no: TRUTH with `number` 1 or 0.

    >>> [reading.number for reading in read_truth_cells(["Enabled", "N", True, 0.0, "✓"])]
    [1.0, 0.0, 1.0, 0.0, 1.0]
    """
    known: dict[str, CellReading] = {}
    readings = []
    for cell in cells:
        faulty = not_a_value(cell)
        if faulty is not None:
            readings.append(faulty)
            continue
        text = cell_text(cell)
        if text not in known:
            known[text] = _read_truth(text)
        readings.append(known[text])
    return readings


def _read_truth(text: str) -> CellReading:
    if not text:
        return MISSING
    for word in (text.casefold(), folded(text)):
        if word in YES:
            return CellReading(CellKind.TRUTH, 1.0, text=text)
        if word in NO:
            return CellReading(CellKind.TRUTH, 0.0, text=text)
    kind = kind_of_word(text)
    if kind in (CellKind.NOT_USED, CellKind.MISSING, CellKind.TO_BE_CONFIRMED, CellKind.ERROR):
        return CellReading(kind, text=text, remark=f"'{text}' says neither yes nor no")
    return CellReading(CellKind.BAD, text=text, remark=f"'{text}' is neither yes nor no; {EXPECTED}")
