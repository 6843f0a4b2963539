"""Earth-fault, differential and voltage settings (common practice, with margins)."""

from __future__ import annotations

from tests.sites.curves import clearing_time_s
from tests.sites.plant import Record, number
from tests.sites.settings.setter import Setter


def set_earth_fault(setter: Setter, bus: Record, greatest_a: float) -> None:
    """Earth fault by the earthing of the system and the kind of CT."""
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


def set_differential(setter: Setter, greatest_a: float) -> None:
    """Two CT sets or flux balance."""
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


def set_voltage(setter: Setter, bus: Record) -> None:
    """Under- and overvoltage and phase sequence of latched breakers."""
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
