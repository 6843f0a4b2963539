"""Formulas with the values that they have: a reader that does not calculate shows them all the same."""

from __future__ import annotations

import html
import re
from collections.abc import Mapping
from pathlib import Path

from openpyxl import Workbook

from audit.report.workbook.patch.package import Package
from audit.report.workbook.patch.tags import attribute, with_attribute
from audit.report.workbook.patch.text import escape_text
from audit.report.workbook.patch.workbook_part import WorkbookPart
from audit.report.workbook.patch.worksheet import Worksheet

SavedValue = str | float | bool
SavedValues = Mapping[str, Mapping[str, SavedValue]]
"""By sheet and cell address the value of each formula of a report."""

_FORMULA_CELL = re.compile(rb"<c((?:\s[^<>]*?)?)><f(?:\s[^<>]*)?>(.*?)</f>(?:<v\s*/>|<v>.*?</v>)?</c>", re.DOTALL)


def formula_cell(attributes: bytes, formula: str, value: SavedValue) -> bytes:
    """Give a cell with a formula and its value; the formula stands in no chain of calculation, which is optional.

    >>> formula_cell(b' r="A1"', "B1&C1", "ab")
    b'<c r="A1" t="str"><f>B1&amp;C1</f><v>ab</v></c>'
    """
    if isinstance(value, bool):
        kind, shown = b"b", str(int(value))
    elif isinstance(value, str):
        kind, shown = b"str", html.escape(escape_text(value), quote=False)
    else:
        kind, shown = b"n", repr(float(value))
    text = html.escape(formula, quote=False)
    return b"<c" + with_attribute(attributes, b"t", kind) + f"><f>{text}</f><v>{shown}</v></c>".encode()


def save_with_values(book: Workbook, path: Path, values: SavedValues) -> None:
    """Save a workbook of ours with the values of its formulas."""
    bare = path.with_name(f".{path.name}.bare.xlsx")
    try:
        book.save(bare)
        package = Package(bare)
        for entry in WorkbookPart(package).sheets():
            if entry.part is None or not values.get(entry.name):
                continue
            sheet = Worksheet(package, entry.part)
            sheet.rows = [_with_values(sheet.data[sheet.start : sheet.end], values[entry.name])]
            sheet.save()
        package.save(path)
    finally:
        bare.unlink(missing_ok=True)


def _with_values(rows: bytes, values: Mapping[str, SavedValue]) -> bytes:
    def replace(found: re.Match[bytes]) -> bytes:
        address = (attribute(found[1], b"r") or b"").decode()
        if address not in values:
            return found[0]
        return formula_cell(found[1], html.unescape(found[2].decode()), values[address])

    return _FORMULA_CELL.sub(replace, rows)
