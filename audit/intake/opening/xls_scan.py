"""Records of an .xls stream for what the reader does not tell.

Layout of the records: [MS-XLS], the published specification of the format.
"""

from __future__ import annotations

import struct
from collections.abc import Iterator
from dataclasses import dataclass, field
from pathlib import Path

from audit.intake.cells import CellError
from audit.intake.opening.compound import CompoundFile, DamagedCompoundFile
from audit.intake.opening.facts import Cell, SheetFacts, WorkbookFacts, check_reach, packed
from audit.intake.opening.formats import BUILT_IN_PERCENT, shows_percent
from audit.intake.opening.kinds import damaged, encrypted

BEGIN, END, PASSWORD, DATE_SYSTEM, SHEET = 0x0809, 0x000A, 0x002F, 0x0022, 0x0085
EXTENT = 0x0200
FONT, FORMAT, CELL_FORMAT = 0x0031, 0x041E, 0x00E0
COLUMN_INFO, ROW, FORMULA, TRUTH_OR_ERROR, SEVERAL_NUMBERS = 0x007D, 0x0208, 0x0006, 0x0205, 0x00BD
ONE_CELL = frozenset({0x0203, 0x027E, 0x00FD, 0x0204, 0x00D6, FORMULA, TRUTH_OR_ERROR})
NEWEST_VERSION = 0x0600
LAST_ROW, LAST_COLUMN = 65_536, 256
ERROR_CODES = {
    0x00: "#NULL!",
    0x07: "#DIV/0!",
    0x0F: "#VALUE!",
    0x17: "#REF!",
    0x1D: "#NAME?",
    0x24: "#NUM!",
    0x2A: "#N/A",
    0x2B: "#GETTING_DATA",
}


@dataclass
class _Globals:
    """What stands before the sheets."""

    sheets: dict[int, str] = field(default_factory=dict)
    formats: dict[int, bool] = field(default_factory=lambda: dict.fromkeys(BUILT_IN_PERCENT, True))
    struck_fonts: set[int] = field(default_factory=set)
    fonts: int = 0
    cell_formats: list[tuple[int, int]] = field(default_factory=list)
    date_1904: bool = False
    newest: bool = True

    def percent(self, index: int) -> bool:
        """Tell whether a cell format shows a percentage."""
        return index < len(self.cell_formats) and self.formats.get(self.cell_formats[index][1], False)

    def struck(self, index: int) -> bool:
        """Tell whether a cell format strikes its text through."""
        return index < len(self.cell_formats) and self.cell_formats[index][0] in self.struck_fonts


def xls_facts(path: Path, data: bytes) -> WorkbookFacts:
    """Facts of all sheets of an .xls file."""
    try:
        file = CompoundFile(data)
        name = next(name for name in ("Workbook", "WORKBOOK", "Book", "BOOK") if name in file.names)
        stream = file.stream(name)
    except DamagedCompoundFile as error:
        raise damaged(path, str(error)) from error
    book = _Globals()
    sheets: list[_Sheet] = []
    try:
        sheet: _Sheet | None = None
        for offset, kind, content in _records(stream):
            if kind == BEGIN and offset in book.sheets:
                sheet = _Sheet(path, book.sheets[offset], book)
                sheets.append(sheet)
            elif kind == PASSWORD:
                raise encrypted(path)
            elif sheet is None:
                _note_global(kind, content, book)
            else:
                sheet.note(kind, content)
    except (struct.error, IndexError) as error:
        raise damaged(path, "a record is shorter than its kind needs") from error
    if len(sheets) != len(book.sheets):
        raise damaged(path, "a sheet does not begin where the workbook says")
    return WorkbookFacts({sheet.name: sheet.finish() for sheet in sheets}, book.date_1904)


def _records(stream: bytes) -> Iterator[tuple[int, int, bytes]]:
    offset, end = 0, len(stream)
    while offset + 4 <= end:
        kind, size = struct.unpack_from("<HH", stream, offset)
        yield offset, kind, stream[offset + 4 : offset + 4 + size]
        offset += 4 + size


