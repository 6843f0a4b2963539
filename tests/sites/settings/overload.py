"""Short-circuit, thermal and unbalance settings (common practice, with margins)."""

from __future__ import annotations

import math

from tests.sites.plant import Record, number
from tests.sites.settings.setter import Setter


def set_short_circuit(setter: Setter, greatest_a: float) -> None:
    """Trip on a breaker, above an offset start; leave the fuse its work on a contactor."""
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


def set_thermal(setter: Setter, greatest_a: float, slowest_s: float) -> None:
    """Anchor the thermal element at the stall times."""
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


def set_unbalance(setter: Setter, bus: Record) -> None:
    """Above what the supply makes, below an open phase."""
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
