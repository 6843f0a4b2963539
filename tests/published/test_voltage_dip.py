"""Voltage dip on starting against published worked examples (IEEE 399 and handbooks)."""

from __future__ import annotations

import numpy as np

from audit.engineering.start_voltage import voltage_at_start_current_v
from audit.engineering.voltage_dip import (
    dip_constant_current_pct,
    dip_constant_impedance_pct,
    fault_level_mva,
    starting_power_mva,
    transformer_fault_level_mva,
)

VALUES = "13-voltage-dip"


def dip_by_fault_current(fault_ka, locked_rotor_a, voltage_v):
    start = starting_power_mva(locked_rotor_a, voltage_v)
    return dip_constant_impedance_pct(start, fault_level_mva(fault_ka, voltage_v))


def dip_behind_transformer(motor_mva, locked_rotor_multiple, rated_power_mva, impedance_pct):
    level = transformer_fault_level_mva(rated_power_mva, impedance_pct)
    return dip_constant_impedance_pct(motor_mva * locked_rotor_multiple, level)


def bus_voltage(source_angle_deg, **start):
    return voltage_at_start_current_v(x_to_r_ratio=np.tan(np.radians(source_angle_deg)), **start)


FORMULAS = {
    "dip, motor a constant impedance (%)": dip_constant_impedance_pct,
    "dip, current constant (%)": dip_constant_current_pct,
    "dip by fault current (%)": dip_by_fault_current,
    "dip behind a transformer (%)": dip_behind_transformer,
    "bus voltage at a start current (V)": bus_voltage,
}


def test_published_value_is_reproduced(row):
    row.reproduced_by(FORMULAS[row.quantity](**row.arguments()))
