"""Numbers as written to values in the quantity's unit; what cannot be converted is withheld, and said or asked."""

from __future__ import annotations

from collections.abc import Callable, Iterator
from dataclasses import dataclass

import numpy as np
import pandas as pd
from numpy.typing import NDArray

from audit.fleet.column import Floats
from audit.intake.resolve.bases import Base, Beside, base_of, frequency, quotient_of, secondary_ratio
from audit.intake.resolve.ledger import Ledger
from audit.intake.resolve.units import OTHER_BASES, OWN_BASES, Plan, Way, plan_of
from audit.vocabulary.quantities import Quantity, vocabulary
from audit.vocabulary.spellings import dimension_of, spellings
from audit.vocabulary.wire_sizes import awg_mm2

BASE_SPELLINGS = {
    "full_load": "FLA",
    "ct": "CT",
    "earth_ct": "earth CT",
    "motor_voltage": "motor voltage",
    "system_voltage": "system voltage",
    "vt": "VT",
    "device": "device rating",
}
"""Bases as an answer in fleet.toml spells them."""
BASE_WORDS = {
    "full_load": "full load (FLA)",
    "ct": "the CT primary",
    "earth_ct": "the earth-fault CT primary",
    "secondary": "secondary amperes or volts",
    "motor_voltage": "the motor's rated voltage",
    "system_voltage": "the system's nominal voltage",
    "vt": "the VT primary",
    "device": "the rating of the switching device",
    "primary": "primary amperes or volts",
}


@dataclass(frozen=True)
class Converted:
    """Values of the readings of one quantity, and which of them were written without any unit."""

    values: Floats
    bare: NDArray[np.bool_]


def convert(quantity: Quantity, readings: pd.DataFrame, beside: Beside, ledger: Ledger) -> Converted:
    """Convert the numbers of one quantity; `beside` gives other data of the same rows."""
    values = np.full(len(readings), np.nan)
    bare = np.zeros(len(readings), dtype=bool)
    told = ((readings["state"] == "value") & readings["number"].notna()).to_numpy()
    numbers = readings["number"].to_numpy(dtype=np.float64)
    names = ["unit", "base", "header"] if dimension_of(quantity) == "inertia" else ["unit", "base"]
    for rows, key in _written_alike(readings, names, told):
        plan = plan_of(quantity.name, *key)
        part = (numbers[rows] + plan.offset) * plan.factor
        values[rows] = _by_way(quantity, plan, part, readings.iloc[rows], _at(beside, rows), ledger, key[0])
        bare[rows] = plan.way is Way.BARE
    return Converted(values, bare)


def _written_alike(
    readings: pd.DataFrame, names: list[str], told: NDArray[np.bool_]
) -> Iterator[tuple[NDArray[np.intp], tuple[str, ...]]]:
    """Give the places of the readings that are told and written in the same words, and these words."""
    codes = np.zeros(len(readings), dtype=np.int64)
    for name in names:
        words = readings[name].astype("category").cat
        codes = codes * (len(words.categories) + 1) + words.codes.to_numpy()
    for code in np.unique(codes[told]).tolist():
        rows = np.flatnonzero((codes == code) & told)
        yield rows, tuple(str(readings[name].iloc[rows[0]]) for name in names)


def _at(beside: Beside, rows: NDArray[np.intp]) -> Beside:
    def some(name: str) -> Floats:
        return beside(name)[rows]

    return some


def _by_way(
    quantity: Quantity, plan: Plan, part: Floats, readings: pd.DataFrame, beside: Beside, ledger: Ledger, unit: str
) -> Floats:
    if plan.way in (Way.PLAIN, Way.BARE):
        return part
    if plan.way is Way.GAUGE:
        return np.array([awg_mm2(gauge) for gauge in part.tolist()])
    if plan.way in (Way.OPEN_BASE, Way.OPEN_UNIT, Way.WRONG_BASE):
        return _ask(quantity, plan, part, readings, ledger)
    if plan.way is Way.WRONG_UNIT:
        ledger.complain_by_column(
            readings,
            f"'{{written}}' ({unit}) is no unit of {quantity.label}",
            f"a number in {units_of(quantity)}",
            "Correct the unit, or name it in fleet.toml.",
            quantity=quantity.name,
        )
        return np.full(len(part), np.nan)
    base, combine = _base(quantity, plan, beside)
    _say_lacking(quantity, plan, base, readings, ledger)
    return combine(part, base.values)


