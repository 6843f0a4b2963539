"""Voltage during a start against node voltages of the ladder of supply, cable and motor."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from audit.engineering.start_voltage import (
    bus_voltage_while_starting_v,
    terminal_voltage_while_starting_v,
    voltage_at_start_current_v,
)
from audit.engineering.voltage_dip import (
    dip_constant_current_pct,
    dip_constant_impedance_pct,
    fault_level_mva,
    starting_power_mva,
    transformer_fault_level_mva,
)

faults = st.floats(2, 60)
x_to_r = st.floats(0.3, 50)
currents = st.floats(10, 3000)
factors = st.floats(0.05, 0.6)
cables = st.floats(0.0001, 0.1)


def phasor(magnitude: float, angle: float) -> complex:
    return magnitude * np.exp(1j * angle)


@given(faults, x_to_r, currents, factors, cables, cables)
def test_bus_and_terminals_are_the_node_voltages_of_the_ladder(fault_ka, ratio, locked, factor, resistance, reactance):
    source = phasor(400 / np.sqrt(3) / (1000 * fault_ka), np.arctan(ratio))
    cable = resistance + 1j * reactance
    motor = phasor(380 / np.sqrt(3) / locked, np.arccos(factor))
    admittance = np.array([[1 / source + 1 / cable, -1 / cable], [-1 / cable, 1 / cable + 1 / motor]])
    nodes = np.abs(np.linalg.solve(admittance, [400 / np.sqrt(3) / source, 0])) * np.sqrt(3)
    given_ = (400, fault_ka, ratio, locked, 380, factor, resistance, reactance)
    assert bus_voltage_while_starting_v(*given_).item() == pytest.approx(nodes[0], rel=1e-7)
    assert terminal_voltage_while_starting_v(*given_).item() == pytest.approx(nodes[1], rel=1e-7)


@given(faults, x_to_r, currents, factors, cables, cables)
def test_both_forms_agree_for_the_current_that_really_flows(fault_ka, ratio, locked, factor, resistance, reactance):
    source = phasor(400 / np.sqrt(3) / (1000 * fault_ka), np.arctan(ratio))
    motor = phasor(400 / np.sqrt(3) / locked, np.arccos(factor))
    total = source + resistance + 1j * reactance + motor
    current, power_factor = 400 / np.sqrt(3) / abs(total), np.cos(np.angle(total))
    terminals = terminal_voltage_while_starting_v(400, fault_ka, ratio, locked, 400, factor, resistance, reactance)
    by_current = voltage_at_start_current_v(400, fault_ka, ratio, current, power_factor, resistance, reactance)
    assert by_current.item() == pytest.approx(terminals.item(), rel=1e-6)


@given(faults, currents)
def test_scalar_dip_is_the_dip_of_equal_angles(fault_ka, locked):
    # pure reactance throughout
    exact = 400 - bus_voltage_while_starting_v(400, fault_ka, np.inf, locked, 400, 0, 0, 0)
    scalar = dip_constant_impedance_pct(starting_power_mva(locked, 400), fault_level_mva(fault_ka, 400))
    assert scalar.item() == pytest.approx(exact.item() / 4, abs=1e-6)


@given(st.floats(0.01, 50), st.floats(1, 1000))
def test_constant_current_is_the_pessimistic_form(start_mva, level_mva):
    assert dip_constant_current_pct(start_mva, level_mva) > dip_constant_impedance_pct(start_mva, level_mva)


def test_transformer_of_less_impedance_dips_less():
    dips = dip_constant_impedance_pct(12, transformer_fault_level_mva(5, [4, 5, 6, 8]))
    assert (np.diff(dips) > 0).all()


def test_current_that_the_supply_cannot_drive_has_no_voltage():
    # 25 kA into a short is all there is
    assert np.isnan(voltage_at_start_current_v(415, 25, 10, 26_000, 0.2))
