"""Current and voltage transformers as fitted; relays of a sound site are set to what is fitted."""

from __future__ import annotations

from tests.sites.plant import Record, number
from tests.sites.preferred import CT_PRIMARIES_A, next_up


def phase_cts(full_load_a: float, secondary_a: float, *, high_voltage: bool) -> Record:
    """Three phase CTs of class 5P20, primary 1.25 times full load and up to the next size."""
    rated_burden = 15.0 if high_voltage else 10.0
    primary = next_up(CT_PRIMARIES_A, 1.25 * full_load_a)
    per_ampere = 1.0 / secondary_a**2
    return {
        "ct_primary_a": primary,
        "ct_secondary_a": secondary_a,
        "ct_count": 3.0,
        "ct_accuracy_limit_factor": 20.0,
        "ct_rated_burden_va": rated_burden,
        "ct_winding_ohm": round((2.4 if high_voltage else 1.6) * per_ampere + 0.002 * primary / secondary_a / 10, 3),
        "ct_connected_burden_ohm": round(0.9 * per_ampere + 0.05, 3),
        "ct_ratio_error_pct": 1.0,
    }


def earth_ct(kind: str, phase: Record, *, primary_a: float = 50.0, secondary_a: float = 1.0) -> Record:
    """Core-balance CT, or the residual connection of the phase CTs."""
    if kind == "core_balance":
        return {"earth_ct_kind": kind, "earth_ct_primary_a": primary_a, "earth_ct_secondary_a": secondary_a}
    return {
        "earth_ct_kind": "residual",
        "earth_ct_primary_a": number(phase, "ct_primary_a"),
        "earth_ct_secondary_a": number(phase, "ct_secondary_a"),
    }


def voltage_transformers(nominal_v: float) -> Record:
    """Two VTs in open delta, nominal to 110 V."""
    return {"vt_primary_v": nominal_v, "vt_secondary_v": 110.0, "vt_connection": "line_to_line"}


def told_to_relay(motor: Record) -> Record:
    """Give what a relay has to know about the transformers, from what is fitted."""
    relay: Record = {}
    for fitted, told in (
        ("ct_primary_a", "relay_ct_primary_a"),
        ("ct_secondary_a", "relay_ct_secondary_a"),
        ("ct_count", "relay_ct_count"),
        ("earth_ct_kind", "relay_earth_source"),
        ("earth_ct_primary_a", "relay_earth_ct_primary_a"),
        ("earth_ct_secondary_a", "relay_earth_ct_secondary_a"),
        ("vt_primary_v", "relay_vt_primary_v"),
        ("vt_secondary_v", "relay_vt_secondary_v"),
        ("vt_connection", "relay_vt_connection"),
    ):
        if fitted in motor:
            relay[told] = motor[fitted]
    return relay
