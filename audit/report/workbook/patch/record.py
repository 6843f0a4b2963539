"""What a copy of ours says about itself, so that it is recognised and can be taken back to what it was.

A custom document property tells that the workbook is such a copy. A custom XML part, which spreadsheet programs
keep when they save, holds the names of our sheets, the authors of our notes and what cells were filled with
before. Each of our sheets carries a hidden name of its own, which goes with the sheet when it is renamed.
"""

from __future__ import annotations

import uuid
from dataclasses import dataclass

from lxml import etree

from audit.report.workbook.patch.markup import children, new_root
from audit.report.workbook.patch.ooxml import (
    CUSTOM_XML,
    REL_CUSTOM_XML,
    REL_CUSTOM_XML_PROPERTIES,
    TYPE_CUSTOM_XML_PROPERTIES,
)
from audit.report.workbook.patch.package import Package
from audit.report.workbook.patch.properties import custom_property, set_custom_property
from audit.report.workbook.patch.relations import relate, targets
from audit.report.workbook.patch.styles import Former, MarkedCells
from audit.report.workbook.patch.workbook_part import SheetEntry, WorkbookPart

PROPERTY = "Motor settings audit"
PROPERTY_VALUE = "annotated copy"
SHEET_MARK = "_motor_settings_audit"
_NAMESPACE = "urn:motor-settings-audit:annotated-copy:1"
_STORE = uuid.uuid5(uuid.NAMESPACE_URL, _NAMESPACE)


@dataclass(frozen=True)
class Record:
    """What is needed to take our work back."""

    sheets: tuple[str, ...] = ()
    authors: tuple[str, ...] = ()
    formers: tuple[Former, ...] = ()
    cells: tuple[MarkedCells, ...] = ()


def is_ours(package: Package) -> bool:
    """Whether the workbook is a copy that was annotated before."""
    return custom_property(package, PROPERTY) is not None


def marked_sheets(book: WorkbookPart) -> list[SheetEntry]:
    """Sheets that came from a report of ours, whatever they are called now."""
    marked = {name.get("localSheetId") for name in book.defined_names() if name.get("name") == SHEET_MARK}
    return [sheet for sheet in book.sheets() if str(sheet.position) in marked]


def read_record(book: WorkbookPart) -> Record:
    """The record of a copy; empty where there is none."""
    part = _part(book)
    if part is None:
        return Record()
    sheets, authors, formers, cells = [], [], [], []
    for child in children(book.package.look(part)):
        if child.tag == f"{{{_NAMESPACE}}}sheet":
            sheets.append(child.get("name", ""))
        elif child.tag == f"{{{_NAMESPACE}}}author":
            authors.append(child.get("name", ""))
        elif child.tag == f"{{{_NAMESPACE}}}former":
            formers.append(Former(child.text or "", child.get("apply-fill")))
        elif child.tag == f"{{{_NAMESPACE}}}cells" and child.get("former", "").isdigit():
            addresses = tuple((child.text or "").split())
            cells.append(
                MarkedCells(child.get("sheet", ""), child.get("fill", ""), int(child.get("former", "")), addresses)
            )
    return Record(tuple(sheets), tuple(authors), tuple(formers), tuple(cells))


def write_record(book: WorkbookPart, record: Record) -> None:
    """Put the record into the workbook, in place of an earlier one."""
    package = book.package
    root = new_root(_NAMESPACE, "record")
    for sheet in record.sheets:
        etree.SubElement(root, f"{{{_NAMESPACE}}}sheet", name=sheet)
    for author in record.authors:
        etree.SubElement(root, f"{{{_NAMESPACE}}}author", name=author)
    for former in record.formers:
        element = etree.SubElement(root, f"{{{_NAMESPACE}}}former")
        element.text = former.fill
        if former.apply_fill is not None:
            element.set("apply-fill", former.apply_fill)
    for group in record.cells:
        attributes = {"sheet": group.sheet, "fill": group.fill, "former": str(group.former)}
        etree.SubElement(root, f"{{{_NAMESPACE}}}cells", attributes).text = " ".join(group.addresses)
    part = _part(book)
    if part is not None:
        package.put(part, root)
    else:
        _add_part(book, root)
    set_custom_property(package, PROPERTY, PROPERTY_VALUE)


def _part(book: WorkbookPart) -> str | None:
    # some programs hang custom XML on the package instead of the workbook when they save
    for part in [found for holder in (book.part, "") for found in targets(book.package, holder, REL_CUSTOM_XML)]:
        if book.package.has(part) and _NAMESPACE.encode() in book.package.read(part):
            return part
    return None


def _add_part(book: WorkbookPart, root: etree._Element) -> None:
    package = book.package
    part = package.free_name("customXml/item{}.xml")
    package.put(part, root)
    package.set_content_type(part, "application/xml")
    relate(package, book.part, REL_CUSTOM_XML, part)
    properties_part = package.free_name("customXml/itemProps{}.xml")
    properties = etree.Element(
        f"{{{CUSTOM_XML}}}datastoreItem",
        {f"{{{CUSTOM_XML}}}itemID": "{" + str(_STORE).upper() + "}"},
        nsmap={"ds": CUSTOM_XML},
    )
    schemas = etree.SubElement(properties, f"{{{CUSTOM_XML}}}schemaRefs")
    etree.SubElement(schemas, f"{{{CUSTOM_XML}}}schemaRef", {f"{{{CUSTOM_XML}}}uri": _NAMESPACE})
    package.put(properties_part, properties)
    package.set_content_type(properties_part, TYPE_CUSTOM_XML_PROPERTIES)
    relate(package, part, REL_CUSTOM_XML_PROPERTIES, properties_part)
