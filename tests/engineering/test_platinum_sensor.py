"""Pt100 sensors: there and back, and against a root finder."""

from __future__ import annotations

from itertools import pairwise

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from scipy.optimize import brentq

from audit.engineering.platinum_sensor import (
    platinum_resistance_ohm,
    platinum_temperature_c,
    platinum_tolerance_k,
)


@given(st.floats(-200, 850))
def test_temperature_comes_back_from_its_resistance(temperature):
    assert platinum_temperature_c(platinum_resistance_ohm(temperature)).item() == pytest.approx(temperature, abs=1e-6)


@pytest.mark.parametrize("resistance", [20.0, 60.26, 99.9, 138.51, 300.0])
def test_temperature_is_the_root_of_the_resistance_formula(resistance):
    root = brentq(lambda t: platinum_resistance_ohm(t).item() - resistance, -200, 850, xtol=1e-10)
    assert platinum_temperature_c(resistance).item() == pytest.approx(root, abs=1e-7)


def test_resistance_rises_throughout():
    assert (np.diff(platinum_resistance_ohm(np.linspace(-200, 850, 2000))) > 0).all()


def test_broken_or_shorted_lead_has_no_temperature():
    assert np.isnan(platinum_temperature_c([0.0, 18.5, 390.6, 1e6])).all()
    assert np.isnan(platinum_resistance_ohm([-200.1, 850.1])).all()


def test_better_classes_deviate_less_at_every_temperature():
    temperatures = np.linspace(-50, 250, 50)
    by_class = [platinum_tolerance_k(temperatures, name) for name in ("AA", "A", "B", "C")]
    assert all((better < worse).all() for better, worse in pairwise(by_class))


def test_sensor_class_of_another_name_has_no_tolerance():
    assert np.isnan(platinum_tolerance_k(100, "D"))
