"""Stall times against published values (IEEE 620 taken as I2t, first-order thermal model)."""

from __future__ import annotations

import numpy as np

from audit.engineering.stall import stall_time_at_current_s, stall_time_at_voltage_s
from audit.engineering.thermal_model import thermal_trip_time_cold_s, thermal_trip_time_hot_s

VALUES = "08-stall-and-limit-curves"


def hot_cold_ratio(current: float, prior_current: float, pickup: float) -> np.ndarray:
    hot = thermal_trip_time_hot_s(current, prior_current, pickup, 1.0)
    return hot / thermal_trip_time_cold_s(current, pickup, 1.0)


FORMULAS = {
    "stall time at another current (s)": lambda stall_time_s, rated_current, current: stall_time_at_current_s(
        stall_time_s, rated_current, current
    ),
    "stall time at reduced voltage (s)": stall_time_at_voltage_s,
    "ratio of hot to cold trip time": hot_cold_ratio,
}


def test_published_value_is_reproduced(row):
    row.reproduced_by(FORMULAS[row.quantity](**row.arguments()))
