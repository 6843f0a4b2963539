"""How the invented sites spell choices and yes or no in their workbooks."""

from __future__ import annotations

from tests.sites.plant import Record

SPELLINGS: dict[str, dict[str, str]] = {
    "motor_kind": {"cage": "Cage", "wound_rotor": "Slip ring"},
    "hazardous_protection": {"none": "Safe", "ex_eb": "Ex eb", "ex_ec": "Ex ec", "ex_db": "Ex db"},
    "driven_machine": {
        "pump": "Pump",
        "submersible_pump": "Submersible pump",
        "multistage_pump": "Multistage pump",
        "canned_pump": "Canned pump",
        "vertical_pump": "Vertical pump",
        "fan": "Fan",
        "compressor": "Compressor",
        "conveyor": "Conveyor",
        "crusher": "Crusher",
        "mill": "Mill",
        "screw": "Screw conveyor",
        "mixer": "Agitator",
        "chipper": "Chipper",
        "other": "Other",
    },
    "starting_method": {
        "direct_on_line": "DOL",
        "star_delta": "Y/D",
        "soft_starter": "SS",
        "drive": "VSD",
        "rotor_resistance": "SR",
    },
    "switching_device": {
        "breaker": "CB",
        "moulded_case_breaker": "MCCB",
        "motor_protective_breaker": "MPCB",
        "fused_contactor": "Fused contactor",
        "contactor": "Contactor",
        "fused_switch": "Switch-fuse",
    },
    "overload_device": {
        "motor_relay": "Motor relay",
        "overload_relay": "O/L relay",
        "motor_protective_breaker": "MPCB",
        "drive": "VSD",
        "thermistor": "PTC",
        "none": "None",
    },
    "short_circuit_device": {"relay": "Relay", "magnetic_trip": "Magnetic", "fuse": "Fuses"},
    "fuse_kind": {"motor_circuit": "aM", "general": "gG"},
    "efficiency_class": {"ie1": "IE1", "ie2": "IE2", "ie3": "IE3", "ie4": "IE4"},
    "insulation_class": {"B": "B", "F": "F", "H": "H"},
    "bearing_kind": {"sleeve": "Sleeve", "rolling": "Roller"},
    "stator_sensors": {"none": "N/A", "resistance": "6xPt100", "thermistor": "PTC"},
    "differential_cts": {"none": "N/A", "both_ends": "Both ends", "flux_balance": "Flux balance"},
    "earth_ct_kind": {"none": "None", "core_balance": "CBCT", "residual": "Residual"},
    "vt_connection": {"line_to_line": "Open-delta", "line_to_neutral": "Star"},
    "cable_conductor": {"copper": "Cu", "aluminium": "Al"},
    "cable_insulation": {"xlpe": "XLPE", "pvc": "PVC"},
    "relay_earth_source": {"none": "None", "core_balance": "CBCT", "residual": "Residual"},
    "relay_vt_connection": {"line_to_line": "Open delta", "line_to_neutral": "Star"},
    "relay_phase_rotation": {"abc": "ABC", "acb": "ACB"},
    "relay_role": {
        "motor": "Motor",
        "incomer": "Incomer",
        "feeder": "Feeder",
        "transformer": "Transformer",
        "spare": "Spare",
        "coupler": "Bus tie",
    },
    "short_circuit_filter": {"rms": "True RMS", "offset_rejected": "DC rejected", "peak": "Peak"},
    "thermal_hot_curve": {"all_load": "Full", "stall_ratio": "Hot/cold ratio", "none": "None"},
    "unbalance_base": {"full_load": "I2/FLA", "positive_sequence": "I2/I1", "deviation": "Deviation"},
    "differential_kind": {"two_sets": "Two CT sets", "flux_balance": "Flux balance"},
    "overcurrent_curve": {"long_time_inverse": "LTI", "iec_extremely_inverse": "IEC EI"},
    "short_circuit_opens": {"breaker": "CB", "contactor": "Contactor", "nothing": "None"},
    "thermal_opens": {"breaker": "CB", "contactor": "Contactor", "nothing": "None"},
    "earth_fault_opens": {"breaker": "CB", "contactor": "Contactor", "nothing": "None"},
    "unbalance_opens": {"breaker": "CB", "contactor": "Contactor", "nothing": "None"},
    "overload_class_standard": {"iec": "IEC", "nema": "NEMA"},
    "overload_reset_mode": {"manual": "Manual", "automatic": "Auto"},
    "bus_phase_rotation": {"abc": "ABC", "acb": "ACB"},
    "earthing": {
        "solid": "Solid",
        "low_resistance": "Low resistance",
        "high_resistance": "High resistance",
        "isolated": "IT",
    },
    "incomer_curve": {"iec_standard_inverse": "SI", "definite_time": "DT", "iec_very_inverse": "IEC VI"},
    "automatic_transfer": {"none": "None", "slow": "Slow", "fast": "Fast"},
}


def spelled(record: Record, quantity: str) -> object:
    """Give a value as the site writes it: words for choices, Y and N for yes and no, blank for nothing."""
    value = record.get(quantity)
    if isinstance(value, bool):
        return "Y" if value else "N"
    if isinstance(value, str):
        return SPELLINGS.get(quantity, {}).get(value, value)
    if isinstance(value, float):
        return int(value) if value == int(value) else value
    return value


def ratio(record: Record, first: str, second: str) -> str | None:
    """Give a ratio as '200/5', or nothing."""
    if first not in record or second not in record:
        return None
    return f"{record[first]:g}/{record[second]:g}"
