"""Suppose other values than those read, before they are resolved: what is written as a multiple of them follows."""

from __future__ import annotations

from collections.abc import Collection, Mapping, Sequence
from dataclasses import dataclass, replace
from datetime import date

import numpy as np
import pandas as pd

from audit.derivation.trace import shown_value
from audit.expression.units import nearest
from audit.findings.comparison.comparison import Supposed
from audit.fleet.build import NAMES_ITSELF, column_of
from audit.fleet.column import NO, NO_CELL, YES
from audit.fleet.fleet import Fleet
from audit.fleet.folding import exact
from audit.intake.gathered import Gathered, readings_frame
from audit.intake.resolve.codes import truth_of
from audit.refusal import Refusal
from audit.vocabulary.quantities import Quantity, fold_choice
from audit.vocabulary.spellings import name_of

SUBJECTS = ("motor", "relay", "bus")
FORM = "Write SUBJECT=NAME:QUANTITY=VALUE, for example bus=B2:fault_max_ka=31.5; SUBJECT is motor, relay or bus."


@dataclass(frozen=True, slots=True)
class Supposition:
    """A value to be supposed, as the command line gives it."""

    subject: str
    name: str
    quantity: str
    value: str


def read_supposition(text: str) -> Supposition:
    """Read a supposition.

    >>> read_supposition("bus=B2:fault_max_ka=31.5")
    Supposition(subject='bus', name='B2', quantity='fault_max_ka', value='31.5')
    """
    subject, of, rest = text.partition("=")
    told, _, value = rest.rpartition("=")
    name, colon, quantity = told.rpartition(":")
    parts = [part.strip() for part in (subject, name, quantity, value)]
    if not of or not colon or not all(parts):
        raise Refusal(f"--set '{text}' cannot be read. {FORM}")
    if parts[0] not in SUBJECTS:
        raise Refusal(f"--set '{text}': '{parts[0]}' is not a subject{nearest(parts[0], SUBJECTS)}. {FORM}")
    return Supposition(*parts)


def suppose(
    gathered: Gathered, fleet: Fleet, suppositions: Sequence[Supposition], quantities: Mapping[str, Quantity]
) -> tuple[Gathered, tuple[Supposed, ...]]:
    """Put supposed values in place of what was read; the fleet as read tells which cells these are.

    Raises
    ------
    Refusal
        If a name is not known, or a value is none that the quantity can have.
    """
    readings = gathered.readings
    told: list[Supposed] = []
    for one in suppositions:
        quantity = _quantity(one, quantities)
        row = _row(one, quantity, fleet)
        value = _value(one, quantity)
        column = fleet.tables[quantity.subject].columns[quantity.name]
        supposed = column_of(quantity, [value])
        told.append(
            Supposed(
                quantity.subject,
                fleet.tables[quantity.subject].keys[row],
                quantity.name,
                quantity.label,
                shown_value(column, row, quantity),
                shown_value(supposed, 0, quantity),
            )
        )
        readings = _with(readings, fleet, quantity, row, _written(quantity, value))
    return replace(gathered, readings=readings), tuple(told)


def _quantity(one: Supposition, quantities: Mapping[str, Quantity]) -> Quantity:
    quantity = quantities.get(one.quantity)
    given = [q.name for q in quantities.values() if q.role != "derived" and q.subject in SUBJECTS]
    if quantity is None:
        own = [name for name in given if quantities[name].subject == one.subject]
        raise Refusal(f"--set: '{one.quantity}' is not a known quantity{nearest(one.quantity, own or given)}.")
    if quantity.role == "derived":
        raise Refusal(f"--set: {one.quantity} ({quantity.label}) is worked out; suppose a datum that it is made of.")
    if quantity.name in (*NAMES_ITSELF.values(), "setting_group"):
        raise Refusal(f"--set: {one.quantity} is the name of a {quantity.subject}; a name cannot be supposed.")
    if quantity.subject != one.subject and (one.subject, quantity.subject) != ("motor", "relay"):
        raise Refusal(
            f"--set: {one.quantity} ({quantity.label}) is no datum of a {one.subject}. "
            f"Write {quantity.subject}=NAME:{one.quantity}={one.value}."
        )
    return quantity


def _row(one: Supposition, quantity: Quantity, fleet: Fleet) -> int:
    keys = fleet.tables[one.subject].keys
    places = {exact(key): row for row, key in reversed(list(enumerate(keys)))}
    row = places.get(exact(one.name), -1)
    if row < 0:
        raise Refusal(f"--set: there is no {one.subject} '{one.name}'{nearest(one.name, keys)}.")
    rows = fleet.parent_rows(one.subject, quantity.subject)
    at = int(rows[row]) if rows is not None and len(rows) else -1
    if at < 0:
        raise Refusal(f"--set: motor {keys[row]} has no relay whose {quantity.label} could be supposed.")
    return at


