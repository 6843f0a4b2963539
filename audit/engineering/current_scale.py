"""Amperes and kiloamperes: fault currents of boards are stated in the one, settings in the other."""

from __future__ import annotations

from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, floats

AMPERES_PER_KILOAMPERE = 1000.0


def current_in_a(current_ka: ArrayLike) -> Floats:
    """Current in amperes.

    A = 1000 * kA

    Parameters
    ----------
    current_ka : array_like
        Current in kiloamperes. [kA]

    Returns
    -------
    ndarray
        The same current; missing where the input is missing. [A]

    Notes
    -----
    The definition of the prefix.

    Examples
    --------
    25 kA. By hand: 25,000 A.

    >>> current_in_a(25).item()
    25000.0

    References
    ----------
    ISO 80000-1, prefixes.
    """
    return floats(current_ka) * AMPERES_PER_KILOAMPERE


def current_in_ka(current_a: ArrayLike) -> Floats:
    """Current in kiloamperes.

    kA = A / 1000

    Parameters
    ----------
    current_a : array_like
        Current in amperes. [A]

    Returns
    -------
    ndarray
        The same current; missing where the input is missing. [kA]

    Notes
    -----
    The definition of the prefix.

    Examples
    --------
    400 A. By hand: 0.4 kA.

    >>> current_in_ka(400).item()
    0.4

    References
    ----------
    ISO 80000-1, prefixes.
    """
    return floats(current_a) / AMPERES_PER_KILOAMPERE
