"""A worksheet part as two pieces: the frame, parsed, and what lies between the tags of sheetData, as bytes.

A sheet of a hundred thousand rows costs gigabytes as a tree. Its rows therefore stay bytes, of which only
tags that must change are replaced; everything around them is a small tree. Searching bytes for tags is exact
once comments, CDATA and other encodings are out of the way: '<' then begins a tag wherever it stands.
"""

from __future__ import annotations

import codecs
import re

from lxml import etree

from audit.report.workbook.patch.markup import children, is_plain_utf8, parse, serialise
from audit.report.workbook.patch.ooxml import main
from audit.report.workbook.patch.package import Package
from audit.report.workbook.patch.refusal import CannotPatch
from audit.report.workbook.patch.tags import INSIDE_TAG
from audit.report.workbook.patch.writing import Content

_ROOT_TAG = re.compile(rb"<(?:([A-Za-z_][\w.-]*):)?worksheet(?=[\s/>])")
_PLACEHOLDER = "rows-7c1e94d2-stand-here"


class Worksheet:
    """One worksheet of a package.

    `prefix` stands before the names of its elements, colon included. `data[start:end]` are the rows as they
    came, `rows` what will be written in their place. `nested` says that cells or rows may hold elements of
    foreign namespaces, so that a tag's name alone does not tell what it is.
    """

    def __init__(self, package: Package, part: str) -> None:
        self.part = part
        self._package = package
        data = package.read(part)
        if not is_plain_utf8(data) or _has_peculiar_markup(data):
            data = _plainly_written(parse(data, part))
        self.data = data.removeprefix(codecs.BOM_UTF8)
        root_tag = _ROOT_TAG.search(self.data)
        if root_tag is None:
            raise CannotPatch(f"the part {part} is not a worksheet")
        self.prefix = root_tag[1] + b":" if root_tag[1] else b""
        self.start, self.end = self._find_rows()
        self.rows: Content = [memoryview(self.data)[self.start : self.end]]
        self.nested = any(self.data.find(word, self.start, self.end) >= 0 for word in (b"xmlns", b"extLst"))
        self.root = parse(self.data[: self.start] + self.data[self.end :], part)
        if self.root.tag != main("worksheet"):
            raise CannotPatch(f"the part {part} is not a worksheet of the transitional standard")
        if [child.tag for child in children(self.root)].count(main("sheetData")) != 1:
            raise CannotPatch(f"the part {part} does not have its rows in one place")

    def child(self, local: str) -> etree._Element | None:
        """Child of the root with a name."""
        return self.root.find(main(local))

    def save(self) -> None:
        """Put the worksheet back into its package."""
        self._package.put(self.part, self.content())

    def content(self) -> Content:
        """The part in pieces."""
        sheet_data = self.root.find(main("sheetData"))
        assert sheet_data is not None
        sheet_data.text = _PLACEHOLDER
        before, found, after = serialise(self.root).partition(_PLACEHOLDER.encode())
        assert found
        sheet_data.text = None
        return [before, *self.rows, after]

    def _find_rows(self) -> tuple[int, int]:
        name = re.escape(self.prefix + b"sheetData")
        opening = re.compile(rb"<" + name + rb"(?=[\s/>])" + INSIDE_TAG + rb">").search(self.data)
        if opening is None:
            raise CannotPatch(f"the part {self.part} has no rows element")
        if opening[0].endswith(b"/>"):
            return opening.end(), opening.end()
        closing = re.compile(rb"</" + name + rb"\s*>").search(self.data, opening.end())
        if closing is None:
            raise CannotPatch(f"the part {self.part} is cut short")
        return opening.end(), closing.start()


def _has_peculiar_markup(data: bytes) -> bool:
    """Whether there are comments, CDATA, a document type or processing instructions past the declaration."""
    return b"<!" in data or data.find(b"<?", data.find(b"?>")) >= 0


def _plainly_written(root: etree._Element) -> bytes:
    """The part in UTF-8 without comments, processing instructions and CDATA sections."""
    plain = etree.fromstring(
        etree.tostring(root),
        etree.XMLParser(resolve_entities=False, no_network=True, huge_tree=True, remove_comments=True, remove_pis=True),
    )
    return serialise(plain)