def _value(one: Supposition, quantity: Quantity) -> float | bool | str | date:
    """Read a value as the quantity wants it, in the quantity's unit."""
    place = f"--set {one.subject}={one.name}:{one.quantity}={one.value}"
    if quantity.kind == "number":
        unit = quantity.unit.symbol if quantity.unit and quantity.unit.symbol else "a plain number"
        try:
            number = float(one.value)
        except ValueError:
            number = np.nan
        if not np.isfinite(number):
            raise Refusal(f"{place}: '{one.value}' is not a number. Write the number alone; it is taken in {unit}.")
        low, high = quantity.plausible or (-np.inf, np.inf)
        if not low <= number <= high:
            raise Refusal(
                f"{place}: {number:g} {unit} is outside the plausible range of {quantity.label}, {low:g} to {high:g}."
            )
        return number
    if quantity.kind == "truth":
        truth = truth_of(one.value)
        if truth not in (YES, NO):
            raise Refusal(f"{place}: '{one.value}' is neither yes nor no.")
        return truth == YES
    if quantity.kind == "choice":
        choice = (quantity.spellings or {}).get(fold_choice(one.value))
        if choice is None:
            near = nearest(one.value, quantity.choices)
            raise Refusal(f"{place}: '{one.value}' is none of {', '.join(quantity.choices)}{near}.")
        return choice
    if quantity.kind == "date":
        try:
            return date.fromisoformat(one.value)
        except ValueError:
            raise Refusal(f"{place}: '{one.value}' is not a day; write it as 2026-11-30.") from None
    return one.value


def _written(quantity: Quantity, value: float | bool | str | date) -> dict[str, object]:
    """Give a reading that says the value."""
    reading: dict[str, object] = {
        "quantity": quantity.name,
        "state": "value",
        "number": np.nan,
        "text": None,
        "unit": "",
        "base": "",
        "written": f"supposed: {value}",
        "cell": NO_CELL,
    }
    if isinstance(value, bool):
        reading["text"] = reading["written"] = "yes" if value else "no"
    elif isinstance(value, date):
        reading["number"] = float((value - date(1970, 1, 1)).days)
    elif isinstance(value, float):
        reading["number"] = value
        reading["unit"] = name_of(quantity.unit) if quantity.unit is not None else ""
        if quantity.bases:
            reading["base"] = "primary"
    else:
        reading["text"] = reading["written"] = value
    return reading


def _with(
    readings: pd.DataFrame, fleet: Fleet, quantity: Quantity, row: int, reading: Mapping[str, object]
) -> pd.DataFrame:
    """Take away what is said of a quantity of a row, and say the supposed value in the same record."""
    of_row = fleet.readings[(fleet.readings["subject"] == quantity.subject) & (fleet.readings["row"] == row)]
    same = of_row[of_row["quantity"].astype(str) == quantity.name]
    replaced = _standing_in(readings, same)
    record = readings[replaced if replaced.any() else _standing_in(readings, of_row)]
    left = readings[~replaced]
    if not record.empty:
        first = record.iloc[0]
        said = {**reading, "table": first["table"], "record": first["record"], "group": first["group"]}
        return pd.concat([left, _frame([said])], ignore_index=True)
    key = fleet.tables[quantity.subject].keys[row]
    whose = {"quantity": NAMES_ITSELF[quantity.subject], "text": key, "written": key}
    record_number = int(readings["record"].max()) + 1
    said_of = {"table": quantity.subject, "record": record_number}
    return pd.concat([left, _frame([{**whose, **said_of}, {**reading, **said_of}])], ignore_index=True)


def _standing_in(readings: pd.DataFrame, kept: pd.DataFrame) -> np.ndarray[tuple[int], np.dtype[np.bool_]]:
    """Tell which readings are among those kept, by quantity and cell."""
    wanted: Collection[tuple[str, int]] = set(
        zip(kept["quantity"].astype(str).tolist(), kept["cell"].tolist(), strict=True)
    )
    cells = readings["cell"].to_numpy()
    near = np.isin(cells, [cell for _, cell in wanted])
    found = np.zeros(len(readings), dtype=bool)
    for place in np.flatnonzero(near).tolist():
        found[place] = (str(readings["quantity"].iat[place]), int(cells[place])) in wanted
    return found


def _frame(rows: Sequence[Mapping[str, object]]) -> pd.DataFrame:
    defaults: dict[str, object] = {"state": "value", "number": np.nan, "text": None, "cell": NO_CELL, "record": 0}
    names = readings_frame().columns
    return readings_frame({name: [row.get(name, defaults.get(name, "")) for row in rows] for name in names})
