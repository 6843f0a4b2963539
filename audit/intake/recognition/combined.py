"""Cells that hold several quantities: hot and cold stall times, cold and hot starts, alarm and trip levels."""

from __future__ import annotations

import re
from collections.abc import Sequence

import numpy as np

from audit.intake.celltext import KIND_CODES, CellKind, CellReading, cell_text, read_number_column
from audit.intake.celltext.characters import plain
from audit.intake.recognition.blocks import BAD, NOT_USED, OFF, PENDING, Readings
from audit.intake.recognition.cables import read_cables
from audit.intake.recognition.cells_to_readings import unit_of
from audit.intake.recognition.dictionary import Combined, combined_readings
from audit.intake.recognition.source import ADVICE, Cells, Source
from audit.intake.recognition.splits import Split, idle_readings
from audit.vocabulary.quantities import Quantity, vocabulary
from audit.vocabulary.spellings import UnitReading

_HOT_COLD = re.compile(
    r"(?P<first>\d+)\s*(?:x\s*)?(?P<one>c|cold|h|hot)\s*[/,;+ ]*\s*(?P<second>\d+)\s*(?:x\s*)?(?P<two>c|cold|h|hot)",
    re.IGNORECASE,
)
SEVERAL = (CellKind.SEVERAL, CellKind.RANGE)


def read_combined(name: str, cells: Cells, source: Source) -> list[Readings]:
    """Read a column that holds the quantities of a combined header."""
    combined = combined_readings()[name]
    if name == "cable":
        return read_cables(cells, source)
    quantities = [vocabulary().quantities[quantity] for quantity in combined.quantities]
    column = read_number_column(cells.values, decimal_comma=source.decimal_comma, percent=cells.percent)
    splits = [Split() for _ in quantities]
    idle: dict[int, str] = {}
    single: list[int] = []
    for place in np.flatnonzero(column.kinds != KIND_CODES[CellKind.MISSING]).tolist():
        reading = column.reading(place)
        parts = _parts(reading, cells.values[place])
        stated = cells.stated(place)
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
    return [*made, *idle_readings(idle, quantities, cells)]


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
    splits: list[Split],
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
