"""A missing input makes a missing result, in every formula and for every input, without a warning."""

from __future__ import annotations

import inspect
from types import FunctionType

import numpy as np
import pytest

from audit.engineering import (
    bus_transfer,
    cable_withstand,
    charging_current,
    conductor,
    ct_accuracy,
    ct_burden,
    ct_false_current,
    earth_fault,
    earth_fault_loop,
    insulation_class,
    interrupting_duty,
    motor_contribution,
    offset_current,
    peak_short_circuit,
    platinum_sensor,
    rated_point,
    start_voltage,
    temperature_scale,
    terminal_fault,
    unbalance,
    unbalance_effect,
    voltage_base,
    voltage_dip,
)

MODULES = (
    bus_transfer,
    cable_withstand,
    charging_current,
    conductor,
    ct_accuracy,
    ct_burden,
    ct_false_current,
    earth_fault,
    earth_fault_loop,
    insulation_class,
    interrupting_duty,
    motor_contribution,
    offset_current,
    peak_short_circuit,
    platinum_sensor,
    rated_point,
    start_voltage,
    temperature_scale,
    terminal_fault,
    unbalance,
    unbalance_effect,
    voltage_base,
    voltage_dip,
)

# a sensible figure for a parameter of this name, else for one of this ending
BY_NAME = {
    "material": "copper",
    "insulation": "XLPE",
    "insulation_class": "F",
    "tolerance_class": "B",
    "voltage_unbalance_pct": 2.0,
    "offset_rms_ratio": 1.5,
    "power_factor": 0.86,
    "start_power_factor": 0.2,
    "final_temperature_c": 250.0,
    "residual_voltage_pu": 0.3,
    "runs": 2.0,
    "poles": 4.0,
    "cycles": 0.5,
    "parting_cycles": 3.0,
    "adiabatic_constant": 143.0,
    "unbalance_weight": 6.0,
    "start_current_a": 600.0,
    "fault_ka": 30.0,
    "frequency_hz": 50.0,
    "rated_speed_rpm": 1480.0,
    "vt_secondary_v": 110.0,
    "ct_secondary_a": 5.0,
    "first": 400.0,
    "second": 395.0,
    "third": 388.0,
    "surge_voltage_v": 6600.0,
    "resistance_ohm": 138.0,
    "cable_resistance_ohm": 0.01,
    "cable_reactance_ohm": 0.01,
}
BY_ENDING = {
    "_ratio": 10.0,
    "_multiple": 6.0,
    "_pu": 0.9,
    "_deg": 60.0,
    "_s": 0.2,
    "_pct": 80.0,
    "_ka": 20.0,
    "_kw": 75.0,
    "_mva": 10.0,
    "_va": 15.0,
    "_hp": 100.0,
    "_mm2": 95.0,
    "_per_km": 0.1,
    "_ohm": 2.0,
    "_uf": 0.3,
    "_a2s": 1e8,
    "_a": 300.0,
    "_v": 4160.0,
    "_m": 100.0,
    "_c": 40.0,
    "_f": 100.0,
    "_k": 80.0,
}
WORDS = {"material", "insulation", "insulation_class", "tolerance_class"}


def sensible(name: str) -> float | str:
    if name in BY_NAME:
        return BY_NAME[name]
    return next(figure for ending, figure in BY_ENDING.items() if name.endswith(ending))


FORMULAS = [
    formula
    for module in MODULES
    for name, formula in vars(module).items()
    if isinstance(formula, FunctionType) and formula.__module__ == module.__name__ and not name.startswith("_")
]
INPUTS = [(formula, name) for formula in FORMULAS for name in inspect.signature(formula).parameters]


def named(value: object) -> str:
    return getattr(value, "__name__", str(value))


@pytest.mark.parametrize("formula", FORMULAS, ids=named)
def test_sensible_inputs_give_a_figure_per_row(formula):
    arguments = {name: sensible(name) for name in inspect.signature(formula).parameters}
    alone = formula(**arguments)
    assert np.isfinite(alone)
    rows = formula(**{name: [value] * 3 for name, value in arguments.items()})
    assert rows.shape == (3,)
    assert rows.dtype == np.float64
    assert (rows == alone).all()


@pytest.mark.parametrize(("formula", "name"), INPUTS, ids=named)
def test_missing_input_makes_the_row_missing_and_no_other(formula, name):
    arguments = {other: sensible(other) for other in inspect.signature(formula).parameters}
    known = arguments[name]
    arguments[name] = [known, "" if name in WORDS else np.nan, known]
    assert np.isnan(formula(**arguments)).tolist() == [False, True, False]


@pytest.mark.parametrize(("formula", "name"), [pair for pair in INPUTS if pair[1] not in WORDS], ids=named)
def test_infinite_or_senseless_input_raises_no_warning(formula, name):
    arguments = {other: sensible(other) for other in inspect.signature(formula).parameters}
    for figure in (0.0, -1.0, 1e9, np.inf, -np.inf):
        arguments[name] = figure
        formula(**arguments)  # warnings are errors in this suite
