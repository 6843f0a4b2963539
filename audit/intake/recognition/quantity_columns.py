"""One way to read the cells of a quantity, whatever else they may hold: ratios, pairs, plain values."""

from __future__ import annotations

from dataclasses import replace

import numpy as np

from audit.intake.celltext import cell_text
from audit.intake.recognition.blocks import Readings
from audit.intake.recognition.cells_to_readings import read_cells
from audit.intake.recognition.combined import holds_pair, read_combined
from audit.intake.recognition.dictionary import combined_readings
from audit.intake.recognition.ratios import read_ratio
from audit.intake.recognition.source import Cells, Source
from audit.vocabulary.quantities import vocabulary

PAIRED = {
    "stated_starts_per_hour": "successive_starts",
    "stated_start_time_s": "start_times",
    "bearing_temperature_trip_c": "bearing_levels",
    "stator_temperature_trip_c": "stator_levels",
    "unbalance_trip_pickup_pct": "unbalance_levels",
}
"""Quantities below whose header '3/2' or '90/100' holds two: cold and hot starts, alarm and trip, ..."""


def read_named(name: str, cells: Cells, source: Source) -> list[Readings]:
    """Read cells of a quantity or of a combined header."""
    if name in combined_readings():
        return read_combined(name, cells, source)
    known = vocabulary().quantities
    quantity = known[name]
    if "_primary_" in name and name.replace("_primary_", "_secondary_") in known:
        return read_ratio(quantity, cells, source)
    if name in PAIRED:
        pairs = np.array([isinstance(value, str) and holds_pair(value) for value in cells.values], dtype=bool)
        if pairs.any():
            rest = read_cells(quantity, cells.part(np.flatnonzero(~pairs)), source)
            return [rest, *_pairs(name, cells.part(np.flatnonzero(pairs)), source)]
    return [read_cells(quantity, cells, source)]


def _pairs(name: str, cells: Cells, source: Source) -> list[Readings]:
    combined = combined_readings()[PAIRED[name]]
    known = vocabulary().quantities
    labels = " and ".join(known[quantity].label for quantity in combined.quantities)
    more = f", and {len(cells.values) - 1} more" if len(cells.values) > 1 else ""
    source.remark(
        int(cells.address[0]),
        f"'{cell_text(cells.values[0])}' below '{cells.header}'{more} holds two values",
        f"one {known[name].label}",
        f"Read as {labels}, the {'greater' if combined.order == 'falling' else 'smaller'} being the first.",
        name,
    )
    # starts an hour and starts in succession are counted in different units
    unit = None if combined.order == "falling" else cells.unit
    return read_combined(PAIRED[name], replace(cells, unit=unit), source)
