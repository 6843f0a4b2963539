"""Offset, peak and motor contribution against published values (R-L circuit theory, IEC 60909-0, IEEE C37.13)."""

from __future__ import annotations

from math import sqrt

from audit.engineering.motor_contribution import motor_x_to_r_ratio
from audit.engineering.offset_current import (
    offset_first_peak_ratio,
    offset_peak_half_cycle_ratio,
    offset_rms_half_cycle_ratio,
    offset_rms_ratio,
    x_to_r_from_offset_rms_ratio,
    x_to_r_from_power_factor_ratio,
    x_to_r_from_time_constant_ratio,
)
from audit.engineering.peak_short_circuit import short_circuit_peak_ratio
from tests.published.nameplate import motor_contribution

VALUES = "03-asymmetry"


FORMULAS = {
    "rms factor half a cycle after closing": offset_rms_half_cycle_ratio,
    "current half a cycle after closing over symmetrical rms": offset_peak_half_cycle_ratio,
    "first peak over symmetrical rms, closing at voltage zero": offset_first_peak_ratio,
    "peak factor kappa": short_circuit_peak_ratio,
    "rms factor some cycles after closing": offset_rms_ratio,
    "X/R that gives an rms factor": x_to_r_from_offset_rms_ratio,
    "peak factor kappa of a motor": lambda **motor: short_circuit_peak_ratio(motor_x_to_r_ratio(**motor)),
    "current half a cycle after closing, by time constant": lambda **circuit: offset_peak_half_cycle_ratio(
        x_to_r_from_time_constant_ratio(**circuit)
    ),
    "current half a cycle after closing, by power factor": lambda power_factor: offset_peak_half_cycle_ratio(
        x_to_r_from_power_factor_ratio(power_factor)
    ),
    "peak factor kappa times sqrt(2), by power factor": lambda power_factor: (
        sqrt(2) * short_circuit_peak_ratio(x_to_r_from_power_factor_ratio(power_factor))
    ),
    "motor contribution (kA)": motor_contribution,
}


def test_published_value_is_reproduced(row):
    row.reproduced_by(FORMULAS[row.quantity](**row.arguments()))
