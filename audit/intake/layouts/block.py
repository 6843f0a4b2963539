"""One sheet or block a relay: names beside values, in one or several column blocks."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass

import numpy as np

from audit.fleet.folding import exact
from audit.intake.cells import CellValue
from audit.intake.celltext import cell_text
from audit.intake.layouts.anchors import Anchor, find_anchors, sheet_tag
from audit.intake.layouts.setting_names import NamedSettings, heading_for, match_setting
from audit.intake.opening import SheetGrid
from audit.intake.recognition.folding import fold_header
from audit.intake.recognition.header_units import is_unit
from audit.intake.recognition.matching import heading_element
from audit.intake.recognition.settings_grammar import read_part
from audit.intake.recognition.sheets import Sheet, said

FEWEST_SETTINGS = 3
FARTHEST_VALUE = 4
LOOKED_AT_ROWS = 400
"""Rows from which the columns of names and values are told."""
LONGEST_NAME = 70


@dataclass
class _Band:
    """A column of names, the column of its values and that of their units."""

    names: int
    values: int
    units: int = 0
    last: int = 0


def is_block(grid: SheetGrid) -> bool:
    """Tell whether a sheet holds names of settings with values beside them, alone or below headings of elements."""
    found: set[str] = set()
    for band in find_bands(grid):
        function = ""
        for row in _rows_looked_at(grid):
            name = _name(grid, row, band.names)
            if name and not _filled(grid, row, band.values):
                function = name
            elif name:
                for match in (match_setting("", name), match_setting(function, name)):
                    if match.known:
                        found.add(match.name)
    return len(found) >= FEWEST_SETTINGS


def _rows_looked_at(grid: SheetGrid) -> range:
    return range(1, min(grid.height, LOOKED_AT_ROWS) + 1)


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
            for row in _rows_looked_at(grid)
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
    anchors = find_anchors(grid, tags, lambda row, column: _beside_name(grid, row, column, bands))
    fallback = relay or sheet_tag(sheet, tags)
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
                heading_for(function, name),
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


def _beside_name(grid: SheetGrid, row: int, column: int, bands: list[_Band]) -> bool:
    return any(band.values == column and _name(grid, row, band.names) for band in bands)
