"""Short-circuit currents against a network calculation library; how they were made: network_library/make_results.py."""

from __future__ import annotations

from audit.engineering.peak_short_circuit import short_circuit_peak_ratio
from audit.engineering.terminal_fault import phase_to_phase_fault_a, terminal_three_phase_fault_a
from audit.engineering.voltage_dip import fault_level_mva
from tests.published.nameplate import motor_contribution

VALUES = "../network_library/results"
# the network of make_results.py: 6 kV, 250 MVA; voltage factors of IEC 60909 above 1 kV; cable hot at 80 C
VOLTAGE_V = 6000.0
BUS_FAULT_KA = 250.0 / fault_level_mva(1.0, VOLTAGE_V).item()
GREATEST_VOLTAGE_FACTOR = 1.1
LEAST_VOLTAGE_FACTOR = 1.0
HOT_OVER_COLD = 1 + 0.004 * (80 - 20)


def greatest_fault(x_to_r_ratio, length_km, r_ohm_per_km, x_ohm_per_km):
    resistance, reactance = r_ohm_per_km * length_km, x_ohm_per_km * length_km
    voltage = GREATEST_VOLTAGE_FACTOR * VOLTAGE_V
    return terminal_three_phase_fault_a(BUS_FAULT_KA, x_to_r_ratio, voltage, resistance, reactance) / 1000


def least_fault(x_to_r_ratio, length_km, r_ohm_per_km, x_ohm_per_km):
    resistance, reactance = HOT_OVER_COLD * r_ohm_per_km * length_km, x_ohm_per_km * length_km
    voltage = LEAST_VOLTAGE_FACTOR * VOLTAGE_V
    three_phase = terminal_three_phase_fault_a(BUS_FAULT_KA, x_to_r_ratio, voltage, resistance, reactance)
    return phase_to_phase_fault_a(three_phase) / 1000


FORMULAS = {
    "peak factor kappa": short_circuit_peak_ratio,
    "motor contribution (kA)": motor_contribution,
    "three-phase fault at the end of a cold cable (kA)": greatest_fault,
    "phase-to-phase fault at the end of a hot cable (kA)": least_fault,
}


def test_network_library_agrees(row):
    row.reproduced_by(FORMULAS[row.quantity](**row.arguments()))
