"""Transfer of running motors to another supply: the jolt at reclosure."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, above_zero, floats, within, zero_or_more


def volts_per_hertz_pu(voltage_pu: ArrayLike, frequency_pu: ArrayLike) -> Floats:
    """Voltage over frequency, each over its rated value.

    v / f

    Parameters
    ----------
    voltage_pu : array_like
        Voltage over rated voltage. [1]
    frequency_pu : array_like
        Frequency over rated frequency. [1]

    Returns
    -------
    ndarray
        Volts per hertz; missing where an input is missing, negative, or the frequency zero. [1]

    Notes
    -----
    A measure of the flux.

    Examples
    --------
    0.6 of the voltage at 0.8 of the frequency. By hand: 0.75.

    >>> volts_per_hertz_pu(0.6, 0.8).round(9).item()
    0.75

    References
    ----------
    Definition, as in ANSI C50.41.
    """
    return floats(zero_or_more(voltage_pu) / above_zero(frequency_pu))


def transfer_resultant_pu(source_pu: ArrayLike, residual_pu: ArrayLike, angle_deg: ArrayLike) -> Floats:
    """Difference of supply and residual voltage at reclosure, in volts per hertz.

    Er = sqrt(Es^2 + Em^2 - 2 * Es * Em * cos(d))

    Parameters
    ----------
    source_pu : array_like
        Volts per hertz of the new supply over the motors' rated value. [1]
    residual_pu : array_like
        Volts per hertz that the motors still keep up. [1]
    angle_deg : array_like
        Angle between the two. [deg]

    Returns
    -------
    ndarray
        Resultant; missing where an input is missing or a voltage negative. [1]

    Notes
    -----
    To be set against 1.33. A fast transfer must close before the angle has grown.

    Examples
    --------
    1.0 against 0.7 at 90 deg. By hand: sqrt(1 + 0.49) = 1.2207.

    >>> transfer_resultant_pu(1.0, 0.7, 90).round(4).item()
    1.2207

    References
    ----------
    ANSI C50.41; NEMA MG 1, 20.34 (from memory).
    """
    source, residual = zero_or_more(source_pu), zero_or_more(residual_pu)
    angle = np.radians(np.where(np.isfinite(floats(angle_deg)), floats(angle_deg), np.nan))
    square = source**2 + residual**2 - 2 * source * residual * np.cos(angle)
    return floats(np.sqrt(np.maximum(square, 0.0)))


def greatest_transfer_angle_deg(source_pu: ArrayLike, residual_pu: ArrayLike, resultant_limit_pu: ArrayLike) -> Floats:
    """Angle up to which a reclosure stays within a resultant.

    d = arccos((Es^2 + Em^2 - L^2) / (2 * Es * Em))

    Parameters
    ----------
    source_pu : array_like
        Volts per hertz of the new supply over the motors' rated value. [1]
    residual_pu : array_like
        Volts per hertz that the motors still keep up. [1]
    resultant_limit_pu : array_like
        Greatest permitted resultant, usually 1.33. [1]

    Returns
    -------
    ndarray
        Angle, 180 where the limit holds at any angle, 0 where it holds at none; missing where an input is
        missing or a voltage not positive. [deg]

    Notes
    -----
    As `transfer_resultant_pu`, of which it is the inverse.

    Examples
    --------
    Equal voltages, limit 1.33. By hand: arccos((2 - 1.7689) / 2) = arccos(0.11555) = 83.36 deg.

    >>> greatest_transfer_angle_deg(1.0, 1.0, 1.33).round(2).item()
    83.36

    References
    ----------
    ANSI C50.41; NEMA MG 1, 20.34 (from memory).
    """
    source, residual = above_zero(source_pu), above_zero(residual_pu)
    cosine = (source**2 + residual**2 - zero_or_more(resultant_limit_pu) ** 2) / (2 * source * residual)
    return floats(np.degrees(np.arccos(np.clip(cosine, -1.0, 1.0))))


def residual_voltage_pu(dead_time_s: ArrayLike, open_circuit_time_constant_s: ArrayLike) -> Floats:
    """Residual voltage of motors some time after they lost their supply.

    v = exp(-t / T)

    Parameters
    ----------
    dead_time_s : array_like
        Time without supply. [s]
    open_circuit_time_constant_s : array_like
        Open-circuit time constant of the motors together. [s]

    Returns
    -------
    ndarray
        Voltage over the voltage before the loss; missing where an input is missing, negative, or the
        time constant zero. [1]

    Notes
    -----
    One time constant; loss of speed, capacitors and parallel motors of unlike size are left out.

    Examples
    --------
    1.5 time constants. By hand: exp(-1.5) = 0.223.

    >>> residual_voltage_pu(1.5, 1.0).round(3).item()
    0.223

    References
    ----------
    Decay of rotor flux; common practice.
    """
    return floats(np.exp(-zero_or_more(dead_time_s) / above_zero(open_circuit_time_constant_s)))


def least_dead_time_s(residual_voltage_pu: ArrayLike, open_circuit_time_constant_s: ArrayLike) -> Floats:
    """Time without supply after which the residual voltage has fallen to a given level.

    t = T * ln(1 / v)

    Parameters
    ----------
    residual_voltage_pu : array_like
        Permitted residual voltage over the voltage before the loss, above 0 up to 1. [1]
    open_circuit_time_constant_s : array_like
        Open-circuit time constant of the motors together. [s]

    Returns
    -------
    ndarray
        Time; missing where an input is missing or out of its range. [s]

    Notes
    -----
    The inverse of `residual_voltage_pu`.

    Examples
    --------
    A quarter, T = 1 s. By hand: ln 4 = 1.386 s.

    >>> least_dead_time_s(0.25, 1.0).round(3).item()
    1.386

    References
    ----------
    Decay of rotor flux; 25 per cent is common practice.
    """
    level = above_zero(within(residual_voltage_pu, 0.0, 1.0))
    return floats(above_zero(open_circuit_time_constant_s) * np.log(1 / level))
