"""Current that unequal transformers feign while nothing is wrong: false residual, false differential.

Each bound is an error times the balanced current in the primary conductors, in primary amperes.
"""

from __future__ import annotations

from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, floats, zero_or_more


def false_residual_a(balanced_current_a: ArrayLike, ratio_error_pct: ArrayLike) -> Floats:
    """Greatest false residual of three transformers whose ratio errors lie within plus and minus e.

    2 * e * I

    Parameters
    ----------
    balanced_current_a : array_like
        Current in each phase, a start above all. [A]
    ratio_error_pct : array_like
        Greatest ratio error, either way. [%]

    Returns
    -------
    ndarray
        Residual in primary amperes; missing where an input is missing or negative. [A]

    Notes
    -----
    Ratio errors only, no phase displacement, no saturation. While an offset saturates one core the
    residual comes near tens of per cent for some cycles: delay, block, or a core-balance transformer.

    Examples
    --------
    600 A start, 1 per cent. By hand: 2 * 0.01 * 600 = 12 A.

    >>> false_residual_a(600, 1).item()
    12.0

    References
    ----------
    Derived: |e1 + e2 a^2 + e3 a| is greatest where two errors are +e and one is -e, or the reverse.
    """
    return floats(2 * zero_or_more(ratio_error_pct) / 100 * zero_or_more(balanced_current_a))


def false_residual_one_sided_a(balanced_current_a: ArrayLike, ratio_error_pct: ArrayLike) -> Floats:
    """Greatest false residual of three transformers whose ratio errors all lie between 0 and -e.

    e * I

    Parameters
    ----------
    balanced_current_a : array_like
        Current in each phase. [A]
    ratio_error_pct : array_like
        Greatest ratio error. [%]

    Returns
    -------
    ndarray
        Residual in primary amperes; missing where an input is missing or negative. [A]

    Notes
    -----
    The case of turns without correction, where magnetising current alone makes the error.

    Examples
    --------
    600 A start, 1 per cent. By hand: 0.01 * 600 = 6 A.

    >>> false_residual_one_sided_a(600, 1).item()
    6.0

    References
    ----------
    Derived: |e1 + e2 a^2 + e3 a| over the cube of errors is greatest at a corner.
    """
    return floats(zero_or_more(ratio_error_pct) / 100 * zero_or_more(balanced_current_a))


def false_residual_composite_a(balanced_current_a: ArrayLike, composite_error_pct: ArrayLike) -> Floats:
    """Greatest false residual of three transformers at their composite error, at whatever angle.

    3 * eps * I

    Parameters
    ----------
    balanced_current_a : array_like
        Current in each phase, up to the accuracy limit. [A]
    composite_error_pct : array_like
        Composite error of the class: 5 for 5P, 10 for 10P. [%]

    Returns
    -------
    ndarray
        Residual in primary amperes; missing where an input is missing or negative. [A]

    Notes
    -----
    An outer bound: three errors at just the angles at which they add up.

    Examples
    --------
    600 A start, 5P. By hand: 3 * 0.05 * 600 = 90 A.

    >>> round(false_residual_composite_a(600, 5).item(), 9)
    90.0

    References
    ----------
    Derived from the definition of composite error in IEC 61869-2.
    """
    return floats(3 * zero_or_more(composite_error_pct) / 100 * zero_or_more(balanced_current_a))


def false_residual_rms_a(balanced_current_a: ArrayLike, ratio_error_pct: ArrayLike) -> Floats:
    """Root mean square of the false residual over many sets of three transformers.

    sqrt(3) * (e / sqrt(3)) * I = e * I

    Parameters
    ----------
    balanced_current_a : array_like
        Current in each phase. [A]
    ratio_error_pct : array_like
        Half the width of the range over which the errors are spread evenly and independently. [%]

    Returns
    -------
    ndarray
        Residual in primary amperes; missing where an input is missing or negative. [A]

    Notes
    -----
    What to expect, not a bound: the bound `false_residual_a` is twice as high.

    Examples
    --------
    600 A start, 1 per cent. By hand: 0.01 * 600 = 6 A.

    >>> false_residual_rms_a(600, 1).item()
    6.0

    References
    ----------
    Derived: variance e^2/3 of an even spread, three independent phasors of length I.
    """
    return floats(zero_or_more(ratio_error_pct) / 100 * zero_or_more(balanced_current_a))


def false_differential_a(through_current_a: ArrayLike, ratio_error_pct: ArrayLike) -> Floats:
    """Greatest false difference of the two transformers of a phase, ratio errors within plus and minus e.

    2 * e * I

    Parameters
    ----------
    through_current_a : array_like
        Current through the winding, a start above all. [A]
    ratio_error_pct : array_like
        Greatest ratio error, either way. [%]

    Returns
    -------
    ndarray
        Difference in primary amperes; missing where an input is missing or negative. [A]

    Notes
    -----
    Two sets of equal ratio, no saturation. A flux-balance transformer around both ends has no such error.

    Examples
    --------
    600 A start, 1 per cent. By hand: (+0.01 - -0.01) * 600 = 12 A.

    >>> false_differential_a(600, 1).item()
    12.0

    References
    ----------
    Derived: |e1 - e2| is at most 2 e.
    """
    return floats(2 * zero_or_more(ratio_error_pct) / 100 * zero_or_more(through_current_a))


def false_differential_composite_a(through_current_a: ArrayLike, composite_error_pct: ArrayLike) -> Floats:
    """Greatest false difference of two transformers at their composite error, at whatever angle.

    2 * eps * I

    Parameters
    ----------
    through_current_a : array_like
        Current through the winding, up to the accuracy limit. [A]
    composite_error_pct : array_like
        Composite error of the class: 5 for 5P, 10 for 10P. [%]

    Returns
    -------
    ndarray
        Difference in primary amperes; missing where an input is missing or negative. [A]

    Notes
    -----
    An outer bound: two errors in phase opposition.

    Examples
    --------
    600 A start, 5P. By hand: 2 * 0.05 * 600 = 60 A.

    >>> round(false_differential_composite_a(600, 5).item(), 9)
    60.0

    References
    ----------
    Derived from the definition of composite error in IEC 61869-2.
    """
    return floats(2 * zero_or_more(composite_error_pct) / 100 * zero_or_more(through_current_a))
