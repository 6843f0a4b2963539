"""Notes of a sheet: our section below what stands there, new notes where there are none, threads left alone."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field

from lxml import etree

from audit.fleet.addresses import a1
from audit.report.workbook.patch.boxes import Boxes, remove_boxes
from audit.report.workbook.patch.markup import children, new_root
from audit.report.workbook.patch.ooxml import (
    MAIN,
    REL_COMMENTS,
    REL_THREADED_COMMENTS,
    TYPE_COMMENTS,
    XML,
    main,
)
from audit.report.workbook.patch.package import Package
from audit.report.workbook.patch.references import cell_of
from audit.report.workbook.patch.relations import relate, targets, unrelate
from audit.report.workbook.patch.text import escape_text, our_note, spans_of_our_note
from audit.report.workbook.patch.worksheet import Worksheet

THREAD_AUTHOR = "tc="
_FONT = '<rPr><sz val="9"/><color indexed="81"/><rFont val="Tahoma"/><family val="2"/></rPr>'

Cell = tuple[int, int]
"""Row and column, from 1."""


@dataclass
class NotesOutcome:
    """What became of the notes of a sheet."""

    added: int = 0
    extended: int = 0
    threaded: list[Cell] = field(default_factory=list)


def write_notes(package: Package, sheet: Worksheet, notes: Mapping[Cell, str], author: str) -> NotesOutcome:
    """Write a note's text to each cell; the sheet's frame learns where its notes are drawn."""
    outcome = NotesOutcome()
    threads = _threaded_cells(package, sheet.part)
    outcome.threaded = sorted(cell for cell in notes if cell in threads)
    notes = {cell: text for cell, text in sorted(notes.items()) if cell not in threads}
    if not notes:
        return outcome
    part = _comments_part(package, sheet.part)
    root = package.edit(part)
    holder = root.find(main("commentList"))
    if holder is None:
        holder = etree.SubElement(root, main("commentList"))
    known: dict[Cell | None, etree._Element] = {cell_of(child.get("ref", "")): child for child in children(holder)}
    author_number = _author_number(root, author)
    boxes = Boxes(package, sheet)
    for cell, text in notes.items():
        comment = known.get(cell)
        if comment is None:
            comment = etree.SubElement(holder, main("comment"), {"ref": a1(*cell), "authorId": str(author_number)})
            outcome.added += 1
        else:
            outcome.extended += 1
        _append(comment, text)
        known[cell] = comment
        boxes.fit(cell, note_text(comment))
    for place, comment in known.items():
        if place is not None:
            boxes.ensure(place, note_text(comment))
    boxes.save()
    return outcome


def take_back_notes(package: Package, sheet: Worksheet, authors: set[str]) -> bool:
    """Take our sections, and notes that held nothing else, out of a sheet; tell whether its frame changed."""
    frame_changed = False
    for part in targets(package, sheet.part, REL_COMMENTS):
        root = package.look(part)
        holder = root.find(main("commentList"))
        if holder is None:
            continue
        ours = [child for child in children(holder) if spans_of_our_note(note_text(child))]
        if not ours:
            continue
        package.edit(part)
        names = [author.text or "" for author in root.iterfind(f"{main('authors')}/{main('author')}")]
        gone: set[Cell] = set()
        for comment in ours:
            _cut(comment)
            number = comment.get("authorId", "")
            author = names[int(number)].strip() if number.isdigit() and int(number) < len(names) else ""
            cell = cell_of(comment.get("ref", ""))
            if not note_text(comment) and author in {*authors, ""} and cell is not None:
                gone.add(cell)
                holder.remove(comment)
        frame_changed |= remove_boxes(package, sheet, gone, keep_part=len(holder) > 0)
        if not len(holder):
            unrelate(package, sheet.part, part)
            package.remove(part)
    return frame_changed


def note_text(comment: etree._Element) -> str:
    """All text of a note, without phonetic readings."""
    return "".join(piece.text or "" for piece in _pieces(comment))


def _pieces(comment: etree._Element) -> list[etree._Element]:
    text = comment.find(main("text"))
    if text is None:
        return []
    pieces = []
    for child in children(text):
        if child.tag == main("t"):
            pieces.append(child)
        elif child.tag == main("r"):
            pieces += child.findall(main("t"))
    return pieces


def _append(comment: etree._Element, note: str) -> None:
    text = comment.find(main("text"))
    if text is None:
        text = etree.Element(main("text"))
        comment.insert(0, text)
    separator = "\n\n" if note_text(comment) else ""
    run = etree.fromstring(f'<r xmlns="{MAIN}">{_FONT}<t/></r>')
    written = run.find(main("t"))
    assert written is not None
    written.set(f"{{{XML}}}space", "preserve")
    written.text = escape_text(separator + our_note(note))
    position = 0
    for index, child in enumerate(text):
        if child.tag in {main("t"), main("r")}:
            position = index + 1
    text.insert(position, run)


def _cut(comment: etree._Element) -> None:
    """Delete our sections from a note's runs and drop the runs that are left empty by it."""
    pieces = _pieces(comment)
    spans = spans_of_our_note(note_text(comment))
    start = 0
    for piece in pieces:
        text = piece.text or ""
        kept, position = "", 0
        for first, last in spans:
            kept += text[position : max(first - start, position)]
            position = max(last - start, position)
        kept += text[position:]
        start += len(text)
        if kept == text:
            continue
        piece.text = kept
        holder = piece.getparent()
        if not kept and holder is not None and holder.tag == main("r"):
            parent = holder.getparent()
            if parent is not None:
                parent.remove(holder)


def _threaded_cells(package: Package, sheet_part: str) -> set[Cell]:
    found = set()
    for part in targets(package, sheet_part, REL_THREADED_COMMENTS):
        for child in children(package.look(part)):
            found.add(cell_of(child.get("ref", "")))
    for part in targets(package, sheet_part, REL_COMMENTS):
        root = package.look(part)
        names = [author.text or "" for author in root.iterfind(f"{main('authors')}/{main('author')}")]
        threads = {str(number) for number, name in enumerate(names) if name.startswith(THREAD_AUTHOR)}
        for comment in root.iterfind(f"{main('commentList')}/{main('comment')}"):
            if comment.get("authorId") in threads:
                found.add(cell_of(comment.get("ref", "")))
    return {cell for cell in found if cell is not None}


def _comments_part(package: Package, sheet_part: str) -> str:
    found = targets(package, sheet_part, REL_COMMENTS)
    if found and package.has(found[0]):
        return found[0]
    part = package.free_name("xl/comments{}.xml")
    root = new_root(MAIN, "comments")
    etree.SubElement(root, main("authors"))
    etree.SubElement(root, main("commentList"))
    package.put(part, root)
    package.set_content_type(part, TYPE_COMMENTS)
    relate(package, sheet_part, REL_COMMENTS, part)
    return part


def _author_number(root: etree._Element, author: str) -> int:
    holder = root.find(main("authors"))
    if holder is None:
        holder = etree.Element(main("authors"))
        root.insert(0, holder)
    names = [child.text or "" for child in children(holder)]
    author = escape_text(author)
    if author not in names:
        etree.SubElement(holder, main("author")).text = author
        names.append(author)
    return names.index(author)
