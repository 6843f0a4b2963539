"""Rows of a report sheet rewritten for the user's workbook: formats renumbered, strings in place.

A formula becomes the text that it is, unless the report declares it as its own and gives the value that it has.
"""

from __future__ import annotations

import html
import re
from collections.abc import Mapping, Sequence

from lxml import etree

from audit.report.workbook.patch.graft_styles import StyleImport
from audit.report.workbook.patch.markup import children
from audit.report.workbook.patch.ooxml import MAIN
from audit.report.workbook.patch.saved_values import SavedValue, formula_cell
from audit.report.workbook.patch.sheet_names import renamed
from audit.report.workbook.patch.tags import attribute, with_attribute
from audit.report.workbook.patch.text import could_become_formula, escape_literals

_ROW_OR_CELL = re.compile(
    rb"<row((?:\s[^<>]*)?)>|<c((?:\s[^<>]*?)?)(?:/>|>(.*?)</c>)",
    re.DOTALL,
)
_VALUE = re.compile(rb"<v>(.*?)</v>", re.DOTALL)
_FORMULA = re.compile(rb"<f(?:\s[^<>]*)?(?:/>|>(.*?)</f>)", re.DOTALL)
_TEXT = re.compile(rb"(<t(?:\s[^<>]*)?>)(.*?)(</t>)", re.DOTALL)


class CellImport:
    """Rewrites the rows of the report's sheets."""

    def __init__(self, styles: StyleImport, shared_strings: etree._Element | None) -> None:
        self._styles = styles
        self._strings: Sequence[bytes] = [
            _inline(item) for item in (children(shared_strings) if shared_strings is not None else ())
        ]
        self._formulas: Mapping[str, SavedValue] = {}
        self._names: Mapping[str, str] = {}

    def rows(
        self,
        data: bytes,
        formulas: Mapping[str, SavedValue] | None = None,
        names: Mapping[str, str] | None = None,
    ) -> bytes:
        """What lies between the tags of sheetData, as the user's workbook needs it.

        `formulas` are the cells whose formulas are carried, with their values; `names` the new names of sheets.
        """
        self._formulas, self._names = formulas or {}, names or {}
        return _ROW_OR_CELL.sub(self._replace, data)

    def _replace(self, found: re.Match[bytes]) -> bytes:
        if found[1] is not None:
            styled = attribute(found[1], b"s") is not None
            return b"<row" + self._restyled(found[1]) + b">" if styled else found[0]
        attributes, inside = found[2], found[3]
        if inside is None:
            return b"<c" + self._restyled(attributes) + b"/>"
        kind = attribute(attributes, b"t")
        formula = _FORMULA.search(inside)
        if formula is not None:
            address = (attribute(attributes, b"r") or b"").decode()
            if address in self._formulas:
                text = renamed(html.unescape((formula[1] or b"").decode()), self._names)
                return formula_cell(self._restyled(attributes), text, self._formulas[address])
            inside = b'<is><t xml:space="preserve">=' + (formula[1] or b"") + b"</t></is>"
        elif kind == b"s":
            value = _VALUE.search(inside)
            inside = self._strings[int(value[1])] if value else b"<is><t/></is>"
        elif kind != b"inlineStr":
            return b"<c" + self._restyled(attributes) + b">" + inside + b"</c>"
        inside = _TEXT.sub(_escaped, inside) if b"_x" in inside else inside
        first = _TEXT.search(inside)
        as_typed = first is not None and could_become_formula(html.unescape(first[2][:8].decode("utf-8", "ignore")))
        attributes = with_attribute(self._restyled(attributes, as_typed), b"t", b"inlineStr")
        return b"<c" + attributes + b">" + inside + b"</c>"

    def _restyled(self, attributes: bytes, as_typed: bool = False) -> bytes:
        number = self._styles.cell_format(int(attribute(attributes, b"s") or b"0"), as_typed)
        return with_attribute(attributes, b"s", str(number).encode())


def _inline(item: etree._Element) -> bytes:
    """Shared string as the content of a cell."""
    inside = etree.tostring(item, encoding="UTF-8", xml_declaration=False, with_tail=False)
    inside = inside.replace(f' xmlns="{MAIN}"'.encode(), b"")
    return re.sub(rb"^<si(\s[^>]*)?>|</si>$", lambda found: b"<is>" if found[0][1:2] != b"/" else b"</is>", inside)


def _escaped(found: re.Match[bytes]) -> bytes:
    return found[1] + escape_literals(found[2].decode()).encode() + found[3]
