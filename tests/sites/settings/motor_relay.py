"""Settings of a multifunction motor relay as a careful engineer chooses them."""

from __future__ import annotations

from collections.abc import Sequence

from tests.sites.plant import Record, number
from tests.sites.settings.earth_and_voltage import set_differential, set_earth_fault, set_voltage
from tests.sites.settings.overload import set_short_circuit, set_thermal, set_unbalance
from tests.sites.settings.running import set_jam, set_starting, set_starts_limit, set_temperatures, set_undercurrent
from tests.sites.settings.setter import Setter


def set_motor_relay(
    relay: Record, motor: Record, bus: Record, sisters: Sequence[Record], starts: Sequence[Record]
) -> None:
    """Set all elements; sisters (the motor among them) and their starts decide together, so they are set alike."""
    setter = Setter(relay, motor)
    longest = max([number(start, "start_time_s") for start in starts], default=0.0)
    slowest = max(longest, number(motor, "stated_start_time_at_lowest_voltage_s"))
    at_rated = [
        number(start, "start_current_a") / number(start, "start_voltage_pct") * 100
        for start in starts
        if motor["starting_method"] == "direct_on_line"
    ]
    greatest = max([number(motor, "locked_rotor_a"), *at_rated])
    set_short_circuit(setter, greatest)
    limited = motor["starting_method"] == "soft_starter" and not motor.get("bypass_start_possible")
    set_thermal(setter, number(motor, "soft_start_current_limit_a") if limited else greatest, slowest)
    set_unbalance(setter, bus)
    set_starting(setter, longest, slowest, starts)
    set_jam(setter, slowest)
    set_undercurrent(setter, slowest)
    set_earth_fault(setter, bus, greatest)
    set_differential(setter, greatest)
    set_voltage(setter, bus)
    set_starts_limit(setter)
    set_temperatures(setter)
    if motor.get("must_run"):
        leave_alarms_only(relay)


def leave_alarms_only(relay: Record) -> None:
    """Leave a must-run motor its short-circuit and earth-fault trips; what else would trip gives an alarm."""
    for element in ("thermal", "unbalance", "jam", "undercurrent", "stator_temperature", "bearing_temperature"):
        if f"{element}_trip_on" in relay:
            relay[f"{element}_trip_on"] = False
            if element != "jam":
                relay[f"{element}_alarm_on"] = True
    relay["start_timer_on"] = False
    relay["starts_limit_on"] = False
    relay["thermal_opens"] = relay["unbalance_opens"] = "nothing"
    for quantity in (
        "jam_trip_pickup_a",
        "jam_trip_delay_s",
        "jam_block_s",
        "undercurrent_trip_pickup_a",
        "unbalance_trip_pickup_pct",
        "unbalance_trip_delay_s",
        "start_timer_delay_s",
        "start_timer_pickup_a",
        "starts_limit_per_hour",
        "start_interval_min",
        "stator_temperature_trip_c",
        "bearing_temperature_trip_c",
    ):
        relay.pop(quantity, None)
