"""What a written unit and base make of a number, per quantity: a plan that holds for every cell written so."""

from __future__ import annotations

import re
from collections.abc import Mapping
from dataclasses import dataclass
from enum import Enum
from functools import lru_cache

from audit.vocabulary.quantities import Quantity, vocabulary
from audit.vocabulary.spellings import conversion, dimension_of, spellings

_GD2 = re.compile(r"\bG\s?D\s?[2²]", re.IGNORECASE)
_WK2 = re.compile(r"\bW\s?[KR]\s?[2²]", re.IGNORECASE)
_OF_RATED_VOLTAGE = (
    "start_voltage_pct",
    "lowest_start_voltage_pct",
    "stated_undervoltage_pickup_pct",
    "stated_overvoltage_pickup_pct",
)
OWN_BASES: Mapping[str, tuple[str, ...]] = {
    "unbalance_trip_pickup_pct": ("full_load",),
    "unbalance_alarm_pickup_pct": ("full_load",),
    "locked_rotor_ratio": ("full_load",),
    "ia_in_ratio": ("full_load",),
    "phase_sequence_trip_pickup_pct": ("motor_voltage", "system_voltage", "vt"),
    **dict.fromkeys(_OF_RATED_VOLTAGE, ("motor_voltage",)),
}
"""Bases that a ratio or per cent has anyway: naming them changes nothing."""
OTHER_BASES: Mapping[tuple[str, str], tuple[str, str]] = {
    **{
        (f"unbalance_{part}_pickup_pct", "ct"): ("relay_ct_primary_a", "relay_full_load_a")
        for part in ("trip", "alarm")
    },
    **{(name, "system_voltage"): ("bus_nominal_v", "rated_voltage_v") for name in _OF_RATED_VOLTAGE},
    **{(name, "vt"): ("relay_vt_primary_v", "rated_voltage_v") for name in _OF_RATED_VOLTAGE},
}
"""Per cent of another base: times the base written, over the quantity's own."""


class Way(Enum):
    """How a number becomes a value in the quantity's unit."""

    PLAIN = "a constant factor and offset"
    BARE = "no unit was written: the quantity's own"
    CYCLES = "cycles, divided by the frequency"
    GAUGE = "an American wire gauge"
    SECONDARY = "secondary amperes or volts, times a transformer ratio"
    MULTIPLE = "a multiple of a base"
    OF_VOLTAGE = "volts, as a part of the motor's rated voltage"
    OF_POWER = "a fault level in MVA, divided by the bus voltage"
    REBASED = "a per cent of another base than the quantity's own"
    OPEN_BASE = "a multiple or per cent of an unnamed base"
    OPEN_UNIT = "a number whose header allows two units"
    WRONG_BASE = "a base that this quantity has not"
    WRONG_UNIT = "a unit of something else"


@dataclass(frozen=True, slots=True)
class Plan:
    """(number + offset) * factor, and what else the way asks for."""

    way: Way
    factor: float = 1.0
    offset: float = 0.0
    base: str = ""


@lru_cache(maxsize=4096)
def plan_of(name: str, unit: str, base: str, header: str = "") -> Plan:
    """Give the plan for a quantity written in a unit on a base.

    >>> plan_of("jam_trip_delay_s", "ms", "")
    Plan(way=<Way.PLAIN: 'a constant factor and offset'>, factor=0.001, offset=0.0, base='')
    >>> plan_of("jam_trip_pickup_a", "pct", "full_load").factor
    0.01
    """
    quantity = vocabulary().quantities[name]
    own = dimension_of(quantity)
    if own == "inertia":
        special = _inertia(unit, header)
        if special is not None:
            return special
    if not unit:
        if base == "secondary":
            return Plan(Way.SECONDARY)
        if base in quantity.bases or base == "device":
            return Plan(Way.OPEN_UNIT, base=base)
        return Plan(Way.PLAIN if base in ("primary", "device") else Way.BARE)
    ratio = spellings().dimensions["ratio"].units
    if own != "ratio" and unit in ratio:
        return _multiple(quantity, ratio[unit].factor, base)
    found = conversion(unit, quantity)
    if found is not None and own == "ratio" and base not in ("", "primary", *OWN_BASES.get(name, ())):
        way = Way.REBASED if (name, base) in OTHER_BASES else Way.WRONG_BASE
        return Plan(way, found[0], base=base)
    if found is not None and own is not None:
        if spellings().dimensions[own].units[unit].periods:
            return Plan(Way.CYCLES, found[0])
        if base == "secondary" and own in ("current", "voltage"):
            return Plan(Way.SECONDARY, found[0])
        return Plan(Way.PLAIN, *found, base=base)
    if own == "area" and unit == "awg":
        return Plan(Way.GAUGE)
    return _other_dimension(quantity, unit)


def _multiple(quantity: Quantity, factor: float, base: str) -> Plan:
    allowed = tuple(known for known in quantity.bases if known != "secondary")
    if base in allowed or (base == "device" and quantity.bases):
        return Plan(Way.MULTIPLE, factor, base=base)
    if not base and len(allowed) == 1:
        return Plan(Way.MULTIPLE, factor, base=allowed[0])
    if not allowed:
        return Plan(Way.WRONG_UNIT)
    return Plan(Way.OPEN_BASE if not base or base == "primary" else Way.WRONG_BASE, factor, base=base)


def _other_dimension(quantity: Quantity, unit: str) -> Plan:
    also = spellings().also.get(quantity.name)
    if also is not None and unit in spellings().dimensions[also].units:
        factor = spellings().dimensions[also].units[unit].factor
        return Plan(Way.OF_VOLTAGE if also == "voltage" else Way.OF_POWER, factor)
    return Plan(Way.WRONG_UNIT)


def _inertia(unit: str, header: str) -> Plan | None:
    """GD² is four times the inertia whatever its unit; WK² without a unit may be lb-ft² or kg m²."""
    if _GD2.search(header):
        return Plan(Way.PLAIN, 0.25) if unit in ("", "kgm2", "gd2") else None
    return Plan(Way.OPEN_UNIT) if not unit and _WK2.search(header) else None
