"""From laid readings to the columns of the tables."""

from __future__ import annotations

from collections.abc import Iterable

import numpy as np
import pandas as pd
from numpy.typing import NDArray

from audit.fleet.addresses import SheetBook
from audit.fleet.column import (
    NO,
    NO_CELL,
    RECORDED,
    STATED,
    UNKNOWN,
    YES,
    Bytes,
    Column,
    Floats,
    Integers,
    missing_of,
)
from audit.fleet.fleet import Fleet, Table
from audit.intake.resolve.bases import FIRST
from audit.intake.resolve.codes import UNREAD, code_words, truth_of
from audit.intake.resolve.doubtful import bare_doubts, fractions_and_per_cents
from audit.intake.resolve.implausible import withhold_implausible
from audit.intake.resolve.ledger import Ledger
from audit.intake.resolve.numbers import convert
from audit.intake.resolve.pick import NOT_READ, NOT_USED, VALUE, Picked, pick
from audit.intake.resolve.rows import Laid
from audit.intake.resolve.switches import as_codes, switch, switches
from audit.vocabulary.quantities import Quantity, vocabulary


class Tables:
    """The values of all quantities while they are being resolved."""

    def __init__(self, laid: Laid, book: SheetBook, ledger: Ledger) -> None:
        self.laid = laid
        self.ledger = ledger
        self.keys = laid.keys()
        empty = {subject: Table(subject, keys, {}) for subject, keys in self.keys.items()}
        self.shape = Fleet("", empty, laid.links(), book)
        self.quantities = {
            name: quantity for name, quantity in vocabulary().quantities.items() if quantity.role != "derived"
        }
        self.readings = laid.readings.drop_duplicates("reading").set_index("reading")
        self.of = {str(name): group for name, group in laid.readings.groupby("quantity", sort=False)}
        self.none = laid.readings.iloc[:0]
        self.picked: dict[str, Picked] = {}
        self.basis: dict[str, Bytes] = {}
        self.parents: dict[tuple[str, str], Integers] = {}

    def resolve(self) -> dict[str, Table]:
        """Resolve every quantity, those first that others are made with, and give the tables."""
        first = [self.quantities[name] for name in FIRST]
        rest = [quantity for name, quantity in self.quantities.items() if name not in FIRST]
        for quantity in first:
            self._pick(quantity)
            self._withhold([quantity])
        for quantity in rest:
            self._pick(quantity)
        self._unbalance_base()
        self._alarms_said_with_trips()
        self._withhold([quantity for quantity in rest if quantity.name != "group_active"])
        for one in switches():
            self.basis[one.on.name] = switch(one, self.picked, self.ledger)
        self._windings()
        self._groups()
        return {
            subject: Table(
                subject,
                keys,
                {
                    name: self._column(quantity)
                    for name, quantity in self.quantities.items()
                    if quantity.subject == subject
                },
            )
            for subject, keys in self.keys.items()
        }

    def _size(self, quantity: Quantity) -> int:
        return len(self.keys[quantity.subject])

    def _pick(self, quantity: Quantity) -> None:
        readings = self.of.get(quantity.name, self.none)
        if quantity.kind in ("truth", "choice"):
            missing = np.full(self._size(quantity), UNREAD, dtype=np.int16)
        else:
            missing = missing_of(quantity.kind, self._size(quantity))
        if readings.empty:
            self.picked[quantity.name] = pick(quantity, readings, missing, missing, self.ledger)
            return
        if quantity.kind == "number":
            values: NDArray[np.generic] = self._numbers(quantity, readings)
        elif quantity.kind == "date":
            values = readings["number"].where(readings["state"] == "value").to_numpy(dtype=np.float64)
        elif quantity.kind == "text":
            readings = readings[readings["state"] == "value"]
            values = _texts(readings).to_numpy(dtype=object)
        else:
            readings, values = self._codes(quantity, readings)
        self.picked[quantity.name] = pick(quantity, readings, values, missing, self.ledger)

    def _numbers(self, quantity: Quantity, readings: pd.DataFrame) -> Floats:
        known: dict[str, Floats] = {}

        def beside(name: str) -> Floats:
            if name not in known:
                known[name] = self._beside(name, quantity.subject, readings["row"].to_numpy())
            return known[name]

        converted = convert(quantity, readings, beside, self.ledger)
        values = fractions_and_per_cents(quantity, converted.values, converted.bare, readings, self.ledger)
        return bare_doubts(quantity, values, converted.bare, readings, beside, self.ledger)

    def _beside(self, name: str, subject: str, rows: Integers) -> Floats:
        """Give a quantity of the motor, relay or bus that goes with these rows, as floats; a choice as its place."""
        home = self.quantities[name].subject
        if (subject, home) not in self.parents:
            parents = self.shape.parent_rows(subject, home)
            self.parents[subject, home] = np.full(len(self.keys[subject]), -1) if parents is None else parents
        source = self.picked[name].values.astype(np.float64)
        source[source == UNREAD] = np.nan
        at = self.parents[subject, home][rows]
        return np.append(source, np.nan)[at]

    def _codes(self, quantity: Quantity, readings: pd.DataFrame) -> tuple[pd.DataFrame, NDArray[np.int16]]:
        """Give codes of words; a word for off or not used may be one of the choices, and says no of a yes or no."""
        texts = _texts(readings)
        codes, within = code_words(quantity, texts)
        state = readings["state"].to_numpy(dtype=object).copy()
        if quantity.kind == "truth":
            number = readings["number"].to_numpy(dtype=np.float64)
            codes = np.where(codes == UNKNOWN, UNREAD, codes).astype(np.int16)
            codes = np.where((codes == UNREAD) & (number == 1), YES, codes)
            codes = np.where((codes == UNREAD) & (number == 0), NO, codes)
            codes[state == "off"] = NO
            codes[state == "not_used"] = UNREAD
        else:
            state[np.isin(state, ("off", "not_used")) & (codes != UNREAD)] = "value"
        codes[np.isin(state, ("pending", "bad"))] = UNREAD
        if within.any():
            self.ledger.complain_by_column(
                readings[within],
                f"{quantity.label}: '{{written}}' is taken for the one known word in it",
                f"one of {', '.join(quantity.choices)}",
                "Correct the cells where this is wrong.",
                quantity=quantity.name,
                weight="remark",
            )
        return readings.assign(state=state), codes

    def _withhold(self, quantities: Iterable[Quantity]) -> None:
        by_subject: dict[str, list[Quantity]] = {}
        for quantity in quantities:
            by_subject.setdefault(quantity.subject, []).append(quantity)
        for subject, of_subject in by_subject.items():
            withhold_implausible(of_subject, self.picked, self.readings, self.keys[subject], self.ledger)

    def _unbalance_base(self) -> None:
        """'% FLA' at the unbalance pickup also says what its per cent are of."""
        pickup, base = self.picked["unbalance_trip_pickup_pct"], self.picked["unbalance_base"]
        written = self.readings["base"].reindex(pickup.reading).to_numpy(dtype=object)
        says = (base.state == NOT_READ) & (pickup.state == VALUE) & (written == "full_load")
        base.values[says] = self.quantities["unbalance_base"].choices.index("full_load")
        for target, source in ((base.state, pickup.state), (base.cell, pickup.cell), (base.reading, pickup.reading)):
            target[says] = source[says]

    def _alarms_said_with_trips(self) -> None:
        """'Alarm only' or 'trip + alarm' where the trip's state belongs also says the alarm's."""
        for one in switches():
            if one.on.part != "trip_on":
                continue
            alarm = f"{one.on.element}_alarm_on"
            if alarm not in self.picked:
                continue
            trip, other = self.picked[one.on.name], self.picked[alarm]
            open_ = np.flatnonzero((trip.state == VALUE) & (other.state == NOT_READ))
            for row in open_.tolist():
                text = str(self.readings.at[trip.reading[row], "written"])
                if "al" in text.casefold() and truth_of(text, "alarm_on") == YES:
                    other.values[row], other.state[row] = YES, VALUE
                    other.cell[row], other.reading[row] = trip.cell[row], trip.reading[row]

    def _windings(self) -> None:
        column = self.picked["winding"]
        for row, winding in enumerate(self.laid.motors.windings):
            if winding is not None and column.state[row] == NOT_READ:
                column.values[row], column.cell[row], column.state[row] = winding.text, winding.cell, VALUE

    def _groups(self) -> None:
        """Name the setting groups, and mark the one that is judged as active where there is a choice."""
        relays = self.laid.relays
        group, active = self.picked["setting_group"], self.picked["group_active"]
        of_row = np.array(relays.relay_of_row, dtype=np.int64)
        count = np.bincount(of_row, minlength=1)[of_row]
        for row, (name, judged) in enumerate(zip(relays.groups, relays.judged, strict=True)):
            if name and group.state[row] == NOT_READ:
                group.values[row], group.state[row] = name, VALUE
            if count[row] > 1:
                active.values[row] = (YES if judged else NO) if name else UNREAD

    def _column(self, quantity: Quantity) -> Column:
        picked = self.picked[quantity.name]
        size = len(picked.values)
        basis = self.basis.get(quantity.name)
        if basis is None:
            basis = np.full(size, RECORDED if quantity.subject == "start" else STATED, dtype=np.int8)
        values = picked.values
        if quantity.kind == "truth":
            values = as_codes(values)
            if quantity.absent_means_no:
                values[(picked.state == NOT_READ) | (picked.state == NOT_USED)] = NO
        elif quantity.kind == "choice":
            values = np.where(values == UNREAD, -1, values).astype(np.int16)
        cell = np.where(picked.state == NOT_READ, NO_CELL, picked.cell)
        return Column(quantity.kind, values, basis, cell, choices=quantity.choices)


def _texts(readings: pd.DataFrame) -> pd.Series:
    """Give the words of readings: the text read, else the cell as written."""
    return readings["text"].where(readings["text"].notna(), readings["written"]).astype(object).map(_trimmed)


def _trimmed(text: object) -> str:
    return str(text).strip()