def _note_global(kind: int, content: bytes, book: _Globals) -> None:
    if kind == BEGIN:
        book.newest = struct.unpack_from("<H", content)[0] == NEWEST_VERSION
    elif kind == DATE_SYSTEM:
        book.date_1904 = content[:1] == b"\1"
    elif kind == SHEET:
        (offset,) = struct.unpack_from("<I", content)
        book.sheets[offset] = _text(content[6:], 1, book.newest)
    elif kind == FORMAT:
        (number,) = struct.unpack_from("<H", content)
        book.formats[number] = shows_percent(_text(content[2:], 2 if book.newest else 1, book.newest))
    elif kind == FONT:
        # there is no font 4: the fifth font of a file has number 5
        number = book.fonts + (book.fonts >= 4)
        if struct.unpack_from("<H", content, 2)[0] & 0x0008:
            book.struck_fonts.add(number)
        book.fonts += 1
    elif kind == CELL_FORMAT:
        book.cell_formats.append(struct.unpack_from("<HH", content))


def _text(content: bytes, count_bytes: int, newest: bool) -> str:
    count = int.from_bytes(content[:count_bytes], "little")
    if not newest:
        return content[count_bytes : count_bytes + count].decode("cp1252", errors="replace")
    start = count_bytes + 1
    if content[count_bytes] & 1:
        return content[start : start + 2 * count].decode("utf-16-le", errors="replace")
    return content[start : start + count].decode("latin-1")


class _Sheet:
    """One sheet while its records pass by."""

    def __init__(self, path: Path, name: str, book: _Globals) -> None:
        self.name = name
        self.facts = SheetFacts()
        self._path = path
        self._book = book
        self._charts = 0
        self._percent: list[Cell] = []
        self._struck: list[Cell] = []

    def note(self, kind: int, content: bytes) -> None:
        """Note what one record tells; a chart inside the sheet holds records of its own, which are no cells."""
        if kind == BEGIN:
            self._charts += 1
        elif kind == END and self._charts:
            self._charts -= 1
        elif not self._charts:
            self._note(kind, content)

    def _note(self, kind: int, content: bytes) -> None:
        if kind in ONE_CELL:
            row, column, style = struct.unpack_from("<HHH", content)
            self._note_cell((row + 1, column + 1), style)
            code = _error_code(kind, content)
            if code is not None:
                self.facts.markers[(row + 1, column + 1)] = CellError(ERROR_CODES.get(code, "#ERROR"))
        elif kind == SEVERAL_NUMBERS:
            row, column = struct.unpack_from("<HH", content)
            for place in range(4, len(content) - 2, 6):
                (style,) = struct.unpack_from("<H", content, place)
                self._note_cell((row + 1, column + 1 + (place - 4) // 6), style)
        elif kind == EXTENT:
            self._check_extent(content)
        elif kind == ROW:
            row, flags = struct.unpack_from("<H10xH", content)
            if flags & 0x20:
                self.facts.hidden_rows.add(row + 1)
        elif kind == COLUMN_INFO:
            first, last, flags = struct.unpack_from("<HH4xH", content)
            if flags & 0x1:
                self.facts.hidden_columns.update(range(first + 1, min(last, 255) + 2))

    def finish(self) -> SheetFacts:
        """Facts of the sheet once all its records have passed by."""
        check_reach(self._path, self.name, self.facts)
        self.facts.percent.append(packed(self._percent))
        self.facts.struck.append(packed(self._struck))
        return self.facts

    def _check_extent(self, content: bytes) -> None:
        """Refuse an extent that no .xls sheet can have: the reader takes memory for all of it."""
        first_row, last_row, first_column, last_column = struct.unpack_from(
            "<IIHH" if self._book.newest else "<HHHH", content
        )
        if not (first_row <= last_row <= LAST_ROW and first_column <= last_column <= LAST_COLUMN):
            raise damaged(self._path, f"sheet '{self.name}' states an extent that no .xls sheet can have")

    def _note_cell(self, cell: Cell, style: int) -> None:
        self.facts.reach(*cell)
        if self._book.percent(style):
            self._percent.append(cell)
        if self._book.struck(style):
            self._struck.append(cell)


def _error_code(kind: int, content: bytes) -> int | None:
    if kind == TRUTH_OR_ERROR and content[7]:
        return content[6]
    if kind == FORMULA and content[12:14] == b"\xff\xff" and content[6] == 2:
        return content[8]
    return None
