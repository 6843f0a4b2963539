"""Motor control centres with fused contactors and multifunction relays, on 3.3 kV and on 400 V."""

from __future__ import annotations

from dataclasses import replace

import numpy as np

from tests.sites.fleets.drawing import (
    COMPRESSOR,
    CONVEYOR,
    COUPLED_CONVEYOR,
    FAN,
    MILL,
    MIXER,
    PUMP,
    SCREW,
    Draw,
    Starter,
    board,
    fill,
)
from tests.sites.fleets.high_voltage_plant import DATA
from tests.sites.plant import Site, Value
from tests.sites.supply import earth_through_resistor

STARTS: dict[str, Value] = {"stated_starts_per_hour": 6.0, "stated_start_interval_min": 8.0}
HIGH = Draw(
    (PUMP, PUMP, FAN, COMPRESSOR, MILL, COUPLED_CONVEYOR),
    (Starter("direct_on_line", "fused_contactor", "motor_relay", "mv_contactor", "core_balance", 14, DATA),),
    (160, 200, 220, 250, 280, 315, 355, 400),
    (2, 4, 4, 6),
    (5.2, 6.0),
    (60, 260),
)
LOW_RELAY = Starter("direct_on_line", "fused_contactor", "motor_relay", "lv_long", "none", 12, STARTS)
LOW = Draw(
    (PUMP, PUMP, FAN, CONVEYOR, SCREW, MIXER),
    (LOW_RELAY, replace(LOW_RELAY, facts=STARTS | {"relay_blocks_jam_by_state": True})),
    (22, 30, 37, 45, 55, 75, 90, 110),
)


def fused_contactors(seed: int) -> Site:
    """Make the site."""
    random = np.random.default_rng(seed)
    site = Site("Dunwarth Sugar Factory")
    high = []
    for number, earthing in (
        (31, "low_resistance"),
        (32, "low_resistance"),
        (33, "low_resistance"),
        (34, "high_resistance"),
        (35, "high_resistance"),
    ):
        bus = board(f"MCC-{number}", 3300, 5.0, earthing)
        if earthing == "low_resistance":
            earth_through_resistor(bus, 100.0, charging_a=3.0)
            bus |= {
                "incomer_earth_fault_on": True,
                "incomer_earth_fault_pickup_a": 20.0,
                "incomer_earth_fault_delay_s": 0.8,
            }
        else:
            earth_through_resistor(bus, 8.0, charging_a=2.5)
        high.append(bus)
    low = [board(f"MCC-{number}", 400, 1.6, "solid") for number in range(41, 51)]
    site.buses = high + low
    fill(site, high, HIGH, 80, random)
    fill(site, low, LOW, 120, random, first=4000)
    return site
