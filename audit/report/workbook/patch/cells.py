"""Give cells another format: the tag of a cell that is there changes, a cell or row that is not is put in order."""

from __future__ import annotations

import re
from collections.abc import Callable, Mapping

from audit.fleet.addresses import a1
from audit.report.workbook.patch.tags import (
    Source,
    Tag,
    attribute,
    cells,
    cells_by_address,
    rows,
    with_attribute,
)
from audit.report.workbook.patch.writing import Content

Fills = Mapping[int, Mapping[int, str]]
"""Fill by row and column."""

Restyle = Callable[[int, str], int]
"""From a cell's format and a fill to the same format with that fill."""


class Painter:
    """Gives cells of one sheet other formats.

    `painted` lists them by the format that they got, `inserted` those that the sheet did not have. Without a
    `column_format` to inherit, cells that the sheet does not have are passed over.
    """

    def __init__(self, source: Source, restyle: Restyle, column_format: Callable[[int], int] | None) -> None:
        self._source = source
        self._restyle = restyle
        self._column_format = column_format
        self.painted: dict[int, list[tuple[int, int]]] = {}
        self.inserted: list[tuple[int, int]] = []

    def paint(self, start: int, end: int, fills: Fills) -> Content:
        """The rows between two positions with the fills given."""
        view = memoryview(self._source.data)
        waiting = sorted(fills, reverse=True)
        pieces: list[bytes | memoryview] = []
        done = start
        for row in rows(self._source, start, end):
            while waiting and waiting[-1] < row.number:
                pieces += view[done : row.start], self._new_row(waiting[-1], fills[waiting.pop()])
                done = row.start
            if not waiting:
                break
            if waiting[-1] == row.number:
                pieces += view[done : row.start], self._painted_row(row, fills[waiting.pop()])
                done = row.end
        pieces.append(view[done:end])
        pieces += [self._new_row(number, fills[number]) for number in reversed(waiting)]
        return pieces

    def _painted_row(self, row: Tag, fills: Mapping[int, str]) -> bytes:
        data = self._source.data
        row_format = _row_format(row.attributes)
        waiting = sorted(fills, reverse=True)
        pieces: list[bytes] = []
        done = last_end = row.after
        outside = False
        for cell in cells_by_address(self._source, row, waiting[::-1]) or cells(self._source, row):
            while waiting and waiting[-1] < cell.number:
                pieces += data[done : cell.start], self._new_cell(row.number, waiting[-1], row_format, fills)
                waiting.pop()
                done, outside = cell.start, True
            if waiting and waiting[-1] == cell.number:
                pieces += data[done : cell.start], self._painted_cell(row.number, cell, fills[waiting.pop()])
                done = cell.after
            last_end = cell.end
        if waiting:
            last_end = max(done, last_end)
            pieces.append(data[done:last_end])
            pieces += [self._new_cell(row.number, column, row_format, fills) for column in reversed(waiting)]
            done, outside = last_end, True
        # 'spans' is only a hint of a row's width; a wrong one is worse than none
        attributes = with_attribute(row.attributes, b"spans", None) if outside else row.attributes
        tag = self._source.prefix + b"row"
        if row.empty:
            return b"".join([b"<", tag, attributes, b">", *pieces, b"</", tag, b">"])
        return b"".join([b"<", tag, attributes, b">", *pieces, data[done : row.end]])

    def _painted_cell(self, row: int, cell: Tag, fill: str) -> bytes:
        former = attribute(cell.attributes, b"s")
        new = self._restyle(int(former) if former and former.isdigit() else 0, fill)
        self.painted.setdefault(new, []).append((row, cell.number))
        attributes = with_attribute(cell.attributes, b"s", str(new).encode())
        return b"".join([b"<", self._source.prefix, b"c", attributes, b"/>" if cell.empty else b">"])

    def _new_row(self, number: int, fills: Mapping[int, str]) -> bytes:
        if self._column_format is None:
            return b""
        tag = self._source.prefix + b"row"
        inside = [self._new_cell(number, column, None, fills) for column in sorted(fills)]
        return b"".join([b"<", tag, b' r="%d">' % number, *inside, b"</", tag, b">"])

    def _new_cell(self, row: int, column: int, row_format: int | None, fills: Mapping[int, str]) -> bytes:
        if self._column_format is None:
            return b""
        self.inserted.append((row, column))
        former = self._column_format(column) if row_format is None else row_format
        new = self._restyle(former, fills[column])
        self.painted.setdefault(new, []).append((row, column))
        return b"<" + self._source.prefix + f'c r="{a1(row, column)}" s="{new}"/>'.encode()


def with_formats_replaced(data: bytes, prefix: bytes, replaced: Mapping[int, int]) -> bytes:
    """Rows whose cells and row tags point at other formats."""
    if not replaced:
        return data
    numbers = b"|".join(str(number).encode() for number in replaced)
    tag = re.compile(
        rb"(<" + re.escape(prefix) + rb"(?:c|row)(?=\s)(?:[^>\"']|\"[^\"]*\"|'[^']*')*?)"
        rb"(\ss\s*=\s*)[\"'](" + numbers + rb")[\"']"
    )

    def replace(found: re.Match[bytes]) -> bytes:
        new = replaced[int(found[3])]
        return found[1] + (b'%b"%d"' % (found[2], new) if new else b"")

    return tag.sub(replace, data)


def _row_format(attributes: bytes) -> int | None:
    if attribute(attributes, b"customFormat") not in {b"1", b"true"}:
        return None
    stated = attribute(attributes, b"s")
    return int(stated) if stated and stated.isdigit() else 0
