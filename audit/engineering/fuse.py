"""Where a fuse takes over from relay and contactor."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, above_zero
from audit.engineering.point_curve import current_on_curves_a


def takeover_current_a(
    relay_and_device_time_s: ArrayLike, curve_current_a: ArrayLike, curve_time_s: ArrayLike
) -> Floats:
    """Current above which the fuse is faster than a relay of definite time and the device that it opens.

    The current at which the fuse curve has the time of relay plus device, on log-log paper

    Parameters
    ----------
    relay_and_device_time_s : array_like
        Time of the relay's definite-time element plus opening time of the contactor, one a row. [s]
    curve_current_a : array_like
        Currents of the points of the fuse curve, one curve a row, rising; filled up with missing. [A]
    curve_time_s : array_like
        Times of the points, falling or level, filled up likewise. [s]

    Returns
    -------
    ndarray
        Take-over current per row; missing where an input is missing, the curve unusable, or its points do
        not reach the time. [A]

    Notes
    -----
    Total clearing curve of the fuse with the least time of relay and contactor: the contactor does not
    open a current above its rating before the fuse has cleared. Melting curve with the greatest time: the
    contactor leaves the fuse intact below. A relay that is not of definite time near the crossing is
    not covered.

    Examples
    --------
    A straight I^2 t line from 3 kA in 0.4 s to 6 kA in 0.1 s; relay 0.1 s plus contactor 0.1 s. By hand:
    3000 * sqrt(0.4 / 0.2) = 4,243 A.

    >>> takeover_current_a([0.2], [[3000, 6000]], [[0.4, 0.1]]).round(0).tolist()
    [4243.0]

    References
    ----------
    IEC 60947-4-1 and IEC 62271-106, take-over current.
    """
    time = np.atleast_1d(above_zero(relay_and_device_time_s))
    return current_on_curves_a(time, curve_current_a, curve_time_s)
