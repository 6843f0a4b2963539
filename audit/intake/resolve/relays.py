"""The rows of the relay table, one a relay and setting group, and which motor each serves."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass, field

import numpy as np
import pandas as pd

from audit.fleet.column import NO_CELL, NO_ROW, Integers
from audit.intake.resolve.groups import active_group, group_key, says_active
from audit.intake.resolve.joins import joined
from audit.intake.resolve.ledger import Ledger
from audit.intake.resolve.motors import MotorRows
from audit.intake.resolve.names import AMBIGUOUS, Names, exact
from audit.intake.resolve.records import Name, Record


@dataclass
class Relay:
    """A relay: its name, and the records that speak of it by setting group."""

    name: Name
    records: dict[str, list[Record]] = field(default_factory=dict)
    written_groups: dict[str, str] = field(default_factory=dict)

    def add(self, record: Record) -> None:
        """Let a record speak of its setting group, "" for the whole relay."""
        key = group_key(record.group) if record.group else ""
        self.records.setdefault(key, []).append(record)
        self.written_groups.setdefault(key, record.group)

    def groups(self) -> list[str]:
        """Give the keys of the setting groups; a single "" where none is named."""
        return [key for key in self.records if key] or [""]


@dataclass
class RelayRows:
    """The rows of the relay table and what finds them."""

    keys: list[str] = field(default_factory=list)
    groups: list[str] = field(default_factory=list)
    """The group of each row as written, "" where the relay has one group without a name."""
    judged: list[bool] = field(default_factory=list)
    """Whether a row is the one judged: the active group, or what all groups share where that is open."""
    rows_of_record: dict[int, list[int]] = field(default_factory=dict)
    shared: set[int] = field(default_factory=set)
    """Records that speak for several groups: what a group says itself goes before them."""
    motor_relay: Integers = field(default_factory=lambda: np.empty(0, dtype=np.int64))
    relay_motor: Integers = field(default_factory=lambda: np.empty(0, dtype=np.int64))
    relay_of_row: list[int] = field(default_factory=list)


class RelayRegister:
    """Relays as they are met, and the relay that each motor is served by."""

    def __init__(self, motors: MotorRows, ledger: Ledger) -> None:
        self.motors = motors
        self.ledger = ledger
        self.relays: list[Relay] = []
        self.names = Names()
        self.serves = np.full(len(motors.keys), NO_ROW, dtype=np.int64)

    def named(self, name: Name) -> int:
        """Give the relay of a name, a new one at the first call."""
        known = self.names.rows.get(exact(name.text))
        if known is not None:
            return known
        self.names.add(name.text, len(self.relays))
        self.relays.append(Relay(name))
        return len(self.relays) - 1

    def waiting(self) -> list[int]:
        """Give the relays that serve no motor so far."""
        serving = set(self.serves.tolist())
        return [relay for relay in range(len(self.relays)) if relay not in serving]

    def serve(self, motor: int, relay: int) -> None:
        """Let a relay serve a motor that has none."""
        if motor >= 0 and self.serves[motor] < 0:
            self.serves[motor] = relay


def relay_rows(
    readings: pd.DataFrame, records: Iterable[Record], motors: MotorRows, ledger: Ledger, settings: frozenset[str]
) -> RelayRows:
    """Find the relays among relay blocks, rows of settings, and motor rows that carry settings (`settings`)."""
    register = RelayRegister(motors, ledger)
    listed = [record for record in records if record.table == "relay"]
    for record in listed:
        if record.relay is not None:
            register.relays[register.named(record.relay)].add(record)
    named = [motors.first(row, "relay") for row in range(len(motors.keys))]
    names = [relay.name.text for relay in register.relays]
    register.serves[:] = joined(named, register.names, names, "relay", ledger).rows
    _by_motor_names(listed, register)
    _by_own_name(register)
    _by_cubicle(register)
    carrying = set(
        readings.loc[readings["quantity"].isin(settings) & (readings["table"] == "motor"), "record"].tolist()
    )
    _in_motor_rows(carrying, named, register)
    return _rows(_active_statements(readings), register)


def _by_motor_names(listed: list[Record], register: RelayRegister) -> None:
    """Records that name their motor: of the relay they name, of the motor's relay, or of one that bears its tag."""
    motors = register.motors
    rows = joined([record.motor for record in listed], motors.names, motors.keys, "motor", register.ledger).rows
    for record, motor in zip(listed, rows.tolist(), strict=True):
        if record.relay is not None:
            register.serve(motor, register.named(record.relay))
        elif record.motor is not None:
            relay = int(register.serves[motor]) if motor >= 0 else NO_ROW
            if relay < 0:
                tag = motors.keys[motor] if motor >= 0 else record.motor.text
                relay = register.named(Name(tag, record.motor.cell))
                register.serve(motor, relay)
            register.relays[relay].add(record)
        else:
            register.ledger.complain(
                record.cell,
                "settings here name neither a relay nor a motor",
                "the tag of the relay or of the motor beside its settings",
                "They are left out.",
                subject="relay",
            )


def _by_own_name(register: RelayRegister) -> None:
    """Relays that bear the tag of a motor."""
    motors, waiting = register.motors, register.waiting()
    names = [register.relays[relay].name for relay in waiting]
    rows = joined(names, motors.names, motors.keys, "motor", register.ledger).rows
    for relay, motor in zip(waiting, rows.tolist(), strict=True):
        register.serve(motor, relay)


