"""Degrees Celsius and Fahrenheit: points on the scale and differences are not the same conversion."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, floats

ABSOLUTE_ZERO_C = -273.15


def celsius_c(temperature_f: ArrayLike) -> Floats:
    """Temperature in degrees Celsius.

    C = (F - 32) / 1.8

    Parameters
    ----------
    temperature_f : array_like
        Temperature in degrees Fahrenheit. [F]

    Returns
    -------
    ndarray
        Temperature; missing below absolute zero or where the input is missing. [C]

    Notes
    -----
    For a reading, not for a rise: see `rise_k`.

    Examples
    --------
    311 F. By hand: 279 / 1.8 = 155 C.

    >>> celsius_c(311).round(9).item()
    155.0

    References
    ----------
    Definition.
    """
    return _real((floats(temperature_f) - 32) / 1.8)


def fahrenheit_f(temperature_c: ArrayLike) -> Floats:
    """Temperature in degrees Fahrenheit.

    F = 1.8 * C + 32

    Parameters
    ----------
    temperature_c : array_like
        Temperature in degrees Celsius. [C]

    Returns
    -------
    ndarray
        Temperature; missing below absolute zero or where the input is missing. [F]

    Notes
    -----
    For a reading, not for a rise.

    Examples
    --------
    100 C. By hand: 212 F.

    >>> fahrenheit_f(100).item()
    212.0

    References
    ----------
    Definition.
    """
    return floats(1.8 * _real(floats(temperature_c)) + 32)


def rise_k(rise_f: ArrayLike) -> Floats:
    """Temperature rise in kelvin from degrees Fahrenheit.

    K = F / 1.8

    Parameters
    ----------
    rise_f : array_like
        Difference of two temperatures. [F]

    Returns
    -------
    ndarray
        Difference; missing where the input is missing. [K]

    Notes
    -----
    A difference has no zero to shift: 144 F of rise are 80 K, whereas 144 F on the thermometer are 62 C.

    Examples
    --------
    144 F. By hand: 144 / 1.8 = 80 K.

    >>> rise_k(144).item()
    80.0

    References
    ----------
    Definition.
    """
    return floats(floats(rise_f) / 1.8)


def _real(temperature_c: Floats) -> Floats:
    return np.where(temperature_c >= ABSOLUTE_ZERO_C, temperature_c, np.nan)
