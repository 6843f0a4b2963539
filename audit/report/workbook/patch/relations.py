"""Relationships of a part: what it points at, by identifier and by type."""

from __future__ import annotations

import posixpath
from collections.abc import Iterator
from dataclasses import dataclass
from urllib.parse import unquote

from lxml import etree

from audit.report.workbook.patch.markup import children, new_root
from audit.report.workbook.patch.ooxml import PACKAGE_RELATIONSHIPS, TYPE_RELATIONSHIPS
from audit.report.workbook.patch.package import Package, relationships_part


@dataclass(frozen=True)
class Relation:
    """One relationship; `target` is a part's name, or an address outside the package."""

    identifier: str
    kind: str
    target: str
    external: bool


def relations(package: Package, part: str = "") -> Iterator[Relation]:
    """Relationships of a part, or of the package itself."""
    holder = relationships_part(part)
    if not package.has(holder):
        return
    for child in children(package.look(holder)):
        external = child.get("TargetMode") == "External"
        target = child.get("Target", "")
        yield Relation(
            child.get("Id", ""),
            child.get("Type", ""),
            target if external else _resolve(package, part, target),
            external,
        )


def targets(package: Package, part: str, kind: str) -> list[str]:
    """Parts at which a part points with relationships of one type."""
    return [found.target for found in relations(package, part) if found.kind == kind and not found.external]


def target_by_identifier(package: Package, part: str, identifier: str | None) -> str | None:
    """Part behind a relationship's identifier."""
    for found in relations(package, part):
        if found.identifier == identifier and not found.external:
            return found.target
    return None


def relate(package: Package, part: str, kind: str, target: str, external: bool = False) -> str:
    """Add a relationship and give its identifier."""
    holder = relationships_part(part)
    if package.has(holder):
        root = package.edit(holder)
    else:
        root = new_root(PACKAGE_RELATIONSHIPS, "Relationships")
        package.put(holder, root)
        package.set_default_type("rels", TYPE_RELATIONSHIPS)
    taken = {child.get("Id") for child in children(root)}
    number = len(taken) + 1
    while f"rId{number}" in taken:
        number += 1
    attributes = {"Id": f"rId{number}", "Type": kind, "Target": target if external else f"/{target}"}
    if external:
        attributes["TargetMode"] = "External"
    etree.SubElement(root, f"{{{PACKAGE_RELATIONSHIPS}}}Relationship", attributes)
    return f"rId{number}"


def unrelate(package: Package, part: str, target: str) -> None:
    """Remove a part's relationships to another part."""
    gone = {found.identifier for found in relations(package, part) if found.target == target}
    if gone:
        root = package.edit(relationships_part(part))
        for child in list(children(root)):
            if child.get("Id") in gone:
                root.remove(child)


def reachable(package: Package, start: str) -> set[str]:
    """All parts of the package that can be reached from a part, without that part."""
    found: set[str] = set()
    waiting = [start]
    while waiting:
        for relation in relations(package, waiting.pop()):
            if not relation.external and relation.target not in found and package.has(relation.target):
                found.add(relation.target)
                waiting.append(relation.target)
    return found - {start}


def _resolve(package: Package, part: str, target: str) -> str:
    """Name of the part that a relationship's target means; written as is where that finds it, else decoded."""
    target = target.partition("#")[0].replace("\\", "/")
    joined = posixpath.normpath(posixpath.join("/", posixpath.dirname(part), target)).lstrip("/")
    return joined if package.has(joined) else unquote(joined)
