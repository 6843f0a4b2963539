"""What settings are multiples of: the relay's own settings, or the fitted transformers."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from audit.fleet.column import Floats
from audit.vocabulary.quantities import Quantity, vocabulary

Beside = Callable[[str], NDArray[np.float64]]
"""Gives a quantity of the same motor, relay or bus for each reading in hand, missing where it is not known."""

FIRST = (
    "frequency_hz", "bus_frequency_hz", "relay_frequency_hz",
    "rated_voltage_v", "bus_nominal_v", "full_load_a", "device_rated_current_a",
    "ct_primary_a", "ct_secondary_a", "ct_turns", "earth_ct_kind", "earth_ct_primary_a", "earth_ct_secondary_a",
    "vt_primary_v", "vt_secondary_v", "vt_connection",
    "relay_ct_primary_a", "relay_ct_secondary_a", "relay_earth_source", "relay_earth_ct_primary_a",
    "relay_earth_ct_secondary_a", "relay_vt_primary_v", "relay_vt_secondary_v", "relay_vt_connection",
    "relay_full_load_a",
)  # fmt: skip
"""Quantities that other values are made with, in an order in which each needs only earlier ones."""

_OF_THE_MOTOR = ("magnetic", "overload_dial")
"""Elements without a full-load setting of their own: 'x FLA' is the motor's."""


@dataclass(frozen=True)
class Base:
    """A base for each reading in hand; `lacks` says which datum is missing, `open` where two are possible."""

    values: Floats
    lacks: str
    open: NDArray[np.bool_] | None = None


def base_of(quantity: Quantity, base: str, beside: Beside) -> Base:
    """Give what a multiple is a multiple of, in the quantity's unit."""
    if base == "full_load":
        of_relay = quantity.subject == "relay" and quantity.element not in _OF_THE_MOTOR
        return _plain("relay_full_load_a" if of_relay else "full_load_a", beside)
    if base == "ct" and quantity.element == "earth_fault":
        return _earth_fault_ct(beside)
    names = {
        "ct": "relay_ct_primary_a",
        "earth_ct": "relay_earth_ct_primary_a",
        "device": "device_rated_current_a",
        "motor_voltage": "rated_voltage_v",
        "system_voltage": "bus_nominal_v",
        "vt": "relay_vt_primary_v",
    }
    return _plain(names[base], beside)


def frequency(beside: Beside) -> Base:
    """Frequency that turns cycles into seconds: of the bus, else of the motor, else set in the relay."""
    found = _first_known(beside("bus_frequency_hz"), beside("frequency_hz"), beside("relay_frequency_hz"))
    return Base(found, "the frequency of the bus or the motor")


def secondary_ratio(quantity: Quantity, beside: Beside) -> Base:
    """Ratio by which secondary amperes or volts become primary ones: fitted, else as set in the relay."""
    if quantity.unit is not None and quantity.unit.symbol == "V":
        return _voltage_ratio(beside)
    phase = _first_known(
        quotient_of(beside("ct_primary_a"), beside("ct_secondary_a")) / np.fmax(beside("ct_turns"), 1.0),
        quotient_of(beside("relay_ct_primary_a"), beside("relay_ct_secondary_a")),
    )
    if quantity.element != "earth_fault":
        return Base(phase, "the ratio of the phase CT")
    core = _first_known(
        quotient_of(beside("earth_ct_primary_a"), beside("earth_ct_secondary_a")),
        quotient_of(beside("relay_earth_ct_primary_a"), beside("relay_earth_ct_secondary_a")),
    )
    residual = _source(beside, "residual")
    known = residual | _source(beside, "core_balance") | ~np.isnan(core)
    ratio = np.where(residual, phase, core)
    return Base(np.where(known, ratio, np.nan), "the ratio of the earth-fault CT, or that it is residual")


def _earth_fault_ct(beside: Beside) -> Base:
    phase, earth = beside("relay_ct_primary_a"), beside("relay_earth_ct_primary_a")
    core, residual = _source(beside, "core_balance"), _source(beside, "residual")
    unsaid = ~core & ~residual
    values = np.where(core, earth, np.where(residual | np.isnan(earth), phase, np.nan))
    return Base(values, "the CT primary set in the relay for earth faults", unsaid & ~np.isnan(earth))


def _source(beside: Beside, choice: str) -> NDArray[np.bool_]:
    """Tell where the earth-fault source is this one: as set in the relay, else as fitted."""
    known = vocabulary().quantities
    set_, fitted = beside("relay_earth_source"), beside("earth_ct_kind")
    is_set = np.equal(set_, known["relay_earth_source"].choices.index(choice))
    is_fitted = np.equal(fitted, known["earth_ct_kind"].choices.index(choice))
    return np.logical_or(is_set, np.logical_and(np.isnan(set_), is_fitted))


def _voltage_ratio(beside: Beside) -> Base:
    star = vocabulary().quantities["vt_connection"].choices.index("line_to_neutral")
    connection = _first_known(beside("vt_connection"), beside("relay_vt_connection"))
    ratio = _first_known(
        quotient_of(beside("vt_primary_v"), beside("vt_secondary_v")),
        quotient_of(beside("relay_vt_primary_v"), beside("relay_vt_secondary_v")),
    )
    per_line = np.where(np.isnan(connection), np.nan, np.where(connection == star, np.sqrt(3.0), 1.0))
    return Base(ratio * per_line, "the ratio of the VT, or whether it is connected line-to-line or line-to-neutral")


def _plain(name: str, beside: Beside) -> Base:
    return Base(beside(name), f"the {vocabulary().quantities[name].label}")


def _first_known(*candidates: Floats) -> Floats:
    found = candidates[0].copy()
    for candidate in candidates[1:]:
        np.copyto(found, candidate, where=np.isnan(found))
    return found


def quotient_of(above: Floats, below: Floats) -> Floats:
    """Divide, missing where the lower number is missing or not above nought."""
    quotient = np.full(len(above), np.nan)
    np.divide(above, below, out=quotient, where=below > 0)
    return quotient
