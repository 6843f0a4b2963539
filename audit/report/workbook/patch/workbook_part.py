"""The workbook part: its sheets in order, where each one lies, defined names and what counts sheets by position."""

from __future__ import annotations

from collections.abc import Callable, Iterator
from dataclasses import dataclass

from lxml import etree

from audit.report.workbook.patch.markup import children, insert_in_order
from audit.report.workbook.patch.ooxml import (
    MAIN_STRICT,
    REL_OFFICE_DOCUMENT,
    REL_OFFICE_DOCUMENT_STRICT,
    REL_REVISION_HEADERS,
    REL_SIGNATURE_ORIGIN,
    REL_WORKSHEET,
    RELATIONSHIP_IDS,
    TYPE_MACRO_WORKBOOK,
    TYPE_WORKBOOK,
    TYPE_WORKSHEET,
    main,
    mains,
)
from audit.report.workbook.patch.package import Package
from audit.report.workbook.patch.refusal import CannotPatch
from audit.report.workbook.patch.relations import relate, relations, targets

_AFTER_NAMES = mains(
    "calcPr oleSize customWorkbookViews pivotCaches smartTagPr smartTagTypes webPublishing fileRecoveryPr "
    "webPublishObjects extLst"
)
_IDENTIFIER = f"{{{RELATIONSHIP_IDS}}}id"


@dataclass(frozen=True)
class SheetEntry:
    """A sheet as the workbook lists it; `part` is None for chart sheets and the like."""

    position: int
    name: str
    number: int
    part: str | None
    element: etree._Element


class WorkbookPart:
    """What a workbook says about its sheets."""

    def __init__(self, package: Package) -> None:
        self.package = package
        self.part = _find(package)
        root = package.look(self.part)
        if root.tag == f"{{{MAIN_STRICT}}}workbook":
            raise CannotPatch("the workbook is saved in the Strict variant of the format")
        if root.tag != main("workbook"):
            raise CannotPatch("the archive's main part is not a workbook")
        if package.content_type(self.part) not in {TYPE_WORKBOOK, TYPE_MACRO_WORKBOOK}:
            raise CannotPatch("the file's content is neither an .xlsx nor an .xlsm workbook")
        if targets(package, self.part, REL_REVISION_HEADERS):
            raise CannotPatch("the workbook is shared and keeps a history of revisions")
        if root.find(main("sheets")) is None or not list(self.sheets()):
            raise CannotPatch("the workbook lists no sheets")

    def sheets(self) -> Iterator[SheetEntry]:
        """Sheets in the order of their tabs."""
        holder = self.package.look(self.part).find(main("sheets"))
        by_identifier = {found.identifier: found for found in relations(self.package, self.part) if not found.external}
        for position, element in enumerate(children(holder) if holder is not None else ()):
            found = by_identifier.get(element.get(_IDENTIFIER, ""))
            is_worksheet = found is not None and found.kind == REL_WORKSHEET and self.package.has(found.target)
            number = element.get("sheetId", "")
            yield SheetEntry(
                position,
                element.get("name", ""),
                int(number) if number.isdigit() else 0,
                found.target if found is not None and is_worksheet else None,
                element,
            )

    def defined_names(self) -> list[etree._Element]:
        """Defined names, those of one sheet included."""
        holder = self.package.look(self.part).find(main("definedNames"))
        return [] if holder is None else [child for child in children(holder) if child.tag == main("definedName")]

    def add_defined_name(self, attributes: dict[str, str], refers_to: str) -> None:
        """Define a name."""
        root = self.package.edit(self.part)
        holder = root.find(main("definedNames"))
        if holder is None:
            holder = root.makeelement(main("definedNames"))
            insert_in_order(root, holder, _AFTER_NAMES)
        etree.SubElement(holder, main("definedName"), attributes).text = refers_to

    def insert_sheet(self, position: int, name: str, part: str, state: str | None) -> None:
        """List a worksheet that is in the package, at a position among the tabs."""
        package = self.package
        number = max(sheet.number for sheet in self.sheets()) + 1
        package.set_content_type(part, TYPE_WORKSHEET)
        identifier = relate(package, self.part, REL_WORKSHEET, part)
        holder = package.edit(self.part).find(main("sheets"))
        assert holder is not None
        new = holder.makeelement(main("sheet"), {"name": name, "sheetId": str(number)})
        if state is not None:
            new.set("state", state)
        new.set(_IDENTIFIER, identifier)
        before = [sheet.element for sheet in self.sheets() if sheet.position == position]
        if before:
            before[0].addprevious(new)
        else:
            holder.append(new)
        self._move_positions(lambda old: old + 1 if old >= position else old)

    def remove_sheet(self, sheet: SheetEntry) -> None:
        """Take a sheet off the list, with the names that are its own."""
        root = self.package.edit(self.part)
        position = sheet.position
        for name in self.defined_names():
            if name.get("localSheetId") == str(position):
                _detach(name)
        holder = root.find(main("definedNames"))
        if holder is not None and not len(holder):
            _detach(holder)
        _detach(sheet.element)
        self._move_positions(lambda old: old - 1 if old > position else old)
        self._keep_views_inside()

    def _move_positions(self, moved: Callable[[int], int]) -> None:
        """Correct whatever names a sheet by its position.

        The first tab in view stays a number: it then shows sheets that were put in front.
        """
        root = self.package.edit(self.part)
        for name in self.defined_names():
            _move(name, "localSheetId", moved)
        for view in root.iterfind(f"{main('bookViews')}/{main('workbookView')}"):
            if view.get("activeTab") is None and moved(0) > 0:
                view.set("activeTab", "0")
            _move(view, "activeTab", moved)

    def _keep_views_inside(self) -> None:
        """Let views start on a sheet that is there and can be seen."""
        sheets = list(self.sheets())
        seen = [sheet.position for sheet in sheets if sheet.element.get("state", "visible") == "visible"]
        root = self.package.edit(self.part)
        for view in root.iterfind(f"{main('bookViews')}/{main('workbookView')}"):
            active = view.get("activeTab", "0")
            if seen and active.isdigit() and int(active) not in seen:
                view.set("activeTab", str(min(seen, key=lambda position: abs(position - int(active)))))
            first = view.get("firstSheet", "0")
            if first.isdigit() and int(first) >= len(sheets):
                view.set("firstSheet", "0")


def _move(element: etree._Element, attribute: str, moved: Callable[[int], int]) -> None:
    old = element.get(attribute)
    if old is not None and old.isdigit() and moved(int(old)) != int(old):
        element.set(attribute, str(moved(int(old))))


def _detach(element: etree._Element) -> None:
    parent = element.getparent()
    if parent is not None:
        parent.remove(element)


def _find(package: Package) -> str:
    for found in relations(package):
        if found.kind == REL_SIGNATURE_ORIGIN:
            raise CannotPatch("the workbook is digitally signed; a changed copy would break the signature")
        if found.kind == REL_OFFICE_DOCUMENT_STRICT:
            raise CannotPatch("the workbook is saved in the Strict variant of the format")
    found_parts = [part for part in targets(package, "", REL_OFFICE_DOCUMENT) if package.has(part)]
    if not found_parts:
        raise CannotPatch("the archive holds no workbook")
    return found_parts[0]
