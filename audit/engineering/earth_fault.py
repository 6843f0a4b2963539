"""Earth-fault current behind a neutral resistor, and the share of the winding that is covered."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, above_zero, floats, zero_or_more
from audit.engineering.unit_factors import SQRT3


def resistor_current_a(voltage_v: ArrayLike, resistor_ohm: ArrayLike) -> Floats:
    """Current through the neutral resistor in a bolted earth fault.

    I = V / (sqrt(3) * R)

    Parameters
    ----------
    voltage_v : array_like
        Voltage of the system, line to line. [V]
    resistor_ohm : array_like
        Resistance of the neutral resistor. [ohm]

    Returns
    -------
    ndarray
        Current; missing where an input is missing or not positive. [A]

    Notes
    -----
    The resistor is much greater than all other zero-sequence impedance. With several resistors the fewest
    in service give the least current.

    Examples
    --------
    4160 V, 6 ohm. By hand: 4160 / 10.3923 = 400.3 A.

    >>> resistor_current_a(4160, 6).round(1).item()
    400.3

    References
    ----------
    Ohm's law; IEEE 142.
    """
    return floats(above_zero(voltage_v) / (SQRT3 * above_zero(resistor_ohm)))


def resistor_ohm(voltage_v: ArrayLike, resistor_current_a: ArrayLike) -> Floats:
    """Resistance of a neutral resistor stated by its current.

    R = V / (sqrt(3) * I)

    Parameters
    ----------
    voltage_v : array_like
        Voltage of the system, line to line. [V]
    resistor_current_a : array_like
        Current of the resistor at that voltage. [A]

    Returns
    -------
    ndarray
        Resistance, cold; missing where an input is missing or not positive. [ohm]

    Notes
    -----
    A hot resistor has some ten per cent more resistance and lets that much less current through.

    Examples
    --------
    400 A at 4160 V. By hand: 4160 / 692.82 = 6.004 ohm.

    >>> resistor_ohm(4160, 400).round(3).item()
    6.004

    References
    ----------
    Ohm's law; IEEE 142.
    """
    return floats(above_zero(voltage_v) / (SQRT3 * above_zero(resistor_current_a)))


def earth_fault_current_a(resistor_current_a: ArrayLike, charging_current_a: ArrayLike) -> Floats:
    """Earth-fault current at the fault: resistive and capacitive part in quadrature.

    I = sqrt(IR^2 + (3 Ic0)^2)

    Parameters
    ----------
    resistor_current_a : array_like
        Current through the neutral resistor. [A]
    charging_current_a : array_like
        Charging current of the whole system. [A]

    Returns
    -------
    ndarray
        Current; missing where an input is missing or negative. [A]

    Notes
    -----
    Bolted fault. The resistor's current alone is the lower figure, for checks that must detect.

    Examples
    --------
    5 A and 12 A. By hand: sqrt(25 + 144) = 13 A.

    >>> earth_fault_current_a(5, 12).item()
    13.0

    References
    ----------
    Circuit theory; IEEE 142.
    """
    return floats(np.hypot(zero_or_more(resistor_current_a), zero_or_more(charging_current_a)))


def winding_unprotected_pct(pickup_a: ArrayLike, earth_fault_a: ArrayLike) -> Floats:
    """Share of a star winding, counted from its neutral, in which an earth fault is not seen.

    100 * Ipickup / IE, at most 100

    Parameters
    ----------
    pickup_a : array_like
        Earth-fault pickup in primary amperes. [A]
    earth_fault_a : array_like
        Least earth-fault current for a fault at the terminals. [A]

    Returns
    -------
    ndarray
        Share of the winding; missing where an input is missing, negative, or the current zero. [%]

    Notes
    -----
    The current of a fault inside the winding falls in proportion to its distance from the neutral. For a
    winding in delta every point has at least half the phase voltage, and more is seen.

    Examples
    --------
    10 A on 400 A. By hand: 2.5 per cent.

    >>> winding_unprotected_pct(10, 400).item()
    2.5

    References
    ----------
    Derived; common practice.
    """
    share = 100 * zero_or_more(pickup_a) / above_zero(earth_fault_a)
    return floats(np.minimum(share, 100.0))


def winding_covered_pct(pickup_a: ArrayLike, earth_fault_a: ArrayLike) -> Floats:
    """Share of a star winding, counted from its terminals, in which an earth fault is seen.

    100 * (1 - Ipickup / IE), at least 0

    Parameters
    ----------
    pickup_a : array_like
        Earth-fault pickup in primary amperes. [A]
    earth_fault_a : array_like
        Least earth-fault current for a fault at the terminals. [A]

    Returns
    -------
    ndarray
        Share of the winding; missing where an input is missing, negative, or the current zero. [%]

    Notes
    -----
    As `winding_unprotected_pct`.

    Examples
    --------
    80 A on 400 A. By hand: 80 per cent.

    >>> winding_covered_pct(80, 400).item()
    80.0

    References
    ----------
    Derived; common practice.
    """
    return floats(100 - winding_unprotected_pct(pickup_a, earth_fault_a))
