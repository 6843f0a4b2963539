"""Curves as points, a row a point: thermal limits of motors, melting and clearing times of fuses."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass, field

import numpy as np

from audit.fleet.folding import exact
from audit.intake.celltext import cell_text, read_number_column
from audit.intake.opening import SheetGrid
from audit.intake.recognition.blocks import Readings
from audit.intake.recognition.folding import fold_header
from audit.intake.recognition.header_rows import SEARCHED_ROWS
from audit.intake.recognition.header_units import split_units
from audit.intake.recognition.matching import match_header
from audit.intake.recognition.sheets import Sheet, said

_CURRENT = frozenset(["current", "i", "line current", "amps", "stator current", "fault current", "prospective current"])
_TIMES = {
    "time": frozenset(["time", "t", "limit time", "withstand time", "thermal limit", "permissible time"]),
    "hot": frozenset(["hot", "time hot", "hot time", "t hot", "limit hot", "hot limit", "thermal limit hot", "warm"]),
    "cold": frozenset(["cold", "time cold", "cold time", "t cold", "limit cold", "cold limit", "thermal limit cold"]),
    "melting": frozenset(
        ["melting", "melting time", "min melting time", "minimum melting time", "pre-arcing time", "pre arcing time",
         "prearcing time", "melt time", "average melting time"]
    ),
    "clearing": frozenset(
        ["clearing", "clearing time", "total clearing", "total clearing time", "max clearing time", "operating time"]
    ),
}  # fmt: skip
_STATE = frozenset(["hot/cold", "cold/hot", "state", "condition", "from", "hot or cold", "curve", "start from"])
_SECONDS = {"s": 1.0, "ms": 1e-3, "min": 60.0}
_AMPERES = {"a": 1.0, "ka": 1e3}
FEWEST_POINTS = 2


@dataclass(frozen=True)
class PointsHeading:
    """Header row of a table of points and the column of each role."""

    row: int
    of_fuses: bool
    roles: Mapping[str, int]
    units: Mapping[str, str]


@dataclass
class _Curve:
    points: list[tuple[float, float]] = field(default_factory=list)
    cell: int = -1
    multiples: bool = False


def find_points(grid: SheetGrid) -> PointsHeading | None:
    """Find the header row of a table of points, or None."""
    for row in range(1, min(grid.height, SEARCHED_ROWS) + 1):
        roles: dict[str, int] = {}
        units: dict[str, str] = {}
        for column, value in enumerate(grid.rows[row - 1], 1):
            if isinstance(value, str):
                role, unit = _role(value)
                if role and role not in roles:
                    roles[role], units[role] = column, unit
        times = [role for role in _TIMES if role in roles]
        key = "fuse" if "fuse" in roles else "motor"
        if key in roles and "current" in roles and times and _keys_repeat(grid, row, roles[key]):
            of_fuses = key == "fuse"
            if of_fuses != bool({"melting", "clearing"} & set(times)) or ("time" in roles and "state" not in roles):
                continue
            return PointsHeading(row, of_fuses, roles, units)
    return None


def _keys_repeat(grid: SheetGrid, row: int, column: int) -> bool:
    keys = [exact(text) for r in range(row + 1, grid.height + 1) if (text := cell_text(grid.rows[r - 1][column - 1]))]
    return len(keys) < (grid.height - row) or (len(keys) >= FEWEST_POINTS and len(set(keys)) <= len(keys) / 2)


def _role(text: str) -> tuple[str, str]:
    for words, unit in split_units(text):
        folded = fold_header(words)
        if folded in _CURRENT:
            return "current", unit
        for role, names in _TIMES.items():
            if folded in names:
                return role, unit
        if folded in _STATE:
            return "state", ""
        if match_header(words, "motor").quantity in ("fuse", "motor"):
            return match_header(words, "motor").quantity, ""
    return "", ""


def read_points(
    sheet: Sheet,
    heading: PointsHeading,
    motors: Mapping[str, Sequence[int]],
    fuses: Mapping[str, Sequence[int]],
    full_load_a: Mapping[int, float],
) -> bool:
    """Read curves as texts of points for the motors (by tag or by fuse) of the motor list."""
    grid, roles = sheet.grid, heading.roles
    key_role = "fuse" if heading.of_fuses else "motor"
    curves: dict[tuple[str, str], _Curve] = {}
    numbers = {
        role: read_number_column(grid.column(column, heading.row + 1), decimal_comma=sheet.source.decimal_comma)
        for role, column in roles.items()
        if role == "current" or role in _TIMES
    }
    key = ""
    for place, row in enumerate(range(heading.row + 1, grid.height + 1)):
        key = sheet.text(row, roles[key_role]) or key
        current = numbers["current"].reading(place)
        if not key or np.isnan(current.number):
            continue
        unit = (current.unit_text or heading.units["current"] or "A").casefold()
        multiple = unit not in _AMPERES
        for role in _TIMES:
            if role not in numbers or np.isnan(numbers[role].values[place]):
                continue
            kind = _kind(role, sheet.text(row, roles["state"]) if "state" in roles else "")
            time = numbers[role].reading(place)
            seconds = time.number * _SECONDS.get((time.unit_text or heading.units[role] or "s").casefold(), 1.0)
            if not kind:
                continue
            curve = curves.setdefault((exact(key), kind), _Curve(cell=sheet.address(row, roles[key_role])))
            curve.points.append((current.number * _AMPERES.get(unit, 1.0), seconds))
            curve.multiples = curve.multiples or multiple
    records = fuses if heading.of_fuses else motors
    made = [block for (name, kind), curve in curves.items() for block in _readings(kind, curve, records.get(name, ()),
                                                                                   full_load_a)]  # fmt: skip
    for block in made:
        sheet.keep(block, "motor", "points")
    _say(sheet, heading, curves, records, full_load_a)
    return bool(made)


def _kind(role: str, state: str) -> str:
    if role == "time":
        folded = fold_header(state)
        role = "hot" if folded in ("hot", "warm", "h") else "cold" if folded in ("cold", "c") else ""
    return {
        "hot": "hot_limit_curve",
        "cold": "cold_limit_curve",
        "melting": "fuse_melting_curve",
        "clearing": "fuse_clearing_curve",
    }.get(role, "")


def _readings(kind: str, curve: _Curve, records: Sequence[int], full_load_a: Mapping[int, float]) -> list[Readings]:
    made = []
    for record in records:
        base = full_load_a.get(record) if curve.multiples else 1.0
        if base is None:
            continue
        points = sorted((current * base, seconds) for current, seconds in curve.points)
        text = "; ".join(f"{current:.6g} A: {seconds:.6g} s" for current, seconds in points)
        made.append(said(kind, np.array([record]), [text], np.array([curve.cell], dtype=np.int64), "points"))
    return made


def _say(
    sheet: Sheet,
    heading: PointsHeading,
    curves: Mapping[tuple[str, str], _Curve],
    records: Mapping[str, Sequence[int]],
    full_load_a: Mapping[int, float],
) -> None:
    what = "fuse" if heading.of_fuses else "motor"
    for (name, kind), curve in curves.items():
        found = records.get(name, ())
        if not found:
            sheet.source.complain(
                curve.cell,
                f"points of {what} '{name}', which the motor list does not name",
                f"a {what} of the motor list",
                "These points are left out.",
                kind,
            )
        elif curve.multiples and not any(record in full_load_a for record in found):
            sheet.source.complain(
                curve.cell,
                f"points of '{name}' are multiples of the full-load current, which is not known in amperes",
                "currents in A, or a full-load current",
                "These points are left out.",
                kind,
            )
    for role, column in heading.roles.items():
        sheet.understood(
            sheet.text(heading.row, column),
            sheet.address(heading.row, column),
            "motor",
            "" if role in ("current", "state") else _kind(role, "hot") if role in _TIMES else role,
            None,
            sheet.text(heading.row + 1, column)[:40],
            "synonym",
        )
