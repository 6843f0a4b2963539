"""Motor cables: impedance, ampacity, withstand, the least fault at the motor and the voltage during its start."""

from __future__ import annotations

import cmath
import math
from dataclasses import dataclass

from tests.sites.plant import Record, number
from tests.sites.preferred import CABLES_MM2
from tests.sites.rounding import near

RESISTIVITY_OHM_MM2_PER_KM = 18.35
"""Copper strands at 20 C (IEC 60228 class 2, from memory)."""
HOT_OVER_COLD = {"xlpe": 1.28, "pvc": 1.20}
REACTANCE_OHM_PER_KM = 0.085
WITHSTAND_K = {"xlpe": 143.0, "pvc": 115.0}
"""IEC 60364-4-43 (table copies)."""
AMPACITY_A = {
    "pvc": (24, 32, 41, 57, 76, 96, 119, 144, 184, 223, 259, 299, 341, 403, 464),
    "xlpe": (30, 40, 52, 71, 96, 119, 147, 179, 229, 278, 322, 371, 424, 500, 576),
}
"""Three loaded copper conductors fixed to a wall, 30 C (IEC 60364-5-52, from memory)."""
GROUPING = 0.85
START_POWER_FACTOR = 0.25


@dataclass(frozen=True)
class Feeder:
    """What a motor cable has to serve."""

    bus: Record
    full_load_a: float
    locked_rotor_a: float
    rated_voltage_v: float
    length_m: float
    let_through_a2s: float
    must_see_a: float
    """Current that the least fault at the motor has to reach (earth fault too on low voltage)."""
    starts_directly: bool = True


def source_ohm(bus: Record, greatest: bool = False) -> complex:
    """Impedance of the supply a phase, from its fault current and X/R."""
    voltage = number(bus, "bus_nominal_v") * (0.95 if number(bus, "bus_nominal_v") < 1000 else 1.0)
    current = number(bus, "fault_max_ka" if greatest else "fault_min_ka") * 1e3
    return cmath.rect(voltage / math.sqrt(3) / current, math.atan(number(bus, "fault_x_r_ratio")))


def cable_ohm(size_mm2: float, runs: int, length_m: float, insulation: str) -> complex:
    """Impedance of a hot cable a phase."""
    resistance = RESISTIVITY_OHM_MM2_PER_KM / size_mm2 * HOT_OVER_COLD[insulation]
    return complex(resistance, REACTANCE_OHM_PER_KM) * length_m / 1e3 / runs


def earth_conductor_mm2(size_mm2: float) -> float:
    """Protective conductor of the table in IEC 60364-5-54: equal, 16 mm2, then half."""
    if size_mm2 <= 16:
        return size_mm2
    return 16.0 if size_mm2 <= 35 else next(size for size in CABLES_MM2 if size >= size_mm2 / 2)


def least_fault_a(bus: Record, cable: complex, earth_path: complex | None) -> float:
    """Least fault current at the motor: phase to phase, or to the protective conductor where there is one."""
    voltage = number(bus, "bus_nominal_v") * (0.95 if number(bus, "bus_nominal_v") < 1000 else 1.0)
    phase_to_phase = voltage / 2 / abs(source_ohm(bus) + cable)
    if earth_path is None:
        return phase_to_phase
    return min(phase_to_phase, voltage / math.sqrt(3) / abs(source_ohm(bus) + cable + earth_path))


def start_voltage_pu(bus: Record, cable: complex, rated_voltage_v: float, locked_rotor_a: float) -> tuple[float, float]:
    """Voltage at the bus and at the motor while it starts, in parts of nominal and of rated voltage.

    The source is taken without the 5 % that the least fault current allows for.
    """
    source = source_ohm(bus)
    if number(bus, "bus_nominal_v") < 1000:
        source /= 0.95
    angle = math.acos(START_POWER_FACTOR)
    motor = cmath.rect(rated_voltage_v / math.sqrt(3) / locked_rotor_a, angle)
    total = source + cable + motor
    nominal = number(bus, "bus_nominal_v")
    return abs((cable + motor) / total), abs(motor / total) * nominal / rated_voltage_v


def choose_cable(feeder: Feeder) -> Record:
    """Choose the least cable that carries, survives, lets the protection see faults and the motor start."""
    high_voltage = number(feeder.bus, "bus_nominal_v") > 1000
    insulation = "xlpe" if high_voltage or feeder.full_load_a > 40 else "pvc"
    for runs in (1, 2, 3):
        for size, ampacity in zip(CABLES_MM2, AMPACITY_A[insulation], strict=True):
            if high_voltage and size < 70:
                continue
            cable = cable_ohm(size, runs, feeder.length_m, insulation)
            protective = earth_conductor_mm2(size)
            earth_path = None if high_voltage else cable_ohm(protective, runs, feeder.length_m, insulation)
            _, at_motor = start_voltage_pu(feeder.bus, cable, feeder.rated_voltage_v, feeder.locked_rotor_a)
            carried = near(ampacity * GROUPING * runs, 1.0)
            if (
                carried >= 1.3 * feeder.full_load_a
                and (WITHSTAND_K[insulation] * size * runs) ** 2 >= 1.5 * feeder.let_through_a2s
                and least_fault_a(feeder.bus, cable, earth_path) >= feeder.must_see_a
                and (at_motor >= 0.86 or not feeder.starts_directly)
            ):
                record: Record = {
                    "cable_size_mm2": float(size),
                    "cable_runs": float(runs),
                    "cable_length_m": feeder.length_m,
                    "cable_conductor": "copper",
                    "cable_insulation": insulation,
                    "cable_ampacity_a": carried,
                }
                if high_voltage:
                    record["cable_capacitance_uf_per_km"] = near(0.18 + 0.0011 * size, 0.01)
                else:
                    record["earth_conductor_mm2"] = protective
                return record
    raise ValueError(f"no cable of {feeder.length_m:g} m serves {feeder.full_load_a:g} A")


def cable_of(motor: Record) -> complex:
    """Impedance of a motor's own cable."""
    return cable_ohm(
        number(motor, "cable_size_mm2"),
        int(number(motor, "cable_runs")),
        number(motor, "cable_length_m"),
        str(motor["cable_insulation"]),
    )


def charging_current_a(motor: Record, bus: Record) -> float:
    """Charging current of a motor's cable to earth, 3 I_c0 = sqrt3 2 pi f C0 V."""
    capacitance = number(motor, "cable_capacitance_uf_per_km") * 1e-6 * number(motor, "cable_length_m") / 1e3
    frequency, voltage = number(bus, "bus_frequency_hz"), number(bus, "bus_nominal_v")
    return math.sqrt(3) * 2 * math.pi * frequency * capacitance * number(motor, "cable_runs") * voltage
