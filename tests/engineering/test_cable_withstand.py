"""Cable withstand against the heating of a conductor, solved step by step with the properties of the metal."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from scipy.integrate import solve_ivp

from audit.engineering.cable_withstand import (
    adiabatic_constant,
    adiabatic_constant_icea,
    adiabatic_constant_printed,
    cable_withstand_a2s,
    least_section_mm2,
    longest_clearing_time_s,
)

# IEC 60949, table of materials (from memory): heat per volume J/(K mm3), resistivity at 20 C ohm mm, beta C
METALS = {"copper": (3.45e-3, 17.241e-6, 234.5), "aluminium": (2.5e-3, 28.264e-6, 228.0)}


@pytest.mark.parametrize("material", METALS)
@pytest.mark.parametrize(("initial", "final"), [(90, 250), (70, 160), (40, 200)])
def test_constant_is_that_of_a_conductor_heated_without_loss(material, initial, final):
    heat, resistivity, beta = METALS[material]
    density = 100.0  # A/mm2

    def slope(_, temperature):
        return density**2 * resistivity * (beta + temperature) / (beta + 20) / heat

    def reached(_, temperature):
        return temperature[0] - final

    reached.terminal = True
    heated = solve_ivp(slope, (0, 60), [float(initial)], events=reached, rtol=1e-10, atol=1e-10)
    constant = density * np.sqrt(heated.t_events[0][0])
    # 226 and 148 are the rounded constants of the standard
    assert adiabatic_constant(material, initial, final).item() == pytest.approx(constant, rel=2e-3)


@pytest.mark.parametrize("material", METALS)
@given(st.floats(20, 100), st.floats(10, 200))
def test_both_forms_of_the_constant_lie_within_two_per_cent(material, initial, rise):
    iec = adiabatic_constant(material, initial, initial + rise)
    assert adiabatic_constant_icea(material, initial, initial + rise) == pytest.approx(iec, rel=0.02)


@pytest.mark.parametrize(
    ("material", "insulation", "section", "initial", "final"),
    [
        ("copper", "pvc", 300, 70, 160),
        ("copper", "pvc", 301, 70, 140),
        ("copper", "xlpe", 400, 90, 250),
        ("copper", "epr", 95, 90, 250),
        ("aluminium", "pvc", 300, 70, 160),
        ("aluminium", "pvc", 301, 70, 140),
        ("aluminium", "xlpe", 400, 90, 250),
    ],
)
def test_printed_constants_are_the_rounded_formula(material, insulation, section, initial, final):
    printed = adiabatic_constant_printed(material, insulation, section).item()
    assert printed == pytest.approx(adiabatic_constant(material, initial, final).item(), rel=0.006)


@given(st.floats(100, 50_000), st.floats(0.1, 5), st.sampled_from([115.0, 143.0, 76.0, 94.0]))
def test_cable_of_least_section_bears_the_fault_just_that_long(fault_a, time_s, constant):
    section = least_section_mm2(fault_a, time_s, constant)
    assert longest_clearing_time_s(fault_a, (constant * section) ** 2).item() == pytest.approx(time_s, rel=1e-9)


def test_two_runs_bear_four_times_the_heat():
    one, two = cable_withstand_a2s(95, [1, 2], "copper", "XLPE")
    assert two == pytest.approx(4 * one, rel=1e-12)


def test_insulation_or_material_of_another_name_has_no_withstand():
    assert np.isnan(cable_withstand_a2s(95, 1, ["copper", "", "steel"], ["paper", "XLPE", "XLPE"])).all()


def test_fault_that_would_cool_the_conductor_has_no_constant():
    assert np.isnan(adiabatic_constant("copper", 90, 70))
    assert np.isnan(adiabatic_constant_icea("copper", 90, 70))
