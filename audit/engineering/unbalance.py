"""Unbalance from three magnitudes: by the deviation from the mean, and by symmetrical components."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, above_zero, floats, zero_or_more

ROUNDING = 1e-12


def deviation_from_mean_pct(first: ArrayLike, second: ArrayLike, third: ArrayLike) -> Floats:
    """Unbalance by NEMA: greatest deviation from the mean.

    100 * max|V - mean| / mean

    Parameters
    ----------
    first : array_like
        Line voltage or line current, all three in one unit. [1]
    second : array_like
        The second. [1]
    third : array_like
        The third. [1]

    Returns
    -------
    ndarray
        Unbalance; missing where an input is missing or negative, or all three are zero. [%]

    Notes
    -----
    Line-to-line voltages. It takes no account of angles: the voltage unbalance factor lies up to 15.5 per
    cent of its value above it, never below for small unbalance.

    Examples
    --------
    460, 467, 450 V. By hand: mean 459, deviation 9, 1.96 per cent.

    >>> deviation_from_mean_pct(460, 467, 450).round(2).item()
    1.96

    References
    ----------
    NEMA MG 1, 14.36.
    """
    one, two, three = zero_or_more(first), zero_or_more(second), zero_or_more(third)
    mean = above_zero((one + two + three) / 3)
    farthest = np.maximum(np.maximum(np.abs(one - mean), np.abs(two - mean)), np.abs(three - mean))
    return floats(100 * farthest / mean)


def negative_sequence_share_pct(first: ArrayLike, second: ArrayLike, third: ArrayLike) -> Floats:
    """Unbalance by symmetrical components: negative over positive sequence, from three magnitudes.

    100 * sqrt((1 - sqrt(3 - 6 b)) / (1 + sqrt(3 - 6 b))), b = (V1^4 + V2^4 + V3^4) / (V1^2 + V2^2 + V3^2)^2

    Parameters
    ----------
    first : array_like
        Line-to-line voltage, or line current of a motor without earth current, all three in one unit. [1]
    second : array_like
        The second. [1]
    third : array_like
        The third. [1]

    Returns
    -------
    ndarray
        Negative sequence in per cent of positive sequence; missing where an input is missing or negative, all
        are zero, or the three cannot close a triangle. [%]

    Notes
    -----
    The three phasors add up to nothing: line-to-line voltages always, line currents without earth
    current. Which of the two sequences is the greater follows from magnitudes only by convention: a
    reversed phase order reads like a sound one.

    Examples
    --------
    One phase open, 1, 1, 0. By hand: b = 2 / 4, the inner root vanishes, 100 per cent.

    >>> negative_sequence_share_pct(1, 1, 0).item()
    100.0

    References
    ----------
    IEC 61000-4-30, supply voltage unbalance (from memory); IEC 60034-26 for its use.
    """
    one, two, three = (zero_or_more(value) ** 2 for value in (first, second, third))
    spread = (one**2 + two**2 + three**2) / above_zero(one + two + three) ** 2
    radicand = 3 - 6 * spread
    # 3 - 6/2 and 3 - 6/3 leave rounding errors of either sign at the two ends
    inner = np.sqrt(np.clip(np.where(radicand < -ROUNDING, np.nan, radicand), 0.0, 1.0))
    return floats(100 * np.sqrt((1 - inner) / (1 + inner)))
