"""One sheet or block a relay: names beside values, in one or several column blocks."""

from __future__ import annotations

import re
from collections.abc import Iterable, Mapping
from dataclasses import dataclass

import numpy as np

from audit.intake.cells import CellValue
from audit.intake.celltext import cell_text
from audit.intake.layouts.setting_names import NamedSettings, match_setting
from audit.intake.opening import SheetGrid
from audit.intake.recognition.folding import fold_header
from audit.intake.recognition.header_units import is_unit
from audit.intake.recognition.matching import heading_element, match_header
from audit.intake.recognition.settings_grammar import read_part
from audit.intake.recognition.sheets import Sheet, said
from audit.intake.resolve.names import exact

FEWEST_SETTINGS = 3
FARTHEST_VALUE = 4
LONGEST_NAME = 70
_LABEL = re.compile(
    r"(?P<what>relay(?: tag| id| no\.?| name)?|ied|protection relay|motor(?: tag| id| no\.?)?|tag(?: no\.?)?|"
    r"equipment tag|feeder|setting group|group)\s*[:=]\s*(?P<text>\S.*)",
    re.IGNORECASE | re.DOTALL,
)
_GENERAL_NAME = re.compile(
    r"(?:sheet|tabelle|table|feuil|hoja|blad)\s*\d*|settings?(?: list| data| sheet)?|relay settings?|relays?|data|"
    r"parameters?|protection(?: settings?)?|page \d+",
    re.IGNORECASE,
)
_PIECE_ENDS = " ,:;()[]{}'\"/–—-"


@dataclass(frozen=True)
class Anchor:
    """A cell that says whose settings follow: kind is 'relay', 'motor' or 'group'."""

    row: int
    column: int
    kind: str
    text: str
    cell: tuple[int, int]


@dataclass
class _Band:
    """A column of names, the column of its values and that of their units."""

    names: int
    values: int
    units: int = 0
    last: int = 0


def is_block(grid: SheetGrid) -> bool:
    """Tell whether a sheet holds names of settings with values beside them."""
    names = {
        found.name
        for band in find_bands(grid)
        for row in range(1, grid.height + 1)
        if _filled(grid, row, band.values)
        for found in [match_setting("", _name(grid, row, band.names))]
        if found.known
    }
    return len(names) >= FEWEST_SETTINGS or _named_below_headings(grid) >= FEWEST_SETTINGS


def _named_below_headings(grid: SheetGrid) -> int:
    """Count settings whose names make sense only below the heading of an element."""
    found: set[str] = set()
    for band in find_bands(grid):
        function = ""
        for row in range(1, grid.height + 1):
            name = _name(grid, row, band.names)
            if name and not _filled(grid, row, band.values):
                function = name
            elif name and function:
                match = match_setting(function, name)
                if match.known:
                    found.add(match.name)
    return len(found)


def _name(grid: SheetGrid, row: int, column: int) -> str:
    value = grid.rows[row - 1][column - 1]
    text = cell_text(value) if isinstance(value, str) or _is_device_number(value) else ""
    return text if len(text) <= LONGEST_NAME else ""


def _is_device_number(value: CellValue) -> bool:
    return isinstance(value, int | float) and not isinstance(value, bool) and 10 < value < 100


def _filled(grid: SheetGrid, row: int, column: int) -> bool:
    return bool(cell_text(grid.rows[row - 1][column - 1])) if 1 <= column <= grid.width else False


def _is_name(text: str) -> bool:
    if not text:
        return False
    found = match_setting("", text)
    return found.known or bool(found.open_part) or read_part(fold_header(text)) is not None


def find_bands(grid: SheetGrid) -> list[_Band]:
    """Find the columns of names with values to their right."""
    bands: list[_Band] = []
    taken: set[int] = set()
    for column in range(1, grid.width + 1):
        if column in taken:
            continue
        rows = [
            row
            for row in range(1, grid.height + 1)
            if isinstance(grid.rows[row - 1][column - 1], str) and _is_name(_name(grid, row, column))
        ]
        if len(rows) < 2:
            continue
        band = _band(grid, column, rows)
        if band is not None:
            bands.append(band)
            taken |= {band.names, band.values, band.units}
    for band, following in zip(bands, [*bands, None][1:], strict=True):
        band.last = following.names - 1 if following else grid.width
    return bands


