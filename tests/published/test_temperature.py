"""Thermal classes and Pt100 sensors against published values (IEC 60085, 60034-1, 60034-11, 60751)."""

from __future__ import annotations

from audit.engineering.insulation_class import (
    class_temperature_c,
    rapid_overload_limit_c,
    rise_by_detector_k,
    rise_by_resistance_k,
    slow_overload_limit_c,
)
from audit.engineering.platinum_sensor import (
    platinum_resistance_ohm,
    platinum_temperature_c,
    platinum_tolerance_k,
)

VALUES = "16-temperature"


def word(insulation_class):
    """Give a class as a cell of a list gives it: '130', not 130.0."""
    return insulation_class if isinstance(insulation_class, str) else f"{insulation_class:.0f}"


FORMULAS = {
    "Pt100 resistance (ohm)": platinum_resistance_ohm,
    "Pt100 temperature (C)": platinum_temperature_c,
    "Pt100 tolerance (K)": platinum_tolerance_k,
    "class temperature (C)": class_temperature_c,
    "slow overload limit (C)": lambda insulation_class: slow_overload_limit_c(word(insulation_class)),
    "rapid overload limit (C)": lambda insulation_class: rapid_overload_limit_c(word(insulation_class)),
    "rise by resistance (K)": rise_by_resistance_k,
    "alarm of a detector: ambient and rise (C)": lambda insulation_class, ambient_c: (
        ambient_c + rise_by_detector_k(insulation_class)
    ),
    "trip of a detector: below the class (C)": lambda insulation_class, margin_k: (
        class_temperature_c(insulation_class) - margin_k
    ),
}


def test_published_value_is_reproduced(row):
    row.reproduced_by(FORMULAS[row.quantity](**row.arguments()))
