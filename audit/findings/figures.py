"""Figures of a finding: values with their unit, permissible ranges and margins."""

from __future__ import annotations

import numpy as np

from audit.derivation.trace import day_text
from audit.expression.text import plain_number
from audit.vocabulary.units import UNITS, Unit


def known_or_none(value: float) -> float | None:
    """Give a number, None where it is missing."""
    return None if np.isnan(value) else value


def is_outside(present: float, low: float | None, high: float | None) -> bool:
    """Tell whether a value lies outside the ends that are known."""
    return (low is not None and present < low) or (high is not None and present > high)


def with_unit(value: float, unit: Unit) -> str:
    """Write a value with its unit, a date as a day."""
    if unit == UNITS["date"]:
        return day_text(value)
    return f"{plain_number(value)} {unit.symbol}".strip()


def range_text(low: float | None, high: float | None, unit: Unit, *, beyond: bool = False) -> str:
    """Write a permissible range; beyond a single end where that end itself does not do.

    >>> from audit.vocabulary.units import UNITS
    >>> range_text(1020.0, None, UNITS["a"]), range_text(None, None, UNITS["a"])
    ('1,020 A or more', '')
    >>> range_text(0.0, None, UNITS["1"], beyond=True), range_text(None, -0.1, UNITS["s"])
    ('above 0', 'none (would be -0.1 s)')
    """
    if low is None and high is None:
        return ""
    if high is None:
        return f"above {with_unit(low or 0.0, unit)}" if beyond else f"{with_unit(low or 0.0, unit)} or more"
    if low is None:
        if high < 0 and unit in (UNITS["s"], UNITS["a"], UNITS["v"]):
            return f"none (would be {with_unit(high, unit)})"
        return f"below {with_unit(high, unit)}" if beyond else f"{with_unit(high, unit)} or less"
    if low == high:
        return with_unit(low, unit)
    if low > high:
        return f"none ({with_unit(low, unit)} > {with_unit(high, unit)})"
    return f"{plain_number(low)} to {with_unit(high, unit)}"


def margin_pct(present: float, low: float | None, high: float | None) -> float | None:
    """Give the distance to the nearer end in per cent of that end; positive inside the range.

    >>> margin_pct(900.0, 1000.0, None)
    -10.0
    """
    if present != present:
        return None
    margins = []
    if low:
        margins.append((present - low) / low * 100)
    if high:
        margins.append((high - present) / high * 100)
    return min(margins) if margins else None