def _by_cubicle(register: RelayRegister) -> None:
    """Relays that bear the name of the cubicle of one motor; shown, since a name may mislead."""
    waiting = {exact(register.relays[relay].name.text): relay for relay in register.waiting()}
    cubicles: dict[str, int] = {}
    for motor in range(len(register.motors.keys)) if waiting else ():
        cubicle = register.motors.first(motor, "cubicle")
        if cubicle is not None:
            name = exact(cubicle.text)
            cubicles[name] = AMBIGUOUS if name in cubicles else motor
    for name, relay in waiting.items():
        motor = cubicles.get(name, NO_ROW)
        if motor >= 0 and register.serves[motor] < 0:
            register.serve(motor, relay)
            register.ledger.complain(
                register.relays[relay].name.cell,
                f"relay '{register.relays[relay].name.text}' taken as that of motor {register.motors.keys[motor]}, "
                "which stands in the cubicle of that name",
                "the relay of each motor named in the motor list",
                "Name the relay in the motor list if this join is wrong.",
                weight="remark",
            )


def _in_motor_rows(carrying: set[int], named: list[Name | None], register: RelayRegister) -> None:
    """Settings in rows of the motor list: of the relay the row names, else of one that bears the motor's tag."""
    motors = register.motors
    carriers = [
        row for row, records in enumerate(motors.records) if any(record.number in carrying for record in records)
    ]
    naming: dict[str, list[int]] = {}
    for row in carriers:
        name = named[row]
        if register.serves[row] < 0 and name is not None:
            naming.setdefault(exact(name.text), []).append(row)
    _complain_shared({name: rows for name, rows in naming.items() if len(rows) > 1}, named, register)
    for row in carriers:
        name = named[row]
        if register.serves[row] < 0:
            own = name is not None and len(naming[exact(name.text)]) == 1
            register.serve(row, register.named(name if own and name else Name(motors.keys[row], NO_CELL)))
        for record in motors.records[row]:
            if record.number in carrying:
                register.relays[register.serves[row]].add(record)
    for row, name in enumerate(named):
        if name is not None and exact(name.text) in register.names.rows:
            register.serve(row, register.names.rows[exact(name.text)])


def _complain_shared(shared: dict[str, list[int]], named: list[Name | None], register: RelayRegister) -> None:
    for rows in shared.values():
        name = named[rows[0]]
        if name is not None:
            register.ledger.complain(
                name.cell,
                f"'{name.text}' is named as the relay of {len(rows)} motors that each have settings in their row",
                "one relay for each row of settings",
                "They are taken for each motor's own relay. If this is a type, head the column 'Relay Type'.",
                weight="remark",
            )


def _active_statements(readings: pd.DataFrame) -> dict[int, str]:
    """Give what each record says under 'active', as written."""
    said = readings[(readings["quantity"] == "group_active") & readings["state"].isin(("value", "off"))]
    return dict(zip(said["record"].tolist(), said["written"].astype(str).tolist(), strict=True))


def _rows(statements: dict[int, str], register: RelayRegister) -> RelayRows:
    told = RelayRows()
    active_rows: list[int] = []
    for index, relay in enumerate(register.relays):
        groups = relay.groups()
        active = active_group(groups, _says(relay, statements))
        if active is None:
            groups = _ask_active(relay, groups, register.ledger)
        rows: dict[str, int] = {}
        for key in groups:
            rows[key] = len(told.keys)
            judged = key == (active or "")
            told.keys.append(relay.name.text if judged else f"{relay.name.text} (group {key})")
            told.groups.append(relay.written_groups.get(key, ""))
            told.judged.append(judged)
            told.relay_of_row.append(index)
        active_rows.append(rows[active or ""])
        for key, records in relay.records.items():
            for record in records:
                told.rows_of_record[record.number] = [rows[key]] if key in rows and key else list(rows.values())
                if not key and len(rows) > 1:
                    told.shared.add(record.number)
    told.motor_relay = np.array([*active_rows, NO_ROW], dtype=np.int64)[register.serves]
    first = np.full(len(register.relays) + 1, NO_ROW, dtype=np.int64)
    served = np.flatnonzero(register.serves >= 0)[::-1]
    first[register.serves[served]] = served
    told.relay_motor = first[np.array(told.relay_of_row, dtype=np.int64)]
    return told


def _says(relay: Relay, statements: dict[int, str]) -> list[tuple[str, str]]:
    """Give what the records and names of groups say about which group is active."""
    said = [
        (key, statements[record.number])
        for key, records in relay.records.items()
        for record in records
        if record.number in statements
    ]
    return said + [(key, "active") for key, written in relay.written_groups.items() if says_active(written)]


def _ask_active(relay: Relay, groups: list[str], ledger: Ledger) -> list[str]:
    written = tuple(relay.written_groups[key] for key in groups)
    ledger.ask(
        relay.name.cell,
        f"relay '{relay.name.text}' has the setting groups {', '.join(written)}",
        "Which of them is active? No setting of one group alone is judged until then.",
        written,
    )
    return ["", *groups]
