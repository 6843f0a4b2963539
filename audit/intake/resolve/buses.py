"""The rows of the bus and start tables, and the bus and motor that each names."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from dataclasses import dataclass, field

import numpy as np

from audit.fleet.column import NO_CELL, NO_ROW, Integers
from audit.intake.resolve.joins import joined
from audit.intake.resolve.ledger import Ledger
from audit.intake.resolve.motors import MotorRows
from audit.intake.resolve.names import Names, exact
from audit.intake.resolve.records import Name, Record


@dataclass
class BusRows:
    """The buses, the bus of each motor, and the row of each record that speaks of one."""

    keys: list[str] = field(default_factory=list)
    row_of_record: dict[int, int] = field(default_factory=dict)
    motor_bus: Integers = field(default_factory=lambda: np.empty(0, dtype=np.int64))


@dataclass
class StartRows:
    """The starts and the motor of each."""

    keys: list[str] = field(default_factory=list)
    row_of_record: dict[int, int] = field(default_factory=dict)
    start_motor: Integers = field(default_factory=lambda: np.empty(0, dtype=np.int64))


def bus_rows(
    records: Iterable[Record],
    telling: set[int],
    motors: MotorRows,
    said_elsewhere: Mapping[int, Name],
    ledger: Ledger,
) -> BusRows:
    """Find the buses of the bus list, and those that only rows of motors speak of (records `telling`).

    `said_elsewhere` names the bus of motors whose own rows do not, from the rows of their relays.
    """
    told = BusRows()
    names = Names()

    def named(name: str) -> int:
        row = names.rows.get(exact(name))
        if row is None:
            row = len(told.keys)
            names.add(name, row)
            told.keys.append(name)
        return row

    for record in records:
        if record.table != "bus":
            continue
        if record.bus is None:
            ledger.complain(
                record.cell, "a row of the bus list has no name", "a name in each row", "It is left out.", subject="bus"
            )
        else:
            told.row_of_record[record.number] = named(record.bus.text)
    wanted = [motors.first(row, "bus") or said_elsewhere.get(row) for row in range(len(motors.keys))]
    told.motor_bus = joined(wanted, names, told.keys, "bus", ledger).rows
    for row, of_motor in enumerate(motors.records):
        speaking = [record for record in of_motor if record.number in telling]
        if speaking and told.motor_bus[row] < 0:
            own = wanted[row] or Name(f"bus of {motors.keys[row]}", NO_CELL)
            told.motor_bus[row] = named(own.text)
        told.row_of_record.update((record.number, int(told.motor_bus[row])) for record in speaking)
    for row, name in enumerate(wanted):
        if name is not None and told.motor_bus[row] < 0:
            told.motor_bus[row] = max(names.rows.get(exact(name.text), NO_ROW), NO_ROW)
    return told


def start_rows(records: Iterable[Record], motors: MotorRows, ledger: Ledger) -> StartRows:
    """Find the starts; one that names no motor is left out, one of an unknown motor is kept and said."""
    told = StartRows()
    named: list[Name] = []
    for record in records:
        if record.table != "start":
            continue
        if record.motor is None:
            ledger.complain(
                record.cell,
                "a start names no motor",
                "the tag of the motor in each row",
                "It is left out.",
                subject="start",
            )
            continue
        told.row_of_record[record.number] = len(named)
        named.append(record.motor)
    met = joined(named, motors.names, motors.keys, "motor", ledger)
    told.start_motor = met.rows
    told.keys = [f"{name.text} start {number}" for name, number in zip(named, _counted(named), strict=True)]
    strangers = (met.rows < 0) & ~met.ambiguous
    _complain_strangers([named[row] for row in strangers.nonzero()[0].tolist()], ledger)
    return told


def _counted(named: list[Name]) -> list[int]:
    counts: dict[str, int] = {}
    numbers = []
    for name in named:
        counts[exact(name.text)] = counts.get(exact(name.text), 0) + 1
        numbers.append(counts[exact(name.text)])
    return numbers


def _complain_strangers(named: list[Name], ledger: Ledger) -> None:
    strangers: dict[str, list[Name]] = {}
    for name in named:
        strangers.setdefault(exact(name.text), []).append(name)
    for names in strangers.values():
        ledger.complain(
            names[0].cell,
            f"'{names[0].text}' of {len(names)} recorded starts joins to no motor of the list",
            "the tag of a motor in the motor list",
            "These starts are not used.",
            quantity="start_motor",
            subject="start",
            key=names[0].text,
        )
