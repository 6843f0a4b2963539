"""Published limits of starting duty: starts an hour, rest, load inertia."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, above_zero, entry_at, floats, present, together, zero_or_more
from audit.engineering.unit_factors import KG_M2_PER_LB_FT2, KW_PER_HP

_HP = (1, 1.5, 2, 3, 5, 7.5, 10, 15, 20, 25, 30, 40, 50, 60, 75, 100, 125, 150, 200, 250)
_POLES = (2, 4, 6)
# NEMA MG 10 Table 2-3 per pole number: starts an hour; starts an hour times load WK2 in lb ft2; rest in seconds
_STARTS_PER_HOUR = (
    (15, 12.9, 11.5, 9.9, 8.1, 7.0, 6.2, 5.4, 4.8, 4.4, 4.1, 3.7, 3.4, 3.2, 2.9, 2.6, 2.4, 2.2, 2.0, 1.8),
    (30, 25.7, 23, 19.8, 16.3, 13.9, 12.5, 10.7, 9.6, 8.8, 8.2, 7.4, 6.8, 6.3, 5.8, 5.2, 4.8, 4.5, 4.0, 3.7),
    (34, 29.1, 26.1, 22.4, 18.4, 15.8, 14.2, 12.1, 10.9, 10, 9.3, 8.4, 7.7, 7.2, 6.6, 5.9, 5.4, 5.1, 4.5, 4.2),
)
_STARTS_TIMES_LB_FT2 = (
    (1.2, 1.8, 2.4, 3.5, 5.7, 8.3, 11, 16, 21, 26, 31, 40, 49, 58, 71, 92, 113, 133, 172, 210),
    (5.8, 8.6, 11, 17, 27, 39, 51, 75, 99, 122, 144, 189, 232, 275, 338, 441, 542, 640, 831, 1017),
    (15, 23, 30, 44, 71, 104, 137, 200, 262, 324, 384, 503, 620, 735, 904, 1181, 1452, 1719, 2238, 2744),
)
_REST_S = (
    (75, 76, 77, 80, 83, 88, 92, 100, 110, 115, 120, 130, 145, 170, 180, 220, 275, 320, 600, 1000),
    (38, 38, 39, 40, 42, 44, 46, 50, 55, 58, 60, 65, 72, 85, 90, 110, 140, 160, 300, 500),
    (33, 34, 35, 36, 37, 39, 41, 44, 48, 51, 53, 57, 64, 75, 79, 97, 120, 140, 265, 440),
)
_ROW_SLACK = 1.01


def _entry(table: tuple[tuple[float, ...], ...], power_kw: Floats, poles: Floats) -> Floats:
    """Entry of the listed horsepower, or of the next larger one, which is allowed less."""
    column = np.searchsorted(_HP, power_kw / KW_PER_HP / _ROW_SLACK, side="left")
    row = np.searchsorted(_POLES, poles, side="left")
    known = (power_kw > 0) & (column < len(_HP)) & np.isin(poles, _POLES)
    return entry_at(np.array(table, dtype=np.float64).ravel(), np.where(known, row * len(_HP) + column, -1))


def usual_starts_per_hour(power_kw: ArrayLike, poles: ArrayLike, load_inertia_kgm2: ArrayLike = 0.0) -> Floats:
    """Starts an hour that a general-purpose motor is usually allowed.

    n = min(A, B / WK^2)

    Parameters
    ----------
    power_kw : array_like
        Rated power. [kW]
    poles : array_like
        Number of poles: 2, 4 or 6. [1]
    load_inertia_kgm2 : array_like
        Inertia of the driven machine referred to the motor shaft; zero leaves A alone. [kg m2]

    Returns
    -------
    ndarray
        Starts an hour, not a whole number. [1/h]

    Notes
    -----
    Designs A and B, low voltage, 60 Hz, 1 to 250 hp, load torque rising with the square of the speed. Powers
    between two rows read the larger one, which is allowed less. Rest between starts is a limit of its own.
    Missing where an input is missing, the inertia negative, the power above 250 hp or the poles others.

    Examples
    --------
    25 hp, 4 poles, WK^2 = 50 lb ft2 = 2.107 kg m2. By hand: min(8.8, 122 / 50) = 2.44.

    >>> usual_starts_per_hour(18.64, 4, 2.107).round(2).item()
    2.44

    References
    ----------
    NEMA MG 10, Table 2-3: eight rows from copies, the others from memory, held against MG 1 12.54's formula.
    """
    power, pole_number, inertia = together(power_kw, poles, load_inertia_kgm2)
    wk2 = zero_or_more(inertia) / KG_M2_PER_LB_FT2
    with np.errstate(divide="ignore"):
        by_inertia = _entry(_STARTS_TIMES_LB_FT2, power, pole_number) / wk2
    return floats(np.minimum(_entry(_STARTS_PER_HOUR, power, pole_number), by_inertia))


def usual_starts_times_inertia_kgm2_per_hour(power_kw: ArrayLike, poles: ArrayLike) -> Floats:
    """Product of starts an hour and load inertia that a general-purpose motor is usually allowed.

    B of n = min(A, B / WK^2)

    Parameters
    ----------
    power_kw : array_like
        Rated power. [kW]
    poles : array_like
        Number of poles: 2, 4 or 6. [1]

    Returns
    -------
    ndarray
        Starts an hour times inertia. [kg m2/h]

    Notes
    -----
    As for usual_starts_per_hour.

    Examples
    --------
    100 hp, 4 poles, from the table 441 lb ft2 an hour. By hand: 441 * 0.0421401 = 18.58 kg m2 an hour.

    >>> usual_starts_times_inertia_kgm2_per_hour(74.57, 4).round(2).item()
    18.58

    References
    ----------
    NEMA MG 10, Table 2-3: eight rows from copies, the others from memory, held against MG 1 12.54's formula.
    """
    return floats(_entry(_STARTS_TIMES_LB_FT2, *together(power_kw, poles)) * KG_M2_PER_LB_FT2)


def least_rest_time_s(power_kw: ArrayLike, poles: ArrayLike) -> Floats:
    """Least time at rest between two starts of a general-purpose motor.

    Parameters
    ----------
    power_kw : array_like
        Rated power. [kW]
    poles : array_like
        Number of poles: 2, 4 or 6. [1]

    Returns
    -------
    ndarray
        Rest. [s]

    Notes
    -----
    As for usual_starts_per_hour.

    Examples
    --------
    100 hp, 4 poles, from the table 110 s.

    >>> least_rest_time_s(74.57, 4).item()
    110.0

    References
    ----------
    NEMA MG 10, Table 2-3: eight rows from copies, the others from memory.
    """
    return _entry(_REST_S, *together(power_kw, poles))


def nema_load_inertia_limit_kgm2(power_kw: ArrayLike, synchronous_speed_rpm: ArrayLike) -> Floats:
    """Load inertia that a medium cage motor can bring up to speed twice from cold or once from hot.

    WK^2 = A * hp^0.95 / (n / 1000)^2.4 - 0.0685 * hp^1.5 / (n / 1000)^1.8, A = 24, or 27 at 3600 r/min

    Parameters
    ----------
    power_kw : array_like
        Rated power. [kW]
    synchronous_speed_rpm : array_like
        Synchronous speed. [r/min]

    Returns
    -------
    ndarray
        Greatest inertia of the driven machine referred to the motor shaft. [kg m2]

    Notes
    -----
    Load torque rising with the square of the speed to rated torque, rated voltage and frequency, 60 Hz.
    Validity: to 500 hp at 3600 and 1800 r/min, 350 hp at 1200, 250 hp at 900 and below; missing beyond, and
    where an input is missing or not above zero. The formula meets the printed table within 1.2 %.

    Examples
    --------
    100 hp, 1800 r/min. By hand: 24 * 79.43 / 4.099 - 0.0685 * 1000 / 2.881 = 441.3 lb ft2; * 0.0421401 =
    18.6 kg m2.

    >>> nema_load_inertia_limit_kgm2(74.57, 1800).round(1).item()
    18.6

    References
    ----------
    NEMA MG 1 12.54 and Table 12-7; formula from memory, held against a copy of the table.
    """
    power, speed = together(power_kw, synchronous_speed_rpm)
    horsepower = above_zero(power) / KW_PER_HP
    thousands = above_zero(speed) / 1000.0
    factor = np.where(speed > 1800.0, 27.0, 24.0)
    largest = np.where(speed >= 1800.0, 500.0, np.where(speed >= 1200.0, 350.0, 250.0))
    limit = factor * horsepower**0.95 / thousands**2.4 - 0.0685 * horsepower**1.5 / thousands**1.8
    usable = present(power, speed) & (horsepower <= largest * _ROW_SLACK) & (speed <= 3600.0)
    return np.where(usable, limit * KG_M2_PER_LB_FT2, np.nan)


def iec_external_inertia_limit_kgm2(power_kw: ArrayLike, pole_pairs: ArrayLike) -> Floats:
    """Load inertia that a cage motor of design N must be able to start.

    J = 0.04 * P^0.9 * p^2.5

    Parameters
    ----------
    power_kw : array_like
        Rated power. [kW]
    pole_pairs : array_like
        Number of pole pairs. [1]

    Returns
    -------
    ndarray
        Greatest external inertia referred to the motor shaft. [kg m2]

    Notes
    -----
    Twice in succession from cold or once from hot, load torque rising with the square of the speed, rated
    voltage and frequency. For 0.4 to 630 kW, low voltage, direct start; missing outside and where an input is
    missing or the pole pairs are fewer than one.

    Examples
    --------
    1 kW, two pole pairs. By hand: 0.04 * 2^2.5 = 0.2263 kg m2.

    >>> iec_external_inertia_limit_kgm2(1, 2).round(4).item()
    0.2263

    References
    ----------
    IEC 60034-12, starting requirements, from memory.
    """
    power, pairs = together(power_kw, pole_pairs)
    usable = (power >= 0.4) & (power <= 630.0) & (pairs >= 1)
    with np.errstate(invalid="ignore"):
        return np.where(usable, 0.04 * power**0.9 * pairs**2.5, np.nan)
