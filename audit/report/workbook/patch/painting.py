"""Fill cells of one worksheet: merged cells at their corner, blank cells in the format they inherit."""

from __future__ import annotations

from bisect import bisect_left
from collections.abc import Callable, Iterable, Mapping

from audit.fleet.addresses import a1
from audit.report.workbook.patch.cells import Painter
from audit.report.workbook.patch.ooxml import main
from audit.report.workbook.patch.references import cell_of, range_of, range_text
from audit.report.workbook.patch.styles import MarkedCells, Styles
from audit.report.workbook.patch.tags import Source
from audit.report.workbook.patch.worksheet import Worksheet

Cell = tuple[int, int]


def anchors(sheet: Worksheet, cells: Iterable[Cell]) -> dict[Cell, Cell]:
    """Corner that shows for each cell that lies elsewhere within merged ones."""
    found: dict[Cell, Cell] = {}
    ordered = sorted(set(cells))
    holder = sheet.child("mergeCells")
    for merged in holder.iterfind(main("mergeCell")) if holder is not None else ():
        corners = range_of(merged.get("ref", ""))
        if corners is None:
            continue
        first_row, first_column, last_row, last_column = corners
        start = bisect_left(ordered, (first_row, first_column))
        for row, column in ordered[start:]:
            if row > last_row:
                break
            if first_column <= column <= last_column and (row, column) != (first_row, first_column):
                found[row, column] = (first_row, first_column)
    return found


def paint_sheet(sheet: Worksheet, name: str, styles: Styles, fills: Mapping[Cell, str]) -> list[MarkedCells]:
    """Give cells their fills, and the sheet its new extent where cells were added; gives what to remember."""
    source = Source(sheet.data, sheet.prefix, sheet.nested)
    painter = Painter(source, styles.painted, _column_formats(sheet))
    sheet.rows = painter.paint(sheet.start, sheet.end, _by_row(fills))
    _extend(sheet, painter)
    return [
        MarkedCells(name, fills[cells[0]].upper(), styles.former_of[number], tuple(a1(*cell) for cell in cells))
        for number, cells in sorted(painter.painted.items())
    ]


def unpaint_sheet(sheet: Worksheet, styles: Styles, marked: Iterable[MarkedCells]) -> bool:
    """Give recorded cells back what they had, where they still have our fill; tell whether there were any."""
    groups = dict(enumerate(marked))
    keys = {
        cell: str(number)
        for number, group in groups.items()
        for cell in map(cell_of, group.addresses)
        if cell is not None
    }
    if not keys:
        return False

    def restore(cell_format: int, key: str) -> int:
        group = groups[int(key)]
        return styles.unpainted(cell_format, group.fill, group.former)

    painter = Painter(Source(sheet.data, sheet.prefix, sheet.nested), restore, None)
    sheet.rows = painter.paint(sheet.start, sheet.end, _by_row(keys))
    return True


def _by_row(fills: Mapping[Cell, str]) -> dict[int, dict[int, str]]:
    by_row: dict[int, dict[int, str]] = {}
    for (row, column), fill in fills.items():
        by_row.setdefault(row, {})[column] = fill
    return by_row


def _extend(sheet: Worksheet, painter: Painter) -> None:
    dimension = sheet.child("dimension")
    corners = range_of(dimension.get("ref", "")) if dimension is not None else None
    if dimension is None or corners is None or not painter.inserted:
        return
    rows = [row for row, _ in painter.inserted]
    columns = [column for _, column in painter.inserted]
    extent = range_text(
        min(corners[0], *rows), min(corners[1], *columns), max(corners[2], *rows), max(corners[3], *columns)
    )
    dimension.set("ref", extent)


def _column_formats(sheet: Worksheet) -> Callable[[int], int]:
    spans: list[tuple[int, int, int]] = []
    holder = sheet.child("cols")
    for column in holder.iterfind(main("col")) if holder is not None else ():
        numbers = [column.get(name, "") for name in ("min", "max", "style")]
        if all(number.isdigit() for number in numbers):
            first, last, style = map(int, numbers)
            spans.append((first, last, style))

    def column_format(column: int) -> int:
        return next((style for first, last, style in spans if first <= column <= last), 0)

    return column_format
