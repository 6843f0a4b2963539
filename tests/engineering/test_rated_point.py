"""Rated point: power balance, poles and slip, horsepower against the unit library pint."""

from __future__ import annotations

import numpy as np
import pint
import pytest
from hypothesis import given
from hypothesis import strategies as st

from audit.engineering.rated_point import (
    efficiency_times_power_factor,
    full_load_from_power_a,
    poles_from_speed,
    power_from_hp_kw,
    power_from_kw_hp,
    slip_pct,
    synchronous_speed_rpm,
)

UNITS = pint.UnitRegistry()
powers = st.floats(0.2, 20_000)
even_poles = st.sampled_from([2, 4, 6, 8, 10, 12, 14, 16])


@given(powers)
def test_horsepower_agrees_with_the_unit_library(power):
    assert power_from_hp_kw(power).item() == pytest.approx(UNITS.Quantity(power, "horsepower").to("kW").magnitude)
    assert power_from_kw_hp(power).item() == pytest.approx(UNITS.Quantity(power, "kW").to("horsepower").magnitude)


@given(powers, st.floats(200, 15_000), st.floats(70, 98), st.floats(0.5, 0.95))
def test_plate_implies_the_efficiency_and_power_factor_it_was_computed_from(power, voltage, efficiency, factor):
    current = full_load_from_power_a(power, voltage, efficiency, factor)
    implied = efficiency_times_power_factor(power, voltage, current)
    assert implied.item() == pytest.approx(efficiency / 100 * factor)


def test_share_typed_for_per_cent_gives_no_plausible_current():
    # 0.945 meant 94.5 per cent: a hundred times the current, which the plausibility of the plate then shows
    wrong = full_load_from_power_a(75, 400, 0.945, 0.86)
    assert efficiency_times_power_factor(75, 400, wrong).item() < 0.01


def test_efficiency_or_power_factor_above_one_has_no_current():
    assert np.isnan(full_load_from_power_a(75, 400, [101, 94.5], [0.86, 86])).all()


@given(st.sampled_from([50.0, 60.0]), even_poles, st.floats(0, 6))
def test_poles_and_slip_come_back_from_the_speed(hertz, poles, slip):
    speed = synchronous_speed_rpm(hertz, poles) * (1 - slip / 100)
    found = poles_from_speed(speed, hertz)
    assert found.item() == poles
    assert slip_pct(speed, hertz, found).item() == pytest.approx(slip, abs=1e-9)


def test_speed_of_another_frequency_leaves_a_slip_that_gives_it_away():
    # 1780 rpm is a 60 Hz motor; at 50 Hz it can only be read as 2 poles with 40 per cent slip
    assert slip_pct(1780, 50, poles_from_speed(1780, 50)).item() == pytest.approx(40.67, abs=0.01)


def test_speed_above_two_poles_has_no_number_of_poles():
    assert np.isnan(poles_from_speed(3700, 60))
