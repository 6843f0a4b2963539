"""Code letters for locked-rotor kVA per horsepower and the currents they stand for."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, above_zero, code_of, entry_at, floats
from audit.engineering.unit_factors import KW_PER_HP, SQRT3

_BANDS = {
    "A": (0.0, 3.14),
    "B": (3.15, 3.54),
    "C": (3.55, 3.99),
    "D": (4.0, 4.49),
    "E": (4.5, 4.99),
    "F": (5.0, 5.59),
    "G": (5.6, 6.29),
    "H": (6.3, 7.09),
    "J": (7.1, 7.99),
    "K": (8.0, 8.99),
    "L": (9.0, 9.99),
    "M": (10.0, 11.19),
    "N": (11.2, 12.49),
    "P": (12.5, 13.99),
    "R": (14.0, 15.99),
    "S": (16.0, 17.99),
    "T": (18.0, 19.99),
    "U": (20.0, 22.39),
    "V": (22.4, np.inf),
}
"""Letter: locked-rotor kVA per horsepower from and to, as the table prints them. I, O and Q are not used."""

LETTERS = "".join(_BANDS)
"""Letters in order. The place in this order, from zero, is a letter's code."""

LETTER_CODES = {letter.casefold(): code for code, letter in enumerate(LETTERS)}
_FROM, _TO = np.array(list(_BANDS.values())).T


def letter_code(letter: str) -> int:
    """Place of a code letter in the table.

    Parameters
    ----------
    letter : str
        The letter, capital or not. [text]

    Returns
    -------
    int
        Its place, A being 0. [code]

    Notes
    -----
    I, O, Q and anything beyond V are refused with a ValueError.

    Examples
    --------
    G is the seventh letter, J comes right after H.

    >>> letter_code("G"), letter_code("J") - letter_code("H")
    (6, 1)

    References
    ----------
    NFPA 70, Table 430.7(B), same as NEMA MG 1 10.37.
    """
    return code_of(letter, LETTER_CODES, "a code letter")


def letter_least_kva_per_hp(letter_code: ArrayLike) -> Floats:
    """Lower end of a code letter's band.

    Parameters
    ----------
    letter_code : array_like
        Place of the letter in the table. [code]

    Returns
    -------
    ndarray
        Locked-rotor kVA per horsepower. [kVA/hp]

    Notes
    -----
    Letter A begins at zero. Missing for an unknown code.

    Examples
    --------
    G, from the table: 5.6.

    >>> letter_least_kva_per_hp(6).item()
    5.6

    References
    ----------
    NFPA 70, Table 430.7(B), same as NEMA MG 1 10.37.
    """
    return entry_at(_FROM, letter_code)


def letter_greatest_kva_per_hp(letter_code: ArrayLike) -> Floats:
    """Upper end of a code letter's band, as printed.

    Parameters
    ----------
    letter_code : array_like
        Place of the letter in the table. [code]

    Returns
    -------
    ndarray
        Locked-rotor kVA per horsepower; infinite for V. [kVA/hp]

    Notes
    -----
    Printed to 0.01; the next letter begins 0.01 above. Missing for an unknown code.

    Examples
    --------
    G, from the table: 6.29.

    >>> letter_greatest_kva_per_hp(6).item()
    6.29

    References
    ----------
    NFPA 70, Table 430.7(B), same as NEMA MG 1 10.37.
    """
    return entry_at(_TO, letter_code)


def locked_rotor_kva_per_hp(locked_rotor_a: ArrayLike, power_kw: ArrayLike, voltage_v: ArrayLike) -> Floats:
    """Locked-rotor apparent power per horsepower that a locked-rotor current amounts to.

    S = sqrt(3) * V * I / 1000 / hp

    Parameters
    ----------
    locked_rotor_a : array_like
        Locked-rotor current at rated voltage. [A]
    power_kw : array_like
        Rated power at the shaft. [kW]
    voltage_v : array_like
        Rated voltage. [V]

    Returns
    -------
    ndarray
        Locked-rotor kVA per horsepower. [kVA/hp]

    Notes
    -----
    Missing where an input is missing or not above zero.

    Examples
    --------
    725 A, 100 hp, 460 V. By hand: 1.73205 * 460 * 725 / 1000 / 100 = 5.776.

    >>> locked_rotor_kva_per_hp(725, 74.57, 460).round(3).item()
    5.776

    References
    ----------
    NFPA 70, Table 430.7(B), definition of its column.
    """
    horsepower = above_zero(power_kw) / KW_PER_HP
    return floats(SQRT3 * above_zero(voltage_v) * above_zero(locked_rotor_a) / 1000 / horsepower)


