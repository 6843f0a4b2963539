"""Successive starts on the thermal model: their heat, how many it permits and how long to wait."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, present, together
from audit.engineering.thermal_level import thermal_level_after_pu


def start_heat_pu(
    start_current_a: ArrayLike, start_time_s: ArrayLike, pickup_a: ArrayLike, time_constant_s: ArrayLike
) -> Floats:
    """Thermal level that one start leaves behind in a cold motor.

    theta = (I / Ip)^2 * (1 - exp(-t / tau))

    Parameters
    ----------
    start_current_a : array_like
        Start current, taken as constant over the start. [A]
    start_time_s : array_like
        Start time. [s]
    pickup_a : array_like
        Current that the element finally trips at. [A]
    time_constant_s : array_like
        Heating time constant. [s]

    Returns
    -------
    ndarray
        Thermal level; 1 trips. [1]

    Notes
    -----
    Upper estimate: the current falls towards the end of a start. Missing where an input is missing or
    negative, or pickup or time constant is not above zero.

    Examples
    --------
    600 A for 8 s, pickup 100 A, 10 min. By hand: 36 * (1 - exp(-0.013333)) = 0.477.

    >>> start_heat_pu(600, 8, 100, 600).round(3).item()
    0.477

    References
    ----------
    IEC 60255-149, first-order thermal model.
    """
    current, time, pickup, constant = together(start_current_a, start_time_s, pickup_a, time_constant_s)
    usable = (current >= 0) & (pickup > 0)
    with np.errstate(divide="ignore", invalid="ignore"):
        target = np.where(usable, (current / pickup) ** 2, np.nan)
    return thermal_level_after_pu(0.0, target, constant, time)


def permitted_starts(
    start_current_a: ArrayLike,
    start_time_s: ArrayLike,
    pickup_a: ArrayLike,
    heating_time_constant_s: ArrayLike,
    initial_level_pu: ArrayLike = 0.0,
    rest_time_s: ArrayLike = 0.0,
    cooling_time_constant_s: ArrayLike = np.inf,
) -> Floats:
    """Number of successive starts that a thermal element lets through without tripping.

    y_k = T * (1 - E) + E * R * y_(k-1) < 1, T = (I / Ip)^2, E = exp(-t / tau), R = exp(-rest / tau_c)

    Parameters
    ----------
    start_current_a : array_like
        Start current, taken as constant over each start. [A]
    start_time_s : array_like
        Start time. [s]
    pickup_a : array_like
        Current that the element finally trips at. [A]
    heating_time_constant_s : array_like
        Heating time constant. [s]
    initial_level_pu : array_like
        Thermal level before the first start; the steady level of the load for starts from hot. [1]
    rest_time_s : array_like
        Rest between one start and the next. [s]
    cooling_time_constant_s : array_like
        Time constant at rest. [s]

    Returns
    -------
    ndarray
        Whole number of starts; infinite where the level never gets to the trip however many follow. [1]

    Notes
    -----
    Closed form of the sequence, so no count is cut off. The time at load between starts is left out. Missing
    where an input is missing or negative, or pickup or a time constant is not above zero.

    Examples
    --------
    Each start heats a cold motor to 0.4768 (600 A, 8 s, 100 A, 10 min), no rest. By hand: second start ends
    at 36 * (1 - exp(-16 / 600)) = 0.947, the third at 1.411, so two starts; from a level of 0.75 the first
    ends at 1.217, so none.

    >>> permitted_starts(600, 8, 100, 600, [0, 0.75]).tolist()
    [2.0, 0.0]

    References
    ----------
    IEC 60255-149, first-order thermal model; two starts cold and one hot are the usual need, NEMA MG 1 12.54.
    """
    current, time, pickup, heating, initial, rest, cooling = together(
        start_current_a,
        start_time_s,
        pickup_a,
        heating_time_constant_s,
        initial_level_pu,
        rest_time_s,
        cooling_time_constant_s,
    )
    rise = start_heat_pu(current, time, pickup, heating)
    usable = present(rise, initial, rest, cooling) & (initial >= 0) & (rest >= 0) & (cooling > 0)
    with np.errstate(divide="ignore", invalid="ignore"):
        first = rise + initial * np.exp(-time / heating)
        decay = time / heating + rest / cooling
        final = rise / -np.expm1(-decay)
        # y_k = final - (final - first) * exp(-(k - 1) * decay): the last k below 1 is the ceiling of this
        count = np.ceil(np.log((final - first) / (final - 1.0)) / decay)
    count = np.where(final > 1.0, count, np.inf)
    count = np.where((rise == 0.0) & (initial < 1.0), np.inf, count)
    count = np.where(first >= 1.0, 0.0, count)
    return np.where(usable, count, np.nan)


def cooling_time_s(level_pu: ArrayLike, permitted_level_pu: ArrayLike, cooling_time_constant_s: ArrayLike) -> Floats:
    """Time that a motor at rest needs to cool from one thermal level to another.

    t = tau_c * ln(theta / theta_permitted)

    Parameters
    ----------
    level_pu : array_like
        Thermal level at the beginning. [1]
    permitted_level_pu : array_like
        Level to be reached. [1]
    cooling_time_constant_s : array_like
        Time constant at rest. [s]

    Returns
    -------
    ndarray
        Time; zero where the level is low enough already, infinite for a level of zero or less. [s]

    Notes
    -----
    Cooling to ambient by one time constant. Missing where an input is missing, the beginning is negative or
    the time constant not above zero.

    Examples
    --------
    From the trip to 0.5, 1 h. By hand: 3600 * ln 2 = 2495 s.

    >>> cooling_time_s(1, 0.5, 3600).round().item()
    2495.0

    References
    ----------
    IEC 60255-149, first-order thermal model.
    """
    level, permitted, constant = together(level_pu, permitted_level_pu, cooling_time_constant_s)
    usable = present(level, permitted, constant) & (level >= 0) & (constant > 0)
    with np.errstate(divide="ignore", invalid="ignore"):
        time = constant * np.log(level / permitted)
    time = np.where(permitted > 0, time, np.inf)
    return np.where(usable, np.where(level <= permitted, 0.0, time), np.nan)


def waiting_time_until_start_s(
    level_pu: ArrayLike,
    start_current_a: ArrayLike,
    start_time_s: ArrayLike,
    pickup_a: ArrayLike,
    heating_time_constant_s: ArrayLike,
    cooling_time_constant_s: ArrayLike,
) -> Floats:
    """Time at rest until the thermal element has room for one more start.

    t = tau_c * ln(theta / (1 - theta_start))

    Parameters
    ----------
    level_pu : array_like
        Thermal level when the motor came to rest; 1 after a trip. [1]
    start_current_a : array_like
        Start current. [A]
    start_time_s : array_like
        Start time. [s]
    pickup_a : array_like
        Current that the element finally trips at. [A]
    heating_time_constant_s : array_like
        Heating time constant. [s]
    cooling_time_constant_s : array_like
        Time constant at rest. [s]

    Returns
    -------
    ndarray
        Waiting time; zero where there is room already, infinite where not even a cold motor has room. [s]

    Notes
    -----
    The heat of the start is added to the level in full; what the motor gives off during the start is left
    out, so the time is a little long (by t/tau of the permitted level). Missing where an input is missing
    or negative, or pickup or a time constant is not above zero.

    Examples
    --------
    After a trip; a start leaves 0.476814 (600 A, 8 s, 100 A, 10 min); 1 h. By hand:
    3600 * ln(1 / 0.523186) = 2332 s.

    >>> waiting_time_until_start_s(1, 600, 8, 100, 600, 3600).round().item()
    2332.0

    References
    ----------
    IEC 60255-149, first-order thermal model; room for the heat of one start is common practice.
    """
    heat = start_heat_pu(start_current_a, start_time_s, pickup_a, heating_time_constant_s)
    return cooling_time_s(level_pu, 1.0 - heat, cooling_time_constant_s)