def _band(grid: SheetGrid, column: int, rows: list[int]) -> _Band | None:
    """Find the values and units beside a column of names."""
    right = range(column + 1, min(column + FARTHEST_VALUE, grid.width) + 1)
    share: dict[int, float] = {}
    units: dict[int, bool] = {}
    for place in right:
        texts = [text for row in rows if (text := cell_text(grid.rows[row - 1][place - 1]))]
        if not texts or sum(_is_name(text) and not _could_be_value(text) for text in texts) > 0.5 * len(texts):
            continue
        units[place] = sum(is_unit(text.strip("()[]")) or text == "-" for text in texts) > 0.8 * len(texts)
        share[place] = len(texts) / len(rows)
    values = [place for place in share if not units[place]]
    if not values:
        return None
    best = max(values, key=lambda place: (share[place] >= 0.3, -place))
    beside = [place for place in share if units[place] and place <= best + 2]
    return _Band(column, best, beside[0] if beside else 0)


def _could_be_value(text: str) -> bool:
    return any(c.isdigit() for c in text) or len(text) <= 4


def read_block(sheet: Sheet, tags: Mapping[str, tuple[str, str]], relay: str = "", group: str = "") -> bool:
    """Read a sheet of blocks. `tags` gives for each folded known tag its kind ('relay' or 'motor') and spelling."""
    grid = sheet.grid
    bands = find_bands(grid)
    anchors = _anchors(grid, bands, tags)
    fallback = relay or _sheet_tag(sheet, tags)
    settings = NamedSettings(sheet)
    records: dict[tuple[str, str, str], int] = {}
    owners: dict[int, tuple[Anchor | None, Anchor | None, str]] = {}
    for band in bands:
        function = ""
        for row in range(1, grid.height + 1):
            name = _name(grid, row, band.names)
            if not name:
                continue
            if not _filled(grid, row, band.values):
                function = name if heading_element(name) or not _is_name(name) else function
                continue
            if any(anchor.row == row and anchor.column == band.names for anchor in anchors):
                continue
            whose = {kind: _governing(anchors, kind, row, band) for kind in ("relay", "motor", "group")}
            in_group = whose["group"].text if whose["group"] else group
            key = (
                exact(whose["relay"].text) if whose["relay"] else "",
                exact(whose["motor"].text) if whose["motor"] else "",
                in_group,
            )
            if key not in records:
                records[key] = int(sheet.records.take(1)[0])
                owners[records[key]] = (whose["relay"], whose["motor"], in_group)
            unit = cell_text(grid.rows[row - 1][band.units - 1]).strip("()[]") if band.units else ""
            settings.add(
                function if heading_element(function) else "",
                name,
                sheet.address(row, band.names),
                (row, band.values),
                records[key],
                "" if unit in ("-", "--") else unit,
                in_group,
            )
    if not settings.read():
        return False
    _say_owners(sheet, owners, fallback)
    return True


def _say_owners(sheet: Sheet, owners: Mapping[int, tuple[Anchor | None, Anchor | None, str]], fallback: str) -> None:
    used = {int(record) for block in sheet.readings for record in np.unique(block.record).tolist()}
    for record, (relay, motor, group) in owners.items():
        if record not in used:
            continue
        for quantity, anchor in (("relay_tag", relay), ("motor", motor)):
            if anchor is None and (quantity == "motor" or motor is not None):
                continue
            text = anchor.text if anchor else fallback
            if not text:
                continue
            cell = sheet.address(*anchor.cell) if anchor else -1
            made = said(
                quantity, np.array([record]), [text], np.array([cell], dtype=np.int64), "heading" if anchor else "sheet"
            )
            made.group = group
            sheet.keep(made, "relay")


def _governing(anchors: list[Anchor], kind: str, row: int, band: _Band) -> Anchor | None:
    """Give the anchor that a pair stands under: the last one above it in its own columns, else above all blocks."""
    above = [anchor for anchor in anchors if anchor.kind == kind and anchor.row <= row]
    own = [anchor for anchor in above if band.names <= anchor.column <= band.last]
    if own:
        return max(own, key=lambda anchor: anchor.row)
    identities = [
        anchor.row
        for anchor in anchors
        if anchor.kind != "group" and band.names <= anchor.column <= band.last and anchor.row <= row
    ]
    # what stands beside the name of a block belongs to another block; a title above all of them to each
    ceiling = min(identities) if identities and kind != "group" else row + 1
    shared = [anchor for anchor in above if anchor.row < ceiling and anchor.column < band.names]
    return max(shared, key=lambda anchor: (anchor.row, anchor.column)) if shared else None


