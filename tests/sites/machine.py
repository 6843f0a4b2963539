"""Cage induction motors from physics: plate, torque, start, stall.

Typical figures by size are common practice for modern 50 Hz machines; currents and speeds follow from them.
"""

from __future__ import annotations

import math
from dataclasses import dataclass

import numpy as np

from tests.sites.rounding import near, printed, up

HORSEPOWER_KW = 0.7457
LOWEST_START_VOLTAGE_PU = 0.80
CODE_LETTER_BANDS = (
    ("A", 3.15),
    ("B", 3.55),
    ("C", 4.0),
    ("D", 4.5),
    ("E", 5.0),
    ("F", 5.6),
    ("G", 6.3),
    ("H", 7.1),
    ("J", 8.0),
    ("K", 9.0),
    ("L", 10.0),
    ("M", 11.2),
    ("N", 12.5),
    ("P", 14.0),
    ("R", 16.0),
    ("S", 18.0),
    ("T", 20.0),
    ("U", 22.4),
)
"""Upper ends of kVA/hp, NFPA 70 table 430.7(B) (copies)."""


@dataclass(frozen=True)
class Machine:
    """A motor as its data sheet describes it."""

    power_kw: float
    poles: int
    voltage_v: float
    efficiency_pct: float
    power_factor: float
    full_load_a: float
    locked_rotor_a: float
    speed_rpm: float
    locked_rotor_torque: float
    breakdown_torque: float
    inertia_kgm2: float
    no_load_a: float

    @property
    def synchronous_rpm(self) -> float:
        """Synchronous speed at 50 Hz."""
        return 6000.0 / self.poles

    @property
    def rated_torque_nm(self) -> float:
        """Torque at the rated point."""
        return self.power_kw * 1e3 / (2 * math.pi * self.speed_rpm / 60)

    @property
    def code_letter(self) -> str:
        """Code letter of the locked-rotor kVA."""
        kva_per_hp = math.sqrt(3) * self.voltage_v * self.locked_rotor_a / 1e3 / (self.power_kw / HORSEPOWER_KW)
        return next((letter for letter, end in CODE_LETTER_BANDS if kva_per_hp < end), "V")


def make_machine(
    power_kw: float, poles: int, voltage_v: float, start_multiple: float, *, premium: bool, scatter: float = 0.0
) -> Machine:
    """Make a motor of a size; `scatter` within +-1 tells makers apart."""
    pole_pairs = poles // 2
    high_voltage = voltage_v > 1000
    if high_voltage:
        efficiency = 100 - 21.6 * power_kw**-0.248
        power_factor = 0.885 - 0.02 * (pole_pairs - 2) + 0.005 * scatter
        slip = 0.0085 + 0.001 * scatter
        torque, breakdown = 0.85 - 0.03 * (pole_pairs - 1) + 0.05 * scatter, 2.3 + 0.1 * scatter
    else:
        efficiency = 100 - (16.5 if premium else 19.5) * power_kw**-0.268
        power_factor = min(0.80 + 0.02 * math.log(power_kw / 4), 0.87) - 0.025 * (pole_pairs - 2) + 0.005 * scatter
        slip = 0.052 * power_kw**-0.32 * (1 + 0.05 * scatter)
        torque, breakdown = 2.1 + 0.15 * scatter, 2.8 + 0.15 * scatter
    efficiency, power_factor = round(efficiency + 0.1 * scatter, 1), round(power_factor, 2)
    full_load = printed(power_kw * 1e3 / (math.sqrt(3) * voltage_v * efficiency / 100 * power_factor))
    speed = round(6000 / poles * (1 - slip))
    inertia = 0.0024 * power_kw**1.25 * pole_pairs**1.8
    return Machine(
        power_kw,
        poles,
        voltage_v,
        efficiency,
        power_factor,
        full_load,
        printed(full_load * round(start_multiple + 0.1 * scatter, 1)),
        float(speed),
        round(torque, 2),
        round(breakdown, 2),
        float(f"{inertia:.3g}"),
        printed(full_load * (0.24 + 0.035 * (pole_pairs - 1))),
    )


def external_inertia_limit_kgm2(power_kw: float, poles: int) -> float:
    """Give the external inertia that a motor must be able to start: J = 0.04 P^0.9 p^2.5.

    IEC 60034-12, from memory.
    """
    return float(0.04 * power_kw**0.9 * (poles / 2) ** 2.5)


def run_up_time_s(machine: Machine, load_inertia_kgm2: float, load: str, voltage_pu: float, loading: float) -> float:
    """Time from standstill to 98 % of rated speed, by the torque balance J dw/dt = T_motor - T_load.

    The motor's torque runs straight between the corners of its curve (standstill, saddle, breakdown,
    rated, synchronous) and follows the square of the voltage. Load: 'square' for fans and pumps, 'constant'
    for belts, 'unloaded' for crushers, mills and compressors that start empty; `loading` in parts of rated torque.
    """
    share = np.linspace(0.0, 0.98 * machine.speed_rpm / machine.synchronous_rpm, 1500)
    breakdown_at = 1 - 0.08 - 0.5 * (1 - machine.speed_rpm / machine.synchronous_rpm)
    rated_at = machine.speed_rpm / machine.synchronous_rpm
    corners = [0.0, 0.35, breakdown_at, rated_at, 1.0]
    saddle = 0.97 * machine.locked_rotor_torque
    motor = np.interp(share, corners, [machine.locked_rotor_torque, saddle, machine.breakdown_torque, 1.0, 0.0])
    relative = share / rated_at
    if load == "square":
        needed = 0.08 + (loading - 0.08) * relative**2
    elif load == "constant":
        needed = np.full_like(share, loading)
    elif load == "unloaded":
        needed = 0.12 + 0.13 * relative
    else:
        raise ValueError(f"load '{load}' is not known")
    net = motor * voltage_pu**2 - needed
    if (net <= 0).any():
        return math.inf
    angular = share * 2 * math.pi * machine.synchronous_rpm / 60
    inertia = machine.inertia_kgm2 + load_inertia_kgm2
    return float(inertia / machine.rated_torque_nm * np.trapezoid(1 / net, angular))


def stall_times_s(machine: Machine, slowest_start_s: float) -> tuple[float, float]:
    """Give hot and cold safe stall time at rated voltage, as a maker states them.

    A motor is built for its start: two starts from cold at the lowest voltage stay within its cold stall time,
    and one from hot well within its hot one; neither is below what its size usually has. Hot to cold 0.70 to 0.75
    (data sheets: 0.5 to 0.9, common practice).
    """
    usual = 12.0 if machine.voltage_v > 1000 else 18.0 + 8.0 * min(machine.power_kw / 160, 1.0)
    hot = up(max(usual, 1.8 * slowest_start_s + 1.5), 1.0)
    return hot, near(hot / (0.75 if machine.voltage_v > 1000 else 0.70), 1.0)
