"""Content of an .ods file for its extent and for what the reader does not tell."""

from __future__ import annotations

import re
from dataclasses import dataclass, field
from pathlib import Path

from lxml import etree

from audit.intake.cells import CellError, UncachedFormula
from audit.intake.opening.archive import SafeArchive
from audit.intake.opening.bounds import SHEET_COLUMNS
from audit.intake.opening.facts import Cell, SheetFacts, WorkbookFacts, check_reach, packed
from audit.intake.opening.kinds import damaged
from audit.intake.opening.markup import Stream, attribute, local_name

CELLS = ("table-cell", "covered-table-cell")
NOTE = "struck-through text is not known for .ods"
_ERROR_TEXT = re.compile(r"#(?:REF|DIV/0|VALUE|NAME|NUM|NULL)[!?]|#N/A|Err:\d{3}")


@dataclass
class _Row:
    """Cells of a row with content, until it is known how often the row is repeated."""

    full: list[int] = field(default_factory=list)
    percent: list[int] = field(default_factory=list)
    markers: dict[int, CellError | UncachedFormula] = field(default_factory=dict)
    merged: list[tuple[int, int, int]] = field(default_factory=list)
    last_column: int = 0


def ods_facts(path: Path, data: bytes) -> WorkbookFacts:
    """Facts of all sheets of an .ods file."""
    archive = SafeArchive(path, data)
    part = archive.find("content.xml")
    if part is None:
        raise damaged(path, "it has no content")
    try:
        facts = _Scan(path).run(Stream(archive.chunks(part)))
    except etree.XMLSyntaxError as error:
        raise damaged(path, f"part {part}: {error.msg}") from error
    archive.check_the_rest()
    return facts


def _repeats(element: etree._Element, what: str) -> int:
    value = attribute(element, f"number-{what}-repeated") or "1"
    return max(int(value), 1) if value.isascii() and value.isdigit() else 1


class _Scan:
    """The sheets of a document while its elements pass by."""

    def __init__(self, path: Path) -> None:
        self._path = path
        self._sheets: dict[str, SheetFacts] = {}
        self._name = ""
        self._facts = SheetFacts()
        self._row = _Row()
        self._rows = self._columns = self._column = 0
        self._depth = 0
        self._percent: list[Cell] = []
        self._date_1904 = False

    def run(self, stream: Stream) -> WorkbookFacts:
        """Go through the whole document."""
        for event, element in etree.iterparse(
            stream, events=("start", "end"), resolve_entities=False, no_network=True, load_dtd=False, huge_tree=False
        ):
            kind = local_name(element)
            if event == "start":
                self._start(kind, element)
            elif self._depth == 1:
                self._end(kind, element)
            if event == "end" and kind == "table":
                self._depth -= 1
        return WorkbookFacts(self._sheets, self._date_1904)

    def _start(self, kind: str, element: etree._Element) -> None:
        if kind == "table":
            self._depth += 1
            if self._depth == 1:
                self._name = attribute(element, "name") or ""
                self._facts = self._sheets[self._name] = SheetFacts(notes=[NOTE])
                self._rows = self._columns = 0
                self._percent = []
        elif kind == "table-row" and self._depth == 1:
            self._row = _Row()
            self._column = 0
        elif kind == "null-date":
            self._date_1904 = (attribute(element, "date-value") or "").startswith("1904")

    def _end(self, kind: str, element: etree._Element) -> None:
        if kind in CELLS:
            self._cell(element)
        elif kind == "table-column":
            repeats = _repeats(element, "columns")
            if attribute(element, "visibility") in ("collapse", "filter"):
                last = min(self._columns + repeats, SHEET_COLUMNS)
                self._facts.hidden_columns.update(range(self._columns + 1, last + 1))
            self._columns += repeats
        elif kind == "table-row":
            self._end_of_row(element)
            element.clear()
        elif kind == "table":
            self._facts.percent.append(packed(self._percent))
            element.clear()

    def _cell(self, element: etree._Element) -> None:
        first = self._column + 1
        repeats = _repeats(element, "columns")
        self._column += repeats
        formula = attribute(element, "formula")
        kind = element.get("{urn:oasis:names:tc:opendocument:xmlns:office:1.0}value-type")
        spans = [attribute(element, f"number-{what}-spanned") or "1" for what in ("rows", "columns")]
        if all(span.isascii() and span.isdigit() for span in spans) and spans != ["1", "1"]:
            self._row.merged.append((first, int(spans[0]), int(spans[1])))
        if kind is None and formula is None:
            return
        self._row.last_column = self._column
        self._facts.reach(self._rows + 1, self._column)
        check_reach(self._path, self._name, self._facts)
        columns = range(first, first + repeats)
        text = "".join("".join(map(str, child.itertext())) for child in element if local_name(child) == "p")
        calculated = element.get("{urn:org:documentfoundation:names:experimental:calc:xmlns:calcext:1.0}value-type")
        if calculated == "error" or (formula is not None and _ERROR_TEXT.fullmatch(text)):
            self._row.markers.update(dict.fromkeys(columns, CellError(text)))
        elif formula is not None and kind is None:
            self._row.markers.update(dict.fromkeys(columns, UncachedFormula()))
        if kind == "percentage":
            self._row.percent.extend(columns)

    def _end_of_row(self, element: etree._Element) -> None:
        first = self._rows + 1
        repeats = _repeats(element, "rows")
        self._rows += repeats
        hidden = attribute(element, "visibility") in ("collapse", "filter")
        if self._row.last_column:
            self._facts.reach(self._rows, self._row.last_column)
            check_reach(self._path, self._name, self._facts)
            for row in range(first, self._rows + 1):
                self._percent.extend((row, column) for column in self._row.percent)
                self._facts.markers.update({(row, column): mark for column, mark in self._row.markers.items()})
            if hidden:
                self._facts.hidden_rows.update(range(first, self._rows + 1))
        for column, rows, columns in self._row.merged:
            self._facts.merged.append((first, column, first + rows - 1, column + columns - 1))
