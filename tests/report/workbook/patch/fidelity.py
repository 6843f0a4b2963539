"""What an annotated copy may differ in from its original: the one list, and the comparison that holds to it."""

from __future__ import annotations

import copy
import re
import zipfile
from collections.abc import Callable, Iterable
from pathlib import Path

from lxml import etree
from openpyxl.utils import range_boundaries

from audit.report.workbook.patch import Mark, strip_our_note
from tests.report.workbook.patch.workbooks import MAIN, VML, VML_EXCEL

ALLOWED = {
    "content types": "entries are added",
    "relationships": "entries are added to the package, the workbook and marked sheets",
    "workbook": "sheets of the report, their names; the position at which a name or the active tab stands",
    "styles": "fonts, fills, borders, number formats, cell formats and conditional formats follow the old ones",
    "worksheet": "format of marked cells, marked cells that were missing, extent, pointer to the notes' boxes",
    "comments": "our section follows a note's own runs; new notes and an author follow the old ones",
    "vml": "boxes of new notes, larger boxes of notes with our section, blocks of shape numbers",
    "extended properties": "titles of the report's sheets",
    "custom properties": "our own property",
}
"""Differences that an annotation may make, by kind of part. Any other part is the original's, byte for byte."""

_KINDS = (
    (re.compile(r"\[content_types\]\.xml$", re.I), "content types"),
    (re.compile(r"(^|/)_rels/(\.rels|workbook\d*\.xml\.rels|sheet\d*\.xml\.rels)$", re.I), "relationships"),
    (re.compile(r"(^|/)workbook\d*\.xml$", re.I), "workbook"),
    (re.compile(r"(^|/)styles\d*\.xml$", re.I), "styles"),
    (re.compile(r"(^|/)sheet\d*\.xml$", re.I), "worksheet"),
    (re.compile(r"(^|/)comments\d*\.xml$", re.I), "comments"),
    (re.compile(r"vmldrawing\d*\.vml$", re.I), "vml"),
    (re.compile(r"^docprops/app\.xml$", re.I), "extended properties"),
    (re.compile(r"^docprops/custom\.xml$", re.I), "custom properties"),
)


def compare(original: Path, annotated: Path, marks: Iterable[Mark], added_in_front: int) -> dict[str, int]:
    """Hold a copy against its original part by part; counts of parts that are the same and that differ as allowed."""
    marked = {(mark.row, mark.column) for mark in marks}
    counts = {"same": 0, "changed as allowed": 0}
    with zipfile.ZipFile(original) as old, zipfile.ZipFile(annotated) as new:
        kept = set(old.namelist())
        assert [name for name in new.namelist() if name in kept] == old.namelist(), "parts lost or out of order"
        for name in old.namelist():
            before, after = old.getinfo(name), new.getinfo(name)
            content, copied = old.read(name), new.read(name)
            if content == copied:
                assert before.compress_type == after.compress_type, name
                assert before.date_time == after.date_time, name
                assert before.compress_size == after.compress_size, name
                counts["same"] += 1
                continue
            kind = _kind(name)
            assert kind in ALLOWED, f"{name} must not change"
            _COMPARE[kind](content, copied, marked, added_in_front)
            counts["changed as allowed"] += 1
    return counts


Cells = set[tuple[int, int]]


def _kind(name: str) -> str:
    plain = name.replace("\\", "/").lstrip("/")
    return next((kind for pattern, kind in _KINDS if pattern.search(plain)), "another part")


def _tree(content: bytes) -> etree._Element:
    parser = etree.XMLParser(remove_comments=True, remove_pis=True, resolve_entities=False, huge_tree=True)
    return etree.fromstring(content, parser)


def _spelt(element: etree._Element) -> bytes:
    """One spelling for equal elements, wherever their prefixes are declared."""
    clean = copy.deepcopy(element)
    clean.tail = None
    holder = etree.Element("holder")
    holder.append(clean)
    etree.cleanup_namespaces(holder)
    return re.sub(rb">\s+<", b"><", etree.tostring(clean, method="c14n", exclusive=True))


def _children_kept(old: etree._Element, new: etree._Element) -> list[etree._Element]:
    """Check that the old children stand first and unchanged; gives the new ones."""
    before, after = list(old), list(new)
    assert [_spelt(child) for child in before] == [_spelt(child) for child in after[: len(before)]]
    return after[len(before) :]


