"""Values of the cells through python-calamine, after everything that could harm it was ruled out."""

from __future__ import annotations

import io
import os
import sys
from collections.abc import Collection, Iterator
from contextlib import contextmanager
from dataclasses import dataclass
from pathlib import Path

from python_calamine import CalamineError, CalamineSheet, CalamineWorkbook, SheetTypeEnum, SheetVisibleEnum

from audit.intake.cells import CellError, CellValue
from audit.intake.opening.kinds import damaged, encrypted

STANDARD_ERROR = 2
ENDLESS_TIME = CellError("a time beyond all limits in this row")


@dataclass(frozen=True)
class RawSheet:
    """A sheet as the reader gives it; blanks are None."""

    name: str
    rows: list[list[CellValue]]
    hidden: bool
    merged: tuple[tuple[int, int, int, int], ...]


def read_sheets(path: Path, data: bytes, skip: Collection[str] = ()) -> list[RawSheet]:
    """Worksheets of a workbook in their order, without those to skip and without chart sheets."""
    try:
        with quiet_panics():
            return _read_sheets(data, skip)
    except CalamineError as error:
        if "password" in str(error).lower():
            raise encrypted(path) from error
        raise damaged(path, str(error)) from error
    except OSError as error:
        # the bytes lie in memory: what ends early is a part of the workbook
        raise damaged(path, str(error)) from error
    except BaseException as error:
        # a panic of the reader arrives as an exception outside Exception that cannot be imported by name
        if type(error).__name__ != "PanicException":
            raise
        raise damaged(path, "its content contradicts itself") from error


@contextmanager
def quiet_panics() -> Iterator[None]:
    """Keep the reader's own outcry off the standard error stream; the refusal says what is needed."""
    try:
        kept = os.dup(STANDARD_ERROR)
    except OSError:
        yield  # there is no such stream
        return
    nowhere = os.open(os.devnull, os.O_WRONLY)
    try:
        sys.stderr.flush()
        os.dup2(nowhere, STANDARD_ERROR)
        yield
    finally:
        os.dup2(kept, STANDARD_ERROR)
        os.close(nowhere)
        os.close(kept)


def _read_sheets(data: bytes, skip: Collection[str]) -> list[RawSheet]:
    sheets = []
    with CalamineWorkbook.from_filelike(io.BytesIO(data)) as workbook:
        for metadata in workbook.sheets_metadata:
            if metadata.typ != SheetTypeEnum.WorkSheet or metadata.name in skip:
                continue
            sheet = workbook.get_sheet_by_name(metadata.name)
            rows = _rows(sheet)
            sheets.append(
                RawSheet(
                    name=metadata.name,
                    rows=rows,
                    hidden=metadata.visible != SheetVisibleEnum.Visible,
                    merged=tuple(
                        (first[0] + 1, first[1] + 1, last[0] + 1, last[1] + 1)
                        for first, last in sheet.merged_cell_ranges or ()
                    ),
                )
            )
    return sheets


def _rows(sheet: CalamineSheet) -> list[list[CellValue]]:
    try:
        return [
            [None if value == "" else value for value in row] if "" in row else list(row)
            for row in sheet.to_python(skip_empty_area=False)
        ]
    except OverflowError:
        return _rows_one_by_one(sheet)


def _rows_one_by_one(sheet: CalamineSheet) -> list[list[CellValue]]:
    """Rows of a sheet with a span of time that no program can show: its row is marked, the others are read."""
    height, width = (sheet.end[0] + 1, sheet.end[1] + 1) if sheet.end else (0, 0)
    rows: list[list[CellValue]] = []
    remaining = sheet.iter_rows()
    while True:
        try:
            values: list[CellValue] = [None if value == "" else value for value in next(remaining)]
        except StopIteration:
            break
        except OverflowError:
            values = [ENDLESS_TIME] * width
        # these rows may leave out empty columns, and empty rows at the top, that come before all content
        rows.append([None] * (width - len(values)) + values)
    above: list[list[CellValue]] = [[None] * width for _ in range(height - len(rows))]
    return above + rows
