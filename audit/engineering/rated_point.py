"""What the plate of a motor says about itself: current, power, speed, slip, poles at the rated point."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, above_zero, floats, within, zero_or_more
from audit.engineering.unit_factors import KW_PER_HP, SQRT3

SLACK = 1e-9


def full_load_from_power_a(
    rated_power_kw: ArrayLike,
    rated_voltage_v: ArrayLike,
    efficiency_pct: ArrayLike,
    power_factor: ArrayLike,
) -> Floats:
    """Full-load current of a three-phase motor.

    I = P / (sqrt(3) * V * eff * pf)

    Parameters
    ----------
    rated_power_kw : array_like
        Rated shaft power. [kW]
    rated_voltage_v : array_like
        Rated voltage, line to line. [V]
    efficiency_pct : array_like
        Efficiency at full load. [%]
    power_factor : array_like
        Power factor at full load. [1]

    Returns
    -------
    ndarray
        Current; missing where an input is missing or not positive, efficiency above 100 per cent or power
        factor above 1. [A]

    Notes
    -----
    The rated point only, not a load by service factor or a part load.

    Examples
    --------
    75 kW, 400 V, 94.5 per cent, 0.86. By hand: 75000 / (692.82 * 0.8127) = 133.2 A.

    >>> full_load_from_power_a(75, 400, 94.5, 0.86).round(1).item()
    133.2

    References
    ----------
    Power equation.
    """
    efficiency = above_zero(within(efficiency_pct, 0.0, 100.0)) / 100
    factor = above_zero(within(power_factor, 0.0, 1.0))
    return floats(above_zero(rated_power_kw) * 1000 / (SQRT3 * above_zero(rated_voltage_v) * efficiency * factor))


def efficiency_times_power_factor(
    rated_power_kw: ArrayLike, rated_voltage_v: ArrayLike, full_load_a: ArrayLike
) -> Floats:
    """Product of efficiency and power factor that power, voltage and current of a plate imply.

    eff * pf = P / (sqrt(3) * V * I)

    Parameters
    ----------
    rated_power_kw : array_like
        Rated shaft power. [kW]
    rated_voltage_v : array_like
        Rated voltage, line to line. [V]
    full_load_a : array_like
        Full-load current. [A]

    Returns
    -------
    ndarray
        Product; missing where an input is missing or not positive. [1]

    Notes
    -----
    From about 0.55 to 0.93 for motors of 4 poles and some kilowatts. Outside, one of the three is wrong: a
    factor of 1.34 hints at horsepower taken for kilowatts, 1.73 at a phase value taken for a line value.

    Examples
    --------
    75 kW, 400 V, 133.2 A. By hand: 75000 / (692.82 * 133.2) = 0.813.

    >>> efficiency_times_power_factor(75, 400, 133.2).round(3).item()
    0.813

    References
    ----------
    Power equation; range common practice.
    """
    apparent = SQRT3 * above_zero(rated_voltage_v) * above_zero(full_load_a)
    return floats(above_zero(rated_power_kw) * 1000 / apparent)


def synchronous_speed_rpm(frequency_hz: ArrayLike, poles: ArrayLike) -> Floats:
    """Synchronous speed.

    n = 120 * f / p

    Parameters
    ----------
    frequency_hz : array_like
        Frequency. [Hz]
    poles : array_like
        Number of poles. [1]

    Returns
    -------
    ndarray
        Speed; missing where an input is missing or not positive. [r/min]

    Notes
    -----
    Poles, not pole pairs.

    Examples
    --------
    60 Hz, 4 poles. By hand: 7200 / 4 = 1800 rpm.

    >>> synchronous_speed_rpm(60, 4).item()
    1800.0

    References
    ----------
    Definition.
    """
    return floats(120 * above_zero(frequency_hz) / above_zero(poles))


def slip_pct(rated_speed_rpm: ArrayLike, frequency_hz: ArrayLike, poles: ArrayLike) -> Floats:
    """Slip at a speed.

    s = 100 * (ns - n) / ns

    Parameters
    ----------
    rated_speed_rpm : array_like
        Speed. [r/min]
    frequency_hz : array_like
        Frequency. [Hz]
    poles : array_like
        Number of poles. [1]

    Returns
    -------
    ndarray
        Slip, negative above synchronous speed; missing where an input is missing or out of its range. [%]

    Notes
    -----
    Rated slip of a cage motor: above 0, seldom more than 5 per cent.

    Examples
    --------
    1775 rpm, 60 Hz, 4 poles. By hand: 25 / 1800 = 1.389 per cent.

    >>> slip_pct(1775, 60, 4).round(3).item()
    1.389

    References
    ----------
    Definition.
    """
    synchronous = synchronous_speed_rpm(frequency_hz, poles)
    return floats(100 * (synchronous - zero_or_more(rated_speed_rpm)) / synchronous)


def poles_from_speed(rated_speed_rpm: ArrayLike, frequency_hz: ArrayLike) -> Floats:
    """Number of poles of a motor from its rated speed.

    The greatest even number not above 120 * f / n

    Parameters
    ----------
    rated_speed_rpm : array_like
        Rated speed. [r/min]
    frequency_hz : array_like
        Rated frequency. [Hz]

    Returns
    -------
    ndarray
        Number of poles; missing where an input is missing or not positive, or the speed above that of two
        poles. [1]

    Notes
    -----
    The slip that follows tells whether the answer is sensible: a speed that belongs to another frequency, or a
    hair above a synchronous speed, leaves a slip of ten per cent and more.

    Examples
    --------
    1775 rpm at 60 Hz. By hand: 7200 / 1775 = 4.056, 4 poles.

    >>> poles_from_speed(1775, 60).item()
    4.0

    References
    ----------
    Definition of synchronous speed.
    """
    count = 120 * above_zero(frequency_hz) / above_zero(rated_speed_rpm)
    even = 2 * np.floor(count * (1 + SLACK) / 2)
    return np.where(even >= 2, even, np.nan)


def power_from_hp_kw(rated_power_hp: ArrayLike) -> Floats:
    """Power in kilowatts from horsepower.

    1 hp = 550 ft lbf/s = 0.7457 kW

    Parameters
    ----------
    rated_power_hp : array_like
        Power in mechanical horsepower. [hp]

    Returns
    -------
    ndarray
        Power; missing where the input is missing or negative. [kW]

    Notes
    -----
    Not the metric horsepower (PS, cv), which is 0.7355 kW.

    Examples
    --------
    100 hp. By hand: 74.57 kW.

    >>> power_from_hp_kw(100).round(2).item()
    74.57

    References
    ----------
    Definition.
    """
    return floats(zero_or_more(rated_power_hp) * KW_PER_HP)


def power_from_kw_hp(rated_power_kw: ArrayLike) -> Floats:
    """Power in horsepower from kilowatts.

    1 kW = 1.341 hp

    Parameters
    ----------
    rated_power_kw : array_like
        Power. [kW]

    Returns
    -------
    ndarray
        Power in mechanical horsepower; missing where the input is missing or negative. [hp]

    Notes
    -----
    The inverse of `power_from_hp_kw`.

    Examples
    --------
    74.57 kW. By hand: 100.0 hp.

    >>> power_from_kw_hp(74.57).round(1).item()
    100.0

    References
    ----------
    Definition.
    """
    return floats(zero_or_more(rated_power_kw) / KW_PER_HP)
