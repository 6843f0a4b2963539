"""What was changed: every datum and setting that says something else, with both values and cells."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import dataclass
from functools import cached_property
from typing import Literal

import numpy as np
import pandas as pd

from audit.derivation.trace import shown_value
from audit.findings.audit import Audit
from audit.findings.comparison.alignment import Pair
from audit.findings.comparison.starts import StartsChange, starts_changed
from audit.fleet.addresses import Place
from audit.fleet.column import NO_CELL
from audit.fleet.folding import exact
from audit.intake.resolve.bases import FIRST
from audit.vocabulary.quantities import Quantity

SUBJECTS = ("bus", "motor", "relay")
Kind = Literal["changed", "now given", "no longer given", "follows"]
_WRITTEN = ("state", "number", "text", "unit", "base")
_OF_BASE: Mapping[str, tuple[str, ...]] = {
    "full_load": ("relay_full_load_a", "full_load_a"),
    "ct": ("relay_ct_primary_a", "relay_earth_ct_primary_a", "relay_earth_source", "earth_ct_kind"),
    "earth_ct": ("relay_earth_ct_primary_a",),
    "device": ("device_rated_current_a",),
    "motor_voltage": ("rated_voltage_v",),
    "system_voltage": ("bus_nominal_v",),
    "vt": ("relay_vt_primary_v",),
    "secondary": tuple(name for name in FIRST if "ct_" in name or "vt_" in name or name == "relay_earth_source"),
    "": tuple(name for name in FIRST if name.endswith(("_hz", "_v"))),
}
"""What a value on each base is made with; a value without a base can rest on a frequency or a voltage only."""


@dataclass(frozen=True, slots=True)
class Change:
    """One datum or setting that differs."""

    subject: str
    name: str
    motor: str
    quantity: str
    label: str
    unit: str
    role: str
    kind: Kind
    before: object
    after: object
    before_text: str
    after_text: str
    before_cell: Place | None
    after_cell: Place | None
    follows: tuple[str, ...] = ()
    """Names of the changed data that moved the value although its own cell says what it said before."""


@dataclass(frozen=True, slots=True)
class RowChange:
    """A motor, relay or bus that was added or removed."""

    subject: str
    name: str
    kind: Literal["added", "removed"]
    motor: str
    bus: str


class Changes:
    """The changes between two audits."""

    def __init__(self, pair: Pair) -> None:
        self.pair = pair
        self.starts: Mapping[str, StartsChange] = starts_changed(pair.before, pair.after)

    @cached_property
    def values(self) -> tuple[Change, ...]:
        """Give every datum and setting that differs, by subject, row and the order of the vocabulary."""
        found: list[tuple[tuple[int, int, int], Change]] = []
        for place, subject in enumerate(SUBJECTS):
            for number, quantity in enumerate(self._given(subject)):
                for row in np.flatnonzero(self.pair.differs(quantity.name)).tolist():
                    found.append(((place, row, number), self._change(quantity, row)))
        return tuple(change for _, change in sorted(found, key=lambda item: item[0]))

    @cached_property
    def rows(self) -> tuple[RowChange, ...]:
        """Give the motors, relays and buses that were added or removed.

        Settings that stand in the motor's own row make no relay of their own: they come and go with the motor.
        """
        found: list[RowChange] = []
        for subject in SUBJECTS:
            found += [self._row(subject, row, "added") for row in self.pair.added(subject)]
            found += [self._row(subject, row, "removed") for row in self.pair.removed(subject)]
        motors = {(row.name, row.kind) for row in found if row.subject == "motor"}
        return tuple(row for row in found if row.subject != "relay" or (row.name, row.kind) not in motors)

    def cause(self, name: str, row: int) -> tuple[str, ...]:
        """Give the changed data that a value follows whose own cell did not change; none where the cell changed."""
        quantity = self.pair.after.workings.quantities[name]
        if name in FIRST or quantity.kind != "number":
            return ()
        key = self.pair.keys(quantity.subject)[row]
        written = self._written(self.pair.after, quantity, key)
        if written is None or written != self._written(self.pair.before, quantity, key):
            return ()
        bases = {base for reading in written for base in _OF_BASE.get(reading[_WRITTEN.index("base")], FIRST)}
        return tuple(base for base, at in self._at(bases, quantity.subject, row) if self.pair.differs(base)[at])

    def _at(self, bases: set[str], subject: str, row: int) -> Iterator[tuple[str, int]]:
        for base in sorted(bases, key=FIRST.index):
            home = self.pair.after.workings.quantities[base].subject
            rows = self.pair.after.fleet.parent_rows(subject, home)
            if rows is not None and rows[row] >= 0:
                yield base, int(rows[row])

    def _given(self, subject: str) -> list[Quantity]:
        quantities = self.pair.after.workings.quantities.values()
        return [q for q in quantities if q.subject == subject and q.role != "derived"]

    def _change(self, quantity: Quantity, row: int) -> Change:
        before, at = self.pair.value_before(quantity.name, row)
        after = self.pair.after.workings.home_column(quantity.name)
        follows = self.cause(quantity.name, row)
        gone, new = bool(after.missing()[row]), bool(before.missing()[at])
        kind: Kind = "follows" if follows else "now given" if new else "no longer given" if gone else "changed"
        book = self.pair.before.fleet.book, self.pair.after.fleet.book
        old_text, new_text = shown_value(before, at, quantity), shown_value(after, row, quantity)
        plain_old = None if new else _plain(before.values[at], old_text, before.kind)
        plain_new = None if gone else _plain(after.values[row], new_text, after.kind)
        return Change(
            subject=quantity.subject,
            name=self.pair.keys(quantity.subject)[row],
            motor=self.motor_of(self.pair.after, quantity.subject, row),
            quantity=quantity.name,
            label=quantity.label,
            unit=quantity.unit.symbol if quantity.unit and quantity.kind == "number" else "",
            role=quantity.role,
            kind=kind,
            before=plain_old,
            after=plain_new,
            before_text=old_text,
            after_text=new_text,
            before_cell=book[0].place(before.cell[at]) if before.cell[at] != NO_CELL else None,
            after_cell=book[1].place(after.cell[row]) if after.cell[row] != NO_CELL else None,
            follows=follows,
        )

    def _row(self, subject: str, row: int, kind: Literal["added", "removed"]) -> RowChange:
        audit = self.pair.after if kind == "added" else self.pair.before
        key = audit.fleet.tables[subject].keys[row]
        motor = self.motor_of(audit, subject, row)
        bus = str(audit.workings.home_column("bus").values[row] or "") if subject == "motor" else ""
        return RowChange(subject, key, kind, motor, bus)

    @staticmethod
    def motor_of(audit: Audit, subject: str, row: int) -> str:
        """Give the tag of the motor that a row belongs to, '' for none."""
        rows = audit.fleet.parent_rows(subject, "motor")
        at = int(rows[row]) if rows is not None and len(rows) else -1
        return audit.fleet.tables["motor"].keys[at] if at >= 0 else ""

    def _written(self, audit: Audit, quantity: Quantity, key: str) -> frozenset[tuple[str, ...]] | None:
        """Give what the cells of a value say, or None where no reading is kept."""
        index = self._index(audit)
        rows = index.get((quantity.name, exact(key)))
        if rows is None:
            return None
        chosen = audit.fleet.readings.iloc[rows]
        columns = [chosen[name].map(_word).tolist() for name in _WRITTEN]
        return frozenset(zip(*columns, strict=True))

    def _index(self, audit: Audit) -> dict[tuple[str, str], list[int]]:
        side = int(audit is self.pair.after)
        if side not in self._indexes:
            readings = audit.fleet.readings
            index: dict[tuple[str, str], list[int]] = {}
            if not readings.empty:
                wanted = self._wanted
                names = readings["quantity"].astype(str).to_numpy()
                keep = np.flatnonzero(np.isin(names, list(wanted)))
                for row, name, key in zip(
                    keep.tolist(), names[keep].tolist(), readings["key"].to_numpy()[keep].tolist(), strict=True
                ):
                    if exact(str(key)) in wanted[name]:
                        index.setdefault((name, exact(str(key))), []).append(row)
            self._indexes[side] = index
        return self._indexes[side]

    @cached_property
    def _indexes(self) -> dict[int, dict[tuple[str, str], list[int]]]:
        return {}

    @cached_property
    def _wanted(self) -> dict[str, set[str]]:
        """Give for each quantity that differs the keys of the rows in which it does."""
        wanted: dict[str, set[str]] = {}
        for subject in SUBJECTS:
            keys = self.pair.keys(subject)
            for quantity in self._given(subject):
                rows = np.flatnonzero(self.pair.differs(quantity.name)).tolist()
                if rows:
                    wanted[quantity.name] = {exact(keys[row]) for row in rows}
        return wanted


def _plain(value: object, text: str, kind: str) -> object:
    """Give a value that JSON can hold: numbers as numbers, yes and no as such, the rest in words."""
    if kind == "number" and isinstance(value, (int, float)):
        return float(value) if np.isfinite(value) else text
    if kind == "truth":
        return bool(value == 2)
    return text


def _word(value: object) -> str:
    """Write a part of a reading so that it reads alike from a fleet and from its record."""
    if value is None or value is pd.NA or value != value:
        return ""
    return f"{value:.12g}" if isinstance(value, float) else exact(str(value))
