"""Bases of voltage settings and bus transfer against published values (ANSI C50.41)."""

from __future__ import annotations

from audit.engineering.bus_transfer import greatest_transfer_angle_deg, transfer_resultant_pu
from audit.engineering.voltage_base import (
    pickup_from_pct_v,
    pickup_from_secondary_pct_v,
    pickup_in_pct,
    pickup_in_secondary_v,
)

VALUES = "14-voltage-settings"


def on_the_secondary(pickup_pct, base_voltage_v, **transformer):
    return pickup_in_secondary_v(pickup_from_pct_v(pickup_pct, base_voltage_v), **transformer)


def on_another_base(pickup_pct, base_voltage_v, other_base_v):
    return pickup_in_pct(pickup_from_pct_v(pickup_pct, base_voltage_v), other_base_v)


def on_motor_volts(rated_voltage_v, **secondary):
    return pickup_in_pct(pickup_from_secondary_pct_v(**secondary), rated_voltage_v)


FORMULAS = {
    "pickup of per cent of motor volts, on the secondary (V)": on_the_secondary,
    "pickup of per cent of motor volts, on another base (%)": on_another_base,
    "pickup of per cent of secondary volts, on motor volts (%)": on_motor_volts,
    "resultant volts per hertz (pu)": transfer_resultant_pu,
    "greatest angle for a resultant (deg)": greatest_transfer_angle_deg,
}


def test_published_value_is_reproduced(row):
    row.reproduced_by(FORMULAS[row.quantity](**row.arguments()))
