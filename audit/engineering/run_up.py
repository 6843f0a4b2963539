"""Run-up time of motor and driven machine from torques over the speed, and from an average torque."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, above_zero, floats, present, together, zero_or_more
from audit.engineering.unit_factors import RADIANS_PER_SECOND_PER_RPM

# nearer to one than this, log1p(r) / r is its own first-order series in double precision
_LEVEL_SEGMENT = 1e-8


def run_up_time_s(
    inertia_kgm2: ArrayLike, speed_rpm: ArrayLike, motor_torque_nm: ArrayLike, load_torque_nm: ArrayLike
) -> Floats:
    """Run-up time from motor and load torque given as points over the speed.

    t = J * integral of dw / (Tm - TL)

    Parameters
    ----------
    inertia_kgm2 : array_like
        Inertia of motor and driven machine, referred to the motor shaft; one per motor. [kg m2]
    speed_rpm : array_like
        Speeds of the points, rising along the last axis; the first is where the start begins, the last where
        it counts as done; shorter curves filled up with missing. [r/min]
    motor_torque_nm : array_like
        Motor torque at the points, at the voltage of the start. [N m]
    load_torque_nm : array_like
        Torque of the driven machine at the points. [N m]

    Returns
    -------
    ndarray
        Run-up time; infinite where the load's torque meets the motor's on the way, so that it stalls. [s]

    Notes
    -----
    Exact for torques that are straight between the points; a dip between two points is not seen. The last
    point must lie below the speed where the torques meet. Missing where a point has a gap, the speed does not
    rise, fewer than two points are given or the inertia is not above zero.

    Examples
    --------
    50 kg m2, 1500 N m net from 0 to 1500 r/min. By hand: 50 * 157.08 / 1500 = 5.24 s. With a load that takes
    all of it at the end: never.

    >>> run_up_time_s(50, [0, 1500], [2000, 2000], [500, 500]).round(2).item()
    5.24
    >>> run_up_time_s(50, [0, 1500], [2000, 2000], [500, 2000]).item()
    inf

    References
    ----------
    Equation of motion of a rigid shaft.
    """
    speed, motor, load = together(speed_rpm, motor_torque_nm, load_torque_nm)
    inertia = above_zero(inertia_kgm2)
    given = present(speed, motor, load)
    count = given.sum(axis=-1)
    padding = np.arange(speed.shape[-1]) >= count[..., None]
    blank = np.isnan(speed) & np.isnan(motor) & np.isnan(load)
    sound = (count >= 2) & np.where(padding, blank | np.isnan(speed), given).all(axis=-1)
    with np.errstate(invalid="ignore", divide="ignore"):
        step = np.diff(speed, axis=-1) * RADIANS_PER_SECOND_PER_RPM
        sound &= ~(step <= 0).any(axis=-1)
        net = motor - load
        rise = net[..., 1:] / net[..., :-1] - 1.0
        level = np.abs(rise) < _LEVEL_SEGMENT
        mean = np.where(level, 1.0 - rise / 2, np.log1p(rise) / np.where(level, 1.0, rise))
        time = np.where(given[..., 1:], step / net[..., :-1] * mean, 0.0).sum(axis=-1)
        stalls = (given & (net <= 0)).any(axis=-1)
        total = inertia * np.where(stalls, np.inf, time)
    return np.where(sound, total, np.nan)


def average_accelerating_torque_nm(
    locked_rotor_torque_nm: ArrayLike,
    breakdown_torque_nm: ArrayLike,
    load_torque_nm: ArrayLike,
    load_exponent: ArrayLike = 2.0,
    voltage_pu: ArrayLike = 1.0,
) -> Floats:
    """Average torque left for acceleration, for data sheets without a torque curve.

    T = 0.45 * V^2 * (TLR + TBD) - TL / (1 + k)

    Parameters
    ----------
    locked_rotor_torque_nm : array_like
        Locked-rotor torque at rated voltage. [N m]
    breakdown_torque_nm : array_like
        Breakdown torque at rated voltage. [N m]
    load_torque_nm : array_like
        Torque of the driven machine at full speed. [N m]
    load_exponent : array_like
        0 constant torque, 1 rising in proportion, 2 with the square of the speed. [1]
    voltage_pu : array_like
        Terminal voltage during the start, in parts of the rated. [1]

    Returns
    -------
    ndarray
        Average accelerating torque; negative where the load outweighs the motor. [N m]

    Notes
    -----
    A rule of thumb, good to some 20 %; it cannot see a stall at one speed. Missing where an input is missing
    or negative.

    Examples
    --------
    1000 and 2500 N m, pump of 900 N m. By hand: 0.45 * 3500 - 300 = 1275 N m.

    >>> average_accelerating_torque_nm(1000, 2500, 900).round(6).item()
    1275.0

    References
    ----------
    Common practice, from memory.
    """
    motor = 0.45 * (zero_or_more(locked_rotor_torque_nm) + zero_or_more(breakdown_torque_nm))
    load = zero_or_more(load_torque_nm) / (1.0 + zero_or_more(load_exponent))
    return floats(motor * zero_or_more(voltage_pu) ** 2 - load)


def run_up_time_constant_torque_s(
    inertia_kgm2: ArrayLike, speed_rpm: ArrayLike, accelerating_torque_nm: ArrayLike
) -> Floats:
    """Run-up time from standstill with a constant accelerating torque.

    t = J * w / T

    Parameters
    ----------
    inertia_kgm2 : array_like
        Inertia of motor and driven machine, referred to the motor shaft. [kg m2]
    speed_rpm : array_like
        Speed at which the start counts as done. [r/min]
    accelerating_torque_nm : array_like
        Motor torque less load torque, average over the speed. [N m]

    Returns
    -------
    ndarray
        Run-up time; infinite where no torque is left. [s]

    Notes
    -----
    The US form WK^2 * dN / (308 * T) is the same with rounded units. Missing where an input is missing,
    inertia not above zero or speed negative.

    Examples
    --------
    By hand: 50 * 157.08 / 1500 = 5.24 s.

    >>> run_up_time_constant_torque_s(50, 1500, 1500).round(2).item()
    5.24

    References
    ----------
    Equation of motion of a rigid shaft.
    """
    inertia, speed, torque = together(above_zero(inertia_kgm2), zero_or_more(speed_rpm), accelerating_torque_nm)
    usable = present(inertia, speed, torque)
    with np.errstate(divide="ignore", invalid="ignore"):
        time = np.where(torque > 0, inertia * speed * RADIANS_PER_SECOND_PER_RPM / torque, np.inf)
    return np.where(usable, time, np.nan)
