"""A fleet as it was left: as-left values put into the readings, so that everything made with them follows."""

from __future__ import annotations

import dataclasses
from collections.abc import Collection, Iterable

import numpy as np
import pandas as pd

from audit.findings.closeout.answers import Answer
from audit.findings.closeout.matching import Matched
from audit.fleet.addresses import NO_CELL
from audit.fleet.fleet import Fleet
from audit.intake.gathered import Gathered

HEADER = "as left, returned sheet"


def with_as_left(gathered: Gathered, fleet: Fleet, matched: Iterable[Matched], read_files: Collection[str]) -> Gathered:
    """Give the readings with the as-left values in place of those that they replace.

    `fleet` is the fleet made of the readings; settings that stand in one of `read_files`, which were read after
    the work, are left as they were read.
    """
    readings = gathered.readings.copy()
    positions: dict[tuple[int, str], list[int]] = {}
    for position, key in enumerate(zip(readings["cell"].tolist(), readings["quantity"].tolist(), strict=True)):
        positions.setdefault((int(key[0]), str(key[1])), []).append(position)
    relays = {key: row for row, key in enumerate(fleet.tables["relay"].keys)}
    changes: list[tuple[list[int], Answer]] = []
    new: list[pd.Series] = []
    for one in matched:
        relay_row = relays.get(one.work.relay_key, -1)
        if not one.usable or relay_row < 0:
            continue
        setting = one.work.setting
        cell = int(fleet.tables["relay"].columns[setting].cell[relay_row])
        place = fleet.book.place(cell) if cell != NO_CELL else None
        if place is not None and place.file in read_files:
            continue
        at = positions.get((cell, setting), []) if cell != NO_CELL else []
        if at:
            changes.append((at, one.as_left))
            continue
        row = _new_reading(gathered, fleet, relay_row, one)
        if row is not None:
            new.append(row)
    for at, answer in changes:
        _put(readings, at, answer)
    if new:
        readings = pd.concat([readings, pd.DataFrame(new)], ignore_index=True).astype(readings.dtypes.to_dict())
    return dataclasses.replace(gathered, readings=readings)


def _put(readings: pd.DataFrame, at: list[int], answer: Answer) -> None:
    is_number = answer.number == answer.number
    for column, value in (
        ("state", "off" if answer.off else "value"),
        ("number", answer.number if is_number else np.nan),
        ("text", None if is_number or answer.off else answer.written),
        ("written", answer.written),
    ):
        place = readings.columns.get_loc(column)
        assert isinstance(place, int)
        for position in at:
            readings.iat[position, place] = value


def _new_reading(gathered: Gathered, fleet: Fleet, relay_row: int, one: Matched) -> pd.Series | None:
    """Give a reading of a setting that the export does not hold, beside another one of the same relay."""
    told = fleet.readings
    same = told[((told["subject"] == "relay") & (told["row"] == relay_row)).to_numpy()]
    cells = gathered.readings["cell"].to_numpy()
    found = np.flatnonzero(np.isin(cells, same["cell"].to_numpy()))
    if not len(found):
        return None
    row = gathered.readings.iloc[int(found[0])].copy()
    answer = one.as_left
    row["quantity"], row["header"], row["cell"] = one.work.setting, HEADER, NO_CELL
    row["state"] = "off" if answer.off else "value"
    row["number"], row["written"] = answer.number, answer.written
    row["text"] = None if answer.number == answer.number else answer.written
    row["unit"], row["base"] = one.work.written.unit_code, one.work.written.base
    return row
