"""Plates with two voltages: '400/690' and '67.5/39' say which pair holds once the voltage of the bus is known."""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence

import numpy as np

from audit.fleet.addresses import SheetBook
from audit.fleet.fleet import Complaint
from audit.fleet.folding import exact
from audit.intake.celltext import CellKind, read_number_text
from audit.intake.recognition.blocks import BAD, VALUE, Readings

CURRENTS = ("full_load_a", "locked_rotor_a")
RATED_TO_NOMINAL = (0.85, 1.06)
"""Rated voltage over nominal bus voltage: 460 V on 480 V, 4000 V on 4160 V, 380 V on 400 V."""


def choose_by_bus(readings: Sequence[Readings], complaints: list[Complaint], book: SheetBook) -> None:
    """Settle two voltages, and the currents that go with them, by the bus that the motor is fed from."""
    nominal = _nominal_volts(readings)
    if not nominal:
        return
    ranks: dict[int, int] = {}
    settled: list[tuple[Readings, int, float]] = []
    for block in _of_motors(readings, ("rated_voltage_v",)):
        for place, values in _pairs(block):
            volts = nominal.get(int(block.record[place]))
            if volts is None:
                continue
            factor = 1000.0 if block.unit[place] == "kv" or max(values) < 50 else 1.0
            low, high = RATED_TO_NOMINAL
            fitting = [i for i, value in enumerate(values) if low <= value * factor / volts <= high]
            if len(fitting) == 1:
                ranks[int(block.record[place])] = int(np.argsort(np.argsort(values))[fitting[0]])
                settled.append((block, place, values[fitting[0]]))
                if factor != 1.0:
                    block.unit[place] = "kv"
    for block in _of_motors(readings, CURRENTS):
        for place, values in _pairs(block):
            rank = ranks.get(int(block.record[place]))
            if rank is not None:
                # the higher voltage goes with the lower current, in whatever order the plate names them
                settled.append((block, place, sorted(values, reverse=True)[rank]))
    for block, place, value in settled:
        _settle(block, place, value, complaints, book)


def _of_motors(readings: Sequence[Readings], quantities: Iterable[str]) -> list[Readings]:
    return [block for block in readings if block.table == "motor" and block.quantity in quantities]


def _pairs(block: Readings) -> list[tuple[int, tuple[float, ...]]]:
    found: list[tuple[int, tuple[float, ...]]] = []
    for place in np.flatnonzero(block.state == BAD).tolist():
        reading = read_number_text(str(block.written[place]))
        if reading.kind is CellKind.SEVERAL and len(reading.numbers) == 2 and len(set(reading.numbers)) == 2:
            found.append((place, reading.numbers))
    return found


def _nominal_volts(readings: Sequence[Readings]) -> Mapping[int, float]:
    """Give the nominal voltage of the bus of each motor record, as far as it is stated."""
    of_bus: dict[int, float] = {}
    own: dict[int, float] = {}
    for block in readings:
        if block.quantity != "bus_nominal_v":
            continue
        target = of_bus if block.table == "bus" else own
        for place in np.flatnonzero(block.state == VALUE).tolist():
            factor = 1000.0 if block.unit[place] == "kv" else 1.0
            target[int(block.record[place])] = float(block.number[place]) * factor
    volts: dict[str, float] = {}
    for block in readings:
        if block.quantity == "bus_name":
            for record, text in zip(block.record.tolist(), block.text.tolist(), strict=True):
                if isinstance(text, str) and record in of_bus:
                    volts[exact(text)] = of_bus[record]
    for block in _of_motors(readings, ("bus",)):
        for record, text in zip(block.record.tolist(), block.text.tolist(), strict=True):
            if isinstance(text, str) and exact(text) in volts:
                own.setdefault(record, volts[exact(text)])
    return own


def _settle(block: Readings, place: int, value: float, complaints: list[Complaint], book: SheetBook) -> None:
    block.state[place] = VALUE
    block.number[place] = value
    where = book.place(int(block.cell[place]))
    assert where is not None
    about = (where.file, where.sheet, where.cell)
    complaints[:] = [c for c in complaints if (c.file, c.sheet, c.cell) != about or c.quantity != block.quantity]
    complaints.append(
        Complaint(
            *about,
            f"of '{block.written[place]}' {value:.15g} is taken, which goes with the voltage of the bus",
            "one value",
            "",
            block.quantity,
            weight="remark",
        )
    )
