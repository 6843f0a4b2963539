"""The patient way through the XML of a sheet: an XML parser, element by element."""

from __future__ import annotations

import re
from collections.abc import Iterator, Mapping
from pathlib import Path

from lxml import etree

from audit.fleet.addresses import column_number
from audit.intake.cells import CellError, UncachedFormula
from audit.intake.opening.bounds import SHEET_COLUMNS
from audit.intake.opening.facts import Cell, SheetFacts, check_reach, packed
from audit.intake.opening.kinds import damaged
from audit.intake.opening.markup import Stream, is_true, local_name
from audit.intake.opening.package import CellFormats

_REFERENCE = re.compile(r"([A-Z]{1,3})(\d{1,7})")


def scan_elements(path: Path, sheet: str, part: str, chunks: Iterator[bytes], formats: CellFormats) -> SheetFacts:
    facts = SheetFacts()
    percent: list[Cell] = []
    struck: list[Cell] = []
    row = column = 0
    try:
        for event, element in etree.iterparse(
            Stream(chunks),
            events=("start", "end"),
            resolve_entities=False,
            no_network=True,
            load_dtd=False,
            huge_tree=False,
        ):
            kind = local_name(element)
            if event == "start":
                if kind == "row":
                    number = element.get("r") or ""
                    row = int(number) if number.isdigit() else row + 1
                    column = 0
                    if is_true(element.get("hidden")):
                        facts.hidden_rows.add(row)
            elif kind == "col":
                note_columns({str(key): str(value) for key, value in element.attrib.items()}, facts)
            elif kind == "c":
                reference = _REFERENCE.fullmatch(element.get("r") or "")
                column = column_number(reference[1]) if reference else column + 1
                cell = (int(reference[2]) if reference else row, column)
                style = _note_cell(element, cell, facts)
                if style in formats.percent:
                    percent.append(cell)
                if style in formats.struck:
                    struck.append(cell)
            elif kind == "row":
                element.clear()
                while element.getprevious() is not None:
                    parent = element.getparent()
                    if parent is None:
                        break
                    del parent[0]
    except etree.XMLSyntaxError as error:
        raise damaged(path, f"part {part}: {error.msg}") from error
    check_reach(path, sheet, facts)
    facts.percent.append(packed(percent))
    facts.struck.append(packed(struck))
    return facts


def _note_cell(element: etree._Element, cell: Cell, facts: SheetFacts) -> int:
    """Note what a cell holds; give the index of its format, -1 for an empty cell or none."""
    children = {local_name(child): child for child in element}
    if not children:
        return -1
    facts.reach(*cell)
    kind, style = element.get("t"), element.get("s") or ""
    result = children.get("v")
    if kind == "e":
        facts.markers[cell] = CellError((result.text or "") if result is not None else "")
    elif "f" in children and (result is None or not (result.text or kind == "str")):
        facts.markers[cell] = UncachedFormula()
    return int(style) if style.isdigit() else -1


def note_columns(attributes: Mapping[str, str], facts: SheetFacts) -> None:
    first, last = attributes.get("min", ""), attributes.get("max", "")
    if is_true(attributes.get("hidden")) and first.isdigit() and last.isdigit():
        facts.hidden_columns.update(range(int(first), min(int(last), SHEET_COLUMNS) + 1))
