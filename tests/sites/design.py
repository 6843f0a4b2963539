"""A family of motors to records: plate, start, device, cable, transformers, settings."""

from __future__ import annotations

import math
from collections.abc import Sequence
from datetime import date
from zlib import crc32

import numpy as np

from tests.sites import cables, switchgear
from tests.sites.current_transformers import earth_ct, phase_cts, voltage_transformers
from tests.sites.curves import clearing_curve, limit_curves, melting_curve
from tests.sites.families import Family
from tests.sites.machine import (
    LOWEST_START_VOLTAGE_PU,
    Machine,
    external_inertia_limit_kgm2,
    make_machine,
    run_up_time_s,
    stall_times_s,
)
from tests.sites.plant import Record, Site, number
from tests.sites.rounding import near, printed, up
from tests.sites.settings.motor_relay import set_motor_relay
from tests.sites.settings.overload import trip_class_for
from tests.sites.settings.setter import new_relay
from tests.sites.soft_start import SOFT_START_MULTIPLE, soft_start_time_s
from tests.sites.start_records import StartBehaviour, simulate_starts
from tests.sites.supply import FREQUENCY_HZ

MAKERS = ("Bramwell Motors", "Skarholm Elektro", "Vexmoor Electric", "Ostfall Maschinen")
RELAY_TYPES = {"mv_breaker": "MPR-6", "mv_contactor": "MPR-3", "lv_breaker": "MPR-L7", "lv_long": "MPR-L2"}


def add_family(site: Site, family: Family, random: np.random.Generator) -> None:
    """Add the motors of a family with their relays and starts to a site."""
    bus = site.bus(family.bus)
    voltage = family.rated_voltage_v or number(bus, "bus_nominal_v")
    scatter = float(np.round(random.uniform(-1, 1), 2))
    machine = make_machine(
        family.power_kw, family.poles, voltage, family.start_multiple, premium=family.premium, scatter=scatter
    )
    inertia = float(f"{family.inertia * external_inertia_limit_kgm2(family.power_kw, family.poles):.3g}")
    slowest, usual = _start_times(machine, inertia, family)
    common = _plate(machine, family, inertia, usual, slowest)
    common["motor_make"] = MAKERS[int(random.integers(0, len(MAKERS)))]
    order = crc32(family.tags[0].encode()) % 900 + 100
    common["motor_type"] = f"{'HV' if voltage > 1000 else 'LV'}{int(family.power_kw)}-{family.poles}/{order}"
    common |= {name: value for name, value in family.facts.items() if not name.startswith("code_letter")}
    if family.facts.get("code_letter_on_plate"):
        common["locked_rotor_kva_letter"] = machine.code_letter
    if common.pop("limit_curves_supplied", False):
        common |= limit_curves(machine, common)
    members = []
    for tag in family.tags:
        motor: Record = {"motor": tag, **common}
        _device(motor, machine, family, bus, near(float(random.uniform(*family.length_m)), 5.0))
        members.append(motor)
    records = [_starts(motor, machine, family, bus, inertia, random) for motor in members]
    started = [start for each in records for start in each]
    relays = []
    for motor in members:
        if family.layout:
            exported = date(2026, 9, 7) if voltage > 1000 else date(2026, 3, 16)
            relay = new_relay(motor, family.layout, RELAY_TYPES[family.layout], exported)
            set_motor_relay(relay, motor, bus, members, started)
            relays.append(relay)
        elif family.overload_device in ("overload_relay", "motor_protective_breaker"):
            motor |= switchgear.overload_relay(family.overload_device, motor)
    site.motors.extend(members)
    site.relays.extend(relays)
    site.starts.extend(started)


def _start_times(machine: Machine, inertia: float, family: Family) -> tuple[float, float]:
    """Start time at the lowest permitted voltage and at rated voltage."""
    if family.starting_method == "drive":
        return 0.0, 0.0
    if family.starting_method == "soft_starter":
        usual = soft_start_time_s(machine, inertia, family.load, family.loading, SOFT_START_MULTIPLE, 1.0)
        slow = soft_start_time_s(machine, inertia, family.load, family.loading, SOFT_START_MULTIPLE, 0.85)
        return slow, usual
    if family.starting_method == "star_delta":
        usual = run_up_time_s(machine, inertia, family.load, 1 / math.sqrt(3), family.loading)
        return run_up_time_s(machine, inertia, family.load, 0.85 / math.sqrt(3), family.loading), usual
    return tuple(
        run_up_time_s(machine, inertia, family.load, voltage, family.loading)
        for voltage in (LOWEST_START_VOLTAGE_PU, 1.0)
    )


