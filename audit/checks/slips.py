"""Slips of unit, base or ratio: the factor that would bring a value inside its bounds, and what it stands for."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from audit.checks.entry import Check
from audit.checks.ranges import SettingRange
from audit.derivation.workings import Workings
from audit.expression.text import plain_number
from audit.vocabulary.units import DIMENSIONLESS, UNITS, Unit

Floats = NDArray[np.float64]
Mask = NDArray[np.bool_]
NO_SLIP = -1
NEAR = 0.15
"""How near a value lies to a sign, as a share of it."""


@dataclass(frozen=True, slots=True)
class Slip:
    """For each row the slip that explains its value best, or NO_SLIP, and the factor that puts it right."""

    which: NDArray[np.int64]
    factor: Floats


def explaining_slip(present: Floats, low: Floats, high: Floats, factors: Sequence[Floats]) -> Slip:
    """Find the factor that brings a value inside its bounds when it is multiplied or divided by it.

    Of several the one that brings it nearest to the middle of the bounds, on a logarithmic scale.

    Examples
    --------
    900 within 0.5 to 1.5 is explained by 1000 (milli), not by 60.

    >>> slip = explaining_slip(np.array([900.0]), np.array([0.5]), np.array([1.5]), [np.array([60.0]), np.array([1e3])])
    >>> slip.which.tolist(), slip.factor.tolist()
    ([1], [0.001])
    """
    size = len(present)
    best = Slip(np.full(size, NO_SLIP, dtype=np.int64), np.full(size, np.nan))
    nearest = np.full(size, np.inf)
    with np.errstate(all="ignore"):
        ends = np.where(np.isnan(low), high, low), np.where(np.isnan(high), low, high)
        middle = np.sqrt(ends[0] * ends[1])
        for number, factor in enumerate(factors):
            for turned in (factor, 1 / factor):
                corrected = present * turned
                inside = ~(corrected < low * (1 - 1e-9)) & ~(corrected > high * (1 + 1e-9)) & (present > 0)
                away = np.abs(np.log(corrected / middle))
                better = inside & (away < nearest)
                best.which[better] = number
                best.factor[better] = turned[better]
                nearest[better] = away[better]
    return best


def unit_name(unit: Unit) -> str:
    """Give the short name of a unit, as entries write it."""
    return next((name for name, known in UNITS.items() if known == unit), "1")


def factors_of(check: Check, unit: Unit, subject: str, workings: Workings) -> tuple[tuple[str, ...], list[Floats]]:
    """Give the slips that a check names for a unit, and their factors in each row of the subject."""
    names = check.slips.get(unit_name(unit), ())
    scope = workings.scope(subject)
    size = workings.fleet.rows(subject)
    return names, [np.broadcast_to(np.asarray(scope.value(name).values, dtype=float), size) for name in names]


def slipped(check: Check, band: SettingRange, workings: Workings) -> Mask:
    """Tell where a setting lies far outside its range and a slip would explain it.

    The range must be narrow beside the slip: within a wide one some factor fits any value.
    """
    quantity = workings.quantities[band.setting]
    names, factors = factors_of(check, quantity.unit or DIMENSIONLESS, band.subject, workings)
    if not names or check.beyond is None:
        return np.zeros(len(band.low), dtype=bool)
    present = workings.column(band.subject, band.setting).values
    beyond = workings.limits[check.beyond].value
    with np.errstate(all="ignore"):
        far = (present * beyond < band.low * (1 - 1e-9)) | (present > band.high * beyond * (1 + 1e-9))
        width = band.high / band.low
        telling = [np.where(width * width <= np.maximum(factor, 1 / factor), factor, np.nan) for factor in factors]
    explained = explaining_slip(present, band.low, band.high, telling).which != NO_SLIP
    return np.asarray(far & (band.low <= band.high) & ~band.assumed_end & explained)


def range_hits(check: Check, band: SettingRange, workings: Workings) -> Mask:
    """Tell where a check of ranges finds something: a slip, where it names slips, else a range without a value."""
    return slipped(check, band, workings) if check.slips else band.conflict()


def slip_in_words(check: Check, unit: Unit, figures: tuple[float, float, float], row: int, workings: Workings) -> str:
    """Say which slip would explain a value (present, low, high) in one row, or nothing."""
    present, low, high = (np.array([figure]) for figure in figures)
    names, factors = factors_of(check, unit, check.subject, workings)
    slip = explaining_slip(present, low, high, [factor[row : row + 1] for factor in factors])
    if slip.which[0] == NO_SLIP:
        return ""
    name = names[int(slip.which[0])]
    limit = workings.limits.get(name)
    says = limit.says if limit is not None else workings.quantities[name].label
    factor = float(slip.factor[0])
    turned = f"multiplied by {plain_number(factor)}" if factor > 1 else f"divided by {plain_number(1 / factor)}"
    return f"{turned} it would fit: {says}"


def sign_in_words(check: Check, present: float, workings: Workings) -> str:
    """Say which cause a value points at, or nothing."""
    for name in check.signs:
        limit = workings.limits[name]
        if abs(present - limit.value) <= NEAR * abs(limit.value):
            return f"near {plain_number(limit.value)} {limit.unit.symbol}: {limit.says}".replace(" :", ":")
    return ""
