"""Safe stall time carried to other currents and voltages."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, present, together


def stall_time_at_current_s(stall_time_s: ArrayLike, rated_current_a: ArrayLike, current_a: ArrayLike) -> Floats:
    """Safe stall time at another current than the one it is stated for.

    t2 = t1 * (I1 / I2)^2

    Parameters
    ----------
    stall_time_s : array_like
        Stated safe stall time, hot or cold. [s]
    rated_current_a : array_like
        Locked-rotor current that the time is stated for, usually that at rated voltage. [A]
    current_a : array_like
        Current while stalled. [A]

    Returns
    -------
    ndarray
        Safe stall time at that current; infinite at no current. [s]

    Notes
    -----
    Adiabatic: all heat stays in the winding and cage, which holds for locked-rotor currents (from about three
    times full load upward). Below that it understates the time. Missing where an input is missing or
    negative, or the rated current is zero.

    Examples
    --------
    10 s at 600 A, stalled at 480 A. By hand: 10 * 1.25^2 = 15.6 s.

    >>> stall_time_at_current_s(10, 600, 480).round(1).item()
    15.6

    References
    ----------
    IEEE 620, locked-rotor part of the limit curve taken as I^2 t.
    """
    time, rated, current = together(stall_time_s, rated_current_a, current_a)
    usable = present(time, rated, current) & (time >= 0) & (rated > 0) & (current >= 0)
    with np.errstate(divide="ignore", invalid="ignore"):
        return np.where(usable, np.where(current > 0, time * (rated / current) ** 2, np.inf), np.nan)


def stall_time_at_voltage_s(stall_time_s: ArrayLike, voltage_pu: ArrayLike) -> Floats:
    """Safe stall time at a reduced terminal voltage.

    t = t_rated / V^2

    Parameters
    ----------
    stall_time_s : array_like
        Safe stall time at rated voltage, hot or cold. [s]
    voltage_pu : array_like
        Terminal voltage while stalled, in parts of the rated. [1]

    Returns
    -------
    ndarray
        Safe stall time at that voltage; infinite at no voltage. [s]

    Notes
    -----
    Locked-rotor current taken as proportional to the voltage; iron saturation makes it fall faster, so the
    time is on the safe side below rated voltage and slightly too long above it. Missing where an input is
    missing or negative.

    Examples
    --------
    10 s at rated voltage, 80 %. By hand: 10 / 0.64 = 15.6 s.

    >>> stall_time_at_voltage_s(10, 0.8).round(1).item()
    15.6

    References
    ----------
    IEEE 620, locked-rotor part of the limit curve taken as I^2 t.
    """
    time, voltage = together(stall_time_s, voltage_pu)
    return stall_time_at_current_s(time, 1.0, voltage)
