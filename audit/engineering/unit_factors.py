"""Exact factors between the units that nameplates and US tables use and those used here."""

from __future__ import annotations

from math import pi

KW_PER_HP = 0.745_699_871_582_270_22
"""One mechanical horsepower is 550 ft lbf/s: 550 x 0.3048 x 0.45359237 x 9.80665 W."""

KG_M2_PER_LB_FT2 = 0.453_592_37 * 0.3048**2
"""Avoirdupois pound (0.45359237 kg) and international foot (0.3048 m), both exact by definition."""

NEWTON_METRE_PER_LB_FT = 0.453_592_37 * 9.806_65 * 0.3048
"""Pound-force foot at standard gravity."""

RADIANS_PER_SECOND_PER_RPM = pi / 30.0
"""One turn a minute is 2 pi / 60 rad/s."""

SQRT3 = 3.0**0.5
"""Line to phase factor of a balanced three-phase system."""
