"""Rated point of a motor against published values (power equation, definition of synchronous speed)."""

from __future__ import annotations

from audit.engineering.rated_point import (
    full_load_from_power_a,
    poles_from_speed,
    power_from_hp_kw,
    slip_pct,
    synchronous_speed_rpm,
)

VALUES = "17-rated-point"
FORMULAS = {
    "full-load current (A)": full_load_from_power_a,
    "synchronous speed (rpm)": synchronous_speed_rpm,
    "poles from synchronous speed": poles_from_speed,
    "slip (%)": slip_pct,
    "horsepower (kW)": power_from_hp_kw,
}


def test_published_value_is_reproduced(row):
    row.reproduced_by(FORMULAS[row.quantity](**row.arguments()))
