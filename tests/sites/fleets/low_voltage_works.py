"""A works on 400 V with overload relays, moulded-case breakers, motor-protective breakers and fuses only."""

from __future__ import annotations

import numpy as np

from tests.sites.fleets.drawing import (
    COMPRESSOR,
    CONVEYOR,
    CRUSHER,
    FAN,
    MIXER,
    PUMP,
    SCREW,
    Draw,
    Starter,
    board,
    fill,
)
from tests.sites.plant import Site

MACHINES = (PUMP, PUMP, FAN, CONVEYOR, SCREW, MIXER, COMPRESSOR, CRUSHER)
SMALL = Draw(
    MACHINES,
    (Starter(switching_device="motor_protective_breaker", overload_device="motor_protective_breaker"),),
    (1.1, 1.5, 2.2, 3, 4, 5.5, 7.5, 11, 15),
)
MIDDLE = Draw(
    MACHINES,
    (
        Starter(),
        Starter(starts=10),
        Starter(switching_device="fused_contactor"),
        Starter(starting_method="star_delta", facts={"relay_inside_delta": True}),
    ),
    (7.5, 11, 15, 18.5, 22, 30, 37, 45, 55, 75, 90),
)


def low_voltage_works(seed: int) -> Site:
    """Make the site."""
    random = np.random.default_rng(seed)
    site = Site("Ostrigg Board Mill", buses=[board(f"MCC-{number}", 400, 1.6, "solid") for number in range(11, 19)])
    for bus in site.buses:
        bus["incomer_earth_fault_on"] = False
    fill(site, site.buses, SMALL, 80, random)
    fill(site, site.buses, MIDDLE, 120, random, first=4000)
    return site
