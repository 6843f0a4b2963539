"""Open any file that may hold a table."""

from __future__ import annotations

import hashlib
from pathlib import Path

from audit.intake.opening.archive import SafeArchive
from audit.intake.opening.bounds import MAXIMUM_FILE_BYTES, MEGABYTE
from audit.intake.opening.calamine_reader import read_sheets
from audit.intake.opening.grids import SheetGrid, UnreadableWorkbook, WorkbookGrids
from audit.intake.opening.kinds import EXPECTED, FileKind, recognise
from audit.intake.opening.text_table import read_text_table


def open_workbook(path: Path) -> WorkbookGrids:
    """Grids of all sheets of a file, or `UnreadableWorkbook` with one clear message."""
    data = _read_bytes(path)
    digest = hashlib.sha256(data).hexdigest()
    kind = recognise(path, data)
    if kind is FileKind.TEXT:
        grid, remarks = read_text_table(path, data)
        return WorkbookGrids(path, digest, [grid], remarks=remarks)
    if kind in (FileKind.XLSX, FileKind.XLSB, FileKind.ODS):
        SafeArchive(path, data).check_markup()
    sheets = [
        SheetGrid(sheet.name, sheet.rows, hidden=sheet.hidden, merged=sheet.merged) for sheet in read_sheets(path, data)
    ]
    return WorkbookGrids(path, digest, sheets)


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
