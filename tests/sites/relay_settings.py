"""Settings of a multifunction motor relay as a careful engineer chooses them (common practice, with margins)."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass
from datetime import date

from tests.sites.current_transformers import told_to_relay
from tests.sites.curves import clearing_time_s
from tests.sites.notation import LAYOUTS, in_steps
from tests.sites.plant import Record, number, text
from tests.sites.rounding import up
from tests.sites.supply import FREQUENCY_HZ

JAMMING_MACHINES = ("crusher", "mill", "conveyor", "chipper", "screw", "mixer", "compressor")
JAM_MULTIPLES = {"crusher": 3.0, "mill": 2.4, "compressor": 1.5, "screw": 1.8, "mixer": 1.8}
DRY_RUN_PUMPS = ("submersible_pump", "multistage_pump", "canned_pump")


@dataclass
class Setter:
    """Puts settings on a relay in the steps that it has."""

    relay: Record
    motor: Record

    def put(self, quantity: str, value: float, way: str = "near") -> None:
        """Set a quantity to the step at, above or below a primary value."""
        written = LAYOUTS[text(self.relay, "layout")].get(quantity)
        self.relay[quantity] = value if written is None else in_steps(value, written, self.relay, self.motor, way)

    def turn(self, element: str, on: bool) -> bool:
        """Turn an element's trip on or off."""
        self.relay[f"{element}_trip_on" if element not in ("start_timer", "starts_limit") else f"{element}_on"] = on
        return on


def new_relay(motor: Record, layout: str, relay_type: str, exported: date) -> Record:
    """Make a relay that is told what is fitted."""
    relay: Record = {
        "relay_tag": text(motor, "relay"),
        "layout": layout,
        "motor": text(motor, "motor"),
        "relay_role": "motor",
        "relay_type": relay_type,
        "settings_export_date": exported,
        "relay_frequency_hz": FREQUENCY_HZ,
        "relay_phase_rotation": "abc",
        **told_to_relay(motor),
    }
    if layout != "lv_long":
        relay |= {"setting_group": "1", "group_active": True, "group_selectable": True}
    full_load = number(motor, "full_load_a")
    Setter(relay, motor).put("relay_full_load_a", full_load)
    return relay


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
    _short_circuit(setter, greatest)
    limited = motor["starting_method"] == "soft_starter" and not motor.get("bypass_start_possible")
    _thermal(setter, number(motor, "soft_start_current_limit_a") if limited else greatest, slowest)
    _unbalance(setter, bus)
    _starting(setter, longest, slowest, starts)
    _jam(setter, slowest)
    _undercurrent(setter, slowest)
    _earth_fault(setter, bus, greatest)
    _differential(setter, greatest)
    _voltage(setter, bus)
    _starts_limit(setter)
    _temperatures(setter)
    if motor.get("must_run"):
        _alarm_only(relay)


def _short_circuit(setter: Setter, greatest_a: float) -> None:
    relay, motor = setter.relay, setter.motor
    breaker = motor["switching_device"] == "breaker"
    relay["short_circuit_opens"] = "breaker" if breaker else "nothing"
    if not setter.turn("short_circuit", breaker):
        relay["short_circuit_blocked_above_device_rating"] = True
        return
    relay["short_circuit_filter"] = motor.get("relay_filter", "rms")
    multiple = 1.4 if relay["short_circuit_filter"] == "offset_rejected" else 1.8
    setter.put("short_circuit_trip_pickup_a", multiple * greatest_a, "up")
    setter.put("short_circuit_trip_delay_s", 0.04 if relay["layout"] == "mv_breaker" else 0.0)


