"""A setting as the site's own export writes it: its words, unit and base, and how they become a primary value."""

from __future__ import annotations

from collections import Counter
from dataclasses import dataclass

import numpy as np
import pandas as pd

from audit.expression.values import NO, YES
from audit.fleet.addresses import Place
from audit.fleet.column import NO_CELL
from audit.fleet.fleet import Fleet
from audit.intake.resolve.codes import truth_of
from audit.intake.resolve.numbers import BASE_SPELLINGS
from audit.intake.resolve.units import Way, plan_of
from audit.vocabulary.quantities import Quantity, vocabulary
from audit.vocabulary.spellings import name_of
from audit.vocabulary.units import UNITS

MOST_DECIMALS = 4
_UNIT_WORDS = {"x": "x", "ms": "ms", "cycles": "cycles", "f": "°F", "ma": "mA", "h": "h", "per_day": "per day"}
_SIDES = {"secondary": "sec", "primary": "pri"}


@dataclass(frozen=True, slots=True)
class WrittenSetting:
    """A setting in the words of the export that it was read from."""

    quantity: str
    """What the cell holds; for a trip that is told off by 'OFF' in its pickup, the pickup."""
    header: str
    written: str
    unit: str
    """Unit and base as one reads them: '% FLA', 'A sec', 's'; '' for words."""
    unit_code: str
    base: str
    number: float
    factor: float
    offset: float
    """primary value = (number + offset) * factor; NaN where the export does not tell."""
    step: float
    place: Place | None
    on_word: str = "ON"
    off_word: str = "OFF"

    def primary(self, number: float) -> float:
        """Give the value in the quantity's own unit."""
        return (number + self.offset) * self.factor

    def number_for(self, primary: float) -> float:
        """Give the number to write for a value in the quantity's own unit."""
        return primary / self.factor - self.offset


class WrittenSettings:
    """Finds settings in the readings of a fleet."""

    def __init__(self, fleet: Fleet) -> None:
        self._fleet = fleet
        readings = fleet.readings
        self._relay = readings[(readings["subject"] == "relay").to_numpy()] if len(readings) else readings
        self._at: dict[int, list[int]] = {}
        self._steps: dict[tuple[str, str, str, str], float] = {}
        self._words: dict[str, tuple[str, str]] = {}
        for position, cell in enumerate(self._relay["cell"].tolist() if len(self._relay) else ()):
            self._at.setdefault(cell, []).append(position)

    def of(self, setting: str, relay_row: int) -> WrittenSetting:
        """Give a setting of a relay as written; empty words where the export does not hold it."""
        quantity = vocabulary().quantities[setting]
        table = self._fleet.tables["relay"]
        column = table.columns.get(setting)
        cell = int(column.cell[relay_row]) if column is not None else NO_CELL
        found = self._reading(cell, setting)
        if found is None:
            symbol = quantity.unit.symbol if quantity.unit else ""
            code = name_of(quantity.unit) if quantity.unit and quantity.kind == "number" else ""
            return WrittenSetting(setting, "", "", symbol, code, "", np.nan, 1.0, 0.0, np.nan, None)
        held = vocabulary().quantities[str(found["quantity"])]
        held_column = table.columns[held.name]
        value = float(held_column.values[relay_row]) if held.kind == "number" else np.nan
        factor, offset = _conversion(held, found, value)
        on_word, off_word = self._on_and_off(held)
        return WrittenSetting(
            quantity=held.name,
            header=str(found["header"]),
            written=str(found["written"]),
            unit=unit_words(held, str(found["unit"]), str(found["base"])),
            unit_code=str(found["unit"]),
            base=str(found["base"]),
            number=float(found["number"]),
            factor=factor,
            offset=offset,
            step=self._step(held, found),
            place=self._fleet.book.place(cell),
            on_word=on_word,
            off_word=off_word,
        )

    def _reading(self, cell: int, setting: str) -> pd.Series | None:
        if cell == NO_CELL:
            return None
        positions = self._at.get(cell, [])
        own = [p for p in positions if self._relay["quantity"].iat[p] == setting]
        settings = vocabulary().settings()
        others = [p for p in positions if self._relay["quantity"].iat[p] in settings]
        chosen = (own or others)[:1]
        return self._relay.iloc[chosen[0]] if chosen else None

    def _step(self, quantity: Quantity, found: pd.Series) -> float:
        """Give one of the last digit in which the export writes this setting."""
        if quantity.kind != "number":
            return np.nan
        key = (quantity.name, str(found["unit"]), str(found["base"]), str(found["header"]))
        if key not in self._steps:
            same = np.logical_and.reduce(
                [
                    (self._relay[name] == word).to_numpy()
                    for name, word in zip(("quantity", "unit", "base", "header"), key, strict=True)
                ]
            )
            numbers = self._relay["number"].to_numpy()[same]
            numbers = numbers[~np.isnan(numbers)]
            self._steps[key] = step_of(numbers)
        return self._steps[key]

    def _on_and_off(self, quantity: Quantity) -> tuple[str, str]:
        """Give the words that the export writes most often for on and off."""
        if quantity.kind != "truth":
            return "ON", "OFF"
        if quantity.name not in self._words:
            counts = Counter(self._relay["written"][(self._relay["quantity"] == quantity.name).to_numpy()].astype(str))
            found = {YES: "ON", NO: "OFF"}
            for code in found:
                words = [word for word, _ in counts.most_common() if truth_of(word, quantity.part) == code]
                found[code] = words[0] if words else found[code]
            self._words[quantity.name] = found[YES], found[NO]
        return self._words[quantity.name]


def _conversion(quantity: Quantity, found: pd.Series, value: float) -> tuple[float, float]:
    if quantity.kind != "number":
        return 1.0, 0.0
    number = float(found["number"])
    plan = plan_of(quantity.name, str(found["unit"]), str(found["base"]), str(found["header"]))
    if plan.way in (Way.PLAIN, Way.BARE):
        planned = (number + plan.offset) * plan.factor
        if not abs(planned - value) > 1e-6 * max(abs(value), 1e-9):
            return plan.factor, plan.offset
    if number == 0 or number != number or value != value:
        return np.nan, 0.0
    return value / number, 0.0


def step_of(numbers: np.ndarray[tuple[int, ...], np.dtype[np.float64]]) -> float:
    """Give one of the last digit that these numbers need, at most four after the point.

    >>> step_of(np.array([55.0, 28.5])), step_of(np.array([1.0, 0.05])), step_of(np.array([]))
    (0.1, 0.01, nan)
    """
    if not len(numbers):
        return float("nan")
    for decimals in range(MOST_DECIMALS):
        if np.allclose(np.round(numbers, decimals), numbers, rtol=1e-9, atol=1e-9):
            return float(10.0**-decimals)
    return float(10.0**-MOST_DECIMALS)


def unit_words(quantity: Quantity, unit: str, base: str) -> str:
    """Write unit and base as one reads them on a relay.

    >>> known = vocabulary().quantities
    >>> unit_words(known["jam_trip_pickup_a"], "pct", "full_load"), unit_words(known["jam_trip_pickup_a"], "", "")
    ('% FLA', 'A')
    """
    if quantity.kind != "number":
        return ""
    if not unit:
        own = quantity.unit.symbol if quantity.unit else ""
        return f"x {BASE_SPELLINGS[base]}" if base in BASE_SPELLINGS and not own else own
    word = _UNIT_WORDS.get(unit) or (UNITS[unit].symbol if unit in UNITS else unit)
    beside = BASE_SPELLINGS.get(base) or _SIDES.get(base, "")
    return f"{word} {beside}".strip()
