"""Offset of a start or fault current: how far the direct-current part lifts it above its steady value."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, above_zero, floats, zero_or_more, zero_to_infinity

NEWTON_STEPS = 12
LEAST_X_TO_R = 1e-6


def offset_rms_ratio(x_to_r_ratio: ArrayLike, cycles: ArrayLike) -> Floats:
    """Rms of a fully offset current over its symmetrical rms, some cycles after closing.

    F = sqrt(1 + 2 * exp(-4 * pi * c / (X/R)))

    Parameters
    ----------
    x_to_r_ratio : array_like
        Reactance over resistance of the circuit at power frequency; infinite is allowed. [1]
    cycles : array_like
        Cycles of power frequency since the current began. [1]

    Returns
    -------
    ndarray
        From sqrt(3) at the first instant down to 1; missing where an input is missing or negative. [1]

    Notes
    -----
    A linear R-L circuit fed by a constant voltage, closed so that the offset is greatest: no decay of
    the alternating part, no saturation of the iron. X/R of 0 counts as no offset at all.

    Examples
    --------
    X/R 20, half a cycle. By hand: exp(-0.31416) = 0.73040; sqrt(1 + 1.46080) = 1.5687.

    >>> offset_rms_ratio(20, 0.5).round(4).item()
    1.5687

    References
    ----------
    R-L circuit theory, the basis of the multipliers of IEEE C37.010.
    """
    x_to_r = zero_to_infinity(x_to_r_ratio)
    with np.errstate(divide="ignore", invalid="ignore"):
        decay = np.where(x_to_r == 0, np.inf, 4 * np.pi * zero_or_more(cycles) / x_to_r)
    # a missing number of cycles must stay missing where X/R is 0
    return floats(np.sqrt(1 + 2 * np.exp(-decay)) + 0 * zero_or_more(cycles))


def offset_rms_half_cycle_ratio(x_to_r_ratio: ArrayLike) -> Floats:
    """Rms of a fully offset current half a cycle after closing, over its symmetrical rms.

    F = sqrt(1 + 2 * exp(-2 * pi / (X/R)))

    Parameters
    ----------
    x_to_r_ratio : array_like
        Reactance over resistance of the circuit at power frequency. [1]

    Returns
    -------
    ndarray
        Between 1 and sqrt(3); missing where the input is missing or negative. [1]

    Notes
    -----
    As `offset_rms_ratio`. The figure that an element sensing true rms meets in a direct-on-line start.

    Examples
    --------
    X/R 10. By hand: exp(-0.62832) = 0.53349; sqrt(2.06698) = 1.4377.

    >>> offset_rms_half_cycle_ratio(10).round(4).item()
    1.4377

    References
    ----------
    R-L circuit theory, the basis of the multipliers of IEEE C37.010.
    """
    return offset_rms_ratio(x_to_r_ratio, 0.5)


def offset_peak_half_cycle_ratio(x_to_r_ratio: ArrayLike) -> Floats:
    """Current half a cycle after the start of a fully offset wave, over the symmetrical rms.

    F = sqrt(2) * (1 + exp(-pi / (X/R)))

    Parameters
    ----------
    x_to_r_ratio : array_like
        Reactance over resistance of the circuit at power frequency. [1]

    Returns
    -------
    ndarray
        From sqrt(2) to 2 sqrt(2); missing where the input is missing or negative. [1]

    Notes
    -----
    The usual approximation of the first peak, up to 2.1 % low at X/R 3 and 0.1 % at 20. The exact figure
    is `offset_first_peak_ratio`.

    Examples
    --------
    X/R 20. By hand: exp(-0.15708) = 0.85464; 1.41421 * 1.85464 = 2.6229.

    >>> offset_peak_half_cycle_ratio(20).round(4).item()
    2.6229

    References
    ----------
    R-L circuit theory; the form used with IEEE C37.13 and C37.010.
    """
    x_to_r = zero_to_infinity(x_to_r_ratio)
    with np.errstate(divide="ignore"):
        return floats(np.sqrt(2) * (1 + np.exp(-np.pi / x_to_r)))


def offset_first_peak_ratio(x_to_r_ratio: ArrayLike) -> Floats:
    """Highest instantaneous current after closing at voltage zero, over the symmetrical rms.

    i(a) = sqrt(2) * (sin(a - phi) + sin(phi) * exp(-a / (X/R))), tan(phi) = X/R, at its first maximum

    Parameters
    ----------
    x_to_r_ratio : array_like
        Reactance over resistance of the circuit at power frequency; infinite is allowed. [1]

    Returns
    -------
    ndarray
        From sqrt(2) to 2 sqrt(2); missing where the input is missing or negative. [1]

    Notes
    -----
    A linear R-L circuit fed by a constant sinusoidal voltage. Where the slope vanishes,
    cos(a - phi) = cos(phi) * exp(-a / (X/R)); the root is found by Newton's method from a = phi + 90 deg,
    from where it approaches without overshoot.

    Examples
    --------
    Without resistance the wave is sqrt(2) * (1 - cos(a)), by hand 2 * 1.41421 = 2.8284 at 180 deg.

    >>> offset_first_peak_ratio(float("inf")).round(4).item()
    2.8284

    References
    ----------
    Differential equation of the R-L circuit.
    """
    # a hair above zero: 1 / (X/R) must stay finite, and so little reactance leaves no offset to see
    x_to_r = np.maximum(zero_to_infinity(x_to_r_ratio), LEAST_X_TO_R)
    phase = np.arctan(x_to_r)
    angle = phase + np.pi / 2
    for _ in range(NEWTON_STEPS):
        offset = np.cos(phase) * np.exp(-angle / x_to_r)
        slope = np.cos(angle - phase) - offset
        bend = offset / x_to_r - np.sin(angle - phase)
        angle = angle - slope / bend
    return floats(np.sqrt(2) * (np.sin(angle - phase) + np.sin(phase) * np.exp(-angle / x_to_r)))


def x_to_r_from_offset_rms_ratio(offset_rms_ratio: ArrayLike, cycles: ArrayLike) -> Floats:
    """X/R at which a fully offset current has a given rms factor, some cycles after closing.

    X/R = 4 * pi * c / ln(2 / (F^2 - 1))

    Parameters
    ----------
    offset_rms_ratio : array_like
        Rms of the offset current over its symmetrical rms, from 1 to below sqrt(3). [1]
    cycles : array_like
        Cycles of power frequency since the current began, above zero. [1]

    Returns
    -------
    ndarray
        X/R, without bound towards sqrt(3); missing outside 1 to sqrt(3) or where an input is missing. [1]

    Notes
    -----
    The inverse of `offset_rms_ratio`: up to which X/R a pickup multiple rides through an offset start.

    Examples
    --------
    Factor 1.6, half a cycle. By hand: 2 * pi / ln(2 / 1.56) = 6.28319 / 0.248461 = 25.29.

    >>> x_to_r_from_offset_rms_ratio(1.6, 0.5).round(2).item()
    25.29

    References
    ----------
    R-L circuit theory.
    """
    factor = floats(offset_rms_ratio)
    squared = np.where((factor >= 1) & (factor <= np.sqrt(3)), factor * factor - 1, np.nan)
    with np.errstate(divide="ignore", invalid="ignore"):
        # sqrt(3) squared is not exactly 3 in binary: a hair above must not turn the sign
        return floats(4 * np.pi * above_zero(cycles) / np.maximum(np.log(2 / squared), 0.0))


def x_to_r_from_time_constant_ratio(time_constant_s: ArrayLike, frequency_hz: ArrayLike) -> Floats:
    """X/R of a circuit whose direct-current part decays with a given time constant.

    X/R = 2 * pi * f * T

    Parameters
    ----------
    time_constant_s : array_like
        Time constant L/R of the direct-current part. [s]
    frequency_hz : array_like
        Power frequency. [Hz]

    Returns
    -------
    ndarray
        X/R; missing where an input is missing, negative, or the frequency zero. [1]

    Notes
    -----
    One time constant for the whole circuit; a meshed network has several.

    Examples
    --------
    45 ms at 60 Hz. By hand: 376.991 * 0.045 = 16.96.

    >>> x_to_r_from_time_constant_ratio(0.045, 60).round(2).item()
    16.96

    References
    ----------
    R-L circuit theory; 45 ms is the standard time constant of IEC 62271-100 (from memory).
    """
    return floats(2 * np.pi * above_zero(frequency_hz) * zero_or_more(time_constant_s))


def x_to_r_from_power_factor_ratio(power_factor: ArrayLike) -> Floats:
    """X/R of a circuit whose short-circuit power factor is given.

    X/R = sqrt(1 - pf^2) / pf

    Parameters
    ----------
    power_factor : array_like
        Power factor of the short circuit, 0 to 1. [1]

    Returns
    -------
    ndarray
        X/R; infinite at power factor 0, missing outside 0 to 1. [1]

    Notes
    -----
    Low-voltage breakers are tested at a stated power factor: this gives the X/R behind their rating.

    Examples
    --------
    Power factor 0.15. By hand: sqrt(0.9775) / 0.15 = 6.59.

    >>> x_to_r_from_power_factor_ratio(0.15).round(2).item()
    6.59

    References
    ----------
    Circuit theory; 15 per cent is the test power factor of IEEE C37.13 (from memory).
    """
    factor = floats(power_factor)
    allowed = np.where((factor >= 0) & (factor <= 1), factor, np.nan)
    with np.errstate(divide="ignore"):
        return floats(np.sqrt(1 - allowed * allowed) / allowed)
