"""A column of cells at once: plain numbers go straight into an array, texts are read once each."""

from __future__ import annotations

import math
import re
from collections.abc import Mapping, Sequence
from dataclasses import dataclass, replace
from datetime import date, datetime, time, timedelta

import numpy as np
from numpy.typing import NDArray

from audit.intake.cells import CellError, CellValue, UncachedFormula
from audit.intake.celltext.characters import plain
from audit.intake.celltext.numerals import find_decimal_comma
from audit.intake.celltext.quantities import WRITE_A_NUMBER, read_number_text
from audit.intake.celltext.reading import KIND_CODES, KINDS, MISSING, CellKind, CellReading
from audit.intake.celltext.words import kind_of_word

_NUMBER_CODE = KIND_CODES[CellKind.NUMBER]
_PLAIN = re.compile(r"[-+]?(?P<whole>\d{1,15})(?:(?P<mark>[.,])(?P<fraction>\d{1,15}))?", re.ASCII)
_MISSING_CODE = KIND_CODES[CellKind.MISSING]


@dataclass(frozen=True)
class NumberColumn:
    """A column read as numbers.

    `values` holds the number of each cell, missing where it is not one; `kinds` the place of its kind in
    `KINDS`; `odd` the reading of every cell that is neither a plain number nor blank: look there for
    units, remarks and complaints.
    """

    values: NDArray[np.float64]
    kinds: NDArray[np.uint8]
    odd: Mapping[int, CellReading]
    decimal_comma: bool | None

    def __len__(self) -> int:
        """Number of cells."""
        return len(self.values)

    def reading(self, index: int) -> CellReading:
        """Reading of one cell."""
        odd = self.odd.get(index)
        if odd is not None:
            return odd
        value = float(self.values[index])
        return MISSING if math.isnan(value) else CellReading(CellKind.NUMBER, value, text=number_text(value))

    def kind(self, index: int) -> CellKind:
        """Kind of one cell."""
        return KINDS[int(self.kinds[index])]


def read_number_column(
    cells: Sequence[CellValue],
    *,
    decimal_comma: bool | None = None,
    percent: NDArray[np.bool_] | None = None,
) -> NumberColumn:
    """Read a column of cells that should hold numbers.

    `decimal_comma` is what is known about the file; where it is None the column's own texts decide.
    `percent` marks cells that are shown as percentages: their value is given as shown, 0.85 as 85 %.
    """
    values = np.full(len(cells), math.nan)
    kinds = np.full(len(cells), _MISSING_CODE, dtype=np.uint8)
    numeric = [index for index, cell in enumerate(cells) if type(cell) is float or type(cell) is int]
    if numeric:
        values[numeric] = [cells[index] for index in numeric]
        kinds[numeric] = _NUMBER_CODE
    odd: dict[int, CellReading] = {}
    others = [
        (index, cell)
        for index, cell in enumerate(cells)
        if cell is not None and type(cell) is not float and type(cell) is not int
    ]
    texts = {cell for _, cell in others if isinstance(cell, str)}
    if decimal_comma is None:
        decimal_comma = find_decimal_comma(map(plain, texts))
    plain_numbers = {text: number for text in texts if (number := _plain_number(text, decimal_comma)) is not None}
    known = {text: read_number_text(text, decimal_comma) for text in texts if text not in plain_numbers}
    for index, cell in others:
        if isinstance(cell, str) and cell in plain_numbers:
            values[index] = plain_numbers[cell]
            kinds[index] = _NUMBER_CODE
            continue
        reading = known[cell] if isinstance(cell, str) else _not_text(cell)
        if reading is MISSING:
            continue
        odd[index] = reading
        kinds[index] = KIND_CODES[reading.kind]
        if reading.kind is CellKind.NUMBER:
            values[index] = reading.number
    for index in np.flatnonzero((kinds == _NUMBER_CODE) & ~np.isfinite(values)).tolist():
        odd[index] = CellReading(CellKind.BAD, text=str(cells[index]), remark=f"no finite number; {WRITE_A_NUMBER}")
        kinds[index] = KIND_CODES[CellKind.BAD]
        values[index] = math.nan
    if percent is not None:
        _show_as_percent(values, odd, np.intersect1d(np.flatnonzero(percent), numeric))
    return NumberColumn(values, kinds, odd, decimal_comma)


def read_number_cells(
    cells: Sequence[CellValue],
    *,
    decimal_comma: bool | None = None,
    percent: NDArray[np.bool_] | None = None,
) -> list[CellReading]:
    """Readings of a column of cells that should hold numbers; `read_number_column` is far cheaper."""
    column = read_number_column(cells, decimal_comma=decimal_comma, percent=percent)
    return [column.reading(index) for index in range(len(column))]


