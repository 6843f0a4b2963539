"""Propose one value inside a permissible range, and say how it was chosen."""

from __future__ import annotations

import math
from dataclasses import dataclass

from audit.expression.text import plain_number
from audit.findings.handover.written import WrittenSetting

MARGIN = 0.05
"""Distance kept from the nearer end, as a part of it (common practice: about the tolerance of a relay's pickup)."""
SLACK = 1e-9


@dataclass(frozen=True, slots=True)
class Proposal:
    """A value in the export's own unit or words, or none, and why."""

    value: float | str | None
    how: str


def propose_number(
    present: float, low: float | None, high: float | None, written: WrittenSetting, symbol: str
) -> Proposal:
    """Propose the smallest change: the nearer end and a margin inside it, but not past the middle, on a whole step."""
    if low is None and high is None:
        return Proposal(None, "no end of the range is known")
    if low is not None and high is not None and low > high:
        return Proposal(None, "none: the range is empty, no value satisfies both ends")
    if math.isnan(written.factor) or math.isnan(written.step) or not written.factor > 0:
        return Proposal(None, "none: the export does not tell the unit, the base or the step of this setting")
    raise_it = low is not None and (present != present or present < low * (1 + SLACK) or high is None)
    end = low if raise_it else high
    assert end is not None
    target = end + (MARGIN if raise_it else -MARGIN) * abs(end)
    if low is not None and high is not None:
        middle = (low + high) / 2
        target = min(target, middle) if raise_it else max(target, middle)
    number = _on_step(written.number_for(target), written.step, up=raise_it)
    if not inside(written.primary(number), low, high):
        number = _on_step(written.number_for(target), written.step, up=not raise_it)
    if not inside(written.primary(number), low, high) or number == written.number:
        return Proposal(None, f"none: no step of {written.step:g} lies inside the range")
    side = "low" if raise_it else "high"
    shown = f"{plain_number(end)} {symbol}".strip()
    return Proposal(
        number,
        f"smallest change: {side} end {shown}, {MARGIN:.0%} inside it but not past the middle, "
        f"on a step of {written.step:g}",
    )


def propose_switch(wanted_on: bool, written: WrittenSetting) -> Proposal:
    """Propose on or off in the export's own word."""
    return Proposal(written.on_word if wanted_on else written.off_word, "the only state that the check allows")


def inside(value: float, low: float | None, high: float | None) -> bool:
    """Tell whether a value lies inside a range; a setting typed at its limit does.

    >>> inside(10.0, 10.0, None), inside(9.9, 10.0, None), inside(5.0, None, None)
    (True, False, True)
    """
    above = low is None or value >= low - SLACK * abs(low)
    return above and (high is None or value <= high + SLACK * abs(high))


def _on_step(number: float, step: float, *, up: bool) -> float:
    whole = number / step
    whole = math.ceil(whole - 1e-6) if up else math.floor(whole + 1e-6)
    return round(whole * step, 6)
