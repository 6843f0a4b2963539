"""Open any file that may hold a table."""

from __future__ import annotations

import hashlib
import re
from collections.abc import Callable
from functools import partial
from pathlib import Path

from audit.fleet.addresses import a1
from audit.intake.cells import CellValue
from audit.intake.opening.archive import SafeArchive
from audit.intake.opening.bounds import MAXIMUM_FILE_BYTES, MEGABYTE
from audit.intake.opening.calamine_reader import RawSheet, read_sheets
from audit.intake.opening.facts import SheetFacts, WorkbookFacts, check_extent, united
from audit.intake.opening.grids import SheetGrid, UnreadableWorkbook, WorkbookGrids
from audit.intake.opening.kinds import EXPECTED, FileKind, recognise
from audit.intake.opening.ods_scan import ods_facts
from audit.intake.opening.package import read_package
from audit.intake.opening.sheet_scan import scan_sheet
from audit.intake.opening.text_table import read_text_table
from audit.intake.opening.xls_scan import xls_facts
from audit.intake.opening.xlsb_scan import xlsb_facts

WORKSHEET = re.compile(rb"<(?:\w+:)?worksheet\b")
NOTHING_KNOWN = "error cells, formulas without a result, percentages and hidden rows are not known for this sheet"


def open_workbook(path: Path) -> WorkbookGrids:
    """Grids of all sheets of a file, or `UnreadableWorkbook` with one clear message."""
    data = _read_bytes(path)
    digest = hashlib.sha256(data).hexdigest()
    kind = recognise(path, data)
    if kind is FileKind.TEXT:
        grid, remarks = read_text_table(path, data)
        return WorkbookGrids(path, digest, [grid], remarks=remarks)
    facts = FACTS_OF_KIND[kind](path, data)
    check_extent(path, facts.sheets)
    sheets = [_grid(sheet, facts.sheets.get(sheet.name)) for sheet in read_sheets(path, data, facts.own_sheets)]
    return WorkbookGrids(path, digest, sheets, facts.date_1904, facts.remarks)


def _read_bytes(path: Path) -> bytes:
    try:
        size = path.stat().st_size
        if size > MAXIMUM_FILE_BYTES:
            raise UnreadableWorkbook(
                path,
                f"the file has {size / MEGABYTE:,.0f} MB",
                f"at most {MAXIMUM_FILE_BYTES // MEGABYTE} MB",
                "Take pictures and unused sheets out of a copy, and give the copy.",
            )
        return path.read_bytes()
    except OSError as error:
        raise UnreadableWorkbook(
            path,
            f"the file cannot be read ({error.strerror})",
            EXPECTED,
            "Close it in other programs and check that it exists and that you may read it.",
        ) from error


def _xlsx_facts(path: Path, data: bytes) -> WorkbookFacts:
    archive = SafeArchive(path, data)
    package = read_package(archive)
    sheets = {
        name: scan_sheet(path, name, part, partial(archive.chunks, part), package.formats)
        for name, part in package.sheets.items()
        if name not in package.own_sheets
    }
    for part in archive.unread(".xml"):
        # a reader may find its way to a sheet that the workbook does not list as one
        if WORKSHEET.search(next(archive.chunks(part), b"")[:8192].replace(b"\0", b"")):
            scan_sheet(path, part, part, partial(archive.chunks, part), package.formats)
    archive.check_the_rest()
    return WorkbookFacts(sheets, package.date_1904, package.own_sheets)


FACTS_OF_KIND: dict[FileKind, Callable[[Path, bytes], WorkbookFacts]] = {
    FileKind.XLSX: _xlsx_facts,
    FileKind.XLSB: xlsb_facts,
    FileKind.ODS: ods_facts,
    FileKind.XLS: xls_facts,
}


def _grid(sheet: RawSheet, facts: SheetFacts | None) -> SheetGrid:
    if facts is None:
        return SheetGrid(sheet.name, sheet.rows, hidden=sheet.hidden, merged=sheet.merged, notes=(NOTHING_KNOWN,))
    notes = list(facts.notes)
    if len(sheet.rows) < facts.last_row or (sheet.rows and len(sheet.rows[0]) < facts.last_column):
        notes.append(f"it holds cells as far as {a1(facts.last_row, facts.last_column)} that could not be read")
    for (row, column), marker in facts.markers.items():
        _set(sheet.rows, row, column, marker)
    return SheetGrid(
        sheet.name,
        sheet.rows,
        hidden=sheet.hidden,
        hidden_rows=frozenset(facts.hidden_rows),
        hidden_columns=frozenset(facts.hidden_columns),
        merged=sheet.merged or tuple(facts.merged),
        percent_cells=united(facts.percent),
        struck_cells=united(facts.struck),
        notes=tuple(notes),
    )


def _set(rows: list[list[CellValue]], row: int, column: int, value: CellValue) -> None:
    """Put a value into a grid, which grows where the reader saw nothing so far out."""
    width = max(len(rows[0]) if rows else 0, column)
    if rows and width > len(rows[0]):
        for cells in rows:
            cells.extend([None] * (width - len(cells)))
    while len(rows) < row:
        rows.append([None] * width)
    rows[row - 1][column - 1] = value
