"""Cells that hold several quantities: CT ratios, hot and cold stall times, alarm and trip levels, cable sizes."""

from __future__ import annotations

import math
import re
from collections.abc import Sequence
from dataclasses import dataclass, field

import numpy as np

from audit.intake.celltext import KIND_CODES, CellKind, CellReading, cell_text, read_number_column
from audit.intake.celltext.characters import plain
from audit.intake.recognition.blocks import BAD, NOT_USED, OFF, PENDING, VALUE, Readings, filled, objects
from audit.intake.recognition.cells_to_readings import ADVICE, Cells, Source, read_cells, unit_of
from audit.intake.recognition.dictionary import Combined, combined_readings
from audit.vocabulary.quantities import Quantity, vocabulary
from audit.vocabulary.spellings import UnitReading
from audit.vocabulary.wire_sizes import wire_size

_HOT_COLD = re.compile(
    r"(?P<first>\d+)\s*(?:x\s*)?(?P<one>c|cold|h|hot)\s*[/,;+ ]*\s*(?P<second>\d+)\s*(?:x\s*)?(?P<two>c|cold|h|hot)",
    re.IGNORECASE,
)
_ROOT = re.compile(r"/\s*(?:√|sqrt\(?|v)\s*3\)?", re.IGNORECASE)
_TAP = re.compile(r"@\s*(?P<tap>\d+)")
_TURNS = re.compile(r"\(?\s*(?P<turns>\d{1,2})\s*(?:t|turns?)\s*\)?", re.IGNORECASE)
SEVERAL = (CellKind.SEVERAL, CellKind.RANGE)


@dataclass
class _Split:
    """Single values gathered for one quantity of a combined column."""

    places: list[int] = field(default_factory=list)
    numbers: list[float] = field(default_factory=list)
    units: list[UnitReading] = field(default_factory=list)

    def add(self, place: int, number: float, unit: UnitReading) -> None:
        self.places.append(place)
        self.numbers.append(number)
        self.units.append(unit)

    def readings(self, quantity: str, cells: Cells) -> Readings:
        places = np.array(self.places, dtype=np.int64)
        size = len(places)
        return Readings(
            quantity,
            cells.record[places],
            filled(VALUE, size),
            np.array(self.numbers, dtype=np.float64),
            filled(None, size),
            objects([unit.unit for unit in self.units]),
            objects([unit.base for unit in self.units]),
            objects([cell_text(cells.values[place]) for place in self.places]),
            cells.address[places],
            cells.header,
            group=cells.group if isinstance(cells.group, str) else cells.group[places],
        )


def read_combined(name: str, cells: Cells, source: Source) -> list[Readings]:
    """Read a column that holds the quantities of a combined header."""
    combined = combined_readings()[name]
    if name == "cable":
        return _cable(cells, source)
    quantities = [vocabulary().quantities[quantity] for quantity in combined.quantities]
    column = read_number_column(cells.values, decimal_comma=source.decimal_comma, percent=cells.percent)
    splits = [_Split() for _ in quantities]
    idle: dict[int, str] = {}
    single: list[int] = []
    for place in np.flatnonzero(column.kinds != KIND_CODES[CellKind.MISSING]).tolist():
        reading = column.reading(place)
        parts = _parts(reading, cells.values[place])
        stated = _stated(cells, place)
        if len(parts) == 2:
            _pair(place, parts, combined, quantities, stated, splits, cells, source)
        elif reading.kind is CellKind.NUMBER:
            alone = _side(reading.qualifier, combined)
            if alone is None and not combined.alone:
                single.append(place)
                continue
            target = alone if alone is not None else combined.quantities.index(combined.alone)
            unit = unit_of(reading.unit_text, stated, quantities[target])
            if unit is None:
                _bad(place, reading, quantities[target], cells, source, idle)
            else:
                splits[target].add(place, reading.number, unit)
        elif reading.kind is CellKind.OFF or reading.kind is CellKind.NOT_USED:
            if quantities[0].role == "setting":
                idle[place] = OFF if reading.kind is CellKind.OFF else NOT_USED
        elif reading.kind is CellKind.TO_BE_CONFIRMED:
            idle[place] = PENDING
        elif reading.kind is not CellKind.MISSING:
            _bad(place, reading, quantities[0], cells, source, idle)
    if single:
        _ask_once(single, combined, cells, source, idle)
    made = [split.readings(q.name, cells) for split, q in zip(splits, quantities, strict=True)]
    return [*made, *_idle(idle, quantities, cells)]


def _stated(cells: Cells, place: int) -> UnitReading | None:
    if cells.unit is None or isinstance(cells.unit, UnitReading):
        return cells.unit
    return cells.unit[place]