def _content_types(old: bytes, new: bytes, marked: Cells, front: int) -> None:
    after = [_spelt(child) for child in _tree(new)]
    positions = [after.index(_spelt(child)) for child in _tree(old)]
    assert positions == sorted(positions)


def _relationships(old: bytes, new: bytes, marked: Cells, front: int) -> None:
    added = _children_kept(_tree(old), _tree(new))
    identifiers = [child.get("Id") for child in _tree(new)]
    assert added
    assert len(set(identifiers)) == len(identifiers)


def _workbook(old: bytes, new: bytes, marked: Cells, front: int) -> None:
    before, after = _tree(old), _tree(new)
    old_sheets, new_sheets = before.find("{*}sheets"), after.find("{*}sheets")
    assert old_sheets is not None
    assert new_sheets is not None
    added = len(new_sheets) - len(old_sheets)
    ours = list(new_sheets)[:added] if front else list(new_sheets)[len(old_sheets) :]
    positions = {str(list(new_sheets).index(sheet)) for sheet in ours}
    for sheet in ours:
        new_sheets.remove(sheet)
    names = after.find("{*}definedNames")
    for name in list(names) if names is not None else ():
        if name.get("localSheetId") in positions:
            names.remove(name)
        elif name.get("localSheetId"):
            name.set("localSheetId", str(int(name.get("localSheetId")) - front))
    if names is not None and not len(names) and before.find("{*}definedNames") is None:
        after.remove(names)
    for view, original in zip(after.iterfind("{*}bookViews/*"), before.iterfind("{*}bookViews/*"), strict=True):
        assert int(view.get("activeTab", "0")) == int(original.get("activeTab", "0")) + front
        _copy_attribute(original, view, "activeTab")
    assert _spelt(before) == _spelt(after)


def _styles(old: bytes, new: bytes, marked: Cells, front: int) -> None:
    before, after = _tree(old), _tree(new)
    for group in ("numFmts", "fonts", "fills", "borders", "cellXfs", "dxfs"):
        one, other = before.find(f"{{*}}{group}"), after.find(f"{{*}}{group}")
        if one is None:
            if other is not None:
                after.remove(other)
            continue
        assert other is not None
        assert other.get("count") in {None, str(len(other))}
        for child in _children_kept(one, other):
            other.remove(child)
        _copy_attribute(one, other, "count")
    assert _spelt(before) == _spelt(after)


def _worksheet(old: bytes, new: bytes, marked: Cells, front: int) -> None:
    before, after = _tree(old), _tree(new)
    marked = {_corner_that_shows(before, cell) for cell in marked}
    old_cells, new_cells = _cells(before), _cells(after)
    assert set(old_cells) <= set(new_cells)
    assert set(new_cells) - set(old_cells) <= marked
    for place, cell in new_cells.items():
        if place not in old_cells:
            assert not len(cell)
            _remove(cell)
        elif place in marked:
            _copy_attribute(old_cells[place], cell, "s")
    old_rows = _rows(before)
    for number, row in _rows(after).items():
        if number not in old_rows:
            assert not len(row)
            _remove(row)
        else:
            _copy_attribute(old_rows[number], row, "spans")
    for local in ("dimension", "legacyDrawing"):
        one, other = before.find(f"{{*}}{local}"), after.find(f"{{*}}{local}")
        if one is None and other is not None:
            assert local == "legacyDrawing"
            after.remove(other)
        elif one is not None and other is not None and local == "dimension":
            other.set("ref", one.get("ref", ""))
    assert _spelt(before) == _spelt(after)


def _comments(old: bytes, new: bytes, marked: Cells, front: int) -> None:
    before, after = _tree(old), _tree(new)
    old_authors, new_authors = before.find("{*}authors"), after.find("{*}authors")
    assert old_authors is not None
    assert new_authors is not None
    assert len(_children_kept(old_authors, new_authors)) <= 1
    after_by_cell = {comment.get("ref"): comment for comment in after.iter(f"{{{MAIN}}}comment")}
    for comment in before.iter(f"{{{MAIN}}}comment"):
        same = copy.deepcopy(after_by_cell[comment.get("ref")])
        text, own = same.find("{*}text"), comment.find("{*}text")
        if text is not None and own is not None and len(text) > len(own):
            runs = text.findall("{*}r")
            assert strip_our_note("x" + "".join(runs[-1].itertext())) == "x"
            text.remove(runs[-1])
        assert _spelt(same) == _spelt(comment)


