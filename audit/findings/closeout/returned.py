"""A returned hand-over sheet: rows known by their hidden key, columns by their hidden names, whatever moved."""

from __future__ import annotations

import zipfile
from collections.abc import Iterable, Iterator, Sequence
from dataclasses import dataclass, field
from pathlib import Path

from openpyxl import load_workbook
from openpyxl.cell.rich_text import CellRichText, TextBlock

from audit.fleet.addresses import a1
from audit.intake.cells import CellValue
from audit.intake.celltext import cell_text
from audit.intake.opening import SheetGrid, open_workbook
from audit.refusal import Refusal

MARK = "work:"
STAMP = "stamp:"
FIRST_ROWS = 60
MOST_ROWS, MOST_COLUMNS = 200_000, 400
LARGE_BYTES = 3_000_000
_ZIPPED = (".xlsx", ".xlsm")


@dataclass(frozen=True, slots=True)
class ReturnedCell:
    """What stands in a cell; text that is struck through is left out and said."""

    value: CellValue
    struck: str = ""
    per_cent: bool = False
    """The cell shows a number as a per cent: 0.05 stands for 5 %."""

    def text(self) -> str:
        """Give the cell as text, '' for a blank one."""
        return "" if self.value is None else cell_text(self.value).strip()


BLANK = ReturnedCell(None)


@dataclass(frozen=True, slots=True)
class ReturnedRow:
    """One row that came back."""

    key: str
    place: str
    cells: dict[str, ReturnedCell]

    def cell(self, name: str) -> ReturnedCell:
        """Give a cell by the name of its column."""
        return self.cells.get(name, BLANK)

    def text(self, name: str) -> str:
        """Give a cell's text."""
        return self.cell(name).text()


@dataclass(frozen=True)
class ReturnedSheet:
    """Everything that came back."""

    file: str
    sha256: str
    rows: tuple[ReturnedRow, ...]
    stamps: tuple[str, ...]
    remarks: tuple[str, ...] = field(default=())

    def column(self, name: str) -> list[str]:
        """Give the texts of a column, for what they say together about decimal marks and dates."""
        return [row.text(name) for row in self.rows]


@dataclass
class _Sheet:
    name: str
    rows: Iterable[Sequence[ReturnedCell]]


def read_returned(path: Path) -> ReturnedSheet:
    """Read the hand-over sheet of a returned workbook.

    Raises
    ------
    Refusal
        If the file cannot be read, or holds no sheet with the hidden names of the hand-over.
    """
    opened = open_workbook(path)  # what is unsafe or broken is refused here
    if path.suffix.casefold() in _ZIPPED:
        sheets = _styled(path)
    else:
        sheets = iter([_Sheet(grid.name, _of_grid(grid)) for grid in opened.sheets])
    rows: list[ReturnedRow] = []
    stamps: list[str] = []
    remarks = list(opened.remarks)
    found = False
    for sheet in sheets:
        for columns, row in _marked_rows(sheet, stamps):
            found = True
            if row is not None:
                rows.append(row)
            elif "key" not in columns:
                remarks.append(f"sheet '{sheet.name}' has lost its column of keys: none of its rows can be known")
    if not found:
        raise Refusal(
            f"{path.name}: no sheet holds the hidden row of names that the hand-over sheet carries (cells that begin "
            f"with '{MARK}'). Give the workbook that the audit wrote, filled in, with its sheet 'Work'."
        )
    return ReturnedSheet(path.name, opened.sha256, tuple(rows), tuple(dict.fromkeys(stamps)), tuple(remarks))


def _marked_rows(sheet: _Sheet, stamps: list[str]) -> Iterator[tuple[dict[str, int], ReturnedRow | None]]:
    columns: dict[str, int] = {}
    for number, cells in enumerate(sheet.rows, start=1):
        if not columns:
            if number > FIRST_ROWS:
                return
            for cell in cells:
                if isinstance(cell.value, str) and cell.value.startswith(STAMP):
                    stamps.append(cell.value)
            columns = {
                cell.value.removeprefix(MARK): place
                for place, cell in enumerate(cells)
                if isinstance(cell.value, str) and cell.value.startswith(MARK)
            }
            if columns:
                yield columns, None
            continue
        key = cells[columns["key"]].text() if columns.get("key", MOST_COLUMNS) < len(cells) else ""
        if "|" not in key:
            continue
        named = {name: cells[place] for name, place in columns.items() if place < len(cells)}
        left = columns.get("as_left", 0)
        yield columns, ReturnedRow(key, f"{sheet.name}!{a1(number, left + 1)}", named)


def _styled(path: Path) -> Iterator[_Sheet]:
    """Read sheets with what is struck through, which grids of values do not tell of a part of a cell.

    Large files are streamed; a part struck through is then told only where the text stands in the shared strings,
    as the usual programs write it.
    """
    streamed = path.stat().st_size > LARGE_BYTES
    try:
        book = load_workbook(path, read_only=streamed, data_only=True, rich_text=True)
    except (ValueError, KeyError, TypeError, zipfile.BadZipFile) as error:
        raise Refusal(f"{path.name}: the workbook cannot be read ({error}). Save it anew as .xlsx.") from error
    try:
        for sheet in book.worksheets:
            if streamed:
                sheet.reset_dimensions()
            # a loaded sheet would grow to the bounds asked for; a streamed one does not know its size
            rows = MOST_ROWS if streamed else min(sheet.max_row, MOST_ROWS)
            columns = MOST_COLUMNS if streamed else min(sheet.max_column, MOST_COLUMNS)
            yield _Sheet(
                sheet.title,
                ([_cell(cell) for cell in row] for row in sheet.iter_rows(max_row=rows, max_col=columns)),
            )
    finally:
        book.close()


def _cell(cell: object) -> ReturnedCell:
    value = getattr(cell, "value", None)
    if value is None:
        return BLANK
    font = getattr(cell, "font", None)
    if isinstance(value, CellRichText):
        kept: list[str] = []
        gone: list[str] = []
        for part in value:
            struck = isinstance(part, TextBlock) and bool(part.font.strike)
            (gone if struck else kept).append(str(part))
        text = "".join(kept).strip()
        return ReturnedCell(text or None, "".join(gone).strip())
    if font is not None and font.strike:
        return ReturnedCell(None, str(value))
    per_cent = isinstance(value, (int, float)) and "%" in str(getattr(cell, "number_format", ""))
    return ReturnedCell(value, per_cent=per_cent)


def _of_grid(grid: SheetGrid) -> list[list[ReturnedCell]]:
    columns = range(1, min(grid.width, MOST_COLUMNS) + 1)
    struck = {column: grid.struck_in_column(column) for column in columns}
    percent = {column: grid.percent_in_column(column) for column in columns}
    return [
        [
            ReturnedCell(None, str(row[column - 1]))
            if struck[column][number] and row[column - 1] is not None
            else ReturnedCell(_blank(row[column - 1]), per_cent=bool(percent[column][number]))
            for column in columns
        ]
        for number, row in enumerate(grid.rows)
    ]


def _blank(value: CellValue) -> CellValue:
    return None if value == "" else value
