"""Numbers without a unit that cannot be what they seem: multiples read as amperes, fractions read as per cent."""

from __future__ import annotations

from collections.abc import Mapping

import numpy as np
import pandas as pd
from numpy.typing import NDArray

from audit.fleet.column import Floats
from audit.intake.resolve.bases import Beside
from audit.intake.resolve.ledger import Ledger
from audit.intake.resolve.numbers import BASE_SPELLINGS, unit_words
from audit.vocabulary.quantities import Quantity
from audit.vocabulary.spellings import dimension_of

AMPERES: Mapping[str, tuple[float, float]] = {
    "short_circuit": (3.0, 30.0),
    "overcurrent": (0.9, 20.0),
    "thermal": (0.6, 3.0),
    "start_timer": (0.9, 8.0),
    "jam": (0.9, 8.0),
    "undercurrent": (0.08, 1.1),
    "magnetic": (3.0, 30.0),
    "relay_full_load_a": (0.2, 5.0),
    "locked_rotor_a": (1.5, 20.0),
    "start_current_a": (1.0, 25.0),
}
"""Common practice: between which multiples of full load a bare number is believed to be amperes."""
VOLTS = (0.2, 1.5)
"""The same for undervoltage and overvoltage, in multiples of the rated voltage."""
LEAST_AMPERES = {"earth_fault": 0.5, "differential": 1.0}
"""Common practice: below this many primary amperes a bare number is rather a multiple or a secondary value."""
LOOKS_LIKE_A_MULTIPLE = 15.0
LOOKS_LIKE_SECONDARY_VOLTS = 130.0
SHORT_TIME_CONSTANT_S = 300.0
"""Below this a bare time constant may be minutes (common practice: 5 to 60 min)."""
TIME_CONSTANTS = ("heating_time_constant_s", "cooling_time_constant_s")


def bare_doubts(
    quantity: Quantity, values: Floats, bare: NDArray[np.bool_], readings: pd.DataFrame, beside: Beside, ledger: Ledger
) -> Floats:
    """Withhold bare numbers that may be something else, and ask once a column what they are.

    Where most bare numbers of a column are doubtful, all of them are: the column speaks one language.
    """
    doubtful = bare & (values > 0) & _doubtful(quantity, values, beside)
    if not doubtful.any():
        return values
    columns = pd.Series(pd.factorize(readings["header"])[0])
    share = pd.Series(doubtful[bare]).groupby(columns[bare].to_numpy()).mean()
    doubtful |= bare & columns.isin(share.index[share > 0.5]).to_numpy() & ~np.isnan(values)
    answers: tuple[str, ...] = ('unit = "s"', 'unit = "min"')
    about = "may be seconds or minutes"
    if quantity.name not in TIME_CONSTANTS:
        answers = _answers(quantity, float(np.median(values[doubtful])))
        about = f"has no unit and is hardly {unit_words(quantity)} on the primary side"
    ledger.ask_by_column(
        readings[doubtful],
        f"{quantity.label}: '{{written}}' {about}",
        "In which unit, or of what a multiple, is this column? Its values are withheld until then.",
        answers,
    )
    return np.where(doubtful, np.nan, values)


def _answers(quantity: Quantity, typical: float) -> tuple[str, ...]:
    """Give what fleet.toml may say of the unit: primary, secondary, or a multiple or per cent of each base."""
    own = unit_words(quantity)
    sign = "x" if typical <= LOOKS_LIKE_A_MULTIPLE else "%"
    bases = (f"{sign} {BASE_SPELLINGS[base]}" for base in quantity.bases if base != "secondary")
    sides = [f"{own} {side}" for side in ("pri", "sec") if side == "pri" or "secondary" in quantity.bases]
    return tuple(f'unit = "{unit}"' for unit in (*sides, *bases))


def _doubtful(quantity: Quantity, values: Floats, beside: Beside) -> NDArray[np.bool_]:
    if quantity.name in TIME_CONSTANTS:
        return values < SHORT_TIME_CONSTANT_S
    if not quantity.bases:
        return np.zeros(len(values), dtype=bool)
    if dimension_of(quantity) == "voltage":
        rated = _known(beside("rated_voltage_v"), beside("bus_nominal_v"))
        outside = (values < VOLTS[0] * rated) | (values > VOLTS[1] * rated)
        return np.where(np.isnan(rated), values <= LOOKS_LIKE_SECONDARY_VOLTS, outside)
    if quantity.element in LEAST_AMPERES:
        return values < LEAST_AMPERES[quantity.element]
    band = AMPERES.get(quantity.name) or AMPERES.get(quantity.element or "")
    if band is None:
        return np.zeros(len(values), dtype=bool)
    own = quantity.name in ("relay_full_load_a", "locked_rotor_a")
    full_load = beside("full_load_a") if own else _known(beside("full_load_a"), beside("relay_full_load_a"))
    if quantity.name == "relay_full_load_a":
        # a wrong full-load setting is a finding of its own: only what looks like a multiple or secondary is asked
        return (values <= LOOKS_LIKE_A_MULTIPLE) & (values < band[0] * full_load)
    outside = (values < band[0] * full_load) | (values > band[1] * full_load)
    return np.where(np.isnan(full_load), values <= LOOKS_LIKE_A_MULTIPLE, outside)


def _known(first: Floats, second: Floats) -> Floats:
    return np.where(np.isnan(first), second, first)


def fractions_and_per_cents(
    quantity: Quantity, values: Floats, bare: NDArray[np.bool_], readings: pd.DataFrame, ledger: Ledger
) -> Floats:
    """Read a bare 0.945 as 94.5 %, and a bare 86 as 0.86, where only one of the two is possible; say so."""
    if dimension_of(quantity) != "ratio" or quantity.plausible is None or quantity.unit is None:
        return values
    low, high = quantity.plausible
    per_cent = quantity.unit.symbol == "%"
    if not per_cent and not (quantity.name.endswith(("_factor", "_ratio")) and high <= LOOKS_LIKE_A_MULTIPLE):
        return values
    other = values * 100 if per_cent else values / 100
    outside = bare & ((values < low) | (values > high))
    turned = outside & (other >= low) & (other <= high) & (values <= 1.5 if per_cent else values > 1.5)
    if turned.any():
        meant = "fractions, not per cent" if per_cent else "per cent"
        ledger.complain_by_column(
            readings[turned],
            f"{quantity.label}: '{{written}}' has no unit and is taken for {meant}",
            f"{low:g} to {high:g} {quantity.unit.symbol}".strip(),
            "Write the unit into the header if this is wrong.",
            quantity=quantity.name,
            weight="remark",
        )
    return np.where(turned, other, values)
