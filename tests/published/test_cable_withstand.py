"""Short-circuit withstand of cables against published values (IEC 60364, IEC 60949, ICEA P-32-382)."""

from __future__ import annotations

from audit.engineering.cable_withstand import (
    adiabatic_constant,
    adiabatic_constant_icea,
    adiabatic_constant_printed,
    least_section_mm2,
)

VALUES = "15-short-circuit-and-cable"
FORMULAS = {
    "adiabatic constant, printed": adiabatic_constant_printed,
    "adiabatic constant, computed": adiabatic_constant,
    "adiabatic constant, ICEA form": adiabatic_constant_icea,
    "least section (mm2)": least_section_mm2,
}


def test_published_value_is_reproduced(row):
    row.reproduced_by(FORMULAS[row.quantity](**row.arguments()))
