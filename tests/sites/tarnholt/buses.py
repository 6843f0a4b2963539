"""Buses of the Tarnholt works: 33 kV intake, 6.6 kV, 3.3 kV, 690 V and 400 V."""

from __future__ import annotations

from datetime import date

from tests.sites.plant import Record
from tests.sites.supply import Transformer, earth_through_resistor, protect_incomer, transformer_bus


def tarnholt_buses() -> list[Record]:
    """Give the buses with their earthing and incomers."""
    buses = []
    for name, motors in (("SWB-6A", 5.0), ("SWB-6B", 5.5)):
        bus = transformer_bus(
            name, 6600, Transformer(12.5, 10.0, 1000, 500), "low_resistance", running_motors_mva=motors
        )
        earth_through_resistor(bus, 400.0, resistors=2, charging_a=12.0)
        protect_incomer(bus, 1250.0, 0.25, 80.0, 0.8)
        buses.append(bus)
    for name, earthing in (("MCC-3A", "low_resistance"), ("MCC-3B", "high_resistance")):
        bus = transformer_bus(name, 3300, Transformer(4.0, 6.5, 130, 100), earthing, running_motors_mva=2.0)
        if earthing == "low_resistance":
            earth_through_resistor(bus, 100.0, charging_a=3.0)
            protect_incomer(bus, 800.0, 0.25, 20.0, 1.2)
        else:
            earth_through_resistor(bus, 8.0, charging_a=2.4)
            protect_incomer(bus, 800.0, 0.25, 0.0, 0.0)
        buses.append(bus)
    bus = transformer_bus("SWB-7", 690, Transformer(2.5, 6.0, 130, 100), "solid", running_motors_mva=1.2)
    protect_incomer(bus, 2500.0, 0.3, 600.0, 0.6)
    buses.append(bus)
    for name in ("MCC-41", "MCC-42", "MCC-43", "MCC-44"):
        bus = transformer_bus(name, 400, Transformer(1.6, 6.0, 130, 100), "solid", running_motors_mva=0.6)
        protect_incomer(bus, 2500.0, 0.3, 600.0, 0.6)
        buses.append(bus)
    buses[0]["supply_changed_date"] = date(2019, 8, 12)
    return buses
