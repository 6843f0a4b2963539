"""Earth faults against a three-phase network of resistor and capacitances, solved by node voltages."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from audit.engineering.charging_current import (
    cable_capacitance_uf,
    charging_current_a,
    surge_capacitance_uf,
)
from audit.engineering.earth_fault import (
    earth_fault_current_a,
    resistor_current_a,
    resistor_ohm,
    winding_covered_pct,
    winding_unprotected_pct,
)

voltages = st.floats(400, 15_000)


@given(voltages, st.floats(1, 2000), st.floats(0.01, 5), st.sampled_from([50.0, 60.0]))
def test_bolted_fault_draws_resistor_and_charging_current_in_quadrature(voltage, resistance, capacitance, hertz):
    # phase a at earth: the neutral rises to -Ea, the sound phases to line voltage against earth
    a = np.exp(2j * np.pi / 3)
    phases = voltage / np.sqrt(3) * np.array([1, a**2, a])
    neutral = -phases[0]
    susceptance = 2j * np.pi * hertz * capacitance * 1e-6
    charging = susceptance * (neutral + phases).sum()
    through_resistor = neutral / resistance
    resistor = resistor_current_a(voltage, resistance)
    own = charging_current_a(voltage, hertz, capacitance)
    assert resistor.item() == pytest.approx(abs(through_resistor), rel=1e-9)
    assert own.item() == pytest.approx(abs(charging), rel=1e-9)
    assert earth_fault_current_a(resistor, own).item() == pytest.approx(abs(charging + through_resistor), rel=1e-9)


@given(voltages, st.floats(1, 2000))
def test_resistance_comes_back_from_its_current(voltage, resistance):
    current = resistor_current_a(voltage, resistance)
    assert resistor_ohm(voltage, current).item() == pytest.approx(resistance, rel=1e-12)


def test_capacitance_of_runs_and_lengths_adds_up():
    # by hand: 0.25 uF/km, 0.8 km, three runs: 0.6 uF
    assert cable_capacitance_uf(800, 0.25, 3).item() == pytest.approx(0.6, rel=1e-12)


def test_usual_surge_capacitor_goes_by_voltage():
    # IEEE C62.21 (from memory): 0.5 uF from 2.4 kV to 6.9 kV, 0.25 uF from 11.5 kV to 13.8 kV
    found = surge_capacitance_uf([690, 2400, 6900, 10000, 11500, 13800, 15000])
    assert np.array_equal(found, [np.nan, 0.5, 0.5, np.nan, 0.25, 0.25, np.nan], equal_nan=True)


@given(st.floats(0.1, 500), st.floats(1, 2000), st.floats(0, 1))
def test_fault_inside_the_winding_is_seen_beyond_the_unprotected_share(pickup, terminal_fault, place):
    # place is the distance from the neutral over the winding; the driving voltage is that share of the phase
    unprotected = winding_unprotected_pct(pickup, terminal_fault).item()
    seen = place * terminal_fault > pickup * (1 + 1e-9)
    if seen:
        assert 100 * place > unprotected
    assert unprotected + winding_covered_pct(pickup, terminal_fault).item() == pytest.approx(100)


def test_pickup_above_the_fault_current_leaves_nothing_covered():
    assert winding_unprotected_pct(500, 400).item() == 100
    assert winding_covered_pct(500, 400).item() == 0
