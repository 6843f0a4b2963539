"""Ratios of current and voltage transformers: '200/5', '4200:120', '50:5 (2T)', '600:5 MR @300'."""

from __future__ import annotations

import re

import numpy as np

from audit.intake.celltext import CellKind, CellReading, cell_text, read_number_column
from audit.intake.celltext.characters import plain
from audit.intake.recognition.blocks import BAD, Readings
from audit.intake.recognition.cells_to_readings import read_cells, unit_of
from audit.intake.recognition.source import Cells, Source
from audit.intake.recognition.splits import Split, idle_readings
from audit.vocabulary.quantities import Quantity, vocabulary
from audit.vocabulary.spellings import UnitReading

_ROOT = re.compile(r"/\s*(?:√|sqrt\(?|v)\s*3\)?", re.IGNORECASE)
_TAP = re.compile(r"@\s*(?P<tap>\d+)")
_TURNS = re.compile(r"\(?\s*(?P<turns>\d{1,2})\s*(?:t|turns?)\s*\)?", re.IGNORECASE)


def read_ratio(quantity: Quantity, cells: Cells, source: Source) -> list[Readings]:
    """Read a column of transformer ratios ('200/5', '4200:120') or of primary values alone."""
    secondary = vocabulary().quantities[quantity.name.replace("_primary_", "_secondary_")]
    values = list(cells.values)
    first, second, turns, plainly = Split(), Split(), Split(), []
    column = read_number_column(values, decimal_comma=source.decimal_comma)
    handled = np.zeros(len(values), dtype=bool)
    for place, reading in column.odd.items():
        ratio = _ratio(reading, values[place])
        if ratio is None:
            continue
        handled[place] = True
        primary, low, unit_text, mark = ratio
        unit = unit_of(unit_text, cells.stated(place), quantity) or cells.stated(place) or UnitReading("")
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
    others = read_cells(quantity, cells.part(rest), source)
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
    return idle_readings(dict.fromkeys(places, BAD), [quantity], cells)


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
