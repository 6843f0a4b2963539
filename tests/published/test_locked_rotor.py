"""Locked-rotor currents against published values (NEMA MG 1 12.35, IEC 60034-12)."""

from __future__ import annotations

import numpy as np

from audit.engineering.nema_tables import table_full_load_current_a, table_locked_rotor_a
from audit.engineering.start_current import (
    largest_apparent_power_ratio,
    locked_rotor_from_power_ratio_multiple,
)
from audit.engineering.unit_factors import KW_PER_HP

VALUES = "05-locked-rotor-current"


def multiple_of_tables(power_hp: float, voltage_v: float) -> np.ndarray:
    power_kw = power_hp * KW_PER_HP
    return table_locked_rotor_a(power_kw, voltage_v) / table_full_load_current_a(power_kw, voltage_v)


FORMULAS = {
    "greatest locked-rotor current (A)": lambda power_hp, voltage_v: table_locked_rotor_a(
        power_hp * KW_PER_HP, voltage_v
    ),
    "greatest locked-rotor current over full-load current, both of the tables": multiple_of_tables,
    "greatest locked-rotor kVA per kW": largest_apparent_power_ratio,
    "locked-rotor multiple from kVA per kW": lambda ratio, efficiency, power_factor: (
        locked_rotor_from_power_ratio_multiple(ratio, efficiency, power_factor)
    ),
}


def test_published_value_is_reproduced(row):
    row.reproduced_by(FORMULAS[row.quantity](**row.arguments()))
