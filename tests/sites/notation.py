"""How the relays of each kind of export are set and written: header, unit, step.

A setting exists only in the steps of its relay, so every primary value is made from a whole number of steps.
"""

from __future__ import annotations

from dataclasses import dataclass

from tests.sites.plant import Record, number
from tests.sites.rounding import clean, down, near, up
from tests.sites.supply import FREQUENCY_HZ


@dataclass(frozen=True)
class Written:
    """How one setting is written: header words, unit, step of the relay in that unit."""

    header: str
    unit: str = ""
    step: float = 1.0


PLAIN_UNITS = {
    "": 1.0,
    "A": 1.0,
    "V": 1.0,
    "s": 1.0,
    "ms": 1e-3,
    "min": 60.0,
    "cycles": 1 / FREQUENCY_HZ,
    "%": 1.0,
    "°C": 1.0,
    "/h": 1.0,
    "Hz": 1.0,
    "minutes": 1.0,
}
"""Value of one unit in the unit of the quantity; 'minutes' where the quantity itself is in minutes."""


def unit_size(unit: str, relay: Record, motor: Record) -> float:
    """Give the primary value of one unit: multiples by what the relay is told, secondary by what is fitted."""
    if unit in PLAIN_UNITS:
        return PLAIN_UNITS[unit]
    match unit:
        case "x FLA":
            return number(relay, "relay_full_load_a")
        case "% FLA":
            return number(relay, "relay_full_load_a") / 100
        case "x CT":
            return number(relay, "relay_ct_primary_a")
        case "x earth CT":
            return number(relay, "relay_earth_ct_primary_a")
        case "A sec":
            return number(motor, "ct_primary_a") / number(motor, "ct_secondary_a")
        case "A sec earth":
            return number(motor, "earth_ct_primary_a") / number(motor, "earth_ct_secondary_a")
        case "V sec":
            return number(motor, "vt_primary_v") / number(motor, "vt_secondary_v")
        case "% motor Un":
            return number(motor, "rated_voltage_v") / 100
    raise ValueError(f"unit '{unit}' is not known")


def in_steps(value: float, written: Written, relay: Record, motor: Record, way: str = "near") -> float:
    """Move a primary value to a step of the relay: 'up', 'down' or 'near'."""
    size = unit_size(written.unit, relay, motor)
    rounded = {"up": up, "down": down, "near": near}[way](value / size, written.step)
    return clean(rounded * size)


def as_written(value: float, written: Written, relay: Record, motor: Record) -> float:
    """Give the number that stands in the export for a primary value."""
    return float(f"{value / unit_size(written.unit, relay, motor):.7g}")


_COMMON = {
    "relay_full_load_a": Written("Motor FLA", "A", 0.1),
    "relay_frequency_hz": Written("Frequency", "Hz"),
    "short_circuit_trip_delay_s": Written("50 Delay", "ms", 10.0),
    "thermal_pickup_a": Written("49 Pickup", "x FLA", 0.01),
    "heating_time_constant_s": Written("Tau Heating", "min", 0.1),
    "cooling_time_constant_s": Written("Tau Cooling", "min", 0.5),
    "hot_cold_ratio": Written("Hot/Cold Ratio", "", 0.01),
    "unbalance_weight": Written("Unbalance Factor", "", 0.5),
    "thermal_alarm_pct": Written("Thermal Alarm", "%", 5.0),
    "overcurrent_trip_pickup_a": Written("51 Pickup", "x CT", 0.01),
    "overcurrent_time_multiplier": Written("51 TMS", "", 0.05),
    "unbalance_trip_pickup_pct": Written("46 Pickup", "%", 1.0),
    "unbalance_trip_delay_s": Written("46 Delay", "s", 0.1),
    "unbalance_alarm_pickup_pct": Written("46 Alarm Level", "%", 1.0),
    "unbalance_alarm_delay_s": Written("46 Alarm Delay", "s", 1.0),
    "start_timer_pickup_a": Written("48 Pickup", "x FLA", 0.1),
    "start_timer_delay_s": Written("48 Time", "s", 0.5),
    "jam_trip_pickup_a": Written("Jam Pickup", "x FLA", 0.05),
    "jam_trip_delay_s": Written("Jam Delay", "s", 0.1),
    "jam_block_s": Written("Jam Block On Start", "s", 1.0),
    "undercurrent_trip_pickup_a": Written("37 Pickup", "x FLA", 0.01),
    "undercurrent_trip_delay_s": Written("37 Delay", "s", 1.0),
    "undercurrent_block_s": Written("37 Block", "s", 1.0),
    "earth_fault_trip_pickup_a": Written("51G Pickup", "A", 1.0),
    "earth_fault_trip_delay_s": Written("51G Delay", "ms", 10.0),
    "differential_run_pickup_a": Written("87 Run Pickup", "x CT", 0.01),
    "differential_start_pickup_a": Written("87 Start Pickup", "x CT", 0.01),
    "differential_run_delay_s": Written("87 Run Delay", "ms", 10.0),
    "differential_start_delay_s": Written("87 Start Delay", "ms", 10.0),
    "undervoltage_trip_pickup_v": Written("27 Pickup", "V sec", 0.5),
    "undervoltage_trip_delay_s": Written("27 Delay", "s", 0.1),
    "overvoltage_trip_pickup_v": Written("59 Pickup", "V sec", 0.5),
    "overvoltage_trip_delay_s": Written("59 Delay", "s", 0.1),
    "phase_sequence_trip_pickup_pct": Written("47 Pickup", "%", 1.0),
    "phase_sequence_trip_delay_s": Written("47 Delay", "s", 0.1),
    "starts_limit_per_hour": Written("66 Starts per Hour", "/h", 1.0),
    "start_interval_min": Written("66 Time Between Starts", "minutes", 1.0),
    "restart_delay_s": Written("Restart Delay", "s", 10.0),
    "stator_temperature_trip_c": Written("Stator RTD Trip Level", "°C", 1.0),
    "stator_temperature_alarm_c": Written("Stator RTD Alarm Level", "°C", 1.0),
    "bearing_temperature_trip_c": Written("Bearing RTD Trip Level", "°C", 1.0),
    "bearing_temperature_alarm_c": Written("Bearing RTD Alarm Level", "°C", 1.0),
}