def letter_code_from_current(locked_rotor_a: ArrayLike, power_kw: ArrayLike, voltage_v: ArrayLike) -> Floats:
    """Code letter that a locked-rotor current falls under.

    Parameters
    ----------
    locked_rotor_a : array_like
        Locked-rotor current at rated voltage. [A]
    power_kw : array_like
        Rated power at the shaft. [kW]
    voltage_v : array_like
        Rated voltage. [V]

    Returns
    -------
    ndarray
        Place of the letter in the table. [code]

    Notes
    -----
    Bands taken as half open, each up to where the next begins, so that no figure falls between two letters.
    Missing where an input is missing or not above zero.

    Examples
    --------
    725 A, 100 hp, 460 V: 5.776 kVA/hp by hand, between 5.6 and 6.3, letter G.

    >>> LETTERS[int(letter_code_from_current(725, 74.57, 460))]
    'G'

    References
    ----------
    NFPA 70, Table 430.7(B), same as NEMA MG 1 10.37.
    """
    figure = locked_rotor_kva_per_hp(locked_rotor_a, power_kw, voltage_v)
    place = np.searchsorted(_FROM, figure, side="right") - 1
    return np.where(np.isnan(figure), np.nan, place)


def locked_rotor_from_letter_least_a(letter_code: ArrayLike, power_kw: ArrayLike, voltage_v: ArrayLike) -> Floats:
    """Least locked-rotor current that a code letter allows.

    I = hp * S_from * 1000 / (sqrt(3) * V)

    Parameters
    ----------
    letter_code : array_like
        Place of the letter in the table. [code]
    power_kw : array_like
        Rated power at the shaft. [kW]
    voltage_v : array_like
        Rated voltage. [V]

    Returns
    -------
    ndarray
        Locked-rotor current at rated voltage, lower end. [A]

    Notes
    -----
    Steady current, rotor locked, rated voltage and frequency. Missing where an input is missing, a code
    unknown, power or voltage not above zero.

    Examples
    --------
    100 hp, 460 V, G. By hand: 100 * 5.6 * 1000 / 796.74 = 702.9 A.

    >>> locked_rotor_from_letter_least_a(6, 74.57, 460).round(1).item()
    702.9

    References
    ----------
    NFPA 70, Table 430.7(B), same as NEMA MG 1 10.37.
    """
    horsepower = above_zero(power_kw) / KW_PER_HP
    apparent_kva = horsepower * letter_least_kva_per_hp(letter_code)
    return floats(apparent_kva * 1000 / (SQRT3 * above_zero(voltage_v)))


def locked_rotor_from_letter_greatest_a(letter_code: ArrayLike, power_kw: ArrayLike, voltage_v: ArrayLike) -> Floats:
    """Greatest locked-rotor current that a code letter allows.

    I = hp * S_to * 1000 / (sqrt(3) * V)

    Parameters
    ----------
    letter_code : array_like
        Place of the letter in the table. [code]
    power_kw : array_like
        Rated power at the shaft. [kW]
    voltage_v : array_like
        Rated voltage. [V]

    Returns
    -------
    ndarray
        Locked-rotor current at rated voltage, upper end; infinite for V. [A]

    Notes
    -----
    Steady current, rotor locked, rated voltage and frequency. Missing where an input is missing, a code
    unknown, power or voltage not above zero.

    Examples
    --------
    100 hp, 460 V, G. By hand: 100 * 6.29 * 1000 / 796.74 = 789.5 A.

    >>> locked_rotor_from_letter_greatest_a(6, 74.57, 460).round(1).item()
    789.5

    References
    ----------
    NFPA 70, Table 430.7(B), same as NEMA MG 1 10.37.
    """
    horsepower = above_zero(power_kw) / KW_PER_HP
    apparent_kva = horsepower * letter_greatest_kva_per_hp(letter_code)
    return floats(apparent_kva * 1000 / (SQRT3 * above_zero(voltage_v)))
