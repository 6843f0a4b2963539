"""Each reading laid at the table and row that it speaks of."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass

import numpy as np
import pandas as pd

from audit.fleet.column import NO_ROW, Integers
from audit.intake.resolve.buses import BusRows, StartRows, bus_rows, start_rows
from audit.intake.resolve.ledger import Ledger
from audit.intake.resolve.motors import MotorRows, motor_rows
from audit.intake.resolve.records import records_of
from audit.intake.resolve.relays import RelayRows, relay_rows
from audit.vocabulary.quantities import vocabulary

LINKING = frozenset({"motor", "start_motor", "relay", "relay_tag", "bus", "bus_name", "setting_group"})
OWN, SHARED, GUEST = 0, 1, 2
"""Whose word goes before: a row's own, that of a record for several groups, that of another table's record."""


@dataclass(frozen=True)
class Laid:
    """The readings with subject, row and rank; the rows of the tables; the links between them."""

    readings: pd.DataFrame
    motors: MotorRows
    relays: RelayRows
    buses: BusRows
    starts: StartRows

    def keys(self) -> dict[str, tuple[str, ...]]:
        """Give the keys of the rows of each table."""
        return {
            "motor": tuple(self.motors.keys),
            "relay": tuple(self.relays.keys),
            "bus": tuple(self.buses.keys),
            "start": tuple(self.starts.keys),
        }

    def links(self) -> dict[tuple[str, str], Integers]:
        """Give for each row the row of another table that it points to."""
        return {
            ("start", "motor"): self.starts.start_motor,
            ("motor", "relay"): self.relays.motor_relay,
            ("motor", "bus"): self.buses.motor_bus,
            ("relay", "motor"): self.relays.relay_motor,
        }


def lay(readings: pd.DataFrame, ledger: Ledger) -> Laid:
    """Find the rows of all tables and lay each reading at its row; readings of no row are left out."""
    subjects = {name: quantity.subject for name, quantity in vocabulary().quantities.items()}
    readings = readings.reset_index(drop=True)
    subject = readings["quantity"].map(subjects).astype(object)
    records = records_of(readings)
    motors = motor_rows(readings, records.values(), ledger)
    facts = frozenset(name for name, home in subjects.items() if home == "relay" and name not in LINKING)
    relays = relay_rows(readings, records.values(), motors, ledger, facts)
    of_bus = (subject == "bus") & ~readings["quantity"].isin(LINKING) & (readings["table"] == "motor")
    telling = set(readings.loc[of_bus, "record"].tolist())
    at_relays = {
        int(relays.relay_motor[relays.rows_of_record[number][0]]): record.bus
        for number, record in records.items()
        if record.table == "relay" and record.bus and number in relays.rows_of_record
    }
    buses = bus_rows(records.values(), telling, motors, at_relays, ledger)
    starts = start_rows(records.values(), motors, ledger)

    numbers = pd.Index(list(records))
    position = numbers.get_indexer(pd.Index(readings["record"]))
    rows = np.full(len(readings), NO_ROW, dtype=np.int64)
    one_row = {
        "motor": _rows_of(numbers, _motor_of_records(motors, relays, starts)),
        "bus": _rows_of(numbers, buses.row_of_record),
        "start": _rows_of(numbers, starts.row_of_record),
    }
    for home, table in one_row.items():
        here = (subject == home).to_numpy()
        rows[here] = table[position[here]]
    laid = readings.assign(subject=subject, row=rows, rank=OWN)
    guests = (subject == "motor") & (readings["table"] != "motor")
    laid.loc[guests, "rank"] = GUEST
    relay_part = _at_relays(laid[(subject == "relay").to_numpy()], relays)
    laid = pd.concat([laid[(subject != "relay").to_numpy()], relay_part]).sort_index(kind="stable")
    laid = laid[laid["row"] >= 0].rename_axis("reading").reset_index()
    return Laid(laid, motors, relays, buses, starts)


def _rows_of(numbers: pd.Index[int], row_of_record: Mapping[int, int]) -> Integers:
    found = [row_of_record.get(number, NO_ROW) for number in numbers.tolist()]
    return np.array([*found, NO_ROW], dtype=np.int64)


def _motor_of_records(motors: MotorRows, relays: RelayRows, starts: StartRows) -> dict[int, int]:
    rows = dict(motors.row_of_record)
    for number, relay in relays.rows_of_record.items():
        rows.setdefault(number, int(relays.relay_motor[relay[0]]))
    for number, start in starts.row_of_record.items():
        rows.setdefault(number, int(starts.start_motor[start]))
    return rows


def _at_relays(readings: pd.DataFrame, relays: RelayRows) -> pd.DataFrame:
    """Repeat what is said for several setting groups at each of them, behind what a group says itself."""
    homes = [relays.rows_of_record.get(number, []) for number in readings["record"].tolist()]
    counts = np.array([len(home) for home in homes], dtype=np.int64)
    repeated = readings.loc[readings.index.repeat(counts)].copy()
    repeated["row"] = np.array([row for home in homes for row in home], dtype=np.int64)
    repeated.loc[repeated["record"].isin(relays.shared), "rank"] = SHARED
    return repeated
