"""Inverse-time curves against published values (IEEE C37.112, IEC 60255-151, BS 142)."""

from __future__ import annotations

import numpy as np

from audit.engineering.inverse_time import (
    inverse_curve_code,
    inverse_reset_time_s,
    inverse_time_s,
)
from audit.engineering.inverse_time_varying import inverse_time_varying_s

VALUES = "01-inverse-time-curves"
PICKUP_A = 100.0
LONG_S = 1000.0


def trip_time_s(curve: str, time_multiplier: float, multiple: float) -> np.ndarray:
    return inverse_time_s(multiple * PICKUP_A, PICKUP_A, time_multiplier, inverse_curve_code(curve))


def reset_time_s(curve: str, time_multiplier: float, multiple: float) -> np.ndarray:
    return inverse_reset_time_s(multiple * PICKUP_A, PICKUP_A, time_multiplier, inverse_curve_code(curve))


def varying_time_s(
    curve: str,
    time_multiplier: float,
    first_multiple: float,
    first_duration_s: float,
    second_multiple: float,
) -> np.ndarray:
    currents = np.array([first_multiple, second_multiple]) * PICKUP_A
    durations = [first_duration_s, LONG_S]
    return inverse_time_varying_s(currents, durations, PICKUP_A, time_multiplier, inverse_curve_code(curve))


FORMULAS = {
    "trip time (s)": trip_time_s,
    "reset time (s)": reset_time_s,
    "trip time at varying current (s)": varying_time_s,
}


def test_published_value_is_reproduced(row):
    row.reproduced_by(FORMULAS[row.quantity](**row.arguments()))
