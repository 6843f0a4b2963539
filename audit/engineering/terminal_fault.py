"""Least and greatest fault current at the end of a motor cable."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, above_zero, floats, zero_or_more, zero_to_infinity
from audit.engineering.conductor import cable_reactance_ohm, cable_resistance_ohm
from audit.engineering.unit_factors import SQRT3


def source_impedance_ohm(fault_ka: ArrayLike, voltage_v: ArrayLike) -> Floats:
    """Impedance per phase of the supply behind a bus.

    Z = V / (sqrt(3) * I)

    Parameters
    ----------
    fault_ka : array_like
        Three-phase fault current at the bus, rms symmetrical. [kA]
    voltage_v : array_like
        Voltage that drives this current, line to line. [V]

    Returns
    -------
    ndarray
        Impedance; missing where an input is missing or not positive. [ohm]

    Notes
    -----
    The whole network seen as one impedance. Where the fault figure was computed with a voltage factor, the
    voltage must carry the same factor.

    Examples
    --------
    25 kA at 400 V. By hand: 400 / (1.73205 * 25000) = 0.009238 ohm.

    >>> source_impedance_ohm(25, 400).round(6).item()
    0.009238

    References
    ----------
    Ohm's law; IEC 60909-0, network feeders.
    """
    return floats(above_zero(voltage_v) / (SQRT3 * 1000 * above_zero(fault_ka)))


def terminal_three_phase_fault_a(
    bus_fault_ka: ArrayLike,
    bus_x_to_r_ratio: ArrayLike,
    voltage_v: ArrayLike,
    cable_resistance_ohm: ArrayLike,
    cable_reactance_ohm: ArrayLike,
) -> Floats:
    """Three-phase fault current at the far end of a cable.

    I = V / (sqrt(3) * |Zs + Zc|), Zs = V / (sqrt(3) * I_bus) at the angle arctan(X/R)

    Parameters
    ----------
    bus_fault_ka : array_like
        Three-phase fault current at the bus, rms symmetrical. [kA]
    bus_x_to_r_ratio : array_like
        Reactance over resistance of the supply at the bus. [1]
    voltage_v : array_like
        Voltage that drives the fault, line to line. [V]
    cable_resistance_ohm : array_like
        Resistance of the cable per phase. [ohm]
    cable_reactance_ohm : array_like
        Reactance of the cable per phase. [ohm]

    Returns
    -------
    ndarray
        Fault current, rms symmetrical; missing where an input is missing or out of its range. [A]

    Notes
    -----
    Far from generators: no decay. Fault of zero impedance. What this and other motors feed in is left out;
    it belongs into the bus figure.

    Examples
    --------
    25 kA at 400 V, X/R infinite, cable 0.009238 ohm of pure resistance: right angle, so by hand
    25000 / sqrt(2) = 17,678 A.

    >>> terminal_three_phase_fault_a(25, float("inf"), 400, 0.0092376, 0).round(0).item()
    17678.0

    References
    ----------
    Ohm's law with complex impedances; IEC 60909-0.
    """
    source = source_impedance_ohm(bus_fault_ka, voltage_v)
    angle = np.arctan(zero_to_infinity(bus_x_to_r_ratio))
    resistance = source * np.cos(angle) + zero_or_more(cable_resistance_ohm)
    reactance = source * np.sin(angle) + zero_or_more(cable_reactance_ohm)
    return floats(above_zero(voltage_v) / (SQRT3 * np.hypot(resistance, reactance)))


def phase_to_phase_fault_a(three_phase_fault_a: ArrayLike) -> Floats:
    """Phase-to-phase fault current where the three-phase fault current is known.

    I = sqrt(3)/2 * I3

    Parameters
    ----------
    three_phase_fault_a : array_like
        Three-phase fault current at the same place. [A]

    Returns
    -------
    ndarray
        Fault current; missing where the input is missing or negative. [A]

    Notes
    -----
    Negative-sequence impedance equal to the positive: far from generators.

    Examples
    --------
    10 kA. By hand: 8660 A.

    >>> phase_to_phase_fault_a(10000).round(0).item()
    8660.0

    References
    ----------
    IEC 60909-0, line-to-line short circuit.
    """
    return floats(SQRT3 / 2 * zero_or_more(three_phase_fault_a))


def least_phase_to_phase_fault_a(
    bus_minimum_fault_ka: ArrayLike,
    bus_x_to_r_ratio: ArrayLike,
    voltage_v: ArrayLike,
    length_m: ArrayLike,
    section_mm2: ArrayLike,
    material: ArrayLike,
    runs: ArrayLike,
    reactance_ohm_per_km: ArrayLike,
    conductor_temperature_c: ArrayLike,
) -> Floats:
    """Least phase-to-phase fault current at the motor terminals.

    I = sqrt(3)/2 * V / (sqrt(3) * |Zs + Zc|), cable hot

    Parameters
    ----------
    bus_minimum_fault_ka : array_like
        Three-phase fault current at the bus from the weakest supply. [kA]
    bus_x_to_r_ratio : array_like
        Reactance over resistance of that supply. [1]
    voltage_v : array_like
        Voltage that drives the fault, line to line. [V]
    length_m : array_like
        Length of the cable, one way. [m]
    section_mm2 : array_like
        Nominal cross-section of one conductor. [mm2]
    material : array_like
        'copper' or 'aluminium'. [text]
    runs : array_like
        Conductors in parallel per phase. [1]
    reactance_ohm_per_km : array_like
        Reactance of one conductor at power frequency. [ohm/km]
    conductor_temperature_c : array_like
        Temperature of the conductor: the highest in service (70 PVC, 90 XLPE), or that at the end of the
        fault for a slow element. [C]

    Returns
    -------
    ndarray
        Fault current, rms symmetrical; missing where an input is missing or out of its range. [A]

    Notes
    -----
    Bolted, with the negative-sequence impedance equal to the positive. An arc at low voltage can lie
    well below this; margin for it belongs into the limit that uses the figure. Give the voltage the factor
    that the bus figure was computed with (0.95 for a least fault at low voltage in IEC 60909-0).

    Examples
    --------
    20 kA, X/R infinite, 400 V, 100 m of 95 mm2 copper at 20 C, no cable reactance. By hand: Xs = 0.011547,
    R = 0.0193; |Z| = 0.022491; 230.94 / 0.022491 = 10,268 A; times 0.866 = 8,892 A.

    >>> least_phase_to_phase_fault_a(20, float("inf"), 400, 100, 95, "copper", 1, 0, 20).round(-1).item()
    8890.0

    References
    ----------
    IEC 60909-0, line-to-line short circuit; hot conductors for the least fault as its rules ask.
    """
    resistance = cable_resistance_ohm(length_m, section_mm2, material, runs, conductor_temperature_c)
    reactance = cable_reactance_ohm(length_m, reactance_ohm_per_km, runs)
    three_phase = terminal_three_phase_fault_a(bus_minimum_fault_ka, bus_x_to_r_ratio, voltage_v, resistance, reactance)
    return phase_to_phase_fault_a(three_phase)


def greatest_three_phase_fault_a(
    bus_maximum_fault_ka: ArrayLike,
    bus_x_to_r_ratio: ArrayLike,
    voltage_v: ArrayLike,
    length_m: ArrayLike,
    section_mm2: ArrayLike,
    material: ArrayLike,
    runs: ArrayLike,
    reactance_ohm_per_km: ArrayLike,
) -> Floats:
    """Greatest three-phase fault current at the motor terminals.

    I = V / (sqrt(3) * |Zs + Zc|), cable at 20 C

    Parameters
    ----------
    bus_maximum_fault_ka : array_like
        Three-phase fault current at the bus from the strongest supply. [kA]
    bus_x_to_r_ratio : array_like
        Reactance over resistance of that supply. [1]
    voltage_v : array_like
        Voltage that drives the fault, line to line. [V]
    length_m : array_like
        Length of the cable, one way. [m]
    section_mm2 : array_like
        Nominal cross-section of one conductor. [mm2]
    material : array_like
        'copper' or 'aluminium'. [text]
    runs : array_like
        Conductors in parallel per phase. [1]
    reactance_ohm_per_km : array_like
        Reactance of one conductor at power frequency. [ohm/km]

    Returns
    -------
    ndarray
        Fault current, rms symmetrical; missing where an input is missing or out of its range. [A]

    Notes
    -----
    Cold conductors at the greatest resistance that IEC 60228 permits: real cables may give a few per cent
    more. At the device itself the bus figure counts, without any cable.

    Examples
    --------
    20 kA, X/R infinite, 400 V, 100 m of 95 mm2 copper. By hand as for the least fault: 10,268 A.

    >>> greatest_three_phase_fault_a(20, float("inf"), 400, 100, 95, "copper", 1, 0).round(-1).item()
    10270.0

    References
    ----------
    IEC 60909-0, three-phase short circuit; conductors at 20 C for the greatest fault as its rules ask.
    """
    resistance = cable_resistance_ohm(length_m, section_mm2, material, runs, 20.0)
    reactance = cable_reactance_ohm(length_m, reactance_ohm_per_km, runs)
    return terminal_three_phase_fault_a(bus_maximum_fault_ka, bus_x_to_r_ratio, voltage_v, resistance, reactance)
