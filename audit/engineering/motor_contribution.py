"""What a running induction motor feeds into a fault on its bus, after IEC 60909-0."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, above_zero, floats, zero_or_more

LOW_VOLTAGE_ENDS_V = 1000.0
LARGE_MOTOR_KW_PER_POLE_PAIR = 1000.0
X_TO_R_MEDIUM_VOLTAGE_LARGE = 1 / 0.10
X_TO_R_MEDIUM_VOLTAGE_SMALL = 1 / 0.15
X_TO_R_LOW_VOLTAGE_GROUP = 1 / 0.42


def motor_fault_contribution_ka(
    locked_rotor_a: ArrayLike,
    rated_voltage_v: ArrayLike,
    system_voltage_v: ArrayLike,
    voltage_factor_pu: ArrayLike,
) -> Floats:
    """Initial symmetrical current that a motor feeds into a three-phase fault at its terminals.

    I"kM = c * Un / (sqrt(3) * ZM), ZM = UrM / (sqrt(3) * ILR), hence c * ILR * Un / UrM

    Parameters
    ----------
    locked_rotor_a : array_like
        Locked-rotor current at rated voltage. [A]
    rated_voltage_v : array_like
        Rated voltage of the motor, line to line. [V]
    system_voltage_v : array_like
        Nominal voltage of the system, line to line. [V]
    voltage_factor_pu : array_like
        Voltage factor c of the standard: 1.10 at medium voltage, 1.05 or 1.10 at low voltage. [1]

    Returns
    -------
    ndarray
        Initial symmetrical contribution, rms; missing where an input is missing, a voltage not positive. [kA]

    Notes
    -----
    The first instant; the contribution dies away within a few cycles, so it counts for making and for
    fast interruption, not for a least fault. Not for a motor fed by a drive.

    Examples
    --------
    1 MW, 6 kV, power factor 0.86, efficiency 0.95, 5.5 times rated current, c = 1.1. By hand: rated
    current 117.78 A, locked rotor 647.8 A, times 1.1 = 712.6 A.

    >>> motor_fault_contribution_ka(647.78, 6000, 6000, 1.1).round(4).item()
    0.7126

    References
    ----------
    IEC 60909-0:2016, asynchronous motors.
    """
    overvoltage = above_zero(voltage_factor_pu) * above_zero(system_voltage_v) / above_zero(rated_voltage_v)
    return floats(overvoltage * zero_or_more(locked_rotor_a) / 1000)


def motor_x_to_r_ratio(rated_power_kw: ArrayLike, rated_voltage_v: ArrayLike, poles: ArrayLike) -> Floats:
    """Reactance over resistance of a motor that feeds a fault.

    R/X = 0.10 above 1 kV from 1 MW per pole pair, 0.15 above 1 kV below that, 0.42 for low-voltage groups

    Parameters
    ----------
    rated_power_kw : array_like
        Rated shaft power. [kW]
    rated_voltage_v : array_like
        Rated voltage, line to line. [V]
    poles : array_like
        Number of poles. [1]

    Returns
    -------
    ndarray
        X/R: 10, 6.67 or 2.38; missing where an input is missing or not positive. [1]

    Notes
    -----
    The low-voltage figure holds for groups of motors with their cables. Pole number and power do not
    matter up to 1 kV, but are still asked for: a motor without them is not described well enough.

    Examples
    --------
    1500 kW at 6.6 kV with 4 poles: 750 kW per pole pair, R/X 0.15. By hand: 1 / 0.15 = 6.67.

    >>> motor_x_to_r_ratio(1500, 6600, 4).round(2).item()
    6.67

    References
    ----------
    IEC 60909-0:2016, table of asynchronous motors.
    """
    power_per_pair = above_zero(rated_power_kw) / (above_zero(poles) / 2)
    voltage = above_zero(rated_voltage_v)
    large = power_per_pair >= LARGE_MOTOR_KW_PER_POLE_PAIR
    medium_voltage = np.where(large, X_TO_R_MEDIUM_VOLTAGE_LARGE, X_TO_R_MEDIUM_VOLTAGE_SMALL)
    figure = np.where(voltage <= LOW_VOLTAGE_ENDS_V, X_TO_R_LOW_VOLTAGE_GROUP, medium_voltage)
    return np.where(np.isnan(power_per_pair + voltage), np.nan, figure)
