"""Charging current that the capacitance to earth of a feeder or system gives to an earth fault."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, above_zero, floats, zero_or_more
from audit.engineering.unit_factors import SQRT3


def charging_current_a(voltage_v: ArrayLike, frequency_hz: ArrayLike, capacitance_uf: ArrayLike) -> Floats:
    """Charging current 3Ic0 that a feeder or system gives to an earth fault elsewhere.

    3 Ic0 = sqrt(3) * 2 * pi * f * C0 * V

    Parameters
    ----------
    voltage_v : array_like
        Voltage of the system, line to line. [V]
    frequency_hz : array_like
        Power frequency. [Hz]
    capacitance_uf : array_like
        Capacitance to earth of one phase: cable, motor and surge capacitors together. [uF]

    Returns
    -------
    ndarray
        Three times the zero-sequence current; missing where an input is missing or negative. [A]

    Notes
    -----
    A fault without resistance on a system whose neutral rises to full phase voltage (isolated or
    resistance-earthed); less on a solidly earthed one.

    Examples
    --------
    6600 V, 50 Hz, 0.3 uF. By hand: 1.73205 * 314.159 * 0.3e-6 * 6600 = 1.077 A.

    >>> charging_current_a(6600, 50, 0.3).round(3).item()
    1.077

    References
    ----------
    Circuit theory; IEEE 142.
    """
    capacitance_f = zero_or_more(capacitance_uf) * 1e-6
    return floats(SQRT3 * 2 * np.pi * above_zero(frequency_hz) * capacitance_f * above_zero(voltage_v))


def cable_capacitance_uf(length_m: ArrayLike, capacitance_uf_per_km: ArrayLike, runs: ArrayLike) -> Floats:
    """Capacitance to earth of one phase of a screened cable.

    C0 = c * l / 1000 * n

    Parameters
    ----------
    length_m : array_like
        Length of the cable. [m]
    capacitance_uf_per_km : array_like
        Capacitance of one core to its screen. [uF/km]
    runs : array_like
        Cables in parallel. [1]

    Returns
    -------
    ndarray
        Capacitance; missing where an input is missing or negative. [uF]

    Notes
    -----
    Screened cores, as usual at medium voltage: 0.2 to 0.6 uF/km by section and voltage.

    Examples
    --------
    500 m, 0.3 uF/km, two runs. By hand: 0.3 * 0.5 * 2 = 0.3 uF.

    >>> cable_capacitance_uf(500, 0.3, 2).round(6).item()
    0.3

    References
    ----------
    Capacitances in parallel add up; range of figures common practice.
    """
    return floats(zero_or_more(capacitance_uf_per_km) * zero_or_more(length_m) / 1000 * zero_or_more(runs))


def surge_capacitance_uf(voltage_v: ArrayLike) -> Floats:
    """Usual surge capacitor per phase at the terminals of a motor that has one.

    0.5 uF from 2.4 kV to 6.9 kV, 0.25 uF from 11.5 kV to 13.8 kV

    Parameters
    ----------
    voltage_v : array_like
        Rated voltage, line to line. [V]

    Returns
    -------
    ndarray
        Capacitance; missing between and outside the two ranges, or where the input is missing. [uF]

    Notes
    -----
    Not every motor has surge capacitors, and the plate of those that are fitted decides.

    Examples
    --------
    4160 V, from the table: 0.5 uF.

    >>> surge_capacitance_uf([4160, 13800, 480]).tolist()
    [0.5, 0.25, nan]

    References
    ----------
    IEEE C62.21 (from memory).
    """
    voltage = floats(voltage_v)
    lower = (voltage >= 2400) & (voltage <= 6900)
    upper = (voltage >= 11500) & (voltage <= 13800)
    return np.where(lower, 0.5, np.where(upper, 0.25, np.nan))
