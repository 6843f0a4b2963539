"""The functions that rules may name: the engineering functions, described by the endings of their parameters' names."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from dataclasses import replace
from types import ModuleType
from typing import Any

import numpy as np
from numpy.typing import NDArray

from audit.derivation.bus_members import BUS_FUNCTIONS
from audit.derivation.curve_text import CURVE_FUNCTIONS
from audit.derivation.start_records import START_FUNCTIONS
from audit.engineering import (
    bus_transfer,
    cable_withstand,
    charging_current,
    code_letter,
    conductor,
    ct_accuracy,
    ct_burden,
    ct_false_current,
    current_scale,
    earth_fault,
    earth_fault_loop,
    insulation_class,
    interrupting_duty,
    inverse_time,
    motor_capacitor,
    motor_contribution,
    negative_sequence,
    nema_tables,
    offset_current,
    peak_short_circuit,
    rated_point,
    reduced_voltage,
    stall,
    standard_sizes,
    start_current,
    start_limits,
    start_voltage,
    terminal_fault,
    thermal_model,
    thermal_sequence,
    trip_class,
    unbalance_effect,
    voltage_base,
    voltage_dip,
)
from audit.expression.builtin import BUILTIN
from audit.expression.functions import Function, function_from_signature
from audit.vocabulary.units import UNITS

_MODULES: tuple[tuple[ModuleType, tuple[str, ...]], ...] = (
    (bus_transfer, ("transfer_resultant_pu", "residual_voltage_pu", "least_dead_time_s")),
    (cable_withstand, ("cable_withstand_a2s", "longest_clearing_time_s")),
    (code_letter, ("locked_rotor_from_letter_least_a", "locked_rotor_from_letter_greatest_a")),
    (conductor, ("cable_resistance_ohm", "cable_reactance_ohm")),
    (
        ct_accuracy,
        ("actual_accuracy_limit_ratio", "ct_secondary_voltage_v"),
    ),
    (ct_burden, ("rated_burden_ohm", "standard_burden_ohm")),
    (ct_false_current, ("false_residual_a", "false_differential_a")),
    (current_scale, ("current_in_a", "current_in_ka")),
    (
        earth_fault,
        ("resistor_current_a", "winding_unprotected_pct"),
    ),
    (charging_current, ("charging_current_a", "cable_capacitance_uf")),
    (earth_fault_loop, ("least_earth_fault_a",)),
    (insulation_class, ("class_temperature_c", "rise_by_resistance_k")),
    (interrupting_duty, ("interrupting_duty_by_peak_ka",)),
    (inverse_time, ("inverse_time_s", "definite_time_s")),
    (motor_capacitor, ("compensated_current_a",)),
    (motor_contribution, ("motor_fault_contribution_ka",)),
    (
        negative_sequence,
        (
            "typical_unbalance_weight",
            "conservative_unbalance_weight",
            "open_phase_line_current_a",
            "open_phase_sequence_current_a",
            "unbalance_heating_time_s",
            "equivalent_current_a",
        ),
    ),
    (nema_tables, ("table_full_load_current_a", "table_locked_rotor_a")),
    (offset_current, ("offset_rms_half_cycle_ratio", "offset_rms_ratio")),
    (peak_short_circuit, ("short_circuit_peak_ka",)),
    (
        rated_point,
        (
            "full_load_from_power_a",
            "efficiency_times_power_factor",
            "synchronous_speed_rpm",
            "slip_pct",
            "poles_from_speed",
        ),
    ),
    (reduced_voltage, ("star_delta_start_current_a", "autotransformer_line_current_a")),
    (stall, ("stall_time_at_current_s", "stall_time_at_voltage_s")),
    (standard_sizes, ("next_standard_fuse_a",)),
    (
        start_current,
        ("start_current_at_voltage_a", "start_current_at_rated_a", "locked_rotor_from_multiple_a"),
    ),
    (start_limits, ("usual_starts_per_hour",)),
    (
        start_voltage,
        ("bus_voltage_while_starting_v", "terminal_voltage_while_starting_v", "voltage_at_start_current_v"),
    ),
    (
        terminal_fault,
        ("least_phase_to_phase_fault_a", "greatest_three_phase_fault_a", "terminal_three_phase_fault_a"),
    ),
    (
        thermal_model,
        (
            "thermal_trip_time_cold_s",
            "thermal_trip_time_hot_s",
            "thermal_trip_time_from_level_s",
            "steady_thermal_level_pu",
            "running_weight_from_stall_ratio",
        ),
    ),
    (thermal_sequence, ("permitted_starts", "start_heat_pu", "waiting_time_until_start_s")),
    (trip_class, ("trip_class_least_time_s", "trip_class_greatest_time_s")),
    (unbalance_effect, ("negative_sequence_current_pct", "negative_sequence_share_at_load_pct")),
    (voltage_base, ("pickup_from_pct_v",)),
    (voltage_dip, ("fault_level_mva", "starting_power_mva", "dip_constant_impedance_pct")),
)

_RETURNS = {
    "usual_starts_per_hour": UNITS["per_hour"],
}
_WORDS = ("material", "insulation", "insulation_class", "earthing")
_CODES: Mapping[str, Mapping[str, int]] = {
    "curve_code": {
        "definite_time": 0,
        "iec_standard_inverse": 1,
        "iec_very_inverse": 2,
        "iec_extremely_inverse": 3,
        "ieee_moderately_inverse": 4,
        "ieee_very_inverse": 5,
        "ieee_extremely_inverse": 6,
        "long_time_inverse": 7,
    },
    "standard": {"iec": 0, "nema": 1},
    "letter_code": {letter: code for code, letter in enumerate(code_letter.LETTERS)},
}


def _with_codes(call: Callable[..., Any], places: Mapping[int, Mapping[str, int]]) -> Callable[..., Any]:
    """Let a function that takes codes be called with words; a word without a code is missing."""

    def called(*operands: NDArray[Any]) -> Any:
        given = list(operands)
        for place, codes in places.items():
            if place < len(given):
                words, which = np.unique(given[place], return_inverse=True)
                given[place] = np.array([codes.get(str(word), np.nan) for word in words], dtype=float)[which]
        return call(*given)

    return called


def _described(module: ModuleType, name: str) -> Function:
    call = getattr(module, name)
    function = function_from_signature(call, choices=(*_WORDS, *_CODES), returns=_RETURNS.get(name))
    places = {at: _CODES[operand.name] for at, operand in enumerate(function.operands) if operand.name in _CODES}
    reads = name.rsplit("_", 1)[0].replace("_", " ")
    return replace(function, call=_with_codes(call, places) if places else call, reads=reads)


FUNCTIONS: dict[str, Function] = {
    **BUILTIN,
    **START_FUNCTIONS,
    **BUS_FUNCTIONS,
    **CURVE_FUNCTIONS,
    **{name: _described(module, name) for module, names in _MODULES for name in names},
}
