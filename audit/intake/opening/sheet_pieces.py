"""The quick way through the XML of a sheet: large pieces, array operations, a few patterns."""

from __future__ import annotations

import re
from collections.abc import Iterator
from pathlib import Path

import numpy as np
from numpy.typing import NDArray

from audit.fleet.addresses import column_number, pack
from audit.intake.cells import CellError, UncachedFormula
from audit.intake.opening.bounds import MEGABYTE
from audit.intake.opening.facts import Cell, SheetFacts, check_reach
from audit.intake.opening.package import CellFormats
from audit.intake.opening.sheet_elements import note_columns

LONGEST_PIECE = 64 * MEGABYTE
ROW_END = b"</row>"
PADDING = b" " * 48
LONGEST_START = 32
_PREFIXED = re.compile(rb"<\w+:(?:worksheet|sheetData)\b")
_HIDDEN_ROW = re.compile(rb'<row\b([^>]*\bhidden="(?:1|true)"[^>]*)>')
_ROW_NUMBER = re.compile(rb'\br="(\d{1,7})"')
_COLUMN = re.compile(rb"<col\b([^>]*)>")
_ATTRIBUTE = re.compile(r'\b(\w+)="([^"]*)"')
_ERROR = re.compile(
    rb'<c r="([A-Z]{1,3})(\d{1,7})"[^>]*\bt="e"[^>]*>(?:<f\b(?:[^>]*/>|[^>]*>[^<]*</f>))?<v>([^<]*)</v>'
)
_WITHOUT_RESULT = re.compile(rb"<f\b(?:[^>]*/>|[^>]*>[^<]*</f>)(?!<v[^>/]*>[^<])(<v)?")
_CELL_START = re.compile(rb'<c r="([A-Z]{1,3})(\d{1,7})"([^>]*)>')


class UnusualSheet(Exception):
    """The quick way does not understand this sheet."""


def scan_pieces(path: Path, sheet: str, chunks: Iterator[bytes], formats: CellFormats) -> SheetFacts:
    facts = SheetFacts()
    waiting = b""
    before_rows = True
    for chunk in chunks:
        waiting += chunk
        end = waiting.rfind(ROW_END) + len(ROW_END)
        if end < len(ROW_END):
            if len(waiting) > LONGEST_PIECE:
                raise UnusualSheet
            continue
        _scan_piece(waiting[:end], facts, formats, before_rows)
        check_reach(path, sheet, facts)
        waiting = waiting[end:]
        before_rows = False
    _scan_piece(waiting, facts, formats, before_rows)
    check_reach(path, sheet, facts)
    return facts


def _scan_piece(piece: bytes, facts: SheetFacts, formats: CellFormats, before_rows: bool) -> None:
    if b"\0" in piece or b"<!" in piece:
        raise UnusualSheet
    if before_rows:
        if _PREFIXED.search(piece[:8192]):
            raise UnusualSheet
        for match in _COLUMN.finditer(piece.partition(b"<sheetData")[0]):
            note_columns(dict(_ATTRIBUTE.findall(match[1].decode("ascii", errors="replace"))), facts)
    _cells(piece, facts, formats)
    for match in _HIDDEN_ROW.finditer(piece):
        number = _ROW_NUMBER.search(match[1])
        if number is None:
            raise UnusualSheet
        facts.hidden_rows.add(int(number[1]))
    if b't="e"' in piece:
        for match in _ERROR.finditer(piece):
            facts.markers[_cell(match)] = CellError(match[3].decode("utf-8", errors="replace"))
    if b"<f" in piece:
        _formulas_without_result(piece, facts)


def _cell(match: re.Match[bytes]) -> Cell:
    return int(match[2]), column_number(match[1].decode("ascii"))


def _formulas_without_result(piece: bytes, facts: SheetFacts) -> None:
    for match in _WITHOUT_RESULT.finditer(piece):
        start = _CELL_START.match(piece, piece.rfind(b"<c ", 0, match.start()))
        if start is None:
            raise UnusualSheet
        # a formula may have the empty text as its saved result
        if not (match[1] and b't="str"' in start[3]):
            facts.markers.setdefault(_cell(start), UncachedFormula())


