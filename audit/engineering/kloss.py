"""Motor torque after Kloss and the run-up time it gives, for motors without a torque curve."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, above_zero, floats, present, together, within, zero_or_more
from audit.engineering.unit_factors import RADIANS_PER_SECOND_PER_RPM

_PANELS = 24
_NODES = 16


def kloss_torque_nm(slip_pu: ArrayLike, breakdown_torque_nm: ArrayLike, breakdown_slip_pu: ArrayLike) -> Floats:
    """Torque of an induction motor at a slip, from its breakdown point.

    T = 2 * Tk / (s / sk + sk / s)

    Parameters
    ----------
    slip_pu : array_like
        Slip; 1 at standstill. [1]
    breakdown_torque_nm : array_like
        Breakdown torque. [N m]
    breakdown_slip_pu : array_like
        Slip at breakdown torque. [1]

    Returns
    -------
    ndarray
        Torque. [N m]

    Notes
    -----
    Stator resistance left out. Deep-bar and double-cage rotors give more torque at standstill than this, so
    run-up times come out long. Missing where an input is missing or negative or the breakdown slip is zero.

    Examples
    --------
    At the breakdown slip, and at standstill with sk = 0.1. By hand: 2 * 1000 / (10 + 0.1) = 198 N m.

    >>> kloss_torque_nm([0.1, 1.0], 1000, 0.1).round(1).tolist()
    [1000.0, 198.0]

    References
    ----------
    Formula of Kloss, in any textbook on electrical machines.
    """
    relative = zero_or_more(slip_pu) / above_zero(breakdown_slip_pu)
    return floats(2.0 * zero_or_more(breakdown_torque_nm) * relative / (relative**2 + 1.0))


def breakdown_slip_pu(rated_slip_pu: ArrayLike, breakdown_torque_multiple: ArrayLike) -> Floats:
    """Slip at breakdown torque from the rated point.

    sk = sn * (m + sqrt(m^2 - 1))

    Parameters
    ----------
    rated_slip_pu : array_like
        Slip at rated load. [1]
    breakdown_torque_multiple : array_like
        Breakdown torque in multiples of rated torque. [1]

    Returns
    -------
    ndarray
        Slip at breakdown torque. [1]

    Notes
    -----
    From the formula of Kloss at the rated point. Missing where an input is missing, the slip not above zero
    or the multiple below 1.

    Examples
    --------
    2 % slip, 2.5 times. By hand: 0.02 * (2.5 + sqrt(5.25)) = 0.0958.

    >>> breakdown_slip_pu(0.02, 2.5).round(4).item()
    0.0958

    References
    ----------
    Formula of Kloss solved for the breakdown slip.
    """
    multiple = within(breakdown_torque_multiple, 1.0, np.inf)
    return floats(above_zero(rated_slip_pu) * (multiple + np.sqrt(multiple**2 - 1.0)))


def run_up_time_kloss_s(
    inertia_kgm2: ArrayLike,
    synchronous_speed_rpm: ArrayLike,
    breakdown_torque_nm: ArrayLike,
    breakdown_slip_pu: ArrayLike,
    load_torque_nm: ArrayLike,
    load_exponent: ArrayLike = 2.0,
    end_speed_pu: ArrayLike = 0.95,
    voltage_pu: ArrayLike = 1.0,
) -> Floats:
    """Run-up time from standstill with the motor torque after Kloss and a load that follows a power of speed.

    t = J * ws * integral from 0 to x_end of dx / (V^2 * T(1 - x) - TL * x^k)

    Parameters
    ----------
    inertia_kgm2 : array_like
        Inertia of motor and driven machine, referred to the motor shaft. [kg m2]
    synchronous_speed_rpm : array_like
        Synchronous speed. [r/min]
    breakdown_torque_nm : array_like
        Breakdown torque at rated voltage. [N m]
    breakdown_slip_pu : array_like
        Slip at breakdown torque. [1]
    load_torque_nm : array_like
        Torque of the driven machine at synchronous speed. [N m]
    load_exponent : array_like
        0 constant torque (conveyor), 1 rising in proportion, 2 with the square of the speed (pump, fan). [1]
    end_speed_pu : array_like
        Speed at which the start counts as done, in parts of synchronous speed. [1]
    voltage_pu : array_like
        Terminal voltage during the start, in parts of the rated. [1]

    Returns
    -------
    ndarray
        Run-up time; infinite where the motor does not get past the load. [s]

    Notes
    -----
    Steady-state torque, voltage constant during the start, breakaway torque left out. Close to a stall the
    time depends on the last per cent of torque. Missing where an input is missing or negative, inertia,
    speed, torque or slip not above zero, or the end speed not below 1.

    Examples
    --------
    50 kg m2, 1500 r/min, 7500 N m at 12 % slip, pump of 3000 N m, to 90 % speed: 2.69 s published; without
    load by hand J ws / (2 Tk) * ((1 - 0.01) / (2 sk) + sk ln 10) = 0.5236 * (4.125 + 0.2763) = 2.30 s.

    >>> run_up_time_kloss_s(50, 1500, 7500, 0.12, [3000, 0], 2, 0.9).round(2).tolist()
    [2.69, 2.3]

    References
    ----------
    Equation of motion of a rigid shaft, formula of Kloss; torque proportional to the square of the voltage.
    """
    inertia, speed, breakdown, slip, load, exponent, end, voltage = together(
        above_zero(inertia_kgm2),
        above_zero(synchronous_speed_rpm),
        above_zero(breakdown_torque_nm),
        above_zero(breakdown_slip_pu),
        zero_or_more(load_torque_nm),
        zero_or_more(load_exponent),
        zero_or_more(end_speed_pu),
        zero_or_more(voltage_pu),
    )
    usable = present(inertia, speed, breakdown, slip, load, exponent, end, voltage) & (end < 1.0)
    points, weights = np.polynomial.legendre.leggauss(_NODES)
    integral, least = np.zeros_like(end), np.full_like(end, np.inf)
    with np.errstate(divide="ignore", invalid="ignore"):
        # node by node rather than in one block, so that memory does not grow with the number of nodes
        for panel in range(_PANELS):
            for point, weight in zip(points, weights, strict=True):
                x = end * (panel + (point + 1.0) / 2) / _PANELS
                net = voltage**2 * kloss_torque_nm(1.0 - x, breakdown, slip) - load * x**exponent
                least = np.minimum(least, net)
                integral += end * weight / (2 * _PANELS) / net
        # both ends too: a load of constant torque may already hold the motor at standstill
        for x in (np.zeros_like(end), end):
            net = voltage**2 * kloss_torque_nm(1.0 - x, breakdown, slip) - load * x**exponent
            least = np.minimum(least, net)
        time = inertia * speed * RADIANS_PER_SECOND_PER_RPM * integral
    return np.where(usable, np.where(least > 0, time, np.inf), np.nan)
