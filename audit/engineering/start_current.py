"""Start current from what a data sheet gives, and at other voltages than rated."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, above_zero, entry_at, floats, within, zero_or_more

# IEC 60034-12 Table 2: upper end of the power range and S1/PN, designs N and H
_POWER_ENDS_KW = (6.3, 25.0, 63.0, 630.0)
_LARGEST_RATIO = (13.0, 12.0, 11.0, 10.0)
_SMALLEST_KW = 0.4


def locked_rotor_from_multiple_a(locked_rotor_multiple: ArrayLike, full_load_a: ArrayLike) -> Floats:
    """Locked-rotor current from its ratio to full-load current.

    I = m * IFL

    Parameters
    ----------
    locked_rotor_multiple : array_like
        Locked-rotor current in multiples of full-load current. [1]
    full_load_a : array_like
        Full-load current. [A]

    Returns
    -------
    ndarray
        Locked-rotor current at rated voltage. [A]

    Notes
    -----
    Declared ratios carry a tolerance of 20 % upward. Missing where an input is missing or not above zero.

    Examples
    --------
    By hand: 6.5 * 100 = 650 A.

    >>> locked_rotor_from_multiple_a(6.5, 100).item()
    650.0

    References
    ----------
    Definition of the ratio; tolerance from memory of IEC 60034-1.
    """
    return floats(above_zero(locked_rotor_multiple) * above_zero(full_load_a))


def locked_rotor_from_power_ratio_multiple(
    apparent_power_ratio: ArrayLike, efficiency: ArrayLike, power_factor: ArrayLike
) -> Floats:
    """Locked-rotor current in multiples of rated current from locked-rotor apparent power.

    I1 / IN = (S1 / PN) * eta * cos(phi)

    Parameters
    ----------
    apparent_power_ratio : array_like
        Locked-rotor apparent power over rated power, kVA per kW. [1]
    efficiency : array_like
        Efficiency at rated load, 0 to 1. [1]
    power_factor : array_like
        Power factor at rated load, 0 to 1. [1]

    Returns
    -------
    ndarray
        Locked-rotor current in multiples of rated current. [1]

    Notes
    -----
    Follows from PN = sqrt(3) V IN eta cos(phi). Missing where an input is missing or not above zero, or
    efficiency or power factor is above 1.

    Examples
    --------
    By hand: 11 * 0.93 * 0.86 = 8.80.

    >>> locked_rotor_from_power_ratio_multiple(11, 0.93, 0.86).round(2).item()
    8.8

    References
    ----------
    IEC 60034-12, definition of locked-rotor apparent power.
    """
    rated = above_zero(within(efficiency, 0, 1)) * above_zero(within(power_factor, 0, 1))
    return floats(above_zero(apparent_power_ratio) * rated)


def largest_apparent_power_ratio(power_kw: ArrayLike) -> Floats:
    """Greatest locked-rotor apparent power over rated power that design N and H motors may have.

    Parameters
    ----------
    power_kw : array_like
        Rated power. [kW]

    Returns
    -------
    ndarray
        Greatest ratio, kVA per kW. [1]

    Notes
    -----
    0.4 to 630 kW; missing outside. Not for the high-efficiency designs NE and HE, which may draw more. Later
    editions may draw the last two ranges differently (to 100 and 1600 kW).

    Examples
    --------
    From the table: 13 at 5.5 kW, 10 at 110 kW.

    >>> largest_apparent_power_ratio([5.5, 110]).tolist()
    [13.0, 10.0]

    References
    ----------
    IEC 60034-12:2002, Table 2, from memory.
    """
    power = floats(power_kw)
    place = np.searchsorted(_POWER_ENDS_KW, power, side="left")
    return np.where(power >= _SMALLEST_KW, entry_at(_LARGEST_RATIO, place), np.nan)


def start_current_at_voltage_a(locked_rotor_a: ArrayLike, voltage_pu: ArrayLike) -> Floats:
    """Start current at another terminal voltage than rated.

    I = ILR * V

    Parameters
    ----------
    locked_rotor_a : array_like
        Locked-rotor current at rated voltage. [A]
    voltage_pu : array_like
        Terminal voltage during the start, in parts of the rated. [1]

    Returns
    -------
    ndarray
        Start current at that voltage. [A]

    Notes
    -----
    Constant impedance. Saturated slots make the current fall faster than the voltage, so below rated voltage
    the figure is rather high. Missing where an input is missing or negative.

    Examples
    --------
    By hand: 600 * 0.85 = 510 A.

    >>> start_current_at_voltage_a(600, 0.85).item()
    510.0

    References
    ----------
    Locked motor as a constant impedance, common practice.
    """
    return floats(zero_or_more(locked_rotor_a) * zero_or_more(voltage_pu))


def start_current_at_rated_a(recorded_start_current_a: ArrayLike, voltage_pu: ArrayLike) -> Floats:
    """Start current at rated voltage from one recorded at another voltage.

    ILR = I / V

    Parameters
    ----------
    recorded_start_current_a : array_like
        Start current as recorded. [A]
    voltage_pu : array_like
        Terminal voltage during that start, in parts of the rated. [1]

    Returns
    -------
    ndarray
        Start current at rated voltage. [A]

    Notes
    -----
    Constant impedance; with saturation the true current at rated voltage is a little higher still. Missing
    where an input is missing, the current negative or the voltage not above zero.

    Examples
    --------
    By hand: 510 / 0.85 = 600 A.

    >>> start_current_at_rated_a(510, 0.85).item()
    600.0

    References
    ----------
    Locked motor as a constant impedance, common practice.
    """
    return floats(zero_or_more(recorded_start_current_a) / above_zero(voltage_pu))
