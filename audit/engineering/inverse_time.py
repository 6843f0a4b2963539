"""Inverse-time overcurrent curves: trip and reset at constant current."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, code_of, entry_at, present, together

_NAMES = (
    ("definite time",),
    ("iec a", "a", "normal inverse", "standard inverse"),
    ("iec b", "b", "very inverse"),
    ("iec c", "c", "extremely inverse"),
    ("iec d", "d", "ieee moderately inverse", "ieee mi", "moderately inverse"),
    ("iec e", "e", "ieee very inverse", "ieee vi"),
    ("iec f", "f", "ieee extremely inverse", "ieee ei"),
    ("long-time inverse", "long time inverse"),
)
INVERSE_CURVE_CODES = {name: code for code, names in enumerate(_NAMES) for name in names}
"""Whole number that stands for a curve in arrays; 0 is definite time."""

# t = TM * (k / (M^alpha - 1) + c); reset of the IEEE curves t = TM * t_r / (1 - M^2)
_K_S = (0.0, 0.14, 13.5, 80.0, 0.0515, 19.61, 28.2, 120.0)
_ALPHA = (1.0, 0.02, 1.0, 2.0, 0.02, 2.0, 2.0, 1.0)
_C_S = (1.0, 0.0, 0.0, 0.0, 0.114, 0.491, 0.1217, 0.0)
_RESET_S = (np.nan, np.nan, np.nan, np.nan, 4.85, 21.6, 29.1, np.nan)
_DEFINITE = 0
_HELD_ABOVE_MULTIPLE = 20.0


def inverse_curve_code(name: str) -> int:
    """Code of an inverse-time curve.

    Parameters
    ----------
    name : str
        'IEC A' to 'IEC F', 'normal inverse', 'very inverse' (IEC B), 'extremely inverse' (IEC C), the same
        with 'IEEE' before it (IEC D to F), 'long-time inverse', 'definite time'; capitals or not. [text]

    Returns
    -------
    int
        Its code in arrays. [code]

    Notes
    -----
    'Very' and 'extremely inverse' without 'IEEE' are the IEC curves B and C: the name alone does not tell the
    two families apart, so a site should write which it means. Any other name is refused with a ValueError.

    Examples
    --------
    The IEEE very inverse curve is curve E of IEC 60255-151.

    >>> inverse_curve_code("IEEE very inverse") == inverse_curve_code("IEC E")
    True

    References
    ----------
    IEC 60255-151 Annex A and IEEE C37.112, names of the curves; the codes are this project's own.
    """
    return code_of(name, INVERSE_CURVE_CODES, "an inverse-time curve")


def inverse_time_s(
    current_a: ArrayLike,
    pickup_a: ArrayLike,
    time_multiplier: ArrayLike,
    curve_code: ArrayLike,
    held_above_multiple: ArrayLike = _HELD_ABOVE_MULTIPLE,
) -> Floats:
    """Trip time of an inverse-time overcurrent element at constant current.

    t = TM * (k / (M^alpha - 1) + c), M = I / Ip

    Parameters
    ----------
    current_a : array_like
        Current, held constant. [A]
    pickup_a : array_like
        Pickup of the element. [A]
    time_multiplier : array_like
        Time multiplier (IEC) or time dial (IEEE); for definite time the delay in seconds. [1]
    curve_code : array_like
        Code of the curve. [code]
    held_above_multiple : array_like
        Multiple of pickup above which the time stays what it is there; infinite for none. [1]

    Returns
    -------
    ndarray
        Trip time; infinite at or below the pickup. [s]

    Notes
    -----
    The IEC curves are declared from about 1.2 to 20 times the pickup: nearer to the pickup the time is not
    assured, above 20 times it is held unless the maker declares otherwise. Missing where an input is
    missing or negative, the pickup is zero or the code unknown.

    Examples
    --------
    IEC A at five times the pickup, multiplier 1. By hand: 0.14 / (5^0.02 - 1) = 0.14 / 0.032713 = 4.28 s.

    >>> inverse_time_s(500, 100, 1, inverse_curve_code("IEC A")).round(2).item()
    4.28

    References
    ----------
    IEC 60255-151:2009 Annex A (A to C; D to F from memory equal to the next); IEEE C37.112, Table 1;
    long-time inverse after BS 142; holding above 20 times from memory of IEC 60255-151.
    """
    current, pickup, multiplier, code, held = together(
        current_a, pickup_a, time_multiplier, curve_code, held_above_multiple
    )
    alpha = entry_at(_ALPHA, code)
    usable = present(current, pickup, multiplier, alpha, held) & (current >= 0) & (pickup > 0) & (multiplier >= 0)
    with np.errstate(divide="ignore", invalid="ignore", over="ignore"):
        multiple = np.minimum(current / pickup, held)
        # expm1 keeps precision near the pickup, where M^alpha comes close to one
        divisor = np.expm1(alpha * np.log(multiple))
        time = multiplier * (entry_at(_K_S, code) / divisor + entry_at(_C_S, code))
        time = np.where(current > pickup, time, np.inf)
    return np.where(usable, time, np.nan)


def definite_time_s(current_a: ArrayLike, pickup_a: ArrayLike, delay_s: ArrayLike) -> Floats:
    """Trip time of a definite-time overcurrent element at constant current.

    t = delay where I > Ip

    Parameters
    ----------
    current_a : array_like
        Current, held constant. [A]
    pickup_a : array_like
        Pickup of the element. [A]
    delay_s : array_like
        Set delay. [s]

    Returns
    -------
    ndarray
        Trip time; infinite at or below the pickup. [s]

    Notes
    -----
    Without the element's own operating time and without the opening time of the switching device. Missing
    where an input is missing or negative, or the pickup is zero.

    Examples
    --------
    Pickup 200 A, 3 s.

    >>> definite_time_s([150, 250], 200, 3).tolist()
    [inf, 3.0]

    References
    ----------
    IEC 60255-151, dependent and independent time characteristics.
    """
    return inverse_time_s(current_a, pickup_a, delay_s, _DEFINITE)


def inverse_reset_time_s(
    current_a: ArrayLike, pickup_a: ArrayLike, time_multiplier: ArrayLike, curve_code: ArrayLike
) -> Floats:
    """Time that an IEEE inverse-time element needs to run back from the trip to rest.

    t = TM * t_r / (1 - M^2), M = I / Ip

    Parameters
    ----------
    current_a : array_like
        Current, held constant below the pickup. [A]
    pickup_a : array_like
        Pickup of the element. [A]
    time_multiplier : array_like
        Time dial. [1]
    curve_code : array_like
        Code of the curve. [code]

    Returns
    -------
    ndarray
        Reset time; infinite at the pickup and above. [s]

    Notes
    -----
    Only the three IEEE curves (IEC D to F) have such a reset; for the others makers declare their own:
    missing. Missing also where an input is missing or negative, or the pickup is zero.

    Examples
    --------
    Very inverse, dial 1, no current and half the pickup. By hand: 21.6 s; 21.6 / 0.75 = 28.8 s.

    >>> inverse_reset_time_s([0, 50], 100, 1, inverse_curve_code("IEEE VI")).round(1).tolist()
    [21.6, 28.8]

    References
    ----------
    IEEE C37.112, reset equation; its three constants from memory.
    """
    current, pickup, multiplier, code = together(current_a, pickup_a, time_multiplier, curve_code)
    full = multiplier * entry_at(_RESET_S, code)
    usable = present(current, pickup, full) & (current >= 0) & (pickup > 0) & (multiplier >= 0)
    with np.errstate(divide="ignore", invalid="ignore"):
        time = np.where(current < pickup, full / (1.0 - (current / pickup) ** 2), np.inf)
    return np.where(usable, time, np.nan)