def _plate(machine: Machine, family: Family, inertia: float, usual_s: float, slowest_s: float) -> Record:
    high_voltage = machine.voltage_v > 1000
    if not math.isfinite(slowest_s):
        raise ValueError(f"{family.tags[0]} does not start at the lowest voltage")
    hot, cold = stall_times_s(machine, slowest_s)
    plate: Record = {
        "service": family.service,
        "area": family.area,
        "driven_machine": family.driven_machine,
        "bus": family.bus,
        "starting_method": family.starting_method,
        "switching_device": family.switching_device,
        "overload_device": family.overload_device,
        "motor_kind": "cage",
        "phases": 3.0,
        "rated_power_kw": machine.power_kw,
        "rated_voltage_v": machine.voltage_v,
        "frequency_hz": FREQUENCY_HZ,
        "full_load_a": machine.full_load_a,
        "service_factor": 1.0,
        "efficiency_pct": machine.efficiency_pct,
        "power_factor": machine.power_factor,
        "rated_speed_rpm": machine.speed_rpm,
        "poles": float(machine.poles),
        "locked_rotor_a": machine.locked_rotor_a,
        "safe_stall_hot_s": hot,
        "safe_stall_cold_s": cold,
        "insulation_class": "F",
        "temperature_rise_k": 80.0,
        "bearing_kind": "sleeve" if machine.power_kw >= 1000 else "rolling",
        "running_current_a": printed(machine.full_load_a * family.loading),
        "least_running_current_a": printed(machine.full_load_a * family.least_loading),
        "no_load_current_a": machine.no_load_a,
        "hazardous_protection": "none",
        "motor_data_date": date(2023, 11, 20),
    }
    if not high_voltage:
        plate |= {"stator_sensors": "none", "stator_sensors_wired": False, "bearing_sensors_wired": False}
        plate["efficiency_class"] = "ie3" if family.premium else "ie2"
    if family.starting_method != "drive":
        plate |= {
            "stated_start_time_s": up(usual_s, 0.1),
            "stated_start_time_at_lowest_voltage_s": up(slowest_s, 0.1),
            "lowest_start_voltage_pct": 100
            * (LOWEST_START_VOLTAGE_PU if family.starting_method == "direct_on_line" else 0.85),
            "motor_inertia_kgm2": machine.inertia_kgm2,
            "load_inertia_kgm2": inertia,
            "breakdown_torque_ratio": machine.breakdown_torque,
            "locked_rotor_torque_ratio": machine.locked_rotor_torque,
        }
    if family.starting_method == "soft_starter":
        plate["soft_start_current_limit_a"] = printed(SOFT_START_MULTIPLE * machine.full_load_a)
        plate.setdefault("bypass_start_possible", False)
        plate["relay_on_supply_side"] = True
    return plate


