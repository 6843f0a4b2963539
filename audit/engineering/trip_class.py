"""Trip classes of overload relays: the band between least and greatest trip time."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, above_zero, code_of, entry_at, present, together

TRIP_CLASS_10A = 10.5
"""Number that stands for class 10A, which is not a number: its band begins below that of class 10."""

TRIP_STANDARD_CODES = {"iec": 0, "nema": 1}
"""Whole number that stands for the standard: IEC 60947-4-1 (7.2 times) or NEMA ICS 2 (6 times)."""

# IEC 60947-4-1 Table 2, shortest time from cold at 7.2 times the setting; class 5 from memory
_CLASSES = (5.0, 10.0, 20.0, 30.0)
_LEAST_S = (0.5, 4.0, 6.0, 9.0)
_LEAST_10A_S = 2.0
_GREATEST_10A_S = 10.0
# IEC 60947-4-1 Table 3, from equilibrium at 1.0 at 1.5 times the setting
_WARM_S = (120.0, 240.0, 480.0, 720.0)
_WARM_10A_S = 120.0
_IEC_MULTIPLE = 7.2
_NEMA_MULTIPLE = 6.0
_NO_TRIP_MULTIPLE = 1.05
_MUST_TRIP_MULTIPLE = 1.2
_WARM_MULTIPLE = 1.5
_TWO_HOURS_S = 7200.0


def _of_class(trip_class: Floats, entries: tuple[float, ...], entry_10a: float) -> Floats:
    """Entry of the class, or of the next lower one that the standard lists."""
    below = np.searchsorted(_CLASSES, trip_class, side="right") - 1
    entry = entry_at(entries, np.where(present(trip_class), below, -1))
    return np.where(trip_class == TRIP_CLASS_10A, entry_10a, entry)


def trip_standard_code(name: str) -> int:
    """Code of the standard that a trip class is stated after.

    Parameters
    ----------
    name : str
        'IEC' or 'NEMA'. [text]

    Returns
    -------
    int
        Its code in arrays. [code]

    Notes
    -----
    Any other name is refused with a ValueError that lists the accepted ones.

    Examples
    --------
    IEC is the first of the two, counted from zero.

    >>> trip_standard_code("IEC"), trip_standard_code("NEMA")
    (0, 1)

    References
    ----------
    IEC 60947-4-1 and NEMA ICS 2 Part 4; the codes are this project's own.
    """
    return code_of(name, TRIP_STANDARD_CODES, "a standard of trip classes")


def trip_class_least_time_s(multiple: ArrayLike, trip_class: ArrayLike, standard: ArrayLike = 0) -> Floats:
    """Shortest time that an overload relay of a trip class may take to trip from cold.

    t = t_least * (7.2 / M)^2

    Parameters
    ----------
    multiple : array_like
        Current in multiples of the relay's setting. [1]
    trip_class : array_like
        The class as a number; TRIP_CLASS_10A stands for class 10A. [1]
    standard : array_like
        Code of the standard. [code]

    Returns
    -------
    ndarray
        Lower edge of the band, for what must ride through; infinite up to 1.05 times the setting, where the
        relay must not trip within two hours. [s]

    Notes
    -----
    The standard fixes the band at 7.2 times the setting; I^2 t carries it to other currents and is good
    from about 3 times upward. Below that real relays take longer than this edge, so it stays on the safe
    side. Balanced current, reference ambient, from cold. NEMA sets no lower edge: relays of one class are
    built to both standards, so the same edge is used. A class that the standard does not list takes the
    edge of the next lower one that it does. Missing where an input is missing, the standard unknown or the
    class below 5.

    Examples
    --------
    Class 10 at 7.2 times: 4 s by the table; at 6 times by hand 4 * 1.44 = 5.76 s.

    >>> trip_class_least_time_s([7.2, 6.0], 10).round(2).tolist()
    [4.0, 5.76]

    References
    ----------
    IEC 60947-4-1, Table 2 (class 5 from memory); I^2 t and the edge for NEMA are common practice.
    """
    current, number, standard_code = together(multiple, trip_class, standard)
    known = entry_at([1.0, 1.0], standard_code)
    with np.errstate(divide="ignore", invalid="ignore"):
        time = known * _of_class(number, _LEAST_S, _LEAST_10A_S) * (_IEC_MULTIPLE / current) ** 2
    time = np.where((current <= _NO_TRIP_MULTIPLE) & ~np.isnan(time), np.inf, time)
    return np.where(current >= 0, time, np.nan)


def trip_class_greatest_time_s(multiple: ArrayLike, trip_class: ArrayLike, standard: ArrayLike = 0) -> Floats:
    """Longest time that an overload relay of a trip class may take to trip from cold.

    t = t_greatest * (M_class / M)^2, M_class = 7.2 (IEC) or 6 (NEMA)

    Parameters
    ----------
    multiple : array_like
        Current in multiples of the relay's setting. [1]
    trip_class : array_like
        The class as a number; TRIP_CLASS_10A stands for class 10A. [1]
    standard : array_like
        Code of the standard. [code]

    Returns
    -------
    ndarray
        Upper edge of the band, for what must be protected; two hours from 1.2 to below 1.5 times the setting,
        infinite below. [s]

    Notes
    -----
    The standard fixes one point; I^2 t carries it to other currents. A relay with one thermal time constant
    that trips at 1.2 times or less may take up to 8 % longer at 3 times and 23 % longer at 2 times, so the
    edge is good from about 3 times upward: the range of starting and stalling. Balanced current, reference
    ambient, from cold. A class that the standard does not list is taken as its time in seconds. Missing where
    an input is missing, the standard unknown or the class not above zero.

    Examples
    --------
    Class 10 at 6 times the setting: NEMA 10 s; IEC by hand 10 * 1.44 = 14.4 s.

    >>> trip_class_greatest_time_s(6.0, 10, [1, 0]).round(2).tolist()
    [10.0, 14.4]

    References
    ----------
    IEC 60947-4-1, Tables 2 and 3; NEMA ICS 2 Part 4 and UL 60947-4-1 (6 times). Class 5 from memory;
    I^2 t is common practice.
    """
    current, number, standard_code = together(multiple, trip_class, standard)
    anchor = entry_at([_IEC_MULTIPLE, _NEMA_MULTIPLE], standard_code)
    with np.errstate(divide="ignore", invalid="ignore"):
        at_anchor = np.where(number == TRIP_CLASS_10A, _GREATEST_10A_S, above_zero(number))
        time = at_anchor * (anchor / current) ** 2
    known = ~np.isnan(time)
    time = np.where((current < _WARM_MULTIPLE) & known, _TWO_HOURS_S, time)
    time = np.where((current < _MUST_TRIP_MULTIPLE) & known, np.inf, time)
    return np.where(current >= 0, time, np.nan)


def trip_class_warm_time_s(trip_class: ArrayLike) -> Floats:
    """Longest time that an overload relay may take at 1.5 times its setting after running at the setting.

    Parameters
    ----------
    trip_class : array_like
        The class as a number; TRIP_CLASS_10A stands for class 10A. [1]

    Returns
    -------
    ndarray
        Time limit. [s]

    Notes
    -----
    After thermal equilibrium at 1.0 times the setting. Missing for a class without a figure here (40 among
    them).

    Examples
    --------
    Class 10: four minutes.

    >>> trip_class_warm_time_s(10).item()
    240.0

    References
    ----------
    IEC 60947-4-1, Table 3; seen second-hand, class 5 from memory.
    """
    (number,) = together(trip_class)
    listed = np.isin(number, _CLASSES) | (number == TRIP_CLASS_10A)
    return np.where(listed, _of_class(number, _WARM_S, _WARM_10A_S), np.nan)
