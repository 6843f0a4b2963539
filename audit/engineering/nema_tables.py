"""Tables of US practice by horsepower and voltage: full-load current, greatest locked-rotor current."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, entry_at, together
from audit.engineering.unit_factors import KW_PER_HP

_ = np.nan
# hp: amperes at 200, 208, 230, 460, 575 and 2300 V (NFPA 70, Table 430.250, induction columns)
_FULL_LOAD_A: dict[float, tuple[float, ...]] = {
    0.5: (2.5, 2.4, 2.2, 1.1, 0.9, _),
    0.75: (3.7, 3.5, 3.2, 1.6, 1.3, _),
    1: (4.8, 4.6, 4.2, 2.1, 1.7, _),
    1.5: (6.9, 6.6, 6.0, 3.0, 2.4, _),
    2: (7.8, 7.5, 6.8, 3.4, 2.7, _),
    3: (11.0, 10.6, 9.6, 4.8, 3.9, _),
    5: (17.5, 16.7, 15.2, 7.6, 6.1, _),
    7.5: (25.3, 24.2, 22, 11, 9, _),
    10: (32.2, 30.8, 28, 14, 11, _),
    15: (48.3, 46.2, 42, 21, 17, _),
    20: (62.1, 59.4, 54, 27, 22, _),
    25: (78.2, 74.8, 68, 34, 27, _),
    30: (92, 88, 80, 40, 32, _),
    40: (120, 114, 104, 52, 41, _),
    50: (150, 143, 130, 65, 52, _),
    60: (177, 169, 154, 77, 62, 16),
    75: (221, 211, 192, 96, 77, 20),
    100: (285, 273, 248, 124, 99, 26),
    125: (359, 343, 312, 156, 125, 31),
    150: (414, 396, 360, 180, 144, 37),
    200: (552, 528, 480, 240, 192, 49),
    250: (_, _, _, 302, 242, 60),
    300: (_, _, _, 361, 289, 72),
    350: (_, _, _, 414, 336, 83),
    400: (_, _, _, 477, 382, 95),
    450: (_, _, _, 515, 412, 103),
    500: (_, _, _, 590, 472, 118),
}
# hp: amperes at 230 V, 60 Hz, designs B, C, D (NEMA MG 1 12.35)
_LOCKED_ROTOR_230_V_A: dict[float, float] = {
    0.5: 20,
    0.75: 25,
    1: 30,
    1.5: 40,
    2: 50,
    3: 64,
    5: 92,
    7.5: 127,
    10: 162,
    15: 232,
    20: 290,
    25: 365,
    30: 435,
    40: 580,
    50: 725,
    60: 870,
    75: 1085,
    100: 1450,
    125: 1815,
    150: 2170,
    200: 2900,
    250: 3650,
    300: 4400,
    350: 5100,
    400: 5800,
    450: 6500,
    500: 7250,
}
# lowest and highest voltage that reads each column: the table's own ranges; 200 and 208 V from each other apart
_VOLTAGE_FROM_V = (198.0, 204.0, 220.0, 440.0, 550.0, 2200.0)
_VOLTAGE_TO_V = (204.0, 212.0, 240.0, 480.0, 600.0, 2400.0)
_RATED_60_HZ_FROM_V = (*_VOLTAGE_FROM_V, 4000.0)
_RATED_60_HZ_TO_V = (*_VOLTAGE_TO_V, 4160.0)
_POWER_SLACK = 0.01


def _row_of(power_kw: Floats, listed_hp: tuple[float, ...]) -> Floats:
    """Row of the listed horsepower that the power means, within one per cent; -1 for none."""
    horsepower = power_kw / KW_PER_HP
    far = np.abs(horsepower[..., None] / np.array(listed_hp) - 1.0)
    nearest = np.where(np.isnan(far), np.inf, far).argmin(axis=-1)
    return np.where(np.take_along_axis(far, nearest[..., None], -1)[..., 0] <= _POWER_SLACK, nearest, -1.0)


def _column_of(voltage_v: Floats, lowest_v: tuple[float, ...], highest_v: tuple[float, ...]) -> Floats:
    place = np.searchsorted(lowest_v, voltage_v, side="right") - 1
    return np.where(voltage_v <= entry_at(highest_v, place), place, -1.0)


def table_full_load_current_a(power_kw: ArrayLike, voltage_v: ArrayLike) -> Floats:
    """Full-load current of the US table for conductors and short-circuit devices.

    Parameters
    ----------
    power_kw : array_like
        Rated power; one of the listed horsepowers within 1 %. [kW]
    voltage_v : array_like
        Rated motor voltage: 200, 208, 230, 460, 575 or 2300 V, or any within the table's ranges. [V]

    Returns
    -------
    ndarray
        Full-load current of the table. [A]

    Notes
    -----
    Squirrel-cage and wound-rotor motors, 60 Hz, usual speed and torque; the overload device goes by the
    nameplate instead. Ranges 220 to 240, 440 to 480, 550 to 600 and 2200 to 2400 V read as one column each,
    198 to 204 as 200 V, 204 to 212 as 208 V. Missing for other voltages (400 V among them), for powers that
    are not in the table and where the table has no entry.

    Examples
    --------
    100 hp at 460 V, from the table: 124 A; 90 kW is no listed horsepower.

    >>> table_full_load_current_a([74.57, 90], 460).tolist()
    [124.0, nan]

    References
    ----------
    NFPA 70, Table 430.250 (2008 text; copies of later editions agree).
    """
    power, voltage = together(power_kw, voltage_v)
    column = _column_of(voltage, _VOLTAGE_FROM_V, _VOLTAGE_TO_V)
    row = _row_of(power, tuple(_FULL_LOAD_A))
    entries = np.array(list(_FULL_LOAD_A.values()), dtype=np.float64)
    place = np.where((row >= 0) & (column >= 0), row * entries.shape[1] + column, -1)
    return entry_at(entries.ravel(), place)


def table_locked_rotor_a(power_kw: ArrayLike, voltage_v: ArrayLike) -> Floats:
    """Greatest locked-rotor current that a design B, C or D motor may have.

    I = I_230V * 230 / V

    Parameters
    ----------
    power_kw : array_like
        Rated power; one of the listed horsepowers within 1 %. [kW]
    voltage_v : array_like
        Rated motor voltage: 200, 208, 230, 460, 575, 2300 or 4000 V, or near those. [V]

    Returns
    -------
    ndarray
        Locked-rotor current at that voltage. [A]

    Notes
    -----
    Three phase, single speed, 60 Hz, 0.5 to 500 hp; steady, rotor locked, rated voltage. Design A has no such
    limit, energy-efficient motors are often design A. Printed values for 460 V and above are rounded to the
    ampere. Above 1000 V only a trade handbook's extension. Missing for other voltages (400 V, 50 Hz among
    them) and for powers that are not in the table.

    Examples
    --------
    100 hp: 1450 A at 230 V from the table; at 460 V by hand half of it.

    >>> table_locked_rotor_a(74.57, [230, 460]).tolist()
    [1450.0, 725.0]

    References
    ----------
    NEMA MG 1 12.35 (230 V, other voltages inversely proportional).
    """
    power, voltage = together(power_kw, voltage_v)
    at_230_v = entry_at(list(_LOCKED_ROTOR_230_V_A.values()), _row_of(power, tuple(_LOCKED_ROTOR_230_V_A)))
    known = _column_of(voltage, _RATED_60_HZ_FROM_V, _RATED_60_HZ_TO_V) >= 0
    with np.errstate(divide="ignore", invalid="ignore"):
        return np.where(known, at_230_v * 230.0 / voltage, np.nan)
