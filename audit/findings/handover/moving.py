"""Ends of a range that move with another setting: where they do so in a straight line, and which line."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, replace

import numpy as np
from numpy.typing import NDArray

from audit.checks.entry import Check
from audit.checks.ranges import permissible_ranges, settings_beneath
from audit.checks.verdicts import Outcome, evaluate_check
from audit.derivation.workings import Workings
from audit.fleet.column import NO_ROW

Floats = NDArray[np.float64]
SPAN = (0.5, 2.0)
"""A line holds while the other setting stays within these multiples of its present value."""
_FACTORS = (0.5, 0.7, 0.9, 1.0, 1.1, 1.5, 2.0)
_STRAIGHT = 1e-6


@dataclass(frozen=True, slots=True)
class Line:
    """end = intercept + slope * other, while the other setting lies within its span."""

    other: str
    intercept: float
    slope: float
    present: float

    def span(self) -> tuple[float, float]:
        """Give the values of the other setting between which the line holds."""
        return self.present * SPAN[0], self.present * SPAN[1]


@dataclass(frozen=True, slots=True)
class MovingEnds:
    """How the ends of one motor's range move; `again` where that is no line in one other setting.

    `words` are the switches and choices beneath the range: while none of them is changed, the lines hold.
    """

    low: Line | None = None
    high: Line | None = None
    again: bool = False
    words: frozenset[str] = frozenset()


class Movements:
    """Finds how ranges move, a setting at a time for all motors at once."""

    def __init__(self, outcomes: Sequence[Outcome], workings: Workings) -> None:
        self._outcomes = outcomes
        self._workings = workings
        self._relay = workings.fleet.parent_rows("motor", "relay")
        self._known: dict[str, dict[str, tuple[Floats, Floats, Floats]]] = {}
        self._words: dict[str, frozenset[str]] = {}

    def of(self, setting: str, motor_row: int) -> MovingEnds:
        """Give how the ends of a motor's range for a setting move."""
        if setting not in self._known:
            self._known[setting] = self._tabulated(setting)
        lows: list[Line] = []
        highs: list[Line] = []
        for other, (present, low, high) in self._known[setting].items():
            for found, ends in ((lows, low[:, motor_row]), (highs, high[:, motor_row])):
                line = _line(other, float(present[motor_row]), ends)
                if line == "crooked":
                    return MovingEnds(again=True, words=self._words[setting])
                if isinstance(line, Line):
                    found.append(line)
        if len(lows) > 1 or len(highs) > 1:
            return MovingEnds(again=True, words=self._words[setting])
        return MovingEnds(lows[0] if lows else None, highs[0] if highs else None, words=self._words[setting])

    def _tabulated(self, setting: str) -> dict[str, tuple[Floats, Floats, Floats]]:
        """For each other setting: its present values, and both ends at multiples of them."""
        concerned = [
            outcome
            for outcome in self._outcomes
            if outcome.check.subject == "motor"
            and any(judged.requirement.setting() == setting for judged in outcome.judged)
        ]
        others: set[str] = set()
        for outcome in concerned:
            nodes = [outcome.check.when]
            for judged in outcome.judged:
                if judged.requirement.setting() == setting:
                    nodes += [n for n in (judged.requirement.bound, judged.requirement.when) if n is not None]
            for node in nodes:
                others |= settings_beneath(node, self._workings, set())
        found = {}
        numbers = {other for other in others - {setting} if self._workings.quantities[other].kind == "number"}
        self._words[setting] = frozenset(others - numbers - {setting})
        for other in sorted(numbers):
            if other not in self._workings.recipes:
                found[other] = self._swept(setting, other, [outcome.check for outcome in concerned])
        return found

    def _swept(self, setting: str, other: str, checks: Sequence[Check]) -> tuple[Floats, Floats, Floats]:
        fleet = self._workings.fleet
        column = self._workings.home_column(other)
        size = fleet.rows("motor")
        low, high = np.full((len(_FACTORS), size), np.nan), np.full((len(_FACTORS), size), np.nan)
        for place, factor in enumerate(_FACTORS):
            moved = fleet.with_columns("relay", {other: replace(column, values=column.values * factor)})
            workings = replace(self._workings, fleet=moved, _columns={}, _views={}, _lacks={})
            outcomes = [evaluate_check(check, workings) for check in checks]
            band = permissible_ranges(outcomes, workings).get(setting)
            if band is not None:
                low[place], high[place] = band.low, band.high
        rows = self._relay if self._relay is not None else np.full(size, NO_ROW)
        return np.append(column.values, np.nan)[rows], low, high


def _line(other: str, present: float, ends: Floats) -> Line | str | None:
    """Give the line through the ends, None where they do not move, 'crooked' where there is no such line."""
    missing = np.isnan(ends)
    if missing.all():
        return None
    if present != present:
        return None
    if missing.any() or present == 0:
        return "crooked"
    scale = max(float(np.abs(ends).max()), 1e-12)
    if float(np.ptp(ends)) <= _STRAIGHT * scale:
        return None
    at = present * np.array(_FACTORS)
    slope = float((ends[-1] - ends[0]) / (at[-1] - at[0]))
    intercept = float(ends[0] - slope * at[0])
    if float(np.abs(intercept + slope * at - ends).max()) > _STRAIGHT * scale:
        return "crooked"
    return Line(other, intercept, slope, present)
