"""Temperatures that the thermal class of a winding permits."""

from __future__ import annotations

from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, look_up


def _by_letter_and_number(figures: dict[str, float]) -> dict[str, float]:
    numbers = {"A": "105", "E": "120", "B": "130", "F": "155", "H": "180", "N": "200"}
    return figures | {numbers[letter]: figure for letter, figure in figures.items()}


CLASS_TEMPERATURE_C = _by_letter_and_number({"A": 105.0, "E": 120.0, "B": 130.0, "F": 155.0, "H": 180.0, "N": 200.0})
RISE_BY_RESISTANCE_K = _by_letter_and_number({"A": 60.0, "E": 75.0, "B": 80.0, "F": 105.0, "H": 125.0})
RISE_BY_DETECTOR_K = _by_letter_and_number({"B": 85.0, "F": 110.0, "H": 130.0})
SLOW_OVERLOAD_C = _by_letter_and_number({"B": 145.0, "F": 170.0, "H": 195.0, "N": 215.0})
RAPID_OVERLOAD_C = _by_letter_and_number({"B": 225.0, "F": 250.0, "H": 275.0, "N": 295.0})


def class_temperature_c(insulation_class: ArrayLike) -> Floats:
    """Temperature of a thermal class.

    105 A, 120 E, 130 B, 155 F, 180 H, 200 N

    Parameters
    ----------
    insulation_class : array_like
        Letter or number of the thermal class. [text]

    Returns
    -------
    ndarray
        Temperature; missing for another class. [C]

    Notes
    -----
    The hottest spot that the insulation bears for its normal life, whatever the ambient temperature.

    Examples
    --------
    From the table: F is 155, and so is '155'.

    >>> class_temperature_c(["F", "155", "?"]).tolist()
    [155.0, 155.0, nan]

    References
    ----------
    IEC 60085; NEMA MG 1.
    """
    return look_up(insulation_class, CLASS_TEMPERATURE_C)


def rise_by_resistance_k(insulation_class: ArrayLike) -> Floats:
    """Temperature rise that a thermal class permits, measured by resistance.

    60 A, 75 E, 80 B, 105 F, 125 H

    Parameters
    ----------
    insulation_class : array_like
        Letter or number of the thermal class. [text]

    Returns
    -------
    ndarray
        Rise; missing for another class. [K]

    Notes
    -----
    Air-cooled, up to 40 C ambient and 1000 m. A motor is often used to a lower class than it is
    insulated for (F with B rise): give the class of the rise.

    Examples
    --------
    From the table: B rise is 80 K.

    >>> rise_by_resistance_k("B").item()
    80.0

    References
    ----------
    IEC 60034-1, table of temperature rises; A and E from memory.
    """
    return look_up(insulation_class, RISE_BY_RESISTANCE_K)


def rise_by_detector_k(insulation_class: ArrayLike) -> Floats:
    """Temperature rise that a thermal class permits, measured by embedded detector.

    85 B, 110 F, 130 H

    Parameters
    ----------
    insulation_class : array_like
        Letter or number of the thermal class. [text]

    Returns
    -------
    ndarray
        Rise; missing for another class. [K]

    Notes
    -----
    Large machines; up to 40 C ambient and 1000 m. For machines below 5 MW the standard permits some
    kelvin more.

    Examples
    --------
    B rise at 40 C ambient. By hand: 40 + 85 = 125 C, a usual alarm.

    >>> (40 + rise_by_detector_k("B")).item()
    125.0

    References
    ----------
    IEC 60034-1, table of temperature rises (from memory).
    """
    return look_up(insulation_class, RISE_BY_DETECTOR_K)


def slow_overload_limit_c(insulation_class: ArrayLike) -> Floats:
    """Winding temperature that thermal protection may let come about in a slow overload.

    145 B, 170 F, 195 H, 215 N

    Parameters
    ----------
    insulation_class : array_like
        Letter or number of the thermal class. [text]

    Returns
    -------
    ndarray
        Temperature; missing for another class. [C]

    Notes
    -----
    The mean of the winding by resistance, once steady.

    Examples
    --------
    From the table: F, 170 C.

    >>> slow_overload_limit_c("F").item()
    170.0

    References
    ----------
    IEC 60034-11:2020, table 1, second-hand.
    """
    return look_up(insulation_class, SLOW_OVERLOAD_C)


def rapid_overload_limit_c(insulation_class: ArrayLike) -> Floats:
    """Winding temperature that thermal protection may let come about in a rapid overload, such as a stall.

    225 B, 250 F, 275 H, 295 N

    Parameters
    ----------
    insulation_class : array_like
        Letter or number of the thermal class. [text]

    Returns
    -------
    ndarray
        Temperature; missing for another class. [C]

    Notes
    -----
    The 2020 edition; that of 2004 has 200, 225 and 250 for B, F and H.

    Examples
    --------
    From the table: F, 250 C.

    >>> rapid_overload_limit_c("F").item()
    250.0

    References
    ----------
    IEC 60034-11:2020, table 2, second-hand.
    """
    return look_up(insulation_class, RAPID_OVERLOAD_C)
