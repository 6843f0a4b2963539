"""Celsius and Fahrenheit against the unit library pint."""

from __future__ import annotations

import numpy as np
import pint
import pytest
from hypothesis import given
from hypothesis import strategies as st

from audit.engineering.temperature_scale import celsius_c, fahrenheit_f, rise_k

UNITS = pint.UnitRegistry()


@given(st.floats(-273, 2000))
def test_points_agree_with_the_unit_library(celsius):
    quantity = UNITS.Quantity(celsius, "degC")
    assert fahrenheit_f(celsius).item() == pytest.approx(quantity.to("degF").magnitude, abs=1e-6)
    assert celsius_c(quantity.to("degF").magnitude).item() == pytest.approx(celsius, abs=1e-6)


@given(st.floats(-500, 500))
def test_differences_agree_with_the_unit_library(difference):
    kelvin = UNITS.Quantity(difference, "delta_degF").to("delta_degC").magnitude
    assert rise_k(difference).item() == pytest.approx(kelvin, abs=1e-9)


def test_nothing_is_colder_than_absolute_zero():
    assert np.isnan(celsius_c(-460))
    assert np.isnan(fahrenheit_f(-274))