def _cells(piece: bytes, facts: SheetFacts, formats: CellFormats) -> None:
    """Reach and formats of the cells with content; empty ones with a format do not count for a reader."""
    data = np.frombuffer(piece + PADDING, dtype=np.uint8)
    opening = np.flatnonzero(data[: len(piece)] == ord("<"))
    after = data[opening + 2]
    is_cell = (data[opening + 1] == ord("c")) & ((after <= ord(" ")) | (after == ord(">")) | (after == ord("/")))
    cells = opening[is_cell]
    if not cells.size:
        return
    rows, columns, quote = _references(data, cells)
    closing = np.flatnonzero(data == ord(">"))
    following = np.searchsorted(closing, cells)
    if following[-1] >= closing.size:
        raise UnusualSheet
    end = closing[following]
    empty = (data[end - 1] == ord("/")) | ((data[end + 1] == ord("<")) & (data[end + 2] == ord("/")))
    full = np.flatnonzero(~empty)
    if not full.size:
        return
    facts.reach(int(rows[full].max()), int(columns[full].max()))
    if formats.percent or formats.struck:
        styles = _styles(data, quote[full], end[full])
        for wanted, found in ((formats.percent, facts.percent), (formats.struck, facts.struck)):
            marked = full[np.isin(styles, list(wanted))]
            if marked.size:
                found.append(pack(0, rows[marked], columns[marked]))


def _references(
    data: NDArray[np.uint8], cells: NDArray[np.intp]
) -> tuple[NDArray[np.int64], NDArray[np.int64], NDArray[np.intp]]:
    """Rows, columns and place of the closing quote of cells that begin with `<c r="A1"`."""
    if not _reads(data, cells + 3, b'r="').all():
        raise UnusualSheet
    column, position = _number(data, cells + 6, "A", "Z", 3)
    row, position = _number(data, position, "0", "9", 7)
    if not (column.all() and row.all() and (data[position] == ord('"')).all()):
        raise UnusualSheet
    return row, column, position


def _styles(data: NDArray[np.uint8], quote: NDArray[np.intp], end: NDArray[np.intp]) -> NDArray[np.int64]:
    """Index of the cell format, which stands right behind the reference or not at all; -1 for none."""
    styled = _reads(data, quote + 1, b' s="')
    others = np.flatnonzero(~styled & (data[quote + 1] == ord(" ")))
    for offset in range(4, LONGEST_START):
        place = np.minimum(quote[others] + offset, end[others])
        if _reads(data, place, b' s="').any():
            raise UnusualSheet
    number, position = _number(data, np.where(styled, quote + 5, len(data) - 1), "0", "9", 6)
    if not (data[position[styled]] == ord('"')).all():
        raise UnusualSheet
    return np.where(styled, number, -1)


def _reads(data: NDArray[np.uint8], places: NDArray[np.intp], text: bytes) -> NDArray[np.bool_]:
    """Tell at which places a text stands."""
    same = np.ones(places.size, dtype=bool)
    for index, code in enumerate(text):
        same &= data[np.minimum(places + index, len(data) - 1)] == code
    return same


def _number(
    data: NDArray[np.uint8], places: NDArray[np.intp], first: str, last: str, longest: int
) -> tuple[NDArray[np.int64], NDArray[np.intp]]:
    """Numbers in letters or digits that begin at places, and where they end."""
    base = ord(last) - ord(first) + 1
    # letters count from 1, digits from 0
    before_first = ord(first) - 1 if first == "A" else ord(first)
    number = np.zeros(places.size, dtype=np.int64)
    going = np.ones(places.size, dtype=bool)
    for _ in range(longest):
        code = data[places]
        going &= (code >= ord(first)) & (code <= ord(last))
        if not going.any():
            break
        number = np.where(going, number * base + code - before_first, number)
        places = places + going
    return number, places