def _vml(old: bytes, new: bytes, marked: Cells, front: int) -> None:
    try:
        before = etree.fromstring(old)
    except etree.XMLSyntaxError:
        last_tag = old.rindex(b"</")
        assert new.startswith(old[:last_tag])
        assert new.endswith(old[last_tag:])
        return
    after = etree.fromstring(new)
    shape = f"{{{VML}}}shape"
    new_shapes = {found.get("id"): found for found in after.iter(shape)}
    assert len(new_shapes) == len(list(after.iter(shape))), "two shapes have one number"
    for found in before.iter(shape):
        same = new_shapes[found.get("id")]
        for attribute in ("style",):
            trimmed = [re.sub(r"height:[^;]*", "", each.get(attribute, "")) for each in (found, same)]
            assert trimmed[0] == trimmed[1]
            _copy_attribute(found, same, attribute)
        anchors = [each.find(f"{{{VML_EXCEL}}}ClientData/{{{VML_EXCEL}}}Anchor") for each in (found, same)]
        if anchors[0] is not None and anchors[1] is not None:
            places = [re.split(r",\s*", (anchor.text or "").strip()) for anchor in anchors if anchor is not None]
            assert places[0][:6] == places[1][:6]
            anchors[1].text = anchors[0].text
        assert _spelt(found) == _spelt(same)


def _extended_properties(old: bytes, new: bytes, marked: Cells, front: int) -> None:
    before, after = _tree(old), _tree(new)
    for tree in (before, after):
        for local in ("HeadingPairs", "TitlesOfParts"):
            part = tree.find(f"{{*}}{local}")
            if local == "TitlesOfParts" and part is not None:
                assert part[0].get("size") == str(len(part[0]))
            if part is not None:
                tree.remove(part)
    assert _spelt(before) == _spelt(after)


def _custom_properties(old: bytes, new: bytes, marked: Cells, front: int) -> None:
    assert len(_children_kept(_tree(old), _tree(new))) == 1


def _cells(root: etree._Element) -> dict[tuple[int, int], etree._Element]:
    found = {}
    for number, row in _rows(root).items():
        column = 0
        for cell in row.iterfind("{*}c"):
            letters = re.match("[A-Za-z]*", cell.get("r", ""))
            stated = 0
            for letter in letters[0].upper() if letters else "":
                stated = stated * 26 + ord(letter) - 64
            column = stated or column + 1
            found[number, column] = cell
    return found


def _corner_that_shows(root: etree._Element, cell: tuple[int, int]) -> tuple[int, int]:
    for merged in root.iterfind("{*}mergeCells/{*}mergeCell"):
        first_column, first_row, last_column, last_row = range_boundaries(merged.get("ref", ""))
        if first_row <= cell[0] <= last_row and first_column <= cell[1] <= last_column:
            return first_row, first_column
    return cell


def _rows(root: etree._Element) -> dict[int, etree._Element]:
    found, number = {}, 0
    for row in root.iterfind("{*}sheetData/{*}row"):
        first = row.find("{*}c")
        stated = row.get("r") or (re.sub(r"\D", "", first.get("r", "")) if first is not None else "")
        number = int(stated) if stated else number + 1
        found.setdefault(number, row)
    return found


def _remove(element: etree._Element) -> None:
    parent = element.getparent()
    assert parent is not None
    parent.remove(element)


def _copy_attribute(source: etree._Element, target: etree._Element, name: str) -> None:
    value = source.get(name)
    if value is not None:
        target.set(name, value)
    elif name in target.attrib:
        del target.attrib[name]


_COMPARE: dict[str, Callable[[bytes, bytes, Cells, int], None]] = {
    "content types": _content_types,
    "relationships": _relationships,
    "workbook": _workbook,
    "styles": _styles,
    "worksheet": _worksheet,
    "comments": _comments,
    "vml": _vml,
    "extended properties": _extended_properties,
    "custom properties": _custom_properties,
}
