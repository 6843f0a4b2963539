"""Unit factors against a general units library."""

from __future__ import annotations

import pint
import pytest

from audit.engineering import unit_factors
from audit.engineering.code_letter import locked_rotor_from_letter_least_a
from audit.engineering.run_up import run_up_time_constant_torque_s

UNITS = pint.UnitRegistry()


@pytest.mark.parametrize(
    ("name", "one", "unit"),
    [
        ("KW_PER_HP", "horsepower", "kilowatt"),
        ("KG_M2_PER_LB_FT2", "pound * foot**2", "kilogram * meter**2"),
        ("NEWTON_METRE_PER_LB_FT", "pound_force * foot", "newton * meter"),
        ("RADIANS_PER_SECOND_PER_RPM", "revolution / minute", "radian / second"),
    ],
)
def test_factor_is_that_of_the_units_library(name, one, unit):
    assert getattr(unit_factors, name) == pytest.approx(UNITS.Quantity(1, one).to(unit).magnitude, rel=1e-12)


def test_code_letter_current_computed_with_units_is_the_same():
    # 50 hp, 460 V, letter F: 5.0 kVA/hp
    power = UNITS.Quantity(50, "horsepower")
    apparent = power.to("horsepower").magnitude * UNITS.Quantity(5.0, "kilovolt_ampere")
    expected = (apparent / (3**0.5 * UNITS.Quantity(460, "volt"))).to("ampere").magnitude
    got = locked_rotor_from_letter_least_a(5, power.to("kilowatt").magnitude, 460)
    assert got == pytest.approx(expected, rel=1e-12)


def test_run_up_computed_with_units_is_the_same():
    inertia, torque = UNITS.Quantity(500, "pound * foot**2"), UNITS.Quantity(300, "pound_force * foot")
    speed = UNITS.Quantity(1770, "revolution / minute")
    expected = (inertia * speed / torque / UNITS.Quantity(1, "radian")).to("second").magnitude
    got = run_up_time_constant_torque_s(
        inertia.to("kilogram * meter**2").magnitude, 1770, torque.to("newton * meter").magnitude
    )
    assert got == pytest.approx(expected, rel=1e-12)
