"""One VML drawing: the shapes of notes in it, by cell. It need not be well-formed XML, and then stays as it is.

Spreadsheet programs write HTML into text boxes of form controls, unclosed tags included. Such a drawing is only
looked at through a lenient parser; what is new is put in front of its last tag, byte for byte.
"""

from __future__ import annotations

import re
from collections.abc import Iterable, Iterator

from lxml import etree

from audit.report.workbook.patch.markup import parse, parse_leniently, serialise
from audit.report.workbook.patch.ooxml import VML, VML_EXCEL, VML_OFFICE
from audit.report.workbook.patch.package import Package
from audit.report.workbook.patch.refusal import CannotPatch

SHAPES_PER_BLOCK = 1023
BLOCK_SIZE = 1024
OUR_SHAPE_OPENS = f'<v:shape xmlns:v="{VML}" xmlns:o="{VML_OFFICE}" xmlns:x="{VML_EXCEL}" '
TEXT_BOX_TYPE = "_x0000_t202"
_TYPE_OF_TEXT_BOXES = (
    f'<v:shapetype xmlns:v="{VML}" xmlns:o="{VML_OFFICE}" id="{TEXT_BOX_TYPE}" coordsize="21600,21600" o:spt="202" '
    'path="m,l,21600r21600,l21600,xe"><v:stroke joinstyle="miter"/>'
    '<v:path gradientshapeok="t" o:connecttype="rect"/></v:shapetype>'
)
_SHAPE_NUMBER = re.compile(rb"_x0000_s([0-9]{1,9})")
_ROOT_CLOSES = re.compile(rb"</(?:[\w.-]+:)?xml\s*>")
_BLOCKS = re.compile(rb"(<(?:[\w.-]+:)?idmap\b[^>]*?\sdata\s*=\s*[\"'])([0-9, ]*)")
_CELL_OF_OURS = re.compile(r"<x:Row>(\d+)</x:Row><x:Column>(\d+)</x:Column>")


