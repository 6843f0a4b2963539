"""Cell formats of a workbook: a cell's own format with our fill, and the way back from it.

Our fills are told from the site's own by their second colour, which a solid fill never shows: it is the number
under which `Former` says what the cell had before. Where a program dropped that colour, the record of marked cells
serves instead.
"""

from __future__ import annotations

import copy
import re
from collections.abc import Sequence
from dataclasses import dataclass

from lxml import etree

from audit.report.workbook.patch.markup import children, insert_in_order, new_root
from audit.report.workbook.patch.ooxml import MAIN, REL_STYLES, TYPE_STYLES, main, mains
from audit.report.workbook.patch.package import Package
from audit.report.workbook.patch.refusal import CannotPatch
from audit.report.workbook.patch.relations import relate, targets

MOST_FORMATS = 64_000  # Excel's limit of cell formats in a workbook, less a margin
OUR_FIRST_MARK = 0x5E0000
LAST_MARK = 0xFFFFFF

_ORDER = mains("numFmts fonts fills borders cellStyleXfs cellXfs cellStyles dxfs tableStyles colors extLst")
_NEEDED = {
    "fonts": '<font><sz val="11"/><name val="Calibri"/><family val="2"/></font>',
    "fills": '<fill><patternFill patternType="none"/></fill><fill><patternFill patternType="gray125"/></fill>',
    "borders": "<border><left/><right/><top/><bottom/><diagonal/></border>",
    "cellStyleXfs": '<xf numFmtId="0" fontId="0" fillId="0" borderId="0"/>',
    "cellXfs": '<xf numFmtId="0" fontId="0" fillId="0" borderId="0" xfId="0"/>',
    "cellStyles": '<cellStyle name="Normal" xfId="0" builtinId="0"/>',
}


@dataclass(frozen=True)
class Former:
    """What a marked cell's format said before: its fill as XML, and its attribute `applyFill`."""

    fill: str
    apply_fill: str | None


@dataclass(frozen=True)
class MarkedCells:
    """Cells of a sheet with one fill (RRGGBB) that had the same before; `former` is the number of its `Former`."""

    sheet: str
    fill: str
    former: int
    addresses: tuple[str, ...]


