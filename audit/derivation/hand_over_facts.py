"""Facts of a hand-over that came back: what was left, typed, read and altered, counted for each motor.

They are known only at the close-out; expressions of the hand-over pack use them like any quantity.
"""

from __future__ import annotations

from collections.abc import Mapping

import numpy as np
from numpy.typing import NDArray

from audit.fleet.column import NO, NO_CELL, RECORDED, YES, Column
from audit.fleet.fleet import Fleet
from audit.vocabulary.quantities import Quantity
from audit.vocabulary.units import DIMENSIONLESS

_COUNTS = {
    "as_found_not_as_recorded": "settings found in the relay that differ from the recorded ones",
    "as_left_not_as_issued": "settings left that differ from the issued ones",
    "as_left_typed_only": "settings left that were typed and not read from a later export",
    "altered_unasked": "settings altered that nobody asked for",
    "test_values_left": "elements off that were on, and settings at an end of their range",
}
_TRUTHS = {
    "hand_over_returned": "the hand-over sheet came back with rows of the motor",
    "as_found_given": "as-found values were typed",
    "later_export_given": "an export of the relay taken after the work is given",
}
HAND_OVER_FACTS: dict[str, Quantity] = {
    **{
        name: Quantity(name=name, label=label, subject="motor", kind="number", role="derived", unit=DIMENSIONLESS)
        for name, label in _COUNTS.items()
    },
    **{
        name: Quantity(name=name, label=label, subject="motor", kind="truth", role="derived")
        for name, label in _TRUTHS.items()
    },
}


def with_hand_over_facts(fleet: Fleet, told: Mapping[str, Mapping[str, float | bool | None]]) -> Fleet:
    """Give the fleet with these facts of each motor; `told` gives by motor what is known of it."""
    keys = fleet.tables["motor"].keys
    size = len(keys)
    columns = {}
    for name, quantity in HAND_OVER_FACTS.items():
        truth = quantity.kind == "truth"
        column = Column.empty(quantity.kind, size)
        values: NDArray[np.generic] = column.values
        for row, key in enumerate(keys):
            fact = told.get(key, {}).get(name)
            if truth:
                values[row] = YES if fact else NO
            elif fact is not None:
                values[row] = float(fact)
        basis = np.full(size, RECORDED, dtype=np.int8)
        columns[name] = Column(quantity.kind, values, basis, np.full(size, NO_CELL, dtype=np.int64))
    return fleet.with_columns("motor", columns)
