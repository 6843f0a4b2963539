"""Put sheets that were built apart into the user's workbook, with all that belongs to them."""

from __future__ import annotations

import posixpath
import re
from collections.abc import Mapping
from pathlib import Path

from lxml import etree

from audit.report.workbook.patch.graft_cells import CellImport
from audit.report.workbook.patch.graft_styles import StyleImport
from audit.report.workbook.patch.markup import new_root
from audit.report.workbook.patch.ooxml import (
    CHART,
    PACKAGE_RELATIONSHIPS,
    REL_DRAWING,
    REL_HYPERLINK,
    REL_SHARED_STRINGS,
    REL_STYLES,
    REL_TABLE,
    RELATIONSHIP_IDS,
    main,
)
from audit.report.workbook.patch.package import Package, relationships_part
from audit.report.workbook.patch.record import SHEET_MARK
from audit.report.workbook.patch.relations import relate, relations, targets
from audit.report.workbook.patch.saved_values import SavedValues
from audit.report.workbook.patch.sheet_names import free_names, renamed
from audit.report.workbook.patch.styles import Styles
from audit.report.workbook.patch.workbook_part import SheetEntry, WorkbookPart
from audit.report.workbook.patch.worksheet import Worksheet

MOST_LINKS = 65_530  # Excel's limit of hyperlinks in a sheet
_TYPE_CHART = "application/vnd.openxmlformats-officedocument.drawingml.chart+xml"
_TYPE_TABLE = "application/vnd.openxmlformats-officedocument.spreadsheetml.table+xml"
_REFUSED = ("legacyDrawing", "legacyDrawingHF", "oleObjects", "controls", "picture", "extLst", "sheetCalcPr")
_IDENTIFIER = f"{{{RELATIONSHIP_IDS}}}id"


def graft_report(
    book: WorkbookPart, styles: Styles, report: Path, first: bool, formulas: SavedValues | None = None
) -> dict[str, str]:
    """Put the report's sheets before or after the user's own; gives the name that each one got."""
    return _Graft(book, styles, Package(report), formulas or {}).run(first)


