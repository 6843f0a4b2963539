"""Cells of one quantity to readings: value or state, unit and base, and what had to be complained about."""

from __future__ import annotations

import math
from datetime import datetime
from functools import lru_cache

import numpy as np

from audit.intake.celltext import (
    KIND_CODES,
    CellKind,
    CellReading,
    cell_text,
    read_date_cells,
    read_number_column,
    read_text_cells,
)
from audit.intake.recognition.blocks import (
    BAD,
    NOT_USED,
    OFF,
    PENDING,
    VALUE,
    Readings,
    filled,
    objects,
)
from audit.intake.recognition.source import ADVICE, Cells, Source
from audit.vocabulary.quantities import Quantity, fold_choice, vocabulary
from audit.vocabulary.spellings import UnitReading, conversion, read_unit

NO_UNIT = UnitReading("")
EPOCH = datetime(1970, 1, 1)
MANY = 20
_RATED_VOLTAGE_ONLY = ("safe_stall_hot_s", "safe_stall_cold_s", "locked_rotor_a", "locked_rotor_ratio")


def read_cells(quantity: Quantity, cells: Cells, source: Source) -> Readings:
    """Read cells of one quantity."""
    if quantity.kind == "number":
        return _numbers(quantity, cells, source)
    if quantity.kind == "date":
        return _dates(quantity, cells, source)
    return _texts(quantity, cells, source)


def _blank(quantity: Quantity, cells: Cells) -> Readings:
    size = len(cells.values)
    return Readings(
        quantity.name,
        cells.record,
        filled("", size),
        np.full(size, math.nan),
        filled(None, size),
        filled("", size),
        filled("", size),
        filled("", size),
        cells.address,
        cells.header,
        group=cells.group,
    )


def _finish(made: Readings, cells: Cells, source: Source) -> Readings:
    """Withhold struck-through cells, keep the cells as written, and leave out the blank ones."""
    if cells.struck is not None and cells.struck.any():
        for index in np.flatnonzero(cells.struck & (made.state != "")).tolist():
            made.state[index] = BAD
            made.number[index] = math.nan
            source.complain(
                int(cells.address[index]),
                f"'{cell_text(cells.values[index])}' is struck through",
                "a value that stands",
                "Delete what no longer holds, or take the stroke away.",
                made.quantity,
            )
    present = np.flatnonzero(made.state != "")
    made = made.part(present)
    known: dict[object, str] = {}
    written = []
    for place in present.tolist():
        value = cells.values[place]
        if not isinstance(value, str):
            # 1 and True are one key of a dictionary
            key = (type(value), value)
            text = known.get(key)
            if text is None:
                text = known[key] = cell_text(value)
            value = text
        written.append(value)
    made.written = objects(written)
    return made


def unit_of(text: str, stated: UnitReading | None, quantity: Quantity) -> UnitReading | None:
    """Give the unit of a cell from its own text and from what its header says; None where its own does not fit."""
    stated = stated or NO_UNIT
    if not text:
        return stated
    own = unit_named(text, quantity.name)
    if own is None:
        return None
    if not own.base and stated.base and _takes_base(own, stated):
        return UnitReading(own.unit, stated.base)
    return own


@lru_cache(maxsize=4096)
def unit_named(text: str, quantity: str) -> UnitReading | None:
    """Give what a written unit means for a quantity, or None; each spelling is looked up once."""
    return read_unit(text, vocabulary().quantities[quantity])


def _takes_base(own: UnitReading, stated: UnitReading) -> bool:
    multiple = own.unit in ("x", "pct")
    return multiple == (stated.base not in ("primary", "secondary"))


