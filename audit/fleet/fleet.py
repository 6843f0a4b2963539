"""A fleet: tables per subject, the links between them, and where everything was read."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import dataclass, field, replace
from itertools import pairwise
from typing import Literal

import numpy as np
import pandas as pd

from audit.fleet.addresses import SheetBook
from audit.fleet.column import NO_ROW, Column, Integers

PARENTS: Mapping[str, tuple[str, ...]] = {
    "start": ("motor",),
    "motor": ("relay", "bus", "sisters", "peers"),
    "relay": ("motor",),
    "bus": (),
    "sisters": (),
    "peers": (),
}
"""Which tables a row of a table points to. Names of a check are looked for along these links, nearest first."""


@dataclass(frozen=True, slots=True)
class Table:
    """The rows of one subject and their columns."""

    subject: str
    keys: tuple[str, ...]
    columns: dict[str, Column]

    def __len__(self) -> int:
        return len(self.keys)


@dataclass(frozen=True, slots=True)
class Complaint:
    """Something in the inputs that could not be used, and what to do about it."""

    file: str
    sheet: str
    cell: str
    found: str
    expected: str
    advice: str
    quantity: str = ""
    subject: str = ""
    key: str = ""
    weight: Literal["stop", "withheld", "remark"] = "withheld"

    def sentence(self) -> str:
        """Give the complaint as one line."""
        place = self.file
        if self.sheet:
            place += f", sheet '{self.sheet}'"
        if self.cell:
            place += f", cell {self.cell}"
        return f"{place}: {self.found}. Expected: {self.expected}. {self.advice}".strip()


@dataclass(frozen=True, slots=True)
class Question:
    """Something that the reader must not guess: the values concerned are withheld until the site answers."""

    file: str
    sheet: str
    cell: str
    about: str
    ask: str
    answers: tuple[str, ...] = ()


@dataclass(frozen=True, slots=True)
class InputFile:
    """A workbook that was read, with the hash of its bytes."""

    file: str
    sha256: str
    path: str


@dataclass(frozen=True)
class Fleet:
    """Everything that was read of a site, resolved to primary values."""

    site: str
    tables: dict[str, Table]
    links: dict[tuple[str, str], Integers]
    book: SheetBook
    inputs: tuple[InputFile, ...] = ()
    complaints: tuple[Complaint, ...] = ()
    questions: tuple[Question, ...] = ()
    facts: Mapping[str, str] = field(default_factory=dict)
    """Facts of the site from fleet.toml: the code followed, the audit interval, packs wanted."""
    readings: pd.DataFrame = field(default_factory=pd.DataFrame)
    """Every setting and datum as written: subject, key, quantity, group, written, unit, base, value, cell."""
    other_groups: tuple[tuple[str, Integers], ...] = ()
    """Further selectable setting groups: name and, for each motor, the relay row of that group or NO_ROW."""

    def rows(self, subject: str) -> int:
        """Count the rows of a subject."""
        return len(self.tables[subject]) if subject in self.tables else 0

    def paths(self, subject: str, home: str) -> Iterator[tuple[str, ...]]:
        """Give the chains of links from one table to another, shortest first."""
        frontier: list[tuple[str, ...]] = [(subject,)]
        seen = {subject}
        while frontier:
            chain = frontier.pop(0)
            if chain[-1] == home:
                yield chain
                return
            for parent in PARENTS.get(chain[-1], ()):
                if parent not in seen and (chain[-1], parent) in self.links:
                    seen.add(parent)
                    frontier.append((*chain, parent))

    def parent_rows(self, subject: str, home: str) -> Integers | None:
        """Give for each row of a subject the row of another table that it points to, or None without a link."""
        if subject == home:
            return np.arange(self.rows(subject), dtype=np.int64)
        for chain in self.paths(subject, home):
            rows = np.arange(self.rows(subject), dtype=np.int64)
            for child, parent in pairwise(chain):
                # the row added behind the last one catches NO_ROW, also where the parent table is empty
                rows = np.append(self.links[(child, parent)], NO_ROW)[rows]
            return rows
        return None

    def with_columns(self, subject: str, columns: Mapping[str, Column]) -> Fleet:
        """Give a fleet in which a table has these columns as well."""
        table = self.tables[subject]
        tables = {**self.tables, subject: replace(table, columns={**table.columns, **columns})}
        return replace(self, tables=tables)
