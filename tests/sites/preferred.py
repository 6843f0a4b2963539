"""Preferred ratings: what can be bought. Values common practice unless a source is named."""

from __future__ import annotations

from bisect import bisect_left

CT_PRIMARIES_A = (10, 15, 20, 25, 30, 40, 50, 60, 75, 100, 150, 200, 250, 300, 400, 500, 600, 800, 1000)
"""IEC 61869-2 preferred primary currents and their multiples, thinned to what is stocked."""

CONTACTORS_A = (9, 12, 18, 25, 32, 40, 50, 65, 80, 95, 115, 150, 185, 225, 265, 330, 400, 500, 630)
FUSES_A = (6, 10, 16, 20, 25, 32, 40, 50, 63, 80, 100, 125, 160, 200, 250, 315, 355, 400, 500, 630, 800)
MOULDED_BREAKERS_A = (16, 25, 32, 40, 50, 63, 80, 100, 125, 160, 200, 250, 320, 400, 500, 630, 800, 1000)
DIAL_RANGES_A = (
    (0.6, 1),
    (0.9, 1.5),
    (1.4, 2.2),
    (2, 3.2),
    (2.8, 4.6),
    (4, 6.3),
    (5.5, 8),
    (7, 10),
    (9, 13),
    (12, 18),
    (16, 24),
    (20, 32),
    (28, 40),
    (36, 52),
    (45, 65),
    (57, 82),
    (75, 110),
    (100, 145),
    (130, 185),
    (160, 250),
    (220, 330),
    (280, 420),
    (380, 580),
)
CABLES_MM2 = (2.5, 4, 6, 10, 16, 25, 35, 50, 70, 95, 120, 150, 185, 240, 300)


def next_up(series: tuple[float, ...], wanted: float) -> float:
    """Give the least member of a series that is not below what is wanted."""
    place = bisect_left(series, wanted)
    if place == len(series):
        raise ValueError(f"nothing of {wanted:g} or more in the series up to {series[-1]:g}")
    return float(series[place])


def dial_range(current_a: float) -> tuple[float, float]:
    """Give the dial range in which a current lies with room to both sides."""
    low, high = next((low, high) for low, high in DIAL_RANGES_A if low * 1.05 <= current_a <= high * 0.97)
    return float(low), float(high)
