"""Start over a soft starter that holds the current at its limit."""

from __future__ import annotations

import math

import numpy as np

from tests.sites.machine import Machine

SOFT_START_MULTIPLE = 4.0


def soft_start_time_s(
    machine: Machine, load_inertia_kgm2: float, load: str, loading: float, limit_multiple: float, supply_pu: float
) -> float:
    """Time to 98 % of rated speed with the current held at a multiple of full load.

    At full voltage the current falls with speed as LRA sqrt(1 - 0.9 n^8); the starter gives just the
    voltage that keeps it at its limit, and at most the supply's.
    """
    share = np.linspace(0.0, 0.98 * machine.speed_rpm / machine.synchronous_rpm, 1500)
    rated_at = machine.speed_rpm / machine.synchronous_rpm
    at_full_voltage = machine.locked_rotor_a * np.sqrt(1 - 0.9 * share**8)
    voltage = np.minimum(supply_pu, limit_multiple * machine.full_load_a / at_full_voltage)
    corners = [0.0, 0.35, 1 - 0.08 - 0.5 * (1 - rated_at), rated_at, 1.0]
    torques = [machine.locked_rotor_torque, 0.97 * machine.locked_rotor_torque, machine.breakdown_torque, 1.0, 0.0]
    motor = np.interp(share, corners, torques) * voltage**2
    relative = share / rated_at
    needed = 0.08 + (loading - 0.08) * relative**2 if load == "square" else 0.12 + 0.13 * relative
    net = motor - needed
    if (net <= 0).any():
        return math.inf
    angular = share * 2 * math.pi * machine.synchronous_rpm / 60
    inertia = machine.inertia_kgm2 + load_inertia_kgm2
    return float(inertia / machine.rated_torque_nm * np.trapezoid(1 / net, angular))
