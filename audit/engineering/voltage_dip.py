"""Voltage dip while a motor starts, the supply seen as one impedance: by apparent power alone."""

from __future__ import annotations

from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, above_zero, floats, zero_or_more
from audit.engineering.unit_factors import SQRT3


def fault_level_mva(fault_ka: ArrayLike, voltage_v: ArrayLike) -> Floats:
    """Short-circuit apparent power of a bus.

    S = sqrt(3) * V * I

    Parameters
    ----------
    fault_ka : array_like
        Three-phase fault current, rms symmetrical. [kA]
    voltage_v : array_like
        Voltage of the bus, line to line. [V]

    Returns
    -------
    ndarray
        Apparent power; missing where an input is missing or not positive. [MVA]

    Notes
    -----
    Fault current and voltage of the same case.

    Examples
    --------
    25 kA at 6.6 kV. By hand: 1.73205 * 6.6 * 25 = 285.8 MVA.

    >>> fault_level_mva(25, 6600).round(1).item()
    285.8

    References
    ----------
    Power equation.
    """
    return floats(SQRT3 * above_zero(fault_ka) * above_zero(voltage_v) / 1000)


def transformer_fault_level_mva(rated_power_mva: ArrayLike, impedance_pct: ArrayLike) -> Floats:
    """Short-circuit apparent power behind a transformer on a supply without impedance.

    S = 100 * Sr / uk

    Parameters
    ----------
    rated_power_mva : array_like
        Rated power of the transformer. [MVA]
    impedance_pct : array_like
        Short-circuit impedance on that power. [%]

    Returns
    -------
    ndarray
        Apparent power; missing where an input is missing or not positive. [MVA]

    Notes
    -----
    An upper figure: the supply in front of the transformer has impedance too.

    Examples
    --------
    5 MVA, 5.75 per cent. By hand: 500 / 5.75 = 86.96 MVA.

    >>> transformer_fault_level_mva(5, 5.75).round(2).item()
    86.96

    References
    ----------
    Definition of short-circuit impedance.
    """
    return floats(100 * above_zero(rated_power_mva) / above_zero(impedance_pct))


def starting_power_mva(locked_rotor_a: ArrayLike, rated_voltage_v: ArrayLike) -> Floats:
    """Apparent power that a motor takes from a supply of rated voltage while its rotor stands.

    S = sqrt(3) * V * I

    Parameters
    ----------
    locked_rotor_a : array_like
        Locked-rotor current at rated voltage. [A]
    rated_voltage_v : array_like
        Rated voltage, line to line. [V]

    Returns
    -------
    ndarray
        Apparent power; missing where an input is missing, negative, or the voltage zero. [MVA]

    Notes
    -----
    Direct on line. On a bus of another voltage the power scales with the voltage squared.

    Examples
    --------
    600 A at 6.6 kV. By hand: 1.73205 * 6600 * 600 = 6.859 MVA.

    >>> starting_power_mva(600, 6600).round(3).item()
    6.859

    References
    ----------
    Power equation.
    """
    return floats(SQRT3 * zero_or_more(locked_rotor_a) * above_zero(rated_voltage_v) / 1e6)


def dip_constant_impedance_pct(starting_power_mva: ArrayLike, fault_level_mva: ArrayLike) -> Floats:
    """Dip of the bus voltage, the motor an impedance at the angle of the supply.

    dV = 100 * Sst / (Ssc + Sst)

    Parameters
    ----------
    starting_power_mva : array_like
        Apparent power of the start at full voltage. [MVA]
    fault_level_mva : array_like
        Short-circuit apparent power of the bus. [MVA]

    Returns
    -------
    ndarray
        Dip in per cent of the voltage before the start; missing where an input is missing, negative, or
        the fault level zero. [%]

    Notes
    -----
    Right for a standing rotor on a supply whose X/R is near the motor's; otherwise a little pessimistic.
    Other load is left out.

    Examples
    --------
    10 MVA on 100 MVA. By hand: 1000 / 110 = 9.09 per cent.

    >>> dip_constant_impedance_pct(10, 100).round(2).item()
    9.09

    References
    ----------
    Voltage divider; IEEE 399.
    """
    start = zero_or_more(starting_power_mva)
    return floats(100 * start / (above_zero(fault_level_mva) + start))


def dip_constant_current_pct(starting_power_mva: ArrayLike, fault_level_mva: ArrayLike) -> Floats:
    """Dip of the bus voltage, the motor's current taken as if the voltage stayed full.

    dV = 100 * Sst / Ssc

    Parameters
    ----------
    starting_power_mva : array_like
        Apparent power of the start at full voltage. [MVA]
    fault_level_mva : array_like
        Short-circuit apparent power of the bus. [MVA]

    Returns
    -------
    ndarray
        Dip in per cent of the voltage before the start; missing where an input is missing, negative, or
        the fault level zero. [%]

    Notes
    -----
    Pessimistic, since the current falls with the voltage; of use for a first look, up to about 10 per cent.

    Examples
    --------
    10 MVA on 100 MVA. By hand: 10 per cent.

    >>> dip_constant_current_pct(10, 100).item()
    10.0

    References
    ----------
    Ohm's law; common practice.
    """
    return floats(100 * zero_or_more(starting_power_mva) / above_zero(fault_level_mva))
