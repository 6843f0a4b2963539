"""Areas of the Tarnholt works, and what the data sheets of its large motors have in common."""

from __future__ import annotations

from tests.sites.plant import Value

QUARRY, KILNS = "Quarry & Crushing", "Kilns & Hydrate"
SENSORS: dict[str, Value] = {
    "stator_sensors": "resistance",
    "stator_sensors_wired": True,
    "bearing_sensors_wired": True,
    "highest_running_temperature_c": 112.0,
    "stated_starts_per_hour": 3.0,
    "stated_cold_starts": 2.0,
    "stated_hot_starts": 1.0,
    "stated_start_interval_min": 20.0,
}
LARGE: dict[str, Value] = SENSORS | {"stator_leads": 6.0, "differential_cts": "both_ends"}
SMALL: dict[str, Value] = SENSORS | {"stator_leads": 3.0, "differential_cts": "none"}
BREAKER = {"switching_device": "breaker", "layout": "mv_breaker", "earth_ct": "core_balance", "starts": 26}
CONTACTOR = {"switching_device": "fused_contactor", "layout": "mv_contactor", "earth_ct": "core_balance", "starts": 24}
