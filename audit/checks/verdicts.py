"""Evaluate checks over all rows of their subject: four verdicts, three-valued, column-wise."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from audit.checks.entry import NUMBER_BOUNDS, Check, Requirement
from audit.derivation.workings import SubjectScope, Workings, expand_lacks
from audit.expression.lacking import lacking
from audit.expression.values import NO, UNKNOWN, YES, Value, compare_numbers, evaluate, folded_text
from audit.fleet.column import ASSUMED

NOT_APPLICABLE, UNPROVEN, MEETS, BREACH = 0, 1, 2, 3
VERDICT_NAMES = ("not applicable", "unproven", "meets", "breach")
Mask = NDArray[np.bool_]
_OPERATORS = {"at_least": ">=", "above": ">", "at_most": "<=", "below": "<"}


@dataclass(frozen=True, slots=True)
class Judged:
    """One requirement over all rows: whether it applies, whether it holds, and the figures behind it."""

    requirement: Requirement
    active: NDArray[np.int8]
    """Whether the requirement's own condition holds: 0, 1 (unknown) or 2."""
    active_basis: NDArray[np.int8]
    holds: NDArray[np.int8]
    basis: NDArray[np.int8]
    """Basis of what is judged and of its bound; the condition has its own."""
    present: NDArray[np.float64]
    low: NDArray[np.float64]
    high: NDArray[np.float64]
    bound_basis: NDArray[np.int8]
    deciding: NDArray[np.int64] | None


@dataclass(frozen=True, slots=True)
class Outcome:
    """The verdicts of one check, row by row."""

    check: Check
    verdict: NDArray[np.int8]
    provisional: Mask
    no_evidence: Mask
    applies: NDArray[np.int8]
    judged: tuple[Judged, ...]

    def counts(self) -> dict[str, int]:
        """Count the verdicts; they add up to the rows of the subject."""
        return {name: int((self.verdict == code).sum()) for code, name in enumerate(VERDICT_NAMES)}

    def decisive(self, row: int) -> int:
        """Give the place of the requirement that is broken in a row, or 0."""
        for place, judged in enumerate(self.judged):
            if judged.active[row] == YES and judged.holds[row] == NO:
                return place
        return 0


def _spread(values: NDArray[np.generic], size: int) -> NDArray[np.generic]:
    return np.broadcast_to(values, size)


def evaluate_check(check: Check, workings: Workings) -> Outcome:
    """Evaluate one check over all rows of its subject."""
    size = workings.fleet.rows(check.subject)
    scope = workings.scope(check.subject)
    condition = evaluate(check.when, scope)
    applies = np.array(_spread(condition.values, size), dtype=np.int8)
    basis = np.array(_spread(condition.basis, size), dtype=np.int8)
    judged = tuple(_judge(requirement, workings, check.subject, size) for requirement in check.requirements)
    holds, weakest, any_active = _together(judged, size)
    basis = np.maximum(basis, weakest)
    verdict = np.full(size, UNPROVEN, dtype=np.int8)
    verdict[(applies == YES) & (holds == YES)] = MEETS
    verdict[(applies == YES) & (holds == NO)] = BREACH
    verdict[applies == NO] = NOT_APPLICABLE
    verdict[any_active == NO] = NOT_APPLICABLE
    no_evidence = np.zeros(size, dtype=bool)
    if check.evidence:
        absent = np.ones(size, dtype=bool)
        for name in check.evidence:
            absent &= workings.column(check.subject, name).missing()
        no_evidence = absent & (verdict == UNPROVEN)
        verdict[no_evidence] = NOT_APPLICABLE
    provisional = ((verdict == MEETS) | (verdict == BREACH)) & (basis == ASSUMED)
    return Outcome(check, verdict, provisional, no_evidence, applies, judged)


def _together(judged: tuple[Judged, ...], size: int) -> tuple[NDArray[np.int8], NDArray[np.int8], NDArray[np.int8]]:
    """Join requirements: each must hold where its own condition holds; where none has a say, nothing applies."""
    holds = np.full(size, YES, dtype=np.int8)
    any_active = np.full(size, NO, dtype=np.int8)
    basis = np.zeros(size, dtype=np.int8)
    broken_basis = np.full(size, np.int8(127))
    for one in judged:
        # like 'condition is no, or the bound is met': either alone settles it, and then the better-founded one counts
        idle = (YES - one.active).astype(np.int8)
        said = np.maximum(idle, one.holds)
        settling = np.minimum(
            np.where(idle == YES, one.active_basis, np.int8(127)), np.where(one.holds == YES, one.basis, np.int8(127))
        )
        said_basis = np.where(said == YES, settling, np.maximum(one.active_basis, one.basis)).astype(np.int8)
        broken = said == NO
        broken_basis[broken] = np.minimum(broken_basis[broken], said_basis[broken])
        basis = np.maximum(basis, said_basis)
        holds = np.minimum(holds, said)
        any_active = np.maximum(any_active, one.active)
    return holds, np.where(holds == NO, broken_basis, basis).astype(np.int8), any_active


