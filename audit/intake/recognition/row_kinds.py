"""Which rows below a heading are records, and which are sub-headings, totals, notes or repeated headers."""

from __future__ import annotations

import re
from dataclasses import dataclass, field

from audit.intake.celltext import cell_text
from audit.intake.opening import SheetGrid
from audit.intake.recognition.header_rows import Heading, same_heading

_TOTAL = re.compile(
    r"(?:grand |sub-?|sub |area )?(?:totals?|sum|summe|average|mean|count)\b.*|(?:no\.?|number) of motors\b.*",
    re.IGNORECASE,
)
_NOTE = re.compile(
    r"(?:notes?|remarks?|legend|key|abbreviations?|rev(?:ision)?|prepared|checked|approved|issued|source|end of)\b.*"
    r"|[*†‡].*|\(?\d{1,2}[.)]\s+\D.*",
    re.IGNORECASE | re.DOTALL,
)
_EXAMPLE = re.compile(r"example\b.*", re.IGNORECASE)
_AREA = re.compile(
    r"(?:area|unit|section|plant|building|train|mcc|swgr|switchgear|system|dept|department|bus)\b.*", re.IGNORECASE
)
_LONGEST_TAG = 24


@dataclass
class RowKinds:
    """Rows of a table by what they are; rows count from 1."""

    records: list[int] = field(default_factory=list)
    key_rows: list[int] = field(default_factory=list)
    """For each record the row where its key stands, another one where the key cell is merged downwards."""
    areas: list[tuple[int, int] | None] = field(default_factory=list)
    """For each record row and column of the sub-heading above it."""
    headings: list[int] = field(default_factory=list)
    totals: list[int] = field(default_factory=list)
    notes: list[int] = field(default_factory=list)
    repeated: list[int] = field(default_factory=list)
    keyless: list[int] = field(default_factory=list)


def _shape(text: str) -> str:
    return re.sub(r"[A-Z]+", "A", re.sub(r"\d+", "9", text.upper().replace(" ", "")))


def _filled(value: object) -> bool:
    return value is not None and not (isinstance(value, str) and not value.strip())


def kinds_of_rows(
    grid: SheetGrid,
    heading: Heading,
    key: int,
    last_row: int,
    fill_down: bool = False,
    used: frozenset[int] = frozenset(),
) -> RowKinds:
    """Sort the rows below a heading; `key` is the column that names records, `used` the columns that are read.

    `fill_down` lets a row without key belong to the key above it, as lists of starts are written.
    """
    kinds = RowKinds()
    above = {
        row: top
        for top, left, bottom, right in grid.merged
        if left <= key <= right and bottom > top
        for row in range(top + 1, bottom + 1)
    }
    shapes: set[str] | None = None
    area: tuple[int, int] | None = None
    last_key = 0
    for row in range(heading.first_data_row, last_row + 1):
        values = grid.rows[row - 1]
        present = [place for place, value in enumerate(values) if _filled(value)]
        if not present:
            continue
        first = cell_text(values[present[0]])
        if len(present) == 1:
            if shapes is None:
                shapes = _shapes(grid, heading, key, last_row)
            if present[0] == key - 1 and _shape(first) in shapes and not _TOTAL.fullmatch(first):
                pass
            elif _TOTAL.fullmatch(first):
                kinds.totals.append(row)
                continue
            elif (_NOTE.fullmatch(first) and not _AREA.fullmatch(first)) or len(first) > 80:
                kinds.notes.append(row)
                continue
            elif key - 1 != present[0] or _shape(first) not in shapes:
                kinds.headings.append(row)
                area = (row, present[0] + 1)
                continue
        if _EXAMPLE.fullmatch(cell_text(values[key - 1])):
            kinds.notes.append(row)
            continue
        if same_heading(grid, row, heading):
            kinds.repeated.append(row)
            continue
        key_row = row
        if not _filled(values[key - 1]):
            if row in above and _filled(grid.rows[above[row] - 1][key - 1]):
                key_row = above[row]
            elif _TOTAL.fullmatch(first):
                kinds.totals.append(row)
                continue
            elif fill_down and last_key and row not in above:
                key_row = last_key
            elif used and not any(place + 1 in used for place in present):
                kinds.notes.append(row)
                continue
            else:
                kinds.keyless.append(row)
                continue
        elif _TOTAL.fullmatch(cell_text(values[key - 1])):
            kinds.totals.append(row)
            continue
        elif len(present) <= 2 and _note_like(cell_text(values[key - 1])):
            kinds.notes.append(row)
            continue
        last_key = key_row
        kinds.records.append(row)
        kinds.key_rows.append(key_row)
        kinds.areas.append(area)
    _notes_at_the_end(kinds)
    return kinds


def _note_like(text: str) -> bool:
    return bool(_NOTE.fullmatch(text)) and (len(text) > _LONGEST_TAG or not any(c.isdigit() for c in text))


def _shapes(grid: SheetGrid, heading: Heading, key: int, last_row: int) -> set[str]:
    """Give the shapes of keys in rows that hold more than a key: 'P-101A' and 'P-204B' are of one shape."""
    shapes = set()
    for row in range(heading.first_data_row, last_row + 1):
        values = grid.rows[row - 1]
        if _filled(values[key - 1]) and sum(_filled(value) for value in values) > 1:
            shapes.add(_shape(cell_text(values[key - 1])))
    return shapes


def _notes_at_the_end(kinds: RowKinds) -> None:
    """Take lone texts below the last record for notes: no record stands beneath such a heading."""
    last = kinds.records[-1] if kinds.records else 0
    late = [row for row in kinds.headings if row > last]
    kinds.headings = [row for row in kinds.headings if row <= last]
    kinds.notes += late


def rows_in_words(rows: list[int]) -> str:
    """Name some rows in few words.

    >>> rows_in_words([5, 6, 7, 12])
    'rows 5 to 7 and 12'
    """
    runs: list[list[int]] = []
    for row in sorted(rows):
        if runs and row == runs[-1][-1] + 1:
            runs[-1].append(row)
        else:
            runs.append([row])
    words = [f"{run[0]} to {run[-1]}" if len(run) > 2 else " and ".join(map(str, run)) for run in runs]
    if len(words) > 6:
        words = [*words[:5], f"{len(words) - 5} more places"]
    text = words[0] if len(words) == 1 else ", ".join(words[:-1]) + " and " + words[-1]
    return ("row " if len(rows) == 1 else "rows ") + text