def _anchors(grid: SheetGrid, bands: list[_Band], tags: Mapping[str, tuple[str, str]]) -> list[Anchor]:
    """Find the cells that say whose settings follow."""
    values = {band.values for band in bands}
    found: list[Anchor] = []
    for row in range(1, grid.height + 1):
        for column in range(1, grid.width + 1):
            value = grid.rows[row - 1][column - 1]
            if not isinstance(value, str) or (column in values and _beside_name(grid, row, column, bands)):
                continue
            text = cell_text(value)
            if not text or len(text) > LONGEST_NAME:
                continue
            found += _anchors_in(grid, row, column, text, tags)
    return found


def _beside_name(grid: SheetGrid, row: int, column: int, bands: list[_Band]) -> bool:
    return any(band.values == column and _name(grid, row, band.names) for band in bands)


def _anchors_in(grid: SheetGrid, row: int, column: int, text: str, tags: Mapping[str, tuple[str, str]]) -> list[Anchor]:
    match = _LABEL.fullmatch(text)
    if match:
        kind = _kind(match["what"])
        return [Anchor(row, column, kind, _known_or_whole(match["text"], tags, kind), (row, column))]
    kind = _kind(text.strip(" :=")) if _is_label(text) else ""
    if kind:
        for place in range(column + 1, min(column + FARTHEST_VALUE, grid.width) + 1):
            beside = cell_text(grid.rows[row - 1][place - 1])
            if beside:
                return [Anchor(row, column, kind, _known_or_whole(beside, tags, kind), (row, place))]
        return []
    if match_setting("", text).known:
        return []
    return [Anchor(row, column, kind, spelled, (row, column)) for kind, spelled in tags_within(text, tags)]


def _is_label(text: str) -> bool:
    folded = text.strip(" :=")
    if fold_header(folded) in ("setting group", "group", "active group"):
        return True
    return match_header(folded, "relay").quantity in ("relay_tag", "motor") or fold_header(folded) in (
        "tag",
        "feeder",
    )


def _kind(label: str) -> str:
    folded = fold_header(label)
    if "group" in folded.split():
        return "group"
    if folded.split()[0] in ("motor", "tag", "equipment", "feeder"):
        return "motor"
    return "relay" if match_header(label, "relay").quantity != "motor" else "motor"


def _known_or_whole(text: str, tags: Mapping[str, tuple[str, str]], kind: str) -> str:
    """Give the known tag within a text, else its first line."""
    for known, spelled in tags_within(text, tags):
        if known == kind:
            return spelled
    return text.split("\n")[0].strip()


def tags_within(text: str, tags: Mapping[str, tuple[str, str]]) -> list[tuple[str, str]]:
    """Give the known tags that a text names as whole words, longest first.

    >>> tags_within("Settings of R-101 (P-101 A)", {"r-101": ("relay", "R-101"), "p-101 a": ("motor", "P-101 A")})
    [('motor', 'P-101 A'), ('relay', 'R-101')]
    """
    words = text.replace("\n", " ").split(" ")
    found: list[tuple[str, str]] = []
    for length in range(min(4, len(words)), 0, -1):
        for start in range(len(words) - length + 1):
            piece = exact(" ".join(words[start : start + length]).strip(_PIECE_ENDS))
            if piece in tags and tags[piece] not in found:
                found.append(tags[piece])
    return found


def _sheet_tag(sheet: Sheet, tags: Mapping[str, tuple[str, str]]) -> str:
    """Give the relay that the name of a sheet, or else of its file, stands for."""
    name = sheet.grid.name
    within = tags_within(name, tags)
    if within:
        return within[0][1]
    stem = sheet.source.file.rpartition(".")[0]
    if _GENERAL_NAME.fullmatch(name.strip()):
        within = tags_within(stem, tags)
        return within[0][1] if within else stem
    return name.strip()


def known_tags(texts: Iterable[tuple[str, str]]) -> dict[str, tuple[str, str]]:
    """Give the tags by which headings are understood; a tag of both kinds counts as the relay's."""
    tags: dict[str, tuple[str, str]] = {}
    for kind, text in texts:
        if text and (exact(text) not in tags or kind == "relay"):
            tags[exact(text)] = (kind, text)
    return tags
