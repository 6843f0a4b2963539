"""How much current a transformer carries over faithfully: accuracy limit, class voltage, saturation."""

from __future__ import annotations

from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, above_zero, floats, zero_or_more
from audit.engineering.ct_burden import CLASS_MULTIPLE


def actual_accuracy_limit_ratio(
    rated_accuracy_limit_ratio: ArrayLike,
    ct_winding_ohm: ArrayLike,
    rated_burden_ohm: ArrayLike,
    connected_burden_ohm: ArrayLike,
) -> Floats:
    """Multiple of rated current up to which a class P transformer keeps its accuracy with the burden it has.

    ALF = ALFn * (Rct + Rbn) / (Rct + Rb)

    Parameters
    ----------
    rated_accuracy_limit_ratio : array_like
        Rated accuracy limit factor: 20 for 5P20. [1]
    ct_winding_ohm : array_like
        Resistance of the secondary winding, hot. [ohm]
    rated_burden_ohm : array_like
        Rated burden. [ohm]
    connected_burden_ohm : array_like
        Burden connected: leads there and back and the relay. [ohm]

    Returns
    -------
    ndarray
        Accuracy limit factor in service; missing where an input is missing or negative, or both
        resistances of the loop are zero. [1]

    Notes
    -----
    For symmetrical current; burdens added as if all were resistance. An offset current needs a multiple
    of it, see `offset_saturation_multiple`.

    Examples
    --------
    5P20, winding 0.3 ohm, rated 0.6, connected 0.2. By hand: 20 * 0.9 / 0.5 = 36.

    >>> actual_accuracy_limit_ratio(20, 0.3, 0.6, 0.2).round(3).item()
    36.0

    References
    ----------
    IEC 61869-2, class P.
    """
    winding = zero_or_more(ct_winding_ohm)
    loop = above_zero(winding + zero_or_more(connected_burden_ohm))
    return floats(above_zero(rated_accuracy_limit_ratio) * (winding + zero_or_more(rated_burden_ohm)) / loop)


def ct_secondary_voltage_v(
    primary_current_a: ArrayLike, ct_primary_a: ArrayLike, ct_secondary_a: ArrayLike, loop_ohm: ArrayLike
) -> Floats:
    """Voltage that a symmetrical primary current demands of the secondary.

    V = I * Is / Ip * Z

    Parameters
    ----------
    primary_current_a : array_like
        Primary current, rms symmetrical. [A]
    ct_primary_a : array_like
        Rated primary current. [A]
    ct_secondary_a : array_like
        Rated secondary current. [A]
    loop_ohm : array_like
        Connected burden; with the winding added where the result is set against a knee voltage. [ohm]

    Returns
    -------
    ndarray
        Voltage, rms; missing where an input is missing, negative, or a rated current zero. [V]

    Notes
    -----
    As if the transformer did not saturate: a result above the class voltage says that it will.

    Examples
    --------
    360 A through 100/5 with 0.5 ohm. By hand: 360 * 5 / 100 * 0.5 = 9 V.

    >>> ct_secondary_voltage_v(360, 100, 5, 0.5).item()
    9.0

    References
    ----------
    Ohm's law with the turns ratio.
    """
    secondary = zero_or_more(primary_current_a) * above_zero(ct_secondary_a) / above_zero(ct_primary_a)
    return floats(secondary * zero_or_more(loop_ohm))


def ct_offset_voltage_v(symmetrical_voltage_v: ArrayLike, x_to_r_ratio: ArrayLike) -> Floats:
    """Class voltage needed so that a fully offset current does not saturate the transformer.

    Vx = (1 + X/R) * V

    Parameters
    ----------
    symmetrical_voltage_v : array_like
        Secondary voltage that the symmetrical current demands. [V]
    x_to_r_ratio : array_like
        Reactance over resistance of the primary circuit. [1]

    Returns
    -------
    ndarray
        Voltage; missing where an input is missing or negative. [V]

    Notes
    -----
    Full offset and a burden of pure resistance (pessimistic), no remanence (optimistic).

    Examples
    --------
    9 V at X/R 20. By hand: 21 * 9 = 189 V.

    >>> ct_offset_voltage_v(9, 20).item()
    189.0

    References
    ----------
    IEEE C37.110, criterion for freedom from saturation.
    """
    return floats((1 + zero_or_more(x_to_r_ratio)) * zero_or_more(symmetrical_voltage_v))


def offset_saturation_multiple(
    fault_a: ArrayLike,
    ct_primary_a: ArrayLike,
    connected_burden_ohm: ArrayLike,
    standard_burden_ohm: ArrayLike,
    x_to_r_ratio: ArrayLike,
) -> Floats:
    """Criterion of saturation by an offset current: no saturation up to 20.

    (1 + X/R) * (If / Ip) * (Zb / Zstd)

    Parameters
    ----------
    fault_a : array_like
        Fault current, rms symmetrical. [A]
    ct_primary_a : array_like
        Rated primary current. [A]
    connected_burden_ohm : array_like
        Burden connected. [ohm]
    standard_burden_ohm : array_like
        Standard burden of the C class. [ohm]
    x_to_r_ratio : array_like
        Reactance over resistance of the primary circuit. [1]

    Returns
    -------
    ndarray
        To be set against 20; missing where an input is missing, negative, or a divisor zero. [1]

    Notes
    -----
    As `ct_offset_voltage_v`. A value above 20 does not say that the element fails: a fast element can
    operate before the core saturates.

    Examples
    --------
    C200 600/5, 10 kA, 1 ohm, X/R 12. By hand: 13 * 16.667 * 0.5 = 108.3.

    >>> offset_saturation_multiple(10000, 600, 1.0, 2.0, 12).round(1).item()
    108.3

    References
    ----------
    IEEE C37.110, criterion for freedom from saturation.
    """
    current = zero_or_more(fault_a) / above_zero(ct_primary_a)
    burden = zero_or_more(connected_burden_ohm) / above_zero(standard_burden_ohm)
    return floats((1 + zero_or_more(x_to_r_ratio)) * current * burden)


def greatest_unsaturated_multiple(
    connected_burden_ohm: ArrayLike, standard_burden_ohm: ArrayLike, x_to_r_ratio: ArrayLike
) -> Floats:
    """Greatest multiple of rated current whose full offset does not saturate the transformer.

    If / Ip = 20 / ((1 + X/R) * Zb / Zstd)

    Parameters
    ----------
    connected_burden_ohm : array_like
        Burden connected. [ohm]
    standard_burden_ohm : array_like
        Standard burden of the C class. [ohm]
    x_to_r_ratio : array_like
        Reactance over resistance of the primary circuit. [1]

    Returns
    -------
    ndarray
        Multiple of rated primary current; missing where an input is missing or a burden not positive. [1]

    Notes
    -----
    `offset_saturation_multiple` solved for the current.

    Examples
    --------
    C200, 0.5 ohm, X/R 12. By hand: 20 / (13 * 0.25) = 6.15.

    >>> greatest_unsaturated_multiple(0.5, 2.0, 12).round(2).item()
    6.15

    References
    ----------
    IEEE C37.110, criterion for freedom from saturation.
    """
    burden = above_zero(connected_burden_ohm) / above_zero(standard_burden_ohm)
    return floats(CLASS_MULTIPLE / ((1 + zero_or_more(x_to_r_ratio)) * burden))