def _parts(reading: CellReading, value: object) -> list[tuple[float, str, str]]:
    """Give the two values of a cell with their units and what stands beside them."""
    if reading.kind in SEVERAL and len(reading.parts) == 2:
        last = reading.parts[1].unit_text
        return [(part.number, part.unit_text or last, part.qualifier) for part in reading.parts]
    if isinstance(value, str):
        match = _HOT_COLD.fullmatch(plain(value))
        if match:
            return [(float(match["first"]), match["one"], ""), (float(match["second"]), match["two"], "")]
    return []


def holds_pair(text: str) -> bool:
    """Tell whether a cell holds two values: '90/100', '3 cold 2 hot'.

    >>> holds_pair("90/100"), holds_pair("2C/1H"), holds_pair("100")
    (True, True, False)
    """
    return len(_parts(read_number_column([text]).reading(0), text)) == 2


def _side(mark: str, combined: Combined) -> int | None:
    """Give which quantity a mark such as 'hot', 'C', 'trip' beside a value names."""
    word = mark.strip(" ()").casefold()
    for place, quantity in enumerate(combined.quantities):
        for sign, words in _SIGNS.items():
            if sign in quantity and word in words:
                return place
    return None


_SIGNS = {
    "_hot_": ("h", "hot", "warm"),
    "_cold_": ("c", "cold"),
    "_trip_": ("t", "trip"),
    "_alarm_": ("a", "alarm", "alm"),
}


def _pair(
    place: int,
    parts: list[tuple[float, str, str]],
    combined: Combined,
    quantities: Sequence[Quantity],
    stated: UnitReading | None,
    splits: list[_Split],
    cells: Cells,
    source: Source,
) -> None:
    """Give the two values of a cell to their quantities: by marks beside them, else by size."""
    sides = [_side(mark or unit, combined) for _, unit, mark in parts]
    if None in sides or sides[0] == sides[1]:
        falling = combined.order == "falling"
        order = sorted(range(2), key=lambda i: parts[i][0], reverse=falling)
        sides = [0, 0]
        sides[order[0]], sides[order[1]] = 0, 1
        if combined.order == "written":
            sides = [0, 1]
    marked = {"h", "c", "hot", "cold"}
    for (number, unit_text, _), side in zip(parts, sides, strict=True):
        assert side is not None
        text = "" if unit_text.casefold() in marked and "_alarm_" not in combined.quantities[0] else unit_text
        unit = unit_of(text, stated, quantities[side])
        if unit is None:
            source.complain(
                int(cells.address[place]),
                f"'{cell_text(cells.values[place])}': '{unit_text}' is no unit of {quantities[side].label}",
                quantities[side].label,
                ADVICE,
                quantities[side].name,
            )
            continue
        splits[side].add(place, number, unit)


def _bad(
    place: int, reading: CellReading, quantity: Quantity, cells: Cells, source: Source, idle: dict[int, str]
) -> None:
    idle[place] = BAD
    source.complain(
        int(cells.address[place]),
        reading.remark or f"'{reading.text}' is not a number",
        quantity.label,
        ADVICE,
        quantity.name,
    )


def _ask_once(places: list[int], combined: Combined, cells: Cells, source: Source, idle: dict[int, str]) -> None:
    more = f", and {len(places) - 1} more" if len(places) > 1 else ""
    source.ask(
        int(cells.address[places[0]]),
        f"'{cell_text(cells.values[places[0]])}' below '{cells.header}'{more}",
        f"{combined.ask} Name the quantity of the column in fleet.toml.",
        combined.quantities,
    )
    idle.update(dict.fromkeys(places, BAD))


def _idle(idle: dict[int, str], quantities: Sequence[Quantity], cells: Cells) -> list[Readings]:
    """Give readings without a value for cells that hold none: off, not used, pending, bad."""
    if not idle:
        return []
    places = np.array(sorted(idle), dtype=np.int64)
    size = len(places)
    return [
        Readings(
            quantity.name,
            cells.record[places],
            objects([idle[place] for place in places.tolist()]),
            np.full(size, math.nan),
            filled(None, size),
            filled("", size),
            filled("", size),
            objects([cell_text(cells.values[place]) for place in places.tolist()]),
            cells.address[places],
            cells.header,
            group=cells.group if isinstance(cells.group, str) else cells.group[places],
        )
        for quantity in quantities
    ]