def _base(quantity: Quantity, plan: Plan, beside: Beside) -> tuple[Base, Callable[[Floats, Floats], Floats]]:
    if plan.way is Way.CYCLES:
        return frequency(beside), quotient_of
    if plan.way is Way.SECONDARY:
        return secondary_ratio(quantity, beside), np.multiply
    if plan.way is Way.MULTIPLE:
        return base_of(quantity, plan.base, beside), np.multiply
    if plan.way is Way.REBASED:
        written, own = OTHER_BASES[quantity.name, plan.base]
        labels = " and ".join(vocabulary().quantities[name].label for name in (written, own))
        return Base(quotient_of(beside(written), beside(own)), f"the {labels}"), np.multiply
    if plan.way is Way.OF_VOLTAGE:
        return Base(beside("rated_voltage_v") / 100, "the rated voltage of the motor"), quotient_of
    voltage_kv = beside("bus_nominal_v") / 1000 * np.sqrt(3.0)
    return Base(voltage_kv * _per_mva(), "the nominal voltage of the bus"), quotient_of


def _per_mva() -> float:
    """Give one MVA in the first unit of its dimension, so that MVA over kV is kA."""
    return spellings().dimensions["apparent_power"].units["mva"].factor


def _ask(quantity: Quantity, plan: Plan, part: Floats, readings: pd.DataFrame, ledger: Ledger) -> Floats:
    if plan.way is Way.OPEN_UNIT and not quantity.bases:
        answers = tuple(
            f'unit = "{unit}"' for unit in spellings().dimensions[dimension_of(quantity) or "inertia"].units
        )
        ledger.ask_by_column(readings, f"{quantity.label}: '{{header}}' names no unit", "In which unit is it?", answers)
    elif plan.way is Way.OPEN_UNIT:
        ledger.ask_by_column(
            readings,
            f"{quantity.label}: '{{written}}' of {BASE_WORDS[plan.base]}",
            "Is it a multiple or per cent?",
            tuple(f'unit = "{sign} {BASE_SPELLINGS[plan.base]}"' for sign in ("x", "%")),
        )
    else:
        possible = (*quantity.bases, *OWN_BASES.get(quantity.name, ()))
        allowed = tuple(f'base = "{base}"' for base in possible if base != "secondary")
        of = f", {BASE_WORDS[plan.base]} is no base of it" if plan.way is Way.WRONG_BASE else ""
        ledger.ask_by_column(
            readings,
            f"{quantity.label}: '{{written}}' is a multiple or per cent without a known base{of}",
            "Of what is it a multiple or per cent? The values are withheld until then.",
            allowed,
        )
    return np.full(len(part), np.nan)


def _say_lacking(quantity: Quantity, plan: Plan, base: Base, readings: pd.DataFrame, ledger: Ledger) -> None:
    if base.open is not None and base.open.any():
        ledger.ask_by_column(
            readings[base.open],
            f"{quantity.label}: '{{written}}' may be a multiple of the phase CT or of the earth-fault CT",
            "Of which CT? The values are withheld until then.",
            ('base = "earth_ct"', "the source of the earth-fault current, in the relay list"),
        )
    lacking = np.isnan(base.values) if base.open is None else np.isnan(base.values) & ~base.open
    if lacking.any():
        ledger.complain_by_column(
            readings[lacking],
            f"'{{written}}' as {quantity.label} cannot be made a value in {unit_words(quantity)}",
            base.lacks,
            "Give that datum for the motor or relay; the setting counts as missing until then.",
            quantity=quantity.name,
        )


def unit_words(quantity: Quantity) -> str:
    """Give the unit of a quantity as a reader writes it.

    >>> from audit.vocabulary.quantities import vocabulary
    >>> unit_words(vocabulary().quantities["cable_runs"])
    'plain numbers'
    """
    return (quantity.unit.symbol if quantity.unit else "") or "plain numbers"


def units_of(quantity: Quantity) -> str:
    """Give the units in which a quantity may be written, as a reader writes them."""
    own = dimension_of(quantity)
    words = [unit_words(quantity)]
    if own is not None:
        words += [unit for unit in spellings().dimensions[own].units if unit not in ("x", words[0].casefold())]
    return ", ".join(dict.fromkeys(words))
