"""Columns of the motor list: band, header, unit and what stands in them."""

from __future__ import annotations

from dataclasses import dataclass


@dataclass(frozen=True)
class Column:
    """A column of a list: a quantity, or several that share a cell."""

    header: str
    unit: str
    quantities: tuple[str, ...]
    join: str = ""
    """How several quantities stand in one cell: 'ratio' 200/5, 'pair' 12/16, 'cable' 2x(3x240)."""
    otherwise: str = ""
    """What stands in the cell of a motor that has no such thing."""


def _one(header: str, quantity: str, unit: str = "", otherwise: str = "") -> Column:
    return Column(header, unit, (quantity,), otherwise=otherwise)


IDENTITY = (
    _one("Tag No.", "motor"),
    _one("Service", "service"),
    _one("Driven Machine", "driven_machine"),
    _one("Switchboard", "bus"),
    _one("Protection Relay", "relay"),
    _one("Make", "motor_make"),
    _one("Motor Type", "motor_type"),
    _one("Duty/Standby With", "duty_standby_with"),
    _one("Must Run", "must_run"),
    _one("Restart List", "reaccelerated"),
    _one("Critical Machine", "critical"),
)
PLATE = (
    _one("Rated Power", "rated_power_kw", "kW"),
    _one("Rated Voltage", "rated_voltage_v", "V"),
    _one("Frequency", "frequency_hz", "Hz"),
    _one("Phases", "phases"),
    _one("Rotor Type", "motor_kind"),
    _one("FLC", "full_load_a", "A"),
    _one("Efficiency", "efficiency_pct", "%"),
    _one("IE Class", "efficiency_class", otherwise="N/A"),
    _one("Power Factor", "power_factor"),
    _one("Service Factor", "service_factor"),
    _one("Speed", "rated_speed_rpm", "r/min"),
    _one("Poles", "poles"),
    _one("Insulation Class", "insulation_class"),
    _one("Temp Rise", "temperature_rise_k", "K"),
    _one("Ex Protection", "hazardous_protection"),
    _one("tE", "te_s", "s"),
    _one("Certificate IA/IN", "ia_in_ratio"),
    _one("Bearing Type", "bearing_kind"),
    _one("Stator Leads", "stator_leads"),
    _one("Code Letter", "locked_rotor_kva_letter"),
    _one("Data Sheet Date", "motor_data_date"),
    _one("Motor Replaced", "motor_replaced_date"),
)
STARTING = (
    _one("Starting Method", "starting_method"),
    _one("DOL Bypass", "bypass_start_possible"),
    _one("Soft Starter Current Limit", "soft_start_current_limit_a", "A"),
    _one("Relay On Supply Side", "relay_on_supply_side"),
    _one("Starting Current", "locked_rotor_a", "A"),
    Column("Stall Time", "s", ("safe_stall_hot_s", "safe_stall_cold_s"), "stall"),
    _one("Hot Limit Curve", "hot_limit_curve"),
    _one("Cold Limit Curve", "cold_limit_curve"),
    _one("Run-up Time", "stated_start_time_s", "s"),
    _one("Run-up Time 80 % Un", "stated_start_time_at_lowest_voltage_s", "s"),
    _one("Minimum Starting Voltage", "lowest_start_voltage_pct", "%"),
    _one("Motor Inertia", "motor_inertia_kgm2", "kg m2"),
    _one("Load Inertia", "load_inertia_kgm2", "kg m2"),
    _one("MA/MN", "locked_rotor_torque_ratio"),
    _one("MK/MN", "breakdown_torque_ratio"),
    _one("Starts per Hour", "stated_starts_per_hour", "/h"),
    _one("Cold Starts", "stated_cold_starts"),
    _one("Hot Starts", "stated_hot_starts"),
    _one("Min. Time Between Starts", "stated_start_interval_min", "min"),
    _one("Starts Needed Cold", "needed_cold_starts"),
    _one("Starts Needed Hot", "needed_hot_starts"),
    _one("Speed Switch", "speed_switch_fitted"),
    _one("Speed Switch Delay", "speed_switch_delay_s", "s"),
    _one("Backspin Time", "backspin_time_s", "s"),
    _one("Reverse Rotation Harmful", "reverse_rotation_harmful"),
    _one("Re-terminated", "supply_reterminated_date"),
    _one("Rotation Checked On", "rotation_check_date"),
)
RUNNING = (
    _one("Running Amps Max", "running_current_a", "A"),
    _one("Running Amps Min", "least_running_current_a", "A"),
    _one("No-load Current", "no_load_current_a", "A"),
    _one("Cannot Run Dry", "cannot_run_dry"),
    _one("V-belt", "belt_drive"),
    _one("Stator RTD", "stator_sensors", otherwise="N/A"),
    _one("RTD Wired To Relay", "stator_sensors_wired"),
    _one("Bearing RTD Wired", "bearing_sensors_wired"),
    _one("Max Running Winding Temp", "highest_running_temperature_c", "°C", otherwise="N/A"),
    _one("PTC Trip", "thermal_sensor_trips_device"),
    _one("Drive Protects Motor", "drive_protects_motor"),
    _one("Bypass Overload", "bypass_overload_fitted"),
)
DEVICE = (
    _one("Switching Device", "switching_device"),
    _one("Breaking Capacity", "interrupting_rating_ka", "kA"),
    _one("Device Rated Current", "device_rated_current_a", "A"),
    _one("Contactor Ie", "contactor_rated_current_a", "A"),
    _one("Opening Time", "device_opening_time_s", "ms"),
    _one("Least Opening Time", "device_least_opening_time_s", "ms"),
    _one("Short-circuit Device", "short_circuit_device"),
    _one("Fuse Type", "fuse", otherwise="N/A"),
    _one("Fuse Rating", "fuse_rating_a", "A"),
    _one("Fuse Kind", "fuse_kind"),
    _one("Fuse Melting Curve", "fuse_melting_curve"),
    _one("Fuse Clearing Curve", "fuse_clearing_curve"),
    _one("Back-up Fuse Curve", "backup_fuse_melting_curve"),
    _one("Striker Trip", "blown_fuse_trip"),
    _one("Let-through I2t", "fuse_let_through_a2s", "A2s"),
    _one("Starter SCCR", "starter_short_circuit_rating_ka", "kA"),
    _one("Bus UV Scheme", "undervoltage_by_bus_scheme"),
)
OVERLOAD = (
    _one("Overload Device", "overload_device"),
    _one("Overload Inside Delta", "relay_inside_delta"),
    _one("O/L Dial", "overload_dial_a", "A"),
    _one("O/L Range Min", "overload_range_low_a", "A"),
    _one("O/L Range Max", "overload_range_high_a", "A"),
    _one("O/L Class", "overload_trip_class"),
    _one("Class Standard", "overload_class_standard"),
    _one("OL Phase Loss", "overload_phase_loss_on"),
    _one("Mag Trip", "magnetic_trip_a", "A"),
)
TRANSFORMERS = (
    Column("CT Ratio", "A", ("ct_primary_a", "ct_secondary_a"), "ratio", "N/A"),
    _one("No. of CTs", "ct_count"),
    _one("ALF", "ct_accuracy_limit_factor"),
    _one("CT VA", "ct_rated_burden_va", "VA"),
    _one("CT Winding Resistance", "ct_winding_ohm", "ohm"),
    _one("Connected Burden", "ct_connected_burden_ohm", "ohm"),
    _one("CT Ratio Error", "ct_ratio_error_pct", "%"),
    _one("CT Changed", "ct_changed_date"),
    _one("Earth Fault CT", "earth_ct_kind"),
    Column("Earth CT Ratio", "A", ("earth_ct_primary_a", "earth_ct_secondary_a"), "ratio", "N/A"),
    Column("VT Ratio", "V", ("vt_primary_v", "vt_secondary_v"), "ratio", "N/A"),
    _one("VT Connection", "vt_connection"),
    _one("87 CTs", "differential_cts", otherwise="N/A"),
)
CABLE = (
    Column("Cable", "mm2", ("cable_size_mm2", "cable_runs"), "cable"),
    _one("No. of Cables", "cable_runs"),
    _one("Cable Length", "cable_length_m", "m"),
    _one("Conductor", "cable_conductor"),
    _one("Cable Insulation", "cable_insulation"),
    _one("Ampacity", "cable_ampacity_a", "A"),
    _one("PE Size", "earth_conductor_mm2", "mm2"),
    _one("Charging Current", "cable_charging_a", "A"),
    _one("Cable Capacitance", "cable_capacitance_uf_per_km", "uF/km"),
)

BANDS = (
    ("IDENTIFICATION", IDENTITY),
    ("NAMEPLATE", PLATE),
    ("STARTING", STARTING),
    ("RUNNING & SENSORS", RUNNING),
    ("STARTER / CUBICLE", DEVICE),
    ("OVERLOAD & MAGNETIC TRIP", OVERLOAD),
    ("INSTRUMENT TRANSFORMERS", TRANSFORMERS),
    ("CABLE", CABLE),
)