def read_ratio(quantity: Quantity, cells: Cells, source: Source) -> list[Readings]:
    """Read a column of transformer ratios ('200/5', '4200:120') or of primary values alone."""
    secondary = vocabulary().quantities[quantity.name.replace("_primary_", "_secondary_")]
    values = list(cells.values)
    first, second, turns, plainly = _Split(), _Split(), _Split(), []
    column = read_number_column(values, decimal_comma=source.decimal_comma)
    handled = np.zeros(len(values), dtype=bool)
    for place, reading in column.odd.items():
        ratio = _ratio(reading, values[place])
        if ratio is None:
            continue
        handled[place] = True
        primary, low, unit_text, mark = ratio
        unit = unit_of(unit_text, _stated(cells, place), quantity) or _stated(cells, place) or UnitReading("")
        if low == 1 and ":" in str(values[place]) and quantity.name.endswith("_a"):
            plainly.append(place)
            continue
        if quantity.name.endswith("_v") and low < 20:
            plainly.append(place)
            continue
        first.add(place, primary, unit)
        second.add(place, low, UnitReading("a" if quantity.name.endswith("_a") else "v"))
        count = _TURNS.search(mark)
        if count:
            turns.add(place, float(count["turns"]), UnitReading("x"))
    blank: list[Readings] = []
    if plainly:
        blank = _ask_ratio(plainly, quantity, cells, source)
    rest = np.flatnonzero(~handled)
    others = read_cells(quantity, part_of(cells, rest), source)
    made = [first.readings(quantity.name, cells), others, second.readings(secondary.name, cells), *blank]
    if turns.places and quantity.name == "ct_primary_a":
        made.append(turns.readings("ct_turns", cells))
    return made


def _ask_ratio(places: list[int], quantity: Quantity, cells: Cells, source: Source) -> list[Readings]:
    """Ask about '40:1', which states rated currents at one site and a ratio of turns at another."""
    written = cell_text(cells.values[places[0]])
    more = f", and {len(places) - 1} more" if len(places) > 1 else ""
    source.ask(
        int(cells.address[places[0]]),
        f"'{written}' below '{cells.header}'{more} may state rated values or a ratio of turns",
        f"Write both rated values of the transformer ({quantity.label} and its secondary), such as 200/5.",
    )
    return _idle(dict.fromkeys(places, BAD), [quantity], cells)


def _ratio(reading: CellReading, value: object) -> tuple[float, float, str, str] | None:
    """Give primary, secondary, unit and what stands beside them, or None where a cell is no ratio."""
    parts = reading.parts
    if reading.kind is CellKind.BAD and isinstance(value, str) and _ROOT.search(value):
        # both sides of a VT between line and earth are divided by root three: the ratio stands as written
        text = _ROOT.sub("", plain(value))
        again = read_number_column([text]).odd.get(0)
        if again is None:
            return None
        reading, parts = again, again.parts
    if reading.kind is not CellKind.SEVERAL or len(parts) < 2:
        return None
    lows = {part.number for part in parts[1:]}
    if len(lows) > 1 and reading.numbers[1] < reading.numbers[0] / 100:
        # a third winding for earth-fault detection
        lows = {parts[1].number}
    if len(lows) != 1:
        return None
    low = lows.pop()
    primary = parts[0].number
    mark = " ".join(part.qualifier for part in parts) + " " + " ".join(part.unit_text for part in parts)
    tap = _TAP.search(mark)
    if tap:
        primary = float(tap["tap"])
    unit = parts[0].unit_text
    return (primary, low, unit, mark) if primary > low else None


def _cable(cells: Cells, source: Source) -> list[Readings]:
    """Read conductor sizes with cores and parallel runs: '3C x 70', '2x(3x240)', '#2/0 AWG'."""
    known = vocabulary().quantities
    size, runs = _Split(), _Split()
    idle: dict[int, str] = {}
    gauge = _stated(cells, 0) if len(cells.values) else None
    suffix = {"awg": " AWG", "kcmil": " kcmil"}.get(gauge.unit if gauge else "", "")
    for place, value in enumerate(cells.values):
        text = cell_text(value)
        if not text:
            continue
        reading = read_number_column([text], decimal_comma=source.decimal_comma).reading(0)
        if reading.kind in (CellKind.MISSING, CellKind.NOT_USED, CellKind.OFF):
            continue
        if reading.kind is CellKind.TO_BE_CONFIRMED:
            idle[place] = PENDING
            continue
        bare = bool(suffix) and not any(word in text.casefold() for word in ("awg", "mcm", "mm", "cmil"))
        found = wire_size(text + suffix if bare else text)
        if found is None:
            idle[place] = BAD
            source.complain(
                int(cells.address[place]),
                f"'{text}' is not a conductor size",
                "a size such as '3C x 70 mm2' or '2/0 AWG'",
                ADVICE,
                "cable_size_mm2",
            )
            continue
        size.add(place, found.mm2, UnitReading("mm2"))
        if found.runs is not None:
            runs.add(place, float(found.runs), UnitReading("x"))
    made = [size.readings("cable_size_mm2", cells), runs.readings("cable_runs", cells)]
    return [*made, *_idle(idle, [known["cable_size_mm2"]], cells)]


def part_of(cells: Cells, places: np.ndarray) -> Cells:
    """Give some of the cells."""
    chosen = places.tolist()
    unit = cells.unit
    return Cells(
        [cells.values[place] for place in chosen],
        cells.address[places],
        cells.record[places],
        unit if unit is None or isinstance(unit, UnitReading) else [unit[place] for place in chosen],
        None if cells.percent is None else cells.percent[places],
        None if cells.struck is None else cells.struck[places],
        cells.header,
        cells.group if isinstance(cells.group, str) else cells.group[places],
    )