class _Graft:
    def __init__(self, book: WorkbookPart, styles: Styles, report: Package, formulas: SavedValues) -> None:
        self._book = book
        self._formulas = formulas
        self._target = book.package
        self._report = report
        self._report_book = WorkbookPart(report)
        strings = targets(report, self._report_book.part, REL_SHARED_STRINGS)
        report_styles = report.look(targets(report, self._report_book.part, REL_STYLES)[0])
        self._styles = StyleImport(report_styles, styles)
        self._cells = CellImport(self._styles, report.look(strings[0]) if strings else None)
        self._names: Mapping[str, str] = {}
        self._copied: dict[str, str] = {}

    def run(self, first: bool) -> dict[str, str]:
        sheets = list(self._report_book.sheets())
        present = list(self._book.sheets())
        names = free_names([sheet.name for sheet in sheets], [sheet.name for sheet in present])
        self._names = names
        start = 0 if first else len(present)
        for offset, sheet in enumerate(sheets):
            part = self._graft_sheet(sheet)
            self._book.insert_sheet(start + offset, names[sheet.name], part, sheet.element.get("state"))
        for offset in range(len(sheets)):
            mark = {"name": SHEET_MARK, "localSheetId": str(start + offset), "hidden": "1"}
            self._book.add_defined_name(mark, "TRUE")
        self._graft_defined_names(start)
        return names

    def _graft_sheet(self, entry: SheetEntry) -> str:
        if entry.part is None:
            raise ValueError(f"report sheet {entry.name!r} is not a worksheet")
        sheet = Worksheet(self._report, entry.part)
        root = sheet.root
        for local in _REFUSED:
            if sheet.child(local) is not None:
                raise ValueError(f"report sheet {entry.name!r} holds {local}, which cannot be carried over")
        part = self._target.free_name("xl/worksheets/sheet{}.xml")
        self._target.put(part, [b""])
        self._adapt_frame(root)
        self._graft_links(root, entry.part, part)
        self._graft_related(root, entry.part, part)
        rows = sheet.data[sheet.start : sheet.end]
        sheet.rows = [self._cells.rows(rows, self._formulas.get(entry.name), self._names)]
        self._target.put(part, sheet.content())
        return part

    def _adapt_frame(self, root: etree._Element) -> None:
        for element in root.iter(main("sheetPr")):
            element.attrib.pop("codeName", "")
        for element in root.iter(main("sheetView")):
            element.attrib.pop("tabSelected", "")
        for element in root.iter(main("pageSetup")):
            element.attrib.pop(_IDENTIFIER, "")
        for element in root.iter(main("col")):
            if element.get("style") is not None:
                element.set("style", str(self._styles.cell_format(int(element.get("style", "0")))))
        for element in root.iter(main("cfRule")):
            if element.get("dxfId") is not None:
                element.set("dxfId", str(self._styles.differential(int(element.get("dxfId", "0")))))
        for element in root.iter(main("formula"), main("formula1"), main("formula2")):
            element.text = renamed(element.text or "", self._names)

    def _graft_links(self, root: etree._Element, old_part: str, new_part: str) -> None:
        outside = {found.identifier: found for found in relations(self._report, old_part)}
        links = list(root.iter(main("hyperlink")))
        if len(links) > MOST_LINKS:
            raise ValueError(f"a report sheet has {len(links):,} links, and a sheet can have {MOST_LINKS:,}")
        known: dict[str, str] = {}
        for link in links:
            identifier = str(link.attrib.pop(_IDENTIFIER, ""))
            target = outside[identifier].target if identifier else ""
            if target.startswith("#"):
                link.set("location", target[1:])
            elif target:
                if target not in known:
                    known[target] = relate(self._target, new_part, REL_HYPERLINK, target, external=True)
                link.set(_IDENTIFIER, known[target])
                continue
            link.set("location", renamed(link.get("location", ""), self._names))

    def _graft_related(self, root: etree._Element, old_part: str, new_part: str) -> None:
        by_identifier = {found.identifier: found for found in relations(self._report, old_part)}
        for element in root.iter(main("drawing"), main("tablePart")):
            found = by_identifier[element.get(_IDENTIFIER, "")]
            kind = REL_DRAWING if element.tag == main("drawing") else REL_TABLE
            element.set(_IDENTIFIER, relate(self._target, new_part, kind, self._copy(found.target)))

    def _copy(self, part: str) -> str:
        """Copy a part and all that it points at under names that are free; gives the part's new name."""
        if part in self._copied:
            return self._copied[part]
        folder, name = posixpath.split(part)
        stem, dot, suffix = name.rpartition(".")
        new = self._target.free_name(posixpath.join(folder, re.sub(r"\d+$", "", stem) + "{}" + dot + suffix))
        self._copied[part] = new
        content_type = self._report.content_type(part)
        if content_type == _TYPE_TABLE:
            self._target.put(new, self._adapted_table(part))
        elif content_type == _TYPE_CHART:
            self._target.put(new, self._adapted_chart(part))
        else:
            self._target.put(new, [self._report.read(part)])
        if content_type is not None:
            self._target.set_content_type(new, content_type)
        self._copy_relations(part, new)
        return new

    def _copy_relations(self, part: str, new: str) -> None:
        found_relations = list(relations(self._report, part))
        if not found_relations:
            return
        root = new_root(PACKAGE_RELATIONSHIPS, "Relationships")
        for found in found_relations:
            attributes = {"Id": found.identifier, "Type": found.kind}
            if found.external:
                attributes |= {"Target": found.target, "TargetMode": "External"}
            else:
                attributes["Target"] = f"/{self._copy(found.target)}"
            etree.SubElement(root, f"{{{PACKAGE_RELATIONSHIPS}}}Relationship", attributes)
        self._target.put(relationships_part(new), root)

    def _adapted_chart(self, part: str) -> etree._Element:
        root = self._report.edit(part)
        for formula in root.iter(f"{{{CHART}}}f"):
            formula.text = renamed(formula.text or "", self._names)
        return root

    def _adapted_table(self, part: str) -> etree._Element:
        root = self._report.edit(part)
        taken, numbers = set(), [0]
        for name in self._target.names():
            if self._target.content_type(name) == _TYPE_TABLE and self._target.read(name):
                table = self._target.look(name)
                taken.add(table.get("displayName", "").casefold())
                numbers.append(int(table.get("id", "0")))
        taken |= {name.get("name", "").casefold() for name in self._book.defined_names()}
        wanted = root.get("displayName", "Table")
        free, number = wanted, 1
        while free.casefold() in taken:
            number += 1
            free = f"{wanted}_{number}"
        root.set("displayName", free)
        root.set("name", free)
        root.set("id", str(max(numbers) + 1))
        return root

    def _graft_defined_names(self, start: int) -> None:
        global_names = {
            name.get("name", "").casefold() for name in self._book.defined_names() if name.get("localSheetId") is None
        }
        for name in self._report_book.defined_names():
            attributes = {str(key): str(value) for key, value in name.attrib.items()}
            if "localSheetId" in attributes:
                attributes["localSheetId"] = str(start + int(attributes["localSheetId"]))
            elif attributes["name"].casefold() in global_names:
                raise ValueError(f"the workbook has a name {attributes['name']!r} of its own already")
            self._book.add_defined_name(attributes, renamed(name.text or "", self._names))