class Styles:
    """The styles part of a workbook, made where it is missing; written anew only if something is added."""

    def __init__(self, package: Package, workbook_part: str, formers: Sequence[Former] = ()) -> None:
        self._package = package
        found = targets(package, workbook_part, REL_STYLES)
        if found and package.has(found[0]):
            self.part = found[0]
        else:
            self.part = package.free_name("xl/styles{}.xml") if package.has("xl/styles.xml") else "xl/styles.xml"
            package.put(self.part, new_root(MAIN, "styleSheet"))
            package.set_content_type(self.part, TYPE_STYLES)
            relate(package, workbook_part, REL_STYLES, self.part)
        self.root = package.look(self.part)
        if self.root.tag != main("styleSheet"):
            raise CannotPatch(f"the part {self.part} does not hold styles")
        self.formers = list(formers)
        self._painted: dict[tuple[int, str], int] = {}
        self.former_of: dict[int, int] = {}
        self._known: dict[str, dict[bytes, int]] = {}

    def painted(self, cell_format: int, fill: str) -> int:
        """Number of the format that is like another one with a solid fill (RRGGBB)."""
        key = (cell_format, fill.upper())
        if key not in self._painted:
            formats = self.items("cellXfs")
            original = formats[cell_format] if cell_format < len(formats) else formats[0]
            new = copy.deepcopy(original)
            former = Former(self._fill_of(original), original.get("applyFill"))
            mark = self._mark(former)
            solid = f'<fill><patternFill patternType="solid"><fgColor rgb="FF{key[1]}"/>'
            solid += f'<bgColor rgb="FF{mark:06X}"/></patternFill></fill>'
            new.set("fillId", str(self.add("fills", self.element(solid))))
            new.set("applyFill", "1")
            self._painted[key] = self.add("cellXfs", new)
            self.former_of[self._painted[key]] = self.formers.index(former)
        return self._painted[key]

    def ways_back(self) -> dict[int, int]:
        """Formats of ours and the ones that the cells had before them."""
        back = {}
        fills = self.items("fills")
        for number, cell_format in enumerate(list(self.items("cellXfs"))):
            mark = _mark_of(fills, cell_format.get("fillId", "0"))
            if mark is None or not 0 <= mark - OUR_FIRST_MARK < len(self.formers):
                continue
            back[number] = self._restored(cell_format, self.formers[mark - OUR_FIRST_MARK])
        return back

    def unpainted(self, cell_format: int, fill: str, former: int) -> int:
        """Number of the format that a cell had before, where its fill still is ours; else of its own."""
        formats, fills = self.items("cellXfs"), self.items("fills")
        if cell_format >= len(formats) or former >= len(self.formers):
            return cell_format
        number = formats[cell_format].get("fillId", "0")
        colour = fills[int(number)].find(f"{main('patternFill')}/{main('fgColor')}") if number.isdigit() else None
        if colour is None or colour.get("rgb", "")[2:].upper() != fill:
            return cell_format
        return self._restored(formats[cell_format], self.formers[former])

    def items(self, group: str) -> list[etree._Element]:
        """Elements of a group such as `fonts`, which is made where it is missing or empty."""
        holder = self.root.find(main(group))
        if holder is None or not any(True for _ in children(holder)):
            holder = self._made(group, holder)
        return list(children(holder))

    def add(self, group: str, new: etree._Element) -> int:
        """Number of an element in its group; it is added if there is none quite like it."""
        known = self._known.get(group)
        if known is None:
            known = {}
            for number, item in enumerate(self.items(group)):
                known.setdefault(_canonical(item), number)
            self._known[group] = known
        canonical = _canonical(new)
        if canonical not in known:
            self._package.edit(self.part)
            self.items(group)
            holder = self.root.find(main(group))
            assert holder is not None
            number = sum(1 for _ in children(holder))
            if group == "cellXfs" and number >= MOST_FORMATS:
                raise CannotPatch(f"the workbook has {number:,} cell formats, the most that it can have")
            holder.append(new)
            if holder.get("count") is not None or group != "cellXfs":
                holder.set("count", str(number + 1))
            known[canonical] = number
        return known[canonical]

    def element(self, text: str) -> etree._Element:
        """Element of the styles' namespace from its text."""
        return etree.fromstring(f'<s xmlns="{MAIN}">{text}</s>')[0]

    def _restored(self, painted: etree._Element, former: Former) -> int:
        original = copy.deepcopy(painted)
        original.set("fillId", str(self.add("fills", self.element(former.fill))))
        original.attrib.pop("applyFill", "")
        if former.apply_fill is not None:
            original.set("applyFill", former.apply_fill)
        return self.add("cellXfs", original)

    def _fill_of(self, cell_format: etree._Element) -> str:
        fills = self.items("fills")
        number = cell_format.get("fillId", "0")
        fill = fills[int(number)] if number.isdigit() and int(number) < len(fills) else fills[0]
        return _canonical(fill).decode().replace(f' xmlns="{MAIN}"', "")

    def _mark(self, former: Former) -> int:
        if former not in self.formers:
            self.formers.append(former)
        mark = OUR_FIRST_MARK + self.formers.index(former)
        if mark > LAST_MARK:
            raise CannotPatch("the workbook has more kinds of fills than can be remembered")
        return mark

    def _made(self, group: str, holder: etree._Element | None) -> etree._Element:
        self._package.edit(self.part)
        if holder is None:
            holder = self.root.makeelement(main(group))
            insert_in_order(self.root, holder, _ORDER[_ORDER.index(main(group)) + 1 :])
        holder.extend(etree.fromstring(f'<s xmlns="{MAIN}">{_NEEDED.get(group, "")}</s>'))
        holder.set("count", str(len(holder)))
        if group == "cellXfs":
            # the one format made here names the first of each of these
            for named in ("fonts", "fills", "borders", "cellStyleXfs", "cellStyles"):
                self.items(named)
        return holder


def _canonical(element: etree._Element) -> bytes:
    """One spelling for elements that say the same, whatever prefixes and spaces they were written with."""
    clean = copy.deepcopy(element)
    clean.tail = None
    for inner in clean.iter():
        if isinstance(inner.tag, str) and len(inner):
            inner.text = None
            for child in inner:
                child.tail = None
    holder = new_root(MAIN, "s")
    holder.append(clean)
    etree.cleanup_namespaces(holder)
    return etree.tostring(clean, method="c14n", exclusive=True)


def _mark_of(fills: list[etree._Element], number: str) -> int | None:
    if not number.isdigit() or int(number) >= len(fills):
        return None
    pattern = fills[int(number)].find(main("patternFill"))
    if pattern is None or pattern.get("patternType") != "solid":
        return None
    second = pattern.find(main("bgColor"))
    rgb = second.get("rgb", "") if second is not None else ""
    return int(rgb[2:], 16) if re.fullmatch("[0-9A-Fa-f]{8}", rgb) else None
