"""Faults at the end of a cable against complex arithmetic and symmetrical components."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from audit.engineering.conductor import (
    ALUMINIUM_OHM_PER_KM,
    CONDUCTIVITY,
    COPPER_OHM_PER_KM,
    cable_reactance_ohm,
    cable_resistance_ohm,
    conductor_resistance_ohm_per_km,
)
from audit.engineering.earth_fault_loop import least_earth_fault_a
from audit.engineering.terminal_fault import (
    greatest_three_phase_fault_a,
    least_phase_to_phase_fault_a,
    source_impedance_ohm,
    terminal_three_phase_fault_a,
)

CABLE = {"section_mm2": 95, "material": "copper", "runs": 1, "reactance_ohm_per_km": 0.08}
faults = st.floats(1, 80)
x_to_r = st.floats(0.2, 60)
lengths = st.floats(1, 2000)


def phasor(magnitude: float, ratio: float) -> complex:
    return magnitude * (1 + 1j * ratio) / abs(1 + 1j * ratio)


@given(faults, x_to_r, st.floats(0, 1), st.floats(0, 1))
def test_three_phase_fault_is_voltage_over_summed_phasors(fault_ka, ratio, resistance, reactance):
    source = phasor(400 / np.sqrt(3) / (fault_ka * 1000), ratio)
    expected = abs(400 / np.sqrt(3) / (source + resistance + 1j * reactance))
    assert terminal_three_phase_fault_a(fault_ka, ratio, 400, resistance, reactance).item() == pytest.approx(
        expected, rel=1e-9
    )


@given(faults, x_to_r, lengths)
def test_phase_to_phase_fault_follows_from_the_two_sequence_networks(fault_ka, ratio, length_m):
    # positive and negative network in series: I1 = E / (Z1 + Z2), phase current sqrt(3) I1
    per_sequence = phasor(400 / np.sqrt(3) / (fault_ka * 1000), ratio)
    per_sequence += (0.193 * (1 + 0.00393 * 70) + 0.08j) * length_m / 1000
    expected = np.sqrt(3) * abs(400 / np.sqrt(3) / (2 * per_sequence))
    least = least_phase_to_phase_fault_a(fault_ka, ratio, 400, length_m=length_m, conductor_temperature_c=90, **CABLE)
    assert least.item() == pytest.approx(expected, rel=1e-9)


@given(faults, x_to_r, lengths)
def test_earth_fault_follows_from_the_three_sequence_networks(fault_ka, ratio, length_m):
    # source with Z0 = Z1; the return path counts three times in the zero-sequence network
    source = phasor(400 / np.sqrt(3) / (fault_ka * 1000), ratio)
    hot = 1 + 0.00393 * 50
    phase = (0.193 * hot + 0.08j) * length_m / 1000
    protective = (0.387 * hot + 0.08j) * length_m / 1000
    sequences = 2 * (source + phase) + (source + phase + 3 * protective)
    expected = abs(3 * 400 / np.sqrt(3) / sequences)
    least = least_earth_fault_a(fault_ka, ratio, 400, length_m, 95, 50, "copper", 1, 0.08, conductor_temperature_c=70)
    assert least.item() == pytest.approx(expected, rel=1e-9)


@given(faults, x_to_r)
def test_cable_without_length_leaves_the_bus_fault(fault_ka, ratio):
    greatest = greatest_three_phase_fault_a(fault_ka, ratio, 400, length_m=0, **CABLE).item()
    assert greatest == pytest.approx(1000 * fault_ka, rel=1e-9)


@given(faults, x_to_r, lengths, st.floats(1.01, 3))
def test_longer_hotter_or_single_cables_give_less(fault_ka, ratio, length_m, times):
    def least(length, temperature, runs=1):
        cable = CABLE | {"runs": runs}
        return least_phase_to_phase_fault_a(
            fault_ka, ratio, 400, length_m=length, conductor_temperature_c=temperature, **cable
        )

    assert least(times * length_m, 90) < least(length_m, 90)
    assert least(length_m, 90) < least(length_m, 20)
    assert least(length_m, 90) < least(length_m, 90, runs=2)


@given(faults, x_to_r, lengths)
def test_least_fault_lies_below_the_greatest(fault_ka, ratio, length_m):
    least = least_phase_to_phase_fault_a(fault_ka, ratio, 400, length_m=length_m, conductor_temperature_c=90, **CABLE)
    assert least < greatest_three_phase_fault_a(fault_ka, ratio, 400, length_m=length_m, **CABLE)


def test_source_impedance_drives_its_own_fault_current():
    assert source_impedance_ohm(25, 400).item() == pytest.approx(400 / np.sqrt(3) / 25000, rel=1e-12)


def test_two_runs_have_half_the_impedance():
    one, two = cable_resistance_ohm(100, 95, "copper", [1, 2], 20)
    assert two == pytest.approx(one / 2, rel=1e-12)
    one, two = cable_reactance_ohm(100, 0.08, [1, 2])
    assert two == pytest.approx(one / 2, rel=1e-12)


@pytest.mark.parametrize(("material", "table"), [("copper", COPPER_OHM_PER_KM), ("aluminium", ALUMINIUM_OHM_PER_KM)])
def test_tabled_resistance_is_never_far_from_the_conductivity_of_the_short_circuit_standard(material, table):
    # two standards, IEC 60228 and IEC 60909-0 (54 and 34 m per ohm mm2); nominal 50 mm2 is really about 47
    sections = np.array(list(table))
    by_conductivity = 1000 / (CONDUCTIVITY[material] * sections)
    tabled = conductor_resistance_ohm_per_km(sections, material, 20)
    assert tabled == pytest.approx(by_conductivity, rel=0.09)
    assert (np.diff(tabled) < 0).all()


def test_section_that_the_table_lacks_goes_by_conductivity():
    # 2/0 AWG, 67.43 mm2; by hand: 1000 / (54 * 67.43) = 0.2746; a handbook gives about 0.26 to 0.27
    assert conductor_resistance_ohm_per_km(67.43, "copper", 20).item() == pytest.approx(0.2746, abs=5e-5)


def test_material_of_another_name_has_no_resistance():
    assert np.isnan(conductor_resistance_ohm_per_km(95, ["steel", "", None], 20)).all()


def test_temperature_that_no_cable_has_is_refused():
    # 363 is 90 C in kelvin
    assert np.isnan(conductor_resistance_ohm_per_km(95, "copper", [363, -60])).all()
