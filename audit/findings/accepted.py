"""Accepted deviations: findings knowingly left, kept by the site in a plain table beside its workbooks."""

from __future__ import annotations

import hashlib
from collections.abc import Sequence
from dataclasses import dataclass
from datetime import date
from pathlib import Path

from audit.findings.finding import FindingCode
from audit.fleet.folding import exact
from audit.intake.cells import CellValue
from audit.intake.celltext import CellKind, cell_text, find_day_first, read_date_cells, read_number_text
from audit.intake.opening import open_workbook
from audit.intake.opening.folder import ACCEPTED_DEVIATIONS
from audit.refusal import Refusal

HEADINGS = ("motor", "check", "setting", "reason", "accepted by", "until", "value", "low", "high")
NEEDED = ("motor", "check", "reason", "accepted by", "until")
SUFFIXES = (".csv", ".xlsx")


@dataclass(frozen=True, slots=True)
class Deviation:
    """A row of the table: which finding, why it is left, by whom, until when, and what it was then."""

    motor: str
    check: str
    setting: str
    reason: str
    accepted_by: str
    until: date | None
    value: str
    low: float | None
    high: float | None
    row: int
    problem: str = ""
    """What keeps the row from being read, or ''."""


@dataclass(frozen=True, slots=True)
class DeviationTable:
    """The table of one site."""

    file: str
    sha256: str
    rows: tuple[Deviation, ...]


@dataclass(frozen=True, slots=True)
class Accepted:
    """A deviation and the finding that it speaks of; None where the audit finds no such thing any more."""

    deviation: Deviation
    code: FindingCode | None
    returned_because: str = ""
    """Why the finding counts all the same, or '' while the acceptance holds."""

    @property
    def holds(self) -> bool:
        """Tell whether the finding is accepted."""
        return self.code is not None and not self.returned_because


def read_deviations(fleet: Path) -> DeviationTable | None:
    """Read the table of a fleet's folder; None where there is none.

    Raises
    ------
    Refusal
        If the table lacks a column that it needs, or there are two tables.
    """
    folder = fleet if fleet.is_dir() else fleet.parent
    found = [folder / f"{ACCEPTED_DEVIATIONS}{suffix}" for suffix in SUFFIXES]
    found = [path for path in found if path.is_file()]
    if not found:
        return None
    if len(found) > 1:
        raise Refusal(f"{folder}: there are two tables of accepted deviations, {found[0].name} and {found[1].name}.")
    path = found[0]
    grid = open_workbook(path).sheets[0]
    headed = ((at, _headings(cells)) for at, cells in enumerate(grid.rows))
    at, places = next(((at, names) for at, names in headed if "motor" in names and "check" in names), (0, {}))
    if not places:
        raise Refusal(f"{path.name}: no row holds the headings {', '.join(NEEDED)}. Write them in the first row.")
    lacking = [name for name in NEEDED if name not in places]
    if lacking:
        raise Refusal(f"{path.name}: the column '{lacking[0]}' is lacking. Headings: {', '.join(HEADINGS)}.")
    rows = _rows(grid.rows[at + 1 :], places, at + 2)
    return DeviationTable(path.name, hashlib.sha256(path.read_bytes()).hexdigest(), tuple(rows))


def _headings(cells: Sequence[CellValue]) -> dict[str, int]:
    return {exact(cell): place for place, cell in enumerate(cells) if isinstance(cell, str)}


def _rows(cells: Sequence[Sequence[CellValue]], places: dict[str, int], first: int) -> list[Deviation]:
    def column(name: str) -> list[CellValue]:
        return [row[places[name]] if name in places else None for row in cells]

    days = column("until")
    day_first = find_day_first(str(day) for day in days if isinstance(day, str))
    read_days = read_date_cells(days, day_first=day_first)
    found = []
    for number, row in enumerate(cells):
        text = {name: _text(row[place]) for name, place in places.items() if place < len(row)}
        if not text.get("motor") and not text.get("check"):
            continue
        day = read_days[number]
        until = day.moment.date() if day.kind is CellKind.DATE and day.moment is not None else None
        ends = [_number(text.get(name, "")) for name in ("low", "high")]
        problem = ""
        if until is None:
            problem = f"its day '{text.get('until', '')}' is none: write it as 2027-06-30"
        found.append(
            Deviation(
                text.get("motor", ""),
                text.get("check", ""),
                text.get("setting", ""),
                text.get("reason", ""),
                text.get("accepted by", ""),
                until,
                text.get("value", ""),
                ends[0],
                ends[1],
                first + number,
                problem,
            )
        )
    return found


def _text(cell: CellValue) -> str:
    return "" if cell is None else cell_text(cell).strip()


def _number(text: str) -> float | None:
    reading = read_number_text(text)
    return reading.number if reading.kind is CellKind.NUMBER else None