def _numbers(quantity: Quantity, cells: Cells, source: Source) -> Readings:
    made = _blank(quantity, cells)
    size = len(cells.values)
    column = read_number_column(cells.values, decimal_comma=source.decimal_comma, percent=cells.percent)
    plain = column.kinds == KIND_CODES[CellKind.NUMBER]
    made.state[plain] = VALUE
    made.number = np.where(plain, column.values, math.nan)
    if cells.unit is None or isinstance(cells.unit, UnitReading):
        stated = cells.unit or NO_UNIT
        made.unit.fill(stated.unit)
        made.base.fill(stated.base)
    else:
        for index in range(size):
            stated = cells.unit[index] or NO_UNIT
            made.unit[index], made.base[index] = stated.unit, stated.base
    bad: list[tuple[int, str, str]] = []
    for index, reading in column.odd.items():
        complaint = _odd(made, index, reading, cells, quantity, source)
        if complaint:
            bad.append((index, *complaint))
    _complain(bad, int(np.count_nonzero(made.state != "")), cells, quantity, source)
    if quantity.role == "setting":
        _zeros_and_stand_ins(made, quantity, source)
    return _finish(made, cells, source)


def _odd(
    made: Readings, index: int, reading: CellReading, cells: Cells, quantity: Quantity, source: Source
) -> tuple[str, str] | None:
    """Fill in one cell that is no plain number; give what is wrong with it and what was expected."""
    setting = quantity.role == "setting"
    kind = reading.kind
    expected = f"{quantity.label}: a number" + (
        f" in {quantity.unit.symbol}" if quantity.unit and quantity.unit.symbol else ""
    )
    made.number[index] = math.nan
    made.state[index] = BAD
    if kind is CellKind.NUMBER:
        unit = unit_of(reading.unit_text, cells.stated(index), quantity)
        if unit is None:
            return f"'{reading.text}': '{reading.unit_text}' is no unit of {quantity.label}", expected
        if quantity.name in _RATED_VOLTAGE_ONLY and _at_other_voltage(reading.qualifier):
            return f"'{reading.text}' holds at another voltage than the rated one", f"{quantity.label}"
        made.state[index] = VALUE
        made.number[index] = reading.number
        made.unit[index], made.base[index] = unit.unit, unit.base
        if reading.remark:
            source.remark(int(cells.address[index]), f"'{reading.text}': {reading.remark}", expected, "", quantity.name)
        return None
    if kind is CellKind.OFF or (kind is CellKind.NOT_USED and setting):
        if not setting:
            made.state[index] = ""
            return None
        made.state[index] = OFF if kind is CellKind.OFF else NOT_USED
        return None
    if kind in (CellKind.MISSING, CellKind.NOT_USED):
        made.state[index] = ""
        return None
    if kind is CellKind.TO_BE_CONFIRMED:
        made.state[index] = PENDING
        return None
    if kind is CellKind.AMBIGUOUS:
        settled = _plausible_one(reading, cells.stated(index), quantity)
        if settled is not None:
            made.state[index], made.number[index] = VALUE, settled
            made.unit[index] = reading.unit_text or made.unit[index]
            others = " or ".join(f"{number:.15g}" for number in reading.numbers if number != settled)
            source.remark(
                int(cells.address[index]),
                f"'{reading.text}' read as {settled:.15g}: {others} is out of the question for {quantity.label}",
                "one decimal mark",
                "",
                quantity.name,
            )
            return None
    if kind is CellKind.INSTANTANEOUS and (quantity.part or "").endswith("delay"):
        made.state[index] = VALUE
        made.number[index] = 0.0
        made.unit[index] = "s"
        return None
    remark = reading.remark or f"'{reading.text}' is not a number"
    return remark if reading.text and reading.text in remark else f"'{reading.text}': {remark}", expected


def _plausible_one(reading: CellReading, stated: UnitReading | None, quantity: Quantity) -> float | None:
    """Give the one meaning of a text that lies within the plausible range, or None where several or none do."""
    unit = unit_of(reading.unit_text, stated, quantity)
    if unit is None or unit.base or quantity.plausible is None or len(reading.numbers) != 2:
        return None
    converted = conversion(unit.unit, quantity) if unit.unit else (1.0, 0.0)
    if converted is None or unit.unit in ("x", "cycles"):
        return None
    factor, offset = converted
    low, high = quantity.plausible
    fitting = [number for number in reading.numbers if low <= (number + offset) * factor <= high]
    return fitting[0] if len(fitting) == 1 else None


