"""Records: the input rows and relay blocks, and the names by which each says whose it is."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from typing import NamedTuple

import pandas as pd

from audit.fleet.addresses import unpack

ANSWERS: Mapping[str, tuple[str, ...]] = {
    "motor": ("motor", "start_motor"),
    "relay": ("relay_tag", "relay"),
    "bus": ("bus_name", "bus"),
    "winding": ("winding",),
    "cubicle": ("cubicle",),
    "group": ("setting_group",),
}
"""What a record is asked for, and the quantities that answer, best first."""


class Name(NamedTuple):
    """A name and the cell it stands in."""

    text: str
    cell: int


@dataclass(slots=True)
class Record:
    """An input row or a relay block: where it stands and whose it says it is."""

    number: int
    table: str
    sheet: int
    cell: int
    group: str = ""
    motor: Name | None = None
    relay: Name | None = None
    bus: Name | None = None
    winding: Name | None = None
    cubicle: Name | None = None


def records_of(readings: pd.DataFrame) -> dict[int, Record]:
    """Give the records by their number, in the order of the readings.

    >>> from audit.intake.gathered import readings_frame
    >>> readings = readings_frame({"table": ["motor"], "record": [7], "quantity": ["motor"], "text": [" P-1 "]})
    >>> records_of(readings)[7].motor
    Name(text='P-1', cell=-1)
    """
    first = readings.drop_duplicates("record")
    cells = first["cell"].to_numpy()
    columns = (first["record"].tolist(), first["table"].tolist(), unpack(cells)[0].tolist(), cells.tolist())
    records = {number: Record(number, table, sheet, cell) for number, table, sheet, cell in zip(*columns, strict=True)}
    for attribute, quantities in ANSWERS.items():
        for quantity in reversed(quantities):
            for number, name in _said(readings, quantity).items():
                setattr(records[number], attribute, name.text if attribute == "group" else name)
    grouped = readings[readings["group"].astype(str) != ""].drop_duplicates("record")
    for number, group in zip(grouped["record"].tolist(), grouped["group"].astype(str).str.strip(), strict=True):
        records[number].group = group
    return records


def _said(readings: pd.DataFrame, quantity: str) -> dict[int, Name]:
    """Give the first text that each record gives for a quantity."""
    chosen = readings[(readings["quantity"] == quantity) & (readings["state"] == "value")].drop_duplicates("record")
    text = chosen["text"].where(chosen["text"].notna(), chosen["written"]).astype(str).str.strip().tolist()
    numbers, cells = chosen["record"].tolist(), chosen["cell"].tolist()
    return {number: Name(name, cell) for number, name, cell in zip(numbers, text, cells, strict=True) if name}
