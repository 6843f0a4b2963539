"""What unbalanced voltage does to a motor: negative-sequence current, and the load it can still carry."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, above_zero, floats, within, zero_or_more

# NEMA MG 1 figure 14-1, read off; no derating up to 1 per cent by the text of 14.36
CURVE_UNBALANCE_PCT = np.array([0.0, 1.0, 1.5, 2.0, 2.5, 3.0, 3.5, 4.0, 4.5, 5.0])
CURVE_DERATING = np.array([1.0, 1.0, 0.97, 0.95, 0.93, 0.89, 0.85, 0.82, 0.78, 0.76])
CURVE_ENDS_PCT = 5.0


def negative_sequence_current_pct(voltage_unbalance_pct: ArrayLike, locked_rotor_multiple: ArrayLike) -> Floats:
    """Negative-sequence current from voltage unbalance, in per cent of full-load current.

    I2 = u2 * ILR / IFL

    Parameters
    ----------
    voltage_unbalance_pct : array_like
        Negative-sequence voltage in per cent of rated voltage. [%]
    locked_rotor_multiple : array_like
        Locked-rotor current in multiples of full-load current. [1]

    Returns
    -------
    ndarray
        Negative-sequence current in per cent of full-load current; missing where an input is missing or
        negative. [%]

    Notes
    -----
    The rotor turns against the negative-sequence field at nearly twice synchronous speed, so the motor shows
    about its locked-rotor impedance. Independent of load.

    Examples
    --------
    2 per cent at 6 times. By hand: 12 per cent.

    >>> negative_sequence_current_pct(2, 6).item()
    12.0

    References
    ----------
    Derived from the equivalent circuit; IEC 60034-26.
    """
    return floats(zero_or_more(voltage_unbalance_pct) * zero_or_more(locked_rotor_multiple))


def negative_sequence_share_at_load_pct(
    voltage_unbalance_pct: ArrayLike, locked_rotor_multiple: ArrayLike, running_current_pu: ArrayLike
) -> Floats:
    """Negative-sequence current from voltage unbalance, in per cent of the running positive sequence.

    I2 / I1 = u2 * (ILR / IFL) / (I / IFL)

    Parameters
    ----------
    voltage_unbalance_pct : array_like
        Negative-sequence voltage in per cent of rated voltage. [%]
    locked_rotor_multiple : array_like
        Locked-rotor current in multiples of full-load current. [1]
    running_current_pu : array_like
        Running current over full-load current. [1]

    Returns
    -------
    ndarray
        Share; missing where an input is missing, negative, or the running current zero. [%]

    Notes
    -----
    For settings on the base I2/I1: the lighter the load, the greater the share. The running current is
    taken for its positive sequence.

    Examples
    --------
    1 per cent at 6 times, half load current. By hand: 12 per cent.

    >>> negative_sequence_share_at_load_pct(1, 6, 0.5).item()
    12.0

    References
    ----------
    Derived from the equivalent circuit.
    """
    of_full_load = negative_sequence_current_pct(voltage_unbalance_pct, locked_rotor_multiple)
    return floats(of_full_load / above_zero(running_current_pu))


def unbalance_derating_ratio(voltage_unbalance_pct: ArrayLike) -> Floats:
    """Share of rated power that a motor can carry on unbalanced voltage, by the published curve.

    Points of NEMA MG 1 figure 14-1, straight lines between them

    Parameters
    ----------
    voltage_unbalance_pct : array_like
        Unbalance by the deviation from the mean. [%]

    Returns
    -------
    ndarray
        Derating factor; missing above 5 per cent, where a motor should not run, and for a missing or negative
        input. [1]

    Notes
    -----
    Read off a figure: within 0.02.

    Examples
    --------
    2 per cent, from the curve: 0.95.

    >>> unbalance_derating_ratio(2).item()
    0.95

    References
    ----------
    NEMA MG 1, 14.36 and figure 14-1.
    """
    unbalance = within(voltage_unbalance_pct, 0.0, CURVE_ENDS_PCT)
    return floats(np.interp(unbalance, CURVE_UNBALANCE_PCT, CURVE_DERATING))


def unbalance_derating_by_heating_ratio(
    voltage_unbalance_pct: ArrayLike, unbalance_weight: ArrayLike, locked_rotor_multiple: ArrayLike
) -> Floats:
    """Share of rated current at which unbalance brings no more heat than rated operation.

    1 / sqrt(1 + q * (ILR / IFL * u2 / 100)^2)

    Parameters
    ----------
    voltage_unbalance_pct : array_like
        Negative-sequence voltage in per cent of positive sequence. [%]
    unbalance_weight : array_like
        Weight q of squared negative-sequence current in heating. [1]
    locked_rotor_multiple : array_like
        Locked-rotor current in multiples of full-load current. [1]

    Returns
    -------
    ndarray
        Derating factor; missing where an input is missing or negative. [1]

    Notes
    -----
    Negative-sequence current in proportion to load current. With q = 8 and 6 times it follows the
    published curve within 0.02: a test of whether a chosen weight is sensible.

    Examples
    --------
    2 per cent, q = 8, 6 times. By hand: 1 / sqrt(1 + 8 * 0.0144) = 0.947.

    >>> unbalance_derating_by_heating_ratio(2, 8, 6).round(3).item()
    0.947

    References
    ----------
    Derived from I1^2 + q * I2^2; Blackburn and Domin, Protective Relaying, motor chapter.
    """
    share = negative_sequence_current_pct(voltage_unbalance_pct, locked_rotor_multiple) / 100
    return floats(1 / np.sqrt(1 + zero_or_more(unbalance_weight) * share**2))


def open_phase_delta_winding_pu(line_current_pu: ArrayLike) -> Floats:
    """Greatest winding current of a delta-connected motor with one line open, over its rated winding current.

    i = 2 / 3 * I / (IFL / sqrt(3)) = 1.155 * I / IFL

    Parameters
    ----------
    line_current_pu : array_like
        Current in the two sound lines over full-load current. [1]

    Returns
    -------
    ndarray
        Current of the phase across the two lines; missing where the input is missing or negative. [1]

    Notes
    -----
    The phase across the sound lines lies in parallel to the two others in series, and like impedances share
    the current 2 to 1. A running motor's phases are not quite alike.

    Examples
    --------
    Rated line current. By hand: 0.66667 * 1.73205 = 1.155.

    >>> open_phase_delta_winding_pu(1).round(3).item()
    1.155

    References
    ----------
    Current divider; common practice.
    """
    return floats(2 / np.sqrt(3) * zero_or_more(line_current_pu))