def _at_other_voltage(qualifier: str) -> bool:
    text = qualifier.replace(" ", "").casefold()
    return text.startswith("@") and any(c.isdigit() for c in text) and not text.startswith(("@100%", "@1.0", "@1,0"))


def _complain(bad: list[tuple[int, str, str]], present: int, cells: Cells, quantity: Quantity, source: Source) -> None:
    """Complain about each bad cell, or once about a column most of which is bad."""
    if len(bad) >= MANY and len(bad) > 0.6 * present:
        index, found, expected = bad[0]
        source.complain(
            int(cells.address[index]),
            f"{len(bad)} of {present} cells below '{cells.header}' cannot be used, first: {found}",
            expected,
            "See whether the column holds this quantity at all; the site map can say what it is.",
            quantity.name,
        )
        return
    for index, found, expected in bad:
        source.complain(int(cells.address[index]), found, expected, ADVICE, quantity.name)


def _zeros_and_stand_ins(made: Readings, quantity: Quantity, source: Source) -> None:
    values = made.state == VALUE
    if source.stand_ins:
        off = values & np.isin(made.number, list(source.stand_ins))
        made.state[off] = OFF
        made.number[off] = math.nan
        values &= ~off
    if quantity.part not in ("trip_pickup", "alarm_pickup"):
        return
    zero = np.flatnonzero(values & (made.number == 0))
    if not zero.size or source.zero_means_off is False:
        return
    if source.zero_means_off:
        made.state[zero] = OFF
        made.number[zero] = math.nan
        return
    made.state[zero] = BAD
    made.number[zero] = math.nan
    more = f" and {zero.size - 1} more" if zero.size > 1 else ""
    source.ask(
        int(made.cell[zero[0]]),
        f"{quantity.label} is 0 here{more}",
        "Does 0 mean that the function is off? Say so in fleet.toml: zero_means_off = true, or false.",
        ("zero_means_off = true", "zero_means_off = false"),
    )


def _texts(quantity: Quantity, cells: Cells, source: Source) -> Readings:
    made = _blank(quantity, cells)
    spelled = quantity.spellings or {}
    setting = quantity.role == "setting"
    for index, reading in enumerate(read_text_cells(cells.values)):
        kind = reading.kind
        if kind is CellKind.TEXT or kind is CellKind.OFF or (spelled and _is_spelled(reading.text, spelled)):
            made.state[index] = VALUE
            made.text[index] = reading.text
        elif kind is CellKind.TO_BE_CONFIRMED:
            made.state[index] = PENDING
        elif kind is CellKind.NOT_USED and setting:
            made.state[index] = NOT_USED
        elif kind is CellKind.ERROR:
            made.state[index] = BAD
            source.complain(int(cells.address[index]), reading.remark, quantity.label, ADVICE, quantity.name)
    return _finish(made, cells, source)


def _is_spelled(text: str, spelled: object) -> bool:
    return isinstance(spelled, dict) and fold_choice(text) in spelled


def _dates(quantity: Quantity, cells: Cells, source: Source) -> Readings:
    made = _blank(quantity, cells)
    bad: list[tuple[int, str, str]] = []
    for index, reading in enumerate(read_date_cells(cells.values, day_first=source.day_first)):
        kind = reading.kind
        if kind is CellKind.DATE and reading.moment is not None:
            made.state[index] = VALUE
            made.number[index] = days_of(reading.moment)
        elif kind is CellKind.TO_BE_CONFIRMED:
            made.state[index] = PENDING
        elif kind in (CellKind.BAD, CellKind.AMBIGUOUS, CellKind.ERROR):
            made.state[index] = BAD
            bad.append((index, reading.remark, f"{quantity.label}: a day"))
    _complain(bad, int(np.count_nonzero(made.state != "")), cells, quantity, source)
    return _finish(made, cells, source)


def days_of(moment: datetime) -> float:
    """Give a moment as days since 1 January 1970, the time of day as a fraction.

    >>> days_of(datetime(1970, 1, 2, 12))
    1.5
    """
    return (moment.replace(tzinfo=None) - EPOCH).total_seconds() / 86400
