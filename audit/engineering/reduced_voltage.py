"""What the starting method makes of start current and torque: voltage, star-delta, tap, current limit."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, above_zero, floats, within, zero_or_more

_STAR_DELTA_SHARE = 1.0 / 3.0


def torque_at_voltage_nm(torque_nm: ArrayLike, voltage_pu: ArrayLike) -> Floats:
    """Motor torque at another terminal voltage than rated, same speed.

    T = Tr * V^2

    Parameters
    ----------
    torque_nm : array_like
        Torque at rated voltage. [N m]
    voltage_pu : array_like
        Terminal voltage in parts of the rated. [1]

    Returns
    -------
    ndarray
        Torque at that voltage. [N m]

    Notes
    -----
    Linear magnetic circuit, rated frequency; with saturation the torque falls a little faster. Missing where
    an input is missing or negative.

    Examples
    --------
    By hand: 1000 * 0.8^2 = 640 N m.

    >>> torque_at_voltage_nm(1000, 0.8).round(6).item()
    640.0

    References
    ----------
    Equivalent circuit of the induction motor, torque proportional to the square of the voltage.
    """
    return floats(zero_or_more(torque_nm) * zero_or_more(voltage_pu) ** 2)


def star_delta_start_current_a(locked_rotor_a: ArrayLike) -> Floats:
    """Line current of a star-delta start while in star.

    I = ILR / 3

    Parameters
    ----------
    locked_rotor_a : array_like
        Line current of a direct start in delta at rated voltage. [A]

    Returns
    -------
    ndarray
        Line current in star. [A]

    Notes
    -----
    The step to delta draws up to the direct start current again, and more for an instant on an open
    transition: protection must ride through that step. Missing where missing or negative.

    Examples
    --------
    By hand: 600 / 3 = 200 A.

    >>> star_delta_start_current_a(600).round(6).item()
    200.0

    References
    ----------
    Phase voltage 1/sqrt(3) and line current of a star against a delta, 1/3 together.
    """
    return floats(zero_or_more(locked_rotor_a) * _STAR_DELTA_SHARE)


def star_delta_start_torque_nm(locked_rotor_torque_nm: ArrayLike) -> Floats:
    """Torque of a star-delta start while in star.

    T = TLR / 3

    Parameters
    ----------
    locked_rotor_torque_nm : array_like
        Torque of a direct start in delta at rated voltage. [N m]

    Returns
    -------
    ndarray
        Torque in star. [N m]

    Notes
    -----
    The square of the phase voltage. Missing where missing or negative.

    Examples
    --------
    By hand: 900 / 3 = 300 N m.

    >>> star_delta_start_torque_nm(900).round(6).item()
    300.0

    References
    ----------
    Torque proportional to the square of the phase voltage, (1/sqrt(3))^2.
    """
    return floats(zero_or_more(locked_rotor_torque_nm) * _STAR_DELTA_SHARE)


def autotransformer_line_current_a(locked_rotor_a: ArrayLike, tap_pu: ArrayLike) -> Floats:
    """Line current of an autotransformer start.

    I = ILR * a^2

    Parameters
    ----------
    locked_rotor_a : array_like
        Line current of a direct start at rated voltage. [A]
    tap_pu : array_like
        Tap: motor voltage in parts of the line voltage, above 0 to 1. [1]

    Returns
    -------
    ndarray
        Line current ahead of the autotransformer. [A]

    Notes
    -----
    Magnetizing current of the autotransformer (some tens of per cent of the motor's full load) left out.
    Missing where an input is missing or negative or the tap is not above 0 and at most 1.

    Examples
    --------
    65 % tap. By hand: 600 * 0.65^2 = 253.5 A.

    >>> autotransformer_line_current_a(600, 0.65).round(1).item()
    253.5

    References
    ----------
    Ideal transformer on a constant impedance.
    """
    tap = above_zero(within(tap_pu, 0, 1))
    return floats(zero_or_more(locked_rotor_a) * tap**2)


def autotransformer_motor_current_a(locked_rotor_a: ArrayLike, tap_pu: ArrayLike) -> Floats:
    """Motor current of an autotransformer start, for CTs behind the autotransformer.

    I = ILR * a

    Parameters
    ----------
    locked_rotor_a : array_like
        Line current of a direct start at rated voltage. [A]
    tap_pu : array_like
        Tap: motor voltage in parts of the line voltage, above 0 to 1. [1]

    Returns
    -------
    ndarray
        Current in the motor's leads. [A]

    Notes
    -----
    Constant impedance. Missing where an input is missing or negative or the tap is not above 0 and at most 1.

    Examples
    --------
    65 % tap. By hand: 600 * 0.65 = 390 A.

    >>> autotransformer_motor_current_a(600, 0.65).round(6).item()
    390.0

    References
    ----------
    Ideal transformer on a constant impedance.
    """
    return floats(zero_or_more(locked_rotor_a) * above_zero(within(tap_pu, 0, 1)))


def soft_start_current_a(
    current_limit_multiple: ArrayLike, full_load_a: ArrayLike, locked_rotor_a: ArrayLike
) -> Floats:
    """Line current of a start with current limit.

    I = min(c * IFL, ILR)

    Parameters
    ----------
    current_limit_multiple : array_like
        Set current limit in multiples of full-load current. [1]
    full_load_a : array_like
        Full-load current that the limit refers to. [A]
    locked_rotor_a : array_like
        Line current of a direct start at rated voltage. [A]

    Returns
    -------
    ndarray
        Line current during the start. [A]

    Notes
    -----
    Fundamental only. A start over the bypass draws the direct start current: that case decides where it is
    possible. Missing where an input is missing or negative.

    Examples
    --------
    By hand: 3.5 * 100 = 350 A, less than 600 A.

    >>> soft_start_current_a(3.5, 100, 600).item()
    350.0

    References
    ----------
    Common practice.
    """
    limited = zero_or_more(current_limit_multiple) * zero_or_more(full_load_a)
    return floats(np.minimum(limited, zero_or_more(locked_rotor_a)))


def soft_start_torque_nm(
    locked_rotor_torque_nm: ArrayLike, start_current_a: ArrayLike, locked_rotor_a: ArrayLike
) -> Floats:
    """Torque at standstill that a limited start current leaves.

    T = TLR * (I / ILR)^2

    Parameters
    ----------
    locked_rotor_torque_nm : array_like
        Torque of a direct start at rated voltage. [N m]
    start_current_a : array_like
        Limited start current; above the direct start current it counts as that. [A]
    locked_rotor_a : array_like
        Line current of a direct start at rated voltage. [A]

    Returns
    -------
    ndarray
        Torque at standstill. [N m]

    Notes
    -----
    Current proportional to the voltage, torque to its square. Missing where an input is missing or negative
    or the direct start current is zero.

    Examples
    --------
    By hand: 900 * (300 / 600)^2 = 225 N m.

    >>> soft_start_torque_nm(900, 300, 600).item()
    225.0

    References
    ----------
    Equivalent circuit of the induction motor.
    """
    share = np.minimum(zero_or_more(start_current_a) / above_zero(locked_rotor_a), 1.0)
    return floats(zero_or_more(locked_rotor_torque_nm) * share**2)
