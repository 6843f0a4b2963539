"""A fleet straight from lists of values: for worked cases, tests and small studies."""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence
from datetime import date, datetime
from typing import Any

import numpy as np

from audit.fleet.addresses import SheetBook
from audit.fleet.column import BASIS_NAMES, NO, NO_ROW, RECORDED, STATED, YES, Column, Integers, missing_of
from audit.fleet.fleet import Fleet, Table
from audit.vocabulary.quantities import Quantity, fold_choice, vocabulary

Row = Mapping[str, Any]
NAMES_ITSELF = {"motor": "motor", "relay": "relay_tag", "bus": "bus_name", "start": "start_motor"}
"""The quantity that holds the key of each table's rows; a start names its motor."""
EPOCH = datetime(1970, 1, 1)


def fleet_of(
    motor: Sequence[Row] = (),
    relay: Sequence[Row] = (),
    bus: Sequence[Row] = (),
    start: Sequence[Row] = (),
    site: str = "test",
    facts: Mapping[str, str] | None = None,
) -> Fleet:
    """Build a fleet from rows of vocabulary quantities.

    A value is a number, True or False, a choice, a text or a date; None is missing; ``(value, basis)`` states
    the basis. Motors join relays and buses by the texts `relay` and `bus`, starts join motors by `start_motor`.
    A motor that names no relay takes the relay at its own position where there are as many relays as motors; a
    single bus serves every motor that names none, a single motor every start.

    >>> fleet = fleet_of(motor=[{"motor": "P-1", "full_load_a": 100}], relay=[{"jam_trip_on": True}])
    >>> fleet.tables["motor"].columns["full_load_a"].values.item(), fleet.links["motor", "relay"].tolist()
    (100.0, [0])
    """
    given = {"motor": list(motor), "relay": list(relay), "bus": list(bus), "start": list(start)}
    tables = {subject: _table(subject, rows) for subject, rows in given.items()}
    motor_relay = _named(tables["motor"], "relay", tables["relay"])
    if len(relay) == len(motor):
        unnamed = tables["motor"].columns["relay"].missing()
        motor_relay = np.where(unnamed, np.arange(len(motor)), motor_relay)
    relay_motor = np.full(len(relay), NO_ROW, dtype=np.int64)
    for row in reversed(range(len(motor))):
        if motor_relay[row] >= 0:
            relay_motor[motor_relay[row]] = row
    links = {
        ("start", "motor"): _named(tables["start"], "start_motor", tables["motor"], only=True),
        ("motor", "relay"): motor_relay,
        ("motor", "bus"): _named(tables["motor"], "bus", tables["bus"], only=True),
        ("relay", "motor"): relay_motor,
    }
    return Fleet(site=site, tables=tables, links=links, book=SheetBook(), facts=dict(facts or {}))


def _table(subject: str, rows: Sequence[Row]) -> Table:
    known = vocabulary().of_subject(subject)
    for name in {name for row in rows for name in row}:
        if name not in known or known[name].role == "derived":
            raise ValueError(f"{name} is not a quantity that a {subject} is given")
    columns = {
        name: column_of(quantity, [row.get(name) for row in rows])
        for name, quantity in known.items()
        if quantity.role != "derived"
    }
    if subject == "start":
        keys = tuple(f"start {number}" for number in range(1, len(rows) + 1))
    else:
        keys = tuple(str(row.get(NAMES_ITSELF[subject]) or f"{subject} {number}") for number, row in enumerate(rows, 1))
    return Table(subject, keys, columns)


def column_of(quantity: Quantity, values: Iterable[Any]) -> Column:
    """Give a column of a quantity from plain Python values; a quantity whose absence means no is then no.

    >>> from audit.vocabulary.quantities import vocabulary
    >>> column_of(vocabulary().quantities["must_run"], [True, None]).values.tolist()
    [2, 0]
    """
    given = list(values)
    kind = quantity.kind
    default = RECORDED if quantity.subject == "start" else STATED
    column = Column.empty(kind, len(given), quantity.choices)
    out, basis = missing_of(kind, len(given)), np.full(len(given), default, dtype=np.int8)
    for row, value in enumerate(given):
        if isinstance(value, tuple):
            value, stated = value
            basis[row] = BASIS_NAMES.index(stated) if isinstance(stated, str) else stated
        if value is None:
            if quantity.absent_means_no:
                out[row] = NO
        else:
            out[row] = _coded(quantity, value)
    return Column(kind, out, basis, column.cell, choices=quantity.choices)


def _coded(quantity: Quantity, value: Any) -> Any:
    if quantity.kind == "truth":
        if not isinstance(value, (bool, np.bool_)):
            raise ValueError(f"{quantity.name} is True or False, not {value!r}")
        return YES if value else NO
    if quantity.kind == "choice":
        choice = (quantity.spellings or {}).get(fold_choice(str(value)))
        if choice is None:
            raise ValueError(f"{quantity.name} is one of {', '.join(quantity.choices)}, not {value!r}")
        return quantity.choices.index(choice)
    if quantity.kind == "date" and isinstance(value, (date, str)):
        moment = datetime.fromisoformat(str(value))
        return (moment.replace(tzinfo=None) - EPOCH).total_seconds() / 86400
    if quantity.kind == "text":
        return str(value)
    if isinstance(value, (bool, str)):
        raise ValueError(f"{quantity.name} is a number, not {value!r}")
    return float(value)


def _named(child: Table, quantity: str, parent: Table, only: bool = False) -> Integers:
    """Rows of the parent that the child's texts name; with `only`, a single parent serves those that name none."""
    rows: dict[str, int] = {}
    for row, key in enumerate(parent.keys):
        rows.setdefault(key.strip().casefold(), row)
    alone = 0 if only and len(parent) == 1 else NO_ROW
    found = [
        alone if name is None else rows.get(str(name).strip().casefold(), NO_ROW)
        for name in child.columns[quantity].values
    ]
    return np.array(found, dtype=np.int64)
