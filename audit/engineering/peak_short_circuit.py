"""First peak of a short-circuit current after IEC 60909-0."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, floats, zero_or_more, zero_to_infinity


def short_circuit_peak_ratio(x_to_r_ratio: ArrayLike) -> Floats:
    """Peak factor kappa: first peak over the amplitude of the initial symmetrical current.

    kappa = 1.02 + 0.98 * exp(-3 * R/X)

    Parameters
    ----------
    x_to_r_ratio : array_like
        Reactance over resistance at the fault point; infinite is allowed. [1]

    Returns
    -------
    ndarray
        From 1.02 to 2.00; missing where the input is missing or negative. [1]

    Notes
    -----
    A single source or a radial network. In a meshed network the standard multiplies by 1.15 or works at
    an equivalent frequency; neither is done here.

    Examples
    --------
    X/R 10. By hand: 1.02 + 0.98 * exp(-0.3) = 1.02 + 0.98 * 0.740818 = 1.7460.

    >>> short_circuit_peak_ratio(10).round(4).item()
    1.746

    References
    ----------
    IEC 60909-0:2016, peak short-circuit current.
    """
    x_to_r = zero_to_infinity(x_to_r_ratio)
    with np.errstate(divide="ignore"):
        return floats(1.02 + 0.98 * np.exp(-3 / x_to_r))


def short_circuit_peak_ka(symmetrical_ka: ArrayLike, x_to_r_ratio: ArrayLike) -> Floats:
    """Peak of a short-circuit current.

    ip = kappa * sqrt(2) * I"k

    Parameters
    ----------
    symmetrical_ka : array_like
        Initial symmetrical short-circuit current, rms. [kA]
    x_to_r_ratio : array_like
        Reactance over resistance at the fault point. [1]

    Returns
    -------
    ndarray
        Peak current; missing where an input is missing or negative. [kA]

    Notes
    -----
    As `short_circuit_peak_ratio`.

    Examples
    --------
    25 kA at X/R 10. By hand: 1.7460 * 1.41421 * 25 = 61.73 kA.

    >>> short_circuit_peak_ka(25, 10).round(2).item()
    61.73

    References
    ----------
    IEC 60909-0:2016, peak short-circuit current.
    """
    return floats(short_circuit_peak_ratio(x_to_r_ratio) * np.sqrt(2) * zero_or_more(symmetrical_ka))
