"""The parts of an .xlsx or .xlsm package that say how its sheets are to be understood."""

from __future__ import annotations

import posixpath
from collections.abc import Iterator
from dataclasses import dataclass

from lxml import etree

from audit.intake.opening.archive import SafeArchive
from audit.intake.opening.bounds import MAXIMUM_SHEETS, MEGABYTE
from audit.intake.opening.formats import BUILT_IN_PERCENT, shows_percent
from audit.intake.opening.grids import UnreadableWorkbook
from audit.intake.opening.kinds import damaged
from audit.intake.opening.markup import attribute, is_true, local_name, parse_part

ANNOTATED_COPY_PROPERTY = "Motor settings audit"
"""Custom document property by which an annotated copy is recognised."""

OWN_SHEET_MARK = "_motor_settings_audit"
"""Hidden name of each sheet that an audit added."""

MAXIMUM_SMALL_PART_BYTES = 64 * MEGABYTE


@dataclass(frozen=True)
class CellFormats:
    """Cell formats by their index that show a percentage, or text struck through."""

    percent: frozenset[int] = frozenset()
    struck: frozenset[int] = frozenset()


@dataclass(frozen=True)
class Package:
    """What the small parts say: worksheets by name and their parts, formats, date system, own sheets."""

    sheets: dict[str, str]
    formats: CellFormats
    date_1904: bool
    own_sheets: frozenset[str]


def read_package(archive: SafeArchive) -> Package:
    """Read the small parts of a package."""
    main_part = workbook_part(archive, "xl/workbook.xml")
    workbook = _parse(archive, main_part)
    folder, name = posixpath.split(main_part.replace("\\", "/"))
    relations = read_relations(archive, posixpath.join(folder, "_rels", name + ".rels"), folder)
    sheets: dict[str, str] = {}
    positions: list[str] = []
    date_1904 = False
    for element in workbook.iter():
        kind = local_name(element)
        if kind == "workbookPr":
            date_1904 = is_true(attribute(element, "date1904"))
        elif kind == "sheet":
            sheet_name = element.get("name") or ""
            if sheet_name in positions:
                raise damaged(archive.path, f"two sheets are called '{sheet_name}'")
            positions.append(sheet_name)
            relation, part = relations.get(attribute(element, "id") or "", ("", ""))
            if relation.endswith("/worksheet") and part:
                sheets[sheet_name] = part
    if len(positions) > MAXIMUM_SHEETS:
        raise UnreadableWorkbook(
            archive.path, f"the workbook has {len(positions):,} sheets", f"at most {MAXIMUM_SHEETS:,}", "Split it."
        )
    styles = next((part for kind, part in relations.values() if kind.endswith("/styles")), "")
    return Package(
        sheets,
        _formats(_parse(archive, styles)) if styles else CellFormats(),
        date_1904,
        _own_sheets(archive, workbook, positions),
    )


def _parse(archive: SafeArchive, part: str) -> etree._Element:
    content = archive.read(part)
    if len(content) > MAXIMUM_SMALL_PART_BYTES:
        raise damaged(archive.path, f"part {part} has {len(content) / MEGABYTE:,.0f} MB")
    return parse_part(archive.path, part, content)


def read_relations(archive: SafeArchive, part: str, folder: str) -> dict[str, tuple[str, str]]:
    """Relations by id: kind, and the part they lead to if it is there."""
    found = archive.find(part)
    if found is None:
        return {}
    relations = {}
    for element in _parse(archive, found):
        if local_name(element) != "Relationship" or element.get("TargetMode") == "External":
            continue
        target = (element.get("Target") or "").replace("\\", "/")
        whole = target if target.startswith("/") else posixpath.join(folder, target)
        target_part = archive.find(posixpath.normpath(whole).lstrip("/"))
        relations[element.get("Id") or ""] = (element.get("Type") or "", target_part or "")
    return relations


def workbook_part(archive: SafeArchive, usual_name: str) -> str:
    """Name of the part that lists the sheets."""
    for kind, part in read_relations(archive, "_rels/.rels", "").values():
        if kind.endswith("/officeDocument") and part:
            return part
    usual = archive.find(usual_name)
    if usual is None:
        raise damaged(archive.path, "it has no workbook part")
    return usual


def _children(root: etree._Element, group: str, kind: str) -> Iterator[etree._Element]:
    for element in root:
        if local_name(element) == group:
            yield from (child for child in element if local_name(child) == kind)


def _number(value: str | None) -> int:
    return int(value) if value is not None and value.isascii() and value.isdigit() else -1


def _formats(styles: etree._Element) -> CellFormats:
    percent_formats = set(BUILT_IN_PERCENT)
    for element in _children(styles, "numFmts", "numFmt"):
        if shows_percent(element.get("formatCode") or ""):
            percent_formats.add(_number(element.get("numFmtId")))
        else:
            percent_formats.discard(_number(element.get("numFmtId")))
    struck_fonts = {
        index
        for index, font in enumerate(_children(styles, "fonts", "font"))
        if any(local_name(child) == "strike" and child.get("val", "1") not in ("0", "false") for child in font)
    }
    percent, struck = set(), set()
    for index, element in enumerate(_children(styles, "cellXfs", "xf")):
        if _number(element.get("numFmtId")) in percent_formats:
            percent.add(index)
        if _number(element.get("fontId")) in struck_fonts:
            struck.add(index)
    return CellFormats(frozenset(percent), frozenset(struck))


def _own_sheets(archive: SafeArchive, workbook: etree._Element, positions: list[str]) -> frozenset[str]:
    """Sheets that an earlier audit added: each carries a hidden name of its own, in a workbook that says so."""
    if not any(
        element.get("name") == ANNOTATED_COPY_PROPERTY
        for kind, part in read_relations(archive, "_rels/.rels", "").values()
        if kind.endswith("/custom-properties") and part
        for element in _parse(archive, part)
    ):
        return frozenset()
    marked = (
        _number(name.get("localSheetId"))
        for name in _children(workbook, "definedNames", "definedName")
        if name.get("name") == OWN_SHEET_MARK
    )
    return frozenset(positions[position] for position in marked if 0 <= position < len(positions))
