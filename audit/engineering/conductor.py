"""Resistance and reactance of a motor cable."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, above_zero, floats, look_up, zero_or_more

# IEC 60228, class 2, greatest direct-current resistance at 20 C, ohm/km by nominal section (from memory)
COPPER_OHM_PER_KM: dict[float, float] = {
    1.5: 12.1, 2.5: 7.41, 4: 4.61, 6: 3.08, 10: 1.83, 16: 1.15, 25: 0.727, 35: 0.524, 50: 0.387, 70: 0.268,
    95: 0.193, 120: 0.153, 150: 0.124, 185: 0.0991, 240: 0.0754, 300: 0.0601, 400: 0.0470, 500: 0.0366,
    630: 0.0283, 800: 0.0221, 1000: 0.0176,
}  # fmt: skip
ALUMINIUM_OHM_PER_KM: dict[float, float] = {
    10: 3.08, 16: 1.91, 25: 1.20, 35: 0.868, 50: 0.641, 70: 0.443, 95: 0.320, 120: 0.253, 150: 0.206,
    185: 0.164, 240: 0.125, 300: 0.100, 400: 0.0778, 500: 0.0605, 630: 0.0469, 800: 0.0367, 1000: 0.0291,
}  # fmt: skip
# IEC 60909-0, for sections without an entry: conductivity in m per ohm mm2
CONDUCTIVITY = {"copper": 54.0, "aluminium": 34.0}
# IEC 60228, per kelvin at 20 C
TEMPERATURE_COEFFICIENT = {"copper": 0.00393, "aluminium": 0.00403}


def conductor_resistance_ohm_per_km(
    section_mm2: ArrayLike, material: ArrayLike, conductor_temperature_c: ArrayLike
) -> Floats:
    """Resistance of one conductor per kilometre at a temperature.

    r = r20 * (1 + alpha * (T - 20)); r20 from IEC 60228, else 1000 / (54 S) copper, 1000 / (34 S) aluminium

    Parameters
    ----------
    section_mm2 : array_like
        Nominal cross-section of the conductor. [mm2]
    material : array_like
        'copper' or 'aluminium'. [text]
    conductor_temperature_c : array_like
        Temperature of the conductor, -50 to 300. [C]

    Returns
    -------
    ndarray
        Resistance; missing where an input is missing or outside its range, or the material another. [ohm/km]

    Notes
    -----
    The tabled figures are the greatest that the standard permits for stranded conductors (class 2), so
    real cables lie at or below them: on the safe side for a least fault. Skin and proximity effect, some
    per cent from 300 mm2 upward, are left out.

    Examples
    --------
    240 mm2 copper at 90 C. By hand: 0.0754 * (1 + 0.00393 * 70) = 0.0754 * 1.2751 = 0.09614.

    >>> conductor_resistance_ohm_per_km(240, "copper", 90).round(5).item()
    0.09614

    References
    ----------
    IEC 60228 table of class 2 conductors and temperature coefficients (from memory); IEC 60909-0
    conductivities for other sections.
    """
    section = above_zero(section_mm2)
    temperature = floats(conductor_temperature_c)
    temperature = np.where((temperature >= -50) & (temperature <= 300), temperature, np.nan)
    by_formula = 1000 / (look_up(material, CONDUCTIVITY) * section)
    of_copper = _tabled(section, COPPER_OHM_PER_KM)
    of_aluminium = _tabled(section, ALUMINIUM_OHM_PER_KM)
    tabled = np.where(look_up(material, {"copper": 1.0, "aluminium": 0.0}) == 1.0, of_copper, of_aluminium)
    at_20_c = np.where(np.isnan(tabled), by_formula, tabled)
    correction = 1 + look_up(material, TEMPERATURE_COEFFICIENT) * (temperature - 20)
    return floats(at_20_c * correction)


def cable_resistance_ohm(
    length_m: ArrayLike,
    section_mm2: ArrayLike,
    material: ArrayLike,
    runs: ArrayLike,
    conductor_temperature_c: ArrayLike,
) -> Floats:
    """Resistance of one phase of a cable.

    R = r * l / (1000 * n)

    Parameters
    ----------
    length_m : array_like
        Length of the cable, one way. [m]
    section_mm2 : array_like
        Nominal cross-section of one conductor. [mm2]
    material : array_like
        'copper' or 'aluminium'. [text]
    runs : array_like
        Conductors in parallel per phase. [1]
    conductor_temperature_c : array_like
        Temperature of the conductor. [C]

    Returns
    -------
    ndarray
        Resistance per phase; missing where an input is missing, negative, or runs below one. [ohm]

    Notes
    -----
    Parallel runs share the current evenly. Otherwise as `conductor_resistance_ohm_per_km`.

    Examples
    --------
    150 m, two runs of 240 mm2 copper at 90 C. By hand: 0.09614 * 150 / 2000 = 0.00721 ohm.

    >>> cable_resistance_ohm(150, 240, "copper", 2, 90).round(5).item()
    0.00721

    References
    ----------
    Ohm's law; figures as `conductor_resistance_ohm_per_km`.
    """
    per_km = conductor_resistance_ohm_per_km(section_mm2, material, conductor_temperature_c)
    return floats(per_km * zero_or_more(length_m) / 1000 / _at_least_one(runs))


def cable_reactance_ohm(length_m: ArrayLike, reactance_ohm_per_km: ArrayLike, runs: ArrayLike) -> Floats:
    """Reactance of one phase of a cable.

    X = x * l / (1000 * n)

    Parameters
    ----------
    length_m : array_like
        Length of the cable, one way. [m]
    reactance_ohm_per_km : array_like
        Reactance of one conductor at power frequency. [ohm/km]
    runs : array_like
        Conductors in parallel per phase. [1]

    Returns
    -------
    ndarray
        Reactance per phase; missing where an input is missing, negative, or runs below one. [ohm]

    Notes
    -----
    Where the cable's own figure is not known, 0.08 ohm/km at 50 Hz (0.096 at 60 Hz) is usual for
    multicore cables; single cores laid apart have up to twice as much.

    Examples
    --------
    150 m, two runs, 0.08 ohm/km. By hand: 0.08 * 150 / 2000 = 0.006 ohm.

    >>> cable_reactance_ohm(150, 0.08, 2).round(4).item()
    0.006

    References
    ----------
    Common practice for the usual figure.
    """
    return floats(zero_or_more(reactance_ohm_per_km) * zero_or_more(length_m) / 1000 / _at_least_one(runs))


def _tabled(section_mm2: Floats, table: dict[float, float]) -> Floats:
    figure = np.full(section_mm2.shape, np.nan)
    for nominal, resistance in table.items():
        figure = np.where(np.isclose(section_mm2, nominal, rtol=1e-6), resistance, figure)
    return figure


def _at_least_one(runs: ArrayLike) -> Floats:
    count = floats(runs)
    return np.where(count >= 1, count, np.nan)
