"""Which engineering functions rules may name."""

from __future__ import annotations

from types import ModuleType

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
    kloss,
    motor_capacitor,
    motor_contribution,
    negative_sequence,
    nema_tables,
    offset_current,
    peak_short_circuit,
    platinum_sensor,
    rated_point,
    reduced_voltage,
    run_up,
    stall,
    standard_sizes,
    start_current,
    start_limits,
    start_voltage,
    terminal_fault,
    thermal_level,
    thermal_model,
    thermal_sequence,
    trip_class,
    unbalance_effect,
    voltage_base,
    voltage_dip,
)

OF_MODULE: tuple[tuple[ModuleType, str], ...] = (
    (
        bus_transfer,
        "transfer_resultant_pu residual_voltage_pu least_dead_time_s volts_per_hertz_pu greatest_transfer_angle_deg",
    ),
    (cable_withstand, "cable_withstand_a2s longest_clearing_time_s"),
    (charging_current, "charging_current_a cable_capacitance_uf surge_capacitance_uf"),
    (code_letter, "locked_rotor_from_letter_least_a locked_rotor_from_letter_greatest_a"),
    (conductor, "cable_resistance_ohm cable_reactance_ohm conductor_resistance_ohm_per_km"),
    (
        ct_accuracy,
        "actual_accuracy_limit_ratio ct_secondary_voltage_v ct_offset_voltage_v offset_saturation_multiple "
        "greatest_unsaturated_multiple",
    ),
    (ct_burden, "rated_burden_ohm standard_burden_ohm rated_burden_va class_voltage_v"),
    (
        ct_false_current,
        "false_residual_a false_differential_a false_residual_one_sided_a false_residual_composite_a "
        "false_residual_rms_a false_differential_composite_a",
    ),
    (current_scale, "current_in_a current_in_ka"),
    (earth_fault, "resistor_current_a winding_unprotected_pct resistor_ohm earth_fault_current_a winding_covered_pct"),
    (earth_fault_loop, "least_earth_fault_a"),
    (
        insulation_class,
        "class_temperature_c rise_by_resistance_k rise_by_detector_k slow_overload_limit_c rapid_overload_limit_c",
    ),
    (interrupting_duty, "interrupting_duty_by_peak_ka interrupting_duty_by_rms_ka"),
    (inverse_time, "inverse_time_s definite_time_s inverse_reset_time_s"),
    (kloss, "kloss_torque_nm breakdown_slip_pu run_up_time_kloss_s"),
    (motor_capacitor, "compensated_current_a"),
    (motor_contribution, "motor_fault_contribution_ka motor_x_to_r_ratio"),
    (
        negative_sequence,
        "typical_unbalance_weight conservative_unbalance_weight open_phase_line_current_a "
        "open_phase_sequence_current_a unbalance_heating_time_s equivalent_current_a "
        "open_phase_equivalent_current_a",
    ),
    (nema_tables, "table_full_load_current_a table_locked_rotor_a"),
    (
        offset_current,
        "offset_rms_half_cycle_ratio offset_rms_ratio offset_peak_half_cycle_ratio offset_first_peak_ratio "
        "x_to_r_from_offset_rms_ratio x_to_r_from_time_constant_ratio x_to_r_from_power_factor_ratio",
    ),
    (peak_short_circuit, "short_circuit_peak_ka short_circuit_peak_ratio"),
    (platinum_sensor, "platinum_resistance_ohm platinum_temperature_c"),
    (
        rated_point,
        "full_load_from_power_a efficiency_times_power_factor synchronous_speed_rpm slip_pct poles_from_speed",
    ),
    (
        reduced_voltage,
        "star_delta_start_current_a autotransformer_line_current_a torque_at_voltage_nm "
        "star_delta_start_torque_nm autotransformer_motor_current_a soft_start_current_a soft_start_torque_nm",
    ),
    (run_up, "average_accelerating_torque_nm run_up_time_constant_torque_s"),
    (stall, "stall_time_at_current_s stall_time_at_voltage_s"),
    (standard_sizes, "next_standard_fuse_a"),
    (
        start_current,
        "start_current_at_voltage_a start_current_at_rated_a locked_rotor_from_multiple_a "
        "locked_rotor_from_power_ratio_multiple largest_apparent_power_ratio",
    ),
    (
        start_limits,
        "usual_starts_per_hour least_rest_time_s nema_load_inertia_limit_kgm2 iec_external_inertia_limit_kgm2",
    ),
    (start_voltage, "bus_voltage_while_starting_v terminal_voltage_while_starting_v voltage_at_start_current_v"),
    (
        terminal_fault,
        "least_phase_to_phase_fault_a greatest_three_phase_fault_a terminal_three_phase_fault_a "
        "source_impedance_ohm phase_to_phase_fault_a",
    ),
    (thermal_level, "thermal_level_after_pu"),
    (
        thermal_model,
        "thermal_trip_time_cold_s thermal_trip_time_hot_s thermal_trip_time_from_level_s "
        "steady_thermal_level_pu running_weight_from_stall_ratio thermal_time_constant_s",
    ),
    (thermal_sequence, "permitted_starts start_heat_pu waiting_time_until_start_s cooling_time_s"),
    (trip_class, "trip_class_least_time_s trip_class_greatest_time_s trip_class_warm_time_s"),
    (
        unbalance_effect,
        "negative_sequence_current_pct negative_sequence_share_at_load_pct unbalance_derating_ratio "
        "unbalance_derating_by_heating_ratio open_phase_delta_winding_pu",
    ),
    (
        voltage_base,
        "pickup_from_pct_v pickup_from_secondary_v pickup_from_secondary_pct_v pickup_in_pct "
        "pickup_in_secondary_v line_to_line_v",
    ),
    (
        voltage_dip,
        "fault_level_mva starting_power_mva dip_constant_impedance_pct transformer_fault_level_mva "
        "dip_constant_current_pct",
    ),
)
"""The functions of each module that rules may name: those that work row by row on data whose units their names tell."""
