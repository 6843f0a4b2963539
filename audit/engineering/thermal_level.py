"""Thermal level after a while at one current, and over a sequence of starts, runs and rests."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, present, together


def thermal_level_after_pu(
    level_pu: ArrayLike, target_level_pu: ArrayLike, time_constant_s: ArrayLike, duration_s: ArrayLike
) -> Floats:
    """Thermal level after a while at constant current.

    theta(t) = theta_end + (theta_0 - theta_end) * exp(-t / tau)

    Parameters
    ----------
    level_pu : array_like
        Thermal level at the beginning; 1 trips. [1]
    target_level_pu : array_like
        Level that the current would settle at: (I / Ip)^2 for a start, that times the running weight for a
        run, 0 at rest. [1]
    time_constant_s : array_like
        Time constant: heating for start and run, cooling for rest. [s]
    duration_s : array_like
        How long the current flows. [s]

    Returns
    -------
    ndarray
        Thermal level at the end. [1]

    Notes
    -----
    One time constant at a time. Does not stop at 1: above it the element has tripped on the way. Missing
    where an input is missing, a duration is negative or a time constant not above zero.

    Examples
    --------
    A start at 6 times the pickup, 8 s, 10 min. By hand: 36 * (1 - exp(-8 / 600)) = 0.477.

    >>> thermal_level_after_pu(0, 36, 600, 8).round(3).item()
    0.477

    References
    ----------
    IEC 60255-149, first-order thermal model.
    """
    level, target, constant, duration = together(level_pu, target_level_pu, time_constant_s, duration_s)
    usable = present(level, target, constant, duration) & (constant > 0) & (duration >= 0)
    with np.errstate(divide="ignore", invalid="ignore"):
        # weighted mean rather than a difference, so that an infinite target stays a number where t = 0
        kept = np.exp(-duration / constant)
        gained = -np.expm1(-duration / constant)
        return np.where(usable, level * kept + target * gained, np.nan)


def thermal_level_over_sequence_pu(
    initial_level_pu: ArrayLike, target_level_pu: ArrayLike, time_constant_s: ArrayLike, duration_s: ArrayLike
) -> Floats:
    """Thermal level at the end of each step of a sequence of starts, runs and rests.

    theta_n = thermal_level_after_pu(theta_(n-1), step n)

    Parameters
    ----------
    initial_level_pu : array_like
        Level before the first step, one per motor. [1]
    target_level_pu : array_like
        Level that each step's current would settle at; steps along the last axis, motors before it. [1]
    time_constant_s : array_like
        Time constant of each step (heating or cooling). [s]
    duration_s : array_like
        Duration of each step. [s]

    Returns
    -------
    ndarray
        Level at the end of each step, in the shape of the steps. [1]

    Notes
    -----
    The three step arrays broadcast against each other; shorter sequences are filled up with steps of no
    duration. From a missing step on the level is missing.

    Examples
    --------
    Two starts of 8 s at 6 times the pickup, 600 s at rest between, tau 600 s and 1200 s. By hand:
    0.4768; times exp(-0.5) = 0.2892; 0.2892 * 0.98676 + 0.4768 = 0.7622.

    >>> thermal_level_over_sequence_pu(0, [36, 0, 36], [600, 1200, 600], [8, 600, 8]).round(4).tolist()
    [0.4768, 0.2892, 0.7622]

    References
    ----------
    IEC 60255-149, first-order thermal model, step by step.
    """
    targets, constants, durations = together(target_level_pu, time_constant_s, duration_s)
    motors = targets.shape[:-1]
    level = np.broadcast_to(np.asarray(initial_level_pu, dtype=np.float64), motors)
    reached = np.empty_like(targets)
    for step in range(targets.shape[-1]):
        level = thermal_level_after_pu(level, targets[..., step], constants[..., step], durations[..., step])
        reached[..., step] = level
    return reached
