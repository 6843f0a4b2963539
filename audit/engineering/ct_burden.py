"""Burdens of current transformers: from volt-amperes and from the voltage class to ohms, and back."""

from __future__ import annotations

from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, above_zero, floats, zero_or_more

CLASS_MULTIPLE = 20.0
"""Multiple of rated current at which the C number of IEEE C57.13 is stated."""


def rated_burden_ohm(rated_burden_va: ArrayLike, ct_secondary_a: ArrayLike) -> Floats:
    """Rated burden as an impedance.

    Z = S / I^2

    Parameters
    ----------
    rated_burden_va : array_like
        Rated burden. [VA]
    ct_secondary_a : array_like
        Rated secondary current. [A]

    Returns
    -------
    ndarray
        Impedance at rated current; missing where an input is missing, negative, or the current zero. [ohm]

    Notes
    -----
    The magnitude only; relay burdens are near unity power factor.

    Examples
    --------
    15 VA at 5 A. By hand: 15 / 25 = 0.6 ohm.

    >>> rated_burden_ohm(15, 5).item()
    0.6

    References
    ----------
    IEC 61869-2, rated output; IEEE C57.13, standard burdens.
    """
    return floats(zero_or_more(rated_burden_va) / above_zero(ct_secondary_a) ** 2)


def rated_burden_va(burden_ohm: ArrayLike, ct_secondary_a: ArrayLike) -> Floats:
    """Burden as apparent power at rated current.

    S = Z * I^2

    Parameters
    ----------
    burden_ohm : array_like
        Impedance of the burden. [ohm]
    ct_secondary_a : array_like
        Rated secondary current. [A]

    Returns
    -------
    ndarray
        Apparent power; missing where an input is missing, negative, or the current zero. [VA]

    Notes
    -----
    The magnitude only.

    Examples
    --------
    B-1 at 5 A. By hand: 1 * 25 = 25 VA.

    >>> rated_burden_va(1, 5).item()
    25.0

    References
    ----------
    IEEE C57.13, standard burdens.
    """
    return floats(zero_or_more(burden_ohm) * above_zero(ct_secondary_a) ** 2)


def standard_burden_ohm(class_voltage_v: ArrayLike, ct_secondary_a: ArrayLike) -> Floats:
    """Standard burden that belongs to a C-class voltage.

    Z = C / (20 * Is)

    Parameters
    ----------
    class_voltage_v : array_like
        C number: secondary terminal voltage at 20 times rated current. [V]
    ct_secondary_a : array_like
        Rated secondary current. [A]

    Returns
    -------
    ndarray
        Burden; missing where an input is missing or not positive. [ohm]

    Notes
    -----
    The number holds for the full winding; a tap of a multi-ratio transformer has its share in turns.

    Examples
    --------
    C200 at 5 A. By hand: 200 / 100 = 2 ohm.

    >>> standard_burden_ohm(200, 5).item()
    2.0

    References
    ----------
    IEEE C57.13, C classification.
    """
    return floats(above_zero(class_voltage_v) / (CLASS_MULTIPLE * above_zero(ct_secondary_a)))


def class_voltage_v(standard_burden_ohm: ArrayLike, ct_secondary_a: ArrayLike) -> Floats:
    """C-class voltage that belongs to a standard burden.

    C = 20 * Is * Z

    Parameters
    ----------
    standard_burden_ohm : array_like
        Standard burden. [ohm]
    ct_secondary_a : array_like
        Rated secondary current. [A]

    Returns
    -------
    ndarray
        Secondary terminal voltage at 20 times rated current; missing where an input is missing or not
        positive. [V]

    Notes
    -----
    The inverse of `standard_burden_ohm`.

    Examples
    --------
    B-4 at 5 A. By hand: 20 * 5 * 4 = 400 V.

    >>> class_voltage_v(4, 5).item()
    400.0

    References
    ----------
    IEEE C57.13, C classification.
    """
    return floats(CLASS_MULTIPLE * above_zero(ct_secondary_a) * above_zero(standard_burden_ohm))
