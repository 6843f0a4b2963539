"""A low-voltage site with soft starters and drives beside direct-on-line motors."""

from __future__ import annotations

import numpy as np

from tests.sites.fleets.drawing import COMPRESSOR, CONVEYOR, FAN, MIXER, PUMP, SCREW, Draw, Starter, board, fill
from tests.sites.fleets.fused_contactors import STARTS
from tests.sites.plant import Site, Value

ON_DRIVE: dict[str, Value] = {"drive_protects_motor": True, "bypass_start_possible": False}
WITH_BYPASS: dict[str, Value] = {
    "drive_protects_motor": True,
    "bypass_start_possible": True,
    "bypass_overload_fitted": True,
}
WITH_SENSORS: dict[str, Value] = ON_DRIVE | {"stator_sensors": "thermistor", "thermal_sensor_trips_device": True}
SOFT = Draw(
    (PUMP, PUMP, FAN, MIXER, COMPRESSOR),
    (
        Starter("soft_starter", "fused_contactor", "motor_relay", "lv_long", starts=12, facts=STARTS),
        Starter("soft_starter", "fused_contactor", "motor_relay", "lv_long", starts=12,
                facts=STARTS | {"bypass_start_possible": True}),
    ),
    (45, 55, 75, 90, 110, 132, 160),
)  # fmt: skip
DRIVES = Draw(
    (PUMP, FAN, CONVEYOR, MIXER, SCREW),
    (
        Starter("drive", "fused_switch", "drive", facts=ON_DRIVE),
        Starter("drive", "moulded_case_breaker", "drive", facts=ON_DRIVE),
        Starter("drive", "fused_switch", "drive", facts=WITH_BYPASS),
        Starter("drive", "fused_switch", "drive", facts=WITH_SENSORS),
    ),
    (4, 7.5, 11, 15, 22, 30, 45, 55, 75, 90),
)
DIRECT = Draw((PUMP, FAN, CONVEYOR, MIXER, SCREW), (Starter(), Starter(starts=8)), (4, 7.5, 11, 15, 22, 30, 37, 45))
LARGE = Draw(
    (PUMP, FAN, MIXER),
    (Starter("direct_on_line", "breaker", "motor_relay", "lv_breaker", "core_balance", 12, STARTS),
     Starter("direct_on_line", "breaker", "motor_relay", "lv_breaker", "residual", 12, STARTS)),
    (160, 200, 250, 315),
)  # fmt: skip


def mixed_starters(seed: int) -> Site:
    """Make the site."""
    random = np.random.default_rng(seed)
    site = Site("Lirrin Bottling Works")
    large = [board(f"SWB-{number}", 690, 2.5, "solid") for number in (71, 72)]
    for bus in large:
        bus |= {
            "incomer_earth_fault_on": True,
            "incomer_earth_fault_pickup_a": 600.0,
            "incomer_earth_fault_delay_s": 0.6,
        }
    low = [board(f"MCC-{number}", 400, 1.6, "solid") for number in range(21, 31)]
    site.buses = large + low
    fill(site, large, LARGE, 14, random)
    fill(site, low, SOFT, 36, random, first=4000)
    fill(site, low, DRIVES, 90, random, first=7000)
    fill(site, low, DIRECT, 60, random, first=10000)
    return site
