"""Values taken out of cells that hold several, gathered for one quantity."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass, field

import numpy as np

from audit.intake.celltext import cell_text
from audit.intake.recognition.blocks import VALUE, Readings, filled, objects
from audit.intake.recognition.source import Cells
from audit.vocabulary.quantities import Quantity
from audit.vocabulary.spellings import UnitReading


@dataclass
class Split:
    """Single values gathered for one quantity of a combined column."""

    places: list[int] = field(default_factory=list)
    numbers: list[float] = field(default_factory=list)
    units: list[UnitReading] = field(default_factory=list)

    def add(self, place: int, number: float, unit: UnitReading) -> None:
        """Take a value for the cell at a place."""
        self.places.append(place)
        self.numbers.append(number)
        self.units.append(unit)

    def readings(self, quantity: str, cells: Cells) -> Readings:
        """Give the values as readings of a quantity."""
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


def idle_readings(idle: dict[int, str], quantities: Sequence[Quantity], cells: Cells) -> list[Readings]:
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