def _thermal(setter: Setter, greatest_a: float, slowest_s: float) -> None:
    relay, motor = setter.relay, setter.motor
    setter.turn("thermal", True)
    relay["thermal_opens"] = "breaker" if motor["switching_device"] == "breaker" else "contactor"
    hazardous = motor.get("hazardous_protection") in ("ex_eb", "ex_ec")
    multiple = 1.0 if hazardous else 1.2 if number(motor, "service_factor") >= 1.15 else 1.1
    setter.put("thermal_pickup_a", multiple * number(motor, "full_load_a"))
    pickup = number(relay, "thermal_pickup_a")
    hot, cold = number(motor, "safe_stall_hot_s"), number(motor, "safe_stall_cold_s")
    relay["thermal_hot_curve"] = motor.get("relay_hot_curve", "stall_ratio")
    if relay["thermal_hot_curve"] == "stall_ratio":
        setter.put("hot_cold_ratio", hot / cold, "down")
    locked = number(motor, "locked_rotor_a")
    if relay["layout"] == "lv_long" and not hazardous:
        relay["thermal_trip_class"] = trip_class_for(motor, locked / pickup, greatest_a / pickup, slowest_s)
    else:
        wanted = min(0.82 * cold, 0.85 * number(motor, "te_s") if "te_s" in motor else math.inf)
        if motor.get("speed_switch_fitted"):
            # the speed switch guards the stalled motor, the thermal element has to let the long start through
            wanted = 1.5 * slowest_s * cold / hot
        setter.put("heating_time_constant_s", wanted / math.log(locked**2 / (locked**2 - pickup**2)))
        setter.put("cooling_time_constant_s", 3 * number(relay, "heating_time_constant_s"), "up")
        setter.put("unbalance_weight", min(max(175 / (locked / number(motor, "full_load_a")) ** 2, 3.0), 8.0))
    relay["thermal_alarm_on"] = True
    setter.put("thermal_alarm_pct", 85)
    if setter.turn("overcurrent", bool(motor.get("relay_backup_51"))):
        # back-up of the thermal element, slower than it at every current
        setter.put("overcurrent_trip_pickup_a", 1.3 * number(motor, "full_load_a"), "up")
        relay["overcurrent_curve"] = "long_time_inverse"
        setter.put("overcurrent_time_multiplier", 1.0)


def trip_class_for(motor: Record, locked: float, greatest: float, slowest_s: float) -> float:
    """Least class (IEC 60947-4-1, 7.2 times) whose hot lower edge lets the start through, inside both stall times."""
    hot, cold = number(motor, "safe_stall_hot_s"), number(motor, "safe_stall_cold_s")
    for trip_class, lower_s in ((10.0, 4.0), (20.0, 6.0), (30.0, 9.0)):
        shortest_s = lower_s * (7.2 / greatest) ** 2
        rides = shortest_s * hot / cold >= 1.15 * slowest_s and shortest_s >= 2.1 * number(motor, "stated_start_time_s")
        stops = trip_class * (7.2 / locked) ** 2 <= 0.92 * cold
        if rides and stops:
            return trip_class
    raise ValueError(f"{motor['motor']}: no trip class between a start of {slowest_s:.1f} s and {hot:g} s of stall")


def _unbalance(setter: Setter, bus: Record) -> None:
    relay, motor = setter.relay, setter.motor
    setter.turn("unbalance", True)
    relay["unbalance_opens"] = relay["thermal_opens"]
    relay["unbalance_base"] = motor.get("relay_unbalance_base", "full_load")
    multiple = number(motor, "locked_rotor_a") / number(motor, "full_load_a")
    standing = multiple * number(bus, "standing_unbalance_pct")
    least = number(motor, "least_running_current_a") / number(motor, "full_load_a")
    if relay["unbalance_base"] == "positive_sequence":
        standing /= least
    setter.put("unbalance_trip_pickup_pct", max(15.0, min(standing + 5, 24.0)), "up")
    setter.put("unbalance_trip_delay_s", 4.0)
    relay["unbalance_alarm_on"] = True
    setter.put("unbalance_alarm_pickup_pct", max(8.0, standing + 2), "up")
    setter.put("unbalance_alarm_delay_s", 15.0)


def _starting(setter: Setter, longest_s: float, slowest_s: float, starts: Sequence[Record]) -> None:
    motor = setter.motor
    setter.turn("start_timer", True)
    running = number(motor, "running_current_a")
    least = min([number(start, "start_current_a") for start in starts], default=number(motor, "locked_rotor_a"))
    wanted = max(1.4 * number(motor, "full_load_a"), 1.2 * running)
    if wanted > 0.85 * least:
        raise ValueError(f"{motor['motor']}: no place for the start pickup")
    setter.put("start_timer_pickup_a", wanted)
    setter.put("start_timer_delay_s", max(1.25 * longest_s, 1.1 * slowest_s, slowest_s + 0.5), "up")


def _jam(setter: Setter, slowest_s: float) -> None:
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


def _undercurrent(setter: Setter, slowest_s: float) -> None:
    motor = setter.motor
    wanted = motor.get("cannot_run_dry") or motor.get("belt_drive") or motor.get("driven_machine") in DRY_RUN_PUMPS
    if setter.turn("undercurrent", bool(wanted)):
        least, idle = number(motor, "least_running_current_a"), number(motor, "no_load_current_a")
        setter.put("undercurrent_trip_pickup_a", (0.85 * least + 1.1 * idle) / 2)
        setter.put("undercurrent_trip_delay_s", 5.0)
        setter.put("undercurrent_block_s", 1.3 * slowest_s + 1, "up")


