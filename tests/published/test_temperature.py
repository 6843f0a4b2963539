"""Thermal classes and Pt100 sensors against published values (IEC 60085, 60034-1, 60034-11, 60751)."""

from __future__ import annotations

import pytest

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
from tests.published.rows import Row, cases_of, unclaimed, value_of

NAME = "16-temperature"


def word(insulation_class):
    """Give a class as a cell of a list gives it: '130', not 130.0."""
    return insulation_class if isinstance(insulation_class, str) else f"{insulation_class:.0f}"


FORMULAS = {
    "Pt100 resistance (ohm)": platinum_resistance_ohm,
    "Pt100 tolerance (K)": platinum_tolerance_k,
    "class temperature (C)": class_temperature_c,
    "slow overload limit (C)": lambda insulation_class: slow_overload_limit_c(word(insulation_class)),
    "rapid overload limit (C)": lambda insulation_class: rapid_overload_limit_c(word(insulation_class)),
    "rise by resistance (K)": rise_by_resistance_k,
    "alarm of a detector: ambient and rise (C)": lambda insulation_class, ambient_c: ambient_c
    + rise_by_detector_k(insulation_class),
    "trip of a detector: below the class (C)": lambda insulation_class, margin_k: class_temperature_c(
        insulation_class
    )
    - margin_k,
}


@pytest.mark.parametrize("row", cases_of(NAME, FORMULAS))
def test_published_value_is_reproduced(row: Row):
    assert value_of(row, FORMULAS) == row.allowed()


def test_every_row_is_claimed():
    assert unclaimed(NAME, FORMULAS) == set()


@pytest.mark.parametrize("row", cases_of(NAME, {"Pt100 resistance (ohm)": None}))
def test_temperature_is_read_back_from_the_published_resistance(row: Row):
    # the printed resistances have an error of up to 0.005 ohm, that is 0.02 K
    temperature = platinum_temperature_c(float(row.expected)).item()
    assert temperature == pytest.approx(row.arguments()["temperature_c"], abs=0.02)
