"""Thermal model with one time constant: trip times from cold and from a running motor."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, present, together


def _time_to_trip_s(level_pu: Floats, current_a: Floats, pickup_a: Floats, time_constant_s: Floats) -> Floats:
    usable = (
        present(level_pu, current_a, pickup_a, time_constant_s)
        & (level_pu >= 0)
        & (current_a >= 0)
        & (pickup_a > 0)
        & (time_constant_s > 0)
    )
    with np.errstate(divide="ignore", invalid="ignore", over="ignore"):
        square = (current_a / pickup_a) ** 2
        # log1p keeps full precision at many times pickup, where the quotient is close to one
        time = time_constant_s * np.log1p((1.0 - level_pu) / (square - 1.0))
    time = np.where(square > 1.0, time, np.inf)
    time = np.where(level_pu >= 1.0, 0.0, time)
    return np.where(usable, time, np.nan)


def thermal_trip_time_cold_s(current_a: ArrayLike, pickup_a: ArrayLike, time_constant_s: ArrayLike) -> Floats:
    """Time that a cold thermal element needs to trip at constant current.

    t = tau * ln(I^2 / (I^2 - Ip^2))

    Parameters
    ----------
    current_a : array_like
        Motor current, held constant; the equivalent current where the element weights unbalance. [A]
    pickup_a : array_like
        Current that the element finally trips at, k times the base current. [A]
    time_constant_s : array_like
        Heating time constant. [s]

    Returns
    -------
    ndarray
        Trip time; infinite at or below the pickup. [s]

    Notes
    -----
    One time constant, no earlier load: not for a restart from hot. Missing where an input is missing, a
    current is negative, or pickup or time constant is not above zero.

    Examples
    --------
    600 A on 105 A pickup (base 100 A, k = 1.05), 20 min. By hand: 1200 * ln(36 / 34.8975) = 37.3 s.

    >>> thermal_trip_time_cold_s(600, 105, 1200).round(1).item()
    37.3

    References
    ----------
    IEC 60255-149, cold curve (formerly IEC 60255-8).
    """
    current, pickup, constant = together(current_a, pickup_a, time_constant_s)
    return _time_to_trip_s(np.zeros_like(current), current, pickup, constant)


def thermal_trip_time_hot_s(
    current_a: ArrayLike,
    prior_current_a: ArrayLike,
    pickup_a: ArrayLike,
    time_constant_s: ArrayLike,
    running_weight: ArrayLike = 1.0,
) -> Floats:
    """Time that a thermal element warmed by a steady load needs to trip at constant current.

    t = tau * ln((I^2 - w * Io^2) / (I^2 - Ip^2))

    Parameters
    ----------
    current_a : array_like
        Motor current, held constant. [A]
    prior_current_a : array_like
        Current before, held for several time constants. [A]
    pickup_a : array_like
        Current that the element finally trips at. [A]
    time_constant_s : array_like
        Heating time constant. [s]
    running_weight : array_like
        Share w of the earlier load's heat that the element counts while the motor runs; 1 is the standard's
        hot curve, less where the element is set by a ratio of hot to cold stall time. [1]

    Returns
    -------
    ndarray
        Trip time; infinite at or below the pickup, zero where the earlier load has used up the whole
        thermal capacity. [s]

    Notes
    -----
    The earlier load must have reached its steady level. With w = 1 a single time constant trips a hot motor
    far sooner than data sheets allow (ratio to cold about 0.25 at six times full load). Missing where an
    input is missing or negative, or pickup or time constant is not above zero.

    Examples
    --------
    Twice the pickup after 0.9 of it, 10 min. By hand: 600 * ln((4 - 0.81) / (4 - 1)) = 36.8 s.

    >>> thermal_trip_time_hot_s(200, 90, 100, 600).round(1).item()
    36.8

    References
    ----------
    IEC 60255-149, hot curve; the running weight is common practice, from memory.
    """
    current, prior, pickup, constant, weight = together(
        current_a, prior_current_a, pickup_a, time_constant_s, running_weight
    )
    level = steady_thermal_level_pu(prior, pickup, weight)
    return _time_to_trip_s(level, current, pickup, constant)


def thermal_trip_time_from_level_s(
    level_pu: ArrayLike, current_a: ArrayLike, pickup_a: ArrayLike, time_constant_s: ArrayLike
) -> Floats:
    """Time that a thermal element needs to trip from a given thermal level at constant current.

    t = tau * ln((M^2 - theta) / (M^2 - 1)), M = I / Ip

    Parameters
    ----------
    level_pu : array_like
        Thermal level at the beginning; 1 trips. [1]
    current_a : array_like
        Motor current, held constant. [A]
    pickup_a : array_like
        Current that the element finally trips at. [A]
    time_constant_s : array_like
        Heating time constant. [s]

    Returns
    -------
    ndarray
        Trip time; infinite at or below the pickup, zero from level 1 upward. [s]

    Notes
    -----
    One time constant. Missing where an input is missing or negative, or pickup or time constant is not above
    zero.

    Examples
    --------
    Half warm, six times the pickup, 10 min. By hand: 600 * ln(35.5 / 35) = 8.51 s.

    >>> thermal_trip_time_from_level_s(0.5, 600, 100, 600).round(2).item()
    8.51

    References
    ----------
    IEC 60255-149, first-order thermal model.
    """
    return _time_to_trip_s(*together(level_pu, current_a, pickup_a, time_constant_s))


def steady_thermal_level_pu(current_a: ArrayLike, pickup_a: ArrayLike, running_weight: ArrayLike = 1.0) -> Floats:
    """Thermal level that a steady load settles at.

    theta = w * (I / Ip)^2

    Parameters
    ----------
    current_a : array_like
        Steady motor current. [A]
    pickup_a : array_like
        Current that the element finally trips at. [A]
    running_weight : array_like
        Share of the load's heat that the element counts while the motor runs. [1]

    Returns
    -------
    ndarray
        Thermal level; 1 trips. [1]

    Notes
    -----
    After several time constants; above 1 the element has tripped on the way. Missing where an input is
    missing or negative, or the pickup is zero.

    Examples
    --------
    Full load 100 A on 115 A pickup. By hand: (100 / 115)^2 = 0.756.

    >>> steady_thermal_level_pu(100, 115).round(3).item()
    0.756

    References
    ----------
    IEC 60255-149, first-order thermal model; the weight is common practice, from memory.
    """
    current, pickup, weight = together(current_a, pickup_a, running_weight)
    usable = present(current, pickup, weight) & (current >= 0) & (pickup > 0) & (weight >= 0)
    with np.errstate(divide="ignore", invalid="ignore"):
        return np.where(usable, weight * (current / pickup) ** 2, np.nan)


def running_weight_from_stall_ratio(hot_cold_ratio: ArrayLike, pickup_multiple: ArrayLike = 1.0) -> Floats:
    """Running weight that makes the hot curve keep a given ratio of hot to cold stall time.

    w = (1 - r) * k^2

    Parameters
    ----------
    hot_cold_ratio : array_like
        Safe stall time hot divided by safe stall time cold. [1]
    pickup_multiple : array_like
        Pickup of the element in multiples k of full-load current; 1 where the element counts its running
        heat on the pickup itself. [1]

    Returns
    -------
    ndarray
        Weight by which the square of the running current in multiples of pickup is counted. [1]

    Notes
    -----
    Exact for currents far above the pickup, where the first-order curve is I^2 t; at six times the pickup
    the hot time comes out up to 1.4 % longer than the ratio says. Ratios outside 0 to 1 and multiples not
    above zero give missing.

    Examples
    --------
    Stall 18 s hot, 20 s cold, pickup at full load. By hand: 1 - 0.9 = 0.1.

    >>> running_weight_from_stall_ratio(18 / 20).round(3).item()
    0.1

    References
    ----------
    Common practice, from memory; no standard clause known.
    """
    ratio, multiple = together(hot_cold_ratio, pickup_multiple)
    usable = present(ratio, multiple) & (ratio >= 0) & (ratio <= 1) & (multiple > 0)
    return np.where(usable, (1.0 - ratio) * multiple**2, np.nan)


def thermal_time_constant_s(trip_time_s: ArrayLike, current_a: ArrayLike, pickup_a: ArrayLike) -> Floats:
    """Time constant of the cold curve that passes through one known point.

    tau = t / ln(I^2 / (I^2 - Ip^2))

    Parameters
    ----------
    trip_time_s : array_like
        Trip time from cold at the point. [s]
    current_a : array_like
        Current of the point. [A]
    pickup_a : array_like
        Current that the element finally trips at. [A]

    Returns
    -------
    ndarray
        Heating time constant. [s]

    Notes
    -----
    Needs a point above the pickup; at or below it, and for negative inputs, missing.

    Examples
    --------
    10 s at 7.2 times a setting that is also the pickup. By hand: 10 / ln(51.84 / 50.84) = 513.4 s.

    >>> thermal_time_constant_s(10, 720, 100).round(1).item()
    513.4

    References
    ----------
    IEC 60255-149, cold curve solved for the time constant.
    """
    time, current, pickup = together(trip_time_s, current_a, pickup_a)
    usable = present(time, current, pickup) & (time >= 0) & (pickup > 0) & (current > pickup)
    with np.errstate(divide="ignore", invalid="ignore"):
        return np.where(usable, time / -np.log1p(-((pickup / current) ** 2)), np.nan)