def _earth_fault(setter: Setter, bus: Record, greatest_a: float) -> None:
    relay, motor = setter.relay, setter.motor
    kind = motor.get("earth_ct_kind", "none")
    if kind == "none":
        relay["relay_earth_source"] = "none"
        return
    setter.turn("earth_fault", True)
    relay["earth_fault_opens"] = relay["thermal_opens"]
    if bus["earthing"] == "low_resistance":
        if kind == "core_balance":
            setter.put("earth_fault_trip_pickup_a", 0.07 * number(bus, "earth_fault_min_a"))
        else:
            residual = max(0.04 * greatest_a, 0.2 * number(motor, "ct_primary_a"))
            setter.put("earth_fault_trip_pickup_a", min(residual, 0.15 * number(bus, "earth_fault_min_a")), "up")
        setter.put("earth_fault_trip_delay_s", 0.1 if kind == "core_balance" else 0.2)
    elif bus["earthing"] == "high_resistance":
        setter.put("earth_fault_trip_pickup_a", 0.3 * number(bus, "earth_fault_min_a"))
        setter.put("earth_fault_trip_delay_s", 0.5)
    elif kind == "core_balance":
        setter.put("earth_fault_trip_pickup_a", max(10.0, 0.175 * number(motor, "full_load_a")), "down")
        setter.put("earth_fault_trip_delay_s", _after_the_fuse(motor, 0.2), "up")
    else:
        setter.put("earth_fault_trip_pickup_a", max(0.21 * number(motor, "full_load_a"), 0.03 * greatest_a))
        setter.put("earth_fault_trip_delay_s", 0.25)


def _after_the_fuse(motor: Record, usual_s: float) -> float:
    """Delay after which the fuse has cleared every earth fault that the contactor could not break."""
    if motor["switching_device"] != "fused_contactor":
        return usual_s
    cleared = clearing_time_s(number(motor, "fuse_rating_a"), 1e3 * number(motor, "interrupting_rating_ka"))
    if 1.3 * cleared > 0.35:
        raise ValueError(f"{motor['motor']}: the fuse takes {cleared:.2f} s at the limit of its contactor")
    return max(usual_s, 1.3 * cleared)


def _differential(setter: Setter, greatest_a: float) -> None:
    relay, motor = setter.relay, setter.motor
    cts = motor.get("differential_cts", "none")
    if not setter.turn("differential", cts != "none"):
        return
    full_load = number(motor, "full_load_a")
    setter.put("differential_run_delay_s", 0.04)
    if cts == "flux_balance":
        relay["differential_kind"] = "flux_balance"
        setter.put("differential_run_pickup_a", 9.0)
        return
    relay["differential_kind"] = "two_sets"
    setter.put("differential_run_pickup_a", 0.2 * full_load)
    setter.put("differential_start_pickup_a", max(0.03 * greatest_a, 0.3 * full_load), "up")
    setter.put("differential_start_delay_s", 0.1)


def _voltage(setter: Setter, bus: Record) -> None:
    motor = setter.motor
    latched = motor["switching_device"] == "breaker" and "vt_primary_v" in motor
    rated = number(motor, "rated_voltage_v")
    wanted = latched and not motor.get("reaccelerated") and not motor.get("undervoltage_by_bus_scheme")
    if setter.turn("undervoltage", wanted and not motor.get("must_run")):
        setter.put("undervoltage_trip_pickup_v", 0.82 * rated, "up")
        setter.put("undervoltage_trip_delay_s", number(bus, "bus_clearing_time_s") + (1.5 if rated > 1000 else 3.5))
    if setter.turn("overvoltage", latched and not motor.get("must_run")):
        setter.put("overvoltage_trip_pickup_v", 1.10 * rated)
        setter.put("overvoltage_trip_delay_s", 3.0)
    if setter.turn("phase_sequence", latched and bool(motor.get("reverse_rotation_harmful"))):
        setter.put("phase_sequence_trip_pickup_pct", 8.0)
        setter.put("phase_sequence_trip_delay_s", 3.0)


def _starts_limit(setter: Setter) -> None:
    motor = setter.motor
    if setter.turn("starts_limit", "stated_starts_per_hour" in motor):
        setter.put("starts_limit_per_hour", number(motor, "stated_starts_per_hour"))
        if "stated_start_interval_min" in motor:
            setter.put("start_interval_min", number(motor, "stated_start_interval_min"))
    if "backspin_time_s" in motor and not motor.get("ratchet_fitted"):
        setter.put("restart_delay_s", up(number(motor, "backspin_time_s") * 1.25, 10.0))


def _temperatures(setter: Setter) -> None:
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


def _alarm_only(relay: Record) -> None:
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
