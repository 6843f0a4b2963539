"""Fault current that a breaker must be rated for where X/R is above that of its type test."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, floats, zero_or_more
from audit.engineering.offset_current import offset_peak_half_cycle_ratio, offset_rms_ratio


def interrupting_duty_by_peak_ka(
    fault_ka: ArrayLike, fault_x_to_r_ratio: ArrayLike, test_x_to_r_ratio: ArrayLike
) -> Floats:
    """Symmetrical rating that a fast low-voltage breaker needs, judged by the first peak.

    I * max(1, (1 + exp(-pi / (X/R))) / (1 + exp(-pi / (X/R of the test))))

    Parameters
    ----------
    fault_ka : array_like
        Greatest fault current at the breaker, rms symmetrical. [kA]
    fault_x_to_r_ratio : array_like
        Reactance over resistance at the fault point. [1]
    test_x_to_r_ratio : array_like
        Reactance over resistance at which the breaker was tested. [1]

    Returns
    -------
    ndarray
        Current that the rating must reach, never below the fault current; missing where an input is
        missing or negative. [kA]

    Notes
    -----
    For breakers without intended delay. The test X/R follows from the test power factor: 6.6 for
    low-voltage power breakers (15 per cent), 4.9 for large moulded-case breakers (20 per cent).

    Examples
    --------
    50 kA at X/R 20, breaker tested at 6.59. By hand: 1.85464 / 1.62081 = 1.14427; 57.2 kA.

    >>> interrupting_duty_by_peak_ka(50, 20, 6.59).round(1).item()
    57.2

    References
    ----------
    IEEE C37.13 and IEEE 551, multiplying factor by the half-cycle peak (from memory).
    """
    in_fault = offset_peak_half_cycle_ratio(fault_x_to_r_ratio)
    in_test = offset_peak_half_cycle_ratio(test_x_to_r_ratio)
    return floats(zero_or_more(fault_ka) * np.maximum(in_fault / in_test, 1.0))


def interrupting_duty_by_rms_ka(
    fault_ka: ArrayLike,
    fault_x_to_r_ratio: ArrayLike,
    test_x_to_r_ratio: ArrayLike,
    parting_cycles: ArrayLike,
) -> Floats:
    """Symmetrical rating that a breaker needs, judged by the rms at the moment its contacts part.

    I * max(1, F(X/R, c) / F(X/R of the test, c)), F the rms factor of a fully offset current

    Parameters
    ----------
    fault_ka : array_like
        Greatest fault current at the breaker, rms symmetrical. [kA]
    fault_x_to_r_ratio : array_like
        Reactance over resistance at the fault point. [1]
    test_x_to_r_ratio : array_like
        Reactance over resistance that the rating covers. [1]
    parting_cycles : array_like
        Cycles from the start of the fault until the contacts part, relay time included. [1]

    Returns
    -------
    ndarray
        Current that the rating must reach, never below the fault current; missing where an input is
        missing or negative. [kA]

    Notes
    -----
    Far from generators, where the alternating part does not decay: elsewhere pessimistic. Medium-voltage
    breakers rated on a symmetrical basis cover X/R 17 at 60 Hz (time constant 45 ms).

    Examples
    --------
    25 kA at X/R 40, breaker for 17, contacts part after 3 cycles. By hand: exp(-0.94248) = 0.38966,
    sqrt(1.77933) = 1.33392; exp(-2.21760) = 0.10887, sqrt(1.21774) = 1.10351; ratio 1.20879; 30.2 kA.

    >>> interrupting_duty_by_rms_ka(25, 40, 17, 3).round(1).item()
    30.2

    References
    ----------
    R-L circuit theory in the manner of IEEE C37.010; 17 from memory.
    """
    in_fault = offset_rms_ratio(fault_x_to_r_ratio, parting_cycles)
    in_test = offset_rms_ratio(test_x_to_r_ratio, parting_cycles)
    return floats(zero_or_more(fault_ka) * np.maximum(in_fault / in_test, 1.0))
