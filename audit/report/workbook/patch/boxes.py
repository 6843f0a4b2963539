"""The boxes in which notes are shown: large enough for their text, added and removed with their notes."""

from __future__ import annotations

import math
import re

from lxml import etree

from audit.report.workbook.patch.markup import insert_in_order
from audit.report.workbook.patch.ooxml import (
    LARGEST_COLUMN,
    LARGEST_ROW,
    REL_VML_DRAWING,
    RELATIONSHIP_IDS,
    TYPE_VML_DRAWING,
    VML_EXCEL,
    main,
    mains,
)
from audit.report.workbook.patch.package import Package
from audit.report.workbook.patch.relations import relate, target_by_identifier, unrelate
from audit.report.workbook.patch.vml import VmlDrawing
from audit.report.workbook.patch.worksheet import Worksheet

WIDTH_PT = 240.0
WIDTH_COLUMNS = 4
LINE_PT = 12.0
MARGIN_PT = 14.0
LARGEST_HEIGHT_PT = 1200.0
ROW_PT = 15.0  # default height of a row; where rows differ, the program sets the box right on opening
LETTER_PT = 5.2  # mean width of a letter at the size in which notes are written

_AFTER_LEGACY_DRAWING = [
    *mains("legacyDrawingHF drawingHF picture oleObjects controls webPublishItems tableParts extLst"),
    "{http://schemas.openxmlformats.org/markup-compatibility/2006}AlternateContent",
]
_MEASURE = r"(?<![\w-]){}\s*:\s*([0-9.]+)\s*(pt|px|in|cm|mm)?"
_POINTS = {"pt": 1.0, "px": 0.75, "in": 72.0, "cm": 72 / 2.54, "mm": 7.2 / 2.54, None: 0.75}


class Boxes:
    """The boxes of one sheet's notes."""

    def __init__(self, package: Package, sheet: Worksheet) -> None:
        part = _drawing_part(package, sheet)
        if part is None:
            part = package.free_name("xl/drawings/vmlDrawing{}.vml")
            self._drawing = VmlDrawing(package, part, is_new=True)
            package.put(part, [b""])
            package.set_default_type("vml", TYPE_VML_DRAWING)
            package.set_content_type(part, TYPE_VML_DRAWING)
            _point_at(sheet, relate(package, sheet.part, REL_VML_DRAWING, part))
        else:
            self._drawing = VmlDrawing(package, part)
        self._shapes = set(self._drawing.notes())
        self._existing = self._drawing.notes() if self._drawing.editable else {}

    def fit(self, cell: tuple[int, int], text: str) -> None:
        """Make the box of a cell's note large enough; add it where there is none."""
        self.ensure(cell, text)
        if cell in self._existing:
            _enlarge(self._existing[cell], text)

    def ensure(self, cell: tuple[int, int], text: str) -> None:
        """Add a box where a cell's note has none."""
        if cell not in self._shapes:
            self._shapes.add(cell)
            self._drawing.append(_new_box(cell, text))

    def save(self) -> None:
        """Put the drawing back into its package."""
        self._drawing.save()


def remove_boxes(package: Package, sheet: Worksheet, cells: set[tuple[int, int]], keep_part: bool) -> bool:
    """Remove the boxes of some cells, and the drawing with the last one; tell whether the sheet's frame changed."""
    part = _drawing_part(package, sheet)
    if part is None or not cells:
        return False
    drawing = VmlDrawing(package, part)
    drawing.remove_notes(cells)
    if keep_part or not drawing.is_empty():
        drawing.save()
        return False
    pointer = sheet.child("legacyDrawing")
    assert pointer is not None
    sheet.root.remove(pointer)
    unrelate(package, sheet.part, part)
    package.remove(part)
    return True


def _drawing_part(package: Package, sheet: Worksheet) -> str | None:
    pointer = sheet.child("legacyDrawing")
    if pointer is None:
        return None
    part = target_by_identifier(package, sheet.part, pointer.get(f"{{{RELATIONSHIP_IDS}}}id"))
    return part if part is not None and package.has(part) else None


def _point_at(sheet: Worksheet, identifier: str) -> None:
    pointer = sheet.child("legacyDrawing")
    if pointer is None:
        pointer = sheet.root.makeelement(main("legacyDrawing"))
        insert_in_order(sheet.root, pointer, _AFTER_LEGACY_DRAWING)
    pointer.set(f"{{{RELATIONSHIP_IDS}}}id", identifier)


def _needed_height_pt(text: str, width_pt: float) -> float:
    letters = max(int(width_pt / LETTER_PT), 10)
    lines = sum(max(math.ceil(len(line) / letters), 1) for line in text.split("\n"))
    return min(lines * LINE_PT + MARGIN_PT, LARGEST_HEIGHT_PT)


def _new_box(cell: tuple[int, int], text: str) -> str:
    row, column = cell
    height_pt = _needed_height_pt(text, WIDTH_PT)
    rows = math.ceil(height_pt / ROW_PT)
    top = max(min(row - 2, LARGEST_ROW - 1 - rows), 0)
    left = column if column + WIDTH_COLUMNS < LARGEST_COLUMN else column - 2 - WIDTH_COLUMNS
    anchor = f"{left}, 15, {top}, 10, {left + WIDTH_COLUMNS}, 15, {top + rows}, 4"
    return (
        f'style="position:absolute;width:{WIDTH_PT:g}pt;height:{height_pt:g}pt;z-index:1;visibility:hidden" '
        'fillcolor="#ffffe1" o:insetmode="auto"><v:fill color2="#ffffe1"/>'
        '<v:shadow on="t" color="black" obscured="t"/><v:path o:connecttype="none"/>'
        '<v:textbox style="mso-direction-alt:auto"><div style="text-align:left"/></v:textbox>'
        '<x:ClientData ObjectType="Note"><x:MoveWithCells/><x:SizeWithCells/>'
        f"<x:Anchor>{anchor}</x:Anchor><x:AutoFill>False</x:AutoFill>"
        f"<x:Row>{row - 1}</x:Row><x:Column>{column - 1}</x:Column></x:ClientData>"
    )


def _enlarge(shape: etree._Element, text: str) -> None:
    """Let a box grow downwards until its text has room; it never shrinks, so a second time changes nothing."""
    style = shape.get("style", "")
    anchor = shape.find(f"{{{VML_EXCEL}}}ClientData/{{{VML_EXCEL}}}Anchor")
    places = [place.strip() for place in (anchor.text or "").split(",")] if anchor is not None else []
    anchored = len(places) == 8 and all(place.lstrip("-").isdigit() for place in places)
    height_pt = _measure_pt(style, "height")
    if height_pt is None:
        height_pt = (int(places[6]) - int(places[2])) * ROW_PT if anchored else 0.0
    needed_pt = _needed_height_pt(text, _measure_pt(style, "width") or WIDTH_PT)
    if needed_pt <= height_pt:
        return
    height = re.compile(_MEASURE.format("height"))
    if height.search(style):
        style = height.sub(f"height:{needed_pt:g}pt", style, count=1)
    else:
        style = f"{style.rstrip(';')};height:{needed_pt:g}pt".lstrip(";")
    shape.set("style", style)
    if anchor is not None and anchored:
        rows = math.ceil((needed_pt - height_pt) / ROW_PT)
        places[6] = str(min(int(places[6]) + rows, LARGEST_ROW - 1))
        anchor.text = ", ".join(places)


def _measure_pt(style: str, name: str) -> float | None:
    found = re.search(_MEASURE.format(name), style)
    if found is None:
        return None
    try:
        return float(found[1]) * _POINTS[found[2]]
    except ValueError:
        return None
