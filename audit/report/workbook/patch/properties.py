"""Document properties: the list of sheets that the package keeps beside them, and a custom property of ours."""

from __future__ import annotations

from collections.abc import Sequence

from lxml import etree

from audit.report.workbook.patch.markup import children, new_root
from audit.report.workbook.patch.ooxml import (
    CUSTOM_PROPERTIES,
    EXTENDED_PROPERTIES,
    REL_CUSTOM_PROPERTIES,
    REL_EXTENDED_PROPERTIES,
    TYPE_CUSTOM_PROPERTIES,
    VALUE_TYPES,
)
from audit.report.workbook.patch.package import Package
from audit.report.workbook.patch.relations import relate, targets

_USER_PROPERTIES = "{D5CDD505-2E9C-101B-9397-08002B2CF9AE}"  # fixed by [MS-OLEPS] for properties that users add
_SMALLEST_PROPERTY_NUMBER = 2


def custom_property(package: Package, name: str) -> str | None:
    """Value of a custom document property as text."""
    for part in targets(package, "", REL_CUSTOM_PROPERTIES):
        if package.has(part):
            for child in children(package.look(part)):
                if child.get("name") == name:
                    return "".join(str(text) for text in child.itertext())
    return None


def set_custom_property(package: Package, name: str, value: str) -> None:
    """Set a custom document property, unless it says so already."""
    if custom_property(package, name) == value:
        return
    found = [part for part in targets(package, "", REL_CUSTOM_PROPERTIES) if package.has(part)]
    if found:
        root = package.edit(found[0])
    else:
        part = _free_custom_part(package)
        root = new_root(CUSTOM_PROPERTIES, "Properties", vt=VALUE_TYPES)
        package.put(part, root)
        package.set_content_type(part, TYPE_CUSTOM_PROPERTIES)
        relate(package, "", REL_CUSTOM_PROPERTIES, part)
    numbers = [_SMALLEST_PROPERTY_NUMBER - 1]
    for child in list(children(root)):
        if child.get("name") == name:
            root.remove(child)
        elif child.get("pid", "").isdigit():
            numbers.append(int(child.get("pid", "")))
    attributes = {"fmtid": _USER_PROPERTIES, "pid": str(max(numbers) + 1), "name": name}
    new = etree.SubElement(root, f"{{{CUSTOM_PROPERTIES}}}property", attributes)
    etree.SubElement(new, f"{{{VALUE_TYPES}}}lpwstr").text = value


def list_worksheets(package: Package, added: Sequence[str], removed: Sequence[str], first: bool) -> None:
    """Keep the titles in the extended properties in step; a list of another shape is left as it is."""
    found = [part for part in targets(package, "", REL_EXTENDED_PROPERTIES) if package.has(part)]
    if not found or not (added or removed):
        return
    root = package.look(found[0])
    count = _count_of_worksheets(root)
    titles = root.find(f"{{{EXTENDED_PROPERTIES}}}TitlesOfParts/{{{VALUE_TYPES}}}vector")
    if count is None or titles is None or not (count.text or "").isdigit():
        return
    number = int(count.text or "0")
    items = list(children(titles))
    if number > len(items):
        return
    package.edit(found[0])
    names = [item.text or "" for item in items[:number] if (item.text or "") not in removed]
    names = [*added, *names] if first else [*names, *added]
    for item in items[:number]:
        titles.remove(item)
    for position, name in enumerate(names):
        item = etree.Element(f"{{{VALUE_TYPES}}}lpstr")
        item.text = name
        titles.insert(position, item)
    titles.set("size", str(len(items) - number + len(names)))
    count.text = str(len(names))


def _free_custom_part(package: Package) -> str:
    usual = "docProps/custom.xml"
    return package.free_name("docProps/custom{}.xml") if package.has(usual) else usual


def _count_of_worksheets(root: etree._Element) -> etree._Element | None:
    """The count that stands first in the list of headings, where that heading is the worksheets'."""
    pairs = root.find(f"{{{EXTENDED_PROPERTIES}}}HeadingPairs/{{{VALUE_TYPES}}}vector")
    variants = list(children(pairs)) if pairs is not None else []
    if len(variants) < 2:
        return None
    return variants[1].find(f"{{{VALUE_TYPES}}}i4")
