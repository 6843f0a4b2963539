"""What reading the workbooks of a site hands on: readings, how each column was understood, and what was in the way."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field

import numpy as np
import pandas as pd

from audit.fleet.addresses import SheetBook
from audit.fleet.fleet import Complaint, InputFile, Question
from audit.refusal import Refusal

READING_COLUMNS: Mapping[str, str] = {
    "table": "object",
    "record": "int64",
    "quantity": "object",
    "group": "object",
    "state": "object",
    "number": "float64",
    "text": "object",
    "unit": "object",
    "base": "object",
    "written": "object",
    "cell": "int64",
    "header": "object",
}
"""Columns of the readings: one row a cell that holds something, or a part of a cell that holds several things."""

TABLES = ("motor", "relay", "bus", "start")
STATES = ("value", "off", "not_used", "pending", "bad")


@dataclass(frozen=True, slots=True)
class ColumnReading:
    """How a column of a sheet, or a name of a name/value list, was understood."""

    file: str
    sheet: str
    header: str
    cell: str
    table: str
    quantity: str
    unit: str
    base: str
    sample: str
    how: str


@dataclass(frozen=True, slots=True)
class SheetReading:
    """How a sheet was understood: its table, its layout ("wide", "long", "block"), and where its headers stand."""

    file: str
    sheet: str
    table: str
    layout: str
    header_row: int
    header_rows: int


@dataclass(frozen=True)
class Gathered:
    """Everything that was read of a site, not yet resolved to values of motors, relays, buses and starts."""

    site: str
    facts: Mapping[str, str]
    book: SheetBook
    inputs: tuple[InputFile, ...]
    readings: pd.DataFrame
    complaints: list[Complaint] = field(default_factory=list)
    questions: list[Question] = field(default_factory=list)
    columns: list[ColumnReading] = field(default_factory=list)
    sheets: list[SheetReading] = field(default_factory=list)


class CannotRead(Refusal):
    """Nothing can be judged: no readable workbook, or no motor list."""

    def __init__(self, complaint: Complaint) -> None:
        super().__init__(complaint.sentence())
        self.complaint = complaint


def readings_frame(columns: Mapping[str, object] | None = None) -> pd.DataFrame:
    """Give a frame of readings with the agreed columns and types; columns left out are empty.

    >>> list(readings_frame({"quantity": ["full_load_a"], "number": [55.0]})[["quantity", "state"]].iloc[0])
    ['full_load_a', 'value']
    """
    given = dict(columns or {})
    rows = max((len(values) for values in given.values() if hasattr(values, "__len__")), default=0)
    defaults: dict[str, object] = {"state": "value", "number": np.nan, "text": None, "cell": -1, "record": 0}
    return pd.DataFrame(
        {
            name: pd.Series(given.get(name, [defaults.get(name, "")] * rows), dtype=kind)
            for name, kind in READING_COLUMNS.items()
        }
    )
