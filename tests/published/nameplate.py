"""Formulas put together from nameplate data, as published examples give them."""

from __future__ import annotations

from audit.engineering.motor_contribution import motor_fault_contribution_ka
from audit.engineering.rated_point import full_load_from_power_a


def motor_contribution(
    rated_power_kw, rated_voltage_v, efficiency_pct, power_factor, locked_rotor_multiple, voltage_factor_pu
):
    full_load = full_load_from_power_a(rated_power_kw, rated_voltage_v, efficiency_pct, power_factor)
    return motor_fault_contribution_ka(
        locked_rotor_multiple * full_load, rated_voltage_v, rated_voltage_v, voltage_factor_pu
    )
