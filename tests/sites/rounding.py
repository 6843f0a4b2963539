"""Round to the steps in which data are printed and relays are set."""

from __future__ import annotations

import math


def clean(value: float) -> float:
    """Drop the binary dust of a product of decimal numbers."""
    return float(f"{value:.10g}")


def near(value: float, step: float) -> float:
    """Round to the nearest step."""
    return clean(math.floor(value / step + 0.5) * step)


def up(value: float, step: float) -> float:
    """Round up to a step; a value already on a step stays."""
    return clean(math.ceil(value / step - 1e-9) * step)


def down(value: float, step: float) -> float:
    """Round down to a step; a value already on a step stays."""
    return clean(math.floor(value / step + 1e-9) * step)


def printed(value: float) -> float:
    """Round a current as plates print it: three figures, whole amperes from 100 A."""
    if value >= 100:
        return float(round(value))
    return round(value, 1)
