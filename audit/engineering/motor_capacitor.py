"""Line current of a motor with a capacitor at its terminals."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, present, together


def compensated_current_a(current_a: ArrayLike, power_factor: ArrayLike, capacitor_current_a: ArrayLike) -> Floats:
    """Line current ahead of a capacitor that stands at the motor's terminals.

    I' = sqrt((I * pf)^2 + (I * sqrt(1 - pf^2) - Ic)^2)

    Parameters
    ----------
    current_a : array_like
        Current of the motor itself. [A]
    power_factor : array_like
        Power factor of the motor at that current. [1]
    capacitor_current_a : array_like
        Current of the capacitor at the motor's voltage. [A]

    Returns
    -------
    ndarray
        Current in the line, which is what an overload device ahead of the capacitor sees. [A]

    Notes
    -----
    Fundamental only; harmonics in the supply add to the capacitor's current. Missing where an input is
    missing, a current is negative or the power factor lies outside 0 to 1.

    Examples
    --------
    100 A at 0.8, 40 A of capacitor. By hand: sqrt(80^2 + (60 - 40)^2) = 82.46 A.

    >>> compensated_current_a(100, 0.8, 40).round(2).item()
    82.46

    References
    ----------
    Phasor sum; NFPA 70 460.9 asks for the overload device to be set by the compensated current.
    """
    current, factor, capacitor = together(current_a, power_factor, capacitor_current_a)
    usable = present(current, factor, capacitor) & (current >= 0) & (capacitor >= 0) & (factor >= 0) & (factor <= 1)
    with np.errstate(invalid="ignore"):
        reactive = current * np.sqrt(1.0 - factor**2) - capacitor
        return np.where(usable, np.hypot(current * factor, reactive), np.nan)
