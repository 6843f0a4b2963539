"""Voltage at bus and motor terminals while a motor starts, with the angles of supply, cable and motor."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, above_zero, floats, within, zero_or_more, zero_to_infinity
from audit.engineering.terminal_fault import source_impedance_ohm
from audit.engineering.unit_factors import SQRT3


def voltage_at_start_current_v(
    supply_voltage_v: ArrayLike,
    fault_ka: ArrayLike,
    x_to_r_ratio: ArrayLike,
    start_current_a: ArrayLike,
    start_power_factor: ArrayLike,
    cable_resistance_ohm: ArrayLike = 0.0,
    cable_reactance_ohm: ArrayLike = 0.0,
) -> Floats:
    """Voltage behind supply and cable while a given current flows.

    V = |E - sqrt(3) * I * (Zs + Zc)|, I lagging E by the angle of its power factor

    Parameters
    ----------
    supply_voltage_v : array_like
        Voltage before the start, line to line. [V]
    fault_ka : array_like
        Three-phase fault current of the bus at this voltage. [kA]
    x_to_r_ratio : array_like
        Reactance over resistance of the supply. [1]
    start_current_a : array_like
        Starting current as it flows, for example recorded. [A]
    start_power_factor : array_like
        Power factor of that current, 0 to 1. [1]
    cable_resistance_ohm : array_like
        Resistance of the cable per phase; zero for the bus. [ohm]
    cable_reactance_ohm : array_like
        Reactance of the cable per phase; zero for the bus. [ohm]

    Returns
    -------
    ndarray
        Voltage, line to line; missing where an input is missing or out of its range, or the current greater
        than the supply can drive. [V]

    Notes
    -----
    For a current known at the reduced voltage. With the locked-rotor current at rated voltage it is
    pessimistic; use `bus_voltage_while_starting_v` then. Other load is left out.

    Examples
    --------
    415 V, 25 kA at 80 deg (X/R 5.6713), 1043.4 A at power factor 0.12. By hand: 239.6 V per phase, drop
    10.0 V at -3.1 deg, 229.6 V, times 1.732 = 397.7 V.

    >>> voltage_at_start_current_v(415, 25, 5.6713, 1043.4, 0.12).round(1).item()
    397.7

    References
    ----------
    Circuit theory; IEEE 399.
    """
    supply = above_zero(supply_voltage_v)
    impedance = _supply(supply, fault_ka, x_to_r_ratio) + _impedance(cable_resistance_ohm, cable_reactance_ohm)
    current = zero_or_more(start_current_a) * np.exp(-1j * np.arccos(within(start_power_factor, 0.0, 1.0)))
    drop = SQRT3 * current * impedance
    return np.where(np.abs(drop) <= supply, np.abs(supply - drop), np.nan)


def bus_voltage_while_starting_v(
    supply_voltage_v: ArrayLike,
    fault_ka: ArrayLike,
    x_to_r_ratio: ArrayLike,
    locked_rotor_a: ArrayLike,
    rated_voltage_v: ArrayLike,
    start_power_factor: ArrayLike,
    cable_resistance_ohm: ArrayLike,
    cable_reactance_ohm: ArrayLike,
) -> Floats:
    """Voltage at the bus while a motor stands still on it.

    V = E * |Zc + Zm| / |Zs + Zc + Zm|, Zm = Vr / (sqrt(3) * ILR) at the angle of the power factor

    Parameters
    ----------
    supply_voltage_v : array_like
        Voltage before the start, line to line. [V]
    fault_ka : array_like
        Three-phase fault current of the bus at this voltage. [kA]
    x_to_r_ratio : array_like
        Reactance over resistance of the supply. [1]
    locked_rotor_a : array_like
        Locked-rotor current at rated voltage. [A]
    rated_voltage_v : array_like
        Rated voltage of the motor, line to line. [V]
    start_power_factor : array_like
        Power factor with the rotor locked, 0 to 1; usually 0.15 to 0.35. [1]
    cable_resistance_ohm : array_like
        Resistance of the motor's cable per phase. [ohm]
    cable_reactance_ohm : array_like
        Reactance of the motor's cable per phase. [ohm]

    Returns
    -------
    ndarray
        Voltage, line to line; missing where an input is missing or out of its range. [V]

    Notes
    -----
    The motor as a constant impedance: right with the rotor at rest, the lowest point of most starts.
    Saturation makes the current fall faster than the voltage. Other load is left out.

    Examples
    --------
    400 V, 20 kA, 1 kA locked-rotor current at 400 V, everything pure reactance, no cable. By hand: divider
    20 / 21 * 400 = 380.95 V.

    >>> bus_voltage_while_starting_v(400, 20, float("inf"), 1000, 400, 0, 0, 0).round(2).item()
    380.95

    References
    ----------
    Voltage divider; IEEE 399.
    """
    supply = _supply(above_zero(supply_voltage_v), fault_ka, x_to_r_ratio)
    cable = _impedance(cable_resistance_ohm, cable_reactance_ohm)
    motor = _motor(locked_rotor_a, rated_voltage_v, start_power_factor)
    return floats(above_zero(supply_voltage_v) * np.abs(cable + motor) / np.abs(supply + cable + motor))


def terminal_voltage_while_starting_v(
    supply_voltage_v: ArrayLike,
    fault_ka: ArrayLike,
    x_to_r_ratio: ArrayLike,
    locked_rotor_a: ArrayLike,
    rated_voltage_v: ArrayLike,
    start_power_factor: ArrayLike,
    cable_resistance_ohm: ArrayLike,
    cable_reactance_ohm: ArrayLike,
) -> Floats:
    """Voltage at the motor's terminals while its rotor stands.

    V = E * |Zm| / |Zs + Zc + Zm|

    Parameters
    ----------
    supply_voltage_v : array_like
        Voltage before the start, line to line. [V]
    fault_ka : array_like
        Three-phase fault current of the bus at this voltage. [kA]
    x_to_r_ratio : array_like
        Reactance over resistance of the supply. [1]
    locked_rotor_a : array_like
        Locked-rotor current at rated voltage. [A]
    rated_voltage_v : array_like
        Rated voltage of the motor, line to line. [V]
    start_power_factor : array_like
        Power factor with the rotor locked, 0 to 1; usually 0.15 to 0.35. [1]
    cable_resistance_ohm : array_like
        Resistance of the motor's cable per phase. [ohm]
    cable_reactance_ohm : array_like
        Reactance of the motor's cable per phase. [ohm]

    Returns
    -------
    ndarray
        Voltage, line to line; missing where an input is missing or out of its range. [V]

    Notes
    -----
    As `bus_voltage_while_starting_v`. Torque falls with the square of this voltage.

    Examples
    --------
    400 V, 20 kA, 1 kA locked-rotor current, pure reactance, cable as much as the supply (0.011547 ohm). By
    hand: motor 20 parts, supply and cable one each: 20 / 22 * 400 = 363.64 V.

    >>> terminal_voltage_while_starting_v(400, 20, float("inf"), 1000, 400, 0, 0, 0.011547).round(2).item()
    363.64

    References
    ----------
    Voltage divider; IEEE 399.
    """
    supply = _supply(above_zero(supply_voltage_v), fault_ka, x_to_r_ratio)
    cable = _impedance(cable_resistance_ohm, cable_reactance_ohm)
    motor = _motor(locked_rotor_a, rated_voltage_v, start_power_factor)
    return floats(above_zero(supply_voltage_v) * np.abs(motor) / np.abs(supply + cable + motor))


Phasors = np.ndarray[tuple[int, ...], np.dtype[np.complex128]]


def _supply(voltage_v: Floats, fault_ka: ArrayLike, x_to_r_ratio: ArrayLike) -> Phasors:
    angle = np.arctan(zero_to_infinity(x_to_r_ratio))
    return np.asarray(source_impedance_ohm(fault_ka, voltage_v) * np.exp(1j * angle))


def _impedance(resistance_ohm: ArrayLike, reactance_ohm: ArrayLike) -> Phasors:
    return np.asarray(zero_or_more(resistance_ohm) + 1j * zero_or_more(reactance_ohm))


def _motor(locked_rotor_a: ArrayLike, rated_voltage_v: ArrayLike, power_factor: ArrayLike) -> Phasors:
    magnitude = above_zero(rated_voltage_v) / (SQRT3 * above_zero(locked_rotor_a))
    return np.asarray(magnitude * np.exp(1j * np.arccos(within(power_factor, 0.0, 1.0))))
