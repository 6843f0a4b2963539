"""How long a cable bears a fault current: no heat given off while it lasts (adiabatic)."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, above_zero, floats, look_up, zero_or_more

IEC_CONSTANT = {"copper": 226.0, "aluminium": 148.0}
IEC_BETA_C = {"copper": 234.5, "aluminium": 228.0}
ICEA_CONSTANT = {"copper": 0.0297, "aluminium": 0.0125}
ICEA_BETA_C = {"copper": 234.0, "aluminium": 228.0}
MM2_PER_CIRCULAR_MIL = np.pi / 4 * 0.0254**2
LARGE_PVC_SECTION_MM2 = 300.0
# A sqrt(s)/mm2 for copper; PVC from 70 C to 160 C, above 300 mm2 to 140 C; XLPE and EPR from 90 C to 250 C
COPPER_K = {"PVC": 115.0, "XLPE": 143.0, "EPR": 143.0}
COPPER_K_LARGE = {"PVC": 103.0, "XLPE": 143.0, "EPR": 143.0}
ALUMINIUM_K = {"PVC": 76.0, "XLPE": 94.0, "EPR": 94.0}
ALUMINIUM_K_LARGE = {"PVC": 68.0, "XLPE": 94.0, "EPR": 94.0}


def adiabatic_constant(material: ArrayLike, initial_temperature_c: ArrayLike, final_temperature_c: ArrayLike) -> Floats:
    """Constant k of a conductor between two temperatures.

    k = K * sqrt(ln(1 + (Tf - Ti) / (beta + Ti))); K 226, beta 234.5 copper; K 148, beta 228 aluminium

    Parameters
    ----------
    material : array_like
        'copper' or 'aluminium'. [text]
    initial_temperature_c : array_like
        Conductor temperature before the fault. [C]
    final_temperature_c : array_like
        Highest temperature that the insulation bears at its end. [C]

    Returns
    -------
    ndarray
        Constant; missing where an input is missing, final is below initial, or the material another.
        [A sqrt(s)/mm2]

    Notes
    -----
    No heat leaves the conductor: for faults up to 5 s.

    Examples
    --------
    Copper from 90 C to 250 C. By hand: ln(1 + 160 / 324.5) = 0.40083; 226 * 0.63311 = 143.1.

    >>> adiabatic_constant("copper", 90, 250).round(1).item()
    143.1

    References
    ----------
    IEC 60949, adiabatic part (constants from memory; they give the printed k of IEC 60364-4-43).
    """
    initial = floats(initial_temperature_c)
    rise = zero_or_more(floats(final_temperature_c) - initial)
    with np.errstate(invalid="ignore"):
        root = np.sqrt(np.log1p(rise / above_zero(look_up(material, IEC_BETA_C) + initial)))
    return floats(look_up(material, IEC_CONSTANT) * root)


def adiabatic_constant_printed(material: ArrayLike, insulation: ArrayLike, section_mm2: ArrayLike) -> Floats:
    """Printed constant k for the insulation of a cable that was fully loaded before the fault.

    k = 115 (copper, PVC), 143 (copper, XLPE or EPR), 76 (aluminium, PVC), 94 (aluminium, XLPE or EPR);
    PVC above 300 mm2: 103 copper, 68 aluminium

    Parameters
    ----------
    material : array_like
        'copper' or 'aluminium'. [text]
    insulation : array_like
        'PVC', 'XLPE' or 'EPR'. [text]
    section_mm2 : array_like
        Nominal cross-section of one conductor. [mm2]

    Returns
    -------
    ndarray
        Constant; missing for another material or insulation, or where an input is missing. [A sqrt(s)/mm2]

    Notes
    -----
    Conductor at its highest service temperature at the start: 70 C for PVC, 90 C for XLPE and EPR.

    Examples
    --------
    Copper in XLPE, from the table: 143. Aluminium in PVC of 400 mm2: 68.

    >>> adiabatic_constant_printed(["copper", "aluminium"], ["XLPE", "PVC"], [95, 400]).tolist()
    [143.0, 68.0]

    References
    ----------
    IEC 60364-4-43 and 60364-5-54; the figure 68 from memory.
    """
    section = above_zero(section_mm2)
    large = section > LARGE_PVC_SECTION_MM2
    of_copper = np.where(large, look_up(insulation, COPPER_K_LARGE), look_up(insulation, COPPER_K))
    of_aluminium = np.where(large, look_up(insulation, ALUMINIUM_K_LARGE), look_up(insulation, ALUMINIUM_K))
    is_copper = look_up(material, {"copper": 1.0, "aluminium": 0.0})
    constant = np.where(is_copper == 1.0, of_copper, of_aluminium)
    return np.where(np.isnan(section + is_copper), np.nan, constant)


def adiabatic_constant_icea(
    material: ArrayLike, initial_temperature_c: ArrayLike, final_temperature_c: ArrayLike
) -> Floats:
    """Constant k of a conductor between two temperatures, in the form used in North America.

    (I/A)^2 * t = 0.0297 * log10((T2 + 234) / (T1 + 234)) copper,
    0.0125 * log10((T2 + 228) / (T1 + 228)) aluminium, A in circular mils; here per mm2

    Parameters
    ----------
    material : array_like
        'copper' or 'aluminium'. [text]
    initial_temperature_c : array_like
        Conductor temperature before the fault. [C]
    final_temperature_c : array_like
        Highest temperature that the insulation bears at its end. [C]

    Returns
    -------
    ndarray
        Constant; missing where an input is missing, final is below initial, or the material another.
        [A sqrt(s)/mm2]

    Notes
    -----
    Within 2 per cent of `adiabatic_constant`. For faults up to 5 s.

    Examples
    --------
    Copper from 90 C to 250 C. By hand: log10(484 / 324) = 0.174310; sqrt(0.0297 * 0.174310) = 0.071951 per
    circular mil; a circular mil is 5.0671e-4 mm2: 142.0.

    >>> adiabatic_constant_icea("copper", 90, 250).round(1).item()
    142.0

    References
    ----------
    ICEA P-32-382 (from memory).
    """
    initial = floats(initial_temperature_c)
    final = initial + zero_or_more(floats(final_temperature_c) - initial)
    beta = look_up(material, ICEA_BETA_C)
    hotter = np.log10(above_zero(final + beta) / above_zero(initial + beta))
    return floats(np.sqrt(look_up(material, ICEA_CONSTANT) * hotter) / MM2_PER_CIRCULAR_MIL)


def cable_withstand_a2s(section_mm2: ArrayLike, runs: ArrayLike, material: ArrayLike, insulation: ArrayLike) -> Floats:
    """Heat that the conductors of a cable bear, as the square of current times time.

    k^2 * (n * S)^2, k as printed for conductor and insulation

    Parameters
    ----------
    section_mm2 : array_like
        Nominal cross-section of one conductor. [mm2]
    runs : array_like
        Conductors in parallel per phase that share the fault current evenly. [1]
    material : array_like
        'copper' or 'aluminium'. [text]
    insulation : array_like
        'PVC', 'XLPE' or 'EPR'. [text]

    Returns
    -------
    ndarray
        Withstand; missing where an input is missing or not positive. [A2 s]

    Notes
    -----
    To be set against the let-through of the device. A fault within one of several parallel runs is fed
    from both ends through that run alone: then take one run.

    Examples
    --------
    95 mm2 copper in XLPE. By hand: (143 * 95)^2 = 13585^2 = 1.8455e8.

    >>> cable_withstand_a2s(95, 1, "copper", "XLPE").item()
    184552225.0

    References
    ----------
    IEC 60364-4-43.
    """
    constant = adiabatic_constant_printed(material, insulation, section_mm2)
    return floats((constant * above_zero(section_mm2) * above_zero(runs)) ** 2)


def longest_clearing_time_s(fault_a: ArrayLike, cable_withstand_a2s: ArrayLike) -> Floats:
    """Longest time that a fault current may last before the cable is too hot.

    t = k^2 S^2 / I^2

    Parameters
    ----------
    fault_a : array_like
        Fault current, rms symmetrical. [A]
    cable_withstand_a2s : array_like
        Withstand of the cable. [A2 s]

    Returns
    -------
    ndarray
        Time; missing where an input is missing or not positive. [s]

    Notes
    -----
    Valid from 0.1 s to 5 s. A result below 0.1 s means: judge the let-through of the device instead, since
    the offset counts. Above 5 s heat is given off and the cable bears more.

    Examples
    --------
    12 kA in 95 mm2 copper in XLPE. By hand: 1.84552e8 / 1.44e8 = 1.28 s.

    >>> longest_clearing_time_s(12000, 184552225).round(2).item()
    1.28

    References
    ----------
    IEC 60364-4-43.
    """
    return floats(above_zero(cable_withstand_a2s) / above_zero(fault_a) ** 2)


def least_section_mm2(fault_a: ArrayLike, clearing_time_s: ArrayLike, adiabatic_constant: ArrayLike) -> Floats:
    """Least total cross-section that bears a fault current until it is cleared.

    S = I * sqrt(t) / k

    Parameters
    ----------
    fault_a : array_like
        Fault current, rms symmetrical. [A]
    clearing_time_s : array_like
        Time until the device has cleared it. [s]
    adiabatic_constant : array_like
        Constant k of conductor and insulation. [A sqrt(s)/mm2]

    Returns
    -------
    ndarray
        Cross-section of all parallel conductors together; missing where an input is missing or
        negative. [mm2]

    Notes
    -----
    Valid from 0.1 s to 5 s; below, use the let-through of the device.

    Examples
    --------
    25 kA for 0.2 s, k = 143. By hand: 25000 * 0.44721 / 143 = 78.18 mm2.

    >>> least_section_mm2(25000, 0.2, 143).round(2).item()
    78.18

    References
    ----------
    IEC 60364-4-43 and 60364-5-54.
    """
    root = np.sqrt(zero_or_more(clearing_time_s))
    return floats(zero_or_more(fault_a) * root / above_zero(adiabatic_constant))
