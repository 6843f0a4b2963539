"""Start timer, jam, undercurrent, starts and temperatures (common practice, with margins)."""

from __future__ import annotations

from collections.abc import Sequence

from tests.sites.plant import Record, number
from tests.sites.rounding import up
from tests.sites.settings.setter import Setter

JAMMING_MACHINES = ("crusher", "mill", "conveyor", "chipper", "screw", "mixer", "compressor")


JAM_MULTIPLES = {"crusher": 3.0, "mill": 2.4, "compressor": 1.5, "screw": 1.8, "mixer": 1.8}


DRY_RUN_PUMPS = ("submersible_pump", "multistage_pump", "canned_pump")


def set_starting(setter: Setter, longest_s: float, slowest_s: float, starts: Sequence[Record]) -> None:
    """Start timer between the longest start and the stall time."""
    motor = setter.motor
    setter.turn("start_timer", True)
    running = number(motor, "running_current_a")
    least = min([number(start, "start_current_a") for start in starts], default=number(motor, "locked_rotor_a"))
    wanted = max(1.4 * number(motor, "full_load_a"), 1.2 * running)
    if wanted > 0.85 * least:
        raise ValueError(f"{motor['motor']}: no place for the start pickup")
    setter.put("start_timer_pickup_a", wanted)
    setter.put("start_timer_delay_s", max(1.25 * longest_s, 1.1 * slowest_s, slowest_s + 0.5), "up")


def set_jam(setter: Setter, slowest_s: float) -> None:
    """Jam element of machines that can jam."""
    motor = setter.motor
    multiple = 2.0
    if number(motor, "rated_voltage_v") > 1000 or motor.get("driven_machine") != "crusher":
        multiple = JAM_MULTIPLES.get(str(motor.get("driven_machine")), 2.0)
    if "relay_jam_multiple" in motor:
        multiple = number(motor, "relay_jam_multiple")
    if setter.turn("jam", motor.get("driven_machine") in JAMMING_MACHINES or bool(motor.get("relay_jam"))):
        setter.put("jam_trip_pickup_a", multiple * number(motor, "full_load_a"))
        setter.put("jam_trip_delay_s", 3.0 if motor["driven_machine"] == "crusher" else 2.0)
        if motor.get("relay_blocks_jam_by_state"):
            setter.relay["jam_blocked_by_state"] = True
        else:
            setter.put("jam_block_s", 1.25 * slowest_s, "up")


def set_undercurrent(setter: Setter, slowest_s: float) -> None:
    """Undercurrent of pumps that cannot run dry and of belt drives."""
    motor = setter.motor
    wanted = motor.get("cannot_run_dry") or motor.get("belt_drive") or motor.get("driven_machine") in DRY_RUN_PUMPS
    if setter.turn("undercurrent", bool(wanted)):
        least, idle = number(motor, "least_running_current_a"), number(motor, "no_load_current_a")
        setter.put("undercurrent_trip_pickup_a", (0.85 * least + 1.1 * idle) / 2)
        setter.put("undercurrent_trip_delay_s", 5.0)
        setter.put("undercurrent_block_s", 1.3 * slowest_s + 1, "up")


def set_starts_limit(setter: Setter) -> None:
    """Starts an hour, interval and backspin as the data sheet has them."""
    motor = setter.motor
    if setter.turn("starts_limit", "stated_starts_per_hour" in motor):
        setter.put("starts_limit_per_hour", number(motor, "stated_starts_per_hour"))
        if "stated_start_interval_min" in motor:
            setter.put("start_interval_min", number(motor, "stated_start_interval_min"))
    if "backspin_time_s" in motor and not motor.get("ratchet_fitted"):
        setter.put("restart_delay_s", up(number(motor, "backspin_time_s") * 1.25, 10.0))


def set_temperatures(setter: Setter) -> None:
    """Winding and bearing sensors."""
    relay, motor = setter.relay, setter.motor
    if motor.get("stator_sensors_wired") and motor.get("stator_sensors") == "resistance":
        trips = number(motor, "rated_power_kw") > 1000 or motor.get("relay_trips_on_winding", False)
        if setter.turn("stator_temperature", bool(trips)):
            setter.put("stator_temperature_trip_c", 145.0)
        relay["stator_temperature_alarm_on"] = True
        setter.put("stator_temperature_alarm_c", 130.0)
    if motor.get("bearing_sensors_wired"):
        sleeve = motor["bearing_kind"] == "sleeve"
        setter.turn("bearing_temperature", True)
        setter.put("bearing_temperature_trip_c", 95.0 if sleeve else 105.0)
        relay["bearing_temperature_alarm_on"] = True
        setter.put("bearing_temperature_alarm_c", 85.0 if sleeve else 95.0)
