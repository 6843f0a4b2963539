"""Where the headers of a sheet stand, in one to three rows, and what each column means."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, field

from audit.intake.celltext import cell_text
from audit.intake.gathered import TABLES
from audit.intake.opening import SheetGrid
from audit.intake.recognition.header_units import is_unit
from audit.intake.recognition.matching import NOTHING, HeaderMatch, match_header, match_texts
from audit.vocabulary.quantities import vocabulary
from audit.vocabulary.spellings import UnitReading, read_unit

SEARCHED_ROWS = 40
DEEPEST = 3
WIDEST = 1000
"""Columns beyond this one hold no table."""
FEWEST = 2
_KEYS = {"motor": "motor", "relay": "relay_tag", "bus": "bus_name", "start": "start_motor"}


@dataclass(frozen=True)
class Heading:
    """Header rows of a table on a sheet: rows count from 1, columns too."""

    first_row: int
    depth: int
    texts: dict[int, tuple[str, ...]]
    unit_row: int = 0
    units: dict[int, str] = field(default_factory=dict)

    @property
    def first_data_row(self) -> int:
        """Give the row below headers and units."""
        return max(self.first_row + self.depth, self.unit_row + 1)

    def label(self, column: int) -> str:
        """Give a header as one text."""
        return " / ".join(self.texts.get(column, ()))

    def matches(self, table: str) -> dict[int, HeaderMatch]:
        """Give what each column means in a table."""
        return {column: self._match(column, table) for column in self.texts}

    def _match(self, column: int, table: str) -> HeaderMatch:
        texts = self.texts[column]
        found = match_texts(texts, table)
        unit = self.units.get(column)
        if unit and not found.known and not found.open_part:
            # 'LRT' above 's' is a time, above '%' a torque
            with_unit = match_texts((*texts[:-1], f"{texts[-1]} ({unit})"), table)
            return with_unit if with_unit.known else found
        return found


def find_heading(grid: SheetGrid, first_row: int = 1, last_row: int | None = None) -> Heading | None:
    """Find the header rows of a sheet within its first rows, or None where it has none that is known."""
    last = min(grid.height, last_row or first_row + SEARCHED_ROWS - 1)
    known = {row: _known_cells(grid, row) for row in range(first_row, min(last + DEEPEST, grid.height) + 1)}
    best: tuple[float, int, int] | None = None
    for row in range(first_row, last + 1):
        if not any(value is not None for value in grid.rows[row - 1]):
            continue
        if not known[row] and not any(known.get(row + below, 0) for below in range(1, DEEPEST)):
            continue
        for depth in range(1, DEEPEST + 1):
            if row + depth - 1 > grid.height or (not known.get(row + depth - 1) and depth > 1):
                continue
            if depth == 1 and known[row] < FEWEST:
                continue
            if depth > 1 and _unit_row(grid, row + depth - 1, heading_texts(grid, row, depth - 1)):
                # the last of these rows names units
                continue
            texts = heading_texts(grid, row, depth)
            score = _score(texts)
            if score >= FEWEST and (best is None or score > best[0] + 1e-9):
                best = (score, row, depth)
    if best is None:
        return None
    return heading_at(grid, best[1], best[2])


def heading_at(grid: SheetGrid, row: int, depth: int) -> Heading:
    """Give the headers at a known place, with the row of units below them where there is one."""
    texts = heading_texts(grid, row, depth)
    units = _unit_row(grid, row + depth, texts)
    return Heading(row, depth, texts, row + depth if units else 0, units)


def _known_cells(grid: SheetGrid, row: int) -> int:
    return sum(
        1
        for value in grid.rows[row - 1][:WIDEST]
        if isinstance(value, str) and any(_means_something(value, table) for table in TABLES)
    )


def _means_something(text: str, table: str) -> bool:
    found = match_header(text, table)
    return found.known or bool(found.candidates) or bool(found.open_part)


def _score(texts: dict[int, tuple[str, ...]]) -> float:
    """Rate header rows by the best table: what is known, less what is strange, less what is said twice."""
    best = 0.0
    for table in TABLES:
        names: set[tuple[str, str]] = set()
        score = 0.0
        for parts in texts.values():
            found = match_texts(parts, table)
            if found.known:
                score += 1.0 if (found.name, found.group) not in names else -0.2
                names.add((found.name, found.group))
            elif found.candidates or found.open_part:
                score += 0.4
            elif len(parts[-1]) > 60:
                score -= 1.0
            else:
                score -= 0.05
        best = max(best, score)
    return best


def heading_texts(grid: SheetGrid, row: int, depth: int) -> dict[int, tuple[str, ...]]:
    """Give for each column its header read downwards, merged headings spread over their columns."""
    levels = [_level(grid, row + offset, row + depth - 1) for offset in range(depth)]
    texts: dict[int, tuple[str, ...]] = {}
    for column in range(1, min(grid.width, WIDEST) + 1):
        parts: list[str] = []
        own = False
        for offset, (level, spread) in enumerate(levels):
            text = level.get(column, "")
            if text and text not in parts:
                parts.append(text)
                own = own or not spread[column] or offset == depth - 1
        if parts and own:
            texts[column] = tuple(parts)
    return texts


def _level(grid: SheetGrid, row: int, last_row: int) -> tuple[dict[int, str], dict[int, bool]]:
    """Give the texts of one header row by column, and which of them were spread from the left."""
    values = grid.rows[row - 1]
    texts = {column: cell_text(value) for column, value in enumerate(values, 1) if value is not None}
    texts = {column: text for column, text in texts.items() if text}
    spread = dict.fromkeys(texts, False)
    if row == last_row:
        return texts, spread
    if len(set(texts.values())) == 1 and min(texts) <= _first_column(grid, row + 1, last_row):
        # one text above all columns is the title of the sheet
        return {}, {}
    merges = [area for area in grid.merged if area[0] <= row <= area[2] and area[3] > area[1]]
    if merges:
        for top, left, _bottom, right in merges:
            text = cell_text(grid.rows[top - 1][left - 1]) if top <= grid.height and left <= grid.width else ""
            for column in range(left + 1, min(right, grid.width) + 1):
                if text and column not in texts:
                    texts[column], spread[column] = text, True
        return texts, spread
    current = ""
    for column in range(1, grid.width + 1):
        # a header without anything below it stands for its own column alone
        has_below = any(grid.rows[below][column - 1] is not None for below in range(row, last_row))
        if column in texts:
            current = texts[column] if has_below else ""
        elif current and has_below:
            texts[column], spread[column] = current, True
        else:
            current = ""
    return texts, spread


def _first_column(grid: SheetGrid, row: int, last_row: int) -> int:
    """Give the first column that holds something in some rows."""
    columns = [
        column
        for header in grid.rows[row - 1 : last_row]
        for column, value in enumerate(header, 1)
        if value is not None
    ]
    return min(columns, default=0)


def _unit_row(grid: SheetGrid, row: int, texts: dict[int, tuple[str, ...]]) -> dict[int, str]:
    """Give the units of a row below the headers; empty where that row holds data."""
    if row > grid.height:
        return {}
    found: dict[int, str] = {}
    others = 0
    for column in texts:
        value = grid.rows[row - 1][column - 1]
        if value is None:
            continue
        text = cell_text(value).strip("()[]{} ")
        if isinstance(value, str) and (is_unit(text) or text in ("-", "--", "")):
            if is_unit(text):
                found[column] = text
        else:
            others += 1
    return found if (len(found) >= 2 and len(found) > 2 * others) or (len(found) == 1 and not others) else {}


def unit_below(found: HeaderMatch, unit_text: str) -> UnitReading | None:
    """Give the unit of a column from its unit row, where header and unit row agree; else from its header."""
    if not unit_text or not found.quantity:
        return found.unit
    return read_unit(unit_text, vocabulary().quantities[found.quantity]) or found.unit


def key_column(matches: dict[int, HeaderMatch], table: str) -> int:
    """Give the column that names the rows of a table, 0 where there is none."""
    return next((column for column, found in matches.items() if found.quantity == _KEYS[table]), 0)


def same_heading(grid: SheetGrid, row: int, heading: Heading) -> bool:
    """Tell whether a row repeats the last header row, as printed lists do on every page."""
    values: Sequence[object] = grid.rows[row - 1]
    head: Sequence[object] = grid.rows[heading.first_row + heading.depth - 2]
    present = [(a, b) for a, b in zip(values, head, strict=True) if b is not None]
    return bool(present) and sum(a == b for a, b in present) > 0.8 * len(present)


__all__ = [
    "NOTHING",
    "Heading",
    "find_heading",
    "heading_at",
    "heading_texts",
    "key_column",
    "same_heading",
    "unit_below",
]