def _plain_number(text: str, decimal_comma: bool | None) -> float | None:
    """Number of a text without unit and doubt; texts of a file without cell types are mostly that."""
    match = _PLAIN.fullmatch(text)
    if match is None:
        return None
    mark, fraction = match["mark"], match["fraction"]
    if mark is None:
        return float(text)
    if len(fraction) == 3 and match["whole"][0] != "0" and decimal_comma is not (mark == ","):
        return None
    return float(text.replace(",", "."))


def _show_as_percent(values: NDArray[np.float64], odd: dict[int, CellReading], shown: NDArray[np.intp]) -> None:
    for index in shown.tolist():
        if index in odd:
            continue
        # twelve digits: 0.07 * 100 is 7.000000000000001 in binary
        value = float(f"{values[index] * 100:.12g}")
        values[index] = value
        odd[index] = CellReading(CellKind.NUMBER, value, "%", f"{number_text(value)} %")


def number_text(value: float) -> str:
    """Number as its cell shows it in the general format.

    >>> number_text(101.0), number_text(0.86)
    ('101', '0.86')
    """
    return str(int(value)) if value == int(value) and abs(value) < 1e15 else f"{value:.15g}"


def cell_text(cell: CellValue) -> str:
    """Text of a cell in one spelling, '' for a blank; a tag typed as the number 101 gives '101'."""
    if isinstance(cell, str):
        return plain(cell)
    if cell is None:
        return ""
    if isinstance(cell, bool):
        return "TRUE" if cell else "FALSE"
    if isinstance(cell, int | float):
        return number_text(cell) if math.isfinite(cell) else str(cell)
    if isinstance(cell, datetime) and cell.time() == time():
        return cell.date().isoformat()
    if isinstance(cell, datetime):
        return cell.isoformat(sep=" ")
    return str(cell)


def not_a_value(cell: CellValue) -> CellReading | None:
    """Reading of an error cell or a formula without result; None for anything else."""
    if isinstance(cell, CellError):
        return CellReading(
            CellKind.ERROR, text=cell.code, remark=f"the cell shows the error {cell.code}; repair its formula"
        )
    if isinstance(cell, UncachedFormula):
        return CellReading(
            CellKind.ERROR,
            remark="the cell holds a formula whose result was never saved; open the workbook in a "
            "spreadsheet program and save it",
        )
    return None


def _not_text(cell: CellValue) -> CellReading:
    """Reading of a cell that holds neither number nor text in a column of numbers."""
    faulty = not_a_value(cell)
    if faulty is not None:
        return faulty
    text = cell_text(cell)
    if isinstance(cell, bool):
        return CellReading(CellKind.BAD, text=text, remark=f"the cell holds {text}, not a number; {WRITE_A_NUMBER}")
    if isinstance(cell, timedelta):
        return _clock(text, cell)
    if isinstance(cell, time):
        return _clock(
            text,
            timedelta(hours=cell.hour, minutes=cell.minute, seconds=cell.second, microseconds=cell.microsecond),
        )
    if isinstance(cell, date):
        typed = f"'{cell.month}-{cell.day}', '{cell.day}/{cell.month}' or '{cell.day}.{cell.month}'"
        return CellReading(
            CellKind.BAD,
            text=text,
            remark=f"the cell holds the date {text}; a spreadsheet program makes one of {typed}, "
            f"typed as a range or a fraction. Format the cell as text or number and {WRITE_A_NUMBER}",
        )
    return CellReading(CellKind.BAD, text=text, remark=f"'{text}' is not a number; {WRITE_A_NUMBER}")


def _clock(text: str, span: timedelta) -> CellReading:
    seconds = span.total_seconds()
    if seconds % 60:
        return CellReading(
            CellKind.NUMBER,
            seconds,
            "s",
            text,
            remark=f"the cell holds the time {text}, read as {number_text(seconds)} s",
        )
    return CellReading(
        CellKind.AMBIGUOUS,
        unit_text="s",
        text=text,
        numbers=(seconds / 60, seconds),
        remark=f"the cell holds the time {text}: typed as minutes and seconds it means "
        f"{number_text(seconds / 60)} s, as hours and minutes {number_text(seconds)} s; {WRITE_A_NUMBER}",
    )


def read_text_cells(cells: Sequence[CellValue]) -> list[CellReading]:
    """Readings of a column of free texts, tags or choices; words that stand for no value are told apart."""
    known: dict[str, CellReading] = {}
    readings = []
    for cell in cells:
        faulty = not_a_value(cell)
        if faulty is not None:
            readings.append(faulty)
            continue
        text = cell_text(cell)
        if text not in known:
            known[text] = _read_text(text)
        readings.append(known[text])
    return readings


def _read_text(text: str) -> CellReading:
    if not text:
        return MISSING
    kind = kind_of_word(text)
    if kind is None or kind is CellKind.INSTANTANEOUS:
        return CellReading(CellKind.TEXT, text=text)
    return replace(CellReading(kind, text=text), remark=f"'{text}' stands for no value")
