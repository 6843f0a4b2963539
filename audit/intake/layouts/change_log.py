"""A log of changes, a row a change: which motor or bus, what was changed, when."""

from __future__ import annotations

import re
from collections.abc import Mapping, Sequence
from dataclasses import dataclass

import numpy as np

from audit.fleet.folding import exact
from audit.intake.celltext import CellKind, cell_text, read_date_cells
from audit.intake.opening import SheetGrid
from audit.intake.recognition.blocks import Readings
from audit.intake.recognition.cells_to_readings import days_of
from audit.intake.recognition.folding import fold_header
from audit.intake.recognition.header_rows import SEARCHED_ROWS
from audit.intake.recognition.matching import match_header
from audit.intake.recognition.sheets import Sheet, said

_WHAT = frozenset(
    ["change", "what", "what changed", "changed", "description of change", "modification", "work done", "change made",
     "item changed", "part changed", "event", "work"]
)  # fmt: skip
_WHEN = frozenset(["date", "date of change", "changed on", "when", "completed", "done on", "change date"])
_KINDS = (
    ("ct_changed_date", re.compile(r"\bcts?\b|current transformer", re.IGNORECASE)),
    (
        "supply_changed_date",
        re.compile(r"transformer|generator|transfer scheme|incomer|bus tie|utility", re.IGNORECASE),
    ),
    ("supply_reterminated_date", re.compile(r"re-?terminat|cable (?:replaced|changed)|reconnect", re.IGNORECASE)),
    ("motor_replaced_date", re.compile(r"\bmotor\b|rewound|rewind|replaced|stator", re.IGNORECASE)),
)
OF_BUS = "supply_changed_date"


@dataclass(frozen=True)
class LogHeading:
    """Header row of a change log and the columns of tag (or bus), change and day."""

    row: int
    tag: int
    what: int
    when: int


def find_change_log(grid: SheetGrid) -> LogHeading | None:
    """Find the header row of a change log, or None."""
    for row in range(1, min(grid.height, SEARCHED_ROWS) + 1):
        tag = what = when = 0
        for column, value in enumerate(grid.rows[row - 1], 1):
            if not isinstance(value, str):
                continue
            folded = fold_header(value)
            if folded in _WHAT:
                what = what or column
            elif folded in _WHEN:
                when = when or column
            else:
                named = match_header(value, "motor").quantity in ("motor", "bus") or folded in (
                    "equipment",
                    "motor/bus",
                )
                tag = tag or (column if named else 0)
        if tag and what and when:
            return LogHeading(row, tag, what, when)
    return None


def read_change_log(
    sheet: Sheet,
    heading: LogHeading,
    motors: Mapping[str, Sequence[int]],
    buses: Mapping[str, Sequence[int]],
) -> bool:
    """Read the last change of each kind for the motors and buses of the lists."""
    grid = sheet.grid
    rows = range(heading.row + 1, grid.height + 1)
    dates = read_date_cells(grid.column(heading.when, heading.row + 1), day_first=sheet.source.day_first)
    last: dict[tuple[str, str], tuple[float, int, str]] = {}
    strange: list[int] = []
    for row, date in zip(rows, dates, strict=True):
        tag, what = sheet.text(row, heading.tag), sheet.text(row, heading.what)
        if not tag or not what:
            continue
        kind = next((quantity for quantity, words in _KINDS if words.search(what)), "")
        if not kind:
            strange.append(row)
            continue
        cell = sheet.address(row, heading.when)
        if date.kind is not CellKind.DATE or date.moment is None:
            if date.kind is not CellKind.MISSING:
                sheet.source.complain(cell, date.remark, "the day of the change", quantity=kind)
            continue
        day = days_of(date.moment)
        if (exact(tag), kind) not in last or last[exact(tag), kind][0] < day:
            last[exact(tag), kind] = (day, cell, cell_text(grid.rows[row - 1][heading.when - 1]))
    made = [b for (tag, kind), found in last.items() for b in _reading(sheet, tag, kind, found, motors, buses)]
    for block in made:
        sheet.keep(block, "bus" if block.quantity == OF_BUS else "motor", "change log")
    if strange:
        sheet.source.remark(
            sheet.address(strange[0], heading.what),
            f"{len(strange)} changes of the log concern neither motor, CT, supply nor cable",
            "changes that an audit has to know of",
            "They are left out.",
        )
    for column, quantity in ((heading.tag, "motor"), (heading.what, ""), (heading.when, "")):
        sheet.understood(
            sheet.text(heading.row, column),
            sheet.address(heading.row, column),
            "motor",
            quantity,
            None,
            sheet.text(heading.row + 1, column)[:40],
            "synonym",
        )
    return bool(last) or bool(strange)


def _reading(
    sheet: Sheet,
    tag: str,
    kind: str,
    found: tuple[float, int, str],
    motors: Mapping[str, Sequence[int]],
    buses: Mapping[str, Sequence[int]],
) -> list[Readings]:
    day, cell, written = found
    records = (buses if kind == OF_BUS else motors).get(tag, ())
    if not records:
        sheet.source.complain(
            cell, f"a change of '{tag}', which no list names", "a motor or bus of the lists", "It is left out.", kind
        )
        return []
    size = len(records)
    made = said(kind, np.array(records), [written] * size, np.full(size, cell, dtype=np.int64), "change log")
    made.number = np.full(size, day)
    made.text[:] = None
    return [made]
