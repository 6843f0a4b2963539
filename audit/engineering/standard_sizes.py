"""Standard ampere ratings of fuses and circuit-breakers of US practice."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, entry_at, together

_STANDARD_A = (
    1.0, 3.0, 6.0, 10.0, 15.0, 20.0, 25.0, 30.0, 35.0, 40.0, 45.0, 50.0, 60.0, 70.0, 80.0, 90.0, 100.0, 110.0, 125.0,
    150.0, 175.0, 200.0, 225.0, 250.0, 300.0, 350.0, 400.0, 450.0, 500.0, 600.0, 601.0, 700.0, 800.0, 1000.0, 1200.0,
    1600.0, 2000.0, 2500.0, 3000.0, 4000.0, 5000.0, 6000.0,
)  # fmt: skip


def next_standard_fuse_a(current_a: ArrayLike) -> Floats:
    """Standard fuse rating that is not below a current.

    Parameters
    ----------
    current_a : array_like
        Calculated current. [A]

    Returns
    -------
    ndarray
        The rating itself where the current is one, else the next higher one. [A]

    Notes
    -----
    From 1 A to 6000 A; missing above, and for currents that are missing or negative. A millionth is forgiven,
    so that a product that comes out just above a rating still means that rating.

    Examples
    --------
    From the list: 1.75 times 124 A is 217 A, next is 225 A; 100 A stays 100 A.

    >>> next_standard_fuse_a([217, 100]).tolist()
    [225.0, 100.0]

    References
    ----------
    NFPA 70, 240.6(A), from memory.
    """
    (current,) = together(current_a)
    place = np.searchsorted(_STANDARD_A, current * (1 - 1e-6), side="left").astype(np.float64)
    usable = (current >= 0) & (place < len(_STANDARD_A))
    return entry_at(_STANDARD_A, np.where(usable, place, -1.0))
