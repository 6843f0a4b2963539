"""Neutral resistors and charging current against published values (IEEE 142)."""

from __future__ import annotations

from audit.engineering.charging_current import charging_current_a
from audit.engineering.earth_fault import resistor_current_a

VALUES = "12-resistance-earthing"
FORMULAS = {
    "current of the neutral resistor (A)": resistor_current_a,
    "charging current (A)": charging_current_a,
}


def test_published_value_is_reproduced(row):
    row.reproduced_by(FORMULAS[row.quantity](**row.arguments()))
