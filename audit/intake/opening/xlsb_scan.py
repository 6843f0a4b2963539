"""Records of an .xlsb package for its extent, its error cells and its percentages.

Layout of the records: [MS-XLSB], the published specification of the format.
"""

from __future__ import annotations

import posixpath
import struct
from collections.abc import Iterator
from pathlib import Path

from audit.intake.cells import CellError
from audit.intake.opening.archive import SafeArchive
from audit.intake.opening.facts import Cell, SheetFacts, WorkbookFacts, check_reach, packed
from audit.intake.opening.formats import BUILT_IN_PERCENT, shows_percent
from audit.intake.opening.kinds import damaged
from audit.intake.opening.package import read_relations, workbook_part
from audit.intake.opening.xls_scan import ERROR_CODES

ROW, FIRST_CELL, LAST_CELL, ERROR, FORMULA_ERROR = 0, 2, 11, 3, 11
FORMAT, CELL_FORMAT, WORKBOOK_PROPERTIES, SHEET = 44, 47, 153, 156
CELL_FORMATS_BEGIN, CELL_FORMATS_END = 617, 618
NOTE = "hidden rows and columns, merged cells and struck-through text are not known for .xlsb"


def xlsb_facts(path: Path, data: bytes) -> WorkbookFacts:
    """Facts of all sheets of an .xlsb file."""
    archive = SafeArchive(path, data)
    workbook = workbook_part(archive, "xl/workbook.bin")
    folder, name = posixpath.split(workbook.replace("\\", "/"))
    relations = read_relations(archive, posixpath.join(folder, "_rels", name + ".rels"), folder)
    styles = next((part for kind, part in relations.values() if kind.endswith("/styles") and part), None)
    sheets: dict[str, SheetFacts] = {}
    date_1904 = False
    try:
        percent = _percent_formats(archive.read(styles)) if styles else frozenset()
        for record, content in _records(archive.read(workbook)):
            if record == WORKBOOK_PROPERTIES:
                date_1904 = bool(content[0] & 1)
            elif record == SHEET:
                relation, rest = _text(content[8:])
                sheet_name, _ = _text(rest)
                kind, part = relations.get(relation, ("", ""))
                if kind.endswith("/worksheet") and part:
                    sheets[sheet_name] = _scan(path, sheet_name, archive.read(part), percent)
        for part in archive.unread(".bin"):
            if "worksheets/" in part.replace("\\", "/").lower():
                _scan(path, part, archive.read(part), percent)
    except (struct.error, IndexError) as error:
        raise damaged(path, "a record is shorter than its kind needs") from error
    archive.check_the_rest()
    return WorkbookFacts(sheets, date_1904)


def _records(content: bytes) -> Iterator[tuple[int, bytes]]:
    offset, end = 0, len(content)
    while offset < end:
        kind = content[offset]
        offset += 1
        if kind & 0x80:
            kind = (kind & 0x7F) | (content[offset] << 7)
            offset += 1
        size = shift = 0
        while True:
            byte = content[offset]
            offset += 1
            size |= (byte & 0x7F) << shift
            shift += 7
            if not byte & 0x80 or shift == 28:
                break
        yield kind, content[offset : offset + size]
        offset += size


def _text(content: bytes) -> tuple[str, bytes]:
    """Text at the beginning of a content, and what follows it."""
    (count,) = struct.unpack_from("<I", content)
    end = 4 + 2 * count
    return content[4:end].decode("utf-16-le", errors="replace"), content[end:]


def _percent_formats(styles: bytes) -> frozenset[int]:
    formats = set(BUILT_IN_PERCENT)
    percent = set()
    index = -1
    for kind, content in _records(styles):
        if kind == FORMAT:
            (number,) = struct.unpack_from("<H", content)
            code, _ = _text(content[2:])
            if shows_percent(code):
                formats.add(number)
            else:
                formats.discard(number)
        elif kind == CELL_FORMATS_BEGIN:
            index = 0
        elif kind == CELL_FORMATS_END:
            break
        elif kind == CELL_FORMAT and index >= 0:
            if struct.unpack_from("<H", content, 2)[0] in formats:
                percent.add(index)
            index += 1
    return frozenset(percent)


def _scan(path: Path, sheet: str, content: bytes, percent: frozenset[int]) -> SheetFacts:
    facts = SheetFacts(notes=[NOTE])
    shown_as_percent: list[Cell] = []
    row = 0
    for kind, record in _records(content):
        if kind == ROW:
            row = struct.unpack_from("<I", record)[0] + 1
        elif FIRST_CELL <= kind <= LAST_CELL:
            column, style = struct.unpack_from("<II", record)
            cell = (row, column + 1)
            facts.reach(*cell)
            if style & 0xFFFFFF in percent:
                shown_as_percent.append(cell)
            if kind in (ERROR, FORMULA_ERROR):
                facts.markers[cell] = CellError(ERROR_CODES.get(record[8], "#ERROR"))
    check_reach(path, sheet, facts)
    facts.percent.append(packed(shown_as_percent))
    return facts
