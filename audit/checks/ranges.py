"""Permissible ranges: for each motor and setting the band that its checks leave."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from audit.checks.verdicts import Outcome
from audit.derivation.workings import Workings
from audit.expression.nodes import Node, names_in
from audit.expression.values import NO, YES
from audit.fleet.column import ASSUMED

Floats = NDArray[np.float64]
Integers = NDArray[np.int64]
Mask = NDArray[np.bool_]
NO_CHECK = -1


@dataclass(slots=True)
class SettingRange:
    """The permissible range of one setting over all motors."""

    setting: str
    subject: str
    low: Floats
    high: Floats
    low_check: Integers
    high_check: Integers
    provisional: Mask
    moving: Mask
    assumed_end: Mask
    preferred_low: Floats
    preferred_high: Floats

    @staticmethod
    def open(setting: str, subject: str, size: int) -> SettingRange:
        """Give a range without ends."""

        def number() -> Floats:
            return np.full(size, np.nan)

        def flag() -> Mask:
            return np.zeros(size, dtype=bool)

        none = np.full(size, NO_CHECK, dtype=np.int64)
        return SettingRange(
            setting, subject, number(), number(), none.copy(), none.copy(), flag(), flag(), flag(), number(), number()
        )

    def conflict(self) -> Mask:
        """Tell where low lies above high, ends set by assumed data left out."""
        with np.errstate(invalid="ignore"):
            return (self.low > self.high * (1 + 1e-9)) & ~self.assumed_end

    def bounded(self) -> Mask:
        """Tell where at least one end is set."""
        return ~np.isnan(self.low) | ~np.isnan(self.high)

    def states(self) -> tuple[tuple[str, Mask], ...]:
        """Give the words that qualify a range, each with the rows that it holds for."""
        return ("provisional", self.provisional), ("moving", self.moving), ("conflict", self.conflict())


def settings_beneath(node: Node, workings: Workings, seen: set[str]) -> set[str]:
    """Give the settings that an expression rests on, through all recipes; `seen` gathers the names met."""
    found: set[str] = set()
    for name in names_in(node):
        if name in seen or name not in workings.quantities:
            continue
        seen.add(name)
        if workings.quantities[name].role == "setting":
            found.add(name)
        recipe = workings.recipes.get(name)
        for way in recipe.ways if recipe else ():
            found |= settings_beneath(way.node, workings, seen)
    return found


def permissible_ranges(outcomes: Iterable[Outcome], workings: Workings) -> dict[str, SettingRange]:
    """Gather the bounds of all checks into one range a setting and motor."""
    ranges: dict[str, SettingRange] = {}
    for number, outcome in enumerate(outcomes):
        if outcome.check.subject != "motor":
            continue
        for judged in outcome.judged:
            setting = judged.requirement.setting()
            quantity = workings.quantities.get(setting or "")
            if quantity is None or quantity.role != "setting" or quantity.kind != "number":
                continue
            if judged.requirement.bound is None:
                continue
            size = len(outcome.verdict)
            band = ranges.setdefault(quantity.name, SettingRange.open(quantity.name, "motor", size))
            moving = bool(settings_beneath(judged.requirement.bound, workings, set()) - {quantity.name})
            _narrow(
                band,
                number,
                outcome,
                judged.low,
                greatest=True,
                active=judged.active,
                moving=moving,
                basis=np.maximum(judged.bound_basis, judged.active_basis),
                wanted=judged.requirement.kind in ("at_least", "above", "equals"),
            )
            _narrow(
                band,
                number,
                outcome,
                judged.high,
                greatest=False,
                active=judged.active,
                moving=moving,
                basis=np.maximum(judged.bound_basis, judged.active_basis),
                wanted=judged.requirement.kind in ("at_most", "below", "equals"),
            )
    return ranges


def _narrow(
    band: SettingRange,
    number: int,
    outcome: Outcome,
    bound: Floats,
    *,
    greatest: bool,
    active: NDArray[np.int8],
    moving: bool,
    basis: NDArray[np.int8],
    wanted: bool,
) -> None:
    if not wanted:
        return
    in_force = (outcome.applies == YES) & (active == YES) & ~outcome.no_evidence
    open_question = (outcome.applies != NO) & (active != NO) & ~outcome.no_evidence & (np.isnan(bound) | ~in_force)
    if outcome.check.severity not in ("unsafe", "nuisance"):
        preferred = band.preferred_low if greatest else band.preferred_high
        tighter = in_force & ~np.isnan(bound)
        with np.errstate(invalid="ignore"):
            tighter &= np.isnan(preferred) | ((bound > preferred) if greatest else (bound < preferred))
        preferred[tighter] = bound[tighter]
        return
    end = band.low if greatest else band.high
    source = band.low_check if greatest else band.high_check
    with np.errstate(invalid="ignore"):
        tighter = in_force & ~np.isnan(bound) & (np.isnan(end) | ((bound > end) if greatest else (bound < end)))
    end[tighter] = bound[tighter]
    source[tighter] = number
    band.provisional |= open_question
    assumed = in_force & (basis == ASSUMED) & ~np.isnan(bound)
    band.provisional |= assumed
    band.assumed_end |= assumed
    if moving:
        band.moving |= in_force
