"""Pt100 resistance sensors after IEC 60751."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, floats, look_up, within

RESISTANCE_AT_ZERO_OHM = 100.0
LINEAR = 3.9083e-3
SQUARE = -5.775e-7
BELOW_ZERO = -4.183e-12
COLDEST_C = -200.0
HOTTEST_C = 850.0
NEWTON_STEPS = 8
PRINTED_TO_OHM = 0.005
"""Half the last place of the printed table, so that its own ends are accepted."""
TOLERANCE_AT_ZERO_K = {"AA": 0.10, "A": 0.15, "B": 0.30, "C": 0.60}
TOLERANCE_SLOPE = {"AA": 0.0017, "A": 0.002, "B": 0.005, "C": 0.01}


def platinum_resistance_ohm(temperature_c: ArrayLike) -> Floats:
    """Resistance of a Pt100 sensor.

    R = 100 * (1 + A t + B t^2), below 0 C with C (t - 100) t^3 added to the bracket

    Parameters
    ----------
    temperature_c : array_like
        Temperature. [C]

    Returns
    -------
    ndarray
        Resistance; missing outside -200 to 850 C or where the input is missing. [ohm]

    Notes
    -----
    The sensor alone, without leads.

    Examples
    --------
    100 C. By hand: 100 * (1 + 0.39083 - 0.005775) = 138.5055 ohm.

    >>> platinum_resistance_ohm(100).round(4).item()
    138.5055

    References
    ----------
    IEC 60751.
    """
    return _resistance(within(temperature_c, COLDEST_C, HOTTEST_C))


def platinum_temperature_c(resistance_ohm: ArrayLike) -> Floats:
    """Temperature of a Pt100 sensor from its resistance.

    t = (-A + sqrt(A^2 - 4 B (1 - R / 100))) / (2 B), below 100 ohm by Newton's method

    Parameters
    ----------
    resistance_ohm : array_like
        Resistance of the sensor, leads taken off. [ohm]

    Returns
    -------
    ndarray
        Temperature; missing outside 18.52 to 390.48 ohm (as printed) or where the input is missing. [C]

    Notes
    -----
    A resistance outside the range of the sensor (a broken or shorted lead) has no temperature.

    Examples
    --------
    138.5055 ohm, by the table of the standard 100 C.

    >>> platinum_temperature_c(138.5055).round(3).item()
    100.0

    References
    ----------
    IEC 60751.
    """
    ends = _resistance(np.array([COLDEST_C, HOTTEST_C]))
    resistance = within(resistance_ohm, ends[0] - PRINTED_TO_OHM, ends[1] + PRINTED_TO_OHM)
    share = resistance / RESISTANCE_AT_ZERO_OHM
    temperature = (-LINEAR + np.sqrt(LINEAR**2 - 4 * SQUARE * (1 - share))) / (2 * SQUARE)
    for _ in range(NEWTON_STEPS):
        cold = temperature < 0
        slope = (
            LINEAR
            + 2 * SQUARE * temperature
            + np.where(cold, BELOW_ZERO * (4 * temperature**3 - 300 * temperature**2), 0.0)
        )
        step = (_resistance(temperature) - resistance) / (RESISTANCE_AT_ZERO_OHM * slope)
        temperature = temperature - step
    return floats(temperature)


def platinum_tolerance_k(temperature_c: ArrayLike, tolerance_class: ArrayLike) -> Floats:
    """Greatest deviation of a Pt100 sensor of a tolerance class.

    a + b * |t|; 0.10 + 0.0017 AA, 0.15 + 0.002 A, 0.30 + 0.005 B, 0.60 + 0.01 C

    Parameters
    ----------
    temperature_c : array_like
        Temperature. [C]
    tolerance_class : array_like
        'AA', 'A', 'B' or 'C'. [text]

    Returns
    -------
    ndarray
        Deviation either way; missing for another class, outside -200 to 850 C or where an input is
        missing. [K]

    Notes
    -----
    Each class holds over a narrower range, which depends on the make of the sensor: AA to 250 C and A to
    450 C at most.

    Examples
    --------
    Class B at 155 C. By hand: 0.30 + 0.775 = 1.075 K.

    >>> platinum_tolerance_k(155, "B").round(3).item()
    1.075

    References
    ----------
    IEC 60751, tolerance classes; AA and C from memory.
    """
    distance = np.abs(within(temperature_c, COLDEST_C, HOTTEST_C))
    at_zero = look_up(tolerance_class, TOLERANCE_AT_ZERO_K)
    return floats(at_zero + look_up(tolerance_class, TOLERANCE_SLOPE) * distance)


def _resistance(temperature_c: Floats) -> Floats:
    cold = np.where(temperature_c < 0, BELOW_ZERO * (temperature_c - 100) * temperature_c**3, 0.0)
    return floats(RESISTANCE_AT_ZERO_OHM * (1 + LINEAR * temperature_c + SQUARE * temperature_c**2 + cold))