def _judge(requirement: Requirement, workings: Workings, subject: str, size: int) -> Judged:
    scope = workings.scope(subject)
    active = np.full(size, YES, dtype=np.int8)
    active_basis = np.zeros(size, dtype=np.int8)
    if requirement.when is not None:
        condition = evaluate(requirement.when, scope)
        active = np.array(_spread(condition.values, size), dtype=np.int8)
        active_basis = np.array(_spread(condition.basis, size), dtype=np.int8)
    nothing = np.full(size, np.nan)
    if requirement.kind == "requires" or requirement.judged is None:
        assert requirement.bound is not None
        truth = evaluate(requirement.bound, scope)
        holds = np.array(_spread(truth.values, size), dtype=np.int8)
        all_basis = np.array(_spread(truth.basis, size), dtype=np.int8)
        return Judged(
            requirement, active, active_basis, holds, all_basis, nothing, nothing, nothing, all_basis, scope.deciding
        )
    judged = evaluate(requirement.judged, scope)
    basis = np.array(_spread(judged.basis, size), dtype=np.int8)
    deciding = scope.deciding
    if requirement.kind == "must_be":
        wanted = YES if requirement.text == "on" else NO
        truth_values = np.array(_spread(judged.values, size), dtype=np.int8)
        holds = np.where(truth_values == UNKNOWN, UNKNOWN, np.where(truth_values == wanted, YES, NO)).astype(np.int8)
        present = np.where(truth_values == UNKNOWN, np.nan, truth_values / YES)
        target = np.full(size, wanted / YES)
        return Judged(requirement, active, active_basis, holds, basis, present, target, target, basis, deciding)
    if requirement.kind == "must_be_stated":
        holds = np.where(_spread(judged.missing(), size), NO, YES).astype(np.int8)
        return Judged(requirement, active, active_basis, holds, basis, nothing, nothing, nothing, basis, deciding)
    assert requirement.bound is not None
    bound = evaluate(requirement.bound, scope)
    bound_basis = np.array(_spread(bound.basis, size), dtype=np.int8)
    basis = np.maximum(basis, bound_basis)
    if judged.sort != "number":
        same = _same_words(judged, bound, size)
        return Judged(requirement, active, active_basis, same, basis, nothing, nothing, nothing, bound_basis, deciding)
    present = np.array(_spread(judged.values, size), dtype=float)
    limit = np.array(_spread(bound.values, size), dtype=float)
    holds, low, high = _against(requirement, present, limit, scope, size)
    return Judged(requirement, active, active_basis, holds, basis, present, low, high, bound_basis, deciding)


def _against(
    requirement: Requirement,
    present: NDArray[np.float64],
    limit: NDArray[np.float64],
    scope: SubjectScope,
    size: int,
) -> tuple[NDArray[np.int8], NDArray[np.float64], NDArray[np.float64]]:
    nothing = np.full(size, np.nan)
    assert requirement.kind in NUMBER_BOUNDS
    if requirement.kind == "equals":
        within = np.zeros(size)
        if requirement.within is not None:
            within = np.array(_spread(evaluate(requirement.within, scope).values, size), dtype=float)
        low, high = limit - within, limit + within
        holds = np.minimum(compare_numbers(">=", present, low), compare_numbers("<=", present, high))
        return holds, low, high
    holds = compare_numbers(_OPERATORS[requirement.kind], present, limit)
    if requirement.kind in ("at_least", "above"):
        return holds, limit, nothing
    return holds, nothing, limit


def _same_words(first: Value, second: Value, size: int) -> NDArray[np.int8]:
    unknown = _spread(first.missing() | second.missing(), size)
    if first.sort == "choice":
        places = {word: code for code, word in enumerate(first.choices)}
        codes = np.array([*(places.get(word, -2) for word in second.choices), -1])
        same = first.values == codes[second.values]
    elif first.sort == "text":
        same = np.asarray(folded_text(first.values) == folded_text(second.values))
    else:
        same = first.values == second.values
    return np.where(unknown, UNKNOWN, np.where(_spread(same, size), YES, NO)).astype(np.int8)


def data_lacking(outcome: Outcome, workings: Workings) -> dict[str, Mask]:
    """Give for each datum the unproven (or provisional) rows that it would help to settle."""
    check = outcome.check
    scope = workings.scope(check.subject)
    unproven = outcome.verdict == UNPROVEN
    found: dict[str, Mask] = dict(lacking(check.when, scope, unproven & (outcome.applies == UNKNOWN)))
    for judged in outcome.judged:
        open_rows = unproven & (judged.holds == UNKNOWN) & (judged.active != NO)
        parts = [(judged.requirement.judged, open_rows), (judged.requirement.bound, open_rows)]
        if judged.requirement.when is not None:
            parts.append((judged.requirement.when, unproven & (judged.active == UNKNOWN)))
        for node, rows in parts:
            if node is None:
                continue
            for name, mask in lacking(node, scope, rows).items():
                found[name] = found.get(name, np.zeros_like(mask)) | mask
    return expand_lacks(workings, check.subject, found)
