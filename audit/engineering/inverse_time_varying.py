"""Inverse-time overcurrent elements while the current changes."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, together
from audit.engineering.inverse_time import inverse_time_s


def inverse_time_varying_s(
    current_a: ArrayLike,
    duration_s: ArrayLike,
    pickup_a: ArrayLike,
    time_multiplier: ArrayLike,
    curve_code: ArrayLike,
    reset_time_s: ArrayLike = np.inf,
) -> Floats:
    """Trip time of an inverse-time element when the current changes step by step.

    trip when the integral of dt / t(M) reaches 1; below the pickup it runs back by (1 - M^2) dt / t_reset

    Parameters
    ----------
    current_a : array_like
        Current of each step; steps along the last axis, elements before it. [A]
    duration_s : array_like
        Duration of each step. [s]
    pickup_a : array_like
        Pickup of each element. [A]
    time_multiplier : array_like
        Time multiplier or time dial of each element. [1]
    curve_code : array_like
        Code of the curve of each element. [code]
    reset_time_s : array_like
        Time to run back in full at no current; infinite: the element waits; zero: it falls back at once. [s]

    Returns
    -------
    ndarray
        Time from the beginning to the trip; infinite where the steps end before it. [s]

    Notes
    -----
    Current constant within a step; shorter sequences are filled up with steps of no duration. Missing from a
    step with a missing input on, unless the trip came before it.

    Examples
    --------
    IEEE very inverse (code 5), dial 1: twice the pickup for 3 s, then five times. By hand: 3 / 7.0277 =
    0.42688; 0.57312 * 1.3081 = 0.7497 s; together 3.75 s.

    >>> inverse_time_varying_s([200, 500], [3, 60], 100, 1, 5).round(2).item()
    3.75

    References
    ----------
    IEEE C37.112, integral of the reciprocal of the trip time.
    """
    currents, durations = together(current_a, duration_s)
    elements = np.broadcast_shapes(
        currents.shape[:-1], *(np.shape(v) for v in (pickup_a, time_multiplier, curve_code, reset_time_s))
    )
    reset = np.broadcast_to(np.asarray(reset_time_s, dtype=np.float64), elements)
    pickup = np.broadcast_to(np.asarray(pickup_a, dtype=np.float64), elements)
    travel, elapsed = np.zeros(elements), np.zeros(elements)
    tripped = np.full(elements, np.inf)
    for step in range(currents.shape[-1]):
        current, duration = currents[..., step], durations[..., step]
        full = inverse_time_s(current, pickup, time_multiplier, curve_code)
        with np.errstate(divide="ignore", invalid="ignore"):
            gained = np.where(duration > 0, duration / full, duration * 0.0)
            back = np.where(duration > 0, (1.0 - (current / pickup) ** 2) * duration / reset, duration * 0.0)
            at = elapsed + np.where(travel < 1.0, (1.0 - travel) * full, 0.0)
        reaches = np.isinf(tripped) & (travel + gained >= 1.0)
        unknown = np.isinf(tripped) & np.isnan(travel + gained + duration + reset)
        tripped = np.where(unknown, np.nan, np.where(reaches, at, tripped))
        travel = np.where(current > pickup, travel + gained, np.maximum(travel - back, 0.0))
        elapsed = elapsed + duration
    return tripped
