"""Under- and overvoltage settings carried between their bases: per cent, secondary volts, primary volts.

Four bases are in use (per cent of the motor's rated, of the system's nominal, of the transformer's primary, of
its secondary voltage). All of them meet in line-to-line volts on the primary side.
"""

from __future__ import annotations

from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, above_zero, floats, zero_or_more
from audit.engineering.unit_factors import SQRT3


def pickup_from_pct_v(pickup_pct: ArrayLike, base_voltage_v: ArrayLike) -> Floats:
    """Pickup in primary volts from per cent of a primary voltage.

    V = p / 100 * Vbase

    Parameters
    ----------
    pickup_pct : array_like
        Pickup. [%]
    base_voltage_v : array_like
        Its base: rated voltage of the motor, nominal voltage of the system or primary voltage of the
        transformer, whichever the setting means. [V]

    Returns
    -------
    ndarray
        Pickup on the primary side; missing where an input is missing, negative, or the base zero. [V]

    Notes
    -----
    The base must be stated: 80 per cent of a 120 V secondary is 84 per cent of a 4000 V motor at 35:1.

    Examples
    --------
    80 per cent of 4000 V. By hand: 3200 V.

    >>> pickup_from_pct_v(80, 4000).item()
    3200.0

    References
    ----------
    Definition.
    """
    return floats(zero_or_more(pickup_pct) / 100 * above_zero(base_voltage_v))


def pickup_from_secondary_v(
    pickup_secondary_v: ArrayLike, vt_primary_v: ArrayLike, vt_secondary_v: ArrayLike
) -> Floats:
    """Pickup in primary volts from secondary volts.

    V = Vsec * Vp / Vs

    Parameters
    ----------
    pickup_secondary_v : array_like
        Pickup on the secondary side. [V]
    vt_primary_v : array_like
        Primary voltage of the voltage transformer. [V]
    vt_secondary_v : array_like
        Secondary voltage of the voltage transformer. [V]

    Returns
    -------
    ndarray
        Pickup on the primary side; missing where an input is missing, negative, or a rating zero. [V]

    Notes
    -----
    Line to line on both sides, or line to neutral on both; see `line_to_line_v`.

    Examples
    --------
    96 V through 4200:120. By hand: 96 * 35 = 3360 V.

    >>> pickup_from_secondary_v(96, 4200, 120).item()
    3360.0

    References
    ----------
    Transformer ratio.
    """
    return floats(zero_or_more(pickup_secondary_v) * above_zero(vt_primary_v) / above_zero(vt_secondary_v))


def pickup_from_secondary_pct_v(
    pickup_pct: ArrayLike,
    secondary_base_v: ArrayLike,
    vt_primary_v: ArrayLike,
    vt_secondary_v: ArrayLike,
) -> Floats:
    """Pickup in primary volts from per cent of a secondary voltage.

    V = p / 100 * Vbase * Vp / Vs

    Parameters
    ----------
    pickup_pct : array_like
        Pickup. [%]
    secondary_base_v : array_like
        Secondary voltage that is 100 per cent: 100, 110 or 120 V. [V]
    vt_primary_v : array_like
        Primary voltage of the voltage transformer. [V]
    vt_secondary_v : array_like
        Secondary voltage of the voltage transformer. [V]

    Returns
    -------
    ndarray
        Pickup on the primary side; missing where an input is missing, negative, or a voltage zero. [V]

    Notes
    -----
    Where the base equals the transformer's secondary voltage this is per cent of its primary voltage.

    Examples
    --------
    80 per cent of 120 V through 4200:120. By hand: 96 * 35 = 3360 V.

    >>> pickup_from_secondary_pct_v(80, 120, 4200, 120).item()
    3360.0

    References
    ----------
    Transformer ratio.
    """
    secondary = pickup_from_pct_v(pickup_pct, secondary_base_v)
    return pickup_from_secondary_v(secondary, vt_primary_v, vt_secondary_v)


def pickup_in_pct(pickup_v: ArrayLike, base_voltage_v: ArrayLike) -> Floats:
    """Pickup in per cent of a voltage.

    p = 100 * V / Vbase

    Parameters
    ----------
    pickup_v : array_like
        Pickup on the side of the base. [V]
    base_voltage_v : array_like
        Voltage that is 100 per cent. [V]

    Returns
    -------
    ndarray
        Pickup; missing where an input is missing, negative, or the base zero. [%]

    Notes
    -----
    The inverse of `pickup_from_pct_v`.

    Examples
    --------
    3360 V on a 4000 V motor. By hand: 84 per cent.

    >>> pickup_in_pct(3360, 4000).item()
    84.0

    References
    ----------
    Definition.
    """
    return floats(100 * zero_or_more(pickup_v) / above_zero(base_voltage_v))


def pickup_in_secondary_v(pickup_v: ArrayLike, vt_primary_v: ArrayLike, vt_secondary_v: ArrayLike) -> Floats:
    """Pickup in secondary volts from primary volts.

    Vsec = V * Vs / Vp

    Parameters
    ----------
    pickup_v : array_like
        Pickup on the primary side. [V]
    vt_primary_v : array_like
        Primary voltage of the voltage transformer. [V]
    vt_secondary_v : array_like
        Secondary voltage of the voltage transformer. [V]

    Returns
    -------
    ndarray
        Pickup on the secondary side; missing where an input is missing, negative, or a rating zero. [V]

    Notes
    -----
    The inverse of `pickup_from_secondary_v`.

    Examples
    --------
    3200 V through 4200:120. By hand: 3200 / 35 = 91.43 V.

    >>> pickup_in_secondary_v(3200, 4200, 120).round(2).item()
    91.43

    References
    ----------
    Transformer ratio.
    """
    return floats(zero_or_more(pickup_v) * above_zero(vt_secondary_v) / above_zero(vt_primary_v))


def line_to_line_v(line_to_neutral_v: ArrayLike) -> Floats:
    """Line-to-line voltage of a balanced system from its line-to-neutral voltage.

    V = sqrt(3) * Vn

    Parameters
    ----------
    line_to_neutral_v : array_like
        Voltage between line and neutral. [V]

    Returns
    -------
    ndarray
        Voltage between lines; missing where the input is missing or negative. [V]

    Notes
    -----
    Balanced voltages.

    Examples
    --------
    230.94 V. By hand: 1.73205 * 230.94 = 400 V.

    >>> line_to_line_v(230.94).round(1).item()
    400.0

    References
    ----------
    Geometry of three balanced phasors.
    """
    return floats(SQRT3 * zero_or_more(line_to_neutral_v))
