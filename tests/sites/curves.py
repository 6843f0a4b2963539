"""Curves as points: fuses by the shape of motor fuses, thermal limits as a maker derives them."""

from __future__ import annotations

import math

import numpy as np

from tests.sites.machine import Machine
from tests.sites.plant import Record, number

MELTING = (
    (3.0, 300.0),
    (4.0, 90.0),
    (5.0, 35.0),
    (6.3, 13.0),
    (8.0, 4.5),
    (10.0, 1.6),
    (12.5, 0.45),
    (16.0, 0.2),
    (20.0, 0.085),
    (30.0, 0.025),
    (50.0, 0.008),
)
"""Least melting time of a motor fuse by multiples of its rating; inside the gates of class aM, IEC 60269-2 (memory)."""
CLEARING_OVER_MELTING, ARCING_S = 1.2, 0.005
LIMIT_MULTIPLES = (1.4, 1.6, 2.0, 2.5, 3.0, 4.0)
LIMIT_BASE = 1.2
"""Current that the motor bears for ever, as a multiple of full load: what its thermal limit tends to."""


def as_points(points: list[tuple[float, float]]) -> str:
    """Give points of current and time as a list writes them.

    >>> as_points([(300.0, 40.0), (600.0, 10.25)])
    '300 A: 40 s; 600 A: 10.2 s'
    """
    return "; ".join(f"{current:.4g} A: {time:.3g} s" for current, time in points)


def melting_curve(rating_a: float) -> str:
    """Melting curve of a motor fuse."""
    return as_points([(multiple * rating_a, time) for multiple, time in MELTING])


def clearing_curve(rating_a: float) -> str:
    """Total clearing curve of the same fuse."""
    return as_points([(multiple * rating_a, time * CLEARING_OVER_MELTING + ARCING_S) for multiple, time in MELTING])


def clearing_time_s(rating_a: float, current_a: float) -> float:
    """Total clearing time of the fuse at a current, straight between its points on logarithmic scales."""
    multiples, times = zip(*MELTING, strict=True)
    melting = math.exp(float(np.interp(math.log(current_a / rating_a), np.log(multiples), np.log(times))))
    return melting * CLEARING_OVER_MELTING + ARCING_S


def limit_curves(machine: Machine, motor: Record) -> Record:
    """Thermal limits cold and hot: first-order heating through the safe stall times at locked rotor.

    A motor that has run at full load starts from the heat that makes its hot stall time what it is.
    """
    locked = machine.locked_rotor_a / machine.full_load_a
    hot, cold = number(motor, "safe_stall_hot_s"), number(motor, "safe_stall_cold_s")
    base = LIMIT_BASE**2
    constant = cold / math.log(locked**2 / (locked**2 - base))
    earlier = locked**2 - (locked**2 - base) * math.exp(hot / constant)
    curves: Record = {}
    for name, heat in (("cold_limit_curve", 0.0), ("hot_limit_curve", earlier)):
        points = [
            (multiple * machine.full_load_a, constant * math.log((multiple**2 - heat) / (multiple**2 - base)))
            for multiple in (*LIMIT_MULTIPLES, locked)
        ]
        curves[name] = as_points(points)
    return curves