class VmlDrawing:
    """A drawing that is there already, or a new one."""

    def __init__(self, package: Package, part: str, is_new: bool = False) -> None:
        self._package = package
        self.part = part
        self._additions: list[str] = []
        content = _empty(_free_block(package)) if is_new else package.read(part)
        self._raw = content
        self._root = _well_formed(content)
        if self._root is None and (b"\0" in content or not _ROOT_CLOSES.search(content)):
            raise CannotPatch(f"the drawing {part}, which holds the boxes of notes, is corrupt")
        facts = self._root if self._root is not None else parse_leniently(content)
        self._facts = facts if facts is not None else etree.Element("xml")
        self._taken = {int(found) for found in _SHAPE_NUMBER.findall(content)}
        self._own_blocks = _blocks_of(content)
        self._numbers = self._free_numbers()
        # prefixes declared on each shape again would double the size of a drawing of many notes
        declared = (
            self._root is not None and {"v": VML, "o": VML_OFFICE, "x": VML_EXCEL}.items() <= self._root.nsmap.items()
        )
        self._opening = "<v:shape " if declared else OUR_SHAPE_OPENS
        self.editable = self._root is not None

    def notes(self) -> dict[tuple[int, int], etree._Element]:
        """Shapes of notes by row and column, from 1."""
        found = {}
        for data in self._facts.iter(f"{{{VML_EXCEL}}}ClientData"):
            row, column = data.findtext(f"{{{VML_EXCEL}}}Row"), data.findtext(f"{{{VML_EXCEL}}}Column")
            shape = data.getparent()
            if data.get("ObjectType") != "Note" or shape is None or row is None or column is None:
                continue
            if row.strip().isdigit() and column.strip().isdigit():
                found[int(row) + 1, int(column) + 1] = shape
        return found

    def append(self, shape_rest: str) -> None:
        """Add a shape; the text given follows its opening, namespaces and number."""
        number = next(self._numbers)
        self._taken.add(number)
        self._additions.append(f'{self._opening}id="_x0000_s{number}" type="#{TEXT_BOX_TYPE}" {shape_rest}</v:shape>')

    def remove_notes(self, cells: set[tuple[int, int]]) -> None:
        """Take the shapes of notes out; from a drawing that is not well formed only those that we added."""
        if self._root is not None:
            for cell, shape in self.notes().items():
                parent = shape.getparent()
                if cell in cells and parent is not None:
                    parent.remove(shape)
            return
        ours = re.compile(re.escape(OUR_SHAPE_OPENS) + r".*?</v:shape>", re.DOTALL)

        def without(found: re.Match[str]) -> str:
            place = _CELL_OF_OURS.search(found[0])
            mine = place is not None and (int(place[1]) + 1, int(place[2]) + 1) in cells
            return "" if mine else found[0]

        self._raw = ours.sub(without, self._raw.decode("latin-1")).encode("latin-1")

    def is_empty(self) -> bool:
        """Whether nothing is drawn any more."""
        drawn = ("shape", "group", "rect", "roundrect", "oval", "line", "polyline", "image", "arc", "curve")
        return self._root is not None and not any(
            True for _ in self._root.iter(*(f"{{{VML}}}{local}" for local in drawn))
        )

    def save(self) -> None:
        """Put the drawing back into its package."""
        if (
            not any(kind.get("id") == TEXT_BOX_TYPE for kind in self._facts.iter(f"{{{VML}}}shapetype"))
            and self._additions
        ):
            self._additions.insert(0, _TYPE_OF_TEXT_BOXES)
        if self._root is not None:
            for blocks in self._root.iter(f"{{{VML_OFFICE}}}idmap"):
                blocks.set("data", self._blocks_text().decode())
                break
            self._root.text = self._root.text or ""
            self._raw = serialise(self._root)
            last = self._raw.rindex(b"</")
        else:
            self._raw = _BLOCKS.sub(rb"\g<1>" + self._blocks_text(), self._raw, count=1)
            last = [found.start() for found in _ROOT_CLOSES.finditer(self._raw)][-1]
        added = "".join(self._additions).encode("ascii")
        self._package.put(self.part, [self._raw[:last], added, self._raw[last:]])

    def _blocks_text(self) -> bytes:
        return ",".join(str(block) for block in self._own_blocks).encode()

    def _free_numbers(self) -> Iterator[int]:
        tried = 0
        while True:
            if tried == len(self._own_blocks):
                self._own_blocks.append(max(_free_block(self._package), max(self._own_blocks, default=0) + 1))
            first = self._own_blocks[tried] * BLOCK_SIZE + 1
            yield from (number for number in range(first, first + SHAPES_PER_BLOCK) if number not in self._taken)
            tried += 1


def _well_formed(content: bytes) -> etree._Element | None:
    try:
        return parse(content, "drawing")
    except CannotPatch:
        return None


def _blocks_of(content: bytes) -> list[int]:
    found = _BLOCKS.search(content)
    return [int(block) for block in found[2].split(b",") if block.strip().isdigit()] if found else []


def _free_block(package: Package) -> int:
    """First number above all blocks of shape numbers in the workbook's drawings."""
    highest = 0
    for name in package.names():
        if name.lower().endswith(".vml"):
            content = package.read(name)
            blocks: Iterable[int] = _blocks_of(content)
            shapes = (int(number) // BLOCK_SIZE for number in _SHAPE_NUMBER.findall(content))
            highest = max([highest, *blocks, *shapes])
    return highest + 1


def _empty(block: int) -> bytes:
    return (
        f'<xml xmlns:v="{VML}" xmlns:o="{VML_OFFICE}" xmlns:x="{VML_EXCEL}"><o:shapelayout v:ext="edit">'
        f'<o:idmap v:ext="edit" data="{block}"/></o:shapelayout>{_TYPE_OF_TEXT_BOXES}</xml>'
    ).encode()
