"""Switching devices, fuses and overload relays chosen for a motor, with their ratings (common practice)."""

from __future__ import annotations

from tests.sites.plant import Record, number
from tests.sites.preferred import CONTACTORS_A, FUSES_A, MOULDED_BREAKERS_A, dial_range, next_up
from tests.sites.rounding import down, near, up

MAGNETIC_LOWER_EDGE, MAGNETIC_UPPER_EDGE = 0.8, 1.2
"""IEC 60947-2: the magnetic release acts within 20 % of its setting."""
OFFSET = 1.732
"""Greatest r.m.s. value of a fully offset start, as a multiple of the symmetrical one."""


def breaker(high_voltage: bool, full_load_a: float) -> Record:
    """Circuit-breaker without trip unit of its own."""
    return {
        "interrupting_rating_ka": 25.0 if high_voltage else 50.0,
        "device_rated_current_a": 630.0 if high_voltage else next_up((800.0, 1000.0, 1250.0), 1.4 * full_load_a),
        "device_opening_time_s": 0.08 if high_voltage else 0.06,
        "device_least_opening_time_s": 0.04 if high_voltage else 0.025,
        "short_circuit_device": "relay",
    }


def contactor_with_fuses(high_voltage: bool, full_load_a: float, locked_rotor_a: float, *, slow: bool) -> Record:
    """Fused contactor: the fuse carries the start and takes every short circuit."""
    wanted = 1.6 * full_load_a if high_voltage else 1.2 * full_load_a
    # the fuse must not melt before the relay has tripped on a stall, in 15 s or (long starts) in 30 s
    fuse = next_up(FUSES_A, max(wanted, locked_rotor_a / (4.8 if slow else 6.0)))
    # the contactor, which breaks 12 times its rating, must break what the fuse leaves to it: up to 3.8 times the start
    rated = 400.0 if high_voltage else next_up(CONTACTORS_A, 3.8 * locked_rotor_a / 12)
    return {
        "interrupting_rating_ka": 4.5 if high_voltage else near(12 * rated / 1000, 0.01),
        "device_rated_current_a": rated,
        "contactor_rated_current_a": rated,
        "device_opening_time_s": 0.12 if high_voltage else 0.05,
        "device_least_opening_time_s": 0.05 if high_voltage else 0.02,
        "fuse": f"{fuse:g} A {'back-up, 7.2 kV' if high_voltage else 'aM'}",
        "fuse_rating_a": fuse,
        "fuse_kind": "motor_circuit",
        "fuse_let_through_a2s": float(f"{1.6 * fuse**2.3:.2g}"),
        "short_circuit_device": "fuse",
    } | ({"blown_fuse_trip": True} if high_voltage else {})


def fused_switch(full_load_a: float) -> Record:
    """Fuse-switch ahead of a drive."""
    fuse = next_up(FUSES_A, 1.4 * full_load_a)
    return {
        "device_rated_current_a": fuse,
        "device_opening_time_s": 0.05,
        "fuse": f"{fuse:g} A gG",
        "fuse_rating_a": fuse,
        "fuse_kind": "general",
        "fuse_let_through_a2s": float(f"{1.6 * fuse**2.3:.2g}"),
        "short_circuit_device": "fuse",
    }


def magnetic_trip_a(greatest_start_a: float) -> float:
    """Magnetic trip whose lower edge stays above an offset start, on the dial's steps."""
    step = 1.0 if greatest_start_a < 60 else 5.0 if greatest_start_a < 400 else 20.0
    return up(1.03 * OFFSET * greatest_start_a / MAGNETIC_LOWER_EDGE, step)


def moulded_breaker(kind: str, full_load_a: float, magnetic_a: float) -> Record:
    """Moulded-case or motor-protective breaker; the breaker limits the energy that it lets through."""
    protective = kind == "motor_protective_breaker"
    rated = next_up(MOULDED_BREAKERS_A, max(1.15 * full_load_a, magnetic_a / 15))
    return {
        "interrupting_rating_ka": 100.0 if protective else 50.0,
        "device_rated_current_a": rated,
        "device_opening_time_s": 0.03,
        "device_least_opening_time_s": 0.01,
        "fuse_let_through_a2s": float(f"{(500 if protective else 1300) * rated**1.3:.2g}"),
        "short_circuit_device": "magnetic_trip",
        "magnetic_trip_a": magnetic_a,
    }


def starter_contactor(full_load_a: float, locked_rotor_a: float) -> Record:
    """Contactor behind a moulded-case breaker, with the conditional rating of the pair."""
    return {
        "contactor_rated_current_a": next_up(CONTACTORS_A, max(1.05 * full_load_a, locked_rotor_a / 8)),
        "starter_short_circuit_rating_ka": 50.0,
    }


def overload_relay(kind: str, motor: Record) -> Record:
    """Overload relay or motor-protective breaker with its dial and trip class."""
    current = number(motor, "full_load_a") / (3**0.5 if motor.get("relay_inside_delta") else 1.0)
    low, high = dial_range(current)
    dial = down(current, 0.1 if high < 20 else 0.5 if high < 100 else 1.0)
    start = number(motor, "locked_rotor_a") / (3**0.5 if motor.get("relay_inside_delta") else 1.0) / dial
    longest = number(motor, "stated_start_time_at_lowest_voltage_s")
    if motor["starting_method"] == "star_delta":
        start /= 3
    classes = ((10.0, 4.0), (20.0, 6.0), (30.0, 9.0)) if kind == "overload_relay" else ((10.0, 4.0), (20.0, 6.0))
    trip_class = next(
        (
            trip_class
            for trip_class, lower_s in classes
            if lower_s * (7.2 / start) ** 2 >= 1.15 * longest
            and trip_class * (7.2 / (number(motor, "locked_rotor_a") / number(motor, "full_load_a"))) ** 2
            <= 0.93 * number(motor, "safe_stall_cold_s")
        ),
        None,
    )
    if trip_class is None:
        raise ValueError(f"{motor['motor']}: no trip class for a start of {longest:.1f} s at {start:.1f} x dial")
    return {
        "overload_dial_a": dial,
        "overload_range_low_a": low,
        "overload_range_high_a": high,
        "overload_trip_class": trip_class,
        "overload_class_standard": "iec",
        "overload_phase_loss_on": True,
    }
