"""A plant on 6.6 kV and 11 kV with breakers and multifunction relays."""

from __future__ import annotations

from dataclasses import replace

import numpy as np

from tests.sites.fleets.drawing import (
    COMPRESSOR,
    COUPLED_CONVEYOR,
    CRUSHER,
    FAN,
    MILL,
    PUMP,
    Draw,
    Starter,
    board,
    fill,
)
from tests.sites.plant import Record, Site, Value
from tests.sites.supply import earth_through_resistor

DATA: dict[str, Value] = {
    "stator_sensors": "resistance",
    "stator_sensors_wired": True,
    "bearing_sensors_wired": True,
    "highest_running_temperature_c": 115.0,
    "stated_starts_per_hour": 3.0,
    "stated_start_interval_min": 20.0,
    "stator_leads": 3.0,
    "differential_cts": "none",
}
LARGE_DATA = DATA | {"stator_leads": 6.0, "differential_cts": "both_ends"}
BREAKER = Starter("direct_on_line", "breaker", "motor_relay", "mv_breaker", "core_balance", 16, DATA)
MACHINES = (PUMP, PUMP, FAN, COMPRESSOR, MILL, CRUSHER, COUPLED_CONVEYOR)
USUAL = Draw(
    MACHINES,
    (BREAKER, replace(BREAKER, facts=DATA | {"relay_filter": "offset_rejected"})),
    (200, 250, 315, 400, 500, 630, 800, 1000, 1250),
    (2, 4, 4, 6),
    (5.0, 6.0),
    (60, 320),
)
LARGE = replace(USUAL, sizes_kw=(1500, 1600, 1800), starters=(replace(BREAKER, facts=LARGE_DATA),))
RESIDUAL = replace(USUAL, earth_ct="residual")


def high_voltage_boards(first: int, count: int, nominal_v: float, rating_mva: float) -> list[Record]:
    """Make boards, each earthed through a resistor of 400 A, with earth-fault protection on the incomer."""
    boards = []
    for number in range(first, first + count):
        bus = board(f"SWB-{number}", nominal_v, rating_mva, "low_resistance")
        earth_through_resistor(bus, 400.0, charging_a=10.0)
        bus |= {
            "incomer_earth_fault_on": True,
            "incomer_earth_fault_pickup_a": 80.0,
            "incomer_earth_fault_delay_s": 0.8,
        }
        boards.append(bus)
    return boards


def high_voltage_plant(seed: int) -> Site:
    """Make the site."""
    random = np.random.default_rng(seed)
    site = Site("Karnholt Process Plant")
    site.buses = high_voltage_boards(61, 8, 6600, 20.0) + high_voltage_boards(81, 4, 11000, 25.0)
    fill(site, site.buses, LARGE, 12, random)
    fill(site, site.buses, RESIDUAL, 30, random, first=4000)
    fill(site, site.buses, USUAL, 158, random, first=7000)
    return site
