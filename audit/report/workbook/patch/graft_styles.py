"""Formats of the report's sheets carried over into the styles of the user's workbook."""

from __future__ import annotations

import copy

from lxml import etree

from audit.report.workbook.patch.markup import children
from audit.report.workbook.patch.ooxml import main
from audit.report.workbook.patch.styles import Styles

FIRST_OWN_NUMBER_FORMAT = 164  # lower numbers are built in (ISO/IEC 29500-1, 18.8.30)
_GROUPS = {"fontId": "fonts", "fillId": "fills", "borderId": "borders"}
_APPLIED = ("applyNumberFormat", "applyFont", "applyFill", "applyBorder", "applyAlignment", "applyProtection")


class StyleImport:
    """Gives the number that a format of the report has in the user's workbook."""

    def __init__(self, report: etree._Element, target: Styles) -> None:
        self._report = report
        self._target = target
        self._cell_formats: dict[tuple[int, bool], int] = {}
        self._differential: dict[int, int] = {}
        self._items: dict[str, list[etree._Element]] = {}

    def cell_format(self, number: int, as_typed: bool = False) -> int:
        """Number of a cell format; `as_typed` ones hold text that stays text when the cell is edited."""
        key = (number, as_typed)
        if key not in self._cell_formats:
            new = copy.deepcopy(self._group("cellXfs")[number])
            for attribute, group in _GROUPS.items():
                part = copy.deepcopy(self._group(group)[int(new.get(attribute, "0"))])
                if group == "fonts":
                    # the font stays the one that the report was designed with, whatever the workbook's theme
                    for scheme in part.findall(main("scheme")):
                        part.remove(scheme)
                new.set(attribute, str(self._target.add(group, part)))
            new.set("numFmtId", self._number_format(new.get("numFmtId", "0")))
            new.set("xfId", "0")
            for applied in _APPLIED:
                new.set(applied, "1")
            if as_typed:
                new.set("quotePrefix", "1")
            self._cell_formats[key] = self._target.add("cellXfs", new)
        return self._cell_formats[key]

    def differential(self, number: int) -> int:
        """Number of a format that a conditional format lays over a cell's own."""
        if number not in self._differential:
            new = copy.deepcopy(self._group("dxfs")[number])
            self._differential[number] = self._target.add("dxfs", new)
        return self._differential[number]

    def _group(self, group: str) -> list[etree._Element]:
        if group not in self._items:
            holder = self._report.find(main(group))
            self._items[group] = list(children(holder)) if holder is not None else []
        return self._items[group]

    def _number_format(self, number: str) -> str:
        for own in self._group("numFmts"):
            if own.get("numFmtId") == number:
                return self._own_number_format(own.get("formatCode", "General"))
        return number

    def _own_number_format(self, code: str) -> str:
        known = self._target.root.find(main("numFmts"))
        taken = {}
        for there in children(known) if known is not None else ():
            taken[there.get("numFmtId", "")] = there.get("formatCode")
        for number, there_code in taken.items():
            if there_code == code:
                return number
        numbers = [int(number) for number in taken if number.isdigit()]
        free = str(max([FIRST_OWN_NUMBER_FORMAT - 1, *numbers]) + 1)
        self._target.add("numFmts", etree.Element(main("numFmt"), {"numFmtId": free, "formatCode": code}))
        return free
