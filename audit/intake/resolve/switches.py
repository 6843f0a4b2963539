"""Whether an element is on: said in a column of its own, or by what stands where its pickup or delay belongs."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from audit.fleet.column import ASSUMED, NO, STATED, UNKNOWN, YES, Bytes
from audit.intake.resolve.codes import UNREAD
from audit.intake.resolve.ledger import Ledger
from audit.intake.resolve.pick import NOT_READ, NOT_USED, OFF, VALUE, Picked
from audit.vocabulary.quantities import Quantity, vocabulary

PARTS = {"trip_on": ("trip_pickup", "trip_delay"), "alarm_on": ("alarm_pickup", "alarm_delay")}
"""Where the state of a trip or alarm shows when nothing says it: in the pickup, else in the delay."""


@dataclass(frozen=True, slots=True)
class Switch:
    """The quantity that says whether a trip or alarm is on, and those whose cells tell it as well."""

    on: Quantity
    settings: tuple[Quantity, ...]


def switches() -> Iterator[Switch]:
    """Give the trips and alarms of all elements.

    >>> [setting.name for setting in next(switches()).settings]
    ['short_circuit_trip_pickup_a', 'short_circuit_trip_delay_s']
    """
    settings = vocabulary().settings()
    by_part = {(quantity.element, quantity.part): quantity for quantity in settings.values() if quantity.part != "own"}
    for quantity in settings.values():
        parts = PARTS.get(quantity.part or "", ())
        if parts:
            found = [by_part.get((quantity.element, part)) for part in parts]
            yield Switch(quantity, tuple(setting for setting in found if setting is not None))


def switch(one: Switch, picked: Mapping[str, Picked], ledger: Ledger) -> Bytes:
    """Settle in place whether a trip or alarm is on; give the basis of each row.

    A number says on, a word for off says off, '-' or 'N/A' says not used: off, as an assumption. A column of
    its own goes before; where it says on and the pickup says off, nobody knows.
    """
    own = picked[one.on.name]
    basis = np.full(len(own.values), STATED, dtype=np.int8)
    own.values[own.state == OFF] = NO
    unused = own.state == NOT_USED
    own.values[unused], basis[unused] = NO, ASSUMED
    for setting in one.settings:
        shown = picked[setting.name]
        open_ = (own.state == NOT_READ) & (shown.state != NOT_READ)
        for state, code in ((VALUE, YES), (OFF, NO), (NOT_USED, NO)):
            own.values[open_ & (shown.state == state)] = code
        basis[open_ & (shown.state == NOT_USED)] = ASSUMED
        own.cell[open_] = shown.cell[open_]
        own.reading[open_] = shown.reading[open_]
        own.state[open_] = shown.state[open_]
    _contradictions(one, own, picked, ledger)
    return basis


def _contradictions(one: Switch, own: Picked, picked: Mapping[str, Picked], ledger: Ledger) -> None:
    for setting in one.settings[:1]:
        shown = picked[setting.name]
        against = np.flatnonzero((own.values == YES) & (shown.state == OFF) & (own.cell != shown.cell))
        for row in against.tolist():
            place = ledger.place(int(own.cell[row]))
            ledger.complain(
                int(shown.cell[row]),
                f"{setting.label} is off here, but sheet '{place.sheet}', cell {place.cell}, says that it is on",
                "one state for an element",
                "Correct one of them; whether it is on counts as unknown until then.",
                quantity=one.on.name,
                subject="relay",
            )
        own.values[against] = UNREAD


def as_codes(values: NDArray[np.int16]) -> Bytes:
    """Give the codes of yes and no, unknown where nothing was read or understood."""
    return np.where(values == UNREAD, UNKNOWN, values).astype(np.int8)