LAYOUTS: dict[str, dict[str, Written]] = {
    "mv_breaker": _COMMON
    | {
        "short_circuit_trip_pickup_a": Written("50 Pickup", "x CT", 0.1),
        "jam_trip_pickup_a": Written("Jam Pickup", "A", 1.0),
        "earth_fault_trip_pickup_a": Written("51G Pickup", "A sec earth", 0.01),
    },
    "mv_contactor": _COMMON
    | {
        "relay_full_load_a": Written("Relay FLA", "x CT", 0.01),
        "short_circuit_trip_pickup_a": Written("I>> Pickup", "A sec", 0.05),
        "short_circuit_trip_delay_s": Written("I>> Delay", "cycles", 1.0),
        "thermal_pickup_a": Written("Thermal Overload Pickup", "% FLA", 1.0),
        "heating_time_constant_s": Written("τ Heating", "s", 5.0),
        "cooling_time_constant_s": Written("τ Cooling", "s", 30.0),
        "unbalance_trip_pickup_pct": Written("Unbalance Pickup", "%", 1.0),
        "unbalance_trip_delay_s": Written("Unbalance Delay", "s", 0.1),
        "unbalance_alarm_pickup_pct": Written("Unbalance Alarm Level", "%", 1.0),
        "unbalance_alarm_delay_s": Written("Unbalance Alarm Delay", "s", 1.0),
        "start_timer_pickup_a": Written("Start Timer Pickup", "% FLA", 5.0),
        "start_timer_delay_s": Written("Start Timer Delay", "s", 0.5),
        "jam_trip_pickup_a": Written("Jam Pickup", "A sec", 0.05),
        "jam_trip_delay_s": Written("Jam Delay", "ms", 100.0),
        "undercurrent_trip_pickup_a": Written("Undercurrent Pickup", "A sec", 0.01),
        "undercurrent_trip_delay_s": Written("Undercurrent Delay", "s", 1.0),
        "undercurrent_block_s": Written("Undercurrent Block", "s", 1.0),
        "earth_fault_trip_pickup_a": Written("Earth Fault Pickup", "A", 0.1),
        "earth_fault_trip_delay_s": Written("Earth Fault Delay", "cycles", 1.0),
    },
    "lv_breaker": _COMMON
    | {
        "short_circuit_trip_pickup_a": Written("50 Pickup", "A", 50.0),
        "short_circuit_trip_delay_s": Written("50 Delay", "s", 0.01),
        "thermal_pickup_a": Written("49 Pickup", "A", 1.0),
        "start_timer_pickup_a": Written("48 Pickup", "A", 5.0),
        "jam_trip_pickup_a": Written("Jam Pickup", "A", 5.0),
        "undercurrent_trip_pickup_a": Written("37 Pickup", "A", 1.0),
        "earth_fault_trip_delay_s": Written("51G Delay", "s", 0.05),
        "undervoltage_trip_pickup_v": Written("27 Pickup", "% motor Un", 1.0),
        "overvoltage_trip_pickup_v": Written("59 Pickup", "% motor Un", 1.0),
    },
    "lv_long": _COMMON
    | {
        "relay_full_load_a": Written("FLA", "A", 0.5),
        "thermal_trip_class": Written("Trip Class", "", 5.0),
        "short_circuit_trip_pickup_a": Written("Pickup", "x FLA", 0.1),
        "earth_fault_trip_delay_s": Written("Delay", "s", 0.05),
    },
}
"""How the four kinds of relay export of these sites write each setting."""
