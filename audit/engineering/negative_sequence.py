"""Heat of unbalanced currents: weighting, equivalent current, one phase open."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, present, together
from audit.engineering.unit_factors import SQRT3


def _weight(constant: float, locked_rotor_multiple: ArrayLike) -> Floats:
    (multiple,) = together(locked_rotor_multiple)
    with np.errstate(divide="ignore", invalid="ignore"):
        return np.where(multiple > 0, constant / multiple**2, np.nan)


def typical_unbalance_weight(locked_rotor_multiple: ArrayLike) -> Floats:
    """Weight of negative-sequence current in the rotor's heat, usual estimate.

    q = 175 / ILR^2, ILR in multiples of full-load current

    Parameters
    ----------
    locked_rotor_multiple : array_like
        Locked-rotor current in multiples of full-load current. [1]

    Returns
    -------
    ndarray
        Weight q of the squared negative-sequence current. [1]

    Notes
    -----
    Stands for the ratio of rotor resistance at slip 2 - s to that at slip s of a cage motor with about rated
    starting torque. Missing for a multiple that is missing or not above zero.

    Examples
    --------
    Five times full load. By hand: 175 / 25 = 7.

    >>> typical_unbalance_weight(5.0).item()
    7.0

    References
    ----------
    Blackburn and Domin, Protective Relaying: Principles and Applications, motor chapter.
    """
    return _weight(175.0, locked_rotor_multiple)


def conservative_unbalance_weight(locked_rotor_multiple: ArrayLike) -> Floats:
    """Weight of negative-sequence current in the rotor's heat, estimate on the safe side.

    q = 230 / ILR^2, ILR in multiples of full-load current

    Parameters
    ----------
    locked_rotor_multiple : array_like
        Locked-rotor current in multiples of full-load current. [1]

    Returns
    -------
    ndarray
        Weight q of the squared negative-sequence current. [1]

    Notes
    -----
    About 30 % above the usual estimate. Missing for a multiple that is missing or not above zero.

    Examples
    --------
    Five times full load. By hand: 230 / 25 = 9.2.

    >>> conservative_unbalance_weight(5.0).item()
    9.2

    References
    ----------
    Common practice, seen second-hand only; no standard clause known.
    """
    return _weight(230.0, locked_rotor_multiple)


def equivalent_current_a(
    positive_sequence_a: ArrayLike, negative_sequence_a: ArrayLike, unbalance_weight: ArrayLike
) -> Floats:
    """Balanced current that heats the motor as much as the unbalanced one.

    Ieq = sqrt(I1^2 + q * I2^2)

    Parameters
    ----------
    positive_sequence_a : array_like
        Positive-sequence current. [A]
    negative_sequence_a : array_like
        Negative-sequence current. [A]
    unbalance_weight : array_like
        Weight q of the squared negative-sequence current. [1]

    Returns
    -------
    ndarray
        Equivalent current, for use in the thermal curves. [A]

    Notes
    -----
    The rotor's extra heat as if spread over the whole thermal model. Missing where an input is missing or
    negative.

    Examples
    --------
    100 A with 10 % unbalance, q = 6. By hand: sqrt(100^2 + 6 * 10^2) = sqrt(10600) = 102.96 A.

    >>> equivalent_current_a(100, 10, 6).round(2).item()
    102.96

    References
    ----------
    IEEE C37.96 and Blackburn and Domin, Protective Relaying, motor chapter.
    """
    positive, negative, weight = together(positive_sequence_a, negative_sequence_a, unbalance_weight)
    usable = present(positive, negative, weight) & (positive >= 0) & (negative >= 0) & (weight >= 0)
    with np.errstate(invalid="ignore"):
        return np.where(usable, np.sqrt(positive**2 + weight * negative**2), np.nan)


def open_phase_line_current_a(load_current_a: ArrayLike) -> Floats:
    """Current in the two sound lines when one line opens and the motor keeps its load.

    I = sqrt(3) * Iload

    Parameters
    ----------
    load_current_a : array_like
        Balanced line current before the line opened. [A]

    Returns
    -------
    ndarray
        Line current afterwards. [A]

    Notes
    -----
    Same power, voltage and power factor on two lines, losses neglected; the true figure is a little higher as
    the slip rises. The motor may instead pull out: then the current is near sqrt(3)/2 of locked rotor.
    Missing for a missing or negative current.

    Examples
    --------
    By hand: 1.732 * 60 = 103.9 A.

    >>> open_phase_line_current_a(60).round(1).item()
    103.9

    References
    ----------
    Equal power on one phase-to-phase voltage; common practice.
    """
    (load,) = together(load_current_a)
    return np.where(load >= 0, SQRT3 * load, np.nan)


def open_phase_sequence_current_a(line_current_a: ArrayLike) -> Floats:
    """Positive- and negative-sequence current (they are equal) when one line is open.

    I1 = I2 = I / sqrt(3)

    Parameters
    ----------
    line_current_a : array_like
        Current in the two sound lines. [A]

    Returns
    -------
    ndarray
        Magnitude of either sequence current. [A]

    Notes
    -----
    Exact for Ia = 0, Ic = -Ib. Missing for a missing or negative current.

    Examples
    --------
    By hand: 103.92 / 1.7321 = 60 A.

    >>> open_phase_sequence_current_a(103.923).round(2).item()
    60.0

    References
    ----------
    Symmetrical components of an open phase, as in Blackburn and Domin, Protective Relaying.
    """
    (line,) = together(line_current_a)
    return np.where(line >= 0, line / SQRT3, np.nan)


def open_phase_equivalent_current_a(line_current_a: ArrayLike, unbalance_weight: ArrayLike) -> Floats:
    """Balanced current that heats the motor as much as running on two lines.

    Ieq = I * sqrt((1 + q) / 3)

    Parameters
    ----------
    line_current_a : array_like
        Current in the two sound lines. [A]
    unbalance_weight : array_like
        Weight q of the squared negative-sequence current. [1]

    Returns
    -------
    ndarray
        Equivalent current, for use in the thermal curves. [A]

    Notes
    -----
    Missing where an input is missing or negative.

    Examples
    --------
    100 A in two lines, q = 6. By hand: 100 * sqrt(7 / 3) = 152.8 A.

    >>> open_phase_equivalent_current_a(100, 6).round(1).item()
    152.8

    References
    ----------
    Equivalent current of Blackburn and Domin with the two equal sequence currents of an open phase.
    """
    sequence = open_phase_sequence_current_a(line_current_a)
    return equivalent_current_a(sequence, sequence, unbalance_weight)


def unbalance_heating_time_s(
    negative_sequence_a: ArrayLike, full_load_a: ArrayLike, heating_limit_s: ArrayLike
) -> Floats:
    """Time until negative-sequence current, an open phase above all, has used up the rotor's heat reserve.

    t = K / (I2 / IFL)^2

    Parameters
    ----------
    negative_sequence_a : array_like
        Negative-sequence current. [A]
    full_load_a : array_like
        Rated current of the motor. [A]
    heating_limit_s : array_like
        K, the time that negative-sequence current of the size of full-load current can be borne. [s]

    Returns
    -------
    ndarray
        Time; infinite without negative-sequence current. [s]

    Notes
    -----
    No heat given off (adiabatic): for minutes at the most, and short of the truth for small unbalance, where
    the thermal curve with the equivalent current is the better judge. The maker's K comes first; 40 s is a
    usual figure where none is given. Missing where an input is missing, a current negative, full load or K
    not above zero.

    Examples
    --------
    An open phase at full load in delta or star: line current 1.732 times, I2 equal to full load; K = 40 s.
    By hand: 40 / 1^2 = 40 s; at half that I2 four times as long.

    >>> unbalance_heating_time_s([100, 50], 100, 40).tolist()
    [40.0, 160.0]

    References
    ----------
    Form I2^2 t = K as in Blackburn and Domin, Protective Relaying; the figure of 40 s is common practice,
    from memory.
    """
    negative, full_load, limit = together(negative_sequence_a, full_load_a, heating_limit_s)
    usable = present(negative, full_load, limit) & (negative >= 0) & (full_load > 0) & (limit > 0)
    with np.errstate(divide="ignore", invalid="ignore"):
        return np.where(usable, limit / (negative / full_load) ** 2, np.nan)
