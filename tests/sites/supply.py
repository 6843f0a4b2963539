"""Buses from their transformers: fault currents, earthing, incomers."""

from __future__ import annotations

import math
from dataclasses import dataclass
from datetime import date

from tests.sites.plant import Record, number
from tests.sites.rounding import down, near, up

FREQUENCY_HZ = 50.0


@dataclass(frozen=True)
class Transformer:
    """A transformer with the short-circuit power behind it, greatest and least."""

    rating_mva: float
    impedance_pct: float
    source_max_mva: float
    source_min_mva: float


def transformer_bus(
    name: str, nominal_v: float, transformer: Transformer, earthing: str, *, running_motors_mva: float = 0.0
) -> Record:
    """Make a bus behind a transformer.

    Three-phase fault current by impedances in series, voltage factors of IEC 60909 (1.10 or 1.05 greatest;
    1.00 or 0.95 least); motors that run add five times their rated current to the greatest.
    """
    low_voltage = nominal_v < 1000
    base = transformer.rating_mva * 1e6 / (math.sqrt(3) * nominal_v)
    currents = []
    for source, factor in (
        (transformer.source_max_mva, 1.05 if low_voltage else 1.10),
        (transformer.source_min_mva, 0.95 if low_voltage else 1.00),
    ):
        impedance = transformer.impedance_pct / 100 + transformer.rating_mva / source
        currents.append(factor * base / impedance / 1e3)
    motors = 5 * running_motors_mva * 1e3 / (math.sqrt(3) * nominal_v)
    return {
        "bus_name": name,
        "bus_nominal_v": nominal_v,
        "bus_highest_voltage_v": near(nominal_v * 1.04, 1 if low_voltage else 10),
        "bus_frequency_hz": FREQUENCY_HZ,
        "bus_phase_rotation": "abc",
        "fault_max_ka": up(currents[0] + motors, 0.1),
        "fault_min_ka": down(currents[1], 0.1),
        "fault_x_r_ratio": 8.0 if low_voltage else 15.0,
        "fault_includes_motors": True,
        "fault_study_date": date(2024, 5, 14),
        "earthing": earthing,
        "bus_clearing_time_s": 0.5,
        "standing_unbalance_pct": 0.8,
        "automatic_transfer": "none",
    }


def earth_through_resistor(bus: Record, resistor_a: float, resistors: int = 1, charging_a: float = 0.0) -> None:
    """Earth a bus through resistors that each carry `resistor_a`; charging current adds at a right angle."""
    bus["neutral_resistor_ohm"] = near(number(bus, "bus_nominal_v") / math.sqrt(3) / resistor_a, 0.1)
    bus["earth_fault_max_a"] = near(math.hypot(resistor_a * resistors, charging_a), 0.1)
    bus["earth_fault_min_a"] = resistor_a


def protect_incomer(
    bus: Record, pickup_a: float, multiplier: float, earth_pickup_a: float, earth_delay_s: float
) -> None:
    """Set the incomer: standard inverse overcurrent, earth fault by definite time (none: 0)."""
    bus["incomer_overcurrent_on"] = True
    bus["incomer_pickup_a"] = pickup_a
    bus["incomer_curve"] = "iec_standard_inverse"
    bus["incomer_time_multiplier"] = multiplier
    bus["incomer_earth_fault_on"] = earth_delay_s > 0
    if earth_delay_s > 0:
        bus["incomer_earth_fault_pickup_a"] = earth_pickup_a
        bus["incomer_earth_fault_delay_s"] = earth_delay_s