def _device(motor: Record, machine: Machine, family: Family, bus: Record, length_m: float) -> None:
    """Choose switching device, cable and transformers of one motor."""
    high_voltage = machine.voltage_v > 1000
    current, locked = machine.full_load_a, machine.locked_rotor_a
    direct = family.starting_method == "direct_on_line"
    across_the_line = direct or (family.starting_method == "soft_starter" and bool(motor.get("bypass_start_possible")))
    must_see = 0.0
    match family.switching_device:
        case "breaker":
            motor |= switchgear.breaker(high_voltage, current)
            must_see = 2.1 * 1.8 * locked
        case "fused_contactor":
            motor |= switchgear.contactor_with_fuses(high_voltage, current, locked, slow=_trips_slowly(motor, family))
            must_see = 10 * number(motor, "fuse_rating_a")
            motor["fuse_melting_curve"] = melting_curve(number(motor, "fuse_rating_a"))
            motor["fuse_clearing_curve"] = clearing_curve(number(motor, "fuse_rating_a"))
        case "fused_switch":
            motor |= switchgear.fused_switch(current)
            must_see = 8 * number(motor, "fuse_rating_a")
        case "moulded_case_breaker" | "motor_protective_breaker":
            drive = family.starting_method == "drive"
            magnetic = near(10 * current, 10.0) if drive else switchgear.magnetic_trip_a(1.015 * locked)
            motor |= switchgear.moulded_breaker(family.switching_device, current, magnetic)
            if not drive:
                motor |= switchgear.starter_contactor(current, locked)
            must_see = 1.05 * switchgear.MAGNETIC_UPPER_EDGE * magnetic
    duty = (
        number(motor, "fuse_let_through_a2s")
        if "fuse_let_through_a2s" in motor
        else ((number(bus, "fault_max_ka") * 1e3) ** 2 * 0.2)
    )
    motor |= cables.choose_cable(
        cables.Feeder(bus, current, locked, machine.voltage_v, length_m, duty, must_see, across_the_line)
    )
    if family.layout:
        motor["relay"] = f"R-{str(motor['motor']).replace('-', '')}"
        motor |= phase_cts(current, 1.0 if high_voltage else 5.0, high_voltage=high_voltage)
        motor["earth_ct_kind"] = family.earth_ct
        if family.earth_ct != "none":
            sensitive = bus["earthing"] == "high_resistance"
            motor |= earth_ct(family.earth_ct, motor, primary_a=20.0 if sensitive else 50.0)
        if family.switching_device == "breaker" and family.layout != "lv_long":
            motor |= voltage_transformers(number(bus, "bus_nominal_v"))
    if high_voltage:
        motor["cable_charging_a"] = round(cables.charging_current_a(motor, bus), 2)


def _trips_slowly(motor: Record, family: Family) -> bool:
    """Tell whether the motor's overload protection will take a slow trip class, 20 or 30."""
    slowest = number(motor, "stated_start_time_at_lowest_voltage_s")
    locked = number(motor, "locked_rotor_a")
    if family.layout != "lv_long":
        return slowest >= 3.0
    pickup = 1.1 * number(motor, "full_load_a")
    limited = family.starting_method == "soft_starter" and not motor.get("bypass_start_possible")
    greatest = number(motor, "soft_start_current_limit_a") if limited else 1.012 * locked
    return trip_class_for(motor, locked / pickup, greatest / pickup, slowest) > 10


def _starts(
    motor: Record, machine: Machine, family: Family, bus: Record, inertia: float, random: np.random.Generator
) -> list[Record]:
    if not family.starts or family.starting_method == "drive":
        return []
    if family.starting_method == "soft_starter":
        limit = number(motor, "soft_start_current_limit_a")
        times = tuple(
            soft_start_time_s(machine, inertia, family.load, family.loading, SOFT_START_MULTIPLE, voltage)
            for voltage in (0.94, 1.0)
        )
        behaviour = StartBehaviour((0.94, 1.0), (times[0], times[1]), 0.99 * limit, follows_voltage=False)
        return simulate_starts(str(motor["motor"]), behaviour, family.starts, random)
    _, least = cables.start_voltage_pu(bus, cables.cable_of(motor), machine.voltage_v, machine.locked_rotor_a)
    low = round(min(least, 0.99), 3)
    high = low + 0.35 * (1 - low)
    times = tuple(run_up_time_s(machine, inertia, family.load, voltage, family.loading) for voltage in (low, high))
    # where no starts an hour are stated a heavy fan gets an hour's rest
    rest = 35.0 if "stated_starts_per_hour" in motor else 65.0
    behaviour = StartBehaviour((low, high), (times[0], times[1]), machine.locked_rotor_a, rest_min=rest)
    return simulate_starts(str(motor["motor"]), behaviour, family.starts, random)


def settle_buses(site: Site, buses: Sequence[Record]) -> None:
    """Check that what was designed fits its buses: load below the incomer, dips bearable."""
    for bus in buses:
        members = [motor for motor in site.motors if motor["bus"] == bus["bus_name"]]
        load = sum(number(motor, "running_current_a") for motor in members)
        if load > number(bus, "incomer_pickup_a"):
            raise ValueError(f"{bus['bus_name']}: {load:.0f} A run, the incomer is set to {bus['incomer_pickup_a']} A")
