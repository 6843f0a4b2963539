"""Thermal model against published values (IEC 60255-149, Blackburn and Domin, IEC 60947-4-1)."""

from __future__ import annotations

import numpy as np

from audit.engineering.negative_sequence import (
    conservative_unbalance_weight,
    equivalent_current_a,
    typical_unbalance_weight,
)
from audit.engineering.thermal_level import thermal_level_after_pu
from audit.engineering.thermal_model import thermal_time_constant_s, thermal_trip_time_hot_s
from audit.engineering.thermal_sequence import start_heat_pu, waiting_time_until_start_s

VALUES = "02-thermal-model"


def trip_time_s(time_constant_s: float, current: float, prior_current: float, pickup: float) -> np.ndarray:
    return thermal_trip_time_hot_s(current, prior_current, pickup, time_constant_s)


def level_after_start_pu(
    current: float, duration_s: float, time_constant_s: float, pickup: float, initial_level: float
) -> np.ndarray:
    if initial_level == 0:
        return start_heat_pu(current, duration_s, pickup, time_constant_s)
    return thermal_level_after_pu(initial_level, (current / pickup) ** 2, time_constant_s, duration_s)


def waiting_time_s(
    level: float,
    current: float,
    start_time_s: float,
    time_constant_s: float,
    pickup: float,
    cooling_time_constant_s: float,
) -> np.ndarray:
    return waiting_time_until_start_s(level, current, start_time_s, pickup, time_constant_s, cooling_time_constant_s)


FORMULAS = {
    "trip time (s)": trip_time_s,
    "negative-sequence weight, typical": typical_unbalance_weight,
    "negative-sequence weight, conservative": conservative_unbalance_weight,
    "equivalent heating current (pu)": lambda positive_sequence, negative_sequence, weight: equivalent_current_a(
        positive_sequence, negative_sequence, weight
    ),
    "thermal level after a start (pu)": level_after_start_pu,
    "waiting time for a start (s)": waiting_time_s,
    "time constant implied by a trip class (s)": lambda trip_class, multiple, pickup: thermal_time_constant_s(
        trip_class, multiple, pickup
    ),
}


def test_published_value_is_reproduced(row):
    row.reproduced_by(FORMULAS[row.quantity](**row.arguments()))
