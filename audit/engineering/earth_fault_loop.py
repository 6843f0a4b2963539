"""Least earth-fault current at the motor terminals where a protective conductor returns it (TN system)."""

from __future__ import annotations

from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats
from audit.engineering.conductor import cable_reactance_ohm, cable_resistance_ohm
from audit.engineering.terminal_fault import terminal_three_phase_fault_a


def least_earth_fault_a(
    bus_earth_fault_ka: ArrayLike,
    bus_x_to_r_ratio: ArrayLike,
    voltage_v: ArrayLike,
    length_m: ArrayLike,
    section_mm2: ArrayLike,
    protective_section_mm2: ArrayLike,
    material: ArrayLike,
    runs: ArrayLike,
    reactance_ohm_per_km: ArrayLike,
    conductor_temperature_c: ArrayLike,
) -> Floats:
    """Least earth-fault current at the motor terminals in a solidly earthed TN system.

    I = (V / sqrt(3)) / |Zs + Zphase + Zpe|, Zs from the earth-fault current at the bus

    Parameters
    ----------
    bus_earth_fault_ka : array_like
        Least phase-to-earth fault current at the bus; for a delta-star transformer near the bus it is
        close to the three-phase figure. [kA]
    bus_x_to_r_ratio : array_like
        Reactance over resistance of that loop. [1]
    voltage_v : array_like
        Voltage of the system, line to line. [V]
    length_m : array_like
        Length of the cable, one way. [m]
    section_mm2 : array_like
        Nominal cross-section of one phase conductor. [mm2]
    protective_section_mm2 : array_like
        Nominal cross-section of one protective conductor in the same cable. [mm2]
    material : array_like
        Of phase and protective conductor, 'copper' or 'aluminium'. [text]
    runs : array_like
        Cables in parallel, each with its protective conductor. [1]
    reactance_ohm_per_km : array_like
        Reactance of one conductor at power frequency. [ohm/km]
    conductor_temperature_c : array_like
        Temperature of both conductors. [C]

    Returns
    -------
    ndarray
        Earth-fault current, rms symmetrical; missing where an input is missing or out of its range. [A]

    Notes
    -----
    The protective conductor lies in the cable; laid apart, or a steel armour or conduit used instead, the
    loop has more impedance and the current is less. Not for TT, IT or impedance-earthed systems.

    Examples
    --------
    10 kA and X/R infinite at 400 V, 100 m with 35 mm2 phase and 16 mm2 protective conductor, copper at
    20 C, no cable reactance. By hand: Xs = 0.023094; R = 0.0524 + 0.115 = 0.1674; |Z| = 0.16899;
    230.94 / 0.16899 = 1,367 A.

    >>> least_earth_fault_a(10, float("inf"), 400, 100, 35, 16, "copper", 1, 0, 20).round(-1).item()
    1370.0

    References
    ----------
    IEC 60364-4-41, fault loop of a TN system.
    """
    phase = cable_resistance_ohm(length_m, section_mm2, material, runs, conductor_temperature_c)
    protective = cable_resistance_ohm(length_m, protective_section_mm2, material, runs, conductor_temperature_c)
    reactance = cable_reactance_ohm(length_m, reactance_ohm_per_km, runs)
    return terminal_three_phase_fault_a(
        bus_earth_fault_ka, bus_x_to_r_ratio, voltage_v, phase + protective, 2 * reactance
    )
