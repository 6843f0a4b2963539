"""Facts about how each setting is written: without a unit, as a multiple, with its base or without, how finely."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np
import pandas as pd

from audit.fleet.column import NO, NO_CELL, STATED, UNKNOWN, YES, Column, Integers
from audit.fleet.fleet import Fleet
from audit.vocabulary.quantities import Quantity, vocabulary
from audit.vocabulary.units import UNITS

RELATIVE_UNITS = ("", "x", "pct")
"""Ways to write a current or voltage that say nothing without a base."""


def _based() -> dict[str, Quantity]:
    return {name: quantity for name, quantity in vocabulary().settings().items() if quantity.bases}


def _delays() -> dict[str, Quantity]:
    seconds = UNITS["s"]
    return {
        name: quantity
        for name, quantity in vocabulary().settings().items()
        if quantity.kind == "number" and quantity.unit is not None and quantity.unit.same_as(seconds)
    }


def _truth(name: str, label: str) -> Quantity:
    return Quantity(name=name, label=label, subject="relay", kind="truth", role="derived")


WRITTEN_FACTS: dict[str, Quantity] = {
    fact.name: fact
    for fact in (
        *(
            _truth(f"{name}_relative", f"{q.label} given without a unit, as a multiple or in per cent")
            for name, q in _based().items()
        ),
        *(_truth(f"{name}_base_written", f"base of the {q.label} stated") for name, q in _based().items()),
        *(_truth(f"{name}_unit_lacking", f"{q.label} given without a unit") for name, q in _delays().items()),
        Quantity(
            name="relay_full_load_last_digit_a",
            label="last digit of the full-load setting as written",
            subject="relay",
            kind="number",
            role="derived",
            unit=UNITS["a"],
        ),
    )
}


def written_facts(fleet: Fleet) -> Iterator[tuple[str, Column]]:
    """Give the facts of all settings, each with the cell in which the setting stands."""
    size = fleet.rows("relay")
    readings = fleet.readings
    if readings.empty:
        for name, fact in WRITTEN_FACTS.items():
            yield name, Column.empty(fact.kind, size)
        return
    told = readings[(readings["subject"] == "relay") & readings["state"].isin(["value", "pending", "bad"])]
    of = {str(name): group for name, group in told.groupby("quantity", sort=False, observed=True)}
    none = told.iloc[:0]
    for name, quantity in _based().items():
        yield from _base_facts(name, quantity, of.get(name, none), size)
    for name in _delays():
        one = of.get(name, none)
        bare = one["unit"].astype(str).to_numpy() == ""
        yield f"{name}_unit_lacking", _truths(one, bare, size)
    yield "relay_full_load_last_digit_a", _last_digit(of.get("relay_full_load_a", none), size)


def _base_facts(name: str, quantity: Quantity, readings: pd.DataFrame, size: int) -> Iterator[tuple[str, Column]]:
    unit = readings["unit"].astype(str).to_numpy()
    base = readings["base"].astype(str).to_numpy()
    relative = np.isin(unit, RELATIVE_UNITS)
    possible = [known for known in quantity.bases if known != "secondary"]
    # a multiple of something that can be a multiple of one thing only says enough
    alone = np.isin(unit, ("x", "pct")) & (len(possible) == 1)
    yield f"{name}_relative", _truths(readings, relative, size)
    yield f"{name}_base_written", _truths(readings, ~relative | (base != "") | alone, size)


def _rows(readings: pd.DataFrame) -> Integers:
    return np.asarray(readings["row"].to_numpy(), dtype=np.int64)


def _truths(readings: pd.DataFrame, holds: np.ndarray[tuple[int], np.dtype[np.bool_]], size: int) -> Column:
    """Put yes or no at the rows of these readings, unknown where the cell could not be read, no where none is."""
    values = np.full(size, NO, dtype=np.int8)
    cell = np.full(size, NO_CELL, dtype=np.int64)
    usable = (readings["state"] == "value").to_numpy()
    rows = _rows(readings)
    values[rows] = np.where(usable, np.where(holds, YES, NO), UNKNOWN)
    cell[rows] = readings["cell"].to_numpy()
    return Column("truth", values, np.full(size, STATED, dtype=np.int8), cell)


def _last_digit(readings: pd.DataFrame, size: int) -> Column:
    """Give what one unit in the last place of a figure is worth: 0.1 A for '8.7', 1 A for '9'."""
    values = np.full(size, np.nan)
    usable = readings[(readings["state"] == "value") & (readings["number"] > 0)]
    decimals = usable["written"].astype(str).str.extract(r"\d[.,](\d+)", expand=False).str.len().fillna(0)
    worth = usable["value"] / usable["number"]
    values[_rows(usable)] = (worth * 10.0 ** -decimals.astype(float)).to_numpy()
    return Column("number", values, np.full(size, STATED, dtype=np.int8), np.full(size, NO_CELL, dtype=np.int64))
