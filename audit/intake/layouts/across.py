"""Settings down, relays across: a column of names and a column of values for each relay or motor."""

from __future__ import annotations

import re
from collections.abc import Mapping
from dataclasses import dataclass

import numpy as np

from audit.fleet.folding import exact
from audit.intake.celltext import cell_text
from audit.intake.layouts.setting_names import NamedSettings, heading_for, match_setting
from audit.intake.opening import SheetGrid
from audit.intake.recognition.folding import fold_header
from audit.intake.recognition.header_rows import SEARCHED_ROWS
from audit.intake.recognition.header_units import is_unit
from audit.intake.recognition.matching import heading_element
from audit.intake.recognition.settings_grammar import read_part
from audit.intake.recognition.sheets import Sheet, said

FEWEST_RELAYS = 2
FEWEST_SETTINGS = 3
LOOKED_AT_ROWS = 400
_TAG = re.compile(r"(?=.*\d)(?=.*[A-Z])[A-Z0-9][A-Z0-9 ._/-]{1,23}", re.IGNORECASE)


@dataclass(frozen=True)
class AcrossHeading:
    """The row of tags, the columns of values with their tags and kinds, the column of names and that of units."""

    row: int
    columns: Mapping[int, tuple[str, str]]
    names: int
    units: int


def find_across(grid: SheetGrid, tags: Mapping[str, tuple[str, str]]) -> AcrossHeading | None:
    """Find a row of tags above columns of values, or None. Known tags count first, then texts of one shape."""
    for row in range(1, min(grid.height, SEARCHED_ROWS) + 1):
        texts = {
            column: text for column, value in enumerate(grid.rows[row - 1], 1) if value and (text := cell_text(value))
        }
        columns = _alike(texts)
        columns |= {column: tags[exact(text)] for column, text in texts.items() if exact(text) in tags}
        if len(columns) < FEWEST_RELAYS or len({tag for _, tag in columns.values()}) < len(columns):
            continue
        found = _names(grid, row, columns)
        if found is not None:
            return found
    return None


def _alike(texts: Mapping[int, str]) -> dict[int, tuple[str, str]]:
    """Give the cells of a row that look like tags of one list: 'R-101', 'R-102'."""
    shapes: dict[str, list[int]] = {}
    for column, text in texts.items():
        if _TAG.fullmatch(text) and not match_setting("", text).known and not is_unit(text):
            shapes.setdefault(re.sub(r"\d+", "9", text.upper()), []).append(column)
    best = max(shapes.values(), key=len, default=[])
    return {column: ("relay", texts[column]) for column in best}


def _names(grid: SheetGrid, row: int, columns: Mapping[int, tuple[str, str]]) -> AcrossHeading | None:
    """Find the column of names to the left of the values, with settings that are known."""
    last = min(grid.height, row + LOOKED_AT_ROWS)
    if any(_holds_names(grid, row, c, last) for c in range(min(columns), max(columns)) if c not in columns):
        # blocks side by side, each with names of its own
        return None
    for names in range(1, min(columns)):
        known: set[str] = set()
        function = ""
        for below in range(row + 1, last + 1):
            text = _text(grid, below, names)
            filled = any(_text(grid, below, column) for column in columns)
            if text and not filled:
                function = text
            elif text:
                known |= {m.name for f in ("", function) if (m := match_setting(f, text)).known}
        if len(known) >= FEWEST_SETTINGS:
            between = [c for c in range(names + 1, min(columns)) if _holds_units(grid, row, c, last)]
            return AcrossHeading(row, columns, names, between[0] if between else 0)
    return None


def _text(grid: SheetGrid, row: int, column: int) -> str:
    return cell_text(grid.rows[row - 1][column - 1])


def _holds_names(grid: SheetGrid, row: int, column: int, last: int) -> bool:
    names = {text for below in range(row + 1, last + 1) if (text := _text(grid, below, column)) and not is_unit(text)}
    return sum(_is_name(text) for text in names) >= FEWEST_RELAYS


def _is_name(text: str) -> bool:
    return match_setting("", text).known or read_part(fold_header(text)) is not None or bool(heading_element(text))


def _holds_units(grid: SheetGrid, row: int, column: int, last: int) -> bool:
    texts = [text for below in range(row + 1, last + 1) if (text := _text(grid, below, column))]
    return bool(texts) and sum(is_unit(text.strip("()[]")) for text in texts) > 0.6 * len(texts)


def read_across(sheet: Sheet, heading: AcrossHeading, group: str = "") -> bool:
    """Read the settings of each relay or motor that has a column."""
    grid = sheet.grid
    settings = NamedSettings(sheet)
    numbers = sheet.records.take(len(heading.columns)).tolist()
    records = dict(zip(heading.columns, numbers, strict=True))
    function = ""
    for row in range(heading.row + 1, grid.height + 1):
        name = _text(grid, row, heading.names)
        filled = [column for column in heading.columns if _text(grid, row, column)]
        if name and not filled:
            function = name
        if not name:
            continue
        unit = _text(grid, row, heading.units).strip("()[]") if heading.units else ""
        for column in filled:
            settings.add(
                heading_for(function, name),
                name,
                sheet.address(row, heading.names),
                (row, column),
                records[column],
                unit if is_unit(unit) else "",
                group,
            )
    if not settings.read():
        return False
    used = {int(record) for block in sheet.readings for record in block.record.tolist()}
    for column, (kind, tag) in heading.columns.items():
        if records[column] in used:
            made = said(
                "relay_tag" if kind == "relay" else "motor",
                np.array([records[column]]),
                [tag],
                np.array([sheet.address(heading.row, column)], dtype=np.int64),
                "heading",
            )
            made.group = group
            sheet.keep(made, "relay")
    return True
