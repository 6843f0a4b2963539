"""An open package: parts looked at, edited, added and removed in memory, then written out beside the original."""

from __future__ import annotations

import posixpath
from collections.abc import Iterator
from pathlib import Path

from lxml import etree

from audit.intake.opening.archive import SafeArchive
from audit.intake.opening.grids import UnreadableWorkbook
from audit.intake.opening.kinds import FileKind, recognise
from audit.report.workbook.patch.entries import read_entries
from audit.report.workbook.patch.markup import children, parse, serialise
from audit.report.workbook.patch.ooxml import CONTENT_TYPES
from audit.report.workbook.patch.refusal import CannotPatch
from audit.report.workbook.patch.writing import Content, write_archive

CONTENT_TYPES_PART = "[Content_Types].xml"


class Package:
    """Parts by their name without a leading slash; names match whatever their case, as the standard says."""

    def __init__(self, path: Path) -> None:
        data = path.read_bytes()
        try:
            if recognise(path, data) is not FileKind.XLSX:
                raise CannotPatch("only .xlsx and .xlsm workbooks can be annotated in a copy of themselves")
            self._archive = SafeArchive(path, data)
        except UnreadableWorkbook as error:
            raise CannotPatch(error.found) from error
        self._entries, self._comment = read_entries(data)
        self._stored_names: dict[str, str] = {}
        for entry in self._entries:
            name = entry.info.orig_filename
            known = self._stored_names.setdefault(_key(name), name)
            if known != name:
                raise CannotPatch(f"two parts of the archive have one name ({known})")
        self._changed: dict[str, Content] = {}
        self._removed: set[str] = set()
        self._roots: dict[str, etree._Element] = {}
        self._edited: dict[str, str] = {}

    def names(self) -> Iterator[str]:
        """Names of all parts that there are now."""
        for key, stored in self._stored_names.items():
            if key not in self._removed and not stored.endswith("/"):
                yield stored.replace("\\", "/")
        yield from (name for key, name in self._edited.items() if key not in self._stored_names)

    def has(self, name: str) -> bool:
        """Whether there is such a part now."""
        key = _key(name)
        return key not in self._removed and (key in self._stored_names or key in self._edited)

    def read(self, name: str) -> bytes:
        """Content of a part as it is now."""
        key = _key(name)
        if key in self._edited and key in self._roots:
            return serialise(self._roots[key])
        if key in self._changed:
            return b"".join(self._changed[key])
        if not self.has(name):
            raise CannotPatch(f"the part {name} is missing")
        try:
            return self._archive.read(self._stored_names[key])
        except UnreadableWorkbook as error:
            raise CannotPatch(error.found) from error

    def look(self, name: str) -> etree._Element:
        """Root of a part, not to be changed."""
        key = _key(name)
        if key not in self._roots:
            self._roots[key] = parse(self.read(name), name)
        return self._roots[key]

    def edit(self, name: str) -> etree._Element:
        """Root of a part that will be written anew with what the caller changes in it."""
        root = self.look(name)
        self._edited[_key(name)] = name
        self._changed.pop(_key(name), None)
        return root

    def put(self, name: str, content: Content | etree._Element) -> None:
        """Give a part new content, or add it."""
        key = _key(name)
        self._removed.discard(key)
        self._edited[key] = name
        if isinstance(content, etree._Element):
            self._roots[key] = content
            self._changed.pop(key, None)
        else:
            self._roots.pop(key, None)
            self._changed[key] = content

    def remove(self, name: str) -> None:
        """Take a part out, with its relationships and its entry among the content types."""
        for gone in (name, relationships_part(name)):
            key = _key(gone)
            if key in self._stored_names:
                self._removed.add(key)
            for known in (self._edited, self._roots, self._changed):
                known.pop(key, None)
        types = self.edit(CONTENT_TYPES_PART)
        for override in list(children(types)):
            if _key(override.get("PartName", "")) == _key(name):
                types.remove(override)

    def free_name(self, pattern: str) -> str:
        """Name with the smallest free number in place of `{}`."""
        number = 1
        while self.has(pattern.format(number)):
            number += 1
        return pattern.format(number)

    def content_type(self, name: str) -> str | None:
        """Content type of a part; None where none is declared."""
        suffix = name.rpartition(".")[2].lower()
        by_suffix = None
        for child in children(self.look(CONTENT_TYPES_PART)):
            if _key(child.get("PartName", "")) == _key(name):
                return child.get("ContentType")
            if child.get("Extension", "").lower() == suffix:
                by_suffix = child.get("ContentType")
        return by_suffix

    def set_content_type(self, name: str, content_type: str) -> None:
        """Declare the content type of a part where it is not declared so already."""
        if self.content_type(name) != content_type:
            etree.SubElement(
                self.edit(CONTENT_TYPES_PART),
                f"{{{CONTENT_TYPES}}}Override",
                {"PartName": f"/{name}", "ContentType": content_type},
            )

    def set_default_type(self, suffix: str, content_type: str) -> None:
        """Declare the content type that goes with a file name's suffix, unless one is declared."""
        types = self.look(CONTENT_TYPES_PART)
        if not any(child.get("Extension", "").lower() == suffix for child in children(types)):
            new = etree.Element(f"{{{CONTENT_TYPES}}}Default", {"Extension": suffix, "ContentType": content_type})
            self.edit(CONTENT_TYPES_PART).insert(0, new)

    def save(self, target: Path) -> None:
        """Write the package; untouched parts keep their packed bytes and their place."""
        changed: dict[str, Content] = {}
        added: dict[str, Content] = {}
        for key, name in self._edited.items():
            content = [serialise(self._roots[key])] if key in self._roots else self._changed[key]
            stored = self._stored_names.get(key)
            if stored is None:
                added[name] = content
            else:
                changed[stored] = content
        kept = [entry for entry in self._entries if _key(entry.info.orig_filename) not in self._removed]
        write_archive(target, kept, changed, added, self._comment)


def relationships_part(part: str) -> str:
    """Name of the part that holds the relationships of a part; of the package itself for ''.

    >>> relationships_part("xl/workbook.xml"), relationships_part("")
    ('xl/_rels/workbook.xml.rels', '_rels/.rels')
    """
    folder, name = posixpath.split(part)
    return posixpath.join(folder, "_rels", f"{name}.rels")


def _key(name: str) -> str:
    return name.replace("\\", "/").lstrip("/").lower()
