"""Form the groups of like motors: sisters (to be set alike) and peers (to be compared as multiples of full load)."""

from __future__ import annotations

from dataclasses import replace

import numpy as np
from numpy.typing import NDArray

from audit.fleet.column import NO_ROW, Column, Integers
from audit.fleet.fleet import Fleet, Table

SISTERS_ALIKE = (
    "motor_make",
    "motor_type",
    "rated_power_kw",
    "rated_voltage_v",
    "rated_speed_rpm",
    "starting_method",
    "driven_machine",
    "relay_type",
    "ct_primary_a",
    "ct_secondary_a",
)
"""Two motors are sisters when all of these are stated and alike; the CT only where either has one."""
MAY_BE_ABSENT = frozenset({"ct_primary_a", "ct_secondary_a", "relay_type", "motor_type"})
VOLTAGE_LEVELS_V = (1000.0, 3600.0, 7200.0)
"""Bounds of the voltage levels within which multiples of full load are compared."""


def with_groups(fleet: Fleet) -> Fleet:
    """Give the fleet with its tables of sisters and peers and the links to them."""
    sisters_of, sisters = _grouped(*_sister_labels(fleet))
    peers_of, peers = _grouped(*_peer_labels(fleet))
    tables = {**fleet.tables, "sisters": Table("sisters", sisters, {}), "peers": Table("peers", peers, {})}
    links = {**fleet.links, ("motor", "sisters"): sisters_of, ("motor", "peers"): peers_of}
    return replace(fleet, tables=tables, links=links)


def _motor_view(fleet: Fleet, name: str) -> Column | None:
    for subject in ("motor", "relay"):
        table = fleet.tables.get(subject)
        if table is not None and name in table.columns:
            rows = fleet.parent_rows("motor", subject)
            return None if rows is None else table.columns[name].gathered(rows)
    return None


def _labels(column: Column) -> NDArray[np.str_]:
    if column.kind == "text":
        return np.array([" ".join((text or "").casefold().split()) for text in column.values], dtype=str)
    if column.kind == "choice":
        return np.array([column.choices[code] if code >= 0 else "" for code in column.values], dtype=str)
    return np.array(["" if value != value else f"{value:.4g}" for value in column.values], dtype=str)


def _sister_labels(fleet: Fleet) -> tuple[list[str], NDArray[np.bool_]]:
    size = fleet.rows("motor")
    usable = np.ones(size, dtype=bool)
    labels: list[NDArray[np.str_]] = []
    for name in SISTERS_ALIKE:
        column = _motor_view(fleet, name)
        if column is None:
            column = Column.empty("text", size)
        label = _labels(column)
        if name not in MAY_BE_ABSENT:
            usable &= label != ""
        labels.append(label)
    return [" · ".join(part for part in parts if part) for parts in zip(*labels, strict=True)], usable


def _peer_labels(fleet: Fleet) -> tuple[list[str], NDArray[np.bool_]]:
    size = fleet.rows("motor")
    voltage = _motor_view(fleet, "rated_voltage_v") or Column.empty("number", size)
    method = _motor_view(fleet, "starting_method") or Column.empty("text", size)
    level = np.searchsorted(VOLTAGE_LEVELS_V, np.nan_to_num(voltage.values))
    bounds = ("0", *(f"{bound / 1000:g}" for bound in VOLTAGE_LEVELS_V), "more")
    words = [f"{bounds[at]} to {bounds[at + 1]} kV" for at in level]
    methods = _labels(method)
    usable = ~voltage.missing() & (methods != "")
    return [f"{word}, {name.replace('_', ' ')}" for word, name in zip(words, methods, strict=True)], usable


def _grouped(labels: list[str], usable: NDArray[np.bool_]) -> tuple[Integers, tuple[str, ...]]:
    link = np.full(len(labels), NO_ROW, dtype=np.int64)
    chosen = np.array(labels, dtype=str)[usable]
    if not len(chosen):
        return link, ()
    names, place, members = np.unique(chosen, return_inverse=True, return_counts=True)
    shared = members >= 2
    number = np.where(shared, np.cumsum(shared) - 1, NO_ROW)
    link[usable] = number[place]
    return link, tuple(str(name) for name in names[shared])
